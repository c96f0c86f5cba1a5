/**
 * A document as one HTML file that refers to nothing outside of itself: formulas are MathML, pictures inline
 * SVG, and the one script, which sorts tables, is named by its hash in the content security policy of the page.
 */
import { createHash } from 'node:crypto';
import type { Block, Document, Headline, Inline, Line, Matrix, Section } from '../document.ts';
import { browserLatex, type Formula, latexOf, latexPieces } from '../mathematics/index.ts';
import { drawFigure } from '../svg/figure.ts';
import { escapeXml, sceneToSvg } from '../svg/scene-svg.ts';
import { SCRIPT, STYLE } from './html-assets.ts';
import { numbersOf, sourcesOf } from './lines.ts';

/** Formulas wider than this, in em, are set in pieces: a browser breaks lines between formulas, not within them. */
const PIECE = 26;

type Typesetter = (latex: string, display: boolean) => string;

/** MathML of a formula. LaTeX that the typesetter does not know is shown as it is. */
async function typesetter(): Promise<Typesetter> {
  const katex = (await import('katex')).default;
  const cache = new Map<string, string>();
  return (latex, display) => {
    const key = `${display ? 'd' : 'i'}${latex}`;
    let mathml = cache.get(key);
    if (mathml === undefined) {
      mathml = katex.renderToString(browserLatex(latex), {
        output: 'mathml',
        displayMode: display,
        throwOnError: false,
        strict: 'ignore',
        trust: false,
        maxExpand: 1000,
      });
      cache.set(key, mathml);
    }
    return mathml;
  };
}

/** The page. */
export async function printHtml(document: Document): Promise<string> {
  const writer = new Writer(numbersOf(document), await typesetter());
  const sections: string[] = [];
  for (const section of document.sections) sections.push(await writer.section(section));
  const sources = sourcesOf(document);
  if (sources.length > 0)
    sections.push(
      `<section id="references"><h2>References</h2><ol>${sources.map((source, i) => `<li id="source-${i + 1}">${escapeXml(source)}</li>`).join('')}</ol></section>`,
    );
  const contents = [
    ...document.sections.map((s) => [s.id, s.title] as const),
    ...(sources.length > 0 ? [['references', 'References'] as const] : []),
  ];
  const title = escapeXml(document.title);
  const hash = createHash('sha256').update(SCRIPT).digest('base64');
  return `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'; script-src 'sha256-${hash}'; img-src data:; base-uri 'none'; form-action 'none'">
<meta name="color-scheme" content="light dark">
<title>${title}</title>
<style>${STYLE}</style>
</head>
<body>
<a class="skip" href="#content">Skip to the report</a>
<header><h1>${title}</h1><p class="subtitle">${escapeXml(document.subtitle)}</p></header>
<nav aria-label="Contents"><h2>Contents</h2><ol>${contents.map(([id, name]) => `<li><a href="#${id}">${escapeXml(name)}</a></li>`).join('')}</ol></nav>
<main id="content">
${document.headline === null ? '' : writer.headline(document.headline)}
${document.caution === null ? '' : `<p class="caution" role="note">${escapeXml(document.caution)}</p>`}
${sections.join('\n')}
</main>
<script>${SCRIPT}</script>
</body>
</html>
`;
}

class Writer {
  private readonly numbers: ReadonlyMap<string, number>;
  private readonly math: Typesetter;

  constructor(numbers: ReadonlyMap<string, number>, math: Typesetter) {
    this.numbers = numbers;
    this.math = math;
  }

  headline(headline: Headline): string {
    const answer =
      headline.answer === '' ? '' : `<p class="answer"><strong>${escapeXml(headline.answer)}.</strong> ${escapeXml(headline.sentence)}</p>`;
    return `<div class="headline ${headline.tone}">${answer}${this.facts(headline.facts)}</div>`;
  }

  async section(section: Section): Promise<string> {
    const blocks: string[] = [];
    for (const block of section.blocks) blocks.push(await this.block(block));
    return `<section id="${section.id}"><h2>${escapeXml(section.title)}</h2>\n${blocks.join('\n')}\n</section>`;
  }

  private async block(block: Block): Promise<string> {
    switch (block.kind) {
      case 'paragraph':
        return `<p>${this.line(block.line)}</p>`;
      case 'note':
        return `<p class="note"><strong>${escapeXml(block.title)}.</strong> ${this.line(block.line)}</p>`;
      case 'facts':
        return this.facts(block.rows);
      case 'list':
        return `<ul>${block.items.map((item) => `<li>${this.line(item)}</li>`).join('')}</ul>`;
      case 'table':
        return this.table(block);
      case 'display':
        return this.display(block.formula);
      case 'matrices':
        return `<div class="matrices">${block.matrices.map((m) => `<div class="display" tabindex="0">${this.matrix(m)}</div>`).join('')}</div>`;
      case 'figure': {
        const scene = await drawFigure(block.figure);
        return `<figure>${await sceneToSvg(scene, false)}<figcaption>${escapeXml(block.caption)}</figcaption></figure>`;
      }
    }
  }

  private facts(rows: readonly { readonly name: string; readonly line: Line }[]): string {
    if (rows.length === 0) return '';
    return `<dl>${rows.map((row) => `<div><dt>${escapeXml(row.name)}</dt><dd>${this.line(row.line)}</dd></div>`).join('')}</dl>`;
  }

  private table(block: Extract<Block, { kind: 'table' }>): string {
    const sortable = block.rows.length > 1;
    const heads = block.columns.map((c) => {
      const words = this.line(c.head);
      return `<th scope="col" class="${c.align}">${sortable ? `<button type="button">${words}</button>` : words}</th>`;
    });
    const rows = block.rows.map(
      (row) =>
        `<tr>${row.map((cell, k) => `<td class="${block.columns[k]?.align ?? 'left'}" data-key="${escapeXml(keyOf(cell))}">${this.line(cell)}</td>`).join('')}</tr>`,
    );
    return `<div class="table" tabindex="0"><table${sortable ? ' class="sortable"' : ''}><caption>${escapeXml(block.caption)}</caption><thead><tr>${heads.join('')}</tr></thead><tbody>${rows.join('')}</tbody></table></div>`;
  }

  private display(formula: Formula): string {
    const pieces = latexPieces(formula, PIECE * 1.4);
    if (pieces.length === 1) return `<div class="display" tabindex="0">${this.math(pieces[0]!.latex, true)}</div>`;
    return `<div class="display long">${this.pieces(formula, PIECE)}</div>`;
  }

  private matrix({ name, rows }: Matrix): string {
    const body = rows.map((row) => row.map(latexOf).join(' & ')).join(' \\\\ ');
    return this.math(`${latexOf(name)} = \\begin{pmatrix} ${body} \\end{pmatrix}`, true);
  }

  private line(line: Line): string {
    return line.map((part) => this.inline(part)).join('');
  }

  private inline(part: Inline): string {
    if (typeof part === 'string') return escapeXml(part);
    switch (part.kind) {
      case 'formula':
        return this.pieces(part.formula, PIECE);
      case 'strong':
        return `<strong>${escapeXml(part.text)}</strong>`;
      case 'code':
        return `<code>${escapeXml(part.text)}</code>`;
      case 'cite': {
        const links = part.keys.flatMap((key) => this.numbers.get(key) ?? []).map((n) => `<a href="#source-${n}">${n}</a>`);
        return `<span class="cite">[${links.join(', ')}]</span>`;
      }
    }
  }

  private pieces(formula: Formula, limit: number): string {
    return latexPieces(formula, limit)
      .map((piece, i) => {
        // a sign at the beginning brings its own space
        const before = i === 0 ? '' : piece.gap && !piece.latex.startsWith('{}') ? ' ' : '<wbr>';
        return `${before}${piece.words === undefined ? this.math(piece.latex, false) : escapeXml(piece.words)}`;
      })
      .join('');
  }
}

/** What a cell is sorted by: its plain text. */
function keyOf(line: Line): string {
  return line
    .map((part) => (typeof part === 'string' ? part : part.kind === 'formula' ? part.formula.text : part.kind === 'cite' ? '' : part.text))
    .join('')
    .slice(0, 200);
}
