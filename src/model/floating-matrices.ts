/**
 * The quadratic energy of matrices of doubles: a Hessian S, or mass, gyroscopic and stiffness matrices M, G, K with
 * H = ½(p − ½Gq)ᵀM⁻¹(p − ½Gq) + ½qᵀKq (M q″ + G q′ + K q = 0), affine in parameters.
 */
import { InputError } from '../errors/index.ts';
import {
  largestEntry,
  type NumberMatrix,
  numberBuild,
  numberCombine,
  numberIdentity,
  numberMatrix,
  numberMultiply,
  numberScale,
  numberSolve,
  numberTranspose,
  requireFinite,
  symmetricPart,
} from '../linear/index.ts';
import type { Declaration, MatrixFamily } from './declaration/declaration.ts';
import { type Expression, gradientNumeric, parseExpression, substituteSymbols } from './expression/index.ts';
import { weightsAt } from './file-family.ts';
import type { FloatingEnergy, FloatingLocal } from './floating-energy.ts';
import type { MatrixText } from './matrix-file/index.ts';
import { INTEGER, REAL } from './matrix-file/number-text.ts';
import { numericValue } from './numeric-value.ts';

/** Asymmetry, relative to the largest entry, that is put down to the rounding of a file. */
export const SYMMETRY_TOLERANCE = 1e-7;

/** A matrix, its derivatives by some parameters, and the largest terms in its entries. */
interface Evaluated {
  readonly value: NumberMatrix;
  readonly by: readonly NumberMatrix[];
  readonly size: NumberMatrix;
}

interface Reader {
  readonly values: ReadonlyMap<string, number>;
  readonly definitions: ReadonlyMap<string, Expression>;
  readonly file: string;
  readonly vary: readonly string[];
}

function evaluateText(m: MatrixText, reader: Reader): { value: Float64Array; by: Float64Array[] } {
  const value = new Float64Array(m.rows * m.cols);
  const by = reader.vary.map(() => new Float64Array(m.rows * m.cols));
  const names = [...reader.values.keys()];
  const at = [...reader.values.values()];
  for (const { i, j, text } of m.entries) {
    const place = i * m.cols + j;
    if (INTEGER.test(text) || REAL.test(text)) {
      value[place]! += Number(text);
      continue;
    }
    const where = { file: reader.file, key: `${m.source}[${i + 1}][${j + 1}]` };
    const e = substituteSymbols(parseExpression(text, where), reader.definitions);
    value[place]! += numericValue(e, reader.values);
    if (reader.vary.length === 0) continue;
    const g = gradientNumeric(e, names)(at);
    reader.vary.forEach((v, k) => {
      by[k]![place]! += g[names.indexOf(v)] ?? 0;
    });
  }
  return { value, by };
}

function evaluateFamily(f: MatrixFamily, reader: Reader, key: string): Evaluated {
  const length = f.rows * f.cols;
  const value = new Float64Array(length);
  const size = new Float64Array(length);
  const by = reader.vary.map(() => new Float64Array(length));
  const numberOf = (name: string): number => {
    const value = reader.values.get(name);
    if (value === undefined) throw new InputError(`the parameter ${name} has no value`, { file: reader.file, key: `parameters.${name}` });
    return value;
  };
  /** Adds factor · m, where the factor grows with the parameter by the slope. */
  const add = (m: MatrixText, factor = 1, slope = 0, name?: string) => {
    const own = evaluateText(m, reader);
    own.value.forEach((x, k) => {
      value[k]! += factor * x;
      size[k] = Math.max(size[k]!, Math.abs(factor * x));
    });
    reader.vary.forEach((v, p) => {
      own.by[p]!.forEach((x, k) => {
        by[p]![k]! += factor * x;
      });
      if (v === name)
        own.value.forEach((x, k) => {
          by[p]![k]! += slope * x;
        });
    });
  };
  if (f.constant !== undefined) add(f.constant);
  for (const [name, m] of f.terms) add(m, numberOf(name), 1, name);
  if (f.files !== undefined) {
    const { parameter } = f.files;
    for (const { weight, slope, matrix } of weightsAt(f.files, numberOf(parameter), reader.file)) add(matrix, weight, slope, parameter);
  }
  const shape = (d: Float64Array) => numberMatrix(f.rows, f.cols, d);
  requireFinite(shape(value), key);
  return { value: shape(value), by: by.map(shape), size: shape(size) };
}

/** Symmetric (sign 1) or skew (−1) part; throws InputError where the rest is more than rounding. */
function partOf(m: NumberMatrix, sign: 1 | -1, key: string, file: string): NumberMatrix {
  const bound = SYMMETRY_TOLERANCE * largestEntry(m);
  const n = m.rows;
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      const [a, b] = [m.data[i * n + j]!, m.data[j * n + i]!];
      if (Math.abs(a - sign * b) > bound)
        throw new InputError(
          `the ${key} matrix is not ${sign === 1 ? 'symmetric' : 'skew-symmetric'}: entry (${i + 1}, ${j + 1}) is ${a}, entry (${j + 1}, ${i + 1}) is ${b}`,
          {
            file,
            key: `${key}[${i + 1}][${j + 1}]`,
            value: String(a),
            expected: String(sign * b),
            next:
              sign === 1
                ? key === 'quadratic'
                  ? 'give the symmetric matrix S of H = x^T S x/2'
                  : 'a non-symmetric stiffness is not conservative: it has no Hamiltonian'
                : 'the symmetric part of a velocity term is damping',
          },
        );
    }
  return numberBuild(n, n, (i, j) => (m.data[i * n + j]! + sign * m.data[j * n + i]!) / 2);
}

const absolute = (m: NumberMatrix): NumberMatrix => ({ ...m, data: m.data.map(Math.abs) });

/** [[a, b], [bᵀ, c]]. */
function assembled(a: NumberMatrix, b: NumberMatrix, c: NumberMatrix): NumberMatrix {
  const n = a.rows;
  const data = new Float64Array(4 * n * n);
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++) {
      data[i * 2 * n + j] = a.data[i * n + j]!;
      data[i * 2 * n + n + j] = b.data[i * n + j]!;
      data[(n + j) * 2 * n + i] = b.data[i * n + j]!;
      data[(n + i) * 2 * n + n + j] = c.data[i * n + j]!;
    }
  return numberMatrix(2 * n, 2 * n, data);
}

function inverseMass(m: NumberMatrix, file: string): NumberMatrix {
  const n = m.rows;
  let diagonal = true;
  for (let i = 0; i < n && diagonal; i++) for (let j = 0; j < n; j++) if (i !== j && m.data[i * n + j] !== 0) diagonal = false;
  const singular = () =>
    new InputError('the mass matrix is singular', {
      file,
      key: 'mass',
      expected: 'a positive definite mass matrix',
      next: 'eliminate the coordinates without inertia first',
    });
  if (diagonal) {
    for (let i = 0; i < n; i++) if (m.data[i * n + i] === 0) throw singular();
    return numberBuild(n, n, (i, j) => (i === j ? 1 / m.data[i * n + i]! : 0));
  }
  try {
    const inverse = symmetricPart(numberSolve(m, numberIdentity(n)));
    if (largestEntry(inverse) * largestEntry(m) > 1e13) throw singular();
    return inverse;
  } catch (error) {
    if (error instanceof RangeError) throw singular();
    throw error;
  }
}

function quadratic(
  names: readonly string[],
  s: NumberMatrix,
  size: NumberMatrix,
  common: NumberMatrix,
  by: () => NumberMatrix[],
): FloatingEnergy {
  const n = names.length;
  const times = (m: NumberMatrix, x: Float64Array) => numberMultiply(m, numberMatrix(n, 1, x)).data;
  return {
    names,
    gradient: (x) => times(s, x),
    hessian: () => s,
    sizes: (x) => ({ gradient: Math.max(0, ...times(size, x.map(Math.abs))), hessian: size, common }),
    local: (x): FloatingLocal => {
      const hessianBy = by();
      return { hessianBy, gradientBy: hessianBy.map((m) => times(m, x)) };
    },
  };
}

/** S and its derivatives for M, G, K. */
function mechanical(m: Evaluated, g: Evaluated | undefined, k: Evaluated, file: string) {
  const half = (x: NumberMatrix) => numberScale(x, -0.5);
  const mass = partOf(m.value, 1, 'mass', file);
  const inverse = inverseMass(mass, file);
  const n = mass.rows;
  const none = numberMatrix(n, n);
  const gyro = g === undefined ? undefined : partOf(g.value, -1, 'gyroscopic', file);
  const stiffness = partOf(k.value, 1, 'stiffness', file);
  const build = (c: NumberMatrix, gy: NumberMatrix | undefined, st: NumberMatrix) => {
    if (gy === undefined) return assembled(st, none, c);
    const t = numberMultiply(numberTranspose(gy), c); // GᵀM⁻¹
    return assembled(numberCombine(st, numberMultiply(t, gy), 0.25), half(t), c);
  };
  const size = build(absolute(inverse), gyro === undefined ? undefined : absolute(gyro), k.size);
  const by = () =>
    k.by.map((kBy, v) => {
      // product rule, term by term
      const massBy = partOf(m.by[v]!, 1, 'mass', file);
      const inverseBy = numberScale(numberMultiply(inverse, numberMultiply(massBy, inverse)), -1);
      const stiffnessBy = partOf(kBy, 1, 'stiffness', file);
      if (gyro === undefined) return assembled(stiffnessBy, none, inverseBy);
      const gyroBy = partOf(g!.by[v]!, -1, 'gyroscopic', file);
      const t = numberMultiply(numberTranspose(gyro), inverse);
      const tBy = numberCombine(numberMultiply(numberTranspose(gyroBy), inverse), numberMultiply(numberTranspose(gyro), inverseBy));
      const square = numberCombine(numberMultiply(tBy, gyro), numberMultiply(t, gyroBy));
      return assembled(numberCombine(stiffnessBy, square, 0.25), half(tBy), inverseBy);
    });
  const level = (x: NumberMatrix) => {
    const top = largestEntry(x);
    return numberBuild(n, n, () => top);
  };
  const total = absolute(size);
  const corner = (rows: number, cols: number) => numberBuild(n, n, (i, j) => total.data[(i + rows) * 2 * n + j + cols]!);
  const common = assembled(level(corner(0, 0)), level(corner(0, n)), level(corner(n, n)));
  return { s: build(inverse, gyro, stiffness), size: total, common, by };
}

/** The energy of a declaration by matrices; `values` are those of the parameters. Throws InputError. */
export function energyOfMatrices(
  declaration: Declaration,
  definitions: ReadonlyMap<string, Expression>,
  values: ReadonlyMap<string, number>,
  vary: readonly string[],
): FloatingEnergy {
  const { energy, source: file } = declaration;
  const names = [...declaration.coordinates, ...declaration.momenta];
  const reader: Reader = { values, definitions, file, vary };
  if (energy.kind === 'hessian') {
    const family: MatrixFamily = {
      rows: energy.matrix.rows,
      cols: energy.matrix.cols,
      ...(energy.files === undefined ? { constant: energy.matrix } : { files: energy.files }),
      terms: new Map(),
      where: 'quadratic',
    };
    if (family.rows !== names.length || family.cols !== names.length)
      throw new InputError(`the Hessian is ${family.rows} × ${family.cols}`, {
        file,
        key: energy.matrix.source,
        expected: `${names.length} × ${names.length}, for coordinates and momenta`,
      });
    const s = evaluateFamily(family, reader, 'quadratic');
    const top = largestEntry(s.size);
    const common = numberBuild(names.length, names.length, () => top);
    return quadratic(names, partOf(s.value, 1, 'quadratic', file), symmetricPart(s.size), common, () => s.by.map(symmetricPart));
  }
  if (energy.kind !== 'mechanical') throw new RangeError(`an energy of kind ${energy.kind} has no matrices`);
  const { s, size, common, by } = mechanical(
    evaluateFamily(energy.mass, reader, 'mass'),
    energy.gyroscopic === undefined ? undefined : evaluateFamily(energy.gyroscopic, reader, 'gyroscopic'),
    evaluateFamily(energy.stiffness, reader, 'stiffness'),
    file,
  );
  return quadratic(names, s, size, common, by);
}
