/**
 * Small idempotents of the real group algebra. For a subgroup H and a real linear character λ of H the
 * element e = |H|⁻¹ Σ λ(h) h cuts every copy of an irreducible K down to dim eK = ⟨K|_H, λ⟩ dimensions; the
 * best possible is β(K), the dimension of the commuting algebra. Working on eV instead of V is the Morita
 * equivalence between the block of the group algebra and its corner (common practice: symmetry-adapted bases).
 */
import { type FiniteGroup, productOf } from '../group/index.ts';

/** A subgroup with a real linear character. */
export interface Cutter {
  /** Element numbers of H. */
  readonly elements: readonly number[];
  /** λ on those elements. */
  readonly signs: readonly (1 | -1)[];
  /** dim eK for each irreducible asked for. */
  readonly dimensions: readonly number[];
}

type Product = (i: number, j: number) => number;

/** Up to this order a table of all products costs less than looking for products one by one. */
const TABLE_ORDER = 256;

/** The product of element numbers, from a table where the group is small. */
export function smallProduct(group: FiniteGroup): Product {
  return group.order <= TABLE_ORDER ? productOf(group) : (i, j) => group.multiply(i, j);
}

/** What the search needs of an irreducible: its real character by class in doubles (integers decide), β, multiplicity. */
export interface SearchedIrreducible {
  readonly values: readonly number[];
  readonly beta: 1 | 2 | 4;
  readonly multiplicity: number;
}

/** Subgroups larger than this are not tried. */
export const SUBGROUP_LIMIT = 2000;
/** At most this many second generators are tried beside each class representative. */
export const SECOND_GENERATORS = 24;

/** ⟨generators⟩ by generator and earlier element; undefined if it is too large or, but for `whole`, if it is all of the group. */
function generated(
  group: FiniteGroup,
  generators: readonly number[],
  product: Product,
  whole: boolean,
): { elements: number[]; words: number[][] } | undefined {
  const most = whole ? SUBGROUP_LIMIT : Math.min(SUBGROUP_LIMIT, group.order >> 1);
  const seen = new Uint8Array(group.order);
  seen[0] = 1;
  const elements = [0];
  const words: number[][] = [[]];
  for (let i = 0; i < elements.length; i++)
    for (let s = 0; s < generators.length; s++) {
      const x = product(generators[s]!, elements[i]!);
      if (seen[x] === 1) continue;
      seen[x] = 1;
      elements.push(x);
      words.push([s, i]);
      if (elements.length > most) return undefined;
    }
  return { elements, words };
}

/** The real linear characters of ⟨generators⟩ as sign lists along `elements`. */
function realCharacters(
  product: Product,
  generators: readonly number[],
  elements: readonly number[],
  words: readonly number[][],
): (1 | -1)[][] {
  const position: number[] = [];
  elements.forEach((e, i) => {
    position[e] = i;
  });
  const out: (1 | -1)[][] = [];
  for (let mask = 0; mask < 1 << generators.length; mask++) {
    const sign = (s: number): 1 | -1 => (mask & (1 << s) ? -1 : 1);
    const values: (1 | -1)[] = [1];
    for (let i = 1; i < elements.length; i++) values.push((sign(words[i]![0]!) * values[words[i]![1]!]!) as 1 | -1);
    const good = elements.every((e, i) => generators.every((g, s) => values[position[product(g, e)]!] === sign(s) * values[i]!));
    if (good) out.push(values);
  }
  return out;
}

/** The cutter for each irreducible: least dim eK first, then least total dimension of eV. */
export function findCutters(group: FiniteGroup, irreducibles: readonly SearchedIrreducible[]): Cutter[] {
  const n = irreducibles.length;
  const best: Array<{ cutter: Cutter; total: number } | undefined> = new Array(n).fill(undefined);
  const seen = new Set<string>();
  const product = smallProduct(group);
  const consider = (generators: readonly number[], whole = false) => {
    const closed = generated(group, generators, product, whole);
    if (closed === undefined) return;
    const { elements, words } = closed;
    const key = Int32Array.from(elements).sort().join(',');
    if (seen.has(key)) return;
    seen.add(key);
    for (const signs of realCharacters(product, generators, elements, words)) {
      const weights = new Float64Array(group.classes.length);
      elements.forEach((e, i) => {
        const c = group.classOf[e]!;
        weights[c] = weights[c]! + signs[i]!;
      });
      const dimensions = irreducibles.map((k) => {
        let s = 0;
        for (let c = 0; c < weights.length; c++) if (weights[c] !== 0) s += weights[c]! * k.values[c]!;
        return Math.round(s / elements.length);
      });
      let total = 0;
      for (let k = 0; k < n; k++) total += dimensions[k]! * irreducibles[k]!.multiplicity;
      const cutter: Cutter = { elements, signs, dimensions };
      for (let k = 0; k < n; k++) {
        const d = dimensions[k]!;
        if (d === 0) continue;
        const old = best[k];
        if (old === undefined || d < old.cutter.dimensions[k]! || (d === old.cutter.dimensions[k] && total < old.total))
          best[k] = { cutter, total };
      }
    }
  };
  const settled = () =>
    best.every(
      (b, k) =>
        b !== undefined &&
        b.cutter.dimensions[k] === irreducibles[k]!.beta &&
        b.total <= 4 * irreducibles[k]!.beta * irreducibles[k]!.multiplicity,
    );
  // the whole group is considered here once; later it is not even generated
  if (group.order <= SUBGROUP_LIMIT) consider(group.generators, true);
  consider([]);
  const representatives = group.classes.map((c) => c.representative);
  for (const x of representatives) consider([x]);
  for (const x of representatives) {
    if (settled()) break;
    // a few spread-out partners: they meet every small pattern of generation without enumerating all pairs
    const step = Math.max(1, Math.floor(group.order / SECOND_GENERATORS));
    for (let y = 1; y < group.order; y += step) consider([x, y]);
    for (const y of representatives.slice(1, SECOND_GENERATORS)) consider([x, y]);
  }
  return best.map((b) => b!.cutter);
}
