/** How large the coordinates of ρ(g)f - f can be: what an exact check modulo primes needs. */
import { type Algebraic, gcd } from '../field/index.ts';
import type { Polynomial } from '../polynomial/index.ts';
import type { LinearAction } from './linear-action.ts';

/**
 * A bound of the coordinates, over the integral basis, of ρ(g)f - f times a common denominator, for the generators g
 * and forms f of one degree. With |x| the sum of the absolute coordinates and K the largest |b_i b_j| over the basis,
 * |x y| <= K |x| |y|.
 */
export function boundOfDifferences(action: LinearAction, degree: number, forms: readonly Polynomial<Algebraic>[]): bigint {
  const { field, generatorMatrices, dimension } = action;
  const n = field.degree;
  const size = (x: Algebraic) => x.c.reduce((s, y) => s + (y < 0n ? -y : y), 0n);
  const unit = (j: number): Algebraic => ({ c: Array.from({ length: n }, (_, i) => (i === j ? 1n : 0n)), d: 1n });
  let K = 1n;
  for (let i = 0; i < n; i++)
    for (let j = i; j < n; j++) {
      const s = size(field.mul(unit(i), unit(j)));
      if (s > K) K = s;
    }
  let most = 1n;
  for (const m of generatorMatrices) {
    const d = m.data.reduce((l, x) => (l * x.d) / gcd(l, x.d), 1n);
    if (d > most) most = d;
    for (let i = 0; i < dimension; i++) {
      let s = 0n;
      for (let j = 0; j < dimension; j++) {
        const x = m.data[i * dimension + j]!;
        s += size(x) * (d / x.d);
      }
      if (s > most) most = s;
    }
  }
  let largest = 1n;
  for (const f of forms) {
    const d = f.coefficients.reduce((l, x) => (l * x.d) / gcd(l, x.d), 1n);
    const s = f.coefficients.reduce((t, x) => t + size(x) * (d / x.d), 0n);
    if (s > largest) largest = s;
  }
  return 2n * largest * (K * most) ** BigInt(degree);
}
