/**
 * Field elements by number. The vectors of an orbit of a finite group have few distinct entries, so that a product or a
 * sum is computed once and looked up afterwards.
 */
import { type Algebraic, gcd, type RealField } from '../field/index.ts';
import type { SparseMatrix } from '../linear/index.ts';

/** A pair of numbers below this is one key. */
const WIDTH = 2 ** 26;

export class ValueTable {
  readonly field: RealField;
  /** Number 0 is zero, number 1 is one. */
  readonly values: Algebraic[] = [];
  readonly #numbers = new Map<string, number>();
  readonly #products = new Map<number, number>();
  readonly #doubles: number[] = [];
  readonly #sums = new Map<number, number>();

  constructor(field: RealField) {
    this.field = field;
    this.number(field.zero);
    this.number(field.one);
  }
  /** The number of an element, a new one if it was not met before. */
  number(x: Algebraic): number {
    const key = this.field.key(x);
    let k = this.#numbers.get(key);
    if (k === undefined) {
      k = this.values.push(x) - 1;
      this.#numbers.set(key, k);
    }
    return k;
  }
  mul(a: number, b: number): number {
    if (a === 1 || b === 0) return b;
    if (b === 1 || a === 0) return a;
    const key = a * WIDTH + b;
    let k = this.#products.get(key);
    if (k === undefined) {
      k = this.number(this.field.mul(this.values[a]!, this.values[b]!));
      this.#products.set(key, k);
    }
    return k;
  }
  add(a: number, b: number): number {
    if (a === 0) return b;
    if (b === 0) return a;
    const key = a * WIDTH + b;
    let k = this.#sums.get(key);
    if (k === undefined) {
      k = this.number(this.field.add(this.values[a]!, this.values[b]!));
      this.#sums.set(key, k);
    }
    return k;
  }
  /** In floating point. */
  double(a: number): number {
    return (this.#doubles[a] ??= this.field.toNumber(this.values[a]!));
  }

  /** The sums of the values with given numbers by place, 0 to size - 1. */
  sums(size: number, places: readonly number[], terms: readonly number[]): Algebraic[] {
    return this.#integerSums(size, places, terms) ?? this.#fieldSums(size, places, terms);
  }

  #fieldSums(size: number, places: readonly number[], terms: readonly number[]): Algebraic[] {
    const out = new Array<Algebraic>(size).fill(this.field.zero);
    terms.forEach((term, k) => {
      out[places[k]!] = this.field.add(out[places[k]!]!, this.values[term]!);
    });
    return out;
  }

  /** The same in integers over a common denominator; undefined if they could leave the range where doubles are exact. */
  #integerSums(size: number, places: readonly number[], terms: readonly number[]): Algebraic[] | undefined {
    const { degree, zero } = this.field;
    const met = [...new Set(terms)];
    let denominator = 1n;
    for (const k of met) {
      const { d } = this.values[k]!;
      if (denominator % d !== 0n) denominator *= d / gcd(denominator, d);
    }
    const scaled: number[][] = [];
    let largest = Number(denominator);
    for (const k of met) {
      const { c, d } = this.values[k]!;
      scaled[k] = c.map((x) => Number(x * (denominator / d)));
      for (const x of scaled[k]) largest = Math.max(largest, Math.abs(x));
    }
    if (!(largest * terms.length <= Number.MAX_SAFE_INTEGER)) return undefined;
    const sum = new Float64Array(size * degree);
    for (let k = 0; k < terms.length; k++) {
      const term = scaled[terms[k]!]!;
      const at = places[k]! * degree;
      for (let i = 0; i < degree; i++) sum[at + i]! += term[i]!;
    }
    return Array.from({ length: size }, (_, j) => {
      const row = sum.subarray(j * degree, (j + 1) * degree);
      return row.every((x) => x === 0) ? zero : this.field.element(Array.from(row, BigInt), denominator);
    });
  }
}

/** A sparse matrix with the numbers of its values. */
export interface NumberedMatrix {
  readonly index: readonly (readonly number[])[];
  readonly numbers: readonly (readonly number[])[];
}

export function numberedMatrix(a: SparseMatrix<Algebraic>, values: ValueTable): NumberedMatrix {
  return { index: a.index, numbers: a.value.map((row) => row.map((x) => values.number(x))) };
}

/** The product of two square matrices of the same size. */
export function multiplyNumbered(a: NumberedMatrix, b: NumberedMatrix, values: ValueTable): NumberedMatrix {
  const n = a.index.length;
  const sum = new Int32Array(n);
  const index: number[][] = [];
  const numbers: number[][] = [];
  for (let i = 0; i < n; i++) {
    const cols = a.index[i]!;
    const places: number[] = [];
    for (let k = 0; k < cols.length; k++) {
      const x = a.numbers[i]![k]!;
      const row = b.index[cols[k]!]!;
      const entries = b.numbers[cols[k]!]!;
      for (let q = 0; q < row.length; q++) {
        const j = row[q]!;
        if (sum[j] === 0) places.push(j); // again, if terms have cancelled here: left out below
        sum[j] = values.add(sum[j]!, values.mul(x, entries[q]!));
      }
    }
    places.sort((s, t) => s - t);
    const own: number[] = [];
    const found: number[] = [];
    for (const j of places) {
      if (sum[j] === 0) continue;
      own.push(j);
      found.push(sum[j]!);
      sum[j] = 0;
    }
    index.push(own);
    numbers.push(found);
  }
  return { index, numbers };
}

export function sparseOfNumbers(a: NumberedMatrix, values: ValueTable): SparseMatrix<Algebraic> {
  const n = a.index.length;
  return { field: values.field, rows: n, cols: n, index: a.index, value: a.numbers.map((row) => row.map((k) => values.values[k]!)) };
}
