/**
 * Relations among generators up to a degree: the reduced Gröbner basis of the ideal of relations for the order of
 * `compareProducts`, as far as the degree goes. Each relation is checked by substitution.
 */
import type { Algebraic } from '../field/index.ts';
import { build } from '../linear/index.ts';
import { divideMonomials, type Monomial, type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import { binomial } from './dimensions.ts';
import type { GeneratorSet } from './generators.ts';
import { compositions } from './graded-monomials.ts';
import { StandardProducts } from './normal-form.ts';
import { total } from './parameter-plan.ts';
import { primitive } from './primitive.ts';
import { ProductTable } from './products.ts';

export interface Relation {
  readonly degree: number;
  /** Vanishes when the generators are put in; in the ring of generator names. */
  readonly polynomial: Polynomial<Algebraic>;
  readonly text: string;
  readonly latex: string;
}

/** The ring of polynomials in the names of the generators. */
export function generatorRing(set: GeneratorSet): PolynomialRing<Algebraic> {
  return new PolynomialRing<Algebraic>(
    set.spaces.action.field,
    set.generators.map((g) => g.name),
  );
}

/** The relations up to a degree, and that degree: lower than asked for where the work would pass WORK_MOST. */
export interface RelationList extends ReadonlyArray<Relation> {
  readonly upTo: number;
}

/** Most multidegrees of one degree, and most multiply-adds (products times standard products times monomials). */
export const MULTIDEGREES_MOST = 3_000;
export const RELATION_WORK_MOST = 2e8;

/** Relations of total degree at most `degree` in the coordinates. */
export function relations(set: GeneratorSet, degree: number): RelationList {
  const { action, ring } = set.spaces;
  const done = (list: Relation[], upTo: number): RelationList => Object.assign(list, { upTo });
  // n generators of a complete list are independent, for the ring has dimension n
  if (set.complete && set.generators.length === action.dimension) return done([], degree);
  const names = generatorRing(set);
  const standard = new StandardProducts(new ProductTable(ring, set.generators));
  const leads: Monomial[] = [];
  const out: Relation[] = [];
  let work = 0;
  for (let d = 1; d <= degree; d++) {
    const parts = action.blocks.length;
    if (parts > 0 && binomial(d + parts - 1, d) > BigInt(MULTIDEGREES_MOST)) return done(out, d - 1);
    const list = compositions(parts, d);
    for (const degrees of list) {
      const count = standard.table.of(degrees).length;
      const dimension = set.spaces.dimensions.dimension(degrees);
      work += count * dimension * action.blocks.reduce((m, b, i) => m * Number(binomial(b.length + degrees[i]! - 1, degrees[i]!)), 1);
    }
    if (work > RELATION_WORK_MOST) return done(out, d - 1);
    for (const degrees of list) {
      const piece = standard.piece(degrees);
      const kept = new Set(piece.standard);
      const fresh = piece.products.flatMap((m, i) => (kept.has(i) || leads.some((l) => divideMonomials(m, l) !== undefined) ? [] : [m]));
      if (fresh.length === 0) continue;
      const forms = fresh.map((m) => standard.table.expand(m));
      const b = build(ring.field, piece.pivots.length, forms.length, (i, j) => ring.coefficient(forms[j]!, piece.pivots[i]!));
      const x = standard.solve(piece, b);
      fresh.forEach((m, j) => {
        const combination = names.fromTerms(piece.standard.map((s, i) => [piece.products[s]!, x.data[i * x.cols + j]!] as const));
        const relation = primitive(names, names.sub(names.term(m, ring.field.one), combination));
        const value = names.substitute(
          relation,
          set.generators.map((g) => g.polynomial),
          ring,
        );
        if (!ring.isZero(value)) throw new Error(`a relation of degrees ${degrees.join(', ')} modulo a prime does not hold exactly`);
        leads.push(m);
        out.push({ degree: total(degrees), polynomial: relation, text: names.format(relation), latex: names.latex(relation) });
      });
    }
  }
  return done(out, degree);
}
