import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors/index.ts';
import {
  type ClassNumber,
  centraliserGl,
  centraliserSo,
  centraliserSoStar,
  centraliserSp,
  clusterOrbitCodimension,
  codimensionByClass,
  coincidenceCodimension,
  collisionCodimension,
  conjugatePartition,
  corankCodimension,
  type EigenvalueKind,
  galinCodimension,
  partitionOfBlocks,
  partitions,
  type SpectrumType,
  spectrumCodimension,
  zeroCodimensionOfPartition,
} from '../../../src/event/partition-codimension.ts';
import { signatureOfParts, signedPartitions } from '../../../src/event/signed-partitions.ts';

const load = (name: string) => JSON.parse(readFileSync(new URL(name, import.meta.url), 'utf8'));
const orbits = load('nilpotent-orbits.json') as {
  centralisers: { algebra: string; partition: number[]; centraliser: number }[];
  counts: { form: string; orbits: number; partitions: [number[], number][] }[];
  crossings: { form: string; multiplicity: number; coincidence: number; corank: number }[];
};
const types = load('hamiltonian-types.json') as {
  cases: { type: string; blocks: (string | number)[][]; orbit: number; bundle: number; generalisedKernel: number }[];
  gl: { partitions: number[][]; orbit: number; bundle: number }[];
};

const expand = (a: readonly { size: number; count: number }[]) => a.flatMap(({ size, count }) => new Array<number>(count).fill(size));

describe('Collingwood & McGovern 1993, cor. 6.1.4: centralisers of nilpotent elements', () => {
  const formulas = { sp: centraliserSp, so: centraliserSo, gl: centraliserGl };
  it.each(orbits.centralisers)('$algebra $partition: $centraliser', ({ algebra, partition, centraliser }) => {
    expect(formulas[algebra.slice(0, 2) as 'sp'](partition)).toBe(centraliser);
  });
  it('the zero orbit has the dimension of the algebra', () => {
    for (let n = 1; n <= 5; n++) {
      const ones = new Array<number>(n).fill(1);
      expect(centraliserGl(ones)).toBe(n * n);
      expect(centraliserSp([...ones, ...ones])).toBe(n * (2 * n + 1));
      expect(centraliserSo(ones)).toBe((n * (n - 1)) / 2);
      expect(centraliserSoStar(ones)).toBe(n * (2 * n - 1));
    }
  });
  it('so*(2m) by the partition of m over H: 2 Σ (λ*)² - #odd', () => {
    const values: [number[], number][] = [
      [[1], 1],
      [[2], 4],
      [[1, 1], 6],
      [[3], 5],
      [[2, 1], 9],
      [[1, 1, 1], 15],
      [[4], 8],
      [[3, 1], 10],
      [[2, 2], 16],
      [[2, 1, 1], 18],
      [[1, 1, 1, 1], 28],
    ];
    for (const [p, value] of values) expect(centraliserSoStar(p)).toBe(value);
  });
  it('refuses partitions that do not occur', () => {
    expect(() => centraliserSp([3, 1])).toThrow(InputError);
    expect(() => centraliserSo([2])).toThrow(InputError);
    expect(() => conjugatePartition([2, 0])).toThrow(InputError);
    expect(() => conjugatePartition([1.5])).toThrow(InputError);
  });
  it('conjugation of partitions is an involution', () => {
    for (const p of partitions(9)) expect(conjugatePartition(conjugatePartition(p))).toEqual(p);
    expect(partitions(0)).toEqual([[]]);
    expect(partitions(9).length).toBe(30);
  });
});

describe('Arnold 1971: codimensions in gl(n, C)', () => {
  it.each(types.gl)('$partitions: orbit $orbit, bundle $bundle', ({ partitions: list, orbit, bundle }) => {
    const sum = list.reduce((s, p) => s + centraliserGl(p), 0);
    expect(sum).toBe(orbit);
    expect(sum - list.length).toBe(bundle);
  });
});

function spectrumType(blocks: (string | number)[][]): SpectrumType {
  const zero: number[] = [];
  const clusters = new Map<string, { kind: EigenvalueKind; partition: number[] }>();
  for (const [letter, size, first, second] of blocks as [string, number, number, number][]) {
    if (letter === 'Z') {
      zero.push(size);
      if (size % 2 === 1) zero.push(size);
      continue;
    }
    const kind = letter === 'I' ? 'imaginary' : letter === 'R' ? 'real' : 'quadruple';
    const key = `${kind} ${first} ${kind === 'quadruple' ? second : ''}`;
    if (!clusters.has(key)) clusters.set(key, { kind, partition: [] });
    clusters.get(key)!.partition.push(size);
  }
  return { zero, clusters: [...clusters.values()] };
}

describe('Galin 1975/1982, Koçak 1984: Hamiltonian matrices without symmetry', () => {
  it.each(types.cases)('$type: orbit $orbit, bundle $bundle', ({ blocks, orbit, bundle, generalisedKernel }) => {
    const type = spectrumType(blocks);
    expect(spectrumCodimension(type)).toEqual({ orbit, bundle });
    expect(galinCodimension(type)).toBe(orbit);
    expect(type.zero.reduce((a, b) => a + b, 0)).toBe(generalisedKernel);
  });
  it('both formulas agree on every zero partition up to dimension 12', () => {
    for (let k = 0; k <= 6; k++)
      for (const zero of partitions(2 * k)) {
        if (zero.some((p) => p % 2 === 1 && zero.filter((q) => q === p).length % 2 === 1)) {
          expect(() => galinCodimension({ zero, clusters: [] })).toThrow(InputError);
          continue;
        }
        expect(galinCodimension({ zero, clusters: [] })).toBe(spectrumCodimension({ zero, clusters: [] }).orbit);
      }
  });
});

describe('zero events in the ten classes (brute-force ranks of the adjoint map on explicit bases)', () => {
  const values: [ClassNumber, number[], number][] = [
    [1, [2], 1],
    [1, [1, 1], 3],
    [1, [4], 2],
    [1, [2, 2], 4],
    [1, [2, 1, 1], 6],
    [1, [1, 1, 1, 1], 10],
    [1, [3, 3], 7],
    [1, [6], 3],
    [1, [4, 2], 5],
    [1, [2, 2, 2], 9],
    [2, [1], 1],
    [2, [1, 1], 4],
    [2, [2], 2],
    [2, [2, 1], 5],
    [3, [1, 1], 1],
    [3, [1, 1, 1, 1], 6],
    [3, [2, 2], 4],
    [3, [1, 1, 1, 1, 1, 1], 15],
    [4, [2], 1],
    [4, [2, 2], 3],
    [4, [4], 2],
    [4, [4, 2], 4],
    [4, [2, 2, 2], 6],
    [5, [2, 2], 1],
    [5, [1, 1, 1, 1], 4],
    [6, [4], 2],
    [6, [2, 2], 4],
    [6, [2, 1, 1], 5],
    [7, [2], 2],
    [7, [1, 1], 3],
    [7, [3], 3],
    [8, [2, 2], 2],
    [8, [3, 3], 3],
    [8, [1, 1, 1, 1], 6],
    [9, [2, 2], 3],
    [9, [1, 1, 1, 1], 4],
    [10, [2, 2], 1],
    [10, [1, 1, 1, 1], 2],
    [10, [4, 4], 2],
    [10, [2, 2, 2, 2], 6],
  ];
  it.each(values)('class %i, %j: %i', (number, parts, value) => {
    expect(zeroCodimensionOfPartition(number, parts)).toBe(value);
    const times = [3, 5, 8, 9, 10].includes(number) ? 2 : 1;
    const blocks = [...new Set(parts)].map((size) => ({ size, count: parts.filter((p) => p === size).length / times }));
    expect(partitionOfBlocks(number, blocks)).toEqual(parts);
    expect(codimensionByClass(number, blocks)).toBe(value);
  });
  it('the zero matrix costs dim P', () => {
    for (let k = 1; k <= 5; k++) {
      const all = (number: ClassNumber, count: number) => codimensionByClass(number, [{ size: 1, count }]);
      expect(all(1, 2 * k)).toBe(k * (2 * k + 1));
      expect(all(2, k)).toBe(k * k);
      expect(all(3, k)).toBe(k * (2 * k - 1));
      expect(all(4, 2 * k)).toBe(k * (k + 1));
      // sp(2k) with k even, k = 2j copies
      expect(all(5, 2 * k)).toBe(4 * k * k);
      expect(all(6, 2 * k)).toBe(2 * k * k);
      expect(all(7, k)).toBe((k * (k + 1)) / 2);
      expect(all(8, k)).toBe(k * (2 * k - 1));
      expect(all(9, k)).toBe(k * k);
      expect(all(10, 2 * k)).toBe(2 * k * (2 * k - 1));
    }
  });
  it('codimension one: splits where s(K) = 0, passes where s(K) > 0 (Golubitsky & Stewart 1987; Dellnitz, Melbourne & Marsden 1992)', () => {
    for (const number of [1, 4, 6, 10] as const) expect(codimensionByClass(number, [{ size: 2, count: 1 }])).toBe(1);
    expect(codimensionByClass(5, [{ size: 2, count: 1 }])).toBe(1);
    for (const number of [2, 3, 7, 8, 9] as const) expect(codimensionByClass(number, [{ size: 1, count: 1 }])).toBe(1);
  });
  it('no event at all costs nothing, and impossible blocks are refused', () => {
    for (let number = 1; number <= 10; number++) expect(codimensionByClass(number as ClassNumber, [])).toBe(0);
    expect(() => codimensionByClass(1, [{ size: 1, count: 1 }])).toThrow(InputError);
    expect(() => codimensionByClass(4, [{ size: 3, count: 1 }])).toThrow(InputError);
    expect(() => codimensionByClass(2, [{ size: 0, count: 1 }])).toThrow(InputError);
    expect(() => codimensionByClass(2, [{ size: 2, count: -1 }])).toThrow(InputError);
  });
});

describe('collisions off zero in the ten classes', () => {
  const at = (classNumber: ClassNumber, kind: EigenvalueKind, partition: number[]) =>
    collisionCodimension(kind, [{ classNumber, partition }]);
  it('at ±iω: sp(4) 3 and 1, u(2) 3, u(1,1) nilpotent 1, class 7 definite 2, class 8 definite 5', () => {
    expect(at(1, 'imaginary', [1, 1])).toBe(3);
    expect(at(1, 'imaginary', [2])).toBe(1);
    expect(at(2, 'imaginary', [1, 1])).toBe(3);
    expect(at(2, 'imaginary', [2])).toBe(1);
    expect(at(7, 'imaginary', [1, 1])).toBe(2);
    expect(at(8, 'imaginary', [1, 1, 1, 1])).toBe(5);
  });
  it('two modes of different irreducibles at one frequency cost 1', () => {
    const simplest: [ClassNumber, number[]][] = [
      [1, [1]],
      [2, [1]],
      [3, [1]],
      [4, [1]],
      [5, [1, 1]],
      [6, [1]],
      [7, [1]],
      [8, [1, 1]],
      [9, [1]],
      [10, [1, 1]],
    ];
    for (const [a, p] of simplest) {
      expect(at(a, 'imaginary', p)).toBe(0);
      for (const [b, q] of simplest)
        expect(
          collisionCodimension('imaginary', [
            { classNumber: a, partition: p },
            { classNumber: b, partition: q },
          ]),
        ).toBe(1);
    }
  });
  it('the simplest real pair costs s(K): 0 in 1, 4, 5, 6, 10; 1 in 2, 7, 8; 2 in 9; 3 in 3', () => {
    const simplest: [ClassNumber, number[], number][] = [
      [1, [1], 0],
      [4, [1], 0],
      [5, [1, 1], 0],
      [6, [1], 0],
      [10, [1, 1], 0],
      [2, [1], 1],
      [7, [1], 1],
      [8, [1, 1], 1],
      [9, [1, 1], 2],
      [3, [1, 1], 3],
    ];
    for (const [number, parts, cost] of simplest) expect(at(number, 'real', parts)).toBe(cost);
  });
  it('the simplest quadruple costs nothing in any class', () => {
    for (const number of [1, 2, 3, 4, 6, 7, 9] as const) expect(at(number, 'quadruple', [1])).toBe(0);
    for (const number of [5, 8, 10] as const) expect(at(number, 'quadruple', [1, 1])).toBe(0);
  });
  it('refuses what does not occur', () => {
    expect(() => clusterOrbitCodimension(5, 'quadruple', [1])).toThrow(InputError);
    expect(() => clusterOrbitCodimension(10, 'imaginary', [1, 1, 1])).toThrow(InputError);
  });
});

describe('von Neumann & Wigner 1929: coincidences', () => {
  const beta = (form: string) => (form.startsWith('real') ? 1 : form.startsWith('complex') ? 2 : 4);
  it.each(orbits.crossings)('$form, $multiplicity-fold: $coincidence, corank $corank', ({ form, multiplicity, coincidence, corank }) => {
    expect(coincidenceCodimension(beta(form), multiplicity)).toBe(coincidence);
    expect(corankCodimension(beta(form), multiplicity)).toBe(corank);
  });
});

describe('Collingwood & McGovern 1993, thm 9.3.3-9.3.5: nilpotent orbits of real forms', () => {
  const typesOf = (form: string) => {
    const [, letters, first, second] = /^(sp|u|so\*)\((\d+)(?:,(\d+|R))?\)$/.exec(form)!;
    if (letters === 'sp') return signedPartitions(1, Number(first));
    if (letters === 'u') return signedPartitions(2, { a: Number(first), b: Number(second) });
    return signedPartitions(3, Number(first) / 2);
  };
  it.each(orbits.counts)('$form has $orbits', ({ form, orbits: count, partitions: list }) => {
    const all = typesOf(form);
    expect(all.length).toBe(count);
    for (const [partition, number] of list) expect(all.filter((t) => expand(t.parts).join() === partition.join()).length).toBe(number);
    expect(list.reduce((n, [, k]) => n + k, 0)).toBe(count);
  });
});

describe('signed types in the classes with reversing elements, smallest multiplicities', () => {
  it('classes 4, 6, 10 with k = 1: (a, b) ↦ (ta, b/t) on R² has the null orbits 0, four half axes', () => {
    for (const number of [4, 6, 10] as const) expect(signedPartitions(number, 1).length).toBe(5);
  });
  it('class 5 with k = 2: SL(2, C) on R^{3,1} has the null orbits 0 and two half cones', () => {
    expect(signedPartitions(5, 2).map((t) => expand(t.parts).join())).toEqual(['2', '2', '1,1']);
  });
  it('class 8 with (a, b) = (1, 1): Sp(1, 1) on R^{4,1} has the null orbits 0 and two half cones', () => {
    expect(signedPartitions(8, { a: 1, b: 1 }).length).toBe(3);
    expect(signedPartitions(8, { a: 2, b: 0 }).length).toBe(1);
  });
  it('class 9 with m = 2: O(2, C) identifies the half axes of R² in pairs', () => {
    expect(signedPartitions(9, 2).length).toBe(3);
  });
  it('class 7: pencils of two real symmetric forms have the same signs as u(a, b)', () => {
    for (const [a, b] of [
      [1, 0],
      [1, 1],
      [2, 1],
      [2, 2],
    ] as const)
      expect(signedPartitions(7, { a, b }).length).toBe(signedPartitions(2, { a, b }).length);
  });
  it('fill the given multiplicity and signature, and have a codimension', () => {
    for (let number = 1; number <= 10; number++) {
      const hermitian = number === 2 || number === 7 || number === 8;
      for (const t of signedPartitions(number as ClassNumber, hermitian ? { a: 2, b: 2 } : 4)) {
        expect(expand(t.parts).reduce((x, y) => x + y, 0)).toBe([4, 6, 10].includes(number) ? 8 : 4);
        if (hermitian) expect(signatureOfParts(t.parts)).toEqual([2, 2]);
        expect(codimensionByClass(number as ClassNumber, t.parts)).toBeGreaterThan(0);
      }
    }
  });
  it('of no copies are the empty type alone; wrong multiplicities are refused', () => {
    expect(signedPartitions(1, 0)).toEqual([{ parts: [], signature: null }]);
    expect(() => signedPartitions(2, 3)).toThrow(InputError);
    expect(() => signedPartitions(1, { a: 1, b: 1 })).toThrow(InputError);
    expect(() => signedPartitions(1, -1)).toThrow(InputError);
    expect(() => signedPartitions(3, 1.5)).toThrow(InputError);
  });
});
