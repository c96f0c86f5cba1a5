/** Invariants as orbit sums of monomials in letters (see letters.ts): one orbit, one complex invariant or none. */
import { type Algebraic, RealField } from '../field/index.ts';
import { factorsOf, type Monomial, type Polynomial, type PolynomialRing } from '../polynomial/index.ts';
import { gradedMonomials } from './graded-monomials.ts';
import type { LetterMap, Letters } from './letters.ts';
import type { LinearAction } from './linear-action.ts';
import type { MonomialLayers } from './monomial-layers.ts';

/** The sum of exp(2 pi i phase/order) times monomials in letters, or its real or imaginary part. */
export interface OrbitSum {
  readonly part: 'all' | 'real' | 'imaginary';
  readonly monomials: readonly Monomial[];
  readonly phases: readonly number[];
}

/** A letter map on the monomials of one degree in one block, by number. */
interface Image {
  readonly image: Int32Array;
  readonly phase: Int32Array;
}

export class OrbitSums {
  readonly #letters: Letters;
  readonly #blocks: readonly (readonly number[])[];
  readonly #layers: readonly MonomialLayers[];
  readonly #real: boolean;
  /** The generators, then complex conjugation. */
  readonly #maps: readonly LetterMap[];
  /** images[map][block][degree] */
  readonly #images: readonly (readonly Image[][])[];

  constructor(letters: Letters, action: LinearAction, layers: readonly MonomialLayers[]) {
    this.#letters = letters;
    this.#blocks = action.blocks;
    this.#layers = layers;
    this.#real = action.field instanceof RealField && letters.planes.length > 0;
    this.#maps = [...letters.generators, { image: letters.conjugate, phase: letters.conjugate.map(() => 0) }];
    this.#images = this.#maps.map(() => action.blocks.map(() => [{ image: new Int32Array(1), phase: new Int32Array(1) }]));
  }

  #image(map: number, block: number, degree: number): Image {
    const known = this.#images[map]![block]!;
    const { image: letter, phase: turn } = this.#maps[map]!;
    const variables = this.#blocks[block]!;
    const layers = this.#layers[block]!;
    const { order } = this.#letters;
    const { n } = layers;
    const local = variables.map((v) => variables.indexOf(letter[v]!));
    while (known.length <= degree) {
      const k = known.length;
      const { size, parent, last } = layers.layer(k);
      const times = layers.times(k - 1);
      const below = known[k - 1]!;
      const image = new Int32Array(size);
      const phase = new Int32Array(size);
      for (let i = 0; i < size; i++) {
        const from = parent[i]!;
        const v = last[i]!;
        image[i] = times[below.image[from]! * n + local[v]!]!;
        phase[i] = (below.phase[from]! + turn[variables[v]!]!) % order;
      }
      known.push({ image, phase });
    }
    return known[degree]!;
  }
  /** The map on the monomials of these degrees, numbered with the last block running fastest. */
  #combined(map: number, degrees: readonly number[]): Image {
    const { order } = this.#letters;
    let image: Int32Array = new Int32Array(1);
    let phase: Int32Array = new Int32Array(1);
    degrees.forEach((d, b) => {
      if (d === 0) return;
      const own = this.#image(map, b, d);
      const width = own.image.length;
      const nextImage = new Int32Array(image.length * width);
      const nextPhase = new Int32Array(image.length * width);
      for (let i = 0; i < image.length; i++)
        for (let j = 0; j < width; j++) {
          nextImage[i * width + j] = image[i]! * width + own.image[j]!;
          nextPhase[i * width + j] = (phase[i]! + own.phase[j]!) % order;
        }
      image = nextImage;
      phase = nextPhase;
    });
    return { image, phase };
  }

  /** All orbit sums with these degrees in the blocks: a basis of the invariants. */
  of(degrees: readonly number[]): OrbitSum[] {
    const { order } = this.#letters;
    const names = gradedMonomials(this.#layers, this.#blocks, degrees);
    const generators = this.#letters.generators.map((_, g) => this.#combined(g, degrees));
    const conjugate = this.#real ? this.#combined(this.#maps.length - 1, degrees).image : undefined;
    const phase = new Int32Array(names.length).fill(-1);
    const orbitOf = new Int32Array(names.length).fill(-1);
    const queue = new Int32Array(names.length);
    const orbits: Array<{ start: number; consistent: boolean; members: number[] }> = [];
    for (let start = 0, tail = 0; start < names.length; start++) {
      if (phase[start] !== -1) continue;
      let consistent = true;
      let head = tail;
      queue[tail++] = start;
      phase[start] = 0;
      orbitOf[start] = orbits.length;
      for (; head < tail; head++) {
        const m = queue[head]!;
        const own = phase[m]!;
        // f∘g = f: the coefficient at the image is that at m times the phase
        for (let g = 0; g < generators.length; g++) {
          const { image, phase: turn } = generators[g]!;
          const next = image[m]!;
          let now = own + turn[m]!;
          if (now >= order) now -= order;
          if (phase[next] === -1) {
            phase[next] = now;
            orbitOf[next] = orbits.length;
            queue[tail++] = next;
          } else if (phase[next] !== now) consistent = false;
        }
      }
      orbits.push({ start, consistent, members: [] });
    }
    for (let m = 0; m < names.length; m++) orbits[orbitOf[m]!]!.members.push(m);
    const out: OrbitSum[] = [];
    const sum = (part: OrbitSum['part'], list: readonly number[], turn = 0): OrbitSum => ({
      part,
      monomials: list.map((m) => names[m]!),
      phases: list.map((m) => (phase[m]! - turn + order) % order),
    });
    orbits.forEach(({ start, consistent, members }, o) => {
      if (!consistent) return;
      if (conjugate === undefined) {
        out.push(sum('all', members));
        return;
      }
      const mirror = conjugate[start]!;
      const other = orbitOf[mirror]!;
      if (other !== o) {
        // of two conjugate orbits the first gives both parts
        if (other > o) out.push(sum('real', members), sum('imaginary', members));
        return;
      }
      // the conjugate of the sum f is exp(-2 pi i k/order) f, so exp(-pi i k/order) f is real; k is even
      const kept = members.filter((m) => m <= conjugate[m]!);
      out.push(sum('real', kept, phase[mirror]! / 2));
    });
    return out;
  }
}

/** Writes orbit sums in real coordinates (in the coordinates themselves over a cyclotomic field). */
export class OrbitSumExpander {
  readonly #ring: PolynomialRing<Algebraic>;
  readonly #letters: Letters;
  readonly #plane: ReadonlyMap<number, { x: number; y: number }>;
  readonly #powers = new Map<string, { re: Polynomial<Algebraic>; im: Polynomial<Algebraic> }>();
  constructor(ring: PolynomialRing<Algebraic>, letters: Letters) {
    this.#ring = ring;
    this.#letters = letters;
    this.#plane = new Map(letters.planes.flatMap(([x, y]) => [[x, { x, y }] as const, [y, { x, y }] as const]));
  }
  /** undefined if a cosine that is needed is not in the field. */
  expand(sum: OrbitSum): Polynomial<Algebraic> | undefined {
    const ring = this.#ring;
    const field = ring.field;
    const { order } = this.#letters;
    if (!(field instanceof RealField)) {
      const cyclotomic = field as unknown as { conductor: number; root(k: number): Algebraic; neg(a: Algebraic): Algebraic };
      const n = cyclotomic.conductor;
      return ring.fromTerms(
        sum.monomials.map((m, i) => {
          const k = sum.phases[i]!;
          const direct = (k * n) / order;
          const c = Number.isInteger(direct)
            ? cyclotomic.root(direct)
            : cyclotomic.neg(cyclotomic.root((((k + order / 2) % order) * n) / order));
          return [m, c] as const;
        }),
      );
    }
    const signs = sum.phases.every((k) => k === 0 || 2 * k === order);
    if (this.#letters.planes.length === 0) {
      const minus = field.neg(field.one);
      const coefficients = sum.phases.map((k) => (k === 0 ? field.one : minus));
      const { monomials } = sum;
      const ordered = monomials.every((m, i) => i === 0 || monomials[i - 1]! < m);
      return ordered ? { monomials, coefficients } : ring.fromTerms(monomials.map((m, i) => [m, coefficients[i]!] as const));
    }
    const parts: Polynomial<Algebraic>[] = [];
    for (let i = 0; i < sum.monomials.length; i++) {
      const { re, im } = this.#monomial(sum.monomials[i]!);
      // Re(ζ^k(R + iI)) = cos R - sin I, Im = sin R + cos I
      const k = sum.phases[i]!;
      const c = signs ? field.fromInteger(k === 0 ? 1 : -1) : field.cos(k, order);
      const s = signs ? field.zero : field.sin(k, order);
      if (c === undefined || s === undefined) return undefined;
      if (sum.part === 'imaginary') parts.push(ring.scale(re, s), ring.scale(im, c));
      else parts.push(ring.scale(re, c), ring.scale(im, field.neg(s)));
    }
    return ring.sum(parts);
  }
  /** Real and imaginary part of a monomial in letters. */
  #monomial(m: Monomial): { re: Polynomial<Algebraic>; im: Polynomial<Algebraic> } {
    const ring = this.#ring;
    let re = ring.one;
    let im = ring.zero;
    const done = new Set<number>();
    const factors = new Map(factorsOf(m));
    for (const [letter, e] of factors) {
      const plane = this.#plane.get(letter);
      if (plane === undefined) {
        const x = ring.power(ring.variable(letter), e);
        re = ring.mul(re, x);
        im = ring.mul(im, x);
        continue;
      }
      if (done.has(plane.x)) continue;
      done.add(plane.x);
      const p = this.#power(plane, factors.get(plane.x) ?? 0, factors.get(plane.y) ?? 0);
      const next = ring.sub(ring.mul(re, p.re), ring.mul(im, p.im));
      im = ring.add(ring.mul(re, p.im), ring.mul(im, p.re));
      re = next;
    }
    return { re, im };
  }
  /** z^a z̄^b. */
  #power(plane: { x: number; y: number }, a: number, b: number): { re: Polynomial<Algebraic>; im: Polynomial<Algebraic> } {
    const key = `${plane.x},${a},${b}`;
    const known = this.#powers.get(key);
    if (known !== undefined) return known;
    const ring = this.#ring;
    let out = { re: ring.one, im: ring.zero };
    if (a + b > 0) {
      const [x, y] = [ring.variable(plane.x), ring.variable(plane.y)];
      const q = a > 0 ? this.#power(plane, a - 1, b) : this.#power(plane, a, b - 1);
      const yy = a > 0 ? y : ring.neg(y);
      out = { re: ring.sub(ring.mul(q.re, x), ring.mul(q.im, yy)), im: ring.add(ring.mul(q.re, yy), ring.mul(q.im, x)) };
    }
    this.#powers.set(key, out);
    return out;
  }
}
