/**
 * Display labels of real irreducibles: the letter says the dimension over R (A and B 1, E 2, T 3, G 4, H 5, I 6)
 * after R. S. Mulliken, Report on notation for the spectra of polyatomic molecules, J. Chem. Phys. 23 (1955);
 * a number keeps labels of one letter apart. Point groups get their usual labels in point-labels.ts.
 * @source Mulliken1955
 */
import type { RealIrreducible } from '../group/index.ts';

const LETTERS = ['', 'A', 'E', 'T', 'G', 'H', 'I'];

/** One label for each irreducible; `principal` is the class whose sign tells A from B (the first generator's). */
export function genericLabels(irreducibles: readonly RealIrreducible[], principal: number | undefined): string[] {
  const letters = irreducibles.map((k) => {
    if (k.dimension === 1) return principal !== undefined && k.values[principal]! < 0 ? 'B' : 'A';
    return LETTERS[k.dimension] ?? `V${k.dimension}_`;
  });
  const total = new Map<string, number>();
  for (const l of letters) total.set(l, (total.get(l) ?? 0) + 1);
  const used = new Map<string, number>();
  return letters.map((l) => {
    if (total.get(l) === 1 && !l.endsWith('_')) return l;
    const n = (used.get(l) ?? 0) + 1;
    used.set(l, n);
    return `${l}${n}`;
  });
}
