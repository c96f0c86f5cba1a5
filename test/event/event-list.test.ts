/** The list of zero events: counts of nilpotent orbits, explicit normal forms in all ten classes, lists without symmetry. */
import { describe, expect, it } from 'vitest';
import { flowBlocks, symplecticPart } from '../../src/action/index.ts';
import { LimitError } from '../../src/errors/index.ts';
import { simpleCollisions } from '../../src/event/collision-list.ts';
import { type BlockCapacity, blockEvents, inertiaOfBlock, zeroEvents } from '../../src/event/event-list.ts';
import { type ClassNumber, codimensionByClass, collisionCodimension } from '../../src/event/partition-codimension.ts';
import { type SignedType, signedPartitions } from '../../src/event/signed-partitions.ts';
import { inertia } from '../../src/linear/index.ts';
import { eventOf } from '../support/actions.ts';
import { actionOfModel, F, hessianOf, MODELS, nilpotentModel } from './normal-forms.ts';

const capacity = (classNumber: ClassNumber, copies: number, signature: [number, number] | null = null): BlockCapacity => ({
  classNumber,
  copies,
  signature,
  dimension: MODELS[classNumber].generators[0]?.matrix.rows ?? 1,
  labels: [4, 6, 10].includes(classNumber) ? ['K', 'L'] : ['K'],
});

const text = (b: readonly BlockCapacity[], limit: number) => zeroEvents(b, limit).map((e) => `${e.codimension}: ${e.signs}`);

describe('without symmetry (D. M. Galin, Versal deformations of linear Hamiltonian systems, 1975/1982)', () => {
  it('codimension 1: 0² of both signs; codimension 2: 0⁴ of both signs', () => {
    expect(text([capacity(1, 4)], 2)).toEqual(['1: [2]+', '1: [2]-', '2: [4]+', '2: [4]-']);
  });
  it('codimension 3: 0,0 and 0⁶', () => {
    expect(text([capacity(1, 6)], 3).slice(4)).toEqual(['3: [1] [1]', '3: [6]+', '3: [6]-']);
  });
  it('an event must fit: one degree of freedom', () => {
    expect(text([capacity(1, 2)], 3)).toEqual(['1: [2]+', '1: [2]-', '3: [1] [1]']);
  });
  it('collisions of codimension 1: (±iω)² and (±a)²', () => {
    expect(simpleCollisions([capacity(1, 4)]).map((c) => `${c.kind} ${c.blocks} ${c.motion}`)).toEqual([
      'imaginary 2 splits',
      'real 2 splits',
    ]);
    expect(simpleCollisions([capacity(1, 2)])).toEqual([]);
  });
  it('the inertia of S on blocks [2], [4], [6], [3] (inertia of the normal forms)', () => {
    expect(inertiaOfBlock(2, 1)).toEqual({ positive: 1, zero: 1, negative: 0 });
    expect(inertiaOfBlock(4, 1)).toEqual({ positive: 1, zero: 1, negative: 2 });
    expect(inertiaOfBlock(4, -1)).toEqual({ positive: 2, zero: 1, negative: 1 });
    expect(inertiaOfBlock(6, 1)).toEqual({ positive: 3, zero: 1, negative: 2 });
    expect(inertiaOfBlock(3, 0)).toEqual({ positive: 1, zero: 1, negative: 1 });
  });
});

// D. Collingwood, W. McGovern, Nilpotent Orbits in Semisimple Lie Algebras (1993), theorems 9.3.3 to 9.3.5 (place from memory)
describe('counts of nilpotent orbits that fill the multiplicity space, zero included', () => {
  it.each([
    [2, 3],
    [4, 8],
    [6, 19],
    [8, 41],
  ])('sp(%i, R): %i', (n, count) => {
    expect(signedPartitions(1, n)).toHaveLength(count);
  });
  it.each([
    [1, 0, 1],
    [1, 1, 3],
    [2, 1, 4],
    [2, 2, 10],
    [3, 1, 4],
    [3, 2, 13],
    [3, 3, 27],
  ])('u(%i, %i): %i', (a, b, count) => {
    expect(signedPartitions(2, { a, b })).toHaveLength(count);
  });
  it.each([
    [1, 1],
    [2, 3],
    [3, 4],
    [4, 9],
  ])('so*(2 · %i): %i', (m, count) => {
    expect(signedPartitions(3, m)).toHaveLength(count);
  });
  it.each([
    [1, 6],
    [2, 4],
    [3, 4],
  ] as const)('class %i: a list without bound holds each orbit of each smaller space once', (c, n) => {
    const b = capacity(c, n, c === 2 ? [2, 2] : null);
    const all = blockEvents(b, 1000);
    let expected = 0;
    for (let k = 1; k <= n; k++) {
      if (c !== 2) expected += signedPartitions(c, k).length;
      else for (let a = 0; a <= k; a++) if (a <= 2 && k - a <= 2) expected += signedPartitions(2, { a, b: k - a }).length;
    }
    expect(all).toHaveLength(expected);
  });
});

/** All types up to a number of copies. */
function types(c: ClassNumber, copies: number): SignedType[] {
  const out: SignedType[] = [];
  for (let n = 1; n <= copies; n++) {
    if (c === 2 || c === 7 || c === 8) for (let a = 0; a <= n; a++) out.push(...signedPartitions(c, { a, b: n - a }));
    else out.push(...signedPartitions(c, n));
  }
  return out;
}

describe('explicit normal forms in the ten classes: rank of the adjoint map, Jordan blocks, signs, inertia', () => {
  const COPIES: Readonly<Record<ClassNumber, number>> = { 1: 4, 2: 2, 3: 2, 4: 2, 5: 4, 6: 1, 7: 3, 8: 2, 9: 2, 10: 1 };
  for (const key of Object.keys(MODELS)) {
    const c = Number(key) as ClassNumber;
    it(`class ${c}`, { timeout: 20_000 }, () => {
      const dimension = capacity(c, 0).dimension;
      for (const type of types(c, COPIES[c])) {
        const name = JSON.stringify(type.parts);
        const model = nilpotentModel(c, type);
        const s = hessianOf(model);
        const act = actionOfModel(model);
        const event = eventOf(act, s);
        const block = event.blocks[0]!;
        expect(event.blocks, name).toHaveLength(1);
        expect(block.block.symmetryClass, name).toBe(c);
        expect(block.rank.codimension, name).toBe(codimensionByClass(c, type.parts));
        const copies = type.parts.reduce((n, p) => n + p.size * p.count, 0) / ([4, 6, 10].includes(c) ? 2 : 1);
        const listed = zeroEvents([capacity(c, copies, type.signature === null ? null : [...type.signature])], block.formula).find(
          (e) => JSON.stringify(e.parts[0]!.type) === JSON.stringify(type),
        )!;
        expect(listed, name).toBeDefined();
        expect(listed.codimension, name).toBe(block.rank.codimension);
        expect(listed.blocks, name).toEqual(event.sizes);
        expect(listed.kernel, name).toBe(event.kernel);
        expect(listed.dimension, name).toBe(event.dimension);
        expect(listed.semisimple, name).toBe(event.semisimple);
        expect(listed.inertia, name).toEqual(inertia(s, F));
        for (const part of type.parts) {
          if (part.size % 2 === 1) continue;
          const found = block.signed.find((x) => x.size === part.size)!;
          const copiesOfChi = (found.count * block.block.copies) / (part.count * dimension);
          expect(copiesOfChi, name).toBe(1);
          const plus = part.signs![0] + (part.partnerSigns?.[0] ?? 0);
          expect((found.positive * block.block.copies) / dimension, name).toBe(plus);
        }
      }
    });
  }
});

describe('several blocks', () => {
  it('codimensions add, one entry per choice', () => {
    const a: BlockCapacity = { ...capacity(1, 2), labels: ['A'] };
    const e: BlockCapacity = { ...capacity(1, 2), labels: ['E'], dimension: 2 };
    const list = zeroEvents([a, e], 2);
    expect(list.map((x) => x.signs)).toEqual([
      '[2]+',
      '[2]-',
      '[2]+',
      '[2]-',
      'A: [2]+; E: [2]+',
      'A: [2]+; E: [2]-',
      'A: [2]-; E: [2]+',
      'A: [2]-; E: [2]-',
    ]);
    expect(list.at(-1)).toMatchObject({ codimension: 2, components: ['A', 'E'], kernel: 3, dimension: 6, blocks: [2, 2, 2] });
    expect(simpleCollisions([a, e]).map((x) => [x.kind, x.components, x.blocks, x.motion])).toEqual([
      ['imaginary', ['A', 'E'], [1, 1, 1], 'passes'],
      ['real', ['A', 'E'], [1, 1, 1], 'passes'],
    ]);
  });
  it('classes 4, 6, 10: the kernel is K or K⊗σ', () => {
    const list = zeroEvents([capacity(4, 2)], 3);
    expect(list.filter((x) => x.codimension === 1).map((x) => x.components)).toEqual([['K'], ['K'], ['L'], ['L']]);
    expect(list.find((x) => x.signs === '[1] [1]')).toMatchObject({ codimension: 2, components: ['K', 'L'] });
    expect(list.map((x) => x.signs)).toContain('K: [2]+; L: [2]-');
  });
  it('nothing without blocks or without codimension', () => {
    expect(zeroEvents([], 3)).toEqual([]);
    expect(zeroEvents([capacity(1, 2)], 0)).toEqual([]);
    expect(simpleCollisions([])).toEqual([]);
  });
  it('a list that would be too long is refused', () => {
    const many = Array.from({ length: 12 }, (_, i): BlockCapacity => ({ ...capacity(4, 6), labels: [`A${i}`, `B${i}`] }));
    expect(() => zeroEvents(many, 4)).toThrow(LimitError);
    expect(() => zeroEvents([capacity(1, 200)], 60)).toThrow(LimitError);
  });
});

describe('collisions by class (Dellnitz, Melbourne & Marsden 1992; Melbourne & Dellnitz 1993)', () => {
  const words = (b: BlockCapacity) => simpleCollisions([b]).map((x) => `${x.kind} ${x.motion}`);
  it('real and quaternionic type: opposite signatures split; equal ones do not meet', () => {
    expect(words(capacity(1, 4))).toEqual(['imaginary splits', 'real splits']);
    expect(words(capacity(3, 2))).toEqual(['imaginary splits']);
  });
  it('complex type: V with V splits where ω is indefinite, V with its conjugate passes', () => {
    expect(words(capacity(2, 2, [1, 1]))).toEqual(['imaginary splits', 'imaginary passes', 'real passes']);
    expect(words(capacity(2, 2, [2, 0]))).toEqual(['imaginary passes']);
    expect(words(capacity(2, 1, [1, 0]))).toEqual([]);
  });
  it('the least real pair costs nothing in classes 1, 4, 5, 6, 10, one in 2, 7, 8, two in 9, three in 3', () => {
    const cost = (c: ClassNumber, parts: number[]) => collisionCodimension('real', [{ classNumber: c, partition: parts }]);
    expect([cost(1, [1]), cost(4, [1]), cost(5, [1, 1]), cost(6, [1]), cost(10, [1, 1])]).toEqual([0, 0, 0, 0, 0]);
    expect([cost(2, [1]), cost(7, [1]), cost(8, [1, 1]), cost(9, [1, 1]), cost(3, [1, 1])]).toEqual([1, 1, 1, 2, 3]);
    for (const [c, copies] of [
      [2, 2],
      [7, 2],
      [8, 2],
    ] as const)
      expect(words(capacity(c, copies, [1, 1]))).toContain('real passes');
  });
});

it('the models belong to their classes, each with one irreducible', () => {
  for (const key of Object.keys(MODELS)) {
    const c = Number(key) as ClassNumber;
    const act = actionOfModel(nilpotentModel(c, types(c, 2).at(-1)!));
    expect(flowBlocks(act, symplecticPart(act)).map((b) => b.symmetryClass)).toEqual([c]);
  }
});
