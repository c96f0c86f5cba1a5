/** Lines as plain text, and the numbers of citations. */
import type { Document, Inline, Line } from '../document.ts';
import { REFERENCES, referenceText } from '../references.ts';

/** Numbers the sources of a document in the order of citation. */
export function numbersOf(document: Document): ReadonlyMap<string, number> {
  return new Map(document.citations.map((key, i) => [key, i + 1]));
}

/** The list of sources, in order, in words. */
export function sourcesOf(document: Document): readonly string[] {
  return document.citations.map((key) => referenceText(REFERENCES[key]));
}

/** A part of a line without any type. */
export function plainInline(part: Inline, numbers: ReadonlyMap<string, number>): string {
  if (typeof part === 'string') return part;
  switch (part.kind) {
    case 'formula':
      return part.formula.text;
    case 'strong':
    case 'code':
      return part.text;
    case 'cite':
      return numbers.size === 0 ? '' : `[${part.keys.flatMap((key) => numbers.get(key) ?? []).join(', ')}]`;
  }
}

/** A line without any type; without numbers its citations are left out. */
export function plainLine(line: Line, numbers: ReadonlyMap<string, number>): string {
  const parts = line.map((part) => plainInline(part, numbers));
  // the blank before a citation that is left out goes with it
  line.forEach((part, i) => {
    if (typeof part !== 'string' && part.kind === 'cite' && parts[i] === '' && i > 0) parts[i - 1] = parts[i - 1]!.trimEnd();
  });
  return parts.join('');
}
