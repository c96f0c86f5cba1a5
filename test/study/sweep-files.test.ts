/**
 * Sweeps from file to file. A ring of N equal masses with springs of stiffness k to the ground and c to the neighbours
 * has ω² = k + 4c sin²(πj/N) (M. Born, T. von Kármán 1912), so that mode j meets zero at c = −k/(4 sin²(πj/N)).
 */
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { InputError, NotAnEquilibriumError, NotInvariantError, UsageError } from '../../src/errors/index.ts';
import { codim, type Declaration, declareText, sweep } from '../../src/index.ts';
import { readModelText } from '../../src/model/declaration/index.ts';
import { renderMarkdown } from '../../src/report/index.ts';

const root = mkdtempSync(join(tmpdir(), 'files-'));
afterAll(() => rmSync(root, { recursive: true }));
let folders = 0;

type Rows = readonly (readonly number[])[];

/** The ring as a matrix, times `unit`. */
const ring = (n: number, k: number, c: number, unit = 1): Rows =>
  Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (_, j) => {
      const bonds = (i === j ? 2 : 0) - (j === (i + 1) % n ? 1 : 0) - (i === (j + 1) % n ? 1 : 0);
      return (i === j ? k * unit : 0) + c * unit * bonds;
    }),
  );
const identity = (n: number, m = 1): Rows => Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => (i === j ? m : 0)));

/** Integers exactly, other numbers as doubles. */
function matrixMarket(rows: Rows, field = 'integer'): string {
  const entries = rows.flatMap((row, i) =>
    row.flatMap((x, j) => (x === 0 ? [] : [`${i + 1} ${j + 1} ${field === 'real' ? x.toExponential(16) : x}`])),
  );
  return `%%MatrixMarket matrix coordinate ${field} general\n${rows.length} ${rows.length} ${entries.length}\n${entries.join('\n')}\n`;
}

/** A model in a folder of its own, with its matrix files. */
function modelWith(files: Readonly<Record<string, Rows>>, text: string, field?: string): Declaration {
  const folder = join(root, `${folders++}`);
  mkdirSync(folder);
  for (const [name, rows] of Object.entries(files)) writeFileSync(join(folder, `${name}.mtx`), matrixMarket(rows, field));
  return readModelText(text, join(folder, 'model.yaml'), folder);
}

const sites = (n: number) => Array.from({ length: n }, (_, i) => `q${i + 1}`).join(', ');
const symmetry = (n: number) => `symmetry: {group: dihedral:${n}, action: ring, on: [[${sites(n)}]], timeReversal: true}\n`;
const mass = (n: number) => `mass: [${identity(n).map((r) => `[${r}]`)}]\n`;

/** The ring with couplings given file by file. */
function rings(n: number, k: number, couplings: readonly number[], more = 'vary: n\n', { field = 'integer', unit = 1 } = {}): Declaration {
  const files = Object.fromEntries(couplings.map((c, i) => [`K-${i + 1}`, ring(n, k, c, unit)]));
  return modelWith(files, `${mass(n)}stiffness: {parameter: n, files: K-*.mtx}\n${symmetry(n)}${more}`, field);
}

describe('exact files', () => {
  it('a ring of three: the double zero of E at c = -1/3 of k, between the files with c = 0 and c = -1', async () => {
    const result = await sweep(rings(3, 3, [2, 0, -3]));
    expect(result).toMatchObject({ arithmetic: 'exact', range: { from: '1', to: '3' }, singular: [] });
    expect(result.crossings).toMatchObject([
      {
        // c = -3(n - 2) = -1
        exact: '7/3',
        kernel: 2,
        blocks: [2, 2],
        motion: 'splits',
        observed: { motion: 'splits' },
        agrees: true,
        codimension: 1,
        codimensionWithoutSymmetry: 4,
        versal: true,
        arithmetic: 'exact',
        between: ['K-2.mtx', 'K-3.mtx'],
        inertiaBefore: { positive: 6, zero: 0, negative: 0 },
        inertiaAfter: { positive: 4, zero: 0, negative: 2 },
      },
    ]);
    expect(result.crossings[0]!.file).toBeUndefined();
  });

  it('a ring of six, bent at a file: each mode at its own value, in order', async () => {
    // c = 0, -2, -12 at n = 1, 2, 3; k = 12: j = 3 at c = -3, j = 2 at c = -4, j = 1 at c = -12
    const { crossings } = await sweep(rings(6, 12, [0, -2, -12]));
    expect(crossings.map((c) => [c.exact, c.kernel, c.between ?? c.file])).toEqual([
      ['21/10', 1, ['K-2.mtx', 'K-3.mtx']],
      ['11/5', 2, ['K-2.mtx', 'K-3.mtx']],
      ['3', 2, 'K-3.mtx'],
    ]);
  });

  it('listed values that are fractions; irrational thresholds in closed form', async () => {
    // a ring of five: 4 sin²(2π/5) = (5 + √5)/2, c falls from 0 to -1 between 1/3 and 1/2
    const declaration = modelWith(
      { a: ring(5, 1, 0), b: ring(5, 1, -1) },
      `${mass(5)}stiffness: {parameter: s, files: {1/2: b.mtx, 1/3: a.mtx}}\n${symmetry(5)}vary: s\n`,
    );
    const { crossings } = await sweep(declaration);
    const at = (j: number) => 1 / 3 + 1 / (4 * Math.sin((Math.PI * j) / 5) ** 2) / 6;
    expect(crossings).toHaveLength(2);
    expect(crossings.every((c) => c.exact?.includes('sqrt(5)'))).toBe(true);
    crossings.forEach((c, i) => {
      expect(Math.abs(c.value - at(2 - i))).toBeLessThan(1e-14);
    });
  });

  it('at a file: the file is named; versal where the family goes through, not where it turns back', async () => {
    const through = await sweep(rings(4, 4, [0, -1, -3]));
    expect(through.crossings[0]).toMatchObject({ exact: '2', file: 'K-2.mtx', versal: true, observed: { motion: 'splits' }, agrees: true });
    const back = await sweep(rings(4, 4, [0, -1, 0]));
    expect(back.crossings).toMatchObject([{ exact: '2', file: 'K-2.mtx', versal: false, observed: { motion: 'passes' }, agrees: false }]);
    expect(back.crossings[0]!.inertiaBefore).toEqual(back.crossings[0]!.inertiaAfter);
    // stays at zero for a while: singular only there
    const stays = await sweep(rings(4, 4, [0, -1, -1, 0]));
    expect(stays.singular).toEqual([]);
    expect(stays.crossings.map((c) => c.exact)).toEqual(['2', '3']);
  });

  it('the table holds the frequencies by component at each file, in one order', async () => {
    const couplings = [2, 1, -1];
    const { files, paths } = await sweep(rings(4, 5, couplings));
    expect(files).toMatchObject({ parameter: 'n', note: 'between the files the matrix is interpolated' });
    expect(files!.points.map((p) => [p.value, p.at, p.files, p.inertia.positive])).toEqual(
      couplings.map((_, i) => [`${i + 1}`, i + 1, [`K-${i + 1}.mtx`], 8]),
    );
    const labels = files!.points.map((p) => p.eigenvalues.map((e) => e.component));
    expect(labels[1]).toEqual(labels[0]);
    files!.points.forEach((p, i) => {
      const frequencies = p.eigenvalues.flatMap((e) => e.values.map((v) => v.im));
      const wanted = [0, 2, 1].map((j) => Math.sqrt(5 + 4 * couplings[i]! * Math.sin((Math.PI * j) / 4) ** 2));
      expect(frequencies).toHaveLength(3);
      frequencies.forEach((f, j) => {
        expect(Math.abs(f - wanted[j]!)).toBeLessThan(1e-12);
      });
    });
    for (const path of paths.paths) for (const p of files!.points) expect(path.points.some((x) => x.at === p.at)).toBe(true);
  });

  it('of mass and stiffness together, at values of their own; frequencies of the interpolated pair', async () => {
    const declaration = modelWith(
      { 'M-0': identity(2), 'M-2': identity(2, 3), K0: ring(2, 4, 0), K1: ring(2, 1, 0), K2: ring(2, -1, 0) },
      'mass: {parameter: t, files: {0: M-0.mtx, 2: M-2.mtx}}\nstiffness: {parameter: t, files: {0: K0.mtx, 1: K1.mtx, 2: K2.mtx}}\nvary: t\n',
    );
    const { crossings, files } = await sweep(declaration);
    expect(crossings).toMatchObject([{ exact: '3/2', kernel: 2, between: ['M-0.mtx, K1.mtx', 'M-2.mtx, K2.mtx'] }]);
    expect(files!.points.map((p) => p.files.join(' '))).toEqual(['M-0.mtx K0.mtx', 'K1.mtx', 'M-2.mtx K2.mtx']);
    // M = 2, K = 1
    expect(Math.abs(files!.points[1]!.eigenvalues[0]!.values[0]!.im - Math.sqrt(0.5))).toBeLessThan(1e-13);
  });

  it('with gyroscopic forces the pair passes: K = 0 is stabilised on both sides', async () => {
    const declaration = modelWith(
      {
        'K-0': identity(2, 3),
        'K-1': identity(2, 1),
        'K-2': identity(2, -1),
        G0: [
          [0, -6],
          [6, 0],
        ],
        G2: [
          [0, -8],
          [8, 0],
        ],
      },
      'mass: [[1, 0], [0, 1]]\ngyroscopic: {parameter: n, files: {0: G0.mtx, 2: G2.mtx}}\nstiffness: {parameter: n, files: K-*.mtx}\n' +
        'symmetry: {group: cyclic:4, on: [[q1, q2]]}\nvary: n\n',
    );
    const { crossings } = await sweep(declaration);
    expect(crossings).toMatchObject([
      { exact: '3/2', kernel: 2, blocks: [1, 1], motion: 'passes', observed: { motion: 'passes' }, codimension: 1, versal: true },
    ]);
  });

  it('a quadratic energy by files; a range inside the files', async () => {
    const declaration = modelWith(
      {
        a: [
          [2, 0],
          [0, 1],
        ],
        b: [
          [-1, 0],
          [0, 1],
        ],
      },
      'quadratic: {parameter: mu, files: {0: a.mtx, 1: b.mtx}}\nparameters: {mu: 0}\nvary: mu\nrange: {mu: [1/2, 9/10, 10]}\n',
    );
    const result = await sweep(declaration);
    expect(result).toMatchObject({ range: { from: '1/2', to: '9/10', steps: 10 }, files: { points: [] } });
    expect(result.crossings).toMatchObject([{ exact: '2/3', motion: 'splits', between: ['a.mtx', 'b.mtx'] }]);
  });

  it('another parameter is swept with the matrix at the declared value', async () => {
    // K = 1/2 halfway from 2 to -1
    const declaration = (n: string) =>
      modelWith(
        {
          a: [
            [0, 0],
            [0, 1],
          ],
          b: [
            [2, 0],
            [0, 1],
          ],
          c: [
            [-1, 0],
            [0, 1],
          ],
        },
        `quadratic: {parameter: n, files: {0: a.mtx, 1: b.mtx, 2: c.mtx}}\nparameters: {n: ${n}, w: 1}\nvary: w\nrange: {w: [1, 3]}\n` +
          'symplectic: [[0, w], [-w, 0]]\n',
      );
    const result = await sweep(declaration('3/2'));
    expect(result.files).toBeUndefined();
    expect(result.crossings).toEqual([]);
    expect(result.model.interpolated).toHaveLength(1);
    // frequency sqrt(1/2)/w
    expect(Math.abs(result.paths.paths[0]!.points[0]!.im - Math.sqrt(0.5))).toBeLessThan(1e-11);
    expect((await sweep(declaration('1'))).model.interpolated).toBeUndefined();
  });
});

describe('floating files', () => {
  const unit = 1e7 * Math.SQRT2;

  it('the same ring in other units: the value to 1e-12, the same motion and inertia', async () => {
    const result = await sweep(rings(3, 3, [2, 0, -3], 'vary: n\n', { field: 'real', unit }));
    expect(result.arithmetic).toBe('floating');
    expect(result.floatingBecause).toContain('K-1.mtx');
    expect(result.crossings).toMatchObject([
      {
        exact: null,
        kernel: 2,
        blocks: [2, 2],
        motion: 'splits',
        agrees: true,
        codimension: 1,
        versal: true,
        between: ['K-2.mtx', 'K-3.mtx'],
        inertiaBefore: { positive: 6, zero: 0, negative: 0 },
        inertiaAfter: { positive: 4, zero: 0, negative: 2 },
      },
    ]);
    expect(Math.abs(result.crossings[0]!.value - 7 / 3)).toBeLessThan(1e-12);
  });

  it('an event within the tolerance of a file is at the file', async () => {
    for (const off of [1e-10, -1e-10]) {
      const { crossings } = await sweep(rings(4, 4, [0, -1 + off, -3], 'vary: n\n', { field: 'real', unit }));
      expect(crossings[0]).toMatchObject({ value: 2, file: 'K-2.mtx', kernel: 1, versal: true });
    }
    const { crossings } = await sweep(rings(4, 4, [0, -1 + 1e-3, -3], 'vary: n\n', { field: 'real', unit }));
    expect(crossings[0]!.between).toEqual(['K-2.mtx', 'K-3.mtx']);
  });

  it('two routes: integers read as floating numbers, with masses and velocities that vary', async () => {
    const text =
      'mass: {parameter: n, files: M-*.mtx}\ngyroscopic: {parameter: n, files: G-*.mtx}\nstiffness: {parameter: n, files: K-*.mtx}\n' +
      'symmetry: {group: cyclic:4, on: [[q1, q2]]}\nvary: n\n';
    const files: Record<string, Rows> = {};
    [4, 1, -1].forEach((k, i) => {
      files[`K-${i}`] = identity(2, k);
      files[`M-${i}`] = identity(2, i + 1);
      files[`G-${i}`] = [
        [0, -3 - i],
        [3 + i, 0],
      ];
    });
    const exact = await sweep(modelWith(files, text));
    const floating = await sweep(modelWith(files, `${text}numbers: floating\n`));
    expect([exact.arithmetic, floating.arithmetic]).toEqual(['exact', 'floating']);
    expect(floating.crossings.map((c) => [c.component, c.kernel, c.blocks, c.motion, c.codimension])).toEqual(
      exact.crossings.map((c) => [c.component, c.kernel, c.blocks, c.motion, c.codimension]),
    );
    expect(exact.crossings.map((c) => c.exact)).toEqual(['3/2']);
    expect(Math.abs(floating.crossings[0]!.value - 1.5)).toBeLessThan(1e-13);
    floating.files!.points.forEach((p, i) => {
      p.eigenvalues[0]!.values.forEach((v, k) => {
        expect(Math.abs(v.im - exact.files!.points[i]!.eigenvalues[0]!.values[k]!.im)).toBeLessThan(1e-12);
      });
    });
  });

  it('a free ring: the translation is singular throughout, the others meet zero once', async () => {
    const free = rings(3, 0, [2, 1, -3], 'vary: n\n', { field: 'real', unit });
    const bound = await sweep({ ...free, groups: [], timeReversal: false });
    // one component of all: c = 0 at n = 2 + 1/4
    expect(bound.singular).toHaveLength(1);
    expect(bound.crossings).toHaveLength(1);
    expect(Math.abs(bound.crossings[0]!.value - 2.25)).toBeLessThan(1e-12);
    expect(bound.crossings[0]).toMatchObject({
      inertiaBefore: { positive: 5, zero: 1 },
      inertiaAfter: { positive: 3, zero: 1, negative: 2 },
    });
    const symmetric = await sweep(free);
    expect(symmetric.singular).toHaveLength(1);
    expect(symmetric.crossings).toHaveLength(1);
  });
});

describe('at one value', () => {
  const text = (n: string) => `parameters: {n: ${n}}\nvary: n\n`;

  it('a listed value has the matrix of the file: the codimensions of the ring of three', async () => {
    const result = await codim(rings(3, 3, [0, -1, -3], text('2')));
    expect(result.zero).toMatchObject({ kernel: 2, codimension: 1, codimensionWithoutSymmetry: 4, motion: 'splits' });
    expect(result.verdict).toMatchObject({ answer: 'generic', versal: true });
    expect(result.model.interpolated).toBeUndefined();
    const floating = await codim(rings(3, 3, [0, -1, -3], text('2'), { field: 'real', unit: Math.SQRT2 }));
    expect(floating.zero).toMatchObject({ kernel: 2, codimension: 1, motion: 'splits' });
  });

  it('a value between is that of the affine family, and the result says so', async () => {
    const result = await codim(rings(3, 3, [2, 0, -3], text('7/3')));
    expect(result.zero).toMatchObject({ kernel: 2, codimension: 1, codimensionWithoutSymmetry: 4 });
    expect(result.model.interpolated).toEqual(['n = 7/3 lies between K-2.mtx and K-3.mtx: between the files the matrix is interpolated']);
    expect(await renderMarkdown([result as never])).toContain('between the files the matrix is interpolated');
  });

  it('a value beyond the files, or none, is wrong input', async () => {
    await expect(codim(rings(3, 3, [2, 0, -3], text('4')))).rejects.toThrow(
      /n = 4 lies outside the files of stiffness, which go from 1 to 3/,
    );
    await expect(codim(rings(3, 3, [2, 0, -3]))).rejects.toThrow(/n has no value/);
    await expect(codim(rings(3, 3, [2, 0, -3], `${text('0.5')}numbers: floating\n`))).rejects.toThrow(InputError);
  });
});

describe('the report', () => {
  it('names the files of each event and lists every file', async () => {
    const result = await sweep(rings(4, 4, [0, -1, -3]));
    const text = await renderMarkdown([result as never]);
    expect(text).toContain('at K-2.mtx');
    expect(text).toContain('K-2.mtx to K-3.mtx');
    expect(text).toContain('between the files the matrix is interpolated');
  });
});

describe('what is refused', () => {
  it('a file that is not invariant, by name, exact or floating', async () => {
    for (const field of ['integer', 'real']) {
      for (const bad of [0, 1, 2]) {
        const files = Object.fromEntries(
          [0, 1, 2].map((i) => [
            `K-${i}`,
            i === bad ? ring(3, 3, 1).map((r, a) => r.map((x, b) => (a === 0 && b === 0 ? x + 1 : x))) : ring(3, 3, 1 - i),
          ]),
        );
        const declaration = modelWith(files, `${mass(3)}stiffness: {parameter: n, files: K-*.mtx}\n${symmetry(3)}vary: n\n`, field);
        const error = await sweep(declaration).catch((e: unknown) => e);
        expect(error).toBeInstanceOf(NotInvariantError);
        expect((error as Error).message).toContain(`K-${bad}.mtx is not invariant under r`);
      }
    }
  });

  it('a range beyond the files, a grid, families that share no interval, a point that is no equilibrium', async () => {
    await expect(sweep(rings(3, 3, [2, 0, -3], 'vary: n\nrange: {n: [0, 2]}\n'))).rejects.toThrow(/goes beyond the files/);
    const grid = modelWith(
      { a: [[1]], b: [[2]] },
      'mass: {m: [[1]]}\nstiffness: {parameter: n, files: {0: a.mtx, 1: b.mtx}}\nparameters: {m: 1}\nvary: [n, m]\nrange: {n: [0, 1], m: [1, 2]}\n',
    );
    await expect(sweep(grid)).rejects.toThrow(UsageError);
    const apart = modelWith(
      { a: [[1]], b: [[2]] },
      'mass: {parameter: n, files: {0: a.mtx, 1: b.mtx}}\nstiffness: {parameter: n, files: {2: a.mtx, 3: b.mtx}}\nvary: n\n',
    );
    await expect(sweep(apart)).rejects.toThrow(/no interval of values in common/);
    for (const field of ['integer', 'real']) {
      const off = modelWith(
        { a: [[1]], b: [[2]] },
        'mass: [[1]]\nstiffness: {parameter: n, files: {0: a.mtx, 1: b.mtx}}\nvary: n\nequilibrium: {q1: 1}\n',
        field,
      );
      await expect(sweep(off)).rejects.toThrow(NotAnEquilibriumError);
    }
  });

  it('a matrix typed in place of a file keeps its own message', () => {
    expect(() => declareText('mass: [[1]]\nstiffness: {parameter: [[1]], files: [[2]]}\n')).not.toThrow();
    expect(() => declareText('mass: [[1]]\nstiffness: {parameter: n, files: [[2]]}\nvary: n\n')).toThrow(/mapping from values to files/);
  });
});
