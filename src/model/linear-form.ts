/** Linear forms: what the right-hand sides of maps, vector fields and matrix entries are read as. */
import { InputError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { type Expression, exactValue, fold, formatExpression } from './expression/index.ts';

/** constant + Σ coefficient · name. */
export interface AffineForm {
  readonly constant: Algebraic;
  readonly coefficients: ReadonlyMap<string, Algebraic>;
}

export interface Where {
  readonly file?: string;
  readonly key?: string;
}

/**
 * Reads an expression as an affine form in `names`; everything else must be constant under `values`.
 * Throws InputError where it is not affine; lets the signals of a field that is too small pass.
 */
export function affineForm(
  e: Expression,
  names: ReadonlySet<string>,
  values: ReadonlyMap<string, Algebraic>,
  field: RealField,
  where: Where,
): AffineForm {
  type Part = { readonly e: Expression; readonly form?: AffineForm };
  const none: ReadonlyMap<string, Algebraic> = new Map();
  const nonlinear = (x: Expression): InputError =>
    new InputError(`${formatExpression(x)} is not linear in the coordinates`, {
      ...where,
      value: formatExpression(e),
      expected: 'a sum of numbers times coordinates',
      next: 'a symmetry must be a linear map of the phase space',
    });
  const combine = (x: Expression, parts: readonly Part[]): Part => {
    if (x.kind === 'symbol' && names.has(x.name))
      return { e: x, form: { constant: field.zero, coefficients: new Map([[x.name, field.one]]) } };
    if (parts.every((p) => p.form === undefined)) return { e: x };
    const form = (p: Part): AffineForm => p.form ?? { constant: exactValue(p.e, values, field), coefficients: none };
    const scaled = (a: AffineForm, s: Algebraic): AffineForm => ({
      constant: field.mul(a.constant, s),
      coefficients: new Map([...a.coefficients].map(([k, v]) => [k, field.mul(v, s)])),
    });
    switch (x.kind) {
      case 'sum': {
        let constant = field.zero;
        const coefficients = new Map<string, Algebraic>();
        for (const p of parts) {
          const f = form(p);
          constant = field.add(constant, f.constant);
          for (const [k, v] of f.coefficients) coefficients.set(k, field.add(coefficients.get(k) ?? field.zero, v));
        }
        return { e: x, form: { constant, coefficients } };
      }
      case 'negate':
        return { e: x, form: scaled(form(parts[0]!), field.neg(field.one)) };
      case 'product': {
        const variable = parts.filter((p) => p.form !== undefined);
        if (variable.length !== 1) throw nonlinear(x);
        let s = field.one;
        for (const p of parts) if (p.form === undefined) s = field.mul(s, exactValue(p.e, values, field));
        return { e: x, form: scaled(variable[0]!.form!, s) };
      }
      case 'quotient': {
        if (parts[1]!.form !== undefined) throw nonlinear(x);
        const d = exactValue(parts[1]!.e, values, field);
        if (field.isZero(d))
          throw new InputError('division by zero', { ...where, value: formatExpression(x), expected: 'a nonzero denominator' });
        return { e: x, form: scaled(parts[0]!.form!, field.inv(d)) };
      }
      case 'power': {
        const exponent = parts[1]!.e;
        if (parts[1]!.form === undefined && exponent.kind === 'number' && exponent.d === 1n && exponent.n === 1n) return parts[0]!;
        throw nonlinear(x);
      }
      default:
        throw nonlinear(x);
    }
  };
  const result = fold<Part>(e, combine);
  return result.form ?? { constant: exactValue(e, values, field), coefficients: none };
}
