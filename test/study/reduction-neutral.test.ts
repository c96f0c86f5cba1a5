/** `reduce` beside a continuous symmetry: relative equilibria at fixed momenta, against the same systems in relative coordinates. */
import { describe, expect, it } from 'vitest';
import { readModelFile, readModelText } from '../../src/model/declaration/index.ts';
import type { ReduceResult } from '../../src/study/reduce.ts';
import { study } from '../../src/study/study.ts';

const reduce = async (text: string) => (await study('reduce', readModelText(text))).result as ReduceResult;

/** Coefficients of h in one kernel coordinate, parameters left out: "sqrt(2)*u1^3/3 + 3*u1^4". */
function coefficients(result: ReduceResult): number[] {
  const out: number[] = [];
  for (const term of result.reduced.polynomial.replace(/ - /g, ' + -').split(' + ')) {
    const [, sign, factor, power, over] = /^(-?)(.*?)\*?u1\^?(\d*)(?:\/(\d+))?$/.exec(term)!;
    const root = /^(?:(\d+)\*)?sqrt\((\d+)\)$/.exec(factor!);
    const size = root === null ? Number(factor === '' ? 1 : factor) : Number(root[1] ?? 1) * Math.sqrt(Number(root[2]));
    out[Number(power === '' ? 1 : power)] = ((sign === '-' ? -1 : 1) * size) / Number(over ?? 1);
  }
  return Array.from(out, (x) => x ?? 0);
}

const value = (c: readonly number[], u: number) => c.reduce((s, x, i) => s + x * u ** i, 0);

/** The order with which f vanishes at 0, from two small arguments. */
const orderOf = (f: (d: number) => number) => Math.log(Math.abs(f(0.02) / f(0.01))) / Math.log(2);

describe('translations against relative coordinates', () => {
  it('two particles on a line', async () => {
    const whole = await reduce(`
parameters: {mu: 0}
vary: [mu]
hamiltonian: (p1^2+p2^2)/2 + mu*(q1-q2)^2/2 + (q1-q2)^3/6 + (q1-q2)^4
neutral: [{q1: 1, q2: 1}]`);
    // q1 - q2 = sqrt(2) r
    const relative = await reduce(`
coordinates: [r]
momenta: [s]
parameters: {mu: 0}
vary: [mu]
hamiltonian: s^2/2 + mu*r^2 + sqrt(2)*r^3/3 + 4*r^4`);
    for (const key of ['expression', 'polynomial', 'kinetic', 'codimension', 'moduli', 'determinedAt'] as const)
      expect(whole.reduced[key]).toEqual(relative.reduced[key]);
    expect(whole.neutral).toMatchObject({ dimension: 2 });
    expect(whole.momenta?.fixed).toEqual(['p1 + p2']);
    expect(whole.reduced.because).toContain('at fixed momenta: the momentum p1 + p2 keeps its value');
    expect(relative.momenta).toBeUndefined();
  });

  it('unequal masses on a line: the Jacobi coordinate with the slaved momenta', async () => {
    const whole = await reduce(`
parameters: {mu: 0}
vary: [mu]
hamiltonian: p1^2/2 + p2^2/6 + mu*(q1-q2)^2 + (q1-q2)^4
neutral: [{q1: 1, q2: 1}]`);
    expect(whole.reduced.expression).toBe('2*mu*I1^2 + 4*I1^4');
  });

  it('three particles with all permutations: both copies of Re z³ + r⁴', async () => {
    const [a, b, c] = ['(q1+q2-2*q3)', '(q2+q3-2*q1)', '(q3+q1-2*q2)'];
    const whole = await reduce(`
coordinates: [q1, q2, q3]
parameters: {mu: 0}
vary: [mu]
momenta: [p1, p2, p3]
hamiltonian: (p1^2+p2^2+p3^2)/2 + mu*(${a}^2+${b}^2+${c}^2) + ${a}*${b}*${c} + ${a}^4+${b}^4+${c}^4
symmetry: {group: 'symmetric:3', on: [[q1, q2, q3]]}
neutral: [{q1: 1, q2: 1, q3: 1}]`);
    // q1+q2-2q3 = -sqrt(6) x and so on in the orthonormal coordinates x, y of the plane q1+q2+q3 = 0
    const [x, y, z] = ['(sqrt(6)*x)', '(-sqrt(6)*x/2 + 3*sqrt(2)*y/2)', '(-sqrt(6)*x/2 - 3*sqrt(2)*y/2)'];
    const relative = await reduce(`
coordinates: [x, y]
momenta: [px, py]
parameters: {mu: 0}
vary: [mu]
hamiltonian: (px^2+py^2)/2 + mu*(${x}^2+${y}^2+${z}^2) + ${x}*${y}*${z} + ${x}^4+${y}^4+${z}^4
symmetry: {group: 'dihedral:3', on: [[x, y]]}`);
    expect(whole.reduced.codimension).toBe(1);
    // a sign of the coordinates is free
    const unsigned = (s: string) => s.replace(/^-/, '').replace(/ - /g, ' + ');
    expect(whole.reduced.invariants.map((i) => unsigned(i.polynomial))).toEqual(
      relative.reduced.invariants.map((i) => unsigned(i.polynomial)),
    );
    expect(unsigned(whole.reduced.expression)).toBe(unsigned(relative.reduced.expression));
  });

  it('translations with circulation leave a plane, where h is H itself (H depends on x1 - x2, y1 - y2)', async () => {
    const r = await reduce(`
coordinates: [x1, x2]
momenta: [y1, y2]
hamiltonian: (x1-x2)^3 - 3*(x1-x2)*(y1-y2)^2
neutral: [{x1: 1, x2: 1}, {y1: 1, y2: 1}]`);
    expect(r.neutral?.dimension).toBe(2);
    // x1 - x2 = sqrt(2) u1
    expect(r.reduced.polynomial).toBe('2*sqrt(2)*u1^3 - 6*sqrt(2)*u1*u2^2');
    expect(r.reduced.brackets).toHaveLength(1);
  });
});

describe('a particle in a central potential, written in the frame that turns with it', () => {
  // V'(1) = 1 is the unit of speed of the circular orbit, V''(1) = -3 the border of its stability: V_eff = V + 1/(2r²)
  const orbit = (extra: string, more = '') => `
coordinates: [x, y]
momenta: [px, py]
parameters: {mu: 0${more}}
vary: [mu]
define: {s: x^2+y^2-1}
hamiltonian: (px^2+py^2)/2 + s/2 - s^2/2 + ${extra} - (x*py-y*px)
equilibrium: {x: 1, py: 1}
neutral: [{x: -y, y: x}]`;
  // on the slice the orbit is at (r, 0) with p = (0, 1/r), so that the kernel coordinate is u = (r - 1 - (1/r - 1))/sqrt(2)
  const u = (r: number) => (r - 1 / r) / Math.SQRT2;
  const effective = (c3: number, c4: number) => (r: number) => {
    const s = r * r - 1;
    return 1 / (2 * r * r) - 1 / 2 + s / 2 - s ** 2 / 2 + c3 * s ** 3 + c4 * s ** 4;
  };
  it('fold: h is V_eff in another coordinate', async () => {
    const r = await reduce(orbit('2*s^3/3 + mu*s'));
    expect(r.reduced).toMatchObject({ leadingDegree: 3, codimension: 1, moduli: 0, kinetic: '(y1^2)/2', degree: 4 });
    const c = coefficients(r);
    const v = effective(2 / 3, 0);
    expect(c[3]).toBeGreaterThan(0.4);
    expect(orderOf((d) => value(c, u(1 + d)) - v(1 + d))).toBeGreaterThan(4.8);
  });
  it('cusp: V_eff‴ = 0 as well', async () => {
    // V_eff = const + s²(-1/2 + 1/2) + s³(c - 1/2) + s⁴(1/2 + d) + … in s
    const r = await reduce(orbit('s^3/2 + s^4/3 + mu*s^2'));
    expect(r.reduced).toMatchObject({ leadingDegree: 4, codimension: 2, moduli: 0 });
    const c = coefficients(r);
    const v = effective(1 / 2, 1 / 3);
    // s = 2d + …, u = sqrt(2) d + …: (1/2 + 1/3)·16 d⁴ = c₄·4 d⁴
    expect(c[4]).toBeCloseTo(10 / 3, 12);
    expect(orderOf((d) => value(c, u(1 + d)) - v(1 + d))).toBeGreaterThan(4.8);
  });
  it('with the coefficient of the cubic term as a symbol', async () => {
    const r = await reduce(orbit('c*s^3 + mu*s^2', ', c'));
    expect(r.reduced.conditions).toEqual(['1 - 2*c']);
    // sqrt(2)·2 c u³ = 8 c d³
    expect(r.reduced.polynomial).toContain('(-sqrt(2) + 2*sqrt(2)*c)*u1^3');
  });
});

describe('rotations of space', () => {
  const rotations = '{x1: -x2, x2: x1}, {x2: -x3, x3: x2}, {x3: -x1, x1: x3}';
  const space = (h: string, fields: string, point = '{x1: 1, p2: 1}') => `
coordinates: [x1, x2, x3]
momenta: [p1, p2, p3]
parameters: {mu: 0}
vary: [mu]
define: {d: x1^2+x2^2+x3^2-1, e: p1^2+p2^2+p3^2-1, c: x1*p1+x2*p2+x3*p3}
hamiltonian: ${h}
equilibrium: ${point}
neutral: [${fields}]`;
  it('at angular momentum 1: the group is not abelian, one direction of it is divided out', async () => {
    // |x|²|p|² - (x·p)² = 1 leaves h = d² + d e + c²/2 with e = (1 + c²)/(1 + d) - 1, that is d³ - d⁴ + … at c = 0
    const r = await reduce(space('(1+mu)*d^2 + d*e + c^2/2', rotations));
    expect(r.neutral?.dimension).toBe(4);
    expect(r.momenta?.fixed).toHaveLength(3);
    expect(r.reduced).toMatchObject({ leadingDegree: 3, codimension: 1 });
    const c = coefficients(r);
    const exact = (x: number) => {
      const d = x * x - 1;
      return d * d + d * (1 / (1 + d) - 1);
    };
    // by the mirror of the second axis the solution is x = (x, 0, 0), p = (0, 1/x, 0)
    expect(orderOf((d) => value(c, (1 + d - 1 / (1 + d)) / Math.SQRT2) - exact(1 + d))).toBeGreaterThan(4.8);
  });
  it('fields whose brackets were not declared are refused', async () => {
    await expect(reduce(space('(1+mu)*d^2 + d*e + c^2/2', '{x1: -x2, x2: x1}, {x2: -x3, x3: x2}'))).rejects.toThrow(
      /not closed under brackets/,
    );
  });
  it('so is a rotation about the axis that the others need', async () => {
    await expect(reduce(space('(p1^2+p2^2+p3^2)/2 + mu*d^2 + d^3', rotations, '{x1: 1}'))).rejects.toThrow(/vanish at the equilibrium/);
  });
});

describe('what is counted and what is refused', () => {
  it('a rotation about the place where both particles rest counts linearly only', async () => {
    const r = await reduce(`
coordinates: [x1, y1, x2, y2]
momenta: [a1, b1, a2, b2]
parameters: {mu: 0}
vary: [mu]
define: {s: (x1-x2)^2+(y1-y2)^2}
hamiltonian: (a1^2+b1^2+a2^2+b2^2)/2 + mu*s/2 + s^2
neutral: [{x1: 1, x2: 1}, {y1: 1, y2: 1}, {x1: -y1, y1: x1, x2: -y2, y2: x2}]`);
    expect(r.neutral?.dimension).toBe(4);
    expect(r.reduced.polynomial).toBe('4*u1^4 + 8*u1^2*u2^2 + 4*u2^4');
    expect(r.momenta?.because).toContain('the linear analysis only');
  });
  it('a symplectic form that depends on the parameter', async () => {
    const model = `
coordinates: [q1, q2]
momenta: [p1, p2]
symplectic: [[0, 0, 1+mu, 0], [0, 0, 0, 1], [-1-mu, 0, 0, 0], [0, -1, 0, 0]]
parameters: {mu: 0}
vary: [mu]
hamiltonian: (p1^2+p2^2)/2 + mu*q2^2 + q2^4
neutral: [{q1: 1}]`;
    await expect(reduce(model)).rejects.toThrow(/symplectic form depends on mu/);
    expect((await reduce(model.replaceAll('+mu', '').replaceAll('-mu', ''))).reduced.expression).toBe('mu*I1^2 + I1^4');
  });
  it('a field that depends on a symbol', async () => {
    await expect(
      reduce(`
coordinates: [q1, q2, q3]
momenta: [p1, p2, p3]
parameters: {a}
hamiltonian: (p1^2+p2^2+p3^2)/2 + q3^4 + (q1-a*q2)^2/2
neutral: [{q1: a, q2: 1}]`),
    ).rejects.toThrow(/a neutral field depends on a/);
  });
});

describe('seven equal vortices on a ring', () => {
  it('the quartic form at fixed angular impulse is definite: the ring is stable (Kurakin & Yudovich, Chaos 12, 2002, from memory)', async () => {
    const declaration = readModelFile('samples/vortex-heptagon-slice.yaml');
    const { result } = await study('reduce', { ...declaration, degree: 4 });
    const { reduced, neutral } = result as ReduceResult;
    expect(neutral?.dimension).toBe(2);
    expect(reduced.leadingDegree).toBe(4);
    // 9/28 = 0.32143 agrees with the stationary values of H at given kernel coordinates found by Newton's iteration in doubles
    expect(reduced.expression).toBe('9*I^2/28');
    expect(reduced.kinetic).toBe('(y1^2 + y2^2)/2');
  });
});
