/** Reduced potentials at an event: splitting lemma, germs, isotropy, branches; Birkhoff normal forms. */
export * from './birkhoff.ts';
export * from './birkhoff-text.ts';
export * from './branches.ts';
export * from './confirm-branch.ts';
export * from './elliptic.ts';
export * from './gaussian-field.ts';
export * from './germ.ts';
export * from './isotropy.ts';
export * from './resonance.ts';
export * from './splitting.ts';
