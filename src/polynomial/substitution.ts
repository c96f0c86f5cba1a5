/** Polynomials put into polynomials, by Horner's rule on the tree of monomials: one product for each distinct leading part. */
import type { TermList } from './product.ts';

/** What substitution needs of the ring of the images. */
export interface TargetRing<U> {
  constant(c: U): TermList<U>;
  add(a: TermList<U>, b: TermList<U>): TermList<U>;
  sum(list: Iterable<TermList<U>>): TermList<U>;
  mulTruncated(a: TermList<U>, b: TermList<U>, limit: number): TermList<U>;
}

/** Variable v replaced by images[v], coefficients mapped by `embed`, terms of degree above `limit` left out. */
export function substituteTerms<T, U>(
  a: TermList<T>,
  images: readonly TermList<U>[],
  target: TargetRing<U>,
  embed: (c: T) => U,
  limit: number,
): TermList<U> {
  const order = Array.from(a.monomials.keys()).sort((x, y) => (a.monomials[x]! < a.monomials[y]! ? -1 : 1));
  const below = (from: number, to: number, depth: number): TermList<U> => {
    const parts: TermList<U>[] = [];
    let i = from;
    if (i < to && a.monomials[order[i]!]!.length === depth) parts.push(target.constant(embed(a.coefficients[order[i++]!]!)));
    while (i < to) {
      const v = a.monomials[order[i]!]!.charCodeAt(depth);
      let j = i + 1;
      while (j < to && a.monomials[order[j]!]!.charCodeAt(depth) === v) j++;
      parts.push(target.mulTruncated(images[v]!, below(i, j, depth + 1), limit));
      i = j;
    }
    return parts.length === 1 ? parts[0]! : parts.length === 2 ? target.add(parts[0]!, parts[1]!) : target.sum(parts);
  };
  return below(0, order.length, 0);
}
