import { describe, expect, it } from 'vitest';
import { InputError, NotSymplecticError, ShapeError } from '../../../src/errors/index.ts';
import { zeroChain } from '../../../src/event/chain.ts';
import { blocksKey, gapRatio, LARGEST_GAP_RATIO } from '../../../src/event/floating/readings.ts';
import { balanceScaling, canonicalCoordinates } from '../../../src/event/floating/scaling.ts';
import { decideZeroEvent, generalisedKernelBasis } from '../../../src/event/floating/zero.ts';
import { rationals } from '../../../src/field/index.ts';
import {
  largestEntry,
  type NumberMatrix,
  numberBuild,
  numberCombine,
  numberCongruence,
  numberIdentity,
  numberMatrix,
  numberMultiply,
  numberRows,
  numberSolve,
  numberTranspose,
} from '../../../src/linear/floating.ts';
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

const plane = numberRows([
  [0, 1],
  [-1, 0],
]);
const rest = [oscillator(2), oscillator(-3), pairOfBlocks(1, 2)];
type List = (readonly [number, 1 | -1 | 0])[];

describe('planted zero events in random symplectic coordinates (Jordan types with signs; the exact recursion gives the answer)', () => {
  const lists: List[] = [
    [],
    [[1, 0]],
    [[2, 1]],
    [[2, -1]],
    [[4, 1]],
    [[4, -1]],
    [
      [2, 1],
      [2, 1],
    ],
    [
      [2, 1],
      [2, -1],
    ],
    [[3, 0]],
    [
      [4, 1],
      [2, -1],
    ],
    [
      [4, -1],
      [2, -1],
    ],
    [[6, 1]],
    [[6, -1]],
    [
      [3, 0],
      [2, 1],
    ],
    [
      [4, 1],
      [1, 0],
    ],
    [[5, 0]],
    [
      [3, 0],
      [1, 0],
    ],
    [
      [4, 1],
      [4, -1],
    ],
  ];
  it.each(
    lists.map((list) => ({ name: list.map(([n, s]) => `${n}${s > 0 ? '+' : s < 0 ? '-' : ' twice'}`).join(', ') || 'nothing', list })),
  )('$name: noise 1e-10, never wrong, almost always decided', ({ list }) => {
    const base = canonical(sum([zeroBlocks(list), ...rest]));
    const want = zeroChain(base.s, base.w, rationals);
    let decided = 0;
    for (let k = 0; k < 20; k++) {
      const random = generator(1000 * k + 7);
      const p = transformed(base, randomSymplectic(base.s.rows, random));
      const f = decideZeroEvent(noisy(p.s, 1e-10, random), doubles(p.w));
      if (!f.decided) {
        expect(f.reason).not.toBeNull();
        continue;
      }
      decided++;
      expect(blocksKey(f.blocks)).toBe(blocksKey(want.blocks));
      expect(f.generalisedDimension).toBe(want.generalisedDimension);
      expect(f.inertia.zero).toBe(want.kernelDimension);
      expect(f.gap).toBeLessThanOrEqual(LARGEST_GAP_RATIO);
    }
    expect(decided).toBeGreaterThanOrEqual(17);
  });
  it('noise of a tenth of the tolerance: undecided rather than wrong', () => {
    for (const list of [
      [[4, 1]],
      [
        [2, 1],
        [2, -1],
      ],
      [
        [3, 0],
        [2, 1],
      ],
      [[6, -1]],
    ] as List[]) {
      const base = canonical(sum([zeroBlocks(list), ...rest]));
      const want = blocksKey(zeroChain(base.s, base.w, rationals).blocks);
      for (let k = 0; k < 10; k++) {
        const random = generator(31 * k + 2);
        const p = transformed(base, randomSymplectic(base.s.rows, random));
        const f = decideZeroEvent(noisy(p.s, 1e-8, random), doubles(p.w));
        expect(f.decided ? blocksKey(f.blocks) : want).toBe(want);
        if (!f.decided) expect(f.reason).toMatch(/tolerance|ratio|reduction|rank/);
      }
    }
  });
  it('in general linear coordinates, W not canonical', () => {
    const base = sum([
      zeroBlocks([
        [2, 1],
        [4, -1],
      ]),
      oscillator(2),
      oscillator(-3),
    ]);
    let decided = 0;
    for (let k = 0; k < 10; k++) {
      const random = generator(5 * k + 1);
      const t = integers(base.s.rows, base.s.rows, (i, j) => Math.floor(random() * 5) - 2 + (i === j ? 3 : 0));
      const p = transformed(base, t);
      const f = decideZeroEvent(noisy(p.s, 1e-11, random), doubles(p.w));
      if (f.decided) {
        decided++;
        expect(blocksKey(f.blocks)).toBe(blocksKey(zeroChain(base.s, base.w, rationals).blocks));
      }
    }
    expect(decided).toBeGreaterThanOrEqual(9);
  });
});

describe('small and degenerate spaces', () => {
  it('dimension 0', () => {
    const f = decideZeroEvent(numberMatrix(0, 0), numberMatrix(0, 0));
    expect([f.decided, f.generalisedDimension, f.readings.length]).toEqual([true, 0, 0]);
  });
  it('the zero matrix: semisimple', () => {
    for (const n of [2, 4, 6]) {
      const w = numberBuild(n, n, (i, j) => (j === i + n / 2 ? 1 : i === j + n / 2 ? -1 : 0));
      const f = decideZeroEvent(numberMatrix(n, n), w);
      expect(f.decided).toBe(true);
      expect(f.blocks).toEqual([{ size: 1, count: n, positive: 0, negative: 0 }]);
    }
  });
  it('a block that is all rounding is zero against the scale of the whole Hessian, not against itself', () => {
    const s = numberRows([
      [3e-16, 1e-16],
      [1e-16, -2e-16],
    ]);
    expect(blocksKey(decideZeroEvent(s, plane, { scale: 1 }).blocks)).toBe('1 1');
    expect(blocksKey(decideZeroEvent(s, plane).blocks)).toBe('none');
  });
  it('one degree of freedom near a fold: decided away from the tolerance, undecided at it, with the readings', () => {
    for (const [d, key, decided] of [
      [1e-3, 'none', true],
      [1e-5, 'none', true],
      [1e-6, 'none', false],
      [1e-7, '2+', false],
      [1e-9, '2+', true],
      [0, '2+', true],
    ] as const) {
      const f = decideZeroEvent(
        numberRows([
          [d, 0],
          [0, 1],
        ]),
        plane,
      );
      expect([d, blocksKey(f.blocks), f.decided]).toEqual([d, key, decided]);
      expect(f.reason === null).toBe(decided);
      const [r] = f.readings;
      expect([...r!.zero, ...r!.nonzero]).toEqual([d, 1]);
      expect(f.others.map((o) => o.tolerance)).toEqual([1e-6, 1e-8]);
    }
  });
  it('a small gap alone makes it undecided', () => {
    const w = numberBuild(4, 4, (i, j) => (j === i + 2 ? 1 : i === j + 2 ? -1 : 0));
    const s = numberBuild(4, 4, (i, j) => (i !== j ? 0 : [1e-9, 1e-5, 1, 1][i]!));
    const decided = decideZeroEvent(s, w);
    expect(decided.decided).toBe(true);
    const close = decideZeroEvent(
      numberBuild(4, 4, (i, j) => (i !== j ? 0 : [8e-9, 5e-6, 1, 1][i]!)),
      w,
    );
    expect(close.decided).toBe(false);
    expect(close.gap).toBeCloseTo(8e-9 / 5e-6, 12);
    expect(Math.max(...close.readings.map(gapRatio))).toBe(close.gap);
  });
  it('only the symmetric part of S counts', () => {
    const f = decideZeroEvent(
      numberRows([
        [0, 1e-3],
        [-1e-3, 1],
      ]),
      plane,
    );
    expect(blocksKey(f.blocks)).toBe('2+');
  });
  it('refuses bad input with the culprit', () => {
    expect(() =>
      decideZeroEvent(
        numberRows([
          [Number.NaN, 0],
          [0, 1],
        ]),
        plane,
      ),
    ).toThrow(InputError);
    expect(() => decideZeroEvent(numberIdentity(2), numberIdentity(2))).toThrow(NotSymplecticError);
    expect(() => decideZeroEvent(numberIdentity(2), numberMatrix(2, 2))).toThrow(NotSymplecticError);
    expect(() => decideZeroEvent(numberIdentity(4), plane)).toThrow(ShapeError);
    expect(() => decideZeroEvent(numberIdentity(2), plane, { tolerance: 2 })).toThrow(InputError);
    expect(() => decideZeroEvent(numberIdentity(2), plane, { scale: -1 })).toThrow(InputError);
    expect(() =>
      decideZeroEvent(numberIdentity(2), plane, {
        terms: numberRows([
          [1, -1],
          [1, 1],
        ]),
      }),
    ).toThrow(InputError);
    expect(() => decideZeroEvent(numberIdentity(3), numberMatrix(3, 3))).toThrow(NotSymplecticError);
  });
});

describe('units', () => {
  it('that differ by 10³ and 10⁶ change nothing, the sizes of the terms being known', () => {
    const base = canonical(
      sum([
        zeroBlocks([
          [2, 1],
          [4, -1],
        ]),
        oscillator(2),
        oscillator(-3),
      ]),
    );
    const n = base.s.rows;
    const m = n / 2;
    for (const unit of [1e3, 1e6]) {
      for (let k = 0; k < 8; k++) {
        const random = generator(5 * k + 1);
        const p = transformed(base, randomSymplectic(n, random));
        const plain = noisy(p.s, 1e-11, random);
        const size = largestEntry(plain);
        const factor = Array.from({ length: n }, (_, i) => unit ** ((i < m ? 1 : -1) * (((i % m) % 3) - 1)));
        const entry = (f: (i: number, j: number) => number) => numberBuild(n, n, (i, j) => f(i, j) * factor[i]! * factor[j]!);
        const f = decideZeroEvent(
          entry((i, j) => plain.data[i * n + j]!),
          doubles(p.w),
          { terms: entry(() => size) },
        );
        expect(f.decided).toBe(true);
        expect(blocksKey(f.blocks)).toBe('4- 2+');
      }
    }
  });
  it('an oscillator of mass and stiffness 10⁶ is not a free particle', () => {
    const s = numberRows([
      [1e6, 0],
      [0, 1e-6],
    ]);
    expect(blocksKey(decideZeroEvent(s, plane, { terms: s }).blocks)).toBe('none');
  });
  it('a free particle of mass 10⁹ beside a light oscillator is one', () => {
    const w = numberBuild(4, 4, (i, j) => (j === i + 2 ? 1 : i === j + 2 ? -1 : 0));
    const s = numberBuild(4, 4, (i, j) => (i !== j ? 0 : [0, 1, 1e-9, 1][i]!));
    expect(blocksKey(decideZeroEvent(s, w, { terms: s }).blocks)).toBe('2+');
    expect(blocksKey(decideZeroEvent(s, w).blocks)).not.toBe('2+');
  });
});

describe('canonical coordinates and balancing', () => {
  const canonicalError = (w: NumberMatrix, t: NumberMatrix) => {
    const v = numberCongruence(t, w);
    // every row has one entry ±1
    return numberBuild(1, w.rows, (_, i) =>
      Math.abs(1 - Array.from({ length: w.rows }, (_x, j) => Math.abs(v.data[i * w.rows + j]!)).reduce((a, b) => a + b, 0)),
    );
  };
  it('of vortices of unequal strength and of a full skew matrix (Darboux)', () => {
    const vortices = numberBuild(6, 6, (i, j) =>
      Math.floor(i / 2) === Math.floor(j / 2) && i !== j ? (i < j ? 1 : -1) * [1, -1e-4, 1e5][Math.floor(i / 2)]! : 0,
    );
    expect(largestEntry(canonicalError(vortices, canonicalCoordinates(vortices)))).toBeLessThan(1e-12);
    const full = numberBuild(6, 6, (i, j) => Math.sin(i * j * 3 + i * i) - Math.sin(i * j * 3 + j * j));
    expect(largestEntry(canonicalError(full, canonicalCoordinates(full)))).toBeLessThan(1e-11);
    expect(() => canonicalCoordinates(numberBuild(4, 4, (i, j) => i - j))).toThrow(NotSymplecticError);
  });
  it('balancing is symplectic, by powers of 2, and brings the entries together', () => {
    const w = numberBuild(4, 4, (i, j) => (j === i + 2 ? 1 : i === j + 2 ? -1 : 0));
    const s = numberRows([
      [1e8, 1e2, 0, 0],
      [1e2, 1e-4, 0, 0],
      [0, 0, 1e-8, 1e-3],
      [0, 0, 1e-3, 1e5],
    ]);
    const b = balanceScaling(
      s,
      w,
      numberBuild(4, 4, (i, j) => Math.abs(s.data[4 * i + j]!)),
    );
    expect(b.w).toEqual(w);
    for (let i = 0; i < 4; i++) expect(Number.isInteger(Math.log2(b.transform.data[5 * i]!))).toBe(true);
    expect(numberCongruence(b.transform, s)).toEqual(b.s);
    for (let i = 0; i < 4; i++) {
      expect(b.s.data[5 * i]).toBeGreaterThan(0.2);
      expect(b.s.data[5 * i]).toBeLessThan(10);
    }
    expect(b.scale).toBe(largestEntry(b.terms));
  });
  it('one factor for an irreducible copy of dimension 2', () => {
    const w = numberBuild(4, 4, (i, j) => (j === i + 2 ? 1 : i === j + 2 ? -1 : 0));
    const s = numberBuild(4, 4, (i, j) => (i === j ? (i < 2 ? 1e6 : 1e-6) : 0));
    const { transform } = balanceScaling(s, w, s, [{ q: [0, 1], p: [2, 3] }]);
    expect(transform.data[0]).toBe(transform.data[5]);
    expect(transform.data[10]! * transform.data[0]!).toBe(1);
    expect(transform.data[0]).toBeLessThan(0.01);
  });
});

describe('generalised kernel from the blocks, without powers', () => {
  it('is invariant under L, symplectic, and L is nilpotent on it', () => {
    for (const list of [
      [
        [4, 1],
        [2, -1],
      ],
      [
        [3, 0],
        [2, 1],
      ],
      [[6, -1]],
      [[1, 0]],
    ] as List[]) {
      const base = canonical(sum([zeroBlocks(list), ...rest]));
      const p = transformed(base, randomSymplectic(base.s.rows, generator(9)));
      const s = doubles(p.s);
      const w = doubles(p.w);
      const { blocks, generalisedDimension } = zeroChain(p.s, p.w, rationals);
      const e = generalisedKernelBasis(s, w, blocks);
      expect(e.cols).toBe(generalisedDimension);
      const le = numberMultiply(numberSolve(numberTranspose(w), s), e);
      const inside = numberMultiply(numberTranspose(e), le);
      const scale = largestEntry(s);
      expect(largestEntry(numberCombine(le, numberMultiply(e, inside), -1)) / scale).toBeLessThan(1e-9);
      let power = inside;
      for (let k = 1; k < blocks[0]!.size; k++) power = numberMultiply(power, inside);
      expect(largestEntry(power) / scale ** blocks[0]!.size).toBeLessThan(1e-9);
    }
    expect(generalisedKernelBasis(numberIdentity(2), plane, []).cols).toBe(0);
  });
});

describe("Thomson's heptagon of equal vortices in the rotating frame (Havelock 1931)", () => {
  const n = 7;
  const z = Array.from({ length: n }, (_, k) => [Math.cos((2 * Math.PI * k) / n), Math.sin((2 * Math.PI * k) / n)] as const);
  // H = -1/(4π) Σ ln |z_i - z_j|² + Ω/2 Σ |z_i|², Ω = 6/(4π); coordinates x_1 … x_7, y_1 … y_7
  const data = new Float64Array(4 * n * n);
  const add = (i: number, a: number, j: number, b: number, v: number) => {
    data[(i + a * n) * 2 * n + (j + b * n)]! += v;
  };
  for (let i = 0; i < n; i++)
    for (let a = 0; a < 2; a++) {
      add(i, a, i, a, 6 / (4 * Math.PI));
      for (let j = 0; j < n; j++)
        for (let b = 0; b < 2; b++) {
          if (i === j) continue;
          const d = [z[i]![0] - z[j]![0], z[i]![1] - z[j]![1]];
          const r = d[0]! ** 2 + d[1]! ** 2;
          const second = (-1 / (2 * Math.PI)) * ((a === b ? 1 : 0) / r - (2 * d[a]! * d[b]!) / r ** 2);
          add(i, a, i, b, second);
          add(i, a, j, b, -second);
        }
    }
  const w = numberBuild(2 * n, 2 * n, (i, j) => (j === i + n ? 1 : i === j + n ? -1 : 0));
  it('has the signature (11, 0, 3) and the blocks 2, 2, 2', () => {
    const f = decideZeroEvent(numberMatrix(2 * n, 2 * n, data), w);
    expect(f.decided).toBe(true);
    expect(f.inertia).toEqual({ positive: 11, negative: 0, zero: 3 });
    expect(f.blocks.map((b) => [b.size, b.count])).toEqual([[2, 3]]);
  });
});
