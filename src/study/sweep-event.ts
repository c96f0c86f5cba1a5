/**
 * What happens at one zero on the way: kernel, blocks and codimension at the value of the parameter, exactly where
 * that value lies in a field of the program, else from the blocks in double precision; and what was seen on either
 * side of it.
 */

import { InputError, LimitError } from '../errors/index.ts';
import { decideZeroEvent } from '../event/floating/zero.ts';
import { zeroCodimensionOfPartition } from '../event/partition-codimension.ts';
import { motionOf } from '../event/zero-event.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { largestEntry } from '../linear/index.ts';
import { symmetricEigen } from '../linear/spectral.ts';
import { codimResult } from './codim.ts';
import { linearStudy } from './linear-study.ts';
import { isExact, prepare } from './prepare.ts';
import type { InertiaSummary, Motion } from './result.ts';
import type { BlocksAt } from './sweep-curve.ts';
import type { SweepFamily } from './sweep-family.ts';
import { declarationAt } from './sweep-range.ts';
import { blockEigenvalues, type Place, placeNearZero } from './sweep-spectrum.ts';

export interface ActiveBlock {
  readonly flow: number;
  readonly pairs: number;
}

/** The event in numbers. */
export interface EventNumbers {
  readonly kernel: number;
  readonly dimension: number;
  readonly blocks: readonly number[];
  readonly codimension: number | null;
  readonly codimensionWithoutSymmetry: number | null;
  readonly motion: Motion;
  /** Null where the event does not say, or nothing was asked. */
  readonly versal: boolean | null;
  readonly arithmetic: 'exact' | 'floating';
  /** Pairs of eigenvalues at zero on each flow block that has any. */
  readonly active: readonly ActiveBlock[];
}

/** Smallest change of the critical eigenvalue of S across the event, in units of S and the offset, that counts as transversal. */
const TRANSVERSAL = 1e-6;

/** The event from the blocks in double precision. */
export function floatingEvent(family: SweepFamily, at: BlocksAt): EventNumbers {
  const sizes: number[] = [];
  const active: { flow: number; pairs: number }[] = [];
  let codimension: number | null = 0;
  let kernel = 0;
  const scale = Math.max(1e-300, ...family.flow.map((_, i) => largestEntry(at.flow(i).s)));
  family.flow.forEach((block, i) => {
    const { s, w } = at.flow(i);
    const zero = decideZeroEvent(s, w, {
      scale: Math.min(scale, 1e3 * Math.max(largestEntry(s), 1e-3 * scale)),
      ...(family.tolerance === undefined ? {} : { tolerance: family.tolerance }),
    });
    if (zero.generalisedDimension === 0) return;
    const chi = block.irreducible.beta === 4 ? 2 : 1;
    const partition = zero.blocks.flatMap((b) => new Array<number>(Math.round((b.count / block.cut) * chi)).fill(b.size));
    for (const b of zero.blocks) for (let c = b.count * block.copies; c > 0; c--) sizes.push(b.size);
    kernel += zero.kernelDimension * block.copies;
    active.push({ flow: i, pairs: zero.generalisedDimension / 2 });
    codimension = zero.decided && codimension !== null ? codimension + zeroCodimensionOfPartition(block.symmetryClass, partition) : null;
  });
  sizes.sort((a, b) => b - a);
  return {
    kernel,
    dimension: sizes.reduce((a, b) => a + b, 0),
    blocks: sizes,
    codimension,
    codimensionWithoutSymmetry: codimension === null ? null : zeroCodimensionOfPartition(1, sizes),
    motion:
      codimension === null
        ? 'degenerate'
        : motionOf(
            codimension,
            sizes.every((x) => x === 1),
          ),
    versal: null,
    arithmetic: 'floating',
    active,
  };
}

/** The event exactly, at a value that a model can be given as a text; undefined where the model is then not exact. */
export function exactEvent(
  family: SweepFamily,
  value: { readonly field: RealField; readonly value: Algebraic },
  seen: EventNumbers,
): EventNumbers | undefined {
  const { parameter } = family.range;
  try {
    const at = declarationAt(family.declaration, new Map([[parameter, value.field.format(value.value)]]));
    const prepared = prepare({ ...at, vary: [parameter], parameterCount: 1 });
    if (!isExact(prepared) || !prepared.equilibriumHolds || !prepared.symmetryHolds) return undefined;
    const result = codimResult(linearStudy(prepared), 1);
    if (result.zero === null) return undefined;
    return {
      ...seen,
      kernel: result.zero.kernel,
      dimension: result.zero.dimension,
      blocks: result.zero.blocks,
      codimension: result.zero.codimension,
      codimensionWithoutSymmetry: result.zero.codimensionWithoutSymmetry,
      motion: result.zero.motion,
      versal: result.verdict.versal,
      arithmetic: 'exact',
    };
  } catch (error) {
    // a pole of H, or a field that is too large: the floating answer stands
    if (error instanceof InputError || error instanceof LimitError) return undefined;
    throw error;
  }
}

/** Inertia of S on the whole space from its blocks; eigenvalues within rounding of zero count as zero. */
export function inertiaAt(family: SweepFamily, at: BlocksAt): InertiaSummary {
  let [positive, zero, negative] = [0, 0, 0];
  const whole = family.tolerance === undefined ? 0 : Math.max(...family.adapted.map((_, i) => largestEntry(at.component(i))));
  family.adapted.forEach((b, i) => {
    const copies = b.component.irreducible.dimension / b.cut;
    const m = at.component(i);
    const cut = family.tolerance === undefined ? 1e-11 * largestEntry(m) : family.tolerance * whole;
    for (const x of symmetricEigen(m.data, m.rows).values) {
      if (x > cut) positive += copies;
      else if (x < -cut) negative += copies;
      else zero += copies;
    }
  });
  return { positive, zero, negative };
}

/** What the eigenvalues near zero were seen to do. */
export interface Observation {
  readonly before: Place;
  readonly after: Place;
  readonly motion: 'passes' | 'splits' | 'other';
}

/** Looks at the eigenvalues that are zero at the event but not beside it; `always` are those that are zero beside it too. */
export function observe(active: readonly ActiveBlock[], always: readonly ActiveBlock[], before: BlocksAt, after: BlocksAt): Observation {
  const place = (at: BlocksAt): Place => {
    const all = active.flatMap(({ flow, pairs }) => {
      const idle = always.find((a) => a.flow === flow)?.pairs ?? 0;
      if (pairs <= idle) return [];
      const { s, w } = at.flow(flow);
      return [placeNearZero(blockEigenvalues(s, w), pairs - idle, idle)];
    });
    return all.every((p) => p === all[0]) ? (all[0] ?? 'zero') : 'complex';
  };
  const [a, b] = [place(before), place(after)];
  const motion =
    a === 'imaginary' && b === 'imaginary'
      ? 'passes'
      : (a === 'imaginary' && b === 'real') || (a === 'real' && b === 'imaginary')
        ? 'splits'
        : 'other';
  return { before: a, after: b, motion };
}

/** Whether the critical eigenvalues of S on the components move through zero with nonzero speed. */
export function transversal(components: readonly number[], before: BlocksAt, after: BlocksAt, offset: number): boolean {
  return components.every((i) => {
    const [a, b] = [before.component(i), after.component(i)];
    const smallest = (m: typeof a) => symmetricEigen(m.data, m.rows).values.reduce((s, x) => (Math.abs(x) < Math.abs(s) ? x : s), Infinity);
    const scale = Math.max(largestEntry(a), largestEntry(b));
    return Math.abs(smallest(b) - smallest(a)) > TRANSVERSAL * scale * offset;
  });
}
