/** Exact division of polynomials in several variables over a field. */
import { divideMonomials, type Monomial } from './monomial.ts';
import type { Polynomial, PolynomialRing } from './polynomial.ts';

/** a/b if b divides a, else undefined. Throws RangeError if b is zero. */
export function divideExactly<T>(ring: PolynomialRing<T>, a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> | undefined {
  const f = ring.field;
  if (ring.isZero(b)) throw new RangeError('division by the zero polynomial');
  if (ring.isZero(a)) return a;
  if (b.monomials.length === 1) {
    const inverse = f.inv(b.coefficients[0]!);
    const terms: Array<[Monomial, T]> = [];
    for (const [m, c] of ring.terms(a)) {
      const q = divideMonomials(m, b.monomials[0]!);
      if (q === undefined) return undefined;
      terms.push([q, f.mul(c, inverse)]);
    }
    return ring.fromTerms(terms);
  }
  // the first and the last term of a product are the products of the first and of the last terms
  if (divideMonomials(a.monomials[0]!, b.monomials[0]!) === undefined) return undefined;
  const top = b.monomials.length - 1;
  const lead = f.inv(b.coefficients[top]!);
  let rest = a;
  const quotient: Array<[Monomial, T]> = [];
  while (!ring.isZero(rest)) {
    const last = rest.monomials.length - 1;
    const m = divideMonomials(rest.monomials[last]!, b.monomials[top]!);
    if (m === undefined) return undefined;
    const c = f.mul(rest.coefficients[last]!, lead);
    quotient.push([m, c]);
    rest = ring.sub(rest, ring.mul(ring.term(m, c), b));
  }
  return ring.fromTerms(quotient);
}

/** First coefficient made 1; zero stays. */
export function monic<T>(ring: PolynomialRing<T>, a: Polynomial<T>): Polynomial<T> {
  const c = a.coefficients[0];
  return c === undefined || ring.field.equal(c, ring.field.one) ? a : ring.scale(a, ring.field.inv(c));
}
