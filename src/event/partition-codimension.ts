/**
 * Codimensions from Jordan partitions, in integers. Dimensions of centralisers: Collingwood & McGovern, Nilpotent Orbits in Semisimple
 * Lie Algebras (1993), cor. 6.1.4; Hamiltonian matrices without symmetry: Galin 1975/1982; with reversing elements the codimension in
 * the class is half of (centraliser + dim P - dim 𝔤₀) (Kostant & Rallis, Orbits and representations associated with symmetric spaces,
 * 1971, from memory). The ten classes are numbered as in the documentation: 1 sp, 2 u, 3 so*, and with reversing elements
 * 4, 5 (sp), 6, 7, 8 (u), 9, 10 (so*).
 */
import { InputError } from '../errors/index.ts';

export type ClassNumber = 1 | 2 | 3 | 4 | 5 | 6 | 7 | 8 | 9 | 10;

/** `count` copies of the irreducible K (and K⊗σ) carry blocks of this size: count · dim K blocks in the real Jordan list. */
export interface BlockCount {
  readonly size: number;
  readonly count: number;
}

/** Imaginary pair ±iω, real pair ±a, quadruple ±a±ib. */
export type EigenvalueKind = 'imaginary' | 'real' | 'quadruple';

type Family = 'sp' | 'u' | 'so*';

const FAMILY: Readonly<Record<ClassNumber, Family>> = {
  1: 'sp',
  2: 'u',
  3: 'so*',
  4: 'sp',
  5: 'sp',
  6: 'u',
  7: 'u',
  8: 'u',
  9: 'so*',
  10: 'so*',
};

/** dim P - dim 𝔤₀ over the dimension of the complex multiplicity space of χ; 0 where there is no reversing element. */
const EXCESS: Readonly<Record<ClassNumber, readonly [number, number]>> = {
  1: [0, 1],
  2: [0, 1],
  3: [0, 1],
  4: [1, 2],
  5: [-1, 2],
  6: [0, 1],
  7: [1, 1],
  8: [-1, 1],
  9: [1, 2],
  10: [-1, 2],
};

const DOUBLED: ReadonlySet<ClassNumber> = new Set([5, 8, 10]);

function validPartition(parts: readonly number[]): number[] {
  for (const p of parts)
    if (!Number.isSafeInteger(p) || p < 1)
      throw new InputError(`${p} is not a part of a partition`, { value: parts.join(', '), expected: 'positive integers' });
  return [...parts].sort((a, b) => b - a);
}

/** Conjugate partition: i-th entry = number of parts ≥ i. */
export function conjugatePartition(parts: readonly number[]): number[] {
  const sorted = validPartition(parts);
  return Array.from({ length: sorted[0] ?? 0 }, (_, i) => sorted.filter((p) => p > i).length);
}

/** All partitions of n, parts descending, in reverse lexicographic order. */
export function partitions(n: number, largest = n): number[][] {
  if (n === 0) return [[]];
  const out: number[][] = [];
  for (let p = Math.min(n, largest); p >= 1; p--) for (const rest of partitions(n - p, p)) out.push([p, ...rest]);
  return out;
}

const sizeOf = (parts: readonly number[]) => parts.reduce((a, b) => a + b, 0);
const squares = (parts: readonly number[]) => conjugatePartition(parts).reduce((a, b) => a + b * b, 0);
const oddParts = (parts: readonly number[]) => parts.filter((p) => p % 2 === 1).length;

/** Repeated parts of the other parity come in even numbers. */
function requireEvenMultiplicity(parts: readonly number[], parity: number, algebra: string): void {
  for (const p of new Set(parts))
    if (p % 2 === parity && parts.filter((q) => q === p).length % 2 === 1)
      throw new InputError(`no nilpotent element of ${algebra} has the blocks ${parts.join(', ')}`, {
        expected: `each ${parity === 1 ? 'odd' : 'even'} part an even number of times`,
      });
}

/** dim of the centraliser in gl(n) or u(a, b): Σ (λ*_i)². */
export function centraliserGl(parts: readonly number[]): number {
  return squares(parts);
}

/** dim of the centraliser in sp(2k): ½(Σ (λ*_i)² + number of odd parts). Throws InputError if λ does not occur. */
export function centraliserSp(parts: readonly number[]): number {
  requireEvenMultiplicity(parts, 1, 'sp');
  return (squares(parts) + oddParts(parts)) / 2;
}

/** dim of the centraliser in so(n): ½(Σ (λ*_i)² - number of odd parts). Throws InputError if λ does not occur. */
export function centraliserSo(parts: readonly number[]): number {
  requireEvenMultiplicity(parts, 0, 'so');
  return (squares(parts) - oddParts(parts)) / 2;
}

/** dim of the centraliser in so*(2m), λ the partition of m over the quaternions: that of so(2m) with every part doubled. */
export function centraliserSoStar(parts: readonly number[]): number {
  return centraliserSo([...parts, ...parts]);
}

/** λ over the complex multiplicity space: n_j parts j in classes 1, 2, 4, 6, 7 and 2 n_j in 3, 5, 8, 9, 10; descending. */
export function partitionOfBlocks(classNumber: ClassNumber, blocks: readonly BlockCount[]): number[] {
  const times = [3, 5, 8, 9, 10].includes(classNumber) ? 2 : 1;
  for (const { size, count } of blocks)
    if (!Number.isSafeInteger(size) || size < 1 || !Number.isSafeInteger(count) || count < 0)
      throw new InputError(`${count} blocks of size ${size}`, { expected: 'positive sizes and counts, as integers' });
  return validPartition(blocks.flatMap(({ size, count }) => new Array<number>(times * count).fill(size)));
}

function inClass(classNumber: ClassNumber, centraliser: number, dimension: number, parts: readonly number[]): number {
  if (classNumber <= 3) return centraliser;
  const [n, d] = EXCESS[classNumber];
  const value = (centraliser + (n * dimension) / d) / 2;
  if (!Number.isSafeInteger(value) || value < 0)
    throw new InputError(`the blocks ${parts.join(', ')} do not occur in class ${classNumber}`, { value: parts.join(', ') });
  return value;
}

/** Orbit codimension in the class of a zero event whose complex multiplicity space has the partition λ. Throws InputError if λ does not occur. */
export function zeroCodimensionOfPartition(classNumber: ClassNumber, parts: readonly number[]): number {
  const family = FAMILY[classNumber];
  const c = family === 'sp' ? centraliserSp(parts) : family === 'u' ? centraliserGl(parts) : centraliserSo(parts);
  return inClass(classNumber, c, sizeOf(parts), parts);
}

/** Orbit codimension in the class of a zero event with n_j copies of K (and K⊗σ) carrying blocks of size j. */
export function codimensionByClass(classNumber: ClassNumber, blocks: readonly BlockCount[]): number {
  return zeroCodimensionOfPartition(classNumber, partitionOfBlocks(classNumber, blocks));
}

/** Parameters that a family of codimension 0 uses up on the eigenvalue itself. */
export function freeParameters(kind: EigenvalueKind): 1 | 2 {
  return kind === 'quadruple' ? 2 : 1;
}

/**
 * Orbit codimension in the class of one cluster off zero. λ is the Jordan partition of L at ONE eigenvalue λ of the cluster on the complex
 * multiplicity space of χ. What the other elements of the cluster are: in classes 1, 3, 4, 5, 9, 10 its negative and conjugates; in 2, 7, 8
 * the negative conjugate alone, so that eigenvalues iω and -iω of χ are two clusters whose orbit codimensions add; in 6 all of them again.
 * In classes 5, 8, 10 all parts, in 3 and 9 those of real pairs, come in equal pairs. Throws InputError if λ does not occur.
 */
export function clusterOrbitCodimension(classNumber: ClassNumber, kind: EigenvalueKind, parts: readonly number[]): number {
  // a quaternionic structure or an invariant skew form on the eigenspace doubles every block
  if (DOUBLED.has(classNumber) || (kind === 'real' && FAMILY[classNumber] === 'so*'))
    for (const p of new Set(parts))
      if (parts.filter((q) => q === p).length % 2 === 1)
        throw new InputError(`the blocks ${parts.join(', ')} do not occur off zero in class ${classNumber}`, {
          value: parts.join(', '),
          expected: 'each part an even number of times',
        });
  const self = squares(parts);
  const r = sizeOf(parts);
  let copies: number;
  let dimension: number;
  if (FAMILY[classNumber] !== 'u') {
    copies = kind === 'quadruple' ? 2 : 1;
    dimension = (kind === 'quadruple' ? 4 : 2) * r;
  } else {
    const halves = kind === 'imaginary' ? 1 : 2;
    copies = classNumber === 6 && kind !== 'real' ? 2 * halves : halves;
    dimension = copies * r;
  }
  return inClass(classNumber, copies * self, dimension, parts);
}

/** Bundle codimension of a collision: the orbit codimensions of its parts (one irreducible each) together, minus the free parameters once. */
export function collisionCodimension(
  kind: EigenvalueKind,
  members: readonly { readonly classNumber: ClassNumber; readonly partition: readonly number[] }[],
): number {
  return members.reduce((sum, m) => sum + clusterOrbitCodimension(m.classNumber, kind, m.partition), 0) - freeParameters(kind);
}

/** The spectrum of a Hamiltonian matrix without symmetry: one partition at zero and one per distinct pair or quadruple. */
export interface SpectrumType {
  readonly zero: readonly number[];
  readonly clusters: readonly { readonly kind: EigenvalueKind; readonly partition: readonly number[] }[];
}

/** Orbit and bundle codimension in sp(2n, R), cluster by cluster. */
export function spectrumCodimension(type: SpectrumType): { readonly orbit: number; readonly bundle: number } {
  let orbit = centraliserSp(type.zero);
  let free = 0;
  for (const { kind, partition } of type.clusters) {
    orbit += clusterOrbitCodimension(1, kind, partition);
    free += freeParameters(kind);
  }
  return { orbit, bundle: orbit - free };
}

/**
 * The same orbit codimension by Galin's formula: ½ Σ_{λ≠0} Σ_j (2j-1) n_j(λ) + ½ Σ_j (2j-1) m_j + Σ_j (2(2j-1) m̃_j + 1) + 2 Σ_{j,k}
 * min(m_j, m̃_k), where n_1 ≥ n_2 ≥ … are the blocks of each nonzero eigenvalue, m_j the even blocks at zero, m̃_j the pairs of odd ones
 * (D. M. Galin, Versal deformations of linear Hamiltonian systems, 1975/1982; Arnold, Mathematical Methods of Classical Mechanics, app. 6).
 */
export function galinCodimension(type: SpectrumType): number {
  const weighted = (parts: readonly number[]) => validPartition(parts).reduce((s, p, j) => s + (2 * j + 1) * p, 0);
  requireEvenMultiplicity(type.zero, 1, 'sp');
  const eigenvalues = { imaginary: 2, real: 2, quadruple: 4 };
  let twice = 0;
  for (const { kind, partition } of type.clusters) twice += eigenvalues[kind] * weighted(partition);
  const zero = validPartition(type.zero);
  const even = zero.filter((p) => p % 2 === 0);
  const pairs = zero.filter((p) => p % 2 === 1).filter((_, i) => i % 2 === 0);
  twice += weighted(even) + 2 * (2 * weighted(pairs) + pairs.length);
  for (const m of even) for (const t of pairs) twice += 4 * Math.min(m, t);
  return twice / 2;
}

/** Parameters that a Hermitian matrix over R, C or H (β = 1, 2, 4) needs for an r-fold zero: r + β r (r - 1)/2 (von Neumann & Wigner 1929). */
export function corankCodimension(beta: 1 | 2 | 4, r: number): number {
  return r + (beta * r * (r - 1)) / 2;
}

/** The same for an r-fold eigenvalue at a place that is free. */
export function coincidenceCodimension(beta: 1 | 2 | 4, r: number): number {
  return corankCodimension(beta, r) - 1;
}
