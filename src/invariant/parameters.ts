/**
 * Homogeneous systems of parameters: n invariants whose only common zero is 0. Proved by Macaulay's criterion (the
 * forms of degree Σ(d - 1) + 1 all lie in the ideal; a full rank modulo p is a full rank), block by block: systems
 * for the blocks together are one for the whole.
 */
import { type Algebraic, PrimeField, powModInt } from '../field/index.ts';
import { at, build, determinant, type Matrix } from '../linear/index.ts';
import { type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import { CommonReduction } from './common-reduction.ts';
import { binomial } from './dimensions.ts';
import { Span } from './evaluation.ts';
import type { LinearAction } from './linear-action.ts';
import { MonomialLayers } from './monomial-layers.ts';

/** Largest number of monomials in Macaulay's criterion. */
export const MACAULAY_MOST = 500;

/** True if the forms (in the given variables only) are proved to have no common zero but 0. */
export function isParameterSystem(action: LinearAction, variables: readonly number[], forms: readonly Polynomial<Algebraic>[]): boolean {
  const n = variables.length;
  if (forms.length !== n) return false;
  const degrees = forms.map((f) => f.monomials.at(-1)!.length);
  const top = degrees.reduce((s, d) => s + d - 1, 1);
  if (binomial(top + n - 1, n - 1) > BigInt(MACAULAY_MOST)) return false;
  const layers = new MonomialLayers(n);
  const reduction = CommonReduction.of(action.field);
  const { p } = reduction;
  const columns = layers.names(top, variables);
  const place = new Map(columns.map((m, i) => [m, i] as const));
  const ring = new PolynomialRing<number>(new PrimeField(p), action.names);
  const span = new Span(p, columns.length, columns.length);
  for (let k = n - 1; k >= 0; k--) {
    const f = ring.map(
      { monomials: forms[k]!.monomials, coefficients: forms[k]!.coefficients.map((c) => reduction.apply(c)) },
      (c) => c,
      ring,
    );
    for (const m of layers.names(top - degrees[k]!, variables)) {
      const row = new Int32Array(columns.length);
      const q = ring.mul(ring.term(m, 1), f);
      q.monomials.forEach((x, i) => {
        row[place.get(x)!] = q.coefficients[i]!;
      });
      span.add(row);
      if (span.rank === columns.length) return true;
    }
  }
  return false;
}

/** True if the Jacobian of n forms in n variables is proved not to vanish identically. */
export function areIndependent(action: LinearAction, variables: readonly number[], forms: readonly Polynomial<Algebraic>[]): boolean {
  const n = variables.length;
  if (forms.length !== n) return false;
  const reduction = CommonReduction.of(action.field);
  const { p } = reduction;
  const prime = new PrimeField(p);
  const ring = new PolynomialRing<number>(prime, action.names);
  const point = action.names.map((_, i) => powModInt(7, 3 * i + 5, p));
  const images = forms.map((f) => ring.fromTerms(f.monomials.map((m, i) => [m, reduction.apply(f.coefficients[i]!)] as const)));
  const jacobian: Matrix<number> = build(prime, n, n, (i, j) => ring.evaluate(ring.derivative(images[i]!, variables[j]!), point));
  return n === 0 || (at(jacobian, 0, 0) !== undefined && determinant(jacobian) !== 0);
}

/** Subsets of size k of 0 … n-1, in order of their largest members. */
export function* subsets(n: number, k: number): IterableIterator<number[]> {
  if (k === 0) {
    yield [];
    return;
  }
  for (let last = k - 1; last < n; last++) for (const rest of subsets(last, k - 1)) yield [...rest, last];
}
