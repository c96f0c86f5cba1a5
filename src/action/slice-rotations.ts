/**
 * Finite stand-ins for a continuous symmetry that fixes the equilibrium. A rotation field with weights m_j on V has
 * weights m_i ± m_j on quadratic forms; turned by 2π/k with k > 2 max m it leaves exactly the forms invariant that the
 * whole circle does. For groups that are not tori a random form, averaged over the finite group, decides.
 */
import { type Algebraic, mulAddMod, RealField, type Reduction } from '../field/index.ts';
import { type Matrix, type SparseMatrix, sparseIdentity, sparseMultiply, sparseTimes } from '../linear/index.ts';
import type { Action } from './action.ts';
import { embedSparse } from './irreducibles.ts';
import { combineSparse } from './slice.ts';

/** A field whose flow is periodic: ξ² = −c² m² on the space of each weight m, the weights coprime integers. */
export interface PeriodicField {
  readonly matrix: SparseMatrix<Algebraic>;
  readonly weights: readonly number[];
  readonly squaredRate: Algebraic;
}

/** Real roots of a monic polynomial all of whose roots are real (coefficients from the constant term up); undefined where that fails. */
function realRoots(coefficients: readonly number[]): number[] | undefined {
  const d = coefficients.length - 1;
  // simultaneous iteration of Durand and Kerner (common practice)
  const z = Array.from({ length: d }, (_, i) => ({ re: Math.cos(0.7 + 2.4 * i) * (1 + i), im: Math.sin(0.7 + 2.4 * i) * (1 + i) }));
  for (let step = 0; step < 500; step++) {
    let moved = 0;
    for (let i = 0; i < d; i++) {
      let [vr, vi] = [0, 0];
      for (let k = d; k >= 0; k--) [vr, vi] = [vr * z[i]!.re - vi * z[i]!.im + coefficients[k]!, vr * z[i]!.im + vi * z[i]!.re];
      let [dr, di] = [1, 0];
      for (let j = 0; j < d; j++)
        if (j !== i) {
          const [a, b] = [z[i]!.re - z[j]!.re, z[i]!.im - z[j]!.im];
          [dr, di] = [dr * a - di * b, dr * b + di * a];
        }
      const size = dr * dr + di * di;
      if (size === 0) return undefined;
      const [sr, si] = [(vr * dr + vi * di) / size, (vi * dr - vr * di) / size];
      z[i] = { re: z[i]!.re - sr, im: z[i]!.im - si };
      moved = Math.max(moved, Math.hypot(sr, si));
    }
    if (moved < 1e-13) break;
  }
  return z.every((x) => Math.abs(x.im) < 1e-6 * (1 + Math.abs(x.re))) ? z.map((x) => x.re) : undefined;
}

/** The minimal polynomial of a as seen by one vector: coefficients from the constant term up, monic. */
function vectorPolynomial(a: SparseMatrix<Algebraic>, field: RealField): Algebraic[] | undefined {
  const n = a.rows;
  const start: Matrix<Algebraic> = {
    field,
    rows: n,
    cols: 1,
    data: Array.from({ length: n }, (_, i) => field.fromInteger(((i * 37 + 11) % 23) + 1)),
  };
  const rows: { v: Algebraic[]; c: Algebraic[]; pivot: number }[] = [];
  let w = start;
  for (let k = 0; k <= 8; k++) {
    const v = [...w.data];
    const c: Algebraic[] = [...new Array<Algebraic>(k).fill(field.zero), field.one];
    for (const r of rows) {
      const g = v[r.pivot]!;
      if (field.isZero(g)) continue;
      for (let i = 0; i < n; i++) if (!field.isZero(r.v[i]!)) v[i] = field.sub(v[i]!, field.mul(g, r.v[i]!));
      for (let i = 0; i < r.c.length; i++) c[i] = field.sub(c[i]!, field.mul(g, r.c[i]!));
    }
    const pivot = v.findIndex((x) => !field.isZero(x));
    if (pivot < 0) return c;
    const inv = field.inv(v[pivot]!);
    rows.push({ v: v.map((x) => field.mul(inv, x)), c: c.map((x) => field.mul(inv, x)), pivot });
    w = sparseTimes(a, w);
  }
  return undefined;
}

/** The weights of a field whose flow is periodic; undefined where it is not, or not visibly. Proved exactly. */
export function periodicField(matrix: SparseMatrix<Algebraic>, field: RealField): PeriodicField | undefined {
  const square = sparseMultiply(matrix, matrix);
  const polynomial = vectorPolynomial(square, field);
  if (polynomial === undefined || polynomial.length < 2) return undefined;
  const roots = realRoots(polynomial.map((x) => field.toNumber(x)));
  if (roots === undefined) return undefined;
  const scaleOf = Math.max(...roots.map(Math.abs));
  const rates = roots.filter((r) => Math.abs(r) > 1e-9 * scaleOf).map((r) => (r < 0 ? Math.sqrt(-r) : Number.NaN));
  if (rates.length === 0 || rates.some(Number.isNaN)) return undefined;
  const least = Math.min(...rates);
  for (let denominator = 1; denominator <= 12; denominator++) {
    const weights = rates.map((r) => Math.round((r / least) * denominator));
    if (!rates.every((r, i) => Math.abs((r / least) * denominator - weights[i]!) < 1e-6)) continue;
    const total = weights.reduce((s, m) => s + m * m, 0);
    // the sum of the roots is −c² Σ m²
    const squaredRate = field.div(polynomial.at(-2)!, field.fromInteger(total));
    if (field.sign(squaredRate) <= 0) return undefined;
    const found = { matrix, weights: [...weights].sort((a, b) => a - b), squaredRate };
    const projections = weightProjections(found, square, field);
    const sum = combineSparse(
      field,
      matrix.rows,
      projections.map((p) => [field.one, p.projection] as const),
    );
    const proved =
      sum.index.every((c, i) => c.length === 1 && c[0] === i && field.equal(sum.value[i]![0]!, field.one)) &&
      projections.every(({ weight, projection: p }) => {
        if (weight === 0) return sparseMultiply(matrix, p).index.every((c) => c.length === 0);
        const off = combineSparse(field, matrix.rows, [
          [field.one, sparseMultiply(square, p)],
          [field.mul(squaredRate, field.fromInteger(weight * weight)), p],
        ]);
        return off.index.every((c) => c.length === 0);
      });
    return proved ? found : undefined;
  }
  return undefined;
}

/** Projections onto the spaces of the weights, 0 included, as polynomials in ξ². */
function weightProjections(
  f: PeriodicField,
  square: SparseMatrix<Algebraic>,
  field: RealField,
): { weight: number; projection: SparseMatrix<Algebraic> }[] {
  const n = square.rows;
  const one = sparseIdentity<Algebraic>(field, n);
  const weights = [0, ...f.weights];
  return weights.map((weight) => {
    let projection = one;
    for (const other of weights) {
      if (other === weight) continue;
      // (ξ² + c²o²)/(c²(o² − m²))
      const factor = combineSparse(field, n, [
        [field.one, square],
        [field.mul(f.squaredRate, field.fromInteger(other * other)), one],
      ]);
      const norm = field.inv(field.mul(f.squaredRate, field.fromInteger(other * other - weight * weight)));
      projection = combineSparse(field, n, [[norm, sparseMultiply(projection, factor)]]);
    }
    return { weight, projection };
  });
}

/** Orders of turns that are tried: small ones with small fields first. */
const TURNS = [4, 6, 8, 10, 12, 16, 20, 24];

/** exp(2πξ/(ck)) over a field that holds it, k > 2 max m; undefined where no field of square roots does. */
export function finiteTurn(
  f: PeriodicField,
  field: RealField,
): { field: RealField; matrix: SparseMatrix<Algebraic>; order: number } | undefined {
  const order = TURNS.find((t) => t > 2 * f.weights.at(-1)!);
  if (order === undefined) return undefined;
  let large = RealField.join(field, RealField.of({ cosines: [order * 4] }));
  const rational = field.toRational(f.squaredRate);
  if (rational !== undefined) large = RealField.join(large, RealField.of({ squareRoots: [rational.n * rational.d] }));
  const rate = large.sqrtElement(large.embed(field, f.squaredRate));
  if (rate === undefined) return undefined;
  const xi = embedSparse(f.matrix, field, large);
  const moved = { ...f, matrix: xi, squaredRate: large.embed(field, f.squaredRate) };
  const terms = weightProjections(moved, sparseMultiply(xi, xi), large).flatMap(({ weight, projection }) => {
    if (weight === 0) return [[large.one, projection] as const];
    const [c, s] = [large.cos(weight, order)!, large.sin(weight, order)!];
    const turned = sparseMultiply(xi, projection);
    return [[c, projection] as const, [large.div(s, large.mul(rate, large.fromInteger(weight))), turned] as const];
  });
  return { field: large, matrix: combineSparse(large, f.matrix.rows, terms), order };
}

/**
 * Whether every quadratic form that the finite group leaves invariant is one of the continuous symmetry too, judged modulo a prime by the average
 * of a random form (wrong with probability about 1/p). All elements must be symplectic.
 */
export function standsFor(action: Action, isotropy: readonly SparseMatrix<Algebraic>[]): boolean {
  const reduction = action.field.reduction();
  const { p } = reduction;
  const n = action.dimension;
  let seed = 12345;
  const next = () => {
    seed = (seed * 48271) % 2147483647;
    return seed % p;
  };
  const form = new Int32Array(n * n);
  for (let i = 0; i < n; i++) for (let j = 0; j <= i; j++) form[i * n + j] = form[j * n + i] = next();
  const sum = new Int32Array(n * n);
  for (let e = 0; e < action.group.order; e++) {
    const image = pullBack(action.matrix(e), form, n, reduction);
    for (let i = 0; i < sum.length; i++) sum[i] = (sum[i]! + image[i]!) % p;
  }
  return isotropy.every((xi) => {
    const half = leftTransposed(xi, sum, n, reduction); // ξᵀX
    for (let i = 0; i < n; i++) for (let j = 0; j <= i; j++) if ((half[i * n + j]! + half[j * n + i]!) % p !== 0) return false;
    return true;
  });
}

/** aᵀ x modulo p. */
function leftTransposed(a: SparseMatrix<Algebraic>, x: Int32Array, n: number, reduction: Reduction): Int32Array {
  const { p } = reduction;
  const out = new Int32Array(n * n);
  a.index.forEach((cols, i) => {
    cols.forEach((j, k) => {
      const c = reduction.apply(a.value[i]![k]!);
      for (let l = 0; l < n; l++) out[j * n + l] = mulAddMod(out[j * n + l]!, c, x[i * n + l]!, p);
    });
  });
  return out;
}

/** aᵀ x a modulo p for symmetric x. */
function pullBack(a: SparseMatrix<Algebraic>, x: Int32Array, n: number, reduction: Reduction): Int32Array {
  const half = leftTransposed(a, x, n, reduction);
  const turned = new Int32Array(n * n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) turned[j * n + i] = half[i * n + j]!;
  return leftTransposed(a, turned, n, reduction);
}
