/**
 * The generalised kernel of L = JS on one multiplicity space, exactly: E_1 = ker L, E_{j+1} = {x : Lx ∈ E_j}.
 * dim E_j = nullity of L^j, so the second differences of these dimensions count the Jordan blocks.
 */
import type { Algebraic } from '../field/index.ts';
import { beside, build, inverse, kernel, type Matrix, multiply, negate, transpose } from '../linear/index.ts';

/** J = W^{-T} of a symplectic matrix. */
export function poisson(w: Matrix<Algebraic>): Matrix<Algebraic> {
  return transpose(inverse(w));
}

export interface GeneralisedKernel {
  /** ker L^j for j = 1, 2, … up to the first repeat. */
  readonly dimensions: readonly number[];
  /** Basis of E_0 (columns); its first dimensions[0] columns span ker L. */
  readonly basis: Matrix<Algebraic>;
  /** blocks[j] = number of Jordan blocks of size j at zero (index 0 unused). */
  readonly blocks: readonly number[];
}

export function generalisedKernel(l: Matrix<Algebraic>): GeneralisedKernel {
  const n = l.rows;
  let e = kernel(l);
  const dimensions: number[] = [e.cols];
  while (e.cols > 0 && e.cols < n) {
    // Lx = E y, the kernel of [L | −E]; x alone determines y because E has full rank
    const k = kernel(beside(l, negate(e)));
    const next = build(l.field, n, k.cols, (i, j) => k.data[i * k.cols + j]!);
    if (next.cols === e.cols) break;
    e = next;
    dimensions.push(e.cols);
  }
  const blocks: number[] = [0];
  for (let j = 1; j <= dimensions.length; j++) {
    const d = (i: number) => (i === 0 ? 0 : (dimensions[i - 1] ?? dimensions.at(-1)!));
    blocks.push(2 * d(j) - d(j - 1) - d(j + 1));
  }
  return { dimensions, basis: e, blocks };
}

/** The map induced on an invariant subspace: X with basis·X = m·basis, by coordinates in chosen rows. */
export function inducedMap(
  m: Matrix<Algebraic>,
  basis: Matrix<Algebraic>,
  coordinates: (images: Matrix<Algebraic>) => Matrix<Algebraic>,
): Matrix<Algebraic> {
  return coordinates(multiply(m, basis));
}
