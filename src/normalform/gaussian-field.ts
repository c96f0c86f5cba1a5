/** F(i) for an ordered field F: pairs re + i im. */
import type { Field, OrderedField } from '../field/index.ts';

export interface Gaussian<T> {
  readonly re: T;
  readonly im: T;
}

export class GaussianField<T> implements Field<Gaussian<T>> {
  readonly base: OrderedField<T>;
  readonly name: string;
  readonly characteristic: number;
  readonly exact: boolean;
  readonly zero: Gaussian<T>;
  readonly one: Gaussian<T>;
  readonly i: Gaussian<T>;
  constructor(base: OrderedField<T>) {
    this.base = base;
    this.name = `${base.name}(i)`;
    this.characteristic = base.characteristic;
    this.exact = base.exact;
    this.zero = { re: base.zero, im: base.zero };
    this.one = { re: base.one, im: base.zero };
    this.i = { re: base.zero, im: base.one };
  }
  real(x: T): Gaussian<T> {
    return { re: x, im: this.base.zero };
  }
  fromInteger(n: bigint | number): Gaussian<T> {
    return this.real(this.base.fromInteger(n));
  }
  fromRational(n: bigint, d: bigint): Gaussian<T> {
    return this.real(this.base.fromRational(n, d));
  }
  add(a: Gaussian<T>, b: Gaussian<T>): Gaussian<T> {
    return { re: this.base.add(a.re, b.re), im: this.base.add(a.im, b.im) };
  }
  sub(a: Gaussian<T>, b: Gaussian<T>): Gaussian<T> {
    return { re: this.base.sub(a.re, b.re), im: this.base.sub(a.im, b.im) };
  }
  mul(a: Gaussian<T>, b: Gaussian<T>): Gaussian<T> {
    const f = this.base;
    const ra = f.isZero(a.im);
    const rb = f.isZero(b.im);
    if (ra && rb) return { re: f.mul(a.re, b.re), im: f.zero };
    if (ra) return { re: f.mul(a.re, b.re), im: f.mul(a.re, b.im) };
    if (rb) return { re: f.mul(a.re, b.re), im: f.mul(a.im, b.re) };
    if (f.isZero(a.re)) return { re: f.neg(f.mul(a.im, b.im)), im: f.mul(a.im, b.re) };
    if (f.isZero(b.re)) return { re: f.neg(f.mul(a.im, b.im)), im: f.mul(a.re, b.im) };
    return { re: f.sub(f.mul(a.re, b.re), f.mul(a.im, b.im)), im: f.add(f.mul(a.re, b.im), f.mul(a.im, b.re)) };
  }
  neg(a: Gaussian<T>): Gaussian<T> {
    return { re: this.base.neg(a.re), im: this.base.neg(a.im) };
  }
  inv(a: Gaussian<T>): Gaussian<T> {
    const f = this.base;
    const n = f.add(f.mul(a.re, a.re), f.mul(a.im, a.im));
    return { re: f.div(a.re, n), im: f.neg(f.div(a.im, n)) };
  }
  div(a: Gaussian<T>, b: Gaussian<T>): Gaussian<T> {
    return this.mul(a, this.inv(b));
  }
  isZero(a: Gaussian<T>): boolean {
    return this.base.isZero(a.re) && this.base.isZero(a.im);
  }
  equal(a: Gaussian<T>, b: Gaussian<T>): boolean {
    return this.base.equal(a.re, b.re) && this.base.equal(a.im, b.im);
  }
  conj(a: Gaussian<T>): Gaussian<T> {
    return { re: a.re, im: this.base.neg(a.im) };
  }
  format(a: Gaussian<T>): string {
    const f = this.base;
    if (f.isZero(a.im)) return f.format(a.re);
    const imaginary = f.equal(a.im, f.one) ? 'i' : f.equal(a.im, f.neg(f.one)) ? '-i' : `(${f.format(a.im)})*i`;
    return f.isZero(a.re) ? imaginary : `${f.format(a.re)} + ${imaginary}`;
  }
  key(a: Gaussian<T>): string {
    return `${this.base.key(a.re)} ${this.base.key(a.im)}`;
  }
}
