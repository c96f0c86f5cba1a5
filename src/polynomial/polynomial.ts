/**
 * Sparse polynomials in several variables over any field. A polynomial is an immutable list of terms in
 * canonical order: ascending degree, within a degree lexicographic with the first variable first
 * (1, x, y, x^2, x y, y^2). The ring does the arithmetic; a polynomial holds no reference to it.
 */
import { ShapeError } from '../errors/index.ts';
import type { Field, OrderedField } from '../field/index.ts';
import { at, type Matrix } from '../linear/index.ts';
import {
  compareMonomials,
  exponentOf,
  exponentsOf,
  factorsOf,
  type Monomial,
  monomialOf,
  multiplyMonomials,
  UNIT,
  VARIABLE_LIMIT,
} from './monomial.ts';
import { multiplyTerms, sortedTerms, type TermList } from './product.ts';
import { substituteTerms } from './substitution.ts';
import { mergeTerms, sumTerms } from './sums.ts';
import { joinTerms, latexName, latexTerm, writeTerm } from './writing.ts';

/** Terms in canonical order without zero coefficients; made by a PolynomialRing only. */
export interface Polynomial<T> extends TermList<T> {
  readonly monomials: readonly Monomial[];
  readonly coefficients: readonly T[];
}

const EMPTY: Polynomial<never> = { monomials: [], coefficients: [] };

export class PolynomialRing<T> {
  readonly field: Field<T>;
  readonly variables: readonly string[];
  readonly zero: Polynomial<T> = EMPTY;
  readonly one: Polynomial<T>;
  readonly #index: ReadonlyMap<string, number>;

  /** Throws RangeError on repeated names or too many. */
  constructor(field: Field<T>, variables: readonly string[]) {
    if (variables.length > VARIABLE_LIMIT) throw new RangeError(`${variables.length} variables; the limit is ${VARIABLE_LIMIT}`);
    this.field = field;
    this.variables = variables;
    this.#index = new Map(variables.map((name, i) => [name, i]));
    if (this.#index.size !== variables.length) throw new RangeError('a variable name occurs twice');
    this.one = this.constant(field.one);
  }

  /** Number of the variable with this name, or -1. */
  indexOf(name: string): number {
    return this.#index.get(name) ?? -1;
  }
  constant(c: T): Polynomial<T> {
    return this.field.isZero(c) ? EMPTY : { monomials: [UNIT], coefficients: [c] };
  }
  integer(n: bigint | number): Polynomial<T> {
    return this.constant(this.field.fromInteger(n));
  }
  /** By number or by name. Throws RangeError if there is no such variable. */
  variable(which: number | string): Polynomial<T> {
    const i = typeof which === 'number' ? which : this.indexOf(which);
    if (!(i >= 0 && i < this.variables.length)) throw new RangeError(`no variable ${which} among ${this.variables.join(', ')}`);
    return { monomials: [String.fromCharCode(i)], coefficients: [this.field.one] };
  }
  /** c times a monomial. */
  term(m: Monomial, c: T): Polynomial<T> {
    return this.field.isZero(c) ? EMPTY : { monomials: [m], coefficients: [c] };
  }
  /** Terms in any order, repeats added; exponents dense (one per variable) or a monomial. */
  fromTerms(terms: Iterable<readonly [exponents: readonly number[] | Monomial, coefficient: T]>): Polynomial<T> {
    const sums = new Map<Monomial, T>();
    for (const [e, c] of terms) {
      const m = typeof e === 'string' ? e : monomialOf(e);
      const old = sums.get(m);
      sums.set(m, old === undefined ? c : this.field.add(old, c));
    }
    return sortedTerms(this.field, sums);
  }
  /** Pairs (monomial, coefficient) in canonical order. */
  *terms(p: Polynomial<T>): IterableIterator<[Monomial, T]> {
    for (let i = 0; i < p.monomials.length; i++) yield [p.monomials[i]!, p.coefficients[i]!];
  }
  /** Dense exponents of term i. */
  exponents(p: Polynomial<T>, i: number): number[] {
    return exponentsOf(p.monomials[i]!, this.variables.length);
  }

  add(a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> {
    return mergeTerms(this.field, a, b, false);
  }
  sub(a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> {
    return mergeTerms(this.field, a, b, true);
  }
  neg(a: Polynomial<T>): Polynomial<T> {
    return { monomials: a.monomials, coefficients: a.coefficients.map((c) => this.field.neg(c)) };
  }
  /** Sum of many, by one pass. */
  sum(list: Iterable<Polynomial<T>>): Polynomial<T> {
    return sumTerms(this.field, list);
  }
  mul(a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> {
    return multiplyTerms(this.field, a, b);
  }
  /** Product without the terms of degree above `limit`. */
  mulTruncated(a: Polynomial<T>, b: Polynomial<T>, limit: number): Polynomial<T> {
    return multiplyTerms(this.field, a, b, limit);
  }
  scale(a: Polynomial<T>, s: T): Polynomial<T> {
    return multiplyTerms(this.field, this.constant(s), a);
  }
  /** a^n for an integer n >= 0, without the terms of degree above `limit`. Throws RangeError otherwise. */
  power(a: Polynomial<T>, n: number, limit = Infinity): Polynomial<T> {
    if (!Number.isInteger(n) || n < 0) throw new RangeError(`exponent ${n} is not a non-negative integer`);
    let out = this.one;
    for (let base = a; n > 0; n = Math.floor(n / 2)) {
      if (n % 2 === 1) out = multiplyTerms(this.field, out, base, limit);
      if (n > 1) base = multiplyTerms(this.field, base, base, limit);
    }
    return out;
  }
  /** Partial derivative by variable i. */
  derivative(a: Polynomial<T>, i: number): Polynomial<T> {
    const c = String.fromCharCode(i);
    const terms: Array<[Monomial, T]> = [];
    for (let k = 0; k < a.monomials.length; k++) {
      const m = a.monomials[k]!;
      const first = m.indexOf(c);
      if (first < 0) continue;
      const e = m.lastIndexOf(c) - first + 1;
      const x = a.coefficients[k]!;
      terms.push([m.slice(0, first) + m.slice(first + 1), e === 1 ? x : this.field.mul(this.field.fromInteger(e), x)]);
    }
    return this.fromTerms(terms);
  }
  gradient(a: Polynomial<T>): Polynomial<T>[] {
    return this.variables.map((_, i) => this.derivative(a, i));
  }
  #between(a: Polynomial<T>, low: number, high: number): Polynomial<T> {
    let from = 0;
    while (from < a.monomials.length && a.monomials[from]!.length < low) from++;
    let to = a.monomials.length;
    while (to > from && a.monomials[to - 1]!.length > high) to--;
    if (from === 0 && to === a.monomials.length) return a;
    return { monomials: a.monomials.slice(from, to), coefficients: a.coefficients.slice(from, to) };
  }
  homogeneousPart(a: Polynomial<T>, d: number): Polynomial<T> {
    return this.#between(a, d, d);
  }
  /** The terms of degree at most d. */
  truncate(a: Polynomial<T>, d: number): Polynomial<T> {
    return this.#between(a, 0, d);
  }
  /** Total degree; -1 for zero. */
  degree(a: Polynomial<T>): number {
    return a.monomials.at(-1)?.length ?? -1;
  }
  /** Least degree of a term; Infinity for zero. */
  order(a: Polynomial<T>): number {
    return a.monomials[0]?.length ?? Infinity;
  }
  /** Highest exponent of variable i; -1 for zero. */
  degreeIn(a: Polynomial<T>, i: number): number {
    return a.monomials.reduce((d, m) => Math.max(d, exponentOf(m, i)), -1);
  }
  /** Numbers of the variables that occur, increasing. */
  support(a: Polynomial<T>): number[] {
    const used = new Set<number>();
    for (const m of a.monomials) for (const [v] of factorsOf(m)) used.add(v);
    return [...used].sort((x, y) => x - y);
  }
  isZero(a: Polynomial<T>): boolean {
    return a.monomials.length === 0;
  }
  isConstant(a: Polynomial<T>): boolean {
    return this.degree(a) <= 0;
  }
  constantTerm(a: Polynomial<T>): T {
    return a.monomials[0] === UNIT ? a.coefficients[0]! : this.field.zero;
  }
  equal(a: Polynomial<T>, b: Polynomial<T>): boolean {
    return (
      a === b ||
      (a.monomials.length === b.monomials.length &&
        a.monomials.every((m, i) => m === b.monomials[i] && this.field.equal(a.coefficients[i]!, b.coefficients[i]!)))
    );
  }
  /** Coefficient of a monomial given by dense exponents or as a monomial. */
  coefficient(a: Polynomial<T>, exponents: readonly number[] | Monomial): T {
    const m = typeof exponents === 'string' ? exponents : monomialOf(exponents);
    let lo = 0;
    let hi = a.monomials.length - 1;
    while (lo <= hi) {
      const mid = (lo + hi) >> 1;
      const order = compareMonomials(a.monomials[mid]!, m);
      if (order === 0) return a.coefficients[mid]!;
      if (order < 0) lo = mid + 1;
      else hi = mid - 1;
    }
    return this.field.zero;
  }
  /** Coefficients by powers of variable i, index = exponent; each is free of variable i. */
  coefficientsIn(a: Polynomial<T>, i: number): Polynomial<T>[] {
    const c = String.fromCharCode(i);
    const parts: Array<Array<[Monomial, T]>> = [];
    for (const [m, x] of this.terms(a)) {
      const first = m.indexOf(c);
      const e = first < 0 ? 0 : m.lastIndexOf(c) - first + 1;
      (parts[e] ??= []).push([first < 0 ? m : m.slice(0, first) + m.slice(first + e), x]);
    }
    return Array.from(parts, (part) => (part === undefined ? this.zero : this.fromTerms(part)));
  }

  /**
   * The polynomial with variable i replaced by images[i], terms of degree above `limit` left out.
   * `embed` maps the coefficients into the field of the target ring (the identity by default, for equal fields).
   * Horner's rule on the tree of monomials: one product for each distinct leading part.
   */
  substitute<U>(
    a: Polynomial<T>,
    images: readonly Polynomial<U>[],
    target: PolynomialRing<U>,
    embed: (c: T) => U = (c) => c as unknown as U,
    limit = Infinity,
  ): Polynomial<U> {
    if (images.length < this.variables.length) throw new ShapeError(`${images.length} images for ${this.variables.length} variables`);
    return substituteTerms(a, images, target, embed, limit);
  }
  /** x ↦ a(m x): variable i is replaced by the form of row i of m (square, one row per variable). */
  linearSubstitution(a: Polynomial<T>, m: Matrix<T>): Polynomial<T> {
    const n = this.variables.length;
    if (m.rows !== n || m.cols !== n) throw new ShapeError(`a ${m.rows} x ${m.cols} matrix acts on ${n} variables`);
    const images = Array.from({ length: n }, (_, i) => this.linearForm(Array.from({ length: n }, (_, j) => at(m, i, j))));
    return this.substitute(a, images, this);
  }
  /** The linear form with these coefficients. */
  linearForm(coefficients: readonly T[]): Polynomial<T> {
    return this.fromTerms(coefficients.map((c, i) => [String.fromCharCode(i), c] as const));
  }
  /** The value at a point. */
  evaluate(a: Polynomial<T>, point: readonly T[]): T {
    const f = this.field;
    const powers: T[][] = point.map((x) => [f.one, x]);
    let sum = f.zero;
    for (const [m, c] of this.terms(a)) {
      let t = c;
      for (const [v, e] of factorsOf(m)) {
        const list = powers[v]!;
        while (list.length <= e) list.push(f.mul(list.at(-1)!, point[v]!));
        t = f.mul(t, list[e]!);
      }
      sum = f.add(sum, t);
    }
    return sum;
  }
  /** Coefficients mapped into the field of another ring; variables keep their numbers. */
  map<U>(a: Polynomial<T>, g: (c: T) => U, target: PolynomialRing<U>): Polynomial<U> {
    const monomials: Monomial[] = [];
    const coefficients: U[] = [];
    a.monomials.forEach((m, i) => {
      const c = g(a.coefficients[i]!);
      if (target.field.isZero(c)) return;
      monomials.push(m);
      coefficients.push(c);
    });
    return { monomials, coefficients };
  }
  /** The same polynomial with variable i renumbered to places[i] (injective), e.g. inside a larger ring. */
  renumber(a: Polynomial<T>, places: readonly number[]): Polynomial<T> {
    return this.fromTerms(
      a.monomials.map((m, i) => {
        let image = UNIT;
        for (const [v, e] of factorsOf(m)) image = multiplyMonomials(image, String.fromCharCode(places[v]!).repeat(e));
        return [image, a.coefficients[i]!] as const;
      }),
    );
  }

  /** In the language of model files, e.g. `q1^2 - 3*q1*q2^2/2`. */
  format(a: Polynomial<T>): string {
    return joinTerms(
      a.monomials.map((m, i) => {
        const product = factorsOf(m).map(([v, e]) => (e === 1 ? this.variables[v]! : `${this.variables[v]}^${e}`));
        return writeTerm(this.field.format(a.coefficients[i]!), product.join('*'));
      }),
    );
  }
  /** In LaTeX, without dollars. */
  latex(a: Polynomial<T>): string {
    const f = this.field as Partial<OrderedField<T>> & Field<T>;
    const write = (c: T) => (f.latex === undefined ? f.format(c) : f.latex(c));
    return joinTerms(
      a.monomials.map((m, i) => {
        const product = factorsOf(m).map(([v, e]) => latexName(this.variables[v]!) + (e === 1 ? '' : `^{${e}}`));
        return latexTerm(write(a.coefficients[i]!), product.join(' '));
      }),
    );
  }
  /** Canonical text, for maps and sets. */
  key(a: Polynomial<T>): string {
    return a.monomials.map((m, i) => `${[...m].map((c) => c.charCodeAt(0)).join('.')}:${this.field.key(a.coefficients[i]!)}`).join(' ');
  }
}
