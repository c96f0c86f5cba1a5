/**
 * Dimensions of the graded pieces of a ring of invariants, or of a twisted piece, by Molien's formula: the average
 * over the classes of ψ̄(g) times the traces on symmetric powers, block by block. The traces are computed modulo
 * primes by Newton's recursion d h_d = Σ χ(g^k) h_{d-k}; the averages are integers below a known bound, so enough
 * primes determine them. (T. Molien 1897; R. Stanley, Bull. Amer. Math. Soc. 1 (1979), from memory.)
 */
import { type Algebraic, type CyclotomicField, invMod, lcmInt, mulAddMod, mulMod, reduceBigint } from '../field/index.ts';
import { chineseRemainder } from '../polynomial/index.ts';
import { CommonReduction } from './common-reduction.ts';
import type { LinearAction } from './linear-action.ts';
import { classTraces, powerClasses } from './traces.ts';

/** A class function with values in a cyclotomic field whose conductor divides the exponent of the group. */
export interface Twist {
  readonly field: CyclotomicField;
  /** By class. */
  readonly values: readonly Algebraic[];
  /** ψ(1), a bound of |ψ|. */
  readonly degree: number;
}

interface Prime {
  readonly reduction: CommonReduction;
  readonly traces: readonly Int32Array[]; // block, class
  readonly weights: Int32Array; // |class| ψ̄ / |Γ|
  readonly powers: readonly Int32Array[][]; // block, class: h_0, h_1, …
}

export class GradedDimensions {
  readonly action: LinearAction;
  readonly blocks: readonly (readonly number[])[];
  readonly #twist: Twist | undefined;
  readonly #powerClasses: readonly Int32Array[];
  readonly #primes: Prime[] = [];

  /** `blocks` may be coarser than those of the action, e.g. all coordinates together. */
  constructor(action: LinearAction, blocks: readonly (readonly number[])[] = action.blocks, twist?: Twist) {
    this.action = action;
    this.blocks = blocks;
    this.#twist = twist;
    this.#powerClasses = powerClasses(action);
  }

  #prime(index: number): Prime {
    while (this.#primes.length <= index) {
      const { group } = this.action;
      const twist = this.#twist;
      const reduction = CommonReduction.of(this.action.field, lcmInt(group.exponent, twist?.field.conductor ?? 1), this.#primes.length);
      const { p } = reduction;
      const inverse = invMod(reduceBigint(BigInt(group.order), p), p);
      const weights = Int32Array.from(group.classes, (c) => {
        const w = mulMod(c.size % p, inverse, p);
        return twist === undefined ? w : mulMod(w, reduction.applyCyclotomic(twist.field, twist.values[c.inverse]!), p);
      });
      const traces = classTraces(this.action, reduction, this.blocks);
      this.#primes.push({ reduction, traces, weights, powers: this.blocks.map(() => group.classes.map(() => new Int32Array([1]))) });
    }
    return this.#primes[index]!;
  }
  #extend(prime: Prime, block: number, degree: number): void {
    const { p } = prime.reduction;
    const table = prime.powers[block]!;
    if (table[0]!.length > degree) return;
    const traces = prime.traces[block]!;
    const length = Math.max(degree + 1, 2 * table[0]!.length);
    table.forEach((old, c) => {
      const h = new Int32Array(length);
      h.set(old);
      const classes = this.#powerClasses[c]!;
      const order = classes.length;
      for (let d = old.length; d < length; d++) {
        let s = 0;
        for (let k = 1; k <= d; k++) s = mulAddMod(s, traces[classes[k % order]!]!, h[d - k]!, p);
        h[d] = mulMod(s, invMod(d, p), p);
      }
      table[c] = h;
    });
  }
  /** Dimension of the piece with these degrees in the blocks. */
  dimension(degrees: readonly number[]): number {
    let bound = BigInt(this.#twist?.degree ?? 1);
    degrees.forEach((d, b) => {
      bound *= binomial(this.blocks[b]!.length + d - 1, d);
    });
    let value = 0n;
    let modulus = 1n;
    for (let index = 0; modulus <= bound; index++) {
      const prime = this.#prime(index);
      const { p } = prime.reduction;
      degrees.forEach((d, b) => {
        this.#extend(prime, b, d);
      });
      let s = 0;
      for (let c = 0; c < prime.weights.length; c++) {
        let t = prime.weights[c]!;
        for (let b = 0; b < degrees.length && t !== 0; b++) t = mulMod(t, prime.powers[b]![c]![degrees[b]!]!, p);
        s = (s + t) % p;
      }
      value = modulus === 1n ? BigInt(s) : chineseRemainder(value, modulus, s, p);
      modulus *= BigInt(p);
    }
    return Number(value);
  }
  /** Multiplicities of the eigenvalues exp(2 pi i k/m) of class c on all coordinates, m its element order. */
  eigenvalueMultiplicities(c: number): number[] {
    const { reduction, traces } = this.#prime(0);
    const { p } = reduction;
    const classes = this.#powerClasses[c]!;
    const m = classes.length;
    const inverse = invMod(m, p);
    const total = Int32Array.from(classes, (d) => traces.reduce((s, t) => (s + t[d]!) % p, 0));
    return Array.from({ length: m }, (_, k) => {
      let s = 0;
      for (let j = 0; j < m; j++) s = mulAddMod(s, total[j]!, reduction.root(-((j * k) % m), m), p);
      return mulMod(s, inverse, p);
    });
  }
  /** Number of elements that act as the identity. */
  get kernelOrder(): number {
    const n = this.blocks.reduce((s, b) => s + b.length, 0);
    return this.action.group.classes.reduce((s, c, k) => (this.eigenvalueMultiplicities(k)[0] === n ? s + c.size : s), 0);
  }
}

/** n over k. */
export function binomial(n: number, k: number): bigint {
  if (k < 0 || k > n) return k === 0 ? 1n : 0n;
  let out = 1n;
  for (let i = 1; i <= k; i++) out = (out * BigInt(n - k + i)) / BigInt(i);
  return out;
}
