/** The jet of an expression, from the leaves up; a constant is the jet of an expression without coordinates. */
import { InputError } from '../../errors/index.ts';
import { type Algebraic, type RealField, rational, rationals } from '../../field/index.ts';
import { PolynomialRing } from '../../polynomial/index.ts';
import { type Expression, fold } from './ast.ts';
import { ExactConstants } from './exact-constants.ts';
import { type Jet, JetAlgebra } from './jet.ts';
import { nearest } from './nearest.ts';
import type { Value } from './relation.ts';
import { Transcendental } from './signals.ts';
import { formatExpression } from './writing.ts';

/** A short text of an expression for a message. */
function shortText(e: Expression): string {
  try {
    const text = formatExpression(e);
    return text.length > 80 ? `${text.slice(0, 77)}…` : text;
  } catch {
    return 'a long expression';
  }
}

/** Refuses a name that has no value; `known` are the names that have one. */
export function unknownName(name: string, known: Iterable<string>, more: { file?: string; key?: string } = {}): InputError {
  const guess = nearest(name, known);
  return new InputError(`'${name}' has no value`, {
    ...more,
    value: name,
    expected: 'a coordinate, a parameter with a value or a definition',
    next: guess === undefined ? `give ${name} a value` : `did you mean '${guess}'? otherwise give ${name} a value`,
  });
}

/**
 * The jet of `e`; `leaf` gives the jets of names (undefined: unknown, which is an InputError naming `known`).
 * Throws InputError where e is not smooth at the point.
 */
export function expandExpression<V, C>(
  root: Expression,
  algebra: JetAlgebra<V, C>,
  leaf: (name: string) => Jet<V, C> | undefined,
  known: Iterable<string> = [],
): Jet<V, C> {
  const { constants } = algebra;
  const done = new Map<Expression, Jet<V, C>>(); // what `power` nodes were made of, for sqrt(b^2)
  const half = rational(1n, 2n);
  const isHalf = (r: { n: bigint; d: bigint } | undefined) => r !== undefined && rationals.equal(r, half);
  const combine = (e: Expression, parts: readonly Jet<V, C>[]): Jet<V, C> => {
    const text = () => shortText(e);
    switch (e.kind) {
      case 'number':
        return algebra.constant(constants.field.fromRational(e.n, e.d));
      case 'pi':
        return algebra.constant(constants.pi);
      case 'symbol': {
        const jet = leaf(e.name);
        if (jet === undefined) throw unknownName(e.name, known);
        return jet;
      }
      case 'sum':
        return algebra.sum(parts);
      case 'product':
        return algebra.product(parts);
      case 'negate':
        return algebra.neg(parts[0]!);
      case 'quotient':
        return algebra.div(parts[0]!, parts[1]!, text);
      case 'power': {
        const rooted = algebra.isConstant(parts[1]!) && isHalf(constants.rational(parts[1]!.value));
        return (rooted ? squareUnderRoot(e.base) : undefined) ?? algebra.power(parts[0]!, parts[1]!, text);
      }
      case 'call':
        return (e.name === 'sqrt' ? squareUnderRoot(e.argument) : undefined) ?? algebra.call(e.name, parts[0]!, text);
    }
  };
  const squareUnderRoot = (e: Expression) =>
    e.kind === 'power' ? algebra.rootOfPower(done.get(e.base)!, done.get(e.exponent)!) : undefined;
  return fold<Jet<V, C>>(root, (e, parts) => {
    const jet = combine(e, parts);
    done.set(e, jet);
    return jet;
  });
}

const NO_VALUES: ReadonlyMap<string, Algebraic> = new Map();

/**
 * The exact value of an expression without coordinates, in the given field; `values` are those of its names.
 * Throws FieldTooSmall (see `withField`), Transcendental if the value is in no such field, InputError where there
 * is no value or a name has none.
 */
export function exactValue(e: Expression, values: ReadonlyMap<string, Algebraic> = NO_VALUES, field: RealField): Algebraic {
  if (e.kind === 'number') return field.fromRational(e.n, e.d);
  const constants = new ExactConstants(field);
  const algebra = new JetAlgebra<Value, Algebraic>(constants, new PolynomialRing(field, []), 0, () => field.zero);
  const leaf = (name: string) => {
    const value = values.get(name);
    return value === undefined ? undefined : algebra.constant(constants.field.fromConstant(value));
  };
  const { value } = expandExpression(e, algebra, leaf, values.keys());
  const exact = constants.constant(value);
  if (exact === undefined) throw new Transcendental(constants.atomIn(value)!);
  return exact;
}
