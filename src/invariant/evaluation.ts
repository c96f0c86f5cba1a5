/** Values of polynomials at fixed pseudo-random points modulo a prime, and growing spans of value vectors. */
import { type Algebraic, addRowInPlace, invMod, mulAddMod, mulMod } from '../field/index.ts';
import type { Polynomial } from '../polynomial/index.ts';
import { CommonReduction } from './common-reduction.ts';
import type { ScalarField } from './linear-action.ts';

/** Points beyond the dimension, so that a chance dependence of the points does not look like one of polynomials. */
export const SPARE_POINTS = 6;

export class Sampler {
  readonly p: number;
  readonly reduction: CommonReduction;
  readonly #points: Int32Array[];
  constructor(field: ScalarField, variables: number, points: number, index = 0) {
    this.reduction = CommonReduction.of(field, 1, index);
    const p = (this.p = this.reduction.p);
    // a mixing of counters (no linear recursion: that would put the points on a line)
    let counter = index * 1_000_003;
    const next = () => {
      let x = Math.imul(++counter, 0x9e3779b1);
      x = Math.imul(x ^ (x >>> 16), 0x85ebca6b);
      x = Math.imul(x ^ (x >>> 13), 0xc2b2ae35);
      return ((x ^ (x >>> 16)) >>> 1) % p;
    };
    this.#points = Array.from({ length: points }, () => Int32Array.from({ length: variables }, next));
  }
  get count(): number {
    return this.#points.length;
  }
  /** Values at all points. */
  values(a: Polynomial<Algebraic>): Int32Array {
    const { p } = this;
    const coefficients = a.coefficients.map((c) => this.reduction.apply(c));
    const out = new Int32Array(this.#points.length);
    this.#points.forEach((x, i) => {
      let s = 0;
      for (let t = 0; t < coefficients.length; t++) {
        let v = coefficients[t]!;
        const m = a.monomials[t]!;
        for (let k = 0; k < m.length; k++) v = mulMod(v, x[m.charCodeAt(k)]!, p);
        s = mulAddMod(s, 1, v, p);
      }
      out[i] = s;
    });
    return out;
  }
  product(a: Int32Array, b: Int32Array): Int32Array {
    const out = new Int32Array(a.length);
    for (let i = 0; i < out.length; i++) out[i] = mulMod(a[i]!, b[i]!, this.p);
    return out;
  }
}

/** A growing subspace of GF(p)^width in echelon form. */
export class Span {
  readonly #p: number;
  readonly #width: number;
  #data: Int32Array;
  readonly #pivots: number[] = [];
  constructor(p: number, width: number, expected = 8) {
    this.#p = p;
    this.#width = width;
    this.#data = new Int32Array(width * (expected + 1));
  }
  get rank(): number {
    return this.#pivots.length;
  }
  /** Column of the leading entry of each row. */
  get pivots(): readonly number[] {
    return this.#pivots;
  }
  /** Adds a vector (its first `width` entries); true if it was independent of the others. */
  add(v: Int32Array): boolean {
    const p = this.#p;
    const w = this.#width;
    const at = this.#pivots.length * w;
    if (at + w > this.#data.length) {
      const larger = new Int32Array(2 * this.#data.length + w);
      larger.set(this.#data);
      this.#data = larger;
    }
    const data = this.#data;
    for (let j = 0; j < w; j++) data[at + j] = v[j]!;
    for (let r = 0; r < this.#pivots.length; r++) {
      const j = this.#pivots[r]!;
      const x = data[at + j]!;
      if (x !== 0) addRowInPlace(data, at, r * w, j, w, p - x, p);
    }
    let j = 0;
    while (j < w && data[at + j] === 0) j++;
    if (j === w) return false;
    const inverse = invMod(data[at + j]!, p);
    for (let k = j; k < w; k++) if (data[at + k] !== 0) data[at + k] = mulMod(inverse, data[at + k]!, p);
    this.#pivots.push(j);
    return true;
  }
}
