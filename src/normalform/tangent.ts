/**
 * Tangent spaces of an invariant germ h modulo p, in the invariants up to a degree D. For a finite group the derivatives of h
 * along equivariant fields are the invariants in the Jacobian ideal (average the field), so the codimension is the dimension
 * of the invariant part of the local algebra, less the constants (J. W. Bruce, A. A. du Plessis, C. T. C. Wall,
 * Determinacy and unipotency, Invent. Math. 88 (1987), for determinacy by the unipotent part; place from memory).
 */
import { mulAddMod } from '../field/index.ts';
import { modularKernel } from '../linear/index.ts';
import { type Monomial, monomialsOfDegree } from '../polynomial/index.ts';
import { type Coinvariants, GrowingEchelon, type ModularPolynomial } from './coinvariants.ts';
import { squareProduct } from './modular-action.ts';

export function derivativeOf(f: ModularPolynomial, i: number, p: number): ModularPolynomial {
  const c = String.fromCharCode(i);
  const out = new Map<Monomial, number>();
  for (const [m, x] of f) {
    const first = m.indexOf(c);
    if (first < 0) continue;
    const e = m.lastIndexOf(c) - first + 1;
    out.set(m.slice(0, first) + m.slice(first + 1), mulAddMod(0, e, x, p));
  }
  return out;
}
export function orderOf(f: ModularPolynomial): number {
  let d = Infinity;
  for (const m of f.keys()) d = Math.min(d, m.length);
  return d;
}
/** a + t b. */
export function combine(a: ModularPolynomial, b: ModularPolynomial, t: number, p: number): ModularPolynomial {
  const out = new Map(a);
  for (const [m, x] of b) {
    const y = mulAddMod(out.get(m) ?? 0, t, x, p);
    if (y === 0) out.delete(m);
    else out.set(m, y);
  }
  return out;
}

export interface TangentSpace {
  readonly echelon: GrowingEchelon;
  readonly offsets: readonly number[];
  readonly degree: number;
}

/** Values of x^a ∂_i h for |a| >= order: all of the invariant part of m^order J(h), up to degree D. */
export function tangentSpace(c: Coinvariants, h: ModularPolynomial, degree: number, order = 0, start?: GrowingEchelon): TangentSpace {
  const { n, p } = c.generators;
  const offsets = c.offsets(degree);
  const width = offsets.at(-1)!;
  const echelon = start ?? new GrowingEchelon(width, p);
  const partial = Array.from({ length: n }, (_, i) => derivativeOf(h, i, p));
  const least = Math.min(...partial.map(orderOf));
  // highest shifts first: their products lie in the highest degrees, and once these are full the others add nothing
  let full = width;
  for (let e = degree - least; e >= order; e--) {
    const from = offsets[e + least]!;
    search: for (const shift of monomialsOfDegree(n, e))
      for (const g of partial) {
        while (full > from && echelon.hasPivot(full - 1)) full--;
        if (full <= from) break search;
        const v = new Int32Array(width);
        c.addValuesInPlace(v, offsets, g, shift, degree);
        echelon.addInPlace(v);
      }
  }
  return { echelon, offsets, degree };
}

/** Numbers of invariants of each degree 0 … D outside the space: dimensions of the pieces of the quotient, filtered by degree. */
export function missingByDegree({ echelon, offsets, degree }: TangentSpace): number[] {
  return Array.from({ length: degree + 1 }, (_, e) => {
    let count = 0;
    for (let j = offsets[e]!; j < offsets[e + 1]!; j++) if (!echelon.hasPivot(j)) count++;
    return count;
  });
}

/** The tangent space of the unipotent part: fields of order 2 and nilpotent linear fields that keep the leading form. */
export function unipotentTangentSpace(c: Coinvariants, h: ModularPolynomial, degree: number): TangentSpace {
  const { n, p } = c.generators;
  const offsets = c.offsets(degree);
  const echelon = new GrowingEchelon(offsets.at(-1)!, p);
  const partial = Array.from({ length: n }, (_, i) => derivativeOf(h, i, p));
  for (const a of nilpotentStabiliser(c, h)) {
    const v = new Int32Array(offsets.at(-1)!);
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) {
        const x = a[i * n + j]!;
        if (x === 0) continue;
        const scaled = new Map([...partial[i]!].map(([m, y]) => [m, mulAddMod(0, x, y, p)] as const));
        c.addValuesInPlace(v, offsets, scaled, String.fromCharCode(j), degree);
      }
    echelon.addInPlace(v);
  }
  return tangentSpace(c, h, degree, 2, echelon);
}

/** Equivariant linear fields Ax with ⟨∇h_d, Ax⟩ = 0 that lie in the radical of the algebra they generate (it is nilpotent). */
function nilpotentStabiliser(c: Coinvariants, h: ModularPolynomial): Int32Array[] {
  const { n, p, matrices } = c.generators;
  const d = orderOf(h);
  const leading = new Map([...h].filter(([m]) => m.length === d));
  const partial = Array.from({ length: n }, (_, i) => derivativeOf(leading, i, p));
  const unknowns = n * n;
  const { place, monomials } = c.degree(d);
  const rows = matrices.length * unknowns + monomials.length;
  const data = new Int32Array(rows * unknowns);
  matrices.forEach((g, k) => {
    // (A g - g A)_{ij} = sum_l A_il g_lj - g_il A_lj
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) {
        const r = (k * unknowns + i * n + j) * unknowns;
        for (let l = 0; l < n; l++) {
          data[r + i * n + l] = (data[r + i * n + l]! + g[l * n + j]!) % p;
          data[r + l * n + j] = (data[r + l * n + j]! + p - g[i * n + l]!) % p;
        }
      }
  });
  const base = matrices.length * unknowns;
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++)
      for (const [m, x] of partial[i]!) {
        const at = (base + place.get(insert(m, j))!) * unknowns + i * n + j;
        data[at] = (data[at]! + x) % p;
      }
  const stabiliser = modularKernel({ p, rows, cols: unknowns, data });
  const list = Array.from({ length: stabiliser.rows }, (_, i) => stabiliser.data.slice(i * unknowns, (i + 1) * unknowns));
  if (list.length === 0) return [];
  // the associative algebra they generate, and the radical of its trace form
  const span = new GrowingEchelon(unknowns, p);
  const algebra: Int32Array[] = [];
  const take = (a: Int32Array) => {
    if (span.addInPlace(a.slice())) algebra.push(a);
  };
  list.forEach(take);
  for (let i = 0; i < algebra.length; i++) for (const a of list) take(squareProduct(algebra[i]!, a, n, p));
  const trace = new Int32Array(algebra.length * list.length);
  algebra.forEach((b, r) => {
    list.forEach((a, s) => {
      let t = 0;
      for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) t = mulAddMod(t, a[i * n + j]!, b[j * n + i]!, p);
      trace[r * list.length + s] = t;
    });
  });
  const radical = modularKernel({ p, rows: algebra.length, cols: list.length, data: trace });
  return Array.from({ length: radical.rows }, (_, r) => {
    const out = new Int32Array(unknowns);
    list.forEach((a, s) => {
      const x = radical.data[r * list.length + s]!;
      if (x !== 0) for (let k = 0; k < unknowns; k++) out[k] = mulAddMod(out[k]!, x, a[k]!, p);
    });
    return out;
  });
}
function insert(m: Monomial, v: number): Monomial {
  let i = 0;
  while (i < m.length && m.charCodeAt(i) <= v) i++;
  return m.slice(0, i) + String.fromCharCode(v) + m.slice(i);
}
