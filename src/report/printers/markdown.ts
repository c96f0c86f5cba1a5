/** A document in GitHub flavoured Markdown with formulas between dollars. */
import type { Block, Document, Inline, Line, Matrix } from '../document.ts';
import { browserLatex, type Formula, latexOf, latexPieces } from '../mathematics/index.ts';
import { numbersOf, sourcesOf } from './lines.ts';

/** Formulas wider than this, in em, are given in pieces so that lines can wrap. */
const PIECE = 60;

export function printMarkdown(document: Document): string {
  const numbers = numbersOf(document);
  const out: string[] = [`# ${escapeMarkdown(document.title)}`, `*${escapeMarkdown(document.subtitle)}*`];
  const line = (parts: Line, cell = false): string => parts.map((part) => inline(part, numbers, cell)).join('');
  const facts = (rows: readonly { readonly name: string; readonly line: Line }[]): string =>
    rows.map((row) => `- **${escapeMarkdown(row.name)}:** ${line(row.line)}`).join('\n');
  const block = (b: Block): string => {
    switch (b.kind) {
      case 'paragraph':
        return line(b.line);
      case 'facts':
        return facts(b.rows);
      case 'list':
        return b.items.map((item) => `- ${line(item)}`).join('\n');
      case 'table': {
        const rule = b.columns.map((c) => (c.align === 'right' ? '---:' : c.align === 'center' ? ':---:' : '---'));
        const rows = [b.columns.map((c) => line(c.head, true)), rule, ...b.rows.map((row) => row.map((cell) => line(cell, true)))];
        return `${escapeMarkdown(b.caption)}\n\n${rows.map((row) => `| ${row.join(' | ')} |`).join('\n')}`;
      }
      case 'display':
        return `\`\`\`math\n${displayLatex(b.formula)}\n\`\`\``;
      case 'matrices':
        return b.matrices.map(matrixBlock).join('\n\n');
      case 'figure':
        return '';
      case 'note':
        return `> **${escapeMarkdown(b.title)}.** ${line(b.line)}`;
    }
  };
  const headline = document.headline;
  if (headline !== null) {
    if (headline.answer !== '')
      out.push(`**${escapeMarkdown(headline.answer)}.**${headline.sentence === '' ? '' : ` ${escapeMarkdown(headline.sentence)}`}`);
    if (headline.facts.length > 0) out.push(facts(headline.facts));
  }
  if (document.caution !== null) out.push(`> ${escapeMarkdown(document.caution)}`);
  for (const section of document.sections) out.push(`## ${escapeMarkdown(section.title)}`, ...section.blocks.map(block));
  const sources = sourcesOf(document);
  if (sources.length > 0) out.push('## References', sources.map((source, i) => `${i + 1}. ${escapeMarkdown(source)}`).join('\n'));
  return `${out.filter((part) => part !== '').join('\n\n')}\n`;
}

function matrixBlock({ name, rows }: Matrix): string {
  const body = rows.map((row) => row.map(latexOf).join(' & ')).join(' \\\\\n');
  return `\`\`\`math\n${latexOf(name)} = \\begin{pmatrix}\n${body}\n\\end{pmatrix}\n\`\`\``;
}

function inline(part: Inline, numbers: ReadonlyMap<string, number>, cell: boolean): string {
  if (typeof part === 'string') return escapeMarkdown(part);
  switch (part.kind) {
    case 'formula':
      return latexPieces(part.formula, PIECE)
        .map(
          (piece, i) =>
            `${i > 0 && piece.gap ? ' ' : ''}${piece.words === undefined ? `$${inlineLatex(piece.latex, cell)}$` : escapeMarkdown(piece.words)}`,
        )
        .join('');
    case 'strong':
      return `**${escapeMarkdown(part.text)}**`;
    case 'code':
      return `\`${part.text.replaceAll('`', "'")}\``;
    case 'cite':
      return `\\[${part.keys.flatMap((key) => numbers.get(key) ?? []).join(', ')}\\]`;
  }
}

/** Markdown takes a backslash before punctuation away before mathematics is read: such commands are spelt out. */
function inlineLatex(latex: string, cell: boolean): string {
  const spelt = browserLatex(latex)
    .replaceAll('\\{', '\\lbrace ')
    .replaceAll('\\}', '\\rbrace ')
    .replaceAll('\\,', '\\thinspace ')
    .replaceAll('\\_', '\\text{\\textunderscore}')
    .replaceAll('<', '\\lt ')
    .replaceAll('>', '\\gt ');
  return cell ? spelt.replaceAll('|', '\\vert ') : spelt;
}

/** Broken into lines at the signs of the outermost sum where it is long. */
function displayLatex(formula: Formula): string {
  const pieces = latexPieces(formula, PIECE);
  if (pieces.length === 1) return pieces[0]!.latex;
  const [head, ...rest] = formula.tree.kind === 'relation' ? pieces : [{ latex: '' }, ...pieces];
  return `\\begin{aligned}\n${head!.latex} ${rest.map((piece, i) => `${i === 0 ? '&' : '&\\quad '}${piece.latex}`).join(' \\\\\n')}\n\\end{aligned}`;
}

/** Prose that shows as it is: no emphasis, links, HTML, formulas or headings of its own. */
export function escapeMarkdown(text: string): string {
  return text
    .replace(/[\r\n]+/g, ' ')
    .replace(/[\\`*_{}[\]()#$|~!]/g, (sign) => (/[(){}!#]/.test(sign) ? sign : `\\${sign}`))
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replace(/^(\s*)([-+]|#{1,6})(\s)/, '$1\\$2$3')
    .replace(/^(\s*\d+)\.(\s)/, '$1\\.$2');
}
