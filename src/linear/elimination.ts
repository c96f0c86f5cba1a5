/** Exact Gaussian elimination over any field: echelon form, rank, kernel, image, solutions, inverse, determinant. */
import { ShapeError } from '../errors/index.ts';
import type { Field } from '../field/index.ts';
import { at, beside, build, fromColumns, identity, type Matrix, zeroMatrix } from './matrix.ts';

/** Reduced row echelon form; pivots[i] is the column of the leading one of row i. */
export interface Echelon<T> {
  readonly matrix: Matrix<T>;
  readonly pivots: readonly number[];
}

/** Reduced row echelon form, rows of zeros dropped. */
export function echelon<T>(a: Matrix<T>): Echelon<T> {
  const f = a.field;
  const rows: T[][] = [];
  for (let i = 0; i < a.rows; i++) {
    const r = a.data.slice(i * a.cols, (i + 1) * a.cols) as T[];
    if (r.some((x) => !f.isZero(x))) rows.push(r);
  }
  const pivots: number[] = [];
  let done = 0;
  for (let j = 0; j < a.cols && done < rows.length; j++) {
    let best = -1;
    let weight = Infinity;
    for (let i = done; i < rows.length; i++) {
      if (f.isZero(rows[i]![j]!)) continue;
      let w = 0;
      for (const x of rows[i]!) if (!f.isZero(x)) w++;
      if (w < weight) {
        weight = w;
        best = i;
      }
    }
    if (best < 0) continue;
    [rows[done], rows[best]] = [rows[best]!, rows[done]!];
    const pivot = rows[done]!;
    const inverse = f.inv(pivot[j]!);
    if (!f.equal(inverse, f.one)) for (let k = j; k < a.cols; k++) if (!f.isZero(pivot[k]!)) pivot[k] = f.mul(inverse, pivot[k]!);
    for (let i = 0; i < rows.length; i++) {
      if (i === done) continue;
      const r = rows[i]!;
      const g = r[j]!;
      if (f.isZero(g)) continue;
      for (let k = j; k < a.cols; k++) if (!f.isZero(pivot[k]!)) r[k] = f.sub(r[k]!, f.mul(g, pivot[k]!));
    }
    pivots.push(j);
    done++;
  }
  return { matrix: { field: f, rows: done, cols: a.cols, data: rows.slice(0, done).flat() }, pivots };
}

export function rank<T>(a: Matrix<T>): number {
  return echelon(a.rows > a.cols ? build(a.field, a.cols, a.rows, (i, j) => at(a, j, i)) : a).pivots.length;
}

/** Basis of {x : a x = 0} as columns; a.cols x nullity. */
export function kernel<T>(a: Matrix<T>): Matrix<T> {
  const f = a.field;
  const { matrix: e, pivots } = echelon(a);
  const free: number[] = [];
  for (let j = 0, i = 0; j < a.cols; j++) {
    if (pivots[i] === j) i++;
    else free.push(j);
  }
  const columns = free.map((j) => {
    const v = new Array<T>(a.cols).fill(f.zero);
    v[j] = f.one;
    pivots.forEach((p, i) => {
      v[p] = f.neg(at(e, i, j));
    });
    return v;
  });
  return fromColumns(f, columns, a.cols);
}

/** Basis of the column space: the pivot columns of a. */
export function image<T>(a: Matrix<T>): Matrix<T> {
  const { pivots } = echelon(a);
  return build(a.field, a.rows, pivots.length, (i, j) => at(a, i, pivots[j]!));
}

/** One solution X of a X = b (free unknowns zero), or undefined if there is none. */
export function solve<T>(a: Matrix<T>, b: Matrix<T>): Matrix<T> | undefined {
  const { matrix: e, pivots } = echelon(beside(a, b));
  if (pivots.some((p) => p >= a.cols)) return undefined;
  const f = a.field;
  const out = new Array<T>(a.cols * b.cols).fill(f.zero);
  pivots.forEach((p, i) => {
    for (let j = 0; j < b.cols; j++) out[p * b.cols + j] = at(e, i, a.cols + j);
  });
  return { field: f, rows: a.cols, cols: b.cols, data: out };
}

/** Throws ShapeError if a is not square, RangeError if it is singular. */
export function inverse<T>(a: Matrix<T>): Matrix<T> {
  if (a.rows !== a.cols) throw new ShapeError(`a ${a.rows} x ${a.cols} matrix has no inverse`);
  const x = solve(a, identity(a.field, a.rows));
  if (x === undefined || rank(a) < a.rows) throw new RangeError('singular matrix');
  return x;
}

export function determinant<T>(a: Matrix<T>): T {
  const f: Field<T> = a.field;
  const n = a.rows;
  if (a.cols !== n) throw new ShapeError(`a ${a.rows} x ${a.cols} matrix has no determinant`);
  const rows = Array.from({ length: n }, (_, i) => a.data.slice(i * n, (i + 1) * n) as T[]);
  let det = f.one;
  for (let j = 0; j < n; j++) {
    const p = rows.findIndex((r, i) => i >= j && !f.isZero(r[j]!));
    if (p < 0) return f.zero;
    if (p !== j) {
      [rows[p], rows[j]] = [rows[j]!, rows[p]!];
      det = f.neg(det);
    }
    const pivot = rows[j]!;
    det = f.mul(det, pivot[j]!);
    const inv = f.inv(pivot[j]!);
    for (let i = j + 1; i < n; i++) {
      const r = rows[i]!;
      if (f.isZero(r[j]!)) continue;
      const g = f.mul(inv, r[j]!);
      for (let k = j; k < n; k++) r[k] = f.sub(r[k]!, f.mul(g, pivot[k]!));
    }
  }
  return det;
}

/** Basis (columns) of a complement of the column space of a in the whole space: unit vectors. */
export function complement<T>(a: Matrix<T>): Matrix<T> {
  const n = a.rows;
  const { pivots } = echelon(beside(a, identity(a.field, n)));
  const units = pivots.filter((p) => p >= a.cols).map((p) => p - a.cols);
  return build(a.field, n, units.length, (i, j) => (i === units[j] ? a.field.one : a.field.zero));
}

/** Basis of the intersection of two column spaces. */
export function intersection<T>(a: Matrix<T>, b: Matrix<T>): Matrix<T> {
  if (a.cols === 0 || b.cols === 0) return zeroMatrix(a.field, a.rows, 0);
  const k = kernel(beside(a, b));
  const columns = Array.from({ length: k.cols }, (_, j) =>
    Array.from({ length: a.rows }, (_, i) => {
      let s = a.field.zero;
      for (let l = 0; l < a.cols; l++) s = a.field.add(s, a.field.mul(at(a, i, l), at(k, l, j)));
      return s;
    }),
  );
  return image(fromColumns(a.field, columns, a.rows));
}
