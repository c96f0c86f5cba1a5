/** The two ways in which series are held while H is composed with them: dense for few variables, sparse otherwise. */

import type { Field } from '../field/index.ts';
import type { Polynomial, PolynomialRing } from '../polynomial/index.ts';
import { type DenseSeries, SeriesAlgebra } from './truncated-series.ts';

export interface Composer<T, S> {
  readonly zero: S;
  isZero(a: S): boolean;
  linear(coefficients: readonly T[]): S;
  /** Variable i to the power w. */
  power(i: number, w: number): S;
  combination(list: readonly (readonly [T, S])[]): S;
  multiply(a: S, b: S): S;
  part(a: S, d: number): S;
  evaluate(p: Polynomial<T>, at: readonly S[], limit: number): S;
  toPolynomial(a: S): Polynomial<T>;
}

export function denseComposer<T>(field: Field<T>, ring: PolynomialRing<T>, degree: number): Composer<T, DenseSeries<T>> {
  const algebra = new SeriesAlgebra(field, ring.variables.length, degree);
  return {
    get zero() {
      return algebra.zero;
    },
    isZero: (a) => algebra.isZero(a),
    linear: (c) => algebra.linear(c),
    power: (i, w) => algebra.term(String.fromCharCode(i).repeat(w), field.one),
    combination(list) {
      const out = algebra.zero;
      for (const [c, a] of list) algebra.addScaledInPlace(out, a, c);
      return out;
    },
    multiply: (a, b) => algebra.multiply(a, b),
    part: (a, d) => algebra.part(a, d),
    evaluate: (p, at, limit) => algebra.evaluate(p, at, limit),
    toPolynomial: (a) => algebra.toPolynomial(a, ring),
  };
}

export function sparseComposer<T>(field: Field<T>, ring: PolynomialRing<T>, degree: number): Composer<T, Polynomial<T>> {
  return {
    zero: ring.zero,
    isZero: (a) => ring.isZero(a),
    linear: (c) => ring.linearForm(c),
    power: (i, w) => ring.term(String.fromCharCode(i).repeat(w), field.one),
    combination: (list) => ring.sum(list.map(([c, a]) => ring.scale(a, c))),
    multiply: (a, b) => ring.mulTruncated(a, b, degree),
    part: (a, d) => ring.homogeneousPart(a, d),
    evaluate: (p, at, limit) => ring.substitute(p, at, ring, (c) => c, limit),
    toPolynomial: (a) => a,
  };
}
