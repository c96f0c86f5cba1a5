/** Sweeps: branches that move, collisions and passages, families of matrices, grids, what is refused. */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { InputError, NotAnEquilibriumError, NotInvariantError, UsageError } from '../../src/errors/index.ts';
import { declareFile, declareObject, declareOptions, type OptionModel } from '../../src/index.ts';
import { numberRows } from '../../src/linear/index.ts';
import { sweepResult } from '../../src/study/sweep.ts';
import { blockEigenvalues, bracketed } from '../../src/study/sweep-spectrum.ts';

const sample = (name: string) => declareFile(new URL(`../../samples/${name}.yaml`, import.meta.url).pathname);
const sweepOf = (hamiltonian: string, range: OptionModel['range'], rest: OptionModel = {}) =>
  sweepResult(declareOptions({ hamiltonian, ...rest, ...(range === undefined ? {} : { range }) }));

describe('zeros', () => {
  it('of the ring of three resonators: c = -1/3, with the signature on both sides', async () => {
    const { crossings, arithmetic } = await sweepResult(sample('three-resonator-ring'));
    expect(arithmetic).toBe('exact');
    expect(crossings).toMatchObject([
      {
        parameter: 'c',
        exact: '-1/3',
        component: 'E1',
        kernel: 2,
        motion: 'splits',
        codimension: 1,
        codimensionWithoutSymmetry: 4,
        inertiaBefore: { positive: 4, zero: 0, negative: 2 },
        inertiaAfter: { positive: 6, zero: 0, negative: 0 },
      },
    ]);
  });

  it('of a whirling shaft with matrices affine in the stiffness: k = 1/3 and 1 pass', async () => {
    const { crossings } = await sweepResult(sample('whirling-shaft'));
    expect(crossings.map((c) => [c.exact, c.motion, c.observed.motion, c.codimension])).toEqual([
      ['1/3', 'passes', 'passes', 1],
      ['1', 'passes', 'passes', 1],
    ]);
  });

  it('of a rational family, not at its pole', async () => {
    const { crossings } = await sweepOf('p^2/2 + (mu - 1)/(mu + 1)*q^2/2', { mu: [-3, 3] });
    expect(crossings.map((c) => c.exact)).toEqual(['1']);
  });

  it('of a transcendental family: exp(mu) = 2 at log 2', async () => {
    const result = await sweepOf('p^2/2 + (exp(mu) - 2)*q^2/2', { mu: [-3, 3] });
    expect(result).toMatchObject({
      arithmetic: 'floating',
      followed: false,
      crossings: [{ exact: null, codimension: 1, motion: 'splits' }],
    });
    expect(Math.abs(result.crossings[0]!.value - Math.log(2))).toBeLessThan(1e-15);
  });

  it('of double eigenvalues in floating point, which no determinant shows by its sign', async () => {
    const { crossings } = await sweepOf('(exp(mu) - 2)*(q1^2 + p1^2)/2', { mu: [-3, 3] }, { group: 'cyclic:3', on: [['q1', 'p1']] });
    expect(crossings).toMatchObject([{ kernel: 2, blocks: [1, 1], codimension: 1, motion: 'passes', observed: { motion: 'passes' } }]);
  });

  it('without closed form have their polynomial and thirty digits', async () => {
    const { crossings } = await sweepOf('p^2/2 + (mu^3 - 2)*q^2/2', { mu: [-3, 3] });
    expect(crossings).toMatchObject([{ exact: null, polynomial: 'mu^3 - 2', digits: '1.259921049894873164767210607278', versal: true }]);
  });

  it('of two components at once are one event of codimension 2', async () => {
    const { crossings } = await sweepOf(
      '(p1^2 + p2^2)/2 + mu*(q1^2 + q2^2)/2 + q1^4',
      { mu: [-1, 1] },
      { group: 'reflection', on: [['q1']] },
    );
    expect(crossings).toMatchObject([{ kernel: 2, codimension: 2, motion: 'degenerate', agrees: null }]);
    expect(crossings[0]!.component.split(' + ')).toHaveLength(2);
  });
});

describe('branches that move', () => {
  it('a fold: electrostatic pull-in at v = 4/27 (H. C. Nathanson and others 1967)', async () => {
    const result = await sweepResult(sample('pull-in-fold'));
    expect(result).toMatchObject({
      followed: true,
      crossings: [{ exact: '4/27', fold: true, motion: 'splits', codimension: 1, versal: true }],
    });
  });

  it('the same fold found from an equilibrium elsewhere, to the last digits', async () => {
    // at q = 1/4, v = q(1 - q)² = 9/64
    const declaration = declareObject({
      coordinates: ['q'],
      momenta: ['p'],
      parameters: { v: '9/64' },
      vary: ['v'],
      range: { v: ['1/10', '1/5'] },
      hamiltonian: 'p^2/2 + q^2/2 - v/(1 - q)',
      equilibrium: { q: '1/4' },
    });
    const { crossings } = await sweepResult(declaration);
    expect(crossings).toHaveLength(1);
    expect(crossings[0]).toMatchObject({ exact: null, fold: true });
    expect(Math.abs(crossings[0]!.value - 4 / 27)).toBeLessThan(1e-15);
  });

  it('a declared branch with its own value for each parameter stays exact', async () => {
    // q = mu along q²/2 - mu q: the second coordinate has stiffness q - 1/2
    const declaration = declareObject({
      coordinates: ['q', 'r'],
      momenta: ['p', 's'],
      parameters: { mu: 0 },
      vary: ['mu'],
      range: { mu: [-1, 1] },
      hamiltonian: '(p^2 + s^2)/2 + q^2/2 - mu*q + (q - 1/2)*r^2/2',
      equilibrium: { q: 'mu' },
    });
    expect(await sweepResult(declaration)).toMatchObject({
      arithmetic: 'exact',
      followed: false,
      crossings: [{ exact: '1/2', codimension: 1 }],
    });
  });

  it('a point that is no equilibrium anywhere is refused', async () => {
    await expect(
      sweepOf('p^2/2 + q^2/2 + exp(q)*(2 + mu^2) - q^2', { mu: [-1, 1] }, { group: 'reflection', on: [['q', 'p']] }),
    ).rejects.toThrow(/invariant|equilibrium/);
    await expect(sweepOf('p^2/2 + q + mu^2*q', { mu: [-1, 1] })).rejects.toThrow(NotAnEquilibriumError);
  });
});

describe('collisions off zero', () => {
  it('of opposite signs leave the axis: frequencies 1 and w coupled by 1/10, at w² = 4/5 and 6/5', async () => {
    const { collisions } = await sweepOf('(p1^2 + q1^2)/2 - (p2^2 + w^2*q2^2)/2 + q1*q2/10', { w: ['1/2', 2] });
    expect(collisions.map((c) => [c.kind, c.motion, c.signs])).toEqual([
      ['imaginary', 'splits', [1, -1]],
      ['imaginary', 'splits', [1, -1]],
    ]);
    expect(Math.abs(collisions[0]!.at ** 2 - 0.8)).toBeLessThan(1e-12);
    expect(Math.abs(collisions[1]!.at ** 2 - 1.2)).toBeLessThan(1e-12);
  });

  it('of equal signs never happen in one component, and pass in two', async () => {
    expect((await sweepOf('(p1^2 + q1^2)/2 + (p2^2 + w^2*q2^2)/2 + q1*q2/10', { w: ['1/2', 2] })).collisions).toEqual([]);
    const { collisions } = await sweepOf('(p1^2 + q1^2)/2 + (p2^2 + w^2*q2^2)/2', { w: ['1/2', 2] }, { group: 'reflection', on: [['q1']] });
    expect(collisions).toMatchObject([{ kind: 'imaginary', motion: 'passes', signs: [1, 1] }]);
    expect(Math.abs(collisions[0]!.at - 1)).toBeLessThan(1e-12);
  });
});

describe('pictures', () => {
  it('tracks keep their component and the sign of the energy', async () => {
    const { paths } = await sweepOf('(p1^2 + q1^2)/2 - (p2^2 + w^2*q2^2)/2', { w: [2, 3, 20] }, { group: 'reflection', on: [['q1']] });
    expect(paths.paths.map((p) => [...new Set(p.points.map((x) => x.sign))]).sort()).toEqual([[-1], [1]]);
    for (const { points } of paths.paths) expect(points).toHaveLength(21);
  });

  it('two ranges give the curves of each component: k = W² and k = 0', async () => {
    const { chart } = await sweepOf(
      '(p1^2 + p2^2)/2 + k*(q1^2 + q2^2)/2 - W*(q1*p2 - q2*p1)',
      { k: ['1/10', 2], W: ['1/10', '13/10'] },
      { group: 'cyclic:4', on: [['q1', 'q2']], vary: ['k', 'W'] },
    );
    expect(chart!.parameters).toEqual(['k', 'W']);
    expect(chart!.curves).toHaveLength(1);
    for (const [k, w] of chart!.curves[0]!.points) expect(Math.abs(k - w * w)).toBeLessThan(1e-12);
  });
});

describe('matrices from files', () => {
  it('affine in a parameter, floating in the file: k = 1 where a spring of -1 is balanced', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'sweep-'));
    try {
      const head = '%%MatrixMarket matrix coordinate real general\n2 2';
      writeFileSync(join(folder, 'k0.mtx'), `${head} 2\n1 1 -1.0\n2 2 3.5\n`);
      writeFileSync(join(folder, 'k1.mtx'), `${head} 2\n1 1 1.0\n2 2 1.0\n`);
      writeFileSync(
        join(folder, 'model.yaml'),
        'mass: [[1, 0], [0, 1]]\nstiffness: {constant: k0.mtx, k: k1.mtx}\nparameters: {k: 1}\nvary: [k]\nrange: {k: [0, 2]}\n',
      );
      const { crossings } = await sweepResult(declareFile(join(folder, 'model.yaml')));
      expect(crossings).toMatchObject([{ kernel: 1, codimension: 1, motion: 'splits' }]);
      expect(Math.abs(crossings[0]!.value - 1)).toBeLessThan(1e-15);
    } finally {
      rmSync(folder, { recursive: true });
    }
  });
});

describe('what is refused', () => {
  it('no range, an empty one, a parameter that is not there or has no part in H, another without a value', async () => {
    await expect(sweepOf('p^2/2 + mu*q^2/2', undefined)).rejects.toThrow(UsageError);
    await expect(sweepOf('p^2/2 + mu*q^2/2', { mu: [1, 1] })).rejects.toThrow(InputError);
    await expect(sweepOf('p^2/2 + mu*q^2/2 + k*q^2', { mu: [0, 1] })).rejects.toThrow(/k has no value/);
    await expect(sweepOf('p^2/2 + mu*q^2/2', { mu: [0, 1] }, { group: 'cyclic:4', on: [['q', 'p']] })).rejects.toThrow(NotInvariantError);
  });
});

describe('routines', () => {
  it('eigenvalues of empty and of small blocks', () => {
    const w = numberRows([
      [0, 1],
      [-1, 0],
    ]);
    expect(blockEigenvalues(numberRows([], 0), numberRows([], 0))).toEqual([]);
    expect(
      blockEigenvalues(
        numberRows([
          [4, 0],
          [0, 1],
        ]),
        w,
      ),
    ).toEqual([{ re: 0, im: 2, sign: 1 }]);
    expect(
      blockEigenvalues(
        numberRows([
          [-4, 0],
          [0, -1],
        ]),
        w,
      ),
    ).toEqual([{ re: 0, im: 2, sign: -1 }]);
    expect(
      blockEigenvalues(
        numberRows([
          [-4, 0],
          [0, 1],
        ]),
        w,
      ),
    ).toEqual([{ re: 2, im: 0, sign: 0 }]);
    expect(
      blockEigenvalues(
        numberRows([
          [0, 0],
          [0, 1],
        ]),
        w,
      ),
    ).toEqual([{ re: 0, im: 0, sign: 0 }]);
  });

  it('bracketed zeros to the last digits', () => {
    for (const c of [0.3, 1e-9, 0.999999999, 0.5]) {
      const f = (t: number) => Math.atan(50 * (t - c));
      expect(Math.abs(bracketed(f, f(0), f(1)) - c)).toBeLessThan(1e-15);
    }
  });
});
