/** Integers as products of powers, by trial division. */
import { isqrt, ratioToNumber } from '../../field/index.ts';

/** Bits of n >= 0, up to three too many. */
export const bits = (n: bigint): number => n.toString(16).length * 4;

/** log p, also for p beyond the range of doubles. */
export function logOf(p: bigint): number {
  const shift = Math.max(0, bits(p) - 64);
  return Math.log(ratioToNumber(p >> BigInt(shift), 1n)) + shift * Math.LN2;
}

/** Trial division up to these bounds, for numbers below and above 2^53; what remains counts as one prime (or a square). */
const SMALL_BOUND = 1_000_000;
const LARGE_BOUND = 20_000;

/** n >= 1 as a product of powers of pairwise coprime bases, primes where they are small. */
export function primePowers(n: bigint): Array<readonly [base: bigint, exponent: number]> {
  const out: Array<readonly [bigint, number]> = [];
  for (let p = 2; n > 1n; p += p === 2 ? 1 : 2) {
    if (n < 9007199254740992n) {
      let m = Number(n);
      for (; p * p <= m && p < SMALL_BOUND; p += p === 2 ? 1 : 2) {
        let e = 0;
        while (m % p === 0) {
          m /= p;
          e++;
        }
        if (e > 0) out.push([BigInt(p), e]);
      }
      n = BigInt(m);
      break;
    }
    if (p > LARGE_BOUND) break;
    const b = BigInt(p);
    let e = 0;
    while (n % b === 0n) {
      n /= b;
      e++;
    }
    if (e > 0) out.push([b, e]);
  }
  if (n > 1n) {
    const root = isqrt(n);
    if (root * root === n) out.push([root, 2]);
    else out.push([n, 1]);
  }
  return out;
}
