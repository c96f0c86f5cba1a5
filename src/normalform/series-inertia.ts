/**
 * Signature, for all small positive e, of a symmetric matrix of power series in e known modulo e^N. Pivots of least order keep
 * the precision: entries stay known modulo e^N, and what is zero to that precision is reported as undecided.
 */
import type { Algebraic, RealField } from '../field/index.ts';

/** Coefficients of 1, e, …, e^(N-1). */
export type Series = readonly Algebraic[];

export interface SeriesInertia {
  readonly positive: number;
  readonly negative: number;
  readonly undecided: number;
}

function orderOf(f: RealField, a: Series): number {
  const k = a.findIndex((x) => !f.isZero(x));
  return k < 0 ? Infinity : k;
}
function add(f: RealField, a: Series, b: Series): Series {
  return a.map((x, i) => f.add(x, b[i]!));
}
/** a * b / c, where the orders of a and b are at least that of c. */
function ratio(f: RealField, a: Series, b: Series, c: Series, order: number): Series {
  const n = a.length;
  const product = new Array<Algebraic>(n + order).fill(f.zero);
  a.forEach((x, i) => {
    if (f.isZero(x)) return;
    for (let j = 0; j < n && i + j < n + order; j++) if (!f.isZero(b[j]!)) product[i + j] = f.add(product[i + j]!, f.mul(x, b[j]!));
  });
  const inverse = f.inv(c[order]!);
  const out = new Array<Algebraic>(n).fill(f.zero);
  for (let k = 0; k < n; k++) {
    const q = f.mul(product[k + order]!, inverse);
    out[k] = q;
    if (f.isZero(q)) continue;
    for (let j = 0; j + order < n && k + j < n; j++)
      if (!f.isZero(c[order + j]!)) product[k + order + j] = f.sub(product[k + order + j]!, f.mul(q, c[order + j]!));
  }
  return out;
}

export function seriesInertia(f: RealField, matrix: readonly (readonly Series[])[]): SeriesInertia {
  const a = matrix.map((row) => row.slice());
  let active = a.map((_, i) => i);
  let positive = 0;
  let negative = 0;
  while (active.length > 0) {
    let best = Infinity;
    let at: [number, number] = [active[0]!, active[0]!];
    for (const i of active)
      for (const j of active) {
        if (j < i) continue;
        const v = orderOf(f, a[i]![j]!);
        if (v < best || (v === best && i === j && at[0] !== at[1])) {
          best = v;
          at = [i, j];
        }
      }
    if (best === Infinity) break;
    const [i, j] = at;
    if (i !== j) {
      // the diagonal entries are of higher order: the sum of the two basis vectors has 2 a_ij on the diagonal
      for (const k of active) a[i]![k] = add(f, a[i]![k]!, a[j]![k]!);
      for (const k of active) a[k]![i] = add(f, a[k]![i]!, a[k]![j]!);
    }
    const pivot = a[i]![i]!;
    if (f.sign(pivot[best]!) > 0) positive++;
    else negative++;
    active = active.filter((k) => k !== i);
    for (const k of active)
      for (const l of active) {
        const q = ratio(f, a[k]![i]!, a[i]![l]!, pivot, best);
        a[k]![l] = a[k]![l]!.map((x, t) => f.sub(x, q[t]!));
      }
  }
  return { positive, negative, undecided: active.length };
}
