/** Monomials, sparse polynomials, rational functions, univariate polynomials, modular linear algebra. */
export * from './monomial.ts';
export * from './polynomial.ts';
export * from './writing.ts';
