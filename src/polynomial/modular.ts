/**
 * Linear algebra modulo a prime p < 2^31 on rectangular Int32Arrays (row after row), and rational
 * reconstruction of its results. A rank modulo p is a lower bound of the exact one; a reconstructed vector is a
 * candidate that the caller checks exactly.
 */
import { type Algebraic, addRowInPlace, invMod, isqrt, mulMod, type Rational, RealField, rational } from '../field/index.ts';
import type { Matrix } from '../linear/index.ts';

export interface ModularMatrix {
  readonly p: number;
  readonly rows: number;
  readonly cols: number;
  /** Entry (i, j) at i * cols + j, in [0, p). */
  readonly data: Int32Array;
}

/** The image of an exact matrix. Throws RangeError if p divides a denominator. */
export function reduceMatrix(a: Matrix<Algebraic>, reduction: { p: number; apply(x: Algebraic): number }): ModularMatrix {
  return { p: reduction.p, rows: a.rows, cols: a.cols, data: Int32Array.from(a.data, (x) => reduction.apply(x)) };
}

/**
 * Brings rows into echelon form in place, reduced if `full`; returns the pivot column of each leading row.
 * Rows below the rank are zero afterwards.
 */
export function echelonInPlace(data: Int32Array, rows: number, cols: number, p: number, full = true): number[] {
  const pivots: number[] = [];
  let done = 0;
  for (let j = 0; j < cols && done < rows; j++) {
    let k = done;
    while (k < rows && data[k * cols + j] === 0) k++;
    if (k === rows) continue;
    const b = done * cols;
    if (k !== done)
      for (let l = j; l < cols; l++) {
        const t = data[b + l]!;
        data[b + l] = data[k * cols + l]!;
        data[k * cols + l] = t;
      }
    const lead = data[b + j]!;
    if (lead !== 1) {
      const g = invMod(lead, p);
      for (let l = j; l < cols; l++) if (data[b + l] !== 0) data[b + l] = mulMod(g, data[b + l]!, p);
    }
    for (let i = full ? 0 : done + 1; i < rows; i++) {
      if (i === done) continue;
      const x = data[i * cols + j]!;
      if (x !== 0) addRowInPlace(data, i * cols, b, j, cols, p - x, p);
    }
    pivots.push(j);
    done++;
  }
  return pivots;
}

export function rankModular(m: ModularMatrix): number {
  return echelonInPlace(m.data.slice(), m.rows, m.cols, m.p, false).length;
}

/** Reduced row echelon form, zero rows dropped. */
export function echelonModular(m: ModularMatrix): { matrix: ModularMatrix; pivots: readonly number[] } {
  const data = m.data.slice();
  const pivots = echelonInPlace(data, m.rows, m.cols, m.p);
  return { matrix: { p: m.p, rows: pivots.length, cols: m.cols, data: data.slice(0, pivots.length * m.cols) }, pivots };
}

/** Basis of {x : m x = 0} as rows, each 1 at its own free column and 0 at the others; with the free columns. */
export function kernelModular(m: ModularMatrix): { matrix: ModularMatrix; free: readonly number[] } {
  const { matrix: e, pivots } = echelonModular(m);
  const free: number[] = [];
  for (let j = 0, i = 0; j < m.cols; j++) {
    if (pivots[i] === j) i++;
    else free.push(j);
  }
  const data = new Int32Array(free.length * m.cols);
  free.forEach((j, k) => {
    data[k * m.cols + j] = 1;
    pivots.forEach((q, i) => {
      const x = e.data[i * m.cols + j]!;
      data[k * m.cols + q] = x === 0 ? 0 : m.p - x;
    });
  });
  return { matrix: { p: m.p, rows: free.length, cols: m.cols, data }, free };
}

/** n/d = x mod m with |n|, d <= bound (default sqrt(m/2)), or undefined (Wang 1981; from memory). */
export function reconstructRational(x: bigint, m: bigint, bound = isqrt(m / 2n)): Rational | undefined {
  let [r0, r1] = [m, ((x % m) + m) % m];
  let [s0, s1] = [0n, 1n];
  while (r1 > bound) {
    const q = r0 / r1;
    [r0, r1] = [r1, r0 - q * r1];
    [s0, s1] = [s1, s0 - q * s1];
  }
  if (s1 === 0n || (s1 < 0n ? -s1 : s1) > bound) return undefined;
  const out = rational(r1, s1);
  return out.d === (s1 < 0n ? -s1 : s1) ? out : undefined;
}

/** The same for one word-sized prime, in doubles. */
export function reconstructSmall(x: number, p: number): { n: number; d: number } | undefined {
  const bound = Math.floor(Math.sqrt(p / 2));
  let [r0, r1] = [p, x];
  let [s0, s1] = [0, 1];
  while (r1 > bound) {
    const q = Math.floor(r0 / r1);
    [r0, r1] = [r1, r0 - q * r1];
    [s0, s1] = [s1, s0 - q * s1];
  }
  if (s1 === 0 || Math.abs(s1) > bound) return undefined;
  return s1 < 0 ? { n: -r1, d: -s1 } : { n: r1, d: s1 };
}

/** Chinese remainder: the x mod m q with x = a mod m and x = b mod q, q prime, m prime to q. */
export function chineseRemainder(a: bigint, m: bigint, b: number, q: number): bigint {
  const inverse = BigInt(invMod(Number(m % BigInt(q)), q));
  const t = ((((BigInt(b) - a) % BigInt(q)) + BigInt(q)) * inverse) % BigInt(q);
  return a + m * t;
}

/**
 * Rational vectors from their images modulo several primes: reconstructs each entry, or undefined if one fails.
 * The caller checks the result exactly.
 */
export function reconstructVector(images: readonly { p: number; values: Int32Array }[]): Rational[] | undefined {
  const first = images[0];
  if (first === undefined) return undefined;
  const out: Rational[] = [];
  let modulus = 1n;
  for (const { p } of images) modulus *= BigInt(p);
  const bound = isqrt(modulus / 2n);
  for (let i = 0; i < first.values.length; i++) {
    let x = BigInt(first.values[i]!);
    let m = BigInt(first.p);
    for (const { p, values } of images.slice(1)) {
      x = chineseRemainder(x, m, values[i]!, p);
      m *= BigInt(p);
    }
    const r = reconstructRational(x, modulus, bound);
    if (r === undefined) return undefined;
    out.push(r);
  }
  return out;
}

/** Rank of an exact matrix modulo one prime: a lower bound of its rank, equal to it for all but finitely many primes. */
export function rankLowerBound(a: Matrix<Algebraic>, index = 0): number {
  if (!(a.field instanceof RealField)) throw new TypeError(`no reduction for ${a.field.name}`);
  return rankModular(reduceMatrix(a, a.field.reduction(index)));
}
