/**
 * A polynomial with a symplectic form as a structure on signed variables. Every variable x has two literals, x and −x;
 * a signed permutation permutes the literals and respects negation. One further variable τ carries the sign of time:
 * ω is multiplied by it. Coefficients enter by classes of equal absolute value with a sign, so that exact and clustered
 * floating numbers look alike.
 */

/** A coefficient: the class of its absolute value (1, 2, …) and its sign. */
export interface Weight {
  readonly size: number;
  readonly sign: 1 | -1;
}

/** weight · Π variable^exponent; distinct variables, increasing. */
export interface StructureTerm {
  readonly variables: readonly number[];
  readonly exponents: readonly number[];
  readonly weight: Weight;
}

/** W_ij for i < j. */
export interface FormEntry {
  readonly i: number;
  readonly j: number;
  readonly weight: Weight;
}

export interface SignedStructure {
  /** Without τ, which is variable number `count`. */
  readonly count: number;
  readonly terms: readonly StructureTerm[];
  readonly form: readonly FormEntry[];
  /** What else tells variables apart, e.g. coordinates from momenta; may be empty. */
  readonly kinds: readonly number[];
  /** Classes of values that must be kept with their sign, e.g. the entries of the equilibrium; undefined: zero. */
  readonly values: readonly (Weight | undefined)[];
}

/** A signed permutation: variable i goes to images[i] with signs[i]; the last one is τ, which stays. */
export interface SignedPermutation {
  readonly images: Int32Array;
  readonly signs: Int8Array;
}

/** Literal numbers: 2i is +i, 2i + 1 is −i. */
export const negated = (literal: number): number => literal ^ 1;

/** A structure made ready for search and for verification. */
export class StructureIndex {
  readonly structure: SignedStructure;
  /** Number of literals, τ included. */
  readonly literals: number;
  readonly tau: number;
  /** Initial colours of the literals, canonical numbers from 0. */
  readonly colours: Int32Array;
  /** Terms in two and more variables. */
  readonly joined: readonly StructureTerm[];
  /** Of each variable: numbers of terms, and −1 − number for entries of ω. */
  readonly incidence: readonly (readonly number[])[];
  readonly #weights = new Map<string, number>();
  readonly #form = new Map<number, number>();

  constructor(structure: SignedStructure) {
    this.structure = structure;
    const m = structure.count;
    this.tau = m;
    this.literals = 2 * (m + 1);
    const keys = Array.from({ length: this.literals }, (_, l) => {
      const i = l >> 1;
      return i === m ? ['t'] : [`k${structure.kinds[i] ?? 0}`];
    });
    const joined: StructureTerm[] = [];
    const signed = (w: Weight, s: number) => w.size * w.sign * s;
    structure.values.forEach((w, i) => {
      if (w === undefined) return;
      keys[2 * i]!.push(`v${signed(w, 1)}`);
      keys[2 * i + 1]!.push(`v${signed(w, -1)}`);
    });
    for (const t of structure.terms) {
      this.#weights.set(t.variables.map((v, k) => `${v}^${t.exponents[k]}`).join(' '), signed(t.weight, 1));
      if (t.variables.length === 0) continue;
      if (t.variables.length > 1) {
        joined.push(t);
        continue;
      }
      const [v, e] = [t.variables[0]!, t.exponents[0]!];
      keys[2 * v]!.push(`p${e}:${signed(t.weight, 1)}`);
      keys[2 * v + 1]!.push(`p${e}:${signed(t.weight, e % 2 === 1 ? -1 : 1)}`);
    }
    for (const { i, j, weight } of structure.form) {
      this.#form.set(i * m + j, signed(weight, 1));
      this.#form.set(j * m + i, signed(weight, -1));
    }
    const texts = keys.map((k) => k.sort().join('|'));
    const order = new Map([...new Set(texts)].sort().map((t, k) => [t, k]));
    this.colours = Int32Array.from(texts, (t) => order.get(t)!);
    this.joined = joined;
    const incidence: number[][] = Array.from({ length: m + 1 }, () => []);
    joined.forEach((t, k) => {
      for (const v of t.variables) incidence[v]!.push(k);
    });
    structure.form.forEach(({ i, j }, k) => {
      incidence[i]!.push(-1 - k);
      incidence[j]!.push(-1 - k);
      incidence[m]!.push(-1 - k);
    });
    this.incidence = incidence;
  }

  /** Whether a signed permutation leaves the polynomial and the values invariant and multiplies ω by the sign of τ. Exact. */
  isSymmetry({ images, signs }: SignedPermutation): boolean {
    const m = this.tau;
    const touched = new Set<number>();
    for (let i = 0; i <= m; i++) {
      if (images[i] === i && signs[i] === 1) continue;
      const to = 2 * images[i]! + (signs[i] === 1 ? 0 : 1);
      if (this.colours[2 * i] !== this.colours[to]) return false;
      for (const k of this.incidence[i]!) touched.add(k);
    }
    for (const k of touched) {
      if (k < 0) {
        const { i, j, weight } = this.structure.form[-1 - k]!;
        const value = weight.size * weight.sign * signs[i]! * signs[j]! * signs[m]!;
        if (this.#form.get(images[i]! * m + images[j]!) !== value) return false;
        continue;
      }
      const t = this.joined[k]!;
      let sign = t.weight.sign as number;
      const pairs = t.variables.map((v, q) => {
        if (t.exponents[q]! % 2 === 1) sign *= signs[v]!;
        return [images[v]!, t.exponents[q]!] as const;
      });
      pairs.sort((a, b) => a[0] - b[0]);
      if (this.#weights.get(pairs.map(([v, e]) => `${v}^${e}`).join(' ')) !== t.weight.size * sign) return false;
    }
    return true;
  }
}
