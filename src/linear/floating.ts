/**
 * Dense matrices of doubles, row-major. They answer what the exact matrices answer, but never decide a rank:
 * a routine that needs a rank takes it, or a cut, from its caller. 0 x n and n x 0 are matrices.
 */
import { InputError, ShapeError } from '../errors/index.ts';
import type { OrderedField } from '../field/index.ts';
import type { Matrix } from './matrix.ts';

/** Entry (i, j) is data[i * cols + j]. */
export interface NumberMatrix {
  readonly rows: number;
  readonly cols: number;
  readonly data: Float64Array;
}

/** rows x cols matrix of the given row-major entries; throws ShapeError if their number is wrong. */
export function numberMatrix(rows: number, cols: number, data: ArrayLike<number> = new Float64Array(rows * cols)): NumberMatrix {
  if (data.length !== rows * cols) throw new ShapeError(`a ${rows} x ${cols} matrix has ${rows * cols} entries, not ${data.length}`);
  return { rows, cols, data: data instanceof Float64Array ? data : Float64Array.from(data) };
}

/** `cols` is needed only when there are no rows. */
export function numberRows(rows: readonly (readonly number[])[], cols = rows[0]?.length ?? 0): NumberMatrix {
  return numberMatrix(rows.length, cols, rows.flat());
}

export function numberBuild(rows: number, cols: number, entry: (i: number, j: number) => number): NumberMatrix {
  const data = new Float64Array(rows * cols);
  for (let i = 0; i < rows; i++) for (let j = 0; j < cols; j++) data[i * cols + j] = entry(i, j);
  return { rows, cols, data };
}

export function numberIdentity(n: number): NumberMatrix {
  return numberBuild(n, n, (i, j) => (i === j ? 1 : 0));
}

/** Nearest doubles of an exact matrix. */
export function toNumberMatrix<T>(a: Matrix<T>, field: OrderedField<T>): NumberMatrix {
  return numberMatrix(
    a.rows,
    a.cols,
    a.data.map((x) => field.toNumber(x)),
  );
}

export function numberAt(a: NumberMatrix, i: number, j: number): number {
  return a.data[i * a.cols + j]!;
}

export function numberTranspose(a: NumberMatrix): NumberMatrix {
  const { rows, cols, data } = a;
  const out = new Float64Array(data.length);
  for (let i = 0; i < rows; i++) for (let j = 0; j < cols; j++) out[j * rows + i] = data[i * cols + j]!;
  return { rows: cols, cols: rows, data: out };
}

export function numberMultiply(a: NumberMatrix, b: NumberMatrix): NumberMatrix {
  if (a.cols !== b.rows) throw new ShapeError(`${a.rows} x ${a.cols} times ${b.rows} x ${b.cols}`);
  const n = b.cols;
  const out = new Float64Array(a.rows * n);
  for (let i = 0; i < a.rows; i++)
    for (let k = 0; k < a.cols; k++) {
      const x = a.data[i * a.cols + k]!;
      if (x === 0) continue;
      const from = k * n;
      const to = i * n;
      for (let j = 0; j < n; j++) out[to + j]! += x * b.data[from + j]!;
    }
  return { rows: a.rows, cols: n, data: out };
}

/** aᵀ m b: the values of a bilinear form on two lists of columns. */
export function numberCongruence(a: NumberMatrix, m: NumberMatrix, b: NumberMatrix = a): NumberMatrix {
  return numberMultiply(numberTranspose(a), numberMultiply(m, b));
}

/** a + factor b. */
export function numberCombine(a: NumberMatrix, b: NumberMatrix, factor = 1): NumberMatrix {
  if (a.rows !== b.rows || a.cols !== b.cols) throw new ShapeError(`${a.rows} x ${a.cols} against ${b.rows} x ${b.cols}`);
  return { rows: a.rows, cols: a.cols, data: a.data.map((x, i) => x + factor * b.data[i]!) };
}

export function numberScale(a: NumberMatrix, factor: number): NumberMatrix {
  return { rows: a.rows, cols: a.cols, data: a.data.map((x) => factor * x) };
}

/** Columns of a, then columns of b. */
export function numberBeside(a: NumberMatrix, b: NumberMatrix): NumberMatrix {
  if (a.rows !== b.rows) throw new ShapeError(`${a.rows} rows beside ${b.rows} rows`);
  return numberBuild(a.rows, a.cols + b.cols, (i, j) => (j < a.cols ? numberAt(a, i, j) : numberAt(b, i, j - a.cols)));
}

/** Rows of a, then rows of b. */
export function numberAbove(a: NumberMatrix, b: NumberMatrix): NumberMatrix {
  if (a.cols !== b.cols) throw new ShapeError(`${a.cols} columns above ${b.cols} columns`);
  const data = new Float64Array(a.data.length + b.data.length);
  data.set(a.data);
  data.set(b.data, a.data.length);
  return { rows: a.rows + b.rows, cols: a.cols, data };
}

/** Columns from, …, to - 1. */
export function numberColumns(a: NumberMatrix, from: number, to: number): NumberMatrix {
  return numberBuild(a.rows, to - from, (i, j) => numberAt(a, i, from + j));
}

/** Largest absolute entry; 0 for an empty matrix. */
export function largestEntry(a: NumberMatrix): number {
  let best = 0;
  for (const x of a.data) if (Math.abs(x) > best) best = Math.abs(x);
  return best;
}

/** ½(a + aᵀ) for square a. */
export function symmetricPart(a: NumberMatrix): NumberMatrix {
  if (a.rows !== a.cols) throw new ShapeError(`a ${a.rows} x ${a.cols} matrix is not square`);
  return numberBuild(a.rows, a.cols, (i, j) => (numberAt(a, i, j) + numberAt(a, j, i)) / 2);
}

/** Throws InputError naming the first entry that is not a finite number. */
export function requireFinite(a: NumberMatrix, name: string): void {
  const k = a.data.findIndex((x) => !Number.isFinite(x));
  if (k >= 0)
    throw new InputError(`${name} has an entry that is not a finite number`, {
      key: `${name}[${Math.floor(k / a.cols) + 1}][${(k % a.cols) + 1}]`,
      value: String(a.data[k]),
      expected: 'finite numbers',
    });
}

/** a = q r with q orthogonal (rows x rows) and r upper trapezoidal, by Householder reflections (A. S. Householder 1958). */
export function householderQr(a: NumberMatrix): { readonly q: NumberMatrix; readonly r: NumberMatrix } {
  const { rows: m, cols: n } = a;
  const r = Float64Array.from(a.data);
  const q = numberIdentity(m).data;
  const v = new Float64Array(m);
  for (let k = 0; k < Math.min(m - 1, n); k++) {
    let norm = 0;
    for (let i = k; i < m; i++) norm = Math.hypot(norm, r[i * n + k]!);
    if (norm === 0) continue;
    const alpha = r[k * n + k]! > 0 ? -norm : norm;
    for (let i = k; i < m; i++) v[i] = r[i * n + k]! / norm;
    v[k]! -= alpha / norm;
    let square = 0;
    for (let i = k; i < m; i++) square += v[i]! * v[i]!;
    for (let j = k; j < n; j++) {
      let s = 0;
      for (let i = k; i < m; i++) s += v[i]! * r[i * n + j]!;
      s *= 2 / square;
      for (let i = k; i < m; i++) r[i * n + j]! -= s * v[i]!;
    }
    for (let i = 0; i < m; i++) {
      let s = 0;
      for (let l = k; l < m; l++) s += q[i * m + l]! * v[l]!;
      s *= 2 / square;
      for (let l = k; l < m; l++) q[i * m + l]! -= s * v[l]!;
    }
    for (let i = k + 1; i < m; i++) r[i * n + k] = 0;
  }
  return { q: { rows: m, cols: m, data: q }, r: { rows: m, cols: n, data: r } };
}

/** Orthonormal basis of the span of the columns, which the caller knows to be independent; rows x cols. */
export function orthonormalise(a: NumberMatrix): NumberMatrix {
  if (a.cols > a.rows) throw new ShapeError(`${a.cols} vectors of length ${a.rows} are not independent`);
  return numberColumns(householderQr(a).q, 0, a.cols);
}

/** Solution of the square system a X = b, by elimination with partial pivoting. Throws RangeError on an exactly zero pivot. */
export function numberSolve(a: NumberMatrix, b: NumberMatrix): NumberMatrix {
  const n = a.rows;
  if (a.cols !== n || b.rows !== n) throw new ShapeError(`${a.rows} x ${a.cols} system with ${b.rows} right-hand rows`);
  const m = b.cols;
  const l = Float64Array.from(a.data);
  const x = Float64Array.from(b.data);
  const swapInPlace = (data: Float64Array, width: number, i: number, j: number) => {
    for (let k = 0; k < width; k++) {
      const t = data[i * width + k]!;
      data[i * width + k] = data[j * width + k]!;
      data[j * width + k] = t;
    }
  };
  for (let k = 0; k < n; k++) {
    let p = k;
    for (let i = k + 1; i < n; i++) if (Math.abs(l[i * n + k]!) > Math.abs(l[p * n + k]!)) p = i;
    const pivot = l[p * n + k]!;
    if (pivot === 0) throw new RangeError('singular matrix');
    if (p !== k) {
      swapInPlace(l, n, p, k);
      swapInPlace(x, m, p, k);
    }
    for (let i = k + 1; i < n; i++) {
      const g = l[i * n + k]! / pivot;
      if (g === 0) continue;
      for (let j = k + 1; j < n; j++) l[i * n + j]! -= g * l[k * n + j]!;
      for (let j = 0; j < m; j++) x[i * m + j]! -= g * x[k * m + j]!;
    }
  }
  for (let k = n - 1; k >= 0; k--)
    for (let j = 0; j < m; j++) {
      let s = x[k * m + j]!;
      for (let i = k + 1; i < n; i++) s -= l[k * n + i]! * x[i * m + j]!;
      x[k * m + j] = s / l[k * n + k]!;
    }
  return { rows: n, cols: m, data: x };
}
