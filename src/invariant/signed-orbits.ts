/** Signed permutations of the monomials of one degree, and their orbits. */
import type { SparseRow } from './symmetric-powers.ts';

/** True if every row has a single entry 1 or -1. */
export function isSigned(rows: readonly SparseRow[], p: number): boolean {
  return rows.every((r) => r.index.length === 1 && (r.value[0] === 1 || r.value[0] === p - 1));
}

/**
 * Orbits of monomials under signed permutations that carry an invariant, in the order of their first members; signs
 * are relative to these. Other monomials get no orbit.
 */
export function signedOrbits(set: readonly number[], generators: readonly (readonly SparseRow[])[], signOf: Int8Array): number[][] {
  for (const m of set) signOf[m] = 0;
  const out: number[][] = [];
  for (const start of set) {
    if (signOf[start] !== 0) continue;
    signOf[start] = 1;
    const orbit = [start];
    let consistent = true;
    for (const m of orbit)
      for (const g of generators) {
        const { index, value } = g[m]!;
        const sign = (value[0] === 1 ? signOf[m]! : -signOf[m]!) as 1 | -1;
        const next = index[0]!;
        if (signOf[next] === 0) {
          signOf[next] = sign;
          orbit.push(next);
        } else if (signOf[next] !== sign) consistent = false;
      }
    if (!consistent) continue;
    out.push(orbit.sort((a, b) => a - b));
  }
  return out;
}
