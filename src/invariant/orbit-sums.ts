/** Invariants as orbit sums of monomials in letters (see letters.ts): one orbit, one complex invariant or none. */
import { type Algebraic, RealField } from '../field/index.ts';
import { factorsOf, type Monomial, type Polynomial, type PolynomialRing } from '../polynomial/index.ts';
import { gradedMonomials } from './graded-monomials.ts';
import { applyLetters, conjugateMonomial, type Letters } from './letters.ts';

/** The sum of exp(2 pi i phase/order) times monomials in letters, or its real or imaginary part. */
export interface OrbitSum {
  readonly part: 'all' | 'real' | 'imaginary';
  readonly monomials: readonly Monomial[];
  readonly phases: readonly number[];
}

/** All orbit sums with these degrees in the blocks: a basis of the invariants. */
export function orbitSums(letters: Letters, blocks: readonly (readonly number[])[], degrees: readonly number[], real: boolean): OrbitSum[] {
  const seen = new Set<Monomial>();
  const out: OrbitSum[] = [];
  const { order } = letters;
  for (const start of gradedMonomials(blocks, degrees)) {
    if (seen.has(start)) continue;
    const phase = new Map<Monomial, number>([[start, 0]]);
    const queue = [start];
    let consistent = true;
    for (let i = 0; i < queue.length; i++) {
      const m = queue[i]!;
      const own = phase.get(m)!;
      for (const g of letters.generators) {
        // f∘g = f: the coefficient at the image is that at m times the phase
        const { image, phase: p } = applyLetters(m, g, order);
        const now = (own + p) % order;
        const known = phase.get(image);
        if (known === undefined) {
          phase.set(image, now);
          queue.push(image);
        } else if (known !== now) consistent = false;
      }
    }
    for (const m of queue) seen.add(m);
    if (!real || letters.planes.length === 0) {
      if (consistent) out.push({ part: 'all', monomials: queue, phases: queue.map((m) => phase.get(m)!) });
      continue;
    }
    const mirror = conjugateMonomial(start, letters.conjugate);
    const k = phase.get(mirror);
    if (k === undefined) for (const m of queue) seen.add(conjugateMonomial(m, letters.conjugate));
    if (!consistent) continue;
    if (k === undefined) {
      const phases = queue.map((m) => phase.get(m)!);
      out.push({ part: 'real', monomials: queue, phases }, { part: 'imaginary', monomials: queue, phases });
      continue;
    }
    // the conjugate of the sum f is exp(-2 pi i k/order) f, so exp(-pi i k/order) f is real; k is even
    const kept = queue.filter((m) => {
      const c = conjugateMonomial(m, letters.conjugate);
      return m <= c || !phase.has(c);
    });
    out.push({ part: 'real', monomials: kept, phases: kept.map((m) => (phase.get(m)! - k / 2 + order) % order) });
  }
  return out;
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
    if (this.#letters.planes.length === 0)
      return ring.fromTerms(sum.monomials.map((m, i) => [m, sum.phases[i] === 0 ? field.one : field.neg(field.one)] as const));
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
