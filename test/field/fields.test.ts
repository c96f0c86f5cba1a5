/** Laws of every exact field, their embeddings, and values known from trigonometry. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type AbelianField,
  type Algebraic,
  CyclotomicField,
  cyclotomicPolynomial,
  isPrime,
  mulAddMod,
  PrimeField,
  primeCongruentToOne,
  type Rational,
  RealField,
  rational,
  rationals,
  ratioToNumber,
  sqrtMod,
  totient,
} from '../../src/field/index.ts';
import { exactValue, parseExpression } from '../../src/model/expression/index.ts';
import { fieldLaws } from '../support/field-laws.ts';

const small = fc.bigInt({ min: -30n, max: 30n });
const fraction: fc.Arbitrary<Rational> = fc.tuple(small, fc.bigInt({ min: 1n, max: 12n })).map(([n, d]) => rational(n, d));
const elementsOf = (field: AbelianField): fc.Arbitrary<Algebraic> =>
  fc
    .tuple(fc.array(small, { minLength: field.degree, maxLength: field.degree }), fc.bigInt({ min: 1n, max: 9n }))
    .map(([c, d]) => field.element(c, d));

const demands = [
  {},
  { squareRoots: [2n] },
  { squareRoots: [6n, 35n] },
  { cosines: [5] },
  { cosines: [7] },
  { cosines: [9], squareRoots: [5n] },
  { cosines: [16] },
  { cosines: [28] },
  { cosines: [24], squareRoots: [7n] },
  { cosines: [21], squareRoots: [3n, 7n] },
];
fieldLaws(rationals, fraction);
fieldLaws(new PrimeField(2147483629), fc.integer({ min: 0, max: 2147483628 }));
fieldLaws(new PrimeField(3), fc.integer({ min: 0, max: 2 }));
for (const d of demands) fieldLaws(RealField.of(d), elementsOf(RealField.of(d)), 25);
for (const n of [1, 3, 4, 5, 8, 12, 15]) fieldLaws(CyclotomicField.of(n), elementsOf(CyclotomicField.of(n)), 25);

describe('real fields', () => {
  for (const demand of demands) {
    const f = RealField.of(demand);
    it(`${f.name}: embedding, sign and order agree with arithmetic`, () =>
      fc.assert(
        fc.property(elementsOf(f), elementsOf(f), (a, b) => {
          const [x, y] = [f.toNumber(a), f.toNumber(b)];
          const scale = 1 + Math.abs(x) + Math.abs(y);
          expect(Math.abs(f.toNumber(f.add(a, b)) - (x + y))).toBeLessThan(1e-10 * scale);
          expect(Math.abs(f.toNumber(f.mul(a, b)) - x * y)).toBeLessThan(1e-9 * scale * scale);
          expect(f.sign(f.mul(a, b))).toBe(f.sign(a) * f.sign(b) || 0);
          expect(f.compare(a, b)).toBe(-f.compare(b, a) || 0);
        }),
        { numRuns: 40, seed: 20261201 },
      ));
    it(`${f.name}: written numbers read back as the same number`, () =>
      fc.assert(
        fc.property(elementsOf(f), (a) => {
          expect(f.equal(exactValue(parseExpression(f.format(a)), new Map(), f), a)).toBe(true);
        }),
        { numRuns: 25, seed: 20261201 },
      ));
    it(`${f.name}: reductions modulo primes are ring maps`, () =>
      fc.assert(
        fc.property(elementsOf(f), elementsOf(f), fc.integer({ min: 0, max: 2 }), (a, b, i) => {
          const r = f.reduction(i);
          const g = new PrimeField(r.p);
          expect(r.apply(f.mul(a, b))).toBe(g.mul(r.apply(a), r.apply(b)));
          expect(r.apply(f.add(a, b))).toBe(g.add(r.apply(a), r.apply(b)));
        }),
        { numRuns: 25, seed: 20261201 },
      ));
    it(`${f.name}: automorphisms are ring maps, as many as the degree`, () => {
      const a = f.element(
        f.zero.c.map((_, i) => BigInt(i * i + 1)),
        3n,
      );
      const images = new Set<string>();
      for (let i = 0; i < f.degree; i++) {
        images.add(f.key(f.automorphism(i, a)));
        expect(f.equal(f.automorphism(i, f.mul(a, a)), f.mul(f.automorphism(i, a), f.automorphism(i, a)))).toBe(true);
      }
      expect(images.size).toBe(f.degree);
    });
  }
  it('cosines and sines of all multiples of 2 pi/n for n up to 24 (trigonometry)', () => {
    for (let n = 1; n <= 24; n++) {
      const f = RealField.of({ cosines: [n, 4 * n] });
      for (let k = 0; k < n; k++) {
        expect(Math.abs(f.toNumber(f.cos(k, n)!) - Math.cos((2 * Math.PI * k) / n))).toBeLessThan(1e-13);
        expect(Math.abs(f.toNumber(f.sin(k, n)!) - Math.sin((2 * Math.PI * k) / n))).toBeLessThan(1e-13);
      }
    }
  });
  it('square roots square to what they are roots of, in radical and in cyclotomic fields (Gauss 1811)', () => {
    for (const demand of [{ squareRoots: [2n, 3n, 5n, 7n] }, { cosines: [840] }]) {
      const f = RealField.of(demand);
      for (const [n, d] of [
        [2n, 1n],
        [3n, 4n],
        [5n, 9n],
        [7n, 1n],
        [21n, 2n],
        [12n, 1n],
        [0n, 1n],
      ] as const) {
        const r = f.sqrt(rational(n, d))!;
        expect(f.equal(f.mul(r, r), f.fromRational(n, d))).toBe(true);
        expect(f.sign(r)).toBe(n === 0n ? 0 : 1);
      }
    }
    expect(RealField.of().sqrt(rational(2n))).toBeUndefined();
    expect(RealField.of().sqrt(rational(-1n))).toBeUndefined();
  });
  it('the sign of a number that is almost zero is exact', () => {
    const f = RealField.of({ squareRoots: [2n] });
    // convergents of sqrt(2): p/q - sqrt(2) alternates in sign and shrinks like 1/q^2
    let [p, q] = [1n, 1n];
    for (let i = 0; i < 60; i++) {
      const x = f.sub(f.fromRational(p, q), f.sqrt(rational(2n))!);
      expect(f.sign(x)).toBe(i % 2 === 0 ? -1 : 1);
      expect(Math.sign(f.toNumber(x))).toBe(i % 2 === 0 ? -1 : 1);
      [p, q] = [p + 2n * q, p + q];
    }
  });
  it('the characters of a cyclotomic field come down to the least real field', () => {
    const c = CyclotomicField.of(30);
    const f = RealField.of({ squareRoots: [5n] });
    for (const [power, value] of [
      [6, (Math.sqrt(5) - 1) / 2],
      [3, (Math.sqrt(5) + 1) / 2],
      [12, (-Math.sqrt(5) - 1) / 2],
      [10, -1],
      [15, -2],
      [0, 2],
    ] as const) {
      const x = f.fromCyclotomic(c, c.add(c.root(power), c.root(-power)));
      expect(x === undefined ? Number.NaN : f.toNumber(x)).toBeCloseTo(value, 12);
    }
    expect(f.fromCyclotomic(c, c.root(1))).toBeUndefined();
    expect(f.fromCyclotomic(c, c.add(c.root(1), c.root(-1)))).toBeUndefined();
    expect(c.leastConductor([c.root(10)])).toBe(3);
  });
  it('a field joins and embeds in both of its parts', () => {
    const [a, b] = [RealField.of({ squareRoots: [3n] }), RealField.of({ cosines: [7] })];
    const j = RealField.join(a, b);
    const root = a.sqrt(rational(3n))!;
    const cosine = b.cos(1, 7)!;
    expect(j.toNumber(j.mul(j.embed(a, root), j.embed(b, cosine)))).toBeCloseTo(Math.sqrt(3) * Math.cos((2 * Math.PI) / 7), 12);
    expect(() => a.embed(b, cosine)).toThrow(RangeError);
    expect(RealField.of({ cosines: [12] })).toBe(RealField.of({ squareRoots: [3n] }));
    expect(() => RealField.of({ cosines: [4999] })).toThrow(RangeError);
  });
});

describe('integers and primes', () => {
  it('cyclotomic polynomials have degree phi(n) and multiply to x^n - 1', () => {
    for (const n of [1, 2, 3, 6, 12, 30, 105]) {
      let product = [1];
      for (let d = 1; d <= n; d++) {
        if (n % d !== 0) continue;
        const phi = cyclotomicPolynomial(d);
        expect(phi.length - 1).toBe(totient(d));
        const next = new Array<number>(product.length + phi.length - 1).fill(0);
        product.forEach((x, i) => {
          phi.forEach((y, j) => {
            next[i + j] = next[i + j]! + x * y;
          });
        });
        product = next;
      }
      expect(product).toEqual([-1, ...new Array<number>(n - 1).fill(0), 1]);
    }
    // the first coefficient other than 0, 1, -1 (A. Migotti 1883, from memory)
    expect(cyclotomicPolynomial(105)).toContain(-2);
  });
  it('the 31-bit product agrees with big integers, also at the edges', () => {
    const p = 2147483647;
    const edge = [0, 1, 2, p - 1, p - 2, (p - 1) / 2, 46341];
    const check = (y: number, g: number, v: number) => {
      expect(mulAddMod(y, g, v, p)).toBe(Number((BigInt(y) + BigInt(g) * BigInt(v)) % BigInt(p)));
    };
    for (const y of edge) for (const g of edge) for (const v of edge) check(y, g, v);
    fc.assert(fc.property(fc.nat(p - 1), fc.nat(p - 1), fc.nat(p - 1), check), { numRuns: 500, seed: 20261201 });
  });
  it('square roots modulo a prime', () => {
    const p = primeCongruentToOne(840);
    for (const a of [1, 2, 3, 5, 7, 11, 13]) {
      const r = sqrtMod(a, p);
      if (r !== undefined) expect((BigInt(r) * BigInt(r)) % BigInt(p)).toBe(BigInt(a));
    }
    expect(sqrtMod(0, p)).toBe(0);
  });
  it('quotients of huge integers become the nearest doubles', () => {
    expect(ratioToNumber(10n ** 400n, 3n * 10n ** 400n)).toBeCloseTo(1 / 3, 15);
    expect(ratioToNumber(-(2n ** 60n), 1n)).toBe(-(2 ** 60));
    expect(ratioToNumber(0n, 5n)).toBe(0);
  });
});

describe('Primality below 2^31', () => {
  const byDivision = (n: number) => {
    if (n < 2) return false;
    for (let p = 2; p * p <= n; p++) if (n % p === 0) return false;
    return true;
  };
  it('as by trial division: the first numbers, and random ones (fast-check)', () => {
    for (let n = 0; n < 6000; n++) expect(isPrime(n)).toBe(byDivision(n));
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 2 ** 31 - 1 }), (n) => isPrime(n) === byDivision(n)),
      { numRuns: 200 },
    );
  });
  it('strong pseudoprimes to the bases 2, 3 and 5, and the largest prime (Pomerance, Selfridge, Wagstaff 1980)', () => {
    for (const n of [2047, 1373653, 25326001, 161304001, 960946321, 1157839381]) expect(isPrime(n)).toBe(false);
    expect(isPrime(2 ** 31 - 1)).toBe(true);
  });
});
