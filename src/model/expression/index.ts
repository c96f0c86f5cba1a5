/** Expressions: text, trees, exact values, Taylor expansions, fast floating values. */
export * from './ast.ts';
export * from './nearest.ts';
export * from './parser.ts';
export { isName, LENGTH_LIMIT, NESTING_LIMIT, type Where } from './scan.ts';
export * from './writing.ts';
