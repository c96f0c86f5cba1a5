/**
 * All subgroups up to conjugacy. Every subgroup is reached from the trivial one by adjoining elements of
 * prime power order one at a time; one representative of each class is extended. J. Neubüser,
 * Untersuchungen des Untergruppenverbandes endlicher Gruppen auf einer programmgesteuerten elektronischen
 * Dualmaschine, Numer. Math. 2 (1960). Departure: all such elements are adjoined, not only those that
 * normalise the subgroup, so that perfect subgroups need no list.
 */
import { LimitError } from '../errors/errors.ts';
import { factorize } from '../field/arithmetic.ts';
import { closeGroup } from './closure.ts';
import { adjoinInPlace, generate, normalizer, type PartialSubgroup, productOf, trivialSubgroup } from './generate.ts';
import type { FiniteGroup } from './group.ts';
import { residueSource } from './modular.ts';

export interface SubgroupClass {
  readonly order: number;
  /** Element numbers of a representative, increasing. */
  readonly elements: Int32Array;
  /** Element numbers that generate the representative. */
  readonly generators: readonly number[];
  /** Number of conjugates: the index of the normaliser. */
  readonly conjugates: number;
}

export interface SubgroupLimits {
  /** Conjugacy classes of subgroups. */
  readonly classes?: number;
  /** Roughly the products of elements formed in the search; a count, so that the outcome does not depend on the machine. */
  readonly work?: number;
}

/** F4 (order 1152, 246 classes) needs between 20 and 60 million of this work and 0.4 s; H4 (order 14400) exceeds the limit after some seconds. */
export const SUBGROUP_LIMITS: Required<SubgroupLimits> = { classes: 5000, work: 100_000_000 };

/** Increasing order, the trivial subgroup first, the group last. Throws LimitError past a limit. */
export function subgroupClasses(group: FiniteGroup, limits: SubgroupLimits = {}): SubgroupClass[] {
  const search = new SubgroupSearch(group, { ...SUBGROUP_LIMITS, ...limits });
  return search.run();
}

class SubgroupSearch {
  readonly #group: FiniteGroup;
  readonly #limits: Required<SubgroupLimits>;
  readonly #product: (i: number, j: number) => number;
  /** Conjugation by each generator, as a map of element numbers. */
  readonly #conjugations: Int32Array[];
  readonly #weights: Float64Array;
  /** Sets of elements seen, by hash; all conjugates are entered. */
  readonly #seen = new Map<number, Int32Array[]>();
  readonly #classes: SubgroupClass[] = [];
  #work = 0;

  constructor(group: FiniteGroup, limits: Required<SubgroupLimits>) {
    this.#group = group;
    this.#limits = limits;
    const product = productOf(group);
    this.#product = product;
    this.#conjugations = [...new Set(group.generators)]
      .filter((g) => g !== 0)
      .map((g) => {
        const back = group.inverse(g);
        return Int32Array.from({ length: group.order }, (_, x) => product(product(g, x), back));
      });
    this.#weights = Float64Array.from({ length: group.order }, residueSource(104_729, 2147483647));
  }

  run(): SubgroupClass[] {
    const group = this.#group;
    this.#enter(trivialSubgroup(group));
    const candidates = primePowerElements(group);
    for (let q = 0; q < this.#classes.length; q++) this.#extend(this.#classes[q]!, candidates);
    return this.#classes.sort((a, b) => a.order - b.order || b.conjugates - a.conjugates || lexicographic(a.elements, b.elements));
  }

  /** Adjoins one element of every orbit of the normaliser to a representative. */
  #extend(h: SubgroupClass, candidates: readonly number[]): void {
    const group = this.#group;
    const product = this.#product;
    const done = new Uint8Array(group.order);
    for (const x of h.elements) done[x] = 1;
    let normal: Int32Array | undefined;
    for (const z of candidates) {
      if (done[z] === 1) continue;
      const k: PartialSubgroup = { elements: Array.from(h.elements), inside: new Uint8Array(group.order), generators: [...h.generators] };
      for (const x of h.elements) k.inside[x] = 1;
      adjoinInPlace(group, k, z);
      this.#charge(k.elements.length + group.order);
      this.#enter(k);
      // With a prime index nothing lies between: every other element of k gives k again.
      const index = k.elements.length / h.order;
      const same = factorize(index).length === 1 && factorize(index)[0]![1] === 1 ? k.elements.filter((x) => done[x] === 0) : [z];
      normal ??= normalizer(group, h.elements, h.generators);
      this.#charge(group.order + normal.length * same.length);
      for (const g of normal) {
        const back = group.inverse(g);
        for (const x of same) done[product(product(g, x), back)] = 1;
      }
    }
  }

  /** Enters a subgroup and all its conjugates, unless it is known. */
  #enter(k: PartialSubgroup): void {
    const elements = Int32Array.from(k.elements).sort();
    if (!this.#add(elements)) return;
    const orbit = [elements];
    for (let i = 0; i < orbit.length; i++)
      for (const map of this.#conjugations) {
        const image = orbit[i]!.map((x) => map[x]!).sort();
        this.#charge(2 * image.length);
        if (this.#add(image)) orbit.push(image);
      }
    this.#classes.push({ order: elements.length, elements, generators: k.generators, conjugates: orbit.length });
    if (this.#classes.length > this.#limits.classes)
      throw this.#tooMany(`more than ${this.#limits.classes} conjugacy classes of subgroups`);
  }

  #add(elements: Int32Array): boolean {
    let hash = 0;
    for (const x of elements) hash += this.#weights[x]!;
    const bucket = this.#seen.get(hash);
    if (bucket === undefined) {
      this.#seen.set(hash, [elements]);
      return true;
    }
    if (bucket.some((other) => other.length === elements.length && other.every((x, i) => x === elements[i]))) return false;
    bucket.push(elements);
    return true;
  }

  #charge(products: number): void {
    this.#work += products;
    if (this.#work > this.#limits.work) throw this.#tooMany('the search for subgroups takes too long');
  }

  #tooMany(message: string): LimitError {
    return new LimitError(message, {
      value: `a group of order ${this.#group.order}, ${this.#classes.length} classes of subgroups found so far`,
      expected: `at most ${this.#limits.classes} classes and ${this.#limits.work} products`,
    });
  }
}

function lexicographic(a: Int32Array, b: Int32Array): number {
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return a[i]! - b[i]!;
  return 0;
}

/** One generator of each cyclic subgroup of prime power order, by increasing element number. */
function primePowerElements(group: FiniteGroup): number[] {
  const covered = new Uint8Array(group.order);
  const out: number[] = [];
  for (let x = 1; x < group.order; x++) {
    if (covered[x] === 1) continue;
    const order = group.classes[group.classOf[x]!]!.order;
    const factors = factorize(order);
    if (factors.length !== 1) continue;
    const p = factors[0]![0];
    out.push(x);
    for (let k = 1, y = x; k < order; k++, y = group.multiply(y, x)) if (k % p !== 0) covered[y] = 1;
  }
  return out;
}

/** The subgroup generated by some elements, as a group with its own numbering; inclusion[i] is the number of its element i in the group. */
export function subgroup(group: FiniteGroup, numbers: Iterable<number>): { group: FiniteGroup; inclusion: Int32Array } {
  const { generators } = generate(group, numbers);
  const own = closeGroup(
    generators.map((g) => group.permutation(g)),
    group.degree,
    group.order,
  );
  const inclusion = new Int32Array(own.order);
  for (let i = 1; i < own.order; i++) inclusion[i] = group.multiply(generators[own.via[i]!]!, inclusion[own.parent[i]!]!);
  return { group: own, inclusion };
}

/** The order of the normaliser. */
export function normalizerOrder(group: FiniteGroup, h: SubgroupClass): number {
  return group.order / h.conjugates;
}

/** Whether some conjugate of a lies in b. */
export function isSubconjugate(group: FiniteGroup, a: SubgroupClass, b: SubgroupClass): boolean {
  if (b.order % a.order !== 0) return false;
  const product = productOf(group);
  const inside = new Uint8Array(group.order);
  for (const x of b.elements) inside[x] = 1;
  for (let g = 0; g < group.order; g++) {
    const back = group.inverse(g);
    if (a.generators.every((x) => inside[product(product(g, x), back)] === 1)) return true;
  }
  return false;
}
