/** One door to the matrix formats: the banner or the first character decides, then the ending of the name. */
import { InputError } from '../../errors/index.ts';
import { parseMatrixMarket } from './matrix-market.ts';
import type { MatrixText } from './matrix-text.ts';
import { parseCsv, parseJsonMatrix } from './table.ts';

const ENDINGS = /\.(mtx|mm|csv|tsv|json)$/i;

/** Whether a text names a matrix file rather than being an expression: it ends in .mtx, .mm, .csv, .tsv or .json. */
export function namesMatrixFile(text: string): boolean {
  return ENDINGS.test(text.trim());
}

/** Parses the text of a matrix file. Throws InputError with file and line. */
export function parseMatrix(text: string, file: string): MatrixText {
  if (text.trim() === '')
    throw new InputError(`${file} is empty.`, { file, expected: 'a matrix', next: 'write it in Matrix Market, CSV or JSON' });
  if (text.startsWith('%') || /\.(mtx|mm)$/i.test(file)) return parseMatrixMarket(text, file);
  if (text.trimStart().startsWith('[') || /\.json$/i.test(file)) return parseJsonMatrix(text, file);
  return parseCsv(text, file);
}
