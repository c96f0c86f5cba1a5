/**
 * Stability types of many quadratic Hamiltonians with one symmetry group: the blocks are found once, exactly, and each
 * Hessian is then restricted to them in doubles. On a block the characteristic polynomial is even; up to four dimensions
 * its roots are known in closed form.
 */
import { type Action, flowBlocks } from '../action/index.ts';
import { ShapeError } from '../errors/index.ts';
import type { RealField } from '../field/index.ts';
import { dense, inverse, type NumberMatrix, numberMatrix, orthonormalColumns, toNumberMatrix, transpose } from '../linear/index.ts';
import { generalEigenvalues } from '../linear/spectral.ts';

/** How many eigenvalues of L lie where; they add up to the dimension. */
export interface StabilityType {
  readonly zero: number;
  readonly imaginary: number;
  readonly real: number;
  /** In quadruples off both axes. */
  readonly complex: number;
}

/** Relative size, against the entries of the block squared, below which λ² or a discriminant counts as zero. */
export const TYPE_TOLERANCE = 1e-10;

interface Block {
  readonly size: number;
  readonly copies: number;
  /** size × n: rows Qᵀ W⁻ᵀ, so that Qᵀ L Q = left S Q. */
  readonly left: Float64Array;
  /** size × n: rows of Qᵀ. */
  readonly right: Float64Array;
}

/**
 * The type of L = W⁻ᵀS for every Hessian S, n × n row-major, that the action leaves invariant (the caller's to check).
 * Multiple eigenvalues count as on the axes that they are on; nothing is said about Jordan blocks.
 * Throws ShapeError for a Hessian of another size.
 */
export function stabilityTypes(action: Action): (hessian: NumberMatrix) => StabilityType {
  const n = action.dimension;
  const field: RealField = action.field;
  const poisson = toNumberMatrix(transpose(inverse(dense(action.form))), field);
  const blocks = flowBlocks(action).map(({ basis, copies }): Block => {
    const columns = Array.from({ length: basis.cols }, (_, j) =>
      Float64Array.from({ length: n }, (__, i) => field.toNumber(basis.data[i * basis.cols + j]!)),
    );
    const size = columns.length;
    const right = new Float64Array(size * n);
    const left = new Float64Array(size * n);
    orthonormalColumns(columns).forEach((q, a) => {
      right.set(q, a * n);
      for (let i = 0; i < n; i++) if (q[i] !== 0) for (let j = 0; j < n; j++) left[a * n + j]! += q[i]! * poisson.data[i * n + j]!;
    });
    return { size, copies, left, right };
  });
  const image = new Float64Array(n);
  return (hessian) => {
    if (hessian.rows !== n || hessian.cols !== n) throw new ShapeError(`a ${hessian.rows} x ${hessian.cols} Hessian on ${n} coordinates`);
    const counts = [0, 0, 0, 0];
    for (const block of blocks) {
      const l = restrict(block, hessian.data, n, image);
      for (const [kind, count] of typesOf(l, block.size)) counts[kind]! += count * block.copies;
    }
    return { zero: counts[ZERO]!, imaginary: counts[IMAGINARY]!, real: counts[REAL]!, complex: counts[COMPLEX]! };
  };
}

const ZERO = 0;
const IMAGINARY = 1;
const REAL = 2;
const COMPLEX = 3;

/** Qᵀ L Q. */
function restrict({ size, left, right }: Block, s: Float64Array, n: number, image: Float64Array): Float64Array {
  const out = new Float64Array(size * size);
  for (let a = 0; a < size; a++) {
    image.fill(0);
    for (let k = 0; k < n; k++) {
      const x = left[a * n + k]!;
      if (x !== 0) for (let j = 0, at = k * n; j < n; j++, at++) image[j]! += x * s[at]!;
    }
    for (let b = 0; b < size; b++) {
      let sum = 0;
      for (let j = 0; j < n; j++) sum += image[j]! * right[b * n + j]!;
      out[a * size + b] = sum;
    }
  }
  return out;
}

/** Kinds of eigenvalue with their numbers. */
function typesOf(l: Float64Array, size: number): (readonly [kind: number, count: number])[] {
  let square = 0;
  for (const x of l) square += x * x;
  if (square === 0) return [[ZERO, size]];
  const cut = TYPE_TOLERANCE * square;
  const byRoot = (mu: number) => (Math.abs(mu) <= cut ? ZERO : mu < 0 ? IMAGINARY : REAL);
  if (size === 2) return [[byRoot(l[1]! * l[2]! - l[0]! * l[3]!), 2]];
  if (size === 4) {
    // λ⁴ + 2 half λ² + product = 0
    const half = -traceOfSquare(l, 4) / 4;
    const product = determinant4(l);
    const discriminant = half * half - product;
    if (discriminant < -cut * square) return [[COMPLEX, 4]];
    const root = Math.sqrt(Math.max(0, discriminant));
    // the larger root first, the smaller from the product: no cancellation
    const first = half > 0 ? -half - root : -half + root;
    return [
      [byRoot(first), 2],
      [byRoot(first === 0 ? 0 : product / first), 2],
    ];
  }
  return generalEigenvalues(numberMatrix(size, size, l)).map(({ re, im }) => {
    const kind = re * re + im * im <= cut ? ZERO : Math.abs(re) ** 2 <= cut ? IMAGINARY : Math.abs(im) ** 2 <= cut ? REAL : COMPLEX;
    return [kind, 1] as const;
  });
}

function traceOfSquare(l: Float64Array, n: number): number {
  let sum = 0;
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) sum += l[i * n + j]! * l[j * n + i]!;
  return sum;
}

/** By 2 × 2 minors of the first two rows and of the last two. */
function determinant4(m: Float64Array): number {
  const minor = (r: number, i: number, j: number) => m[4 * r + i]! * m[4 * r + 4 + j]! - m[4 * r + j]! * m[4 * r + 4 + i]!;
  return (
    minor(0, 0, 1) * minor(2, 2, 3) -
    minor(0, 0, 2) * minor(2, 1, 3) +
    minor(0, 0, 3) * minor(2, 1, 2) +
    minor(0, 1, 2) * minor(2, 0, 3) -
    minor(0, 1, 3) * minor(2, 0, 2) +
    minor(0, 2, 3) * minor(2, 0, 1)
  );
}
