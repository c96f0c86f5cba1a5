/**
 * Thresholds as formulas in the other parameters, such as k = W^2: the determinant of a small block over the rational
 * functions in all parameters, solved for the swept one where its degree in it is one or two. A formula is kept only
 * if our own arithmetic finds that the determinant vanishes at it for the declared values, exactly, and at others.
 */
import { InputError, LimitError } from '../errors/index.ts';
import type { Algebraic } from '../field/index.ts';
import { build, determinant, type Matrix, multiply, sparseFromMaps, sparseTimes, transpose } from '../linear/index.ts';
import { energyExpression } from '../model/energy.ts';
import {
  compileNumeric,
  exactValue,
  FieldTooSmall,
  formatExpression,
  parseExpression,
  Transcendental,
  taylor,
  withField,
} from '../model/expression/index.ts';
import { readQuantities } from '../model/quantities.ts';
import { divideExactly, factorsOf, gcdPolynomials, type RationalFunction, type RationalFunctionField } from '../polynomial/index.ts';
import { quadraticFormulas } from './closed-form.ts';
import type { SweepFamily } from './sweep-family.ts';

/** Largest block and largest number of other parameters for which a formula is looked for. */
const BLOCK_SIZE = 4;
const OTHERS = 6;

/** For each component the formulas of its zeros, each with its value at the declared parameters. */
export type Formulas = ReadonlyMap<number, readonly { readonly text: string; readonly value: number }[]>;

/** Formulas for the components with the numbers given; none where there are no other parameters. */
export async function thresholdFormulas(family: SweepFamily, components: readonly number[]): Promise<Formulas> {
  const out = new Map<number, { text: string; value: number }[]>();
  const { parameter } = family.range;
  const others = [...family.declaration.parameters.keys()].filter((name) => name !== parameter);
  if (others.length === 0 || others.length > OTHERS || family.rational === undefined) return out;
  try {
    for (const i of components) {
      const basis = family.adapted[i]!.basis;
      if (basis.cols <= BLOCK_SIZE) out.set(i, await formulasOf(family, basis, others));
    }
  } catch (error) {
    // no expansion in all parameters, or one that is too large
    if (!(error instanceof InputError || error instanceof LimitError || error instanceof RangeError)) throw error;
  }
  return out;
}

async function formulasOf(family: SweepFamily, basis: Matrix<Algebraic>, others: readonly string[]) {
  const { parameter } = family.range;
  const quantities = readQuantities(family.declaration);
  const h = energyExpression(family.declaration, quantities.definitions)!;
  const t = taylor(h, {
    names: quantities.names,
    point: quantities.pointExpressions,
    parameters: quantities.valueExpressions,
    keep: [parameter, ...others],
    degree: 2,
    field: family.field,
  });
  if (t.kind !== 'symbolic' || t.atoms.length > 0 || t.field !== family.field) return [];
  const field: RationalFunctionField<Algebraic> = t.constants.field;
  const n = quantities.names.length;
  const rows = Array.from({ length: n }, () => new Map<number, RationalFunction<Algebraic>>());
  t.polynomial.monomials.forEach((m, k) => {
    const flat = factorsOf(m).flatMap(([v, e]) => new Array<number>(e).fill(v));
    if (flat.length !== 2) return;
    const [i, j] = flat as [number, number];
    const c = t.polynomial.coefficients[k]!;
    rows[i]!.set(j, i === j ? field.add(c, c) : c);
    rows[j]!.set(i, i === j ? field.add(c, c) : c);
  });
  const columns = build(field, basis.rows, basis.cols, (i, j) => field.fromConstant(basis.data[i * basis.cols + j]!));
  const s = sparseFromMaps(field, n, rows);
  const block = multiply(transpose(columns), sparseTimes(s, columns));
  const ring = field.ring;
  const at = ring.indexOf(parameter);
  const full = determinant(block).numerator;
  // a block over C or H has a square for its determinant
  const repeated = gcdPolynomials(ring, full, ring.derivative(full, at));
  const once = ring.degree(repeated) > 0 ? divideExactly(ring, full, repeated)! : full;
  if (ring.isZero(once)) return [];
  const numerator = ring.scale(once, ring.field.inv(once.coefficients[0]!));
  const parts = [ring.zero, ring.zero, ring.zero];
  for (const [m, c] of ring.terms(numerator)) {
    const e = factorsOf(m).find(([v]) => v === at)?.[1] ?? 0;
    if (e > 2) return [];
    const rest = [...m].filter((x) => x.charCodeAt(0) !== at).join('');
    parts[e] = ring.add(parts[e]!, ring.fromTerms([[rest, c]]));
  }
  const [c, b, a] = parts;
  if (ring.isZero(a!) && ring.isZero(b!)) return [];
  const texts = ring.isZero(a!)
    ? [field.format(field.neg(field.quotient(c!, b!)))]
    : await quadraticFormulas(ring.format(a!), ring.format(b!), ring.format(c!), others);
  return texts.flatMap((text) => checked(text, ring.format(numerator), parameter, others, family));
}

/** The formula with its value, if the determinant vanishes at it. */
function checked(text: string, condition: string, parameter: string, others: readonly string[], family: SweepFamily) {
  const formula = parseExpression(text);
  const names = [...others];
  const declared = readQuantities(family.declaration);
  const values = names.map((name) => declared.field.toNumber(declared.values.get(name)!));
  const f = compileNumeric(formula, names);
  const g = compileNumeric(parseExpression(condition), [...names, parameter]);
  for (const factor of [1, 1.0625, 1.1875]) {
    const x = values.map((v, i) => v * factor ** (1 + (i % 2)));
    const root = f(x);
    if (!Number.isFinite(root)) return [];
    // against the slope of the condition, so that its size does not matter
    const step = 1e-4 * Math.max(1, Math.abs(root));
    const slope = Math.abs(g([...x, root + step]) - g([...x, root])) + Math.abs(g([...x, root - step]) - g([...x, root]));
    if (!(Math.abs(g([...x, root])) <= 1e-9 * slope)) return [];
  }
  try {
    const { result } = withField((field) => {
      const map = new Map(names.map((name) => [name, field.embed(declared.field, declared.values.get(name)!)]));
      const root = exactValue(formula, map, field);
      return field.isZero(exactValue(parseExpression(condition), new Map([...map, [parameter, root]]), field));
    }, declared.field);
    if (!result) return [];
  } catch (error) {
    // a nested root has no exact value; the numbers stand
    if (!(error instanceof Transcendental || error instanceof FieldTooSmall)) throw error;
  }
  return [{ text: formatExpression(formula), value: f(values) }];
}
