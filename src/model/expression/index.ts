/** Expressions: text, trees, exact values, Taylor expansions, fast floating values. */
export * from './ast.ts';
export * from './constants.ts';
export * from './exact-constants.ts';
export * from './expand.ts';
export * from './jet.ts';
export * from './nearest.ts';
export * from './numeric.ts';
export * from './parser.ts';
export * from './prime-powers.ts';
export type { Value } from './relation.ts';
export { isName, LENGTH_LIMIT, NESTING_LIMIT, type Where } from './scan.ts';
export { FieldTooSmall, located, Transcendental, withField } from './signals.ts';
export * from './taylor.ts';
export { tidy } from './tidy.ts';
export * from './writing.ts';
