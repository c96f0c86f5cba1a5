/**
 * Power series in few variables cut off at a degree, as dense arrays of coefficients with a table of products. In doubles the
 * arrays are typed; other fields use the same loops over their own elements and skip zeros.
 */
import type { Field } from '../field/index.ts';
import { type Monomial, monomialsOfDegree, type Polynomial, type PolynomialRing } from '../polynomial/index.ts';

/** Coefficients by the order of `SeriesAlgebra.monomials`. */
export type DenseSeries<T> = T[];

export class SeriesAlgebra<T> {
  readonly field: Field<T>;
  readonly degree: number;
  readonly monomials: readonly Monomial[];
  /** offsets[d] is the place of the first monomial of degree d. */
  readonly offsets: readonly number[];
  readonly #table: Int32Array;
  readonly #degreeOf: Uint8Array;
  readonly #float: boolean;

  constructor(field: Field<T>, variables: number, degree: number) {
    this.field = field;
    this.degree = degree;
    const monomials: Monomial[] = [];
    const offsets: number[] = [];
    for (let d = 0; d <= degree; d++) {
      offsets.push(monomials.length);
      for (const m of d === 0 ? [''] : monomialsOfDegree(variables, d)) monomials.push(m);
    }
    offsets.push(monomials.length);
    this.monomials = monomials;
    this.offsets = offsets;
    this.#float = !field.exact && typeof field.zero === 'number';
    const count = monomials.length;
    const weights = Array.from({ length: variables }, (_, v) => (degree + 1) ** v);
    const codes = Float64Array.from(monomials, (m) => {
      let s = 0;
      for (let i = 0; i < m.length; i++) s += weights[m.charCodeAt(i)]!;
      return s;
    });
    const places = new Map<number, number>();
    for (let i = 0; i < count; i++) places.set(codes[i]!, i);
    this.#degreeOf = Uint8Array.from(monomials, (m) => m.length);
    this.#table = new Int32Array(count * count);
    for (let i = 0; i < count; i++) {
      const end = offsets[degree - this.#degreeOf[i]! + 1]!;
      for (let j = 0; j < end; j++) this.#table[i * count + j] = places.get(codes[i]! + codes[j]!)!;
    }
  }
  static fits(variables: number, degree: number): boolean {
    let count = 1;
    for (let i = 1; i <= variables; i++) count = (count * (degree + i)) / i;
    return count <= 300 && (degree + 1) ** variables < 2 ** 53;
  }
  get zero(): DenseSeries<T> {
    return new Array<T>(this.monomials.length).fill(this.field.zero);
  }
  isZero(a: DenseSeries<T>): boolean {
    return a.every((x) => this.field.isZero(x));
  }
  linear(coefficients: readonly T[]): DenseSeries<T> {
    const out = this.zero;
    coefficients.forEach((c, i) => {
      out[1 + i] = c;
    });
    return out;
  }
  term(m: Monomial, c: T): DenseSeries<T> {
    const out = this.zero;
    const at = this.monomials.indexOf(m);
    if (at >= 0) out[at] = c;
    return out;
  }
  /** out += c a. */
  addScaledInPlace(out: DenseSeries<T>, a: DenseSeries<T>, c: T): void {
    if (this.#float) {
      const [o, x, s] = [out as number[], a as number[], c as number];
      for (let i = 0; i < o.length; i++) o[i]! += s * x[i]!;
      return;
    }
    const f = this.field;
    const plain = c === f.one;
    a.forEach((x, i) => {
      if (f.isZero(x)) return;
      const t = plain ? x : f.mul(c, x);
      out[i] = f.isZero(out[i]!) ? t : f.add(out[i]!, t);
    });
  }
  /** Product up to degree `limit`. */
  multiply(a: DenseSeries<T>, b: DenseSeries<T>, limit = this.degree): DenseSeries<T> {
    const out = this.zero;
    const count = out.length;
    const table = this.#table;
    const end = this.offsets[limit + 1]!;
    if (this.#float) {
      const [o, x, y] = [out as number[], a as number[], b as number[]];
      for (let i = 0; i < end; i++) {
        const s = x[i]!;
        if (s === 0) continue;
        const to = this.offsets[limit - this.#degreeOf[i]! + 1]!;
        for (let j = 0; j < to; j++) o[table[i * count + j]!]! += s * y[j]!;
      }
      return out;
    }
    const f = this.field;
    for (let i = 0; i < end; i++) {
      const s = a[i]!;
      if (f.isZero(s)) continue;
      const to = this.offsets[limit - this.#degreeOf[i]! + 1]!;
      for (let j = 0; j < to; j++) {
        const t = b[j]!;
        if (f.isZero(t)) continue;
        const k = table[i * count + j]!;
        const product = f.mul(s, t);
        out[k] = f.isZero(out[k]!) ? product : f.add(out[k]!, product);
      }
    }
    return out;
  }
  /** Only the terms of degree d. */
  part(a: DenseSeries<T>, d: number): DenseSeries<T> {
    const out = this.zero;
    for (let i = this.offsets[d]!; i < this.offsets[d + 1]!; i++) out[i] = a[i]!;
    return out;
  }
  /** The value of a polynomial at series, by Horner's rule on the tree of its monomials. */
  evaluate(p: Polynomial<T>, at: readonly DenseSeries<T>[], limit = this.degree): DenseSeries<T> {
    const f = this.field;
    const order = Array.from(p.monomials.keys()).sort((x, y) => (p.monomials[x]! < p.monomials[y]! ? -1 : 1));
    const below = (from: number, to: number, depth: number): DenseSeries<T> => {
      const out = this.zero;
      let i = from;
      if (i < to && p.monomials[order[i]!]!.length === depth) out[0] = p.coefficients[order[i++]!]!;
      while (i < to) {
        const v = p.monomials[order[i]!]!.charCodeAt(depth);
        let j = i + 1;
        while (j < to && p.monomials[order[j]!]!.charCodeAt(depth) === v) j++;
        // a single variable is added, not multiplied
        const only = j === i + 1 && p.monomials[order[i]!]!.length === depth + 1;
        if (only) this.addScaledInPlace(out, at[v]!, p.coefficients[order[i]!]!);
        else this.addScaledInPlace(out, this.multiply(at[v]!, below(i, j, depth + 1), limit), f.one);
        i = j;
      }
      return out;
    };
    return below(0, order.length, 0);
  }
  toPolynomial(a: DenseSeries<T>, ring: PolynomialRing<T>): Polynomial<T> {
    return ring.fromTerms(a.flatMap((c, i) => (this.field.isZero(c) ? [] : [[this.monomials[i]!, c] as const])));
  }
}
