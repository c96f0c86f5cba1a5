/** Determinants of the components of whole models in factors, and where they vanish, against values found by hand or by other routes. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RealField } from '../../src/field/index.ts';
import { determinant, type Matrix } from '../../src/linear/index.ts';
import { type Declaration, declare } from '../../src/model/declaration/index.ts';
import { parseExpression } from '../../src/model/expression/index.ts';
import { numericValue } from '../../src/model/numeric-value.ts';
import { PolynomialRing, type RationalFunction, RationalFunctionField } from '../../src/polynomial/index.ts';
import { renderHtml, renderLatex, renderMarkdown, renderText } from '../../src/report/index.ts';
import { componentsResult } from '../../src/study/components.ts';
import { determinantParts } from '../../src/study/factored-determinant.ts';
import { determinantThresholds } from '../../src/study/factored-thresholds.ts';
import type { ComponentSummary } from '../../src/study/result.ts';

const file = (text: string): Declaration => declare({ text }, []);
const components = async (text: string): Promise<Record<string, ComponentSummary>> =>
  Object.fromEntries((await componentsResult(file(text))).components.map((c) => [c.label, c]));
const number = (text: string, at: Record<string, number> = {}): number => numericValue(parseExpression(text), new Map(Object.entries(at)));

const ring = (parameters: string) => `
coordinates: [q1, q2, q3]
momenta: [p1, p2, p3]
${parameters}
hamiltonian: (p1^2+p2^2+p3^2)/2 + c*((q1-q2)^2+(q2-q3)^2+(q3-q1)^2)/2 + k*(q1^2+q2^2+q3^2)/2
symmetry: {group: dihedral:3, action: ring, on: [[q1, q2, q3]], timeReversal: true}
`;

describe('three resonators on a ring, by hand: stiffness k and k + 3c', () => {
  it('c = -1/3 where k = 1', async () => {
    const { A1, E } = await components(ring('parameters: {c: 0, k: 1}\nvary: [c]'));
    expect(A1).toMatchObject({ determinant: '3', thresholds: [] });
    expect(E!.determinant).toBe('2*(1 + 3*c)');
    expect(E!.thresholds).toEqual([{ parameter: 'c', exact: '-1/3', value: -1 / 3, signChange: true }]);
  });
  it('c = -k/3 where k has no value', async () => {
    const { A1, E } = await components(ring('vary: [c]'));
    expect(A1).toMatchObject({ determinant: '3*k', thresholds: [] });
    expect(E!.determinant).toBe('2*(3*c + k)');
    expect(E!.thresholds).toEqual([{ parameter: 'c', exact: '-k/3', value: null, signChange: true }]);
  });
  it('a second varied parameter stands in the determinant and takes its value in the threshold', async () => {
    const { E } = await components(ring('parameters: {c: 0, k: 2}\nvary: [c, k]'));
    expect(E!.determinant).toBe('2*(3*c + k)');
    expect(E!.thresholds).toEqual([{ parameter: 'c', exact: '-2/3', value: -2 / 3, signChange: true }]);
  });
  it('no parameter at all: the number, no thresholds', async () => {
    const { A1, E } = await components(ring('parameters: {c: 1, k: 1}'));
    expect(E).toMatchObject({ determinant: '8' });
    expect([A1!.thresholds, E!.thresholds]).toEqual([undefined, undefined]);
  });
  it('nothing varies: the first parameter without value', async () => {
    const { E } = await components(ring('parameters: {k: 1}'));
    expect(E!.thresholds).toMatchObject([{ parameter: 'c', exact: '-1/3', value: -1 / 3 }]);
  });
  it('identically zero', async () => {
    const { A1, E } = await components(ring('parameters: {c: 1, k: 0}\nvary: [c]'));
    expect(A1).toMatchObject({ determinant: '0', thresholds: [] });
    expect(E).toMatchObject({ determinant: '6*c', thresholds: [{ exact: '0', value: 0, signChange: true }] });
  });
});

it('a varied parameter that breaks the symmetry has no thresholds: it is no symbol', async () => {
  const { E } = await components(`
coordinates: [q1, q2, q3]
momenta: [p1, p2, p3]
parameters: {b: 0}
vary: [b]
hamiltonian: (p1^2+p2^2+p3^2)/2 + (q1^2+q2^2+q3^2)/2 + b*q1^2
symmetry: {group: dihedral:3, action: ring, on: [[q1, q2, q3]], timeReversal: true}
`);
  expect(E!.determinant).toBe('2');
  expect(E!.thresholds).toBeUndefined();
});

describe('inverted pendulums on a ring of N springs: g = 4 sin²(πk/N), the spectrum of the cycle', () => {
  it.each([3, 4, 5, 6, 8, 12])('N = %i', async (n) => {
    const names = Array.from({ length: n }, (_, i) => i + 1);
    const found = await components(`
coordinates: [${names.map((i) => `q${i}`).join(', ')}]
momenta: [${names.map((i) => `p${i}`).join(', ')}]
parameters: {g: 1}
vary: [g]
hamiltonian: ${names.map((i) => `p${i}^2/2 + (q${i}-q${(i % n) + 1})^2/2 - g*q${i}^2/2`).join(' + ')}
symmetry: {group: dihedral:${n}, action: ring, on: [[${names.map((i) => `q${i}`).join(', ')}]], timeReversal: true}
`);
    const expected = Array.from({ length: Math.floor(n / 2) + 1 }, (_, k) => 4 * Math.sin((Math.PI * k) / n) ** 2);
    const thresholds = Object.values(found).flatMap((c) => c.thresholds!);
    expect(thresholds.every((t) => t.signChange && t.parameter === 'g' && t.exact !== null)).toBe(true);
    const values = thresholds.map((t) => number(t.exact!)).sort((a, b) => a - b);
    expect(values).toHaveLength(expected.length);
    for (const [i, v] of values.entries()) expect(v).toBeCloseTo(expected[i]!, 12);
    for (const t of thresholds) expect(t.value!).toBeCloseTo(number(t.exact!), 14);
    // the text in factors is the determinant of the block
    for (const c of Object.values(found))
      expect(number(c.determinant!, { g: 0.7 })).toBeCloseTo(number(`${c.block![0]![0]}`, { g: 0.7 }), 9);
  });
});

describe('an isotropic oscillator in a rotating frame: S is singular where k = Ω²', () => {
  const rotating = (parameters: string) => `
coordinates: [x, y]
momenta: [px, py]
${parameters}
hamiltonian: (px^2+py^2)/2 + k*(x^2+y^2)/2 - Omega*(x*py-y*px)
symmetry: {group: cyclic:3, action: plane, on: [[x, y]]}
`;
  it('k in terms of Omega', async () => {
    const { E } = await components(rotating('vary: [k]'));
    expect(E).toMatchObject({ type: 'complex', determinant: '(k - Omega^2)^2' });
    expect(E!.thresholds).toEqual([{ parameter: 'k', exact: 'Omega^2', value: null, signChange: true }]);
  });
  it('Omega in terms of k, two roots', async () => {
    const { E } = await components(rotating('vary: [Omega]'));
    expect(E!.thresholds!.map((t) => [t.exact, t.signChange])).toEqual([
      ['-sqrt(k)', true],
      ['sqrt(k)', true],
    ]);
  });
  it('Omega with k = 2', async () => {
    const { E } = await components(rotating('parameters: {Omega: 0, k: 2}\nvary: [Omega]'));
    expect(E!.thresholds!.map((t) => t.exact)).toEqual(['-sqrt(2)', 'sqrt(2)']);
  });
});

const reflected = (potential: string, parameters: string) => `
coordinates: [x, y]
momenta: [px, py]
${parameters}
hamiltonian: (px^2+py^2)/2 + (${potential})*x^2/2 + y^2/2
symmetry: {generators: [{name: s, map: {x: -x}}, {name: t, reversing: true}]}
`;
const only = async (potential: string, parameters: string) => (await components(reflected(potential, parameters))).B1!;

describe('one stiffness of any form', () => {
  it('a cubic without rational root: the plastic number to 30 digits (OEIS A060006)', async () => {
    const { determinant: d, thresholds } = await only('mu^3 - mu - 1', 'parameters: {mu: 0}\nvary: [mu]');
    expect(number(d!, { mu: 2 })).toBe(5);
    expect(thresholds).toHaveLength(1);
    expect(thresholds![0]).toMatchObject({ exact: null, digits: '1.324717957244746025960908854478', signChange: true });
    expect(thresholds![0]!.value).toBeCloseTo(1.324717957244746, 14);
    expect(number(thresholds![0]!.polynomial!, { mu: thresholds![0]!.value! })).toBeCloseTo(0, 13);
  });
  it('a double root is touched', async () => {
    const c = await only('(mu-1)^2', 'parameters: {mu: 0}\nvary: [mu]');
    expect(c).toMatchObject({ determinant: '(1 - mu)^2', thresholds: [{ exact: '1', value: 1, signChange: false }] });
  });
  it('simple, double and triple roots in ascending order', async () => {
    const c = await only('(mu+2)^3*(mu-1)^2*(3*mu-1)', 'parameters: {mu: 0}\nvary: [mu]');
    expect(c.thresholds!.map((t) => [t.exact, t.signChange])).toEqual([
      ['-2', true],
      ['1/3', true],
      ['1', false],
    ]);
  });
  it('no real root', async () => {
    const c = await only('mu^2 + 1', 'parameters: {mu: 0}\nvary: [mu]');
    expect(c).toMatchObject({ determinant: '1 + mu^2', thresholds: [] });
    const open = await only('mu^2 + b^2 + 1', 'vary: [mu]');
    expect(open).toMatchObject({ determinant: '1 + mu^2 + b^2', thresholds: [] });
  });
  it('a quadratic with open coefficients, by its formula', async () => {
    const c = await only('mu^2 - 2*b*mu + d', 'vary: [mu]');
    expect(c.thresholds!.map((t) => t.value)).toEqual([null, null]);
    const at = { b: 3, d: 5 };
    const values = c.thresholds!.map((t) => number(t.exact!, at)).sort();
    expect(values).toEqual([1, 5]);
    expect(c.thresholds!.every((t) => t.signChange)).toBe(true);
  });
  it('roots that are real only for large or for negative values of the open parameter', async () => {
    const large = await only('mu^2 - b + 100000', 'vary: [mu]');
    expect(large.thresholds!.map((t) => [number(t.exact!, { b: 100004 }), t.signChange])).toEqual([
      [-2, true],
      [2, true],
    ]);
    const negative = await only('mu^2 + b', 'vary: [mu]');
    expect(negative.thresholds!.map((t) => t.exact)).toEqual(['-sqrt(-b)', 'sqrt(-b)']);
  });
  it('a square of an open quadratic is touched', async () => {
    const c = await only('(mu^2 - b)^2', 'vary: [mu]');
    expect(c.determinant).toBe('(b - mu^2)^2');
    expect(c.thresholds!.map((t) => [t.exact, t.signChange])).toEqual([
      ['-sqrt(b)', false],
      ['sqrt(b)', false],
    ]);
  });
  it('of degree three in the parameter with an open one: the condition', async () => {
    const c = await only('mu^3 + b*mu + 1', 'vary: [mu]');
    expect(c.thresholds).toEqual([{ parameter: 'mu', exact: null, value: null, polynomial: '1 + mu*b + mu^3', signChange: true }]);
  });
  it('poles are no zeros', async () => {
    const c = await only('(mu-2)/(1+mu)', 'parameters: {mu: 0}\nvary: [mu]');
    expect(number(c.determinant!, { mu: 5 })).toBe(0.5);
    expect(c.thresholds).toEqual([{ parameter: 'mu', exact: '2', value: 2, signChange: true }]);
    const other = await only('(mu-b)*mu/(mu-1)', 'parameters: {mu: 0, b: 1}\nvary: [mu, b]');
    expect(other.thresholds!.map((t) => t.exact)).toEqual(['0']);
  });
  it('the value of another parameter is irrational', async () => {
    const c = await only('mu^2 - b', 'parameters: {mu: 0, b: 3 + 2*sqrt(2)}\nvary: [mu, b]');
    expect(c.determinant).toBe('-(b - mu^2)');
    expect(c.thresholds!.map((t) => number(t.exact!))).toEqual([expect.closeTo(-1 - Math.SQRT2, 12), expect.closeTo(1 + Math.SQRT2, 12)]);
  });
});

describe('documents show them', () => {
  const result = () => componentsResult(file(reflected('mu^3 - mu - 1', 'parameters: {mu: 0}\nvary: [mu]')));
  it('text, Markdown, LaTeX and HTML', async () => {
    const r = (await result()) as never;
    const digits = '1.324717957244746025960908854478';
    const plain = renderText(r, { width: 120 });
    expect(plain).toContain(digits);
    expect(plain).toContain('det S on B1 = -(1 + mu - mu^3)');
    for (const written of [await renderMarkdown(r), await renderLatex(r), await renderHtml(r)]) {
      expect(written).toContain(digits);
      expect(written).toContain('\\det S_{B_{1}} = -');
    }
  });
  it('a formula in open parameters as a fraction', async () => {
    const r = (await componentsResult(file(ring('vary: [c]')))) as never;
    expect(await renderLatex(r)).toContain('c = -\\frac{k}{3}');
  });
});

describe('determinants of matrices of rational functions', () => {
  const base = RealField.of();
  const f = new RationalFunctionField(new PolynomialRing(base, ['a', 'b']));
  const value = (x: RationalFunction<ReturnType<RealField['fromInteger']>>) =>
    f.evaluateNumber(x, new Map(Object.entries({ a: 0.75, b: -1.25 })));
  const entry = fc.tuple(fc.integer({ min: -2, max: 2 }), fc.integer({ min: -2, max: 2 }), fc.integer({ min: -1, max: 1 }), fc.boolean());
  const element = ([x, y, z, over]: [number, number, number, boolean]) => {
    const p = f.add(f.add(f.fromInteger(x), f.mul(f.fromInteger(y), f.symbol('a'))), f.mul(f.fromInteger(z), f.symbol('b')));
    return over ? f.div(p, f.add(f.symbol('a'), f.fromInteger(3))) : p;
  };
  it('agree with elimination over the rational functions', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 4 }), fc.array(entry, { minLength: 16, maxLength: 16 }), (n, entries) => {
        const data = Array.from({ length: n * n }, (_, i) => {
          const [r, c] = [Math.floor(i / n), i % n];
          return element(entries[Math.min(r, c) * 4 + Math.max(r, c)]!);
        });
        const m: Matrix<(typeof data)[number]> = { field: f, rows: n, cols: n, data };
        const product = determinantParts(m, f)!.reduce((x, { polynomial, power }) => {
          const p = f.fromPolynomial(polynomial);
          return power > 0 ? f.mul(x, p) : f.div(x, p);
        }, f.one);
        expect(f.equal(product, determinant(m))).toBe(true);
        if (n === 1) expect(value(product)).toBeCloseTo(value(data[0]!), 9);
      }),
      { numRuns: 80 },
    );
  });
  it('too large a one is left out', () => {
    const n = 9;
    const data = Array.from({ length: n * n }, (_, i) => (i % (n + 1) === 0 ? f.symbol('a') : f.symbol('b')));
    expect(determinantParts({ field: f, rows: n, cols: n, data }, f)).toBeUndefined();
  });
});

it('roots of random products of linear factors, with their sides', () => {
  const base = RealField.of();
  const r = new PolynomialRing(base, ['x']);
  fc.assert(
    fc.property(
      fc.uniqueArray(fc.tuple(fc.integer({ min: -9, max: 9 }), fc.constantFrom(-2, -1, 1, 2, 3)), { selector: ([x]) => x, maxLength: 6 }),
      (list) => {
        const factors = list.map(([x, power]) => ({
          polynomial: r.fromTerms([
            [[0], base.fromInteger(-x)],
            [[1], base.one],
          ]),
          power,
        }));
        const zeros = list.filter(([, power]) => power > 0).sort(([x], [y]) => x - y);
        expect(determinantThresholds(r, factors, 'x').map((t) => [t.value, t.signChange])).toEqual(
          zeros.map(([x, power]) => [x, power % 2 === 1]),
        );
      },
    ),
    { numRuns: 60 },
  );
});
