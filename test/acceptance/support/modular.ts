/**
 * Ranks of integer matrices by elimination modulo a prime below 2^26, so that products stay exact in a double.
 * Written for the tests alone: shares nothing with the sources. A rank modulo p is at most the true one and differs
 * from it only where p divides a minor, which the small entries here make unlikely (common practice).
 */
export type Mat = number[][];

export const P = 67108859;

const mod = (x: number): number => {
  const r = x % P;
  return r < 0 ? r + P : r;
};

function power(base: number, exponent: number): number {
  let result = 1;
  let b = mod(base);
  for (let e = exponent; e > 0; e = Math.floor(e / 2)) {
    if (e % 2 === 1) result = (result * b) % P;
    b = (b * b) % P;
  }
  return result;
}
export const invert = (x: number): number => power(x, P - 2);

export const reduce = (a: Mat): Mat => a.map((row) => row.map(mod));
export const identity = (n: number): Mat => Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => (i === j ? 1 : 0)));
export const transpose = (a: Mat): Mat => (a[0] ?? []).map((_, j) => a.map((row) => row[j]!));

/** Product modulo p; entries may be any integers below 2^53 in size. */
export function times(a: Mat, b: Mat): Mat {
  const right = reduce(b);
  return a.map((row) => {
    const out = new Array<number>(right[0]?.length ?? 0).fill(0);
    row.forEach((x, k) => {
      const y = mod(x);
      if (y !== 0) {
        const line = right[k]!;
        for (let j = 0; j < out.length; j++) out[j] = (out[j]! + y * line[j]!) % P;
      }
    });
    return out;
  });
}
/** Product over the integers. */
export const timesExact = (a: Mat, b: Mat): Mat =>
  a.map((row) => (b[0] ?? []).map((_, j) => row.reduce((s, x, k) => s + x * b[k]![j]!, 0)));
export const plus = (a: Mat, b: Mat, factor = 1): Mat => a.map((row, i) => row.map((x, j) => x + factor * b[i]![j]!));

/** Reduced row echelon form with its pivot columns. */
export function echelon(a: Mat): { rows: Mat; pivots: number[] } {
  const m = reduce(a);
  const pivots: number[] = [];
  const columns = m[0]?.length ?? 0;
  let r = 0;
  for (let c = 0; c < columns && r < m.length; c++) {
    const at = m.findIndex((row, i) => i >= r && row[c] !== 0);
    if (at < 0) continue;
    [m[r], m[at]] = [m[at]!, m[r]!];
    const pivot = m[r]!;
    const scale = invert(pivot[c]!);
    for (let j = c; j < columns; j++) pivot[j] = (pivot[j]! * scale) % P;
    m.forEach((row, i) => {
      const x = row[c]!;
      if (i !== r && x !== 0) for (let j = c; j < columns; j++) row[j] = (row[j]! + (P - x) * pivot[j]!) % P;
    });
    pivots.push(c);
    r++;
  }
  return { rows: m.slice(0, r), pivots };
}
export const rank = (a: Mat): number => (a.length === 0 ? 0 : echelon(a).pivots.length);

/** Basis of {x : a x = 0} as rows. */
export function kernel(a: Mat, columns: number): Mat {
  const { rows, pivots } = echelon(a);
  const free = Array.from({ length: columns }, (_, j) => j).filter((j) => !pivots.includes(j));
  return free.map((f) => {
    const v = new Array<number>(columns).fill(0);
    v[f] = 1;
    pivots.forEach((p, i) => {
      v[p] = mod(-rows[i]![f]!);
    });
    return v;
  });
}
export function inverse(a: Mat): Mat {
  const n = a.length;
  const { rows, pivots } = echelon(a.map((row, i) => [...row, ...identity(n)[i]!]));
  if (pivots.slice(0, n).some((p, i) => p !== i)) throw new Error('singular');
  return rows.map((row) => row.slice(n));
}
/** Characteristic polynomial by Newton's identities, highest coefficient first; needs n < p. */
export function characteristic(a: Mat): number[] {
  const n = a.length;
  const c = [1];
  const traces: number[] = [];
  let m = identity(n);
  for (let k = 1; k <= n; k++) {
    m = times(m, a);
    traces.push(m.reduce((s, row, i) => (s + row[i]!) % P, 0));
    let sum = 0;
    for (let i = 0; i < k; i++) sum = (sum + c[i]! * traces[k - 1 - i]!) % P;
    c.push(mod(-((sum * invert(k)) % P)));
  }
  return c;
}
/** Number of distinct roots of a polynomial (highest coefficient first) in an algebraic closure: deg f − deg gcd(f, f′). */
export function distinctRoots(f: number[]): number {
  const trim = (g: number[]): number[] => g.slice(Math.max(0, g.findIndex((x) => x !== 0) < 0 ? g.length : g.findIndex((x) => x !== 0)));
  const n = f.length - 1;
  let a = trim(f);
  let b = trim(f.slice(0, -1).map((x, i) => (x * (n - i)) % P));
  while (b.length > 0) {
    const lead = invert(b[0]!);
    let r = a.slice();
    while (r.length >= b.length) {
      const q = (r[0]! * lead) % P;
      for (let i = 0; i < b.length; i++) r[i] = (r[i]! + (P - q) * b[i]!) % P;
      r = r.slice(1);
    }
    [a, b] = [b, trim(r)];
  }
  return n - (a.length - 1);
}
