/** Fixed-point values of pi and cos(2 pi k/N), to any precision: used to decide exact signs. */

const piCache = new Map<number, bigint>();

/** pi * 2^bits, error below 2 units, by Machin's formula (J. Machin, 1706; from memory). */
export function piFixed(bits: number): bigint {
  const known = piCache.get(bits);
  if (known !== undefined) return known;
  const guard = 16;
  const one = 1n << BigInt(bits + guard);
  const arctanInverse = (x: bigint) => {
    let term = one / x;
    let sum = term;
    for (let n = 3n, sign = -1n; term !== 0n; n += 2n, sign = -sign) {
      term /= x * x;
      sum += (sign * term) / n;
    }
    return sum;
  };
  const value = (4n * (4n * arctanInverse(5n) - arctanInverse(239n))) >> BigInt(guard);
  piCache.set(bits, value);
  return value;
}

/** cos(2 pi k/n) * 2^bits, error below 4 units. */
export function cosFixed(k: number, n: number, bits: number): bigint {
  const guard = 24;
  const b = bits + guard;
  let j = ((k % n) + n) % n;
  if (2 * j > n) j = n - j;
  const negative = 4 * j > n; // reflect to the first quadrant
  const num = negative ? n - 2 * j : 2 * j; // angle = pi * num / n, 0 <= num/n <= 1/2
  const x = (piFixed(b) * BigInt(num)) / BigInt(n);
  const x2 = (x * x) >> BigInt(b);
  let term = 1n << BigInt(b);
  let sum = term;
  for (let i = 1n; term !== 0n; i += 2n) {
    term = -((term * x2) >> BigInt(b)) / (i * (i + 1n));
    sum += term;
  }
  const r = sum >> BigInt(guard);
  return negative ? -r : r;
}
