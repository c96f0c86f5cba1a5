/** Small actions written down by hand, over one field, for the tests of events and classes. */
import { type Action, embedSparse, flowBlocks, makeAction, withCharacters } from '../../src/action/index.ts';
import { blockForms, type ZeroEvent, zeroEvent } from '../../src/event/zero-event.ts';
import { type Algebraic, RealField } from '../../src/field/index.ts';
import { build, directSum, fromRows, type Matrix, multiply, scale, sparse, zeroMatrix } from '../../src/linear/index.ts';

export type Entry = number | Algebraic;
/** Holds cosines and sines of multiples of 2 pi/3, 2 pi/5 and 2 pi/6. */
export const F = RealField.of({ cosines: [5], squareRoots: [2n, 3n] });
export const big = RealField.of({ cosines: [5, 20, 12, 8] });

export function mat(field: RealField, rows: readonly (readonly Entry[])[]): Matrix<Algebraic> {
  return fromRows(
    field,
    rows.map((r) => r.map((x) => (typeof x === 'number' ? field.fromInteger(x) : x))),
    rows[0]?.length ?? 0,
  );
}
/** Rotation of the plane by 2 pi k/n. */
export function rotation(field: RealField, k: number, n: number): Matrix<Algebraic> {
  const c = field.cos(k, n)!;
  const s = field.sin(k, n)!;
  return mat(field, [
    [c, field.neg(s)],
    [s, c],
  ]);
}
export const diag = (field: RealField, ...x: number[]) =>
  build<Algebraic>(field, x.length, x.length, (i, j) => (i === j ? field.fromInteger(x[i]!) : field.zero));
export const blocks = (...m: Matrix<Algebraic>[]) => m.reduce((a, b) => directSum(a, b));
/** [[0, I], [−I, 0]]. */
export function canonical(field: RealField, n: number): Matrix<Algebraic> {
  return build<Algebraic>(field, 2 * n, 2 * n, (i, j) => (j === i + n ? field.one : i === j + n ? field.fromInteger(-1) : field.zero));
}
/** q ↦ Aq, p ↦ σAp for orthogonal A. */
export const lift = (a: Matrix<Algebraic>, sigma = 1) => directSum(a, scale(a, a.field.fromInteger(sigma)));
export const kron = (a: Matrix<Algebraic>, b: Matrix<Algebraic>) =>
  build<Algebraic>(a.field, a.rows * b.rows, a.cols * b.cols, (i, j) =>
    a.field.mul(a.data[Math.floor(i / b.rows) * a.cols + Math.floor(j / b.cols)]!, b.data[(i % b.rows) * b.cols + (j % b.cols)]!),
  );
export const zero = (field: RealField, n: number) => zeroMatrix<Algebraic>(field, n, n);
export { multiply };

/** Left multiplication by i and j on H = R⁴, basis 1, i, j, k; right multiplication by i and j. */
export const quaternion = (field: RealField) => ({
  li: mat(field, [
    [0, -1, 0, 0],
    [1, 0, 0, 0],
    [0, 0, 0, -1],
    [0, 0, 1, 0],
  ]),
  lj: mat(field, [
    [0, 0, -1, 0],
    [0, 0, 0, 1],
    [1, 0, 0, 0],
    [0, -1, 0, 0],
  ]),
  ri: mat(field, [
    [0, -1, 0, 0],
    [1, 0, 0, 0],
    [0, 0, 0, 1],
    [0, 0, -1, 0],
  ]),
  rj: mat(field, [
    [0, 0, -1, 0],
    [0, 0, 0, -1],
    [1, 0, 0, 0],
    [0, 1, 0, 0],
  ]),
});

export function action(field: RealField, form: Matrix<Algebraic>, generators: readonly Matrix<Algebraic>[]): Action {
  return withCharacters(
    makeAction(
      field,
      sparse(form),
      generators.map((m, i) => ({ name: `g${i + 1}`, matrix: sparse(m) })),
    ),
  );
}

export function eventOf(act: Action, s: Matrix<Algebraic>): ZeroEvent {
  return zeroEvent(blockForms(flowBlocks(act), embedSparse(sparse(s), s.field as RealField, act.field), act.form), act.field);
}
