/**
 * The determinant of a matrix of rational functions as a list of polynomials to be multiplied: one for each set of rows
 * that is coupled, over a common denominator. Fraction-free elimination (Bareiss 1968, from memory) in several symbols,
 * interpolation in one.
 */
import type { Algebraic, RealField } from '../field/index.ts';
import { determinant, type Matrix } from '../linear/index.ts';
import { divideExactly, gcdPolynomials, type RationalFunction, type RationalFunctionField } from '../polynomial/index.ts';
import type { Factor, Poly, Ring } from './factored-squares.ts';
import { polynomialDeterminant } from './thresholds.ts';

/** Rows that are coupled: at most so many with no symbol or one, or with several; and terms of one polynomial on the way. */
const ROWS_ONE = 12;
const ROWS_SEVERAL = 8;
const TERMS = 400;

/** det m as a product of powers; one factor is zero where it vanishes identically. Undefined where it is too large. */
export function determinantParts(m: Matrix<RationalFunction<Algebraic>>, f: RationalFunctionField<Algebraic>): Factor[] | undefined {
  const out: Factor[] = [];
  for (const rows of coupledRows(m, f)) {
    const part = minorParts(m, rows, f);
    if (part === undefined) return undefined;
    out.push(...part);
  }
  return out;
}

/** The rows of a symmetric pattern in connected sets. */
function coupledRows(m: Matrix<RationalFunction<Algebraic>>, f: RationalFunctionField<Algebraic>): number[][] {
  const set = Array.from({ length: m.rows }, (_, i) => i);
  const root = (i: number): number => {
    let r = i;
    while (set[r] !== r) r = set[r]!;
    return r;
  };
  for (let i = 0; i < m.rows; i++) for (let j = 0; j < m.cols; j++) if (!f.isZero(m.data[i * m.cols + j]!)) set[root(i)] = root(j);
  const sets = new Map<number, number[]>();
  for (let i = 0; i < m.rows; i++) sets.set(root(i), [...(sets.get(root(i)) ?? []), i]);
  return [...sets.values()];
}

function minorParts(
  m: Matrix<RationalFunction<Algebraic>>,
  rows: readonly number[],
  f: RationalFunctionField<Algebraic>,
): Factor[] | undefined {
  const { ring } = f;
  const out: Factor[] = [];
  const entries = rows.map((i) => {
    const row = rows.map((j) => m.data[i * m.cols + j]!);
    let common = ring.one;
    for (const { denominator } of row)
      common = ring.mul(common, divideExactly(ring, denominator, gcdPolynomials(ring, common, denominator))!);
    if (!ring.isConstant(common)) out.push({ polynomial: common, power: -1 });
    return row.map((x) => ring.mul(x.numerator, divideExactly(ring, common, x.denominator)!));
  });
  const symbols = new Set(entries.flat().flatMap((p) => ring.support(p)));
  const [only] = symbols;
  let d: Poly | undefined;
  if (symbols.size < 2) d = rows.length > ROWS_ONE ? undefined : inOneSymbol(entries, only ?? 0, ring);
  else d = rows.length > ROWS_SEVERAL ? undefined : eliminated(entries, ring);
  return d === undefined ? undefined : [{ polynomial: d, power: 1 }, ...out];
}

function inOneSymbol(entries: readonly (readonly Poly[])[], v: number, ring: Ring): Poly {
  const field = ring.field as RealField;
  const n = entries.length;
  const flat = entries.flat().map((p) => ring.coefficientsIn(p, v).map((c) => ring.constantTerm(c)));
  const length = flat.reduce((max, c) => Math.max(max, c.length), 1);
  const at = (k: number): Matrix<Algebraic> => ({ field, rows: n, cols: n, data: flat.map((c) => c[k] ?? field.zero) });
  if (length === 1) return ring.constant(determinant(at(0)));
  const d = polynomialDeterminant(
    Array.from({ length }, (_, k) => at(k)),
    field,
  );
  return ring.fromTerms(d.map((c, k) => [String.fromCharCode(v).repeat(k), c] as const));
}

/** Every division is exact; undefined where an entry grows beyond the limit. */
function eliminated(entries: readonly (readonly Poly[])[], ring: Ring): Poly | undefined {
  const rows = entries.map((r) => r.slice());
  const n = rows.length;
  let last = ring.one;
  let negative = false;
  for (let k = 0; k + 1 < n; k++) {
    let pivot = -1;
    for (let i = k; i < n; i++) {
      const x = rows[i]![k]!;
      if (!ring.isZero(x) && (pivot < 0 || x.monomials.length < rows[pivot]![k]!.monomials.length)) pivot = i;
    }
    if (pivot < 0) return ring.zero;
    if (pivot !== k) {
      [rows[pivot], rows[k]] = [rows[k]!, rows[pivot]!];
      negative = !negative;
    }
    const head = rows[k]!;
    for (let i = k + 1; i < n; i++) {
      const row = rows[i]!;
      for (let j = k + 1; j < n; j++) {
        const x = divideExactly(ring, ring.sub(ring.mul(head[k]!, row[j]!), ring.mul(row[k]!, head[j]!)), last)!;
        if (x.monomials.length > TERMS) return undefined;
        row[j] = x;
      }
    }
    last = head[k]!;
  }
  const d = n === 0 ? ring.one : rows[n - 1]![n - 1]!;
  return negative ? ring.neg(d) : d;
}
