/**
 * Characteristic polynomials by reduction to Hessenberg form (K. Hessenberg 1942, from memory), over a field and modulo a prime.
 * A Hamiltonian matrix has an even one, so it is written in y = λ²; zero eigenvalues are split off.
 */
import { invMod, mulAddMod, mulMod } from '../field/index.ts';
import type { Matrix, ModularMatrix } from '../linear/index.ts';
import type { Univariate } from '../polynomial/index.ts';

/** det(x − a), coefficients by exponent. */
export function characteristicPolynomial<T>(a: Matrix<T>): T[] {
  const f = a.field;
  const n = a.rows;
  const h = Array.from({ length: n }, (_, i) => a.data.slice(i * n, (i + 1) * n));
  for (let k = 0; k + 2 <= n - 1; k++) {
    const p = h.findIndex((row, i) => i > k && !f.isZero(row[k]!));
    if (p < 0) continue;
    if (p !== k + 1) {
      [h[p], h[k + 1]] = [h[k + 1]!, h[p]!];
      for (const row of h) [row[p], row[k + 1]] = [row[k + 1]!, row[p]!];
    }
    const inverse = f.inv(h[k + 1]![k]!);
    for (let i = k + 2; i < n; i++) {
      if (f.isZero(h[i]![k]!)) continue;
      const g = f.mul(h[i]![k]!, inverse);
      const [row, pivot] = [h[i]!, h[k + 1]!];
      for (let j = k; j < n; j++) if (!f.isZero(pivot[j]!)) row[j] = f.sub(row[j]!, f.mul(g, pivot[j]!));
      for (const r of h) if (!f.isZero(r[i]!)) r[k + 1] = f.add(r[k + 1]!, f.mul(g, r[i]!));
    }
  }
  const polynomials: T[][] = [[f.one]];
  for (let k = 0; k < n; k++) {
    const last = polynomials[k]!;
    const next = [f.zero, ...last];
    const take = (g: T, p: readonly T[]) => {
      p.forEach((c, e) => {
        next[e] = f.sub(next[e]!, f.mul(g, c));
      });
    };
    take(h[k]![k]!, last);
    let product = f.one;
    for (let i = k - 1; i >= 0; i--) {
      product = f.mul(product, h[i + 1]![i]!);
      if (f.isZero(product)) break;
      if (!f.isZero(h[i]![k]!)) take(f.mul(product, h[i]![k]!), polynomials[i]!);
    }
    polynomials.push(next);
  }
  return polynomials[n]!;
}

/** The same modulo p. */
export function characteristicModular(a: ModularMatrix): Int32Array {
  const { p, rows: n } = a;
  const h = Array.from({ length: n }, (_, i) => a.data.slice(i * n, (i + 1) * n));
  for (let k = 0; k + 2 <= n - 1; k++) {
    let q = k + 1;
    while (q < n && h[q]![k] === 0) q++;
    if (q === n) continue;
    if (q !== k + 1) {
      [h[q], h[k + 1]] = [h[k + 1]!, h[q]!];
      for (const row of h) [row[q], row[k + 1]] = [row[k + 1]!, row[q]!];
    }
    const pivot = h[k + 1]!;
    const inverse = invMod(pivot[k]!, p);
    for (let i = k + 2; i < n; i++) {
      const row = h[i]!;
      if (row[k] === 0) continue;
      const g = mulMod(row[k]!, inverse, p);
      for (let j = k; j < n; j++) if (pivot[j] !== 0) row[j] = mulAddMod(row[j]!, p - g, pivot[j]!, p);
      for (const r of h) if (r[i] !== 0) r[k + 1] = mulAddMod(r[k + 1]!, g, r[i]!, p);
    }
  }
  const polynomials: Int32Array[] = [Int32Array.of(1)];
  for (let k = 0; k < n; k++) {
    const next = new Int32Array(k + 2);
    next.set(polynomials[k]!, 1);
    const take = (g: number, q: Int32Array) => {
      if (g !== 0) for (let e = 0; e < q.length; e++) if (q[e] !== 0) next[e] = mulAddMod(next[e]!, p - g, q[e]!, p);
    };
    take(h[k]![k]!, polynomials[k]!);
    let product = 1;
    for (let i = k - 1; i >= 0 && product !== 0; i--) {
      product = mulMod(product, h[i + 1]![i]!, p);
      take(mulMod(product, h[i]![k]!, p), polynomials[i]!);
    }
    polynomials.push(next);
  }
  return polynomials[n]!;
}

/** The even part in y = x² without its power of y. */
export function nonzeroSquares<T>(p: readonly T[], isZero: (x: T) => boolean): Univariate<T> {
  const even = p.filter((_, e) => e % 2 === 0);
  const first = even.findIndex((x) => !isZero(x));
  return first < 0 ? [] : even.slice(first);
}
