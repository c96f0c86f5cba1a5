/** What a floating-point decision looked at: every number that was counted as zero or as nonzero. */
import type { SignedBlocks } from '../chain.ts';

/** Verdicts need the largest number counted as zero to lie this far below the smallest counted as nonzero. */
export const LARGEST_GAP_RATIO = 1e-3;

/** Relative to the scale of the problem. Noise of 1e-10 in the Hessian is told from zero by a wide margin (see the tests). */
export const DEFAULT_TOLERANCE = 1e-7;

/** Numbers compared with one cut; all are absolute values, relative to the natural size of their quantity. */
export interface Reading {
  /** Number of the reduction, or of the step of a staircase. */
  readonly level: number;
  /**
   * hessian: eigenvalues of S; form: singular values of ω on ker S; chain: eigenvalues of b, as those of S on L⁻¹R;
   * hermitian: eigenvalues of ω(I·,·) on ker S; staircase: singular values of L - λ.
   */
  readonly quantity: 'hessian' | 'form' | 'chain' | 'hermitian' | 'staircase';
  readonly cut: number;
  /** Ascending. */
  readonly zero: readonly number[];
  readonly nonzero: readonly number[];
}

/** Sorts the absolute values at the cut. */
export function reading(level: number, quantity: Reading['quantity'], values: Iterable<number>, cut: number): Reading {
  const all = Array.from(values, Math.abs).sort((a, b) => a - b);
  return { level, quantity, cut, zero: all.filter((x) => x <= cut), nonzero: all.filter((x) => x > cut) };
}

/** Largest counted as zero over smallest counted as nonzero; 0 where one of the two kinds is missing. */
export function gapRatio(r: Reading): number {
  const top = r.zero.at(-1);
  const bottom = r.nonzero[0];
  return top === undefined || bottom === undefined ? 0 : top / bottom;
}

/** A decision and its grounds. */
export interface Decision {
  readonly decided: boolean;
  /** Why not; null if decided. */
  readonly reason: string | null;
  /** Kind of the reason: two steps contradict each other, two numbers lie too near, or the answer moves with the tolerance. */
  readonly cause: 'contradiction' | 'gap' | 'tolerance' | null;
  readonly readings: readonly Reading[];
  /** Largest gapRatio of the readings. */
  readonly gap: number;
}

/** One run of a procedure at one tolerance. */
export interface Run<B> {
  readonly answer: B;
  readonly readings: readonly Reading[];
  /** A contradiction met on the way, or null. */
  readonly contradiction: string | null;
}

const show = (x: number) => x.toExponential(1);

/**
 * Runs a procedure at the tolerance, ten times it and a tenth of it. Undecided if it contradicts itself, if a gap is too small, or if
 * the answer moves; `key` says when two answers are the same.
 */
export function decide<B>(
  tolerance: number,
  run: (tolerance: number) => Run<B>,
  key: (answer: B) => string,
): Decision & { readonly answer: B; readonly others: readonly { readonly tolerance: number; readonly answer: B }[] } {
  const middle = run(tolerance);
  const others = [tolerance * 10, tolerance / 10].map((t) => ({ tolerance: t, answer: run(t).answer }));
  const moved = others.find((o) => key(o.answer) !== key(middle.answer));
  const worst = middle.readings.reduce<Reading | undefined>(
    (w, r) => (gapRatio(r) > (w === undefined ? 0 : gapRatio(w)) ? r : w),
    undefined,
  );
  const gap = worst === undefined ? 0 : gapRatio(worst);
  let reason: string | null = null;
  let cause: Decision['cause'] = null;
  if (middle.contradiction !== null) {
    cause = 'contradiction';
    reason = middle.contradiction;
  } else if (worst !== undefined && gap > LARGEST_GAP_RATIO) {
    cause = 'gap';
    reason = `${show(worst.zero.at(-1)!)} was counted as zero and ${show(worst.nonzero[0]!)} as nonzero (${worst.quantity}, reduction ${worst.level}): their ratio ${show(gap)} is above ${show(LARGEST_GAP_RATIO)}`;
  } else if (moved !== undefined) {
    cause = 'tolerance';
    reason = `the answer is ${key(middle.answer)} at tolerance ${show(tolerance)} and ${key(moved.answer)} at ${show(moved.tolerance)}`;
  }
  return { decided: reason === null, reason, cause, readings: middle.readings, gap, answer: middle.answer, others };
}

/** Blocks as text, e.g. `4+ 2+ 2- 1 1`; equal for equal signed blocks. `none` if there is none. */
export function blocksKey(blocks: readonly SignedBlocks[]): string {
  const words = blocks.flatMap(({ size, count, positive, negative }) =>
    positive + negative === 0
      ? new Array<string>(count).fill(`${size}`)
      : [...new Array<string>(positive).fill(`${size}+`), ...new Array<string>(negative).fill(`${size}-`)],
  );
  return words.length === 0 ? 'none' : words.join(' ');
}
