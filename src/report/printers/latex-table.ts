/** Tables in LaTeX: columns as wide as they need to be, long ones divided, bulky ones written as records. */
import type { Column, Line } from '../document.ts';

export interface LatexTable {
  /** LaTeX already. */
  readonly caption: string;
  readonly columns: readonly Column[];
  readonly rows: readonly (readonly Line[])[];
  /** Width of the line in em. */
  readonly line: number;
  /** Lines of text in one tabular; a longer table continues in another. */
  readonly lines: number;
  readonly write: (line: Line, limit: number) => string;
  readonly width: (line: Line) => number;
}

/** A cell of more lines than this is no matter for a table. */
const CELL_LINES = 7;
/** Space between columns. */
const GAP = 1.2;
/** A head longer than this may be broken. */
const HEAD = 5;

export function tableLatex(table: LatexTable): string {
  const { columns, rows } = table;
  const body = columns.map((_, k) => Math.max(1, ...rows.map((row) => table.width(row[k]!))));
  const heads = columns.map((c) => table.width(c.head));
  const natural = body.map((w, k) => Math.max(w, Math.min(heads[k]!, HEAD)));
  const room = table.line - GAP * (columns.length - 1);
  const widths = shrink(natural, room);
  if (widths === null) return records(table);
  const bulky = rows.filter((row) => row.some((cell, k) => widths[k]! < natural[k]! && table.width(cell) / widths[k]! > CELL_LINES));
  if (bulky.length === rows.length) return records(table);
  if (bulky.length > 0) {
    const rest = rows.filter((row) => !bulky.includes(row));
    return `${tableLatex({ ...table, rows: rest })}\n\n${records({ ...table, rows: bulky })}`;
  }
  const specification = columns.map((c, k) => {
    if (widths[k]! < natural[k]!) return `>{\\raggedright\\arraybackslash}p{${widths[k]!.toFixed(1)}em}`;
    return c.align === 'right' ? 'r' : c.align === 'center' ? 'c' : 'l';
  });
  const limitOf = (k: number): number => (widths[k]! < natural[k]! ? widths[k]! * 0.75 : Number.POSITIVE_INFINITY);
  const head = columns.map((c, k) => headCell(c, k, table, widths, heads)).join(' & ');
  const lines = rows.map((row) => `${row.map((cell, k) => table.write(cell, limitOf(k))).join(' & ')} \\\\`);
  const heights = rows.map((row) => Math.max(1, ...row.map((cell, k) => Math.ceil((table.width(cell) * 1.1) / widths[k]! - 0.1))));
  const parts: string[] = [];
  for (let i = 0, end = 0; i < Math.max(1, lines.length); i = end) {
    let height = 0;
    for (end = i; end < lines.length && (end === i || height + heights[end]! <= table.lines); end++) height += heights[end]!;
    end = Math.max(end, i + 1);
    const note = i === 0 ? table.caption : `${table.caption} (continued)`;
    parts.push(
      [
        '\\begin{center}',
        `{\\small ${note}\\par}\\nopagebreak\\smallskip`,
        `\\symcodimfit{\\setlength{\\extrarowheight}{1.5pt}\\setlength{\\tabcolsep}{${(GAP * 5).toFixed(0)}pt}\\begin{tabular}{@{}${specification.join('')}@{}}`,
        '\\toprule',
        `${head} \\\\`,
        '\\midrule',
        ...lines.slice(i, end),
        '\\bottomrule',
        '\\end{tabular}}',
        '\\end{center}',
      ].join('\n'),
    );
  }
  return parts.join('\n\n');
}

/** A head of several words may stand on two lines, so that narrow columns stay narrow. */
function headCell(column: Column, k: number, table: LatexTable, widths: readonly number[], heads: readonly number[]): string {
  const text = table.write(column.head, Number.POSITIVE_INFINITY);
  if (heads[k]! <= widths[k]! + 0.5) return text;
  const words = column.head.every((part) => typeof part === 'string') ? column.head.join('').split(' ') : [];
  if (words.length < 2) return text;
  const cut = Math.ceil(words.length / 2);
  const align = column.align === 'right' ? 'r' : column.align === 'center' ? 'c' : 'l';
  const write = (part: readonly string[]) => table.write([part.join(' ')], Number.POSITIVE_INFINITY);
  return `\\begin{tabular}[b]{@{}${align}@{}}${write(words.slice(0, cut))}\\\\${write(words.slice(cut))}\\end{tabular}`;
}

/** Takes room from the widest columns until all fit; null where none can give any more. */
function shrink(natural: readonly number[], room: number): readonly number[] | null {
  const widths = [...natural];
  for (;;) {
    const total = widths.reduce((a, b) => a + b, 0);
    if (total <= room) return widths;
    const widest = widths.indexOf(Math.max(...widths));
    const others = widths.filter((_, k) => k !== widest);
    const next = Math.max(0, ...others);
    if (widths[widest]! < 9) return null;
    widths[widest] = Math.max(8, Math.min(widths[widest]! - 1, Math.max(next, widths[widest]! - (total - room))));
  }
}

/** One paragraph for each row: what leads it, then the rest with the names of the columns. */
function records(table: LatexTable): string {
  const items = table.rows.map((row) => {
    const cells = table.columns.slice(1).map((c, k) => `\\textit{${table.write(c.head, 14)}} ${table.write(row[k + 1]!, 16)}`);
    return `${table.write(row[0]!, 16)}\\quad ${cells.join('; ')}\\par`;
  });
  return [
    '{\\raggedright\\leftskip=1.5em\\parindent=-1.5em\\lineskiplimit=2pt\\lineskip=3pt',
    `{\\small ${table.caption}\\par}\\nobreak`,
    ...items,
    '}',
  ].join('\n');
}
