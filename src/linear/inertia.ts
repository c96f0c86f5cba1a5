/** Exact signature of a symmetric matrix over an ordered field (Lagrange's reduction; Sylvester 1852, from memory). */
import type { OrderedField } from '../field/index.ts';
import { at, type Matrix } from './matrix.ts';

export interface Inertia {
  readonly positive: number;
  readonly zero: number;
  readonly negative: number;
}

/** Numbers of positive, zero and negative squares of the form x ↦ xᵀ s x; s must be symmetric. */
export function inertia<T>(s: Matrix<T>, field: OrderedField<T>): Inertia {
  const n = s.rows;
  const a = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => at(s, i, j)));
  let active = Array.from({ length: n }, (_, i) => i);
  let positive = 0;
  let negative = 0;
  while (active.length > 0) {
    const p = active.find((i) => !field.isZero(a[i]![i]!));
    if (p !== undefined) {
      const d = a[p]![p]!;
      if (field.sign(d) > 0) positive++;
      else negative++;
      const inv = field.inv(d);
      active = active.filter((i) => i !== p);
      for (const i of active) {
        if (field.isZero(a[i]![p]!)) continue;
        const g = field.mul(a[i]![p]!, inv);
        for (const j of active) a[i]![j] = field.sub(a[i]![j]!, field.mul(g, a[p]![j]!));
      }
      continue;
    }
    // all diagonal entries vanish: a nonzero pair spans a hyperbolic plane
    let found: [number, number] | undefined;
    outer: for (const i of active)
      for (const j of active)
        if (j > i && !field.isZero(a[i]![j]!)) {
          found = [i, j];
          break outer;
        }
    if (found === undefined) break;
    const [p0, q0] = found;
    positive++;
    negative++;
    const inv = field.inv(a[p0]![q0]!);
    active = active.filter((i) => i !== p0 && i !== q0);
    for (const i of active) {
      const u = field.mul(a[i]![p0]!, inv);
      const v = field.mul(a[i]![q0]!, inv);
      if (field.isZero(u) && field.isZero(v)) continue;
      // subtract u * row(q0) + v * row(p0)
      for (const j of active) a[i]![j] = field.sub(a[i]![j]!, field.add(field.mul(u, a[q0]![j]!), field.mul(v, a[p0]![j]!)));
    }
  }
  return { positive, zero: active.length, negative };
}
