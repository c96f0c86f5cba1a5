/**
 * Newton boundaries of small supports: the compact facets as weights, and what lies on or above them
 * (A. G. Kouchnirenko, Polyèdres de Newton et nombres de Milnor, Invent. Math. 32 (1976); place from memory).
 */
import { type Rational, rational, rationals } from '../field/index.ts';
import { fromRows, kernel } from '../linear/index.ts';

/** Positive weights w with w·s >= 1 on the support, equal to 1 on a facet. */
export type Facet = readonly Rational[];

/** Most points of a support that are looked at. */
const POINTS_MOST = 40;

/** The compact facets of the Newton boundary of points with non-negative integer coordinates; undefined if there are too many points. */
export function compactFacets(support: readonly (readonly number[])[], dimension: number): Facet[] | undefined {
  const points = minimal(support);
  if (points.length > POINTS_MOST) return undefined;
  const found = new Map<string, Facet>();
  const chosen: (readonly number[])[] = [];
  const search = (from: number) => {
    if (chosen.length === dimension) {
      const w = weightsThrough(chosen, dimension);
      if (w === undefined || w.some((x) => x.n <= 0n)) return;
      if (points.every((s) => rationals.compare(weightOf(w, s), rationals.one) >= 0))
        found.set(w.map((x) => rationals.key(x)).join(','), w);
      return;
    }
    for (let i = from; i < points.length; i++) {
      chosen.push(points[i]!);
      search(i + 1);
      chosen.pop();
    }
  };
  search(0);
  return [...found.values()];
}

export function weightOf(w: Facet, exponents: readonly number[]): Rational {
  let sum = rationals.zero;
  exponents.forEach((e, i) => {
    if (e !== 0) sum = rationals.add(sum, rationals.mul(rational(BigInt(e)), w[i]!));
  });
  return sum;
}

/** On or above every facet. */
export function onOrAbove(facets: readonly Facet[], exponents: readonly number[]): boolean {
  return facets.every((w) => rationals.compare(weightOf(w, exponents), rationals.one) >= 0);
}

/** Points that no other point divides. */
function minimal(support: readonly (readonly number[])[]): (readonly number[])[] {
  const distinct = [...new Map(support.map((s) => [s.join(','), s])).values()];
  return distinct.filter((s) => !distinct.some((t) => t !== s && t.every((x, i) => x <= s[i]!)));
}

/** w with w·s = 1 for all the points, if there is exactly one. */
function weightsThrough(points: readonly (readonly number[])[], dimension: number): Facet | undefined {
  // homogeneous: w·s - u = 0
  const k = kernel(
    fromRows(
      rationals,
      points.map((s) => [...s.map((x) => rational(BigInt(x))), rational(-1n)]),
      dimension + 1,
    ),
  );
  if (k.cols !== 1 || k.data[dimension]!.n === 0n) return undefined;
  return Array.from({ length: dimension }, (_, i) => rationals.div(k.data[i]!, k.data[dimension]!));
}
