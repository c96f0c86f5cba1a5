import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CyclotomicField, type Field, PrimeField, type Rational, RealField, rational, rationals } from '../../src/field/index.ts';
import { fromRows } from '../../src/linear/index.ts';
import { type Polynomial, PolynomialRing } from '../../src/polynomial/index.ts';

const terms = (variables: number) =>
  fc.array(
    fc.tuple(fc.array(fc.integer({ min: 0, max: 3 }), { minLength: variables, maxLength: variables }), fc.integer({ min: -4, max: 4 })),
    {
      maxLength: 9,
    },
  );

function laws<T>(field: Field<T>, variables: readonly string[], unit: T): void {
  const ring = new PolynomialRing(field, variables);
  const make = (list: [number[], number][]) =>
    ring.fromTerms(list.map(([e, c]) => [e, field.mul(field.fromInteger(c), c % 2 === 0 ? unit : field.one)] as const));
  const any = terms(variables.length).map(make);
  const same = (a: Polynomial<T>, b: Polynomial<T>) => expect(ring.key(a)).toBe(ring.key(b));
  it(`ring axioms in ${variables.length} variables over ${field.name}`, () => {
    fc.assert(
      fc.property(any, any, any, (a, b, c) => {
        same(ring.add(a, b), ring.add(b, a));
        same(ring.add(ring.add(a, b), c), ring.add(a, ring.add(b, c)));
        same(ring.sub(a, a), ring.zero);
        same(ring.add(a, ring.neg(a)), ring.zero);
        same(ring.mul(a, b), ring.mul(b, a));
        same(ring.mul(ring.mul(a, b), c), ring.mul(a, ring.mul(b, c)));
        same(ring.mul(a, ring.add(b, c)), ring.add(ring.mul(a, b), ring.mul(a, c)));
        same(ring.mul(a, ring.one), a);
        same(ring.mul(a, ring.zero), ring.zero);
        same(ring.power(a, 3), ring.mul(a, ring.mul(a, a)));
        same(ring.sum([a, b, c]), ring.add(a, ring.add(b, c)));
        same(ring.mulTruncated(a, b, 4), ring.truncate(ring.mul(a, b), 4));
        expect(ring.equal(a, b)).toBe(ring.key(a) === ring.key(b));
      }),
      { numRuns: 60 },
    );
  });
  it(`product rule, homogeneous parts and values over ${field.name} in ${variables.length} variables`, () => {
    fc.assert(
      fc.property(any, any, (a, b) => {
        for (let i = 0; i < variables.length; i++) {
          same(ring.derivative(ring.mul(a, b), i), ring.add(ring.mul(ring.derivative(a, i), b), ring.mul(a, ring.derivative(b, i))));
          const rebuilt = ring.coefficientsIn(a, i).map((c, e) => ring.mul(c, ring.power(ring.variable(i), e)));
          same(ring.sum(rebuilt), a);
        }
        const parts = Array.from({ length: ring.degree(a) + 1 }, (_, d) => ring.homogeneousPart(a, d));
        same(ring.sum(parts), a);
        const point = variables.map((_, i) => field.add(unit, field.fromInteger(i)));
        expect(field.key(ring.evaluate(ring.mul(a, b), point))).toBe(
          field.key(field.mul(ring.evaluate(a, point), ring.evaluate(b, point))),
        );
      }),
      { numRuns: 60 },
    );
  });
  it(`substitution is a homomorphism over ${field.name} in ${variables.length} variables`, () => {
    const target = new PolynomialRing(field, ['s', 't']);
    const images = variables.map((_, i) =>
      target.fromTerms([
        [[1, i % 2], unit],
        [[0, 1], field.fromInteger(i + 1)],
      ]),
    );
    const apply = (p: Polynomial<T>) => target.key(ring.substitute(p, images, target));
    fc.assert(
      fc.property(any, any, (a, b) => {
        const [x, y] = [ring.substitute(a, images, target), ring.substitute(b, images, target)];
        expect(apply(ring.mul(a, b))).toBe(target.key(target.mul(x, y)));
        expect(apply(ring.add(a, b))).toBe(target.key(target.add(x, y)));
        expect(target.key(ring.substitute(a, images, target, undefined, 3))).toBe(target.key(target.truncate(x, 3)));
      }),
      { numRuns: 40 },
    );
  });
}

const golden = RealField.of({ squareRoots: [5n] });
const cyclotomic = CyclotomicField.of(12);
describe('laws', () => {
  laws(rationals, ['x', 'y', 'z'], rational(2n, 3n));
  laws(rationals, [], rational(2n, 3n));
  laws(RealField.of(), ['x', 'y'], RealField.of().fromRational(5n, 7n));
  laws(golden, ['x', 'y'], golden.cos(1, 5)!);
  laws(cyclotomic, ['z', 'w'], cyclotomic.root(1));
  laws(new PrimeField(2147483629), ['x'], 5);
});

describe('products', () => {
  const field = RealField.of();
  const names = Array.from({ length: 12 }, (_, i) => `x${i}`);
  const ring = new PolynomialRing(field, names);
  const s = ring.sum([ring.one, ...names.map((_, i) => ring.variable(i))]);
  it('the square of (1 + x0 + … + x11)^4 is its 8th power, with the multinomial number of terms', () => {
    const fourth = ring.power(s, 4);
    expect(fourth.monomials.length).toBe(1820);
    const eighth = ring.mul(fourth, fourth);
    expect(eighth.monomials.length).toBe(125970);
    expect(field.format(ring.coefficient(eighth, [1, 1, 1, 1, 1, 1, 1, 1, 0, 0, 0, 0]))).toBe('40320');
    expect(field.format(ring.coefficient(eighth, [8, ...new Array<number>(11).fill(0)]))).toBe('1');
  });
  it('large and fractional coefficients take the bigint route: (x/3 + 10^20 y)^40', () => {
    const two = new PolynomialRing(field, ['x', 'y']);
    const p = two.fromTerms([
      [[1, 0], field.fromRational(1n, 3n)],
      [[0, 1], field.fromInteger(10n ** 20n)],
    ]);
    const q = two.power(p, 40);
    expect(two.coefficient(q, [20, 20])).toEqual(field.fromRational(137846528820n * 10n ** 400n, 3n ** 20n));
    expect(q.monomials.length).toBe(41);
  });
  it('quadratic forms in 360 variables stay sparse', () => {
    const big = new PolynomialRing(
      field,
      Array.from({ length: 360 }, (_, i) => `x${i}`),
    );
    const sum = big.sum(big.variables.map((_, i) => big.variable(i)));
    const square = big.mul(sum, sum);
    expect(square.monomials.length).toBe((360 * 361) / 2);
    expect(field.format(big.coefficient(square, '\u0000\u0167'))).toBe('2');
    expect(big.equal(big.derivative(square, 359), big.scale(sum, field.fromInteger(2)))).toBe(true);
  });
});

describe('substitution and text', () => {
  const ring = new PolynomialRing(rationals, ['q1', 'q2']);
  const f = (n: bigint, d = 1n): Rational => rational(n, d);
  it('x ↦ p(Mx)', () => {
    const p = ring.fromTerms([
      [[2, 0], f(1n)],
      [[0, 1], f(3n)],
    ]);
    const m = fromRows(rationals, [
      [f(0n), f(-1n)],
      [f(1n), f(2n)],
    ]);
    expect(ring.format(ring.linearSubstitution(p, m))).toBe('3*q1 + 6*q2 + q2^2');
  });
  it('the language of model files', () => {
    const p = ring.fromTerms([
      [[2, 0], f(1n)],
      [[1, 2], f(-3n, 2n)],
      [[0, 1], f(1n, 2n)],
      [[0, 0], f(-1n, 3n)],
    ]);
    expect(ring.format(p)).toBe('-1/3 + q2/2 + q1^2 - 3*q1*q2^2/2');
    expect(ring.format(ring.zero)).toBe('0');
    expect(ring.latex(p)).toBe('-\\tfrac{1}{3} + \\tfrac{1}{2} q_{2} + q_{1}^{2} - \\tfrac{3}{2} q_{1} q_{2}^{2}');
    const five = new PolynomialRing(golden, ['mu', 'omega0']);
    const q = five.fromTerms([
      [[1, 0], golden.cos(1, 5)!],
      [[0, 2], golden.sqrt(rational(5n, 4n))!],
    ]);
    expect(five.format(q)).toBe('(-1 + sqrt(5))*mu/4 + sqrt(5)*omega0^2/2');
    expect(five.latex(q)).toBe('\\tfrac{-1 + \\sqrt{5}}{4} \\mu + \\tfrac{\\sqrt{5}}{2} \\omega_{0}^{2}');
  });
  it('refuses what makes no sense', () => {
    expect(() => ring.variable('p1')).toThrow(RangeError);
    expect(() => ring.power(ring.one, -1)).toThrow(RangeError);
    expect(() => ring.fromTerms([[[0.5], f(1n)]])).toThrow(RangeError);
    expect(() => new PolynomialRing(rationals, ['x', 'x'])).toThrow(RangeError);
  });
});
