/** Formulas: read from the language of model files, set in LaTeX whole or in pieces. */
export * from './formula.ts';
export { browserLatex, labelLatex, latexAlgebra, latexLabel, latexSymbol, latexText, symbolText } from './names.ts';
export type { Piece } from './pieces.ts';
