/** Systems with a known zero event: exact normal forms, conjugated by random integer symplectic matrices. */
import type { Rational } from '../../../src/field/index.ts';
import { rationals } from '../../../src/field/index.ts';
import { type NumberMatrix, numberBuild, toNumberMatrix } from '../../../src/linear/floating.ts';
import { at, build, congruence, directSum, type Matrix, multiply, transpose, zeroMatrix } from '../../../src/linear/index.ts';

export type Exact = Matrix<Rational>;

export interface Planted {
  readonly s: Exact;
  readonly w: Exact;
}

/** A small generator of pseudo-random numbers (linear congruence, as in common use), so that failures can be repeated. */
export function generator(seed: number): () => number {
  let state = seed >>> 0 || 1;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 32;
  };
}

export const integers = (rows: number, cols: number, entry: (i: number, j: number) => number): Exact =>
  build(rationals, rows, cols, (i, j) => rationals.fromInteger(entry(i, j)));

/** One block of even size and sign: L e_{i+1} = e_i, ω(e_i, e_j) = ± (-1)^i where i + j = size + 1 (numbers from 1). */
export function evenBlock(size: number, sign: 1 | -1): Planted {
  const form = (i: number, j: number) => (i + j === size - 1 ? sign * (i % 2 === 0 ? 1 : -1) : 0);
  return { s: integers(size, size, (i, j) => (i > 0 ? form(i - 1, j) : 0)), w: integers(size, size, form) };
}

/** Two blocks of the same size, on a Lagrangian splitting: L = (N, -Nᵀ); with a number, an eigenvalue pair ±value instead of 0. */
export function pairOfBlocks(size: number, value = 0): Planted {
  const nilpotent = (i: number, j: number) => (j === i + 1 ? 1 : i === j ? value : 0);
  return {
    s: integers(2 * size, 2 * size, (i, j) =>
      i < size && j >= size ? nilpotent(j - size, i) : i >= size && j < size ? nilpotent(i - size, j) : 0,
    ),
    w: integers(2 * size, 2 * size, (i, j) => (i < size && j === i + size ? 1 : i >= size && j === i - size ? -1 : 0)),
  };
}

/** ½ k (q² + p²), frequency |k|. */
export function oscillator(k: number): Planted {
  return { s: integers(2, 2, (i, j) => (i === j ? k : 0)), w: integers(2, 2, (i, j) => j - i) };
}

export function sum(parts: readonly Planted[]): Planted {
  return parts.reduce((a, b) => ({ s: directSum(a.s, b.s), w: directSum(a.w, b.w) }), {
    s: zeroMatrix(rationals, 0, 0),
    w: zeroMatrix(rationals, 0, 0),
  });
}

/** `[size, sign]` for even sizes, `[size, 0]` for a pair of odd ones. */
export function zeroBlocks(list: readonly (readonly [number, 1 | -1 | 0])[]): Planted {
  return sum(list.map(([size, sign]) => (sign === 0 ? pairOfBlocks(size) : evenBlock(size, sign))));
}

/** Change of coordinates x = t y for any invertible t. */
export function transformed({ s, w }: Planted, t: Exact): Planted {
  return { s: congruence(t, s), w: congruence(t, w) };
}

/** To the canonical form [[0, I], [-I, 0]]; w must be monomial with entries ±1. */
export function canonical(p: Planted): Planted {
  const n = p.w.rows;
  const positive: [number, number][] = [];
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) if (rationals.sign(at(p.w, i, j)) > 0) positive.push([i, j]);
  const order = [...positive.map(([q]) => q), ...positive.map(([, r]) => r)];
  return transformed(
    p,
    integers(n, n, (i, j) => (order[j] === i ? 1 : 0)),
  );
}

/** Product of integer shears that preserve the canonical form. */
export function randomSymplectic(n: number, random: () => number): Exact {
  const m = n / 2;
  const small = () => Math.floor(random() * 3) - 1;
  const symmetric = () => {
    const values = Array.from({ length: m * m }, small);
    return (i: number, j: number) => values[Math.min(i, j) * m + Math.max(i, j)]!;
  };
  const one = (i: number, j: number) => (i === j ? 1 : 0);
  const b = symmetric();
  const c = symmetric();
  const upper = Array.from({ length: m * m }, small);
  const a = integers(m, m, (i, j) => (i === j ? 1 : j > i ? upper[i * m + j]! : 0));
  const inverseTransposed = () => {
    // of a unipotent matrix, by back substitution
    const rows = Array.from({ length: m }, (_, i) => Array.from({ length: m }, (_, j) => one(i, j)));
    for (let i = m - 1; i >= 0; i--)
      for (let j = i + 1; j < m; j++) for (let k = 0; k < m; k++) rows[i]![k]! -= upper[i * m + j]! * rows[j]![k]!;
    return transpose(integers(m, m, (i, j) => rows[i]![j]!));
  };
  const shear = integers(n, n, (i, j) => one(i, j) + (i < m && j >= m ? b(i, j - m) : 0));
  const kick = integers(n, n, (i, j) => one(i, j) + (i >= m && j < m ? c(i - m, j) : 0));
  return multiply(directSum(a, inverseTransposed()), multiply(shear, kick));
}

/** Doubles, with symmetric noise of the given size relative to the largest entry. */
export function noisy(s: Exact, noise: number, random: () => number): NumberMatrix {
  const f = toNumberMatrix(s, rationals);
  const size = f.data.reduce((m, x) => Math.max(m, Math.abs(x)), 0);
  const e = Array.from({ length: f.data.length }, () => noise * size * (2 * random() - 1));
  return numberBuild(f.rows, f.cols, (i, j) => f.data[i * f.cols + j]! + e[Math.min(i, j) * f.cols + Math.max(i, j)]!);
}

export const doubles = (a: Exact): NumberMatrix => toNumberMatrix(a, rationals);

/**
 * One block over the complex numbers of size j and sign ε, realified in the coordinates (real parts, imaginary parts), with I = i:
 * L = N, ω the real part of a skew-Hermitian form on the antidiagonal, real for even and imaginary for odd sizes.
 */
export function hermitianBlock(size: number, sign: 1 | -1): Planted & { readonly i: Exact } {
  const n = 2 * size;
  const anti = (r: number, c: number) => (r + c === size - 1 ? sign * (r % 2 === 0 ? 1 : -1) : 0);
  const w = (r: number, c: number): number => {
    const [x, y] = [r % size, c % size];
    const sameHalf = r < size === c < size;
    if (size % 2 === 0) return sameHalf ? anti(x, y) : 0;
    return sameHalf ? 0 : r < size ? anti(x, y) : -anti(x, y);
  };
  const s = (r: number, c: number): number => (r % size === 0 ? 0 : w(r - 1, c));
  const i = (r: number, c: number): number => (r < size && c === r + size ? -1 : r >= size && c === r - size ? 1 : 0);
  return { s: integers(n, n, s), w: integers(n, n, w), i: integers(n, n, i) };
}

/** Direct sum of blocks over the complex numbers. */
export function hermitianSum(list: readonly (readonly [number, 1 | -1])[]): Planted & { readonly i: Exact } {
  const blocks = list.map(([size, sign]) => hermitianBlock(size, sign));
  return { ...sum(blocks), i: blocks.reduce((a, b) => directSum(a, b.i), zeroMatrix(rationals, 0, 0)) };
}
