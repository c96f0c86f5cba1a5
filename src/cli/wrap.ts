/** Setting text into lines of a given width. */

/** Widths below this are not worth respecting. */
const NARROWEST = 30;

/** Number of columns that a text takes; combining marks take none. */
export function columns(text: string): number {
  return [...text.normalize('NFC')].filter((sign) => !/\p{Mark}/u.test(sign)).length;
}

/** Breaks one paragraph at blanks; lines after the first begin with `indent` blanks. Words are never cut. */
export function wrapParagraph(paragraph: string, width: number, indent = 0): string {
  const room = Math.max(width, NARROWEST);
  const lines: string[] = [];
  let line = '';
  for (const word of paragraph.split(' ')) {
    const grown = line === '' && lines.length === 0 ? word : line === '' ? ' '.repeat(indent) + word : `${line} ${word}`;
    if (line.trim() !== '' && columns(grown) > room) {
      lines.push(line.trimEnd());
      line = ' '.repeat(indent) + word;
    } else {
      line = grown;
    }
  }
  lines.push(line);
  return lines.join('\n');
}

/** Wraps the lines that are too long, and only those; what follows hangs two columns under the beginning of the line. */
export function wrapText(text: string, width: number | undefined): string {
  if (width === undefined) return text;
  return text
    .split('\n')
    .map((line) => {
      if (columns(line) <= width) return line;
      const lead = /^ */.exec(line)![0];
      return lead + wrapParagraph(line.slice(lead.length), width - lead.length, 2).replaceAll('\n', `\n${lead}`);
    })
    .join('\n');
}
