/**
 * Abelian number fields: the arithmetic shared by the real fields that models live in and by the
 * cyclotomic fields that characters live in. An element is an integer vector over a fixed integral
 * basis with one common denominator; the first basis element is 1.
 */
import type { Field } from './field.ts';
import { gcd, type Rational } from './rational.ts';

/** (c[0] b_0 + … + c[n-1] b_{n-1}) / d with b_0 = 1, d > 0, gcd(d, c…) = 1; zero has d = 1. */
export interface Algebraic {
  readonly c: readonly bigint[];
  readonly d: bigint;
}

export abstract class AbelianField implements Field<Algebraic> {
  abstract readonly name: string;
  readonly characteristic = 0;
  readonly exact = true;
  readonly degree: number;
  readonly zero: Algebraic;
  readonly one: Algebraic;

  protected constructor(degree: number) {
    this.degree = degree;
    const zeros = new Array<bigint>(degree).fill(0n);
    this.zero = { c: zeros, d: 1n };
    this.one = { c: [1n, ...zeros.slice(1)], d: 1n };
  }

  /** Product of two integer vectors over the basis. */
  protected abstract product(a: readonly bigint[], b: readonly bigint[]): bigint[];
  /** Number of automorphisms, the identity being number 0; equals the degree. */
  abstract automorphism(index: number, a: Algebraic): Algebraic;
  abstract conj(a: Algebraic): Algebraic;
  abstract format(a: Algebraic): string;

  /** Canonical element from a vector and a denominator. Throws RangeError if d = 0. */
  element(c: readonly bigint[], d: bigint): Algebraic {
    if (d === 0n) throw new RangeError('division by zero');
    let g = d < 0n ? -d : d;
    for (let i = 0; i < c.length && g !== 1n; i++) if (c[i] !== 0n) g = gcd(g, c[i]!);
    let zero = true;
    for (const x of c)
      if (x !== 0n) {
        zero = false;
        break;
      }
    if (zero) return this.zero;
    if (d < 0n) g = -g;
    if (g === 1n) return { c, d };
    return { c: c.map((x) => x / g), d: d / g };
  }

  fromInteger(n: bigint | number): Algebraic {
    const c = this.zero.c.slice();
    c[0] = BigInt(n);
    return { c, d: 1n };
  }
  fromRational(n: bigint, d: bigint): Algebraic {
    const c = this.zero.c.slice();
    c[0] = n;
    return this.element(c, d);
  }
  /** The rational value, or undefined if a is irrational. */
  toRational(a: Algebraic): Rational | undefined {
    for (let i = 1; i < a.c.length; i++) if (a.c[i] !== 0n) return undefined;
    return { n: a.c[0]!, d: a.d };
  }
  add(a: Algebraic, b: Algebraic): Algebraic {
    if (this.degree === 1) {
      const x = a.c[0]!;
      const y = b.c[0]!;
      if (x === 0n) return b;
      if (y === 0n) return a;
      if (a.d === 1n && b.d === 1n) return { c: [x + y], d: 1n };
      return a.d === b.d ? this.element([x + y], a.d) : this.element([x * b.d + y * a.d], a.d * b.d);
    }
    if (this.isZero(a)) return b;
    if (this.isZero(b)) return a;
    if (a.d === b.d) {
      const c = a.c.map((x, i) => x + b.c[i]!);
      return a.d === 1n ? { c, d: 1n } : this.element(c, a.d);
    }
    return this.element(
      a.c.map((x, i) => x * b.d + b.c[i]! * a.d),
      a.d * b.d,
    );
  }
  sub(a: Algebraic, b: Algebraic): Algebraic {
    return this.add(a, this.neg(b));
  }
  neg(a: Algebraic): Algebraic {
    return { c: a.c.map((x) => -x), d: a.d };
  }
  mul(a: Algebraic, b: Algebraic): Algebraic {
    if (this.degree === 1) {
      const x = a.c[0]!;
      const y = b.c[0]!;
      if (x === 0n || y === 0n) return this.zero;
      if (a.d === 1n && b.d === 1n) return { c: [x * y], d: 1n };
      return this.element([x * y], a.d * b.d);
    }
    if (a === this.one) return b;
    if (b === this.one) return a;
    const c = this.product(a.c, b.c);
    if (a.d === 1n && b.d === 1n) return { c, d: 1n };
    return this.element(c, a.d * b.d);
  }
  inv(a: Algebraic): Algebraic {
    const r = this.toRational(a);
    if (r !== undefined) {
      if (r.n === 0n) throw new RangeError('division by zero');
      return this.fromRational(r.d, r.n);
    }
    // The product of the other conjugates, over the norm (rational because the field is abelian over Q).
    let others = this.automorphism(1, a);
    for (let i = 2; i < this.degree; i++) others = this.mul(others, this.automorphism(i, a));
    const norm = this.toRational(this.mul(others, a));
    if (norm === undefined) throw new Error(`the norm in ${this.name} is not rational`);
    return this.element(
      others.c.map((x) => x * norm.d),
      others.d * norm.n,
    );
  }
  div(a: Algebraic, b: Algebraic): Algebraic {
    return this.mul(a, this.inv(b));
  }
  isZero(a: Algebraic): boolean {
    for (let i = 0; i < a.c.length; i++) if (a.c[i] !== 0n) return false;
    return true;
  }
  equal(a: Algebraic, b: Algebraic): boolean {
    if (a.d !== b.d) return false;
    for (let i = 0; i < a.c.length; i++) if (a.c[i] !== b.c[i]) return false;
    return true;
  }
  key(a: Algebraic): string {
    if (this.degree === 1) return a.d === 1n ? `${a.c[0]}` : `${a.c[0]}/${a.d}`;
    return a.d === 1n ? a.c.join(',') : `${a.c.join(',')}/${a.d}`;
  }
}
