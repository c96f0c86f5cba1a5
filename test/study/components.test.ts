/** `components`: decompositions, exact adapted bases, blocks with symbols, the ten classes, refusals. */
import { describe, expect, it } from 'vitest';
import { type Declaration, declare, type OptionUse } from '../../src/model/declaration/index.ts';
import { parseExpression } from '../../src/model/expression/index.ts';
import { numericValue } from '../../src/model/numeric-value.ts';
import { componentsResult } from '../../src/study/components.ts';
import type { ComponentSummary, Value } from '../../src/study/result.ts';

const file = (text: string): Declaration => declare({ text }, []);
const options = (...pairs: [string, string][]): Declaration =>
  declare(
    {},
    pairs.map(([name, value]): OptionUse => ({ name, value })),
  );
const sample = (name: string): Declaration => declare({ path: `samples/${name}.yaml` }, []);
const decomposition = (list: readonly ComponentSummary[]): Record<string, number> =>
  Object.fromEntries(list.map((c) => [c.label, c.multiplicity]));
const number = (v: Value, at: ReadonlyMap<string, number> = new Map()): number =>
  typeof v === 'number' ? v : numericValue(parseExpression(v), at);
/** A linear form as its vector of coefficients. */
const vector = (form: string, names: readonly string[]): number[] =>
  names.map((n) => number(form, new Map(names.map((m) => [m, m === n ? 1 : 0]))));
const bilinear = (s: readonly (readonly number[])[], u: readonly number[], v: readonly number[]): number =>
  u.reduce((t, x, i) => t + x * v.reduce((r, y, j) => r + s[i]![j]! * y, 0), 0);

const ring = (parameters: string, more = '') => `
coordinates: [q1, q2, q3]
momenta: [p1, p2, p3]
${parameters}
hamiltonian: (p1^2+p2^2+p3^2)/2 + c*((q1-q2)^2+(q2-q3)^2+(q3-q1)^2)/2 + k*(q1^2+q2^2+q3^2)/2 ${more}
symmetry: {group: dihedral:3, action: ring, on: [[q1, q2, q3]], timeReversal: true}
`;

describe('three resonators on a ring, by hand: stiffness k and k + 3c', () => {
  it('blocks of S, ω and L with the varied parameter as a symbol', async () => {
    const r = await componentsResult(file(ring('parameters: {c: -1/3, k: 1}\nvary: [c]')));
    expect(r.symbols).toEqual(['c']);
    expect(decomposition(r.components)).toEqual({ A1: 1, 'A1-': 1, E: 1, 'E-': 1 });
    const e = r.components.find((c) => c.label === 'E')!;
    expect(e).toMatchObject({ basis: ['q2 - q3'], block: [['2 + 6*c']], copies: 2 });
    expect(e.partners).toEqual([{ basis: ['-2*q1 + q2 + q3'], factor: '3' }]);
    expect(r.classes.map((c) => [c.number, c.algebra, c.subalgebra, c.dimensionOfClass, c.dimensionOfGroup])).toEqual([
      [4, 'sp(2,R)', 'gl(1,R)', 2, 1],
      [4, 'sp(2,R)', 'gl(1,R)', 2, 1],
    ]);
    expect(r.classes[1]).toMatchObject({
      components: ['E', 'E-'],
      form: [
        ['0', '2'],
        ['-2', '0'],
      ],
      flow: [
        ['0', '1'],
        ['-1 - 3*c', '0'],
      ],
    });
  });
  it('parameters without values stay symbols, also inside other values', async () => {
    const r = await componentsResult(file(ring('parameters: {c: 2*k}', '+ b*(q1^4+q2^4+q3^4)')));
    expect(r.symbols).toEqual(['k']);
    expect(r.model.parameters).toMatchObject({ k: null, b: null });
    expect(r.components.find((c) => c.label === 'E')!.block).toEqual([['14*k']]);
  });
  it('a varied parameter that breaks the symmetry is replaced by its value', async () => {
    const r = await componentsResult(file(ring('parameters: {c: 1, k: 1, b: 0}\nvary: [b]', '+ b*q1^2')));
    expect(r.symbols).toBeUndefined();
    expect(r.components.find((c) => c.label === 'E')!.block).toEqual([['8']]);
  });
  it('no Hamiltonian: the decomposition alone', async () => {
    const r = await componentsResult(options(['group', 'dihedral:3'], ['on', 'q1,q2']));
    expect(decomposition(r.components)).toEqual({ E: 2 });
    expect(r.components[0]!.block).toBeUndefined();
    expect(r.classes[0]).toMatchObject({ number: 1, algebra: 'sp(2,R)', dimensionOfClass: 3, dimensionOfGroup: 3 });
  });
  it('floating numbers: floating blocks, exact bases', async () => {
    const r = await componentsResult(file(ring('parameters: {c: -1/3, k: log(2)}\nvary: [c]')));
    expect(r.arithmetic).toBe('floating');
    const e = r.components.find((c) => c.label === 'E')!;
    expect(e.basis).toEqual(['q2 - q3']);
    expect(e.block![0]![0]).toBeCloseTo(2 * (Math.log(2) - 1), 12);
  });
});

describe('refusals', () => {
  it('H that is not invariant for every value of a parameter without value', async () => {
    await expect(componentsResult(file(ring('', '+ eps*q1')))).rejects.toThrow(/not invariant/);
  });
  it('a point that is no equilibrium', async () => {
    await expect(componentsResult(options(['hamiltonian', 'p1^2/2 + a*q1 + q1^2']))).rejects.toThrow(/not an equilibrium/);
  });
  it('a generator declared to reverse time that does not', async () => {
    const text = `
coordinates: [q1]
hamiltonian: p1^2 + q1^2
symmetry: {generators: [{name: g, map: {q1: -q1, p1: -p1}, reversing: true}]}
`;
    await expect(componentsResult(file(text))).rejects.toThrow(/declared to reverse time/);
  });
  it('a degenerate form', async () => {
    const text = `
coordinates: [x]
momenta: [y]
symplectic: [[0, 0], [0, 0]]
hamiltonian: x^2 + y^2
`;
    await expect(componentsResult(file(text))).rejects.toThrow(/degenerate/);
  });
});

describe('molecules of the samples (E. B. Wilson, J. C. Decius, P. C. Cross, Molecular Vibrations, 1955; Wilson 1934)', () => {
  it('benzene: each displacement twice, for coordinates and momenta', async () => {
    const r = await componentsResult(sample('benzene'));
    const displacements = { A1g: 2, A2g: 2, A2u: 2, B1u: 2, B2g: 2, B2u: 2, E1g: 2, E1u: 4, E2g: 4, E2u: 2 };
    expect(decomposition(r.components)).toEqual(Object.fromEntries(Object.entries(displacements).map(([k, m]) => [k, 2 * m])));
    expect(r.classes.every((c) => c.number === 1)).toBe(true);
  }, 30_000);
  it('methane with time reversal: once each, momenta with the label of the other parity', async () => {
    const r = await componentsResult(sample('methane'));
    expect(decomposition(r.components)).toEqual({ A1: 1, 'A1-': 1, E: 1, 'E-': 1, T1: 1, 'T1-': 1, T2: 3, 'T2-': 3 });
    expect(r.classes.find((c) => c.components.includes('T2'))).toMatchObject({ algebra: 'sp(6,R)', subalgebra: 'gl(3,R)' });
  });
  it('water in the plane of x and z: 3 A1 + A2 + 3 B1 + 2 B2', async () => {
    expect(decomposition((await componentsResult(sample('water'))).components)).toEqual({ A1: 6, A2: 2, B1: 6, B2: 4 });
  });
});

describe('the adapted basis is one: independent, S block diagonal with equal blocks', () => {
  it.each(['methane', 'quaternion-oscillator', 'turntable-bead', 'pendulum-ring', 'vortex-heptagon'])('%s', async (name) => {
    const r = await componentsResult(sample(name));
    const names = [...r.model.coordinates, ...r.model.momenta];
    const at = new Map(Object.entries(r.model.parameters).map(([k, v]) => [k, number(v!)]));
    const spaces = r.components.flatMap((c) => [
      { forms: c.basis!, factor: 1, c },
      ...(c.partners ?? []).map((p) => ({ forms: p.basis, factor: number(p.factor), c })),
    ]);
    const columns = spaces.flatMap((s) => s.forms.map((f) => vector(f, names)));
    expect(columns).toHaveLength(names.length);
    // the blocks determine S on the basis; invert the change of basis and look whether S is invariant under that description
    const gram = columns.map((u) => columns.map((v) => u.reduce((t, x, i) => t + x * v[i]!, 0)));
    expect(Math.abs(determinant(gram))).toBeGreaterThan(1e-9);
    // S rebuilt from the first copies must agree with the blocks of ω and L of the flow: L = JS there
    for (const k of r.classes) {
      const s = k.stiffness!.map((row) => row.map((v) => number(v, at)));
      const w = k.form!.map((row) => row.map((v) => number(v, at)));
      const l = k.flow!.map((row) => row.map((v) => number(v, at)));
      // WᵀL = S
      s.forEach((row, i) => {
        row.forEach((x, j) => {
          expect(w.reduce((t, wr, m) => t + wr[i]! * l[m]![j]!, 0)).toBeCloseTo(x, 9);
        });
      });
    }
  });
  it('methane: S of the potential itself on all spaces', async () => {
    const r = await componentsResult(sample('methane'));
    const names = [...r.model.coordinates, ...r.model.momenta];
    const at = new Map([['kHH', 0]]);
    // central springs from the carbon atom to the corners, masses 12 and 1
    const corners = [
      [1, 1, 1],
      [1, -1, -1],
      [-1, 1, -1],
      [-1, -1, 1],
    ];
    const s = names.map(() => new Array<number>(names.length).fill(0));
    corners.forEach((d, a) => {
      for (let i = 0; i < 3; i++)
        for (let j = 0; j < 3; j++) {
          const x = (d[i]! * d[j]!) / 3;
          for (const [u, v, sign] of [
            [0, 0, 1],
            [a + 1, a + 1, 1],
            [0, a + 1, -1],
            [a + 1, 0, -1],
          ] as const)
            s[3 * u + i]![3 * v + j]! += sign * x;
        }
    });
    for (let i = 0; i < 15; i++) s[15 + i]![15 + i] = i < 3 ? 1 / 12 : 1;
    const spaces = r.components.flatMap((c) => [
      { forms: c.basis!, factor: 1, block: c.block! },
      ...(c.partners ?? []).map((p) => ({ forms: p.basis, factor: number(p.factor), block: c.block! })),
    ]);
    const vectors = spaces.map((x) => x.forms.map((f) => vector(f, names)));
    spaces.forEach((x, a) => {
      spaces.forEach((_, b) => {
        vectors[a]!.forEach((u, i) => {
          vectors[b]!.forEach((v, j) => {
            expect(bilinear(s, u, v)).toBeCloseTo(a === b ? x.factor * number(x.block[i]![j]!, at) : 0, 9);
          });
        });
      });
    });
  });
});

function determinant(m: readonly (readonly number[])[]): number {
  const a = m.map((r) => [...r]);
  let d = 1;
  for (let j = 0; j < a.length; j++) {
    const p = a.reduce((best, r, i) => (i >= j && Math.abs(r[j]!) > Math.abs(a[best]![j]!) ? i : best), j);
    [a[j], a[p]] = [a[p]!, a[j]!];
    const pivot = a[j]![j]!;
    if (Math.abs(pivot) < 1e-12) return 0;
    d *= pivot;
    for (let i = j + 1; i < a.length; i++) {
      const g = a[i]![j]! / pivot;
      for (let k = j; k < a.length; k++) a[i]![k]! -= g * a[j]![k]!;
    }
  }
  return d;
}
