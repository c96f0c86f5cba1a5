/**
 * Matrices whose entries are texts of the model language: products, sums and Kronecker products that keep
 * 0, 1 and signs short, and the matrices of permutations.
 */

export type TextMatrix = readonly (readonly string[])[];

/** A permutation of 0 … d-1 with signs: the value at site i goes to site images[i], times signs[images[i]]. */
export interface SignedPermutation {
  readonly images: readonly number[];
  readonly signs: readonly number[];
}

export function negateText(a: string): string {
  if (a === '0') return a;
  if (/^-[\w./]+$/.test(a)) return a.slice(1);
  return /^[\w./]+$/.test(a) ? `-${a}` : `-(${a})`;
}

export function multiplyTexts(a: string, b: string): string {
  if (a === '0' || b === '0') return '0';
  if (a === '1') return b;
  if (b === '1') return a;
  if (a === '-1') return negateText(b);
  if (b === '-1') return negateText(a);
  return `(${a})*(${b})`;
}

const filled = (rows: number, columns: number, entry: (i: number, j: number) => string): string[][] =>
  Array.from({ length: rows }, (_, i) => Array.from({ length: columns }, (_, j) => entry(i, j)));

export const scalarTexts = (a: string, dimension: number): TextMatrix => filled(dimension, dimension, (i, j) => (i === j ? a : '0'));

/** Kronecker product: coordinates ordered by those of a, then of b. */
export function kroneckerTexts(a: TextMatrix, b: TextMatrix): TextMatrix {
  const m = b.length;
  return filled(a.length * m, a.length * m, (i, j) => multiplyTexts(a[Math.floor(i / m)]![Math.floor(j / m)]!, b[i % m]![j % m]!));
}

export function directSumTexts(a: TextMatrix, b: TextMatrix): TextMatrix {
  const n = a.length;
  return filled(n + b.length, n + b.length, (i, j) => (i < n && j < n ? a[i]![j]! : i >= n && j >= n ? b[i - n]![j - n]! : '0'));
}

export function permutationTexts({ images, signs }: SignedPermutation): TextMatrix {
  const rows = filled(images.length, images.length, () => '0');
  images.forEach((to, from) => {
    rows[to]![from] = signs[to] === 1 ? '1' : '-1';
  });
  return rows;
}

const gcdNumber = (a: number, b: number): number => (b === 0 ? Math.abs(a) : gcdNumber(b, a % b));

/** Text of (a + b sqrt(n))/c, c > 0, in lowest terms; an integer root of n is used as such. */
function surdText(a: number, b: number, c: number, n: number): string {
  const root = Math.round(Math.sqrt(n));
  if (root * root === n) [a, b] = [a + b * root, 0];
  const g = gcdNumber(gcdNumber(a, b), c);
  [a, b, c] = [a / g, b / g, c / g];
  const radical = `${Math.abs(b) === 1 ? '' : `${Math.abs(b)}*`}sqrt(${n})`;
  const top = b === 0 ? String(a) : a === 0 ? `${b < 0 ? '-' : ''}${radical}` : `${a}${b < 0 ? '-' : '+'}${radical}`;
  if (c === 1) return top;
  return a !== 0 && b !== 0 ? `(${top})/${c}` : `${top}/${c}`;
}

/**
 * A permutation p of n > 1 coordinates on the hyperplane of sum zero, in the orthonormal basis
 * u_k = e_k - a (e_1 + … + e_{n-1}) - e_n/r, k < n, with r = -sqrt(n) and a = 1/(r (r+1)): the images of e_1 … e_{n-1}
 * under the mirror that exchanges e_n and (1, …, 1)/r. All entries lie in Q(r), permutations that fix the
 * last coordinate keep their matrices, and n = 4 gives the symmetries of the tetrahedron with corner (1, 1, 1)
 * (the other sign of r would serve as well, with larger denominators).
 *
 * Modulo (1, …, 1) the image of u_k is e_p(k) + b e_p(n), b = a - 1/r = -1/(r+1); the product with u_i is, for
 * p(n) = m < n, delta_{i,p(k)} + b delta_{i,m} - 1/(r+1)^2 if p(k) < n, and b delta_{i,m} - (r+2)/(r+1)^2 if p(k) = n.
 */
export function sumZeroTexts(images: readonly number[]): TextMatrix {
  const n = images.length;
  const last = n - 1;
  const m = images[last]!;
  if (m === last) return filled(last, last, (i, k) => (images[k] === i ? '1' : '0'));
  // over (n-1)^2, with 1/(r+1) = (r-1)/(n-1); `radical` is the coefficient of r
  return filled(last, last, (i, k) => {
    const to = images[k]!;
    const rational = (to === last ? -2 : (i === to ? last * last : 0) - (n + 1)) + (i === m ? last : 0);
    const radical = (to === last ? 3 - n : 2) - (i === m ? last : 0);
    return surdText(rational, -radical, last * last, n);
  });
}
