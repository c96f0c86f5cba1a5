/** A system of parameters made block by block from generators of the blocks, and the numerator that goes with it. */
import type { Algebraic } from '../field/index.ts';
import type { Polynomial } from '../polynomial/index.ts';
import { denominatorDegrees, poleOrders } from './degrees.ts';
import { binomial } from './dimensions.ts';
import type { Sampler } from './evaluation.ts';
import { MIXED_MOST } from './fixed-forms.ts';
import { restrictToCoordinates } from './linear-action.ts';
import { areIndependent, isParameterSystem, subsets } from './parameters.ts';
import { PieceSearch } from './piece-search.ts';
import { InvariantSpaces } from './reynolds.ts';

export interface Parameter {
  readonly block: number;
  readonly degree: number;
  readonly polynomial: Polynomial<Algebraic>;
}

export interface ParameterPlan {
  readonly parameters: readonly Parameter[];
  /** True if they generate the ring of invariants (one block only). */
  readonly polynomialRing: boolean;
}

/** Highest degree in which parameters are looked for, and subsets tried in one degree. */
export const PARAMETER_DEGREE_MOST = 60;
const SUBSETS_MOST = 120;

/** Parameters among the minimal generators of each block; undefined if some block has none within reach. */
export function planParameters(spaces: InvariantSpaces): ParameterPlan | undefined {
  const { action, ring } = spaces;
  const known = new Map<string, { degree: number; polynomial: Polynomial<Algebraic> }[] | undefined>();
  const parameters: Parameter[] = [];
  let polynomialRing = action.blocks.length === 1;
  for (let b = 0; b < action.blocks.length; b++) {
    const block = action.blocks[b]!;
    const part = restrictToCoordinates(action, block);
    const key = part.generatorMatrices.map((m) => m.data.map((x) => action.field.key(x)).join(' ')).join(';');
    if (!known.has(key)) {
      const found = blockParameters(action.blocks.length === 1 ? spaces : new InvariantSpaces(part));
      known.set(key, found?.forms);
      if (found !== undefined && !found.polynomialRing) polynomialRing = false;
    }
    const forms = known.get(key);
    if (forms === undefined) return undefined;
    for (const f of forms) parameters.push({ block: b, degree: f.degree, polynomial: ring.renumber(f.polynomial, block) });
  }
  return { parameters, polynomialRing };
}

function blockParameters(
  spaces: InvariantSpaces,
): { forms: { degree: number; polynomial: Polynomial<Algebraic> }[]; polynomialRing: boolean } | undefined {
  const { action, dimensions } = spaces;
  const n = action.dimension;
  const order = action.group.order / dimensions.kernelOrder;
  const variables = Array.from({ length: n }, (_, i) => i);
  if (spaces.letters === undefined) {
    // the forms to be found have at least these degrees
    const least = Math.max(0, ...denominatorDegrees(n, poleOrders(dimensions), (d) => dimensions.dimension([d])));
    if (binomial(n + least - 1, least) > BigInt(MIXED_MOST)) return undefined;
  }
  const search = new PieceSearch(spaces);
  const most = Math.min(order, PARAMETER_DEGREE_MOST);
  for (let d = 1; d <= most; d++) {
    const before = search.generators.length;
    const dimension = dimensions.dimension([d]);
    if (dimension > 60) return undefined;
    search.addPiece({ degrees: [d], dimension });
    const { generators } = search;
    if (generators.length === before || generators.length < n) continue;
    let tried = 0;
    for (const subset of subsets(generators.length, n)) {
      if (subset.at(-1)! < before) continue;
      if (++tried > SUBSETS_MOST) break;
      const forms = subset.map((i) => generators[i]!.element.polynomial);
      const degrees = subset.map((i) => generators[i]!.degrees[0]!);
      const product = degrees.reduce((x, y) => x * y, 1);
      if (product % order !== 0) continue;
      const polynomialRing = product === order && areIndependent(action, variables, forms);
      if (polynomialRing || isParameterSystem(action, variables, forms))
        return { forms: forms.map((polynomial, i) => ({ degree: degrees[i]!, polynomial })), polynomialRing };
    }
  }
  return undefined;
}

/** Degrees in the blocks of a basis over the parameters, with multiplicities: the numerator of the graded series. */
export function numeratorPieces(
  parameters: readonly Parameter[],
  blocks: number,
  dimension: (degrees: readonly number[]) => number,
): Array<{ degrees: number[]; count: number }> {
  const tops = Array.from({ length: blocks }, (_, b) => parameters.reduce((s, f) => (f.block === b ? s + f.degree - 1 : s), 0));
  const strides = tops.map((_, b) => tops.slice(b + 1).reduce((s, t) => s * (t + 1), 1));
  const size = tops.reduce((s, t) => s * (t + 1), 1);
  const at = (i: number) => tops.map((t, b) => Math.floor(i / strides[b]!) % (t + 1));
  const counts = Array.from({ length: size }, (_, i) => dimension(at(i)));
  for (const f of parameters)
    for (let i = size - 1; i >= 0; i--) if (at(i)[f.block]! >= f.degree) counts[i] = counts[i]! - counts[i - f.degree * strides[f.block]!]!;
  return counts
    .flatMap((count, i) => (count === 0 ? [] : [{ degrees: at(i), count }]))
    .sort((x, y) => total(x.degrees) - total(y.degrees) || (x.degrees < y.degrees ? 1 : -1));
}

/** Number of multidegrees that `numeratorPieces` looks at. */
export function boxSize(parameters: readonly Parameter[], blocks: number): number {
  let size = 1;
  for (let b = 0; b < blocks; b++) size *= parameters.reduce((s, f) => (f.block === b ? s + f.degree - 1 : s), 1);
  return size;
}

/** Values of power products of parameters of one block, by degree. */
export class PowerProducts {
  readonly #sampler: Sampler;
  readonly #values: ReadonlyArray<ReadonlyArray<{ degree: number; values: Int32Array }>>;
  readonly #cache = new Map<string, Int32Array[]>();
  constructor(sampler: Sampler, parameters: readonly Parameter[], blocks: number) {
    this.#sampler = sampler;
    this.#values = Array.from({ length: blocks }, (_, b) =>
      parameters.filter((f) => f.block === b).map((f) => ({ degree: f.degree, values: sampler.values(f.polynomial) })),
    );
  }
  /** Products of parameters with these degrees in the blocks. */
  of(degrees: readonly number[]): Int32Array[] {
    let out: Int32Array[] = [new Int32Array(this.#sampler.count).fill(1)];
    let trivial = true;
    degrees.forEach((d, b) => {
      if (d === 0) return;
      const own = this.#block(b, d, 0);
      out = trivial ? own : out.flatMap((x) => own.map((y) => this.#sampler.product(x, y)));
      trivial = false;
    });
    return out;
  }
  #block(b: number, d: number, from: number): Int32Array[] {
    if (d === 0) return [new Int32Array(this.#sampler.count).fill(1)];
    const key = `${b},${d},${from}`;
    const known = this.#cache.get(key);
    if (known !== undefined) return known;
    const list = this.#values[b]!;
    const out: Int32Array[] = [];
    for (let i = from; i < list.length; i++)
      if (list[i]!.degree <= d)
        for (const rest of this.#block(b, d - list[i]!.degree, i)) out.push(this.#sampler.product(list[i]!.values, rest));
    this.#cache.set(key, out);
    return out;
  }
}

export const total = (degrees: readonly number[]): number => degrees.reduce((s, d) => s + d, 0);
