/** The determinant of a block of S for the result: in factors, with its zeros in the first parameter that varies. */
import type { Algebraic, RealField } from '../field/index.ts';
import type { Matrix } from '../linear/index.ts';
import { formatFactored, powersFactored } from './factored.ts';
import { determinantParts } from './factored-determinant.ts';
import { type FactorHelper, nerdamerFactors } from './factored-nerdamer.ts';
import type { Factor, Ring } from './factored-squares.ts';
import { determinantThresholds } from './factored-thresholds.ts';
import type { ComponentSummary } from './result.ts';
import type { Coefficient, SymbolicHessian, SymbolicModel } from './symbolic.ts';

export type BlockDeterminant = Pick<ComponentSummary, 'determinant' | 'thresholds'>;

/**
 * The determinant of S on a space that splits into `cut` alike ones, so that it is a power of that order. Nothing where it is too large; no thresholds where no parameter is a symbol.
 */
export async function determinantOf(
  hessian: SymbolicHessian,
  model: SymbolicModel,
  block: Matrix<Coefficient>,
  cut: number,
  helper: FactorHelper = nerdamerFactors,
): Promise<BlockDeterminant> {
  const f = hessian.coefficients;
  const { ring } = f;
  const parts = determinantParts(block, f);
  if (parts === undefined) return {};
  const parameter = thresholdParameter(hessian, model);
  if (parts.some((p) => ring.isZero(p.polynomial))) return { determinant: '0', ...(parameter === undefined ? {} : { thresholds: [] }) };
  const whole = await powersFactored(ring, parts, helper);
  const determinant = formatFactored(ring, whole);
  if (parameter === undefined) return { determinant };
  if (ring.indexOf(parameter) < 0) return { determinant, thresholds: [] };
  const even = whole.factors.every((x) => x.power % cut === 0);
  const once = even ? whole.factors.map((x) => ({ ...x, power: x.power / cut })) : whole.factors;
  const special = atValues(ring, once, hessian, model, parameter);
  // a denominator that vanishes at the values of the other parameters: S is not defined there
  if (special.some((x) => x.power < 0 && ring.isZero(x.polynomial))) return { determinant };
  if (special.some((x) => ring.isZero(x.polynomial))) return { determinant, thresholds: [] };
  const { factors } = special === once ? { factors: once } : await powersFactored(ring, special, helper);
  return { determinant, thresholds: determinantThresholds(ring, factors, parameter) };
}

/** The first parameter that varies, or without one the first that has no value; undefined where it is not a symbol of S. */
function thresholdParameter(hessian: SymbolicHessian, model: SymbolicModel): string | undefined {
  const { vary, unset } = model.declaration;
  const first = vary[0] ?? unset.find((name) => hessian.symbols.includes(name));
  return first !== undefined && hessian.kept.includes(first) ? first : undefined;
}

/** The other parameters that vary at their values. */
function atValues(
  ring: Ring,
  factors: readonly Factor[],
  hessian: SymbolicHessian,
  model: SymbolicModel,
  parameter: string,
): readonly Factor[] {
  const field = ring.field as RealField;
  const { quantities } = model;
  const values = new Map<number, Algebraic>();
  for (const name of hessian.symbols) {
    const value = name === parameter ? undefined : quantities.values.get(name);
    if (value !== undefined) values.set(ring.indexOf(name), field.embed(quantities.field, value));
  }
  if (values.size === 0) return factors;
  const images = ring.variables.map((_, i) => {
    const value = values.get(i);
    return value === undefined ? ring.variable(i) : ring.constant(value);
  });
  return factors.map((x) => ({ ...x, polynomial: ring.substitute(x.polynomial, images, ring) }));
}
