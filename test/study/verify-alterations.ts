/** Random alterations of one number in the text of a result. */

/** A generator of numbers in [0, 1), the same for the same seed (a linear congruence of Knuth's kind, from memory). */
export function random(seed: number): () => number {
  let state = BigInt(seed);
  return () => {
    state = (state * 6364136223846793005n + 1442695040888963407n) & 0xffffffffffffffffn;
    return Number(state >> 11n) / 2 ** 53;
  };
}

/** The text with one run of digits replaced by another; wherever it stands: in a number, a text, a name, a digest. */
export function altered(
  text: string,
  next: () => number,
): { readonly text: string; readonly at: number; readonly from: string; readonly to: string } {
  const runs = [...text.matchAll(/\d+/g)];
  for (;;) {
    const run = runs[Math.floor(next() * runs.length)]!;
    const from = run[0];
    const digits = [...from];
    const place = Math.floor(next() * digits.length);
    digits[place] = `${Math.floor(next() * 10)}`;
    const to = digits.join('');
    // another spelling that JSON does not know, or the same number
    if (to === from || (to.length > 1 && to.startsWith('0') && !/[\w."]/.test(text[run.index - 1] ?? ''))) continue;
    const changed = text.slice(0, run.index) + to + text.slice(run.index + from.length);
    try {
      if (JSON.stringify(JSON.parse(changed)) === JSON.stringify(JSON.parse(text))) continue;
    } catch {
      continue;
    }
    return { text: changed, at: run.index, from, to };
  }
}
