/**
 * Rational numbers from their images modulo primes. A reconstructed vector is a candidate that the caller checks
 * exactly.
 */
import { invMod, isqrt, type Rational, rational } from '../field/index.ts';

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
