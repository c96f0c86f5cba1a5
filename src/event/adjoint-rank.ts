/**
 * The orbit codimension by the rank of the adjoint map, modulo a prime:
 * codim = dim P − rank( T ∈ 𝔤₀ ↦ [JT, L] ) on a space with forms S and W and with operators of the
 * symmetry. In symmetric form [JT, L] is J (TL + LᵀT) (V. I. Arnold, On matrices depending on
 * parameters, 1971, section 3).
 * @source Arnold1971
 */
import type { CompressedElement } from '../action/index.ts';
import type { Algebraic, Reduction } from '../field/index.ts';
import { type Matrix, type ModularMatrix, modularKernel, modularMultiply, modularRank, modularTranspose } from '../linear/index.ts';

/** An element of the compressed group algebra on a multiplicity space: h(g), h(g⁻¹) and σ(g). */
export type ClassOperator = CompressedElement;

/** dim P, dim 𝔤₀ and the orbit codimension. */
export interface AdjointRank {
  readonly dimensionOfClass: number;
  readonly dimensionOfGroup: number;
  readonly codimension: number;
}

export function reduceMatrix(a: Matrix<Algebraic>, reduction: Reduction): ModularMatrix {
  return { p: reduction.p, rows: a.rows, cols: a.cols, data: Int32Array.from(a.data, (x) => reduction.apply(x)) };
}

const pairIndex = (i: number, j: number) => (i >= j ? (i * (i + 1)) / 2 + j : (j * (j + 1)) / 2 + i);

/** Symmetric X with hᵀ X = s X h⁻ for every operator; coordinates X_ij, i ≥ j, one solution a row. */
function invariantForms(n: number, operators: readonly { h: ModularMatrix; k: ModularMatrix; s: 1 | -1 }[], p: number): ModularMatrix {
  const unknowns = (n * (n + 1)) / 2;
  const rows = operators.length * n * n;
  const data = new Int32Array(rows * unknowns);
  const add = (at: number, v: number) => {
    const t = data[at]! + v;
    data[at] = t >= p ? t - p : t;
  };
  operators.forEach(({ h, k, s }, o) => {
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) {
        const row = (o * n * n + i * n + j) * unknowns;
        for (let l = 0; l < n; l++) {
          const a = h.data[l * n + i]!; // (hᵀX)_ij = Σ h_li X_lj
          if (a !== 0) add(row + pairIndex(l, j), a);
          const b = k.data[l * n + j]!; // (X k)_ij = Σ X_il k_lj
          if (b !== 0) add(row + pairIndex(i, l), s === 1 ? p - b : b);
        }
      }
  });
  return modularKernel({ p, rows, cols: unknowns, data });
}

function unpack(n: number, forms: ModularMatrix, r: number): ModularMatrix {
  const data = new Int32Array(n * n);
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) data[i * n + j] = data[j * n + i] = forms.data[r * forms.cols + pairIndex(i, j)]!;
  return { p: forms.p, rows: n, cols: n, data };
}

/** The tangent space of an orbit: the forms TL + LᵀT, T in a basis of 𝔤₀, one a row, coordinates (i, j) with i ≥ j at i(i+1)/2 + j. */
export interface AdjointImage {
  readonly dimensionOfClass: number;
  readonly dimensionOfGroup: number;
  readonly image: ModularMatrix;
}

/** `fields` are infinitesimal symmetries ξ that fix the equilibrium: ξᵀX + Xξ = 0 for the class and for 𝔤₀. */
export function adjointImage(
  l: Matrix<Algebraic>,
  operators: readonly ClassOperator[],
  reduction: Reduction,
  fields: readonly Matrix<Algebraic>[] = [],
): AdjointImage {
  const n = l.rows;
  const p = reduction.p;
  const unknowns = (n * (n + 1)) / 2;
  if (n === 0) return { dimensionOfClass: 0, dimensionOfGroup: 0, image: { p, rows: 0, cols: 0, data: new Int32Array(0) } };
  const reduced = operators.map((o) => ({ h: reduceMatrix(o.matrix, reduction), k: reduceMatrix(o.inverse, reduction), sign: o.sign }));
  const continuous = fields.map((m) => reduceMatrix(m, reduction)).map((m) => ({ h: m, k: m, s: -1 as const }));
  const group = invariantForms(n, [...reduced.map(({ h, k, sign }) => ({ h, k, s: sign })), ...continuous], p);
  const dimensionOfClass = operators.every((o) => o.sign === 1)
    ? group.rows
    : invariantForms(n, [...reduced.map(({ h, k }) => ({ h, k, s: 1 as const })), ...continuous], p).rows;
  const lm = reduceMatrix(l, reduction);
  const images = new Int32Array(group.rows * unknowns);
  for (let r = 0; r < group.rows; r++) {
    const tl = modularMultiply(unpack(n, group, r), lm);
    const lt = modularTranspose(tl);
    for (let i = 0; i < n; i++)
      for (let j = 0; j <= i; j++) {
        const s = tl.data[i * n + j]! + lt.data[i * n + j]!;
        images[r * unknowns + pairIndex(i, j)] = s >= p ? s - p : s;
      }
  }
  return { dimensionOfClass, dimensionOfGroup: group.rows, image: { p, rows: group.rows, cols: unknowns, data: images } };
}

/** Codimension of the orbit of L in the class given by the operators (none: no symmetry). L is n x n. */
export function adjointRank(
  l: Matrix<Algebraic>,
  operators: readonly ClassOperator[],
  reduction: Reduction,
  fields: readonly Matrix<Algebraic>[] = [],
): AdjointRank {
  const { dimensionOfClass, dimensionOfGroup, image } = adjointImage(l, operators, reduction, fields);
  return { dimensionOfClass, dimensionOfGroup, codimension: dimensionOfClass - modularRank(image) };
}

/** Coordinates of a symmetric matrix in the order of `AdjointImage`, modulo the prime of the reduction. */
export function formCoordinates(form: Matrix<Algebraic>, reduction: Reduction): Int32Array {
  const n = form.rows;
  const out = new Int32Array((n * (n + 1)) / 2);
  for (let i = 0; i < n; i++) for (let j = 0; j <= i; j++) out[pairIndex(i, j)] = reduction.apply(form.data[i * n + j]!);
  return out;
}

/** A piece of a space that splits into `copies` spaces on each of which L looks the same. */
export interface RepeatedBlock {
  readonly l: Matrix<Algebraic>;
  readonly copies: number;
}

/**
 * Orbit codimension without symmetry of a space that is the sum of repeated blocks: the dimension of
 * {T symmetric : TL + LᵀT = 0}, counted pair by pair of blocks.
 */
export function adjointRankWithoutSymmetry(blocks: readonly RepeatedBlock[], reduction: Reduction): number {
  const p = reduction.p;
  const mats = blocks.map((b) => ({ m: reduceMatrix(b.l, reduction), copies: b.copies }));
  let total = 0;
  for (let a = 0; a < mats.length; a++) {
    const { m, copies } = mats[a]!;
    const n = m.rows;
    if (n === 0) continue;
    total += copies * symmetricSolutions(m, p);
    if (copies > 1) total += ((copies * (copies - 1)) / 2) * mixedSolutions(m, m, p);
    for (let b = a + 1; b < mats.length; b++) if (mats[b]!.m.rows > 0) total += copies * mats[b]!.copies * mixedSolutions(m, mats[b]!.m, p);
  }
  return total;
}

/** Dimension of {T : TB + AᵀT = 0}, A a x a, B b x b. */
function mixedSolutions(a: ModularMatrix, b: ModularMatrix, p: number): number {
  const [m, n] = [a.rows, b.rows];
  const data = new Int32Array(m * n * m * n);
  const cols = m * n;
  for (let i = 0; i < m; i++)
    for (let j = 0; j < n; j++) {
      const row = (i * n + j) * cols;
      for (let k = 0; k < n; k++) {
        const at = row + i * n + k;
        data[at] = (data[at]! + b.data[k * n + j]!) % p;
      }
      for (let k = 0; k < m; k++) {
        const at = row + k * n + j;
        data[at] = (data[at]! + a.data[k * m + i]!) % p;
      }
    }
  return cols - modularRank({ p, rows: cols, cols, data });
}

/** Dimension of {T symmetric : TL + LᵀT = 0}. */
function symmetricSolutions(l: ModularMatrix, p: number): number {
  const n = l.rows;
  const unknowns = (n * (n + 1)) / 2;
  const data = new Int32Array(unknowns * unknowns);
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      const row = pairIndex(i, j) * unknowns;
      for (let k = 0; k < n; k++) {
        const u = row + pairIndex(i, k);
        data[u] = (data[u]! + l.data[k * n + j]!) % p;
        const v = row + pairIndex(k, j);
        data[v] = (data[v]! + l.data[k * n + i]!) % p;
      }
    }
  return unknowns - modularRank({ p, rows: unknowns, cols: unknowns, data });
}
