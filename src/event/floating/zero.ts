/**
 * The zero event of a floating-point Hessian: the recursion of ../chain.ts on orthonormal bases, with every number that was counted
 * as zero or as nonzero on record. Eigenvalues of L are never looked at: a block of size k turns an error ε into ε^{1/k}.
 */
import { InputError, NotSymplecticError, ShapeError } from '../../errors/index.ts';
import {
  largestEntry,
  type NumberMatrix,
  numberAbove,
  numberAt,
  numberBuild,
  numberColumns,
  numberMultiply,
  numberSolve,
  numberTranspose,
  orthonormalise,
  requireFinite,
  symmetricPart,
} from '../../linear/floating.ts';
import { nullSpaceOfDimension, rightSingular, type SymmetricEigen, symmetricEigen } from '../../linear/spectral.ts';
import { type ChainArithmetic, chainBlocks, chainOfBlocks, type SignedBlocks, type ZeroChain } from '../chain.ts';
import { blocksKey, DEFAULT_TOLERANCE, type Decision, decide, type Reading, type Run, reading } from './readings.ts';
import { balanceScaling, type CanonicalPair } from './scaling.ts';

export interface ZeroOptions {
  /** Largest term that went into the entries of the whole Hessian before it was split; default: its largest entry. */
  readonly scale?: number;
  /** Entrywise bounds of those terms (n x n); allows the coordinates to be balanced. */
  readonly terms?: NumberMatrix;
  /** Irreducible copies that scale together, see balanceScaling. */
  readonly pairs?: readonly CanonicalPair[];
  /** Relative to the scale; default 1e-7. */
  readonly tolerance?: number;
  /** I with I² = -1 preserving S and ω: signs for the blocks of odd size. */
  readonly complexStructure?: NumberMatrix;
}

export interface FloatingZero extends ZeroChain, Decision {
  /** Signature of S. */
  readonly inertia: { readonly positive: number; readonly zero: number; readonly negative: number };
  /** Scale of the balanced Hessian, to which the readings are relative. */
  readonly scale: number;
  readonly tolerance: number;
  /** Blocks at ten times and at a tenth of the tolerance. */
  readonly others: readonly { readonly tolerance: number; readonly blocks: readonly SignedBlocks[] }[];
}

/** One run of the recursion. w should be near canonical; `scale` is that of s, `eigen` its decomposition. */
export function chainRun(
  s: NumberMatrix,
  w: NumberMatrix,
  i: NumberMatrix | undefined,
  scale: number,
  tolerance: number,
  eigen: SymmetricEigen,
): Run<SignedBlocks[]> {
  const readings: Reading[] = [];
  let contradiction: string | null = null;
  const contradict = (message: string) => {
    contradiction ??= message;
  };
  const unit = scale > 0 ? scale : 1;
  // pseudo-inverse of the present S, and by how much an error of S, in units of the scale, is magnified in ω on its kernel
  let inverse: (y: NumberMatrix) => NumberMatrix = (y) => y;
  let spread = 1;
  const signature = (form: NumberMatrix, kind: 'chain' | 'hermitian', level: number, size: number, cut: number) => {
    const values = symmetricEigen(form.data, form.rows).values.map((x) => x / size);
    readings.push(reading(level, kind, values, cut));
    const positive = values.filter((x) => x > cut).length;
    const negative = values.filter((x) => x < -cut).length;
    return { positive, zero: values.length - positive - negative, negative };
  };
  const arithmetic: ChainArithmetic<NumberMatrix> = {
    columns: (a) => a.cols,
    transpose: numberTranspose,
    multiply: numberMultiply,
    split: (m, level) => {
      const { values, vectors } = level === 0 ? eigen : symmetricEigen(m.data, m.rows);
      const r = reading(
        level,
        'hessian',
        values.map((x) => x / unit),
        tolerance,
      );
      readings.push(r);
      const isZero = (x: number) => Math.abs(x / unit) <= tolerance;
      const indices = Array.from(values.keys());
      const kernelIndices = indices.filter((k) => isZero(values[k]!));
      const others = indices.filter((k) => !isZero(values[k]!));
      const kernel = numberBuild(m.rows, kernelIndices.length, (row, k) => numberAt(vectors, row, kernelIndices[k]!));
      const rest = numberBuild(m.rows, others.length, (row, k) => numberAt(vectors, row, others[k]!));
      inverse = (y: NumberMatrix) => {
        const c = numberMultiply(numberTranspose(rest), y);
        return numberMultiply(
          rest,
          numberBuild(c.rows, c.cols, (k, j) => numberAt(c, k, j) / values[others[k]!]!),
        );
      };
      return { kernel, preimage: inverse };
    },
    radical: (k, form, level) => {
      const images = numberMultiply(form, k);
      // an error E of S turns the kernel k by -S⁺Ek, and changes kᵀwk by at most |E| |S⁺wk|
      spread = Math.max(1, unit * largestEntry(inverse(images)));
      const { values, v } = rightSingular(numberMultiply(numberTranspose(k), images));
      const r = reading(level, 'form', values, tolerance * spread);
      readings.push(r);
      if (r.nonzero.length % 2 === 1) contradict(`ω has odd rank ${r.nonzero.length} on the kernel (reduction ${level})`);
      return numberMultiply(k, numberColumns(v, r.nonzero.length, k.cols));
    },
    hermitian: (form, level) => signature(form, 'hermitian', level, 1, tolerance * spread),
    chain: (m, x, form, level) => {
      // b is S on the columns x: on an orthonormal basis q of them it changes by |E| directly and by |E| |Sq| |S⁺wq| as the kernel turns
      const q = orthonormalise(x);
      const mq = numberMultiply(m, q);
      const turn = Math.max(1, largestEntry(mq) * largestEntry(inverse(numberMultiply(form, q))));
      return signature(numberMultiply(numberTranspose(q), mq), 'chain', level, unit, tolerance * turn);
    },
    reduced: (k, r, form) =>
      nullSpaceOfDimension(numberAbove(numberMultiply(numberTranspose(k), form), numberTranspose(r)), k.rows - k.cols - r.cols),
    induced: (map, basis) => numberMultiply(numberTranspose(basis), numberMultiply(map, basis)),
    inconsistent: (level, found, expected) => contradict(`reduction ${level} has a kernel of dimension ${found}, not ${expected}`),
  };
  const answer = chainBlocks(s, w, i, arithmetic);
  return { answer, readings, contradiction };
}

function validated(s: NumberMatrix, w: NumberMatrix, options: ZeroOptions): void {
  const n = s.rows;
  const named: [string, NumberMatrix | undefined][] = [
    ['Hessian', s],
    ['symplectic', w],
    ['terms', options.terms],
    ['complexStructure', options.complexStructure],
  ];
  for (const [name, m] of named) {
    if (m === undefined) continue;
    if (m.rows !== n || m.cols !== n) throw new ShapeError(`${name} is ${m.rows} x ${m.cols} on a space of dimension ${n}`, { key: name });
    requireFinite(m, name);
  }
  const size = largestEntry(w);
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++)
      if (Math.abs(numberAt(w, i, j) + numberAt(w, j, i)) > 1e-12 * size)
        throw new NotSymplecticError(`the symplectic form is not skew at (${i + 1}, ${j + 1})`, { key: 'symplectic' });
  const { tolerance, scale } = options;
  if (tolerance !== undefined && !(tolerance > 0 && tolerance < 1))
    throw new InputError('the tolerance must lie between 0 and 1', {
      key: 'tolerance',
      value: String(tolerance),
      expected: 'a number such as 1e-7',
    });
  if (scale !== undefined && !(scale >= 0 && scale < Infinity))
    throw new InputError('the scale must be finite and not negative', { key: 'scale', value: String(scale) });
}

/** Checked, canonical, balanced coordinates of a floating problem. */
export function prepared(
  s: NumberMatrix,
  w: NumberMatrix,
  options: ZeroOptions,
): { s: NumberMatrix; w: NumberMatrix; scale: number; i: NumberMatrix | undefined; transform: NumberMatrix } {
  validated(s, w, options);
  const symmetric = symmetricPart(s);
  const size = Math.max(options.scale ?? 0, largestEntry(symmetric));
  const uniform = options.scale === undefined ? undefined : numberBuild(s.rows, s.cols, () => size);
  const b = balanceScaling(symmetric, w, options.terms ?? uniform, options.pairs);
  const i = options.complexStructure;
  return {
    s: b.s,
    w: b.w,
    scale: b.scale,
    i: i === undefined ? undefined : numberSolve(b.transform, numberMultiply(i, b.transform)),
    transform: b.transform,
  };
}

/**
 * Jordan blocks of L = JS at zero with signs (as zeroChain does exactly), and whether the numbers decide them. s symmetric (its symmetric
 * part is used), w skew nondegenerate, both n x n: the whole space or one multiplicity space. With a complex structure every count is
 * that of real blocks. Undecided, with the reason, where a number counted as zero comes too near one counted as nonzero, where the
 * answer moves with the tolerance, or where two reductions contradict each other.
 * Throws ShapeError, InputError, NotSymplecticError.
 */
export function decideZeroEvent(s: NumberMatrix, w: NumberMatrix, options: ZeroOptions = {}): FloatingZero {
  const p = prepared(s, w, options);
  const tolerance = options.tolerance ?? DEFAULT_TOLERANCE;
  const eigen = symmetricEigen(p.s.data, p.s.rows);
  const d = decide(tolerance, (t) => chainRun(p.s, p.w, p.i, p.scale, t, eigen), blocksKey);
  const cut = tolerance * p.scale;
  const { values } = eigen;
  const positive = values.filter((x) => x > cut).length;
  const negative = values.filter((x) => x < -cut).length;
  return {
    ...chainOfBlocks(d.answer),
    decided: d.decided,
    reason: d.reason,
    cause: d.cause,
    readings: d.readings,
    gap: d.gap,
    inertia: { positive, zero: values.length - positive - negative, negative },
    scale: p.scale,
    tolerance,
    others: d.others.map((o) => ({ tolerance: o.tolerance, blocks: o.answer })),
  };
}

/**
 * Orthonormal basis (n x generalised dimension) of the generalised kernel of L = JS, its Jordan blocks being known:
 * E_{j+1} = {x : Sx ∈ WᵀE_j}, of dimension Σ min(j + 1, size). No power of L.
 */
export function generalisedKernelBasis(
  s: NumberMatrix,
  w: NumberMatrix,
  blocks: readonly { readonly size: number; readonly count: number }[],
): NumberMatrix {
  const longest = blocks.reduce((m, b) => Math.max(m, b.size), 0);
  const n = s.rows;
  let e = numberBuild(n, 0, () => 0);
  for (let j = 1; j <= longest; j++) {
    const dimension = blocks.reduce((d, b) => d + b.count * Math.min(j, b.size), 0);
    let map = s;
    if (e.cols > 0) {
      const q = orthonormalise(numberMultiply(numberTranspose(w), e));
      const inside = numberMultiply(q, numberMultiply(numberTranspose(q), s));
      map = numberBuild(n, n, (a, b) => numberAt(s, a, b) - numberAt(inside, a, b));
    }
    e = nullSpaceOfDimension(map, dimension);
  }
  return e;
}
