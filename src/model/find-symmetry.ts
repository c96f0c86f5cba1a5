/**
 * All signed permutations that leave a structure invariant, as a base with generators: along one path of
 * individualisations every literal of each cell is tried as the image of the base point, the deepest level first, up to
 * the orbits of what is found already. The order is the product of the lengths of the orbits (base and strong
 * generating set, common practice).
 */
import { LimitError } from '../errors/index.ts';
import { type Colouring, individualise, initialColouring } from './find-symmetry-refine.ts';
import { negated, type SignedPermutation, type SignedStructure, StructureIndex } from './find-symmetry-structure.ts';

export interface SymmetryGroup {
  readonly order: bigint;
  /** A strong generating set; each is verified exactly. */
  readonly generators: readonly SignedPermutation[];
  readonly index: StructureIndex;
}

/** Nodes of the search tree that are visited at most. */
export const SEARCH_LIMIT = 200_000;

/** The full group of signed symmetries. Throws LimitError where the search is too long. */
export function signedSymmetries(structure: SignedStructure, limit = SEARCH_LIMIT): SymmetryGroup {
  const index = new StructureIndex(structure);
  const path: Colouring[] = [initialColouring(index)];
  const base: number[] = [];
  for (;;) {
    const cell = targetCell(index, path.at(-1)!);
    if (cell === undefined) break;
    base.push(cell[0]!);
    path.push(individualise(index, path.at(-1)!, cell[0]!));
  }
  const generators: SignedPermutation[] = [];
  const orbits = new Orbits(index.literals);
  let nodes = 0;
  let order = 1n;

  const search = (level: number, right: Colouring): SignedPermutation | undefined => {
    if (++nodes > limit)
      throw new LimitError(`the search for symmetries visited more than ${limit} places without an end`, {
        expected: 'a model whose coordinates are told apart by their couplings',
        next: 'declare the symmetry that is known; it need not be found',
      });
    const left = path[level]!;
    if (left.trace !== right.trace || left.cells.length !== right.cells.length) return undefined;
    if (left.cells.some((c, i) => c.length !== right.cells[i]!.length)) return undefined;
    const guess = matched(index, left, right);
    if (guess !== undefined && index.isSymmetry(guess)) return guess;
    if (level === base.length) return undefined;
    const point = base[level]!;
    const candidates = right.cells[left.colour[point]!]!;
    const ordered = candidates.includes(point) ? [point, ...candidates.filter((c) => c !== point)] : candidates;
    for (const c of ordered) {
      const found = search(level + 1, individualise(index, right, c));
      if (found !== undefined) return found;
    }
    return undefined;
  };

  for (let level = base.length - 1; level >= 0; level--) {
    const point = base[level]!;
    const failed = new Set<number>();
    for (const c of path[level]!.cells[path[level]!.colour[point]!]!) {
      if (orbits.same(c, point)) continue;
      if (failed.has(orbits.head(c))) continue;
      const found = search(level + 1, individualise(index, path[level]!, c));
      if (found === undefined) {
        failed.add(orbits.head(c));
        continue;
      }
      generators.push(found);
      const heads = [...failed];
      orbits.join(found);
      failed.clear();
      for (const h of heads) failed.add(orbits.head(h));
    }
    order *= BigInt(orbits.size(point));
  }
  return { order, generators, index };
}

/** The smallest cell with more than one literal, τ first; undefined where all are told apart. */
function targetCell(index: StructureIndex, c: Colouring): readonly number[] | undefined {
  const tau = c.cells[c.colour[2 * index.tau]!]!;
  if (tau.length > 1) return tau;
  let best: readonly number[] | undefined;
  for (const cell of c.cells) if (cell.length > 1 && (best === undefined || cell.length < best.length)) best = cell;
  return best;
}

/** The signed permutation that maps cell to cell and moves as little as it can; undefined where negation gets in the way. */
function matched(index: StructureIndex, left: Colouring, right: Colouring): SignedPermutation | undefined {
  const to = new Int32Array(index.literals).fill(-1);
  const used = new Uint8Array(index.literals);
  const put = (x: number, y: number) => {
    to[x] = y;
    to[negated(x)] = negated(y);
    used[y] = used[negated(y)] = 1;
  };
  for (let x = 0; x < index.literals; x += 2)
    if (left.colour[x] === right.colour[x] && left.colour[x + 1] === right.colour[x + 1]) put(x, x);
  const free = right.cells.map((c) => c.filter((y) => used[y] === 0));
  const next = new Int32Array(free.length);
  for (let x = 0; x < index.literals; x++) {
    if (to[x]! >= 0) continue;
    const colour = left.colour[x]!;
    const list = free[colour]!;
    let y = -1;
    while (next[colour]! < list.length) {
      const z = list[next[colour]!]!;
      next[colour] = next[colour]! + 1;
      if (used[z] === 0 && right.colour[negated(z)] === left.colour[negated(x)]) {
        y = z;
        break;
      }
    }
    if (y < 0) return undefined;
    put(x, y);
  }
  const m = index.tau;
  return {
    images: Int32Array.from({ length: m + 1 }, (_, i) => to[2 * i]! >> 1),
    signs: Int8Array.from({ length: m + 1 }, (_, i) => (to[2 * i]! % 2 === 0 ? 1 : -1)),
  };
}

/** Orbits of literals under the permutations joined so far. */
class Orbits {
  readonly #parent: Int32Array;
  readonly #size: Int32Array;
  constructor(n: number) {
    this.#parent = Int32Array.from({ length: n }, (_, i) => i);
    this.#size = new Int32Array(n).fill(1);
  }
  head(x: number): number {
    while (this.#parent[x] !== x) {
      this.#parent[x] = this.#parent[this.#parent[x]!]!;
      x = this.#parent[x]!;
    }
    return x;
  }
  same(x: number, y: number): boolean {
    return this.head(x) === this.head(y);
  }
  size(x: number): number {
    return this.#size[this.head(x)]!;
  }
  join({ images, signs }: SignedPermutation): void {
    images.forEach((to, i) => {
      const s = signs[i] === 1 ? 0 : 1;
      this.#unite(2 * i, 2 * to + s);
      this.#unite(2 * i + 1, 2 * to + (1 - s));
    });
  }
  #unite(x: number, y: number): void {
    const [a, b] = [this.head(x), this.head(y)];
    if (a === b) return;
    this.#parent[a] = b;
    this.#size[b] = this.#size[b]! + this.#size[a]!;
  }
}
