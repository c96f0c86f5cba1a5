/**
 * Eigenvalues of small dense symmetric matrices of doubles: reduction to tridiagonal form by Householder reflections, then QL
 * steps with implicit shifts (J. H. Wilkinson, C. Reinsch, Linear Algebra, 1971, II/2 and II/4; from memory).
 */
import { LimitError, ShapeError } from '../errors/index.ts';
import type { NumberMatrix } from './floating.ts';

const STEPS_MOST = 60;

/** Ascending. The lower triangle is read. Throws ShapeError for a matrix that is not square, LimitError without convergence. */
export function symmetricEigenvalues(a: NumberMatrix): Float64Array {
  if (a.rows !== a.cols) throw new ShapeError(`a ${a.rows} x ${a.cols} matrix is not square`);
  const { diagonal, below } = tridiagonal(a);
  const n = diagonal.length;
  for (let l = 0; l < n; l++)
    for (let step = 0; ; step++) {
      let m = l;
      while (m < n - 1 && Math.abs(below[m]!) > Number.EPSILON * (Math.abs(diagonal[m]!) + Math.abs(diagonal[m + 1]!))) m++;
      if (m === l) break;
      if (step === STEPS_MOST) throw new LimitError('the eigenvalue iteration did not converge');
      qlStepInPlace(diagonal, below, l, m);
    }
  return diagonal.sort();
}

/** One step on the rows l … m. */
function qlStepInPlace(d: Float64Array, e: Float64Array, l: number, m: number): void {
  let g = (d[l + 1]! - d[l]!) / (2 * e[l]!);
  let r = Math.hypot(g, 1);
  g = d[m]! - d[l]! + e[l]! / (g + (g < 0 ? -r : r));
  let s = 1;
  let c = 1;
  let p = 0;
  for (let i = m - 1; i >= l; i--) {
    const f = s * e[i]!;
    const b = c * e[i]!;
    r = Math.hypot(f, g);
    e[i + 1] = r;
    if (r === 0) {
      d[i + 1] = d[i + 1]! - p;
      e[m] = 0;
      return;
    }
    s = f / r;
    c = g / r;
    g = d[i + 1]! - p;
    r = (d[i]! - g) * s + 2 * c * b;
    p = s * r;
    d[i + 1] = g + p;
    g = c * r - b;
  }
  d[l] = d[l]! - p;
  e[l] = g;
  e[m] = 0;
}

/** Diagonal, and below[i] = entry (i + 1, i); the last entry of `below` is 0. */
function tridiagonal(a: NumberMatrix): { diagonal: Float64Array; below: Float64Array } {
  const n = a.rows;
  const x = Float64Array.from(a.data);
  const below = new Float64Array(n);
  const v = new Float64Array(n);
  const w = new Float64Array(n);
  for (let k = 0; k + 2 < n; k++) {
    let norm = 0;
    for (let i = k + 1; i < n; i++) norm = Math.hypot(norm, x[i * n + k]!);
    if (norm === 0) continue;
    const head = x[(k + 1) * n + k]!;
    const alpha = head > 0 ? -norm : norm;
    // H = 1 - v vᵀ/h sends the column below the diagonal to alpha e
    for (let i = k + 1; i < n; i++) v[i] = x[i * n + k]!;
    v[k + 1] = head - alpha;
    const h = norm * norm - head * alpha;
    let inner = 0;
    for (let i = k + 1; i < n; i++) {
      let sum = 0;
      for (let j = k + 1; j <= i; j++) sum += x[i * n + j]! * v[j]!;
      for (let j = i + 1; j < n; j++) sum += x[j * n + i]! * v[j]!;
      w[i] = sum / h;
      inner += w[i]! * v[i]!;
    }
    for (let i = k + 1; i < n; i++) w[i] = w[i]! - (inner / (2 * h)) * v[i]!;
    for (let i = k + 1; i < n; i++) for (let j = k + 1; j <= i; j++) x[i * n + j]! -= v[i]! * w[j]! + w[i]! * v[j]!;
    below[k] = alpha;
  }
  if (n > 1) below[n - 2] = x[(n - 1) * n + n - 2]!;
  return { diagonal: Float64Array.from({ length: n }, (_, i) => x[i * n + i]!), below };
}

/** Eigenvalues of the pencil a - λ b, b positive definite, ascending; by the Cholesky factor of b. Throws RangeError if b is not. */
export function pencilEigenvalues(a: NumberMatrix, b: NumberMatrix): Float64Array {
  const n = a.rows;
  if (b.rows !== n || b.cols !== n) throw new ShapeError(`a ${b.rows} x ${b.cols} matrix beside a ${n} x ${a.cols} one`);
  const l = new Float64Array(n * n);
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      let sum = b.data[i * n + j]!;
      for (let k = 0; k < j; k++) sum -= l[i * n + k]! * l[j * n + k]!;
      if (i === j && !(sum > 0)) throw new RangeError('the matrix is not positive definite');
      l[i * n + j] = i === j ? Math.sqrt(sum) : sum / l[j * n + j]!;
    }
  const x = Float64Array.from(a.data);
  // l⁻¹ a, then l⁻¹ (l⁻¹ a)ᵀ
  for (let pass = 0; pass < 2; pass++) {
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) {
        let sum = x[i * n + j]!;
        for (let k = 0; k < i; k++) sum -= l[i * n + k]! * x[k * n + j]!;
        x[i * n + j] = sum / l[i * n + i]!;
      }
    for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) [x[i * n + j], x[j * n + i]] = [x[j * n + i]!, x[i * n + j]!];
  }
  return symmetricEigenvalues({ rows: n, cols: n, data: x });
}

/** Orthonormal columns with the same span, by the modified Gram-Schmidt process, each vector twice. The columns are independent. */
export function orthonormalColumns(columns: readonly Float64Array[]): Float64Array[] {
  const out: Float64Array[] = [];
  for (const column of columns) {
    const v = Float64Array.from(column);
    for (let pass = 0; pass < 2; pass++) {
      for (const q of out) {
        let s = 0;
        for (let i = 0; i < v.length; i++) s += q[i]! * v[i]!;
        if (s !== 0) for (let i = 0; i < v.length; i++) v[i]! -= s * q[i]!;
      }
      let square = 0;
      for (let i = 0; i < v.length; i++) square += v[i]! * v[i]!;
      const norm = Math.sqrt(square);
      for (let i = 0; i < v.length; i++) v[i]! /= norm;
    }
    out.push(v);
  }
  return out;
}
