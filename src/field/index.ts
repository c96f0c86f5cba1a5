/** Exact arithmetic: rationals, real abelian fields, cyclotomic fields, prime fields. */
export * from './arithmetic.ts';
export * from './cyclotomic.ts';
export * from './field.ts';
export * from './number-field.ts';
export * from './prime.ts';
export * from './rational.ts';
export * from './real-field.ts';
export * from './reduction.ts';
export * from './square-free.ts';
