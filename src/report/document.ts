/**
 * The neutral form of a report: what is said, in which order, before anything is known about paper or screen.
 * It is made once from the results and then printed as text, LaTeX, HTML or Markdown.
 */
import type { Formula } from './mathematics/index.ts';
import type { ReferenceKey } from './references.ts';
import type { FigureData } from './svg/figure.ts';

/** A part of a line. Plain strings are prose and are escaped by every printer. */
export type Inline =
  | string
  | { readonly kind: 'formula'; readonly formula: Formula }
  | { readonly kind: 'strong'; readonly text: string }
  | { readonly kind: 'code'; readonly text: string }
  | { readonly kind: 'cite'; readonly keys: readonly ReferenceKey[] };
export type Line = readonly Inline[];

export interface Column {
  readonly head: Line;
  readonly align: 'left' | 'right' | 'center';
}

export interface Matrix {
  readonly name: Formula;
  readonly rows: readonly (readonly Formula[])[];
}

/** An aside explains, cites or goes into detail; a terminal leaves it out. */
export type Block =
  | { readonly kind: 'paragraph'; readonly line: Line; readonly aside?: true }
  | { readonly kind: 'facts'; readonly rows: readonly { readonly name: string; readonly line: Line }[] }
  | { readonly kind: 'list'; readonly items: readonly Line[]; readonly aside?: true }
  | { readonly kind: 'table'; readonly caption: string; readonly columns: readonly Column[]; readonly rows: readonly (readonly Line[])[] }
  | { readonly kind: 'display'; readonly formula: Formula }
  /** Matrices that belong together; side by side where there is room. */
  | { readonly kind: 'matrices'; readonly matrices: readonly Matrix[] }
  | { readonly kind: 'figure'; readonly figure: FigureData; readonly caption: string }
  | { readonly kind: 'note'; readonly title: string; readonly line: Line };

export interface Section {
  /** Unique in a document, made of letters and hyphens. */
  readonly id: string;
  readonly title: string;
  readonly blocks: readonly Block[];
}

/** The answer, before everything else. */
export interface Headline {
  /** Short: "Generic in one parameter". */
  readonly answer: string;
  readonly tone: 'yes' | 'no' | 'open' | 'plain';
  readonly sentence: string;
  readonly facts: readonly { readonly name: string; readonly line: Line }[];
}

export interface Document {
  readonly title: string;
  readonly subtitle: string;
  readonly headline: Headline | null;
  readonly sections: readonly Section[];
  readonly caution: string | null;
  /** Keys of the sources cited, in the order of first citation. */
  readonly citations: readonly ReferenceKey[];
}

/** A formula in a line. */
export const math = (formula: Formula): Inline => ({ kind: 'formula', formula });
export const strong = (text: string): Inline => ({ kind: 'strong', text });
export const code = (text: string): Inline => ({ kind: 'code', text });
export const cite = (...keys: readonly ReferenceKey[]): Inline => ({ kind: 'cite', keys });
export const paragraph = (...line: readonly Inline[]): Block => ({ kind: 'paragraph', line });
export const aside = (...line: readonly Inline[]): Block => ({ kind: 'paragraph', line, aside: true });
export const column = (head: string | Line, align: Column['align'] = 'left'): Column => ({
  head: typeof head === 'string' ? [head] : head,
  align,
});

/** Joins the parts of a line by a separator. */
export function joined(parts: readonly Inline[], separator = ', '): Line {
  return parts.flatMap((part, i) => (i === 0 ? [part] : [separator, part]));
}

/** All parts of all lines, for looking through a document. */
export function linesOf(block: Block): readonly Line[] {
  switch (block.kind) {
    case 'paragraph':
    case 'note':
      return [block.line];
    case 'facts':
      return block.rows.map((row) => row.line);
    case 'list':
      return block.items;
    case 'table':
      return [...block.columns.map((c) => c.head), ...block.rows.flat()];
    default:
      return [];
  }
}
