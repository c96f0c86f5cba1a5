/**
 * From a declaration to everything exact that the commands start from: the numbers, H near its equilibrium,
 * the generators with their checks, and the action with its characters.
 */
import { type Action, embedSparse, makeAction, signOf, withCharacters } from '../action/index.ts';
import { InputError, NotAnEquilibriumError, NotInvariantError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { dense, modularRank, rank, type SparseMatrix, sparseApply, sparseCongruence, sparseEquals } from '../linear/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { energyExpression, floatingSource } from '../model/energy.ts';
import { type Expression, formatExpression, taylor, tidy } from '../model/expression/index.ts';
import { type LocalExpansion, localExpansion } from '../model/local.ts';
import { polynomialDegree } from '../model/polynomial-energy.ts';
import { type Quantities, readQuantities } from '../model/quantities.ts';
import type { Polynomial, PolynomialRing } from '../polynomial/index.ts';
import { type NeutralSymmetry, neutralSymmetry } from './neutral.ts';
import { type RationalInvariance, rationalInvariance } from './rational-invariance.ts';

/** Degree to which invariance of an H that is no quotient of polynomials is checked. */
export const INVARIANCE_DEGREE = 4;

export interface GeneratorCheck {
  readonly name: string;
  readonly where: string;
  readonly matrix: SparseMatrix<Algebraic>;
  readonly sign: 1 | -1 | undefined;
  readonly declared?: boolean;
  readonly invariant: boolean;
  readonly reason?: string;
}

/** A model whose numbers are exact. */
export interface Prepared {
  readonly declaration: Declaration;
  readonly quantities: Quantities;
  readonly hamiltonian: Expression;
  readonly local: LocalExpansion;
  readonly field: RealField;
  readonly form: SparseMatrix<Algebraic>;
  readonly generators: readonly GeneratorCheck[];
  /** To which degree invariance was checked, or 'all' for a polynomial or a quotient of polynomials. */
  readonly invarianceDegree: number | 'all';
  readonly equilibriumHolds: boolean;
  readonly symmetryHolds: boolean;
  /** Continuous symmetries, declared or found. */
  readonly neutral?: NeutralSymmetry;
}

/** A model that is not exact, and why. */
export interface NotExact {
  readonly declaration: Declaration;
  readonly quantities: Quantities;
  readonly hamiltonian: Expression | undefined;
  readonly because: string;
}

export function isExact(p: Prepared | NotExact): p is Prepared {
  return 'local' in p;
}

const preparedModels = new WeakMap<Declaration, Prepared | NotExact>();

/**
 * Reads and checks a model, once for each declaration. Throws InputError for what cannot be read; checks that fail are
 * recorded, not thrown.
 */
export function prepare(declaration: Declaration): Prepared | NotExact {
  let out = preparedModels.get(declaration);
  if (out === undefined) {
    out = makePrepared(declaration);
    preparedModels.set(declaration, out);
  }
  return out;
}

function makePrepared(declaration: Declaration): Prepared | NotExact {
  const quantities = readQuantities(declaration);
  const file = declaration.source;
  requireNondegenerate(quantities, declaration);
  const source = floatingSource(declaration.energy);
  if (source !== undefined) return { declaration, quantities, hamiltonian: undefined, because: `${source} holds floating numbers` };
  const hamiltonian = energyExpression(declaration, quantities.definitions);
  if (hamiltonian === undefined)
    throw new InputError('the model has no Hamiltonian', {
      file,
      key: 'hamiltonian',
      expected: 'hamiltonian, quadratic, mass with stiffness, or network',
      next: 'add one, or use symcodim events, which needs none',
    });
  if (declaration.numbers === 'floating') return { declaration, quantities, hamiltonian, because: 'floating numbers were asked for' };
  if (quantities.inexact !== undefined) return { declaration, quantities, hamiltonian, because: quantities.inexact };
  if (declaration.unset.length > 0) {
    const name = declaration.unset[0]!;
    throw new InputError(`the parameter ${name} has no value`, {
      file,
      key: `parameters.${name}`,
      value: name,
      expected: 'a value for every parameter',
      next: `give it one in the file or with --set ${name}=…`,
    });
  }
  const local = localExpansion(hamiltonian, quantities, declaration.vary);
  if ('inexact' in local) return { declaration, quantities, hamiltonian, because: local.inexact };
  const field = local.field;
  const embed = (m: SparseMatrix<Algebraic>) => embedSparse(m, quantities.field, field);
  const form = embed(quantities.form);
  const point = quantities.point.map((x) => field.embed(quantities.field, x));
  const values = new Map([...quantities.values].map(([k, v]) => [k, field.embed(quantities.field, v)]));
  const series = invarianceSeries(hamiltonian, quantities, local, declaration.degree);
  const rational =
    series.degree === 'all' || quantities.generators.length === 0
      ? undefined
      : rationalInvariance(hamiltonian, quantities.names, values, field);
  const generators = quantities.generators.map((g): GeneratorCheck => {
    const matrix = embed(g.matrix);
    const sign = signOf(matrix, form);
    const broken = invarianceFailure(g.name, matrix, point, local, series, quantities.names, rational);
    const reason = formFailure(g.name, sign, g.declared) ?? broken;
    return {
      name: g.name,
      where: g.where,
      matrix,
      sign,
      ...(g.declared === undefined ? {} : { declared: g.declared }),
      invariant: broken === undefined,
      ...(reason === undefined ? {} : { reason }),
    };
  });
  const neutral = neutralSymmetry(declaration, quantities, hamiltonian, field, form, point, generators);
  return {
    declaration,
    quantities,
    hamiltonian,
    local,
    field,
    form,
    generators,
    invarianceDegree: rational === undefined ? series.degree : 'all',
    equilibriumHolds: local.gradient.every((x) => field.isZero(x)),
    symmetryHolds: generators.every((g) => g.reason === undefined),
    ...(neutral === undefined ? {} : { neutral }),
  };
}

export function requireNondegenerate(quantities: Quantities, declaration: Declaration): void {
  if (declaration.form === undefined) return;
  const w = quantities.form;
  const reduction = quantities.field.reduction();
  const data = Int32Array.from(dense(w).data, (x) => reduction.apply(x));
  if (modularRank({ p: reduction.p, rows: w.rows, cols: w.cols, data }) === w.rows || rank(dense(w)) === w.rows) return;
  throw new InputError('the symplectic form is degenerate: its matrix is singular', {
    file: declaration.source,
    key: 'symplectic',
    expected: 'an invertible skew-symmetric matrix',
    next: 'restrict the model to a symplectic leaf, or correct the entries',
  });
}

interface Series {
  readonly degree: number | 'all';
  readonly ring: PolynomialRing<Algebraic>;
  /** Terms of degree 3 and more. */
  readonly polynomial: Polynomial<Algebraic>;
}

/** H to the degree that its invariance is checked to. */
function invarianceSeries(h: Expression, quantities: Quantities, local: LocalExpansion, asked = 0): Series {
  const degree = polynomialDegree(h, new Set(quantities.names));
  const wanted = degree ?? Math.max(INVARIANCE_DEGREE, asked);
  const kind = degree === undefined ? wanted : ('all' as const);
  if (wanted <= local.degree) return { degree: kind, ring: local.ring, polynomial: local.higher };
  const t = taylor(h, {
    names: quantities.names,
    point: quantities.pointExpressions,
    parameters: quantities.valueExpressions,
    degree: wanted,
    field: local.field,
  });
  if (t.kind !== 'exact' || t.field !== local.field) return { degree: local.degree, ring: local.ring, polynomial: local.higher };
  const low = t.ring.truncate(t.polynomial, 2);
  return { degree: kind, ring: t.ring, polynomial: t.ring.sub(t.polynomial, low) };
}

/** How a generator fails to be what is declared of it, apart from H; undefined where it does not. */
export function formFailure(name: string, sign: 1 | -1 | undefined, declared: boolean | undefined): string | undefined {
  if (sign === undefined) return `${name} is neither symplectic nor antisymplectic: ρᵀWρ is neither W nor −W`;
  if (declared === undefined || declared === (sign === -1)) return undefined;
  return `${name} is declared ${declared ? 'to reverse time' : 'not to reverse time'}, but ρᵀWρ = ${sign === 1 ? 'W' : '−W'}`;
}

/** How a generator fails to leave H and the point invariant; undefined where it does not. */
function invarianceFailure(
  name: string,
  matrix: SparseMatrix<Algebraic>,
  point: readonly Algebraic[],
  local: LocalExpansion,
  series: Series,
  names: readonly string[],
  rational: RationalInvariance | undefined,
): string | undefined {
  const { field } = local;
  const moved = sparseApply(matrix, point).findIndex((x, i) => !field.equal(x, point[i]!));
  if (moved >= 0) return `${name} moves the equilibrium: ${names[moved]} changes`;
  const image = sparseCongruence(matrix, local.hessian);
  if (!sparseEquals(image, local.hessian)) return quadraticDifference(name, image, local.hessian, names);
  // gradients: ρᵀ∇H = ∇H
  const transposed = matrix.index.flatMap((cols, i) => cols.map((j, k) => [j, i, matrix.value[i]![k]!] as const));
  const gradient = new Array<Algebraic>(names.length).fill(field.zero);
  for (const [j, i, v] of transposed) gradient[j] = field.add(gradient[j]!, field.mul(v, local.gradient[i]!));
  const off = gradient.findIndex((x, i) => !field.equal(x, local.gradient[i]!));
  if (off >= 0)
    return `H is not invariant under ${name}: the linear term of ${names[off]} changes by ${field.format(field.sub(gradient[off]!, local.gradient[off]!))}`;
  const beyond =
    rational === undefined || rational(matrix)
      ? undefined
      : `H is not invariant under ${name}: H∘ρ − H is a rational function that is not zero, though its Taylor terms up to degree ${series.degree} vanish`;
  if (series.polynomial.monomials.length === 0) return beyond;
  const difference = series.ring.sub(series.ring.linearSubstitution(series.polynomial, dense(matrix)), series.polynomial);
  if (series.ring.isZero(difference)) return beyond;
  const terms = difference.monomials.length;
  const worst = { ...difference, monomials: difference.monomials.slice(0, 1), coefficients: difference.coefficients.slice(0, 1) };
  return `H is not invariant under ${name}: H∘ρ − H contains ${series.ring.format(worst)}${terms > 1 ? ` and ${terms - 1} more term${terms > 2 ? 's' : ''}` : ''}`;
}

function quadraticDifference(name: string, image: SparseMatrix<Algebraic>, s: SparseMatrix<Algebraic>, names: readonly string[]): string {
  const field = s.field as RealField;
  const [a, b] = [dense(image), dense(s)];
  for (let i = 0; i < s.rows; i++)
    for (let j = 0; j <= i; j++) {
      const d = field.sub(a.data[i * s.cols + j]!, b.data[i * s.cols + j]!);
      if (field.isZero(d)) continue;
      const c = i === j ? field.div(d, field.fromInteger(2)) : d;
      return `H is not invariant under ${name}: the term ${i === j ? `${names[i]}^2` : `${names[j]}*${names[i]}`} changes by ${field.format(c)}`;
    }
  return `H is not invariant under ${name}`;
}

/** Throws NotInvariantError for the first generator that fails. */
export function requireGenerators(generators: readonly GeneratorCheck[], file: Declaration['source'], next: string): void {
  const bad = generators.find((g) => g.reason !== undefined);
  if (bad === undefined) return;
  throw new NotInvariantError(bad.reason!, {
    file,
    key: bad.where,
    value: bad.name,
    expected: bad.sign === undefined ? 'ρᵀWρ = W, or ρᵀWρ = −W for a generator that reverses time' : 'a generator that leaves H invariant',
    next,
  });
}

/** Stops where the model is not what it claims, with the words of `check`. */
export function requireHolds(p: Prepared): void {
  const file = p.declaration.source;
  const next = 'see all of it with symcodim check';
  requireGenerators(p.generators, file, next);
  if (!p.equilibriumHolds) {
    const i = p.local.gradient.findIndex((x) => !p.field.isZero(x));
    throw new NotAnEquilibriumError(
      `the point is not an equilibrium: ∂H/∂${p.quantities.names[i]} = ${p.field.format(p.local.gradient[i]!)}`,
      { file, key: 'equilibrium', expected: '∇H = 0', next },
    );
  }
}

/** The action of the declared group. Throws NotAGroupError past the limit. */
export function actionOf(p: Prepared): Action {
  return withCharacters(
    makeAction(
      p.field,
      p.form,
      p.generators.map((g) => ({ name: g.name, matrix: g.matrix })),
      p.declaration.orderLimit,
    ),
  );
}

/** What a summary needs to know of a model, exact or not. */
export interface Stated {
  readonly declaration: Declaration;
  readonly quantities: Quantities;
  readonly hamiltonian: Expression | undefined;
}

/** H as a person would recognise it. */
export function energyText(p: Stated): string | undefined {
  const { energy } = p.declaration;
  if (energy.kind === 'hamiltonian' || energy.kind === 'quadratic') return energy.text.replace(/\s+/g, ' ').trim();
  return p.hamiltonian === undefined || energy.kind === 'network' ? undefined : formatExpression(tidy(p.hamiltonian));
}
