/**
 * Products of term lists. Monomials are packed into doubles (exponents side by side, below 2^53) where they
 * fit, so that multiplying monomials is one addition, and like terms meet in an open-addressing table.
 * Rational coefficients are brought to a common denominator first; they then run as doubles while no sum can
 * reach 2^53, as bigints otherwise.
 */
import { AbelianField, type Algebraic, type Field, gcd, type Rational, rationals } from '../field/index.ts';
import { compareMonomials, type Monomial, multiplyMonomials } from './monomial.ts';

/** Terms in canonical order, no zero coefficient. */
export interface TermList<T> {
  readonly monomials: readonly Monomial[];
  readonly coefficients: readonly T[];
}

/** Below this number of term products a plain map of texts is quicker than packing (measured: break-even 30 to 60). */
const PACK_FROM = 48;

/** Product, terms of degree above `limit` left out. */
export function multiplyTerms<T>(f: Field<T>, a: TermList<T>, b: TermList<T>, limit = Infinity): TermList<T> {
  const na = a.monomials.length;
  const nb = b.monomials.length;
  if (na === 0 || nb === 0) return { monomials: [], coefficients: [] };
  if (na === 1 && a.monomials[0] === '') return scaleTerms(f, b, a.coefficients[0]!, limit);
  if (nb === 1 && b.monomials[0] === '') return scaleTerms(f, a, b.coefficients[0]!, limit);
  if (na * nb >= PACK_FROM) {
    const packing = packingFor(a, b, limit);
    if (packing !== undefined) return packedProduct(f, a, b, limit, packing);
  }
  const sums = new Map<Monomial, T>();
  for (let i = 0; i < na; i++) {
    const m = a.monomials[i]!;
    const x = a.coefficients[i]!;
    for (let j = 0; j < nb; j++) {
      const n = b.monomials[j]!;
      if (m.length + n.length > limit) break;
      const key = multiplyMonomials(m, n);
      const term = f.mul(x, b.coefficients[j]!);
      const old = sums.get(key);
      sums.set(key, old === undefined ? term : f.add(old, term));
    }
  }
  return sortedTerms(f, sums);
}

function scaleTerms<T>(f: Field<T>, a: TermList<T>, s: T, limit: number): TermList<T> {
  let end = a.monomials.length;
  while (end > 0 && a.monomials[end - 1]!.length > limit) end--;
  const monomials: Monomial[] = [];
  const coefficients: T[] = [];
  for (let i = 0; i < end; i++) {
    const c = f.mul(s, a.coefficients[i]!);
    if (f.isZero(c)) continue;
    monomials.push(a.monomials[i]!);
    coefficients.push(c);
  }
  return { monomials, coefficients };
}

/** Canonical term list from a map; zero sums dropped. */
export function sortedTerms<T>(f: Field<T>, sums: ReadonlyMap<Monomial, T>): TermList<T> {
  const monomials: Monomial[] = [];
  for (const [m, c] of sums) if (!f.isZero(c)) monomials.push(m);
  monomials.sort(compareMonomials);
  return { monomials, coefficients: monomials.map((m) => sums.get(m)!) };
}

interface Packing {
  readonly variables: readonly number[];
  readonly slot: ReadonlyMap<number, number>; // variable -> weight
  readonly base: number;
}

function packingFor(a: TermList<unknown>, b: TermList<unknown>, limit: number): Packing | undefined {
  const top = Math.min(limit, a.monomials.at(-1)!.length + b.monomials.at(-1)!.length);
  const used = new Set<number>();
  const most = Math.floor(53 / Math.log2(top + 1)) + 1;
  for (const list of [a.monomials, b.monomials])
    for (const m of list) {
      for (let i = 0; i < m.length; i++) used.add(m.charCodeAt(i));
      if (used.size > most) return undefined;
    }
  const variables = [...used].sort((x, y) => x - y);
  const base = top + 1;
  if (variables.length * Math.log2(base) >= 52.9) return undefined;
  const slot = new Map<number, number>();
  let weight = 1;
  for (let i = variables.length - 1; i >= 0; i--) {
    slot.set(variables[i]!, weight);
    weight *= base;
  }
  return { variables, slot, base };
}

function pack(list: readonly Monomial[], packing: Packing): Float64Array {
  const weights = new Float64Array((packing.variables.at(-1) ?? 0) + 1);
  for (const [v, w] of packing.slot) weights[v] = w;
  const out = new Float64Array(list.length);
  list.forEach((m, i) => {
    let k = 0;
    for (let j = 0; j < m.length; j++) k += weights[m.charCodeAt(j)]!;
    out[i] = k;
  });
  return out;
}

function unpack(key: number, packing: Packing): Monomial {
  let out = '';
  const { variables, base } = packing;
  for (let i = variables.length - 1; i >= 0 && key > 0; i--) {
    const q = Math.floor(key / base);
    const e = key - q * base;
    key = q;
    if (e === 1) out = String.fromCharCode(variables[i]!) + out;
    else if (e > 0) out = String.fromCharCode(variables[i]!).repeat(e) + out;
  }
  return out;
}

/** Open-addressing table from packed monomials to places 0, 1, 2, … */
class PackedTable {
  #keys: Float64Array;
  #places: Int32Array;
  #mask: number;
  size = 0;
  keys: number[] = [];
  constructor(expected: number) {
    let capacity = 64;
    while (capacity < 2 * expected) capacity *= 2;
    this.#keys = new Float64Array(capacity);
    this.#places = new Int32Array(capacity).fill(-1);
    this.#mask = capacity - 1;
  }
  place(key: number): number {
    let h = this.#start(key);
    for (;;) {
      const p = this.#places[h]!;
      if (p < 0) break;
      if (this.#keys[h] === key) return p;
      h = (h + 1) & this.#mask;
    }
    this.#keys[h] = key;
    this.#places[h] = this.size;
    this.keys.push(key);
    this.size++;
    if (this.size * 2 > this.#mask) this.#grow();
    return this.size - 1;
  }
  #start(key: number): number {
    const high = Math.floor(key / 4294967296);
    const x = Math.imul((key - high * 4294967296) | 0, 0x9e3779b1) ^ Math.imul(high, 0x85ebca6b);
    return (x ^ (x >>> 15)) & this.#mask;
  }
  #grow(): void {
    const capacity = 2 * (this.#mask + 1);
    this.#mask = capacity - 1;
    this.#keys = new Float64Array(capacity);
    this.#places = new Int32Array(capacity).fill(-1);
    this.keys.forEach((key, place) => {
      let h = this.#start(key);
      while (this.#places[h]! >= 0) h = (h + 1) & this.#mask;
      this.#keys[h] = key;
      this.#places[h] = place;
    });
  }
}

function packedProduct<T>(f: Field<T>, a: TermList<T>, b: TermList<T>, limit: number, packing: Packing): TermList<T> {
  const ka = pack(a.monomials, packing);
  const kb = pack(b.monomials, packing);
  const ends = a.monomials.map((m) => lastWithin(b.monomials, limit - m.length));
  const table = new PackedTable(Math.min(ka.length * kb.length, 4096));
  const values = rationalProduct(f, a, b, ka, kb, ends, table) ?? genericProduct(f, a, b, ka, kb, ends, table);
  const names = table.keys.map((k) => unpack(k, packing));
  const order: number[] = [];
  values.forEach((v, i) => {
    if (!f.isZero(v)) order.push(i);
  });
  order.sort((x, y) => names[x]!.length - names[y]!.length || table.keys[y]! - table.keys[x]!);
  return { monomials: order.map((i) => names[i]!), coefficients: order.map((i) => values[i]!) };
}

/** Number of leading monomials (sorted by degree) of degree at most d. */
function lastWithin(list: readonly Monomial[], d: number): number {
  let lo = 0;
  let hi = list.length;
  while (lo < hi) {
    const mid = (lo + hi) >> 1;
    if (list[mid]!.length <= d) lo = mid + 1;
    else hi = mid;
  }
  return lo;
}

function genericProduct<T>(
  f: Field<T>,
  a: TermList<T>,
  b: TermList<T>,
  ka: Float64Array,
  kb: Float64Array,
  ends: readonly number[],
  table: PackedTable,
): T[] {
  const out: T[] = [];
  for (let i = 0; i < ka.length; i++) {
    const x = a.coefficients[i]!;
    for (let j = 0; j < ends[i]!; j++) {
      const place = table.place(ka[i]! + kb[j]!);
      const term = f.mul(x, b.coefficients[j]!);
      if (place === out.length) out.push(term);
      else out[place] = f.add(out[place]!, term);
    }
  }
  return out;
}

/** Product by integers over a common denominator, for Q in either of its spellings; undefined for other fields. */
function rationalProduct<T>(
  f: Field<T>,
  a: TermList<T>,
  b: TermList<T>,
  ka: Float64Array,
  kb: Float64Array,
  ends: readonly number[],
  table: PackedTable,
): T[] | undefined {
  const plain = (f as unknown) === rationals;
  if (!plain && !(f instanceof AbelianField && f.degree === 1)) return undefined;
  const fraction = (x: T): Rational =>
    plain ? (x as unknown as Rational) : { n: (x as unknown as Algebraic).c[0]!, d: (x as unknown as Algebraic).d };
  const integers = (list: readonly T[]) => {
    let d = 1n;
    for (const x of list) {
      const e = fraction(x).d;
      if (e !== 1n && d % e !== 0n) d *= e / gcd(d, e);
    }
    return { d, n: list.map((x) => fraction(x).n * (d / fraction(x).d)) };
  };
  const ia = integers(a.coefficients);
  const ib = integers(b.coefficients);
  const d = ia.d * ib.d;
  const size = (list: readonly bigint[]) => {
    let most = 0n;
    for (const x of list) {
      const magnitude = x < 0n ? -x : x;
      if (magnitude > most) most = magnitude;
    }
    return most;
  };
  const bound = size(ia.n) * size(ib.n) * BigInt(Math.min(ka.length, kb.length));
  if (bound < 1n << 53n) {
    const na = Float64Array.from(ia.n, Number);
    const nb = Float64Array.from(ib.n, Number);
    const sums: number[] = [];
    for (let i = 0; i < ka.length; i++) {
      const x = na[i]!;
      const k = ka[i]!;
      const end = ends[i]!;
      for (let j = 0; j < end; j++) {
        const place = table.place(k + kb[j]!);
        if (place === sums.length) sums.push(x * nb[j]!);
        else sums[place] = sums[place]! + x * nb[j]!;
      }
    }
    return sums.map((s) => f.fromRational(BigInt(s), d));
  }
  const sums: bigint[] = [];
  for (let i = 0; i < ka.length; i++)
    for (let j = 0; j < ends[i]!; j++) {
      const place = table.place(ka[i]! + kb[j]!);
      if (place === sums.length) sums.push(ia.n[i]! * ib.n[j]!);
      else sums[place] = sums[place]! + ia.n[i]! * ib.n[j]!;
    }
  return sums.map((s) => f.fromRational(s, d));
}
