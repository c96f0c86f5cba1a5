/** Tracks of the eigenvalues along a curve for a picture, and where they collide or pass off zero. */
import type { Motion } from './result.ts';
import type { BlocksAt, Curve, CurvePoint } from './sweep-curve.ts';
import type { SweepFamily } from './sweep-family.ts';
import { type BlockEigenvalue, blockEigenvalues, bracketed, discriminant, matched, squares } from './sweep-spectrum.ts';

export type Tracks = readonly {
  readonly component: string;
  readonly points: readonly { readonly at: number; readonly re: number; readonly im: number; readonly sign: -1 | 0 | 1 }[];
}[];

/** Eigenvalues by flow block and point. */
export interface Tracked {
  readonly tracks: Tracks;
  /** For each flow block the eigenvalues at each point, continued from point to point, those that symmetry repeats left out. */
  readonly values: readonly (readonly (readonly BlockEigenvalue[])[])[];
  /** How often each eigenvalue of a flow block is repeated in it. */
  readonly copies: readonly number[];
}

/** A collision or passage off zero, met on the way. */
export interface SweepCollision {
  readonly parameter: string;
  readonly at: number;
  readonly kind: 'imaginary' | 'real';
  /** Frequency or rate. */
  readonly value: number;
  readonly components: readonly string[];
  /** 'splits' where the eigenvalues leave the axis, 'passes' where two frequencies only agree. */
  readonly motion: Motion;
  /** Null for a passage inside one flow block: it may cost more than 1, and codim at that value says what. */
  readonly codimension: 1 | null;
  /** Krein signs of the two before they meet. */
  readonly signs: readonly [number, number];
}

/** Points between which other work gets its turn. */
const BREATH = 256;

const digits = (x: number): number => Number(x.toPrecision(12));

export async function tracksOf(
  family: SweepFamily,
  curve: Curve,
  blocks: (p: CurvePoint) => BlocksAt,
  progress: (share: number) => void,
): Promise<Tracked> {
  const raw: BlockEigenvalue[][][] = family.flow.map(() => []);
  for (let j = 0; j < curve.points.length; j++) {
    const at = blocks(curve.points[j]!);
    family.flow.forEach((_, i) => {
      const { s, w } = at.flow(i);
      raw[i]!.push(blockEigenvalues(s, w));
    });
    if (j % BREATH === BREATH - 1) {
      progress(j / curve.points.length);
      await new Promise((resolve) => setImmediate(resolve));
    }
  }
  const copies = raw.map(repetition);
  const values = raw.map((rows, i) => {
    const out: BlockEigenvalue[][] = [];
    rows.forEach((row, j) => {
      const once = row.filter((_, k) => k % copies[i]! === 0);
      out.push(matched(out[j - 1], out[j - 2], once));
    });
    return out;
  });
  const tracks = values.flatMap((rows, i) =>
    (rows[0] ?? []).map((_, k) => ({
      component: family.flowLabels[i]!.join(' + '),
      points: rows.map((row, j) => {
        const v = row[k]!;
        return { at: digits(curve.points[j]!.mu), re: digits(Math.abs(v.re)), im: digits(v.im), sign: v.sign };
      }),
    })),
  );
  return { tracks, values, copies };
}

/** The largest number by which all eigenvalues of a block are repeated, at every third of the points. */
function repetition(rows: readonly (readonly BlockEigenvalue[])[]): number {
  let common = 0;
  const gcd = (a: number, b: number): number => (b === 0 ? a : gcd(b, a % b));
  for (const share of [0.13, 0.41, 0.77]) {
    const row = rows[Math.floor(share * (rows.length - 1))] ?? [];
    const sorted = [...row].sort((a, b) => Math.hypot(a.re, a.im) - Math.hypot(b.re, b.im));
    const scale = Math.max(1e-300, ...sorted.map((v) => Math.hypot(v.re, v.im)));
    for (let i = 0; i < sorted.length; ) {
      let j = i + 1;
      while (j < sorted.length && Math.hypot(sorted[j]!.re - sorted[i]!.re, sorted[j]!.im - sorted[i]!.im) <= 1e-6 * scale) j++;
      common = gcd(common, j - i);
      i = j;
    }
  }
  return Math.max(1, common);
}

/** Collisions inside a flow block, where the discriminant in λ² changes sign, and passages of frequencies. */
export function sweepCollisions(
  family: SweepFamily,
  curve: Curve,
  blocks: (p: CurvePoint) => BlocksAt,
  tracked: Tracked,
): SweepCollision[] {
  const out: (SweepCollision & { u: number })[] = [];
  const { parameter } = family.range;
  family.flow.forEach((_, i) => {
    const rows = tracked.values[i]!;
    if ((rows[0]?.length ?? 0) < 2) return;
    const squaresAt = (p: CurvePoint) => {
      const { s, w } = blocks(p).flow(i);
      return squares(blockEigenvalues(s, w), tracked.copies[i]!);
    };
    const disc = rows.map((row) => discriminant(squares(row, 1)));
    for (let j = 0; j + 1 < rows.length; j++) {
      if (disc[j]! * disc[j + 1]! >= 0) continue;
      const theta = bracketed((t) => discriminant(squaresAt(curve.between(j, t))), disc[j]!, disc[j + 1]!);
      const point = curve.between(j, theta);
      const pair = nearestPair(squaresAt(point));
      const y = (pair[0].re + pair[1].re) / 2;
      const before = rows[disc[j]! > 0 ? j : j + 1]!;
      const value = Math.sqrt(Math.abs(y));
      const two = [...before]
        .sort((a, b) => Math.abs(Math.hypot(a.re, a.im) - value) - Math.abs(Math.hypot(b.re, b.im) - value))
        .slice(0, 2);
      out.push({
        u: j + theta,
        parameter,
        at: point.mu,
        kind: y < 0 ? 'imaginary' : 'real',
        value,
        components: family.flowLabels[i]!,
        motion: 'splits',
        codimension: 1,
        signs: [two[0]!.sign, two[1]!.sign],
      });
    }
  });
  out.push(...passages(family, curve, blocks, tracked));
  return out.sort((a, b) => a.u - b.u).map(({ u: _, ...rest }) => rest);
}

function nearestPair(
  y: readonly { readonly re: number; readonly im: number }[],
): readonly [{ re: number; im: number }, { re: number; im: number }] {
  let best: [number, number] = [0, 1];
  let distance = Infinity;
  for (let i = 0; i < y.length; i++)
    for (let j = 0; j < i; j++) {
      const d = Math.hypot(y[i]!.re - y[j]!.re, y[i]!.im - y[j]!.im);
      if (d < distance) {
        distance = d;
        best = [i, j];
      }
    }
  return [y[best[0]]!, y[best[1]]!];
}

/** Two imaginary tracks that cross without meeting in a Jordan block. */
function passages(
  family: SweepFamily,
  curve: Curve,
  blocks: (p: CurvePoint) => BlocksAt,
  tracked: Tracked,
): (SweepCollision & { u: number })[] {
  const { parameter } = family.range;
  const out: (SweepCollision & { u: number })[] = [];
  const all = tracked.values.flatMap((rows, block) => (rows[0] ?? []).map((_, track) => ({ block, track })));
  const imaginary = (v: BlockEigenvalue) => v.re === 0 && v.im > 0;
  for (let a = 0; a < all.length; a++)
    for (let b = 0; b < a; b++) {
      const [p, q] = [all[a]!, all[b]!];
      const value = (x: typeof p, j: number) => tracked.values[x.block]![j]![x.track]!;
      for (let j = 0; j + 1 < curve.points.length; j++) {
        const ends = [value(p, j), value(q, j), value(p, j + 1), value(q, j + 1)] as const;
        if (!ends.every(imaginary)) continue;
        const [d0, d1] = [ends[0].im - ends[1].im, ends[2].im - ends[3].im];
        // the first point of an interval belongs to it, so that a passage at a point is counted once
        if (d0 === 0 ? d1 === 0 || j === 0 : d0 * d1 >= 0) continue;
        const near = (t: number, x: typeof p, from: number, to: number) => {
          const { s, w } = blocks(curve.between(j, t)).flow(x.block);
          const guess = from + t * (to - from);
          return blockEigenvalues(s, w)
            .filter((v) => v.re === 0)
            .reduce((best, v) => (Math.abs(v.im - guess) < Math.abs(best - guess) ? v.im : best), Infinity);
        };
        const difference = (t: number) => near(t, p, ends[0].im, ends[2].im) - near(t, q, ends[1].im, ends[3].im);
        const theta = d0 === 0 ? 0 : bracketed(difference, d0, d1);
        if (!(Math.abs(difference(theta)) <= 1e-9 * Math.max(ends[0].im, ends[1].im))) continue;
        out.push({
          u: j + theta,
          parameter,
          at: curve.between(j, theta).mu,
          kind: 'imaginary',
          value: near(theta, p, ends[0].im, ends[2].im),
          components: [...new Set([...family.flowLabels[q.block]!, ...family.flowLabels[p.block]!])],
          motion: 'passes',
          codimension: p.block === q.block ? null : 1,
          signs: [ends[1].sign, ends[0].sign],
        });
      }
    }
  return out;
}
