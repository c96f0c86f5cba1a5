/** Reports: text, LaTeX, HTML, Markdown and pictures of results. Nothing is computed here. */
export * from './compose.ts';
export * from './document.ts';
export * from './references.ts';
export * from './render.ts';
export type { BifurcationBranch, BifurcationFigure, BranchStability } from './svg/bifurcation.ts';
export type { ChartFigure } from './svg/chart.ts';
export type { EigenvalueFigure, EigenvaluePath } from './svg/eigenvalues.ts';
export type { FigureData } from './svg/figure.ts';
export type { IsotropyFigure, LatticeNode } from './svg/lattice.ts';
export type { BirkhoffView, BranchView, CrossingView, IsotropyView, ReducedView, ReportView } from './view.ts';
