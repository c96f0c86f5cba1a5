/**
 * Collisions of imaginary eigenvalues. The ten examples are those of Golubitsky & Stewart 1987 and of Dellnitz, Melbourne & Marsden 1992:
 * real and quaternionic type meet with opposite Krein signs and split; on a plane of complex type V meets its conjugate and passes.
 */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { embedSparse, flowBlocks, symplecticPart } from '../../src/action/index.ts';
import { characteristicModular, characteristicPolynomial, nonzeroSquares } from '../../src/event/characteristic.ts';
import { type ClusterPlace, collisionAt, collisionsOf } from '../../src/event/collisions.ts';
import { exactPlaces } from '../../src/event/collisions-exact.ts';
import { genericMultiplicity, suspectBlocks } from '../../src/event/collisions-suspects.ts';
import { polynomialRoots } from '../../src/event/polynomial-roots.ts';
import { blockForms } from '../../src/event/zero-event.ts';
import { type Algebraic, RealField, rational, rationals } from '../../src/field/index.ts';
import { fromRows, type Matrix, sparse } from '../../src/linear/index.ts';
import { action, blocks, canonical, diag, F, rotation } from '../support/actions.ts';

interface Example {
  readonly example: string;
  readonly codim: number;
  readonly movement: string;
  readonly kernel: number;
  readonly generalised: number;
  readonly inertia: readonly [number, number, number];
  readonly S: readonly (readonly (number | string)[])[];
  readonly W: readonly (readonly (number | string)[])[];
  readonly generators: readonly (readonly (readonly (number | string)[])[])[];
}

/** h is 1/2, r is √3/2. */
const examples: Example[] = JSON.parse(readFileSync(new URL('data/imaginary-collisions.json', import.meta.url), 'utf8'));
const field = RealField.of({ squareRoots: [3n] });
const entry = (x: number | string): Algebraic => {
  if (typeof x === 'number') return field.fromInteger(x);
  const value = x.endsWith('h') ? field.fromRational(1n, 2n) : field.sin(1, 3)!;
  return x.startsWith('-') ? field.neg(value) : value;
};
const matrixOf = (rows: readonly (readonly (number | string)[])[]) =>
  fromRows(
    field,
    rows.map((r) => r.map(entry)),
  );

function placesOf(f: RealField, s: Matrix<Algebraic>, w: Matrix<Algebraic>, generators: readonly Matrix<Algebraic>[]) {
  const act = action(f, w, generators);
  const forms = blockForms(flowBlocks(act, symplecticPart(act)), embedSparse(sparse(s), f, act.field), act.form);
  return { forms, field: act.field, places: exactPlaces(forms, act.field)! };
}

describe('imaginary collisions of Golubitsky & Stewart 1987', () => {
  it.each(examples)('$example', (e) => {
    const { places } = placesOf(
      field,
      matrixOf(e.S),
      matrixOf(e.W),
      e.generators.map((g) => matrixOf(g)),
    );
    const [c, ...rest] = collisionsOf(places);
    expect(rest).toEqual([]);
    expect(c).toMatchObject({ kind: 'imaginary', im: 1, exact: '1', codimension: e.codim });
    const motion = e.movement.startsWith('passing') ? 'passes' : e.movement.startsWith('splitting') ? 'splits' : 'degenerate';
    expect(c!.motion).toBe(motion);
    // both ±i, over the reals
    expect(2 * c!.sizes.length).toBe(e.kernel);
    expect(2 * c!.multiplicity).toBe(e.generalised);
    // all of these spectra are ±i alone: the Krein signature doubled is the inertia
    expect([2 * c!.krein![0], 2 * c!.krein![1]]).toEqual([e.inertia[0], e.inertia[1]]);
  });
});

describe('places off zero', () => {
  it('two equal oscillators with different components: codimension 1 between them, 3 without symmetry (von Neumann & Wigner 1929)', () => {
    const swap = diag(F, 1, -1, 1, -1);
    const { places } = placesOf(F, diag(F, 4, 4, 1, 1), canonical(F, 2), [swap]);
    const [c] = collisionsOf(places);
    expect(c).toMatchObject({ codimension: 1, codimensionWithoutSymmetry: 3, motion: 'passes', multiplicity: 2, krein: [2, 0] });
    expect(c!.parts.map((p) => p.block)).toEqual([0, 1]);
    expect(c!.exact).toBe('2');
  });
  it('different frequencies are told apart by the prime alone', () => {
    const { forms, field: f, places } = placesOf(F, diag(F, 4, 9, 1, 1), canonical(F, 2), []);
    expect(suspectBlocks(forms, f)).toEqual([]);
    expect(places).toEqual([]);
  });
  it('rational squares are split off: frequencies 1 and √3, each with both Krein signs', () => {
    const spring = [
      [2, 1],
      [1, 2],
    ];
    const rows = Array.from({ length: 8 }, () => new Array<number>(8).fill(0));
    for (const copy of [0, 1])
      for (let i = 0; i < 2; i++) {
        const sign = copy === 0 ? 1 : -1;
        for (let j = 0; j < 2; j++) rows[2 * copy + i]![2 * copy + j] = sign * spring[i]![j]!;
        rows[4 + 2 * copy + i]![4 + 2 * copy + i] = sign;
      }
    const { places } = placesOf(
      F,
      fromRows(
        F,
        rows.map((x) => x.map((y) => F.fromInteger(y))),
      ),
      canonical(F, 4),
      [],
    );
    expect(collisionsOf(places).map((c) => [c.exact, c.codimension, c.krein])).toEqual([
      ['1', 3, [1, 1]],
      ['sqrt(3)', 3, [1, 1]],
    ]);
  });
  it('Krein signatures of the conjugate roots of y² + 5y + 5, one by one', () => {
    // two copies of K = [[4, 1], [1, −1]], M⁻¹ = diag(1, −1): the slow mode lives on q2 and has negative energy
    const rows = Array.from({ length: 8 }, () => new Array<number>(8).fill(0));
    for (const copy of [0, 2]) {
      rows[copy]![copy] = 4;
      rows[copy]![copy + 1] = rows[copy + 1]![copy] = 1;
      rows[copy + 1]![copy + 1] = -1;
      rows[4 + copy]![4 + copy] = 1;
      rows[5 + copy]![5 + copy] = -1;
    }
    const s = fromRows(
      F,
      rows.map((x) => x.map((y) => F.fromInteger(y))),
    );
    const found = collisionsOf(placesOf(F, s, canonical(F, 4), []).places);
    expect(found.map((c) => [c.exact, c.krein, c.codimension])).toEqual([
      [null, [0, 2], 3],
      [null, [2, 0], 3],
    ]);
    expect(found.map((c) => c.im ** 2)).toEqual([expect.closeTo((5 - Math.sqrt(5)) / 2, 12), expect.closeTo((5 + Math.sqrt(5)) / 2, 12)]);
  });
  it('a real pair on a plane of complex type costs 1, on sp(2,R) nothing (simplest real pair: s(K))', () => {
    const r = rotation(F, 1, 3);
    const lifted = blocks(r, r);
    // |p|²/2 − |q|²/2 on T*R²: real eigenvalues ±1 on V and on its conjugate
    const s = diag(F, -1, -1, 1, 1);
    const planar = collisionsOf(placesOf(F, s, canonical(F, 2), [lifted]).places);
    expect(planar).toMatchObject([{ kind: 'real', re: 1, codimension: 1, motion: 'passes', multiplicity: 2 }]);
    expect(collisionsOf(placesOf(F, diag(F, -1, 1), canonical(F, 1), []).places)).toEqual([]);
  });
  it('no places, no collisions; a simple place costs nothing', () => {
    expect(collisionsOf([])).toEqual([]);
    const simple: ClusterPlace = {
      kind: 'imaginary',
      re: 0,
      im: 1,
      exact: null,
      parts: [{ block: 0, classNumber: 1, members: [[1]], sizes: [1], krein: [1, 0] }],
    };
    expect(collisionAt(simple).codimension).toBe(0);
    expect(collisionsOf([simple])).toEqual([]);
  });
  it('how often a free root occurs in each class', () => {
    expect([1, 2, 3, 4, 5, 6, 7, 8, 9, 10].map((c) => genericMultiplicity(c as 1, 4))).toEqual([4, 2, 2, 4, 8, 4, 2, 4, 2, 4]);
  });
});

describe('characteristic polynomials and roots', () => {
  const q = (n: number) => rational(BigInt(n));
  const companion = fromRows(rationals, [
    [q(0), q(0), q(-6)],
    [q(1), q(0), q(11)],
    [q(0), q(1), q(-3)],
  ]);
  it('of a companion matrix, over Q and modulo a prime', () => {
    // x³ + 3x² − 11x + 6
    expect(characteristicPolynomial(companion).map((c) => Number(c.n))).toEqual([6, -11, 3, 1]);
    const p = 101;
    const data = Int32Array.from([0, 0, p - 6, 1, 0, 11, 0, 1, p - 3]);
    expect([...characteristicModular({ p, rows: 3, cols: 3, data })]).toEqual([6, p - 11, 3, 1]);
  });
  it('of empty and of diagonal matrices', () => {
    expect(characteristicPolynomial(fromRows(rationals, [], 0)).map((c) => Number(c.n))).toEqual([1]);
    const d = fromRows(rationals, [
      [q(2), q(0)],
      [q(0), q(0)],
    ]);
    expect(characteristicPolynomial(d).map((c) => Number(c.n))).toEqual([0, -2, 1]);
    expect(nonzeroSquares([0, 0, 3, 0, 1], (x) => x === 0)).toEqual([3, 1]);
  });
  it('roots of (x² + 1)(x − 3)(x + 1/2) and of x⁶ − 2', () => {
    const roots = polynomialRoots([-1.5, -2.5, -0.5, -2.5, 1]);
    expect(roots.map((z) => z.im)).toEqual([0, 0, expect.closeTo(1, 12), expect.closeTo(-1, 12)]);
    expect(roots[0]!.re).toBeCloseTo(-0.5, 12);
    expect(roots[1]!.re).toBeCloseTo(3, 12);
    const sixth = polynomialRoots([-2, 0, 0, 0, 0, 0, 1], 2);
    for (const z of sixth) expect(Math.hypot(z.re, z.im)).toBeCloseTo(2 ** (1 / 6), 12);
  });
});
