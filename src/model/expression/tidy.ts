/**
 * An expression as a person would write it: numbers multiplied out, equal factors as powers, like terms together.
 * Brackets are kept. For expressions that a program has put together, such as ½(p - ½Gq)ᵀM⁻¹(p - ½Gq) + ½qᵀKq.
 * Common practice.
 */
import { type Rational, rational, rationals } from '../../field/index.ts';
import { type Expression, fold } from './ast.ts';
import { formatExpression } from './writing.ts';

/** A number times powers of factors that are no numbers, each under its text. */
interface Term {
  readonly coefficient: Rational;
  readonly factors: ReadonlyMap<string, { readonly base: Expression; readonly exponent: bigint }>;
}

const single = (e: Expression): Term => ({
  coefficient: rational(1n),
  factors: new Map([[formatExpression(e), { base: e, exponent: 1n }]]),
});

function times(a: Term, b: Term): Term {
  const factors = new Map(a.factors);
  for (const [key, { base, exponent }] of b.factors) factors.set(key, { base, exponent: exponent + (factors.get(key)?.exponent ?? 0n) });
  return { coefficient: rationals.mul(a.coefficient, b.coefficient), factors };
}

/** Terms of a sum; a sum inside a sum is opened, one inside a product is not. */
function add(terms: Map<string, Term>, t: Term): void {
  const inner = [...t.factors.values()];
  const only = inner[0];
  if (inner.length === 1 && only!.exponent === 1n && only!.base.kind === 'sum') {
    for (const part of only!.base.terms) {
      const one = termOf(part);
      add(terms, { ...one, coefficient: rationals.mul(one.coefficient, t.coefficient) });
    }
    return;
  }
  const key = [...t.factors]
    .map(([text, f]) => `${text}^${f.exponent}`)
    .sort()
    .join(' * ');
  const before = terms.get(key);
  terms.set(key, before === undefined ? t : { ...before, coefficient: rationals.add(before.coefficient, t.coefficient) });
}

/** Reads what `written` has written, and whatever else comes. */
function termOf(e: Expression): Term {
  switch (e.kind) {
    case 'number':
      return { coefficient: rational(e.n, e.d), factors: new Map() };
    case 'negate':
      return times({ coefficient: rational(-1n), factors: new Map() }, termOf(e.argument));
    case 'product':
      return e.factors.map(termOf).reduce(times);
    case 'quotient':
      if (e.denominator.kind !== 'number' || e.denominator.n === 0n) return single(e);
      return times({ coefficient: rational(e.denominator.d, e.denominator.n), factors: new Map() }, termOf(e.numerator));
    case 'power': {
      const { exponent } = e;
      if (exponent.kind !== 'number' || exponent.d !== 1n || exponent.n < 1n || e.base.kind === 'number') return single(e);
      return { coefficient: rational(1n), factors: new Map([[formatExpression(e.base), { base: e.base, exponent: exponent.n }]]) };
    }
    default:
      return single(e);
  }
}

const number = (n: bigint): Expression => ({ kind: 'number', n, d: 1n });

function written({ coefficient, factors }: Term): Expression {
  const { n, d } = coefficient;
  if (n === 0n || factors.size === 0) return { kind: 'number', n, d };
  const size = n < 0n ? -n : n;
  const parts = [
    ...(size === 1n ? [] : [number(size)]),
    ...[...factors.values()].map(
      ({ base, exponent }): Expression => (exponent === 1n ? base : { kind: 'power', base, exponent: number(exponent) }),
    ),
  ];
  const above: Expression = parts.length === 1 ? parts[0]! : { kind: 'product', factors: parts };
  const whole: Expression = d === 1n ? above : { kind: 'quotient', numerator: above, denominator: number(d) };
  return n < 0n ? { kind: 'negate', argument: whole } : whole;
}

/** The same function, in fewer signs. */
export function tidy(root: Expression): Expression {
  return fold<Expression>(root, (e, parts) => {
    switch (e.kind) {
      case 'sum': {
        const terms = new Map<string, Term>();
        for (const part of parts) add(terms, termOf(part));
        const kept = [...terms.values()].filter((t) => t.coefficient.n !== 0n).map(written);
        return kept.length === 0 ? number(0n) : kept.length === 1 ? kept[0]! : { kind: 'sum', terms: kept };
      }
      case 'product':
        return written(termOf({ kind: 'product', factors: parts }));
      case 'negate':
        return written(termOf({ kind: 'negate', argument: parts[0]! }));
      case 'quotient':
        return written(termOf({ kind: 'quotient', numerator: parts[0]!, denominator: parts[1]! }));
      case 'power':
        return written(termOf({ kind: 'power', base: parts[0]!, exponent: parts[1]! }));
      case 'call':
        return { kind: 'call', name: e.name, argument: parts[0]! };
      default:
        return e;
    }
  });
}
