import { describe, expect, it } from 'vitest';
import { NotAGroupError, ShapeError } from '../../src/errors/index.ts';
import { type Algebraic, RealField } from '../../src/field/index.ts';
import { build, directSum, type Matrix, numberBuild, numberMatrix, sparse, symmetricEigenvalues } from '../../src/linear/index.ts';
import { type ComponentModes, normalModes } from '../../src/study/modes.ts';

const Q = RealField.of();
const permutation = (images: readonly number[]) =>
  build<Algebraic>(Q, images.length, images.length, (i, j) => (images[j] === i ? Q.one : Q.zero));
const cycle = (n: number) => permutation(Array.from({ length: n }, (_, i) => (i + 1) % n));
const flip = (n: number) => permutation(Array.from({ length: n }, (_, i) => (n - i) % n));
const ring = (n: number) => numberBuild(n, n, (i, j) => (i === j ? 3 : (i - j + n) % n === 1 || (j - i + n) % n === 1 ? -1 : 0));
const values = (modes: readonly ComponentModes[]) =>
  modes.flatMap((c) => [...c.squares].flatMap((x) => new Array<number>(c.dimension).fill(x))).sort((a, b) => a - b);
const near = (found: readonly number[], wanted: readonly number[]) => {
  expect(found.length).toBe(wanted.length);
  wanted.forEach((x, i) => {
    expect(found[i]!).toBeCloseTo(x, 10);
  });
};

describe('normal modes by components', () => {
  it.each([3, 4, 6, 7])('a ring of %i equal oscillators: ω² = 1 + 4 sin²(πk/n), in planes but for the ends', (n) => {
    const modes = normalModes(Q, [sparse(cycle(n)), sparse(flip(n))], ring(n));
    near(
      values(modes),
      Array.from({ length: n }, (_, k) => 1 + 4 * Math.sin((Math.PI * k) / n) ** 2).sort((a, b) => a - b),
    );
    expect(modes.map((c) => c.dimension).sort()).toEqual(
      n % 2 === 1 ? [1, ...new Array((n - 1) / 2).fill(2)] : [1, 1, ...new Array(n / 2 - 1).fill(2)],
    );
  });
  it('rotations alone: components of complex type, each value once per copy', () => {
    const modes = normalModes(Q, [sparse(cycle(5))], ring(5));
    expect(modes.map((c) => [c.type, c.dimension, c.squares.length])).toEqual([
      ['real', 1, 1],
      ['complex', 2, 1],
      ['complex', 2, 1],
    ]);
    near(values(modes), [...symmetricEigenvalues(ring(5))]);
  });
  it('the quaternion group by left multiplication on H: one value, four times', () => {
    const rows = (r: number[][]): Matrix<Algebraic> => build<Algebraic>(Q, 4, 4, (i, j) => Q.fromInteger(r[i]![j]!));
    const i = rows([
      [0, -1, 0, 0],
      [1, 0, 0, 0],
      [0, 0, 0, -1],
      [0, 0, 1, 0],
    ]);
    const j = rows([
      [0, 0, -1, 0],
      [0, 0, 0, 1],
      [1, 0, 0, 0],
      [0, -1, 0, 0],
    ]);
    const twice = [i, j].map((m) => sparse(directSum(m, m)));
    const k = numberBuild(8, 8, (a, b) => (a % 4 === b % 4 ? (a === b ? 2 : 1) : 0));
    const modes = normalModes(Q, twice, k);
    expect(modes.map((c) => [c.type, c.dimension, c.multiplicity])).toEqual([['quaternionic', 4, 2]]);
    near([...modes[0]!.squares], [1, 3]);
  });
  it('with masses: the pencil block by block has the eigenvalues of the whole', () => {
    const mass = numberBuild(6, 6, (i, j) => (i === j ? (i % 2 === 0 ? 1 : 2) : 0));
    const generators = [permutation([2, 3, 4, 5, 0, 1]), flip(6)].map((m) => sparse(m));
    const whole = numberBuild(6, 6, (i, j) => ring(6).data[i * 6 + j]! / Math.sqrt(mass.data[i * 7]! * mass.data[j * 7]!));
    near(values(normalModes(Q, generators, ring(6), { mass })), [...symmetricEigenvalues(whole)]);
  });
  it('no generators, and nothing at all', () => {
    near(values(normalModes(Q, [], numberMatrix(2, 2, [2, 1, 1, 2]))), [1, 3]);
    expect(normalModes(Q, [], numberMatrix(0, 0))).toEqual([]);
  });
  it('sizes that differ, and matrices without end', () => {
    expect(() => normalModes(Q, [sparse(cycle(3))], ring(4))).toThrow(ShapeError);
    const shear = build<Algebraic>(Q, 2, 2, (i, j) => (i <= j ? Q.one : Q.zero));
    expect(() => normalModes(Q, [sparse(shear)], numberMatrix(2, 2, [0, 0, 0, 0]), { orderLimit: 100 })).toThrow(NotAGroupError);
  });
});
