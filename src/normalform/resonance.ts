/**
 * Resonant monomials z^a z̄^b, ω·(a - b) = 0, and the invariants of Γ among them.
 */
import type { OrderedField } from '../field/index.ts';
import { fromRows, inverse, kernel, type Matrix, multiply } from '../linear/index.ts';
import { exponentsOf, type Monomial, monomialsOfDegree, type Polynomial } from '../polynomial/index.ts';
import { type BirkhoffForm, isResonant } from './birkhoff.ts';
import type { Mode } from './elliptic.ts';
import type { Gaussian, GaussianField } from './gaussian-field.ts';

export interface Resonance {
  /** Integers k with ω·k = 0, the first nonzero one positive. */
  readonly relation: readonly number[];
  /** Σ |k_j|, the degree of the monomial. */
  readonly order: number;
  /** E.g. `z1^2*conj(z2)`; its real and imaginary parts are invariants. */
  readonly generator: string;
}

/** Monomials of degree d that the flow of H2 fixes. */
export function resonantMonomials<T>(f: OrderedField<T>, modes: readonly Mode<T>[], d: number): Monomial[] {
  const n = modes.length;
  return monomialsOfDegree(2 * n, d).filter((m) => {
    const e = exponentsOf(m, 2 * n);
    return isResonant(
      f,
      modes,
      modes.map((_, j) => e[j]! - e[j + n]!),
    );
  });
}

/** Resonances up to a degree that are not sums of shorter ones with the same signs (generators of the invariants beside |z_j|²). */
export function resonancesOf<T>(f: OrderedField<T>, modes: readonly Mode<T>[], degree: number): Resonance[] {
  const n = modes.length;
  const out: Resonance[] = [];
  const k = new Array<number>(n).fill(0);
  const found: number[][] = [];
  const visit = (j: number, left: number) => {
    if (j === n) {
      if (left === 0 && k.some((x) => x !== 0) && k.find((x) => x !== 0)! > 0 && isResonant(f, modes, k)) found.push(k.slice());
      return;
    }
    for (let x = -left; x <= left; x++) {
      k[j] = x;
      visit(j + 1, left - Math.abs(x));
    }
    k[j] = 0;
  };
  for (let order = 2; order <= degree; order++) {
    found.length = 0;
    visit(0, order);
    for (const relation of found) {
      // a shorter relation inside (in either sign) splits the monomial
      const inside = (s: readonly number[], sign: number) =>
        s.every((x, j) => x === 0 || (sign * x * relation[j]! > 0 && Math.abs(x) <= Math.abs(relation[j]!)));
      if (out.some((r) => inside(r.relation, 1) || inside(r.relation, -1))) continue;
      out.push({ relation, order, generator: monomialText(relation) });
    }
  }
  return out;
}
function monomialText(k: readonly number[]): string {
  return k
    .map((x, j) => (x === 0 ? '' : `${x > 0 ? `z${j + 1}` : `conj(z${j + 1})`}${Math.abs(x) === 1 ? '' : `^${Math.abs(x)}`}`))
    .filter((s) => s !== '')
    .join('*');
}

/**
 * Basis of the invariants of Γ and of the torus of H2 in degree d, as polynomials in z, z̄. `generators` are the matrices of Γ on phase
 * space in the field of the normal form; they may reverse time.
 */
export function torusInvariants<T>(b: BirkhoffForm<T>, generators: readonly Matrix<T>[], d: number): Polynomial<Gaussian<T>>[] {
  const { modes, ring, field: f } = b;
  const n = modes.length;
  const complex = ring.field as GaussianField<T>;
  const forms = [
    ...modes.map((m) => m.a.map((x, i) => ({ re: x, im: m.b[i]! }))),
    ...modes.map((m) => m.a.map((x, i) => ({ re: x, im: f.neg(m.b[i]!) }))),
  ];
  // rows: forms; ζ(ρ x) = forms ρ forms^{-1} ζ
  const rows = fromRows(complex, forms);
  const back = inverse(rows);
  const monomials = resonantMonomials(f, modes, d);
  const place = new Map(monomials.map((m, i) => [m, i]));
  const equations: Gaussian<T>[][] = [];
  for (const g of generators) {
    const lifted = { field: complex, rows: g.rows, cols: g.cols, data: g.data.map((x) => complex.real(x)) };
    const m = multiply(multiply(rows, lifted), back);
    const images = Array.from({ length: 2 * n }, (_, i) =>
      ring.linearForm(Array.from({ length: 2 * n }, (_, j) => m.data[i * 2 * n + j]!)),
    );
    const columns = monomials.map((mono, k) => {
      const column = new Array<Gaussian<T>>(monomials.length).fill(complex.zero);
      for (const [name, c] of ring.terms(ring.substitute(ring.term(mono, complex.one), images, ring))) {
        const at = place.get(name);
        if (at !== undefined) column[at] = c;
      }
      column[k] = complex.sub(column[k]!, complex.one);
      return column;
    });
    for (let i = 0; i < monomials.length; i++) equations.push(columns.map((column) => column[i]!));
  }
  if (equations.length === 0) return monomials.map((m) => ring.term(m, complex.one));
  const k = kernel(fromRows(complex, equations, monomials.length));
  return Array.from({ length: k.cols }, (_, j) => ring.fromTerms(monomials.map((m, i) => [m, k.data[i * k.cols + j]!] as const)));
}
