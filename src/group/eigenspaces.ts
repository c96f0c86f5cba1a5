/**
 * The eigenspaces of a square matrix over GF(p) that is diagonalisable over GF(p), acting on rows.
 * A random row v is written as a sum of eigenvectors: with m the minimal polynomial of v (from its
 * Krylov sequence), v m/(x - a) at the matrix is its part for the eigenvalue a. Rows are added until
 * the parts fill the space. Every step is exact; randomness costs time only.
 */
import { inverseModulo, reduce, reduceInPlace, residueSource, rowTimes, scaleInPlace, subtractInPlace } from './modular.ts';

/** Rows in reduced echelon form: row i is 1 at pivots[i], 0 at the other pivots. */
export interface EchelonRows {
  readonly rows: Float64Array[];
  readonly pivots: number[];
}

/** A basis of each eigenspace (reduced echelon form), in the order of discovery. */
export function eigenspaces(matrix: readonly Float64Array[], p: number): EchelonRows[] {
  const k = matrix.length;
  const spaces = new Map<number, EchelonRows>();
  const next = residueSource(20_011, p);
  for (let rank = 0; rank < k; ) {
    const krylov: Float64Array[] = [Float64Array.from({ length: k }, next)];
    const m = minimalPolynomial(matrix, krylov, p);
    for (const a of roots(m, p)) {
      const part = rowTimes(quotient(m, a, p), krylov, k, p);
      let space = spaces.get(a);
      if (space === undefined) spaces.set(a, (space = { rows: [], pivots: [] }));
      if (insertInPlace(space, part, p)) rank++;
    }
  }
  return [...spaces.values()];
}

/** Extends the Krylov sequence until it becomes dependent; the monic relation, constant term first. */
function minimalPolynomial(matrix: readonly Float64Array[], krylov: Float64Array[], p: number): Float64Array {
  const k = matrix.length;
  const reduced: Float64Array[] = []; // rows [vector | combination], echelon
  const pivots: number[] = [];
  for (let d = 0; ; d++) {
    const row = new Float64Array(2 * k + 1);
    row.set(krylov[d]!);
    row[k + d] = 1;
    for (let i = 0; i < reduced.length; i++) subtractInPlace(row, row[pivots[i]!]!, reduced[i]!, p);
    let pivot = 0;
    while (pivot < k && row[pivot] === 0) pivot++;
    if (pivot === k) {
      // The combination of the krylov rows 0 … d that vanishes has coefficient 1 at row d.
      krylov.length = Math.max(1, d);
      return row.slice(k, k + d + 1);
    }
    scaleInPlace(row, inverseModulo(row[pivot]!, p), p);
    reduced.push(row);
    pivots.push(pivot);
    krylov.push(rowTimes(krylov[d]!, matrix, k, p));
  }
}

/** The roots in GF(p) of a monic polynomial that is a product of distinct linear factors. */
function roots(m: Float64Array, p: number): number[] {
  const found: number[] = [];
  let f = m;
  for (let a = 0; f.length > 1 && a < p; a++) {
    let value = 0;
    for (let i = f.length - 1; i >= 0; i--) value = reduce(value * a + f[i]!, p);
    if (value !== 0) continue;
    found.push(a);
    f = quotient(f, a, p);
  }
  if (f.length > 1) throw new Error(`a class matrix is not diagonalisable modulo ${p}`);
  return found;
}

/** m/(x - a) for a root a. */
function quotient(m: Float64Array, a: number, p: number): Float64Array {
  const q = new Float64Array(m.length - 1);
  let carry = 0;
  for (let i = m.length - 1; i > 0; i--) {
    carry = reduce(carry * a + m[i]!, p);
    q[i - 1] = carry;
  }
  return q;
}

/** Adds a row to a reduced echelon basis; false if it lies in the span already. */
function insertInPlace(space: EchelonRows, row: Float64Array, p: number): boolean {
  space.rows.forEach((r, i) => {
    subtractInPlace(row, row[space.pivots[i]!]!, r, p);
  });
  reduceInPlace(row, p);
  const pivot = row.findIndex((x) => x !== 0);
  if (pivot < 0) return false;
  scaleInPlace(row, inverseModulo(row[pivot]!, p), p);
  for (const r of space.rows) subtractInPlace(r, r[pivot]!, row, p);
  space.rows.push(row);
  space.pivots.push(pivot);
  return true;
}
