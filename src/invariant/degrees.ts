/**
 * A denominator Π(1 - t^d) for a Molien series: n degrees with the smallest sum such that it is a multiple of every
 * det(1 - tρ(g)) and that the numerator has no negative coefficient, as it must for the degrees of a system of
 * parameters (Hochster and Eagon 1971: rings of invariants are Cohen-Macaulay).
 */
import { divisors } from '../field/index.ts';
import type { GradedDimensions } from './dimensions.ts';

/** Nodes of the search, weighted by the factors chosen, before it gives up. */
const NODES_MOST = 400_000;

/** orders[m] = largest multiplicity of a primitive m-th root of unity as an eigenvalue of one element. */
export function poleOrders(dimensions: GradedDimensions): Map<number, number> {
  const out = new Map<number, number>();
  dimensions.action.group.classes.forEach((c, k) => {
    const multiplicity = dimensions.eigenvalueMultiplicities(k);
    for (const m of divisors(c.order)) {
      let most = out.get(m) ?? 0;
      for (let j = 1; j <= m; j++) {
        if (gcd(j, m) !== 1) continue;
        most = Math.max(most, multiplicity[((j * c.order) / m) % c.order]!);
      }
      if (most > 0) out.set(m, most);
    }
  });
  return out;
}

/** The degrees; `coefficient(d)` is the d-th coefficient of the series of invariants. */
export function denominatorDegrees(n: number, orders: ReadonlyMap<number, number>, coefficient: (d: number) => number): number[] {
  if (n === 0) return [];
  const needs = [...orders].filter(([m, e]) => m > 1 && e > 0);
  let nodes = 0;
  const chosen: number[] = [];
  const series: number[] = [];
  const upTo = (d: number) => {
    while (series.length <= d) series.push(coefficient(series.length));
  };
  /** Coefficients 0 … d of the series times the factors chosen. */
  const partial = (d: number): number[] => {
    upTo(d);
    const out = series.slice(0, d + 1);
    for (const e of chosen) for (let i = d; i >= e; i--) out[i] = out[i]! - out[i - e]!;
    return out;
  };
  const search = (least: number, rest: number, checked: number): boolean => {
    const slots = n - chosen.length;
    for (const [m, e] of needs) if (e - chosen.filter((d) => d % m === 0).length > slots) return false;
    if (slots === 0) return rest === 0 && partial(chosen.reduce((s, d) => s + d - 1, 0)).every((c) => c >= 0);
    if ((nodes += chosen.length + 1) > NODES_MOST) return false;
    const most = Math.floor(rest / slots);
    if (most < least) return false;
    const current = partial(most);
    for (let d = checked; d < least; d++) if (current[d]! < 0) return false;
    for (let d = least; d <= most; d++) {
      if (current[d]! < 0) return false;
      if (current[d]! === 0) continue;
      if (slots === 1 && d !== rest) continue;
      chosen.push(d);
      if (search(d, rest - d, least)) return true;
      chosen.pop();
      if (nodes > NODES_MOST) return false;
    }
    return false;
  };
  const bound = needs.reduce((s, [m, e]) => s + m * e, n);
  for (let sum = n; sum <= 2 * bound + 60 && nodes <= NODES_MOST; sum++) if (search(1, sum, 0)) return chosen;
  // a common denominator all the same
  return Array.from({ length: n }, (_, i) => needs.reduce((l, [m, e]) => (e > i ? (l / gcd(l, m)) * m : l), 1)).sort((a, b) => a - b);
}

function gcd(a: number, b: number): number {
  while (b !== 0) [a, b] = [b, a % b];
  return a;
}
