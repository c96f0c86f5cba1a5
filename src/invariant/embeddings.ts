/**
 * All homomorphisms of a number field into GF(p) for a prime that splits completely, and the way back: the
 * coordinates of an element over the integral basis from its images.
 */
import { type Algebraic, mulAddMod } from '../field/index.ts';
import { modularEchelon } from '../linear/index.ts';
import type { CommonReduction } from './common-reduction.ts';
import type { ScalarField } from './linear-action.ts';

export class Embeddings {
  readonly field: ScalarField;
  readonly reduction: CommonReduction;
  readonly #inverse: Int32Array; // n x n, row j gives coordinate j

  /** Throws RangeError if the images of the basis are dependent modulo p (p divides the discriminant). */
  constructor(field: ScalarField, reduction: CommonReduction) {
    this.field = field;
    this.reduction = reduction;
    const n = field.degree;
    const data = new Int32Array(2 * n * n);
    for (let k = 0; k < n; k++) {
      for (let j = 0; j < n; j++)
        data[2 * n * k + j] = this.apply(k, { c: Array.from({ length: n }, (_, i) => (i === j ? 1n : 0n)), d: 1n });
      data[2 * n * k + n + k] = 1;
    }
    const { matrix, pivots } = modularEchelon({ p: reduction.p, rows: n, cols: 2 * n, data });
    if (pivots.some((q, i) => q !== i)) throw new RangeError(`${reduction.p} divides the discriminant of ${field.name}`);
    this.#inverse = new Int32Array(n * n);
    for (let j = 0; j < n; j++) for (let k = 0; k < n; k++) this.#inverse[j * n + k] = matrix.data[2 * n * j + n + k]!;
  }
  get count(): number {
    return this.field.degree;
  }
  /** Image under embedding k. */
  apply(k: number, a: Algebraic): number {
    return this.reduction.apply(k === 0 ? a : this.field.automorphism(k, a));
  }
  coordinates(images: ArrayLike<number>): number[] {
    const n = this.count;
    return Array.from({ length: n }, (_, j) => {
      let s = 0;
      for (let k = 0; k < n; k++) s = mulAddMod(s, this.#inverse[j * n + k]!, images[k]!, this.reduction.p);
      return s;
    });
  }
}
