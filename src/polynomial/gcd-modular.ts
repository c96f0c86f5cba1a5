/**
 * Greatest common divisors by reduction modulo primes, evaluation and interpolation (Brown 1971), for the field of
 * rationals and for real number fields: there every embedding modulo a totally split prime gives one image
 * (Encarnación 1995); both from memory. The answer is kept only if it divides both arguments exactly.
 */
import { type Algebraic, type Field, gcd, PrimeField, type Rational, RealField, rationals } from '../field/index.ts';
import { modularEchelon } from '../linear/index.ts';
import { divideExactly } from './division.ts';
import type { Monomial } from './monomial.ts';
import { type Polynomial, PolynomialRing } from './polynomial.ts';
import { chineseRemainder, reconstructRational } from './reconstruction.ts';
import { gcdModular } from './univariate-modular.ts';

/** Number fields of higher degree are left to remainder sequences. */
const EMBEDDINGS_MOST = 16;
const PRIMES_MOST = 24;

interface Embeddings<T> {
  readonly p: number;
  readonly maps: ReadonlyArray<(c: T) => number>;
  /** Coordinates over the integral basis from the images under the maps. */
  coordinates(images: readonly number[]): number[];
}

function embeddings<T>(field: Field<T>, index: number): Embeddings<T> | undefined {
  const real = field instanceof RealField ? field : (field as unknown) === rationals ? RealField.of() : undefined;
  if (real === undefined || real.degree > EMBEDDINGS_MOST) return undefined;
  const reduction = real.reduction(index);
  const { p } = reduction;
  if (real.degree === 1) {
    const prime = new PrimeField(p);
    const map = (c: T) =>
      field instanceof RealField
        ? reduction.apply(c as unknown as Algebraic)
        : prime.fromRational((c as unknown as Rational).n, (c as unknown as Rational).d);
    return { p, maps: [map], coordinates: (images) => [...images] };
  }
  const n = real.degree;
  const basis = Array.from({ length: n }, (_, j): Algebraic => ({ c: Array.from({ length: n }, (_, i) => (i === j ? 1n : 0n)), d: 1n }));
  const maps = Array.from({ length: n }, (_, k) => (c: T) => reduction.apply(real.automorphism(k, c as unknown as Algebraic)));
  const table = new Int32Array(2 * n * n);
  for (let k = 0; k < n; k++) {
    for (let j = 0; j < n; j++) table[2 * n * k + j] = maps[k]!(basis[j] as unknown as T);
    table[2 * n * k + n + k] = 1;
  }
  const { matrix: inverse, pivots } = modularEchelon({ p, rows: n, cols: 2 * n, data: table });
  if (pivots.some((q, i) => q !== i)) return undefined;
  const prime = new PrimeField(p);
  return {
    p,
    maps,
    coordinates: (images) =>
      Array.from({ length: n }, (_, j) => images.reduce((s, v, k) => prime.add(s, prime.mul(inverse.data[2 * n * j + n + k]!, v)), 0)),
  };
}

/** The gcd, monic in its last term; undefined if the method does not apply or does not settle. */
export function gcdByImages<T>(ring: PolynomialRing<T>, a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> | undefined {
  let modulus = 1n;
  let monomials: readonly Monomial[] = [];
  let values: bigint[][] = []; // per monomial the coordinates modulo `modulus`
  for (let index = 0, used = 0; used < PRIMES_MOST && index < 3 * PRIMES_MOST; index++) {
    const e = embeddings(ring.field, index);
    if (e === undefined) return undefined;
    let images: Polynomial<number>[] | undefined;
    try {
      images = imagesOf(ring, a, b, e);
    } catch (error) {
      if (!(error instanceof RangeError)) throw error; // the prime divides a denominator
    }
    if (images === undefined) continue;
    used++;
    const support = [...new Set(images.flatMap((g) => g.monomials))].sort((x, y) => x.length - y.length || (x < y ? -1 : 1));
    const top = support.at(-1)!;
    if (top === '') return ring.one;
    const old = monomials.at(-1);
    const lower = old !== undefined && (top.length < old.length || (top.length === old.length && top < old));
    if (old !== undefined && top !== old && !lower) continue; // unlucky prime
    const small = new PolynomialRing<number>(new PrimeField(e.p), ring.variables);
    const fresh = new Map(support.map((m) => [m, e.coordinates(images.map((g) => small.coefficient(g, m)))] as const));
    if (old === undefined || lower) {
      monomials = support;
      values = support.map((m) => fresh.get(m)!.map(BigInt));
      modulus = BigInt(e.p);
    } else {
      const all = [...new Set([...monomials, ...support])].sort((x, y) => x.length - y.length || (x < y ? -1 : 1));
      const before = new Map(monomials.map((m, i) => [m, values[i]!] as const));
      values = all.map((m) => {
        const now = fresh.get(m);
        const then = before.get(m);
        return Array.from({ length: (now ?? then)!.length }, (_, i) => chineseRemainder(then?.[i] ?? 0n, modulus, now?.[i] ?? 0, e.p));
      });
      monomials = all;
      modulus *= BigInt(e.p);
    }
    const candidate = reconstruct(ring, monomials, values, modulus);
    if (candidate !== undefined && divideExactly(ring, a, candidate) !== undefined && divideExactly(ring, b, candidate) !== undefined)
      return candidate;
  }
  return undefined;
}

function reconstruct<T>(
  ring: PolynomialRing<T>,
  monomials: readonly Monomial[],
  values: readonly bigint[][],
  modulus: bigint,
): Polynomial<T> | undefined {
  const terms: Array<[Monomial, T]> = [];
  for (let i = 0; i < monomials.length; i++) {
    const parts = values[i]!.map((x) => reconstructRational(x, modulus));
    if (parts.some((r) => r === undefined)) return undefined;
    let d = 1n;
    for (const r of parts) d *= r!.d / gcd(d, r!.d);
    const field = ring.field;
    const c = parts.map((r) => (r!.n * d) / r!.d);
    terms.push([monomials[i]!, field instanceof RealField ? (field.element(c, d) as unknown as T) : field.fromRational(c[0]!, d)]);
  }
  return ring.fromTerms(terms);
}

/** The monic gcds of the images of a and b; undefined if leading terms vanish or the images disagree in shape. */
function imagesOf<T>(ring: PolynomialRing<T>, a: Polynomial<T>, b: Polynomial<T>, e: Embeddings<T>): Polynomial<number>[] | undefined {
  const small = new PolynomialRing<number>(new PrimeField(e.p), ring.variables);
  const variables = [...new Set([...ring.support(a), ...ring.support(b)])].sort((x, y) => x - y);
  const out: Polynomial<number>[] = [];
  for (const map of e.maps) {
    const x = ring.map(a, map, small);
    const y = ring.map(b, map, small);
    if (x.monomials.at(-1) !== a.monomials.at(-1) || y.monomials.at(-1) !== b.monomials.at(-1)) return undefined;
    const g = gcdPrime(small, e.p, x, y, variables);
    if (g === undefined || (out.length > 0 && g.monomials.at(-1) !== out[0]!.monomials.at(-1))) return undefined;
    out.push(g);
  }
  return out;
}

type Ring = PolynomialRing<number>;
type Poly = Polynomial<number>;

function monicLast(ring: Ring, a: Poly): Poly {
  const c = a.coefficients.at(-1);
  return c === undefined || c === 1 ? a : ring.scale(a, ring.field.inv(c));
}
function toDense(ring: Ring, a: Poly, v: number): Int32Array {
  const out = new Int32Array(ring.degreeIn(a, v) + 1);
  a.monomials.forEach((m, i) => {
    out[m.length] = a.coefficients[i]!;
  });
  return out;
}
function fromDense(ring: Ring, a: Int32Array, v: number): Poly {
  return ring.fromTerms(Array.from(a, (c, e) => [String.fromCharCode(v).repeat(e), c] as const));
}
/** Coefficients in variable v (dense) of the monomials in the other variables. */
function collect(a: Poly, v: number): Map<Monomial, Int32Array> {
  const lists = new Map<Monomial, number[]>();
  const c = String.fromCharCode(v);
  a.monomials.forEach((m, i) => {
    const first = m.indexOf(c);
    const e = first < 0 ? 0 : m.lastIndexOf(c) - first + 1;
    const rest = first < 0 ? m : m.slice(0, first) + m.slice(first + e);
    let list = lists.get(rest);
    if (list === undefined) lists.set(rest, (list = []));
    while (list.length < e) list.push(0);
    list[e] = a.coefficients[i]!;
  });
  return new Map([...lists].map(([m, list]) => [m, Int32Array.from(list)]));
}
const last = (list: Iterable<Monomial>) => [...list].reduce((x, y) => (x.length > y.length || (x.length === y.length && x > y) ? x : y));

/** Monic gcd over GF(p) in the listed variables; undefined if evaluation points run out. */
function gcdPrime(ring: Ring, p: number, a: Poly, b: Poly, variables: readonly number[]): Poly | undefined {
  if (ring.isZero(a)) return monicLast(ring, b);
  if (ring.isZero(b)) return monicLast(ring, a);
  if (ring.isConstant(a) || ring.isConstant(b)) return ring.one;
  if (variables.length === 1)
    return fromDense(ring, gcdModular(toDense(ring, a, variables[0]!), toDense(ring, b, variables[0]!), p), variables[0]!);
  const v = variables.at(-1)!;
  const others = variables.slice(0, -1);
  const [ca, cb] = [collect(a, v), collect(b, v)];
  const content = (c: Map<Monomial, Int32Array>) => [...c.values()].reduce((x, y) => gcdModular(x, y, p), new Int32Array(0));
  const [ka, kb] = [content(ca), content(cb)];
  const common = fromDense(ring, gcdModular(ka, kb, p), v);
  const pa = divideExactly(ring, a, fromDense(ring, ka, v))!;
  const pb = divideExactly(ring, b, fromDense(ring, kb, v))!;
  const [la, lb] = [collect(pa, v), collect(pb, v)].map((c) => c.get(last(c.keys()))!) as [Int32Array, Int32Array];
  const lead = gcdModular(la, lb, p);
  const f = ring.field;
  const value = (c: Int32Array, x: number) => c.reduceRight((s, y) => f.add(f.mul(s, x), y), 0);
  const at = (q: Poly, x: number) => ring.fromTerms([...collect(q, v)].map(([m, c]) => [m, value(c, x)] as const));
  let best: Monomial | undefined;
  let sum = ring.zero; // Newton's interpolation so far
  let nodes = ring.one; // product of (x - point)
  let count = 0;
  const enough = Math.min(ring.degreeIn(pa, v), ring.degreeIn(pb, v)) + lead.length;
  for (let x = 1, tries = 0; tries < 4 * enough + 40; x++, tries++) {
    if (value(la, x) === 0 || value(lb, x) === 0) continue;
    const g = gcdPrime(ring, p, at(pa, x), at(pb, x), others);
    if (g === undefined) return undefined;
    const top = g.monomials.at(-1)!;
    if (top === '') return common;
    if (best !== undefined && top !== best) {
      if (last([top, best]) === top) continue;
      best = undefined;
    }
    if (best === undefined) {
      best = top;
      sum = ring.zero;
      nodes = ring.one;
      count = 0;
    }
    const scaled = ring.scale(g, value(lead, x));
    const difference = ring.sub(scaled, at(sum, x));
    const step = ring.scale(difference, f.inv(ring.coefficient(at(nodes, x), '')));
    sum = ring.add(sum, ring.mul(step, nodes));
    nodes = ring.mul(nodes, ring.sub(ring.variable(v), ring.constant(x)));
    count++;
    if (count > 1 && (ring.isZero(difference) || count >= enough)) {
      const primitive = divideExactly(ring, sum, fromDense(ring, content(collect(sum, v)), v))!;
      if (divideExactly(ring, pa, primitive) !== undefined && divideExactly(ring, pb, primitive) !== undefined)
        return monicLast(ring, ring.mul(primitive, common));
      if (count >= enough) best = undefined;
    }
  }
  return undefined;
}
