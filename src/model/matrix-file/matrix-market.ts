/**
 * Matrix Market files (R. Boisvert, R. Pozo, K. Remington, The Matrix Market Exchange Formats: Initial Design,
 * NISTIR 5935, 1996): `coordinate` and `array`; `real` (floating), `integer` (exact); `general`, `symmetric`,
 * `skew-symmetric`. Strict where the format leaves room: counts must agree, no entry twice, symmetric means square.
 */
import { InputError } from '../../errors/index.ts';
import type { MatrixEntry, MatrixText } from './matrix-text.ts';
import { INTEGER, MAX_DIMENSION, MAX_ENTRIES, REAL } from './number-text.ts';

type Layout = 'coordinate' | 'array';
type Symmetry = 'general' | 'symmetric' | 'skew-symmetric';

interface Banner {
  readonly layout: Layout;
  readonly integer: boolean;
  readonly symmetry: Symmetry;
}

function wrong(file: string, line: number, value: string, message: string, expected: string, next: string): InputError {
  return new InputError(`${message} (${file}, line ${line})`, { file, value: value.slice(0, 120), expected, next });
}

function readBanner(file: string, line: string): Banner {
  const next = 'write a first line such as %%MatrixMarket matrix coordinate real symmetric';
  const bad = (message: string, expected: string, then = next): InputError => wrong(file, 1, line, message, expected, then);
  const words = line.trim().split(/\s+/);
  if (words[0] !== '%%MatrixMarket') throw bad('This is not a Matrix Market file', '%%MatrixMarket at the start of the first line');
  const [object, layout, field, symmetry, ...rest] = words.slice(1).map((word) => word.toLowerCase());
  if (object !== 'matrix') throw bad('Only matrices can be read', 'the object matrix');
  if (layout !== 'coordinate' && layout !== 'array') throw bad('The format is unknown', 'coordinate or array');
  if (field === 'complex') {
    throw bad(
      'A complex matrix cannot be an input: masses, stiffnesses and Hessians are real',
      'the field real or integer',
      'give real and imaginary parts as a real matrix of twice the size',
    );
  }
  if (field === 'pattern') {
    throw bad('A pattern matrix has no values', 'the field real or integer', 'write the values as a third column');
  }
  if (field !== 'real' && field !== 'double' && field !== 'integer') throw bad('The field is unknown', 'real or integer');
  if (symmetry === 'hermitian') throw bad('Hermitian belongs to complex matrices', 'general, symmetric or skew-symmetric');
  if (symmetry !== 'general' && symmetry !== 'symmetric' && symmetry !== 'skew-symmetric') {
    throw bad('The symmetry is unknown', 'general, symmetric or skew-symmetric');
  }
  if (rest.length > 0) throw bad('The first line has more than five words', 'five words');
  return { layout, integer: field === 'integer', symmetry };
}

/** The opposite of a number text. */
function negated(text: string): string {
  return text.startsWith('-') ? text.slice(1) : `-${text.replace(/^\+/, '')}`;
}

/** Where the k-th value of an array file goes: column-major, only the stored triangle. */
function* arrayPlaces(rows: number, cols: number, symmetry: Symmetry): Generator<readonly [number, number]> {
  for (let j = 0; j < cols; j++) {
    const first = symmetry === 'general' ? 0 : symmetry === 'symmetric' ? j : j + 1;
    for (let i = first; i < rows; i++) yield [i, j];
  }
}

function arrayCount(rows: number, cols: number, symmetry: Symmetry): number {
  if (symmetry === 'general') return rows * cols;
  return symmetry === 'symmetric' ? (rows * (rows + 1)) / 2 : (rows * (rows - 1)) / 2;
}

/** Parses the text of a Matrix Market file. Throws InputError with file and line. */
export function parseMatrixMarket(text: string, file: string): MatrixText {
  const lines = text.split(/\r\n|\n|\r/);
  const banner = readBanner(file, lines[0] ?? '');
  const { layout, symmetry } = banner;
  const number = banner.integer ? INTEGER : REAL;
  const what = banner.integer ? 'an integer' : 'a real number';

  let at = 1;
  const skip = (): void => {
    while (at < lines.length && (lines[at]!.startsWith('%') || lines[at]!.trim() === '')) at++;
  };
  skip();
  const sizeLine = lines[at] ?? '';
  const sizes = sizeLine.trim().split(/\s+/);
  const wanted = layout === 'coordinate' ? 3 : 2;
  const sizeText = layout === 'coordinate' ? 'three numbers: rows, columns, entries' : 'two numbers: rows, columns';
  if (sizes.length !== wanted || !sizes.every((word) => /^\d{1,9}$/.test(word))) {
    throw wrong(file, at + 1, sizeLine, 'The size line is wrong', sizeText, 'write it as the first line after the comments');
  }
  const [rows, cols] = [Number(sizes[0]), Number(sizes[1])];
  const count = layout === 'coordinate' ? Number(sizes[2]) : arrayCount(rows, cols, symmetry);
  if (rows > MAX_DIMENSION || cols > MAX_DIMENSION || count > MAX_ENTRIES) {
    throw wrong(
      file,
      at + 1,
      sizeLine,
      'The matrix is too large',
      `at most ${MAX_DIMENSION} rows and columns and ${MAX_ENTRIES} entries`,
      'give a smaller model',
    );
  }
  if (symmetry !== 'general' && rows !== cols) {
    throw wrong(file, at + 1, sizeLine, `A ${symmetry} matrix is square`, 'as many rows as columns', 'write general, or correct the sizes');
  }
  at++;

  const entries: MatrixEntry[] = [];
  const seen = new Set<number>();
  const places = layout === 'array' ? arrayPlaces(rows, cols, symmetry) : undefined;
  let found = 0;
  for (; at < lines.length; at++) {
    const line = lines[at]!.trim();
    if (line === '' || line.startsWith('%')) continue;
    const bad = (message: string, expected: string, next = 'correct that line'): InputError =>
      wrong(file, at + 1, line, message, expected, next);
    if (++found > count)
      throw bad(
        `There are more than the ${count} entries of the size line`,
        `${count} entries`,
        'correct the size line or remove the line',
      );
    const words = line.split(/\s+/);
    let i: number;
    let j: number;
    if (places !== undefined) {
      if (words.length !== 1) throw bad('An array file has one value on a line', what);
      [i, j] = places.next().value as readonly [number, number];
    } else {
      if (words.length !== 3 || !/^-?\d{1,9}$/.test(words[0]!) || !/^-?\d{1,9}$/.test(words[1]!))
        throw bad('An entry is row, column, value', 'three numbers');
      [i, j] = [Number(words[0]) - 1, Number(words[1]) - 1];
      if (i < 0 || i >= rows || j < 0 || j >= cols)
        throw bad('The indices lie outside the matrix', `a row from 1 to ${rows} and a column from 1 to ${cols}`);
      if (symmetry === 'skew-symmetric' && i === j)
        throw bad('A skew-symmetric matrix has a zero diagonal', 'entries strictly below the diagonal');
      if (symmetry !== 'general' && i < j)
        throw bad(`A ${symmetry} file stores the lower triangle`, 'a row number not below the column number');
      if (seen.has(i * cols + j)) throw bad('This entry is given twice', 'each entry once');
      seen.add(i * cols + j);
    }
    const value = words[words.length - 1]!;
    if (!number.test(value)) throw bad('The value is not a number of the declared field', what);
    if (places !== undefined && /^[+-]?0+(\.0*)?$/.test(value)) continue;
    entries.push({ i, j, text: value.replace(/^\+/, '') });
    if (symmetry !== 'general' && i !== j)
      entries.push({ i: j, j: i, text: symmetry === 'symmetric' ? value.replace(/^\+/, '') : negated(value) });
  }
  if (found < count) {
    throw wrong(
      file,
      lines.length,
      '',
      `There are ${found} entries and the size line says ${count}`,
      `${count} entries`,
      'correct the size line or complete the file',
    );
  }
  return { rows, cols, entries, exact: banner.integer, source: file };
}
