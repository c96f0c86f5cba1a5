/** Sparse matrices by rows: the form of group elements, which permute sites and mix few components. */
import { ShapeError } from '../errors/index.ts';
import type { Field } from '../field/index.ts';
import type { Matrix } from './matrix.ts';

/** Row i holds value[i][k] in column index[i][k]; columns increase, no zeros are stored. */
export interface SparseMatrix<T> {
  readonly field: Field<T>;
  readonly rows: number;
  readonly cols: number;
  readonly index: readonly (readonly number[])[];
  readonly value: readonly (readonly T[])[];
}

export function sparse<T>(a: Matrix<T>): SparseMatrix<T> {
  const index: number[][] = [];
  const value: T[][] = [];
  for (let i = 0; i < a.rows; i++) {
    const cols: number[] = [];
    const vals: T[] = [];
    for (let j = 0; j < a.cols; j++) {
      const x = a.data[i * a.cols + j]!;
      if (a.field.isZero(x)) continue;
      cols.push(j);
      vals.push(x);
    }
    index.push(cols);
    value.push(vals);
  }
  return { field: a.field, rows: a.rows, cols: a.cols, index, value };
}

export function dense<T>(a: SparseMatrix<T>): Matrix<T> {
  const data = new Array<T>(a.rows * a.cols).fill(a.field.zero);
  a.index.forEach((cols, i) => {
    cols.forEach((j, k) => {
      data[i * a.cols + j] = a.value[i]![k]!;
    });
  });
  return { field: a.field, rows: a.rows, cols: a.cols, data };
}

export function sparseIdentity<T>(field: Field<T>, n: number): SparseMatrix<T> {
  return { field, rows: n, cols: n, index: Array.from({ length: n }, (_, i) => [i]), value: Array.from({ length: n }, () => [field.one]) };
}

/** From rows of column -> value maps; zeros are dropped. */
export function sparseFromMaps<T>(field: Field<T>, cols: number, maps: readonly ReadonlyMap<number, T>[]): SparseMatrix<T> {
  const index: number[][] = [];
  const value: T[][] = [];
  for (const m of maps) {
    const keys = [...m.keys()].filter((j) => !field.isZero(m.get(j)!)).sort((a, b) => a - b);
    index.push(keys);
    value.push(keys.map((j) => m.get(j)!));
  }
  return { field, rows: maps.length, cols, index, value };
}

export function sparseTranspose<T>(a: SparseMatrix<T>): SparseMatrix<T> {
  const index: number[][] = Array.from({ length: a.cols }, () => []);
  const value: T[][] = Array.from({ length: a.cols }, () => []);
  a.index.forEach((cols, i) => {
    cols.forEach((j, k) => {
      index[j]!.push(i);
      value[j]!.push(a.value[i]![k]!);
    });
  });
  return { field: a.field, rows: a.cols, cols: a.rows, index, value };
}

export function sparseMultiply<T>(a: SparseMatrix<T>, b: SparseMatrix<T>): SparseMatrix<T> {
  if (a.cols !== b.rows) throw new ShapeError(`${a.rows} x ${a.cols} times ${b.rows} x ${b.cols}`);
  const f = a.field;
  const index: (readonly number[])[] = [];
  const value: (readonly T[])[] = [];
  for (let i = 0; i < a.rows; i++) {
    const cols = a.index[i]!;
    const vals = a.value[i]!;
    if (cols.length === 1) {
      const x = vals[0]!;
      index.push(b.index[cols[0]!]!);
      value.push(b.value[cols[0]!]!.map((y) => f.mul(x, y)));
      continue;
    }
    const sum = new Map<number, T>();
    for (let k = 0; k < cols.length; k++) {
      const row = b.index[cols[k]!]!;
      const entries = b.value[cols[k]!]!;
      for (let q = 0; q < row.length; q++) {
        const t = f.mul(vals[k]!, entries[q]!);
        const old = sum.get(row[q]!);
        sum.set(row[q]!, old === undefined ? t : f.add(old, t));
      }
    }
    const keys = [...sum.keys()].filter((j) => !f.isZero(sum.get(j)!)).sort((s, t) => s - t);
    index.push(keys);
    value.push(keys.map((j) => sum.get(j)!));
  }
  return { field: f, rows: a.rows, cols: b.cols, index, value };
}

export function sparseApply<T>(a: SparseMatrix<T>, v: readonly T[]): T[] {
  const f = a.field;
  return a.index.map((cols, i) => {
    let s = f.zero;
    const vals = a.value[i]!;
    for (let k = 0; k < cols.length; k++) {
      const y = v[cols[k]!]!;
      if (!f.isZero(y)) s = f.add(s, f.mul(vals[k]!, y));
    }
    return s;
  });
}

/** Sparse times dense. */
export function sparseTimes<T>(a: SparseMatrix<T>, b: Matrix<T>): Matrix<T> {
  if (a.cols !== b.rows) throw new ShapeError(`${a.rows} x ${a.cols} times ${b.rows} x ${b.cols}`);
  const f = a.field;
  const rows = new Array<number[] | undefined>(b.rows).fill(undefined);
  const nonzero = (k: number): number[] => {
    let list = rows[k];
    if (list === undefined) {
      list = [];
      for (let j = 0; j < b.cols; j++) if (!f.isZero(b.data[k * b.cols + j]!)) list.push(j);
      rows[k] = list;
    }
    return list;
  };
  const out = new Array<T>(a.rows * b.cols).fill(f.zero);
  for (let i = 0; i < a.rows; i++) {
    const cols = a.index[i]!;
    const vals = a.value[i]!;
    for (let q = 0; q < cols.length; q++) {
      const k = cols[q]!;
      for (const j of nonzero(k)) out[i * b.cols + j] = f.add(out[i * b.cols + j]!, f.mul(vals[q]!, b.data[k * b.cols + j]!));
    }
  }
  return { field: f, rows: a.rows, cols: b.cols, data: out };
}

export function sparseTrace<T>(a: SparseMatrix<T>): T {
  let s = a.field.zero;
  a.index.forEach((cols, i) => {
    const k = cols.indexOf(i);
    if (k >= 0) s = a.field.add(s, a.value[i]![k]!);
  });
  return s;
}

export function sparseEquals<T>(a: SparseMatrix<T>, b: SparseMatrix<T>): boolean {
  return (
    a.rows === b.rows &&
    a.cols === b.cols &&
    a.index.every(
      (cols, i) =>
        cols.length === b.index[i]!.length && cols.every((j, k) => j === b.index[i]![k] && a.field.equal(a.value[i]![k]!, b.value[i]![k]!)),
    )
  );
}

export function sparseScale<T>(a: SparseMatrix<T>, s: T): SparseMatrix<T> {
  if (a.field.isZero(s)) return { ...a, index: a.index.map(() => []), value: a.value.map(() => []) };
  return { ...a, value: a.value.map((r) => r.map((x) => a.field.mul(s, x))) };
}

/** aᵀ m a for a sparse form m and sparse a. */
export function sparseCongruence<T>(a: SparseMatrix<T>, m: SparseMatrix<T>): SparseMatrix<T> {
  return sparseMultiply(sparseTranspose(a), sparseMultiply(m, a));
}
