/**
 * The characters of degree 1, from the dual of the commutator factor group A = G/G'. A character of
 * a subgroup B of A extends to B and a in as many ways as a has powers before it enters B: each
 * k-th root of the value at a^k is a choice. Values are exponents of exp(2 pi i/e), e the exponent of G.
 */
import { derivedSubgroup, leftCosets } from './generate.ts';
import type { FiniteGroup } from './group.ts';

export interface LinearCharacters {
  /** One row for each linear character, one exponent for each class. The first is trivial. */
  readonly exponents: Int32Array[];
  /** For each class the coset of G' it lies in. */
  readonly cosetOfClass: Int32Array;
}

export function linearCharacters(group: FiniteGroup): LinearCharacters {
  const e = group.exponent;
  const { representatives, cosetOf } = leftCosets(group, derivedSubgroup(group).elements);
  const n = representatives.length;
  const times = (a: number, b: number): number => cosetOf[group.multiply(representatives[a]!, representatives[b]!)]!;
  const inside = new Uint8Array(n);
  inside[0] = 1;
  const members = [0];
  let characters: Int32Array[] = [new Int32Array(n)];
  for (const g of group.generators) {
    const a = cosetOf[g]!;
    if (inside[a] === 1) continue;
    const powers = [0];
    let x = a;
    for (; inside[x] === 0; x = times(x, a)) powers.push(x);
    const k = powers.length;
    const size = members.length;
    const shifted: number[][] = powers.map((y, j) => (j === 0 ? [] : members.slice(0, size).map((b) => times(y, b))));
    const extended: Int32Array[] = [];
    for (const c of characters)
      for (let i = 0; i < k; i++) {
        const step = (c[x]! + i * e) / k; // k divides c[x], because the character extends
        const next = c.slice();
        for (let j = 1; j < k; j++) for (let b = 0; b < size; b++) next[shifted[j]![b]!] = (j * step + c[members[b]!]!) % e;
        extended.push(next);
      }
    characters = extended;
    for (const row of shifted)
      for (const y of row) {
        inside[y] = 1;
        members.push(y);
      }
  }
  const cosetOfClass = Int32Array.from(group.classes, (c) => cosetOf[c.representative]!);
  return { exponents: characters.map((c) => cosetOfClass.map((a) => c[a]!)), cosetOfClass };
}
