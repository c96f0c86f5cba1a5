/**
 * BᵀFB in doubles for matrices with small entries that are integral over the basis of the field: exact as long as every
 * sum stays below 2^53, which is known beforehand from the sizes of the entries.
 */
import type { Algebraic, RealField } from '../field/index.ts';
import type { Matrix, SparseMatrix } from '../linear/index.ts';

const structures = new WeakMap<RealField, Float64Array | undefined>();

/** The products of the basis elements, entry (i·degree + j)·degree + l the coefficient of l in that of i and j. */
function structureOf(f: RealField): Float64Array | undefined {
  if (structures.has(f)) return structures.get(f);
  const { degree } = f;
  const unit = (i: number): Algebraic => ({ c: f.zero.c.map((_, j) => (i === j ? 1n : 0n)), d: 1n });
  const products: Algebraic[] = [];
  for (let i = 0; i < degree; i++) for (let j = 0; j < degree; j++) products.push(f.mul(unit(i), unit(j)));
  const table = integers(products, degree)?.entries;
  structures.set(f, table);
  return table;
}

interface Integers {
  readonly entries: Float64Array;
  readonly largest: number;
}

/** Coefficients of integral elements, one after another; undefined if there is a denominator or a large coefficient. */
function integers(list: readonly Algebraic[], degree: number): Integers | undefined {
  const entries = new Float64Array(list.length * degree);
  let largest = 0;
  for (let k = 0; k < list.length; k++) {
    const { c, d } = list[k]!;
    if (d !== 1n) return undefined;
    for (let i = 0; i < degree; i++) {
      const x = Number(c[i]!);
      if (x === 0) continue;
      entries[k * degree + i] = x;
      if (Math.abs(x) > largest) largest = Math.abs(x);
    }
  }
  return largest <= Number.MAX_SAFE_INTEGER ? { entries, largest } : undefined;
}

/** The entries of BᵀFB, row by row; undefined where doubles might not be exact. B is n × u, F n × n. */
export function integerCongruence(basis: Matrix<Algebraic>, form: SparseMatrix<Algebraic>, f: RealField): Algebraic[] | undefined {
  const { rows: n, cols: u } = basis;
  const { degree } = f;
  const b = integers(basis.data, degree);
  const values = integers(form.value.flat(), degree);
  const structure = structureOf(f);
  if (b === undefined || values === undefined || structure === undefined) return undefined;
  let terms = degree * degree * n;
  for (const x of structure) terms = Math.max(terms, degree * degree * n * Math.abs(x));
  if (!(terms * b.largest * terms * values.largest * b.largest <= Number.MAX_SAFE_INTEGER)) return undefined;
  const places = nonzeroPlaces(b.entries, n, u, degree);
  const image = new Float64Array(n * u * degree);
  for (let i = 0, at = 0; i < n; i++)
    for (const k of form.index[i]!) {
      for (const j of places[k]!)
        addProductInPlace(image, (i * u + j) * degree, values.entries, at, b.entries, (k * u + j) * degree, structure, degree);
      at += degree;
    }
  const out = new Float64Array(u * u * degree);
  const imagePlaces = nonzeroPlaces(image, n, u, degree);
  for (let k = 0; k < n; k++)
    for (const i of places[k]!)
      for (const j of imagePlaces[k]!)
        addProductInPlace(out, (i * u + j) * degree, b.entries, (k * u + i) * degree, image, (k * u + j) * degree, structure, degree);
  return Array.from({ length: u * u }, (_, k) => {
    const c = out.subarray(k * degree, (k + 1) * degree);
    return c.every((x) => x === 0) ? f.zero : { c: Array.from(c, BigInt), d: 1n };
  });
}

/** For each row of an n × u matrix the columns that are not zero. */
function nonzeroPlaces(entries: Float64Array, n: number, u: number, degree: number): number[][] {
  const out: number[][] = [];
  for (let i = 0, at = 0; i < n; i++) {
    const row: number[] = [];
    for (let j = 0; j < u; j++, at += degree)
      for (let l = 0; l < degree; l++)
        if (entries[at + l] !== 0) {
          row.push(j);
          break;
        }
    out.push(row);
  }
  return out;
}

/** out += x y; the elements start at the given places. */
function addProductInPlace(
  out: Float64Array,
  at: number,
  x: Float64Array,
  atX: number,
  y: Float64Array,
  atY: number,
  structure: Float64Array,
  degree: number,
): void {
  for (let i = 0; i < degree; i++) {
    const s = x[atX + i]!;
    if (s === 0) continue;
    for (let j = 0; j < degree; j++) {
      const t = s * y[atY + j]!;
      if (t === 0) continue;
      const row = (i * degree + j) * degree;
      for (let l = 0; l < degree; l++) out[at + l]! += t * structure[row + l]!;
    }
  }
}
