/** Branches of equilibria against the parameter: solid where stable, dashed where not. */
import { latexSymbol } from '../mathematics/index.ts';
import { drawAxes, horizontalAxis, verticalAxis } from './axes.ts';
import { colorOf, line, type Marker, marker, type Scene, type Shape, text } from './scene.ts';

export type BranchStability = 'stable' | 'spectral' | 'unstable' | 'unknown';

export interface BifurcationBranch {
  readonly name: string;
  readonly points: readonly { readonly at: number; readonly amplitude: number; readonly stability: BranchStability }[];
}

export interface BifurcationFigure {
  readonly kind: 'bifurcation';
  readonly parameter: string;
  readonly amplitude: string;
  readonly branches: readonly BifurcationBranch[];
}

const WIDTH = 460;
const HEIGHT = 230;
const DASH: Readonly<Record<BranchStability, readonly number[]>> = {
  stable: [],
  spectral: [9, 3, 2, 3],
  unstable: [5, 4],
  unknown: [1.5, 3],
};
const WORDS: Readonly<Record<BranchStability, string>> = {
  stable: 'stable (energy)',
  spectral: 'spectrally stable',
  unstable: 'unstable',
  unknown: 'not decided',
};
const MARKERS: readonly Marker[] = ['circle', 'square', 'triangle', 'diamond', 'ring', 'cross'];

export async function drawBifurcation(given: BifurcationFigure): Promise<Scene> {
  const finite = (p: BranchPoint) => Number.isFinite(p.at) && Number.isFinite(p.amplitude);
  const figure = { ...given, branches: given.branches.map((branch) => ({ ...branch, points: branch.points.filter(finite) })) };
  const all = figure.branches.flatMap((b) => b.points);
  const plot = WIDTH - 130;
  const x = await horizontalAxis(
    all.map((p) => p.at),
    [52, plot],
    figure.parameter,
    latexSymbol(figure.parameter),
    false,
  );
  const y = await verticalAxis([0, ...all.map((p) => p.amplitude)], [HEIGHT - 32, 20], figure.amplitude, undefined);
  const shapes: Shape[] = [...drawAxes(x, y, WIDTH)];
  const used = new Set<BranchStability>();
  figure.branches.forEach((branch, i) => {
    for (const run of stretches(branch.points)) {
      used.add(run.stability);
      if (run.points.length > 1)
        shapes.push(
          line(
            run.points.map((p) => [x.scale(p.at), y.scale(p.amplitude)]),
            { color: colorOf(i), width: run.stability === 'stable' ? 2 : 1.4, dash: DASH[run.stability] },
            `${branch.name}, ${WORDS[run.stability]}`,
          ),
        );
    }
    // near the ends, where branches stand apart
    for (const p of new Set([
      branch.points.at(Math.floor(branch.points.length * 0.12)),
      branch.points.at(-1 - Math.floor(branch.points.length * 0.12)),
    ]))
      if (p !== undefined)
        shapes.push(...marker(MARKERS[i % MARKERS.length]!, x.scale(p.at), y.scale(p.amplitude), 3, colorOf(i), branch.name));
  });
  let below = 20;
  figure.branches.forEach((branch, i) => {
    shapes.push(
      ...marker(MARKERS[i % MARKERS.length]!, plot + 20, below - 3, 3, colorOf(i)),
      text(plot + 32, below, branch.name, 'start', 9),
    );
    below += 14;
  });
  below += 6;
  for (const stability of ['stable', 'spectral', 'unstable', 'unknown'] as const) {
    if (!used.has(stability)) continue;
    shapes.push(
      line(
        [
          [plot + 10, below - 3],
          [plot + 30, below - 3],
        ],
        { color: 'ink', width: stability === 'stable' ? 2 : 1.4, dash: DASH[stability] },
      ),
      text(plot + 34, below, WORDS[stability], 'start', 9),
    );
    below += 14;
  }
  return {
    width: WIDTH,
    height: Math.max(HEIGHT, below + 8),
    description: `Branches of equilibria against ${figure.parameter}: ${figure.branches.map((b) => b.name).join(', ')}.`,
    shapes,
  };
}

type BranchPoint = BifurcationBranch['points'][number];

/** Stretches of equal stability; neighbours share their point, so that no gap appears. */
function stretches(
  points: readonly BranchPoint[],
): readonly { readonly stability: BranchStability; readonly points: readonly BranchPoint[] }[] {
  const out: { stability: BranchStability; points: BranchPoint[] }[] = [];
  for (const p of points) {
    const last = out.at(-1);
    if (last !== undefined && last.stability === p.stability) last.points.push(p);
    else out.push({ stability: p.stability, points: last === undefined ? [p] : [last.points.at(-1)!, p] });
  }
  return out;
}
