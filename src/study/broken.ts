/** What an H that is not invariant keeps of the declared symmetry: the part that breaks it, and the subgroup that survives. */
import { makeAction } from '../action/index.ts';
import { NotAGroupError, NotSymplecticError } from '../errors/index.ts';
import type { Algebraic } from '../field/index.ts';
import { generate } from '../group/index.ts';
import { linearAction, reynolds } from '../invariant/index.ts';
import { dense } from '../linear/index.ts';
import { taylor } from '../model/expression/index.ts';
import { polynomialDegree } from '../model/polynomial-energy.ts';
import { INVARIANCE_DEGREE, type Prepared } from './prepare.ts';
import { elementWords } from './subgroup-summaries.ts';

/** Larger groups and phase spaces are not looked into. */
const ORDER_LIMIT = 500;
const DIMENSION_LIMIT = 16;
/** Terms of the breaking part that are written out, and degree to which it is looked for. */
const TERMS_LIMIT = 40;
const DEGREE_LIMIT = 12;

export interface BrokenSummary {
  /** H less its average over the declared group. */
  readonly part: string;
  /** Terms left out of `part`. */
  readonly more: number;
  readonly degree: number;
  /** The elements that leave H as it is. */
  readonly survives: { readonly order: number; readonly reversing: number; readonly generators: readonly string[] };
}

/** Undefined where everything holds, or where the declared matrices make no group that is small enough to be averaged over. */
export function brokenSymmetry(p: Prepared): BrokenSummary | undefined {
  const n = p.form.rows;
  if (p.generators.every((g) => g.invariant) || p.generators.some((g) => g.sign === undefined) || n > DIMENSION_LIMIT) return undefined;
  try {
    const action = makeAction(
      p.field,
      p.form,
      p.generators.map((g) => ({ name: g.name, matrix: g.matrix })),
      ORDER_LIMIT,
    );
    const { quantities, hamiltonian } = p;
    const degree = Math.min(polynomialDegree(hamiltonian, new Set(quantities.names)) ?? INVARIANCE_DEGREE, DEGREE_LIMIT);
    const t = taylor(hamiltonian, {
      names: quantities.names,
      point: quantities.pointExpressions,
      parameters: quantities.valueExpressions,
      degree,
      field: p.field,
    });
    if (t.kind !== 'exact' || t.field !== p.field) return undefined;
    const { ring, polynomial } = t;
    const linear = linearAction(
      p.field,
      quantities.names,
      action.group,
      action.generators.map((g) => dense(g.matrix)),
    );
    const part = ring.sub(
      polynomial,
      reynolds(linear, ring, polynomial, (a: Algebraic) => a),
    );
    if (ring.isZero(part)) return undefined;
    const kept: number[] = [];
    for (let g = 0; g < action.group.order; g++)
      if (ring.equal(ring.linearSubstitution(polynomial, dense(action.matrix(g))), polynomial)) kept.push(g);
    const shown = { ...part, monomials: part.monomials.slice(0, TERMS_LIMIT), coefficients: part.coefficients.slice(0, TERMS_LIMIT) };
    return {
      part: ring.format(shown),
      more: part.monomials.length - shown.monomials.length,
      degree,
      survives: {
        order: kept.length,
        reversing: kept.filter((g) => action.signs[g] === -1).length,
        generators: generate(action.group, kept).generators.map(elementWords(action)),
      },
    };
  } catch (error) {
    if (error instanceof NotAGroupError || error instanceof NotSymplecticError) return undefined;
    throw error;
  }
}
