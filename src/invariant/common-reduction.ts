/**
 * Ring homomorphisms into GF(p) that are defined on a number field and on roots of unity at once and agree where
 * the two meet, so that characters, traces and matrices can be reduced together. One root of unity ζ of order N
 * gives the cosines, i and the square roots (Gauss's sums); radicals outside Q(ζ_N) take any root.
 */
import {
  type Algebraic,
  type CyclotomicField,
  invMod,
  isPrime,
  lcmInt,
  mulAddMod,
  mulMod,
  powModInt,
  RealField,
  reduceBigint,
  rootOfUnity,
  sqrtMod,
} from '../field/index.ts';
import type { ScalarField } from './linear-action.ts';

export class CommonReduction {
  readonly p: number;
  /** Order of the root of unity; a multiple of 4. */
  readonly order: number;
  readonly #powers: Int32Array;
  readonly #images: Int32Array;

  private constructor(p: number, order: number, powers: Int32Array, images: Int32Array) {
    this.p = p;
    this.order = order;
    this.#powers = powers;
    this.#images = images;
  }

  /** For a field and roots of unity of orders dividing `multiple`; `index` picks the prime, the largest first. */
  static of(field: ScalarField, multiple = 1, index = 0): CommonReduction {
    const order = lcmInt(4, lcmInt(field.conductor, multiple));
    const top = 2 ** 31 - 1;
    for (let p = top - ((top - 1) % order), found = 0; p > order; p -= order) {
      if (!isPrime(p)) continue;
      const powers = powersOf(powModInt(rootOfUnity(order, p), 1, p), order, p);
      const images = field instanceof RealField ? realImages(field, powers, order, p) : cyclotomicImages(field, powers, order);
      if (images === undefined || found++ < index) continue;
      return new CommonReduction(p, order, powers, images);
    }
    throw new RangeError(`no prime = 1 mod ${order} below 2^31 splits ${field.name}`);
  }

  /** exp(2 pi i k/n) for n dividing the order. */
  root(k: number, n: number): number {
    const step = this.order / n;
    return this.#powers[(((k * step) % this.order) + this.order) % this.order]!;
  }
  /** The image of an element of the field. Throws RangeError if p divides its denominator. */
  apply(a: Algebraic): number {
    const p = this.p;
    let v = 0;
    for (let i = 0; i < a.c.length; i++) if (a.c[i] !== 0n) v = mulAddMod(v, reduceBigint(a.c[i]!, p), this.#images[i]!, p);
    return a.d === 1n ? v : mulMod(v, invMod(reduceBigint(a.d, p), p), p);
  }
  /** The image of an element of a cyclotomic field whose conductor divides the order. */
  applyCyclotomic(field: CyclotomicField, a: Algebraic): number {
    const p = this.p;
    let v = 0;
    a.c.forEach((x, k) => {
      if (x !== 0n) v = mulAddMod(v, reduceBigint(x, p), this.root(k, field.conductor), p);
    });
    return a.d === 1n ? v : mulMod(v, invMod(reduceBigint(a.d, p), p), p);
  }
}

function powersOf(zeta: number, order: number, p: number): Int32Array {
  const out = new Int32Array(order);
  let x = 1;
  for (let k = 0; k < order; k++) {
    out[k] = x;
    x = mulMod(x, zeta, p);
  }
  return out;
}

function cyclotomicImages(field: CyclotomicField, powers: Int32Array, order: number): Int32Array {
  return Int32Array.from({ length: field.degree }, (_, k) => powers[k * (order / field.conductor)]!);
}

function realImages(field: RealField, powers: Int32Array, order: number, p: number): Int32Array | undefined {
  const roots: number[] = [];
  for (const r of field.radicals) {
    const root = gaussRoot(r, powers, order, p) ?? sqrtMod(reduceBigint(r, p), p);
    if (root === undefined || root === 0) return undefined;
    roots.push(root);
  }
  const m = field.degree >> field.radicals.length;
  const step = order / field.conductor;
  return Int32Array.from({ length: field.degree }, (_, i) => {
    const k = i % m;
    let v = k === 0 ? 1 : (powers[k * step]! + powers[order - k * step]!) % p;
    const mask = (i / m) | 0;
    roots.forEach((r, b) => {
      if (mask & (1 << b)) v = mulMod(v, r, p);
    });
    return v;
  });
}

/** The image of the positive root of a prime r if it lies in Q(ζ_order) (Gauss 1811). */
function gaussRoot(r: bigint, powers: Int32Array, order: number, p: number): number | undefined {
  if (r > BigInt(order)) return undefined;
  const q = Number(r);
  if (q === 2) return order % 8 === 0 ? (powers[order / 8]! + powers[order - order / 8]!) % p : undefined;
  if (order % q !== 0) return undefined;
  let sum = 0;
  for (let k = 1; k < q; k++) {
    const x = powers[k * (order / q)]!;
    sum = (sum + (powModInt(k, (q - 1) / 2, q) === 1 ? x : p - x)) % p;
  }
  return q % 4 === 1 ? sum : mulMod(sum, powers[order - order / 4]!, p);
}
