/**
 * Character values as sums of roots of unity: the multiplicities of the eigenvalues of each element,
 * found modulo a prime by the inverse Fourier transform over the powers of the element (Dixon 1967),
 * kept once for each distinct value with its exact form, its residue modulo a second, larger prime
 * and its floating value.
 */

import type { CyclotomicField } from '../field/cyclotomic.ts';
import type { Algebraic } from '../field/number-field.ts';
import { inverseModulo, powersModulo, reduce } from './modular.ts';

/** sum of multiplicities[i] * exp(2 pi i exponents[i]/e), exponents increasing. */
export interface RootSum {
  readonly exponents: readonly number[];
  readonly multiplicities: readonly number[];
}

/** One distinct value in every form it is used in. */
export interface CharacterValue extends RootSum {
  readonly exact: Algebraic;
  readonly residue: number;
  readonly re: number;
  readonly im: number;
}

/** Distinct values, made on demand. */
export class ValueStore {
  readonly #field: CyclotomicField;
  readonly #prime: number;
  readonly #powers: Float64Array;
  readonly #known = new Map<string, CharacterValue>();
  readonly #roots: (CharacterValue | undefined)[];

  /** `root`: an element of order exactly the conductor modulo `prime`. */
  constructor(field: CyclotomicField, prime: number, root: number) {
    this.#field = field;
    this.#prime = prime;
    this.#powers = powersModulo(root, field.conductor, prime);
    this.#roots = new Array<CharacterValue | undefined>(field.conductor);
  }

  /** exp(2 pi i k/e), 0 <= k < e. */
  root(k: number): CharacterValue {
    return (this.#roots[k] ??= this.#make([k], [1]));
  }

  sum(exponents: readonly number[], multiplicities: readonly number[]): CharacterValue {
    const key = `${exponents.join(',')};${multiplicities.join(',')}`;
    let value = this.#known.get(key);
    if (value === undefined) this.#known.set(key, (value = this.#make(exponents, multiplicities)));
    return value;
  }

  #make(exponents: readonly number[], multiplicities: readonly number[]): CharacterValue {
    const e = this.#field.conductor;
    const dense = new Array<number>(e).fill(0);
    let residue = 0;
    let re = 0;
    let im = 0;
    exponents.forEach((k, i) => {
      const m = multiplicities[i]!;
      dense[k] = m;
      residue = reduce(residue + m * this.#powers[k]!, this.#prime);
      re += m * cosine(k, e);
      im += m * cosine(4 * k - e, 4 * e);
    });
    return { exponents, multiplicities, exact: this.#field.fromPowers(dense), residue, re, im };
  }
}

/** cos(2 pi k/n), exact at multiples of a quarter turn. */
function cosine(k: number, n: number): number {
  const quarter = (4 * k) / n;
  if (Number.isInteger(quarter)) return [1, 0, -1, 0][((quarter % 4) + 4) % 4]!;
  return Math.cos((2 * Math.PI * k) / n);
}

/**
 * The values of one character in characteristic zero from its values modulo p.
 * `powers`: classes of the powers of each class representative; `theta`: of order e modulo p.
 * Throws Error if the multiplicities do not add up to the degree.
 */
export function liftCharacter(
  values: Float64Array,
  degree: number,
  powers: readonly Int32Array[],
  theta: Float64Array,
  p: number,
  store: ValueStore,
): CharacterValue[] {
  const e = theta.length;
  const out = new Array<CharacterValue | undefined>(values.length).fill(undefined);
  powers.forEach((row, t) => {
    if (out[t] !== undefined) return;
    const o = row.length;
    const step = e / o;
    const multiplicities = eigenvalueMultiplicities(row, values, degree, theta, p);
    // Galois conjugates: g^a has the a-th powers of the eigenvalues of g.
    for (let a = 0; a < o; a++) {
      const target = row[a]!;
      if (out[target] !== undefined || powers[target]!.length !== o) continue;
      const terms = new Map<number, number>();
      for (let k = 0; k < o; k++) if (multiplicities[k] !== 0) terms.set(((k * a) % o) * step, multiplicities[k]!);
      const exponents = [...terms.keys()].sort((x, y) => x - y);
      out[target] = store.sum(
        exponents,
        exponents.map((x) => terms.get(x)!),
      );
    }
    if (o === 1) out[t] = store.sum([0], [degree]);
  });
  return out.map((v) => v!);
}

/** How often exp(2 pi i k/o) is an eigenvalue of an element of order o, for each k. */
function eigenvalueMultiplicities(row: Int32Array, values: Float64Array, degree: number, theta: Float64Array, p: number): Int32Array {
  const o = row.length;
  const step = theta.length / o;
  const scale = inverseModulo(o % p, p);
  const multiplicities = new Int32Array(o);
  let total = 0;
  for (let k = 0; k < o && total < degree; k++) {
    let sum = 0;
    for (let j = 0, at = 0; j < o; j++) {
      sum += values[row[j]!]! * theta[at * step]!;
      at -= k;
      if (at < 0) at += o;
      if (sum > 2 ** 52) sum = reduce(sum, p);
    }
    const m = reduce(reduce(sum, p) * scale, p);
    multiplicities[k] = m;
    total += m;
  }
  if (total !== degree) throw new Error('eigenvalue multiplicities of a character do not add up to its degree');
  return multiplicities;
}
