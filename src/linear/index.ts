/** Matrices over a field and the routines on them. */
export * from './elimination.ts';
export * from './inertia.ts';
export * from './matrix.ts';
