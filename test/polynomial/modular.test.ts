import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { primeCongruentToOne, RealField, rational, rationals } from '../../src/field/index.ts';
import { build, kernel, rank } from '../../src/linear/index.ts';
import {
  echelonModular,
  kernelModular,
  rankLowerBound,
  rankModular,
  reconstructRational,
  reconstructSmall,
  reconstructVector,
  reduceMatrix,
} from '../../src/polynomial/index.ts';

const field = RealField.of({ squareRoots: [3n] });
const shape = fc.tuple(
  fc.integer({ min: 0, max: 5 }),
  fc.integer({ min: 0, max: 5 }),
  fc.array(fc.integer({ min: -2, max: 2 }), { minLength: 25, maxLength: 25 }),
);
const exact = shape.map(([r, c, list]) =>
  build(field, r, c, (i, j) => {
    const x = list[i * 5 + j]!;
    return x === 2 ? field.sqrt(rational(3n))! : field.fromInteger(x);
  }),
);

describe('modular linear algebra', () => {
  it('rank and kernel agree with the exact ones, also for empty matrices', () => {
    fc.assert(
      fc.property(exact, (a) => {
        const reduction = field.reduction();
        const m = reduceMatrix(a, reduction);
        expect(rankModular(m)).toBe(rank(a));
        expect(rankLowerBound(a)).toBe(rank(a));
        expect(echelonModular(m).pivots.length).toBe(rank(a));
        const k = kernelModular(m);
        const exactKernel = kernel(a);
        expect(k.matrix.rows).toBe(exactKernel.cols);
        const columns = reduceMatrix(exactKernel, reduction);
        for (let i = 0; i < k.matrix.rows; i++)
          for (let j = 0; j < a.cols; j++) expect(k.matrix.data[i * a.cols + j]).toBe(columns.data[j * exactKernel.cols + i]);
      }),
      { numRuns: 80 },
    );
  });
  it('fractions come back from their images, by one prime and by two', () => {
    const [p, q] = [primeCongruentToOne(4, 0), primeCongruentToOne(4, 1)];
    fc.assert(
      fc.property(fc.bigInt({ min: -30000n, max: 30000n }), fc.bigInt({ min: 1n, max: 30000n }), (n, d) => {
        const r = rational(n, d);
        const image = (m: number) => {
          const b = BigInt(m);
          let inverse = 1n;
          for (let e = b - 2n, base = ((r.d % b) + b) % b; e > 0n; e >>= 1n, base = (base * base) % b)
            if (e & 1n) inverse = (inverse * base) % b;
          return Number((((r.n * inverse) % b) + b) % b);
        };
        expect(reconstructRational(BigInt(image(p)), BigInt(p))).toEqual(r);
        expect(reconstructSmall(image(p), p)).toEqual({ n: Number(r.n), d: Number(r.d) });
        expect(
          reconstructVector([
            { p, values: Int32Array.of(image(p)) },
            { p: q, values: Int32Array.of(image(q)) },
          ]),
        ).toEqual([r]);
      }),
      { numRuns: 100 },
    );
    expect(reconstructVector([])).toBeUndefined();
    expect(rationals.key(reconstructRational(0n, 7n)!)).toBe('0');
  });
});
