/** Monomials, sparse polynomials, rational functions, univariate polynomials, rational reconstruction. */
export * from './division.ts';
export * from './gcd.ts';
export * from './monomial.ts';
export * from './polynomial.ts';
export * from './rational-function.ts';
export * from './reconstruction.ts';
export * from './univariate.ts';
export * from './writing.ts';
