/**
 * The terms that a Hessian is the sum of, before they cancel: an expression is split into addends as far as its sums can be
 * distributed, and the Hessian of each is taken alone. A number that is zero after cancellation is then measured against what cancelled.
 */
import { type NumberMatrix, numberMatrix } from '../linear/index.ts';
import { type Expression, gradientNumeric, hessianNumeric, symbolsOf } from './expression/index.ts';

/** Beyond this number of addends sums are left together. */
export const ADDEND_LIMIT = 4000;

/** Expressions with e as their sum. */
export function addends(e: Expression, limit = ADDEND_LIMIT): Expression[] {
  const whole = [e];
  const fits = (parts: Expression[]) => (parts.length <= limit ? parts : whole);
  switch (e.kind) {
    case 'sum':
      return fits(e.terms.flatMap((t) => addends(t, limit)));
    case 'negate':
      return addends(e.argument, limit).map((argument) => ({ kind: 'negate', argument }));
    case 'quotient':
      return addends(e.numerator, limit).map((numerator) => ({ kind: 'quotient', numerator, denominator: e.denominator }));
    case 'product': {
      let parts: Expression[][] = [[]];
      for (const f of e.factors) {
        const own = addends(f, limit);
        if (parts.length * own.length > limit) return whole;
        parts = parts.flatMap((p) => own.map((x) => [...p, x]));
      }
      return parts.map((factors) => (factors.length === 1 ? factors[0]! : { kind: 'product', factors }));
    }
    default:
      return whole;
  }
}

/** Largest absolute terms in the entries of the gradient and of the Hessian of e at x, entry by entry. */
export interface TermSizes {
  readonly gradient: number;
  readonly hessian: NumberMatrix;
  /** Where entries come from matrices of measured numbers: the largest entry of the matrix each comes from, to which its noise is relative. */
  readonly common?: NumberMatrix;
}

/** `values` are those of the other names. Terms that are not finite are left out: the sum itself is checked elsewhere. */
export function termSizes(e: Expression, names: readonly string[], x: Float64Array, values: ReadonlyMap<string, number>): TermSizes {
  const n = names.length;
  const index = new Map(names.map((name, i) => [name, i]));
  const data = new Float64Array(n * n);
  let gradient = 0;
  for (const term of addends(e)) {
    const symbols = [...symbolsOf(term)];
    const own = symbols.filter((s) => index.has(s));
    if (own.length === 0) continue;
    const all = [...own, ...symbols.filter((s) => !index.has(s))];
    const at = all.map((s) => (index.has(s) ? x[index.get(s)!]! : (values.get(s) ?? Number.NaN)));
    const g = gradientNumeric(term, all)(at);
    const h = hessianNumeric(term, all)(at);
    own.forEach((a, i) => {
      if (Math.abs(g[i]!) > gradient && Number.isFinite(g[i]!)) gradient = Math.abs(g[i]!);
      own.forEach((b, j) => {
        const size = Math.abs(h[i * all.length + j]!);
        const place = index.get(a)! * n + index.get(b)!;
        if (size > data[place]! && Number.isFinite(size)) data[place] = size;
      });
    });
  }
  return { gradient, hessian: numberMatrix(n, n, data) };
}
