/** Formulas: read from the language of model files, set in LaTeX whole or in pieces. */
export * from './formula.ts';
export { labelLatex, latexAlgebra, latexLabel, latexSymbol, latexText } from './names.ts';
export type { Piece } from './pieces.ts';
