import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Algebraic, CyclotomicField, type Field, RealField, rational, rationals } from '../../src/field/index.ts';
import {
  divideExactly,
  gcdOfList,
  gcdPolynomials,
  monic,
  monomialsOfDegree,
  type Polynomial,
  PolynomialRing,
  type RationalFunction,
  RationalFunctionField,
} from '../../src/polynomial/index.ts';

const terms = fc.array(
  fc.tuple(fc.array(fc.integer({ min: 0, max: 2 }), { minLength: 3, maxLength: 3 }), fc.integer({ min: -5, max: 5 })),
  {
    minLength: 1,
    maxLength: 4,
  },
);

function gcdLaws<T>(field: Field<T>, unit: T): void {
  const ring = new PolynomialRing(field, ['a', 'b', 'c']);
  const any = terms.map((list) =>
    ring.fromTerms(list.map(([e, c]) => [e, c % 2 === 0 ? field.mul(unit, field.fromInteger(c)) : field.fromInteger(c)] as const)),
  );
  it(`gcd of f h and g h over ${field.name}`, () => {
    fc.assert(
      fc.property(any, any, any, (f, g, h) => {
        const x = ring.mul(f, h);
        const y = ring.mul(g, h);
        const d = gcdPolynomials(ring, x, y);
        if (ring.isZero(x) && ring.isZero(y)) {
          expect(ring.isZero(d)).toBe(true);
          return;
        }
        const u = divideExactly(ring, x, d);
        const v = divideExactly(ring, y, d);
        expect(u).toBeDefined();
        expect(v).toBeDefined();
        expect(divideExactly(ring, d, ring.isZero(h) ? ring.one : h)).toBeDefined();
        expect(ring.key(gcdPolynomials(ring, u!, v!))).toBe(ring.key(ring.one));
      }),
      { numRuns: 60 },
    );
  });
}

describe('greatest common divisors', () => {
  gcdLaws(rationals, rational(2n, 3n));
  const golden = RealField.of({ squareRoots: [5n] });
  gcdLaws(golden, golden.cos(1, 5)!);
  it('a factor that needs the square root: x^2 - 2 and x + sqrt(2)', () => {
    const f = RealField.of({ squareRoots: [2n] });
    const ring = new PolynomialRing(f, ['x']);
    const p = ring.sub(ring.power(ring.variable(0), 2), ring.integer(2));
    const q = ring.add(ring.variable(0), ring.constant(f.sqrt(rational(2n))!));
    const g = gcdPolynomials(ring, p, q);
    expect(ring.degree(g)).toBe(1);
    expect(ring.format(divideExactly(ring, p, q)!)).toBe('-sqrt(2) + x');
  });
  it('remainder sequences, where the field has no images: Q(zeta_12)', () => {
    const z = CyclotomicField.of(12);
    const ring = new PolynomialRing(z, ['x', 'y']);
    const [x, y] = [ring.variable(0), ring.variable(1)];
    const h = ring.add(ring.mul(x, x), ring.scale(y, z.root(1)));
    const f = ring.sub(ring.mul(x, y), ring.constant(z.root(5)));
    const g = ring.add(ring.power(y, 2), ring.add(x, ring.one));
    const d = gcdPolynomials(ring, ring.mul(f, h), ring.mul(g, h));
    expect(ring.key(d)).toBe(ring.key(monic(ring, h)));
  });
  it('dense quartic factors in three variables', () => {
    const ring = new PolynomialRing(RealField.of(), ['a', 'b', 'c']);
    let state = 7;
    const dense = () =>
      ring.fromTerms(
        [0, 1, 2, 3, 4]
          .flatMap((d) => monomialsOfDegree(3, d))
          .map((m) => [m, ring.field.fromInteger(((state = (state * 75 + 74) % 65537) % 19) - 9)] as const),
      );
    const [f, g, h] = [dense(), dense(), dense()];
    const d = gcdPolynomials(ring, ring.mul(f, h), ring.mul(g, h));
    expect(ring.key(d)).toBe(ring.key(monic(ring, h)));
  });
  it('no variables, zero, lists', () => {
    const ring = new PolynomialRing(rationals, []);
    expect(ring.key(gcdPolynomials(ring, ring.integer(4), ring.integer(6)))).toBe(ring.key(ring.one));
    expect(ring.isZero(gcdPolynomials(ring, ring.zero, ring.zero))).toBe(true);
    expect(ring.isZero(gcdOfList(ring, []))).toBe(true);
    expect(() => divideExactly(ring, ring.one, ring.zero)).toThrow(RangeError);
  });
});

describe('rational functions', () => {
  const field = RealField.of();
  const ring = new PolynomialRing(field, ['a', 'b', 'c']);
  const k = new RationalFunctionField(ring);
  const poly = terms.map((list) => ring.fromTerms(list.map(([e, c]) => [e, field.fromInteger(c)] as const)));
  const any = fc.tuple(poly, poly).map(([n, d]) => (ring.isZero(d) ? k.fromPolynomial(n) : k.quotient(n, d)));
  it('field axioms; equal values have equal keys', () => {
    const same = (x: RationalFunction<Algebraic>, y: RationalFunction<Algebraic>) => expect(k.key(x)).toBe(k.key(y));
    fc.assert(
      fc.property(any, any, any, (x, y, z) => {
        same(k.add(x, y), k.add(y, x));
        same(k.add(k.add(x, y), z), k.add(x, k.add(y, z)));
        same(k.mul(k.mul(x, y), z), k.mul(x, k.mul(y, z)));
        same(k.mul(x, k.add(y, z)), k.add(k.mul(x, y), k.mul(x, z)));
        same(k.sub(x, x), k.zero);
        if (!k.isZero(x)) same(k.mul(x, k.inv(x)), k.one);
        if (!k.isZero(y)) same(k.mul(k.div(x, y), y), x);
        for (const s of ['a', 'c']) same(k.derivative(k.mul(x, y), s), k.add(k.mul(k.derivative(x, s), y), k.mul(x, k.derivative(y, s))));
      }),
      { numRuns: 40 },
    );
  });
  it('canonical forms as written', () => {
    const [a, b] = [k.symbol('a'), k.symbol('b')];
    const half = k.fromRational(1n, 2n);
    expect(k.format(k.div(k.sub(k.mul(a, a), k.mul(b, b)), k.sub(a, b)))).toBe('a + b');
    expect(k.format(k.div(half, k.add(k.mul(half, a), b)))).toBe('1/(a + 2*b)');
    expect(k.format(k.div(k.one, k.sub(k.one, a)))).toBe('1/(1 - a)');
    expect(k.format(k.div(k.one, k.sub(a, k.one)))).toBe('-1/(1 - a)');
    expect(k.format(k.mul(half, k.sub(a, b)))).toBe('a/2 - b/2');
    expect(k.latex(k.div(k.neg(a), k.add(a, b)))).toBe('-\\frac{a}{a + b}');
    expect(k.isPolynomial(k.mul(a, b))).toBe(true);
  });
  it('symbols: substitution, values, growth', () => {
    const x = k.div(k.symbol('a'), k.add(k.one, k.symbol('b')));
    expect(k.format(k.substitute(x, new Map([['b', k.symbol('c')]])))).toBe('a/(1 + c)');
    expect(
      k.evaluateNumber(
        x,
        new Map([
          ['a', 3],
          ['b', 1],
        ]),
      ),
    ).toBe(1.5);
    expect(() => k.substitute(x, new Map([['b', k.fromInteger(-1)]]))).toThrow(RangeError);
    expect(() => k.evaluateNumber(x, new Map([['a', 3]]))).toThrow('no value for b');
    const more = k.extend(['mu', 'a', 'mu']);
    expect(more.symbols).toEqual(['a', 'b', 'c', 'mu']);
    expect(more.format(more.mul(x, more.symbol('mu')))).toBe('a*mu/(1 + b)');
    const outer = new PolynomialRing<RationalFunction<Algebraic>>(more, ['q1']);
    const h = outer.fromTerms([
      [[2], more.mul(more.symbol('mu'), more.fromRational(1n, 2n))],
      [[3], x],
      [[4], more.add(more.symbol('a'), more.symbol('b'))],
    ]);
    expect(outer.format(h)).toBe('mu*q1^2/2 + a*q1^3/(1 + b) + (a + b)*q1^4');
  });
});

describe('exact division', () => {
  const ring = new PolynomialRing(rationals, ['x', 'y']);
  const make = (s: [number[], number][]): Polynomial<{ n: bigint; d: bigint }> =>
    ring.fromTerms(s.map(([e, c]) => [e, rational(BigInt(c))] as const));
  it('finds quotients and refuses the rest', () => {
    const a = make([
      [[1, 0], 1],
      [[0, 1], -1],
    ]);
    const b = make([
      [[2, 0], 1],
      [[0, 2], -1],
    ]);
    expect(ring.format(divideExactly(ring, b, a)!)).toBe('x + y');
    expect(divideExactly(ring, a, b)).toBeUndefined();
    expect(divideExactly(ring, ring.add(b, ring.one), a)).toBeUndefined();
  });
});
