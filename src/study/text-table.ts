/** Tables for a terminal. */

const GAP = '  ';

/** Columns that a text takes: signs that combine with the one before take none. */
const lengthOf = (text: string): number => [...text].filter((sign) => !/\p{Mark}/u.test(sign)).length;

/**
 * Rows under a head, columns padded to their widest entry, without blanks at the ends of lines. Where the table is
 * wider than `width`, it is set in parts one under the other, each with the first column.
 */
export function textTable(head: readonly string[], rows: readonly (readonly string[])[], width: number): string {
  const all = [head, ...rows];
  const widths = head.map((_, k) => Math.max(...all.map((row) => lengthOf(row[k] ?? ''))));
  const parts: number[][] = [];
  let [part, used] = [[] as number[], widths[0] ?? 0];
  for (let k = 1; k < head.length; k++) {
    const more = GAP.length + widths[k]!;
    if (part.length > 0 && used + more > width) {
      parts.push(part);
      [part, used] = [[], widths[0]!];
    }
    part.push(k);
    used += more;
  }
  parts.push(part);
  return parts
    .map((columns) =>
      all
        .map((row) =>
          [0, ...columns]
            .map((k) => (row[k] ?? '') + ' '.repeat(widths[k]! - lengthOf(row[k] ?? '')))
            .join(GAP)
            .trimEnd(),
        )
        .join('\n'),
    )
    .join('\n\n');
}
