/**
 * Numbering of the monomials of each degree in n variables, in lexicographic order, without texts: a monomial of
 * degree d is a non-decreasing sequence of d variables, and its number is a sum of tabulated counts.
 */

/** Monomials of one degree, and how they arise from the degree below. */
export interface Layer {
  readonly size: number;
  /** Monomial = monomial `parent` of the layer below times variable `last`, its greatest variable. */
  readonly parent: Int32Array;
  readonly last: Int32Array;
  /** The variables of monomial i, non-decreasing, at i * degree. */
  readonly variables: Uint16Array;
}

export class MonomialLayers {
  readonly n: number;
  readonly #layers: Layer[];
  readonly #times: Int32Array[] = [];
  readonly #names = new Map<number, string[]>();
  constructor(n: number) {
    this.n = n;
    this.#layers = [{ size: 1, parent: new Int32Array(1), last: new Int32Array(1), variables: new Uint16Array(0) }];
  }
  layer(d: number): Layer {
    while (this.#layers.length <= d) {
      const below = this.#layers.at(-1)!;
      const k = this.#layers.length;
      const parent: number[] = [];
      const last: number[] = [];
      for (let i = 0; i < below.size; i++)
        for (let v = k === 1 ? 0 : below.last[i]!; v < this.n; v++) {
          parent.push(i);
          last.push(v);
        }
      const variables = new Uint16Array(parent.length * k);
      for (let i = 0; i < parent.length; i++) {
        const from = parent[i]! * (k - 1);
        for (let j = 0; j < k - 1; j++) variables[i * k + j] = below.variables[from + j]!;
        variables[i * k + k - 1] = last[i]!;
      }
      this.#layers.push({ size: parent.length, parent: Int32Array.from(parent), last: Int32Array.from(last), variables });
    }
    return this.#layers[d]!;
  }
  /** times(d)[i * n + v]: number, in degree d + 1, of monomial i of degree d times variable v. */
  times(d: number): Int32Array {
    while (this.#times.length <= d) {
      const k = this.#times.length;
      const { size, variables } = this.layer(k);
      const { n } = this;
      // smaller[r][v]: how many sequences of length r + 1 start with a variable below v
      const smaller = Array.from({ length: k + 1 }, (_, r) => {
        const out = new Float64Array(n + 1);
        for (let u = 0; u < n; u++) out[u + 1] = out[u]! + multisets(n - u, r);
        return out;
      });
      const out = new Int32Array(size * n);
      for (let i = 0; i < size; i++)
        for (let v = 0; v < n; v++) {
          let rank = 0;
          let previous = 0;
          let placed = false;
          for (let j = 0, at = i * k; j <= k; j++) {
            let w: number;
            if (!placed && (at === (i + 1) * k || variables[at]! > v)) {
              w = v;
              placed = true;
            } else w = variables[at++]!;
            const table = smaller[k - j]!;
            rank += table[w]! - table[previous]!;
            previous = w;
          }
          out[i * n + v] = rank;
        }
      this.#times.push(out);
    }
    return this.#times[d]!;
  }
  /** The monomials of degree d as texts, variable i being named by places[i]. */
  names(d: number, places: readonly number[]): readonly string[] {
    let out = this.#names.get(d);
    if (out === undefined) {
      const { size, variables } = this.layer(d);
      out = Array.from({ length: size }, (_, i) => {
        let m = '';
        for (let j = i * d; j < (i + 1) * d; j++) m += String.fromCharCode(places[variables[j]!]!);
        return m;
      });
      this.#names.set(d, out);
    }
    return out;
  }
}

/** Multisets of size r out of n things. */
function multisets(n: number, r: number): number {
  let out = 1;
  for (let i = 1; i <= r; i++) out = (out * (n + i - 1)) / i;
  return Math.round(out);
}
