/**
 * Prime fields with p < 2^31: the element operations, and the row kernels of modular elimination.
 * The products use one float quotient and 32-bit wrap-around (branch-free, exact for p < 2^31).
 */
import { factorize, isPrime, powMod } from './arithmetic.ts';
import type { Field } from './field.ts';

/** (y + g v) mod p for g, v, y in [0, p). */
export function mulAddMod(y: number, g: number, v: number, p: number): number {
  const w = (g / p) * (1 - 2 ** -50);
  let r = (Math.imul(g, v) - Math.imul((v * w) | 0, p)) | 0;
  r = (r - p) | 0;
  r += p & (r >> 31);
  r = ((r | 0) - p + y) | 0;
  r += p & (r >> 31);
  return r;
}

/** g v mod p. */
export function mulMod(g: number, v: number, p: number): number {
  return mulAddMod(0, g, v, p);
}

/** row[j] += g * pivot[j] mod p for from <= j < to; offsets a (row) and b (pivot row) into one array. */
export function addRowInPlace(data: Int32Array, a: number, b: number, from: number, to: number, g: number, p: number): void {
  const w = (g / p) * (1 - 2 ** -50);
  for (let j = from; j < to; j++) {
    const v = data[b + j]!;
    if (v === 0) continue;
    let r = (Math.imul(g, v) - Math.imul((v * w) | 0, p)) | 0;
    r = (r - p) | 0;
    r += p & (r >> 31);
    r = ((r | 0) - p + data[a + j]!) | 0;
    r += p & (r >> 31);
    data[a + j] = r;
  }
}

export function invMod(a: number, p: number): number {
  let [r0, r1] = [p, ((a % p) + p) % p];
  let [s0, s1] = [0, 1];
  if (r1 === 0) throw new RangeError('division by zero');
  while (r1 !== 0) {
    const q = Math.floor(r0 / r1);
    [r0, r1] = [r1, r0 - q * r1];
    [s0, s1] = [s1, s0 - q * s1];
  }
  return s0 < 0 ? s0 + p : s0;
}

export function powModInt(a: number, e: number, p: number): number {
  let r = 1;
  while (e > 0) {
    if (e % 2 === 1) r = mulMod(r, a, p);
    a = mulMod(a, a, p);
    e = Math.floor(e / 2);
  }
  return r;
}

/** x mod p in [0, p) for a bigint. */
export function reduceBigint(x: bigint, p: number): number {
  const r = Number(x % BigInt(p));
  return r < 0 ? r + p : r;
}

export class PrimeField implements Field<number> {
  readonly name: string;
  readonly characteristic: number;
  readonly exact = true;
  readonly zero = 0;
  readonly one = 1;
  readonly p: number;
  constructor(p: number) {
    this.p = p;
    this.characteristic = p;
    this.name = `GF(${p})`;
  }
  fromInteger(n: bigint | number): number {
    return reduceBigint(BigInt(n), this.p);
  }
  fromRational(n: bigint, d: bigint): number {
    return mulMod(reduceBigint(n, this.p), invMod(reduceBigint(d, this.p), this.p), this.p);
  }
  add(a: number, b: number): number {
    const r = a + b;
    return r >= this.p ? r - this.p : r;
  }
  sub(a: number, b: number): number {
    const r = a - b;
    return r < 0 ? r + this.p : r;
  }
  mul(a: number, b: number): number {
    return mulMod(a, b, this.p);
  }
  neg(a: number): number {
    return a === 0 ? 0 : this.p - a;
  }
  inv(a: number): number {
    return invMod(a, this.p);
  }
  div(a: number, b: number): number {
    return mulMod(a, invMod(b, this.p), this.p);
  }
  isZero(a: number): boolean {
    return a === 0;
  }
  equal(a: number, b: number): boolean {
    return a === b;
  }
  conj(a: number): number {
    return a;
  }
  format(a: number): string {
    return `${a}`;
  }
  key(a: number): string {
    return `${a}`;
  }
}

/** The index-th prime p = 1 mod n counting down from 2^31 (index 0 is the largest). */
export function primeCongruentToOne(n: number, index = 0): number {
  const top = 2 ** 31 - 1;
  let p = top - ((top - 1) % n);
  for (let found = -1; ; p -= n) {
    if (p < 2) throw new RangeError(`no prime = 1 mod ${n} below 2^31`);
    if (isPrime(p) && ++found === index) return p;
  }
}

/** An element of multiplicative order exactly n in GF(p), p = 1 mod n. */
export function rootOfUnity(n: number, p: number): number {
  const primes = factorize(n).map(([q]) => q);
  for (let g = 2; ; g++) {
    const r = powModInt(g % p, (p - 1) / n, p);
    if (primes.every((q) => powModInt(r, n / q, p) !== 1)) return r;
  }
}

/** A square root of a modulo p, or undefined (Tonelli 1891, Shanks 1973; from memory). */
export function sqrtMod(a: number, p: number): number | undefined {
  if (a === 0) return 0;
  if (powModInt(a, (p - 1) / 2, p) !== 1) return undefined;
  let q = p - 1;
  let s = 0;
  while (q % 2 === 0) {
    q /= 2;
    s++;
  }
  let z = 2;
  while (powModInt(z, (p - 1) / 2, p) === 1) z++;
  let m = s;
  let c = powModInt(z, q, p);
  let t = powModInt(a, q, p);
  let r = Number(powMod(BigInt(a), (BigInt(q) + 1n) / 2n, BigInt(p)));
  while (t !== 1) {
    let i = 0;
    for (let u = t; u !== 1; i++) u = mulMod(u, u, p);
    const b = powModInt(c, 2 ** (m - i - 1), p);
    m = i;
    c = mulMod(b, b, p);
    t = mulMod(t, c, p);
    r = mulMod(r, b, p);
  }
  return r;
}
