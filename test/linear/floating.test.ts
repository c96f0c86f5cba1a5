import { describe, expect, it } from 'vitest';
import { InputError, ShapeError } from '../../src/errors/index.ts';
import { rationals } from '../../src/field/index.ts';
import {
  fromRows,
  householderQr,
  largestEntry,
  type NumberMatrix,
  numberBuild,
  numberCombine,
  numberCongruence,
  numberIdentity,
  numberMatrix,
  numberMultiply,
  numberRows,
  numberSolve,
  numberTranspose,
  orthonormalise,
  requireFinite,
  symmetricPart,
  toNumberMatrix,
} from '../../src/linear/index.ts';

const difference = (a: NumberMatrix, b: NumberMatrix) => largestEntry(numberCombine(a, b, -1));
const waves = (rows: number, cols: number) => numberBuild(rows, cols, (i, j) => Math.sin(1 + 3 * i + 7 * j * j + i * j));

describe('matrices of doubles', () => {
  it('are immutable under every operation', () => {
    const a = waves(4, 4);
    const before = a.data.slice();
    numberSolve(a, a);
    householderQr(a);
    symmetricPart(a);
    numberTranspose(a);
    expect(a.data).toEqual(before);
  });
  it('exist with no rows or no columns', () => {
    expect(numberMultiply(numberMatrix(2, 0), numberMatrix(0, 3)).data).toEqual(new Float64Array(6));
    expect(orthonormalise(numberMatrix(3, 0)).cols).toBe(0);
    expect(numberSolve(numberMatrix(0, 0), numberMatrix(0, 2)).cols).toBe(2);
    expect(largestEntry(numberMatrix(0, 5))).toBe(0);
  });
  it('satisfy (ab)ᵀ = bᵀaᵀ and the definition of the congruence', () => {
    const a = waves(3, 5);
    const b = waves(5, 2);
    expect(difference(numberTranspose(numberMultiply(a, b)), numberMultiply(numberTranspose(b), numberTranspose(a)))).toBeLessThan(1e-14);
    expect(difference(numberCongruence(b, waves(5, 5), b), numberMultiply(numberTranspose(b), numberMultiply(waves(5, 5), b)))).toBe(0);
  });
  it('factor as q r, Householder 1958: q orthogonal, r triangular, tall, wide and rank deficient', () => {
    for (const a of [
      waves(5, 3),
      waves(3, 5),
      waves(1, 1),
      numberRows([
        [0, 0],
        [0, 0],
      ]),
      numberMultiply(waves(5, 2), waves(2, 4)),
    ]) {
      const { q, r } = householderQr(a);
      expect(difference(numberMultiply(q, r), a)).toBeLessThan(1e-13);
      expect(difference(numberMultiply(numberTranspose(q), q), numberIdentity(a.rows))).toBeLessThan(1e-14);
      for (let i = 0; i < a.rows; i++) for (let j = 0; j < Math.min(i, a.cols); j++) expect(r.data[i * a.cols + j]).toBe(0);
    }
  });
  it('keep the span when orthonormalised', () => {
    const a = waves(6, 3);
    const q = orthonormalise(a);
    expect(difference(numberMultiply(q, numberMultiply(numberTranspose(q), a)), a)).toBeLessThan(1e-14);
    expect(() => orthonormalise(waves(2, 3))).toThrow(ShapeError);
  });
  it('solve with a zero in the first pivot position', () => {
    const a = numberRows([
      [0, 2, 1],
      [1, 0, 0],
      [3, 0, 1],
    ]);
    const x = numberRows([
      [1, 2],
      [3, 4],
      [5, 6],
    ]);
    expect(difference(numberSolve(a, numberMultiply(a, x)), x)).toBeLessThan(1e-14);
    expect(() =>
      numberSolve(
        numberRows([
          [1, 2],
          [2, 4],
        ]),
        numberRows([[1], [1]]),
      ),
    ).toThrow(RangeError);
  });
  it('come from exact matrices as nearest doubles', () => {
    expect([...toNumberMatrix(fromRows(rationals, [[rationals.fromRational(1n, 3n), rationals.fromInteger(-2)]]), rationals).data]).toEqual(
      [1 / 3, -2],
    );
  });
  it('name the entry that is not finite', () => {
    expect(() =>
      requireFinite(
        numberRows([
          [1, 2],
          [3, Number.NaN],
        ]),
        'Hessian',
      ),
    ).toThrow(InputError);
    try {
      requireFinite(
        numberRows([
          [1, 2],
          [Infinity, 0],
        ]),
        'Hessian',
      );
      expect.unreachable();
    } catch (e) {
      expect((e as InputError).culprit.key).toBe('Hessian[2][1]');
    }
  });
  it('refuse wrong shapes', () => {
    expect(() => numberMatrix(2, 2, [1, 2, 3])).toThrow(ShapeError);
    expect(() => numberMultiply(waves(2, 3), waves(2, 3))).toThrow(ShapeError);
    expect(() => symmetricPart(waves(2, 3))).toThrow(ShapeError);
  });
});
