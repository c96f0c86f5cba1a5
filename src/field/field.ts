/**
 * The Field contract. Generic routines take a field as a value and use nothing outside it.
 * Elements are immutable; every operation returns a canonical element, so `key` is injective.
 */

/** A commutative field whose elements have type T. */
export interface Field<T> {
  /** For display and for error messages, e.g. `Q`, `Q(zeta_12)`, `GF(2147483629)`. */
  readonly name: string;
  /** 0 or a prime. */
  readonly characteristic: number;
  /** False only for floating point. */
  readonly exact: boolean;
  readonly zero: T;
  readonly one: T;
  fromInteger(n: bigint | number): T;
  /** n/d; throws RangeError if d is zero in the field. */
  fromRational(n: bigint, d: bigint): T;
  add(a: T, b: T): T;
  sub(a: T, b: T): T;
  mul(a: T, b: T): T;
  neg(a: T): T;
  /** Throws RangeError on zero. */
  inv(a: T): T;
  /** a/b; throws RangeError if b is zero. */
  div(a: T, b: T): T;
  isZero(a: T): boolean;
  equal(a: T, b: T): boolean;
  /** Complex conjugation; the identity in real and in finite fields. */
  conj(a: T): T;
  /** In the language of model files, e.g. `-1/3`, `sqrt(3)/2`, `2*cos(2*pi/7) - 1`. */
  format(a: T): string;
  /** Canonical text, for maps and sets. */
  key(a: T): string;
}

/** A field with a chosen embedding into the real numbers. */
export interface OrderedField<T> extends Field<T> {
  /** Exact sign: -1, 0 or 1. */
  sign(a: T): -1 | 0 | 1;
  /** Nearest double, up to a few units in the last place. */
  toNumber(a: T): number;
  compare(a: T, b: T): -1 | 0 | 1;
  /** In LaTeX, without dollars. */
  latex(a: T): string;
}
