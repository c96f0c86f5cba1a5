/**
 * The planar oscillator with a three-fold potential, stage by stage: every number worked by hand and with a general-purpose
 * algebra system. H = ½|p|² + μ/2 |q|² + a Re z³ + b |q|⁴, z = q1 + i q2, at μ = 0, a = b = 1.
 */
import { describe, expect, it } from 'vitest';
import { readModelText } from '../../src/model/declaration/index.ts';
import type { ReduceResult } from '../../src/study/reduce.ts';
import type { CodimResult, InvariantsResult } from '../../src/study/result.ts';
import { study } from '../../src/study/study.ts';

const model = (symmetry: string) =>
  readModelText(`
title: Planar oscillator
coordinates: [q1, q2]
momenta: [p1, p2]
parameters: {mu: 0, a: 1, b: 1}
vary: [mu]
hamiltonian: (p1^2+p2^2)/2 + mu*(q1^2+q2^2)/2 + a*(q1^3-3*q1*q2^2) + b*(q1^2+q2^2)^2
symmetry:
  generators:
${symmetry}`);
const r = `    - {name: r, map: {q1: -q1/2 - sqrt(3)/2*q2, q2: sqrt(3)/2*q1 - q2/2}}\n`;
const s = `    - {name: s, map: {q2: -q2}}\n`;
const t = `    - {name: t, reversing: true}\n`;
const codim = async (symmetry: string) => (await study('codim', model(symmetry))).result as CodimResult;

describe('planar oscillator under D3', () => {
  it('group, components and types', async () => {
    const x = await codim(r + s);
    expect(x.arithmetic).toBe('exact');
    expect(x.group).toMatchObject({ order: 6, reversing: 0 });
    expect(x.components).toMatchObject([{ dimension: 2, type: 'real', multiplicity: 2, carriesForm: false }]);
    expect(x.inertia).toEqual({ positive: 2, zero: 2, negative: 0 });
  });
  it('the event: kernel, blocks, sign, codimension by two routes, motion, verdict', async () => {
    const x = await codim(r + s);
    expect(x.zero).toMatchObject({
      dimension: 4,
      kernel: 2,
      blocks: [2, 2],
      semisimple: false,
      codimension: 1,
      codimensionWithoutSymmetry: 4,
      motion: 'splits',
    });
    expect(x.zero!.signs).toMatchObject([{ size: 2, count: 2, positive: 2, negative: 0 }]);
    expect(x.zero!.routes).toMatchObject([{ class: 1, partition: [2], formula: 1, rank: 1 }]);
    expect(x.zero!.unfolding).toEqual(['q1^2 + q2^2']);
    expect(x.verdict).toMatchObject({ answer: 'generic', parameters: 1, versal: true });
  });
  it('subgroups: orders 1, 2, 3, 6 give 4, 2, 2, 1', async () => {
    const x = await codim(r + s);
    expect(x.zero!.subgroups.map((h) => [h.order, h.conjugates, h.codimension])).toEqual([
      [1, 1, 4],
      [2, 3, 2],
      [3, 1, 2],
      [6, 1, 1],
    ]);
  });
  it('other declared symmetries: C3 alone 2, C3 with time reversal 1, D3 with time reversal 1, a mirror alone 2', async () => {
    expect((await codim(r)).zero!.codimension).toBe(2);
    expect((await codim(r + t)).zero!.codimension).toBe(1);
    expect((await codim(r + s + t)).zero!.codimension).toBe(1);
    expect((await codim(s)).zero!.codimension).toBe(2);
  });
  it('the inverse of the rotation declares the same group', async () => {
    const back = r.replace('- sqrt(3)/2*q2', '+ sqrt(3)/2*q2').replace('q2: sqrt(3)/2*q1', 'q2: -sqrt(3)/2*q1');
    const [x, y] = [await codim(r + s), await codim(back + s)];
    expect(y.zero!.codimension).toBe(x.zero!.codimension);
    expect(y.group).toEqual(x.group);
  });
  it('the mirror x ↦ −x breaks Re z³ and is refused', async () => {
    await expect(codim(`${r}    - {name: m, map: {q1: -q1}}\n`)).rejects.toThrow(/not invariant under m/);
  });
  it('invariants: Molien series, 3 and 4 generators, H = ½I3 + μ/2 I1 + a I4 + b I1² with remainder 0', async () => {
    const x = (await study('invariants', model(r + s))).result as InvariantsResult;
    expect(x.molien.series.slice(0, 9)).toEqual([1, 0, 3, 4, 6, 10, 17, 18, 31]);
    expect(x.molien.numerator).toEqual([1, 0, 1, 2, 1, 0, 1]);
    expect(x.molien.denominator).toEqual([2, 2, 3, 3]);
    expect(x.generators.map((g) => g.degree)).toEqual([2, 2, 2, 3, 3, 3, 3]);
    expect(x.complete).toBe(true);
    expect(x.hamiltonian).toMatchObject({ expression: 'mu*I1/2 + I3/2 + a*I4 + b*I1^2', remainder: '0' });
  });
  it('reduction: h = μ/2 I + R + I², leading degree 3, codimension 1, no moduli, unfolding I', async () => {
    const x = ((await study('reduce', model(r + s))).result as ReduceResult).reduced;
    expect(x).toMatchObject({
      leadingDegree: 3,
      expression: 'mu*I/2 + R + I^2',
      codimension: 1,
      moduli: 0,
      stratumCodimension: 1,
      unfolding: ['I'],
      determinedAt: 3,
      kinetic: '(y1^2 + y2^2)/2',
      generic: true,
    });
    expect(x.invariants).toMatchObject([
      { name: 'I', polynomial: 'u1^2 + u2^2' },
      { name: 'R', polynomial: 'u1^3 - 3*u1*u2^2' },
    ]);
  });
});

describe('reduction with symbols', () => {
  const symbolic = (n: number, h: string) =>
    readModelText(`
coordinates: [q1, q2]
momenta: [p1, p2]
parameters: {mu: 0}
vary: [mu]
hamiltonian: (p1^2+p2^2)/2 + mu*(q1^2+q2^2)/2 + ${h}
symmetry: {group: 'dihedral:${n}', on: [[q1, q2]]}`);
  it('D3: h = μ/2 I + a R + b I² for every a ≠ 0 (worked by hand)', async () => {
    const x = (await study('reduce', symbolic(3, 'a*(q1^3-3*q1*q2^2) + b*(q1^2+q2^2)^2'))).result as ReduceResult;
    expect(x.model.parameters).toEqual({ mu: '0', a: null, b: null });
    expect(x.reduced).toMatchObject({ expression: 'mu*I/2 + a*R + b*I^2', conditions: ['a'], codimension: 1, moduli: 0 });
  });
  it('D4: a ≠ 0, a + b ≠ 0, a + 2b ≠ 0 (critical lines of a(x⁴+y⁴) + b(x²+y²)², by hand)', async () => {
    const x = ((await study('reduce', symbolic(4, 'a*(q1^4+q2^4) + b*(q1^2+q2^2)^2'))).result as ReduceResult).reduced;
    expect(x.conditions).toEqual(['a', 'a + b', 'a + 2*b']);
    expect([x.codimension, x.moduli, x.stratumCodimension]).toEqual([2, 1, 1]);
  });
  it('a kernel that depends on a symbol is refused', async () => {
    await expect(study('reduce', symbolic(1, 'a*q1*q2 + q2^2/2 + a^2*q1^2/2 + q1^4'))).rejects.toThrow();
  });
});
