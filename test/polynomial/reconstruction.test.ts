import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { primeCongruentToOne, rational, rationals } from '../../src/field/index.ts';
import { reconstructRational, reconstructSmall, reconstructVector } from '../../src/polynomial/index.ts';

describe('rational reconstruction', () => {
  it('fractions come back from their images, by one prime and by two', () => {
    const [p, q] = [primeCongruentToOne(4, 0), primeCongruentToOne(4, 1)];
    fc.assert(
      fc.property(fc.bigInt({ min: -30000n, max: 30000n }), fc.bigInt({ min: 1n, max: 30000n }), (n, d) => {
        const r = rational(n, d);
        const image = (m: number) => {
          const b = BigInt(m);
          let inverse = 1n;
          for (let e = b - 2n, base = ((r.d % b) + b) % b; e > 0n; e >>= 1n, base = (base * base) % b)
            if (e & 1n) inverse = (inverse * base) % b;
          return Number((((r.n * inverse) % b) + b) % b);
        };
        expect(reconstructRational(BigInt(image(p)), BigInt(p))).toEqual(r);
        expect(reconstructSmall(image(p), p)).toEqual({ n: Number(r.n), d: Number(r.d) });
        expect(
          reconstructVector([
            { p, values: Int32Array.of(image(p)) },
            { p: q, values: Int32Array.of(image(q)) },
          ]),
        ).toEqual([r]);
      }),
      { numRuns: 100 },
    );
    expect(reconstructVector([])).toBeUndefined();
    expect(rationals.key(reconstructRational(0n, 7n)!)).toBe('0');
  });
});
