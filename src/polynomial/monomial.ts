/**
 * Monomials as text: one UTF-16 unit per factor, the number of the variable, sorted. x0^2 x3 is
 * "\u0000\u0000\u0003". The degree is the length, a quadratic monomial in 360 variables takes two units,
 * and graded lexicographic order is: shorter first, then the order of the text. Variable numbers stay valid
 * when variables are appended to a ring.
 */

export type Monomial = string;

/** The empty product. */
export const UNIT: Monomial = '';

/** Most variables a ring may have (one UTF-16 unit each). */
export const VARIABLE_LIMIT = 65_535;

/** Graded lexicographic order, ascending degree; within a degree x0^2 < x0 x1 < x1^2. */
export function compareMonomials(a: Monomial, b: Monomial): number {
  return a.length - b.length || (a < b ? -1 : a > b ? 1 : 0);
}

/** Product of two monomials. */
export function multiplyMonomials(a: Monomial, b: Monomial): Monomial {
  if (a === '') return b;
  if (b === '') return a;
  if (a.charCodeAt(a.length - 1) <= b.charCodeAt(0)) return a + b;
  if (b.charCodeAt(b.length - 1) <= a.charCodeAt(0)) return b + a;
  let out = '';
  let i = 0;
  let j = 0;
  while (i < a.length && j < b.length) out += a.charCodeAt(i) <= b.charCodeAt(j) ? a[i++] : b[j++];
  return out + a.slice(i) + b.slice(j);
}

/** a/b, or undefined if b does not divide a. */
export function divideMonomials(a: Monomial, b: Monomial): Monomial | undefined {
  let out = '';
  let i = 0;
  for (let j = 0; j < b.length; j++) {
    const v = b.charCodeAt(j);
    const from = i;
    while (i < a.length && a.charCodeAt(i) < v) i++;
    if (i >= a.length || a.charCodeAt(i) !== v) return undefined;
    out += a.slice(from, i++);
  }
  return out + a.slice(i);
}

/** Greatest common divisor of two monomials. */
export function gcdMonomials(a: Monomial, b: Monomial): Monomial {
  let out = '';
  let i = 0;
  let j = 0;
  while (i < a.length && j < b.length) {
    const x = a.charCodeAt(i);
    const y = b.charCodeAt(j);
    if (x === y) {
      out += a[i++];
      j++;
    } else if (x < y) i++;
    else j++;
  }
  return out;
}

/** Exponent of variable v. */
export function exponentOf(m: Monomial, v: number): number {
  const c = String.fromCharCode(v);
  const first = m.indexOf(c);
  return first < 0 ? 0 : m.lastIndexOf(c) - first + 1;
}

/** Variables with their exponents, increasing. */
export function factorsOf(m: Monomial): Array<[variable: number, exponent: number]> {
  const out: Array<[number, number]> = [];
  for (let i = 0; i < m.length; ) {
    const v = m.charCodeAt(i);
    let j = i + 1;
    while (j < m.length && m.charCodeAt(j) === v) j++;
    out.push([v, j - i]);
    i = j;
  }
  return out;
}

/** Dense exponents over n variables. */
export function exponentsOf(m: Monomial, n: number): number[] {
  const out = new Array<number>(n).fill(0);
  for (let i = 0; i < m.length; i++) {
    const v = m.charCodeAt(i);
    out[v] = out[v]! + 1;
  }
  return out;
}

/** Monomial with dense exponents. Throws RangeError unless they are non-negative integers. */
export function monomialOf(exponents: readonly number[]): Monomial {
  let out = '';
  exponents.forEach((e, v) => {
    if (!Number.isInteger(e) || e < 0) throw new RangeError(`exponent ${e} of variable ${v} is not a non-negative integer`);
    if (e > 0) out += String.fromCharCode(v).repeat(e);
  });
  return out;
}

/** Monomial with the given (variable, exponent) pairs, in any order. */
export function monomialOfFactors(factors: Iterable<readonly [variable: number, exponent: number]>): Monomial {
  let out = '';
  for (const [v, e] of factors) out = multiplyMonomials(out, String.fromCharCode(v).repeat(e));
  return out;
}

/** All monomials of degree d in variables from, …, n-1, in order. */
export function monomialsOfDegree(n: number, d: number, from = 0): Monomial[] {
  let layer: Monomial[] = [''];
  for (let k = 0; k < d; k++) {
    const next: Monomial[] = [];
    for (const m of layer) for (let v = k === 0 ? from : m.charCodeAt(m.length - 1); v < n; v++) next.push(m + String.fromCharCode(v));
    layer = next;
  }
  return layer;
}
