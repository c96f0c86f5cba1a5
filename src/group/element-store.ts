/**
 * The elements of a permutation group as rows of images, found again through their images of a
 * base: a few points whose images tell any two stored elements apart. The base grows whenever two
 * different elements agree on it, so that the look-up is exact, never a guess.
 */

type Images = Uint16Array | Int32Array;

const UINT16_DEGREE = 65536;

export class ElementStore {
  readonly degree: number;
  count = 0;
  /** Row i holds the images of the points under element i. */
  images: Images;
  /** Points whose images determine the element. */
  base: Int32Array = new Int32Array(0);
  #slots = new Int32Array(16).fill(-1);
  #tuple = new Int32Array(0);

  constructor(degree: number) {
    this.degree = degree;
    this.images = degree <= UINT16_DEGREE ? new Uint16Array(16 * degree) : new Int32Array(16 * degree);
  }

  /** Makes room for `extra` more rows. */
  reserve(extra: number): void {
    const need = (this.count + extra) * this.degree;
    if (need > this.images.length) {
      const length = Math.max(need, 2 * this.images.length);
      const bigger = this.degree <= UINT16_DEGREE ? new Uint16Array(length) : new Int32Array(length);
      bigger.set(this.images.subarray(0, this.count * this.degree));
      this.images = bigger;
    }
    let size = this.#slots.length;
    while (size < 2 * (this.count + extra)) size *= 2;
    if (size !== this.#slots.length) {
      this.#slots = new Int32Array(size);
      this.#rehash();
    }
  }

  /** Enters row `count` (already written and known to be new) into the look-up table. */
  enter(): void {
    const i = this.count++;
    const twin = this.#place(i);
    if (twin >= 0) this.#separate(i * this.degree, this.images, twin);
  }

  /** The number of the element with these images (all of them are compared), or -1. */
  find(p: ArrayLike<number>): number {
    for (;;) {
      for (let k = 0; k < this.base.length; k++) this.#tuple[k] = p[this.base[k]!]!;
      const i = this.#search();
      if (i < 0 || this.#firstDifference(0, p, i) < 0) return i;
      this.#separate(0, p, i);
    }
  }

  /** a after b, once the stored elements are closed under products. */
  multiply(a: number, b: number): number {
    const { images, base, degree } = this;
    const tuple = this.#tuple;
    const rowA = a * degree;
    const rowB = b * degree;
    for (let k = 0; k < base.length; k++) tuple[k] = images[rowA + images[rowB + base[k]!]!]!;
    return this.#search();
  }

  /** The number of g x h for a stored g, where `points` are the images of the base under h. */
  sandwich(g: number, x: number, points: Int32Array): number {
    const { images, degree } = this;
    const tuple = this.#tuple;
    const rowG = g * degree;
    const rowX = x * degree;
    for (let k = 0; k < points.length; k++) tuple[k] = images[rowG + images[rowX + points[k]!]!]!;
    return this.#search();
  }

  /** The number of the inverse of a stored element of a closed store. */
  invert(a: number): number {
    const inverse = new Int32Array(this.degree);
    const row = a * this.degree;
    for (let x = 0; x < this.degree; x++) inverse[this.images[row + x]!] = x;
    for (let k = 0; k < this.base.length; k++) this.#tuple[k] = inverse[this.base[k]!]!;
    return this.#search();
  }

  #search(): number {
    const { images, base, degree } = this;
    const tuple = this.#tuple;
    const slots = this.#slots;
    const mask = slots.length - 1;
    const b = base.length;
    let h = 0;
    for (let k = 0; k < b; k++) h = mix(h, tuple[k]!);
    for (let s = h & mask; ; s = (s + 1) & mask) {
      const i = slots[s]!;
      if (i < 0) return -1;
      const row = i * degree;
      let k = 0;
      while (k < b && images[row + base[k]!] === tuple[k]) k++;
      if (k === b) return i;
    }
  }

  /** Puts element i into the table; an element with the same base images is returned instead (or -1). */
  #place(i: number): number {
    const { images, base, degree } = this;
    const tuple = this.#tuple;
    const slots = this.#slots;
    const mask = slots.length - 1;
    const row = i * degree;
    let h = 0;
    for (let k = 0; k < base.length; k++) h = mix(h, (tuple[k] = images[row + base[k]!]!));
    for (let s = h & mask; ; s = (s + 1) & mask) {
      const j = slots[s]!;
      if (j < 0) {
        slots[s] = i;
        return -1;
      }
      const other = j * degree;
      let k = 0;
      while (k < base.length && images[other + base[k]!] === tuple[k]) k++;
      if (k === base.length) return j;
    }
  }

  #firstDifference(offset: number, p: ArrayLike<number>, i: number): number {
    const row = i * this.degree;
    for (let x = 0; x < this.degree; x++) if (p[offset + x] !== this.images[row + x]) return x;
    return -1;
  }

  /** Adds a point to the base at which p and the stored element i differ. */
  #separate(offset: number, p: ArrayLike<number>, i: number): void {
    const point = this.#firstDifference(offset, p, i);
    this.base = Int32Array.of(...this.base, point);
    this.#tuple = new Int32Array(this.base.length);
    this.#rehash();
  }

  #rehash(): void {
    this.#slots.fill(-1);
    for (let i = 0; i < this.count; i++) this.#place(i);
  }
}

function mix(h: number, x: number): number {
  h = Math.imul(h ^ x, 0x9e3779b1);
  return h ^ (h >>> 15);
}
