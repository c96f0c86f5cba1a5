/**
 * Rational functions in named symbols over a field of numbers: the coefficients of a Hamiltonian whose parameters
 * stay symbols. Canonical: numerator and denominator coprime; the denominator's first term (of least degree)
 * makes it primitive with integer coordinates and positive there (over Q), or monic times such an integer.
 */
import { AbelianField, type Algebraic, type Field, gcd, type OrderedField, type Rational, rationals } from '../field/index.ts';
import { divideExactly } from './division.ts';
import { gcdPolynomials } from './gcd.ts';
import { type Polynomial, PolynomialRing } from './polynomial.ts';
import { isSum } from './writing.ts';

/** numerator/denominator, canonical; the denominator of a polynomial is 1. */
export interface RationalFunction<T> {
  readonly numerator: Polynomial<T>;
  readonly denominator: Polynomial<T>;
}

export class RationalFunctionField<T> implements Field<RationalFunction<T>> {
  readonly name: string;
  readonly characteristic: number;
  readonly exact: boolean;
  readonly ring: PolynomialRing<T>;
  readonly zero: RationalFunction<T>;
  readonly one: RationalFunction<T>;

  constructor(ring: PolynomialRing<T>) {
    this.ring = ring;
    this.name = ring.variables.length === 0 ? ring.field.name : `${ring.field.name}(${ring.variables.join(', ')})`;
    this.characteristic = ring.field.characteristic;
    this.exact = ring.field.exact;
    this.zero = { numerator: ring.zero, denominator: ring.one };
    this.one = { numerator: ring.one, denominator: ring.one };
  }

  /** The field with further symbols (known ones are skipped); elements of this field are elements of it as they are. */
  extend(names: readonly string[]): RationalFunctionField<T> {
    const fresh = names.filter((n) => this.ring.indexOf(n) < 0);
    if (fresh.length === 0) return this;
    return new RationalFunctionField(new PolynomialRing(this.ring.field, [...this.ring.variables, ...new Set(fresh)]));
  }
  get symbols(): readonly string[] {
    return this.ring.variables;
  }

  fromInteger(n: bigint | number): RationalFunction<T> {
    return this.fromPolynomial(this.ring.integer(n));
  }
  fromRational(n: bigint, d: bigint): RationalFunction<T> {
    return this.fromConstant(this.ring.field.fromRational(n, d));
  }
  fromConstant(c: T): RationalFunction<T> {
    return this.fromPolynomial(this.ring.constant(c));
  }
  fromPolynomial(p: Polynomial<T>): RationalFunction<T> {
    return { numerator: p, denominator: this.ring.one };
  }
  /** By number or name. Throws RangeError if there is none. */
  symbol(which: number | string): RationalFunction<T> {
    return this.fromPolynomial(this.ring.variable(which));
  }
  /** numerator/denominator brought to canonical form. Throws RangeError if the denominator is zero. */
  quotient(numerator: Polynomial<T>, denominator: Polynomial<T>): RationalFunction<T> {
    if (this.ring.isZero(denominator)) throw new RangeError('division by zero');
    return this.#reduce(numerator, denominator);
  }
  isPolynomial(a: RationalFunction<T>): boolean {
    return a.denominator.monomials.length === 1 && a.denominator.monomials[0] === '';
  }
  isConstant(a: RationalFunction<T>): boolean {
    return this.isPolynomial(a) && this.ring.isConstant(a.numerator);
  }
  /** The number, or undefined if a symbol occurs. */
  constantValue(a: RationalFunction<T>): T | undefined {
    return this.isConstant(a) ? this.ring.constantTerm(a.numerator) : undefined;
  }

  #reduce(n: Polynomial<T>, d: Polynomial<T>): RationalFunction<T> {
    const ring = this.ring;
    if (ring.isZero(n)) return this.zero;
    if (!ring.isConstant(d)) {
      const g = gcdPolynomials(ring, n, d);
      if (ring.degree(g) > 0) {
        n = divideExactly(ring, n, g)!;
        d = divideExactly(ring, d, g)!;
      }
    }
    return this.#normalise(n, d);
  }
  #normalise(n: Polynomial<T>, d: Polynomial<T>): RationalFunction<T> {
    const { ring } = this;
    const f = ring.field;
    const first = d.coefficients[0]!;
    const factor = ring.isConstant(d)
      ? f.inv(first)
      : f.mul(
          f.inv(first),
          primitiveFactor(
            f,
            d.coefficients.map((c) => f.div(c, first)),
          ),
        );
    if (f.equal(factor, f.one)) return { numerator: n, denominator: d };
    return { numerator: ring.scale(n, factor), denominator: ring.scale(d, factor) };
  }

  add(a: RationalFunction<T>, b: RationalFunction<T>): RationalFunction<T> {
    return this.#combine(a, b, false);
  }
  sub(a: RationalFunction<T>, b: RationalFunction<T>): RationalFunction<T> {
    return this.#combine(a, b, true);
  }
  #combine(a: RationalFunction<T>, b: RationalFunction<T>, subtract: boolean): RationalFunction<T> {
    const ring = this.ring;
    const join = (x: Polynomial<T>, y: Polynomial<T>) => (subtract ? ring.sub(x, y) : ring.add(x, y));
    if (ring.isZero(b.numerator)) return a;
    if (this.isPolynomial(a) && this.isPolynomial(b)) return this.fromPolynomial(join(a.numerator, b.numerator));
    if (ring.equal(a.denominator, b.denominator)) return this.#reduce(join(a.numerator, b.numerator), a.denominator);
    if (this.isPolynomial(a)) return this.#normalise(join(ring.mul(a.numerator, b.denominator), b.numerator), b.denominator);
    if (this.isPolynomial(b)) return this.#normalise(join(a.numerator, ring.mul(b.numerator, a.denominator)), a.denominator);
    const g = gcdPolynomials(ring, a.denominator, b.denominator);
    const da = divideExactly(ring, a.denominator, g)!;
    const db = divideExactly(ring, b.denominator, g)!;
    const numerator = join(ring.mul(a.numerator, db), ring.mul(b.numerator, da));
    if (ring.isZero(numerator)) return this.zero;
    // what still cancels divides g (Henrici 1956; Knuth, TAOCP 2, 4.5.1, for fractions)
    const h = ring.isConstant(g) ? ring.one : gcdPolynomials(ring, numerator, g);
    const trivial = ring.isConstant(h);
    const n = trivial ? numerator : divideExactly(ring, numerator, h)!;
    const d = ring.mul(ring.mul(da, db), trivial ? g : divideExactly(ring, g, h)!);
    return this.#normalise(n, d);
  }
  neg(a: RationalFunction<T>): RationalFunction<T> {
    return { numerator: this.ring.neg(a.numerator), denominator: a.denominator };
  }
  mul(a: RationalFunction<T>, b: RationalFunction<T>): RationalFunction<T> {
    const ring = this.ring;
    if (ring.isZero(a.numerator) || ring.isZero(b.numerator)) return this.zero;
    const pa = this.isPolynomial(a);
    const pb = this.isPolynomial(b);
    if (pa && pb) return this.fromPolynomial(ring.mul(a.numerator, b.numerator));
    const [na, db] = pb ? [a.numerator, b.denominator] : this.#cancel(a.numerator, b.denominator);
    const [nb, da] = pa ? [b.numerator, a.denominator] : this.#cancel(b.numerator, a.denominator);
    return this.#normalise(ring.mul(na, nb), ring.mul(da, db));
  }
  #cancel(n: Polynomial<T>, d: Polynomial<T>): [Polynomial<T>, Polynomial<T>] {
    const ring = this.ring;
    if (ring.isConstant(n) || ring.isConstant(d)) return [n, d];
    const g = gcdPolynomials(ring, n, d);
    return ring.degree(g) <= 0 ? [n, d] : [divideExactly(ring, n, g)!, divideExactly(ring, d, g)!];
  }
  inv(a: RationalFunction<T>): RationalFunction<T> {
    if (this.isZero(a)) throw new RangeError('division by zero');
    return this.#normalise(a.denominator, a.numerator);
  }
  div(a: RationalFunction<T>, b: RationalFunction<T>): RationalFunction<T> {
    return this.mul(a, this.inv(b));
  }
  isZero(a: RationalFunction<T>): boolean {
    return this.ring.isZero(a.numerator);
  }
  equal(a: RationalFunction<T>, b: RationalFunction<T>): boolean {
    return this.ring.equal(a.numerator, b.numerator) && this.ring.equal(a.denominator, b.denominator);
  }
  conj(a: RationalFunction<T>): RationalFunction<T> {
    const bar = (p: Polynomial<T>) => this.ring.map(p, (c) => this.ring.field.conj(c), this.ring);
    return this.#normalise(bar(a.numerator), bar(a.denominator));
  }

  derivative(a: RationalFunction<T>, which: number | string): RationalFunction<T> {
    const ring = this.ring;
    const i = typeof which === 'number' ? which : ring.indexOf(which);
    if (i < 0) return this.zero;
    const dn = ring.derivative(a.numerator, i);
    if (this.isPolynomial(a)) return this.fromPolynomial(dn);
    const dd = ring.derivative(a.denominator, i);
    const n = ring.sub(ring.mul(dn, a.denominator), ring.mul(a.numerator, dd));
    return this.#reduce(n, ring.mul(a.denominator, a.denominator));
  }
  /**
   * Symbols replaced by elements of any field; symbols that are not in the map must be embeddable through `rest`.
   * Throws RangeError if the denominator vanishes there or a symbol has no value.
   */
  substituteInto<U>(a: RationalFunction<T>, target: Field<U>, value: (symbol: string) => U, embed: (c: T) => U): U {
    const values: Array<U | undefined> = [];
    const evaluate = (p: Polynomial<T>): U => {
      let sum = target.zero;
      for (const [m, c] of this.ring.terms(p)) {
        let t = embed(c);
        for (let i = 0; i < m.length; i++) {
          const v = m.charCodeAt(i);
          t = target.mul(t, (values[v] ??= value(this.ring.variables[v]!)));
        }
        sum = target.add(sum, t);
      }
      return sum;
    };
    const n = evaluate(a.numerator);
    return this.isPolynomial(a) ? n : target.div(n, evaluate(a.denominator));
  }
  /** Symbols replaced by numbers or by elements of this field; the others stay. Throws RangeError if the denominator vanishes. */
  substitute(a: RationalFunction<T>, values: ReadonlyMap<string, RationalFunction<T>>): RationalFunction<T> {
    return this.substituteInto(
      a,
      this,
      (s) => values.get(s) ?? this.symbol(s),
      (c) => this.fromConstant(c),
    );
  }
  /** The value in floating point; the field of coefficients must be ordered. Throws RangeError if a symbol has no value. */
  evaluateNumber(a: RationalFunction<T>, values: ReadonlyMap<string, number>): number {
    const f = this.ring.field as OrderedField<T>;
    const evaluate = (p: Polynomial<T>): number => {
      let sum = 0;
      for (const [m, c] of this.ring.terms(p)) {
        let t = f.toNumber(c);
        for (let i = 0; i < m.length; i++) {
          const name = this.ring.variables[m.charCodeAt(i)]!;
          const x = values.get(name);
          if (x === undefined) throw new RangeError(`no value for ${name}`);
          t *= x;
        }
        sum += t;
      }
      return sum;
    };
    return evaluate(a.numerator) / evaluate(a.denominator);
  }

  format(a: RationalFunction<T>): string {
    const n = this.ring.format(a.numerator);
    if (this.isPolynomial(a)) return n;
    const d = this.ring.format(a.denominator);
    return `${isSum(n) ? `(${n})` : n}/${/^[A-Za-z0-9_^]+$/.test(d) ? d : `(${d})`}`;
  }
  latex(a: RationalFunction<T>): string {
    if (this.isPolynomial(a)) return this.ring.latex(a.numerator);
    const minus = a.numerator.monomials.length === 1 && this.ring.latex(a.numerator).startsWith('-');
    const n = minus ? this.ring.neg(a.numerator) : a.numerator;
    return `${minus ? '-' : ''}\\frac{${this.ring.latex(n)}}{${this.ring.latex(a.denominator)}}`;
  }
  key(a: RationalFunction<T>): string {
    const n = this.ring.key(a.numerator);
    return this.isPolynomial(a) ? n : `${n} / ${this.ring.key(a.denominator)}`;
  }
}

/** The positive rational that makes a list of coordinates integral and primitive (1 where the field is not a number field). */
function primitiveFactor<T>(f: Field<T>, list: readonly T[]): T {
  let coordinates: (x: T) => { c: readonly bigint[]; d: bigint };
  if ((f as unknown) === rationals) coordinates = (x) => ({ c: [(x as unknown as Rational).n], d: (x as unknown as Rational).d });
  else if (f instanceof AbelianField) coordinates = (x) => x as unknown as Algebraic;
  else return f.one;
  let d = 1n;
  for (const x of list) {
    const e = coordinates(x).d;
    d *= e / gcd(d, e);
  }
  let g = 0n;
  for (const x of list) for (const c of coordinates(x).c) g = gcd(g, c * (d / coordinates(x).d));
  return f.fromRational(d, g === 0n ? 1n : g);
}
