import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { blocksKey } from '../../../src/event/floating/readings.ts';
import { type FloatingSpectrum, floatingSpectrum } from '../../../src/event/floating/spectrum.ts';
import { staircaseRun } from '../../../src/event/floating/staircase.ts';
import { spectrumCodimension } from '../../../src/event/partition-codimension.ts';
import {
  largestEntry,
  numberBuild,
  numberMatrix,
  numberMultiply,
  numberRows,
  numberTranspose,
  orthonormalise,
} from '../../../src/linear/floating.ts';
import { multiply, transpose } from '../../../src/linear/index.ts';
import {
  canonical,
  doubles,
  generator,
  integers,
  noisy,
  oscillator,
  pairOfBlocks,
  randomSymplectic,
  sum,
  transformed,
  zeroBlocks,
} from './planted.ts';

const { cases } = JSON.parse(readFileSync(new URL('hamiltonian-types.json', import.meta.url), 'utf8')) as {
  cases: {
    type: string;
    blocks: [string, number, number, number?][];
    orbit: number;
    bundle: number;
    inertia: [number, number, number];
    L?: number[][];
    omega?: number[][];
  }[];
};
const exact = (rows: number[][]) => integers(rows.length, rows.length, (i, j) => rows[i]![j]!);
const show = (f: FloatingSpectrum) =>
  [
    `0: ${blocksKey(f.zero.blocks)}`,
    ...f.clusters.map((c) => `${c.kind} ${c.value.re.toFixed(4)} ${c.value.im.toFixed(4)}: ${blocksKey(c.blocks)}`),
  ].join('; ');
const sizes = (blocks: readonly { size: number; count: number }[]) => blocks.flatMap((b) => new Array<number>(b.count).fill(b.size));
const codimension = (f: FloatingSpectrum) =>
  spectrumCodimension({ zero: sizes(f.zero.blocks), clusters: f.clusters.map((c) => ({ kind: c.kind, partition: sizes(c.blocks) })) });
const square = (n: number) => numberBuild(n, n, (i, j) => (j === i + n / 2 ? 1 : i === j + n / 2 ? -1 : 0));
const diagonal = (...values: number[]) => numberBuild(values.length, values.length, (i, j) => (i === j ? values[i]! : 0));

describe('Galin 1975/1982, Koçak 1984: normal forms and their noisy conjugates', () => {
  it.each(cases.filter((c) => c.L !== undefined))(
    '$type: clusters, blocks, codimension $orbit, $bundle',
    ({ blocks, orbit, bundle, inertia, L, omega }) => {
      const w = exact(omega!);
      const base = { s: multiply(transpose(exact(L!)), w), w };
      const plain = floatingSpectrum(doubles(base.s), doubles(base.w));
      expect(plain.decided).toBe(true);
      expect(codimension(plain)).toEqual({ orbit, bundle });
      // the sign of a block is that of the data; + and - are inertia-free labels except for blocks of odd size
      const imaginary = plain.clusters
        .filter((c) => c.kind === 'imaginary')
        .flatMap((c) =>
          c.blocks.flatMap((b) => [
            ...new Array<string>(b.positive).fill(`${b.size}+`),
            ...new Array<string>(b.negative).fill(`${b.size}-`),
          ]),
        );
      const expected = blocks.flatMap(([letter, size, , sign]) => (letter === 'I' ? [`${size}${(sign ?? 1) > 0 ? '+' : '-'}`] : []));
      expect(imaginary.sort()).toEqual(expected.sort());
      const can = canonical(base);
      for (let k = 0; k < 4; k++) {
        const random = generator(77 * k + 3);
        const p = transformed(can, randomSymplectic(can.s.rows, random));
        const f = floatingSpectrum(noisy(p.s, 1e-11, random), doubles(p.w));
        if (f.decided) expect(show(f)).toBe(show(plain));
        else expect(f.reason).not.toBeNull();
        expect(f.decided).toBe(true);
      }
      // signature of S: ω times the Krein form on imaginary clusters, neutral on the others
      const { zero } = plain;
      let positive = zero.inertia.positive;
      if (zero.generalisedDimension === 0) {
        positive = plain.clusters.reduce(
          (n, c) => n + (c.krein !== null ? 2 * c.krein.positive : (c.kind === 'real' ? 1 : 2) * c.multiplicity),
          0,
        );
      }
      expect(positive).toBe(inertia[0]);
    },
  );
});

describe('Krein signatures', () => {
  it('are the sign of H on the eigenplane, whatever the coordinates', () => {
    const base = canonical(sum([oscillator(2), oscillator(-3), oscillator(5)]));
    for (let k = 0; k < 5; k++) {
      const p = transformed(base, randomSymplectic(6, generator(k + 1)));
      const f = floatingSpectrum(doubles(p.s), doubles(p.w));
      expect(f.clusters.map((c) => [Math.round(c.value.im), c.krein])).toEqual([
        [2, { positive: 1, negative: 0 }],
        [3, { positive: 0, negative: 1 }],
        [5, { positive: 1, negative: 0 }],
      ]);
    }
  });
  it('change with the sign of ω', () => {
    const f = floatingSpectrum(
      diagonal(1, 1),
      numberRows([
        [0, -1],
        [1, 0],
      ]),
    );
    const g = floatingSpectrum(
      diagonal(1, 1),
      numberRows([
        [0, 1],
        [-1, 0],
      ]),
    );
    // H = (q² + p²)/2 is positive for either orientation: the eigenvector of +i changes with it
    expect(f.clusters[0]!.krein).toEqual({ positive: 1, negative: 0 });
    expect(g.clusters[0]!.krein).toEqual({ positive: 1, negative: 0 });
  });
  it('of 1:1 and 1:-1 resonance', () => {
    const same = floatingSpectrum(diagonal(1, 1, 1, 1), square(4));
    expect(same.clusters).toHaveLength(1);
    expect(same.clusters[0]!.krein).toEqual({ positive: 2, negative: 0 });
    const opposite = floatingSpectrum(diagonal(1, -1, 1, -1), square(4));
    expect(opposite.clusters[0]!.krein).toEqual({ positive: 1, negative: 1 });
    expect(sizes(opposite.clusters[0]!.blocks)).toEqual([1, 1]);
  });
});

describe('units and strengths', () => {
  it('two oscillators of frequency 1, one of mass and stiffness 10⁶', () => {
    const s = diagonal(1e6, 1, 1e-6, 1);
    const f = floatingSpectrum(s, square(4), { terms: s });
    expect(show(f)).toBe('0: none; imaginary 0.0000 1.0000: 1+ 1+');
    expect(f.decided).toBe(true);
  });
  it('vortices of strengths 2 and -2000 with the same frequency have opposite senses', () => {
    const w = numberBuild(4, 4, (i, j) => (i === j || i < 2 !== j < 2 ? 0 : (i < j ? 1 : -1) * (i < 2 ? 2 : -2000)));
    const s = diagonal(6, 6, 6000, 6000);
    const f = floatingSpectrum(s, w);
    // both Hamiltonians are positive, so both Krein signs are
    expect(show(f)).toBe('0: none; imaginary 0.0000 3.0000: 1+ 1+');
  });
});

describe('near collisions', () => {
  it('are told apart above the tolerance, joined below it, and undecided at it', () => {
    for (const [d, clusters, decided] of [
      [1e-2, 2, true],
      [1e-4, 2, true],
      [1e-5, 2, true],
      [1e-6, 2, false],
      [1e-7, 1, false],
      [1e-9, 1, true],
      [0, 1, true],
    ] as const) {
      const f = floatingSpectrum(diagonal(1, 1 + d, 1, 1 + d), square(4));
      expect([d, f.clusters.length, f.decided]).toEqual([d, clusters, decided]);
    }
  });
  it('three frequencies, two of them equal', () => {
    const f = floatingSpectrum(diagonal(1, 1.004, 1.004, 1, 1.004, 1.004), square(6));
    expect(show(f)).toBe('0: none; imaginary 0.0000 1.0000: 1+; imaginary 0.0000 1.0040: 1+ 1+');
    expect(f.decided).toBe(true);
  });
  it('a small pair beside a zero block of size 4', () => {
    const p = canonical(sum([zeroBlocks([[4, 1]]), pairOfBlocks(1, 1)]));
    const s = doubles(p.s);
    const scaled = numberBuild(6, 6, (i, j) => s.data[6 * i + j]! * ((i % 3) + (j % 3) === 4 ? 1e-2 : 1));
    const f = floatingSpectrum(scaled, doubles(p.w));
    expect(show(f)).toBe('0: 4+; real 0.0100 0.0000: 1');
  });
  it('quadruples: simple, double, with a Jordan block', () => {
    // (q, p) with L = (A, -Aᵀ): ½ pᵀA q doubled
    const of = (a: number[][]) => {
      const m = a.length;
      return numberBuild(2 * m, 2 * m, (i, j) => (i < m && j >= m ? a[j - m]![i]! : i >= m && j < m ? a[i - m]![j]! : 0));
    };
    const rotation = [
      [2, -5],
      [5, 2],
    ];
    const double = [
      [2, -5, 0, 0],
      [5, 2, 0, 0],
      [0, 0, 2, -5],
      [0, 0, 5, 2],
    ];
    const jordan = double.map((row, i) => row.map((x, j) => x + (j === i + 2 ? 1 : 0)));
    expect(show(floatingSpectrum(of(rotation), square(4)))).toBe('0: none; quadruple 2.0000 5.0000: 1');
    const twice = floatingSpectrum(of(double), square(8));
    expect(show(twice)).toBe('0: none; quadruple 2.0000 5.0000: 1 1');
    expect(codimension(twice)).toEqual({ orbit: 8, bundle: 6 });
    const block = floatingSpectrum(of(jordan), square(8));
    expect(show(block)).toBe('0: none; quadruple 2.0000 5.0000: 2');
    expect(codimension(block)).toEqual({ orbit: 4, bundle: 2 });
  });
  it('on the space of dimension 0 and on a wholly nilpotent system there are none', () => {
    expect(floatingSpectrum(numberMatrix(0, 0), numberMatrix(0, 0)).clusters).toEqual([]);
    const { s, w } = zeroBlocks([[6, 1]]);
    expect(floatingSpectrum(doubles(s), doubles(w)).clusters).toEqual([]);
  });
});

describe('staircase (Kublanovskaya 1966): blocks of a general matrix', () => {
  it('3, 2, 1 at one eigenvalue in random orthonormal coordinates', () => {
    const jordan = numberBuild(7, 7, (i, j) => (i === j ? (i < 6 ? 2 : -1) : j === i + 1 && [0, 1, 3].includes(i) ? 1 : 0));
    const random = generator(4);
    const q = orthonormalise(numberBuild(7, 7, () => random() - 0.5));
    const a = numberMultiply(q, numberMultiply(jordan, numberTranspose(q)));
    const run = staircaseRun(a, { re: 2, im: 0 }, largestEntry(a), 1e-9);
    expect(sizes(run.answer)).toEqual([3, 2, 1]);
    expect(run.contradiction).toBeNull();
    expect(staircaseRun(a, { re: 0.5, im: 0.25 }, largestEntry(a), 1e-9).answer).toEqual([]);
  });
});
