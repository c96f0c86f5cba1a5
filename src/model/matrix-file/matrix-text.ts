/**
 * A matrix as text: sizes and the entries that were written, each as the text that stood in the source.
 * No arithmetic happens here; the exact layer reads the texts.
 */

/** One written entry; indices count from 0, entries that are absent are 0. */
export interface MatrixEntry {
  readonly i: number;
  readonly j: number;
  readonly text: string;
}

/**
 * A rows × cols matrix in sparse text form. `exact` is false when the source says that its numbers are
 * floating (Matrix Market `real`; CSV or JSON files with a point or an exponent). `source` names the file,
 * or the key for a matrix typed in the model itself, whose entries are expressions and exact.
 */
export interface MatrixText {
  readonly rows: number;
  readonly cols: number;
  readonly entries: readonly MatrixEntry[];
  readonly exact: boolean;
  readonly source: string;
}

/** The dense table of entry texts, rows of '0' where nothing was written. */
export function denseTexts(matrix: MatrixText): string[][] {
  const dense = Array.from({ length: matrix.rows }, () => new Array<string>(matrix.cols).fill('0'));
  for (const { i, j, text } of matrix.entries) dense[i]![j] = text;
  return dense;
}
