/**
 * Jordan blocks at zero of L = JS, with signs, by repeated symplectic reduction: no power of L is formed. With K = ker S,
 * K^ω its ω-orthogonal and R = K ∩ K^ω, the form ω on K/R counts the blocks of odd size 1 + 2ℓ, the symmetric form
 * b(r, r') = ω(r, x'), Lx' = r', on R counts and signs the blocks of size 2 + 2ℓ, and on K^ω/R, again symplectic, every longer block
 * has lost its two ends (ℓ = 0, 1, … numbers the reductions). The recursion is written once, over the few operations it needs.
 *
 * Signs are those of ω(v, L^{-(j-1)} v) for even size j: a positive block of size 2, 4, 6 gives S the inertia
 * (positive, negative, zero) = (1,0,1), (1,2,1), (3,2,1). With a complex structure I that preserves S and ω, odd sizes j carry the sign of
 * ω(Iv, L^{-(j-1)} v): for j = 1, the sign of the quadratic Hamiltonian whose flow turns in the sense of I.
 * Normal forms: Galin 1975/1982, Koçak 1984; signs of real nilpotent orbits: Collingwood & McGovern 1993, ch. 9.
 */
import { NotSymplecticError, ShapeError } from '../errors/index.ts';
import type { OrderedField } from '../field/index.ts';
import {
  at,
  beside,
  build,
  congruence,
  echelon,
  type Inertia,
  inertia,
  kernel,
  type Matrix,
  multiply,
  solve,
  transpose,
} from '../linear/index.ts';

/** Blocks of one size; positive + negative = count where they carry signs, else both are 0. */
export interface SignedBlocks {
  readonly size: number;
  readonly count: number;
  readonly positive: number;
  readonly negative: number;
}

/** A zero event: blocks by descending size; kernelDimension their number, generalisedDimension the sum of their sizes. */
export interface ZeroChain {
  readonly blocks: readonly SignedBlocks[];
  readonly kernelDimension: number;
  readonly generalisedDimension: number;
}

/** What the recursion asks of a kind of matrix M; `level` is the number ℓ of the reduction, for records and messages. */
export interface ChainArithmetic<M> {
  columns(a: M): number;
  transpose(a: M): M;
  multiply(a: M, b: M): M;
  /** Kernel of a symmetric matrix as columns, and for y in its image some x with s x = y. */
  split(s: M, level: number): { readonly kernel: M; preimage(y: M): M };
  /** Columns k c, c a basis of the kernel of the skew matrix kᵀ w k. */
  radical(k: M, w: M, level: number): M;
  /** Signature of ω(I·, ·) on the kernel. */
  hermitian(form: M, level: number): Inertia;
  /** Signature of b on the radical r: that of s on the columns x with s x = wᵀ r. */
  chain(s: M, x: M, w: M, level: number): Inertia;
  /** Columns that together with r ⊂ k^ω form a basis of k^ω = {x : kᵀ w x = 0}. */
  reduced(k: M, r: M, w: M): M;
  /** The map i induced on the span of `basis` modulo that of r. */
  induced(i: M, basis: M, r: M): M;
  /** Called where two reductions contradict each other: kernel of dimension `found`, nullity of b before it `expected`. */
  inconsistent(level: number, found: number, expected: number): void;
}

/** The recursion, blocks by descending size. s symmetric, w skew and nondegenerate, i (optional) a complex structure preserving both. */
export function chainBlocks<M>(s: M, w: M, i: M | undefined, a: ChainArithmetic<M>): SignedBlocks[] {
  const blocks: SignedBlocks[] = [];
  const onColumns = (k: M, m: M) => a.multiply(a.transpose(k), a.multiply(m, k));
  const signed = (size: number, count: number, positive: number, negative: number, turned: boolean) =>
    blocks.unshift({ size, count, positive: turned ? negative : positive, negative: turned ? positive : negative });
  let expected: number | undefined;
  for (let level = 0; ; level++) {
    if (a.columns(s) === 0) {
      if (expected !== undefined && expected > 0) a.inconsistent(level, 0, expected);
      break;
    }
    const { kernel: k, preimage } = a.split(s, level);
    const dimension = a.columns(k);
    if (expected !== undefined && dimension !== expected) a.inconsistent(level, dimension, expected);
    if (dimension === 0) break;
    const turned = level % 2 === 1;
    const r = a.radical(k, w, level);
    const odd = dimension - a.columns(r);
    if (odd > 0) {
      const form = i === undefined ? undefined : a.hermitian(onColumns(k, a.multiply(a.transpose(i), w)), level);
      signed(1 + 2 * level, odd, form?.positive ?? 0, form?.negative ?? 0, turned);
    }
    if (a.columns(r) === 0) break;
    const b = a.chain(s, preimage(a.multiply(a.transpose(w), r)), w, level);
    if (b.positive + b.negative > 0) signed(2 + 2 * level, b.positive + b.negative, b.positive, b.negative, turned);
    expected = b.zero;
    const basis = a.reduced(k, r, w);
    if (i !== undefined) i = a.induced(i, basis, r);
    s = onColumns(basis, s);
    w = onColumns(basis, w);
  }
  return blocks;
}

/** Dimensions of the kernel and of the generalised kernel from the blocks. */
export function chainOfBlocks(blocks: readonly SignedBlocks[]): ZeroChain {
  return {
    blocks,
    kernelDimension: blocks.reduce((n, b) => n + b.count, 0),
    generalisedDimension: blocks.reduce((n, b) => n + b.count * b.size, 0),
  };
}

function exactArithmetic<T>(field: OrderedField<T>): ChainArithmetic<Matrix<T>> {
  return {
    columns: (a) => a.cols,
    transpose,
    multiply,
    split: (s) => ({
      kernel: kernel(s),
      preimage: (y) => {
        const x = solve(s, y);
        if (x === undefined) throw new NotSymplecticError('the form is degenerate or not skew: a kernel vector has no preimage');
        return x;
      },
    }),
    radical: (k, w) => multiply(k, kernel(congruence(k, w))),
    hermitian: (form) => inertia(form, field),
    chain: (s, x) => inertia(congruence(x, s), field),
    reduced: (k, r, w) => {
      const orthogonal = kernel(multiply(transpose(k), w));
      const all = beside(r, orthogonal);
      const kept = echelon(all).pivots.filter((p) => p >= r.cols);
      return build(field, all.rows, kept.length, (i, j) => at(all, i, kept[j]!));
    },
    induced: (i, basis, r) => {
      const x = solve(beside(basis, r), multiply(i, basis));
      if (x === undefined) throw new NotSymplecticError('the complex structure does not preserve the quadratic and the symplectic form');
      return build(field, basis.cols, basis.cols, (row, column) => at(x, row, column));
    },
    inconsistent: (level, found, expected) => {
      throw new NotSymplecticError(
        `reduction ${level} has a kernel of dimension ${found}, not ${expected}: the forms are not symmetric and skew`,
      );
    },
  };
}

/**
 * Jordan blocks at zero of L = JS, exactly. S symmetric and W skew nondegenerate (n x n, over `field`); `complexStructure`, if given,
 * is I with I² = -1, IᵀSI = S, IᵀWI = W, and adds signs to the blocks of odd size. With it every count is that of real blocks,
 * twice the count over the complex numbers. Throws ShapeError, and NotSymplecticError where the forms are not as said.
 */
export function zeroChain<T>(s: Matrix<T>, w: Matrix<T>, field: OrderedField<T>, complexStructure?: Matrix<T>): ZeroChain {
  for (const m of [s, w, ...(complexStructure === undefined ? [] : [complexStructure])])
    if (m.rows !== s.rows || m.cols !== s.rows) throw new ShapeError(`a ${m.rows} x ${m.cols} matrix on a space of dimension ${s.rows}`);
  for (let i = 0; i < s.rows; i++)
    for (let j = 0; j <= i; j++) {
      if (!field.equal(at(s, i, j), at(s, j, i))) throw new ShapeError(`the Hessian is not symmetric at (${i + 1}, ${j + 1})`);
      if (!field.isZero(field.add(at(w, i, j), at(w, j, i)))) throw new NotSymplecticError(`the form is not skew at (${i + 1}, ${j + 1})`);
    }
  return chainOfBlocks(chainBlocks(s, w, complexStructure, exactArithmetic(field)));
}
