/** Dense matrices that know their field and both dimensions; immutable values; 0 x n and n x 0 are matrices. */
import { ShapeError } from '../errors/index.ts';
import type { Field } from '../field/index.ts';

/** Entry (i, j) is data[i * cols + j]. */
export interface Matrix<T> {
  readonly field: Field<T>;
  readonly rows: number;
  readonly cols: number;
  readonly data: readonly T[];
}

export function matrix<T>(field: Field<T>, rows: number, cols: number, data: readonly T[]): Matrix<T> {
  if (data.length !== rows * cols) throw new ShapeError(`a ${rows} x ${cols} matrix has ${rows * cols} entries, not ${data.length}`);
  return { field, rows, cols, data };
}
/** `cols` is needed only when there are no rows. */
export function fromRows<T>(field: Field<T>, rows: readonly (readonly T[])[], cols = rows[0]?.length ?? 0): Matrix<T> {
  return matrix(field, rows.length, cols, rows.flat());
}
/** Matrix with the given columns; `rows` is needed only when there are none. */
export function fromColumns<T>(field: Field<T>, columns: readonly (readonly T[])[], rows = columns[0]?.length ?? 0): Matrix<T> {
  return build(field, rows, columns.length, (i, j) => columns[j]![i]!);
}
export function build<T>(field: Field<T>, rows: number, cols: number, entry: (i: number, j: number) => T): Matrix<T> {
  const data: T[] = [];
  for (let i = 0; i < rows; i++) for (let j = 0; j < cols; j++) data.push(entry(i, j));
  return { field, rows, cols, data };
}
export function zeroMatrix<T>(field: Field<T>, rows: number, cols: number): Matrix<T> {
  return { field, rows, cols, data: new Array<T>(rows * cols).fill(field.zero) };
}
export function identity<T>(field: Field<T>, n: number): Matrix<T> {
  return build(field, n, n, (i, j) => (i === j ? field.one : field.zero));
}
export function at<T>(a: Matrix<T>, i: number, j: number): T {
  return a.data[i * a.cols + j]!;
}
export function row<T>(a: Matrix<T>, i: number): readonly T[] {
  return a.data.slice(i * a.cols, (i + 1) * a.cols);
}
export function column<T>(a: Matrix<T>, j: number): readonly T[] {
  return Array.from({ length: a.rows }, (_, i) => at(a, i, j));
}
export function columns<T>(a: Matrix<T>): T[][] {
  return Array.from({ length: a.cols }, (_, j) => column(a, j).slice());
}
export function transpose<T>(a: Matrix<T>): Matrix<T> {
  return build(a.field, a.cols, a.rows, (i, j) => at(a, j, i));
}
function sameShape<T>(a: Matrix<T>, b: Matrix<T>): void {
  if (a.rows !== b.rows || a.cols !== b.cols) throw new ShapeError(`${a.rows} x ${a.cols} against ${b.rows} x ${b.cols}`);
}
export function add<T>(a: Matrix<T>, b: Matrix<T>): Matrix<T> {
  sameShape(a, b);
  return { ...a, data: a.data.map((x, i) => a.field.add(x, b.data[i]!)) };
}
export function sub<T>(a: Matrix<T>, b: Matrix<T>): Matrix<T> {
  sameShape(a, b);
  return { ...a, data: a.data.map((x, i) => a.field.sub(x, b.data[i]!)) };
}
export function scale<T>(a: Matrix<T>, s: T): Matrix<T> {
  return { ...a, data: a.data.map((x) => a.field.mul(s, x)) };
}
export function negate<T>(a: Matrix<T>): Matrix<T> {
  return { ...a, data: a.data.map((x) => a.field.neg(x)) };
}
export function multiply<T>(a: Matrix<T>, b: Matrix<T>): Matrix<T> {
  if (a.cols !== b.rows) throw new ShapeError(`${a.rows} x ${a.cols} times ${b.rows} x ${b.cols}`);
  const f = a.field;
  const out = new Array<T>(a.rows * b.cols).fill(f.zero);
  for (let i = 0; i < a.rows; i++)
    for (let k = 0; k < a.cols; k++) {
      const x = a.data[i * a.cols + k]!;
      if (f.isZero(x)) continue;
      for (let j = 0; j < b.cols; j++) {
        const y = b.data[k * b.cols + j]!;
        if (!f.isZero(y)) out[i * b.cols + j] = f.add(out[i * b.cols + j]!, f.mul(x, y));
      }
    }
  return { field: f, rows: a.rows, cols: b.cols, data: out };
}
export function apply<T>(a: Matrix<T>, v: readonly T[]): T[] {
  const f = a.field;
  return Array.from({ length: a.rows }, (_, i) => {
    let s = f.zero;
    for (let j = 0; j < a.cols; j++) {
      const x = a.data[i * a.cols + j]!;
      if (!f.isZero(x) && !f.isZero(v[j]!)) s = f.add(s, f.mul(x, v[j]!));
    }
    return s;
  });
}
/** aᵀ m b for square m: the values of a bilinear form on two lists of columns. */
export function congruence<T>(a: Matrix<T>, m: Matrix<T>, b: Matrix<T> = a): Matrix<T> {
  return multiply(transpose(a), multiply(m, b));
}
export function equals<T>(a: Matrix<T>, b: Matrix<T>): boolean {
  return a.rows === b.rows && a.cols === b.cols && a.data.every((x, i) => a.field.equal(x, b.data[i]!));
}
export function isZeroMatrix<T>(a: Matrix<T>): boolean {
  return a.data.every((x) => a.field.isZero(x));
}
export function trace<T>(a: Matrix<T>): T {
  let s = a.field.zero;
  for (let i = 0; i < Math.min(a.rows, a.cols); i++) s = a.field.add(s, at(a, i, i));
  return s;
}
/** Columns of a, then columns of b. */
export function beside<T>(a: Matrix<T>, b: Matrix<T>): Matrix<T> {
  if (a.rows !== b.rows) throw new ShapeError(`${a.rows} rows beside ${b.rows} rows`);
  return build(a.field, a.rows, a.cols + b.cols, (i, j) => (j < a.cols ? at(a, i, j) : at(b, i, j - a.cols)));
}
/** Rows of a, then rows of b. */
export function above<T>(a: Matrix<T>, b: Matrix<T>): Matrix<T> {
  if (a.cols !== b.cols) throw new ShapeError(`${a.cols} columns above ${b.cols} columns`);
  return { field: a.field, rows: a.rows + b.rows, cols: a.cols, data: [...a.data, ...b.data] };
}
/** Block diagonal sum. */
export function directSum<T>(a: Matrix<T>, b: Matrix<T>): Matrix<T> {
  return build(a.field, a.rows + b.rows, a.cols + b.cols, (i, j) =>
    i < a.rows && j < a.cols ? at(a, i, j) : i >= a.rows && j >= a.cols ? at(b, i - a.rows, j - a.cols) : a.field.zero,
  );
}
/** Entries mapped into another field. */
export function mapMatrix<S, T>(a: Matrix<S>, field: Field<T>, f: (x: S) => T): Matrix<T> {
  return { field, rows: a.rows, cols: a.cols, data: a.data.map(f) };
}
/** Sub-matrix with the given row and column numbers. */
export function minor<T>(a: Matrix<T>, rows: readonly number[], cols: readonly number[]): Matrix<T> {
  return build(a.field, rows.length, cols.length, (i, j) => at(a, rows[i]!, cols[j]!));
}
