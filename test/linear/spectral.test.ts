import { describe, expect, it } from 'vitest';
import { InputError, ShapeError } from '../../src/errors/index.ts';
import {
  largestEntry,
  type NumberMatrix,
  numberBuild,
  numberCombine,
  numberIdentity,
  numberMatrix,
  numberMultiply,
  numberRows,
  numberTranspose,
} from '../../src/linear/index.ts';
import {
  balanced,
  generalEigenvalues,
  hamiltonianEigenvalues,
  nullSpace,
  nullSpaceOfDimension,
  rightSingular,
  svd,
  symmetricEigen,
} from '../../src/linear/spectral.ts';

const difference = (a: NumberMatrix, b: NumberMatrix) => largestEntry(numberCombine(a, b, -1));
const orthogonality = (q: NumberMatrix) => difference(numberMultiply(numberTranspose(q), q), numberIdentity(q.cols));
const waves = (rows: number, cols: number) => numberBuild(rows, cols, (i, j) => Math.sin(1 + 3 * i + 7 * j * j + i * j));
const diagonal = (values: ArrayLike<number>) => numberBuild(values.length, values.length, (i, j) => (i === j ? values[i]! : 0));

describe('symmetric eigenproblem', () => {
  it('of the second difference matrix: 2 - 2 cos(kπ/(n+1)), common knowledge', () => {
    const n = 12;
    const { values } = symmetricEigen(numberBuild(n, n, (i, j) => (i === j ? 2 : Math.abs(i - j) === 1 ? -1 : 0)).data, n);
    for (let k = 0; k < n; k++) expect(values[k]).toBeCloseTo(2 - 2 * Math.cos(((k + 1) * Math.PI) / (n + 1)), 13);
  });
  it('gives orthonormal vectors for multiple eigenvalues of a matrix symmetric only up to rounding', () => {
    const q = symmetricEigen(numberBuild(8, 8, (i, j) => Math.sin(i * j + i + j)).data, 8).vectors;
    const a = numberMultiply(q, numberMultiply(diagonal([1, 1, 1, 1, 2, 2, 2, 0]), numberTranspose(q)));
    const { values, vectors } = symmetricEigen(a.data, 8);
    expect(orthogonality(vectors)).toBeLessThan(1e-13);
    expect(difference(numberMultiply(a, vectors), numberMultiply(vectors, diagonal(values)))).toBeLessThan(1e-13);
  });
  it('answers for 0 x 0 and refuses NaN', () => {
    expect(symmetricEigen(new Float64Array(0), 0).values.length).toBe(0);
    expect(() => symmetricEigen(Float64Array.of(Number.NaN), 1)).toThrow(InputError);
  });
});

describe('singular values and null spaces', () => {
  it('of wide, tall, square, rank deficient and zero matrices', () => {
    for (const a of [
      waves(3, 7),
      waves(7, 3),
      waves(4, 4),
      numberMultiply(waves(50, 20), waves(20, 80)),
      numberMatrix(3, 3),
      numberMatrix(2, 5),
    ]) {
      const { u, values, v } = svd(a);
      expect(difference(numberMultiply(u, numberMultiply(diagonal(values), numberTranspose(v))), a)).toBeLessThan(1e-12);
      expect(orthogonality(u)).toBeLessThan(1e-13);
      expect(orthogonality(v)).toBeLessThan(1e-13);
      const right = rightSingular(a);
      expect(right.v.cols).toBe(a.cols);
      expect(orthogonality(right.v)).toBeLessThan(1e-13);
      expect([...right.values]).toEqual([...right.values].sort((x, y) => y - x));
    }
  });
  it('have the dimension that rank leaves, also for a wide matrix of rank 20 in 80 columns', () => {
    const a = numberMultiply(waves(50, 20), waves(20, 80));
    const k = nullSpace(a, 1e-10);
    expect(k.cols).toBe(60);
    expect(largestEntry(numberMultiply(a, k))).toBeLessThan(1e-12);
    expect(difference(nullSpaceOfDimension(a, 60), k)).toBe(0);
    expect(nullSpace(numberIdentity(3), 1e-3).cols).toBe(0);
    expect(nullSpace(numberMatrix(0, 3), 0).cols).toBe(3);
    expect(nullSpace(numberMatrix(3, 0), 0).cols).toBe(0);
    expect(() => nullSpaceOfDimension(a, 81)).toThrow(ShapeError);
  });
});

describe('eigenvalues of general and Hamiltonian matrices', () => {
  it("Wilkinson's companion matrix of 1, …, 20 survives balancing", () => {
    let c = [1];
    for (let k = 1; k <= 20; k++) c = Array.from({ length: c.length + 1 }, (_, i) => (c[i] ?? 0) - k * (c[i - 1] ?? 0));
    const a = numberBuild(20, 20, (i, j) => (i === 0 ? -c[j + 1]! : i === j + 1 ? 1 : 0));
    const values = generalEigenvalues(a).sort((x, y) => x.re - y.re);
    for (let k = 0; k < 8; k++) expect(Math.hypot(values[k]!.re - (k + 1), values[k]!.im)).toBeLessThan(1e-2);
  });
  it('balancing is a similarity by powers of 2', () => {
    const a = numberRows([
      [1, 1e6, 3],
      [1e-6, 2, 1e-3],
      [4, 5e3, -1],
    ]);
    const { matrix, scaling } = balanced(a);
    for (const s of scaling) expect(Number.isInteger(Math.log2(s))).toBe(true);
    for (let i = 0; i < 3; i++)
      for (let j = 0; j < 3; j++) expect(matrix.data[3 * i + j]).toBe((a.data[3 * i + j]! * scaling[j]!) / scaling[i]!);
    expect(largestEntry(matrix)).toBeLessThan(100);
  });
  it("Hill's lunar problem at L1: ±sqrt(1 + 2 sqrt 7), ±i sqrt(2 sqrt 7 - 1) (Hill 1878, from memory)", () => {
    // q1'' = 2 q2' + 9 q1, q2'' = -2 q1' - 3 q2, written in (q1, q2, p1, p2) with p1 = q1' - q2, p2 = q2' + q1
    const l = numberRows([
      [0, 1, 1, 0],
      [-1, 0, 0, 1],
      [8, 0, 0, 1],
      [0, -4, -1, 0],
    ]);
    const { values, defect } = hamiltonianEigenvalues(l);
    expect(defect).toBeLessThan(1e-12);
    const real = values.find((z) => Math.abs(z.im) < 1e-9 && z.re > 0)!;
    const imaginary = values.find((z) => Math.abs(z.re) < 1e-9 && z.im > 0)!;
    expect(real.re).toBeCloseTo(2.508286789, 8);
    expect(imaginary.im).toBeCloseTo(2.071594224, 8);
  });
  it('come in exact pairs and are not rounded', () => {
    const w = numberRows([
      [0, 0, 1, 0],
      [0, 0, 0, 1],
      [-1, 0, 0, 0],
      [0, -1, 0, 0],
    ]);
    const m = waves(4, 4);
    const { values } = hamiltonianEigenvalues(numberMultiply(w, numberCombine(m, numberTranspose(m))));
    for (let i = 0; i < 4; i += 2) {
      expect(values[i]!.re + values[i + 1]!.re).toBe(0);
      expect(values[i]!.im + values[i + 1]!.im).toBe(0);
      expect(values[i]!.im).toBeGreaterThanOrEqual(0);
    }
    expect(hamiltonianEigenvalues(numberMatrix(0, 0)).values).toEqual([]);
    expect(() => hamiltonianEigenvalues(numberMatrix(3, 3))).toThrow(ShapeError);
    expect(
      hamiltonianEigenvalues(
        numberRows([
          [0, 1],
          [1e-18, 0],
        ]),
      ).values[0]!.re,
    ).toBeCloseTo(1e-9, 12);
  });
});
