/**
 * Minimal generators of the ring of invariants, degree by degree, and a proof that they are all.
 *
 * Ranks of products are taken of their values at random points modulo a prime: a rank found is a lower bound, so a
 * dimension reached is reached. Completeness is proved in one of three ways:
 *   - n algebraically independent invariants whose degrees multiply to the order of the group generate the ring
 *     (J. Humphreys, Reflection Groups and Coxeter Groups, 1990, ch. 3, from memory);
 *   - Noether's bound: the ring is generated in degrees up to the order of the group (E. Noether 1916);
 *   - Hironaka decomposition: the ring is free over the polynomials in a system of parameters (M. Hochster and
 *     J. Eagon 1971), and products of generators are found that are a basis, their degrees rebuilding Molien's series.
 */
import { LimitError } from '../errors/index.ts';
import { binomial } from './dimensions.ts';
import { Sampler, SPARE_POINTS, Span } from './evaluation.ts';
import type { Generator } from './generator.ts';
import { compositions } from './graded-monomials.ts';
import type { LinearAction } from './linear-action.ts';
import { boxSize, numeratorPieces, type Parameter, PowerProducts, planParameters, total } from './parameter-plan.ts';
import { areIndependent } from './parameters.ts';
import { bySimplicity, difference, type FoundGenerator, type Piece, PieceSearch } from './piece-search.ts';
import { nameGenerators } from './readable.ts';
import { InvariantSpaces } from './reynolds.ts';

export interface GeneratorSet {
  readonly spaces: InvariantSpaces;
  readonly generators: readonly Generator[];
  readonly complete: boolean;
  /** Why the list is complete, or up to which degree it is known. */
  readonly proof: string;
  /** Every generator up to this degree is there (Infinity if complete). */
  readonly upTo: number;
  /** The system of parameters used, and the degrees of the basis over it, if that was the proof. */
  readonly hironaka?: { readonly parameters: readonly Parameter[]; readonly secondaryDegrees: readonly number[] };
}

export interface GeneratorOptions {
  /** Highest degree to look at; without it, as far as a proof of completeness needs. */
  readonly degree?: number;
  /** Multiply-adds that may be spent on a proof. */
  readonly work?: number;
  /** Names not to use for generators. */
  readonly reserved?: readonly string[];
}

/** Default for `work`: about two seconds. */
export const WORK_MOST = 4e8;
/** Degree looked at where no proof is within reach and none was asked for. */
export const FALLBACK_DEGREE = 4;
/** Higher degrees are looked at all the same up to this one while the forms have at most so many monomials. */
const FALLBACK_DEGREE_MOST = 12;
const FALLBACK_MONOMIALS = 1_000;
/** Below this Noether's bound is reached at once, without looking for parameters. */
const NOETHER_AT_ONCE = 5e4;
/** Largest dimension of a multidegree, and most multidegrees, that are worth a try. */
const DIMENSION_MOST = 1_200;
const PIECES_MOST = 40_000;

/** Generators of the invariants of an action. */
export function minimalGenerators(action: LinearAction, options: GeneratorOptions = {}): GeneratorSet {
  const spaces = new InvariantSpaces(action);
  const order = action.group.order / spaces.dimensions.kernelOrder;
  const work = options.work ?? WORK_MOST;
  const wanted = options.degree ?? Infinity;
  const result = (found: readonly FoundGenerator[], complete: boolean, proof: string, upTo: number): GeneratorSet => ({
    spaces,
    generators: nameGenerators(spaces, found, options.reserved ?? []),
    complete,
    proof,
    upTo,
  });
  const all = Array.from({ length: action.dimension }, (_, i) => i);
  const upTo = (limit: number, pieces: readonly Piece[]): GeneratorSet => {
    const search = new PieceSearch(
      spaces,
      pieces.reduce((m, x) => Math.max(m, x.dimension), 1),
    );
    for (const piece of pieces) {
      try {
        search.addPiece(piece);
      } catch (error) {
        if (!(error instanceof LimitError)) throw error;
        limit = total(piece.degrees) - 1;
        break;
      }
    }
    const found = search.generators.filter((g) => total(g.degrees) <= limit);
    if (order <= limit)
      return result(found, true, `every degree up to the order ${order} of the group was looked at (Noether's bound)`, Infinity);
    const degrees = found.map((g) => total(g.degrees));
    const polynomials = found.map((g) => g.element.polynomial);
    if (degrees.length === action.dimension && degrees.reduce((s, d) => s * d, 1) === order && areIndependent(action, all, polynomials))
      return result(found, true, independentProof(degrees, order), Infinity);
    return result(found, false, `not proved complete: every generator of degree at most ${limit} is listed`, limit);
  };

  const first = piecesUpTo(spaces, Math.min(order, wanted), wanted < order ? Infinity : work);
  if (wanted < order) {
    if (first !== undefined) return upTo(wanted, first);
    const limit = affordable(spaces, work);
    return upTo(limit, piecesUpTo(spaces, limit, work) ?? []);
  }
  if (first !== undefined && cost(first) <= NOETHER_AT_ONCE) return upTo(order, first);
  const plan = planParameters(spaces);
  if (plan !== undefined) {
    const degrees = plan.parameters.map((f) => f.degree);
    const found = plan.parameters.map((f): FoundGenerator => foundParameter(spaces, f));
    if (plan.polynomialRing) return result(found, true, independentProof(degrees, order), Infinity);
    if (boxSize(plan.parameters, action.blocks.length) <= PIECES_MOST) {
      const pieces = numeratorPieces(plan.parameters, action.blocks.length, (d) => spaces.dimensions.dimension(d)).map((x) => ({
        ...x,
        dimension: spaces.dimensions.dimension(x.degrees),
      }));
      const price = pieces.reduce((s, x) => s + x.dimension ** 3 / 3, 0);
      if (price <= work && (first === undefined || price < cost(first))) {
        const secondary = decompose(spaces, plan.parameters, found, pieces);
        const proof =
          `Hironaka decomposition: over parameters of degrees ${degrees.join(', ')} the ring is free on ${secondary.length} products of generators, ` +
          "whose degrees rebuild Molien's series";
        return { ...result(found, true, proof, Infinity), hironaka: { parameters: plan.parameters, secondaryDegrees: secondary } };
      }
    }
  }
  if (first !== undefined) return upTo(order, first);
  const limit = affordable(spaces, work);
  return upTo(limit, piecesUpTo(spaces, limit, work) ?? []);
}

const independentProof = (degrees: readonly number[], order: number) =>
  `${degrees.length} algebraically independent invariants, their degrees ${degrees.join(', ')} multiply to the order ${order} of the group`;

function foundParameter(spaces: InvariantSpaces, f: Parameter): FoundGenerator {
  const degrees = spaces.action.blocks.map((_, b) => (b === f.block ? f.degree : 0));
  const element = spaces.basis(degrees).find((b) => spaces.ring.equal(b.polynomial, f.polynomial)) ?? {
    polynomial: f.polynomial,
    orbit: undefined,
  };
  return { element, degrees };
}

/**
 * Completes the generators `found` (the parameters, at first) so that products of them are a basis over the
 * parameters; returns the degrees of that basis. `found` grows.
 */
function decompose(
  spaces: InvariantSpaces,
  parameters: readonly Parameter[],
  found: FoundGenerator[],
  pieces: ReadonlyArray<{ degrees: number[]; count: number; dimension: number }>,
): number[] {
  const width = pieces.reduce((m, x) => Math.max(m, x.dimension), 1) + SPARE_POINTS;
  const sampler = new Sampler(spaces.action.field, spaces.action.dimension, width);
  const powers = new PowerProducts(sampler, parameters, spaces.action.blocks.length);
  const basis: Array<{ degrees: readonly number[]; values: Int32Array }> = [];
  const others: Array<{ degrees: readonly number[]; values: Int32Array }> = [];
  for (const piece of pieces) {
    if (total(piece.degrees) === 0) {
      basis.push({ degrees: piece.degrees, values: new Int32Array(width).fill(1) });
      continue;
    }
    const span = new Span(sampler.p, piece.dimension + SPARE_POINTS, piece.dimension);
    for (const b of basis) {
      const rest = difference(piece.degrees, b.degrees);
      if (rest !== undefined) for (const v of powers.of(rest)) span.add(total(b.degrees) === 0 ? v : sampler.product(v, b.values));
    }
    const fresh: Array<{ degrees: readonly number[]; values: Int32Array }> = [];
    const offer = (values: Int32Array): boolean => {
      const independent = span.add(values);
      if (independent) fresh.push({ degrees: piece.degrees, values });
      return independent;
    };
    products: for (const g of others) {
      const rest = difference(piece.degrees, g.degrees);
      if (rest === undefined) continue;
      for (const b of basis) {
        if (span.rank === piece.dimension) break products;
        if (b.degrees.every((d, i) => d === rest[i])) offer(sampler.product(g.values, b.values));
      }
    }
    if (span.rank < piece.dimension)
      for (const element of bySimplicity(spaces.basis(piece.degrees))) {
        const values = sampler.values(element.polynomial);
        if (!offer(values)) continue;
        found.push({ element, degrees: piece.degrees });
        others.push({ degrees: piece.degrees, values });
        if (span.rank === piece.dimension) break;
      }
    if (fresh.length !== piece.count || span.rank !== piece.dimension)
      throw new Error(
        `degrees ${piece.degrees.join(', ')}: ${fresh.length} new elements over the parameters, Molien's series says ${piece.count}`,
      );
    basis.push(...fresh);
  }
  return basis.map((b) => total(b.degrees));
}

/** The multidegrees that hold invariants, with dimensions, up to a total degree; undefined if that is too much. */
function piecesUpTo(spaces: InvariantSpaces, limit: number, work: number): Piece[] | undefined {
  const parts = spaces.action.blocks.length;
  const out: Piece[] = [];
  let price = 0;
  for (let d = 1; d <= limit; d++) {
    let count = 1;
    for (let i = 1; i < parts; i++) count = (count * (d + i)) / i;
    if (out.length + count > PIECES_MOST) return undefined;
    for (const degrees of compositions(parts, d)) {
      const dimension = spaces.dimensions.dimension(degrees);
      price += dimension ** 3;
      if (dimension > DIMENSION_MOST || price > work) return undefined;
      if (dimension > 0) out.push({ degrees, dimension });
    }
  }
  return out;
}
const cost = (pieces: readonly Piece[]): number => pieces.reduce((s, x) => s + x.dimension ** 3, 0);

/** The highest degree worth a look where there is no proof: few monomials, and FALLBACK_DEGREE at least if it can be afforded. */
function affordable(spaces: InvariantSpaces, work: number): number {
  const n = spaces.action.dimension;
  for (let d = FALLBACK_DEGREE_MOST; d > 1; d--) {
    if (d > FALLBACK_DEGREE && binomial(n + d - 1, d) > BigInt(FALLBACK_MONOMIALS)) continue;
    if (piecesUpTo(spaces, d, work / 40) !== undefined) return d;
  }
  return 1;
}
