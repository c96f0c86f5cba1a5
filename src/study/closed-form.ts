/**
 * Closed forms of the real roots of a polynomial: rational roots, elements of the field, square roots, square roots
 * of these. A form is kept only if it is proved: the polynomial vanishes at it exactly where the form lies in a
 * field of ours, else by the defining quadratic equations; and it lies in the isolating interval. Formulas in several
 * parameters come from nerdamer, under names of its own, and are kept only if our own arithmetic agrees.
 */
import type { Algebraic, Rational } from '../field/index.ts';
import { RealField, rational, rationals } from '../field/index.ts';
import { type RealRoot, RealRoots, type Univariate, UnivariateRing } from '../polynomial/index.ts';
import { nerdamerRoots } from './factored-nerdamer.ts';
import { bisected } from './threshold-root.ts';

export interface ClosedForm {
  /** In the language of models. */
  readonly text: string;
  readonly value: number;
  /** The number itself, where it lies in a field of ours: then a model can be studied exactly at it. */
  readonly element?: { readonly field: RealField; readonly value: Algebraic };
}

/** The closed form of a root of a square-free polynomial, or undefined. */
export function closedForm(factor: Univariate<Algebraic>, root: RealRoot, field: RealField): ClosedForm | undefined {
  const ring = new UnivariateRing(field);
  const p = ring.monic(factor);
  const exact = root.exact ?? rationalRoot(p, root, field);
  if (exact !== undefined) return elementForm(field.fromRational(exact.n, exact.d), field);
  const candidates: ClosedForm[] = [];
  if (p.length === 2) candidates.push(elementForm(field.neg(p[0]!), field));
  if (p.length === 3) candidates.push(...quadraticRoots(p, field));
  if (p.length > 3) {
    const low = quadraticFactor(factor, p, root, field);
    if (low !== undefined) candidates.push(...quadraticRoots(low, field));
    else if (p.length === 5 && field.isZero(p[1]!) && field.isZero(p[3]!)) candidates.push(...biquadraticRoots(p, field));
  }
  const near = numberInside(root);
  return candidates.find((c) => near(c));
}

function elementForm(value: Algebraic, field: RealField): ClosedForm {
  return { text: field.format(value), value: field.toNumber(value), element: { field, value } };
}

/** Whether a form is the root in the interval, not another one: exactly where its value can be compared exactly. */
function numberInside(root: RealRoot): (c: ClosedForm) => boolean {
  const at = rationals.toNumber(root.low);
  const to = rationals.toNumber(root.high);
  return (c) => {
    if (c.element !== undefined) {
      const { field, value } = c.element;
      const side = (x: Rational) => field.compare(value, field.fromRational(x.n, x.d));
      return side(root.low) >= 0 && side(root.high) <= 0;
    }
    const slack = 1e-12 * Math.max(1, Math.abs(at));
    return c.value >= at - slack && c.value <= to + slack;
  };
}

/** The rational of least denominator in the interval, if the polynomial vanishes there. */
function rationalRoot(p: Univariate<Algebraic>, root: RealRoot, field: RealField): Rational | undefined {
  const x = simplestBetween(root.low, root.high);
  return new RealRoots(field).signAt(p, x) === 0 ? x : undefined;
}

/** The fraction of least denominator in a closed interval (continued fractions; Knuth, TAOCP 2, 4.5.3, from memory). */
export function simplestBetween(low: Rational, high: Rational): Rational {
  if (low.n <= 0n && high.n >= 0n) return rational(0n);
  if (high.n < 0n) {
    const x = simplestBetween(rationals.neg(high), rationals.neg(low));
    return rationals.neg(x);
  }
  const whole = low.n / low.d;
  if (whole * low.d === low.n) return rational(whole);
  if ((whole + 1n) * high.d <= high.n) return rational(whole + 1n);
  const part = (x: Rational) => rational(x.n - whole * x.d, x.d);
  const inner = simplestBetween(rationals.inv(part(high)), rationals.inv(part(low)));
  return rationals.add(rational(whole), rationals.inv(inner));
}

const isolatedRoots = new WeakMap<Univariate<Algebraic>, RealRoot[]>();

/** All real roots of a square-free polynomial to 36 digits. */
function siblings(p: Univariate<Algebraic>, roots: RealRoots<Algebraic>): RealRoot[] {
  let all = isolatedRoots.get(p);
  if (all === undefined) {
    all = roots.isolate(p).map((r) => bisected(roots, p, r, 36));
    isolatedRoots.set(p, all);
  }
  return all;
}

/** A quadratic factor with rational coefficients that has this root: sum and product of two roots guessed, then divided out exactly. */
function quadraticFactor(
  factor: Univariate<Algebraic>,
  p: Univariate<Algebraic>,
  root: RealRoot,
  field: RealField,
): Univariate<Algebraic> | undefined {
  const roots = new RealRoots(field);
  const ring = new UnivariateRing(field);
  const all = siblings(factor, roots);
  const mine = all.find((r) => rationals.compare(r.low, root.high) <= 0 && rationals.compare(root.low, r.high) <= 0);
  if (mine === undefined) return undefined;
  const ends = (r: RealRoot) => [r.exact ?? r.low, r.exact ?? r.high] as const;
  for (const other of all) {
    if (other === mine) continue;
    const [a, b] = ends(mine);
    const [c, d] = ends(other);
    const sum = simplestBetween(rationals.add(a, c), rationals.add(b, d));
    const products = [a, b].flatMap((x) => [c, d].map((y) => rationals.mul(x, y))).sort(rationals.compare);
    const product = simplestBetween(products[0]!, products.at(-1)!);
    const trial = [field.fromRational(product.n, product.d), field.fromRational(-sum.n, sum.d), field.one];
    if (ring.divide(p, trial).remainder.length === 0) return trial;
  }
  return undefined;
}

/** Square root of a positive element: exactly in a larger field if it is rational or the square of a + b√r found there, else as a text. */
export function squareRoot(x: Algebraic, field: RealField): ClosedForm | undefined {
  const sign = field.sign(x);
  if (sign < 0) return undefined;
  if (sign === 0) return elementForm(field.zero, field);
  if (x.c.every((c, i) => i === 0 || c === 0n)) {
    const r = rational(x.c[0]!, x.d);
    try {
      const larger = RealField.join(field, RealField.of({ squareRoots: [r.n * r.d] }));
      const s = larger.sqrt(r);
      if (s !== undefined) return elementForm(s, larger);
    } catch (error) {
      if (!(error instanceof RangeError)) throw error;
    }
  }
  const inside = denested(x, field);
  if (inside !== undefined) return inside;
  return { text: `sqrt(${field.format(x)})`, value: Math.sqrt(field.toNumber(x)) };
}

/** √(a + b√r) = √u ± √v with rational u, v, where (a² − b²r) is the square of a rational. */
function denested(x: Algebraic, field: RealField): ClosedForm | undefined {
  const terms = x.c.flatMap((c, i) => (c === 0n ? [] : [i]));
  if (field.conductor !== 1 || terms.length !== 2 || terms[0] !== 0) return undefined;
  const bar = { c: x.c.map((c, i) => (i === 0 ? c : -c)), d: x.d };
  const norm = field.mul(x, bar);
  const trace = field.add(x, bar);
  const rationalOf = (y: Algebraic) => (y.c.every((c, i) => i === 0 || c === 0n) ? rational(y.c[0]!, y.d) : undefined);
  const [n, t] = [rationalOf(norm), rationalOf(trace)];
  if (n === undefined || t === undefined || n.n < 0n) return undefined;
  const base = RealField.of();
  const root = base.sqrt(n);
  if (root === undefined) return undefined;
  const half = (s: bigint) =>
    rationals.div(rationals.add(rationals.mul(t, rational(1n, 2n)), rational(s * root.c[0]!, root.d)), rational(2n));
  const [u, v] = [half(1n), half(-1n)];
  if (u.n < 0n || v.n < 0n) return undefined;
  try {
    const larger = RealField.join(field, RealField.of({ squareRoots: [u.n * u.d, v.n * v.d].filter((y) => y !== 0n) }));
    const [a, b] = [larger.sqrt(u), larger.sqrt(v)];
    if (a === undefined || b === undefined) return undefined;
    const target = larger.embed(field, x);
    for (const s of [larger.add(a, b), larger.sub(a, b), larger.sub(b, a)])
      if (larger.sign(s) > 0 && larger.equal(larger.mul(s, s), target)) return elementForm(s, larger);
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
  }
  return undefined;
}

/** Both roots of a monic x² + bx + c with real roots. */
export function quadraticRoots(p: Univariate<Algebraic>, field: RealField): ClosedForm[] {
  const [c, b] = [p[0]!, p[1]!];
  const half = field.mul(field.neg(b), field.fromRational(1n, 2n));
  const root = squareRoot(field.sub(field.mul(half, half), c), field);
  if (root === undefined) return [];
  return [1, -1].map((s): ClosedForm => {
    if (root.element !== undefined) {
      const { field: larger, value } = root.element;
      const x = larger.add(larger.embed(field, half), s === 1 ? value : larger.neg(value));
      return elementForm(x, larger);
    }
    const start = field.isZero(half) ? (s === 1 ? '' : '-') : `${field.format(half)}${s === 1 ? ' + ' : ' - '}`;
    return { text: `${start}${root.text}`, value: field.toNumber(half) + s * root.value };
  });
}

/** Roots of x⁴ + bx² + c: square roots of the roots of y² + by + c. */
function biquadraticRoots(p: Univariate<Algebraic>, field: RealField): ClosedForm[] {
  return quadraticRoots([p[0]!, p[2]!, field.one], field).flatMap((y): ClosedForm[] => {
    if (y.value < 0) return [];
    const root =
      y.element === undefined ? { text: `sqrt(${y.text})`, value: Math.sqrt(y.value) } : squareRoot(y.element.value, y.element.field);
    if (root === undefined) return [];
    if (root.element === undefined) return [root, { text: `-${root.text}`, value: -root.value }];
    const { field: f, value } = root.element;
    return [root, elementForm(f.neg(value), f)];
  });
}

/** Longest quadratic equation that is handed on, in characters. */
const FORMULA_LENGTH = 400;

/**
 * Formulas for the roots in x of a x² + b x + c = 0, where a, b, c are texts in the names given; candidates only, which
 * the caller checks. Names are replaced by private ones, so that none of them means anything to the solver.
 */
export async function quadraticFormulas(a: string, b: string, c: string, names: readonly string[]): Promise<string[]> {
  if (a.length + b.length + c.length > FORMULA_LENGTH) return [];
  const hidden = (text: string) =>
    text.replace(/[A-Za-z_][A-Za-z_0-9]*/g, (name) => (names.includes(name) ? `v_${names.indexOf(name)}` : name));
  const solved = await nerdamerRoots(`(${hidden(a)})*x_0^2+(${hidden(b)})*x_0+(${hidden(c)})`);
  return (solved ?? '')
    .replace(/^\[|\]$/g, '')
    .split(',')
    .filter((text) => text !== '')
    .map((text) => text.replace(/v_(\d+)/g, (_, i: string) => names[Number(i)]!));
}
