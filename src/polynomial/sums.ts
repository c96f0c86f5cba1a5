/** Sums of term lists. */
import type { Field } from '../field/index.ts';
import { compareMonomials, type Monomial } from './monomial.ts';
import { sortedTerms, type TermList } from './product.ts';

/** a + b, or a - b, by one walk along both lists. */
export function mergeTerms<T>(f: Field<T>, a: TermList<T>, b: TermList<T>, subtract: boolean): TermList<T> {
  if (b.monomials.length === 0) return a;
  const monomials: Monomial[] = [];
  const coefficients: T[] = [];
  let i = 0;
  let j = 0;
  while (i < a.monomials.length || j < b.monomials.length) {
    const order = i >= a.monomials.length ? 1 : j >= b.monomials.length ? -1 : compareMonomials(a.monomials[i]!, b.monomials[j]!);
    let c: T;
    let m: Monomial;
    if (order < 0) {
      m = a.monomials[i]!;
      c = a.coefficients[i++]!;
    } else if (order > 0) {
      m = b.monomials[j]!;
      c = b.coefficients[j++]!;
      if (subtract) c = f.neg(c);
    } else {
      m = a.monomials[i]!;
      const y = b.coefficients[j++]!;
      c = subtract ? f.sub(a.coefficients[i++]!, y) : f.add(a.coefficients[i++]!, y);
      if (f.isZero(c)) continue;
    }
    monomials.push(m);
    coefficients.push(c);
  }
  return { monomials, coefficients };
}

/** The sum of many lists, by one table. */
export function sumTerms<T>(f: Field<T>, list: Iterable<TermList<T>>): TermList<T> {
  const sums = new Map<Monomial, T>();
  for (const p of list)
    for (let i = 0; i < p.monomials.length; i++) {
      const m = p.monomials[i]!;
      const old = sums.get(m);
      sums.set(m, old === undefined ? p.coefficients[i]! : f.add(old, p.coefficients[i]!));
    }
  return sortedTerms(f, sums);
}
