/** Formulas and matrices in LaTeX, so that none of them runs over the margin. */
import type { Matrix } from '../document.ts';
import { emsOf, type Formula, latexOf, latexPieces, relation } from '../mathematics/index.ts';

/** Room in em of the text font. */
export interface Layout {
  readonly line: number;
  /** Lines of a table on one page. */
  readonly lines: number;
  /** Wider formulas are not centred on a line of their own but set in ragged lines. */
  readonly display: number;
  /** No unbreakable piece is wider than this, within a line of text and in a display. */
  readonly inlinePiece: number;
  readonly displayPiece: number;
}

/** The page of the standalone document: 160 mm at 10 points. */
export const PAGE: Layout = { line: 45, lines: 36, display: 42, inlinePiece: 22, displayPiece: 28 };
/** The lines of the standard classes at 10 to 12 points, where a fragment is to fit. */
export const FRAGMENT: Layout = { line: 32.5, lines: 24, display: 30, inlinePiece: 16, displayPiece: 20 };
/** Matrices with more rows than this are given by their entries. */
const MATRIX_ROWS = 26;

/** Pieces in a line; TeX may break between any two of them and nowhere else needs to. */
export function inlineFormula(formula: Formula, limit: number): string {
  return latexPieces(formula, limit)
    .map((piece, i) => `${i === 0 ? '' : piece.gap ? ' ' : '\\allowbreak{}'}$${leading(piece.latex)}$`)
    .join('');
}

/** A sign that begins a line or follows a word space needs no further space before it, but the usual one behind it. */
const leading = (latex: string): string => latex.replace(/^\{\}([-+])/, '{$1}\\:').replace(/^\{\}= /, '{=}\\;');

/** Centred where it fits on a line; else in ragged lines that hang under its relation. */
export function displayFormula(formula: Formula, layout: Layout): string {
  if (emsOf(formula) <= layout.display) return `\\[ ${latexOf(formula)} \\]`;
  const tree = formula.tree;
  if (tree.kind !== 'relation')
    return `\\begin{quote}\\raggedright\\lineskiplimit=2pt\\lineskip=4pt ${inlineFormula(formula, layout.displayPiece)}\\end{quote}`;
  const left: Formula = { text: '', tree: tree.left };
  const right: Formula = { text: '', tree: tree.right };
  if (emsOf(left) > 8)
    return `\\begin{quote}\\raggedright\\lineskiplimit=2pt\\lineskip=4pt ${inlineFormula(formula, layout.displayPiece)}\\end{quote}`;
  const head = `$${latexOf(left)} ={}$`;
  return `{\\par\\addvspace{4pt}\\lineskiplimit=2pt\\lineskip=4pt\\sbox0{${head}}\\noindent\\hangindent=\\wd0\\hangafter=1\\raggedright ${head}${inlineFormula(right, layout.displayPiece)}\\par\\addvspace{4pt}}`;
}

/** True if a matrix fits, or nearly so: it is scaled a little then. */
export function printable({ name, rows }: Matrix, layout: Layout): boolean {
  const widths = (rows[0] ?? []).map((_, k) => Math.max(...rows.map((row) => emsOf(row[k]!))));
  const total = widths.reduce((a, b) => a + b + 1, 0) + emsOf(name) + 2;
  return total <= layout.line * 1.5 && rows.length <= MATRIX_ROWS;
}

export function wholeMatrix({ name, rows }: Matrix): string {
  const body = rows.map((row) => row.map(latexOf).join(' & ')).join(' \\\\ ');
  return `\\symcodimfit{$\\displaystyle ${latexOf(name)} = \\left(\\begin{array}{${'c'.repeat(rows[0]?.length ?? 0)}} ${body} \\end{array}\\right)$}`;
}

/** A matrix that is too wide or too high, by its entries. */
export function matrixEntries({ name, rows }: Matrix, layout: Layout): string {
  const columns = rows[0]?.length ?? 0;
  const entries = rows.flatMap((row, i) =>
    row.flatMap((entry, k) =>
      entry.text === '0'
        ? []
        : [
            inlineFormula(
              relation({ text: '', tree: { kind: 'sign', latex: `(${i + 1},${k + 1})`, ems: 2.5 } }, '->', entry),
              layout.inlinePiece,
            ),
          ],
    ),
  );
  const zero = entries.length === 0 ? 'all vanish' : entries.join('; ');
  return `\\begin{quote}\\raggedright $${latexOf(name)}$, ${rows.length} by ${columns}, entries different from zero: ${zero}.\\end{quote}`;
}
