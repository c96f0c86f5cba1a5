/** The symplectic slice as linear algebra, and the finite turns that stand for rotations. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  finiteTurn,
  flowBlocks,
  independentFields,
  makeAction,
  periodicField,
  sliceCoordinates,
  sliceFlowBlocks,
  sliceOf,
  standsFor,
} from '../../src/action/index.ts';
import type { Algebraic } from '../../src/field/index.ts';
import {
  congruence,
  dense,
  directSum,
  identity,
  inverse,
  isZeroMatrix,
  type Matrix,
  multiply,
  rank,
  sparse,
  sparseEquals,
  sparseIdentity,
  sparseMultiply,
  transpose,
} from '../../src/linear/index.ts';
import { action, canonical, diag, F, lift, mat, rotation } from '../support/actions.ts';

const vector = (...x: number[]): Algebraic[] => x.map((v) => F.fromInteger(v));
const nothing = (n: number) =>
  sparse(
    mat(
      F,
      Array.from({ length: n }, () => new Array<number>(n).fill(0)),
    ),
  );
const translation = (...x: number[]) => ({ linear: nothing(x.length), value: vector(...x) });
const skew = (m: readonly (readonly number[])[]) => sparse(lift(mat(F, m)));

describe('slice', () => {
  it('no field: all of V', () => {
    const s = sliceOf(action(F, canonical(F, 2), []), []);
    expect(s.neutral).toBe(0);
    expect(sliceCoordinates(s, identity<Algebraic>(F, 4)).cols).toBe(4);
  });

  it('random translations: dim N = dim V − dim T − dim(T ∩ T^ω), ω nondegenerate on N (fast-check)', () => {
    const entry = fc.integer({ min: -2, max: 2 });
    fc.assert(
      fc.property(fc.array(fc.array(entry, { minLength: 6, maxLength: 6 }), { maxLength: 4 }), (rows) => {
        const w = canonical(F, 3);
        const s = sliceOf(
          action(F, w, []),
          rows.map((r) => translation(...r)),
        );
        const x = sliceCoordinates(s, identity<Algebraic>(F, 6));
        const t = rows.length === 0 ? 0 : rank(mat(F, rows));
        const gram = rows.length === 0 ? 0 : rank(congruence(transpose(mat(F, rows)), w));
        expect(s.neutral).toBe(2 * t - gram);
        expect(x.cols).toBe(6 - s.neutral);
        expect(rank(congruence(x, w))).toBe(x.cols);
        expect(isZeroMatrix(multiply(transpose(s.tangent), multiply(w, x)))).toBe(true);
      }),
      { numRuns: 40 },
    );
  });

  it('the complement is invariant under a group of matrices that are not orthogonal', () => {
    // the permutation of three coordinates in the basis q1, q2 − q1, q3
    const a = mat(F, [
      [0, 0, 1],
      [1, 0, -1],
      [1, 1, 0],
    ]);
    const g = directSum(a, transpose(inverse(a)));
    const turned = multiply(transpose(g), multiply(canonical(F, 3), g));
    expect(turned.data.every((x, i) => F.equal(x, canonical(F, 3).data[i]!))).toBe(true);
    const act = action(F, canonical(F, 3), [g]);
    expect(act.group.order).toBe(3);
    const s = sliceOf(act, [translation(1, 0, 1, 0, 0, 0)]);
    expect(s.neutral).toBe(2);
    const x = sliceCoordinates(s, identity<Algebraic>(F, 6));
    expect(rank(mat(F, [...rows(x), ...rows(multiply(g, x))]))).toBe(4);
    expect(sliceFlowBlocks(s, flowBlocks(act)).reduce((n, b) => n + b.copies * b.basis.cols, 0)).toBe(4);
  });

  it('fields that vanish are kept apart, and their brackets with translations join T', () => {
    const turn = {
      linear: skew([
        [0, -1],
        [1, 0],
      ]),
      value: vector(0, 0, 0, 0),
    };
    const s = sliceOf(action(F, canonical(F, 2), []), [translation(1, 0, 0, 0), turn]);
    expect(s.tangent.cols).toBe(2);
    expect(s.isotropy).toHaveLength(1);
    expect(s.neutral).toBe(4);
  });

  it('dependent fields', () => {
    expect(independentFields(F, [translation(1, 0), translation(2, 0), translation(0, 0)])).toHaveLength(1);
  });
});

/** Columns as rows. */
function rows(m: Matrix<Algebraic>): Algebraic[][] {
  return Array.from({ length: m.cols }, (_, j) => Array.from({ length: m.rows }, (_, i) => m.data[i * m.cols + j]!));
}

describe('periodic fields and finite turns', () => {
  const weights = (...m: number[]) =>
    skew(
      Array.from({ length: 2 * m.length }, (_, i) =>
        Array.from({ length: 2 * m.length }, (_, j) => (i >> 1 !== j >> 1 ? 0 : i === j ? 0 : i < j ? -m[i >> 1]! : m[i >> 1]!)),
      ),
    );
  it.each([
    [[1], 4],
    [[1, 1], 4],
    [[1, 2], 6],
    [[2, 4], 6],
    [[0, 1], 4],
    [[1, 3], 8],
    [[2, 3], 8],
  ])('weights %j: a turn of order %i, whose power of that order is 1', (m, order) => {
    const xi = weights(...m);
    const found = periodicField(xi, F)!;
    const turn = finiteTurn(found, F)!;
    expect(turn.order).toBe(order);
    let power = sparseIdentity<Algebraic>(turn.field, xi.rows);
    for (let k = 1; k <= order; k++) {
      power = sparseMultiply(turn.matrix, power);
      expect(sparseEquals(power, sparseIdentity<Algebraic>(turn.field, xi.rows))).toBe(k === order);
    }
  });
  it('no shear, no stretch, no two rates without a common period', () => {
    const shear = sparse(
      mat(F, [
        [0, 1],
        [0, 0],
      ]),
    );
    const stretch = sparse(
      mat(F, [
        [1, 0],
        [0, -1],
      ]),
    );
    expect(periodicField(shear, F)).toBeUndefined();
    expect(periodicField(stretch, F)).toBeUndefined();
    expect(periodicField(nothing(2), F)).toBeUndefined();
    const two = mat(F, [
      [0, -1, 0, 0],
      [1, 0, 0, 0],
      [0, 0, 0, F.neg(F.sqrt({ n: 2n, d: 1n })!)],
      [0, 0, F.sqrt({ n: 2n, d: 1n })!, 0],
    ]);
    expect(periodicField(sparse(two), F)).toBeUndefined();
  });
  it('a quarter turn stands for the circle on a vector, a half turn does not; nor a quarter turn for weight 2', () => {
    const w = sparse(canonical(F, 2));
    const xi = weights(1);
    const quarter = makeAction(F, w, [{ name: 'r', matrix: sparse(lift(rotation(F, 1, 4))) }]);
    const half = makeAction(F, w, [{ name: 'r', matrix: sparse(diag(F, -1, -1, -1, -1)) }]);
    expect(standsFor(quarter, [xi])).toBe(true);
    expect(standsFor(half, [xi])).toBe(false);
    const double = sparse(lift(rotation(F, 1, 2)));
    expect(standsFor(makeAction(F, w, [{ name: 'r', matrix: double }]), [weights(2)])).toBe(false);
    expect(dense(xi).rows).toBe(4);
  });
});
