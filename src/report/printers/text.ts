/**
 * A document for a terminal: plain text, the answer first, tables aligned, no line wider than asked for where
 * words allow. What the headline has told is not told again, and explanations with their sources are left to the
 * other documents.
 */
import type { Block, Document, Line, Section } from '../document.ts';
import { gridLines } from './grid.ts';
import { plainLine } from './lines.ts';
import { columns, wrapWords } from './wrap.ts';

/** Sections that repeat the declaration. */
const DECLARED: readonly string[] = ['model', 'symmetry'];
const WIDEST = 100;
const NARROWEST = 40;
const DEFAULT = 80;

/** The text; ends without a line break. `width` defaults to 80 and is kept between 40 and 100 for reading. */
export function printText(document: Document, width: number = DEFAULT): string {
  const room = Math.max(NARROWEST, Math.min(WIDEST, width));
  const numbers: ReadonlyMap<string, number> = new Map();
  const told = new Set(document.headline?.facts.map((fact) => fact.name));
  const out: string[] = [];
  const hang = (text: string, lead: string, rest: string) => {
    const lines = wrapWords(text, room - Math.max(columns(lead), columns(rest)));
    out.push(...lines.map((line, i) => `${i === 0 ? lead : rest}${line}`.trimEnd()));
  };
  const facts = (rows: readonly { readonly name: string; readonly line: Line }[]) => {
    const widest = Math.max(0, ...rows.map((row) => columns(row.name)));
    for (const row of rows)
      hang(plainLine(row.line, numbers), `  ${row.name}${' '.repeat(widest - columns(row.name) + 2)}`, ' '.repeat(widest + 4));
  };
  const block = (b: Block) => {
    switch (b.kind) {
      case 'paragraph':
        return hang(plainLine(b.line, numbers), '', '');
      case 'facts':
        return facts(b.rows.filter((row) => !told.has(row.name)));
      case 'list':
        for (const item of b.items) hang(plainLine(item, numbers), '  - ', '    ');
        return;
      case 'table': {
        hang(b.caption, '', '');
        const grid = b.columns.map((c) => ({ head: plainLine(c.head, numbers), right: c.align === 'right' }));
        out.push(
          ...gridLines(
            grid,
            b.rows.map((row) => row.map((cell) => plainLine(cell, numbers))),
            room,
          ),
        );
        return;
      }
      case 'display':
        return hang(b.formula.text, '    ', '      ');
      case 'matrices':
        b.matrices.forEach(({ name, rows }, i) => {
          if (i > 0) out.push('');
          out.push(
            ...matrixLines(
              name.text,
              rows.map((row) => row.map((f) => f.text)),
              room,
            ),
          );
        });
        return;
      case 'figure':
        return;
      case 'note':
        return hang(`${b.title}: ${plainLine(b.line, numbers)}`, '', '');
    }
  };
  hang(document.title, '', '');
  out.push('═'.repeat(Math.min(room, Math.max(8, columns(document.title)))));
  const headline = document.headline;
  if (headline !== null) {
    if (headline.answer !== '') hang(`${headline.answer}${headline.sentence === '' ? '' : `: ${headline.sentence}`}`, '', '');
    if (headline.facts.length > 0) {
      out.push('');
      facts(headline.facts);
    }
  }
  for (const section of terminalOrder(document.sections)) {
    // a terminal shows the verdict once, at the top
    if (section.id === 'verdict') continue;
    const heading = out.length;
    out.push('', section.title, '─'.repeat(columns(section.title)));
    const filled = out.length;
    let before: Block['kind'] | null = null;
    for (const b of section.blocks) {
      if ('aside' in b && b.aside === true) continue;
      const start = out.length;
      block(b);
      if (out.length === start) continue;
      // displays that follow each other stand close
      if (before !== null && !(before === 'display' && b.kind === 'display')) out.splice(start, 0, '');
      before = b.kind;
    }
    if (out.length === filled) out.length = heading;
  }
  if (document.caution !== null) {
    out.push('');
    hang(document.caution, '', '');
  }
  return out.join('\n').trimEnd();
}

/** What was asked for stands before what was declared. */
function terminalOrder(sections: readonly Section[]): readonly Section[] {
  const answers = sections.filter((s) => !DECLARED.includes(s.id));
  const event = answers.some((s) => ['zero-event', 'events', 'sweep'].includes(s.id));
  const context = answers.filter((s) => event && s.id === 'components');
  return [...answers.filter((s) => !context.includes(s)), ...context, ...sections.filter((s) => DECLARED.includes(s.id))];
}

/** A matrix with aligned columns, or row by row where it is too wide. */
function matrixLines(name: string, rows: readonly (readonly string[])[], room: number): readonly string[] {
  const widths = (rows[0] ?? []).map((_, k) => Math.max(...rows.map((row) => columns(row[k] ?? ''))));
  const total = widths.reduce((a, b) => a + b + 2, 0) + 6;
  if (total <= room)
    return [`  ${name}`, ...rows.map((row) => `    [ ${row.map((text, k) => ' '.repeat(widths[k]! - columns(text)) + text).join('  ')} ]`)];
  return [
    `  ${name}, row by row`,
    ...rows.flatMap((row, i) =>
      wrapWords(`${i + 1}:  ${row.join(',  ')}`, room - 8).map((text, k) => `    ${k === 0 ? '' : '    '}${text}`),
    ),
  ];
}
