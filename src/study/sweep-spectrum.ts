/**
 * Eigenvalues of the flow along a curve of equilibria, block by block: tracks with Krein signs, what a pair does on
 * either side of zero, and collisions off zero, found by bisection on what changes sign there: the discriminant in λ²
 * for a collision, the difference of two frequencies for a passage.
 *
 * Krein sign of iω: that of v*Sv on its eigenvector, the energy of the mode.
 */
import { type NumberMatrix, numberMatrix, numberSolve, numberTranspose } from '../linear/index.ts';
import { hamiltonianEigenvalues } from '../linear/spectral.ts';

/** One eigenvalue of each pair ±λ, with im ≥ 0, and re ≥ 0 where im = 0; sign only on the imaginary axis. */
export interface BlockEigenvalue {
  readonly re: number;
  readonly im: number;
  readonly sign: -1 | 0 | 1;
}

/** Real parts below this share of the modulus are rounding. */
const AXIS = 1e-7;
/** Eigenvalues below this share of the largest entry of L are zero: the root of the rounding of their square. */
const ZERO = 1e-7;

export function flowMatrix(s: NumberMatrix, w: NumberMatrix): NumberMatrix {
  return numberSolve(numberTranspose(w), s);
}

/** Eigenvalues of L = JS on one block, one of each pair, by modulus. */
export function blockEigenvalues(s: NumberMatrix, w: NumberMatrix): BlockEigenvalue[] {
  if (s.rows === 0) return [];
  if (s.rows === 2) {
    const area = w.data[1]!;
    const square = -(s.data[0]! * s.data[3]! - s.data[1]! * s.data[2]!) / (area * area);
    const unit = Math.max(...s.data.map(Math.abs)) / Math.abs(area);
    if (Math.abs(square) <= ZERO * ZERO * unit * unit) return [{ re: 0, im: 0, sign: 0 }];
    const size = Math.sqrt(Math.abs(square));
    if (square > 0) return [{ re: size, im: 0, sign: 0 }];
    return [{ re: 0, im: size, sign: s.data[0]! + s.data[3]! > 0 ? 1 : -1 }];
  }
  const l = flowMatrix(s, w);
  const scale = l.data.reduce((m, x) => Math.max(m, Math.abs(x)), 0);
  const { values } = hamiltonianEigenvalues(l);
  return values
    .filter((_, i) => i % 2 === 0)
    .map(({ re, im }): BlockEigenvalue => {
      const size = Math.hypot(re, im);
      const a = Math.abs(re) <= AXIS * size || size <= ZERO * scale ? 0 : Math.abs(im) <= AXIS * size ? Math.abs(re) : im < 0 ? -re : re;
      const b = Math.abs(im) <= AXIS * size || size <= ZERO * scale ? 0 : Math.abs(im);
      return { re: a, im: b, sign: a === 0 && b > 0 ? kreinSign(s, l, b, scale) : 0 };
    });
}

/** Sign of v*Sv for the eigenvector of iω, by inverse iteration on the realified l − iω; 0 where it is too near zero. */
function kreinSign(s: NumberMatrix, l: NumberMatrix, frequency: number, scale: number): -1 | 0 | 1 {
  const n = l.rows;
  const m = numberMatrix(2 * n, 2 * n);
  const shift = frequency * (1 + 1e-9) + 1e-14 * scale;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      m.data[i * 2 * n + j] = l.data[i * n + j]!;
      m.data[(n + i) * 2 * n + n + j] = l.data[i * n + j]!;
    }
    m.data[i * 2 * n + n + i]! += shift;
    m.data[(n + i) * 2 * n + i]! -= shift;
  }
  let v = numberMatrix(
    2 * n,
    1,
    Array.from({ length: 2 * n }, (_, i) => Math.cos(1 + i * i)),
  );
  try {
    for (let k = 0; k < 3; k++) {
      v = numberSolve(m, v);
      const norm = Math.hypot(...v.data);
      v = { ...v, data: v.data.map((x) => x / norm) };
    }
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
  }
  let energy = 0;
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++) energy += s.data[i * n + j]! * (v.data[i]! * v.data[j]! + v.data[n + i]! * v.data[n + j]!);
  return Math.abs(energy) <= 1e-9 * scale ? 0 : energy > 0 ? 1 : -1;
}

/** λ² of a block with the equal values that its symmetry forces counted once, as complex numbers by real part. */
export function squares(values: readonly BlockEigenvalue[], copies: number): { re: number; im: number }[] {
  const all = values.map(({ re, im }) => ({ re: re * re - im * im, im: 2 * re * im })).sort((a, b) => a.re - b.re || a.im - b.im);
  return all.filter((_, i) => i % copies === 0);
}

/** Order of eigenvalues along a track: each row continues the one before. */
export function matched(
  previous: readonly BlockEigenvalue[] | undefined,
  before: readonly BlockEigenvalue[] | undefined,
  next: readonly BlockEigenvalue[],
): BlockEigenvalue[] {
  if (previous === undefined || previous.length !== next.length) return next.slice();
  // on the imaginary axis a track goes on in a straight line; off it, and where it has just turned, it goes to the nearest
  const guess = previous.map((p, i) => {
    const q = before?.[i];
    const smooth = q !== undefined && p.re === 0 && q.re === 0;
    return smooth ? { re: 0, im: Math.abs(2 * p.im - q.im) } : { re: p.re, im: p.im };
  });
  const open = next.slice();
  const out = new Array<BlockEigenvalue>(next.length);
  const pairs = guess.flatMap((g, i) =>
    open.map((v, j) => ({ i, j, d: Math.hypot(g.re - v.re, g.im - v.im) + (previous[i]!.sign * v.sign < 0 ? 1e-9 : 0) })),
  );
  pairs.sort((a, b) => a.d - b.d);
  const used = new Set<number>();
  const placed = new Set<number>();
  for (const { i, j } of pairs) {
    if (placed.has(i) || used.has(j)) continue;
    placed.add(i);
    used.add(j);
    out[i] = open[j]!;
  }
  return out;
}

/** Where eigenvalues near zero lie. */
export type Place = 'imaginary' | 'real' | 'complex' | 'zero';

/** The places of `count` eigenvalues of least modulus, after the first `skipped`; one word if they agree. */
export function placeNearZero(values: readonly BlockEigenvalue[], count: number, skipped = 0): Place {
  const near = [...values].sort((a, b) => Math.hypot(a.re, a.im) - Math.hypot(b.re, b.im)).slice(skipped, skipped + count);
  const kinds = new Set(near.map((v): Place => (v.re === 0 ? (v.im === 0 ? 'zero' : 'imaginary') : v.im === 0 ? 'real' : 'complex')));
  return kinds.size === 1 ? [...kinds][0]! : 'complex';
}

/** Π (y_i − y_j)² over the λ² of a block: changes sign where two of them meet and leave the real axis. */
export function discriminant(y: readonly { readonly re: number; readonly im: number }[]): number {
  let re = 1;
  let im = 0;
  const scale = Math.max(1e-300, ...y.map((z) => Math.hypot(z.re, z.im)));
  for (let i = 0; i < y.length; i++)
    for (let j = 0; j < i; j++) {
      const a = (y[i]!.re - y[j]!.re) / scale;
      const b = (y[i]!.im - y[j]!.im) / scale;
      const [c, d] = [a * a - b * b, 2 * a * b];
      [re, im] = [re * c - im * d, re * d + im * c];
    }
  return re;
}

/**
 * A zero of f between 0 and 1, where f(0) and f(1) have opposite signs: regula falsi with the Illinois weights
 * (from memory), bisection where that is slow; to the last digits.
 */
export function bracketed(f: (t: number) => number, f0: number, f1: number): number {
  let [a, b, fa, fb] = [0, 1, f0, f1];
  let [wa, wb] = [fa, fb];
  for (let k = 0; k < 200 && b - a > 1e-16; k++) {
    let t = k % 3 === 2 ? (a + b) / 2 : (a * wb - b * wa) / (wb - wa);
    if (!(t > a && t < b)) t = (a + b) / 2;
    if (t === a || t === b) break;
    const v = f(t);
    if (v === 0) return t;
    if (Math.sign(v) === Math.sign(fa)) {
      a = t;
      fa = v;
      wa = v;
      wb = fb / 2;
    } else {
      b = t;
      fb = v;
      wb = v;
      wa = fa / 2;
    }
  }
  return Math.abs(fa) < Math.abs(fb) ? a : b;
}
