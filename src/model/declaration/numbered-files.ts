/**
 * A matrix given by numbered files: {parameter: c, files: {0: K0.mtx, 1/2: K1.mtx}}, or {parameter: n, files: K-*.mtx}
 * with the whole numbers that stand for the star in the folder. Each file must be square, of the size of the others,
 * and symmetric or skew-symmetric as the key asks.
 */
import { readdirSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import { InputError } from '../../errors/index.ts';
import { type Rational, rational, rationals } from '../../field/index.ts';
import { type MatrixText, namesMatrixFile } from '../matrix-file/index.ts';
import { FRACTION, MAX_ENTRIES, REAL } from '../matrix-file/number-text.ts';
import type { NumberedFiles } from './declaration.ts';
import { asMap, assertKeys, asText, nameOf } from './keys.ts';
import { fromFolder, readMatrixFile } from './matrix-value.ts';
import { refuse, type YamlMap, type YamlNode } from './yaml-reader.ts';

/** Most files of one family. */
export const MAX_FILES = 10_000;
/** Asymmetry of a floating file, relative to its largest entry, that is put down to rounding. */
const ROUNDING = 1e-7;

/** +1 for a symmetric matrix, −1 for a skew-symmetric one. */
export type Parity = 1 | -1;

/** Integer, fraction or decimal as a fraction; undefined for other texts. */
export function exactNumber(text: string): Rational | undefined {
  if (FRACTION.test(text)) {
    const [n, d] = text.replace(/^\+/, '').split('/');
    return rational(BigInt(n!), BigInt(d!));
  }
  if (!REAL.test(text)) return undefined;
  const [digits, exponent = '0'] = text.replace(/^\+/, '').toLowerCase().split('e');
  const [whole, part = ''] = digits!.replace('-', '').split('.');
  const n = BigInt(`${whole}${part}`) * (digits!.startsWith('-') ? -1n : 1n);
  const shift = Number(exponent) - part.length;
  return shift >= 0 ? rational(n * 10n ** BigInt(shift)) : rational(n, 10n ** BigInt(-shift));
}

/** The mapping under a matrix key where it is a family by numbered files; undefined for matrices and for one affine in parameters. */
export function numberedNode(node: YamlNode): YamlMap | undefined {
  if (node.kind !== 'map') return undefined;
  const [files, parameter] = [node.entries.get('files'), node.entries.get('parameter')];
  const starred = files !== undefined && (files.kind === 'map' || (files.kind === 'text' && files.text.includes('*')));
  const named = parameter !== undefined && parameter.kind === 'text' && !namesMatrixFile(parameter.text);
  return starred || named ? node : undefined;
}

interface Listed {
  readonly value: Rational;
  readonly node: YamlNode;
  readonly text: string;
  readonly path: string;
}

/** The values and files that were written, or that stand in the folder. */
function listedFiles(node: YamlNode, folder: string): Listed[] {
  if (node.kind === 'text' && node.text.includes('*')) return found(node, node.text, folder);
  const { entries } = asMap(node, 'a mapping from values to files, {0: K0.mtx, 1: K1.mtx}, or a name with a star, K-*.mtx');
  return [...entries].map(([text, file]): Listed => {
    const value = exactNumber(text);
    if (value === undefined)
      throw refuse(
        file,
        `${text} is not a value of the parameter`,
        'an integer, a fraction or a decimal number',
        'write such as 1/2 or 0.5',
      );
    const path = asText(file, 'a file ending in .mtx, .csv or .json').text;
    if (!namesMatrixFile(path)) throw refuse(file, `${path} is not the name of a matrix file`, 'a file ending in .mtx, .csv or .json');
    return { value, node: file, text, path };
  });
}

function found(node: YamlNode, pattern: string, folder: string): Listed[] {
  const name = basename(pattern);
  const [before, after, ...more] = name.split('*');
  if (after === undefined || more.length > 0 || dirname(pattern).includes('*'))
    throw refuse(node, `${pattern} must hold one star, in the name of the file`, 'a name such as K-*.mtx');
  if (!namesMatrixFile(pattern)) throw refuse(node, `${pattern} is not the name of a matrix file`, 'a name ending in .mtx, .csv or .json');
  const place = fromFolder(folder, dirname(pattern));
  let names: string[];
  try {
    names = readdirSync(place);
  } catch {
    throw refuse(node, `The folder ${place} cannot be read`, 'a folder with numbered files', 'correct the path');
  }
  const out = names.flatMap((file): Listed[] => {
    if (!file.startsWith(before!) || !file.endsWith(after) || file.length <= before!.length + after.length) return [];
    const text = file.slice(before!.length, file.length - after.length);
    if (!/^\d{1,15}$/.test(text)) return [];
    const path = dirname(pattern) === '.' && !pattern.startsWith('.') ? file : join(dirname(pattern), file);
    return [{ value: rational(BigInt(text)), node, text: `${BigInt(text)}`, path }];
  });
  if (out.length === 0)
    throw refuse(node, `No file in ${place} has a whole number for the star of ${pattern}`, 'files such as K-1.mtx, K-2.mtx');
  out.sort((a, b) => rationals.compare(a.value, b.value) || (a.path < b.path ? -1 : 1));
  const numbers = out.map((f) => f.value.n);
  const gap = numbers.findIndex((n, k) => k > 0 && n > numbers[k - 1]! + 1n);
  if (gap > 0) {
    const [last, next] = [numbers[gap - 1]!, numbers[gap]!];
    const missing = next === last + 2n ? `number ${last + 1n} is missing` : `numbers ${last + 1n} to ${next - 1n} are missing`;
    throw refuse(
      node,
      `Among the files ${pattern} the ${missing}`,
      'consecutive whole numbers',
      'add the files, or list those there are: files: {0: K-0.mtx, 10: K-10.mtx}',
    );
  }
  return out;
}

/** A number of a matrix file as a double. */
const double = (text: string): number => {
  const [n, d] = text.split('/');
  return d === undefined ? Number(n) : Number(n) / Number(d);
};

function requireParity(matrix: MatrixText, parity: Parity, node: YamlNode, key: string): void {
  const at = new Map(matrix.entries.map((e) => [e.i * matrix.cols + e.j, e.text]));
  const bound = matrix.exact ? 0 : ROUNDING * matrix.entries.reduce((m, e) => Math.max(m, Math.abs(double(e.text))), 0);
  for (const { i, j, text } of matrix.entries) {
    const other = at.get(j * matrix.cols + i) ?? '0';
    const agrees = matrix.exact
      ? rationals.equal(exactNumber(text)!, parity === 1 ? exactNumber(other)! : rationals.neg(exactNumber(other)!))
      : Math.abs(double(text) - parity * double(other)) <= bound;
    if (agrees) continue;
    throw refuse(
      node,
      `${matrix.source} is not ${parity === 1 ? 'symmetric' : 'skew-symmetric'}: entry (${i + 1}, ${j + 1}) is ${text}, entry (${j + 1}, ${i + 1}) is ${other}`,
      `a ${parity === 1 ? 'symmetric' : 'skew-symmetric'} matrix in every file of ${key}`,
      parity === 1 ? 'correct the file' : 'the symmetric part of a velocity term is damping',
    );
  }
}

/** Reads a family by numbered files. Throws InputError with file, key, value, expectation and advice. */
export function numberedFilesOf(node: YamlMap, folder: string, parity: Parity): NumberedFiles {
  assertKeys(node, ['parameter', 'files']);
  const [name, files] = [node.entries.get('parameter'), node.entries.get('files')];
  if (name === undefined) throw refuse(node, `${node.key} has files and no parameter`, 'parameter: the name that numbers the files');
  if (files === undefined)
    throw refuse(node, `${node.key} has a parameter and no files`, 'files: {0: K0.mtx, 1: K1.mtx}, or files: K-*.mtx');
  const parameter = nameOf(name);
  const list = listedFiles(files, folder).sort((a, b) => rationals.compare(a.value, b.value));
  list.forEach((file, k) => {
    const before = list[k - 1];
    if (before !== undefined && rationals.equal(before.value, file.value))
      throw refuse(
        file.node,
        `The value ${rationals.format(file.value)} of ${parameter} has two files, ${before.path} and ${file.path}`,
        'one file for each value',
        'remove one of them',
      );
  });
  if (list.length < 2) throw refuse(files, `${files.key} has ${list.length === 1 ? 'one file' : 'no file'}`, 'at least two files');
  if (list.length > MAX_FILES) throw refuse(files, `${files.key} has ${list.length} files`, `at most ${MAX_FILES} files`);
  let entries = 0;
  let size: MatrixText | undefined;
  const nodes = list.map(({ value, node: at, path }) => {
    const matrix = readMatrixFile(path, folder, at.key);
    if (matrix.rows !== matrix.cols) throw refuse(at, `${path} is ${matrix.rows} × ${matrix.cols}`, 'a square matrix');
    size ??= matrix;
    if (matrix.rows !== size.rows)
      throw refuse(
        at,
        `${path} is ${matrix.rows} × ${matrix.cols} and ${size.source} is ${size.rows} × ${size.cols}`,
        'matrices of one size',
      );
    entries += matrix.entries.length;
    if (entries > MAX_ENTRIES)
      throw new InputError(`The files of ${node.key} hold more than ${MAX_ENTRIES} entries.`, {
        file: node.file,
        key: files.key,
        expected: `at most ${MAX_ENTRIES} entries in all`,
        next: 'give fewer files, or sparse ones',
      });
    requireParity(matrix, parity, at, node.key);
    return { value: rationals.format(value), matrix };
  });
  return { parameter, nodes, where: node.key };
}
