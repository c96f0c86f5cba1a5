/** Where the catalogue lies, what it holds by name, and which names lie nearest to a mistyped one. */
import { existsSync, readdirSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { InputError } from '../errors/errors.ts';

/** Path of the folder `groups` beside the package.json of this package, found upwards from this file (source or bundle). */
export function catalogueFolder(): string {
  const start = dirname(fileURLToPath(import.meta.url));
  for (let folder = start, above = dirname(folder); ; folder = above, above = dirname(above)) {
    if (existsSync(join(folder, 'groups')) && existsSync(join(folder, 'package.json'))) return join(folder, 'groups');
    if (above === folder)
      throw new InputError('the catalogue of groups is missing from the installation', {
        file: start,
        expected: 'a folder "groups" beside package.json',
        next: 'install the package again',
      });
  }
}

/** `cyclic:N` is kept in cyclic-N.json: a colon is no part of a file name everywhere. */
export const catalogueFileName = (name: string): string => `${name.replace(':', '-')}.json`;

/** Names in the catalogue, families with N in place of the number: words first, Schoenflies symbols after them. */
export function catalogueNames(folder: string = catalogueFolder()): string[] {
  const named = readdirSync(folder)
    .filter((file) => file.endsWith('.json'))
    .map((file) => file.slice(0, -'.json'.length).replace(/-(?=N$|[A-Z]\d$)/, ':'));
  const word = (name: string) => /^[a-z]/.test(name);
  return named.sort((a, b) => Number(word(b)) - Number(word(a)) || (a < b ? -1 : 1));
}

/** Edit distance of two short texts (Damerau 1964, Levenshtein 1965): change, omission, addition, exchange of neighbours; a change of case counts one half. */
function distance(a: string, b: string): number {
  let before: number[] = [];
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      const x = a[i - 1]!;
      const y = b[j - 1]!;
      const change = x === y ? 0 : x.toLowerCase() === y.toLowerCase() ? 0.5 : 1;
      const exchange = i > 1 && j > 1 && x === b[j - 2] && y === a[i - 2] ? before[j - 2]! + 1 : Number.POSITIVE_INFINITY;
      next.push(Math.min(row[j - 1]! + change, row[j]! + 1, next[j - 1]! + 1, exchange));
    }
    [before, row] = [row, next];
  }
  return row[b.length]!;
}

/** Up to three of the names that a mistyped text may have meant, nearest first. */
export function nearestNames(typed: string, names: readonly string[]): string[] {
  if (typed.length > 60) return [];
  const limit = Math.max(1, typed.length / 3);
  return names
    .map((name) => ({ name, far: distance(typed, name) }))
    .filter(({ far }) => far <= limit)
    .sort((a, b) => a.far - b.far || Math.abs(a.name.length - typed.length) - Math.abs(b.name.length - typed.length))
    .filter(({ far }, _, all) => far === all[0]!.far)
    .slice(0, 3)
    .map(({ name }) => name);
}
