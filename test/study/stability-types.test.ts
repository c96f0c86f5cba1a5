import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ShapeError } from '../../src/errors/index.ts';
import { RealField } from '../../src/field/index.ts';
import { numberBuild, numberMatrix } from '../../src/linear/index.ts';
import { generalEigenvalues } from '../../src/linear/spectral.ts';
import { stabilityTypes } from '../../src/study/stability-types.ts';
import { action, canonical, lift, mat } from '../support/actions.ts';

const Q = RealField.of();
const plain = (half: number) => stabilityTypes(action(Q, canonical(Q, half), []));
const diagonal = (...x: number[]) => numberBuild(x.length, x.length, (i, j) => (i === j ? x[i]! : 0));

describe('stability types', () => {
  it('one degree of freedom: oscillator, barrier, free particle, nothing', () => {
    const type = plain(1);
    expect(type(diagonal(1, 1))).toEqual({ zero: 0, imaginary: 2, real: 0, complex: 0 });
    expect(type(diagonal(-1, 1))).toEqual({ zero: 0, imaginary: 0, real: 2, complex: 0 });
    expect(type(diagonal(0, 1))).toEqual({ zero: 2, imaginary: 0, real: 0, complex: 0 });
    expect(type(diagonal(0, 0))).toEqual({ zero: 2, imaginary: 0, real: 0, complex: 0 });
  });
  it('two degrees of freedom: λ⁴ + aλ² + b in every region of (a, b)', () => {
    const type = plain(2);
    expect(type(diagonal(1, 4, 1, 1))).toEqual({ zero: 0, imaginary: 4, real: 0, complex: 0 });
    expect(type(diagonal(1, -4, 1, 1))).toEqual({ zero: 0, imaginary: 2, real: 2, complex: 0 });
    expect(type(diagonal(-1, -4, 1, 1))).toEqual({ zero: 0, imaginary: 0, real: 4, complex: 0 });
    expect(type(diagonal(0, 4, 1, 1))).toEqual({ zero: 2, imaginary: 2, real: 0, complex: 0 });
    // H = q1 p2 - q2 p1 + (q1 p1 + q2 p2): eigenvalues ±1 ± i
    const focus = numberMatrix(4, 4, [0, 0, 1, 1, 0, 0, -1, 1, 1, -1, 0, 0, 1, 1, 0, 0]);
    expect(type(focus)).toEqual({ zero: 0, imaginary: 0, real: 0, complex: 4 });
  });
  it('three degrees of freedom without symmetry, beyond the closed formulas', () => {
    expect(plain(3)(diagonal(1, -2, 3, 1, 1, 1))).toEqual({ zero: 0, imaginary: 4, real: 2, complex: 0 });
  });
  it('three equal oscillators on a ring: the pair comes once for each of two modes', () => {
    const cycle = mat(Q, [
      [0, 0, 1],
      [1, 0, 0],
      [0, 1, 0],
    ]);
    const flip = mat(Q, [
      [1, 0, 0],
      [0, 0, 1],
      [0, 1, 0],
    ]);
    const act = action(Q, canonical(Q, 3), [lift(cycle), lift(flip)]);
    const s = numberBuild(6, 6, (i, j) => (i >= 3 || j >= 3 ? (i === j ? 1 : 0) : i === j ? 1 : -1));
    // eigenvalues of the potential: -1 once, 2 twice
    expect(stabilityTypes(act)(s)).toEqual({ zero: 0, imaginary: 4, real: 2, complex: 0 });
    expect(() => stabilityTypes(act)(numberMatrix(2, 2))).toThrow(ShapeError);
  });
  it('random Hessians of two degrees of freedom: as from the eigenvalues (fast-check)', () => {
    const type = plain(2);
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -6, max: 6 }), { minLength: 16, maxLength: 16 }), (e) => {
        const s = numberBuild(4, 4, (i, j) => e[4 * Math.min(i, j) + Math.max(i, j)]!);
        const l = numberBuild(4, 4, (i, j) => (i < 2 ? s.data[(i + 2) * 4 + j]! : -s.data[(i - 2) * 4 + j]!));
        const found = type(s);
        const z = generalEigenvalues(l);
        // eigenvalues within 1e-3 of an axis decide nothing here
        fc.pre(
          z.every((x) => Math.hypot(x.re, x.im) > 1e-3 && [x.re, x.im].every((y) => y === 0 || Math.abs(y) < 1e-9 || Math.abs(y) > 1e-3)),
        );
        expect(found.imaginary).toBe(z.filter((x) => Math.abs(x.re) < 1e-9).length);
        expect(found.real).toBe(z.filter((x) => Math.abs(x.im) < 1e-9).length);
        expect(found.complex).toBe(4 - found.imaginary - found.real);
      }),
      { numRuns: 100 },
    );
  });
});
