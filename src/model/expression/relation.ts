/** Symbols with a relation a^k = value: powers reduced, and the symbol removed from denominators where that is easy. */
import type { Algebraic } from '../../field/index.ts';
import { build, column, fromColumns, solve } from '../../linear/index.ts';
import type { RationalFunction, RationalFunctionField } from '../../polynomial/index.ts';

export type Value = RationalFunction<Algebraic>;

/** symbol^power = value, value free of the symbol. */
export interface Relation {
  readonly power: number;
  readonly value: Value;
}

/** Degrees up to which denominators are cleared by a linear system. */
const SYSTEM_LIMIT = 6;

/** v with powers of the symbol below `relation.power`. */
export function reduceByRelation(f: RationalFunctionField<Algebraic>, symbol: string, relation: Relation, v: Value): Value {
  const { ring } = f;
  const { power, value } = relation;
  const i = ring.indexOf(symbol);
  const below = ring.degreeIn(v.denominator, i);
  if (ring.degreeIn(v.numerator, i) < power && below <= 0) return v;
  const lowered = (p: Value['numerator']): Value[] => {
    const out = new Array<Value>(power).fill(f.zero);
    ring.coefficientsIn(p, i).forEach((c, e) => {
      let t = f.fromPolynomial(c);
      for (let k = Math.floor(e / power); k > 0; k--) t = f.mul(t, value);
      out[e % power] = f.add(out[e % power]!, t);
    });
    return out;
  };
  const root = f.symbol(i);
  const joined = (list: readonly Value[]) => list.reduceRight((sum, c) => f.add(f.mul(sum, root), c), f.zero);
  const top = lowered(v.numerator);
  if (below <= 0) return f.div(joined(top), f.fromPolynomial(v.denominator));
  const bottom = lowered(v.denominator);
  const used = bottom.flatMap((c, e) => (f.isZero(c) ? [] : [e]));
  if (used.length === 1) {
    const e = used[0]!;
    if (e === 0) return f.div(joined(top), bottom[0]!);
    // c a^e = c value / a^(power - e)
    const raised = f.mul(joined(top), power - e === 0 ? f.one : f.fromPolynomial(ring.power(ring.variable(i), power - e)));
    return reduceByRelation(f, symbol, relation, f.div(raised, f.mul(bottom[e]!, value)));
  }
  // top/bottom modulo a^power = value is a linear system for its coefficients; small ones only
  if (power === 2 || (power <= SYSTEM_LIMIT && f.isConstant(value))) {
    const product = build(f, power, power, (row, j) => {
      const c = bottom[(row - j + power) % power]!;
      return row < j ? f.mul(c, value) : c;
    });
    const solved = solve(product, fromColumns(f, [top]));
    if (solved !== undefined) return joined(column(solved, 0));
  }
  return f.div(joined(top), joined(bottom));
}
