/**
 * Jordan blocks of a general matrix at one eigenvalue, on orthonormal bases and without powers: the nullities of A, then of A compressed
 * to the orthogonal complement of its kernel, and so on, are the Weyr characteristic (V. N. Kublanovskaya 1966, from memory).
 */
import {
  type NumberMatrix,
  numberAbove,
  numberBeside,
  numberColumns,
  numberCombine,
  numberCongruence,
  numberIdentity,
  numberScale,
} from '../../linear/floating.ts';
import { type ComplexNumber, rightSingular } from '../../linear/spectral.ts';
import type { SignedBlocks } from '../chain.ts';
import { type Reading, type Run, reading } from './readings.ts';

/** The real 2n x 2n matrix of the complex matrix a + ib in the coordinates (real parts, imaginary parts). */
export function realified(a: NumberMatrix, b: NumberMatrix): NumberMatrix {
  return numberAbove(numberBeside(a, numberScale(b, -1)), numberBeside(b, a));
}

/** l - μ, realified where μ is not real. */
export function shifted(l: NumberMatrix, value: ComplexNumber): NumberMatrix {
  const one = numberIdentity(l.rows);
  const real = numberCombine(l, one, -value.re);
  return value.im === 0 ? real : realified(real, numberScale(one, -value.im));
}

/** Blocks without signs of l at the eigenvalue `value`, counted over the complex numbers; singular values are cut at tolerance x scale. */
export function staircaseRun(l: NumberMatrix, value: ComplexNumber, scale: number, tolerance: number): Run<SignedBlocks[]> {
  const unit = scale > 0 ? scale : 1;
  const times = value.im === 0 ? 1 : 2;
  const readings: Reading[] = [];
  const weyr: number[] = [];
  let contradiction: string | null = null;
  for (let a = shifted(l, value); a.rows > 0; ) {
    const { values, v } = rightSingular(a);
    const r = reading(
      weyr.length,
      'staircase',
      values.map((x) => x / unit),
      tolerance,
    );
    readings.push(r);
    const nullity = r.zero.length;
    if (nullity % times === 1) contradiction ??= `a complex kernel has the odd real dimension ${nullity}`;
    if (nullity === 0) break;
    if (nullity > (weyr.at(-1) ?? Infinity)) contradiction ??= `step ${weyr.length} has the nullity ${nullity}, more than the step before`;
    weyr.push(nullity);
    a = numberCongruence(numberColumns(v, 0, r.nonzero.length), a);
  }
  const answer: SignedBlocks[] = [];
  for (let j = weyr.length; j >= 1; j--) {
    const count = Math.max(0, Math.floor((weyr[j - 1]! - (weyr[j] ?? 0)) / times));
    if (count > 0) answer.push({ size: j, count, positive: 0, negative: 0 });
  }
  return { answer, readings, contradiction };
}
