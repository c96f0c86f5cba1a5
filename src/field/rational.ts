/** The rational numbers as reduced fractions of bigints. */
import type { OrderedField } from './field.ts';

/** n/d with d > 0 and gcd(n, d) = 1. */
export interface Rational {
  readonly n: bigint;
  readonly d: bigint;
}

const ZERO: Rational = { n: 0n, d: 1n };
const ONE: Rational = { n: 1n, d: 1n };
const SMALL = 1n << 53n;

/** Greatest common divisor, non-negative. */
export function gcd(a: bigint, b: bigint): bigint {
  if (a < 0n) a = -a;
  if (b < 0n) b = -b;
  if (a < SMALL && b < SMALL) {
    let x = Number(a);
    let y = Number(b);
    while (y !== 0) [x, y] = [y, x % y];
    return BigInt(x);
  }
  while (b !== 0n) [a, b] = [b, a % b];
  return a;
}

/** Reduced n/d. Throws RangeError if d = 0. */
export function rational(n: bigint, d: bigint = 1n): Rational {
  if (d === 0n) throw new RangeError('division by zero');
  if (n === 0n) return ZERO;
  if (d < 0n) {
    n = -n;
    d = -d;
  }
  if (d === 1n) return { n, d };
  const g = gcd(n, d);
  return g === 1n ? { n, d } : { n: n / g, d: d / g };
}

/** The double nearest to n/d, also where n or d exceed the range of doubles. */
export function ratioToNumber(n: bigint, d: bigint): number {
  const negative = n < 0n;
  const a = negative ? -n : n;
  const bits = (x: bigint) => x.toString(16).length * 4;
  const shift = bits(a) - bits(d);
  if (Math.max(bits(a), bits(d)) < 1000 && shift < 900 && a < SMALL && d < SMALL) return Number(n) / Number(d);
  const up = 70 - shift;
  const q = up >= 0 ? (a << BigInt(up)) / d : a / (d << BigInt(-up));
  const value = Number(q) * 2 ** -up;
  return negative ? -value : value;
}

/** Q, with its embedding into R. */
export const rationals: OrderedField<Rational> = {
  name: 'Q',
  characteristic: 0,
  exact: true,
  zero: ZERO,
  one: ONE,
  fromInteger: (n) => ({ n: BigInt(n), d: 1n }),
  fromRational: rational,
  add: (a, b) => {
    if (a.n === 0n) return b;
    if (b.n === 0n) return a;
    if (a.d === 1n && b.d === 1n) return { n: a.n + b.n, d: 1n };
    return a.d === b.d ? rational(a.n + b.n, a.d) : rational(a.n * b.d + b.n * a.d, a.d * b.d);
  },
  sub: (a, b) => {
    if (b.n === 0n) return a;
    if (a.d === 1n && b.d === 1n) return { n: a.n - b.n, d: 1n };
    return rational(a.n * b.d - b.n * a.d, a.d * b.d);
  },
  mul: (a, b) => {
    if (a.n === 0n || b.n === 0n) return ZERO;
    if (a.d === 1n && b.d === 1n) return { n: a.n * b.n, d: 1n };
    return rational(a.n * b.n, a.d * b.d);
  },
  neg: (a) => ({ n: -a.n, d: a.d }),
  inv: (a) => rational(a.d, a.n),
  div: (a, b) => rational(a.n * b.d, a.d * b.n),
  isZero: (a) => a.n === 0n,
  equal: (a, b) => a.n === b.n && a.d === b.d,
  conj: (a) => a,
  format: (a) => (a.d === 1n ? `${a.n}` : `${a.n}/${a.d}`),
  key: (a) => (a.d === 1n ? `${a.n}` : `${a.n}/${a.d}`),
  sign: (a) => (a.n > 0n ? 1 : a.n < 0n ? -1 : 0),
  toNumber: (a) => ratioToNumber(a.n, a.d),
  compare: (a, b) => {
    const c = a.n * b.d - b.n * a.d;
    return c > 0n ? 1 : c < 0n ? -1 : 0;
  },
  latex: (a) => (a.d === 1n ? `${a.n}` : `${a.n < 0n ? '-' : ''}\\tfrac{${a.n < 0n ? -a.n : a.n}}{${a.d}}`),
};
