/** Polynomials in doubles for Newton iterations in few variables: values, gradients, Hessians, small linear systems. */
import type { OrderedField } from '../field/index.ts';
import { type NumberMatrix, numberMatrix, numberSolve } from '../linear/index.ts';
import { exponentsOf, type Polynomial, type PolynomialRing } from '../polynomial/index.ts';

export class NumericPolynomial {
  readonly n: number;
  readonly #exponents: readonly Uint8Array[];
  readonly #coefficients: Float64Array;
  readonly #top: number;
  constructor(n: number, terms: readonly (readonly [exponents: readonly number[], coefficient: number])[]) {
    this.n = n;
    this.#exponents = terms.map(([e]) => Uint8Array.from(e));
    this.#coefficients = Float64Array.from(terms, ([, c]) => c);
    this.#top = terms.reduce((t, [e]) => Math.max(t, ...e), 0);
  }
  static of<T>(ring: PolynomialRing<T>, p: Polynomial<T>): NumericPolynomial {
    const field = ring.field as OrderedField<T>;
    const n = ring.variables.length;
    return new NumericPolynomial(
      n,
      p.monomials.map((m, i) => [exponentsOf(m, n), field.toNumber(p.coefficients[i]!)] as const),
    );
  }
  get isZero(): boolean {
    return this.#coefficients.length === 0;
  }
  /** Largest coefficient in size. */
  get size(): number {
    return this.#coefficients.reduce((s, c) => Math.max(s, Math.abs(c)), 0);
  }
  #powers(x: Float64Array): Float64Array[] {
    return Array.from({ length: this.n }, (_, i) => {
      const out = new Float64Array(this.#top + 1);
      out[0] = 1;
      for (let k = 1; k <= this.#top; k++) out[k] = out[k - 1]! * x[i]!;
      return out;
    });
  }
  value(x: Float64Array): number {
    const powers = this.#powers(x);
    let sum = 0;
    this.#exponents.forEach((e, t) => {
      let v = this.#coefficients[t]!;
      for (let i = 0; i < this.n; i++) v *= powers[i]![e[i]!]!;
      sum += v;
    });
    return sum;
  }
  gradient(x: Float64Array): Float64Array {
    const { n } = this;
    const powers = this.#powers(x);
    const out = new Float64Array(n);
    this.#exponents.forEach((e, t) => {
      for (let j = 0; j < n; j++) {
        if (e[j] === 0) continue;
        let v = this.#coefficients[t]! * e[j]!;
        for (let i = 0; i < n; i++) v *= powers[i]![i === j ? e[i]! - 1 : e[i]!]!;
        out[j]! += v;
      }
    });
    return out;
  }
  hessian(x: Float64Array): Float64Array {
    const { n } = this;
    const powers = this.#powers(x);
    const out = new Float64Array(n * n);
    this.#exponents.forEach((e, t) => {
      for (let j = 0; j < n; j++)
        for (let k = j; k < n; k++) {
          const factor = j === k ? e[j]! * (e[j]! - 1) : e[j]! * e[k]!;
          if (factor === 0) continue;
          let v = this.#coefficients[t]! * factor;
          for (let i = 0; i < n; i++) {
            const down = (i === j ? 1 : 0) + (i === k ? 1 : 0);
            v *= powers[i]![e[i]! - down]!;
          }
          out[j * n + k]! += v;
          if (j !== k) out[k * n + j]! += v;
        }
    });
    return out;
  }
}

export interface NewtonResult {
  readonly point: Float64Array;
  /** Length of the residual. */
  readonly residual: number;
  readonly converged: boolean;
}

/** Newton's iteration with step halving for a square system. `scale` is the size of the terms of the residual at a typical point. */
export function newton(
  start: Float64Array,
  residual: (x: Float64Array) => Float64Array,
  jacobian: (x: Float64Array) => NumberMatrix,
  tolerance: number,
  steps = 60,
): NewtonResult {
  let x = start;
  let r = residual(x);
  let size = norm(r);
  for (let step = 0; step < steps; step++) {
    let delta: Float64Array;
    try {
      delta = numberSolve(jacobian(x), numberMatrix(r.length, 1, r)).data;
    } catch (error) {
      if (!(error instanceof RangeError)) throw error;
      break;
    }
    if (!delta.every(Number.isFinite)) break;
    let factor = 1;
    let moved = false;
    for (let cut = 0; cut < 12; cut++, factor /= 2) {
      const y = x.map((v, i) => v - factor * delta[i]!);
      const ry = residual(y);
      const sy = norm(ry);
      if (sy < size) {
        x = y;
        r = ry;
        size = sy;
        moved = true;
        break;
      }
    }
    if (!moved || norm(delta) * factor <= 1e-15 * (norm(x) + 1e-300)) break;
  }
  return { point: x, residual: size, converged: size <= tolerance };
}

export function norm(v: Float64Array): number {
  let s = 0;
  for (const x of v) s += x * x;
  return Math.sqrt(s);
}

/** Pseudo-random doubles in (-1, 1), reproducible. */
export function randomSource(seed: number): () => number {
  let state = seed >>> 0 || 1;
  return () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return (state / 4_294_967_296) * 2 - 1;
  };
}
