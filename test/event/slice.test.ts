/** The codimension with a continuous symmetry, by the rank with its fields, against the formulas of the classes it generates. */
import { describe, expect, it } from 'vitest';
import { sliceOf } from '../../src/action/index.ts';
import { zeroCodimensionOfPartition } from '../../src/event/partition-codimension.ts';
import { pieceCodimension, sliceEvent, slicePiece } from '../../src/event/slice-rank.ts';
import type { Algebraic } from '../../src/field/index.ts';
import { type Matrix, sparse } from '../../src/linear/index.ts';
import { action, canonical, diag, F, lift, mat, zero } from '../support/actions.ts';

const turn = {
  linear: sparse(
    lift(
      mat(F, [
        [0, -1],
        [1, 0],
      ]),
    ),
  ),
  value: new Array<Algebraic>(4).fill(F.zero),
};
const mirror = lift(diag(F, 1, -1));
const time = diag(F, 1, 1, -1, -1);

function codimension(generators: readonly Matrix<Algebraic>[], s: Matrix<Algebraic>): number {
  const act = action(F, canonical(F, 2), generators);
  const slice = sliceOf(act, [turn]);
  return pieceCodimension(slicePiece(sliceEvent(slice, act.form, sparse(s)), act.generators), slice.field);
}

describe('rotations of the plane on R⁴', () => {
  const kinetic = diag(F, 0, 0, 1, 1);
  it('alone: complex type, u(1,1)', () => {
    expect(codimension([], kinetic)).toBe(zeroCodimensionOfPartition(2, [2]));
    expect(codimension([], zero(F, 4))).toBe(zeroCodimensionOfPartition(2, [1, 1]));
  });
  it('with a mirror: real type, sp(2)', () => {
    expect(codimension([mirror], kinetic)).toBe(zeroCodimensionOfPartition(1, [2]));
    expect(codimension([mirror], zero(F, 4))).toBe(zeroCodimensionOfPartition(1, [1, 1]));
  });
  it('with time reversal: class 6', () => {
    expect(codimension([time], kinetic)).toBe(zeroCodimensionOfPartition(6, [2]));
    expect(codimension([mirror, time], kinetic)).toBe(zeroCodimensionOfPartition(4, [2]));
  });
  it('where nothing is at zero the codimension is 0', () => expect(codimension([], diag(F, 1, 1, 1, 1))).toBe(0));
});

describe('a translation beside it', () => {
  it('E₀ of the slice has lost the neutral pair', () => {
    const act = action(F, canonical(F, 2), []);
    const s = mat(F, [
      [0, 0, 0, 0],
      [0, 0, 1, 0],
      [0, 1, 0, 0],
      [0, 0, 0, 1],
    ]);
    const move = { linear: sparse(zero(F, 4)), value: [F.one, F.zero, F.zero, F.zero] };
    const slice = sliceOf(act, [move]);
    const event = sliceEvent(slice, act.form, sparse(s));
    expect(event.basis.cols).toBe(2);
    expect(pieceCodimension(slicePiece(event, []), slice.field)).toBe(1);
  });
});
