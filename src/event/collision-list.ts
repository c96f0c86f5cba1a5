/**
 * The collisions off zero of bundle codimension 1 that an action allows. A pair off zero of the least kind has one free parameter, so
 * two of them on different blocks cost 1 and pass; on one block the nilpotent pair [2] costs 1 and splits. On blocks of complex type
 * modes of V and of its conjugate pass, and a real pair costs 1, being a quadruple closed up. Costs come from ./partition-codimension.ts.
 */
import type { BlockCapacity } from './event-list.ts';
import { type ClassNumber, clusterOrbitCodimension } from './partition-codimension.ts';

export interface ListedCollision {
  readonly kind: 'imaginary' | 'real';
  readonly components: readonly string[];
  /** Jordan blocks at one eigenvalue of the cluster, descending. */
  readonly blocks: readonly number[];
  readonly codimension: 1;
  readonly motion: 'passes' | 'splits';
  /** In words, what meets. */
  readonly between: string;
}

/** dim of the complex multiplicity space of χ over the copies of K, and dim χ (times what a reversing element adds) over dim K. */
const SPACE: Readonly<Record<ClassNumber, readonly [number, number]>> = {
  1: [1, 1],
  2: [1, 1 / 2],
  3: [2, 1 / 2],
  4: [2, 1],
  5: [2, 1 / 2],
  6: [2, 1],
  7: [1, 1 / 2],
  8: [2, 1 / 4],
  9: [2, 1 / 2],
  10: [4, 1 / 2],
};

const hermitian = (c: ClassNumber): boolean => c === 2 || c === 7 || c === 8;
/** Blocks come in equal pairs: off zero in classes 5, 8, 10, at real eigenvalues in 3 and 9 too. */
const paired = (c: ClassNumber, kind: 'imaginary' | 'real'): boolean =>
  c === 5 || c === 8 || c === 10 || (kind === 'real' && (c === 3 || c === 9));

interface Cluster {
  readonly cost: number;
  readonly sizes: readonly number[];
  readonly nilpotent: boolean;
}

/** The pair with one Jordan block of the given size for each forced copy, if it fits into the block. */
function cluster(b: BlockCapacity, kind: 'imaginary' | 'real', size: number): Cluster | undefined {
  const c = b.classNumber;
  const parts = new Array<number>(paired(c, kind) ? 2 : 1).fill(size);
  const used = parts.length * size * (kind === 'imaginary' && hermitian(c) ? 1 : 2);
  const [space, chi] = SPACE[c];
  if (used > space * b.copies) return undefined;
  // a nilpotent pair and a real one span a space of signature (n, n)
  if (b.signature !== null && (size > 1 || kind === 'real') && Math.min(...b.signature) * space * 2 < used) return undefined;
  const times = b.dimension * chi * parts.length * (kind === 'real' && hermitian(c) ? 2 : 1);
  return { cost: clusterOrbitCodimension(c, kind, parts), sizes: new Array<number>(times).fill(size), nilpotent: size > 1 };
}

/** All collisions of codimension 1, imaginary ones first, on one block before two. */
export function simpleCollisions(blocks: readonly BlockCapacity[]): ListedCollision[] {
  const out: ListedCollision[] = [];
  for (const kind of ['imaginary', 'real'] as const) {
    const what = kind === 'imaginary' ? 'frequencies' : 'rates';
    const least = blocks.map((b) => cluster(b, kind, 1));
    blocks.forEach((b, i) => {
      const add = (sizes: readonly number[], motion: 'passes' | 'splits', between: string) =>
        out.push({ kind, components: b.labels, blocks: sizes, codimension: 1, motion, between });
      const simple = least[i];
      if (simple?.cost === 2) add(simple.sizes, 'passes', `two ${what} with one value: a quadruple that closes to a pair`);
      const double = cluster(b, kind, 2);
      if (double?.cost === 2) add(double.sizes, 'splits', `two ${what} of one component, of opposite signature`);
      if (kind === 'imaginary' && hermitian(b.classNumber) && b.copies >= 2 && simple?.cost === 1)
        add([...simple.sizes, ...simple.sizes], 'passes', 'a mode that turns with one that turns the other way');
    });
    for (let i = 0; i < blocks.length; i++)
      for (let j = i + 1; j < blocks.length; j++) {
        const [x, y] = [least[i], least[j]];
        if (x?.cost !== 1 || y?.cost !== 1) continue;
        out.push({
          kind,
          components: [...blocks[i]!.labels, ...blocks[j]!.labels],
          blocks: [...x.sizes, ...y.sizes],
          codimension: 1,
          motion: 'passes',
          between: `two ${what} of different components`,
        });
      }
  }
  return out;
}
