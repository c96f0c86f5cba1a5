/** Scaling of polynomials to small integer coefficients. */
import { AbelianField, type Algebraic, gcd, RealField } from '../field/index.ts';
import type { Polynomial, PolynomialRing } from '../polynomial/index.ts';

/** Times the rational number that makes all coordinates integers without common factor, the first coefficient positive. */
export function primitive(ring: PolynomialRing<Algebraic>, a: Polynomial<Algebraic>): Polynomial<Algebraic> {
  if (a.coefficients.length === 0 || !(ring.field instanceof AbelianField)) return a;
  if (a.coefficients[0] === ring.field.one && a.coefficients.every((c) => c.d === 1n)) return a;
  let d = 1n;
  for (const c of a.coefficients) if (c.d !== 1n) d *= c.d / gcd(d, c.d);
  let g = 0n;
  for (const c of a.coefficients) for (const x of c.c) if (x !== 0n && g !== 1n) g = gcd(g, x * (d / c.d));
  const first = a.coefficients[0]!;
  const negative = ring.field instanceof RealField ? ring.field.sign(first) < 0 : (first.c.find((x) => x !== 0n) ?? 1n) < 0n;
  if (d === 1n && g === 1n && !negative) return a;
  return ring.scale(a, ring.field.fromRational(negative ? -d : d, g));
}
