/** Bilinear forms on the columns of a basis. What is asked for again on the same matrices is remembered. */
import { type Algebraic, gcd, type RealField } from '../field/index.ts';
import { type Matrix, multiply, type SparseMatrix, sparseTimes, transpose } from '../linear/index.ts';
import { integerCongruence } from './integer-form.ts';

/** A form times its common denominator, so that its entries are integral over the basis of the field. */
interface Cleared {
  readonly integral: SparseMatrix<Algebraic>;
  readonly denominator: bigint;
}

const clearedForms = new WeakMap<SparseMatrix<Algebraic>, Cleared>();
const restrictions = new WeakMap<Matrix<Algebraic>, WeakMap<SparseMatrix<Algebraic>, Matrix<Algebraic>>>();

function cleared(form: SparseMatrix<Algebraic>): Cleared {
  const known = clearedForms.get(form);
  if (known !== undefined) return known;
  let denominator = 1n;
  for (const row of form.value) for (const x of row) if (x.d !== 1n) denominator = (denominator / gcd(denominator, x.d)) * x.d;
  const integral =
    denominator === 1n
      ? form
      : { ...form, value: form.value.map((row) => row.map((x) => ({ c: x.c.map((y) => y * (denominator / x.d)), d: 1n }))) };
  const out = { integral, denominator };
  clearedForms.set(form, out);
  return out;
}

/** Restriction of a sparse form to the columns of a basis: Bᵀ F B. */
export function restrictForm(basis: Matrix<Algebraic>, form: SparseMatrix<Algebraic>): Matrix<Algebraic> {
  let known = restrictions.get(basis);
  if (known === undefined) {
    known = new WeakMap();
    restrictions.set(basis, known);
  }
  let out = known.get(form);
  if (out === undefined) {
    const { integral, denominator } = cleared(form);
    const f = basis.field as RealField;
    const data = integerCongruence(basis, integral, f);
    const raw =
      data === undefined
        ? multiply(transpose(basis), sparseTimes(integral, basis))
        : { field: basis.field, rows: basis.cols, cols: basis.cols, data };
    out = denominator === 1n ? raw : { ...raw, data: raw.data.map((x) => f.element(x.c, x.d * denominator)) };
    known.set(form, out);
  }
  return out;
}
