/**
 * Bases of the invariants of given degrees, by orbit sums where the action is monomial in suitable letters and as
 * the common kernel of ρ(g) - 1 elsewhere; the number found is compared with Molien's. Also the Reynolds operator
 * itself, the average over the group.
 */
import { LimitError } from '../errors/index.ts';
import type { Algebraic } from '../field/index.ts';
import { mapMatrix } from '../linear/index.ts';
import { type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import { GradedDimensions } from './dimensions.ts';
import { FixedForms } from './fixed-forms.ts';
import { compositions } from './graded-monomials.ts';
import { findLetters, type Letters } from './letters.ts';
import type { LinearAction } from './linear-action.ts';
import { MonomialLayers } from './monomial-layers.ts';
import { type OrbitSum, OrbitSumExpander, OrbitSums } from './orbit-sums.ts';
import { primitive } from './primitive.ts';

export interface BasisElement {
  readonly polynomial: Polynomial<Algebraic>;
  /** How it was made, where it is an orbit sum. */
  readonly orbit: OrbitSum | undefined;
}

export class InvariantSpaces {
  readonly action: LinearAction;
  readonly ring: PolynomialRing<Algebraic>;
  readonly dimensions: GradedDimensions;
  readonly letters: Letters | undefined;
  readonly #expander: OrbitSumExpander | undefined;
  readonly #fixed: FixedForms;
  readonly #layers: readonly MonomialLayers[];
  readonly #orbits: OrbitSums | undefined;
  constructor(action: LinearAction) {
    this.action = action;
    this.ring = new PolynomialRing<Algebraic>(action.field, action.names);
    this.dimensions = new GradedDimensions(action);
    this.letters = findLetters(action);
    this.#layers = action.blocks.map((b) => new MonomialLayers(b.length));
    this.#fixed = new FixedForms(action, this.ring, this.#layers);
    this.#orbits = this.letters === undefined ? undefined : new OrbitSums(this.letters, action, this.#layers);
    this.#expander = this.letters === undefined ? undefined : new OrbitSumExpander(this.ring, this.letters);
  }
  /** Basis of the invariants with these degrees in the blocks, coefficients primitive where they are rational. */
  basis(degrees: readonly number[]): BasisElement[] {
    const out = this.#orbitBasis(degrees) ?? this.#fixed.basis(degrees).map((polynomial) => ({ polynomial, orbit: undefined }));
    const scaled = out.map((b) => ({ polynomial: primitive(this.ring, b.polynomial), orbit: b.orbit }));
    const expected = this.dimensions.dimension(degrees);
    if (scaled.length !== expected)
      throw new Error(`${scaled.length} invariants of degrees ${degrees.join(', ')}, Molien's series says ${expected}`);
    return scaled;
  }
  #orbitBasis(degrees: readonly number[]): BasisElement[] | undefined {
    if (this.#orbits === undefined || this.#expander === undefined) return undefined;
    const out: BasisElement[] = [];
    for (const orbit of this.#orbits.of(degrees)) {
      const polynomial = this.#expander.expand(orbit);
      if (polynomial === undefined) return undefined;
      out.push({ polynomial, orbit });
    }
    return out;
  }
  /** Basis of all invariants of total degree d. */
  basisOfDegree(d: number): BasisElement[] {
    return compositions(this.action.blocks.length, d).flatMap((degrees) => this.basis(degrees));
  }
}

/** Substitutions that the average may cost (elements times terms). */
export const AVERAGE_MOST = 2_000_000;

/**
 * The Reynolds operator: the average of h(ρ(g)x) over the group, with coefficients in any field that contains those of
 * the action. Throws LimitError if it takes too long.
 */
export function reynolds<C>(action: LinearAction, ring: PolynomialRing<C>, h: Polynomial<C>, embed: (a: Algebraic) => C): Polynomial<C> {
  const { group } = action;
  if (group.order * h.monomials.length > AVERAGE_MOST)
    throw new LimitError(`averaging ${h.monomials.length} terms over ${group.order} elements`, {
      next: 'make the Hamiltonian invariant, or declare a smaller group',
    });
  // products of linear forms repeat: gather h by monomials once, average each monomial over the group
  const terms: Polynomial<C>[] = [];
  for (let i = 0; i < group.order; i++) {
    const m = mapMatrix(action.matrix(i), ring.field, embed);
    terms.push(ring.linearSubstitution(h, m));
  }
  return ring.scale(ring.sum(terms), ring.field.fromRational(1n, BigInt(group.order)));
}
