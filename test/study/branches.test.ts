/** Branches of equilibria through the whole program: reduced by the splitting lemma, confirmed on the full equations. */
import { describe, expect, it } from 'vitest';
import { readModelText } from '../../src/model/declaration/index.ts';
import type { BranchesResult } from '../../src/study/branches.ts';
import { study } from '../../src/study/study.ts';

const branches = async (text: string) => (await study('branches', readModelText(text))).result as BranchesResult;
const planar = (n: number, potential: string) => `
coordinates: [q1, q2]
momenta: [p1, p2]
parameters: {mu: 0}
vary: [mu]
hamiltonian: (p1^2+p2^2)/2 + mu*(q1^2+q2^2)/2 + ${potential}
symmetry: {group: 'dihedral:${n}', on: [[q1, q2]]}`;
const spatial = (group: string, potential: string) => `
coordinates: [x, y, z]
momenta: [px, py, pz]
parameters: {mu: 0}
vary: [mu]
hamiltonian: (px^2+py^2+pz^2)/2 + mu*(x^2+y^2+z^2)/2 + ${potential}
symmetry: {group: ${group}, on: [[x, y, z]]}`;
const short = (r: BranchesResult) => r.branches.map((b) => [b.isotropyOrder, b.copies, b.side, b.morseIndex, b.confirmed]);

describe('branches', () => {
  it('D3, Re z³: three saddles on each side, x ≈ −μ/(3a) (worked by hand)', async () => {
    const r = await branches(planar(3, 'q1^3 - 3*q1*q2^2 + (q1^2+q2^2)^2'));
    expect(short(r)).toEqual([[2, 3, 'both', 1, true]]);
    expect(r.branches[0]!.exponent).toBe('1');
    expect(r.branches[0]!.stability).toBe('unstable');
    expect(r.isotropy.map((i) => [i.order, i.conjugates, i.fixedDimension, i.axial])).toEqual([
      [6, 1, 0, false],
      [2, 3, 1, true],
      [1, 1, 2, false],
    ]);
    const { step, point } = r.branches[0]!.found!;
    // μ + 3x + 4x² = 0 on the mirror line, up to the rotations of the triangle
    const root = (-3 + Math.sqrt(9 - 16 * step)) / 8;
    expect(Math.hypot(point.q1!, point.q2!)).toBeCloseTo(Math.abs(root), 8);
    expect(r.topologicalDegree).toEqual({ below: -2, above: -2 });
  });
  it('D4: two orbits of four, one of saddles (Golubitsky, Stewart & Schaeffer 1988, ch. XIII)', async () => {
    const r = await branches(planar(4, '(q1^2+q2^2)^2/4 + (q1^4 - 6*q1^2*q2^2 + q2^4)/10'));
    expect(short(r)).toEqual([
      [2, 4, 'negative', 1, true],
      [2, 4, 'negative', 0, true],
    ]);
    expect(r.topologicalDegree).toEqual({ below: 1, above: 1 });
  });
  it('D5: the fifth-degree term fixes the phase', async () => {
    const r = await branches(planar(5, '(q1^2+q2^2)^2/4 + (q1^5 - 10*q1^3*q2^2 + 5*q1*q2^4)/10'));
    expect(r.branches.map((b) => b.copies)).toEqual([5, 5]);
    expect(r.branches.map((b) => b.morseIndex).sort()).toEqual([0, 1]);
    expect(r.branches.every((b) => b.confirmed && b.side === 'negative')).toBe(true);
  });
  it('O_h: 6 + 8 + 12 equilibria (Melbourne 1986)', async () => {
    const r = await branches(spatial('Oh', '(x^2+y^2+z^2)^2/4 + (x^4+y^4+z^4)/10'));
    expect(r.branches.map((b) => b.copies).sort((a, b) => a - b)).toEqual([6, 8, 12]);
    expect(r.branches.every((b) => b.confirmed && b.exponent === '1/2')).toBe(true);
  });
  it('T_d: xyz gives four on either side; on the two-fold axes it vanishes and r⁴ gives six on one side, saddles (by hand)', async () => {
    const r = await branches(spatial('Td', 'x*y*z + (x^2+y^2+z^2)^2/4'));
    const four = r.branches.filter((b) => b.copies === 4);
    expect(four.length).toBeGreaterThan(0);
    expect(four.every((b) => b.exponent === '1' && b.confirmed)).toBe(true);
    // at (s, 0, 0), s² = −μ, the Hessian is 2s² along the axis and s (0 1; 1 0) across it
    expect(r.branches.filter((b) => b.copies === 6)).toMatchObject([{ exponent: '1/2', side: 'negative', morseIndex: 1, confirmed: true }]);
    expect(r.branches).toHaveLength(four.length + 1);
  });
  it('no parameter, no branches', async () => {
    await expect(branches(planar(3, 'q1^3 - 3*q1*q2^2').replace('vary: [mu]', 'vary: []'))).rejects.toThrow(/no parameter varies/);
  });
});
