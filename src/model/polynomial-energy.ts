/** Whether H is a polynomial or a quotient of polynomials in the coordinates, and its degree: how far invariance must be checked. */
import { type Expression, fold } from './expression/index.ts';

/** A power of a power can have any degree; nobody expands more than this. */
const LARGEST_DEGREE = 1000;

/** Degree in `names` if e is visibly a polynomial in them of degree up to LARGEST_DEGREE; undefined otherwise. */
export function polynomialDegree(e: Expression, names: ReadonlySet<string>): number | undefined {
  const degree = fold<number | undefined>(e, (x, parts) => {
    switch (x.kind) {
      case 'number':
      case 'pi':
        return 0;
      case 'symbol':
        return names.has(x.name) ? 1 : 0;
      case 'sum':
        return parts.some((p) => p === undefined) ? undefined : (parts as number[]).reduce((a, b) => Math.max(b, a), 0);
      case 'negate':
        return parts[0];
      case 'product':
        return parts.some((p) => p === undefined) ? undefined : (parts as number[]).reduce((a, b) => a + b, 0);
      case 'quotient':
        return parts[1] === 0 ? parts[0] : undefined;
      case 'power': {
        if (parts[0] === 0 && parts[1] === 0) return 0;
        const n = x.exponent;
        return parts[0] !== undefined && n.kind === 'number' && n.d === 1n && n.n >= 0n && n.n < 1000n ? parts[0] * Number(n.n) : undefined;
      }
      case 'call':
        return parts[0] === 0 ? 0 : undefined;
    }
  });
  return degree !== undefined && degree <= LARGEST_DEGREE ? degree : undefined;
}
