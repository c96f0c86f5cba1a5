/**
 * Rational functions without common divisors: each denominator that occurs becomes a symbol of its own, the arithmetic runs
 * on polynomials in the old and the new symbols, and fractions are formed and reduced once, at the end.
 */
import type { Field } from '../field/index.ts';
import { type Matrix, mapMatrix } from '../linear/index.ts';
import {
  divideExactly,
  exponentsOf,
  type Polynomial,
  PolynomialRing,
  type RationalFunction,
  type RationalFunctionField,
} from '../polynomial/index.ts';

/** Polynomials where a field is asked for; only constants have inverses. */
class PolynomialCoefficients<T> implements Field<Polynomial<T>> {
  readonly name: string;
  readonly characteristic: number;
  readonly exact: boolean;
  readonly zero: Polynomial<T>;
  readonly one: Polynomial<T>;
  readonly ring: PolynomialRing<T>;
  constructor(ring: PolynomialRing<T>) {
    this.ring = ring;
    this.name = `${ring.field.name}[${ring.variables.join(', ')}]`;
    this.characteristic = ring.field.characteristic;
    this.exact = ring.field.exact;
    this.zero = ring.zero;
    this.one = ring.one;
  }
  fromInteger(n: bigint | number): Polynomial<T> {
    return this.ring.integer(n);
  }
  fromRational(n: bigint, d: bigint): Polynomial<T> {
    return this.ring.constant(this.ring.field.fromRational(n, d));
  }
  add(a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> {
    return this.ring.add(a, b);
  }
  sub(a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> {
    return this.ring.sub(a, b);
  }
  mul(a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> {
    return this.ring.mul(a, b);
  }
  neg(a: Polynomial<T>): Polynomial<T> {
    return this.ring.neg(a);
  }
  inv(a: Polynomial<T>): Polynomial<T> {
    if (this.ring.degree(a) !== 0) throw new RangeError('division by a polynomial that is not a constant');
    return this.ring.constant(this.ring.field.inv(this.ring.constantTerm(a)));
  }
  div(a: Polynomial<T>, b: Polynomial<T>): Polynomial<T> {
    return this.ring.mul(a, this.inv(b));
  }
  isZero(a: Polynomial<T>): boolean {
    return a.monomials.length === 0;
  }
  equal(a: Polynomial<T>, b: Polynomial<T>): boolean {
    return this.ring.equal(a, b);
  }
  conj(a: Polynomial<T>): Polynomial<T> {
    return a;
  }
  format(a: Polynomial<T>): string {
    return this.ring.format(a);
  }
  key(a: Polynomial<T>): string {
    return this.ring.key(a);
  }
}

export interface FractionFree<T> {
  readonly ring: PolynomialRing<Polynomial<T>>;
  readonly hamiltonian: Polynomial<Polynomial<T>>;
  readonly kernel: Matrix<Polynomial<T>>;
  readonly complement: Matrix<Polynomial<T>>;
  readonly inverse: Matrix<Polynomial<T>>;
  /** A coefficient as a reduced rational function. */
  restore(c: Polynomial<T>): RationalFunction<T>;
}

/** The pieces of a reduction with a symbol for each denominator. */
export function withoutFractions<T>(
  field: RationalFunctionField<T>,
  ring: PolynomialRing<RationalFunction<T>>,
  pieces: {
    readonly hamiltonian: Polynomial<RationalFunction<T>>;
    readonly kernel: Matrix<RationalFunction<T>>;
    readonly complement: Matrix<RationalFunction<T>>;
    readonly inverse: Matrix<RationalFunction<T>>;
  },
): FractionFree<T> {
  const symbols = field.ring;
  const denominators: Polynomial<T>[] = [];
  const places = new Map<string, number>();
  const note = (a: RationalFunction<T>) => {
    if (field.isPolynomial(a)) return;
    const key = symbols.key(a.denominator);
    if (places.has(key)) return;
    places.set(key, denominators.length);
    denominators.push(a.denominator);
  };
  pieces.hamiltonian.coefficients.forEach(note);
  for (const m of [pieces.kernel, pieces.complement, pieces.inverse]) m.data.forEach(note);
  const n = symbols.variables.length;
  const extended = new PolynomialRing(symbols.field, [...symbols.variables, ...denominators.map((_, i) => `1/d${i + 1}`)]);
  const coefficients = new PolynomialCoefficients(extended);
  const lift = (a: RationalFunction<T>): Polynomial<T> =>
    field.isPolynomial(a) ? a.numerator : extended.mul(a.numerator, extended.variable(n + places.get(symbols.key(a.denominator))!));
  const target = new PolynomialRing<Polynomial<T>>(coefficients, ring.variables);

  const powers = denominators.map((d) => [symbols.one, d]);
  const power = (k: number, e: number): Polynomial<T> => {
    const list = powers[k]!;
    while (list.length <= e) list.push(symbols.mul(list.at(-1)!, list[1]!));
    return list[e]!;
  };
  const restore = (c: Polynomial<T>): RationalFunction<T> => {
    // terms grouped by their powers of the inverse denominators
    const groups = new Map<string, { exponents: number[]; terms: Array<readonly [string, T]> }>();
    const most = denominators.map(() => 0);
    for (const [m, x] of extended.terms(c)) {
      let cut = m.length;
      while (cut > 0 && m.charCodeAt(cut - 1) >= n) cut--;
      const tail = m.slice(cut);
      let group = groups.get(tail);
      if (group === undefined) {
        const exponents = exponentsOf(tail, n + denominators.length).slice(n);
        exponents.forEach((e, k) => {
          most[k] = Math.max(most[k]!, e);
        });
        group = { exponents, terms: [] };
        groups.set(tail, group);
      }
      group.terms.push([m.slice(0, cut), x]);
    }
    let numerator = symbols.sum(
      [...groups.values()].map(({ exponents, terms }) =>
        exponents.reduce((p, e, k) => (most[k]! > e ? symbols.mul(p, power(k, most[k]! - e)) : p), symbols.fromTerms(terms)),
      ),
    );
    if (symbols.isZero(numerator)) return field.zero;
    denominators.forEach((d, k) => {
      while (most[k]! > 0) {
        const q = divideExactly(symbols, numerator, d);
        if (q === undefined) break;
        numerator = q;
        most[k]!--;
      }
    });
    const denominator = most.reduce((p, e, k) => (e === 0 ? p : symbols.mul(p, power(k, e))), symbols.one);
    return field.quotient(numerator, denominator);
  };
  return {
    ring: target,
    hamiltonian: ring.map(pieces.hamiltonian, lift, target),
    kernel: mapMatrix(pieces.kernel, coefficients, lift),
    complement: mapMatrix(pieces.complement, coefficients, lift),
    inverse: mapMatrix(pieces.inverse, coefficients, lift),
    restore,
  };
}
