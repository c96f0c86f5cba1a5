import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { NotSymplecticError, ShapeError } from '../../../src/errors/index.ts';
import { type SignedBlocks, zeroChain } from '../../../src/event/chain.ts';
import { blocksKey } from '../../../src/event/floating/readings.ts';
import { decideZeroEvent } from '../../../src/event/floating/zero.ts';
import { signatureOfParts, signedPartitions } from '../../../src/event/signed-partitions.ts';
import { type Rational, RealField, rationals } from '../../../src/field/index.ts';
import { numberBuild, numberCongruence } from '../../../src/linear/floating.ts';
import {
  build,
  congruence,
  identity,
  inertia,
  inverse,
  type Matrix,
  mapMatrix,
  multiply,
  rank,
  transpose,
  zeroMatrix,
} from '../../../src/linear/index.ts';
import {
  canonical,
  doubles,
  evenBlock,
  generator,
  hermitianSum,
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
    blocks: [string, number, number][];
    inertia: number[];
    kernel: number;
    generalisedKernel: number;
    L?: number[][];
    omega?: number[][];
  }[];
};
const exact = (rows: number[][]) => integers(rows.length, rows.length, (i, j) => rows[i]![j]!);
const keyOf = (sizes: string[]) =>
  sizes.length === 0 ? 'none' : sizes.sort((a, b) => Number.parseInt(b, 10) - Number.parseInt(a, 10) || a.localeCompare(b)).join(' ');
/** Blocks in an order of their own: descending sizes, + before -. */
const sorted = (blocks: readonly SignedBlocks[]) => keyOf(blocksKey(blocks).split(' '));

describe('Galin 1975/1982, Koçak 1984: normal forms', () => {
  it.each(cases.filter((c) => c.L !== undefined))(
    '$type: blocks, signs, kernels and inertia',
    ({ blocks, inertia: signature, kernel, generalisedKernel, L, omega }) => {
      const w = exact(omega!);
      const s = multiply(transpose(exact(L!)), w);
      const chain = zeroChain(s, w, rationals);
      expect(chain.kernelDimension).toBe(kernel);
      expect(chain.generalisedDimension).toBe(generalisedKernel);
      const expected = blocks.flatMap(([letter, size, sign]) =>
        letter !== 'Z' ? [] : size % 2 === 1 ? [`${size}`, `${size}`] : [`${size}${sign > 0 ? '+' : '-'}`],
      );
      expect(sorted(chain.blocks)).toBe(keyOf(expected.length === 0 ? [] : expected));
      const f = decideZeroEvent(doubles(s), doubles(w));
      expect(f.decided).toBe(true);
      expect(blocksKey(f.blocks)).toBe(blocksKey(chain.blocks));
      const { positive, negative, zero } = f.inertia;
      expect([positive, negative, zero]).toEqual(signature);
    },
  );
});

describe('the sign rule: [2]+ (1,0,1), [4]+ (1,2,1), [6]+ (3,2,1)', () => {
  it.each([
    [2, 1, 0],
    [4, 1, 2],
    [6, 3, 2],
    [8, 3, 4],
  ] as const)('size %i: (%i, %i, 1)', (size, positive, negative) => {
    for (const sign of [1, -1] as const) {
      // the test's own normal form has the sign of ω(e_1, e_size)
      const { s, w } = evenBlock(size, sign);
      const [block] = zeroChain(s, w, rationals).blocks;
      const isPositive = block!.positive === 1;
      expect(block).toEqual({ size, count: 1, positive: isPositive ? 1 : 0, negative: isPositive ? 0 : 1 });
      expect(inertia(s, rationals)).toEqual(
        isPositive ? { positive, negative, zero: 1 } : { positive: negative, negative: positive, zero: 1 },
      );
    }
  });
});

describe('laws of the exact recursion', () => {
  const lists: [number, 1 | -1 | 0][][] = [
    [],
    [[1, 0]],
    [[2, -1]],
    [[4, 1]],
    [
      [2, 1],
      [2, -1],
    ],
    [[3, 0]],
    [
      [4, 1],
      [2, -1],
    ],
    [[6, -1]],
    [
      [3, 0],
      [2, 1],
    ],
    [
      [4, -1],
      [1, 0],
    ],
    [[5, 0]],
  ];
  it('does not depend on the coordinates, nor on nonzero eigenvalues', () => {
    const random = generator(11);
    for (const list of lists) {
      const plain = zeroBlocks(list);
      const want = zeroChain(plain.s, plain.w, rationals);
      const expected = list.reduce((n, [size, sign]) => n + (sign === 0 ? 2 : 1) * size, 0);
      expect(want.generalisedDimension).toBe(expected);
      const base = sum([plain, oscillator(2), oscillator(-3), pairOfBlocks(1, 2)]);
      const n = base.s.rows;
      for (let k = 0; k < 3; k++) {
        let t = integers(n, n, () => Math.floor(random() * 5) - 2);
        while (rank(t) < n) t = integers(n, n, () => Math.floor(random() * 5) - 2);
        const p = transformed(base, t);
        expect(zeroChain(p.s, p.w, rationals)).toEqual(want);
      }
    }
  });
  it('agrees with the ranks of the powers of L', () => {
    const random = generator(5);
    for (const list of lists) {
      const base = canonical(sum([zeroBlocks(list), oscillator(1)]));
      const p = transformed(base, randomSymplectic(base.s.rows, random));
      const l = multiply(inverse(transpose(p.w)), p.s);
      const n = l.rows;
      const nullity = [0];
      for (let k = 1, power = l; k <= n + 1; k++, power = multiply(power, l)) nullity.push(n - rank(power));
      const { blocks, kernelDimension, generalisedDimension } = zeroChain(p.s, p.w, rationals);
      expect(kernelDimension).toBe(nullity[1]);
      expect(generalisedDimension).toBe(nullity[n]);
      for (let j = 1; j <= n; j++)
        expect(blocks.find((b) => b.size === j)?.count ?? 0).toBe(2 * nullity[j]! - nullity[j - 1]! - nullity[j + 1]!);
    }
  });
  it('turns all signs of even blocks with S, and keeps them under scaling', () => {
    const { s, w } = zeroBlocks([
      [4, 1],
      [2, 1],
      [3, 0],
    ]);
    const turned = zeroChain(congruence(identity(rationals, s.rows), mapMatrix(s, rationals, rationals.neg)), w, rationals);
    const plain = zeroChain(s, w, rationals);
    // S ↦ -S is L ↦ -L: ω(v, L^{-(j-1)}v) changes its sign for even j
    expect(turned.blocks.map(({ size, positive, negative }) => [size, negative, positive])).toEqual(
      plain.blocks.map(({ size, positive, negative }) => [size, positive, negative]),
    );
    const half = zeroChain(
      mapMatrix(s, rationals, (x) => rationals.div(x, rationals.fromInteger(2))),
      w,
      rationals,
    );
    expect(half).toEqual(plain);
  });
  it('works over Q(√2): (p₁ - √2 p₂)² alone has one block of size 2 and a semisimple plane', () => {
    const field = RealField.of({ squareRoots: [2n] });
    const root = field.sqrt({ n: 2n, d: 1n })!;
    const v = [field.zero, field.zero, field.one, field.neg(root)];
    const s = build(field, 4, 4, (i, j) => field.mul(v[i]!, v[j]!));
    const w = build(field, 4, 4, (i, j) => field.fromInteger(j === i + 2 ? 1 : i === j + 2 ? -1 : 0));
    expect(blocksKey(zeroChain(s, w, field).blocks)).toBe('2+ 1 1');
  });
  it('answers on the space of dimension 0 and for nonsingular S', () => {
    const none = zeroMatrix(rationals, 0, 0);
    expect(zeroChain(none, none, rationals)).toEqual({ blocks: [], kernelDimension: 0, generalisedDimension: 0 });
    const { s, w } = oscillator(3);
    expect(zeroChain(s, w, rationals).blocks).toEqual([]);
  });
  it('refuses forms that are not symmetric, not skew, degenerate, or of other shapes', () => {
    const { s, w } = evenBlock(2, 1);
    expect(() => zeroChain(w, w, rationals)).toThrow(ShapeError);
    expect(() => zeroChain(s, identity(rationals, 2), rationals)).toThrow(NotSymplecticError);
    expect(() => zeroChain(s, zeroMatrix(rationals, 2, 2), rationals)).toThrow(NotSymplecticError);
    expect(() => zeroChain(zeroMatrix(rationals, 2, 2), zeroMatrix(rationals, 2, 2), rationals)).toThrow(NotSymplecticError);
    expect(() => zeroChain(s, zeroMatrix(rationals, 4, 4), rationals)).toThrow(ShapeError);
  });
});

describe('signs of odd blocks with a complex structure: signed Young diagrams of u(a, b), Collingwood & McGovern 1993, thm 9.3.3', () => {
  const half = (blocks: readonly SignedBlocks[]) =>
    blocks.map((b) => ({ size: b.size, count: b.count / 2, signs: [b.positive / 2, b.negative / 2] as const, partnerSigns: null }));
  const signature = (i: Matrix<Rational>, w: Matrix<Rational>) => inertia(multiply(transpose(i), w), rationals);
  it('blocks found in random complex coordinates are those put in, and take up the signature of ω', () => {
    const random = generator(3);
    for (const list of [
      [[1, 1]],
      [[1, -1]],
      [[2, 1]],
      [[3, 1]],
      [[3, -1]],
      [
        [3, 1],
        [1, 1],
      ],
      [
        [2, -1],
        [1, 1],
      ],
      [[5, 1]],
      [
        [3, 1],
        [3, -1],
      ],
      [
        [2, 1],
        [2, -1],
        [1, -1],
      ],
    ] as [number, 1 | -1][][]) {
      const { s, w, i } = hermitianSum(list);
      const chain = zeroChain(s, w, rationals, i);
      const parts = half(chain.blocks);
      const { positive, negative } = signature(i, w);
      expect(signatureOfParts(parts)).toEqual([positive / 2, negative / 2]);
      expect(parts.reduce((n, p) => n + p.count * p.size, 0)).toBe(list.reduce((n, [size]) => n + size, 0));
      // a map that commutes with i: a + ib in blocks, here of each realified summand the identity plus a multiple of i, then mixed
      const n = s.rows;
      const c = integers(n, n, () => Math.floor(random() * 3) - 1);
      const commuting = build(rationals, n, n, (r, q) => {
        const ici = multiply(i, multiply(c, i));
        const shift = r === q ? rationals.fromInteger(5) : rationals.zero;
        return rationals.add(shift, rationals.sub(c.data[r * n + q]!, ici.data[r * n + q]!));
      });
      expect(rank(commuting)).toBe(n);
      const there = zeroChain(
        congruence(commuting, s),
        congruence(commuting, w),
        rationals,
        multiply(inverse(commuting), multiply(i, commuting)),
      );
      expect(there).toEqual(chain);
    }
  });
  it('one block of each kind has the sign of ω(e₁, e_j) resp. ω(ie₁, e_j), and [1]+ turns with I', () => {
    for (const size of [1, 3, 5]) {
      const plus = hermitianSum([[size, 1]]);
      const minus = hermitianSum([[size, -1]]);
      const [p] = half(zeroChain(plus.s, plus.w, rationals, plus.i).blocks);
      const [m] = half(zeroChain(minus.s, minus.w, rationals, minus.i).blocks);
      expect(p!.signs[0] + p!.signs[1]).toBe(1);
      expect(m!.signs).toEqual([p!.signs[1], p!.signs[0]]);
    }
    // I = L of the oscillator (q² + p²)/2, read at S = 0
    const { s, w } = oscillator(1);
    const i = multiply(inverse(transpose(w)), s);
    expect(zeroChain(zeroMatrix(rationals, 2, 2), w, rationals, i).blocks).toEqual([{ size: 1, count: 2, positive: 2, negative: 0 }]);
  });
  it('every signed type of u(2, 1), u(2, 2) is realised once', () => {
    for (const [a, b] of [
      [2, 1],
      [2, 2],
    ] as const) {
      const types = signedPartitions(2, { a, b }).map((t) => t.parts.map((p) => `${p.size}:${p.signs}`).join(' '));
      expect(new Set(types).size).toBe(types.length);
      const found = new Set<string>();
      for (const t of signedPartitions(2, { a, b })) {
        const list = t.parts.flatMap(({ size, signs }) => [
          ...new Array<[number, 1]>(signs![0]).fill([size, 1]),
          ...new Array<[number, -1]>(signs![1]).fill([size, -1]),
        ]);
        const { s, w, i } = hermitianSum(list);
        const parts = half(zeroChain(s, w, rationals, i).blocks);
        found.add(parts.map((p) => `${p.size}:${p.signs}`).join(' '));
      }
      expect(found.size).toBe(types.length);
    }
  });
  it('in floating point, with noise', () => {
    for (const list of [
      [[1, 1]],
      [
        [3, -1],
        [1, 1],
      ],
      [
        [2, 1],
        [1, -1],
      ],
      [[5, 1]],
    ] as [number, 1 | -1][][]) {
      const { s, w, i } = hermitianSum(list);
      const want = zeroChain(s, w, rationals, i);
      // noise that i preserves
      const e = noisy(identity(rationals, s.rows), 1e-10, generator(1));
      const turned = numberCongruence(doubles(i), e);
      const hessian = numberBuild(s.rows, s.rows, (r, c) => {
        const k = r * s.rows + c;
        return doubles(s).data[k]! + (e.data[k]! + turned.data[k]!) / 2 - (r === c ? 1 : 0);
      });
      const f = decideZeroEvent(hessian, doubles(w), { complexStructure: doubles(i), scale: 1 });
      expect(f.decided).toBe(true);
      expect(f.blocks).toEqual(want.blocks);
    }
  });
});
