/**
 * A model along one parameter: its action, its bases, and S and ω as functions of the parameter. S is exact where it
 * is a rational function of the parameter at an equilibrium that is declared for all its values; else it is evaluated
 * in double precision.
 */
import {
  type Action,
  type AdaptedBlock,
  adaptedBlocks,
  type Components,
  componentsOfBlock,
  embedAction,
  embedSparse,
  type FlowBlock,
  flowBlocks,
  makeAction,
  restrictForm,
  symplecticPart,
  withCharacters,
} from '../action/index.ts';
import { InputError, NotInvariantError } from '../errors/index.ts';
import { type Algebraic, RealField } from '../field/index.ts';
import {
  type Matrix,
  type NumberMatrix,
  numberMatrix,
  type SparseMatrix,
  sparseCongruence,
  sparseEquals,
  sparseFromMaps,
  toNumberMatrix,
} from '../linear/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { energyExpression, floatingSource } from '../model/energy.ts';
import {
  compileNumeric,
  type Expression,
  parseExpression,
  resolveDefinitions,
  substituteSymbols,
  symbolsOf,
  taylor,
} from '../model/expression/index.ts';
import { type Quantities, readQuantities } from '../model/quantities.ts';
import { factorsOf, type Polynomial, type PolynomialRing, type Univariate, UnivariateRing } from '../polynomial/index.ts';
import { labelledComponents } from './labels.ts';
import { fixedSpace } from './linear-study.ts';
import { declarationAt, formatRational, type Range, readRanges } from './sweep-range.ts';

/** S(μ) = Σ μᵏ coefficients[k] / denominator(μ), exactly. */
export interface RationalFamily {
  readonly coefficients: readonly SparseMatrix<Algebraic>[];
  readonly denominator: Univariate<Algebraic>;
}

export interface SweepFamily {
  readonly declaration: Declaration;
  readonly range: Range;
  /** All ranges of the declaration that have been read, the one above first. */
  readonly ranges: readonly Range[];
  readonly field: RealField;
  readonly action: Action;
  readonly components: Components;
  readonly adapted: readonly AdaptedBlock[];
  readonly flow: readonly FlowBlock[];
  /** Labels of the components in each flow block. */
  readonly flowLabels: readonly (readonly string[])[];
  /** Coordinates, then momenta. */
  readonly names: readonly string[];
  /** H with all parameters but those of the ranges replaced. */
  readonly hamiltonian: Expression;
  /** Entries of W as functions of the parameter, or undefined where it is constant. */
  readonly formAt: (mu: number) => NumberMatrix;
  /** The declared equilibrium as a function of the parameter. */
  readonly pointAt: (mu: number) => Float64Array;
  /** Its coordinates as expressions in the parameters of the ranges; undefined is 0. */
  readonly placed: readonly (Expression | undefined)[];
  /** Columns that span Fix(Γ). */
  readonly fixed: Matrix<Algebraic>;
  /** The value of the parameter in the declaration, or the lower end. */
  readonly declared: number;
  /** The same exactly, where the model gives it a value that has an exact form. */
  readonly declaredValue: { readonly field: RealField; readonly value: Algebraic } | undefined;
  /** Values of the parameters of the other ranges, held while the first is swept. */
  readonly held: readonly number[];
  readonly rational: RationalFamily | undefined;
  /** Why S is not exact, where it is not. */
  readonly because: string | undefined;
  /** Relative to the scale of S, where its numbers carry errors of their own; absent where only rounding is at stake. */
  readonly tolerance?: number;
}

/** Stands for H where the energy is evaluated from matrices of doubles. */
const NO_ENERGY: Expression = { kind: 'number', n: 0n, d: 1n };

/**
 * Reads a model as a family. With `floating`, the reason, its energy is left out: S is then known from matrices of
 * doubles. Throws the errors of `check` where the model is not what it claims.
 */
export function sweepFamily(declaration: Declaration, floating?: string): SweepFamily {
  const ranges = readRanges(declaration);
  const range = ranges[0]!;
  const swept = new Map(
    ranges.filter((r) => !declaration.parameters.has(r.parameter)).map((r) => [r.parameter, formatRational(r.low)] as const),
  );
  const at = declarationAt(declaration, swept);
  const missing = at.unset[0];
  if (missing !== undefined)
    throw new InputError(`the parameter ${missing} has no value`, {
      file: declaration.source,
      key: `parameters.${missing}`,
      value: missing,
      expected: 'a value for every parameter but the one that is swept',
      next: `give it one in the file or with --set ${missing}=…`,
    });
  const quantities = readQuantities(at);
  const h = floating === undefined ? energyExpression(at, quantities.definitions) : NO_ENERGY;
  if (h === undefined)
    throw new InputError('the model has no Hamiltonian', {
      file: declaration.source,
      key: 'hamiltonian',
      expected: 'hamiltonian, quadratic, mass with stiffness, or network',
    });
  const names = ranges.map((r) => r.parameter);
  const free = new Set(names);
  const values = new Map([...quantities.valueExpressions].filter(([k]) => !free.has(k)));
  const others = resolveDefinitions(values);
  const hamiltonian = substituteSymbols(h, others);
  const used = symbolsOf(hamiltonian);
  const placed = new Map([...quantities.pointExpressions].map(([k, e]) => [k, substituteSymbols(e, others)]));
  const inForm = formExpressions(at, quantities, others);
  for (const name of floating === undefined ? names : [])
    if (!used.has(name) && !inForm.some((e) => symbolsOf(e).has(name)) && ![...placed.values()].some((e) => symbolsOf(e).has(name)))
      throw new InputError(`the Hamiltonian does not depend on ${name}`, {
        file: declaration.source,
        key: `range.${name}`,
        value: name,
        expected: 'a parameter that the model uses',
      });
  const small = withCharacters(
    makeAction(
      quantities.field,
      quantities.form,
      quantities.generators.map((g) => ({ name: g.name, matrix: g.matrix })),
      at.orderLimit,
    ),
  );
  requireDeclaredSigns(quantities, small, at);
  const exact: ExactFamily =
    floating === undefined ? rationalFamily(h, quantities, range.parameter, at) : { kind: 'numeric', because: floating };
  const field = exact.kind === 'exact' ? RealField.join(small.field, exact.field) : small.field;
  const action = embedAction(small, field);
  const components = labelledComponents(at, action);
  const symplectic = symplecticPart(action);
  const flow = flowBlocks(action, symplectic);
  const family = exact.kind === 'exact' ? exact.embed(field) : undefined;
  if (family !== undefined) requireInvariant(family, action, at);
  else requireInvariantValues(hamiltonian, quantities, action, ranges, at);
  return {
    declaration: at,
    range,
    ranges,
    field,
    action,
    components,
    adapted: adaptedBlocks(action, components),
    flow,
    flowLabels: flow.map((b) => componentsOfBlock(action, components, symplectic.part, b.irreducible).map((c) => c.label)),
    names: quantities.names,
    hamiltonian,
    formAt: formFunction(inForm, quantities, ranges),
    pointAt: pointFunction(placed, quantities, ranges),
    placed: quantities.names.map((name) => placed.get(name)),
    fixed: fixedSpace(action, components),
    declared: quantities.field.toNumber(quantities.values.get(range.parameter)!),
    declaredValue:
      quantities.inexact === undefined && declaration.parameters.has(range.parameter)
        ? { field: quantities.field, value: quantities.values.get(range.parameter)! }
        : undefined,
    held: held(quantities, ranges),
    rational: family,
    because: exact.kind === 'exact' ? undefined : exact.because,
  };
}

/**
 * The same model with another energy along another range: the action and all bases are kept. The family stays exact
 * where it was. Throws NotInvariantError where the generators do not leave the energy invariant.
 */
export function familyWithEnergy(frame: SweepFamily, declaration: Declaration, range: Range): SweepFamily {
  const quantities = readQuantities(frame.declaration);
  const h = energyExpression(declaration, quantities.definitions)!;
  const exact = rationalFamily(h, quantities, range.parameter, declaration);
  if (exact.kind !== 'exact') throw new RangeError(`a family that was exact is not so any more: ${exact.because}`);
  const family = exact.embed(frame.field);
  requireInvariant(family, frame.action, declaration);
  const others = resolveDefinitions(new Map([...quantities.valueExpressions].filter(([k]) => k !== range.parameter)));
  return { ...frame, declaration, range, ranges: [range], hamiltonian: substituteSymbols(h, others), rational: family };
}

function requireDeclaredSigns(quantities: Quantities, action: Action, declaration: Declaration): void {
  quantities.generators.forEach((g, i) => {
    const sign = action.generators[i]!.sign;
    if (g.declared !== undefined && g.declared !== (sign === -1))
      throw new InputError(
        `${g.name} is declared ${g.declared ? 'to reverse time' : 'not to reverse time'}, but ρᵀWρ = ${sign === 1 ? 'W' : '−W'}`,
        {
          file: declaration.source,
          key: g.where,
          value: g.name,
          expected: g.declared ? 'ρᵀWρ = −W' : 'ρᵀWρ = W',
        },
      );
  });
}

function requireInvariant(family: RationalFamily, action: Action, declaration: Declaration): void {
  for (const g of action.generators)
    for (const s of family.coefficients)
      if (!sparseEquals(sparseCongruence(g.matrix, s), s))
        throw new NotInvariantError(`the quadratic part of H is not invariant under ${g.name} for all values of the parameter`, {
          file: declaration.source,
          value: g.name,
          expected: 'a generator that leaves H invariant along the whole range',
          next: 'see all of it with symcodim check',
        });
}

/** Places at which an H that is not exact is compared with its images, and by how much they may differ. */
const PROBES = 4;
const INVARIANCE = 1e-9;

function requireInvariantValues(
  hamiltonian: Expression,
  quantities: Quantities,
  action: Action,
  ranges: readonly Range[],
  declaration: Declaration,
): void {
  const { field } = quantities;
  const h = compileNumeric(hamiltonian, [...quantities.names, ...ranges.map((r) => r.parameter)]);
  const start = quantities.point.map((x) => field.toNumber(x));
  for (let k = 0; k < PROBES; k++) {
    const x = start.map((v, i) => v + 0.05 * Math.sin(1 + 7 * k + i * i + 3 * i));
    const mu = ranges.map((r) => r.from + ((k + 0.37) / PROBES) * (r.to - r.from));
    const value = h([...x, ...mu]);
    for (const g of action.generators) {
      const image = g.matrix.index.map((cols, i) => cols.reduce((s, j, q) => s + action.field.toNumber(g.matrix.value[i]![q]!) * x[j]!, 0));
      const other = h([...image, ...mu]);
      if (!Number.isFinite(value) || !Number.isFinite(other) || Math.abs(value - other) <= INVARIANCE * (1 + Math.abs(value))) continue;
      throw new NotInvariantError(`H is not invariant under ${g.name}: ${value} becomes ${other}`, {
        file: declaration.source,
        value: g.name,
        expected: 'a generator that leaves H invariant along the whole range',
        next: 'see all of it with symcodim check',
      });
    }
  }
}

type ExactFamily =
  | { readonly kind: 'exact'; readonly field: RealField; readonly embed: (to: RealField) => RationalFamily }
  | { readonly kind: 'numeric'; readonly because: string };

/** S(μ) from one expansion with the parameter kept as a symbol; numeric where a term is transcendental or the point moves off. */
function rationalFamily(h: Expression, quantities: Quantities, parameter: string, declaration: Declaration): ExactFamily {
  if (declaration.numbers === 'floating') return { kind: 'numeric', because: 'floating numbers were asked for' };
  const inFile = floatingSource(declaration.energy);
  if (inFile !== undefined) return { kind: 'numeric', because: `${inFile} holds floating numbers` };
  if (quantities.inexact !== undefined) return { kind: 'numeric', because: quantities.inexact };
  const n = quantities.names.length;
  const expressions = new Map([...quantities.valueExpressions].filter(([k]) => k !== parameter));
  let t: ReturnType<typeof taylor>;
  try {
    t = taylor(h, {
      names: quantities.names,
      point: quantities.pointExpressions,
      parameters: expressions,
      keep: [parameter],
      degree: 2,
      field: quantities.field,
    });
  } catch (error) {
    // a function that has no rational expansion at a general value of the parameter, such as sqrt(mu)
    if (!(error instanceof InputError)) throw error;
    return { kind: 'numeric', because: error.message };
  }
  const source = t;
  if (source.kind === 'symbolic' && source.atoms.length > 0) return { kind: 'numeric', because: source.atoms[0]! };
  const field = source.field;
  const ring = new UnivariateRing<Algebraic>(field);
  const index = source.kind === 'symbolic' ? source.constants.field.ring.indexOf(parameter) : -1;
  const univariate = (p: Polynomial<Algebraic>, of: PolynomialRing<Algebraic>): Univariate<Algebraic> => {
    const out: Algebraic[] = [];
    for (const [m, c] of of.terms(p)) {
      const e = factorsOf(m).find(([v]) => v === index)?.[1] ?? 0;
      while (out.length <= e) out.push(field.zero);
      out[e] = field.add(out[e]!, c);
    }
    return ring.trim(out);
  };
  const entries: { i: number; j: number; numerator: Univariate<Algebraic>; denominator: Univariate<Algebraic> }[] = [];
  let moves = false;
  source.polynomial.monomials.forEach((m, k) => {
    const flat = factorsOf(m).flatMap(([v, e]) => new Array<number>(e).fill(v));
    if (flat.length === 1) moves = true;
    if (flat.length !== 2) return;
    const [numerator, denominator] =
      source.kind === 'symbolic'
        ? [
            univariate(source.polynomial.coefficients[k]!.numerator, source.constants.field.ring),
            univariate(source.polynomial.coefficients[k]!.denominator, source.constants.field.ring),
          ]
        : [[source.polynomial.coefficients[k]!], [field.one]];
    const [i, j] = flat as [number, number];
    const own = i === j ? ring.scale(numerator, field.fromInteger(2)) : numerator;
    entries.push({ i, j, numerator: own, denominator });
    if (i !== j) entries.push({ i: j, j: i, numerator: own, denominator });
  });
  if (moves) return { kind: 'numeric', because: `the equilibrium moves with ${parameter}` };
  let common: Univariate<Algebraic> = [field.one];
  for (const { denominator } of entries)
    if (denominator.length > 1) common = ring.mul(common, ring.divide(denominator, ring.gcd(common, denominator)).quotient);
  const maps: Map<number, Algebraic>[][] = [];
  for (const { i, j, numerator, denominator } of entries)
    ring.mul(numerator, ring.divide(common, denominator).quotient).forEach((c, k) => {
      while (maps.length <= k) maps.push(Array.from({ length: n }, () => new Map<number, Algebraic>()));
      maps[k]![i]!.set(j, c);
    });
  if (maps.length === 0) maps.push(Array.from({ length: n }, () => new Map<number, Algebraic>()));
  const coefficients = maps.map((rows) => sparseFromMaps(field, n, rows));
  return {
    kind: 'exact',
    field,
    embed: (to) => ({
      coefficients: coefficients.map((s) => embedSparse(s, field, to)),
      denominator: common.map((c) => to.embed(field, c)),
    }),
  };
}

function formExpressions(declaration: Declaration, quantities: Quantities, others: ReadonlyMap<string, Expression>): Expression[] {
  if (declaration.form === undefined) return [];
  return declaration.form.flatMap((row, i) =>
    row.map((text, j) =>
      substituteSymbols(
        substituteSymbols(
          parseExpression(text, { file: declaration.source, key: `symplectic[${i + 1}][${j + 1}]` }),
          quantities.definitions,
        ),
        others,
      ),
    ),
  );
}

/** Parameters beyond the first are held at their declared values. */
function held(quantities: Quantities, ranges: readonly Range[]): number[] {
  return ranges.slice(1).map((r) => quantities.field.toNumber(quantities.values.get(r.parameter)!));
}

function formFunction(entries: readonly Expression[], quantities: Quantities, ranges: readonly Range[]): (mu: number) => NumberMatrix {
  const names = ranges.map((r) => r.parameter);
  const n = quantities.names.length;
  if (!entries.some((e) => names.some((name) => symbolsOf(e).has(name)))) {
    const rows = new Float64Array(n * n);
    quantities.form.index.forEach((cols, i) => {
      cols.forEach((j, k) => {
        rows[i * n + j] = quantities.field.toNumber(quantities.form.value[i]![k]!);
      });
    });
    const constant = numberMatrix(n, n, rows);
    return () => constant;
  }
  const compiled = entries.map((e) => compileNumeric(e, names));
  const rest = held(quantities, ranges);
  return (mu) =>
    numberMatrix(
      n,
      n,
      compiled.map((f) => f([mu, ...rest])),
    );
}

function pointFunction(
  placed: ReadonlyMap<string, Expression>,
  quantities: Quantities,
  ranges: readonly Range[],
): (mu: number) => Float64Array {
  const names = ranges.map((r) => r.parameter);
  const compiled = quantities.names.map((name) => {
    const e = placed.get(name);
    return e === undefined ? () => 0 : compileNumeric(e, names);
  });
  const rest = held(quantities, ranges);
  return (mu) => Float64Array.from(compiled, (f) => f([mu, ...rest]));
}

/** S_k restricted to a basis, exactly. */
export function restrictedCoefficients(family: RationalFamily, basis: Matrix<Algebraic>): Matrix<Algebraic>[] {
  return family.coefficients.map((s) => restrictForm(basis, s));
}

/** Values of a rational family of small blocks in doubles. */
export function blockFunction(
  coefficients: readonly Matrix<Algebraic>[],
  denominator: Univariate<Algebraic>,
  field: RealField,
): (mu: number) => NumberMatrix {
  const parts = coefficients.map((m) => toNumberMatrix(m, field).data);
  const below = denominator.map((c) => field.toNumber(c));
  const { rows, cols } = coefficients[0]!;
  const horner = (list: readonly number[], mu: number) => list.reduceRight((s, c) => s * mu + c, 0);
  return (mu) => {
    const d = horner(below, mu);
    const data = new Float64Array(rows * cols);
    for (let i = 0; i < data.length; i++) {
      let s = 0;
      for (let k = parts.length - 1; k >= 0; k--) s = s * mu + parts[k]![i]!;
      data[i] = s / d;
    }
    return { rows, cols, data };
  };
}
