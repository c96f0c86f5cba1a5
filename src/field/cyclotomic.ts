/**
 * Cyclotomic fields Q(zeta_N), the home of characters. Basis 1, zeta, …, zeta^{phi(N)-1}.
 * Embedding: zeta = exp(2 pi i/N).
 */
import { cyclotomicPolynomial, divisors, factorize, gcdInt } from './arithmetic.ts';
import { AbelianField, type Algebraic } from './number-field.ts';
import { type Rational, rational, ratioToNumber } from './rational.ts';

const cache = new Map<number, CyclotomicField>();

export class CyclotomicField extends AbelianField {
  readonly name: string;
  readonly conductor: number;
  /** Units modulo N, in increasing order; automorphism i is zeta -> zeta^units[i]. */
  readonly units: readonly number[];
  readonly #reduced: readonly (readonly number[])[]; // zeta^k over the basis, 0 <= k < N

  private constructor(n: number) {
    const phi = cyclotomicPolynomial(n);
    super(phi.length - 1);
    this.conductor = n;
    this.name = n <= 2 ? 'Q' : `Q(zeta_${n})`;
    const units: number[] = [];
    for (let k = 1; k <= n; k++) if (gcdInt(k, n) === 1) units.push(k);
    this.units = units;
    const m = this.degree;
    const rows: number[][] = [];
    let row = new Array<number>(m).fill(0);
    row[0] = 1;
    for (let k = 0; k < n; k++) {
      rows.push(row);
      const top = row[m - 1]!;
      const next = [0, ...row.slice(0, m - 1)];
      for (let i = 0; i < m; i++) next[i] = next[i]! - top * phi[i]!;
      row = next;
    }
    this.#reduced = rows;
  }

  /** The field of conductor n >= 1 (one object for each n). */
  static of(n: number): CyclotomicField {
    let f = cache.get(n);
    if (f === undefined) cache.set(n, (f = new CyclotomicField(n)));
    return f;
  }

  /** Sum of multiplicity[k] * zeta^k. */
  fromPowers(multiplicity: readonly (number | bigint)[]): Algebraic {
    const out = new Array<bigint>(this.degree).fill(0n);
    multiplicity.forEach((m, k) => {
      const w = BigInt(m);
      if (w === 0n) return;
      const row = this.#reduced[k % this.conductor]!;
      for (let i = 0; i < row.length; i++) if (row[i] !== 0) out[i] = out[i]! + w * BigInt(row[i]!);
    });
    return { c: out, d: 1n };
  }

  /** zeta_N^k for any integer k. */
  root(k: number): Algebraic {
    const n = this.conductor;
    return { c: this.#reduced[((k % n) + n) % n]!.map(BigInt), d: 1n };
  }

  /** The image of an element of Q(zeta_M), M dividing N. */
  embed(from: CyclotomicField, a: Algebraic): Algebraic {
    if (from === this) return a;
    const step = this.conductor / from.conductor;
    if (!Number.isInteger(step)) throw new RangeError(`${from.name} does not lie in ${this.name}`);
    const powers = new Array<bigint>(this.conductor).fill(0n);
    a.c.forEach((x, k) => {
      powers[(k * step) % this.conductor] = x;
    });
    return this.element(this.fromPowers(powers).c, a.d);
  }

  protected product(a: readonly bigint[], b: readonly bigint[]): bigint[] {
    const m = this.degree;
    const out = new Array<bigint>(m).fill(0n);
    const high = new Array<bigint>(m).fill(0n); // coefficients of zeta^m … zeta^{2m-2}
    for (let i = 0; i < m; i++) {
      const x = a[i]!;
      if (x === 0n) continue;
      for (let j = 0; j < m; j++) {
        const y = b[j]!;
        if (y === 0n) continue;
        const k = i + j;
        if (k < m) out[k] = out[k]! + x * y;
        else high[k - m] = high[k - m]! + x * y;
      }
    }
    for (let h = 0; h < m - 1; h++) {
      const x = high[h]!;
      if (x === 0n) continue;
      const row = this.#reduced[(m + h) % this.conductor]!;
      for (let i = 0; i < m; i++) if (row[i] !== 0) out[i] = out[i]! + x * BigInt(row[i]!);
    }
    return out;
  }

  /** Smallest d dividing N such that all the given elements lie in Q(zeta_d). */
  leastConductor(elements: readonly Algebraic[]): number {
    const n = this.conductor;
    const irrational = [...new Set(elements)].filter((a) => this.toRational(a) === undefined);
    if (irrational.length === 0) return 1;
    return (
      divisors(n).find((d) => this.units.every((k) => (k - 1) % d !== 0 || irrational.every((a) => this.equal(this.galois(k, a), a)))) ?? n
    );
  }

  /**
   * The mean of zeta_N^k over the automorphisms that fix Q(zeta_d), d dividing N: weight * zeta_order^power, order dividing d.
   * With M the order of zeta_N^k and p^a the part of a prime p in M: nothing is left if p divides both d and M/gcd(M, d), or if
   * p does not divide d and a > 1; a prime p with a = 1 that does not divide d gives the factor -1/(p - 1).
   */
  meanOfRoot(k: number, d: number): { order: number; power: number; weight: Rational } | undefined {
    const n = this.conductor;
    const j = ((k % n) + n) % n;
    const m = n / gcdInt(j, n);
    const t = j / (n / m);
    const inside = gcdInt(m, d);
    const outside = m / inside;
    if (gcdInt(outside, d) !== 1) return undefined;
    let weight = 1n;
    for (const [p, e] of factorize(outside)) {
      if (e > 1) return undefined;
      weight *= BigInt(1 - p);
    }
    let power = 0;
    while (inside > 1 && (power * outside - t) % inside !== 0) power++;
    return { order: inside, power, weight: rational(1n, weight) };
  }

  /** zeta -> zeta^k, gcd(k, N) = 1. */
  galois(k: number, a: Algebraic): Algebraic {
    const n = this.conductor;
    const powers = new Array<bigint>(n).fill(0n);
    a.c.forEach((x, j) => {
      const e = (((j * k) % n) + n) % n;
      powers[e] = powers[e]! + x;
    });
    return { c: this.fromPowers(powers).c, d: a.d };
  }
  automorphism(index: number, a: Algebraic): Algebraic {
    return this.galois(this.units[index]!, a);
  }
  conj(a: Algebraic): Algebraic {
    return this.degree === 1 ? a : this.galois(this.conductor - 1, a);
  }
  /** Real and imaginary part of the standard embedding. */
  toComplex(a: Algebraic): { re: number; im: number } {
    let re = 0;
    let im = 0;
    a.c.forEach((x, k) => {
      if (x === 0n) return;
      const v = ratioToNumber(x, a.d);
      const t = (2 * Math.PI * k) / this.conductor;
      re += v * Math.cos(t);
      im += v * Math.sin(t);
    });
    return { re, im };
  }
  /** Coefficients over the powers of zeta, as text: `1 + z - z^3` with z = zeta_N. */
  format(a: Algebraic): string {
    const terms: string[] = [];
    a.c.forEach((x, k) => {
      if (x === 0n) return;
      const magnitude = x < 0n ? -x : x;
      const power = k === 0 ? '' : k === 1 ? 'z' : `z^${k}`;
      const body = power === '' ? `${magnitude}` : magnitude === 1n ? power : `${magnitude}*${power}`;
      terms.push(terms.length === 0 ? (x < 0n ? `-${body}` : body) : x < 0n ? ` - ${body}` : ` + ${body}`);
    });
    const sum = terms.join('') || '0';
    return a.d === 1n ? sum : terms.length === 1 ? `${sum}/${a.d}` : `(${sum})/${a.d}`;
  }
}
