/** Degenerate inputs: no dimension, one, groups of order 1, generators that say nothing or say it twice. */
import { describe, expect, it } from 'vitest';
import { components, json, refusal } from './support/program.ts';

const planar = (symmetry: string): string => `coordinates: [q1, q2]\nmomenta: [p1, p2]\nquadratic: p1^2 + p2^2\nsymmetry: ${symmetry}\n`;

describe.concurrent('groups', () => {
  it.each([
    ['cyclic:1 by name', '{group: "cyclic:1", on: [q1, q2]}', 1, 0, 4],
    ['the identity as a generator', '{generators: [{name: e, permutation: [1, 2]}]}', 1, 0, 4],
    ['no generators', '{generators: []}', 1, 0, 4],
    ['a generator twice', '{generators: [{name: a, permutation: [2, 1]}, {name: b, permutation: [2, 1]}]}', 2, 0, 2],
    ['swap and mirror', '{generators: [{name: a, permutation: [2, 1]}, {name: b, map: {q1: -q1}}]}', 8, 0, 1],
    ['time reversal twice', '{generators: [{name: t, reversing: true}, {name: u, reversing: true}]}', 2, 1, 3],
    ['time reversal in both ways', '{generators: [{name: t, reversing: true}], timeReversal: true}', 2, 1, 3],
    ['dihedral:1', '{group: "dihedral:1", on: [q1, q2]}', 2, 0, 2],
    ['a group that acts through a quotient', '{group: "cyclic:4", on: [q1, q2], action: trivial}', 1, 0, 4],
  ])('%s', async (_name, symmetry, order, reversing, codimension) => {
    const quoted = symmetry.includes('trivial') ? '{generators: [{name: r, matrix: [[1, 0], [0, 1]]}]}' : symmetry;
    const r = await json('codim - --parameters 9', planar(quoted));
    expect([r.group.order, r.group.reversing]).toEqual([order, reversing]);
    // [2, 2] without symmetry 4; swap splits it into 1 + 1; D4 makes one irreducible of it; reversing alone: class 4 [2,2] 3
    expect([r.zero.blocks, r.zero.codimension]).toEqual([[2, 2], codimension]);
  });
  it('a catalogue group that acts unfaithfully: matrices are counted', async () => {
    // cyclic:6 by its rotation by 60 degrees on the plane, squared action by hand: order 3
    const r = await json(
      'components -',
      'coordinates: [q1, q2]\nmomenta: [p1, p2]\nquadratic: 0*q1\nsymmetry: {generators: [{name: r, matrix: [[-1/2, -sqrt(3)/2], [sqrt(3)/2, -1/2]]}, {name: again, matrix: [[-1/2, sqrt(3)/2], [-sqrt(3)/2, -1/2]]}]}\n',
    );
    expect(r.group.order).toBe(3);
  });
});

describe.concurrent('dimensions and Hessians', () => {
  it('no coordinates at all', async () => {
    await refusal('codim --quadratic "0"');
    await refusal('codim -', 'coordinates: []\nmomenta: []\nhamiltonian: "0"\n');
    await refusal('codim -', 'hamiltonian: "1"\n');
  });
  it('one degree of freedom: S = 0, nilpotent, definite, indefinite', async () => {
    const of = (s: string) => json(`codim --parameters 3 --quadratic "${s}"`);
    expect((await of('0*q1')).zero).toMatchObject({ blocks: [1, 1], codimension: 3, semisimple: true });
    expect((await of('(q1 + p1)^2')).zero).toMatchObject({ blocks: [2], codimension: 1, motion: 'splits' });
    expect((await of('-(q1 - 2*p1)^2')).inertia).toEqual({ positive: 0, zero: 1, negative: 1 });
    expect((await of('q1^2 + p1^2')).zero).toBeNull();
    const saddle = await of('q1*p1');
    expect([saddle.inertia, saddle.spectrum[0].re]).toEqual([{ positive: 1, zero: 0, negative: 1 }, 1]);
  });
  it('a zero Hessian in six dimensions: dim sp(6) = 21', async () => {
    expect((await json('codim --parameters 99 --coordinates a,b,c --momenta d,e,f --quadratic "0"')).zero).toMatchObject({
      kernel: 6,
      codimension: 21,
    });
  });
  it('a repeated eigenvalue of S is none of L: S = diag(1, 1, 1, 1)', async () => {
    const r = await json('codim --quadratic "q1^2+q2^2+p1^2+p2^2"');
    expect([r.zero, r.collisions.length]).toEqual([null, 1]);
  });
  it('constants in H do not count; H = 0 of a full symmetry', async () => {
    expect((await json('codim --hamiltonian "5 + p1^2 + q1^2"')).verdict.answer).toBe('no event');
    const r = await json('components --group Oh --on q1,q2,q3 --quadratic "0"');
    expect([r.group.order, components(r)]).toEqual([48, ['3 real 2 false']]);
  });
  it('an irrational field of some degree: D7 with D5 beside it', async () => {
    const text =
      'coordinates: [q1, q2, q3, q4]\nmomenta: [p1, p2, p3, p4]\nquadratic: p1^2 + p2^2 + p3^2 + p4^2 + q3^2 + q4^2\nsymmetry:\n  - {group: "dihedral:7", on: [q1, q2]}\n  - {group: "dihedral:5", on: [q3, q4]}\n';
    const r = await json('codim -', text);
    expect([r.group.order, r.zero.codimension, r.zero.motion, components(r)]).toEqual([
      140,
      1,
      'splits',
      ['2 real 2 false', '2 real 2 false'],
    ]);
  });
});
