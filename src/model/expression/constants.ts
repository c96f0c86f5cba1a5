/** What an expansion needs to know of its constants, whatever kind of number they are. */
import { type Field, type OrderedField, type Rational, ratioToNumber } from '../../field/index.ts';
import type { FunctionName } from './ast.ts';
import { outside } from './signals.ts';

/** Arithmetic and functions of constants. Functions throw InputError outside their domains. */
export interface Constants<V> {
  readonly field: Field<V>;
  readonly pi: V;
  /** A shorter spelling of the same value, after products and quotients. */
  simplify(v: V): V;
  /** The rational value, if it is one. */
  rational(v: V): Rational | undefined;
  /** 1 or -1 where the sign is certain, else undefined (zero, or symbols). */
  sign(v: V): 1 | -1 | undefined;
  power(base: V, exponent: Rational): V;
  generalPower(base: V, exponent: V): V;
  call(name: FunctionName, v: V): V;
}

/** Double precision; a value counts as zero only if it is zero. */
export const doubles: OrderedField<number> = {
  name: 'R (double precision)',
  characteristic: 0,
  exact: false,
  zero: 0,
  one: 1,
  fromInteger: Number,
  fromRational: (n, d) => {
    if (d === 0n) throw new RangeError('division by zero');
    return ratioToNumber(n, d);
  },
  add: (a, b) => a + b,
  sub: (a, b) => a - b,
  mul: (a, b) => a * b,
  neg: (a) => -a,
  inv: (a) => {
    if (a === 0) throw new RangeError('division by zero');
    return 1 / a;
  },
  div: (a, b) => {
    if (b === 0) throw new RangeError('division by zero');
    return a / b;
  },
  isZero: (a) => a === 0,
  equal: (a, b) => a === b,
  conj: (a) => a,
  format: (a) => `${a === 0 ? 0 : a}`,
  key: (a) => `${a === 0 ? 0 : a}`,
  sign: (a) => (a > 0 ? 1 : a < 0 ? -1 : 0),
  toNumber: (a) => a,
  compare: (a, b) => (a < b ? -1 : a > b ? 1 : 0),
  latex: (a) => `${a === 0 ? 0 : a}`.replace(/e\+?(-?\d+)$/, ' \\cdot 10^{$1}'),
};

/** Constants in double precision. */
export const doubleConstants: Constants<number> = {
  field: doubles,
  pi: Math.PI,
  simplify: (v) => v,
  rational: (v) => (Number.isSafeInteger(v) ? { n: BigInt(v), d: 1n } : undefined),
  sign: (v) => (v > 0 ? 1 : v < 0 ? -1 : undefined),
  power: (base, exponent) => finite(base ** ratioToNumber(exponent.n, exponent.d), 'a power', `(${base})^(${exponent.n}/${exponent.d})`),
  generalPower: (base, exponent) => finite(base ** exponent, 'a power', `(${base})^(${exponent})`),
  call: (name, v) => finite(Math[name](v), name, `${name}(${v})`),
};

function finite(value: number, what: string, text: string): number {
  if (!Number.isFinite(value)) throw outside(`${what} has no finite value at the point`, text);
  return value;
}
