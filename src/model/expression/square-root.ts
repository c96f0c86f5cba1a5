/** Square roots of algebraic numbers, where they are again sums of square roots or cosines. */
import { type Algebraic, gcdInt, isqrt, lcmInt, type Rational, type RealField, rational, rationals } from '../../field/index.ts';
import { FieldTooSmall } from './signals.ts';

/** Largest degree and order of the angle for which roots of 2 ± 2 cos are looked for. */
const DEGREE_BOUND = 24;
const ORDER_BOUND = 120;

function rootOfRational(field: RealField, r: Rational): Algebraic {
  const root = field.sqrt(r);
  if (root === undefined) throw new FieldTooSmall({ squareRoots: [r.n * r.d] });
  return root;
}

/** sin(2 pi k/n). Throws FieldTooSmall. */
export function sine(field: RealField, k: number, n: number): Algebraic {
  const value = field.sin(k, n);
  if (value === undefined) throw new FieldTooSmall({ cosines: [(4 * n) / gcdInt(n - 4 * k, 4 * n)] });
  return value;
}

/** cos(2 pi k/n). Throws FieldTooSmall. */
export function cosine(field: RealField, k: number, n: number): Algebraic {
  const value = field.cos(k, n);
  if (value === undefined) throw new FieldTooSmall({ cosines: [n / gcdInt(k, n)] });
  return value;
}

/** The rational square root of r >= 0, if there is one. */
function rationalRoot(r: Rational): Rational | undefined {
  if (r.n < 0n) return undefined;
  const n = isqrt(r.n);
  const d = isqrt(r.d);
  return n * n === r.n && d * d === r.d ? rational(n, d) : undefined;
}

/**
 * The non-negative square root of a >= 0, or undefined if none was found. Found are: roots of rationals; of
 * u + v sqrt(w) with u^2 - v^2 w a square (sqrt(2 + sqrt 3) = (sqrt 6 + sqrt 2)/2); of rational multiples of
 * 2 - 2 cos t (which is (2 sin(t/2))^2: the chords of regular polygons). Throws FieldTooSmall if the root is known
 * and in a larger field.
 */
export function squareRoot(field: RealField, a: Algebraic): Algebraic | undefined {
  const r = field.toRational(a);
  if (r !== undefined) return r.n < 0n ? undefined : rootOfRational(field, r);
  const q = field.quadraticForm(a);
  if (q !== undefined) {
    const { mul, sub, add } = rationals;
    const s = rationalRoot(sub(mul(q.u, q.u), mul(mul(q.v, q.v), rational(q.w))));
    if (s !== undefined) {
      const half = rational(1n, 2n);
      const x = rootOfRational(field, mul(half, add(q.u, s)));
      const y = rootOfRational(field, mul(half, sub(q.u, s)));
      return q.v.n > 0n ? field.add(x, y) : field.sub(x, y);
    }
  }
  return chord(field, a);
}

function chord(field: RealField, a: Algebraic): Algebraic | undefined {
  if (field.degree > DEGREE_BOUND) return undefined;
  let order = field.conductor;
  for (const [r, n] of [
    [2n, 8],
    [3n, 12],
    [5n, 5],
  ] as const)
    if (field.radicals.includes(r)) order = lcmInt(order, n);
  if (order > ORDER_BOUND) return undefined;
  if (order % 2 === 1) order *= 2; // both signs of the cosine
  for (let k = 1; 2 * k < order; k++) {
    const c = field.cos(k, order);
    if (c === undefined || field.toRational(c) !== undefined) continue;
    const square = field.sub(field.fromInteger(2), field.mul(field.fromInteger(2), c));
    const ratio = field.toRational(field.div(a, square));
    if (ratio === undefined || ratio.n < 0n) continue;
    return field.mul(rootOfRational(field, ratio), field.mul(field.fromInteger(2), sine(field, k, 2 * order)));
  }
  return undefined;
}
