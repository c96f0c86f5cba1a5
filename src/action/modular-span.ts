/** Growing subspaces modulo a prime: what is independent there is independent over the field of the model. */
import { invMod, mulAddMod } from '../field/index.ts';

/** Nonzero entries of a vector modulo p: places in increasing order, each followed by its value. */
export type ModularVector = Int32Array;

/** dense += g v modulo p for g in [0, p): mulAddMod with its quotient taken once. */
export function addMultipleInPlace(dense: Int32Array, v: ModularVector, g: number, p: number): void {
  const w = (g / p) * (1 - 2 ** -50);
  for (let q = 0; q < v.length; q += 2) {
    const i = v[q]!;
    const x = v[q + 1]!;
    let r = (Math.imul(g, x) - Math.imul((x * w) | 0, p)) | 0;
    r = (r - p) | 0;
    r += p & (r >> 31);
    r = ((r | 0) - p + dense[i]!) | 0;
    r += p & (r >> 31);
    dense[i] = r;
  }
}

/** A growing subspace of GF(p)^n in echelon form. With a bound on the work it stops growing when that is used up. */
export class ModularSpan {
  readonly #rows: Array<ModularVector | undefined>;
  readonly #p: number;
  readonly #scratch: Int32Array;
  readonly #most: number;
  #rank = 0;
  #work = 0;
  constructor(n: number, p: number, most = Number.POSITIVE_INFINITY) {
    this.#most = most;
    this.#rows = new Array<ModularVector | undefined>(n).fill(undefined);
    this.#scratch = new Int32Array(n);
    this.#p = p;
  }
  /** The remainder of v, dense in the scratch vector from its first nonzero place on; that place, or -1. The caller clears it. */
  #reduceInPlace(v: ModularVector): number {
    const w = this.#scratch;
    for (let q = 0; q < v.length; q += 2) w[v[q]!] = v[q + 1]!;
    let lead = -1;
    for (let j = v[0] ?? w.length; j < w.length; j++) {
      if (w[j] === 0) continue;
      const r = this.#rows[j];
      if (r === undefined) {
        if (lead < 0) lead = j;
        continue;
      }
      addMultipleInPlace(w, r, this.#p - w[j]!, this.#p);
      this.#work += r.length;
    }
    return lead;
  }
  get #full(): boolean {
    return this.#rank === this.#rows.length;
  }
  /** Whether the bound on the work was reached, so that it stopped growing. */
  get exhausted(): boolean {
    return this.#work > this.#most;
  }
  /** Whether v lies in it; false where that is not known any more. */
  contains(v: ModularVector): boolean {
    if (this.#full) return true;
    if (this.exhausted) return false;
    const lead = this.#reduceInPlace(v);
    this.#scratch.fill(0);
    return lead < 0;
  }
  /** True if the subspace grew. */
  add(v: ModularVector): boolean {
    if (this.#full || this.exhausted) return false;
    const w = this.#scratch;
    const lead = this.#reduceInPlace(v);
    if (lead >= 0) {
      const inv = invMod(w[lead]!, this.#p);
      const row: number[] = [];
      for (let j = lead; j < w.length; j++) if (w[j] !== 0) row.push(j, mulAddMod(0, w[j]!, inv, this.#p));
      this.#rows[lead] = Int32Array.from(row);
      this.#rank++;
    }
    w.fill(0);
    return lead >= 0;
  }
}

/** The nonzero entries of a dense vector. */
export function modularVector(dense: Int32Array): ModularVector {
  const out: number[] = [];
  for (let i = 0; i < dense.length; i++) if (dense[i] !== 0) out.push(i, dense[i]!);
  return Int32Array.from(out);
}
