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
/** Longer heads may be broken into several lines. */
const SHORT_HEAD = 6;
/** A table may be scaled by so much before its columns are narrowed. */
const SCALED = 1.15;

export function tableLatex(table: LatexTable): string {
  const { columns, rows } = table;
  const body = columns.map((_, k) => Math.max(1, ...rows.map((row) => table.width(row[k]!))));
  const natural = body.map((w, k) => {
    const head = table.width(columns[k]!.head);
    return Math.max(w, head <= SHORT_HEAD ? head : Math.max(...headWords(columns[k]!).map((word) => table.width(word))));
  });
  const room = table.line - GAP * (columns.length - 1);
  // a table that is hardly too wide is scaled as a whole
  const widths = sum(natural) <= room * SCALED ? natural : shrink(natural, room);
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
  const head = columns.map((c, k) => headCell(c, table, Math.max(widths[k]!, natural[k]!))).join(' & ');
  const lines = rows.map((row) => `${row.map((cell, k) => table.write(cell, limitOf(k))).join(' & ')} \\\\`);
  const heights = rows.map((row) => Math.max(1, ...row.map((cell, k) => Math.ceil((table.width(cell) * 1.1) / widths[k]! - 0.1))));
  const parts: string[] = [];
  for (let i = 0, end = 0; i < Math.max(1, lines.length); i = end) {
    let height = 0;
    for (end = i; end < lines.length && (end === i || height + heights[end]! <= table.lines); end++) height += heights[end]!;
    end = Math.max(end, i + 1);
    const note = i === 0 ? table.caption : '(continued)';
    parts.push(
      [
        '\\begin{center}\\begin{minipage}{\\linewidth}\\centering',
        `{\\small ${note}\\par}\\smallskip`,
        `\\symcodimfit{\\setlength{\\extrarowheight}{1.5pt}\\setlength{\\tabcolsep}{${(GAP * 5).toFixed(0)}pt}\\begin{tabular}{@{}${specification.join('')}@{}}`,
        '\\toprule',
        `${head} \\\\`,
        '\\midrule',
        ...lines.slice(i, end),
        '\\bottomrule',
        '\\end{tabular}}',
        '\\end{minipage}\\end{center}',
      ].join('\n'),
    );
  }
  return parts.join('\n\n');
}

/** What a head can be broken into: its words, or the whole of it where it holds a formula. */
const headWords = (column: Column): readonly Line[] =>
  column.head.every((part) => typeof part === 'string')
    ? column.head
        .join('')
        .split(' ')
        .map((word) => [word])
    : [column.head];

/** A head stands on as many lines as the width of its column asks for, so that narrow columns stay narrow. */
function headCell(column: Column, table: LatexTable, width: number): string {
  const lines: Line[] = [];
  for (const word of headWords(column)) {
    const last = lines.at(-1);
    const grown: Line = last === undefined ? word : [...last, ' ', ...word];
    if (last === undefined || table.width(grown) > width + 0.5) lines.push(word);
    else lines[lines.length - 1] = grown;
  }
  const written = lines.map((line) => table.write(line, Number.POSITIVE_INFINITY));
  if (written.length === 1) return written[0]!;
  const align = column.align === 'right' ? 'r' : column.align === 'center' ? 'c' : 'l';
  return `\\begin{tabular}[b]{@{}${align}@{}}${written.join('\\\\')}\\end{tabular}`;
}

const sum = (numbers: readonly number[]): number => numbers.reduce((a, b) => a + b, 0);

/** Takes room from the widest columns until all fit; null where none can give any more. */
function shrink(natural: readonly number[], room: number): readonly number[] | null {
  const widths = [...natural];
  for (;;) {
    const total = sum(widths);
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
