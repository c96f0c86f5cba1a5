/** "Did you mean": the known name nearest to a mistyped one. */

/** Edit distance with transpositions of neighbours (Damerau 1964; Lowrance and Wagner 1975; from memory). */
export function editDistance(a: string, b: string): number {
  const rows: number[][] = [];
  for (let i = 0; i <= a.length; i++) {
    const row: number[] = [i];
    for (let j = 1; j <= b.length; j++) {
      if (i === 0) {
        row.push(j);
        continue;
      }
      const same = a[i - 1] === b[j - 1] ? 0 : 1;
      let d = Math.min(rows[i - 1]![j]! + 1, row[j - 1]! + 1, rows[i - 1]![j - 1]! + same);
      if (i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]) d = Math.min(d, rows[i - 2]![j - 2]! + 1);
      row.push(d);
    }
    rows.push(row);
  }
  return rows[a.length]![b.length]!;
}

/** The candidate closest to `name`, or undefined if none is close (a third of its letters, at least one, may differ). */
export function nearest(name: string, candidates: Iterable<string>): string | undefined {
  if (name.length > 64) return undefined;
  let best: string | undefined;
  let distance = Math.max(1, Math.floor(name.length / 3)) + 1;
  for (const candidate of candidates) {
    if (Math.abs(candidate.length - name.length) >= distance) continue;
    const d = editDistance(name.toLowerCase(), candidate.toLowerCase());
    if (d < distance) {
      best = candidate;
      distance = d;
    }
  }
  return best;
}
