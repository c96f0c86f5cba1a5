/** "Did you mean": the known name nearest to a mistyped one. */

/**
 * Optimal string alignment distance: insertions, deletions, substitutions and swaps of neighbours cost 1
 * (F. J. Damerau, A technique for computer detection and correction of spelling errors, Comm. ACM 7, 1964).
 */
export function editDistance(a: string, b: string): number {
  let before: number[] = [];
  let last = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const same = a[i - 1] === b[j - 1];
      let best = Math.min(last[j]! + 1, row[j - 1]! + 1, last[j - 1]! + (same ? 0 : 1));
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) best = Math.min(best, before[j - 2]! + 1);
      row.push(best);
    }
    before = last;
    last = row;
  }
  return last[b.length]!;
}

/** The nearest of `known`, if it is near enough to be a slip: up to a third of the longer length, at least 1. */
export function nearest(word: string, known: Iterable<string>): string | undefined {
  if (word.length > 64) return undefined;
  const lower = word.toLowerCase();
  let best: string | undefined;
  let least = Number.POSITIVE_INFINITY;
  for (const candidate of known) {
    if (Math.abs(candidate.length - word.length) > least || candidate.length > 64) continue;
    const distance = editDistance(lower, candidate.toLowerCase());
    const allowed = Math.max(1, Math.floor(Math.max(word.length, candidate.length) / 3));
    if (distance < least && distance <= allowed && distance < Math.max(word.length, candidate.length)) {
      best = candidate;
      least = distance;
    }
  }
  return best;
}

/** " Did you mean X?" or the empty text, to be appended to a sentence. */
export function didYouMean(word: string, known: Iterable<string>): string {
  const near = nearest(word, known);
  return near === undefined ? '' : ` Did you mean ${near}?`;
}

/** Names joined for a message, at most `limit` of them. */
export function listed(names: Iterable<string>, limit = 30): string {
  const all = [...names];
  return all.length <= limit ? all.join(', ') : `${all.slice(0, limit).join(', ')}, … (${all.length} in all)`;
}
