/** Words into lines of a given width, on a terminal. */

/** Number of columns a text takes: combining marks none, wide East Asian signs two. */
export function columns(text: string): number {
  let total = 0;
  for (const sign of text) {
    if (/\p{Mark}/u.test(sign)) continue;
    total += /[\u1100-\u115f\u2e80-\ua4cf\uac00-\ud7a3\uf900-\ufaff\ufe30-\ufe6f\uff00-\uff60\uffe0-\uffe6]|\p{Emoji_Presentation}/u.test(
      sign,
    )
      ? 2
      : 1;
  }
  return total;
}

/** Lines of at most `width` columns, broken at blanks; a longer word is broken after an operator or a comma if it has one, else stays whole. */
export function wrapWords(text: string, width: number): readonly string[] {
  if (columns(text) <= width) return [text];
  const lines: string[] = [];
  let current = '';
  const push = (word: string, blank: boolean) => {
    const grown = current === '' ? word : `${current}${blank ? ' ' : ''}${word}`;
    if (current !== '' && columns(grown) > width) {
      lines.push(current);
      current = word;
    } else current = grown;
  };
  for (const word of text.split(' ')) {
    if (columns(word) <= width) push(word, true);
    else for (const [i, part] of word.split(/(?<=[-+*/,;)])(?=[^)\s])/u).entries()) push(part, i === 0);
  }
  lines.push(current);
  return lines;
}
