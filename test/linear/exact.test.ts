/** Exact matrices: shapes, elimination, inertia, sparse and modular routines, with the empty cases. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Algebraic, type Field, PrimeField, RealField } from '../../src/field/index.ts';
import {
  add,
  apply,
  beside,
  build,
  complement,
  congruence,
  dense,
  determinant,
  directSum,
  equals,
  fromRows,
  identity,
  image,
  inertia,
  intersection,
  inverse,
  isZeroMatrix,
  kernel,
  type Matrix,
  modularKernel,
  modularMultiply,
  modularRank,
  multiply,
  rank,
  solve,
  sparse,
  sparseApply,
  sparseCongruence,
  sparseMultiply,
  sparseTimes,
  sparseTrace,
  sparseTranspose,
  trace,
  transpose,
  zeroMatrix,
} from '../../src/linear/index.ts';

const Q = RealField.of();
const K = RealField.of({ squareRoots: [5n] });
const entry = (f: RealField) =>
  fc.tuple(...Array.from({ length: f.degree }, () => fc.integer({ min: -3, max: 3 }))).map((c) => f.element(c.map(BigInt), 1n));
const matrices = (f: RealField, rows: fc.Arbitrary<number>, cols: fc.Arbitrary<number>): fc.Arbitrary<Matrix<Algebraic>> =>
  fc
    .tuple(rows, cols)
    .chain(([r, c]) =>
      fc.array(entry(f), { minLength: r * c, maxLength: r * c }).map((data) => ({ field: f as Field<Algebraic>, rows: r, cols: c, data })),
    );
const size = fc.integer({ min: 0, max: 5 });
const run = { numRuns: 60, seed: 20261201 };

for (const f of [Q, K])
  describe(`elimination over ${f.name}`, () => {
    it('rank plus nullity is the number of columns; the kernel is killed; the image spans', () =>
      fc.assert(
        fc.property(matrices(f, size, size), (a) => {
          const k = kernel(a);
          expect(rank(a) + k.cols).toBe(a.cols);
          expect(k.rows).toBe(a.cols);
          expect(isZeroMatrix(multiply(a, k))).toBe(true);
          expect(image(a).cols).toBe(rank(a));
          expect(rank(transpose(a))).toBe(rank(a));
          expect(complement(image(a)).cols).toBe(a.rows - rank(a));
          expect(rank(beside(image(a), complement(image(a))))).toBe(a.rows);
        }),
        run,
      ));
    it('solutions solve; there is one exactly when the rank does not grow', () =>
      fc.assert(
        fc.property(matrices(f, fc.constant(4), size), matrices(f, fc.constant(4), fc.constant(2)), (a, b) => {
          const x = solve(a, b);
          expect(x !== undefined).toBe(rank(beside(a, b)) === rank(a));
          if (x !== undefined) expect(equals(multiply(a, x), b)).toBe(true);
        }),
        run,
      ));
    it('determinants multiply, vanish exactly for singular matrices, and inverses invert', () =>
      fc.assert(
        fc.property(matrices(f, fc.constant(3), fc.constant(3)), matrices(f, fc.constant(3), fc.constant(3)), (a, b) => {
          expect(f.equal(determinant(multiply(a, b)), f.mul(determinant(a), determinant(b)))).toBe(true);
          if (f.isZero(determinant(a))) expect(() => inverse(a)).toThrow(RangeError);
          else expect(equals(multiply(a, inverse(a)), identity<Algebraic>(f, 3))).toBe(true);
        }),
        run,
      ));
    it('the intersection of two spaces has the dimension that the formula says', () =>
      fc.assert(
        fc.property(
          matrices(f, fc.constant(4), fc.integer({ min: 0, max: 3 })),
          matrices(f, fc.constant(4), fc.integer({ min: 0, max: 3 })),
          (a, b) => {
            const [u, v] = [image(a), image(b)];
            expect(intersection(u, v).cols).toBe(u.cols + v.cols - rank(beside(u, v)));
          },
        ),
        run,
      ));
    it('inertia is invariant under congruence (Sylvester 1852) and agrees with the rank', () =>
      fc.assert(
        fc.property(matrices(f, fc.constant(4), fc.constant(4)), matrices(f, fc.constant(4), fc.constant(4)), (a, t) => {
          const s = add(a, transpose(a));
          const i = inertia(s, f);
          expect(i.positive + i.negative).toBe(rank(s));
          expect(i.positive + i.negative + i.zero).toBe(4);
          if (rank(t) === 4) expect(inertia(congruence(t, s), f)).toEqual(i);
        }),
        run,
      ));
  });

describe('shapes', () => {
  it('empty matrices have rank 0, determinant 1 and a whole kernel', () => {
    const e = zeroMatrix<Algebraic>(Q, 0, 3);
    expect(rank(e)).toBe(0);
    expect(kernel(e).cols).toBe(3);
    expect(determinant(zeroMatrix<Algebraic>(Q, 0, 0))).toEqual(Q.one);
    expect(multiply(zeroMatrix<Algebraic>(Q, 2, 0), zeroMatrix<Algebraic>(Q, 0, 3)).data.every((x) => Q.isZero(x))).toBe(true);
    expect(inertia(zeroMatrix<Algebraic>(Q, 0, 0), Q)).toEqual({ positive: 0, zero: 0, negative: 0 });
    expect(inverse(zeroMatrix<Algebraic>(Q, 0, 0)).rows).toBe(0);
  });
  it('a hyperbolic plane has one positive and one negative square', () => {
    const h = fromRows(Q, [
      [Q.zero, Q.one],
      [Q.one, Q.zero],
    ]);
    expect(inertia(h, Q)).toEqual({ positive: 1, zero: 0, negative: 1 });
    expect(inertia(directSum(h, zeroMatrix<Algebraic>(Q, 2, 2)), Q)).toEqual({ positive: 1, zero: 2, negative: 1 });
  });
  it('sizes that do not fit are refused', () => {
    expect(() => multiply(identity<Algebraic>(Q, 2), identity<Algebraic>(Q, 3))).toThrow(/2 x 2 times 3 x 3/);
    expect(() => add(identity<Algebraic>(Q, 2), identity<Algebraic>(Q, 3))).toThrow(/2 x 2 against 3 x 3/);
  });
});

describe('sparse and modular routines agree with dense exact ones', () => {
  it('products, transposes, traces, congruences', () =>
    fc.assert(
      fc.property(matrices(Q, fc.constant(4), fc.constant(4)), matrices(Q, fc.constant(4), fc.constant(4)), (a, b) => {
        const [x, y] = [sparse(a), sparse(b)];
        expect(equals(dense(sparseMultiply(x, y)), multiply(a, b))).toBe(true);
        expect(equals(dense(sparseTranspose(x)), transpose(a))).toBe(true);
        expect(equals(sparseTimes(x, b), multiply(a, b))).toBe(true);
        expect(equals(dense(sparseCongruence(x, y)), congruence(a, b))).toBe(true);
        expect(Q.equal(sparseTrace(x), trace(a))).toBe(true);
        const v = b.data.slice(0, 4);
        expect(sparseApply(x, v).map((c) => Q.key(c))).toEqual(apply(a, v).map((c) => Q.key(c)));
      }),
      run,
    ));
  it('rank and kernel modulo a prime', () =>
    fc.assert(
      fc.property(matrices(Q, size, size), (a) => {
        const p = 2147483629;
        const field = new PrimeField(p);
        const m = { p, rows: a.rows, cols: a.cols, data: Int32Array.from(a.data, (x) => field.fromRational(x.c[0]!, x.d)) };
        expect(modularRank(m)).toBe(rank(build(Q, a.rows, a.cols, (i, j) => a.data[i * a.cols + j]!)));
        const k = modularKernel(m);
        expect(k.rows).toBe(a.cols - modularRank(m));
        const product = modularMultiply(m, {
          p,
          rows: a.cols,
          cols: k.rows,
          data: Int32Array.from(
            { length: a.cols * k.rows },
            (_, t) => k.data[(t % Math.max(1, k.rows)) * a.cols + Math.floor(t / Math.max(1, k.rows))]!,
          ),
        });
        expect(product.data.every((x) => x === 0)).toBe(true);
      }),
      run,
    ));
});
