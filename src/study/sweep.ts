/**
 * `sweep`: the equilibrium along one parameter. Every zero of a component and every collision on the way, located to
 * the last digits (exactly, where S is a rational function of the parameter), what the theory says of it and what was
 * seen on either side, and the curves for a picture.
 */
import type { Declaration } from '../model/declaration/index.ts';
import { isExact, prepare } from './prepare.ts';
import type { InertiaSummary, Motion, StudyResult } from './result.ts';
import { CAUTION, componentSummaries, groupSummary, modelSummary } from './summary.ts';
import { type SweepCollision, sweepCollisions, type Tracks, tracksOf } from './sweep-collisions.ts';
import { type BlocksAt, blockEvaluator, type Curve, type CurvePoint, sweepCurve } from './sweep-curve.ts';
import { type EventNumbers, exactEvent, floatingEvent, inertiaAt, type Observation, observe, transversal } from './sweep-event.ts';
import { type SweepFamily, sweepFamily } from './sweep-family.ts';
import { type FileTable, fileSweep } from './sweep-files.ts';
import { type ZeroChart, zeroChart } from './sweep-grid.ts';
import { formatRational } from './sweep-range.ts';
import { type Zeros, zerosOfFamily, zerosOnCurve } from './sweep-zeros.ts';
import { thresholdFormulas } from './threshold-formula.ts';

/** A zero event on the way. */
export interface Crossing {
  readonly parameter: string;
  readonly value: number;
  /** In closed form, or null. */
  readonly exact: string | null;
  /** In the other parameters, where there are some. */
  readonly formula?: string;
  /** Defining polynomial of a value without closed form, and the value to 30 digits. */
  readonly polynomial?: string;
  readonly digits?: string;
  /** Label of the component; labels joined by + where several meet zero at once. */
  readonly component: string;
  readonly kernel: number;
  readonly dimension: number;
  readonly blocks: readonly number[];
  readonly motion: Motion;
  readonly codimension: number | null;
  readonly codimensionWithoutSymmetry: number | null;
  readonly versal: boolean | null;
  readonly observed: Observation;
  /** Whether the motion seen is the one predicted; null where there is no prediction. */
  readonly agrees: boolean | null;
  readonly inertiaBefore: InertiaSummary;
  readonly inertiaAfter: InertiaSummary;
  readonly arithmetic: 'exact' | 'floating';
  /** True where the branch itself turns back. */
  readonly fold?: boolean;
  /** The files below and above, where matrices are interpolated between numbered files. */
  readonly between?: readonly [string, string];
  /** The file, where the event happens at a listed value. */
  readonly file?: string;
}

export interface SweepResult extends StudyResult {
  readonly components: StudyComponents;
  readonly range: { readonly parameter: string; readonly from: string; readonly to: string; readonly steps: number };
  /** True where the equilibrium moves and was followed. */
  readonly followed: boolean;
  readonly crossings: readonly Crossing[];
  readonly collisions: readonly SweepCollision[];
  /** Components whose block is singular for every value. */
  readonly singular: readonly string[];
  /** Curves for a picture: eigenvalues by component, with the sign of the energy. */
  readonly paths: {
    readonly kind: 'eigenvalues';
    readonly parameter: string;
    readonly paths: Tracks;
    readonly events: readonly { readonly at: number; readonly words: string }[];
  };
  readonly chart?: ZeroChart;
  /** Where the matrices are given by numbered files: what was found at each. */
  readonly files?: FileTable;
  readonly ends?: readonly string[];
}

type StudyComponents = ReturnType<typeof componentSummaries>;

export interface SweepOptions {
  /** Told how far the work has come, from 0 to 1. */
  readonly progress?: (share: number) => void;
}

/** Studies a declaration along its range. Throws UsageError without a range, and the errors of `check`. */
export async function sweepResult(declaration: Declaration, options: SweepOptions = {}): Promise<SweepResult> {
  const tell = options.progress ?? (() => {});
  const files = fileSweep(declaration);
  const family = files?.family ?? sweepFamily(declaration);
  tell(0.1);
  const curve = files?.curve ?? sweepCurve(family);
  const blocks = files?.blocks ?? blockEvaluator(family);
  const place = files?.place ?? locator(family, curve);
  const zeros = files?.zeros ?? (family.rational === undefined ? zerosOnCurve(family, curve, blocks) : zerosOfFamily(family, blocks));
  tell(0.3);
  const formulas =
    files === undefined ? await thresholdFormulas(family, [...new Set(zeros.zeros.flatMap((z) => z.components))]) : new Map();
  const crossings = crossingsOf(family, zeros, place, blocks).map((c, k): Crossing => {
    if (files !== undefined) return { ...c, ...files.named(c, zeros.zeros[k]!) };
    const near = (f: { readonly value: number }) => Math.abs(f.value - c.value) <= 1e-12 * Math.max(1, Math.abs(c.value));
    const found = formulas.get(zeros.zeros[k]!.components[0]!)?.find(near);
    return found === undefined || found.text === c.exact ? c : { ...c, formula: found.text };
  });
  tell(0.5);
  const tracks = await tracksOf(family, curve, blocks, (share) => tell(0.5 + 0.3 * share));
  const collisions = sweepCollisions(family, curve, blocks, tracks);
  const chart = family.ranges.length > 1 ? zeroChart(family) : undefined;
  tell(1);
  const { parameter } = family.range;
  return {
    ...headOf(family),
    components: componentSummaries(family.components),
    range: { parameter, from: formatRational(family.range.low), to: formatRational(family.range.high), steps: family.range.steps },
    followed: curve.followed,
    crossings,
    collisions,
    singular: zeros.singular,
    paths: {
      kind: 'eigenvalues',
      parameter,
      paths: tracks.tracks,
      events: [
        ...crossings.map((c) => ({ at: c.value, words: `${c.component} at zero` })),
        ...collisions.map((c) => ({ at: c.at, words: `${c.components.join(' and ')} ${c.motion === 'passes' ? 'pass' : 'collide'}` })),
      ],
    },
    ...(files === undefined ? {} : { files: files.table(tracks) }),
    ...(chart === undefined ? {} : { chart }),
    ...(curve.ends.length === 0 ? {} : { ends: curve.ends }),
  };
}

function headOf(family: SweepFamily): StudyResult {
  const prepared = prepare(family.declaration);
  const generators = family.action.generators.map((g) => ({
    name: g.name,
    reversing: g.sign === -1,
    symplectic: true,
    invariant: true,
  }));
  const { kind } = family.declaration.energy;
  const group = isExact(prepared)
    ? groupSummary(family.action, prepared)
    : {
        order: family.action.group.order,
        reversing: family.action.signs.filter((s) => s === -1).length,
        generators: generators.map((g) => g.name),
      };
  return {
    schema: 'symcodim/1',
    command: 'sweep',
    model: modelSummary(prepared),
    arithmetic: family.rational === undefined ? 'floating' : 'exact',
    ...(family.because === undefined ? {} : { floatingBecause: family.because }),
    field: family.field.name,
    group,
    equilibrium: { holds: true, gradient: '0' },
    symmetry: { holds: true, generators },
    ...(kind === 'mechanical' || kind === 'network' ? { caution: CAUTION } : {}),
  };
}

/** Points of the curve by a real number u: point i at u = i. */
function locator(family: SweepFamily, curve: Curve): (u: number) => CurvePoint {
  const last = curve.points.length - 1;
  const { range } = family;
  return (u) => {
    if (!curve.followed) {
      const mu = range.from + (u / range.steps) * (range.to - range.from);
      return { mu, x: family.pointAt(mu) };
    }
    const i = Math.min(Math.max(Math.floor(u), 0), last - 1);
    return curve.between(i, u - i);
  };
}

function crossingsOf(
  family: SweepFamily,
  { zeros, singular }: Zeros,
  place: (u: number) => CurvePoint,
  blocks: (p: CurvePoint) => BlocksAt,
): Crossing[] {
  const labels = family.adapted.map((b) => b.component.label);
  const trivial = family.adapted.findIndex((b) => b.component.irreducible.index === 0);
  return zeros.map((zero, k): Crossing => {
    const gap = Math.min(zero.u - (zeros[k - 1]?.u ?? -Infinity), (zeros[k + 1]?.u ?? Infinity) - zero.u);
    const offset = Math.min(0.25 * gap, 1e-3 * family.range.steps, 0.5);
    const [before, after] = [blocks(place(zero.u - offset)), blocks(place(zero.u + offset))];
    const seen = floatingEvent(family, blocks(zero.point));
    const always = singular.length === 0 ? [] : floatingEvent(family, after).active;
    const element = zero.closed?.element;
    const exact = element === undefined ? undefined : exactEvent(family, element, seen);
    const numbers: EventNumbers = exact ?? {
      ...(singular.length === 0 ? seen : { ...seen, codimension: null, codimensionWithoutSymmetry: null, motion: 'degenerate' as const }),
      versal:
        singular.length === 0 && seen.codimension === 1 ? transversal(zero.components, before, after, offset / family.range.steps) : null,
    };
    const observed = observe(seen.active, always, before, after);
    const half = (x: number | undefined, side: number) => (x === undefined ? zero.u + side : (x + zero.u) / 2);
    return {
      parameter: family.range.parameter,
      value: zero.value,
      exact: zero.closed?.text ?? null,
      ...(zero.polynomial === undefined ? {} : { polynomial: zero.polynomial }),
      ...(zero.digits === undefined ? {} : { digits: zero.digits }),
      component: zero.components.map((i) => labels[i]!).join(' + '),
      kernel: numbers.kernel,
      dimension: numbers.dimension,
      blocks: numbers.blocks,
      motion: numbers.motion,
      codimension: numbers.codimension,
      codimensionWithoutSymmetry: numbers.codimensionWithoutSymmetry,
      versal: numbers.versal,
      observed,
      agrees: numbers.motion === 'degenerate' ? null : observed.motion === numbers.motion,
      inertiaBefore: inertiaAt(family, blocks(place(Math.max(half(zeros[k - 1]?.u, -1), zero.u - 1)))),
      inertiaAfter: inertiaAt(family, blocks(place(Math.min(half(zeros[k + 1]?.u, 1), zero.u + 1)))),
      arithmetic: numbers.arithmetic,
      ...(family.rational === undefined && zero.components.includes(trivial) && zero.fold ? { fold: true } : {}),
    };
  });
}
