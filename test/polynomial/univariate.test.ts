import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RealField, rational, rationals } from '../../src/field/index.ts';
import { formatRoot, RealRoots, UnivariateRing } from '../../src/polynomial/index.ts';

const ring = new UnivariateRing(rationals);
const poly = fc.array(fc.integer({ min: -6, max: 6 }), { maxLength: 6 }).map((c) => ring.trim(c.map((x) => rational(BigInt(x)))));
const ints = (...c: number[]) => c.map((x) => rational(BigInt(x)));

describe('division', () => {
  it('a = q b + r, gcd divides, square-free factors rebuild the polynomial', () => {
    fc.assert(
      fc.property(poly, poly, (a, b) => {
        if (b.length > 0) {
          const { quotient, remainder } = ring.divide(a, b);
          expect(ring.equal(ring.add(ring.mul(quotient, b), remainder), a)).toBe(true);
          expect(remainder.length).toBeLessThan(b.length);
        }
        const g = ring.gcd(a, b);
        if (g.length > 0) for (const p of [a, b]) expect(ring.divide(p, g).remainder).toEqual([]);
        const product = ring.mul(ring.mul(a, a), b);
        if (product.length > 0) {
          let back = [rationals.one] as ReturnType<typeof ring.mul>;
          for (const { factor, multiplicity } of ring.squareFree(product)) back = ring.mul(back, ring.power(factor, multiplicity));
          expect(ring.equal(back, ring.monic(product))).toBe(true);
        }
      }),
      { numRuns: 100 },
    );
  });
  it('refuses division by zero', () => expect(() => ring.divide(ints(1), [])).toThrow(RangeError));
});

describe('real roots', () => {
  const roots = new RealRoots(rationals);
  it('integer roots with multiplicities are found exactly', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -5, max: 5 }), { minLength: 1, maxLength: 5 }), (list) => {
        let p = ints(2) as ReturnType<typeof ring.mul>;
        for (const r of list) p = ring.mul(p, ints(-r, 1));
        p = ring.mul(p, ints(1, 1, 1)); // no real roots
        const found = roots.isolate(p).map((r) => roots.refine(p, r));
        const distinct = [...new Set(list)].sort((a, b) => a - b);
        expect(found.map((r) => formatRoot(r, 10))).toEqual(distinct.map((r) => `${r}.0000000000`));
        expect(found.map((r) => r.multiplicity)).toEqual(distinct.map((r) => list.filter((x) => x === r).length));
      }),
      { numRuns: 40 },
    );
  });
  it('sqrt(2) to 30 digits, counts by Sturm', () => {
    const p = ints(-2, 0, 1);
    expect(roots.count(p)).toBe(2);
    expect(roots.count(p, rational(0n))).toBe(1);
    const [low, high] = roots.isolate(p).map((r) => formatRoot(roots.refine(p, r, 34), 30));
    expect(high).toBe('1.414213562373095048801688724210');
    expect(low).toBe(`-${high}`);
  });
  it('close roots and different factors: (x^2 - 2)^2 (x - 1414213/1000000)', () => {
    const close = [rational(-1414213n, 1000000n), rational(1n)];
    const p = ring.mul(ring.power(ints(-2, 0, 1), 2), close);
    const found = roots.isolate(p);
    expect(found.map((r) => r.multiplicity)).toEqual([2, 1, 2]);
    for (let i = 0; i + 1 < found.length; i++) expect(rationals.compare(found[i]!.high, found[i + 1]!.low)).toBeLessThanOrEqual(0);
  });
  it('over a real field: x^2 - sqrt(2) x - 1', () => {
    const f = RealField.of({ squareRoots: [2n] });
    const r = new RealRoots(f);
    const p = [f.fromInteger(-1), f.neg(f.sqrt(rational(2n))!), f.one];
    const values = r.isolate(p).map((x) => Number(formatRoot(r.refine(p, x, 20), 16)));
    expect(values[0]).toBeCloseTo((Math.SQRT2 - Math.sqrt(6)) / 2, 14);
    expect(values[1]).toBeCloseTo((Math.SQRT2 + Math.sqrt(6)) / 2, 14);
  });
  it('constants have no roots, zero is refused', () => {
    expect(roots.isolate(ints(3))).toEqual([]);
    expect(() => roots.isolate(ints(0))).toThrow(RangeError);
  });
});
