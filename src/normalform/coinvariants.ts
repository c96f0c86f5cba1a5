/**
 * Linear forms on polynomials modulo p that a group leaves alone: f and its average over the group have the same values, and
 * the values tell invariants apart. So the image of an ideal that the group preserves is the image of its invariant part, and
 * neither averages nor equivariant vector fields are ever formed.
 */
import { invMod, mulAddMod, powModInt } from '../field/index.ts';
import { modularKernel } from '../linear/index.ts';
import { type Monomial, monomialsOfDegree, multiplyMonomials } from '../polynomial/index.ts';

/** Base of the weights of generators in a random combination. */
const WEIGHT = 742_938_285;

/** A polynomial modulo p. */
export type ModularPolynomial = ReadonlyMap<Monomial, number>;

/** A group acting on n coordinates, as row-major matrices of generators modulo p. */
export interface ModularGenerators {
  readonly n: number;
  readonly p: number;
  readonly matrices: readonly Int32Array[];
}

interface Degree {
  readonly monomials: readonly Monomial[];
  readonly place: ReadonlyMap<Monomial, number>;
  /** Number of independent forms: the dimension of the invariants. */
  readonly size: number;
  /** Values of the forms on monomial a at a * size. */
  readonly forms: Int32Array;
}

export class Coinvariants {
  readonly generators: ModularGenerators;
  readonly #degrees: Degree[] = [];
  /** By degree and generator: images of the monomials under substitution, dense rows. */
  readonly #images: Int32Array[][] = [];

  constructor(generators: ModularGenerators) {
    this.generators = generators;
  }
  degree(e: number): Degree {
    while (this.#degrees.length <= e) this.#extend();
    return this.#degrees[e]!;
  }
  /** Dimension of the invariants of degree e. */
  size(e: number): number {
    return this.degree(e).size;
  }
  /** Basis of the invariants of degree e supported on the monomials that `allow` admits; rows over the monomials. */
  invariants(e: number, allow: (m: Monomial) => boolean = () => true): ModularPolynomial[] {
    const { monomials } = this.degree(e);
    const { p, matrices } = this.generators;
    const kept = monomials.map((_, i) => i).filter((i) => allow(monomials[i]!));
    const count = monomials.length;
    const rows = matrices.length === 0 ? 0 : count;
    const combined = this.#combination(this.#images[e]!, count);
    const data = new Int32Array(rows * kept.length);
    if (rows > 0)
      kept.forEach((a, c) => {
        for (let b = 0; b < count; b++) data[b * kept.length + c] = combined[a * count + b]!;
      });
    const k = modularKernel({ p, rows, cols: kept.length, data });
    return Array.from(
      { length: k.rows },
      (_, i) => new Map(kept.map((a, c) => [monomials[a]!, k.data[i * kept.length + c]!] as const).filter(([, x]) => x !== 0)),
    );
  }
  /**
   * Σ c_g (g - 1) for fixed weights c. A positive combination of unitary matrices has norm Σ c_g only on their common fixed vectors,
   * so its determinant elsewhere is not the zero polynomial in the weights: it vanishes for few of them only.
   */
  #combination(images: readonly Int32Array[], count: number): Int32Array {
    const { p } = this.generators;
    const out = new Int32Array(count * count);
    images.forEach((image, g) => {
      const weight = powModInt(WEIGHT, g + 1, p);
      for (let i = 0; i < out.length; i++) if (image[i] !== 0) out[i] = mulAddMod(out[i]!, weight, image[i]!, p);
      for (let i = 0; i < count; i++) {
        const t = i * count + i;
        out[t] = (out[t]! + p - weight) % p;
      }
    });
    return out;
  }
  /** Places of the values in a vector of all degrees up to d. */
  offsets(d: number): number[] {
    const out = [0];
    for (let e = 0; e <= d; e++) out.push(out[e]! + this.size(e));
    return out;
  }
  /** Adds the values of x^shift * f, cut off above degree d, to a vector. */
  addValuesInPlace(vector: Int32Array, offsets: readonly number[], f: ModularPolynomial, shift: Monomial, d: number): void {
    const { p } = this.generators;
    for (const [m, c] of f) {
      const e = m.length + shift.length;
      if (e > d) continue;
      const { place, size, forms } = this.degree(e);
      const a = place.get(multiplyMonomials(m, shift))! * size;
      const o = offsets[e]!;
      for (let j = 0; j < size; j++) if (forms[a + j] !== 0) vector[o + j] = mulAddMod(vector[o + j]!, c, forms[a + j]!, p);
    }
  }

  #extend(): void {
    const { n, p, matrices } = this.generators;
    const e = this.#degrees.length;
    const monomials = monomialsOfDegree(n, e);
    const count = monomials.length;
    const place = new Map(monomials.map((m, i) => [m, i]));
    const images = matrices.map((g, which) => {
      const out = new Int32Array(count * count);
      if (e === 0) {
        out[0] = 1;
        return out;
      }
      const below = this.#degrees[e - 1]!;
      const previous = this.#images[e - 1]![which]!;
      const width = below.monomials.length;
      const up = Array.from({ length: n }, (_, v) => below.monomials.map((m) => place.get(multiplyMonomials(m, String.fromCharCode(v)))!));
      monomials.forEach((m, a) => {
        const v = m.charCodeAt(0);
        const rest = below.place.get(m.slice(1))!;
        for (let b = 0; b < width; b++) {
          const x = previous[rest * width + b]!;
          if (x === 0) continue;
          for (let w = 0; w < n; w++) {
            const y = g[v * n + w]!;
            if (y === 0) continue;
            const t = a * count + up[w]![b]!;
            out[t] = mulAddMod(out[t]!, x, y, p);
          }
        }
      });
      return out;
    });
    let forms: Int32Array;
    let size: number;
    if (matrices.length === 0) {
      size = count;
      forms = new Int32Array(count * count);
      for (let i = 0; i < count; i++) forms[i * count + i] = 1;
    } else {
      // a form with values f satisfies sum_b image[a][b] f_b = f_a
      const k = modularKernel({ p, rows: count, cols: count, data: this.#combination(images, count) });
      size = k.rows;
      forms = new Int32Array(count * size);
      for (let j = 0; j < size; j++) for (let a = 0; a < count; a++) forms[a * size + j] = k.data[j * count + a]!;
    }
    this.#images.push(images);
    this.#degrees.push({ monomials, place, size, forms });
  }
}

/** Rows in echelon form that grow one by one; pivots are leftmost. */
export class GrowingEchelon {
  readonly width: number;
  readonly p: number;
  readonly #rows: Array<Int32Array | undefined>;
  rank = 0;
  constructor(width: number, p: number) {
    this.width = width;
    this.p = p;
    this.#rows = new Array<Int32Array | undefined>(width).fill(undefined);
  }
  copy(): GrowingEchelon {
    const out = new GrowingEchelon(this.width, this.p);
    this.#rows.forEach((r, i) => {
      out.#rows[i] = r;
    });
    out.rank = this.rank;
    return out;
  }
  hasPivot(column: number): boolean {
    return this.#rows[column] !== undefined;
  }
  /** Takes the vector in (overwriting it); false if it depends on the rows. */
  addInPlace(v: Int32Array): boolean {
    const p = this.p;
    for (let j = 0; j < this.width; j++) {
      const x = v[j]!;
      if (x === 0) continue;
      const r = this.#rows[j];
      if (r === undefined) {
        const inverse = invMod(x, p);
        for (let k = j; k < this.width; k++) v[k] = mulAddMod(0, inverse, v[k]!, p);
        this.#rows[j] = v;
        this.rank++;
        return true;
      }
      for (let k = j; k < this.width; k++) if (r[k] !== 0) v[k] = mulAddMod(v[k]!, p - x, r[k]!, p);
    }
    return false;
  }
}
