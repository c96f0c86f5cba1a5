/** Every published source that a comment or a group file names is in a list of references. */
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { REFERENCES } from '../../src/report/references.ts';

const root = new URL('../../', import.meta.url).pathname;
const read = (file: string): string => readFileSync(join(root, file), 'utf8');
const filesIn = (folder: string, end: string): string[] =>
  readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter((file) => file.endsWith(end))
    .map((file) => join(folder, file));

/** Letters without accents, in lower case. */
const plain = (text: string): string =>
  text
    .normalize('NFD')
    .replace(/\p{Mark}/gu, '')
    .toLowerCase();

/** One entry: its text, and the last names of its authors. */
interface Entry {
  readonly text: string;
  readonly names: readonly string[];
}

/** `A. B. Name, C. Name: Title. Where, year.` */
function entryOf(line: string): Entry {
  const authors = line.slice(0, line.indexOf(':'));
  return { text: plain(line), names: authors.split(/,| and /).map((author) => plain(author.trim().split(' ').at(-1) ?? '')) };
}

/** The list in the documents and the sources of algorithms in DEVELOPERS.md make up one bibliography. */
const bibliography: readonly Entry[] = [
  ...Object.values(REFERENCES).map(({ authors, title, where, year }) => entryOf(`${authors}: ${title}. ${where}, ${year}.`)),
  ...(/^## Sources\n([\s\S]*?)(?=^## |$(?![\s\S]))/m.exec(read('DEVELOPERS.md'))?.[1] ?? '')
    .split('\n')
    .filter((line) => line.startsWith('- '))
    .map((line) => entryOf(line.slice(2))),
];

/** Comments of a file, each as one line; line comments that follow each other are one. */
function commentsOf(text: string): string[] {
  return [...text.matchAll(/\/\*[\s\S]*?\*\/|(?:^|(?<=\s))\/\/[^\n]*(?:\n\s*\/\/[^\n]*)*/g)].map((match) =>
    match[0].replace(/\s*\n\s*(?:\*|\/\/)?\s*/g, ' '),
  );
}

/** Years that stand for a publication: four digits, no part of a longer number, date or name. */
const YEAR = /(?<![\w.,^-])(1[6-9]\d\d|20[0-2]\d)(?![\w-]|\.\d)/g;

/** Years of a text for which no entry has that year and one of its authors in the same text. */
function unknownYears(text: string): string[] {
  const folded = plain(text);
  return [...text.matchAll(YEAR)]
    .map((match) => match[1]!)
    .filter(
      (year) =>
        !bibliography.some(
          (entry) => entry.text.includes(year) && entry.names.some((name) => new RegExp(`(?<![a-z])${name}(?![a-z])`).test(folded)),
        ),
    );
}

/** `@source Galin1982, Kocak1984` */
function taggedIn(text: string): string[] {
  return [...text.matchAll(/@source\s+([A-Za-z]+\d{4}(?:\s*,\s*[A-Za-z]+\d{4})*)/g)].flatMap((match) => match[1]!.split(/\s*,\s*/));
}

const isKnownTag = (tag: string): boolean => {
  const [, name, year] = /^([A-Za-z]+)(\d{4})$/.exec(tag) ?? [];
  return bibliography.some((entry) => entry.text.includes(year!) && entry.names.join('').startsWith(plain(name!)));
};

const sources = filesIn('src', '.ts');

describe('citations', () => {
  it('the bibliography is read', () => {
    expect(bibliography.length).toBeGreaterThan(30);
    for (const { text, names } of bibliography) {
      expect(text, text).toMatch(/(1[6-9]|20)\d\d/);
      for (const name of names) expect(name, text).toMatch(/^[a-z'’-]{2,}$/);
    }
  });

  it('a source that is not in the list would be found', () => {
    expect(unknownYears('Codimension (D. M. Galin 1975/1982).')).toEqual([]);
    expect(unknownYears('Codimension (Nobody 1975).')).toEqual(['1975']);
    expect(unknownYears('limit 2000 elements')).toEqual(['2000']);
    expect(unknownYears('2^2000, 1_2000, 2000.5, 1999-12')).toEqual([]);
    expect([taggedIn('/** x @source Galin1982, Kocak1984 */').every(isKnownTag), isKnownTag('Nobody1982')]).toEqual([true, false]);
  });

  it.each(sources.map((file) => [file] as const))('%s', (file) => {
    for (const comment of commentsOf(read(file))) {
      expect(unknownYears(comment), comment).toEqual([]);
      const tags = taggedIn(comment);
      expect(tags.length > 0, comment).toBe(/@source\b/.test(comment));
      expect(
        tags.filter((tag) => !isKnownTag(tag)),
        comment,
      ).toEqual([]);
    }
  });

  it.each(filesIn('groups', '.json').map((file) => [file] as const))('%s', (file) => {
    const { source } = JSON.parse(read(file)) as { source: string };
    expect(source).toMatch(/from memory|common practice|\d{4}/);
    expect(unknownYears(source), source).toEqual([]);
  });
});
