/**
 * Real abelian fields: Q(2 cos(2 pi/N)) with square roots of further primes adjoined. Every exact number
 * of a model lives in one of them: integers, fractions, square roots of rationals, cos, sin and tan of
 * rational multiples of pi.
 *
 * Basis: c_k * sqrt(r) with c_0 = 1, c_k = 2 cos(2 pi k/N) for 0 < k < m, m = max(1, phi(N)/2), and r a
 * product of adjoined primes. The adjoined primes do not ramify in the cyclotomic part, so the two parts
 * are linearly disjoint and the basis is one (ramification of Q(sqrt p) at p; from memory).
 */
import { gcdInt, isqrt, lcmInt } from './arithmetic.ts';
import { reductionTable } from './cosine-table.ts';
import { CyclotomicField } from './cyclotomic.ts';
import type { OrderedField } from './field.ts';
import { AbelianField, type Algebraic } from './number-field.ts';
import { powModInt } from './prime.ts';
import { gcd, type Rational, rational, ratioToNumber } from './rational.ts';
import { LATEX_STYLE, MODEL_STYLE, type NumberStyle, writeSum } from './real-writing.ts';
import { makeReduction, type Reduction } from './reduction.ts';
import { squareFree } from './square-free.ts';
import { cosFixed } from './trigonometry.ts';

/** What a field must contain: 2 cos(2 pi/n) for each n, the square root of each integer. */
export interface FieldDemand {
  readonly cosines?: readonly number[];
  readonly squareRoots?: readonly bigint[];
}

/** The largest degree over Q that is worth computing in. */
export const DEGREE_LIMIT = 512;

const cache = new Map<string, RealField>();
const normalConductor = (n: number) => (n % 4 === 2 ? n / 2 : n);

export class RealField extends AbelianField implements OrderedField<Algebraic> {
  readonly name: string;
  /** Odd or divisible by 4; 1 if there is no cyclotomic part. */
  readonly conductor: number;
  /** Primes whose square roots are adjoined, increasing. */
  readonly radicals: readonly bigint[];
  readonly #m: number;
  readonly #masks: number;
  readonly #reduced: readonly (readonly number[])[]; // 2cos(2 pi k/N) over c_0 … c_{m-1}
  readonly #masked: readonly bigint[]; // product of the radicals in a mask
  readonly #units: readonly number[];
  readonly #values: number[];
  readonly #cosines = new Map<string, Algebraic | undefined>();
  readonly #roots = new Map<bigint, Algebraic | undefined>();
  readonly #embeddings = new Map<RealField, (Algebraic | undefined)[]>();
  readonly #reductions = new Map<number, Reduction>();

  private constructor(conductor: number, radicals: readonly bigint[]) {
    const cyclotomic = CyclotomicField.of(conductor);
    const m = Math.max(1, cyclotomic.degree / 2);
    super(m << radicals.length);
    this.conductor = conductor;
    this.radicals = radicals;
    this.#m = m;
    this.#masks = 1 << radicals.length;
    const parts = [...(m > 1 ? [`cos(2*pi/${conductor})`] : []), ...radicals.map((r) => `sqrt(${r})`)];
    this.name = parts.length === 0 ? 'Q' : `Q(${parts.join(', ')})`;
    this.#reduced = m === 1 ? [] : reductionTable(conductor, m);
    this.#masked = Array.from({ length: this.#masks }, (_, mask) => radicals.reduce((x, r, i) => (mask & (1 << i) ? x * r : x), 1n));
    this.#units = cyclotomic.units.filter((k) => 2 * k <= conductor || conductor <= 2);
    this.#values = Array.from({ length: this.degree }, (_, i) => {
      const k = i % m;
      return (k === 0 ? 1 : 2 * Math.cos((2 * Math.PI * k) / conductor)) * Math.sqrt(Number(this.#masked[(i / m) | 0]!));
    });
  }

  /** The smallest field of this family that meets the demand. Throws RangeError past DEGREE_LIMIT. */
  static of(demand: FieldDemand = {}): RealField {
    let n = 1;
    for (const k of demand.cosines ?? []) n = normalConductor(lcmInt(n, normalConductor(k)));
    // only 2cos matters: conductors 1, 3, 4 give nothing new
    let primes = new Set<bigint>();
    for (const r of demand.squareRoots ?? []) for (const p of squareFree(r < 0n ? -r : r).primes) primes.add(p);
    for (let changed = true; changed; ) {
      changed = false;
      for (const p of [...primes].sort((a, b) => (b > a ? 1 : -1))) {
        const ramified = p === 2n ? n % 4 === 0 && n > 4 : n > 4 && p < 1_000_000n && n % Number(p) === 0;
        if (!ramified) continue;
        const next = lcmInt(n, p === 2n ? 8 : p % 4n === 1n ? Number(p) : 4 * Number(p));
        primes = new Set([...primes].filter((q) => q !== p));
        n = next;
        changed = true;
        break;
      }
    }
    if (n <= 4) n = 1;
    // a quadratic cyclotomic part is the same field as one square root: keep one spelling
    const quadratic = new Map([
      [5, 5n],
      [8, 2n],
      [12, 3n],
    ]).get(n);
    if (quadratic !== undefined) {
      n = 1;
      primes.add(quadratic);
    }
    const radicals = [...primes].sort((a, b) => (a > b ? 1 : -1));
    const key = `${n};${radicals.join(',')}`;
    const known = cache.get(key);
    if (known !== undefined) return known;
    const degree = Math.max(1, CyclotomicField.of(n).degree / 2) * 2 ** radicals.length;
    if (degree > DEGREE_LIMIT)
      throw new RangeError(`the numbers of this model need a field of degree ${degree} over Q; the limit is ${DEGREE_LIMIT}`);
    const field = new RealField(n, radicals);
    cache.set(key, field);
    return field;
  }

  /** The smallest field of the family that contains both. */
  static join(a: RealField, b: RealField): RealField {
    if (a === b) return a;
    return RealField.of({ cosines: [a.conductor, b.conductor], squareRoots: [...a.radicals, ...b.radicals] });
  }

  /** What `RealField.of` needs to contain this field. */
  get demand(): FieldDemand {
    return { cosines: [this.conductor], squareRoots: this.radicals };
  }

  /** cos(2 pi k/n), or undefined if it is not in the field. */
  cos(k: number, n: number): Algebraic | undefined {
    const g = gcdInt(k, n);
    let num = (((k / g) % (n / g)) + n / g) % (n / g);
    let den = n / g;
    let sign = 1n;
    if (den % 4 === 2) {
      // zeta_{2j} = -zeta_j^{(j+1)/2}
      const j = den / 2;
      sign = num % 2 === 0 ? 1n : -1n;
      num = (num * ((j + 1) / 2)) % j;
      den = j;
    }
    const key = `${num}/${den}/${sign}`;
    if (!this.#cosines.has(key)) this.#cosines.set(key, this.#makeCos(num, den, sign));
    return this.#cosines.get(key);
  }

  /** sign cos(2 pi num/den) for a reduced fraction, den not 2 mod 4. */
  #makeCos(num: number, den: number, sign: bigint): Algebraic | undefined {
    const half = (x: Algebraic) =>
      this.element(
        x.c.map((y) => y * sign),
        x.d * 2n,
      );
    if (den === 1) return this.fromInteger(sign);
    if (den === 3) return this.fromRational(-sign, 2n);
    if (den === 4) return num % 2 === 0 ? this.fromInteger(num === 0 ? sign : -sign) : this.zero;
    if (this.conductor % den === 0) {
      const at = (num * (this.conductor / den)) % this.conductor;
      const c = this.zero.c.slice();
      this.#reduced[at]!.forEach((x, i) => {
        c[i] = BigInt(x);
      });
      return half({ c, d: 1n });
    }
    if (den === 8 || den === 12 || den === 5) {
      const root = this.sqrt(den === 8 ? rational(2n) : den === 12 ? rational(3n) : rational(5n));
      if (root === undefined) return undefined;
      if (den === 5) {
        // 2cos(2 pi/5) = (sqrt5 - 1)/2, 2cos(4 pi/5) = (-sqrt5 - 1)/2
        const s = num === 1 || num === 4 ? root : this.neg(root);
        return half(this.mul(this.sub(s, this.one), this.fromRational(1n, 2n)));
      }
      const negative = den === 8 ? num === 3 || num === 5 : num === 5 || num === 7;
      return half(negative ? this.neg(root) : root);
    }
    return undefined;
  }

  /** sin(2 pi k/n), or undefined if it is not in the field. */
  sin(k: number, n: number): Algebraic | undefined {
    return this.cos(n - 4 * k, 4 * n);
  }

  /** The square root of a non-negative rational, or undefined if it is not in the field. */
  sqrt(r: Rational): Algebraic | undefined {
    if (r.n < 0n) return undefined;
    if (r.n === 0n) return this.zero;
    const { primes, square } = squareFree(r.n * r.d);
    let out = this.fromRational(square, r.d);
    for (const p of primes) {
      const root = this.#sqrtPrime(p);
      if (root === undefined) return undefined;
      out = this.mul(out, root);
    }
    return out;
  }

  #sqrtPrime(p: bigint): Algebraic | undefined {
    if (!this.#roots.has(p)) this.#roots.set(p, this.#makeSqrtPrime(p));
    return this.#roots.get(p);
  }

  #makeSqrtPrime(p: bigint): Algebraic | undefined {
    const index = this.radicals.indexOf(p);
    if (index >= 0) {
      const c = this.zero.c.slice();
      c[this.#m << index] = 1n;
      return { c, d: 1n };
    }
    if (p > BigInt(this.conductor)) return undefined;
    const q = Number(p);
    const need = q === 2 ? 8 : q % 4 === 1 ? q : 4 * q;
    if (this.conductor % need !== 0) return undefined;
    if (q === 2) return this.mul(this.fromInteger(2), this.cos(1, 8)!);
    // Gauss 1811: sum of (k/p) zeta_p^k is sqrt(p) for p = 1 mod 4 and i sqrt(p) for p = 3 mod 4.
    let sum = this.zero;
    for (let k = 1; k < q; k++) {
      const legendre = powModInt(k, (q - 1) / 2, q) === 1 ? 1 : -1;
      const term = q % 4 === 1 ? this.cos(k, q)! : this.sin(k, q)!;
      sum = legendre === 1 ? this.add(sum, term) : this.sub(sum, term);
    }
    return sum;
  }

  /** The image of an element of a subfield of this family; throws RangeError if it does not lie in here. */
  embed(from: RealField, a: Algebraic): Algebraic {
    if (from === this) return a;
    let images = this.#embeddings.get(from);
    if (images === undefined) {
      images = new Array<Algebraic | undefined>(from.degree).fill(undefined);
      this.#embeddings.set(from, images);
    }
    let out = this.zero;
    for (let i = 0; i < a.c.length; i++) {
      const x = a.c[i]!;
      if (x === 0n) continue;
      images[i] ??= this.#imageOfBasis(from, i);
      const image = images[i]!;
      out = this.add(out, this.element(x === 1n ? image.c : image.c.map((y) => x * y), image.d));
    }
    return a.d === 1n ? out : this.element(out.c, out.d * a.d);
  }

  #imageOfBasis(from: RealField, i: number): Algebraic {
    const k = i % from.#m;
    const cosine = k === 0 ? this.one : this.cos(k, from.conductor);
    const root = this.sqrt(rational(from.#masked[(i / from.#m) | 0]!));
    if (cosine === undefined || root === undefined) throw new RangeError(`${from.name} does not lie in ${this.name}`);
    const image = this.mul(cosine, root);
    return k === 0 ? image : this.add(image, image);
  }

  /** The real element of a cyclotomic field, or undefined if it is not real or not in here. */
  fromCyclotomic(from: CyclotomicField, a: Algebraic): Algebraic | undefined {
    const ratio = from.toRational(a);
    if (ratio !== undefined) return this.fromRational(ratio.n, ratio.d);
    if (!from.equal(a, from.conj(a))) return undefined;
    // a = (a + conj a)/2 = sum of c_k cos(2 pi k/n), each term replaced by its mean in the least field that holds a
    const d = from.leastConductor([a]);
    let out = this.zero;
    for (let k = 0; k < a.c.length; k++) {
      if (a.c[k] === 0n) continue;
      const mean = from.meanOfRoot(k, d);
      if (mean === undefined) continue;
      const cosine = this.cos(mean.power, mean.order);
      if (cosine === undefined) return undefined;
      out = this.add(out, this.mul(this.fromRational(a.c[k]! * mean.weight.n, mean.weight.d), cosine));
    }
    return this.mul(out, this.fromRational(1n, a.d));
  }

  protected product(a: readonly bigint[], b: readonly bigint[]): bigint[] {
    const m = this.#m;
    const out = new Array<bigint>(this.degree).fill(0n);
    if (m === 1) {
      for (let s = 0; s < this.#masks; s++) {
        const x = a[s]!;
        if (x === 0n) continue;
        for (let t = 0; t < this.#masks; t++) {
          const y = b[t]!;
          if (y !== 0n) out[s ^ t] = out[s ^ t]! + x * y * this.#masked[s & t]!;
        }
      }
      return out;
    }
    for (let s = 0; s < this.#masks; s++)
      for (let t = 0; t < this.#masks; t++) {
        const base = (s ^ t) * m;
        const common = this.#masked[s & t]!;
        for (let i = 0; i < m; i++) {
          let x = a[s * m + i]!;
          if (x === 0n) continue;
          if (common !== 1n) x *= common;
          for (let j = 0; j < m; j++) {
            const y = b[t * m + j]!;
            if (y === 0n) continue;
            const xy = x * y;
            if (i === 0 || j === 0) {
              out[base + i + j] = out[base + i + j]! + xy;
              continue;
            }
            // c_i c_j = c_{i+j} + c_{|i-j|}; 2cos(0) = 2 = 2 c_0
            if (i + j < m) out[base + i + j] = out[base + i + j]! + xy;
            else {
              const row = this.#reduced[(i + j) % this.conductor]!;
              for (let l = 0; l < m; l++) if (row[l] !== 0) out[base + l] = out[base + l]! + xy * BigInt(row[l]!);
            }
            const diff = Math.abs(i - j);
            out[base + diff] = out[base + diff]! + (diff === 0 ? 2n * xy : xy);
          }
        }
      }
    return out;
  }

  automorphism(index: number, a: Algebraic): Algebraic {
    const m = this.#m;
    const k = this.#units[index % m]!;
    const flips = (index / m) | 0;
    const out = new Array<bigint>(this.degree).fill(0n);
    for (let i = 0; i < this.degree; i++) {
      let x = a.c[i]!;
      if (x === 0n) continue;
      const mask = (i / m) | 0;
      for (let bit = mask & flips; bit !== 0; bit &= bit - 1) x = -x;
      const j = i % m;
      if (j === 0 || k === 1) out[i] = out[i]! + x;
      else {
        const row = this.#reduced[(j * k) % this.conductor]!;
        for (let l = 0; l < m; l++) if (row[l] !== 0) out[mask * m + l] = out[mask * m + l]! + x * BigInt(row[l]!);
      }
    }
    return { c: out, d: a.d };
  }
  conj(a: Algebraic): Algebraic {
    return a;
  }

  /** Value as a fixed-point number with the given bits, and a bound on its error in units. */
  #fixed(a: Algebraic, bits: number): { value: bigint; error: bigint } {
    let value = 0n;
    let error = 1n;
    const b = BigInt(bits);
    for (let i = 0; i < this.degree; i++) {
      const x = a.c[i]!;
      if (x === 0n) continue;
      const k = i % this.#m;
      const root = isqrt(this.#masked[(i / this.#m) | 0]! << (2n * b)); // error below 1 unit
      const cosine = k === 0 ? 1n << b : 2n * cosFixed(k, this.conductor, bits); // error below 8 units
      const magnitude = x < 0n ? -x : x;
      value += (x * cosine * root) >> b;
      error += magnitude * ((root >> b) * 9n + 12n) + 1n;
    }
    return { value, error };
  }
  toNumber(a: Algebraic): number {
    if (this.degree === 1) return ratioToNumber(a.c[0]!, a.d);
    let sum = 0;
    let magnitude = 0;
    for (let i = 0; i < this.degree; i++) {
      if (a.c[i] === 0n) continue;
      const t = ratioToNumber(a.c[i]!, a.d) * this.#values[i]!;
      sum += t;
      magnitude += Math.abs(t);
    }
    if (Math.abs(sum) > 0.01 * magnitude || magnitude === 0) return sum;
    for (let bits = 128; ; bits *= 2) {
      const { value, error } = this.#fixed(a, bits);
      const size = value < 0n ? -value : value;
      if (size > error << 60n) return ratioToNumber(value, a.d << BigInt(bits));
    }
  }
  sign(a: Algebraic): -1 | 0 | 1 {
    if (this.isZero(a)) return 0;
    if (this.degree === 1) return a.c[0]! > 0n ? 1 : -1;
    let sum = 0;
    let magnitude = 0;
    for (let i = 0; i < this.degree; i++) {
      if (a.c[i] === 0n) continue;
      const t = ratioToNumber(a.c[i]!, a.d) * this.#values[i]!;
      sum += t;
      magnitude += Math.abs(t);
    }
    if (Number.isFinite(magnitude) && Math.abs(sum) > 1e-10 * magnitude) return sum > 0 ? 1 : -1;
    for (let bits = 128; ; bits *= 2) {
      const { value, error } = this.#fixed(a, bits);
      if (value > error) return 1;
      if (value < -error) return -1;
    }
  }
  compare(a: Algebraic, b: Algebraic): -1 | 0 | 1 {
    return this.sign(this.sub(a, b));
  }

  /** The square root of a in this field if there is one with a rational square (a rational). */
  sqrtElement(a: Algebraic): Algebraic | undefined {
    const r = this.toRational(a);
    return r === undefined ? undefined : this.sqrt(r);
  }

  /** Rational part and multiple of one square root, if a lies in a quadratic field: a = u + v sqrt(w). */
  quadraticForm(a: Algebraic): { u: Rational; v: Rational; w: bigint } | undefined {
    let other: Algebraic | undefined;
    for (let i = 1; i < this.degree; i++) {
      const b = this.automorphism(i, a);
      if (this.equal(a, b)) continue;
      if (other !== undefined && !this.equal(other, b)) return undefined;
      other = b;
    }
    if (other === undefined) return undefined;
    const half = this.fromRational(1n, 2n);
    const u = this.toRational(this.mul(half, this.add(a, other)))!;
    const difference = this.mul(half, this.sub(a, other));
    const square = this.toRational(this.mul(difference, difference))!;
    const { primes, square: s } = squareFree(square.n * square.d);
    const w = primes.reduce((x, p) => x * p, 1n);
    const v = rational(this.sign(difference) > 0 ? s : -s, square.d);
    return { u, v, w };
  }

  format(a: Algebraic): string {
    return this.#write(a, MODEL_STYLE);
  }
  latex(a: Algebraic): string {
    return this.#write(a, LATEX_STYLE);
  }
  #write(a: Algebraic, style: NumberStyle): string {
    const q = this.quadraticForm(a);
    if (q !== undefined) {
      const d = (q.u.d * q.v.d) / gcd(q.u.d, q.v.d);
      const constant = q.u.n === 0n ? [] : [{ x: (q.u.n * d) / q.u.d, body: '' }];
      return writeSum([...constant, { x: (q.v.n * d) / q.v.d, body: style.root(q.w) }], d, style);
    }
    const terms = a.c.flatMap((x, i) => {
      if (x === 0n) return [];
      const k = i % this.#m;
      const mask = (i / this.#m) | 0;
      const parts = [...(k === 0 ? [] : [style.cosine(k, this.conductor)]), ...(mask === 0 ? [] : [style.root(this.#masked[mask]!)])];
      return [{ x: k === 0 ? x : 2n * x, body: parts.join(style.times) }];
    });
    return writeSum(terms, a.d, style);
  }

  /** A reduction into GF(p): p = 1 mod 4N with every adjoined root. `index` picks the prime. */
  reduction(index = 0): Reduction {
    let out = this.#reductions.get(index);
    if (out === undefined) {
      out = makeReduction(this.conductor, this.radicals, this.#m, this.degree, index);
      this.#reductions.set(index, out);
    }
    return out;
  }
}
