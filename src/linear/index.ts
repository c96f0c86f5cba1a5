/** Matrices over a field and the routines on them. */

export * from './elimination.ts';
export * from './floating.ts';
export * from './inertia.ts';
export * from './matrix.ts';
export * from './modular.ts';
export * from './sparse.ts';
export * from './symmetric.ts';
