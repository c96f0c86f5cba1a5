/** `events`: complete lists from an action alone. */
import { describe, expect, it } from 'vitest';
import { LimitError } from '../../src/errors/index.ts';
import { type Declaration, declare, type OptionUse } from '../../src/model/declaration/index.ts';
import { eventsResult } from '../../src/study/events.ts';

const options = (...pairs: [string, string][]): Declaration =>
  declare(
    {},
    pairs.map(([name, value]): OptionUse => ({ name, value })),
  );
const lines = async (d: Declaration) =>
  (await eventsResult(d)).events.map((e) => `${e.codimension} ${e.components.join('+')} ${e.signs} ${e.motion}`);

describe('without symmetry (D. M. Galin, Versal deformations of linear Hamiltonian systems, 1975/1982)', () => {
  const two = ['coordinates', 'q1,q2'] as [string, string];
  it('two degrees of freedom: 0² ± in codimension 1, 0⁴ ± in codimension 2', async () => {
    expect(await lines(options(two))).toEqual(['1 A [2]+ splits', '1 A [2]- splits', '2 A [4]+ degenerate', '2 A [4]- degenerate']);
    const r = await eventsResult(options(two));
    expect(r.collisionTypes.map((c) => `${c.kind} ${c.blocks} ${c.motion}`)).toEqual(['imaginary 2 splits', 'real 2 splits']);
    expect(r.events[0]).toMatchObject({
      kernel: 1,
      dimension: 2,
      blocks: [2],
      inertia: { positive: 1, zero: 1, negative: 0 },
      signChanges: 1,
    });
    expect(r.events[2]!.signChanges).toBeUndefined();
  });
  it('codimension 3 adds 0, 0; 0⁶ does not fit', async () => {
    expect((await lines(options(two, ['codimension', '3']))).slice(4)).toEqual(['3 A [1] [1] degenerate']);
  });
});

describe('with symmetry (Golubitsky & Stewart 1987; Dellnitz, Melbourne & Marsden 1992)', () => {
  it('D3 on a plane with its momenta: splits, kernel of dimension 2', async () => {
    const r = await eventsResult(options(['group', 'dihedral:3'], ['on', 'q1,q2']));
    expect(r.events.map((e) => [e.codimension, e.kernel, e.blocks, e.motion])).toEqual([
      [1, 2, [2, 2], 'splits'],
      [1, 2, [2, 2], 'splits'],
    ]);
  });
  it('C3 rotating (q, p): passes', async () => {
    expect(await lines(options(['group', 'cyclic:3'], ['on', 'q1,p1']))).toEqual(['1 E [1]+ passes']);
  });
  it('C3 on a plane with its momenta: passes in codimension 1, [2] in codimension 2', async () => {
    const list = await lines(options(['group', 'cyclic:3'], ['on', 'q1,q2']));
    expect(list).toEqual(['1 E [1]+ passes', '1 E [1]- passes', '2 E [2]+ degenerate', '2 E [2]- degenerate']);
  });
  it('the quaternion group with time reversal: splits, kernel of dimension 4', async () => {
    const r = await eventsResult(options(['group', 'quaternion'], ['on', 'q1,q2,q3,q4'], ['time-reversal', '']));
    expect(r.events.filter((e) => e.codimension === 1).map((e) => [e.kernel, e.dimension, e.motion])).toEqual(
      new Array(4).fill([4, 8, 'splits']),
    );
  });
});

describe('several irreducibles', () => {
  it('a ring of three sites: events of two components add their codimensions', async () => {
    const r = await eventsResult(options(['group', 'dihedral:3'], ['action', 'ring'], ['on', 'q1,q2,q3']));
    expect(r.components.map((c) => c.label)).toEqual(['A1', 'E']);
    expect(r.events.filter((e) => e.codimension === 1).map((e) => e.components.join())).toEqual(['A1', 'A1', 'E', 'E']);
    expect(r.events.filter((e) => e.components.length === 2).map((e) => e.signs)).toEqual([
      'A1: [2]+; E: [2]+',
      'A1: [2]+; E: [2]-',
      'A1: [2]-; E: [2]+',
      'A1: [2]-; E: [2]-',
    ]);
    expect(r.collisionTypes.map((c) => [c.components.join(), c.motion])).toEqual([
      ['A1,E', 'passes'],
      ['A1,E', 'passes'],
    ]);
  });
  it('ω decides which signs fit: vortices of one sign on a heptagon', async () => {
    const r = await eventsResult(declare({ path: 'samples/vortex-heptagon.yaml' }, []));
    expect(r.events.filter((e) => e.codimension === 1 && e.components[0] === 'E3').map((e) => e.signs)).toEqual(['[1]+', '[1]-']);
  });
  it('a Hamiltonian that is given must hold', async () => {
    await expect(eventsResult(options(['group', 'cyclic:3'], ['on', 'q1,p1'], ['quadratic', 'q1^2 + 2*p1^2']))).rejects.toThrow(
      /not invariant/,
    );
  });
  it('a list too long is refused', async () => {
    const names = Array.from({ length: 40 }, (_, i) => `q${i + 1}`).join();
    const d = options(['coordinates', names], ['codimension', '40']);
    await expect(eventsResult(d)).rejects.toThrow(LimitError);
  }, 20_000);
});
