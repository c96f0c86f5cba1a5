/**
 * Polynomial maps between two actions of one group that commute with it, as a module over the invariants: minimal
 * generators. A map f: V → W is the invariant Σ f_i(x) y_i on V ⊕ W*, linear in y. The module is free over the
 * polynomials in a system of parameters (it is a Cohen-Macaulay module; M. Hochster and J. Eagon 1971), which
 * proves completeness as for the invariants.
 */
import type { Algebraic } from '../field/index.ts';
import type { Polynomial } from '../polynomial/index.ts';
import { binomial } from './dimensions.ts';
import { Sampler, SPARE_POINTS, Span } from './evaluation.ts';
import type { GeneratorSet } from './generators.ts';
import { compositions } from './graded-monomials.ts';
import { dualAction, type LinearAction, sumOfActions } from './linear-action.ts';
import { numeratorPieces, type Parameter, PowerProducts, planParameters, total } from './parameter-plan.ts';
import { bySimplicity, difference, keyOf } from './piece-search.ts';
import { InvariantSpaces } from './reynolds.ts';

export interface Equivariant {
  readonly degree: number;
  /** Components in the coordinates of the target, polynomials in those of the source. */
  readonly components: readonly Polynomial<Algebraic>[];
  readonly text: readonly string[];
}

export interface EquivariantSet {
  readonly generators: readonly Equivariant[];
  readonly complete: boolean;
  readonly proof: string;
  readonly upTo: number;
}

export interface EquivariantOptions {
  /** Highest degree of the components; without it as far as a proof needs, if that is within reach. */
  readonly degree?: number;
  /** The action in which the maps have their values; that of the invariants by default. */
  readonly target?: LinearAction;
}

/** Degree looked at where no proof is within reach and none was asked for. */
export const FALLBACK_DEGREE_OF_MAPS = 3;
const DIMENSION_MOST = 600;
/** Most multidegrees, and most multiply-adds, where no proof is asked for. */
const PIECES_MOST = 3_000;
const WORK_MOST_FOR_MAPS = 5e7;

interface Piece {
  readonly degrees: number[];
  readonly dimension: number;
}

/** Generators of the module of equivariants over the invariants, given generators of these. */
export function equivariants(set: GeneratorSet, options: EquivariantOptions = {}): EquivariantSet {
  const { action } = set.spaces;
  const target = options.target ?? action;
  const dual = dualAction(
    target,
    target.names.map((_, i) => freshName(action.names, i)),
  );
  const both = new InvariantSpaces(sumOfActions(action, dual));
  const parts = action.blocks.length;
  const duals = both.action.blocks.length - parts;
  const wanted = options.degree ?? Infinity;
  const parameters = wanted === Infinity && set.complete ? (set.hironaka?.parameters ?? planParameters(set.spaces)?.parameters) : undefined;
  const linear = Array.from({ length: duals }, (_, k) => Array.from({ length: duals }, (_, j) => (j === k ? 1 : 0)));
  let pieces: Piece[] | undefined;
  if (parameters !== undefined)
    pieces = linear
      .flatMap((y) => numeratorPieces(parameters, parts, (d) => both.dimensions.dimension([...d, ...y])).map((x) => [...x.degrees, ...y]))
      .map((degrees) => ({ degrees, dimension: both.dimensions.dimension(degrees) }));
  const within = pieces?.every((x) => x.dimension <= DIMENSION_MOST) === true;
  let limit = within ? Infinity : wanted === Infinity ? Math.min(FALLBACK_DEGREE_OF_MAPS, set.upTo) : Math.min(wanted, set.upTo);
  if (!within) {
    while (limit > 0 && binomial(limit + parts, limit) * BigInt(duals) > BigInt(PIECES_MOST)) limit--;
    for (;;) {
      pieces = linear.flatMap((y) => piecesUpTo(both, parts, limit, y));
      if (limit === 0 || pieces.reduce((s, x) => s + x.dimension ** 3, 0) <= WORK_MOST_FOR_MAPS) break;
      limit--;
    }
  }
  const sorted = pieces!.sort((a, b) => total(a.degrees) - total(b.degrees));
  const found = within ? overParameters(both, set, parameters!, sorted) : byProducts(both, set, sorted);
  const { ring } = set.spaces;
  const generators = found.map((p): Equivariant => {
    const components = target.names.map((_, i) => both.ring.derivative(p, action.dimension + i));
    return { degree: both.ring.degree(p) - 1, components, text: components.map((c) => ring.format(c)) };
  });
  return {
    generators,
    complete: within,
    proof: within
      ? `the module is free over the parameters of degrees ${parameters!.map((f) => f.degree).join(', ')}; products of the generators are a basis`
      : `not proved complete: every generator of degree at most ${limit} is listed`,
    upTo: limit,
  };
}

function piecesUpTo(both: InvariantSpaces, parts: number, limit: number, y: readonly number[]): Piece[] {
  const out: Piece[] = [];
  for (let d = 0; d <= limit; d++)
    for (const c of compositions(parts, d)) {
      const degrees = [...c, ...y];
      const dimension = both.dimensions.dimension(degrees);
      if (dimension > 0) out.push({ degrees, dimension });
    }
  return out;
}

type Valued = { degrees: readonly number[]; values: Int32Array };

function setUp(both: InvariantSpaces, set: GeneratorSet, pieces: readonly Piece[]): { sampler: Sampler; invariants: Valued[] } {
  const width = pieces.reduce((m, x) => Math.max(m, x.dimension), 1) + SPARE_POINTS;
  const sampler = new Sampler(both.action.field, both.action.dimension, width);
  const pad = both.action.blocks.length - set.spaces.action.blocks.length;
  const invariants = set.generators.map((g) => ({
    degrees: [...g.degrees, ...new Array<number>(pad).fill(0)],
    values: sampler.values(g.polynomial),
  }));
  return { sampler, invariants };
}

/** Fills what products leave of a piece; returns the new generators and the vectors that were independent. */
function fill(both: InvariantSpaces, sampler: Sampler, span: Span, piece: Piece, fresh: Valued[]): Polynomial<Algebraic>[] {
  const out: Polynomial<Algebraic>[] = [];
  if (span.rank === piece.dimension) return out;
  for (const { polynomial } of bySimplicity(both.basis(piece.degrees))) {
    const values = sampler.values(polynomial);
    if (!span.add(values)) continue;
    fresh.push({ degrees: piece.degrees, values });
    out.push(polynomial);
    if (span.rank === piece.dimension) return out;
  }
  throw new Error(`the equivariants of degrees ${piece.degrees.join(', ')} do not fill their dimension at the sample points`);
}

function byProducts(both: InvariantSpaces, set: GeneratorSet, pieces: readonly Piece[]): Polynomial<Algebraic>[] {
  const { sampler, invariants } = setUp(both, set, pieces);
  const bases = new Map<string, Valued[]>();
  const out: Polynomial<Algebraic>[] = [];
  for (const piece of pieces) {
    const span = new Span(sampler.p, piece.dimension + SPARE_POINTS, piece.dimension);
    const fresh: Valued[] = [];
    bases.set(keyOf(piece.degrees), fresh);
    products: for (const g of invariants) {
      const rest = difference(piece.degrees, g.degrees);
      if (rest === undefined) continue;
      for (const b of bases.get(keyOf(rest)) ?? []) {
        if (span.rank === piece.dimension) break products;
        const values = sampler.product(g.values, b.values);
        if (span.add(values)) fresh.push({ degrees: piece.degrees, values });
      }
    }
    out.push(...fill(both, sampler, span, piece, fresh));
  }
  return out;
}

function overParameters(
  both: InvariantSpaces,
  set: GeneratorSet,
  parameters: readonly Parameter[],
  pieces: readonly Piece[],
): Polynomial<Algebraic>[] {
  const { sampler, invariants } = setUp(both, set, pieces);
  const powers = new PowerProducts(sampler, parameters, both.action.blocks.length);
  const basis: Valued[] = [];
  const out: Polynomial<Algebraic>[] = [];
  for (const piece of pieces) {
    const span = new Span(sampler.p, piece.dimension + SPARE_POINTS, piece.dimension);
    for (const b of basis) {
      const rest = difference(piece.degrees, b.degrees);
      if (rest !== undefined) for (const v of powers.of(rest)) span.add(sampler.product(v, b.values));
    }
    const fresh: Valued[] = [];
    products: for (const g of invariants) {
      const rest = difference(piece.degrees, g.degrees);
      if (rest === undefined) continue;
      for (const b of basis) {
        if (span.rank === piece.dimension) break products;
        if (!b.degrees.every((d, i) => d === rest[i])) continue;
        const values = sampler.product(g.values, b.values);
        if (span.add(values)) fresh.push({ degrees: piece.degrees, values });
      }
    }
    out.push(...fill(both, sampler, span, piece, fresh));
    basis.push(...fresh);
  }
  return out;
}

function freshName(names: readonly string[], i: number): string {
  let name = `y${i + 1}`;
  while (names.includes(name)) name = `${name}_`;
  return name;
}
