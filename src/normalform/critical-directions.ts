/**
 * Unit vectors y with ∇f(y) + λ ∇ℓ(y) = 0 for forms f and ℓ: in the plane as real roots of the Jacobian determinant, isolated
 * exactly; in more dimensions by Newton from many starting points.
 */
import { type Algebraic, type RealField, ratioToNumber } from '../field/index.ts';
import { numberMatrix } from '../linear/index.ts';
import { type Polynomial, type PolynomialRing, RealRoots } from '../polynomial/index.ts';
import { NumericPolynomial, newton, norm, randomSource } from './numeric-polynomial.ts';

export interface Directions {
  readonly found: readonly Float64Array[];
  /** Every direction is critical (f is a function of ℓ). */
  readonly all: boolean;
  /** Directions that are multiple roots: not decided by these forms. */
  readonly multiple: readonly Float64Array[];
  /** Proved to be all of them. */
  readonly complete: boolean;
}

/** Starting points in three dimensions; more in proportion to the dimension. */
const STARTS = 160;
const TOLERANCE = 1e-11;

export function criticalDirections(ring: PolynomialRing<Algebraic>, f: Polynomial<Algebraic>, l: Polynomial<Algebraic>): Directions {
  return ring.variables.length === 2 ? inThePlane(ring, f, l) : bySearch(ring, f, l);
}

/** Numbers proportional to ∂_1 f ∂_2 ℓ - ∂_2 f ∂_1 ℓ in dimension 2; whether all 2 x 2 minors vanish otherwise. */
export function dependentGradients(ring: PolynomialRing<Algebraic>, f: Polynomial<Algebraic>, l: Polynomial<Algebraic>): boolean {
  const a = ring.gradient(f);
  const b = ring.gradient(l);
  for (let i = 0; i < a.length; i++)
    for (let j = i + 1; j < a.length; j++) if (!ring.isZero(ring.sub(ring.mul(a[i]!, b[j]!), ring.mul(a[j]!, b[i]!)))) return false;
  return true;
}

function inThePlane(ring: PolynomialRing<Algebraic>, f: Polynomial<Algebraic>, l: Polynomial<Algebraic>): Directions {
  const field = ring.field as RealField;
  const [f1, f2] = ring.gradient(f) as [Polynomial<Algebraic>, Polynomial<Algebraic>];
  const [l1, l2] = ring.gradient(l) as [Polynomial<Algebraic>, Polynomial<Algebraic>];
  const jacobian = ring.sub(ring.mul(f1, l2), ring.mul(f2, l1));
  if (ring.isZero(jacobian)) return { found: [], all: true, multiple: [], complete: true };
  const degree = ring.degree(jacobian);
  // (t, 1) and the direction (1, 0)
  const dense = new Array<Algebraic>(degree + 1).fill(field.zero);
  for (const [m, c] of ring.terms(jacobian)) dense[m.lastIndexOf('\u0000') + 1] = c;
  const roots = new RealRoots(field);
  const p = roots.ring.trim(dense);
  const found: Float64Array[] = [];
  const multiple: Float64Array[] = [];
  const take = (x: number, y: number, times: number) => {
    const r = Math.hypot(x, y);
    for (const s of [1, -1]) (times === 1 ? found : multiple).push(Float64Array.of((s * x) / r, (s * y) / r));
  };
  if (p.length <= degree) take(1, 0, degree + 1 - p.length);
  const doubles = Float64Array.from(p, (c) => field.toNumber(c));
  for (const root of roots.isolate(p)) {
    if (root.exact !== undefined) take(ratioToNumber(root.exact.n, root.exact.d), 1, root.multiplicity);
    else if (root.multiplicity === 1)
      take(bisected(doubles, ratioToNumber(root.low.n, root.low.d), ratioToNumber(root.high.n, root.high.d)), 1, 1);
    else {
      const near = roots.refine(p, root, 10);
      take(ratioToNumber(near.low.n, near.low.d), 1, root.multiplicity);
    }
  }
  return { found, all: false, multiple, complete: true };
}

/** The simple root between two isolating ends, to the last digits of a double. */
function bisected(p: Float64Array, low: number, high: number): number {
  const value = (x: number) => p.reduceRight((s, c) => s * x + c, 0);
  const right = Math.sign(value(high));
  for (let k = 0; k < 200; k++) {
    const mid = (low + high) / 2;
    if (mid <= low || mid >= high) break;
    if (Math.sign(value(mid)) === right) high = mid;
    else low = mid;
  }
  return (low + high) / 2;
}

function bySearch(ring: PolynomialRing<Algebraic>, f: Polynomial<Algebraic>, l: Polynomial<Algebraic>): Directions {
  const n = ring.variables.length;
  if (dependentGradients(ring, f, l)) return { found: [], all: true, multiple: [], complete: true };
  const a = NumericPolynomial.of(ring, f);
  const b = NumericPolynomial.of(ring, l);
  const random = randomSource(20_231);
  const found: Float64Array[] = [];
  const multiple: Float64Array[] = [];
  const size = a.size + b.size;
  const residual = (z: Float64Array) => {
    const y = z.subarray(0, n);
    const ga = a.gradient(y);
    const gb = b.gradient(y);
    const out = new Float64Array(n + 1);
    let square = -1;
    for (let i = 0; i < n; i++) {
      out[i] = ga[i]! + z[n]! * gb[i]!;
      square += y[i]! * y[i]!;
    }
    out[n] = square / 2;
    return out;
  };
  const jacobian = (z: Float64Array) => {
    const y = z.subarray(0, n);
    const ha = a.hessian(y);
    const hb = b.hessian(y);
    const gb = b.gradient(y);
    const m = numberMatrix(n + 1, n + 1);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) m.data[i * (n + 1) + j] = ha[i * n + j]! + z[n]! * hb[i * n + j]!;
      m.data[i * (n + 1) + n] = gb[i]!;
      m.data[n * (n + 1) + i] = y[i]!;
    }
    return m;
  };
  for (let k = 0; k < STARTS * (n - 1); k++) {
    const z = new Float64Array(n + 1);
    for (let i = 0; i < n; i++) z[i] = random();
    const r = norm(z);
    if (r > 1 || r < 1e-3) continue; // even on the sphere
    for (let i = 0; i < n; i++) z[i]! /= r;
    const y = z.subarray(0, n);
    const gb = b.gradient(y);
    const ga = a.gradient(y);
    const square = norm(gb) ** 2;
    z[n] = square === 0 ? 0 : -gb.reduce((s, x, i) => s + x * ga[i]!, 0) / square;
    const end = newton(z, residual, jacobian, TOLERANCE * size);
    if (!end.converged) continue;
    const direction = end.point.slice(0, n);
    const far = (list: readonly Float64Array[]) => list.every((x) => norm(x.map((v, i) => v - direction[i]!)) > 1e-6);
    if (!far(found) || !far(multiple)) continue;
    (wellConditioned(jacobian(end.point).data, n + 1, size) ? found : multiple).push(direction);
  }
  return { found, all: false, multiple, complete: false };
}

/** Smallest pivot of an elimination with complete pivoting against the size of the forms. */
function wellConditioned(data: Float64Array, n: number, size: number): boolean {
  const a = data.slice();
  const rows = Array.from({ length: n }, (_, i) => i);
  const cols = rows.slice();
  for (let k = 0; k < n; k++) {
    let best = 0;
    let at: [number, number] = [k, k];
    for (let i = k; i < n; i++)
      for (let j = k; j < n; j++) {
        const x = Math.abs(a[rows[i]! * n + cols[j]!]!);
        if (x > best) {
          best = x;
          at = [i, j];
        }
      }
    if (best < 1e-7 * Math.min(1, size)) return false;
    [rows[k], rows[at[0]]] = [rows[at[0]]!, rows[k]!];
    [cols[k], cols[at[1]]] = [cols[at[1]]!, cols[k]!];
    for (let i = k + 1; i < n; i++) {
      const g = a[rows[i]! * n + cols[k]!]! / a[rows[k]! * n + cols[k]!]!;
      for (let j = k; j < n; j++) a[rows[i]! * n + cols[j]!]! -= g * a[rows[k]! * n + cols[j]!]!;
    }
  }
  return true;
}
