/** Square-free parts of big integers. */
import { isqrt } from './arithmetic.ts';

/** Square-free kernel and square part of n >= 1: n = free * square^2, with the primes of free. */
export function squareFree(n: bigint): { primes: bigint[]; square: bigint; complete: boolean } {
  const primes: bigint[] = [];
  let square = 1n;
  let complete = true;
  for (let p = 2n; p * p <= n; p += p === 2n ? 1n : 2n) {
    if (p > 1_000_000n) {
      complete = false;
      break;
    }
    let e = 0;
    while (n % p === 0n) {
      n /= p;
      e++;
    }
    square *= p ** BigInt(e >> 1);
    if (e & 1) primes.push(p);
  }
  if (n > 1n) {
    const r = isqrt(n);
    if (r * r === n) square *= r;
    else primes.push(n);
  }
  return { primes, square, complete };
}
