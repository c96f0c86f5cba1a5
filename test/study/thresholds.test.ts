/** Thresholds of families against published values and by hand, to ten digits, and the closed forms of roots. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RealField, rational, rationals } from '../../src/field/index.ts';
import { declareObject, declareOptions } from '../../src/index.ts';
import type { Declaration } from '../../src/model/declaration/index.ts';
import { RealRoots } from '../../src/polynomial/index.ts';
import { closedForm, simplestBetween } from '../../src/study/closed-form.ts';
import { sweepResult } from '../../src/study/sweep.ts';
import { thresholds } from '../../src/study/thresholds.ts';
import { maxwellRing, pendulumRing, vortexRing } from './sweep-models.ts';

const steps = (declaration: Declaration, count: number): Declaration => ({
  ...declaration,
  range: new Map([...declaration.range].map(([name, range]) => [name, { ...range, steps: count }])),
});

describe('ring of pendulums with coupling -1: g = 4 sin(πk/N)², splits, codimension 1', () => {
  it.each([3, 4, 5, 6, 7, 8, 9])('N = %i', async (n) => {
    const { crossings } = await sweepResult(steps(declareObject(pendulumRing(n)), 8));
    const expected = Array.from({ length: Math.floor(n / 2) }, (_, k) => 4 * Math.sin((Math.PI * (k + 1)) / n) ** 2);
    expect(crossings).toHaveLength(expected.length);
    crossings.forEach((c, k) => {
      expect(Math.abs(c.value - expected[k]!)).toBeLessThan(1e-13);
      expect(c).toMatchObject({
        kernel: 2 * (k + 1) === n ? 1 : 2,
        codimension: 1,
        motion: 'splits',
        versal: true,
        agrees: true,
        arithmetic: 'exact',
        observed: { before: 'real', after: 'imaginary' },
      });
      expect(c.exact).not.toBeNull();
    });
  });

  it('with the rotations alone the double ones have codimension 2', async () => {
    const model = { ...pendulumRing(5, 'cyclic:5'), symmetry: { group: 'cyclic:5', action: 'ring', on: [['q1', 'q2', 'q3', 'q4', 'q5']] } };
    const { crossings } = await sweepResult(steps(declareObject(model), 8));
    expect(crossings.map((c) => [c.codimension, c.motion])).toEqual([
      [2, 'degenerate'],
      [2, 'degenerate'],
    ]);
  });
});

describe('oscillator in a turning frame: k = W²', () => {
  const turning = (set: Record<string, string>, range: Record<string, [string, string]>) =>
    declareOptions({
      group: 'cyclic:5',
      on: [['q1', 'q2']],
      hamiltonian: '(p1^2+p2^2)/2 + k*(q1^2+q2^2)/2 - W*(q1*p2-q2*p1)',
      set,
      vary: Object.keys(range),
      range,
    });
  it.each([
    ['W', '3/2', 'k', '9/4'],
    ['W', 'sqrt(2)', 'k', '2'],
    ['k', '2', 'W', 'sqrt(2)'],
    ['k', '1 + sqrt(5)/2 - sqrt(5)/2 + 5/4', 'W', '3/2'],
  ])('%s = %s: %s = %s, passes', async (name, value, swept, exact) => {
    const { crossings } = await sweepResult(turning({ [name]: value }, { [swept]: ['1/2', '3'] }));
    expect(crossings).toMatchObject([
      {
        exact,
        kernel: 2,
        blocks: [1, 1],
        codimension: 1,
        motion: 'passes',
        versal: true,
        agrees: true,
        observed: { before: 'imaginary', after: 'imaginary' },
      },
    ]);
    const c = crossings[0]!;
    const soft = swept === 'k' ? c.inertiaBefore : c.inertiaAfter;
    const stiff = swept === 'k' ? c.inertiaAfter : c.inertiaBefore;
    expect([soft, stiff]).toEqual([
      { positive: 2, zero: 0, negative: 2 },
      { positive: 4, zero: 0, negative: 0 },
    ]);
  });
});

describe('formulas in the other parameters', () => {
  const formulas = async (hamiltonian: string, set: Record<string, string>, range: Record<string, [string, string]>, rest = {}) =>
    (await sweepResult(declareOptions({ hamiltonian, set, range, ...rest }))).crossings.map((c) => c.formula ?? null);
  const turning = '(p1^2+p2^2)/2 + k*(q1^2+q2^2)/2 - W*(q1*p2-q2*p1)';
  const group = { group: 'cyclic:5', on: [['q1', 'q2']] };

  it('k = W² and W = √k for the oscillator in a turning frame', async () => {
    expect(await formulas(turning, { W: '3/2' }, { k: ['1', '3'] }, group)).toEqual(['W^2']);
    expect(await formulas(turning, { k: '2' }, { W: ['1', '3'] }, group)).toEqual(['sqrt(k)']);
  });

  it('a quotient, two square roots, and none of degree three or without other parameters', async () => {
    expect(await formulas('p^2/2 + (a*mu + b)*q^2/2', { a: '3', b: '-1' }, { mu: ['-1', '1'] })).toEqual(['-b/a']);
    const two = await formulas('(p1^2+p2^2)/2 + (a*q1^2 + b*q2^2)/2 + mu*q1*q2', { a: '2', b: '3' }, { mu: ['-3', '3'] });
    expect(two).toHaveLength(2);
    for (const text of two) expect(text).toMatch(/sqrt/);
    expect(await formulas('p^2/2 + (mu^3 - a)*q^2/2', { a: '2' }, { mu: ['-3', '3'] })).toEqual([null]);
    expect(await formulas('p^2/2 + (mu - 1)*q^2/2', {}, { mu: ['-3', '3'] })).toEqual([null]);
  });
});

describe('rings of equal vortices (T. H. Havelock 1931)', () => {
  it.each([3, 4, 5, 6, 7, 8, 9, 10, 11, 12])('N = %i: λ² of mode k is k(N - k)(k(N - k) - 2(N - 1))/4', async (n) => {
    const { paths, singular } = await sweepResult(steps(declareObject(vortexRing(n)), 2));
    // at s = 1, the middle of the range
    const found = paths.paths.map(({ points }) => points[1]!).map(({ re, im }) => re * re - im * im);
    const expected = Array.from({ length: Math.floor(n / 2) + 1 }, (_, k) => (k * (n - k) * (k * (n - k) - 2 * (n - 1))) / 4);
    // modes k and N - k are one pair of the real system
    found.sort((a, b) => a - b);
    expected.sort((a, b) => a - b);
    expect(found).toHaveLength(expected.length);
    found.forEach((x, i) => {
      expect(Math.abs(x - expected[i]!)).toBeLessThan(1e-10 * n * n);
    });
    expect(singular.length).toBe(n === 7 ? 2 : 1);
  });
});

describe('ring of equal masses about a fixed centre (J. C. Maxwell 1859)', () => {
  it.each([
    [10, 420.99302956],
    [12, 733.96080075],
  ])('N = %i: M/m = %d', async (n, critical) => {
    const { collisions } = await sweepResult(steps(declareObject(maxwellRing(n)), 4));
    const first = collisions.find((c) => c.motion === 'splits')!;
    expect(Math.abs(1 / first.at - critical)).toBeLessThan(6e-9);
    expect(first).toMatchObject({ kind: 'imaginary', components: ['B'] });
    expect([...first.signs].sort()).toEqual([-1, 1]);
  });
});

describe('closed forms', () => {
  const q = RealField.of();
  const polynomial = (...c: number[]) => c.map((x) => q.fromInteger(x));
  const found = (...c: number[]) =>
    thresholds([polynomial(...c)], rational(-100n), rational(100n), q).map((t) => t.closed?.text ?? t.digits);

  it.each([
    ['x - 2/3', [-2, 3], ['2/3']],
    ['x² - x - 1', [-1, -1, 1], ['(1 - sqrt(5))/2', '(1 + sqrt(5))/2']],
    ['x² - 12', [-12, 0, 1], ['-2*sqrt(3)', '2*sqrt(3)']],
    [
      'x⁴ - 10x² + 1, the field of √2 and √3',
      [1, 0, -10, 0, 1],
      ['-sqrt(2) - sqrt(3)', '-sqrt(2) + sqrt(3)', 'sqrt(2) - sqrt(3)', 'sqrt(2) + sqrt(3)'],
    ],
    ['x⁴ - 2x² - 1', [-1, 0, -2, 0, 1], ['-sqrt(1 + sqrt(2))', 'sqrt(1 + sqrt(2))']],
    ['(x - 1/7)(x² - 3)', [3, -21, -1, 7], ['-sqrt(3)', '1/7', 'sqrt(3)']],
    ['(x³ - 2)', [-2, 0, 0, 1], ['1.259921049894873164767210607278']],
    ['a double root', [1, -2, 1], ['1']],
    ['no real root', [1, 0, 1], []],
  ] as const)('%s', (_, c, texts) => {
    expect(found(...c).sort()).toEqual([...texts].sort());
  });

  it('are roots, exactly, and lie in their intervals, for random products of a linear and a quadratic factor', () => {
    const roots = new RealRoots(q);
    const small = fc.integer({ min: -9, max: 9 });
    fc.assert(
      fc.property(small, small, small, fc.integer({ min: 1, max: 9 }), (a, b, c, d) => {
        const p = roots.ring.mul(polynomial(a, d), polynomial(b, c, 1));
        for (const t of thresholds([p], rational(-1000n), rational(1000n), q)) {
          const form = closedForm(t.factor, t.root, q)!;
          expect(form.element).toBeDefined();
          const { field, value } = form.element!;
          const lifted = p.map((x) => field.embed(q, x));
          expect(field.isZero(lifted.reduceRight((s, x) => field.add(field.mul(s, value), x), field.zero))).toBe(true);
          expect(Math.abs(form.value - t.value)).toBeLessThan(1e-12);
        }
      }),
      { numRuns: 40, seed: 7 },
    );
  });

  it('the simplest fraction of an interval', () => {
    const between = (a: [bigint, bigint], b: [bigint, bigint]) => rationals.format(simplestBetween(rational(...a), rational(...b)));
    expect(between([1n, 3n], [1n, 2n])).toBe('1/2');
    expect(between([333n, 1000n], [334n, 1000n])).toBe('1/3');
    expect(between([-7n, 5n], [-13n, 10n])).toBe('-4/3');
    expect(between([-1n, 5n], [1n, 9n])).toBe('0');
    expect(between([5n, 2n], [7n, 2n])).toBe('3');
  });

  it('zeros of two blocks at one value are one threshold, near ones are two', () => {
    const at = thresholds([polynomial(-2, 0, 1), polynomial(2, -3, 0, 1).slice(0, 2), polynomial(-4, 0, 2)], rational(0n), rational(9n), q);
    expect(at.map((t) => t.blocks.map((b) => b.block))).toEqual([[1], [0, 2]]);
    const tiny = thresholds(
      [
        [q.fromRational(-1n, 3n), q.one],
        [q.fromRational(-(10n ** 20n), 3n * 10n ** 20n + 1n), q.one],
      ],
      rational(0n),
      rational(1n),
      q,
    );
    expect(tiny).toHaveLength(2);
  });

  it('a zero at an end of the range belongs to it', () => {
    expect(thresholds([polynomial(-2, 1)], rational(2n), rational(3n), q)).toHaveLength(1);
    expect(thresholds([polynomial(-2, 1)], rational(1n), rational(2n), q)).toHaveLength(1);
    expect(thresholds([polynomial(-2, 1)], rational(21n, 10n), rational(3n), q)).toHaveLength(0);
  });
});
