/** Ranges of parameters, as a declaration gives them, and the declaration at one of their values. */
import { InputError, UsageError } from '../errors/index.ts';
import { type Rational, RealField, rational, rationals } from '../field/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { compileNumeric, exactValue, parseExpression, Transcendental, withField } from '../model/expression/index.ts';
import { rationalNear } from '../model/quantities.ts';

/** Values of the parameter at which the curves of a picture are computed, where nothing else is said. */
export const DEFAULT_STEPS = 200;

/** Where a parameter goes. */
export interface Range {
  readonly parameter: string;
  readonly from: number;
  readonly to: number;
  /** The ends exactly, or the doubles as fractions. */
  readonly low: Rational;
  readonly high: Rational;
  readonly steps: number;
}

/** The same declaration with another value of a parameter. */
export function declarationAt(declaration: Declaration, values: ReadonlyMap<string, string>): Declaration {
  return {
    ...declaration,
    parameters: new Map([...declaration.parameters, ...values]),
    unset: declaration.unset.filter((name) => !values.has(name)),
  };
}

/** Reads the ranges of a declaration. Throws UsageError where there is none, InputError for what cannot be read. */
export function readRanges(declaration: Declaration): Range[] {
  if (declaration.range.size === 0) {
    const name = declaration.vary[0] ?? [...declaration.parameters.keys(), ...declaration.unset][0];
    throw new UsageError('sweep needs a range for a parameter', {
      key: '--range',
      expected: 'NAME=FROM:TO, or range in the model file',
      next: name === undefined ? 'the model has no parameter' : `add --range ${name}=-1:1`,
    });
  }
  const ranges = [...declaration.range].map(([parameter, { from, to, steps }]): Range => {
    const end = (text: string, side: string) => readEnd(declaration, parameter, text, side);
    const [low, high] = [end(from, 'from'), end(to, 'to')];
    if (rationals.compare(low, high) >= 0)
      throw new InputError(`the range of ${parameter} is empty`, {
        file: declaration.source,
        key: `range.${parameter}`,
        value: `${from}, ${to}`,
        expected: 'a lower end before a higher one',
      });
    return { parameter, from: rationals.toNumber(low), to: rationals.toNumber(high), low, high, steps: steps ?? DEFAULT_STEPS };
  });
  const first = ranges.findIndex((r) => declaration.vary.includes(r.parameter));
  return first <= 0 ? ranges : [ranges[first]!, ...ranges.filter((_, i) => i !== first)];
}

function readEnd(declaration: Declaration, parameter: string, text: string, side: string): Rational {
  const where = { file: declaration.source, key: `range.${parameter}.${side}` };
  const e = parseExpression(text, where);
  try {
    const { field, result } = withField((f) => exactValue(e, undefined, f));
    if (result.c.every((c, i) => i === 0 || c === 0n)) return rational(result.c[0]!, result.d);
    const near = rationalNear(field.toNumber(result), RealField.of());
    return rational(near.c[0]!, near.d);
  } catch (error) {
    if (!(error instanceof Transcendental)) throw error;
    const near = rationalNear(compileNumeric(e, [])([]), RealField.of());
    return rational(near.c[0]!, near.d);
  }
}

export function formatRational(x: Rational): string {
  return x.d === 1n ? `${x.n}` : `${x.n}/${x.d}`;
}
