/**
 * Expressions in the symbols of a germ that must not vanish for its codimension to be what it is for generic symbols: the
 * common divisor of maximal minors of the tangent space in low degrees, and the denominators.
 */
import { type Algebraic, mulMod, powModInt, type RealField } from '../field/index.ts';
import type { LinearAction } from '../invariant/linear-action.ts';
import { at, build, fromRows, identity, kernel, type Matrix } from '../linear/index.ts';
import {
  divideExactly,
  gcdPolynomials,
  type Monomial,
  monomialsOfDegree,
  multiplyMonomials,
  type Polynomial,
  PolynomialRing,
  type RationalFunction,
  RationalFunctionField,
} from '../polynomial/index.ts';
import { GrowingEchelon } from './coinvariants.ts';
import type { GermInput } from './germ-model.ts';

/** Largest rank and most symbols that are tried. */
const RANK_MOST = 24;
const MONOMIALS_MOST = 140;
const SYMBOLS_MOST = 5;
/** Random combinations of minors that are compared. */
const MINORS = 2;

type Row = readonly Polynomial<Algebraic>[];

/** Conditions seen up to a degree. Empty without symbols; null where the matrices are too large. */
export function germConditions<T>(input: GermInput<T>, degree: number): readonly string[] | null {
  const field = input.ring.field as unknown;
  if (!(field instanceof RationalFunctionField) || field.symbols.length === 0) return [];
  const symbols = field.ring as PolynomialRing<Algebraic>;
  const h = input.h as unknown as Polynomial<RationalFunction<Algebraic>>;
  const used = new Set<number>();
  for (const c of h.coefficients) for (const q of [c.numerator, c.denominator]) for (const v of symbols.support(q)) used.add(v);
  if (used.size === 0) return [];
  if (used.size > SYMBOLS_MOST) return null;
  // one common denominator: the tangent space does not change
  let denominator = symbols.one;
  for (const c of h.coefficients)
    denominator = symbols.mul(denominator, divideExactly(symbols, c.denominator, gcdPolynomials(symbols, denominator, c.denominator))!);
  const terms = h.monomials.map((m, i) => {
    const c = h.coefficients[i]!;
    return [m, symbols.mul(c.numerator, divideExactly(symbols, denominator, c.denominator)!)] as const;
  });
  const homogeneous = terms.every(([m]) => m.length === terms[0]![0].length);
  const blocks = tangentRows(input.action, terms, degree, symbols, homogeneous);
  if (blocks === undefined) return null;
  const factors = new Set(factorsOf(symbols, denominator));
  for (const rows of blocks) {
    const found = rows.length === 0 ? symbols.one : commonMinor(rows, symbols, input.action.field as RealField);
    if (found === undefined) return null;
    for (const x of factorsOf(symbols, found)) factors.add(x);
  }
  return [...factors].sort((x, y) => x.length - y.length || (x < y ? -1 : 1));
}

/** Values of the invariant linear forms on x^a ∂_i h, exactly; for a homogeneous h one block of rows for each degree. */
function tangentRows(
  action: LinearAction,
  h: readonly (readonly [Monomial, Polynomial<Algebraic>])[],
  degree: number,
  symbols: PolynomialRing<Algebraic>,
  homogeneous: boolean,
): Row[][] | undefined {
  const f = action.field as RealField;
  const n = action.dimension;
  const ring = new PolynomialRing<Algebraic>(f, action.names);
  const order = Math.min(...h.map(([m]) => m.length));
  const offsets: number[] = [0];
  const forms: { place: Map<Monomial, number>; values: Matrix<Algebraic> }[] = [];
  for (let e = 0; e <= degree; e++) {
    const monomials = monomialsOfDegree(n, e);
    if (monomials.length > MONOMIALS_MOST) return undefined;
    const place = new Map(monomials.map((m, i) => [m, i]));
    let values: Matrix<Algebraic>;
    if (e < order - 1) values = build(f, monomials.length, 0, () => f.zero);
    else if (action.generatorMatrices.length === 0) values = identity(f, monomials.length);
    else {
      const equations: Algebraic[][] = [];
      for (const g of action.generatorMatrices) {
        const images = Array.from({ length: n }, (_, i) => ring.linearForm(Array.from({ length: n }, (_, j) => at(g, i, j))));
        for (const [a, m] of monomials.entries()) {
          const row = new Array<Algebraic>(monomials.length).fill(f.zero);
          const image = ring.substitute(ring.term(m, f.one), images, ring);
          for (const [k, c] of ring.terms(image)) row[place.get(k)!] = c;
          row[a] = f.sub(row[a]!, f.one);
          equations.push(row);
        }
      }
      values = kernel(fromRows(f, equations, monomials.length));
    }
    forms.push({ place, values });
    offsets.push(offsets[e]! + values.cols);
  }
  const width = offsets.at(-1)!;
  const blocks: Row[][] = Array.from({ length: homogeneous ? degree + 1 : 1 }, () => []);
  for (let i = 0; i < n; i++) {
    const v = String.fromCharCode(i);
    const partial: (readonly [Monomial, Polynomial<Algebraic>])[] = [];
    for (const [m, c] of h) {
      const first = m.indexOf(v);
      if (first < 0) continue;
      const e = m.lastIndexOf(v) - first + 1;
      partial.push([m.slice(0, first) + m.slice(first + 1), symbols.scale(c, f.fromInteger(e))]);
    }
    for (let e = 0; e + order - 1 <= degree; e++)
      for (const shift of monomialsOfDegree(n, e)) {
        const row = new Array<Polynomial<Algebraic>>(width).fill(symbols.zero);
        for (const [m, c] of partial) {
          const d = m.length + e;
          if (d > degree) continue;
          const { place, values } = forms[d]!;
          const a = place.get(multiplyMonomials(m, shift))!;
          for (let j = 0; j < values.cols; j++) {
            const x = at(values, a, j);
            if (!f.isZero(x)) row[offsets[d]! + j] = symbols.add(row[offsets[d]! + j]!, symbols.scale(c, x));
          }
        }
        if (row.every((x) => symbols.isZero(x))) continue;
        if (homogeneous) blocks[e + order - 1]!.push(row.slice(offsets[e + order - 1]!, offsets[e + order]!));
        else blocks[0]!.push(row);
      }
  }
  return blocks;
}

/**
 * Greatest common divisor of the maximal minors: each of a few random combinations of all of them (the determinant after random
 * combinations of rows and of columns) is divisible by it, and two such combinations hardly ever share more.
 */
function commonMinor(rows: readonly Row[], symbols: PolynomialRing<Algebraic>, f: RealField): Polynomial<Algebraic> | undefined {
  const width = rows[0]!.length;
  const reduction = f.reduction();
  const { p } = reduction;
  const residues = symbols.variables.map((_, i) => powModInt(69_621, 7 + 5 * i, p));
  const echelon = new GrowingEchelon(width, p);
  for (const row of rows)
    echelon.addInPlace(
      Int32Array.from(row, (q) => {
        let sum = 0;
        for (const [m, c] of symbols.terms(q)) {
          let t = reduction.apply(c);
          for (let i = 0; i < m.length; i++) t = mulMod(t, residues[m.charCodeAt(i)]!, p);
          sum = (sum + t) % p;
        }
        return sum;
      }),
    );
  const { rank } = echelon;
  if (rank > RANK_MOST) return undefined;
  let state = 1;
  const random = () => f.fromInteger(((state = mulMod(state, 48_271, 2_147_483_647)) % 13) - 6);
  const combined = (list: readonly Row[]): Row => {
    const factors = list.map(random);
    return list[0]!.map((_, j) => symbols.sum(list.map((row, i) => symbols.scale(row[j]!, factors[i]!))));
  };
  const transposed = (list: readonly Row[]): Row[] => list[0]!.map((_, j) => list.map((row) => row[j]!));
  let common: Polynomial<Algebraic> | undefined;
  let minors = 0;
  for (let tries = 0; minors < MINORS && tries < 3 * MINORS; tries++) {
    let square: readonly Row[] = Array.from({ length: rank }, () => combined(rows));
    if (rank < width) {
      const columns = transposed(square);
      square = Array.from({ length: rank }, () => combined(columns));
    }
    const minor = determinantOf(
      square.map((row) => row.slice()),
      symbols,
    );
    if (minor === undefined) return undefined;
    if (symbols.isZero(minor)) continue; // an unlucky choice
    common = common === undefined ? minor : gcdPolynomials(symbols, common, minor);
    minors++;
    if (symbols.isConstant(common)) break;
  }
  return common;
}

/** Fraction-free elimination (E. H. Bareiss 1968); undefined if an intermediate polynomial grows too large. */
function determinantOf(a: Polynomial<Algebraic>[][], ring: PolynomialRing<Algebraic>): Polynomial<Algebraic> | undefined {
  const n = a.length;
  let previous = ring.one;
  let negative = false;
  for (let k = 0; k < n; k++) {
    let pivot = -1;
    for (let i = k; i < n; i++)
      if (!ring.isZero(a[i]![k]!) && (pivot < 0 || a[i]![k]!.monomials.length < a[pivot]![k]!.monomials.length)) pivot = i;
    if (pivot < 0) return ring.zero;
    if (pivot !== k) {
      [a[k], a[pivot]] = [a[pivot]!, a[k]!];
      negative = !negative;
    }
    for (let i = k + 1; i < n; i++)
      for (let j = k + 1; j < n; j++) {
        const x = ring.sub(ring.mul(a[i]![j]!, a[k]![k]!), ring.mul(a[i]![k]!, a[k]![j]!));
        if (x.monomials.length > 3000) return undefined;
        a[i]![j] = divideExactly(ring, x, previous)!;
      }
    previous = a[k]![k]!;
  }
  return negative ? ring.neg(previous) : previous;
}

/** Symbols that divide, then the square-free part of the rest; constants are dropped. */
function factorsOf(ring: PolynomialRing<Algebraic>, a: Polynomial<Algebraic>): string[] {
  const out: string[] = [];
  let rest = a;
  for (const v of ring.support(a)) {
    const x = ring.variable(v);
    for (let q = divideExactly(ring, rest, x); q !== undefined; q = divideExactly(ring, rest, x)) {
      if (out.at(-1) !== ring.variables[v]) out.push(ring.variables[v]!);
      rest = q;
    }
  }
  for (let pending = [rest]; pending.length > 0; ) {
    const q = pending.pop()!;
    if (ring.isConstant(q)) continue;
    let g = q;
    for (const v of ring.support(q)) g = gcdPolynomials(ring, g, ring.derivative(q, v));
    const free = divideExactly(ring, q, g)!;
    // a factor that occurs less often than another is divided off
    const twice = gcdPolynomials(ring, free, g);
    const once = divideExactly(ring, free, twice)!;
    for (const part of [once, twice])
      for (const factor of linearFactors(ring, part)) if (!ring.isConstant(factor)) out.push(ring.format(primitive(ring, factor)));
    pending = [];
  }
  return out;
}
/** Splits rational linear factors off a form in two symbols. */
function linearFactors(ring: PolynomialRing<Algebraic>, a: Polynomial<Algebraic>): Polynomial<Algebraic>[] {
  const f = ring.field as RealField;
  const support = ring.support(a);
  const degree = ring.degree(a);
  if (support.length !== 2 || degree < 2 || ring.order(a) !== degree) return [a];
  const [v, w] = support as [number, number];
  const ends = [v, w].map((x) => f.toRational(ring.coefficient(primitive(ring, a), String.fromCharCode(x).repeat(degree))));
  if (ends.some((x) => x === undefined || x.n === 0n || x.d !== 1n)) return [a];
  const [top, bottom] = ends.map((x) => smallDivisors(x!.n)) as [number[], number[]];
  const out: Polynomial<Algebraic>[] = [];
  let rest = a;
  for (const s of top)
    for (const t of bottom)
      for (const sign of [1, -1]) {
        const form = ring.add(ring.scale(ring.variable(v), f.fromInteger(s)), ring.scale(ring.variable(w), f.fromInteger(sign * t)));
        const q = divideExactly(ring, rest, form);
        if (q === undefined) continue;
        out.push(form);
        rest = q;
      }
  return [...out, rest];
}
function smallDivisors(n: bigint): number[] {
  const size = Number(n < 0n ? -n : n);
  if (size > 1e6) return [1];
  return Array.from({ length: Math.min(size, 1000) }, (_, i) => i + 1).filter((d) => size % d === 0);
}
function primitive(ring: PolynomialRing<Algebraic>, a: Polynomial<Algebraic>): Polynomial<Algebraic> {
  const field = new RationalFunctionField(ring);
  return field.quotient(ring.one, a).denominator;
}
