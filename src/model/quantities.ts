/**
 * The numbers of a declaration: parameter values, the symplectic form, the equilibrium and the generators, all in
 * one real field that is made as large as they need.
 */
import { InputError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { type SparseMatrix, sparseFromMaps } from '../linear/index.ts';
import type { Declaration } from './declaration/declaration.ts';
import {
  type Expression,
  exactValue,
  parseExpression,
  resolveDefinitions,
  substituteSymbols,
  symbolsOf,
  Transcendental,
  withField,
} from './expression/index.ts';
import { type ModelGenerator, modelGenerators } from './generators.ts';
import { numericValue } from './numeric-value.ts';
import { declaredFields, type VectorField } from './vector-field.ts';

/** The exact part of a model. */
export interface Quantities {
  readonly field: RealField;
  /** Coordinates, then momenta. */
  readonly names: readonly string[];
  readonly half: number;
  /** Definitions with the definitions in them replaced. */
  readonly definitions: ReadonlyMap<string, Expression>;
  /** Parameters with a value. */
  readonly values: ReadonlyMap<string, Algebraic>;
  /** Expressions of all parameters with a value (for expansions with parameters kept). */
  readonly valueExpressions: ReadonlyMap<string, Expression>;
  readonly form: SparseMatrix<Algebraic>;
  readonly point: readonly Algebraic[];
  readonly pointExpressions: ReadonlyMap<string, Expression>;
  readonly generators: readonly ModelGenerator[];
  /** Declared continuous symmetries. */
  readonly neutral: readonly VectorField[];
  /** The first value that has no exact form, if any: then the model is floating and `values`, `point` hold rational stand-ins. */
  readonly inexact?: string;
}

/** Reads all numbers of a declaration. Throws InputError for what cannot be read. */
export function readQuantities(declaration: Declaration): Quantities {
  let out = known.get(declaration);
  if (out === undefined) {
    out = makeQuantities(declaration);
    known.set(declaration, out);
  }
  return out;
}

/** Declarations read before; none changes after it was made. */
const known = new WeakMap<Declaration, Quantities>();

function makeQuantities(declaration: Declaration): Quantities {
  const names = [...declaration.coordinates, ...declaration.momenta];
  const half = declaration.coordinates.length;
  const file = declaration.source;
  const raw = new Map([...declaration.define].map(([k, text]) => [k, parseExpression(text, { file, key: `define.${k}` })]));
  const definitions = resolveDefinitions(raw);
  const parse = (text: string, key: string) => substituteSymbols(parseExpression(text, { file, key }), definitions);
  const valueExpressions = new Map([...declaration.parameters].map(([k, text]) => [k, parse(text, `parameters.${k}`)]));
  const pointExpressions = new Map([...declaration.equilibrium].map(([k, text]) => [k, parse(text, `equilibrium.${k}`)]));
  const { field, result } = withField((f) => {
    let inexact: string | undefined;
    const exactOr = (e: Expression, values: ReadonlyMap<string, Algebraic>, key: string): Algebraic => {
      try {
        return exactValue(e, values, f);
      } catch (error) {
        if (error instanceof InputError) throw new InputError(error.message, { file, key, ...error.culprit });
        if (!(error instanceof Transcendental)) throw error;
        inexact ??= error.term;
        return standIn(e, values, f);
      }
    };
    const values = new Map<string, Algebraic>();
    const open = new Map(valueExpressions);
    while (open.size > 0) {
      const ready = [...open].filter(([, e]) => [...symbolsOf(e)].every((s) => values.has(s) || !open.has(s)));
      if (ready.length === 0)
        throw new InputError(`the values of ${[...open.keys()].join(', ')} refer to each other in a circle`, {
          file,
          key: `parameters.${[...open.keys()][0]}`,
          expected: 'values that do not lead back to themselves',
        });
      for (const [k, e] of ready) {
        values.set(k, exactOr(e, values, `parameters.${k}`));
        open.delete(k);
      }
    }
    const point = names.map((n) => {
      const e = pointExpressions.get(n);
      return e === undefined ? f.zero : exactOr(e, values, `equilibrium.${n}`);
    });
    return {
      values,
      point,
      form: symplecticForm(declaration, f, values, parse),
      generators: modelGenerators(declaration, f, values, parse),
      neutral: declaredFields(declaration, f, values, parse),
      inexact,
    };
  });
  const { inexact, ...rest } = result;
  return { field, names, half, definitions, valueExpressions, pointExpressions, ...rest, ...(inexact === undefined ? {} : { inexact }) };
}

/** A rational number near a value that has no exact form. */
function standIn(e: Expression, values: ReadonlyMap<string, Algebraic>, field: RealField): Algebraic {
  return rationalNear(numericValue(e, new Map([...values].map(([k, v]) => [k, field.toNumber(v)]))), field);
}

/** The double x as an exact rational of the field. */
export function rationalNear(x: number, field: RealField): Algebraic {
  if (!Number.isFinite(x)) throw new InputError(`a value is ${x}`, { value: `${x}`, expected: 'a finite number' });
  let d = 1n;
  let y = x;
  while (!Number.isInteger(y)) {
    y *= 2;
    d *= 2n;
  }
  return field.fromRational(BigInt(y), d);
}

function symplecticForm(
  declaration: Declaration,
  field: RealField,
  values: ReadonlyMap<string, Algebraic>,
  parse: (text: string, key: string) => Expression,
): SparseMatrix<Algebraic> {
  const half = declaration.coordinates.length;
  const n = 2 * half;
  const rows = Array.from({ length: n }, () => new Map<number, Algebraic>());
  if (declaration.form === undefined) {
    for (let i = 0; i < half; i++) {
      rows[i]!.set(i + half, field.one);
      rows[i + half]!.set(i, field.neg(field.one));
    }
    return sparseFromMaps(field, n, rows);
  }
  declaration.form.forEach((line, i) => {
    line.forEach((text, j) => {
      if (text !== '0') rows[i]!.set(j, exactValue(parse(text, `symplectic[${i + 1}][${j + 1}]`), values, field));
    });
  });
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      const a = rows[i]!.get(j) ?? field.zero;
      const b = rows[j]!.get(i) ?? field.zero;
      if (!field.isZero(field.add(a, b)))
        throw new InputError(
          `the symplectic form is not skew-symmetric: W[${i + 1}][${j + 1}] = ${field.format(a)}, W[${j + 1}][${i + 1}] = ${field.format(b)}`,
          {
            file: declaration.source,
            key: `symplectic[${i + 1}][${j + 1}]`,
            value: field.format(a),
            expected: `${field.format(field.neg(b))}`,
          },
        );
    }
  return sparseFromMaps(field, n, rows);
}
