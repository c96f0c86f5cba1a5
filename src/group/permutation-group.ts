/** A finite group held as a closed list of permutations; classes and inverses are made when first asked for. */
import { lcmInt } from '../field/arithmetic.ts';
import type { ElementStore } from './element-store.ts';
import type { ConjugacyClass, FiniteGroup, Permutation } from './group.ts';

interface Classes {
  readonly classes: readonly ConjugacyClass[];
  readonly classOf: Int32Array;
  readonly exponent: number;
}

export class PermutationGroup implements FiniteGroup {
  readonly degree: number;
  readonly order: number;
  readonly generators: readonly number[];
  readonly via: Int32Array;
  readonly parent: Int32Array;
  readonly #store: ElementStore;
  #classes: Classes | undefined;
  #inverses: Int32Array | undefined;

  constructor(store: ElementStore, generators: readonly number[], via: Int32Array, parent: Int32Array) {
    this.#store = store;
    this.degree = store.degree;
    this.order = store.count;
    this.generators = generators;
    this.via = via;
    this.parent = parent;
  }

  permutation(i: number): Permutation {
    return Int32Array.from(this.#store.images.subarray(i * this.degree, (i + 1) * this.degree));
  }
  indexOf(p: Permutation): number {
    return p.length === this.degree ? this.#store.find(p) : -1;
  }
  multiply(i: number, j: number): number {
    return this.#store.multiply(i, j);
  }
  inverse(i: number): number {
    this.#inverses ??= this.#makeInverses();
    return this.#inverses[i]!;
  }
  power(i: number, k: number): number {
    let base = k < 0 ? this.inverse(i) : i;
    let result = 0;
    for (let e = Math.abs(k); e > 0; e = Math.floor(e / 2)) {
      if (e % 2 === 1) result = this.multiply(result, base);
      if (e > 1) base = this.multiply(base, base);
    }
    return result;
  }
  get classes(): readonly ConjugacyClass[] {
    return this.#made().classes;
  }
  get classOf(): Int32Array {
    return this.#made().classOf;
  }
  get exponent(): number {
    return this.#made().exponent;
  }

  #makeInverses(): Int32Array {
    const store = this.#store;
    const generatorInverse = this.generators.map((g) => store.invert(g));
    const inverses = new Int32Array(this.order);
    // (g p)^-1 = p^-1 g^-1
    for (let i = 1; i < this.order; i++) inverses[i] = store.multiply(inverses[this.parent[i]!]!, generatorInverse[this.via[i]!]!);
    return inverses;
  }

  #made(): Classes {
    this.#classes ??= this.#makeClasses();
    return this.#classes;
  }

  /** Classes are the orbits of conjugation by the generators. */
  #makeClasses(): Classes {
    const store = this.#store;
    const { order, degree } = this;
    const movers = [...new Set(this.generators)].filter((g) => g !== 0);
    const inverseBases = movers.map((g) => {
      const row = store.invert(g) * degree;
      return store.base.map((x) => store.images[row + x]!);
    });
    const label = new Int32Array(order).fill(-1);
    const heads: number[] = [];
    const sizes: number[] = [];
    const stack = new Int32Array(order);
    for (let x = 0; x < order; x++) {
      if (label[x] !== -1) continue;
      const c = heads.length;
      heads.push(x);
      label[x] = c;
      let size = 1;
      let top = 0;
      stack[top++] = x;
      while (top > 0) {
        const y = stack[--top]!;
        for (let m = 0; m < movers.length; m++) {
          const z = store.sandwich(movers[m]!, y, inverseBases[m]!);
          if (label[z] !== -1) continue;
          label[z] = c;
          size++;
          stack[top++] = z;
        }
      }
      sizes.push(size);
    }
    const orders = heads.map((x) => this.#orderOf(x));
    const byRank = heads.map((_, c) => c).sort((a, b) => orders[a]! - orders[b]! || sizes[a]! - sizes[b]! || heads[a]! - heads[b]!);
    const rank = new Int32Array(heads.length);
    byRank.forEach((c, r) => {
      rank[c] = r;
    });
    const classOf = label.map((c) => rank[c]!);
    const classes = byRank.map((c) => ({
      representative: heads[c]!,
      size: sizes[c]!,
      order: orders[c]!,
      inverse: classOf[store.invert(heads[c]!)]!,
    }));
    return { classes, classOf, exponent: orders.reduce(lcmInt, 1) };
  }

  /** The least common multiple of the cycle lengths. */
  #orderOf(i: number): number {
    const { images } = this.#store;
    const row = i * this.degree;
    const seen = new Uint8Array(this.degree);
    let result = 1;
    for (let x = 0; x < this.degree; x++) {
      if (seen[x] === 1) continue;
      let length = 0;
      for (let y = x; seen[y] === 0; y = images[row + y]!) {
        seen[y] = 1;
        length++;
      }
      result = lcmInt(result, length);
    }
    return result;
  }
}
