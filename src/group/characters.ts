/**
 * Exact tables of complex irreducible characters: the method of Dixon (1967) and Schneider (1990)
 * modulo a small prime, lifted to Q(zeta_e), e the exponent. The result is checked modulo a second,
 * larger prime before it is returned: orthogonality of rows by Freivalds' test (R. Freivalds, Fast
 * probabilistic algorithms, 1979; from memory), sum of squared degrees, indicators in {1, 0, -1}.
 */
import { LimitError } from '../errors/errors.ts';
import { isPrime } from '../field/arithmetic.ts';
import { CyclotomicField } from '../field/cyclotomic.ts';
import type { Algebraic } from '../field/number-field.ts';
import { rootOfUnity } from '../field/prime.ts';
import { type CharacterValue, liftCharacter, type RootSum, ValueStore } from './character-values.ts';
import { nonlinearCharacters } from './class-algebra.ts';
import type { FiniteGroup } from './group.ts';
import { linearCharacters } from './linear-characters.ts';
import { inverseModulo, powersModulo, reduce, residueSource } from './modular.ts';
import { powerClasses } from './powers.ts';

/** A table holds the square of this many values. */
export const CLASS_LIMIT = 3000;

export type Indicator = 1 | 0 | -1;

export interface CharacterTable {
  /** Q(zeta_e), e the exponent of the group. */
  readonly field: CyclotomicField;
  readonly order: number;
  readonly classSizes: readonly number[];
  /** Class of the inverses. */
  readonly inverseClass: readonly number[];
  /** Entry [c][k] is the class of g^k, g in class c. */
  readonly powers: readonly Int32Array[];
  /** The trivial character is first; then by degree, indicator (1, -1, 0) and values. */
  readonly degrees: readonly number[];
  /** Irreducible x class. */
  readonly values: readonly (readonly Algebraic[])[];
  /** Frobenius-Schur indicators: 1 real, 0 complex, -1 quaternionic. */
  readonly indicators: readonly Indicator[];
  /** Number of the complex conjugate. */
  readonly conjugate: readonly number[];
  /** The same values modulo a prime = 1 mod e below 2^26. */
  readonly prime: number;
  readonly residues: readonly Int32Array[];
  /** The same values in floating point. */
  readonly real: readonly Float64Array[];
  readonly imaginary: readonly Float64Array[];
  /** Eigenvalues of the elements of class c in irreducible i, as powers of zeta_e. */
  eigenvalues(i: number, c: number): RootSum;
}

/** Throws LimitError past CLASS_LIMIT classes, Error if a check of the result fails. */
export function characterTable(group: FiniteGroup): CharacterTable {
  const n = group.classes.length;
  if (n > CLASS_LIMIT)
    throw new LimitError(`a character table with ${n} conjugacy classes is too large`, {
      value: `${n} classes, order ${group.order}`,
      expected: `at most ${CLASS_LIMIT} classes`,
    });
  const e = group.exponent;
  const field = CyclotomicField.of(e);
  const prime = primeBelow(2 ** 26, e);
  const store = new ValueStore(field, prime, rootOfUnity(e, prime));
  const powers = powerClasses(group);
  const linear = linearCharacters(group);
  const rows: { degree: number; values: CharacterValue[] }[] = linear.exponents.map((row) => ({
    degree: 1,
    values: Array.from(row, (k) => store.root(k)),
  }));
  if (rows.length < n) {
    const p = primeAbove(Math.max(2 * Math.sqrt(group.order), 512), e);
    const theta = powersModulo(rootOfUnity(e, p), e, p);
    for (const { degree, values } of nonlinearCharacters(group, linear.cosetOfClass, p))
      rows.push({ degree, values: liftCharacter(values, degree, powers, theta, p, store) });
  }
  return assemble(group, field, powers, prime, rows);
}

function assemble(
  group: FiniteGroup,
  field: CyclotomicField,
  powers: readonly Int32Array[],
  prime: number,
  rows: readonly { degree: number; values: CharacterValue[] }[],
): CharacterTable {
  const order = group.order;
  const classSizes = group.classes.map((c) => c.size);
  const inverseClass = group.classes.map((c) => c.inverse);
  const squares = Int32Array.from(powers, (row) => row[2 % row.length]!);
  const unsorted = rows.map(({ degree, values }) => ({
    degree,
    values,
    residues: Int32Array.from(values, (v) => v.residue),
    real: Float64Array.from(values, (v) => v.re),
    imaginary: Float64Array.from(values, (v) => v.im),
    indicator: 0 as Indicator,
  }));
  const inverseOrder = inverseModulo(order % prime, prime);
  for (const row of unsorted) row.indicator = indicatorOf(row.residues, classSizes, squares, inverseOrder, prime);
  const sorted = unsorted.sort((a, b) => compareRows(a, b));
  const residues = sorted.map((r) => r.residues);
  const degrees = sorted.map((r) => r.degree);
  if (degrees.reduce((s, d) => s + d * d, 0) !== order || rows.length !== classSizes.length)
    throw new Error('the squared degrees of the characters do not add up to the order of the group');
  checkOrthogonality(residues, classSizes, inverseClass, order, prime);
  const conjugate = conjugates(residues, inverseClass, prime);
  sorted.forEach((r, i) => {
    if ((r.indicator !== 0) !== (conjugate[i] === i)) throw new Error(`the indicator of character ${i} does not fit its conjugate`);
  });
  return {
    field,
    order,
    classSizes,
    inverseClass,
    powers,
    degrees,
    values: sorted.map((r) => r.values.map((v) => v.exact)),
    indicators: sorted.map((r) => r.indicator),
    conjugate,
    prime,
    residues,
    real: sorted.map((r) => r.real),
    imaginary: sorted.map((r) => r.imaginary),
    eigenvalues: (i, c) => sorted[i]!.values[c]!,
  };
}

interface SortableRow {
  readonly degree: number;
  readonly indicator: Indicator;
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/** Trivial first, then degree, then real, quaternionic, complex, then larger values first, conjugates side by side. */
function compareRows(a: SortableRow, b: SortableRow): number {
  if (a.degree !== b.degree) return a.degree - b.degree;
  const rank = (i: Indicator): number => (i === 0 ? 2 : i === 1 ? 0 : 1);
  if (a.indicator !== b.indicator) return rank(a.indicator) - rank(b.indicator);
  return compareVectors(b.real, a.real) || compareVectors(b.imaginary, a.imaginary);
}

/** Lexicographic; distinct sums of roots of unity that are closer than 1e-9 count as equal and are told apart later in the row. */
function compareVectors(a: Float64Array, b: Float64Array): number {
  for (let i = 0; i < a.length; i++) {
    const d = a[i]! - b[i]!;
    if (Math.abs(d) > 1e-9) return d;
  }
  return 0;
}

/** (1/|G|) sum chi(g^2). */
function indicatorOf(row: Int32Array, sizes: readonly number[], squares: Int32Array, inverseOrder: number, p: number): Indicator {
  let sum = 0;
  for (let c = 0; c < sizes.length; c++) sum = reduce(sum + row[squares[c]!]! * sizes[c]!, p);
  const nu = reduce(sum * inverseOrder, p);
  if (nu === 0 || nu === 1) return nu;
  if (nu === p - 1) return -1;
  throw new Error('a Frobenius-Schur indicator is not 1, 0 or -1');
}

/** X D X* v = |G| v for two reproducible random columns v; a wrong table passes with probability p^-2. */
function checkOrthogonality(
  rows: readonly Int32Array[],
  sizes: readonly number[],
  inverse: readonly number[],
  order: number,
  p: number,
): void {
  const n = rows.length;
  const next = residueSource(4_099, p);
  for (let trial = 0; trial < 2; trial++) {
    const v = Float64Array.from({ length: n }, next);
    const w = new Float64Array(n);
    for (let i = 0; i < n; i++) {
      const row = rows[i]!;
      for (let c = 0; c < n; c++) w[c] = reduce(w[c]! + row[inverse[c]!]! * v[i]!, p);
    }
    for (let c = 0; c < n; c++) w[c] = reduce(w[c]! * (sizes[c]! % p), p);
    for (let i = 0; i < n; i++) {
      const row = rows[i]!;
      let sum = 0;
      for (let c = 0; c < n; c++) sum = reduce(sum + row[c]! * w[c]!, p);
      if (sum !== reduce(v[i]! * (order % p), p)) throw new Error('the characters found are not orthogonal');
    }
  }
}

/** For each row the number of the row with its values at the inverse classes. */
function conjugates(rows: readonly Int32Array[], inverse: readonly number[], p: number): number[] {
  const find = rowFinder(rows, p);
  return rows.map((row) => {
    const i = find(Int32Array.from(inverse, (c) => row[c]!));
    if (i < 0) throw new Error('the complex conjugate of a character is missing');
    return i;
  });
}

/** Looks rows of residues up among given ones: their number, or -1. */
export function rowFinder(rows: readonly Int32Array[], p: number): (row: Int32Array) => number {
  const next = residueSource(7_919, p);
  const weights = Float64Array.from(rows[0] ?? [], next);
  const hash = (row: Int32Array): number => {
    let h = 0;
    for (let c = 0; c < row.length; c++) h = reduce(h + row[c]! * weights[c]!, p);
    return h;
  };
  const buckets = new Map<number, number[]>();
  rows.forEach((row, i) => {
    const h = hash(row);
    const bucket = buckets.get(h);
    if (bucket === undefined) buckets.set(h, [i]);
    else bucket.push(i);
  });
  return (row) => (buckets.get(hash(row)) ?? []).find((i) => rows[i]!.every((x, c) => x === row[c])) ?? -1;
}

/** The smallest prime = 1 mod n that exceeds a bound. */
function primeAbove(bound: number, n: number): number {
  let p = n * Math.floor(bound / n) + 1;
  while (p <= bound || !isPrime(p)) p += n;
  return p;
}

/** The largest prime = 1 mod n below a bound. */
function primeBelow(bound: number, n: number): number {
  let p = n * Math.floor((bound - 2) / n) + 1;
  while (!isPrime(p)) p -= n;
  return p;
}
