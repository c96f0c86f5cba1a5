/**
 * A polynomial in invariant form: exactly solved, degree by degree, for a combination of the standard products of
 * the generators. Coefficients may lie in any field that contains that of the action (numbers, or rational functions
 * of parameters). What is not invariant is separated by the Reynolds operator first.
 */
import type { Algebraic, Field } from '../field/index.ts';
import { build } from '../linear/index.ts';
import { type Monomial, type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import type { GeneratorSet } from './generators.ts';
import { degreesOf } from './graded-monomials.ts';
import { StandardProducts } from './normal-form.ts';
import { keyOf } from './piece-search.ts';
import { ProductTable } from './products.ts';
import { reynolds } from './reynolds.ts';

export interface InvariantForm<C> {
  /** Ring in the names of the generators. */
  readonly ring: PolynomialRing<C>;
  readonly expression: Polynomial<C>;
  /** h minus what the expression stands for; zero if h is invariant and the generators suffice. */
  readonly remainder: Polynomial<C>;
  /** The part of h that the group does not leave invariant, h minus its average; zero if h is invariant. */
  readonly breaking: Polynomial<C>;
}

/**
 * h in the generators. `coordinates` is the ring of h: its variables are those of the action, in the same order.
 * The expression stands for the invariant part of h.
 */
export function rewriteInInvariants<C>(
  h: Polynomial<C>,
  coordinates: PolynomialRing<C>,
  set: GeneratorSet,
  embed: (a: Algebraic) => C,
): InvariantForm<C> {
  const names = set.generators.map((g) => g.name);
  const target = new PolynomialRing<C>(coordinates.field, names);
  const direct = solveInProducts(h, coordinates, target, set, embed);
  if (coordinates.isZero(direct.remainder)) return { ring: target, ...direct, breaking: coordinates.zero };
  const average = reynolds(set.spaces.action, coordinates, h, embed);
  const breaking = coordinates.sub(h, average);
  const { expression, remainder } = solveInProducts(average, coordinates, target, set, embed);
  return { ring: target, expression, remainder: coordinates.add(remainder, breaking), breaking };
}

function solveInProducts<C>(
  h: Polynomial<C>,
  coordinates: PolynomialRing<C>,
  target: PolynomialRing<C>,
  set: GeneratorSet,
  embed: (a: Algebraic) => C,
): { expression: Polynomial<C>; remainder: Polynomial<C> } {
  const { action, ring } = set.spaces;
  const field: Field<C> = coordinates.field;
  const blockOf = new Array<number>(action.dimension).fill(0);
  action.blocks.forEach((block, b) => {
    for (const i of block) blockOf[i] = b;
  });
  const pieces = new Map<string, { degrees: number[]; terms: Array<[Monomial, C]> }>();
  for (const [m, c] of coordinates.terms(h)) {
    const degrees = degreesOf(m, blockOf, action.blocks.length);
    const key = keyOf(degrees);
    let piece = pieces.get(key);
    if (piece === undefined) pieces.set(key, (piece = { degrees, terms: [] }));
    piece.terms.push([m, c]);
  }
  const standard = new StandardProducts(new ProductTable(ring, set.generators));
  const expression: Array<[Monomial, C]> = [];
  const remainder: Polynomial<C>[] = [h];
  for (const { degrees, terms } of pieces.values()) {
    const piece = standard.piece(degrees);
    const part = new Map(terms);
    // only the columns of the inverse that meet a coefficient of h
    const used = piece.pivots.flatMap((m, i) => (part.has(m) ? [{ i, c: part.get(m)! }] : []));
    if (used.length === 0) continue;
    const unit = build(ring.field, piece.pivots.length, used.length, (i, j) => (i === used[j]!.i ? ring.field.one : ring.field.zero));
    const inverse = standard.solve(piece, unit);
    piece.standard.forEach((s, i) => {
      let c = field.zero;
      used.forEach((u, j) => {
        const x = inverse.data[i * inverse.cols + j]!;
        if (!ring.field.isZero(x)) c = field.add(c, field.mul(embed(x), u.c));
      });
      if (field.isZero(c)) return;
      const product = piece.products[s]!;
      expression.push([product, c]);
      remainder.push(coordinates.scale(ring.map(standard.table.expand(product), embed, coordinates), field.neg(c)));
    });
  }
  return { expression: target.fromTerms(expression), remainder: coordinates.sum(remainder) };
}
