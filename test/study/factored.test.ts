/** Polynomials in factors: expanded again they are what they were, also when the helper answers wrongly or not at all. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RealField, rational } from '../../src/field/index.ts';
import { divideExactly, PolynomialRing } from '../../src/polynomial/index.ts';
import { type Factored, factored, formatFactored, powersFactored } from '../../src/study/factored.ts';
import { nerdamerFactors } from '../../src/study/factored-nerdamer.ts';
import { normalised, type Poly, type Ring, squarePart } from '../../src/study/factored-squares.ts';

const field = RealField.of();
const ring = new PolynomialRing(field, ['c', 'k', 'Omega']);
const [c, k, omega] = ['c', 'k', 'Omega'].map((name) => ring.variable(name)) as [Poly, Poly, Poly];
const n = (x: number) => ring.integer(x);
const sum = (...list: Poly[]) => list.reduce((a, b) => ring.add(a, b));
const times = (...list: Poly[]) => list.reduce((a, b) => ring.mul(a, b));
const minus = (a: Poly, b: Poly) => ring.sub(a, b);
const expanded = (r: Ring, f: Factored): Poly =>
  f.factors.reduce((p, { polynomial, power }) => r.mul(p, r.power(polynomial, power)), r.constant(f.constant));
const text = async (...parts: Poly[]) => formatFactored(ring, await factored(ring, parts));
const none = async () => undefined;

describe('factors, by hand', () => {
  it('constants, contents and powers', async () => {
    expect(await text(n(5))).toBe('5');
    expect(await text(ring.scale(c, field.fromRational(-3n, 4n)))).toBe('-3*c/4');
    expect(await text(times(n(-4), sum(n(1), times(n(3), c)), sum(n(1), c)))).toBe('-4*(1 + 3*c)*(1 + c)');
    expect(await text(ring.power(minus(k, times(omega, omega)), 2))).toBe('(k - Omega^2)^2');
    expect(await text(sum(n(3), c), sum(n(6), times(n(2), c)))).toBe('2*(3 + c)^2');
  });
  it('quadratics by their discriminants, without any helper', async () => {
    const p = minus(times(k, k), ring.power(omega, 4));
    expect(formatFactored(ring, await factored(ring, [p], none))).toBe('(k + Omega^2)*(k - Omega^2)');
    expect(formatFactored(ring, await factored(ring, [minus(times(k, k), n(2))], none))).toBe('-(2 - k^2)');
  });
  it('powers of one symbol first, x^6 as y^3', async () => {
    expect(await text(minus(ring.power(c, 6), n(1)))).toBe('-(1 + c)*(1 - c)*(1 + c + c^2)*(1 - c + c^2)');
  });
  it('a quotient has its denominator below', async () => {
    const f = await powersFactored(ring, [
      { polynomial: times(n(3), c), power: 1 },
      { polynomial: times(n(2), sum(n(1), c)), power: -1 },
    ]);
    expect(formatFactored(ring, f)).toBe('3*c/(2*(1 + c))');
    const whole = await powersFactored(ring, [
      { polynomial: times(c, sum(k, c)), power: 1 },
      { polynomial: times(n(3), sum(n(3), times(n(3), c))), power: -2 },
      { polynomial: sum(n(1), c), power: 2 },
    ]);
    expect(formatFactored(ring, whole)).toBe('c*(c + k)/81');
  });
  it('irrational coefficients keep the shorter spelling', () => {
    const golden = RealField.of({ squareRoots: [5n] });
    const r = new PolynomialRing(golden, ['g']);
    const root = golden.sqrt(rational(5n))!;
    const p = r.scale(minusOver(r, r.variable('g'), golden.fromInteger(2)), root);
    expect(normalised(r, p)).toMatchObject({
      polynomial: r.fromTerms([
        [[0], golden.fromInteger(2)],
        [[1], golden.fromInteger(-1)],
      ]),
    });
  });
  it('zero has no factors', async () => {
    await expect(factored(ring, [ring.zero])).rejects.toThrow(RangeError);
  });
});

const minusOver = (r: Ring, p: Poly, x: Parameters<Ring['constant']>[0]) => r.sub(p, r.constant(x));

describe('nerdamer', () => {
  it('is asked for a cubic that splits, and answers', async () => {
    const asked: string[] = [];
    const p = times(sum(n(1), c), sum(n(1), times(n(2), c)), sum(n(1), times(n(3), c)));
    const f = await factored(ring, [p], (q) => {
      asked.push(q);
      return nerdamerFactors(q);
    });
    expect(asked).toEqual(['1 + 6*v_0 + 11*v_0^2 + 6*v_0^3']);
    expect(formatFactored(ring, f)).toBe('(1 + 2*c)*(1 + 3*c)*(1 + c)');
    expect(formatFactored(ring, await factored(ring, [p], none))).toBe('1 + 6*c + 11*c^2 + 6*c^3');
  });
  it('homogeneous ones with one variable less', async () => {
    const asked: string[] = [];
    const cubic = minus(ring.power(k, 3), times(n(8), ring.power(omega, 3)));
    const p = times(cubic, sum(k, omega));
    await factored(ring, [p], async (q) => {
      asked.push(q);
      return undefined;
    });
    expect(asked.every((q) => !q.includes('v_2'))).toBe(true);
    expect(await text(p)).toBe('(k + Omega)*(k - 2*Omega)*(k^2 + 2*k*Omega + 4*Omega^2)');
  });
  it.each([
    ['a wrong factor', '(1+v_0)*(1+2*v_0)*(1+4*v_0)'],
    ['a factor too few', '(1+v_0)*(1+2*v_0)'],
    ['a factor too many', '(1+v_0)*(1+2*v_0)*(1+3*v_0)*v_1'],
    ['rounded coefficients', '(1+v_0)*(1+2*v_0)*(1+2.9999999*v_0)'],
    ['other names', '(1+v_7)*(1+2*v_0)'],
    ['roots', '(1+v_0)*(1+2*v_0)*sqrt(1+3*v_0)^2'],
    ['a quotient', '(1+v_0)*(1+2*v_0)*(1+3*v_0)^2/(1+3*v_0)'],
    ['zero', '(1+v_0)*0'],
    ['no formula', 'factor(('],
    ['a list', '[1+v_0,1+2*v_0]'],
    ['nothing', ''],
  ])('%s is not believed', async (_, answer) => {
    const p = times(sum(n(1), c), sum(n(1), times(n(2), c)), sum(n(1), times(n(3), c)));
    const f = await factored(ring, [p], async () => answer);
    expect(f.factors).toHaveLength(1);
    expect(ring.equal(expanded(ring, f), p)).toBe(true);
  });
  it('a lost sign or constant costs nothing: they are ours', async () => {
    const p = times(n(-6), sum(n(1), c), sum(n(1), times(n(2), c)), sum(n(1), times(n(3), c)));
    const f = await factored(ring, [p], async () => '(1+v_0)*(-1-2*v_0)*(5+15*v_0)/7');
    expect(formatFactored(ring, f)).toBe('-6*(1 + 2*c)*(1 + 3*c)*(1 + c)');
  });
  it('is not asked beyond its limits: digits, degree, names that could mean anything', async () => {
    const never = async (): Promise<string> => {
      throw new Error('asked');
    };
    const large = sum(ring.power(c, 3), ring.scale(c, field.fromInteger(2n ** 50n + 1n)), n(7));
    expect((await factored(ring, [large], never)).factors).toHaveLength(1);
    expect((await factored(ring, [sum(ring.power(c, 11), c, n(5))], never)).factors).toHaveLength(1);
    expect(await nerdamerFactors('process.exit()')).toBeUndefined();
    expect(await nerdamerFactors('v_0:5')).toBeUndefined();
  });
});

describe('laws', () => {
  const small = fc.array(fc.tuple(fc.integer({ min: -4, max: 4 }), fc.array(fc.nat(2), { minLength: 3, maxLength: 3 })), {
    minLength: 1,
    maxLength: 3,
  });
  const poly = small.map((terms) => ring.fromTerms(terms.map(([x, e]) => [e, field.fromInteger(x)] as const)));
  it('the factors multiply to the polynomial, whatever the helper', async () => {
    await fc.assert(
      fc.asyncProperty(fc.array(poly, { minLength: 1, maxLength: 3 }), async (parts) => {
        const p = parts.reduce((a, b) => ring.mul(a, b));
        fc.pre(!ring.isZero(p));
        const f = await factored(ring, parts, none);
        expect(ring.equal(expanded(ring, f), p)).toBe(true);
        const g = await factored(ring, [p], none);
        expect(ring.equal(expanded(ring, g), p)).toBe(true);
      }),
      { numRuns: 60 },
    );
  });
  it('p = square² rest', () => {
    fc.assert(
      fc.property(poly, poly, (a, b) => {
        fc.pre(!ring.isZero(a) && !ring.isZero(b));
        const p = times(a, a, b);
        const { square, rest } = squarePart(ring, p);
        expect(ring.equal(times(square, square, rest), p)).toBe(true);
        expect(divideExactly(ring, square, normalised(ring, a).polynomial)).toBeDefined();
      }),
      { numRuns: 60 },
    );
  });
});
