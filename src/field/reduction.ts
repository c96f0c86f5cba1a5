/** Reductions of real fields into prime fields. */
import { lcmInt } from './arithmetic.ts';
import type { Algebraic } from './number-field.ts';
import { invMod, mulAddMod, mulMod, powModInt, primeCongruentToOne, reduceBigint, rootOfUnity, sqrtMod } from './prime.ts';

/** A ring homomorphism from a real field (elements with denominators prime to p) into GF(p). */
export class Reduction {
  readonly p: number;
  readonly #images: Int32Array;
  constructor(p: number, images: Int32Array) {
    this.p = p;
    this.#images = images;
  }
  /** The image in [0, p). Throws RangeError if p divides the denominator. */
  apply(a: Algebraic): number {
    const p = this.p;
    let v = 0;
    for (let i = 0; i < a.c.length; i++) if (a.c[i] !== 0n) v = mulAddMod(v, reduceBigint(a.c[i]!, p), this.#images[i]!, p);
    return a.d === 1n ? v : mulMod(v, invMod(reduceBigint(a.d, p), p), p);
  }
}

/** The image of each basis element c_k sqrt(r) in GF(p) for the index-th prime p = 1 mod 4N that has all the roots. */
export function makeReduction(conductor: number, radicals: readonly bigint[], m: number, degree: number, index: number): Reduction {
  const n = lcmInt(4, conductor);
  for (let i = 0, found = -1; ; i++) {
    const p = primeCongruentToOne(n, i);
    const roots = radicals.map((r) => sqrtMod(reduceBigint(r, p), p));
    if (roots.some((r) => r === undefined || r === 0) || ++found < index) continue;
    const zeta = m === 1 ? 1 : powModInt(rootOfUnity(n, p), n / conductor, p);
    const images = new Int32Array(degree);
    const inverse = invMod(zeta, p);
    for (let j = 0; j < degree; j++) {
      const k = j % m;
      const mask = (j / m) | 0;
      let v = k === 0 ? 1 : (powModInt(zeta, k, p) + powModInt(inverse, k, p)) % p;
      roots.forEach((r, b) => {
        if (mask & (1 << b)) v = mulMod(v, r!, p);
      });
      images[j] = v;
    }
    return new Reduction(p, images);
  }
}
