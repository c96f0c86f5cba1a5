/**
 * A document in LaTeX for pdflatex with the packages of a basic installation. Nothing runs over the margin:
 * long formulas are set piece by piece in ragged lines, tables are divided into pages and wide boxes are
 * measured by TeX itself and scaled where they are wider than the line.
 */
import type { Block, Column, Document, Inline, Line, Section } from '../document.ts';
import { emsOf, latexText } from '../mathematics/index.ts';
import { drawFigure } from '../svg/figure.ts';
import { sceneToLatex } from '../svg/scene-latex.ts';
import { displayFormula, FRAGMENT, inlineFormula, type Layout, matrixEntries, PAGE, printable, wholeMatrix } from './latex-formula.ts';
import { tableLatex } from './latex-table.ts';
import { numbersOf, sourcesOf } from './lines.ts';

export interface LatexOptions {
  /** No preamble; a comment says which packages are needed. */
  readonly fragment?: boolean;
  /** Pictures are drawn unless this is false. */
  readonly figures?: boolean;
}

/** Begins a new page where a heading would stand nearly alone at the end of one. */
const NEED = '\\par\\vskip0pt plus6\\baselineskip\\penalty-250\\vskip0pt plus-6\\baselineskip\n';
const PACKAGES = ['amsmath', 'amssymb', 'array', 'booktabs', 'graphicx', 'xcolor'] as const;
/** Sets its argument, scaled down where it is wider than the line or nearly as high as the page. */
const FIT = String.raw`\providecommand{\symcodimfit}[1]{\sbox0{#1}\ifdim\wd0>\linewidth\sbox0{\resizebox{\linewidth}{!}{\usebox0}}\fi\ifdim\ht0>.8\textheight\resizebox{!}{.8\textheight}{\usebox0}\else\usebox0\fi}`;
/** A line of a picture; the drawing operators of PDF, whichever engine writes it. */
const DRAW = String.raw`\providecommand{\symcodimdraw}[1]{\ifdefined\pdfliteral\pdfliteral{q #1 Q}\else\ifdefined\pdfextension\pdfextension literal{q #1 Q}\else\special{pdf:literal q #1 Q}\fi\fi}`;

/** The document in LaTeX. */
export async function printLatex(document: Document, options: LatexOptions = {}): Promise<string> {
  const printer = new Printer(numbersOf(document), options.figures !== false, options.fragment === true ? FRAGMENT : PAGE);
  const body: string[] = [];
  if (document.headline !== null) body.push(printer.headline(document));
  if (document.caution !== null) body.push(`\\noindent{\\small\\itshape ${latexText(document.caution)}\\par}`);
  for (const section of document.sections) body.push(await printer.section(section));
  const sources = sourcesOf(document);
  if (sources.length > 0)
    body.push(
      '\\section*{References}',
      '\\begin{list}{}{\\setlength{\\leftmargin}{2.2em}\\setlength{\\labelwidth}{1.8em}\\setlength{\\itemsep}{2pt}\\raggedright}',
      ...sources.map((source, i) => `\\item[{[${i + 1}]}] ${latexText(source)}`),
      '\\end{list}',
    );
  const content = body.join('\n\n');
  if (options.fragment === true)
    return [
      `% needs \\usepackage{${PACKAGES.join(',')}}`,
      FIT,
      DRAW,
      '{\\raggedright\\setlength{\\parindent}{0pt}\\setlength{\\parskip}{4pt}',
      content,
      '\\par}',
      '',
    ].join('\n');
  return [
    '\\documentclass[10pt,a4paper]{article}',
    '\\usepackage[margin=25mm]{geometry}',
    `\\usepackage{${PACKAGES.join(',')}}`,
    FIT,
    DRAW,
    '\\setlength{\\parindent}{0pt}',
    '\\setlength{\\parskip}{5pt plus 1pt}',
    '\\setcounter{secnumdepth}{0}',
    '\\raggedbottom',
    '\\begin{document}',
    '\\raggedright',
    `{\\LARGE\\bfseries ${latexText(document.title)}\\par}`,
    `\\smallskip{\\color{gray}\\small ${latexText(document.subtitle)}\\par}`,
    '\\medskip',
    content,
    '\\end{document}',
    '',
  ].join('\n');
}

class Printer {
  private readonly numbers: ReadonlyMap<string, number>;
  private readonly figures: boolean;
  private readonly layout: Layout;

  constructor(numbers: ReadonlyMap<string, number>, figures: boolean, layout: Layout) {
    this.numbers = numbers;
    this.figures = figures;
    this.layout = layout;
  }

  headline(document: Document): string {
    const { answer, sentence, facts } = document.headline!;
    const rows = facts.map((f) => `\\textbf{${latexText(f.name)}} & ${this.line(f.line)} \\\\`);
    const out: string[] = ['\\noindent\\rule{\\linewidth}{0.8pt}'];
    if (answer !== '') out.push(`{\\large\\textbf{${latexText(answer)}.}${sentence === '' ? '' : ` ${latexText(sentence)}`}\\par}`);
    if (rows.length > 0)
      out.push(
        '\\smallskip',
        '{\\small\\setlength{\\tabcolsep}{4pt}\\begin{tabular}{@{}>{\\raggedright\\arraybackslash}p{7.5em}>{\\raggedright\\arraybackslash}p{0.76\\linewidth}@{}}',
        ...rows,
        '\\end{tabular}\\par}',
      );
    out.push('\\noindent\\rule{\\linewidth}{0.8pt}');
    return out.join('\n');
  }

  async section(section: Section): Promise<string> {
    const blocks: string[] = [];
    for (const block of section.blocks) {
      const text = await this.block(block);
      if (text !== '') blocks.push(text);
    }
    return [`${NEED}\\section{${latexText(section.title)}}`, ...blocks].join('\n\n');
  }

  private async block(block: Block): Promise<string> {
    switch (block.kind) {
      case 'paragraph':
        return this.line(block.line);
      case 'note':
        return `{\\small\\textbf{${latexText(block.title)}.} ${this.line(block.line)}\\par}`;
      case 'facts':
        return this.facts(block.rows);
      case 'list':
        return [
          '\\begin{itemize}\\setlength{\\itemsep}{0pt}',
          ...block.items.map((item) => `\\item ${this.line(item)}`),
          '\\end{itemize}',
        ].join('\n');
      case 'table':
        return this.table(block.caption, block.columns, block.rows);
      case 'display':
        return displayFormula(block.formula, this.layout);
      case 'matrices': {
        const whole = block.matrices.filter((m) => printable(m, this.layout)).map(wholeMatrix);
        const listed = block.matrices.filter((m) => !printable(m, this.layout)).map((m) => matrixEntries(m, this.layout));
        return [...(whole.length === 0 ? [] : [`\\begin{center}\n${whole.join('\\qquad\n')}\n\\end{center}`]), ...listed].join('\n');
      }
      case 'figure': {
        if (!this.figures) return '';
        const scene = await drawFigure(block.figure);
        return `\\begin{center}\n\\symcodimfit{${sceneToLatex(scene)}}\\\\[2pt]\n{\\small ${latexText(block.caption)}}\n\\end{center}`;
      }
    }
  }

  private facts(rows: readonly { readonly name: string; readonly line: Line }[]): string {
    return [
      '\\begin{list}{}{\\setlength{\\leftmargin}{12.5em}\\setlength{\\labelwidth}{12em}\\setlength{\\labelsep}{0.5em}\\setlength{\\itemsep}{0pt}\\setlength{\\parsep}{1pt}\\setlength{\\topsep}{2pt}\\renewcommand{\\makelabel}[1]{\\normalfont#1\\hfil}\\raggedright}',
      ...rows.map(
        (row) =>
          `\\item[{\\parbox[t]{12em}{\\raggedright ${latexText(row.name)}}}] ${this.line(row.line, Math.min(18, this.layout.inlinePiece))}`,
      ),
      '\\end{list}',
    ].join('\n');
  }

  private table(caption: string, columns: readonly Column[], rows: readonly (readonly Line[])[]): string {
    return tableLatex({
      caption: latexText(caption),
      columns,
      rows,
      line: this.layout.line,
      lines: this.layout.lines,
      write: (line, limit) => this.line(line, limit),
      width: (line) => this.width(line),
    });
  }

  /** Estimated width of a line, in em. */
  private width(line: Line): number {
    return line.reduce(
      (total, part) =>
        total +
        (typeof part === 'string'
          ? part.length * 0.5
          : part.kind === 'formula'
            ? emsOf(part.formula)
            : part.kind === 'cite'
              ? part.keys.length * 1.4
              : part.text.length * 0.55),
      0,
    );
  }

  private line(line: Line, limit = this.layout.inlinePiece): string {
    return line.map((part) => this.inline(part, limit)).join('');
  }

  private inline(part: Inline, limit: number): string {
    if (typeof part === 'string') return latexText(part);
    switch (part.kind) {
      case 'formula':
        return inlineFormula(part.formula, limit);
      case 'strong':
        return `\\textbf{${latexText(part.text)}}`;
      case 'code':
        return `\\texttt{${latexText(part.text)}}`;
      case 'cite':
        return `[${part.keys.flatMap((key) => this.numbers.get(key) ?? []).join(', ')}]`;
    }
  }
}
