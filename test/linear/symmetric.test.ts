import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  numberBuild,
  numberMatrix,
  numberMultiply,
  numberTranspose,
  orthonormalColumns,
  pencilEigenvalues,
  symmetricEigenvalues,
} from '../../src/linear/index.ts';

const near = (a: Float64Array, b: readonly number[]) => {
  expect(a.length).toBe(b.length);
  b.forEach((x, i) => {
    expect(a[i]!).toBeCloseTo(x, 9);
  });
};

describe('eigenvalues of symmetric matrices', () => {
  it('empty and 1 × 1', () => {
    near(symmetricEigenvalues(numberMatrix(0, 0)), []);
    near(symmetricEigenvalues(numberMatrix(1, 1, [-3])), [-3]);
  });
  it('a path of n equal springs with fixed ends: 2 - 2 cos(πk/(n+1))', () => {
    for (const n of [2, 3, 10, 41])
      near(
        symmetricEigenvalues(numberBuild(n, n, (i, j) => (i === j ? 2 : Math.abs(i - j) === 1 ? -1 : 0))),
        Array.from({ length: n }, (_, k) => 2 - 2 * Math.cos((Math.PI * (k + 1)) / (n + 1))),
      );
  });
  it('a ring: eigenvalues in pairs; the complete graph: n times n - 1, and 0', () => {
    const ring = numberBuild(8, 8, (i, j) => (i === j ? 2 : (i - j + 8) % 8 === 1 || (j - i + 8) % 8 === 1 ? -1 : 0));
    near(
      symmetricEigenvalues(ring),
      [0, 1, 2, 3, 4, 5, 6, 7].map((k) => 2 - 2 * Math.cos((Math.PI * Math.ceil(k / 2)) / 4)),
    );
    near(symmetricEigenvalues(numberBuild(5, 5, (i, j) => (i === j ? 4 : -1))), [0, 5, 5, 5, 5]);
  });
  it('AAᵀ and AᵀA have the same nonzero eigenvalues; traces of powers (fast-check)', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -9, max: 9 }), { minLength: 24, maxLength: 24 }), (entries) => {
        const a = numberMatrix(4, 6, entries);
        const small = symmetricEigenvalues(numberMultiply(a, numberTranspose(a)));
        const large = symmetricEigenvalues(numberMultiply(numberTranspose(a), a));
        const scale = Math.max(1, ...small);
        const wanted = [0, 0, ...small];
        wanted.forEach((x, i) => {
          expect(Math.abs(large[i]! - x)).toBeLessThan(1e-10 * scale);
        });
        const squares = entries.reduce((s, x) => s + x * x, 0);
        expect(Math.abs(small.reduce((s, x) => s + x, 0) - squares)).toBeLessThan(1e-10 * scale);
      }),
      { numRuns: 50 },
    );
  });
  it('a pencil with masses: two masses m and 4m on springs k, ω² from the characteristic polynomial', () => {
    // K = [[2, -1], [-1, 2]], M = diag(1, 4): 4λ² - 10λ + 3 = 0
    const roots = [(10 - Math.sqrt(52)) / 8, (10 + Math.sqrt(52)) / 8];
    near(pencilEigenvalues(numberMatrix(2, 2, [2, -1, -1, 2]), numberMatrix(2, 2, [1, 0, 0, 4])), roots);
    expect(() => pencilEigenvalues(numberMatrix(1, 1, [1]), numberMatrix(1, 1, [-1]))).toThrow(RangeError);
  });
  it('orthonormal columns span the same plane', () => {
    const [a, b] = orthonormalColumns([Float64Array.of(3, 0, 4), Float64Array.of(1, 1, 0)]);
    near(a!, [0.6, 0, 0.8]);
    expect(b![0]! * 0.6 + b![2]! * 0.8).toBeCloseTo(0, 14);
    expect(b![0]! * 4 - b![2]! * 3 - (b![1]! * 4) / 1).toBeCloseTo(0, 12);
  });
});
