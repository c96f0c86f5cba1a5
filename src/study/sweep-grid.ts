/**
 * Two parameters at once: the curves on which a component meets zero, by marching over a grid of squares on the signs
 * of the eigenvalues of its block, the points on the edges found to the last digits.
 */
import { numberCongruence, numberMatrix, toNumberMatrix } from '../linear/index.ts';
import { symmetricEigen } from '../linear/spectral.ts';
import { compileNumeric, hessianNumeric } from '../model/expression/index.ts';
import type { SweepFamily } from './sweep-family.ts';
import { bracketed } from './sweep-spectrum.ts';

/** What the picture of a chart takes. */
export interface ZeroChart {
  readonly kind: 'chart';
  readonly parameters: readonly [string, string];
  readonly ranges: readonly [readonly [number, number], readonly [number, number]];
  readonly curves: readonly { readonly component: string; readonly points: readonly (readonly [number, number])[] }[];
}

/** Squares along each side. */
const CELLS = 32;

type Segment = readonly [readonly [number, number], readonly [number, number]];

/** The curves over the rectangle of the first two ranges, at the declared equilibrium. */
export function zeroChart(family: SweepFamily): ZeroChart {
  const [first, second] = [family.ranges[0]!, family.ranges[1]!];
  const n = family.names.length;
  const names = [...family.names, ...family.ranges.map((r) => r.parameter)];
  const hessian = hessianNumeric(family.hamiltonian, names);
  const rest = family.held.slice(1);
  const places = family.placed.map((e) =>
    e === undefined
      ? () => 0
      : compileNumeric(
          e,
          family.ranges.map((r) => r.parameter),
        ),
  );
  const bases = family.adapted.map((b) => toNumberMatrix(b.basis, family.field));
  const blocksAt = (x: number, y: number) => {
    const values = [x, y, ...rest];
    const full = hessian([...places.map((f) => f(values)), ...values]);
    const s = numberMatrix(n, n);
    const all = names.length;
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) s.data[i * n + j] = full[i * all + j]!;
    return bases.map((b) => symmetricEigen(numberCongruence(b, s).data, b.cols).values);
  };
  const cells = Math.min(CELLS, second.steps);
  const gridX = Array.from({ length: cells + 1 }, (_, i) => first.from + (i / cells) * (first.to - first.from));
  const gridY = Array.from({ length: cells + 1 }, (_, i) => second.from + (i / cells) * (second.to - second.from));
  const values = gridX.map((x) => gridY.map((y) => blocksAt(x, y)));
  const curves: { component: string; points: readonly (readonly [number, number])[] }[] = [];
  family.adapted.forEach((b, c) => {
    const size = values[0]![0]![c]!.length;
    // an eigenvalue that repeats another one draws no second curve
    for (let k = 0; k < size; k += b.cut) {
      const sign = (i: number, j: number) => (values[i]![j]![c]![k]! >= 0 ? 1 : -1);
      const edges = new Map<string, readonly [number, number]>();
      const onEdge = (i: number, j: number, along: 0 | 1): readonly [number, number] => {
        const key = `${i},${j},${along}`;
        const known = edges.get(key);
        if (known !== undefined) return known;
        const [x0, y0] = [gridX[i]!, gridY[j]!];
        const [x1, y1] = along === 0 ? [gridX[i + 1]!, y0] : [x0, gridY[j + 1]!];
        const end = along === 0 ? values[i + 1]![j]! : values[i]![j + 1]!;
        const at = (t: number): readonly [number, number] => [x0 + t * (x1 - x0), y0 + t * (y1 - y0)];
        const theta = bracketed((t) => blocksAt(...at(t))[c]![k]!, values[i]![j]![c]![k]!, end[c]![k]!);
        const point = at(theta);
        edges.set(key, point);
        return point;
      };
      const segments: Segment[] = [];
      for (let i = 0; i < cells; i++)
        for (let j = 0; j < cells; j++) {
          const corners = [sign(i, j), sign(i + 1, j), sign(i + 1, j + 1), sign(i, j + 1)];
          const hits: (readonly [number, number])[] = [];
          if (corners[0] !== corners[1]) hits.push(onEdge(i, j, 0));
          if (corners[1] !== corners[2]) hits.push(onEdge(i + 1, j, 1));
          if (corners[2] !== corners[3]) hits.push(onEdge(i, j + 1, 0));
          if (corners[3] !== corners[0]) hits.push(onEdge(i, j, 1));
          for (let h = 0; h + 1 < hits.length; h += 2) segments.push([hits[h]!, hits[h + 1]!]);
        }
      for (const points of chains(segments)) curves.push({ component: b.component.label, points });
    }
  });
  return {
    kind: 'chart',
    parameters: [first.parameter, second.parameter],
    ranges: [
      [first.from, first.to],
      [second.from, second.to],
    ],
    curves,
  };
}

/** Segments joined at equal ends into as few lines as can be. */
function chains(segments: readonly Segment[]): (readonly (readonly [number, number])[])[] {
  const keyOf = (p: readonly [number, number]) => `${p[0]},${p[1]}`;
  const byEnd = new Map<string, number[]>();
  segments.forEach((s, i) => {
    for (const p of s) byEnd.set(keyOf(p), [...(byEnd.get(keyOf(p)) ?? []), i]);
  });
  const used = new Set<number>();
  const out: (readonly [number, number])[][] = [];
  segments.forEach((s, i) => {
    if (used.has(i)) return;
    used.add(i);
    const points: (readonly [number, number])[] = [s[0], s[1]];
    const extend = (last: () => readonly [number, number], put: (p: readonly [number, number]) => void) => {
      for (;;) {
        const end = last();
        const next = (byEnd.get(keyOf(end)) ?? []).find((k) => !used.has(k));
        if (next === undefined) return;
        used.add(next);
        const [a, b] = segments[next]!;
        put(keyOf(a) === keyOf(end) ? b : a);
      }
    };
    extend(
      () => points.at(-1)!,
      (p) => points.push(p),
    );
    extend(
      () => points[0]!,
      (p) => points.unshift(p),
    );
    out.push(points);
  });
  return out;
}
