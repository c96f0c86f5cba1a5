/**
 * Taylor expansions of a Hamiltonian about a point. First with coefficients in a real field; only if a parameter is
 * kept as a symbol, or a number outside the field reaches a coefficient, over rational functions in these.
 */
import { type Algebraic, RealField } from '../../field/index.ts';
import { type Polynomial, PolynomialRing } from '../../polynomial/index.ts';
import { type Expression, resolveDefinitions } from './ast.ts';
import { type Constants, doubleConstants, doubles } from './constants.ts';
import { ExactConstants } from './exact-constants.ts';
import { expandExpression, unknownName } from './expand.ts';
import { type Jet, JetAlgebra } from './jet.ts';
import { compileNumeric } from './numeric.ts';
import { parseExpression } from './parser.ts';
import type { Value } from './relation.ts';
import { withField } from './signals.ts';

export interface TaylorRequest {
  /** The expansion variables: coordinates, and parameters that are to be expanded too. */
  readonly names: readonly string[];
  /** Where to expand; names that are missing are at 0. Expressions in the parameters. */
  readonly point?: ReadonlyMap<string, Expression>;
  /** Values of the other names, expressions in each other; undefined: no value. */
  readonly parameters?: ReadonlyMap<string, Expression | undefined>;
  /** Parameters to keep as symbols, whatever their values. */
  readonly keep?: readonly string[];
  /** Terms up to this total degree. */
  readonly degree: number;
  /** A field to start from; the result's field contains it. */
  readonly field?: RealField;
}

interface Expansion {
  readonly degree: number;
  /** The field of all numbers. */
  readonly field: RealField;
  /** Arithmetic of `value` and `point`. */
  readonly constants: ExactConstants;
  /** The value at the point. */
  readonly value: Value;
  /** The point, in the order of the names. */
  readonly point: readonly Value[];
}

/** All coefficients are numbers of the field. `polynomial` is in (names - point), without the value at the point. */
export interface ExactTaylor extends Expansion {
  readonly kind: 'exact';
  readonly ring: PolynomialRing<Algebraic>;
  readonly polynomial: Polynomial<Algebraic>;
}

/** Coefficients are rational functions in kept parameters and atoms. */
export interface SymbolicTaylor extends Expansion {
  readonly kind: 'symbolic';
  readonly ring: PolynomialRing<Value>;
  readonly polynomial: Polynomial<Value>;
  /** Kept parameters that occur in coefficients. */
  readonly symbols: readonly string[];
  /** What keeps coefficients from being exact, such as `log(2)`; empty if nothing does. */
  readonly atoms: readonly string[];
}

export type TaylorResult = ExactTaylor | SymbolicTaylor;

/** A constant has no place among the coefficients. */
class NeedsSymbols extends Error {}

/**
 * The Taylor expansion of `e`. Throws InputError if e is not smooth at the point or a name has no value,
 * LimitError if the field or a number becomes too large.
 */
export function taylor(e: Expression, request: TaylorRequest): TaylorResult {
  return withField((field) => {
    if ((request.keep ?? []).length === 0) {
      try {
        return exactTaylor(e, request, field);
      } catch (signal) {
        if (!(signal instanceof NeedsSymbols)) throw signal;
      }
    }
    return symbolicTaylor(e, request, field);
  }, request.field ?? RealField.of()).result;
}

function run<V, C>(
  e: Expression,
  request: TaylorRequest,
  algebra: JetAlgebra<V, C>,
  symbol: (name: string) => V | undefined,
): { jet: Jet<V, C>; point: V[] } {
  const parameters = request.parameters ?? new Map<string, Expression | undefined>();
  const given = new Map(
    [...parameters].filter((entry): entry is [string, Expression] => entry[1] !== undefined && symbol(entry[0]) === undefined),
  );
  const resolved = resolveDefinitions(given);
  const known = [...request.names, ...given.keys(), ...(request.keep ?? [])];
  const values = new Map<string, Jet<V, C>>();
  const constant = (name: string): Jet<V, C> | undefined => {
    const kept = symbol(name);
    if (kept !== undefined) return algebra.constant(kept);
    const done = values.get(name);
    if (done !== undefined) return done;
    const expression = resolved.get(name);
    if (expression === undefined) {
      if (parameters.has(name)) throw unknownName(name, []);
      return undefined;
    }
    const jet = expandExpression(expression, algebra, constant, known);
    values.set(name, jet);
    return jet;
  };
  const zero = algebra.constants.field.zero;
  const point = request.names.map((name) => {
    const at = request.point?.get(name);
    return at === undefined ? zero : expandExpression(at, algebra, constant, known).value;
  });
  const index = new Map(request.names.map((name, i) => [name, i]));
  const leaf = (name: string) => {
    const i = index.get(name);
    return i === undefined ? constant(name) : algebra.variable(i, point[i]!);
  };
  return { jet: expandExpression(e, algebra, leaf, known), point };
}

function exactTaylor(e: Expression, request: TaylorRequest, field: RealField): ExactTaylor {
  const constants = new ExactConstants(field);
  const ring = new PolynomialRing(field, request.names);
  const algebra = new JetAlgebra<Value, Algebraic>(constants, ring, request.degree, (v) => {
    const c = constants.constant(v);
    if (c === undefined) throw new NeedsSymbols();
    return c;
  });
  const { jet, point } = run(e, request, algebra, () => undefined);
  return { kind: 'exact', degree: request.degree, field, constants, value: jet.value, point, ring, polynomial: jet.rest };
}

function symbolicTaylor(e: Expression, request: TaylorRequest, field: RealField): TaylorResult {
  const kept = (request.keep ?? []).filter((name) => !request.names.includes(name));
  const constants = new ExactConstants(field, kept);
  const open = new PolynomialRing<Value>(constants.field, request.names);
  const algebra = new JetAlgebra<Value, Value>(constants, open, request.degree, (v) => v);
  const symbols = new Set(kept);
  const { jet, point } = run(e, request, algebra, (name) => (symbols.has(name) ? constants.field.symbol(name) : undefined));
  const polynomial = open.map(jet.rest, (c) => constants.simplify(c), open);
  const common = { degree: request.degree, field, constants, value: constants.simplify(jet.value), point };
  const used = new Set<string>();
  for (const c of polynomial.coefficients)
    for (const p of [c.numerator, c.denominator]) for (const i of constants.field.ring.support(p)) used.add(constants.field.symbols[i]!);
  if (used.size === 0 && kept.length === 0) {
    const ring = new PolynomialRing(field, request.names);
    return { kind: 'exact', ...common, ring, polynomial: open.map(polynomial, (c) => constants.constant(c)!, ring) };
  }
  const ring = new PolynomialRing<Value>(constants.field, request.names);
  const atoms = constants.atoms.filter((a) => used.has(a));
  return { kind: 'symbolic', ...common, ring, polynomial, symbols: kept.filter((s) => used.has(s)), atoms };
}

/**
 * The coefficients of an expansion in double precision; `values` are those of the kept parameters.
 * Throws RangeError if one has no value or a denominator vanishes.
 */
export function floatingCoefficients(result: TaylorResult, values: ReadonlyMap<string, number> = new Map()): Polynomial<number> {
  const ring = new PolynomialRing(doubles, result.ring.variables);
  if (result.kind === 'exact') return result.ring.map(result.polynomial, (c) => result.field.toNumber(c), ring);
  const { constants } = result;
  const names = [...values.keys()];
  const at = [...values.values()];
  const all = new Map(values);
  for (const atom of result.atoms) all.set(atom, compileNumeric(parseExpression(atom), names)(at));
  return result.ring.map(result.polynomial, (c) => constants.field.evaluateNumber(c, all), ring);
}

/** The same expansion in double precision throughout. */
export function floatingTaylor(
  e: Expression,
  request: {
    readonly names: readonly string[];
    readonly point?: ReadonlyMap<string, number>;
    readonly parameters?: ReadonlyMap<string, number>;
    readonly degree: number;
  },
): { readonly ring: PolynomialRing<number>; readonly polynomial: Polynomial<number>; readonly value: number } {
  const ring = new PolynomialRing(doubles, request.names);
  const constants: Constants<number> = doubleConstants;
  const algebra = new JetAlgebra<number, number>(constants, ring, request.degree, (v) => v);
  const index = new Map(request.names.map((name, i) => [name, i]));
  const leaf = (name: string) => {
    const i = index.get(name);
    if (i !== undefined) return algebra.variable(i, request.point?.get(name) ?? 0);
    const value = request.parameters?.get(name);
    return value === undefined ? undefined : algebra.constant(value);
  };
  const jet = expandExpression(e, algebra, leaf, [...request.names, ...(request.parameters?.keys() ?? [])]);
  return { ring, polynomial: jet.rest, value: jet.value };
}
