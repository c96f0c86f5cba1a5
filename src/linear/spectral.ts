/**
 * Eigenvalues and singular values over ml-matrix. Loaded only where used (not part of the table of contents of this
 * layer), because the library costs start-up time. What the library does badly is kept away from it: symmetric input
 * is symmetrised and declared so, wide matrices are padded or transposed, general matrices are balanced, empty ones answered here.
 */
import { Matrix as DenseMatrix, EigenvalueDecomposition, SingularValueDecomposition } from 'ml-matrix';
import { LimitError, ShapeError } from '../errors/index.ts';
import { type NumberMatrix, numberBuild, numberColumns, numberIdentity, numberMatrix, numberTranspose, requireFinite } from './floating.ts';

function dense(a: NumberMatrix): DenseMatrix {
  return DenseMatrix.from1DArray(a.rows, a.cols, a.data);
}

export interface SymmetricEigen {
  /** Ascending. */
  readonly values: Float64Array;
  /** Orthonormal eigenvectors as columns, in the order of the values. */
  readonly vectors: NumberMatrix;
}

/** Eigenvalues and orthonormal eigenvectors of the symmetric part of the n x n row-major matrix a. */
export function symmetricEigen(a: Float64Array, n: number): SymmetricEigen {
  const input = numberMatrix(n, n, a);
  requireFinite(input, 'matrix');
  if (n === 0) return { values: new Float64Array(0), vectors: numberMatrix(0, 0) };
  const symmetric = new DenseMatrix(n, n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) symmetric.set(i, j, (a[i * n + j]! + a[j * n + i]!) / 2);
  const evd = new EigenvalueDecomposition(symmetric, { assumeSymmetric: true });
  const raw = evd.realEigenvalues;
  const order = Array.from({ length: n }, (_, i) => i).sort((i, j) => raw[i]! - raw[j]!);
  const v = evd.eigenvectorMatrix;
  return { values: Float64Array.from(order, (i) => raw[i]!), vectors: numberBuild(n, n, (i, j) => v.get(i, order[j]!)) };
}

export interface Svd {
  /** rows x k, k = min(rows, cols), orthonormal columns. */
  readonly u: NumberMatrix;
  /** Descending, k of them. */
  readonly values: Float64Array;
  /** cols x k, orthonormal columns. */
  readonly v: NumberMatrix;
}

/** Thin singular value decomposition a = u diag(values) vᵀ. */
export function svd(a: NumberMatrix): Svd {
  requireFinite(a, 'matrix');
  if (a.rows === 0 || a.cols === 0) return { u: numberMatrix(a.rows, 0), values: new Float64Array(0), v: numberMatrix(a.cols, 0) };
  if (a.rows < a.cols) {
    const t = svd(numberTranspose(a));
    return { u: t.v, values: t.values, v: t.u };
  }
  const d = new SingularValueDecomposition(dense(a), { autoTranspose: false });
  const raw = d.diagonal;
  const order = Array.from({ length: a.cols }, (_, i) => i).sort((i, j) => raw[j]! - raw[i]!);
  const u = d.leftSingularVectors;
  const v = d.rightSingularVectors;
  return {
    u: numberBuild(a.rows, a.cols, (i, j) => u.get(i, order[j]!)),
    values: Float64Array.from(order, (i) => raw[i]!),
    v: numberBuild(a.cols, a.cols, (i, j) => v.get(i, order[j]!)),
  };
}

/** The a.cols singular values of a as a map on its columns (descending; zeros where there are fewer rows) with a full right basis. */
export function rightSingular(a: NumberMatrix): { readonly values: Float64Array; readonly v: NumberMatrix } {
  if (a.cols === 0) return { values: new Float64Array(0), v: numberMatrix(0, 0) };
  if (a.rows === 0) return { values: new Float64Array(a.cols), v: numberIdentity(a.cols) };
  if (a.rows >= a.cols) return svd(a);
  return svd(numberBuild(a.cols, a.cols, (i, j) => (i < a.rows ? a.data[i * a.cols + j]! : 0)));
}

/** Orthonormal basis of the directions whose singular value is at most `cut`; a.cols x nullity. */
export function nullSpace(a: NumberMatrix, cut: number): NumberMatrix {
  const { values, v } = rightSingular(a);
  return numberColumns(v, values.findIndex((s) => s <= cut) < 0 ? a.cols : values.findIndex((s) => s <= cut), a.cols);
}

/** Orthonormal basis of the `dimension` directions that a shrinks most: a null space whose dimension is known. */
export function nullSpaceOfDimension(a: NumberMatrix, dimension: number): NumberMatrix {
  if (dimension > a.cols) throw new ShapeError(`no ${dimension}-dimensional null space in ${a.cols} columns`);
  return numberColumns(rightSingular(a).v, a.cols - dimension, a.cols);
}

/**
 * d⁻¹ a d for a diagonal matrix d of powers of 2 that brings row and column norms together
 * (B. N. Parlett, C. Reinsch, Balancing a matrix for calculation of eigenvalues and eigenvectors, 1969).
 */
export function balanced(a: NumberMatrix): { readonly matrix: NumberMatrix; readonly scaling: Float64Array } {
  const n = a.rows;
  if (a.cols !== n) throw new ShapeError(`a ${a.rows} x ${a.cols} matrix is not square`);
  const data = Float64Array.from(a.data);
  const scaling = new Float64Array(n).fill(1);
  for (let sweep = 0, changed = true; changed && sweep < 100; sweep++) {
    changed = false;
    for (let i = 0; i < n; i++) {
      let c = 0;
      let r = 0;
      for (let j = 0; j < n; j++) {
        if (j === i) continue;
        c += Math.abs(data[j * n + i]!);
        r += Math.abs(data[i * n + j]!);
      }
      if (c === 0 || r === 0) continue;
      const f = 2 ** Math.round(Math.log2(r / c) / 2);
      if (f === 1 || c * f + r / f > 0.95 * (c + r)) continue;
      changed = true;
      scaling[i]! *= f;
      for (let j = 0; j < n; j++) {
        data[j * n + i]! *= f;
        data[i * n + j]! /= f;
      }
    }
  }
  return { matrix: { rows: n, cols: n, data }, scaling };
}

export interface ComplexNumber {
  readonly re: number;
  readonly im: number;
}

/**
 * The matrix in coordinates stretched by different factors between 1 and 5/4. The QR iteration of the library never ends on
 * some skew-symmetric matrices, such as [[0, 3/2, 1, 0], [-3/2, 0, 0, 1], [-1, 0, 0, 3/2], [0, -1, -3/2, 0]]; stretched, they are none.
 */
function stretched(a: NumberMatrix): NumberMatrix {
  const factor = (i: number) => 1 + ((i * 0.6180339887498949) % 1) / 4;
  return numberBuild(a.rows, a.cols, (i, j) => (a.data[i * a.cols + j]! * factor(i)) / factor(j));
}

/** Eigenvalues of a general square matrix, balanced first; no order. */
export function generalEigenvalues(a: NumberMatrix): ComplexNumber[] {
  requireFinite(a, 'matrix');
  if (a.rows === 0) return [];
  const evd = new EigenvalueDecomposition(dense(stretched(balanced(a).matrix)), { assumeSymmetric: false });
  const im = evd.imaginaryEigenvalues;
  const values = evd.realEigenvalues.map((re, i) => ({ re, im: im[i]! }));
  if (values.some((z) => !Number.isFinite(z.re) || !Number.isFinite(z.im)))
    throw new LimitError('the eigenvalue iteration did not converge');
  return values;
}

export interface HamiltonianSpectrum {
  /** All eigenvalues, λ and -λ being exact negatives of each other, neighbours in the list; by modulus, then argument. */
  readonly values: readonly ComplexNumber[];
  /** Largest distance |λ + λ'| of two computed values that were taken for a pair: a measure of the error. */
  readonly defect: number;
}

/**
 * Eigenvalues of an infinitesimally symplectic matrix. Each computed value is matched with the one nearest to its negative and
 * the two are replaced by ±(λ - λ')/2; nothing else is rounded: a real part of 1e-16 stays.
 */
export function hamiltonianEigenvalues(l: NumberMatrix): HamiltonianSpectrum {
  const raw = generalEigenvalues(l).sort((x, y) => Math.hypot(y.re, y.im) - Math.hypot(x.re, x.im));
  if (raw.length % 2 === 1) throw new ShapeError(`a symplectic space has even dimension, not ${raw.length}`);
  const pairs: ComplexNumber[] = [];
  let defect = 0;
  while (raw.length > 0) {
    const z = raw.shift()!;
    let best = 0;
    let distance = Infinity;
    raw.forEach((w, i) => {
      const d = Math.hypot(z.re + w.re, z.im + w.im);
      if (d < distance) {
        distance = d;
        best = i;
      }
    });
    const [w] = raw.splice(best, 1) as [ComplexNumber];
    defect = Math.max(defect, distance);
    const half = { re: (z.re - w.re) / 2, im: (z.im - w.im) / 2 };
    pairs.push(half.im > 0 || (half.im === 0 && half.re >= 0) ? half : { re: -half.re, im: -half.im });
  }
  pairs.sort((x, y) => Math.hypot(x.re, x.im) - Math.hypot(y.re, y.im) || Math.atan2(x.im, x.re) - Math.atan2(y.im, y.re));
  return { values: pairs.flatMap((z) => [z, { re: -z.re, im: -z.im }]), defect };
}
