/**
 * Dense univariate polynomials over a field: coefficients by exponent, no trailing zero, [] is zero. Division,
 * greatest common divisor, square-free factorisation (Yun 1976), Sturm sequences (Sturm 1829) and isolation of
 * real roots over an ordered field, refined by bisection to any number of digits (both from memory).
 */
import type { Field, OrderedField, Rational } from '../field/index.ts';
import { rational, rationals } from '../field/index.ts';

export type Univariate<T> = readonly T[];

export class UnivariateRing<T> {
  readonly field: Field<T>;
  constructor(field: Field<T>) {
    this.field = field;
  }
  /** Without trailing zeros. */
  trim(a: readonly T[]): Univariate<T> {
    let n = a.length;
    while (n > 0 && this.field.isZero(a[n - 1]!)) n--;
    return n === a.length ? a : a.slice(0, n);
  }
  /** -1 for zero. */
  degree(a: Univariate<T>): number {
    return a.length - 1;
  }
  add(a: Univariate<T>, b: Univariate<T>): Univariate<T> {
    const f = this.field;
    return this.trim(Array.from({ length: Math.max(a.length, b.length) }, (_, i) => f.add(a[i] ?? f.zero, b[i] ?? f.zero)));
  }
  neg(a: Univariate<T>): Univariate<T> {
    return a.map((c) => this.field.neg(c));
  }
  sub(a: Univariate<T>, b: Univariate<T>): Univariate<T> {
    return this.add(a, this.neg(b));
  }
  scale(a: Univariate<T>, s: T): Univariate<T> {
    return this.trim(a.map((c) => this.field.mul(s, c)));
  }
  mul(a: Univariate<T>, b: Univariate<T>): Univariate<T> {
    if (a.length === 0 || b.length === 0) return [];
    const f = this.field;
    const out = new Array<T>(a.length + b.length - 1).fill(f.zero);
    a.forEach((x, i) => {
      if (f.isZero(x)) return;
      b.forEach((y, j) => {
        out[i + j] = f.add(out[i + j]!, f.mul(x, y));
      });
    });
    return this.trim(out);
  }
  power(a: Univariate<T>, n: number): Univariate<T> {
    let out: Univariate<T> = [this.field.one];
    for (let k = 0; k < n; k++) out = this.mul(out, a);
    return out;
  }
  /** Quotient and remainder. Throws RangeError if b is zero. */
  divide(a: Univariate<T>, b: Univariate<T>): { quotient: Univariate<T>; remainder: Univariate<T> } {
    const f = this.field;
    if (b.length === 0) throw new RangeError('division by the zero polynomial');
    const r = a.slice();
    const inverse = f.inv(b.at(-1)!);
    const quotient = new Array<T>(Math.max(0, a.length - b.length + 1)).fill(f.zero);
    for (let d = a.length - b.length; d >= 0; d--) {
      const g = f.mul(r[d + b.length - 1]!, inverse);
      if (f.isZero(g)) continue;
      quotient[d] = g;
      for (let j = 0; j < b.length; j++) r[d + j] = f.sub(r[d + j]!, f.mul(g, b[j]!));
    }
    return { quotient: this.trim(quotient), remainder: this.trim(r.slice(0, Math.min(a.length, b.length - 1))) };
  }
  monic(a: Univariate<T>): Univariate<T> {
    return a.length === 0 ? a : this.scale(a, this.field.inv(a.at(-1)!));
  }
  /** Monic; gcd(0, 0) = 0. */
  gcd(a: Univariate<T>, b: Univariate<T>): Univariate<T> {
    let x = this.monic(a);
    let y = this.monic(b);
    while (y.length > 0) [x, y] = [y, this.monic(this.divide(x, y).remainder)];
    return x;
  }
  derivative(a: Univariate<T>): Univariate<T> {
    return this.trim(a.slice(1).map((c, i) => this.field.mul(this.field.fromInteger(i + 1), c)));
  }
  evaluate(a: Univariate<T>, x: T): T {
    const f = this.field;
    let v = f.zero;
    for (let i = a.length - 1; i >= 0; i--) v = f.add(f.mul(v, x), a[i]!);
    return v;
  }
  equal(a: Univariate<T>, b: Univariate<T>): boolean {
    return a.length === b.length && a.every((c, i) => this.field.equal(c, b[i]!));
  }
  /** Monic pairwise coprime square-free factors with multiplicities; constants dropped. Characteristic 0. */
  squareFree(a: Univariate<T>): Array<{ factor: Univariate<T>; multiplicity: number }> {
    const out: Array<{ factor: Univariate<T>; multiplicity: number }> = [];
    if (a.length <= 1) return out;
    const da = this.derivative(a);
    const g = this.gcd(a, da);
    let b = this.divide(a, g).quotient;
    let d = this.sub(this.divide(da, g).quotient, this.derivative(b));
    for (let multiplicity = 1; b.length > 1; multiplicity++) {
      const factor = this.gcd(b, d);
      if (factor.length > 1) out.push({ factor, multiplicity });
      b = this.divide(b, factor).quotient;
      d = this.sub(this.divide(d, factor).quotient, this.derivative(b));
    }
    return out;
  }
}

/** A real root: inside the open interval (low, high), or exactly `exact`. */
export interface RealRoot {
  readonly low: Rational;
  readonly high: Rational;
  readonly exact: Rational | undefined;
  readonly multiplicity: number;
}

/** Real roots over an ordered field with exact sign. */
export class RealRoots<T> {
  readonly ring: UnivariateRing<T>;
  readonly #field: OrderedField<T>;
  constructor(field: OrderedField<T>) {
    this.#field = field;
    this.ring = new UnivariateRing(field);
  }
  /** Sturm's sequence of a square-free polynomial. */
  sturmSequence(a: Univariate<T>): Univariate<T>[] {
    const out = [a, this.ring.derivative(a)];
    while (out.at(-1)!.length > 1) {
      const r = this.ring.neg(this.ring.divide(out.at(-2)!, out.at(-1)!).remainder);
      if (r.length === 0) break;
      // a positive factor changes no sign: keep coefficients small
      const lead = r.at(-1)!;
      const size = this.#field.sign(lead) > 0 ? lead : this.#field.neg(lead);
      out.push(this.ring.scale(r, this.#field.inv(size)));
    }
    return out.filter((p) => p.length > 0);
  }
  /** Number of sign changes at x. */
  variations(sequence: readonly Univariate<T>[], x: Rational): number {
    return changes(sequence.map((p) => this.signAt(p, x)));
  }
  /** Sign of a(x). */
  signAt(a: Univariate<T>, x: Rational): -1 | 0 | 1 {
    return this.#field.sign(this.ring.evaluate(a, this.#field.fromRational(x.n, x.d)));
  }
  /** Number of distinct real roots in (low, high]; ends at infinity by default. a square-free. */
  count(a: Univariate<T>, low?: Rational, high?: Rational): number {
    if (a.length <= 1) return 0;
    const sequence = this.sturmSequence(a);
    const end = (sign: number) => changes(sequence.map((p) => (sign < 0 && p.length % 2 === 0 ? -1 : 1) * this.#field.sign(p.at(-1)!)));
    return (low === undefined ? end(-1) : this.variations(sequence, low)) - (high === undefined ? end(1) : this.variations(sequence, high));
  }
  /** A power of two above the size of every root (Cauchy's bound). */
  bound(a: Univariate<T>): Rational {
    const f = this.#field;
    const lead = Math.abs(f.toNumber(a.at(-1)!));
    const largest = Math.max(0, ...a.slice(0, -1).map((c) => Math.abs(f.toNumber(c))));
    const ratio = (largest / lead) * 1.001 + 1.001;
    return rational(1n << BigInt(Math.max(1, Math.ceil(Math.log2(ratio)) + 1)));
  }
  /** All real roots in increasing order, in disjoint intervals. Throws RangeError for the zero polynomial. */
  isolate(a: Univariate<T>): RealRoot[] {
    const p = this.ring.trim(a);
    if (p.length === 0) throw new RangeError('every number is a root of the zero polynomial');
    let roots: Array<RealRoot & { factor: Univariate<T> }> = [];
    for (const { factor, multiplicity } of this.ring.squareFree(p)) {
      const sequence = this.sturmSequence(factor);
      const b = this.bound(factor);
      const push = (low: Rational, high: Rational, exact?: Rational) => roots.push({ low, high, exact, multiplicity, factor });
      const split = (low: Rational, high: Rational, vl: number, vh: number) => {
        // roots in (low, high]
        if (vl === vh) return;
        if (vl - vh === 1) {
          if (this.signAt(factor, high) === 0) push(high, high, high);
          else push(low, high);
          return;
        }
        const mid = half(low, high);
        const vm = this.variations(sequence, mid);
        split(low, mid, vl, vm);
        split(mid, high, vm, vh);
      };
      const low = rationals.neg(b);
      split(low, b, this.variations(sequence, low), this.variations(sequence, b));
    }
    // intervals of different factors may overlap: refine until they do not
    for (let clash = true; clash; ) {
      clash = false;
      roots.sort((x, y) => rationals.compare(rationals.add(x.low, x.high), rationals.add(y.low, y.high)));
      for (let i = 0; i + 1 < roots.length; i++) {
        const x = roots[i]!;
        const y = roots[i + 1]!;
        if (rationals.compare(x.high, y.low) < 0 || (rationals.equal(x.high, y.low) && !(x.exact && y.exact))) continue;
        roots = roots.map((r, j) => (j === i || j === i + 1 ? { ...this.#bisect(r.factor, r), factor: r.factor } : r));
        clash = true;
        break;
      }
    }
    return roots.map(({ low, high, exact, multiplicity }) => ({ low, high, exact, multiplicity }));
  }
  #bisect(factor: Univariate<T>, root: RealRoot): RealRoot {
    if (root.exact !== undefined) return root;
    const mid = half(root.low, root.high);
    const s = this.signAt(factor, mid);
    if (s === 0) return { ...root, low: mid, high: mid, exact: mid };
    // exactly one simple root inside: the sign just right of low is minus the sign just left of high
    const right = this.signAt(factor, root.high);
    return s === right ? { ...root, high: mid } : { ...root, low: mid };
  }
  /** The root of a within its isolating interval, narrowed below 10^-digits (absolute). */
  refine(a: Univariate<T>, root: RealRoot, digits = 30): RealRoot {
    const factor = this.ring.squareFree(this.ring.trim(a)).find((s) => s.multiplicity === root.multiplicity)!.factor;
    const width = rational(1n, 10n ** BigInt(digits));
    while (root.exact === undefined && rationals.compare(rationals.sub(root.high, root.low), width) > 0) root = this.#bisect(factor, root);
    return root;
  }
}

/** Digits of a root narrowed by `refine`, rounded to `digits` places. */
export function formatRoot(root: RealRoot, digits = 30): string {
  const mid = root.exact ?? half(root.low, root.high);
  const scale = 10n ** BigInt(digits);
  const negative = mid.n < 0n;
  const n = negative ? -mid.n : mid.n;
  const rounded = (2n * n * scale + mid.d) / (2n * mid.d);
  const text = `${rounded}`.padStart(digits + 1, '0');
  return `${negative && rounded !== 0n ? '-' : ''}${text.slice(0, text.length - digits)}${digits === 0 ? '' : `.${text.slice(-digits)}`}`;
}

function half(a: Rational, b: Rational): Rational {
  return rational(a.n * b.d + b.n * a.d, 2n * a.d * b.d);
}
function changes(signs: readonly number[]): number {
  let last = 0;
  let n = 0;
  for (const s of signs) {
    if (s === 0) continue;
    if (last !== 0 && s !== last) n++;
    last = s;
  }
  return n;
}
