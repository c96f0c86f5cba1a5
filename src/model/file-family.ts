/**
 * Matrices by numbered files at a value of their parameter: the file itself at a listed value, and between two files
 * ((b − c) K_a + (c − a) K_b)/(b − a). The two weights are exactly 0 and 1 at the ends, in doubles too.
 */
import { InputError } from '../errors/index.ts';
import { type Algebraic, type Rational, type RealField, rational, rationals } from '../field/index.ts';
import type { Declaration, EnergyDeclaration, MatrixFamily, NumberedFile, NumberedFiles } from './declaration/declaration.ts';
import { exactNumber } from './declaration/numbered-files.ts';
import { numberedFamilies } from './declaration/texts.ts';
import type { Expression } from './expression/index.ts';
import type { MatrixText } from './matrix-file/index.ts';
import { readQuantities } from './quantities.ts';

/** Said wherever a value lies between two files. */
export const INTERPOLATED = 'between the files the matrix is interpolated';

/** The value of a listed file. */
export function fileValue(file: NumberedFile): Rational {
  const [n, d] = file.value.split('/');
  return rational(BigInt(n!), BigInt(d ?? 1));
}

/**
 * The place among the files of a value with the given order to each of them (sign of value − file): the number of the
 * file below, the one before the last at the upper end. Throws InputError outside.
 */
function pieceOf(files: NumberedFiles, order: (file: NumberedFile) => number, value: string, source: string): number {
  const { nodes, parameter } = files;
  const last = nodes.length - 1;
  if (order(nodes[0]!) < 0 || order(nodes[last]!) > 0)
    throw new InputError(
      `${parameter} = ${value} lies outside the files of ${files.where}, which go from ${nodes[0]!.value} to ${nodes[last]!.value}`,
      {
        file: source,
        key: `parameters.${parameter}`,
        value,
        expected: `a value from ${nodes[0]!.value} to ${nodes[last]!.value}`,
        next: 'choose such a value, or add a file',
      },
    );
  let [low, high] = [0, last];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (order(nodes[middle]!) >= 0) low = middle;
    else high = middle;
  }
  return low;
}

const orderOf =
  (field: RealField, value: Algebraic) =>
  (file: NumberedFile): number => {
    const { n, d } = fileValue(file);
    return field.sign(field.sub(value, field.fromRational(n, d)));
  };

/** Where the declared value of a parameter lies among files; two files need no value. */
function declaredPiece(files: NumberedFiles, declaration: Declaration): number {
  const text = declaration.parameters.get(files.parameter) ?? '';
  const typed = exactNumber(text);
  if (typed !== undefined) return pieceOf(files, (file) => rationals.compare(typed, fileValue(file)), text, declaration.source);
  const { field, values } = readQuantities(declaration);
  const value = values.get(files.parameter);
  if (value === undefined) {
    if (files.nodes.length === 2) return 0;
    throw new InputError(`the parameter ${files.parameter} has no value, and chooses among ${files.nodes.length} files of ${files.where}`, {
      file: declaration.source,
      key: `parameters.${files.parameter}`,
      value: files.parameter,
      expected: `a value from ${files.nodes[0]!.value} to ${files.nodes.at(-1)!.value}`,
      next: `give it one in the file or with --set ${files.parameter}=…`,
    });
  }
  return pieceOf(files, orderOf(field, value), field.format(value), declaration.source);
}

const number = ({ n, d }: Rational): Expression => ({ kind: 'number', n, d });
const minus = (a: Expression, b: Expression): Expression => ({ kind: 'sum', terms: [a, { kind: 'negate', argument: b }] });

/** The two matrices that a family is made of at the declared value, with their weights as expressions in the parameter. */
export function weightedFiles(
  files: NumberedFiles,
  declaration: Declaration,
): { readonly weight: Expression; readonly matrix: MatrixText }[] {
  const k = declaredPiece(files, declaration);
  const ends = [files.nodes[k]!, files.nodes[k + 1]!] as const;
  const [a, b] = ends.map((file) => number(fileValue(file))) as [Expression, Expression];
  const c: Expression = { kind: 'symbol', name: files.parameter };
  const share = (numerator: Expression): Expression => ({ kind: 'quotient', numerator, denominator: minus(b, a) });
  return [
    { weight: share(minus(b, c)), matrix: ends[0].matrix },
    { weight: share(minus(c, a)), matrix: ends[1].matrix },
  ];
}

/** The same in doubles at a value, with the derivatives of the weights. Throws InputError outside the files. */
export function weightsAt(
  files: NumberedFiles,
  value: number,
  source: string,
): { readonly weight: number; readonly slope: number; readonly matrix: MatrixText }[] {
  const at = (file: NumberedFile) => rationals.toNumber(fileValue(file));
  const k = pieceOf(files, (file) => value - at(file), `${value}`, source);
  const [low, high] = [files.nodes[k]!, files.nodes[k + 1]!];
  const [a, b] = [at(low), at(high)];
  return [
    { weight: (b - value) / (b - a), slope: -1 / (b - a), matrix: low.matrix },
    { weight: (value - a) / (b - a), slope: 1 / (b - a), matrix: high.matrix },
  ];
}

/** The values at which one of the families numbered by a parameter has a file, ascending, where all of them are given. */
export function listedValues(energy: EnergyDeclaration, parameter: string): Rational[] {
  const families = numberedFamilies(energy).filter((f) => f.parameter === parameter);
  const all = families.map((f) => f.nodes.map(fileValue));
  const inside = (x: Rational) => all.every((nodes) => rationals.compare(x, nodes[0]!) >= 0 && rationals.compare(x, nodes.at(-1)!) <= 0);
  const sorted = all.flat().filter(inside).sort(rationals.compare);
  return sorted.filter((x, k) => k === 0 || !rationals.equal(x, sorted[k - 1]!));
}

/** Names of the files listed at a value of the parameter. */
export function filesAt(energy: EnergyDeclaration, parameter: string, value: Rational): string[] {
  return numberedFamilies(energy)
    .filter((f) => f.parameter === parameter)
    .flatMap((f) => f.nodes.filter((file) => rationals.equal(fileValue(file), value)).map((file) => file.matrix.source));
}

/** The same energy with each family numbered by the parameter cut down to the two files around [low, high]. */
export function betweenFiles(energy: EnergyDeclaration, parameter: string, low: Rational, high: Rational): EnergyDeclaration {
  const cut = (files: NumberedFiles): NumberedFiles => {
    if (files.parameter !== parameter) return files;
    const after = files.nodes.findIndex((file) => rationals.compare(fileValue(file), high) >= 0);
    const k = Math.max(1, after);
    if (after < 0 || rationals.compare(fileValue(files.nodes[k - 1]!), low) > 0)
      throw new RangeError(`no two files of ${files.where} stand around ${rationals.format(low)} and ${rationals.format(high)}`);
    return { ...files, nodes: [files.nodes[k - 1]!, files.nodes[k]!] };
  };
  const family = (f: MatrixFamily): MatrixFamily => (f.files === undefined ? f : { ...f, files: cut(f.files) });
  if (energy.kind === 'hessian' && energy.files !== undefined) return { ...energy, files: cut(energy.files) };
  if (energy.kind !== 'mechanical') return energy;
  return {
    ...energy,
    mass: family(energy.mass),
    ...(energy.gyroscopic === undefined ? {} : { gyroscopic: family(energy.gyroscopic) }),
    stiffness: family(energy.stiffness),
  };
}

/** A sentence for each family whose matrix at the declared value is interpolated; none at listed values. */
export function interpolationNotes(declaration: Declaration): string[] {
  const { field, values } = readQuantities(declaration);
  return numberedFamilies(declaration.energy).flatMap((files) => {
    const value = values.get(files.parameter);
    if (value === undefined) return [];
    const order = orderOf(field, value);
    const k = pieceOf(files, order, field.format(value), declaration.source);
    const ends = [files.nodes[k]!, files.nodes[k + 1]!];
    if (ends.some((file) => order(file) === 0)) return [];
    const names = ends.map((file) => file.matrix.source).join(' and ');
    return [`${files.parameter} = ${field.format(value)} lies between ${names}: ${INTERPOLATED}`];
  });
}
