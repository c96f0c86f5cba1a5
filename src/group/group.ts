/** What a finite group offers to the other layers. Elements are numbered 0 … order-1, 0 is the identity. */

/** Images of the points 0 … degree-1. */
export type Permutation = Int32Array;

export interface ConjugacyClass {
  /** Element number of a representative. */
  readonly representative: number;
  readonly size: number;
  /** Order of its elements. */
  readonly order: number;
  /** Class of the inverses. */
  readonly inverse: number;
}

export interface FiniteGroup {
  /** Number of points of the faithful permutation action. */
  readonly degree: number;
  readonly order: number;
  /** Least common multiple of the element orders. */
  readonly exponent: number;
  /** Element numbers of the generators, in the order given (repeats and the identity allowed). */
  readonly generators: readonly number[];
  /** Element i > 0 is generators[via[i]] after element parent[i]; parent[i] < i. via[0] = parent[0] = -1. */
  readonly via: Int32Array;
  readonly parent: Int32Array;
  permutation(i: number): Permutation;
  /** Number of the element with these images, or -1. */
  indexOf(p: Permutation): number;
  /** i after j, as maps: (i j)(x) = i(j(x)). */
  multiply(i: number, j: number): number;
  inverse(i: number): number;
  power(i: number, k: number): number;
  /** Class 0 is that of the identity; then by element order, size and first representative. */
  readonly classes: readonly ConjugacyClass[];
  readonly classOf: Int32Array;
}
