/** Zero events of small actions against published and hand-checked values. */
import { describe, expect, it } from 'vitest';
import { flowBlocks } from '../../src/action/index.ts';
import { motionOf } from '../../src/event/zero-event.ts';
import type { Algebraic } from '../../src/field/index.ts';
import type { Matrix } from '../../src/linear/index.ts';
import { action, big, blocks, canonical, diag, eventOf, F, kron, lift, mat, quaternion, rotation, zero } from '../support/actions.ts';

const c3 = rotation(F, 1, 3);
const mirror = diag(F, 1, -1);
const time = (n: number) => diag(F, ...new Array<number>(n).fill(1), ...new Array<number>(n).fill(-1));
const kinetic = (n: number) => diag(F, ...new Array<number>(n).fill(0), ...new Array<number>(n).fill(1));
const q = quaternion(F);

interface Case {
  readonly name: string;
  readonly form: Matrix<Algebraic>;
  readonly generators: readonly Matrix<Algebraic>[];
  readonly s: Matrix<Algebraic>;
  readonly sizes: readonly number[];
  readonly inClass: number;
  readonly without: number;
}

// Golubitsky & Stewart 1987 (theorem 3.3), Dellnitz, Melbourne & Marsden 1992; numbers recomputed by rank of the adjoint map.
const cases: Case[] = [
  { name: 'no symmetry, S = 0 on R²', form: canonical(F, 1), generators: [], s: zero(F, 2), sizes: [1, 1], inClass: 3, without: 3 },
  { name: 'no symmetry, p² only', form: canonical(F, 1), generators: [], s: kinetic(1), sizes: [2], inClass: 1, without: 1 },
  ...[3, 4, 5, 6].map((n) => ({
    name: `C${n} rotating (q, p)`,
    form: canonical(big, 1),
    generators: [rotation(big, 1, n)],
    s: zero(big, 2),
    sizes: [1, 1],
    inClass: 1,
    without: 3,
  })),
  { name: 'C2 = −1 on (q, p)', form: canonical(F, 1), generators: [diag(F, -1, -1)], s: zero(F, 2), sizes: [1, 1], inClass: 3, without: 3 },
  {
    name: 'C3 rotating (q, p), reversing mirror',
    form: canonical(F, 1),
    generators: [c3, mirror],
    s: zero(F, 2),
    sizes: [1, 1],
    inClass: 1,
    without: 3,
  },
  {
    name: 'D3 cotangent, p² only',
    form: canonical(F, 2),
    generators: [lift(c3), lift(mirror)],
    s: kinetic(2),
    sizes: [2, 2],
    inClass: 1,
    without: 4,
  },
  { name: 'C3 cotangent, p² only', form: canonical(F, 2), generators: [lift(c3)], s: kinetic(2), sizes: [2, 2], inClass: 2, without: 4 },
  {
    name: 'C3 cotangent with time reversal',
    form: canonical(F, 2),
    generators: [lift(c3), time(2)],
    s: kinetic(2),
    sizes: [2, 2],
    inClass: 1,
    without: 4,
  },
  {
    name: 'D3 cotangent, S = 0',
    form: canonical(F, 2),
    generators: [lift(c3), lift(mirror)],
    s: zero(F, 4),
    sizes: [1, 1, 1, 1],
    inClass: 3,
    without: 10,
  },
  { name: 'Q8 on R⁴', form: q.ri, generators: [q.li, q.lj], s: zero(F, 4), sizes: [1, 1, 1, 1], inClass: 1, without: 10 },
  {
    name: 'Q8 cotangent on R⁸ with time reversal',
    form: canonical(F, 4),
    generators: [lift(q.li), lift(q.lj), time(4)],
    s: kinetic(4),
    sizes: [2, 2, 2, 2],
    inClass: 1,
    without: 16,
  },
  {
    name: 'Q8 cotangent on R⁸ without time reversal',
    form: canonical(F, 4),
    generators: [lift(q.li), lift(q.lj)],
    s: kinetic(4),
    sizes: [2, 2, 2, 2],
    inClass: 4,
    without: 16,
  },
];

describe('worked zero events (Golubitsky & Stewart 1987; Dellnitz, Melbourne & Marsden 1992)', () => {
  for (const c of cases)
    it(c.name, () => {
      const event = eventOf(action(c.s.field as typeof F, c.form, c.generators), c.s);
      expect(event.sizes).toEqual(c.sizes);
      expect(event.codimension).toBe(c.inClass);
      expect(event.codimensionWithoutSymmetry).toBe(c.without);
      expect(event.dimension).toBe(c.sizes.reduce((a, b) => a + b, 0));
    });
  it('passes where semisimple, splits where nilpotent, degenerate otherwise', () => {
    expect(motionOf(1, true)).toBe('passes');
    expect(motionOf(1, false)).toBe('splits');
    expect(motionOf(3, true)).toBe('degenerate');
  });
  it('a nonsingular Hessian has no zero event', () => {
    const event = eventOf(action(F, canonical(F, 2), [lift(c3)]), diag(F, 1, 1, 1, 1));
    expect([event.dimension, event.kernel, event.codimension, event.codimensionWithoutSymmetry]).toEqual([0, 0, 0, 0]);
  });
});

describe('the ten symmetry classes (von Neumann algebras of commuting maps; realisations recomputed by hand)', () => {
  const r90 = rotation(F, 1, 4);
  const c6 = rotation(F, 1, 6);
  const swap = mat(F, [
    [0, 0, -1, 0],
    [0, 0, 0, 1],
    [1, 0, 0, 0],
    [0, -1, 0, 0],
  ]);
  const j2 = canonical(F, 1);
  const realisations: Array<{ number: number; form: Matrix<Algebraic>; generators: Matrix<Algebraic>[] }> = [
    { number: 1, form: canonical(F, 1), generators: [] },
    { number: 1, form: canonical(F, 2), generators: [lift(c3), lift(mirror)] },
    { number: 2, form: canonical(F, 1), generators: [c3] },
    { number: 3, form: q.ri, generators: [q.li, q.lj] },
    { number: 4, form: canonical(F, 1), generators: [diag(F, 1, -1)] },
    { number: 5, form: canonical(F, 2), generators: [blocks(r90, diag(F, -1, -1, -1, -1).rows === 4 ? rotation(F, 3, 4) : r90)] },
    { number: 6, form: canonical(F, 2), generators: [lift(c3), time(2)] },
    { number: 7, form: canonical(F, 1), generators: [c3, mirror] },
    { number: 8, form: blocks(j2, j2), generators: [blocks(c6, c6), swap] },
    { number: 9, form: q.ri, generators: [q.li, q.lj, q.rj] },
    { number: 10, form: canonical(F, 4), generators: [lift(q.li), lift(q.lj), time(4)] },
  ];
  for (const { number, form, generators } of realisations)
    it(`class ${number} on R^${form.rows}, multiplicities 1, 2 and 3: dim P and dim g0 by formula and by rank`, () => {
      for (const copies of [1, 2, 3]) {
        const unit = diag(F, ...new Array<number>(copies).fill(1));
        const act = action(
          F,
          kron(unit, form),
          generators.map((g) => kron(unit, g)),
        );
        const flow = flowBlocks(act);
        expect(flow.map((b) => b.symmetryClass)).toEqual([number]);
        const event = eventOf(act, zero(F, form.rows * copies));
        const { rank } = event.blocks[0]!;
        // S = 0: the orbit is a point, its codimension is dim P
        expect(event.codimension).toBe(rank.dimensionOfClass);
        const b = flow[0]!;
        const chi = (b.basis.cols / b.cut) * (b.irreducible.beta === 4 ? 2 : 1);
        const dims: Record<number, [number, number]> = {
          1: [(chi * (chi + 1)) / 2, (chi * (chi + 1)) / 2],
          2: [chi * chi, chi * chi],
          3: [(chi / 2) * (chi - 1), (chi / 2) * (chi - 1)],
          4: [(chi / 2) * (chi / 2 + 1), (chi / 2) ** 2],
          5: [(chi / 2) ** 2, (chi / 2) * (chi / 2 + 1)],
          6: [chi ** 2 / 2, chi ** 2 / 2],
          7: [(chi * (chi + 1)) / 2, (chi * (chi - 1)) / 2],
          8: [(chi / 2) * (chi - 1), (chi / 2) * (chi + 1)],
          9: [(chi / 2) ** 2, (chi / 2) * (chi / 2 - 1)],
          10: [(chi / 2) * (chi / 2 - 1), (chi / 2) ** 2],
        };
        expect([rank.dimensionOfClass, rank.dimensionOfGroup]).toEqual(dims[number]);
      }
    });
});
