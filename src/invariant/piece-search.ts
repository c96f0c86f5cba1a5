/**
 * Generators multidegree by multidegree: products of the generators found so far are compared with the dimension
 * of the piece, and what is missing is filled with new generators. The pieces are given in an order in which every
 * piece comes after those that divide it.
 */
import { Sampler, SPARE_POINTS, Span } from './evaluation.ts';
import type { BasisElement, InvariantSpaces } from './reynolds.ts';

export interface Piece {
  readonly degrees: readonly number[];
  readonly dimension: number;
}
export interface FoundGenerator {
  readonly element: BasisElement;
  readonly degrees: readonly number[];
}

export class PieceSearch {
  readonly generators: FoundGenerator[] = [];
  readonly #spaces: InvariantSpaces;
  readonly #sampler: Sampler;
  readonly #values: Int32Array[] = [];
  readonly #bases = new Map<string, Int32Array[]>();

  /** `largest` is the largest dimension of a piece to come. */
  constructor(spaces: InvariantSpaces, largest = 60) {
    this.#spaces = spaces;
    this.#sampler = new Sampler(spaces.action.field, spaces.action.dimension, largest + SPARE_POINTS);
    this.#bases.set(keyOf(spaces.action.blocks.map(() => 0)), [new Int32Array(largest + SPARE_POINTS).fill(1)]);
  }
  addPiece(piece: Piece): void {
    if (piece.dimension === 0) return;
    const span = new Span(this.#sampler.p, piece.dimension + SPARE_POINTS, piece.dimension);
    const basis: Int32Array[] = [];
    this.#bases.set(keyOf(piece.degrees), basis);
    products: for (let g = 0; g < this.generators.length; g++) {
      const { degrees } = this.generators[g]!;
      // a product of several generators has a factor of at most half its degree
      if (2 * total(degrees) > total(piece.degrees)) continue;
      const rest = difference(piece.degrees, degrees);
      if (rest === undefined) continue;
      for (const b of this.#bases.get(keyOf(rest)) ?? []) {
        const v = this.#sampler.product(this.#values[g]!, b);
        if (span.add(v)) basis.push(v);
        if (span.rank === piece.dimension) break products;
      }
    }
    if (span.rank === piece.dimension) return;
    for (const element of bySimplicity(this.#spaces.basis(piece.degrees))) {
      const v = this.#sampler.values(element.polynomial);
      if (!span.add(v)) continue;
      basis.push(v);
      this.generators.push({ element, degrees: piece.degrees });
      this.#values.push(v);
      if (span.rank === piece.dimension) return;
    }
    throw new Error(`the invariants of degrees ${piece.degrees.join(', ')} do not fill their dimension at the sample points`);
  }
}

/** Simple elements first: few monomials, real before imaginary parts, small coefficients. */
export function bySimplicity(list: readonly BasisElement[]): BasisElement[] {
  const size = (b: BasisElement) => {
    let digits = 0;
    for (const c of b.polynomial.coefficients) for (const x of c.c) if (x !== 0n) digits += `${x}`.length;
    return digits;
  };
  return list
    .map((b) => ({
      b,
      terms: b.orbit?.monomials.length ?? b.polynomial.monomials.length,
      imaginary: b.orbit?.part === 'imaginary' ? 1 : 0,
      digits: b.orbit === undefined ? size(b) : 0,
    }))
    .sort((x, y) => x.terms - y.terms || x.imaginary - y.imaginary || x.digits - y.digits)
    .map(({ b }) => b);
}

export const keyOf = (degrees: readonly number[]): string => degrees.join(',');

const total = (degrees: readonly number[]): number => degrees.reduce((s, d) => s + d, 0);

/** a - b, or undefined if that is negative somewhere. */
export function difference(a: readonly number[], b: readonly number[]): number[] | undefined {
  const out: number[] = [];
  for (let i = 0; i < a.length; i++) {
    if (a[i]! < b[i]!) return undefined;
    out.push(a[i]! - b[i]!);
  }
  return out;
}
