/**
 * Standard products: those that are no combination of smaller products of the same degrees. They are a basis of what
 * the generators generate, and they make the expression of an invariant in generators unique.
 */
import type { Algebraic } from '../field/index.ts';
import { build, type Matrix, matrix, solve } from '../linear/index.ts';
import type { Monomial } from '../polynomial/index.ts';
import { CommonReduction } from './common-reduction.ts';
import { Span } from './evaluation.ts';
import type { ScalarField } from './linear-action.ts';
import { keyOf } from './piece-search.ts';
import type { Product, ProductTable } from './products.ts';

export interface StandardPiece {
  /** All products of the piece, increasing. */
  readonly products: readonly Product[];
  /** Numbers of the standard ones among them. */
  readonly standard: readonly number[];
  /** As many monomials on which the standard products have an invertible matrix. */
  readonly pivots: readonly Monomial[];
}

export class StandardProducts {
  readonly table: ProductTable;
  readonly #pieces = new Map<string, StandardPiece>();
  constructor(table: ProductTable) {
    this.table = table;
  }
  piece(degrees: readonly number[]): StandardPiece {
    const key = keyOf(degrees);
    let out = this.#pieces.get(key);
    if (out === undefined) this.#pieces.set(key, (out = this.#make(degrees)));
    return out;
  }
  #make(degrees: readonly number[]): StandardPiece {
    const products = this.table.of(degrees);
    const expanded = products.map((m) => this.table.expand(m));
    const place = new Map<Monomial, number>();
    const monomials: Monomial[] = [];
    for (const p of expanded)
      for (const m of p.monomials)
        if (!place.has(m)) {
          place.set(m, monomials.length);
          monomials.push(m);
        }
    const reduction = CommonReduction.of(this.table.ring.field as ScalarField);
    const span = new Span(reduction.p, monomials.length, products.length);
    const standard: number[] = [];
    expanded.forEach((p, i) => {
      const row = new Int32Array(monomials.length);
      p.monomials.forEach((m, k) => {
        row[place.get(m)!] = reduction.apply(p.coefficients[k]!);
      });
      if (span.add(row)) standard.push(i);
    });
    return { products, standard, pivots: span.pivots.map((j) => monomials[j]!) };
  }
  /** The matrix of the standard products on the pivot monomials: entry (monomial, product). */
  matrix(piece: StandardPiece): Matrix<Algebraic> {
    const { ring } = this.table;
    const columns = piece.standard.map((i) => this.table.expand(piece.products[i]!));
    return build(ring.field, piece.pivots.length, columns.length, (i, j) => ring.coefficient(columns[j]!, piece.pivots[i]!));
  }
  /** Coordinates over the standard products of forms given by their values on the pivot monomials (columns of b). */
  solve(piece: StandardPiece, b: Matrix<Algebraic>): Matrix<Algebraic> {
    if (piece.standard.length === 0) return matrix(this.table.ring.field, 0, b.cols, []);
    const x = solve(this.matrix(piece), b);
    if (x === undefined) throw new Error('standard products are dependent on their pivot monomials');
    return x;
  }
}
