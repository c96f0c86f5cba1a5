/**
 * Whether a rational H is invariant under a linear map, decided exactly at random points: two rational functions that
 * agree at a point drawn from 2^20 integers in each coordinate differ with probability at most (sum of degrees)/2^20
 * for each point (common practice; the bound on zeros of a polynomial in a box).
 */
import { InputError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { type SparseMatrix, sparseApply } from '../linear/index.ts';
import { type Expression, exactValue, fold } from '../model/expression/index.ts';

/** Points at which both sides are compared: with degrees up to 1000 the chance to miss a difference is below 2^-27. */
const POINTS = 3;
/** Points tried, as some may be poles. */
const TRIES = 12;
/** Degrees above this make numbers too long to compare at a point. */
const LARGEST_DEGREE = 1000;

/** Whether e is visibly a quotient of polynomials in `names`, of degree up to LARGEST_DEGREE. */
function isRational(e: Expression, names: ReadonlySet<string>): boolean {
  /** A bound of the degrees of numerator and denominator, 0 for a constant, undefined for anything else. */
  const degree = fold<number | undefined>(e, (x, parts) => {
    if (x.kind === 'symbol') return names.has(x.name) ? 1 : 0;
    if (parts.every((p) => p === 0)) return 0;
    if (parts.some((p) => p === undefined) || x.kind === 'call') return undefined;
    if (x.kind !== 'power') return parts.reduce<number>((a, b) => a + b!, 0);
    const n = x.exponent;
    return n.kind === 'number' && n.d === 1n ? parts[0]! * Math.abs(Number(n.n)) : undefined;
  });
  return degree !== undefined && degree <= LARGEST_DEGREE;
}

/** Values of H at x and at ρx for each generator; undefined where H is not rational or has no exact values. */
export type RationalInvariance = (matrix: SparseMatrix<Algebraic>) => boolean;

/** The test for an H, or undefined where H is no quotient of polynomials over the field. */
export function rationalInvariance(
  h: Expression,
  names: readonly string[],
  values: ReadonlyMap<string, Algebraic>,
  field: RealField,
): RationalInvariance | undefined {
  if (!isRational(h, new Set(names))) return undefined;
  const at = (x: readonly Algebraic[]): Algebraic | 'pole' => {
    try {
      return exactValue(h, new Map([...values, ...names.map((n, i) => [n, x[i]!] as const)]), field);
    } catch (error) {
      if (error instanceof InputError) return 'pole';
      throw error;
    }
  };
  // a linear congruential generator: the same points each time
  let state = 12345;
  const draw = (): Algebraic => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return field.fromInteger((state >>> 12) - 2 ** 19);
  };
  const base: { readonly x: readonly Algebraic[]; readonly value: Algebraic }[] = [];
  try {
    for (let k = 0; k < TRIES && base.length < POINTS; k++) {
      const x = names.map(draw);
      const value = at(x);
      if (value !== 'pole') base.push({ x, value });
    }
  } catch {
    // a term of higher degree has a coefficient outside the field
    return undefined;
  }
  if (base.length < POINTS) return undefined;
  return (matrix) =>
    base.every(({ x, value }) => {
      const image = at(sparseApply(matrix, x));
      return image !== 'pole' && field.equal(image, value);
    });
}
