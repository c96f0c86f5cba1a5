/**
 * The spectrum of L = JS off zero: clusters of eigenvalues, their Jordan blocks and Krein signatures. Eigenvalues only propose clusters
 * (a block of size k turns an error ε into ε^{1/k}); whether the members of a cluster are one multiple eigenvalue is decided at the mean μ:
 * for μ = iω by the recursion of ../chain.ts on the Hermitian pair S - iωWᵀ, iW, else by the staircase of L - μ. Clusters that fail
 * are split at their widest gap.
 *
 * Krein sign of an eigenvector v of iω, ω > 0: that of -i v*Wv, which is that of the Hamiltonian on its real eigenplane, v*Sv = ω(-i v*Wv).
 * A block of even size j has the sign of ω(v, (L - iω)^{-(j-1)} v), one of odd size that of ω(iv, (L - iω)^{-(j-1)} v), v its eigenvector.
 */
import {
  type NumberMatrix,
  numberBuild,
  numberCongruence,
  numberIdentity,
  numberMatrix,
  numberMultiply,
  numberScale,
  numberSolve,
  numberTranspose,
} from '../../linear/floating.ts';
import { type ComplexNumber, hamiltonianEigenvalues, nullSpaceOfDimension, symmetricEigen } from '../../linear/spectral.ts';
import type { SignedBlocks } from '../chain.ts';
import type { EigenvalueKind } from '../partition-codimension.ts';
import { blocksKey, DEFAULT_TOLERANCE, type Decision, decide, type Run } from './readings.ts';
import { realified, shifted, staircaseRun } from './staircase.ts';
import { chainRun, decideZeroEvent, type FloatingZero, generalisedKernelBasis, prepared, type ZeroOptions } from './zero.ts';

/** Eigenvalues ±iω, ±a or ±a±ib that the numbers show to be one. */
export interface SpectralCluster extends Decision {
  readonly kind: EigenvalueKind;
  /** re ≥ 0, im ≥ 0; exactly 0 is the part that the kind says. */
  readonly value: ComplexNumber;
  /** Algebraic multiplicity of this one eigenvalue. */
  readonly multiplicity: number;
  /** Blocks of this one eigenvalue, by descending size; signs for imaginary ones. */
  readonly blocks: readonly SignedBlocks[];
  /** Signature of -i v*Wv on the generalised eigenspace of +iω; null off the imaginary axis. */
  readonly krein: { readonly positive: number; readonly negative: number } | null;
}

export interface FloatingSpectrum {
  /** By modulus. */
  readonly clusters: readonly SpectralCluster[];
  readonly zero: FloatingZero;
  /** The zero event and all clusters are decided. */
  readonly decided: boolean;
  readonly reason: string | null;
  /** See hamiltonianEigenvalues. */
  readonly defect: number;
}

export type SpectrumOptions = Omit<ZeroOptions, 'complexStructure'>;

interface Problem {
  readonly s: NumberMatrix;
  readonly w: NumberMatrix;
  readonly l: NumberMatrix;
  readonly scale: number;
  readonly tolerance: number;
  /** Eigenvalues nearer than this may belong together. */
  readonly reach: number;
}

/** Signature of the Hermitian form on the whole chains: halves, and the middle of each odd chain, whose sign alternates with the size. */
function kreinOfBlocks(blocks: readonly SignedBlocks[]): { positive: number; negative: number } {
  let positive = 0;
  let negative = 0;
  for (const b of blocks) {
    const half = Math.floor(b.size / 2);
    positive += half * b.count;
    negative += half * b.count;
    if (b.size % 2 === 0) continue;
    positive += half % 2 === 0 ? b.positive : b.negative;
    negative += half % 2 === 0 ? b.negative : b.positive;
  }
  return { positive, negative };
}

/** The recursion at iω on the realified Hermitian pair; counts over the complex numbers. */
function imaginaryRun(p: Problem, frequency: number): (tolerance: number) => Run<SignedBlocks[]> {
  const n = p.s.rows;
  const none = numberMatrix(n, n);
  const hermitian = realified(p.s, numberScale(p.w, frequency));
  const form = realified(p.w, none);
  const i = realified(none, numberIdentity(n));
  const eigen = symmetricEigen(hermitian.data, 2 * n);
  return (tolerance) => {
    const run = chainRun(hermitian, form, i, Math.max(p.scale, frequency), tolerance, eigen);
    const odd = run.answer.some((b) => b.count % 2 === 1 || b.positive % 2 === 1);
    return {
      answer: run.answer.map((b) => ({
        size: b.size,
        count: Math.floor(b.count / 2),
        positive: Math.floor(b.positive / 2),
        negative: Math.floor(b.negative / 2),
      })),
      readings: run.readings,
      contradiction: run.contradiction ?? (odd ? 'a complex space has an odd real dimension' : null),
    };
  };
}

/**
 * An upper bound, by inverse iteration, of the smallest singular value of L - μ, usually within a factor 2. Where it is a thousand
 * tolerances there is no eigenvalue at μ, and no need of a decomposition that costs a hundred times as much.
 */
function distanceToSpectrum(p: Problem, value: ComplexNumber): number {
  const a = shifted(p.l, value);
  const t = numberTranspose(a);
  let v = numberBuild(a.rows, 1, (i) => Math.cos(1 + i * i));
  let bound = Infinity;
  try {
    for (let k = 0; k < 3; k++) {
      v = numberScale(v, 1 / Math.hypot(...v.data));
      v = numberSolve(a, v);
      bound = Math.min(bound, 1 / Math.hypot(...v.data));
      v = numberSolve(t, v);
    }
  } catch (e) {
    // an exactly singular matrix
    if (e instanceof RangeError) return 0;
    throw e;
  }
  return bound;
}

const dimensionOf = (blocks: readonly SignedBlocks[]) => blocks.reduce((d, b) => d + b.size * b.count, 0);

/** Krein form of the eigenvector of a simple iω, by inverse iteration; between -1 and 1. */
function kreinForm(p: Problem, frequency: number): number {
  const n = p.s.rows;
  const a = shifted(p.l, { re: 1e-13 * p.scale, im: frequency });
  let v = numberBuild(2 * n, 1, (i) => Math.cos(1 + i * i));
  for (let k = 0; k < 3; k++) {
    v = numberSolve(a, v);
    v = numberScale(v, 1 / Math.hypot(...v.data));
  }
  // -i v*Wv = 2 xᵀWy for v = x + iy
  const wy = numberMultiply(p.w, numberMatrix(n, 1, v.data.slice(n)));
  return 2 * wy.data.reduce((s, y, i) => s + y * v.data[i]!, 0);
}

function simple(p: Problem, kind: EigenvalueKind, value: ComplexNumber): SpectralCluster {
  const form = kind === 'imaginary' ? kreinForm(p, value.im) : 0;
  const positive = kind === 'imaginary' && form > 0 ? 1 : 0;
  const negative = kind === 'imaginary' && form <= 0 ? 1 : 0;
  const doubtful = kind === 'imaginary' && Math.abs(form) <= p.tolerance;
  return {
    kind,
    value,
    multiplicity: 1,
    blocks: [{ size: 1, count: 1, positive, negative }],
    krein: kind === 'imaginary' ? { positive, negative } : null,
    decided: !doubtful,
    reason: doubtful ? `the Krein form of the eigenvector of ${value.im}i is ${form.toExponential(1)}` : null,
    cause: doubtful ? 'gap' : null,
    readings: [],
    gap: 0,
  };
}

/** The cluster as one eigenvalue of the given kind and multiplicity; `doubt` where it may yet be one although the answer is no. */
function attempt(p: Problem, kind: EigenvalueKind, mean: ComplexNumber, expected: number): { cluster: SpectralCluster; doubt: boolean } {
  const value = { re: kind === 'imaginary' ? 0 : mean.re, im: kind === 'real' ? 0 : mean.im };
  // what lies at zero was decided before, and is no part of a cluster off zero
  const far = Math.hypot(value.re, value.im) <= p.tolerance * p.scale || distanceToSpectrum(p, value) > 1000 * p.tolerance * p.scale;
  const nothing = (): Run<SignedBlocks[]> => ({ answer: [], readings: [], contradiction: null });
  const run = far ? nothing : kind === 'imaginary' ? imaginaryRun(p, value.im) : (t: number) => staircaseRun(p.l, value, p.scale, t);
  const { answer, others, ...decision } = decide(p.tolerance, run, blocksKey);
  const krein = kind === 'imaginary' ? kreinOfBlocks(answer) : null;
  const cluster = { kind, value, multiplicity: dimensionOf(answer), blocks: answer, krein, ...decision };
  const elsewhere = others.some((o) => dimensionOf(o.answer) === expected);
  return { cluster, doubt: cluster.multiplicity !== expected && (elsewhere || decision.cause === 'contradiction') };
}

/** Single linkage: the sets into which the points fall when gaps wider than `reach` separate. */
function components(points: readonly ComplexNumber[], reach: number): ComplexNumber[][] {
  const left = [...points];
  const out: ComplexNumber[][] = [];
  while (left.length > 0) {
    const group = [left.pop()!];
    for (let i = 0; i < group.length; i++)
      for (let j = left.length - 1; j >= 0; j--)
        if (Math.hypot(group[i]!.re - left[j]!.re, group[i]!.im - left[j]!.im) <= reach) group.push(...left.splice(j, 1));
    out.push(group);
  }
  return out;
}

/** The gap whose removal first separates the points. */
function widestGap(points: readonly ComplexNumber[]): number {
  const inside = [points[0]!];
  const outside = points.slice(1);
  let widest = 0;
  while (outside.length > 0) {
    let best = Infinity;
    let index = 0;
    outside.forEach((z, j) => {
      for (const y of inside) {
        const d = Math.hypot(z.re - y.re, z.im - y.im);
        if (d < best) {
          best = d;
          index = j;
        }
      }
    });
    widest = Math.max(widest, best);
    inside.push(...outside.splice(index, 1));
  }
  return widest;
}

/** Points are eigenvalues λ, one of each pair ±λ, folded into the first quadrant. */
function resolve(p: Problem, points: readonly ComplexNumber[]): SpectralCluster[] {
  const n = points.length;
  const mean = { re: points.reduce((s, z) => s + z.re, 0) / n, im: points.reduce((s, z) => s + z.im, 0) / n };
  const [first] = points as [ComplexNumber];
  if (n === 1) return [first.re <= first.im ? simple(p, 'imaginary', { re: 0, im: first.im }) : simple(p, 'real', { re: first.re, im: 0 })];
  const nearImaginary = points.every((z) => z.re <= p.reach);
  const nearReal = points.every((z) => z.im <= p.reach);
  if (n === 2 && !nearImaginary && !nearReal) return [simple(p, 'quadruple', mean)];
  const kinds: [EigenvalueKind, boolean, number][] = [
    ['imaginary', nearImaginary, n],
    ['real', nearReal, n],
    ['quadruple', n % 2 === 0 && points.every((z) => z.re > 0 && z.im > 0), n / 2],
  ];
  const failed: ReturnType<typeof attempt>[] = [];
  for (const [kind, possible, expected] of kinds) {
    if (!possible) continue;
    const a = attempt(p, kind, mean, expected);
    if (a.cluster.multiplicity === expected) return [a.cluster];
    failed.push(a);
  }
  const doubt = failed.find((a) => a.doubt)?.cluster;
  const gap = widestGap(points);
  const parts = gap > 0 ? components(points, gap * (1 - 1e-9)) : [];
  if (parts.length > 1) {
    const split = parts.flatMap((part) => resolve(p, part));
    if (doubt === undefined || split.some((c) => !c.decided)) return split;
    const place = `${doubt.value.re} + ${doubt.value.im}i`;
    return split.map((c) => ({
      ...c,
      decided: false,
      cause: doubt.cause,
      reason: `whether ${n} eigenvalues near ${place} are one: ${doubt.reason}`,
    }));
  }
  const best = doubt ?? failed[0]?.cluster ?? attempt(p, 'quadruple', mean, n / 2).cluster;
  return [
    {
      ...best,
      decided: false,
      cause: best.cause ?? 'contradiction',
      reason: best.reason ?? `${n} eigenvalues coincide, but their blocks fill ${best.multiplicity} dimensions`,
    },
  ];
}

/**
 * Clusters of the eigenvalues of L = JS off zero; s symmetric, w skew nondegenerate, n x n. The cost is that of one decomposition
 * of a 2n x 2n matrix for each candidate cluster, so it is meant for multiplicity spaces. `zero`, if known, saves its decision.
 * Throws ShapeError, InputError, NotSymplecticError, LimitError.
 */
export function floatingSpectrum(s: NumberMatrix, w: NumberMatrix, options: SpectrumOptions = {}, zero?: FloatingZero): FloatingSpectrum {
  const tolerance = options.tolerance ?? DEFAULT_TOLERANCE;
  const event = zero ?? decideZeroEvent(s, w, options);
  const b = prepared(s, w, options);
  const e0 = generalisedKernelBasis(b.s, b.w, event.blocks);
  const rest = nullSpaceOfDimension(numberMultiply(numberTranspose(e0), b.w), s.rows - e0.cols);
  const flow = (hessian: NumberMatrix, form: NumberMatrix) => numberSolve(numberTranspose(form), hessian);
  const { values, defect } = hamiltonianEigenvalues(flow(numberCongruence(rest, b.s), numberCongruence(rest, b.w)));
  const scale = b.scale > 0 ? b.scale : 1;
  const p: Problem = { s: b.s, w: b.w, l: flow(b.s, b.w), scale, tolerance, reach: scale * tolerance ** 0.25 };
  const points = values.filter((_, i) => i % 2 === 0).map((z) => ({ re: Math.abs(z.re), im: Math.abs(z.im) }));
  const clusters = components(points, p.reach)
    .flatMap((group) => resolve(p, group))
    .sort((x, y) => Math.hypot(x.value.re, x.value.im) - Math.hypot(y.value.re, y.value.im));
  const reason = event.reason ?? clusters.find((c) => !c.decided)?.reason ?? null;
  return { clusters, zero: event, decided: reason === null, reason, defect };
}
