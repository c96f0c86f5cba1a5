/**
 * The certified matrices modulo a prime, and what can be counted there without characters or adapted bases: the
 * order of the group as the length of the orbit of a random vector, subspaces spanned by orbits, traces on them,
 * ranks of powers, and the orbit codimension by the adjoint map on a whole space with its symmetry as equations.
 */
import { invMod, mulAddMod, mulMod } from '../field/index.ts';
import {
  type ModularMatrix,
  modularEchelon,
  modularKernel,
  modularMatrix,
  modularMultiply,
  modularRank,
  modularTranspose,
} from '../linear/index.ts';

/** A generator with its sign. */
export interface SignedMatrix {
  readonly matrix: ModularMatrix;
  readonly sign: 1 | -1;
}

/** Elements of a group as products of generators: element i is generator via[i] times element parent[i]. */
export interface Orbit {
  readonly order: number;
  readonly via: readonly number[];
  readonly parent: readonly number[];
  readonly signs: readonly (1 | -1)[];
  readonly reversing: number;
  /** Images of the vector, as keys: two groups acting on the same vector can be compared by them. */
  readonly keys: readonly string[];
}

/** A vector whose entries look random; the same each time. */
export function genericVector(n: number, p: number, seed = 1): Int32Array {
  let state = (0x9e3779b9 ^ seed) >>> 0;
  return Int32Array.from({ length: n }, () => {
    state = (Math.imul(state ^ (state >>> 15), 0x85ebca6b) + 0x6d2b79f5) >>> 0;
    return ((state ^ (state >>> 13)) >>> 0) % p;
  });
}

export function timesVector(a: ModularMatrix, v: Int32Array): Int32Array {
  const out = new Int32Array(a.rows);
  for (let i = 0; i < a.rows; i++) {
    let s = 0;
    for (let j = 0; j < a.cols; j++) {
      const x = a.data[i * a.cols + j]!;
      if (x !== 0 && v[j] !== 0) s = mulAddMod(s, x, v[j]!, a.p);
    }
    out[i] = s;
  }
  return out;
}

/** The orbit of a vector on which a finite group of matrices acts freely; undefined past the limit. */
export function orbitOf(generators: readonly SignedMatrix[], vector: Int32Array, limit: number): Orbit | undefined {
  const keyOf = (v: Int32Array) => v.join(',');
  const points = [vector];
  const keys = [keyOf(vector)];
  const known = new Map([[keys[0]!, 0]]);
  const via = [-1];
  const parent = [-1];
  const signs: (1 | -1)[] = [1];
  for (let i = 0; i < points.length; i++)
    for (let g = 0; g < generators.length; g++) {
      const image = timesVector(generators[g]!.matrix, points[i]!);
      const key = keyOf(image);
      if (known.has(key)) continue;
      if (points.length >= limit) return undefined;
      known.set(key, points.length);
      points.push(image);
      keys.push(key);
      via.push(g);
      parent.push(i);
      signs.push((signs[i]! * generators[g]!.sign) as 1 | -1);
    }
  return { order: points.length, via, parent, signs, reversing: signs.filter((s) => s === -1).length, keys };
}

/** Basis, one vector a row in echelon form, of the span of the orbits of vectors (the columns of a matrix). */
export function orbitSpan(generators: readonly SignedMatrix[], columns: ModularMatrix): ModularMatrix {
  let basis = modularEchelon(modularTranspose(columns)).matrix;
  for (;;) {
    const parts = [basis, ...generators.map((g) => modularMultiply(basis, modularTranspose(g.matrix)))];
    const rows = parts.reduce((s, x) => s + x.rows, 0);
    const data = new Int32Array(rows * basis.cols);
    let at = 0;
    for (const x of parts) {
      data.set(x.data, at);
      at += x.data.length;
    }
    const next = modularEchelon({ p: basis.p, rows, cols: basis.cols, data }).matrix;
    if (next.rows === basis.rows) return next;
    basis = next;
  }
}

/** The map induced on an invariant subspace given by rows in reduced echelon form: coordinates are the entries in the pivot columns. */
export function inducedOn(basis: ModularMatrix, a: ModularMatrix): ModularMatrix {
  const pivots = modularEchelon(basis).pivots;
  const images = modularMultiply(basis, modularTranspose(a));
  const d = basis.rows;
  const out = modularMatrix(basis.p, d, d);
  for (let j = 0; j < d; j++) for (let i = 0; i < d; i++) out.data[i * d + j] = images.data[j * basis.cols + pivots[i]!]!;
  return out;
}

/** Means over the group of χ(g)², χ(g²), σ(g)χ(g)² and σ(g)χ(g²), χ the trace on an invariant subspace. */
export interface TraceMeans {
  readonly squares: number;
  readonly powers: number;
  readonly signedSquares: number;
  readonly signedPowers: number;
}

export function traceMeans(orbit: Orbit, generators: readonly ModularMatrix[], p: number): TraceMeans {
  const d = generators[0]?.rows ?? 0;
  const sums = [0, 0, 0, 0];
  const elements: Int32Array[] = [];
  for (let e = 0; e < orbit.order; e++) {
    const m =
      e === 0
        ? Int32Array.from({ length: d * d }, (_, i) => (i % (d + 1) === 0 ? 1 : 0))
        : modularMultiply(generators[orbit.via[e]!]!, { p, rows: d, cols: d, data: elements[orbit.parent[e]!]! }).data;
    elements.push(m);
    let trace = 0;
    let square = 0;
    for (let i = 0; i < d; i++) {
      trace = (trace + m[i * d + i]!) % p;
      for (let j = 0; j < d; j++) square = mulAddMod(square, m[i * d + j]!, m[j * d + i]!, p);
    }
    const traceSquared = mulMod(trace, trace, p);
    const sign = orbit.signs[e] === 1 ? 1 : p - 1;
    sums[0] = (sums[0]! + traceSquared) % p;
    sums[1] = (sums[1]! + square) % p;
    sums[2] = mulAddMod(sums[2]!, sign, traceSquared, p);
    sums[3] = mulAddMod(sums[3]!, sign, square, p);
  }
  const inverse = invMod(orbit.order % p, p);
  const [squares, powers, signedSquares, signedPowers] = sums.map((s) => centred(mulMod(s, inverse, p), p));
  return { squares: squares!, powers: powers!, signedSquares: signedSquares!, signedPowers: signedPowers! };
}

/** The representative of least size. */
const centred = (x: number, p: number): number => (x > p / 2 ? x - p : x);

/** Nullities of a, a², … until they no longer grow. */
export function nullities(a: ModularMatrix): number[] {
  const out: number[] = [];
  for (let power = a; ; power = modularMultiply(power, a)) {
    const nullity = a.rows - modularRank(power);
    if (nullity === (out.at(-1) ?? 0)) return out;
    out.push(nullity);
  }
}

/** Block sizes, descending, from the nullities of the powers. */
export function blocksOf(dimensions: readonly number[]): number[] {
  const blocks: number[] = [];
  const d = (i: number) => (i === 0 ? 0 : (dimensions[i - 1] ?? dimensions.at(-1)!));
  for (let j = dimensions.length; j >= 1; j--) for (let c = 2 * d(j) - d(j - 1) - d(j + 1); c > 0; c--) blocks.push(j);
  return blocks;
}

/** Basis of the kernel of a^n, n large, one vector a row, reduced echelon. */
export function generalisedKernelModular(a: ModularMatrix): ModularMatrix {
  let power = a;
  for (let e = 1; e < a.rows; e *= 2) power = modularMultiply(power, power);
  return modularEchelon(modularKernel(power)).matrix;
}

const pair = (i: number, j: number) => (i >= j ? (i * (i + 1)) / 2 + j : (j * (j + 1)) / 2 + i);

/** Dimension of the symmetric T with ρᵀTρ = s T for all generators, s = 1 or σ, one basis a row. */
function symmetricForms(d: number, generators: readonly SignedMatrix[], twisted: boolean, p: number): ModularMatrix {
  const unknowns = (d * (d + 1)) / 2;
  const data = new Int32Array(Math.max(1, generators.length) * d * d * unknowns);
  generators.forEach(({ matrix: r, sign }, g) => {
    for (let k = 0; k < d; k++)
      for (let l = 0; l <= k; l++) {
        // T = E_kl + E_lk (E_kk): (ρᵀTρ)_ij = r_ki r_lj + r_li r_kj
        const u = pair(k, l);
        for (let i = 0; i < d; i++)
          for (let j = 0; j < d; j++) {
            let x = mulMod(r.data[k * d + i]!, r.data[l * d + j]!, p);
            if (k !== l) x = mulAddMod(x, r.data[l * d + i]!, r.data[k * d + j]!, p);
            if ((i === k && j === l) || (i === l && j === k)) x = (x + (twisted && sign === -1 ? 1 : p - 1)) % p;
            data[(g * d * d + i * d + j) * unknowns + u] = x;
          }
      }
  });
  return modularKernel({ p, rows: Math.max(1, generators.length) * d * d, cols: unknowns, data });
}

/** Orbit codimension of L by brute force: dim P − rank(T ↦ TL + LᵀT) over all symmetric T with the symmetry of the generators. */
export function bruteCodimension(l: ModularMatrix, generators: readonly SignedMatrix[]): number {
  const d = l.rows;
  const { p } = l;
  if (d === 0) return 0;
  const unknowns = (d * (d + 1)) / 2;
  const group = symmetricForms(d, generators, true, p);
  const cls = generators.some((g) => g.sign === -1) ? symmetricForms(d, generators, false, p).rows : group.rows;
  const images = new Int32Array(group.rows * unknowns);
  for (let r = 0; r < group.rows; r++) {
    const t = modularMatrix(p, d, d);
    for (let i = 0; i < d; i++) for (let j = 0; j < d; j++) t.data[i * d + j] = group.data[r * unknowns + pair(i, j)]!;
    const tl = modularMultiply(t, l);
    for (let i = 0; i < d; i++)
      for (let j = 0; j <= i; j++) images[r * unknowns + pair(i, j)] = (tl.data[i * d + j]! + tl.data[j * d + i]!) % p;
  }
  return cls - modularRank({ p, rows: group.rows, cols: unknowns, data: images });
}
