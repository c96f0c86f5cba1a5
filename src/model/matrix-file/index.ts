/** Matrices from files, as texts: Matrix Market, CSV, JSON. */
export * from './matrix-file.ts';
export * from './matrix-market.ts';
export * from './matrix-text.ts';
export * from './table.ts';
