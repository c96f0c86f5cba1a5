/** From results to documents in one call. Each takes one result or those of several stages. */
import type { ResultObject } from '../study/outcome.ts';
import { compose } from './compose.ts';
import type { LatexOptions } from './printers/latex.ts';
import { printText } from './printers/text.ts';

type Results = ResultObject | readonly ResultObject[];

export type { LatexOptions };

/** For a terminal; ends without a line break. */
export function renderText(results: Results, options: { readonly width?: number } = {}): string {
  return printText(compose(results), options.width);
}

/** For pdflatex: a whole document, or a fragment to be included. */
export async function renderLatex(results: Results, options: LatexOptions = {}): Promise<string> {
  const { printLatex } = await import('./printers/latex.ts');
  return printLatex(compose(results), options);
}

/** One file for a browser, with no reference to anything outside of it. */
export async function renderHtml(results: Results): Promise<string> {
  const { printHtml } = await import('./printers/html.ts');
  return printHtml(compose(results));
}

/** Markdown with formulas between dollars, as GitHub shows it. */
export async function renderMarkdown(results: Results): Promise<string> {
  const { printMarkdown } = await import('./printers/markdown.ts');
  return printMarkdown(compose(results));
}

/** All pictures of the document, below each other; null where there is none. */
export async function renderSvg(results: Results): Promise<string | null> {
  const { drawFigure } = await import('./svg/figure.ts');
  const { sceneToSvg, stackScenes } = await import('./svg/scene-svg.ts');
  const figures = compose(results).sections.flatMap((section) =>
    section.blocks.flatMap((block) => (block.kind === 'figure' ? [block.figure] : [])),
  );
  if (figures.length === 0) return null;
  return sceneToSvg(stackScenes(await Promise.all(figures.map(drawFigure))), true);
}
