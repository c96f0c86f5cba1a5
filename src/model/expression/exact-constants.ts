/**
 * Exact constants: rational functions over a real field in the kept parameters and in ATOMS. An atom is a symbol
 * that stands for a number outside the field (`log(2)`, `2^(1/3)`, `exp(1)`, `pi`). It may cancel in the end; if it
 * remains, the value is floating and the atom says why. Atoms are chosen so that the usual identities hold by
 * themselves: logarithms and roots of rationals split into primes, exp(n/d) is a power of exp(1/d), and roots and
 * sines carry the relation that rewrites their powers.
 */
import { LimitError } from '../../errors/index.ts';
import { type Algebraic, type Rational, type RealField, rational, rationals } from '../../field/index.ts';
import { PolynomialRing, RationalFunctionField } from '../../polynomial/index.ts';
import type { FunctionName } from './ast.ts';
import type { Constants } from './constants.ts';
import { bits, logOf, primePowers } from './prime-powers.ts';
import { type Relation, reduceByRelation, type Value } from './relation.ts';
import { outside } from './signals.ts';
import { cosine, sine, squareRoot } from './square-root.ts';

interface Atom {
  readonly name: string;
  /** Its value in double precision; undefined if a kept parameter is in it. */
  readonly approximate: number | undefined;
  /** name^power = value. */
  readonly relation?: Relation;
  /** name = exp(argument), log(argument). */
  readonly exponential?: Value;
  readonly logarithm?: Value;
}

/** Bits of an integer power that are worth computing, and powers of atoms. */
const BIT_LIMIT = 1 << 20;
const DEGREE_LIMIT = 1 << 12;
/** Denominators of pi up to which cosines are looked for in a field. */
const ANGLE_LIMIT = 5000n;

export class ExactConstants implements Constants<Value> {
  readonly numbers: RealField;
  #field: RationalFunctionField<Algebraic>;
  readonly #atoms = new Map<string, Atom>();
  readonly #floats = new Map<string, number>();

  /** Over the given field, with the kept parameters as symbols. */
  constructor(numbers: RealField, kept: readonly string[] = []) {
    this.numbers = numbers;
    this.#field = new RationalFunctionField(new PolynomialRing(numbers, kept));
  }

  /** The field with all atoms met so far; earlier elements are elements of it. */
  get field(): RationalFunctionField<Algebraic> {
    return this.#field;
  }
  /** Names of the atoms met so far. */
  get atoms(): readonly string[] {
    return [...this.#atoms.keys()];
  }
  /** The name of an atom in v, without the brackets around a power; undefined if there is none. */
  atomIn(v: Value): string | undefined {
    for (const p of [v.numerator, v.denominator])
      for (const i of this.field.ring.support(p)) {
        const name = this.field.symbols[i]!;
        if (this.#atoms.has(name)) return name.startsWith('(') ? name.slice(1, -1) : name;
      }
    return undefined;
  }
  constant(v: Value): Algebraic | undefined {
    return this.#field.constantValue(v);
  }
  rational(v: Value): Rational | undefined {
    const c = this.constant(v);
    return c === undefined ? undefined : this.numbers.toRational(c);
  }
  /** In double precision; undefined if a kept parameter is in it. */
  approximate(v: Value): number | undefined {
    const c = this.constant(v);
    if (c !== undefined) return this.numbers.toNumber(c);
    for (const p of [v.numerator, v.denominator])
      for (const i of this.field.ring.support(p)) if (!this.#floats.has(this.field.symbols[i]!)) return undefined;
    return this.field.evaluateNumber(v, this.#floats);
  }
  sign(v: Value): 1 | -1 | undefined {
    const c = this.constant(v);
    if (c !== undefined) {
      const s = this.numbers.sign(c);
      return s === 0 ? undefined : s;
    }
    const x = this.approximate(v);
    return x === undefined || !(Math.abs(x) > 1e-9) ? undefined : x > 0 ? 1 : -1;
  }
  get pi(): Value {
    return this.#atom('pi', Math.PI);
  }

  #atom(name: string, approximate: number | undefined, more: Omit<Atom, 'name' | 'approximate'> = {}): Value {
    if (!this.#atoms.has(name)) {
      this.#atoms.set(name, { name, approximate, ...more });
      if (approximate !== undefined) this.#floats.set(name, approximate);
      this.#field = this.#field.extend([name]);
    }
    return this.#field.symbol(name);
  }
  #number(r: Rational): Value {
    return this.#field.fromRational(r.n, r.d);
  }
  #approximately(v: Value, f: (x: number) => number): number | undefined {
    const x = this.approximate(v);
    return x === undefined ? undefined : f(x);
  }

  /** Powers of roots and sines reduced by their relations; roots removed from denominators where they stand alone. */
  simplify(v: Value): Value {
    if (this.#atoms.size === 0 || this.#field.isConstant(v)) return v;
    let out = v;
    for (const atom of [...this.#atoms.values()].reverse())
      if (atom.relation !== undefined) out = reduceByRelation(this.#field, atom.name, atom.relation, out);
    return out;
  }
  #integerPower(v: Value, n: bigint): Value {
    const f = this.#field;
    if (n === 0n) return f.one;
    if (f.isZero(v)) {
      if (n < 0n) throw outside('division by zero', `0^(${n})`);
      return v;
    }
    const size = n < 0n ? -n : n;
    const c = this.constant(v);
    if (c !== undefined && (f.equal(v, f.one) || f.equal(v, f.neg(f.one)))) return size % 2n === 0n ? f.one : v;
    const weight = c === undefined ? BIT_LIMIT / DEGREE_LIMIT : Math.max(bits(c.d), ...c.c.map((x) => bits(x < 0n ? -x : x)));
    if (size > BigInt(Math.floor(BIT_LIMIT / weight)))
      throw new LimitError('a power is too large to be computed', {
        value: `(${f.format(v)})^${n}`.slice(0, 80),
        next: 'use a smaller exponent',
      });
    let out = f.one;
    let base = n < 0n ? f.inv(v) : v;
    for (let k = size; k > 0n; k >>= 1n) {
      if (k & 1n) out = this.simplify(f.mul(out, base));
      if (k > 1n) base = this.simplify(f.mul(base, base));
    }
    return this.simplify(out);
  }

  power(base: Value, exponent: Rational): Value {
    if (exponent.d === 1n) return this.#integerPower(base, exponent.n);
    const f = this.#field;
    const text = () => `(${f.format(base)})^(${exponent.n}/${exponent.d})`;
    if (f.isZero(base)) {
      if (exponent.n < 0n) throw outside('division by zero', text());
      return base;
    }
    if (this.sign(base) === -1) throw outside('a fractional power of a negative number is not real', text());
    const r = this.rational(base);
    if (r !== undefined) return this.#powerOfRational(r, exponent);
    const c = this.constant(base);
    if (c !== undefined && exponent.d % 2n === 0n) {
      const root = squareRoot(this.numbers, c);
      if (root !== undefined) return this.power(f.fromConstant(root), rational(2n * exponent.n, exponent.d));
    }
    const split = this.#positiveAtoms(base);
    if (split !== undefined && split.factors.length > 0) {
      let out = this.power(f.fromConstant(split.coefficient), exponent);
      for (const { atom, power } of split.factors) {
        const e = rationals.mul(exponent, rational(BigInt(power)));
        if (atom.exponential !== undefined) out = f.mul(out, this.#exp(f.mul(atom.exponential, this.#number(e))));
        else out = f.mul(out, this.power(atom.relation!.value, rationals.div(e, rational(BigInt(atom.relation!.power)))));
      }
      return this.simplify(out);
    }
    // a positive number in front goes out of the root: sqrt(3 k^2) = sqrt(3) sqrt(k^2)
    const front = this.numbers.div(base.numerator.coefficients[0]!, base.denominator.coefficients[0]!);
    if (c === undefined && this.numbers.sign(front) > 0 && !this.numbers.equal(front, this.numbers.one)) {
      const number = f.fromConstant(front);
      return this.simplify(f.mul(this.power(number, exponent), this.power(f.div(base, number), exponent)));
    }
    return this.#integerPower(this.#root(base, f.format(base), exponent.d), exponent.n);
  }
  #root(base: Value, text: string, d: bigint): Value {
    if (d > BigInt(DEGREE_LIMIT))
      throw new LimitError('the root is of too high a degree', { value: `${d}`, next: 'use a simpler exponent' });
    const wrapped = /^\w+$/.test(text) ? text : `(${text})`;
    const name = d === 2n ? `sqrt(${text})` : `(${wrapped}^(1/${d}))`;
    return this.#atom(
      name,
      this.#approximately(base, (x) => x ** (1 / Number(d))),
      { relation: { power: Number(d), value: base } },
    );
  }
  #powerOfRational(r: Rational, exponent: Rational): Value {
    let out = this.#field.one;
    for (const [p, e] of [...primePowers(r.n), ...primePowers(r.d).map(([q, k]) => [q, -k] as const)]) {
      const total = rationals.mul(exponent, rational(BigInt(e)));
      let whole = total.n / total.d;
      if (total.n % total.d < 0n) whole--;
      const rest = rationals.sub(total, rational(whole));
      out = this.#field.mul(out, this.#integerPower(this.#field.fromInteger(p), whole));
      if (rest.n === 0n) continue;
      const prime = this.#field.fromInteger(p);
      if (rest.d === 2n) out = this.#field.mul(out, this.#field.fromConstant(squareRoot(this.numbers, this.numbers.fromInteger(p))!));
      else {
        const root = this.#root(prime, `${p}`, rest.d);
        out = this.#field.mul(out, this.#integerPower(root, rest.n));
      }
    }
    return this.simplify(out);
  }
  /** v as a positive number times powers of positive atoms whose powers and logarithms are known. */
  #positiveAtoms(v: Value): { coefficient: Algebraic; factors: Array<{ atom: Atom; power: number }> } | undefined {
    const factors: Array<{ atom: Atom; power: number }> = [];
    const { ring } = this.#field;
    for (const [p, sign] of [
      [v.numerator, 1],
      [v.denominator, -1],
    ] as const) {
      if (p.monomials.length !== 1) return undefined;
      for (const i of ring.support(p)) {
        const atom = this.#atoms.get(ring.variables[i]!);
        const rooted = atom?.relation !== undefined && atom.approximate !== undefined && !atom.name.startsWith('sin');
        if (atom === undefined || !(atom.exponential !== undefined || rooted)) return undefined;
        factors.push({ atom, power: sign * ring.degreeIn(p, i) });
      }
    }
    const coefficient = this.numbers.div(v.numerator.coefficients[0]!, v.denominator.coefficients[0]!);
    return this.numbers.sign(coefficient) > 0 ? { coefficient, factors } : undefined;
  }

  generalPower(base: Value, exponent: Value): Value {
    const r = this.rational(exponent);
    if (r !== undefined) return this.power(base, r);
    const f = this.#field;
    if (f.isZero(base)) throw outside('a power of zero with a symbolic or irrational exponent', `0^(${f.format(exponent)})`);
    if (f.equal(base, f.one)) return base;
    return this.#exp(this.simplify(f.mul(exponent, this.#log(base))));
  }

  call(name: FunctionName, v: Value): Value {
    const f = this.#field;
    switch (name) {
      case 'sqrt':
        return this.power(v, rational(1n, 2n));
      case 'exp':
        return this.#exp(v);
      case 'log':
        return this.#log(v);
      case 'sin':
        return this.#turn(v).sin;
      case 'cos':
        return this.#turn(v).cos;
      case 'tan': {
        const { sin, cos } = this.#turn(v);
        if (this.#field.isZero(cos)) throw outside('tan has a pole at the point', `tan(${f.format(v)})`);
        return this.simplify(this.#field.div(sin, cos));
      }
      default: {
        const e = this.#exp(v);
        const g = this.#field;
        const inverse = g.inv(e);
        const [sum, difference] = [g.add(e, inverse), g.sub(e, inverse)];
        const half = g.fromRational(1n, 2n);
        return this.simplify(name === 'tanh' ? g.div(difference, sum) : g.mul(half, name === 'cosh' ? sum : difference));
      }
    }
  }

  /** Terms of a polynomial value that are a rational times one atom for which `known` holds, and the rest. */
  #linearPart(v: Value, known: (a: Atom) => boolean): { parts: Array<{ atom: Atom; factor: Rational }>; rest: Value } {
    const f = this.#field;
    const parts: Array<{ atom: Atom; factor: Rational }> = [];
    if (!f.isPolynomial(v)) return { parts, rest: v };
    let rest = v;
    for (const [m, c] of f.ring.terms(v.numerator)) {
      if (m.length !== 1) continue;
      const atom = this.#atoms.get(f.symbols[m.charCodeAt(0)]!);
      const factor = this.numbers.toRational(this.numbers.div(c, v.denominator.coefficients[0]!));
      if (atom === undefined || factor === undefined || !known(atom)) continue;
      parts.push({ atom, factor });
      rest = f.sub(rest, f.mul(this.#number(factor), f.symbol(atom.name)));
    }
    return { parts, rest };
  }

  #exp(v: Value): Value {
    const { parts, rest } = this.#linearPart(v, (a) => a.logarithm !== undefined);
    let out = this.#field.one;
    for (const { atom, factor } of parts) out = this.#field.mul(out, this.power(atom.logarithm!, factor));
    if (!this.#field.isZero(rest)) {
      const { factor, body } = this.#leading(rest, 64n);
      const name = `exp(${this.#field.format(body)})`;
      const atom = this.#atom(
        name,
        this.#approximately(body, (x) => finiteOr(Math.exp(x), name)),
        { exponential: body },
      );
      out = this.#field.mul(out, this.#integerPower(atom, factor));
    }
    return this.simplify(out);
  }
  /** v = factor * body with an integer factor taken from the leading coefficient, if it is rational and small enough; else the sign only. */
  #leading(v: Value, most: bigint): { factor: bigint; body: Value } {
    const f = this.#field;
    const c = v.numerator.coefficients[0]!;
    const r = this.numbers.toRational(c);
    const negative = this.numbers.sign(c) < 0;
    const n = r === undefined ? 1n : r.n < 0n ? -r.n : r.n;
    const factor = (n <= most ? n : 1n) * (negative ? -1n : 1n);
    return { factor, body: f.mul(v, f.fromRational(1n, factor)) };
  }

  #log(v: Value): Value {
    const f = this.#field;
    const text = `log(${f.format(v)})`;
    if (f.isZero(v) || this.sign(v) === -1) throw outside('the logarithm of a number that is not positive', text);
    const r = this.rational(v);
    if (r !== undefined) {
      let sum = this.#field.zero;
      for (const [p, e] of [...primePowers(r.n), ...primePowers(r.d).map(([q, k]) => [q, -k] as const)]) {
        const atom = this.#atom(`log(${p})`, logOf(p), { logarithm: this.#field.fromInteger(p) });
        sum = this.#field.add(sum, this.#field.mul(this.#field.fromInteger(e), atom));
      }
      return sum;
    }
    const c = this.constant(v);
    const squared = c === undefined ? undefined : this.numbers.toRational(this.numbers.mul(c, c));
    if (squared !== undefined) return this.#field.mul(f.fromRational(1n, 2n), this.#log(this.#number(squared)));
    const split = this.#positiveAtoms(v);
    if (split !== undefined && split.factors.length > 0) {
      let sum = this.#log(f.fromConstant(split.coefficient));
      for (const { atom, power } of split.factors) {
        const one =
          atom.exponential ?? this.#field.mul(this.#log(atom.relation!.value), this.#field.fromRational(1n, BigInt(atom.relation!.power)));
        sum = this.#field.add(sum, this.#field.mul(this.#field.fromInteger(power), one));
      }
      return sum;
    }
    return this.#atom(text, this.#approximately(v, Math.log), { logarithm: v });
  }

  /** cos and sin of r pi + w, the multiple of pi exact. */
  #turn(v: Value): { cos: Value; sin: Value } {
    const { parts, rest } = this.#linearPart(v, (a) => a.name === 'pi');
    const r = parts[0]?.factor ?? rational(0n);
    if (r.d > ANGLE_LIMIT) return this.#turnAtom(v);
    const n = Number(2n * r.d);
    const k = Number(((r.n % (2n * r.d)) + 2n * r.d) % (2n * r.d));
    const f = this.#field;
    const { numbers } = this;
    // only what is asked for may ask for a larger field
    if (f.isZero(rest))
      return {
        get cos() {
          return f.fromConstant(cosine(numbers, k, n));
        },
        get sin() {
          return f.fromConstant(sine(numbers, k, n));
        },
      };
    const c = f.fromConstant(cosine(numbers, k, n));
    const s = f.fromConstant(sine(numbers, k, n));
    const w = this.#turnAtom(rest);
    return { cos: f.sub(f.mul(c, w.cos), f.mul(s, w.sin)), sin: f.add(f.mul(s, w.cos), f.mul(c, w.sin)) };
  }
  #turnAtom(w: Value): { cos: Value; sin: Value } {
    const { factor, body } = this.#leading(w, 0n);
    const text = this.#field.format(body);
    const cos = this.#atom(`cos(${text})`, this.#approximately(body, Math.cos));
    const f = this.#field;
    const sin = this.#atom(`sin(${text})`, this.#approximately(body, Math.sin), {
      relation: { power: 2, value: f.sub(f.one, f.mul(cos, cos)) },
    });
    return { cos, sin: factor < 0n ? this.#field.neg(sin) : sin };
  }
}

function finiteOr(x: number, text: string): number {
  if (!Number.isFinite(x))
    throw new LimitError('a value exceeds the range of numbers', { value: text.slice(0, 80), next: 'use smaller arguments' });
  return x;
}
