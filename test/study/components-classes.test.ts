/** The ten classes by name, dimensions by table, by linear algebra and by characters, signature of ω. */
import { describe, expect, it } from 'vitest';
import { componentsOf } from '../../src/action/index.ts';
import { classAlgebra } from '../../src/event/algebra-names.ts';
import type { ClassNumber } from '../../src/event/partition-codimension.ts';
import type { SignedType } from '../../src/event/signed-partitions.ts';
import { measuredBlocks } from '../../src/study/capacity.ts';
import { actionOfModel, nilpotentModel } from '../event/normal-forms.ts';

const even = (count: number, size = 2): SignedType => ({
  parts: [{ size, count, signs: [count, 0], partnerSigns: [0, 0] }],
  signature: null,
});
const odd = (plus: number, minus: number): SignedType => ({
  parts: [{ size: 1, count: plus + minus, signs: [plus, minus], partnerSigns: null }],
  signature: [plus, minus],
});

// Hoveijn, Lamb & Roberts 2003; dimensions of the classical algebras
const CASES: readonly [ClassNumber, SignedType, string, string, number, number][] = [
  [1, even(2), 'sp(4,R)', 'sp(4,R)', 10, 10],
  [2, odd(2, 1), 'u(2,1)', 'u(2,1)', 9, 9],
  [2, odd(0, 2), 'u(2,0)', 'u(2,0)', 4, 4],
  [3, even(1), 'so*(4)', 'so*(4)', 6, 6],
  [4, even(2), 'sp(4,R)', 'gl(2,R)', 6, 4],
  [5, even(1), 'sp(4,R)', 'sp(2,C)', 4, 6],
  [6, even(1), 'u(1,1)', 'gl(1,C)', 2, 2],
  [7, odd(2, 1), 'u(2,1)', 'o(2,1)', 6, 3],
  [8, odd(1, 1), 'u(2,2)', 'sp(1,1)', 6, 10],
  [9, even(1), 'so*(4)', 'so(2,C)', 4, 2],
  [10, even(1), 'so*(4)', 'gl(1,H)', 2, 4],
];

describe('algebras of the ten classes', () => {
  it.each(CASES)('class %i', (c, type, algebra, subalgebra, dimensionOfClass, dimensionOfGroup) => {
    const act = actionOfModel(nilpotentModel(c, type));
    // throws where table, linear algebra and characters disagree
    const blocks = measuredBlocks(act, componentsOf(act));
    expect(blocks).toHaveLength(1);
    expect(blocks[0]!.capacity.classNumber).toBe(c);
    expect(blocks[0]!.algebra).toEqual({ algebra, subalgebra, dimensionOfClass, dimensionOfGroup });
    expect(blocks[0]!.components).toHaveLength([4, 6, 10].includes(c) ? 2 : 1);
  });
  it('the signature belongs to classes 2, 7, 8 alone, and fits the copies', () => {
    expect(() => classAlgebra(1, 2, [1, 1])).toThrow(RangeError);
    expect(() => classAlgebra(2, 2, null)).toThrow(RangeError);
    expect(() => classAlgebra(7, 3, [1, 1])).toThrow(RangeError);
    expect(() => classAlgebra(1, 3, null)).toThrow(RangeError);
  });
});
