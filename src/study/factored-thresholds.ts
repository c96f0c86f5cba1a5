/**
 * Where a determinant in factors vanishes as one parameter runs: in closed form where there is one, else by the
 * defining polynomial and 30 digits. Other symbols may be left open: factors of degree one and two are then solved by
 * formula, and the formula put back exactly. Every value is checked by the sign of the determinant on both sides, at
 * sample values of the open symbols where there are some.
 */
import type { Algebraic, Rational, RealField } from '../field/index.ts';
import { rational, rationals } from '../field/index.ts';
import {
  factorsOf,
  formatRoot,
  isSum,
  type RationalFunction,
  RationalFunctionField,
  type RealRoot,
  RealRoots,
  type Univariate,
  writeTerm,
} from '../polynomial/index.ts';
import { closedForm } from './closed-form.ts';
import { type Factor, type Poly, type Ring, squarePart } from './factored-squares.ts';
import type { ThresholdSummary } from './result.ts';
import { bisected, middle } from './threshold-root.ts';
import { numberOf, ROOT_DIGITS } from './thresholds.ts';

/** Thresholds in the symbol, ascending where they are numbers. The factors are coprime; negative powers are poles. */
export function determinantThresholds(ring: Ring, factors: readonly Factor[], parameter: string): ThresholdSummary[] {
  const v = ring.indexOf(parameter);
  const alone = factors.filter((f) => ring.support(f.polynomial).every((i) => i === v));
  const mixed = factors.filter((f) => !alone.includes(f) && f.power > 0 && ring.degreeIn(f.polynomial, v) > 0);
  const numbers = rootsOf(ring, alone, v).flatMap((r) => (alone[r.factor]!.power < 0 ? [] : [numberThreshold(ring, r, parameter)]));
  const formulas = mixed.flatMap((f) => formulaThresholds(ring, factors, f, parameter));
  return [...numbers, ...formulas];
}

/** A root of one of several coprime square-free polynomials in one symbol (none where they are not), and what their product does there. */
interface SignedRoot {
  readonly factor: number;
  readonly polynomial: Univariate<Algebraic>;
  readonly root: RealRoot;
  readonly signChange: boolean;
}

function rootsOf(ring: Ring, factors: readonly Factor[], v: number): SignedRoot[] {
  const field = ring.field as RealField;
  const roots = new RealRoots(field);
  const list = factors.map((f) => ring.coefficientsIn(f.polynomial, v).map((c) => ring.constantTerm(c)));
  const product = list.reduce<Univariate<Algebraic>>((a, b) => roots.ring.mul(a, b), [field.one]);
  if (product.length < 2 || roots.ring.gcd(product, roots.ring.derivative(product)).length > 1) return [];
  const narrow = roots.isolate(product).map((r) => bisected(roots, product, r, ROOT_DIGITS + 6));
  const between = separators(narrow);
  return narrow.flatMap((root, i): SignedRoot[] => {
    const [left, right] = [between[i]!, between[i + 1]!];
    const signs = list.map((p) => [roots.signAt(p, left), roots.signAt(p, right)] as const);
    // the factors are square-free and coprime: one of them, and only it, changes its sign
    const factor = signs.findIndex(([a, b]) => a !== b);
    if (factor < 0) return [];
    const total = (side: 0 | 1) => signs.reduce((s, pair, k) => (factors[k]!.power % 2 === 0 ? s * pair[side] ** 2 : s * pair[side]), 1);
    return [{ factor, polynomial: list[factor]!, root, signChange: total(0) !== total(1) }];
  });
}

/** Numbers below, between and above disjoint roots. */
function separators(roots: readonly RealRoot[]): Rational[] {
  const out: Rational[] = [];
  const [first, last] = [roots[0], roots.at(-1)];
  if (first === undefined || last === undefined) return out;
  out.push(rationals.sub(first.exact ?? first.low, rational(1n)));
  for (let i = 1; i < roots.length; i++) {
    const [a, b] = [roots[i - 1]!, roots[i]!];
    out.push(middle({ low: a.exact ?? a.high, high: b.exact ?? b.low, exact: undefined, multiplicity: 1 }));
  }
  out.push(rationals.add(last.exact ?? last.high, rational(1n)));
  return out;
}

function numberThreshold(ring: Ring, r: SignedRoot, parameter: string): ThresholdSummary {
  const field = ring.field as RealField;
  const closed = closedForm(r.polynomial, r.root, field);
  if (closed !== undefined) return { parameter, exact: closed.text, value: closed.value, signChange: r.signChange };
  const v = String.fromCharCode(ring.indexOf(parameter));
  const polynomial = ring.fromTerms(r.polynomial.map((c, k) => [v.repeat(k), c] as const));
  return {
    parameter,
    exact: null,
    value: numberOf(r.root),
    polynomial: ring.format(polynomial),
    digits: formatRoot(r.root, ROOT_DIGITS),
    signChange: r.signChange,
  };
}

/** A root u + v √r, r a polynomial without the parameter (v = 0 for a rational one). */
interface Formula {
  readonly u: RationalFunction<Algebraic>;
  readonly v: RationalFunction<Algebraic>;
  readonly radicand: Poly;
}

function formulaThresholds(ring: Ring, factors: readonly Factor[], factor: Factor, parameter: string): ThresholdSummary[] {
  const k = new RationalFunctionField(ring);
  const coefficients = ring.coefficientsIn(factor.polynomial, ring.indexOf(parameter));
  const odd = factor.power % 2 !== 0;
  const formulas = coefficients.length > 3 ? [] : formulasOf(k, coefficients).filter((x) => vanishes(k, coefficients, x));
  if (formulas.length === 0) {
    const signChange = sampledSignChange(k, factors, factor, parameter) ?? odd;
    return [{ parameter, exact: null, value: null, polynomial: ring.format(factor.polynomial), signChange }];
  }
  return formulas
    .filter((x) => !isNegative(ring, x.radicand))
    .map((x) => ({
      parameter,
      exact: formulaText(k, x),
      value: null,
      // real at no sample: that of a simple root
      signChange: sampledSignChange(k, factors, factor, parameter, x) ?? odd,
    }));
}

/** Whether a sum of squares with negative coefficients: a root of it is real nowhere. */
function isNegative(ring: Ring, p: Poly): boolean {
  const field = ring.field as RealField;
  return p.coefficients.every((c, i) => field.sign(c) < 0 && factorsOf(p.monomials[i]!).every(([, e]) => e % 2 === 0));
}

function formulasOf(k: RationalFunctionField<Algebraic>, coefficients: readonly Poly[]): Formula[] {
  const { ring } = k;
  const [c, b, a] = coefficients as [Poly, Poly, Poly | undefined];
  if (a === undefined) return [{ u: k.neg(k.quotient(c, b)), v: k.zero, radicand: ring.one }];
  const discriminant = ring.sub(ring.mul(b, b), ring.mul(ring.integer(4), ring.mul(a, c)));
  const { square, rest } = squarePart(ring, discriminant);
  const double = ring.mul(ring.integer(2), a);
  const u = k.neg(k.quotient(b, double));
  // where the open symbols are positive and small the lower one comes first
  const last = (ring.field as RealField).sign(a.coefficients[0]!) > 0 ? square : ring.neg(square);
  const v = k.quotient(last, double);
  return [k.neg(v), v].map((w) => ({ u, v: w, radicand: rest }));
}

/** Whether c + b x + a x² is zero at u + v √r, in the arithmetic of such numbers. */
function vanishes(k: RationalFunctionField<Algebraic>, coefficients: readonly Poly[], { u, v, radicand }: Formula): boolean {
  const r = k.fromPolynomial(radicand);
  let [s, t] = [k.zero, k.zero];
  for (let i = coefficients.length - 1; i >= 0; i--) {
    const next = k.add(k.add(k.mul(s, u), k.mul(k.mul(t, v), r)), k.fromPolynomial(coefficients[i]!));
    t = k.add(k.mul(s, v), k.mul(t, u));
    s = next;
  }
  return k.isZero(s) && k.isZero(t);
}

function formulaText(k: RationalFunctionField<Algebraic>, { u, v, radicand }: Formula): string {
  const { ring } = k;
  if (k.isZero(v)) return k.format(u);
  if (ring.equal(radicand, ring.one)) return k.format(k.add(u, v));
  const text = k.format(v);
  const root = writeTerm(text, `sqrt(${ring.format(radicand)})`);
  if (k.isZero(u)) return root;
  return root.startsWith('-') && !isSum(root.slice(1)) ? `${k.format(u)} - ${root.slice(1)}` : `${k.format(u)} + ${root}`;
}

/** Values for the open symbols: of both signs and of several sizes, none in simple proportion to another. */
const SAMPLES = 24;

function sample(i: number, field: RealField): (symbol: number) => Algebraic {
  return (symbol) => {
    const size = rational(BigInt((3 + ((7 * i + 5 * symbol) % 11)) * (1 + (i % 5)) ** 2), BigInt(2 + ((3 * i + 4 * symbol) % 5)));
    const negative = ((i >> (symbol % 4)) & 1) === 1;
    return field.fromRational(negative ? -size.n : size.n, size.d);
  };
}

/** Whether the product changes sign at the root (any root of the factor without a formula), at the first sample where it is real and simple. */
function sampledSignChange(
  k: RationalFunctionField<Algebraic>,
  factors: readonly Factor[],
  factor: Factor,
  parameter: string,
  formula?: Formula,
): boolean | undefined {
  const { ring } = k;
  const field = ring.field as RealField;
  const v = ring.indexOf(parameter);
  for (let i = 0; i < SAMPLES; i++) {
    const value = sample(i, field);
    const images = ring.variables.map((_, j) => (j === v ? ring.variable(j) : ring.constant(value(j))));
    const special = factors.map((f) => ({ ...f, polynomial: ring.substitute(f.polynomial, images, ring) }));
    if (special.some((f) => ring.isZero(f.polynomial))) continue;
    if (ring.degreeIn(special[factors.indexOf(factor)]!.polynomial, v) < ring.degreeIn(factor.polynomial, v)) continue;
    const at = formula === undefined ? undefined : formulaValue(k, formula, value);
    if (Number.isNaN(at)) continue;
    const place = factors.indexOf(factor);
    const found = rootsOf(ring, special, v).find(
      (r) => r.factor === place && (at === undefined || Math.abs(numberOf(r.root) - at) <= 1e-9 * Math.max(1, Math.abs(at))),
    );
    if (found !== undefined) return found.signChange;
  }
  return undefined;
}

/** NaN where it is not real or not defined. */
function formulaValue(k: RationalFunctionField<Algebraic>, { u, v, radicand }: Formula, value: (symbol: number) => Algebraic): number {
  const field = k.ring.field as RealField;
  const names = new Map(k.symbols.map((name, j) => [name, field.toNumber(value(j))]));
  const number = (x: RationalFunction<Algebraic>) => k.evaluateNumber(x, names);
  const at = number(u) + number(v) * Math.sqrt(number(k.fromPolynomial(radicand)));
  return Number.isFinite(at) ? at : Number.NaN;
}
