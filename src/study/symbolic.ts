/**
 * A model whose parameters stay symbols: those without a value always, those that vary as well. S is then a matrix of rational
 * functions, H is checked to be invariant and at equilibrium for every value of the parameters that have none.
 */
import { embedSparse, signOf } from '../action/index.ts';
import { NotAnEquilibriumError, NotInvariantError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { dense, type SparseMatrix, sparseApply, sparseCongruence, sparseEquals, sparseFromMaps } from '../linear/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { energyExpression, floatingSource } from '../model/energy.ts';
import { type Expression, parseExpression, symbolsOf, type TaylorResult, taylor } from '../model/expression/index.ts';
import { polynomialDegree } from '../model/polynomial-energy.ts';
import { type Quantities, readQuantities } from '../model/quantities.ts';
import { factorsOf, type Polynomial, PolynomialRing, type RationalFunction, RationalFunctionField } from '../polynomial/index.ts';
import { type GeneratorCheck, INVARIANCE_DEGREE, requireNondegenerate } from './prepare.ts';

/** An element of the field of coefficients: a rational function in the kept parameters. */
export type Coefficient = RationalFunction<Algebraic>;

/** S over rational functions. */
export interface SymbolicHessian {
  readonly coefficients: RationalFunctionField<Algebraic>;
  readonly matrix: SparseMatrix<Coefficient>;
  /** Parameters that occur in it. */
  readonly symbols: readonly string[];
  /** Parameters that are symbols, whether they occur or not. */
  readonly kept: readonly string[];
  /** Constants without exact value that stay symbols too. */
  readonly atoms: readonly string[];
}

export interface SymbolicModel {
  /** As read: parameters that depend on one without a value stand among the definitions. */
  readonly declaration: Declaration;
  /** Those, as they were typed. */
  readonly dependent: ReadonlyMap<string, string>;
  readonly quantities: Quantities;
  readonly hamiltonian: Expression | undefined;
  readonly field: RealField;
  readonly form: SparseMatrix<Algebraic>;
  readonly generators: readonly GeneratorCheck[];
  /** Absent where the model has no H, or one of floating numbers. */
  readonly hessian?: SymbolicHessian;
  /** The first term of ∇H that does not vanish, or '0'. */
  readonly gradient: string;
  readonly equilibriumHolds: boolean;
  readonly symmetryHolds: boolean;
}

/** Reads a model; H may be missing, parameters may lack values. Throws InputError for what cannot be read; failures are recorded. */
export function prepareSymbolic(given: Declaration): SymbolicModel {
  const { declaration, dependent } = dependentsDefined(given);
  const quantities = readQuantities(declaration);
  requireNondegenerate(quantities, declaration);
  const source = floatingSource(declaration.energy);
  const hamiltonian = source === undefined ? energyExpression(declaration, quantities.definitions) : undefined;
  const common = { declaration, dependent, quantities, hamiltonian };
  if (hamiltonian === undefined) {
    const { field, form } = quantities;
    const generators = quantities.generators.map((g) => checked(g, g.matrix, form, undefined));
    const holds = generators.every((g) => g.reason === undefined);
    return { ...common, field, form, generators, gradient: '0', equilibriumHolds: true, symmetryHolds: holds };
  }
  const degree = polynomialDegree(hamiltonian, new Set(quantities.names)) ?? INVARIANCE_DEGREE;
  const open = expansionOf(hamiltonian, quantities, declaration.unset, Math.max(degree, 2));
  const { field } = open;
  const form = embedSparse(quantities.form, quantities.field, field);
  const generators = quantities.generators.map((g) => {
    const matrix = embedSparse(g.matrix, quantities.field, field);
    return checked(g, matrix, form, () => invarianceFailure(g.name, matrix, open, quantities));
  });
  const hessian = shownHessian(hamiltonian, quantities, declaration, generators, open);
  const linear = open.ring.truncate(open.polynomial, 1);
  return {
    ...common,
    field,
    form,
    generators,
    hessian,
    gradient: open.ring.isZero(linear) ? '0' : open.coefficients.format(linear.coefficients[0]!),
    equilibriumHolds: open.ring.isZero(linear),
    symmetryHolds: generators.every((g) => g.reason === undefined),
  };
}

/** Parameters whose values contain one without a value become definitions. */
function dependentsDefined(declaration: Declaration): { declaration: Declaration; dependent: ReadonlyMap<string, string> } {
  const open = new Set(declaration.unset);
  const moved = new Map<string, string>();
  const left = new Map(declaration.parameters);
  for (let again = true; again; ) {
    again = false;
    for (const [name, text] of left) {
      const symbols = symbolsOf(parseExpression(text, { file: declaration.source, key: `parameters.${name}` }));
      if (![...symbols].some((s) => open.has(s) || moved.has(s))) continue;
      moved.set(name, text);
      left.delete(name);
      again = true;
    }
  }
  if (moved.size === 0) return { declaration, dependent: moved };
  return {
    declaration: {
      ...declaration,
      parameters: left,
      vary: declaration.vary.filter((v) => !moved.has(v)),
      define: new Map([...declaration.define, ...moved]),
    },
    dependent: moved,
  };
}

function checked(
  g: Quantities['generators'][number],
  matrix: SparseMatrix<Algebraic>,
  form: SparseMatrix<Algebraic>,
  invariance: (() => string | undefined) | undefined,
): GeneratorCheck {
  const sign = signOf(matrix, form);
  const declared = g.declared === undefined ? {} : { declared: g.declared };
  const head = { name: g.name, where: g.where, matrix, sign, ...declared };
  if (sign === undefined)
    return { ...head, invariant: true, reason: `${g.name} is neither symplectic nor antisymplectic: ρᵀWρ is neither W nor −W` };
  if (g.declared !== undefined && g.declared !== (sign === -1))
    return {
      ...head,
      invariant: true,
      reason: `${g.name} is declared ${g.declared ? 'to reverse time' : 'not to reverse time'}, but ρᵀWρ = ${sign === 1 ? 'W' : '−W'}`,
    };
  const reason = invariance?.();
  return { ...head, invariant: reason === undefined, ...(reason === undefined ? {} : { reason }) };
}

/** H about its equilibrium, coefficients in one field of rational functions. */
interface SymbolicExpansion {
  readonly field: RealField;
  readonly coefficients: RationalFunctionField<Algebraic>;
  readonly ring: PolynomialRing<Coefficient>;
  readonly polynomial: Polynomial<Coefficient>;
  readonly symbols: readonly string[];
  readonly atoms: readonly string[];
}

function expansionOf(h: Expression, q: Quantities, keep: readonly string[], degree: number, field = q.field): SymbolicExpansion {
  const t: TaylorResult = taylor(h, {
    names: q.names,
    point: q.pointExpressions,
    parameters: q.valueExpressions,
    keep,
    degree,
    field,
  });
  if (t.kind === 'symbolic') {
    const { ring, polynomial, symbols, atoms } = t;
    return { field: t.field, coefficients: t.constants.field, ring, polynomial, symbols, atoms };
  }
  const coefficients = new RationalFunctionField(new PolynomialRing(t.field, []));
  const ring = new PolynomialRing<Coefficient>(coefficients, q.names);
  const polynomial = t.ring.map(t.polynomial, (c) => coefficients.fromConstant(c), ring);
  return { field: t.field, coefficients, ring, polynomial, symbols: [], atoms: [] };
}

/** What of H changes under a generator, in words; undefined if nothing does. */
function invarianceFailure(name: string, matrix: SparseMatrix<Algebraic>, e: SymbolicExpansion, q: Quantities): string | undefined {
  const { field, coefficients, ring } = e;
  const point = q.point.map((x) => field.embed(q.field, x));
  const moved = sparseApply(matrix, point).findIndex((x, i) => !field.equal(x, point[i]!));
  if (moved >= 0) return `${name} moves the equilibrium: ${q.names[moved]} changes`;
  const lifted = overCoefficients(matrix, coefficients);
  // the quadratic part as a matrix, which is quick where coordinates are many; the rest by substitution
  const s = hessianOf(e, q.names.length).matrix;
  const rest = ring.sub(e.polynomial, ring.sub(ring.truncate(e.polynomial, 2), ring.truncate(e.polynomial, 1)));
  const compared = sparseEquals(sparseCongruence(lifted, s), s) ? rest : e.polynomial;
  if (ring.isZero(compared)) return undefined;
  const difference = ring.sub(ring.linearSubstitution(compared, dense(lifted)), compared);
  if (ring.isZero(difference)) return undefined;
  const first = { ...difference, monomials: difference.monomials.slice(0, 1), coefficients: difference.coefficients.slice(0, 1) };
  const more = difference.monomials.length - 1;
  return `H is not invariant under ${name}: H∘ρ − H contains ${ring.format(first)}${more > 0 ? ` and ${more} more term${more > 1 ? 's' : ''}` : ''}`;
}

function overCoefficients(m: SparseMatrix<Algebraic>, coefficients: RationalFunctionField<Algebraic>): SparseMatrix<Coefficient> {
  return { ...m, field: coefficients, value: m.value.map((row) => row.map((x) => coefficients.fromConstant(x))) };
}

/** S with the varied parameters as symbols too, unless the symmetry holds at their values alone. */
function shownHessian(
  h: Expression,
  q: Quantities,
  declaration: Declaration,
  generators: readonly GeneratorCheck[],
  open: SymbolicExpansion,
): SymbolicHessian {
  const keep = [...new Set([...declaration.vary, ...declaration.unset])];
  if (keep.length > declaration.unset.length) {
    const wide = expansionOf(h, q, keep, 2, open.field);
    const found = hessianOf(wide, q.names.length);
    const invariant = generators.every((g) => {
      const m = overCoefficients(embedSparse(g.matrix, open.field, wide.field), wide.coefficients);
      return sparseEquals(sparseCongruence(m, found.matrix), found.matrix);
    });
    if (invariant && wide.field === open.field) return { ...found, kept: keep };
  }
  return { ...hessianOf(open, q.names.length), kept: declaration.unset };
}

function hessianOf(e: SymbolicExpansion, n: number): Omit<SymbolicHessian, 'kept'> {
  const f = e.coefficients;
  const rows = Array.from({ length: n }, () => new Map<number, Coefficient>());
  e.polynomial.monomials.forEach((m, k) => {
    const flat = factorsOf(m).flatMap(([v, p]) => new Array<number>(p).fill(v));
    if (flat.length !== 2) return;
    const [i, j] = flat as [number, number];
    const c = e.polynomial.coefficients[k]!;
    if (i === j) rows[i]!.set(i, f.add(c, c));
    else {
      rows[i]!.set(j, c);
      rows[j]!.set(i, c);
    }
  });
  const matrix = sparseFromMaps(f, n, rows);
  const used = new Set<string>();
  for (const row of matrix.value)
    for (const x of row) for (const p of [x.numerator, x.denominator]) for (const i of f.ring.support(p)) used.add(f.symbols[i]!);
  return { coefficients: f, matrix, symbols: e.symbols.filter((s) => used.has(s)), atoms: e.atoms.filter((a) => used.has(a)) };
}

/** S over the larger field of an action. */
export function embedHessian(s: SymbolicHessian, from: RealField, to: RealField): SymbolicHessian {
  if (from === to) return s;
  const coefficients = new RationalFunctionField(new PolynomialRing(to, s.coefficients.symbols));
  const move = (p: Polynomial<Algebraic>) => s.coefficients.ring.map(p, (c) => to.embed(from, c), coefficients.ring);
  const value = s.matrix.value.map((row) => row.map((x) => coefficients.quotient(move(x.numerator), move(x.denominator))));
  return { ...s, coefficients, matrix: { ...s.matrix, field: coefficients, value } };
}

/** Stops where the model is not what it claims, with the words of `check`. */
export function requireSymbolicHolds(m: SymbolicModel): void {
  const file = m.declaration.source;
  const next = 'see all of it with symcodim check';
  const bad = m.generators.find((g) => g.reason !== undefined);
  if (bad !== undefined)
    throw new NotInvariantError(bad.reason!, {
      file,
      key: bad.where,
      value: bad.name,
      expected: bad.invariant ? 'ρᵀWρ = W, or ρᵀWρ = −W for a generator that reverses time' : 'a generator that leaves H invariant',
      next,
    });
  if (!m.equilibriumHolds)
    throw new NotAnEquilibriumError(`the point is not an equilibrium: ∇H contains ${m.gradient}`, {
      file,
      key: 'equilibrium',
      expected: '∇H = 0 for every value of the parameters that have none',
      next,
    });
}
