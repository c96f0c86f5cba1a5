/** The field axioms as one suite, called in a line for each field. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Field } from '../../src/field/index.ts';

/** `elements` makes random elements; operations must leave their arguments as they were. */
export function fieldLaws<T>(field: Field<T>, elements: fc.Arbitrary<T>, runs = 60): void {
  const same = (a: T, b: T) => expect(field.key(a)).toBe(field.key(b));
  const check = (law: (a: T, b: T, c: T) => void) =>
    fc.assert(
      fc.property(elements, elements, elements, (a, b, c) => {
        const before = [a, b, c].map((x) => field.key(x));
        law(a, b, c);
        expect([a, b, c].map((x) => field.key(x))).toEqual(before);
      }),
      { numRuns: runs, seed: 20261201 },
    );
  describe(`${field.name} is a field`, () => {
    it('addition: associative, commutative, zero, negatives', () =>
      check((a, b, c) => {
        same(field.add(field.add(a, b), c), field.add(a, field.add(b, c)));
        same(field.add(a, b), field.add(b, a));
        same(field.add(a, field.zero), a);
        same(field.add(a, field.neg(a)), field.zero);
        same(field.sub(a, b), field.add(a, field.neg(b)));
      }));
    it('multiplication: associative, commutative, one, distributive', () =>
      check((a, b, c) => {
        same(field.mul(field.mul(a, b), c), field.mul(a, field.mul(b, c)));
        same(field.mul(a, b), field.mul(b, a));
        same(field.mul(a, field.one), a);
        same(field.mul(a, field.add(b, c)), field.add(field.mul(a, b), field.mul(a, c)));
        same(field.mul(a, field.zero), field.zero);
      }));
    it('inverses and division', () =>
      check((a, b) => {
        if (field.isZero(a)) expect(() => field.inv(a)).toThrow(RangeError);
        else {
          same(field.mul(a, field.inv(a)), field.one);
          same(field.mul(field.div(b, a), a), b);
        }
      }));
    it('conjugation is an automorphism of order at most 2', () =>
      check((a, b) => {
        same(field.conj(field.conj(a)), a);
        same(field.conj(field.mul(a, b)), field.mul(field.conj(a), field.conj(b)));
        same(field.conj(field.add(a, b)), field.add(field.conj(a), field.conj(b)));
      }));
    it('equality, zero and keys agree', () =>
      check((a, b) => {
        expect(field.equal(a, b)).toBe(field.key(a) === field.key(b));
        expect(field.isZero(field.sub(a, b))).toBe(field.equal(a, b));
        expect(field.isZero(field.zero)).toBe(true);
        expect(field.isZero(field.one)).toBe(false);
      }));
    it('integers and fractions map to their values', () => {
      same(field.fromInteger(6), field.mul(field.fromInteger(2n), field.fromInteger(3)));
      same(field.fromRational(1n, 2n), field.inv(field.fromInteger(2)));
      expect(() => field.fromRational(1n, 0n)).toThrow(RangeError);
    });
  });
}
