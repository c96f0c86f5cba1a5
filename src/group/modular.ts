/**
 * Row arithmetic modulo a small prime on doubles: products of two residues stay below 2^53, so sums
 * of several are reduced once. Used for the class algebra, where primes have 9 to 22 bits.
 */

/** x mod p for 0 <= x < 2^53. */
export function reduce(x: number, p: number): number {
  const r = x - Math.floor(x / p) * p;
  return r < 0 ? r + p : r >= p ? r - p : r;
}

/** Reduces every entry of a vector of non-negative integers below 2^53. */
export function reduceInPlace(v: Float64Array, p: number): void {
  const inverse = 1 / p;
  for (let i = 0; i < v.length; i++) {
    const x = v[i]!;
    let r = x - Math.floor(x * inverse) * p;
    if (r < 0) r += p;
    else if (r >= p) r -= p;
    v[i] = r;
  }
}

/** x A for a row x and rows A (each of length `width`), modulo p. */
export function rowTimes(x: ArrayLike<number>, rows: readonly Float64Array[], width: number, p: number): Float64Array {
  const out = new Float64Array(width);
  const chunk = Math.max(1, Math.floor((2 ** 53 - 1 - p) / (p * p)));
  let pending = 0;
  for (let i = 0; i < rows.length; i++) {
    const f = x[i]!;
    if (f === 0) continue;
    const row = rows[i]!;
    for (let j = 0; j < width; j++) out[j] = out[j]! + f * row[j]!;
    if (++pending === chunk) {
      reduceInPlace(out, p);
      pending = 0;
    }
  }
  reduceInPlace(out, p);
  return out;
}

export function scaleInPlace(v: Float64Array, f: number, p: number): void {
  for (let i = 0; i < v.length; i++) v[i] = v[i]! * f;
  reduceInPlace(v, p);
}

/** v - f w modulo p, written into v; f in [0, p). */
export function subtractInPlace(v: Float64Array, f: number, w: Float64Array, p: number): void {
  if (f === 0) return;
  const g = p - f;
  for (let i = 0; i < v.length; i++) v[i] = v[i]! + g * w[i]!;
  reduceInPlace(v, p);
}

/** The inverse of a modulo p, by Euclid's algorithm. */
export function inverseModulo(a: number, p: number): number {
  let [r0, r1, s0, s1] = [p, a, 0, 1];
  while (r1 !== 0) {
    const q = Math.floor(r0 / r1);
    [r0, r1, s0, s1] = [r1, r0 - q * r1, s1, s0 - q * s1];
  }
  return s0 < 0 ? s0 + p : s0;
}

/** Powers 1, z, …, z^{n-1} modulo p. */
export function powersModulo(z: number, n: number, p: number): Float64Array {
  const out = new Float64Array(n);
  for (let k = 0, x = 1; k < n; k++, x = reduce(x * z, p)) out[k] = x;
  return out;
}

/** Reproducible residues (Lehmer generator with multiplier 48271, from memory). */
export function residueSource(seed: number, p: number): () => number {
  let s = seed;
  return () => {
    s = (s * 48271) % 2147483647;
    return s % p;
  };
}
