/**
 * The Hamiltonian near its equilibrium, exactly: gradient, Hessian and their derivatives by the parameters that
 * vary, and the cubic part; all from one Taylor expansion in the coordinates and the varied parameters.
 */
import { InputError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { type SparseMatrix, sparseFromMaps } from '../linear/index.ts';
import { factorsOf, type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import { type Expression, symbolsOf, taylor } from './expression/index.ts';
import type { Quantities } from './quantities.ts';

export interface LocalExpansion {
  readonly field: RealField;
  /** ∇H at the point. */
  readonly gradient: readonly Algebraic[];
  /** S. */
  readonly hessian: SparseMatrix<Algebraic>;
  /** ∂S/∂μ for each varied parameter. */
  readonly hessianBy: readonly SparseMatrix<Algebraic>[];
  /** ∂∇H/∂μ for each varied parameter. */
  readonly gradientBy: readonly (readonly Algebraic[])[];
  /** Terms of H of degree 3 and more in y = x − x₀ alone, up to the degree of the expansion. */
  readonly ring: PolynomialRing<Algebraic>;
  readonly higher: Polynomial<Algebraic>;
  readonly degree: number;
  /** Derivative of the declared equilibrium by each varied parameter; undefined where it has none in the field. */
  readonly pointBy: readonly (readonly Algebraic[])[] | undefined;
}

/** The expansion is floating because a coefficient contains this term. */
export interface InexactExpansion {
  readonly inexact: string;
}

/** Everything at the given parameter values; every parameter must have one. Throws InputError naming one that has none. */
export function localExpansion(
  h: Expression,
  quantities: Quantities,
  vary: readonly string[],
  degree = 3,
): LocalExpansion | InexactExpansion {
  const { names } = quantities;
  // the varied parameters are expansion variables about their values
  const expressions = new Map<string, Expression>(quantities.pointExpressions);
  for (const v of vary) {
    const value = quantities.valueExpressions.get(v);
    if (value === undefined)
      throw new InputError(`the parameter ${v} has no value`, {
        key: `parameters.${v}`,
        value: v,
        expected: 'a value for every parameter',
        next: `give it one in the file or with --set ${v}=…`,
      });
    expressions.set(v, value);
  }
  const t = taylor(h, {
    names: [...names, ...vary],
    point: expressions,
    parameters: quantities.valueExpressions,
    degree: Math.max(degree, 3),
    field: quantities.field,
  });
  if (t.kind === 'symbolic') return { inexact: t.atoms[0] ?? t.symbols[0] ?? 'a value' };
  const field = t.field;
  const n = names.length;
  const gradient = new Array<Algebraic>(n).fill(field.zero);
  const rows = Array.from({ length: n }, () => new Map<number, Algebraic>());
  const by = vary.map(() => Array.from({ length: n }, () => new Map<number, Algebraic>()));
  const gradientBy = vary.map(() => new Array<Algebraic>(n).fill(field.zero));
  const ring = new PolynomialRing<Algebraic>(field, names);
  const higher: [string, Algebraic][] = [];
  const second = (target: Map<number, Algebraic>[], i: number, j: number, c: Algebraic) => {
    if (i === j) target[i]!.set(i, field.add(c, c));
    else {
      target[i]!.set(j, c);
      target[j]!.set(i, c);
    }
  };
  t.polynomial.monomials.forEach((m, k) => {
    const c = t.polynomial.coefficients[k]!;
    const flat = factorsOf(m).flatMap(([v, e]) => new Array<number>(e).fill(v));
    const x = flat.filter((v) => v < n);
    const mu = flat.filter((v) => v >= n).map((v) => v - n);
    if (mu.length === 0) {
      if (x.length === 1) gradient[x[0]!] = c;
      else if (x.length === 2) second(rows, x[0]!, x[1]!, c);
      else higher.push([m, c]);
    } else if (mu.length === 1) {
      if (x.length === 1) gradientBy[mu[0]!]![x[0]!] = c;
      else if (x.length === 2) second(by[mu[0]!]!, x[0]!, x[1]!, c);
    }
  });
  return {
    field,
    gradient,
    hessian: sparseFromMaps(field, n, rows),
    hessianBy: by.map((r) => sparseFromMaps(field, n, r)),
    gradientBy,
    ring,
    higher: ring.fromTerms(higher),
    degree: Math.max(degree, 3),
    pointBy: pointDerivatives(quantities, vary, field),
  };
}

function pointDerivatives(quantities: Quantities, vary: readonly string[], field: RealField): Algebraic[][] | undefined {
  const at = new Map(vary.map((v) => [v, quantities.valueExpressions.get(v)!]));
  const derivatives: Algebraic[][] = [];
  for (const name of quantities.names) {
    const e = quantities.pointExpressions.get(name);
    if (e === undefined || ![...symbolsOf(e)].some((s) => at.has(s))) {
      derivatives.push(vary.map(() => field.zero));
      continue;
    }
    const t = firstOrder(e, vary, at, quantities, field);
    if (t?.kind !== 'exact' || t.field !== field) return undefined;
    derivatives.push(
      vary.map((_, j) =>
        t.ring.coefficient(
          t.polynomial,
          vary.map((_, i) => (i === j ? 1 : 0)),
        ),
      ),
    );
  }
  return vary.map((_, j) => derivatives.map((d) => d[j]!));
}

/** Undefined where the equilibrium is not smooth in the parameters, as sqrt(m) at a fold. */
function firstOrder(e: Expression, vary: readonly string[], at: ReadonlyMap<string, Expression>, quantities: Quantities, field: RealField) {
  try {
    return taylor(e, { names: vary, point: at, parameters: quantities.valueExpressions, degree: 1, field });
  } catch (error) {
    if (error instanceof InputError) return undefined;
    throw error;
  }
}

/** D³H·v as a symmetric matrix. */
export function cubicAlong(local: LocalExpansion, v: readonly Algebraic[]): SparseMatrix<Algebraic> {
  const { field } = local;
  const n = v.length;
  const rows = Array.from({ length: n }, () => new Map<number, Algebraic>());
  const add = (i: number, j: number, c: Algebraic) => {
    rows[i]!.set(j, field.add(rows[i]!.get(j) ?? field.zero, c));
  };
  local.higher.monomials.forEach((m, k) => {
    const flat = factorsOf(m).flatMap(([x, e]) => new Array<number>(e).fill(x));
    if (flat.length !== 3) return;
    const c = local.higher.coefficients[k]!;
    // the third derivative in all orders: sum over the 6 permutations of the three factors
    for (const [a, b, d] of [
      [0, 1, 2],
      [0, 2, 1],
      [1, 0, 2],
      [1, 2, 0],
      [2, 0, 1],
      [2, 1, 0],
    ] as const) {
      const w = v[flat[d]!]!;
      if (!field.isZero(w)) add(flat[a]!, flat[b]!, field.mul(c, w));
    }
  });
  return sparseFromMaps(field, n, rows);
}
