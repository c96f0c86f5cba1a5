/** `branches` beside a continuous symmetry: relative equilibria at fixed momenta, found on the equations with multipliers. */
import { describe, expect, it } from 'vitest';
import { readModelText } from '../../src/model/declaration/index.ts';
import type { BranchesResult } from '../../src/study/branches.ts';
import { study } from '../../src/study/study.ts';

const branches = async (text: string) => (await study('branches', readModelText(text))).result as BranchesResult;
const facts = (r: BranchesResult) =>
  r.branches.map((b) => [b.copies, b.side, b.exponent, b.morseIndex, b.confirmed, b.stability]).sort((a, b) => Number(a[3]) - Number(b[3]));

describe('translations', () => {
  it('two particles on a line: a pitchfork at 4 q² = −μ/4 for q = q1 - q2 (by hand), the centre at rest', async () => {
    const r = await branches(`
coordinates: [q1, q2]
momenta: [p1, p2]
parameters: {mu: 0}
vary: [mu]
hamiltonian: (p1^2+p2^2)/2 + mu*(q1-q2)^2/2 + (q1-q2)^4
symmetry: {group: 'symmetric:2', on: [[q1, q2]]}
neutral: [{q1: 1, q2: 1}]`);
    expect(facts(r)).toEqual([[2, 'negative', '1/2', 0, true, 'stable']]);
    expect(r.momenta?.fixed).toEqual(['p1 + p2']);
    const { step, point } = r.branches[0]!.found!;
    expect((point.q1! - point.q2!) ** 2).toBeCloseTo(-step / 4, 8);
    expect(point.q1! + point.q2!).toBeCloseTo(0, 9);
    expect(r.topologicalDegree).toEqual({ below: 1, above: 1 });
  });
  it('three particles: three saddles on each side, as in the plane of relative positions', async () => {
    const [a, b, c] = ['(q1+q2-2*q3)', '(q2+q3-2*q1)', '(q3+q1-2*q2)'];
    const r = await branches(`
coordinates: [q1, q2, q3]
momenta: [p1, p2, p3]
parameters: {mu: 0}
vary: [mu]
hamiltonian: (p1^2+p2^2+p3^2)/2 + mu*(${a}^2+${b}^2+${c}^2)/2 + ${a}*${b}*${c}
symmetry: {group: 'symmetric:3', on: [[q1, q2, q3]]}
neutral: [{q1: 1, q2: 1, q3: 1}]`);
    expect(facts(r)).toEqual([[3, 'both', '1', 1, true, 'unstable']]);
    expect(r.topologicalDegree).toEqual({ below: -2, above: -2 });
  });
});

describe('circular orbits in the frame that turns with them', () => {
  const orbit = (extra: string) => `
coordinates: [x, y]
momenta: [px, py]
parameters: {mu: 0}
vary: [mu]
define: {s: x^2+y^2-1}
hamiltonian: (px^2+py^2)/2 + s/2 - s^2/2 + ${extra} - (x*py-y*px)
equilibrium: {x: 1, py: 1}
neutral: [{x: -y, y: x}]`;
  it('fold: two orbits of angular momentum 1 on one side, critical points of V + 1/(2r²)', async () => {
    const r = await branches(orbit('2*s^3/3 + mu*s'));
    expect(facts(r)).toEqual([
      [1, 'negative', '1/2', 0, true, 'stable'],
      [1, 'negative', '1/2', 1, true, 'unstable'],
    ]);
    for (const { found } of r.branches) {
      const { step, point } = found!;
      const [x, s] = [point.x!, point.x! ** 2 - 1];
      expect(x * point.py!).toBeCloseTo(1, 8);
      // V' = 1/r³
      expect(2 * x * (1 / 2 - s + 2 * s * s + step)).toBeCloseTo(1 / x ** 3, 7);
    }
  });
  it('where the orbit stays another crosses it: 2μu² + au³ has its minimum at 0 for μ > 0 and elsewhere for μ < 0', async () => {
    const r = await branches(orbit('2*s^3/3 + mu*s^2'));
    expect(facts(r)).toEqual([
      [1, 'negative', '1', 0, true, 'stable'],
      [1, 'positive', '1', 1, true, 'unstable'],
    ]);
    expect(r.topologicalDegree).toEqual({ below: 0, above: 0 });
  });
});

describe('angular momentum 1 in space, a group that is not abelian', () => {
  it('critical points of (1+μ) d² + d/(1+d) - d at d = -2μ/3 + …, all with |x × p| = 1', async () => {
    const r = await branches(`
coordinates: [x1, x2, x3]
momenta: [p1, p2, p3]
parameters: {mu: 0}
vary: [mu]
define: {d: x1^2+x2^2+x3^2-1, e: p1^2+p2^2+p3^2-1, c: x1*p1+x2*p2+x3*p3}
hamiltonian: (1+mu)*d^2 + d*e + c^2/2
equilibrium: {x1: 1, p2: 1}
neutral: [{x1: -x2, x2: x1}, {x2: -x3, x3: x2}, {x3: -x1, x1: x3}]`);
    expect(r.branches.length).toBeGreaterThan(0);
    for (const { confirmed, found } of r.branches) {
      expect(confirmed).toBe(true);
      const { step, point } = found!;
      const d = point.x1! ** 2 + point.x2! ** 2 + point.x3! ** 2 - 1;
      expect(2 * (1 + step) * d + 1 / (1 + d) ** 2 - 1).toBeCloseTo(0, 8);
      expect(Math.abs(d)).toBeGreaterThan(Math.abs(step) / 2);
      expect(point.x1! * point.p2! - point.x2! * point.p1!).toBeCloseTo(1, 8);
    }
  });
});

it('a coordinate that the parameter moves at first order does not hide a branch of the same order', async () => {
  const r = await branches(`
coordinates: [q1, q2, w]
momenta: [p1, p2, v]
parameters: {mu: 0}
vary: [mu]
hamiltonian: (p1^2+p2^2+v^2)/2 + mu*(q1^2+q2^2)/2 + q1^3 - 3*q1*q2^2 + w^2/2 - mu*w
symmetry: {group: 'dihedral:3', on: [[q1, q2]]}`);
  expect(facts(r)).toEqual([[3, 'both', '1', 1, true, 'unstable']]);
  expect(r.branches[0]!.found!.point.w).toBeCloseTo(r.branches[0]!.found!.step, 9);
});
