/**
 * Whole-number arithmetic of group declarations: orders, numbers of classes, dimensions and the images of
 * permutations are written as texts in N (the parameter of a family) and i (a site, from 1).
 * Operators + - * / % ^ with the usual precedence, parentheses, and the functions below. `/` must come out even,
 * `%` is the remainder in 0 … m-1.
 */
import { InputError } from '../errors/errors.ts';

const NESTING_LIMIT = 50;
const LENGTH_LIMIT = 1000;

/** Number of partitions of n into parts of the given list, each part used at most `repeat` times. */
function partitionsInto(n: number, parts: readonly number[], repeat: number): number {
  let counts = Array.from({ length: n + 1 }, (_, k) => (k === 0 ? 1 : 0));
  for (const part of parts) {
    const next = counts.slice();
    for (let total = part; total <= n; total++)
      for (let times = 1; times <= repeat && times * part <= total; times++) next[total]! += counts[total - times * part]!;
    counts = next;
  }
  return counts[n]!;
}
const upTo = (n: number) => Array.from({ length: n }, (_, k) => k + 1);
const partitions = (n: number) => partitionsInto(n, upTo(n), n);

const FUNCTIONS: Readonly<Record<string, { readonly arity: number; readonly apply: (...x: number[]) => number }>> = {
  factorial: { arity: 1, apply: (n) => upTo(small(n!)).reduce((x, k) => x * k, 1) },
  /** Partitions of n: classes of the symmetric group. */
  partitions: { arity: 1, apply: (n) => partitions(small(n!)) },
  /** Partitions of n into distinct odd parts: classes of the symmetric group that halve in the alternating group. */
  distinctOddPartitions: {
    arity: 1,
    apply: (n) =>
      partitionsInto(
        small(n!),
        upTo(n!).filter((k) => k % 2 === 1),
        1,
      ),
  },
  /** Pairs of partitions of n in all: classes of the hyperoctahedral group. */
  bipartitions: {
    arity: 1,
    apply: (n) => Array.from({ length: small(n!) + 1 }, (_, k) => partitions(k) * partitions(n! - k)).reduce((x, y) => x + y, 0),
  },
  min: { arity: 2, apply: Math.min },
  max: { arity: 2, apply: Math.max },
  /** Quotient rounded down. */
  div: { arity: 2, apply: (a, b) => Math.floor(a! / b!) },
};

function small(n: number): number {
  if (n < 0 || n > 100) throw new RangeError(`${n} is outside 0 … 100`);
  return n;
}

const own = <T>(table: Readonly<Record<string, T>>, key: string): T | undefined => (Object.hasOwn(table, key) ? table[key] : undefined);

/**
 * Value of a whole-number text with the given values of its names.
 * @throws InputError with the culprit `where` if the text is not well formed, uses an unknown name, or leaves the exact integers.
 */
export function integerValue(text: string, names: Readonly<Record<string, number>>, where: { file: string; key: string }): number {
  const fail = (reason: string): never => {
    throw new InputError(`"${text}" is not a whole-number expression: ${reason}`, {
      ...where,
      value: text,
      expected: `integers, ${Object.keys(names).join(', ') || 'no names'}, + - * / % ^, parentheses, ${Object.keys(FUNCTIONS).join(', ')}`,
    });
  };
  if (text.length > LENGTH_LIMIT) fail(`it is longer than ${LENGTH_LIMIT} characters`);
  const tokens = text.match(/\d+|[A-Za-z]+|\S/g) ?? [];
  let at = 0;
  const exact = (x: number): number => (Number.isSafeInteger(x) ? x : fail('the value is no exact integer'));
  const expect = (token: string) => {
    if (tokens[at] !== token) fail(`"${token}" expected ${at < tokens.length ? `before "${tokens[at]}"` : 'at the end'}`);
    at++;
  };
  const sum = (depth: number): number => {
    if (depth > NESTING_LIMIT) fail('it is nested too deeply');
    let value = product(depth);
    while (tokens[at] === '+' || tokens[at] === '-') value = exact(tokens[at++] === '+' ? value + product(depth) : value - product(depth));
    return value;
  };
  const product = (depth: number): number => {
    let value = unary(depth);
    for (let sign = tokens[at]; sign === '*' || sign === '/' || sign === '%'; sign = tokens[at]) {
      at++;
      const right = unary(depth);
      if (sign !== '*' && right === 0) fail('division by zero');
      if (sign === '%') value = ((value % right) + Math.abs(right)) % Math.abs(right);
      else value = exact(sign === '*' ? value * right : value / right);
    }
    return value;
  };
  const unary = (depth: number): number => {
    let negative = false;
    while (tokens[at] === '-') {
      negative = !negative;
      at++;
    }
    const value = power(depth);
    return negative ? 0 - value : value;
  };
  const power = (depth: number): number => {
    const base = atom(depth);
    if (tokens[at] !== '^') return base;
    at++;
    return exact(base ** atom(depth));
  };
  const atom = (depth: number): number => {
    const token = tokens[at++];
    if (token === undefined) return fail('it ends too early');
    if (/^\d/.test(token)) return exact(Number(token));
    if (token === '(') {
      const value = sum(depth + 1);
      expect(')');
      return value;
    }
    const routine = own(FUNCTIONS, token);
    if (routine !== undefined) {
      const values: number[] = [];
      expect('(');
      for (let k = 0; k < routine.arity; k++) {
        if (k > 0) expect(',');
        values.push(sum(depth + 1));
      }
      expect(')');
      try {
        return exact(routine.apply(...values));
      } catch (e) {
        if (e instanceof RangeError) return fail(e.message);
        throw e;
      }
    }
    return own(names, token) ?? fail(`"${token}" is unknown`);
  };
  const value = sum(0);
  if (at < tokens.length) fail(`"${tokens[at]}" is one sign too many`);
  return value;
}
