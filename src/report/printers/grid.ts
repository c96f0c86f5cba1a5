/** Tables in a terminal: columns side by side where they fit, records below each other where they do not. */
import { columns as columnsOf, wrapWords } from './wrap.ts';

export interface GridColumn {
  readonly head: string;
  readonly right: boolean;
}

const GAP = 2;
/** A column is not squeezed below this. */
const NARROWEST = 9;
const INDENT = '  ';

/** Lines of a table, indented by two. */
export function gridLines(columns: readonly GridColumn[], rows: readonly (readonly string[])[], width: number): readonly string[] {
  const room = width - INDENT.length;
  const least = columns.map((c, k) => Math.max(...c.head.split(' ').map(columnsOf), ...rows.map((row) => columnsOf(row[k] ?? ''))));
  const widths = columns.map((c, k) => Math.max(columnsOf(c.head), least[k]!));
  const total = () => widths.reduce((a, b) => a + b, 0) + GAP * (columns.length - 1);
  // heads give way first, then the widest cells
  for (let k = 0; k < widths.length && total() > room; k++) widths[k] = Math.max(least[k]!, widths[k]! - (total() - room));
  while (total() > room) {
    const widest = widths.indexOf(Math.max(...widths));
    if (widths[widest]! <= NARROWEST) return recordLines(columns, rows, width);
    widths[widest] = Math.max(NARROWEST, widths[widest]! - (total() - room));
  }
  const cell = (text: string, k: number): readonly string[] => wrapWords(text, widths[k]!);
  const cells = rows.map((row) => columns.map((_, k) => cell(row[k] ?? '', k)));
  const tallest = Math.max(0, ...columns.map((c, k) => cell(c.head, k).length));
  const heads = columns.map((c, k) => {
    const lines = cell(c.head, k);
    return [...Array.from({ length: tallest - lines.length }, () => ''), ...lines];
  });
  // a word wider than its column would push the others out of line
  if ([heads, ...cells].some((row) => row.some((lines, k) => lines.some((l) => columnsOf(l) > widths[k]!))))
    return recordLines(columns, rows, width);
  const print = (row: readonly (readonly string[])[]): readonly string[] => {
    const height = Math.max(...row.map((lines) => lines.length));
    return Array.from({ length: height }, (_, i) =>
      `${INDENT}${row
        .map((lines, k) => {
          const text = lines[i] ?? '';
          const blank = ' '.repeat(Math.max(0, widths[k]! - columnsOf(text)));
          return columns[k]!.right ? blank + text : text + blank;
        })
        .join(' '.repeat(GAP))}`.trimEnd(),
    );
  };
  const rule = `${INDENT}${widths.map((w) => '─'.repeat(w)).join(' '.repeat(GAP))}`;
  return [...print(heads), rule, ...cells.flatMap(print)];
}

/** One record for each row: the first column leads, the others hang below it. */
function recordLines(columns: readonly GridColumn[], rows: readonly (readonly string[])[], width: number): readonly string[] {
  return rows.flatMap((row) =>
    columns.flatMap((column, k) => {
      const lead = k === 0 ? INDENT : `${INDENT}  `;
      const lines = wrapWords(`${column.head}: ${row[k] ?? ''}`, width - lead.length - 2);
      return lines.map((text, i) => `${lead}${i === 0 ? '' : '  '}${text}`);
    }),
  );
}
