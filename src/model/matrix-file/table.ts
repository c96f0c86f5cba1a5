/**
 * Matrices as tables: CSV (Y. Shafranovich, RFC 4180, 2005; numbers only, so quotes are optional) and JSON
 * (a list of rows; T. Bray, RFC 8259, 2017). Numbers stay the text that was typed. The whole matrix is exact
 * when no entry has a point or an exponent.
 */
import { InputError } from '../../errors/index.ts';
import type { MatrixEntry, MatrixText } from './matrix-text.ts';
import { FRACTION, INTEGER, MAX_DIMENSION, MAX_ENTRIES, REAL } from './number-text.ts';

const EXPECTED = 'an integer, a fraction or a decimal number';

function wrong(file: string, line: number, value: string, message: string, expected: string, next: string): InputError {
  return new InputError(`${message} (${file}, line ${line})`, { file, value: value.slice(0, 120), expected, next });
}

/** Collects rows of number texts into a matrix, checking that they are numbers and rows of one length. */
class TableBuilder {
  private readonly file: string;
  private readonly entries: MatrixEntry[] = [];
  private cols: number | undefined;
  private rows = 0;
  private exact = true;

  constructor(file: string) {
    this.file = file;
  }

  addRow(cells: readonly string[], line: number): void {
    if (this.cols === undefined) this.cols = cells.length;
    if (cells.length !== this.cols) {
      throw wrong(
        this.file,
        line,
        cells.join(','),
        `Row ${this.rows + 1} has ${cells.length} entries and the first has ${this.cols}`,
        `${this.cols} entries`,
        'complete the row',
      );
    }
    for (let j = 0; j < cells.length; j++) {
      const text = cells[j]!;
      if (INTEGER.test(text) || FRACTION.test(text)) {
        if (!/^[+-]?0+$/.test(text)) this.entries.push({ i: this.rows, j, text: text.replace(/^\+/, '') });
      } else if (REAL.test(text)) {
        this.exact = false;
        this.entries.push({ i: this.rows, j, text: text.replace(/^\+/, '') });
      } else
        throw wrong(
          this.file,
          line,
          text,
          `Entry ${j + 1} of row ${this.rows + 1} is not a number`,
          EXPECTED,
          'write numbers only, without a heading',
        );
    }
    this.rows++;
    if (this.rows > MAX_DIMENSION || cells.length > MAX_DIMENSION || this.rows * this.cols > MAX_ENTRIES) {
      throw wrong(
        this.file,
        line,
        '',
        'The matrix is too large',
        `at most ${MAX_DIMENSION} rows and columns and ${MAX_ENTRIES} entries`,
        'use a sparse Matrix Market file',
      );
    }
  }

  finish(): MatrixText {
    if (this.rows === 0) throw wrong(this.file, 1, '', 'The file holds no rows', 'at least one row of numbers', 'write one row on a line');
    return { rows: this.rows, cols: this.cols ?? 0, entries: this.entries, exact: this.exact, source: this.file };
  }
}

/** Comma, semicolon or tab separated numbers, one row on a line; empty lines and lines with # are passed over. */
export function parseCsv(text: string, file: string): MatrixText {
  const builder = new TableBuilder(file);
  const lines = text.split(/\r\n|\n|\r/);
  for (let k = 0; k < lines.length; k++) {
    const line = lines[k]!.trim();
    if (line === '' || line.startsWith('#')) continue;
    builder.addRow(
      line.split(/[,;\t]/).map((cell) =>
        cell
          .trim()
          .replace(/^"(.*)"$/, '$1')
          .trim(),
      ),
      k + 1,
    );
  }
  return builder.finish();
}

/** A JSON list of rows, each a list of numbers or of number texts such as "1/3". */
export function parseJsonMatrix(text: string, file: string): MatrixText {
  const builder = new TableBuilder(file);
  const token = /\s*(?:([[\],])|"([^"\\\n]*)"|([^\s[\],"{}:]+)|(\S))/y;
  let line = 1;
  const next = (): { mark: string; cell?: string } => {
    const start = token.lastIndex;
    const match = token.exec(text);
    if (match === null) return { mark: 'end' };
    for (let k = start; k < token.lastIndex; k++) if (text[k] === '\n') line++;
    if (match[1] !== undefined) return { mark: match[1] };
    if (match[4] !== undefined) return { mark: match[4] };
    return { mark: 'cell', cell: (match[2] ?? match[3]!).trim() };
  };
  const need = (mark: string, wanted: string): void => {
    if (mark !== wanted)
      throw wrong(
        file,
        line,
        mark === 'end' ? '' : mark,
        'This is not a list of rows',
        `${wanted} in [[…], […]]`,
        'write the matrix as a list of rows',
      );
  };
  need(next().mark, '[');
  let mark: string;
  do {
    need(next().mark, '[');
    const cells: string[] = [];
    do {
      const item = next();
      if (item.cell === undefined)
        throw wrong(file, line, item.mark, 'An entry of a row is missing', EXPECTED, 'write the matrix as a list of rows');
      cells.push(item.cell);
      mark = next().mark;
    } while (mark === ',');
    need(mark, ']');
    builder.addRow(cells, line);
    mark = next().mark;
  } while (mark === ',');
  need(mark, ']');
  if (next().mark !== 'end') throw wrong(file, line, '', 'Something follows the matrix', 'one list of rows', 'remove what follows');
  return builder.finish();
}
