/** Monomials, sparse polynomials, rational functions, univariate polynomials, modular linear algebra. */
export * from './division.ts';
export * from './gcd.ts';
export * from './modular.ts';
export * from './monomial.ts';
export * from './polynomial.ts';
export * from './rational-function.ts';
export * from './univariate.ts';
export * from './writing.ts';
