/** Shortcuts for small numbers against the arithmetic of the field. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { integerCongruence } from '../../src/action/integer-form.ts';
import { multiplyNumbered, numberedMatrix, sparseOfNumbers, ValueTable } from '../../src/action/value-table.ts';
import { type Algebraic, RealField } from '../../src/field/index.ts';
import { build, dense, type Matrix, multiply, sparse, transpose } from '../../src/linear/index.ts';

const fields = [
  RealField.of(),
  RealField.of({ squareRoots: [5n] }),
  RealField.of({ cosines: [7] }),
  RealField.of({ squareRoots: [2n, 3n] }),
];

/** Matrices with many zeros; the largest coefficient decides which route is taken. */
const matrices = (rows: number, cols: number, most: bigint, denominators: bigint[]) =>
  fc.constantFrom(...fields).chain((field) =>
    fc
      .array(
        fc.oneof(
          fc.constant(field.zero),
          fc
            .tuple(
              fc.array(fc.bigInt({ min: -most, max: most }), { minLength: field.degree, maxLength: field.degree }),
              fc.constantFrom(...denominators),
            )
            .map(([c, d]) => field.element(c, d)),
        ),
        { minLength: rows * cols, maxLength: rows * cols },
      )
      .map((data) => ({ field, matrix: build<Algebraic>(field, rows, cols, (i, j) => data[i * cols + j]!) })),
  );
const keys = (field: RealField, list: readonly Algebraic[]) => list.map((x) => field.key(x));
const square = (m: Matrix<Algebraic>) => multiply(m, transpose(m));

describe('numbered values', () => {
  it('multiply square matrices as the field does, terms that cancel included', () => {
    fc.assert(
      fc.property(matrices(4, 4, 2n, [1n, 2n]), ({ field, matrix }) => {
        const values = new ValueTable(field);
        const a = numberedMatrix(sparse(matrix), values);
        const b = numberedMatrix(sparse(transpose(matrix)), values);
        expect(keys(field, dense(sparseOfNumbers(multiplyNumbered(a, b, values), values)).data)).toEqual(keys(field, square(matrix).data));
      }),
    );
  });
  it.each([3n, 2n ** 60n])('sum by place as the field does, coefficients up to %s', (most) => {
    fc.assert(
      fc.property(
        matrices(3, 3, most, [1n, 2n, 6n]),
        fc.array(fc.tuple(fc.nat(4), fc.nat(8)), { maxLength: 20 }),
        ({ field, matrix }, list) => {
          const values = new ValueTable(field);
          const sums = new Array<Algebraic>(5).fill(field.zero);
          for (const [place, k] of list) sums[place] = field.add(sums[place]!, matrix.data[k]!);
          const places = list.map(([place]) => place);
          const terms = list.map(([, k]) => values.number(matrix.data[k]!));
          expect(keys(field, values.sums(5, places, terms))).toEqual(keys(field, sums));
        },
      ),
    );
  });
});

describe('a form on the columns of a basis, in doubles', () => {
  it('is that of the field', () => {
    fc.assert(
      fc.property(matrices(4, 3, 50n, [1n]), ({ field, matrix }) => {
        const form = square(matrix);
        const found = integerCongruence(matrix, sparse(form), field);
        expect(keys(field, found ?? [])).toEqual(keys(field, multiply(transpose(matrix), multiply(form, matrix)).data));
      }),
    );
  });
  it('is left to the field where sums could pass 2^53, and where there are denominators', () => {
    const field = fields[1]!;
    const of = (x: Algebraic) => build<Algebraic>(field, 2, 2, () => x);
    const form = sparse(of(field.one));
    expect(integerCongruence(of(field.fromInteger(2n ** 26n)), form, field)).toBeUndefined();
    expect(integerCongruence(of(field.fromInteger(2n ** 200n)), form, field)).toBeUndefined();
    expect(integerCongruence(of(field.fromRational(1n, 2n)), form, field)).toBeUndefined();
    expect(integerCongruence(of(field.fromInteger(3n)), form, field)?.map((x) => x.c[0])).toEqual([36n, 36n, 36n, 36n]);
  });
});
