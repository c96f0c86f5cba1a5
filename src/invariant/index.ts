/** Rings of invariants of finite groups: Molien series, generators, equivariants, relations, rewriting. */
export * from './degrees.ts';
export * from './dimensions.ts';
export * from './equivariants.ts';
export * from './generator.ts';
export * from './generators.ts';
export * from './letters.ts';
export * from './linear-action.ts';
export * from './molien.ts';
export type { Parameter } from './parameter-plan.ts';
export * from './parameters.ts';
export * from './primitive.ts';
export { type ComplexCoordinate, complexCoordinates, describeElement } from './readable.ts';
export * from './relations.ts';
export * from './rewrite.ts';
export * from './reynolds.ts';
