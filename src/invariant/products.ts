/** Products of generators: enumeration by multidegree, order, expansion. */
import type { Algebraic } from '../field/index.ts';
import { type Monomial, type Polynomial, type PolynomialRing, UNIT } from '../polynomial/index.ts';
import type { Generator } from './generator.ts';
import { difference, keyOf } from './piece-search.ts';

/** A product of generators as a monomial in their numbers. */
export type Product = Monomial;

/**
 * The order of products of one degree: the one with the higher power of the last generator in which two differ is
 * the larger. It is compatible with multiplication, so the products that are no combination of smaller ones are the
 * multiples of none of the leading products of relations.
 */
export function compareProducts(a: Product, b: Product): number {
  let i = a.length - 1;
  let j = b.length - 1;
  while (i >= 0 && j >= 0) {
    const x = a.charCodeAt(i);
    const y = b.charCodeAt(j);
    if (x !== y) return x - y;
    i--;
    j--;
  }
  return i - j;
}

export class ProductTable {
  readonly generators: readonly Generator[];
  readonly ring: PolynomialRing<Algebraic>;
  readonly #lists = new Map<string, Product[]>();
  readonly #expanded: Map<Product, Polynomial<Algebraic>>;
  constructor(ring: PolynomialRing<Algebraic>, generators: readonly Generator[]) {
    this.ring = ring;
    this.generators = generators;
    this.#expanded = new Map([[UNIT, ring.one]]);
  }
  /** All products with these degrees in the blocks, increasing. */
  of(degrees: readonly number[]): readonly Product[] {
    const key = keyOf(degrees);
    const known = this.#lists.get(key);
    if (known !== undefined) return known;
    const out: Product[] = [];
    const extend = (rest: readonly number[], from: number, m: Product) => {
      if (rest.every((d) => d === 0)) {
        out.push(m);
        return;
      }
      for (let g = from; g < this.generators.length; g++) {
        const next = difference(rest, this.generators[g]!.degrees);
        if (next !== undefined) extend(next, g, m + String.fromCharCode(g));
      }
    };
    extend(degrees, 0, UNIT);
    out.sort(compareProducts);
    this.#lists.set(key, out);
    return out;
  }
  expand(m: Product): Polynomial<Algebraic> {
    let p = this.#expanded.get(m);
    if (p === undefined)
      this.#expanded.set(m, (p = this.ring.mul(this.expand(m.slice(0, -1)), this.generators[m.charCodeAt(m.length - 1)]!.polynomial)));
    return p;
  }
}
