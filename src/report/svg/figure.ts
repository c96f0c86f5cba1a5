/** The pictures of a report: which one, with its data. */
import type { BifurcationFigure } from './bifurcation.ts';
import type { BlockFigure } from './blocks.ts';
import type { ChartFigure } from './chart.ts';
import type { EigenvalueFigure } from './eigenvalues.ts';
import type { IsotropyFigure } from './lattice.ts';
import type { Scene } from './scene.ts';

export type FigureData = IsotropyFigure | BlockFigure | EigenvalueFigure | BifurcationFigure | ChartFigure;

/** Draws a picture; the drawing code is loaded when it is first asked for. */
export async function drawFigure(figure: FigureData): Promise<Scene> {
  switch (figure.kind) {
    case 'lattice':
      return (await import('./lattice.ts')).drawLattice(figure);
    case 'blocks':
      return (await import('./blocks.ts')).drawBlocks(figure);
    case 'eigenvalues':
      return (await import('./eigenvalues.ts')).drawEigenvalues(figure);
    case 'bifurcation':
      return (await import('./bifurcation.ts')).drawBifurcation(figure);
    case 'chart':
      return (await import('./chart.ts')).drawChart(figure);
  }
}
