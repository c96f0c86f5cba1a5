/**
 * Matrices modulo a prime on forms of given degree, one sparse row for each monomial: row m holds the coefficients of
 * m(gx). Built degree by degree, by one linear form at a time.
 */
import { mulAddMod, mulMod } from '../field/index.ts';
import type { MonomialLayers } from './monomial-layers.ts';

/** Columns in no order, values nonzero. */
export interface SparseRow {
  readonly index: Int32Array;
  readonly value: Int32Array;
}

/** The symmetric powers of one n x n matrix over GF(p). */
export class SymmetricPowers {
  readonly #layers: MonomialLayers;
  readonly #p: number;
  readonly #forms: readonly SparseRow[];
  readonly #rows: SparseRow[][];
  /** `matrix` row after row. */
  constructor(layers: MonomialLayers, matrix: Int32Array, p: number) {
    const { n } = layers;
    this.#layers = layers;
    this.#p = p;
    this.#forms = Array.from({ length: n }, (_, i) => {
      const index: number[] = [];
      for (let j = 0; j < n; j++) if (matrix[i * n + j] !== 0) index.push(j);
      return { index: Int32Array.from(index), value: Int32Array.from(index, (j) => matrix[i * n + j]!) };
    });
    this.#rows = [[{ index: Int32Array.of(0), value: Int32Array.of(1) }]];
  }
  /** True if the matrix has a single entry in each row. */
  get monomial(): boolean {
    return this.#forms.every((f) => f.index.length === 1);
  }
  /** Rows of the d-th power. */
  rows(d: number): readonly SparseRow[] {
    const { n } = this.#layers;
    const p = this.#p;
    while (this.#rows.length <= d) {
      const k = this.#rows.length;
      const layer = this.#layers.layer(k);
      const times = this.#layers.times(k - 1);
      const below = this.#rows[k - 1]!;
      const sum = new Int32Array(layer.size);
      const rows: SparseRow[] = [];
      for (let i = 0; i < layer.size; i++) {
        const row = below[layer.parent[i]!]!;
        const form = this.#forms[layer.last[i]!]!;
        const touched: number[] = [];
        for (let a = 0; a < row.index.length; a++) {
          const base = row.index[a]! * n;
          const x = row.value[a]!;
          for (let b = 0; b < form.index.length; b++) {
            const j = times[base + form.index[b]!]!;
            if (sum[j] === 0) touched.push(j);
            sum[j] = mulAddMod(sum[j]!, form.value[b]!, x, p);
          }
        }
        const index: number[] = [];
        const value: number[] = [];
        for (const j of touched) {
          if (sum[j] === 0) continue;
          index.push(j);
          value.push(sum[j]!);
          sum[j] = 0;
        }
        rows.push({ index: Int32Array.from(index), value: Int32Array.from(value) });
      }
      this.#rows.push(rows);
    }
    return this.#rows[d]!;
  }
}

/** Row of the Kronecker product of two rows, the second factor having `width` columns. */
export function kroneckerRow(a: SparseRow, b: SparseRow, width: number, p: number): SparseRow {
  const n = b.index.length;
  const index = new Int32Array(a.index.length * n);
  const value = new Int32Array(a.index.length * n);
  for (let i = 0; i < a.index.length; i++)
    for (let j = 0; j < n; j++) {
      index[i * n + j] = a.index[i]! * width + b.index[j]!;
      value[i * n + j] = mulMod(a.value[i]!, b.value[j]!, p);
    }
  return { index, value };
}
