/** A matrix as it stands in a model: typed as rows, or the name of a matrix file beside the model. */
import { isAbsolute, resolve } from 'node:path';
import type { MatrixText } from '../matrix-file/index.ts';
import { namesMatrixFile, parseMatrix } from '../matrix-file/index.ts';
import { tableOf } from './keys.ts';
import { MATRIX_BYTES, readTextFile } from './text-file.ts';
import { refuse, type YamlNode } from './yaml-reader.ts';

/** A relative path of the declaration, from the folder of the model file. */
export function fromFolder(folder: string, path: string): string {
  return isAbsolute(path) ? path : resolve(folder, path);
}

/** Reads a matrix file that `key` names. Throws InputError. */
export function readMatrixFile(path: string, folder: string, key: string): MatrixText {
  const full = fromFolder(folder, path);
  return { ...parseMatrix(readTextFile(full, MATRIX_BYTES, key), full), source: path };
}

/** A matrix typed in the model (entries are expressions, exact) or named as a file. Throws InputError. */
export function matrixOf(node: YamlNode, folder: string): MatrixText {
  if (node.kind === 'text') {
    if (!namesMatrixFile(node.text)) {
      throw refuse(
        node,
        `${node.key} must be a matrix`,
        'rows [[1, 0], [0, 1]], or a file ending in .mtx, .csv or .json',
        'write the rows or a file name',
      );
    }
    return readMatrixFile(node.text, folder, node.key);
  }
  const table = tableOf(node);
  const entries = table.flatMap((row, i) => row.flatMap((text, j) => (text === '0' ? [] : [{ i, j, text }])));
  return { rows: table.length, cols: table[0]!.length, entries, exact: true, source: node.key };
}
