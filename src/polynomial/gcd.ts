/**
 * Greatest common divisors of polynomials in several variables over a field: monomial and support shortcuts, a
 * coprimality test modulo a prime at a random point, trial division, images modulo primes where the field has
 * them, else primitive remainder sequences in one variable with contents by recursion (Collins 1967 and Brown 1971
 * describe the families; from memory). Results are monic in their first term.
 */
import { type Algebraic, type Field, mulAddMod, mulMod, PrimeField, type Rational, RealField, rationals } from '../field/index.ts';
import { divideExactly, monic } from './division.ts';
import { gcdByImages } from './gcd-modular.ts';
import { exponentOf, factorsOf, gcdMonomials, type Monomial, monomialOfFactors, UNIT } from './monomial.ts';
import type { Polynomial, PolynomialRing } from './polynomial.ts';
import { gcdModular } from './univariate-modular.ts';

/** Greatest common divisor, monic in its first term; gcd(0, 0) = 0. */
export function gcdPolynomials<T>(ring: PolynomialRing<T>, a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> {
  if (ring.isZero(a)) return monic(ring, b);
  if (ring.isZero(b)) return monic(ring, a);
  const ma = a.monomials.reduce(gcdMonomials);
  const mb = b.monomials.reduce(gcdMonomials);
  const m = ring.term(gcdMonomials(ma, mb), ring.field.one);
  if (a.monomials.length === 1 || b.monomials.length === 1) return m;
  const strip = (p: Polynomial<T>, by: Monomial) => (by === UNIT ? p : divideExactly(ring, p, ring.term(by, ring.field.one))!);
  return ring.mul(m, gcdStripped(ring, strip(a, ma), strip(b, mb)));
}

function gcdStripped<T>(ring: PolynomialRing<T>, a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> {
  if (ring.isConstant(a) || ring.isConstant(b)) return ring.one;
  const [small, large] = ring.degree(a) <= ring.degree(b) ? [a, b] : [b, a];
  if (divideExactly(ring, large, small) !== undefined) return monic(ring, small);
  const sa = ring.support(a);
  const sb = ring.support(b);
  // a variable in one of them only: the gcd divides every coefficient by its powers
  const onlyA = sa.find((v) => !sb.includes(v));
  if (onlyA !== undefined) return gcdOfList(ring, [b, ...ring.coefficientsIn(a, onlyA).filter((p) => !ring.isZero(p))]);
  const onlyB = sb.find((v) => !sa.includes(v));
  if (onlyB !== undefined) return gcdOfList(ring, [a, ...ring.coefficientsIn(b, onlyB).filter((p) => !ring.isZero(p))]);
  let main = -1;
  let least = Infinity;
  for (const v of sa) {
    const bound = gcdDegreeBound(ring, a, b, v);
    if (bound === 0)
      return gcdOfList(
        ring,
        [...ring.coefficientsIn(a, v), ...ring.coefficientsIn(b, v)].filter((p) => !ring.isZero(p)),
      );
    const d = Math.min(ring.degreeIn(a, v), ring.degreeIn(b, v));
    if (d < least) {
      least = d;
      main = v;
    }
  }
  const found = gcdByImages(ring, a, b);
  return found === undefined ? gcdByRemainders(ring, a, b, main) : monic(ring, found);
}

/** gcd of several polynomials, small ones first. */
export function gcdOfList<T>(ring: PolynomialRing<T>, list: readonly Polynomial<T>[]): Polynomial<T> {
  const sorted = [...list].sort((x, y) => x.monomials.length - y.monomials.length);
  let g = ring.zero;
  for (const p of sorted) {
    g = gcdPolynomials(ring, g, p);
    if (ring.degree(g) === 0) return ring.one;
  }
  return g;
}

function gcdByRemainders<T>(ring: PolynomialRing<T>, a: Polynomial<T>, b: Polynomial<T>, v: number): Polynomial<T> {
  const content = (p: Polynomial<T>) =>
    gcdOfList(
      ring,
      ring.coefficientsIn(p, v).filter((c) => !ring.isZero(c)),
    );
  const ca = content(a);
  const cb = content(b);
  let x = divideExactly(ring, a, ca)!;
  let y = divideExactly(ring, b, cb)!;
  if (ring.degreeIn(x, v) < ring.degreeIn(y, v)) [x, y] = [y, x];
  for (;;) {
    const r = pseudoRemainder(ring, x, y, v);
    if (ring.isZero(r)) break;
    if (ring.degreeIn(r, v) === 0) {
      y = ring.one;
      break;
    }
    x = y;
    y = monic(ring, divideExactly(ring, r, content(r))!);
  }
  return monic(ring, ring.mul(gcdPolynomials(ring, ca, cb), y));
}

/** Remainder of lc(b)^k a by b in variable v, k as small as it comes. */
function pseudoRemainder<T>(ring: PolynomialRing<T>, a: Polynomial<T>, b: Polynomial<T>, v: number): Polynomial<T> {
  const db = ring.degreeIn(b, v);
  const lead = ring.coefficientsIn(b, v)[db]!;
  let r = a;
  for (let d = ring.degreeIn(r, v); d >= db && !ring.isZero(r); d = ring.degreeIn(r, v)) {
    const top = ring.coefficientsIn(r, v)[d]!;
    const common = gcdPolynomials(ring, top, lead);
    const up = divideExactly(ring, lead, common)!;
    const down = divideExactly(ring, top, common)!;
    const shift = ring.term(monomialOfFactors([[v, d - db]]), ring.field.one);
    r = ring.sub(ring.mul(up, r), ring.mul(ring.mul(down, shift), b));
  }
  return r;
}

/** A ring homomorphism of the field into a prime field, where one is known. */
export function reductionOf<T>(field: Field<T>): { p: number; apply: (c: T) => number } | undefined {
  if (field instanceof RealField) {
    const r = field.reduction();
    return { p: r.p, apply: (c) => r.apply(c as unknown as Algebraic) };
  }
  if ((field as unknown) === rationals) {
    const p = RealField.of().reduction().p;
    const prime = new PrimeField(p);
    return { p, apply: (c) => prime.fromRational((c as unknown as Rational).n, (c as unknown as Rational).d) };
  }
  if (field instanceof PrimeField) return { p: field.p, apply: (c) => c as unknown as number };
  return undefined;
}

/**
 * An upper bound of the degree of gcd(a, b) in variable v: the degree of the gcd of the images under a reduction
 * modulo p with the other variables at a point where neither leading coefficient vanishes. The true gcd maps to a
 * divisor of the image gcd without loss of degree there.
 */
function gcdDegreeBound<T>(ring: PolynomialRing<T>, a: Polynomial<T>, b: Polynomial<T>, v: number): number {
  const most = Math.min(ring.degreeIn(a, v), ring.degreeIn(b, v));
  const reduction = reductionOf(ring.field);
  if (reduction === undefined) return most;
  const { p } = reduction;
  const evaluate = (q: Polynomial<T>, seed: number): Int32Array => {
    const out = new Int32Array(ring.degreeIn(q, v) + 1);
    for (const [m, c] of ring.terms(q)) {
      let t = reduction.apply(c);
      for (const [w, e] of factorsOf(m)) if (w !== v) for (let k = 0; k < e; k++) t = mulMod(t, pointOf(w, seed, p), p);
      const e = exponentOf(m, v);
      out[e] = mulAddMod(t, 1, out[e]!, p);
    }
    return out;
  };
  for (let seed = 1; seed <= 3; seed++) {
    let x: Int32Array;
    let y: Int32Array;
    try {
      x = evaluate(a, seed);
      y = evaluate(b, seed);
    } catch (error) {
      if (error instanceof RangeError) return most; // p divides a denominator
      throw error;
    }
    if (x.at(-1) === 0 || y.at(-1) === 0) continue;
    return gcdModular(x, y, p).length - 1;
  }
  return most;
}

/** A fixed pseudo-random value for variable w. */
function pointOf(w: number, seed: number, p: number): number {
  const x = Math.imul(w + 1, 0x9e3779b1) ^ Math.imul(seed, 0x85ebca6b);
  return (((x ^ (x >>> 13)) >>> 1) % (p - 2)) + 1;
}
