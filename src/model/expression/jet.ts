/**
 * Jets: Taylor expansions truncated at a total degree. The value at the point is kept apart from the polynomial
 * of the higher terms, since it may be a number (log 2) that the coefficients never need.
 *
 * Functions of a jet c + r use the addition theorems, so that only f(c) is needed, and for the nilpotent part r
 * recurrences by degree from the Euler operator E = Σ x_i ∂_i, which multiplies the part of degree k by k:
 * y = exp r has E y = y E r, y = (1+r)^a has (1+r) E y = a y E r, and so on (Griewank and Walther, Evaluating
 * Derivatives, 2008, ch. 13, for one variable; Knuth, TAOCP 2, 4.7, for powers).
 */
import type { Polynomial, PolynomialRing } from '../../polynomial/index.ts';
import type { FunctionName } from './ast.ts';
import type { Constants } from './constants.ts';
import { outside } from './signals.ts';

/** value + rest; `rest` has no constant term and no term above the degree of the algebra. */
export interface Jet<V, C> {
  readonly value: V;
  readonly rest: Polynomial<C>;
}

/** Integer powers up to this one are products; above, the recurrence is quicker. */
const PRODUCT_POWER = 12n;

export class JetAlgebra<V, C> {
  readonly constants: Constants<V>;
  readonly ring: PolynomialRing<C>;
  readonly degree: number;
  readonly #embed: (v: V) => C;

  /** `embed` takes a constant into the coefficients; it may throw a signal if it has no place there. */
  constructor(constants: Constants<V>, ring: PolynomialRing<C>, degree: number, embed: (v: V) => C) {
    this.constants = constants;
    this.ring = ring;
    this.degree = degree;
    this.#embed = embed;
  }

  constant(value: V): Jet<V, C> {
    return { value, rest: this.ring.zero };
  }
  isConstant(a: Jet<V, C>): boolean {
    return this.ring.isZero(a.rest);
  }
  /** value + the variable with this number. */
  variable(i: number, value: V): Jet<V, C> {
    return { value, rest: this.degree < 1 ? this.ring.zero : this.ring.variable(i) };
  }
  sum(list: readonly Jet<V, C>[]): Jet<V, C> {
    const f = this.constants.field;
    let value = f.zero;
    for (const a of list) if (!f.isZero(a.value)) value = f.add(value, a.value);
    const rests = list.filter((a) => !this.ring.isZero(a.rest)).map((a) => a.rest);
    return { value, rest: rests.length === 0 ? this.ring.zero : rests.length === 1 ? rests[0]! : this.ring.sum(rests) };
  }
  neg(a: Jet<V, C>): Jet<V, C> {
    return { value: this.constants.field.neg(a.value), rest: this.ring.neg(a.rest) };
  }
  #scaled(r: Polynomial<C>, v: V): Polynomial<C> {
    const f = this.constants.field;
    if (this.ring.isZero(r) || f.isZero(v)) return this.ring.zero;
    return f.equal(v, f.one) ? r : this.ring.scale(r, this.#embed(v));
  }
  mul(a: Jet<V, C>, b: Jet<V, C>): Jet<V, C> {
    const f = this.constants.field;
    const value = f.isZero(a.value) || f.isZero(b.value) ? f.zero : this.constants.simplify(f.mul(a.value, b.value));
    if (this.isConstant(a)) return { value, rest: this.#scaled(b.rest, a.value) };
    if (this.isConstant(b)) return { value, rest: this.#scaled(a.rest, b.value) };
    let rest = this.ring.mulTruncated(a.rest, b.rest, this.degree);
    if (!f.isZero(b.value)) rest = this.ring.add(rest, this.#scaled(a.rest, b.value));
    if (!f.isZero(a.value)) rest = this.ring.add(rest, this.#scaled(b.rest, a.value));
    return { value, rest };
  }
  /** Product of many; the constants among them are multiplied first. */
  product(list: readonly Jet<V, C>[]): Jet<V, C> {
    let constant = this.constant(this.constants.field.one);
    let out: Jet<V, C> | undefined;
    for (const a of list)
      if (this.isConstant(a)) constant = this.mul(constant, a);
      else out = out === undefined ? a : this.mul(out, a);
    return out === undefined ? constant : this.mul(constant, out);
  }
  /** a/b. Throws InputError if b vanishes at the point; `text` is for the message. */
  div(a: Jet<V, C>, b: Jet<V, C>, text: () => string): Jet<V, C> {
    const f = this.constants.field;
    if (f.isZero(b.value)) throw outside('division by zero at the point', text());
    const inverse = this.constants.simplify(f.inv(b.value));
    if (this.isConstant(b)) return this.mul(a, this.constant(inverse));
    return this.mul(a, this.#binomial(b, this.#embed(f.neg(f.one)), inverse));
  }

  /** The parts of degree 0, …, D of a polynomial. */
  #parts(p: Polynomial<C>): Polynomial<C>[] {
    return Array.from({ length: this.degree + 1 }, (_, k) => this.ring.homogeneousPart(p, k));
  }
  #joined(parts: readonly Polynomial<C>[]): Polynomial<C> {
    return this.ring.sum(parts);
  }
  #ratio(n: number, d: number): C {
    return this.ring.field.fromRational(BigInt(n), BigInt(d));
  }
  /** Σ weight(j) x_j y_{k-j} over the j from 1 to k with both parts nonzero. */
  #convolution(x: readonly Polynomial<C>[], y: readonly Polynomial<C>[], k: number, weight: (j: number) => C): Polynomial<C> {
    const terms: Polynomial<C>[] = [];
    for (let j = 1; j <= k; j++) {
      const b = y[k - j]!;
      if (this.ring.isZero(x[j]!) || this.ring.isZero(b)) continue;
      terms.push(this.ring.scale(this.ring.mul(x[j]!, b), weight(j)));
    }
    return terms.length === 1 ? terms[0]! : this.ring.sum(terms);
  }

  /** value^a (1 + r/value)^a as a jet of value `power`: the value of a is in the coefficients. */
  #binomial(b: Jet<V, C>, a: C, power: V): Jet<V, C> {
    const f = this.ring.field;
    const s = this.#parts(this.#scaled(b.rest, this.constants.simplify(this.constants.field.inv(b.value))));
    const y: Polynomial<C>[] = [this.ring.one];
    // k y_k = Σ_j (a j - (k - j)) s_j y_{k-j}
    for (let k = 1; k <= this.degree; k++)
      y.push(this.#convolution(s, y, k, (j) => f.mul(f.sub(f.mul(a, f.fromInteger(j)), f.fromInteger(k - j)), this.#ratio(1, k))));
    return { value: power, rest: this.#scaled(this.#joined(y.slice(1)), power) };
  }
  /** exp r, parts by degree. */
  #exp(r: Polynomial<C>): Polynomial<C>[] {
    const s = this.#parts(r);
    const y: Polynomial<C>[] = [this.ring.one];
    for (let k = 1; k <= this.degree; k++) y.push(this.#convolution(s, y, k, (j) => this.#ratio(j, k)));
    return y;
  }
  /** log(1 + s) without its zero constant term. */
  #log(r: Polynomial<C>): Polynomial<C> {
    const s = this.#parts(r);
    const y: Polynomial<C>[] = [this.ring.zero];
    // k y_k = k s_k - Σ_{j<k} (k - j) s_j y_{k-j}
    for (let k = 1; k <= this.degree; k++)
      y.push(
        this.ring.add(
          s[k]!,
          this.#convolution(s, y, k, (j) => this.#ratio(j - k, k)),
        ),
      );
    return this.#joined(y);
  }
  /** sin r and cos r for sign = -1, sinh r and cosh r for sign = 1. */
  #turn(r: Polynomial<C>, sign: 1 | -1): { odd: Polynomial<C>; even: Polynomial<C> } {
    const s = this.#parts(r);
    const odd: Polynomial<C>[] = [this.ring.zero];
    const even: Polynomial<C>[] = [this.ring.one];
    for (let k = 1; k <= this.degree; k++) {
      odd.push(this.#convolution(s, even, k, (j) => this.#ratio(j, k)));
      even.push(this.#convolution(s, odd, k, (j) => this.#ratio(sign * j, k)));
    }
    return { odd: this.#joined(odd), even: this.#joined(even.slice(1)) };
  }

  /** base^exponent. Throws InputError where it is not smooth. */
  power(base: Jet<V, C>, exponent: Jet<V, C>, text: () => string): Jet<V, C> {
    const { constants } = this;
    const f = constants.field;
    if (!this.isConstant(exponent)) {
      if (f.isZero(base.value)) throw outside('a power of zero with a variable exponent', text());
      const w = this.mul(exponent, this.call('log', base, text));
      const value = constants.generalPower(base.value, exponent.value);
      return { value, rest: this.#scaled(this.#joined(this.#exp(w.rest).slice(1)), value) };
    }
    const r = constants.rational(exponent.value);
    if (this.isConstant(base)) {
      if (r === undefined) return this.constant(constants.generalPower(base.value, exponent.value));
      if (f.isZero(base.value) && r.n < 0n) throw outside('division by zero', text());
      return this.constant(constants.power(base.value, r));
    }
    if (r !== undefined && r.d === 1n && r.n >= 0n && (r.n <= PRODUCT_POWER || f.isZero(base.value))) {
      if (f.isZero(base.value)) {
        const rest = r.n > BigInt(this.degree) ? this.ring.zero : this.ring.power(base.rest, Number(r.n), this.degree);
        return r.n === 0n ? this.constant(f.one) : { value: f.zero, rest };
      }
      let out = this.constant(f.one);
      let square = base;
      for (let n = r.n; n > 0n; n >>= 1n) {
        if (n & 1n) out = this.mul(out, square);
        if (n > 1n) square = this.mul(square, square);
      }
      return out;
    }
    if (f.isZero(base.value))
      throw outside(r !== undefined && r.n < 0n ? 'division by zero at the point' : 'a root of zero is not smooth', text());
    const value = r === undefined ? constants.generalPower(base.value, exponent.value) : constants.power(base.value, r);
    const a = r === undefined ? this.#embed(exponent.value) : this.ring.field.fromRational(r.n, r.d);
    return this.#binomial(base, a, value);
  }

  /** A function of a jet. Throws InputError where it is not smooth. */
  call(name: FunctionName, a: Jet<V, C>, text: () => string): Jet<V, C> {
    const { constants } = this;
    const f = constants.field;
    if (this.isConstant(a)) return this.constant(constants.call(name, a.value));
    switch (name) {
      case 'sqrt':
        return this.power(a, this.constant(f.fromRational(1n, 2n)), text);
      case 'exp': {
        const value = constants.call('exp', a.value);
        return { value, rest: this.#scaled(this.#joined(this.#exp(a.rest).slice(1)), value) };
      }
      case 'log': {
        const value = constants.call('log', a.value);
        return { value, rest: this.#log(this.#scaled(a.rest, constants.simplify(f.inv(a.value)))) };
      }
      default: {
        const hyperbolic = name.endsWith('h');
        const { odd, even } = this.#turn(a.rest, hyperbolic ? 1 : -1);
        const s: Jet<V, C> = { value: f.zero, rest: odd };
        const c: Jet<V, C> = { value: f.one, rest: even };
        if (name === 'tan' || name === 'tanh') {
          // tan(c + r) = (t + tan r)/(1 - t tan r)
          const t = this.constant(constants.call(name, a.value));
          const u = this.div(s, c, text);
          const product = this.mul(t, u);
          return this.div(this.sum([t, u]), this.sum([this.constant(f.one), hyperbolic ? product : this.neg(product)]), text);
        }
        const [sine, cosine]: [FunctionName, FunctionName] = hyperbolic ? ['sinh', 'cosh'] : ['sin', 'cos'];
        if (f.isZero(a.value)) return name === sine ? s : c;
        const s0 = this.constant(constants.call(sine, a.value));
        const c0 = this.constant(constants.call(cosine, a.value));
        if (name === sine) return this.sum([this.mul(s0, c), this.mul(c0, s)]);
        const crossed = this.mul(s0, s);
        return this.sum([this.mul(c0, c), hyperbolic ? crossed : this.neg(crossed)]);
      }
    }
  }
  /** The square root of b^(2m) is ±b^m where the sign of b at the point is known; undefined otherwise. */
  rootOfPower(b: Jet<V, C>, exponent: Jet<V, C>): Jet<V, C> | undefined {
    const r = this.isConstant(exponent) ? this.constants.rational(exponent.value) : undefined;
    if (r === undefined || r.d !== 1n || r.n % 2n !== 0n || r.n <= 0n) return undefined;
    const sign = this.constants.sign(b.value);
    if (sign === undefined) return undefined;
    const root = this.power(b, this.constant(this.constants.field.fromInteger(r.n / 2n)), () => '');
    return sign === 1 || (r.n / 2n) % 2n === 0n ? root : this.neg(root);
  }
}
