/** Finite groups as permutations: the catalogue, closure, classes, characters, real irreducibles, subgroups. */
export * from './catalogue.ts';
export * from './characters.ts';
export * from './closure.ts';
export * from './decompose.ts';
export * from './generate.ts';
export * from './group.ts';
export * from './powers.ts';
export * from './real-irreducibles.ts';
export * from './sign-class.ts';
export * from './subgroups.ts';
