/** Eigenvalue paths: frequency and rate against the parameter, and the same values in the complex plane. */
import { latexSymbol } from '../mathematics/index.ts';
import { drawAxes, horizontalAxis, verticalAxis } from './axes.ts';
import { colorOf, dashOf, labelText, line, type Marker, marker, type Scene, type Shape, text } from './scene.ts';

/** One eigenvalue along the parameter; of a pair ±λ, or a quadruple, the one with nonnegative parts is enough. */
export interface EigenvaluePath {
  readonly component: string;
  readonly points: readonly { readonly at: number; readonly re: number; readonly im: number; readonly sign?: -1 | 0 | 1 }[];
}

export interface EigenvalueFigure {
  readonly kind: 'eigenvalues';
  readonly parameter: string;
  readonly paths: readonly EigenvaluePath[];
  /** Places of events, drawn as thin lines. */
  readonly events?: readonly { readonly at: number; readonly words: string }[];
}

const WIDTH = 460;
const HEIGHT = 190;
const PLANE = 230;
const MARKS = 9;

/** Draws frequency and rate above, the complex plane below. */
export async function drawEigenvalues(given: EigenvalueFigure): Promise<Scene> {
  const finite = (p: Point) => Number.isFinite(p.at) && Number.isFinite(p.re) && Number.isFinite(p.im);
  const figure = { ...given, paths: given.paths.map((path) => ({ ...path, points: path.points.filter(finite) })) };
  const all = figure.paths.flatMap((p) => p.points);
  const names = [...new Set(figure.paths.map((p) => p.component))];
  const at = await horizontalAxis(
    all.map((p) => p.at),
    [52, WIDTH - 12],
    figure.parameter,
    latexSymbol(figure.parameter),
    false,
  );
  const top = Math.max(0, ...all.map((p) => Math.abs(p.im)));
  const rate = Math.max(0, ...all.map((p) => Math.abs(p.re)));
  const up = await verticalAxis([-rate, 0, top], [HEIGHT - 32, 20], 'frequency', undefined);
  const shapes: Shape[] = [...drawAxes(at, up, WIDTH)];
  for (const event of figure.events ?? [])
    if (event.at >= at.from && event.at <= at.to)
      shapes.push(
        line(
          [
            [at.scale(event.at), up.range[0]],
            [at.scale(event.at), up.range[1]],
          ],
          { color: 'faint', width: 0.8, dash: [2, 3] },
          event.words,
        ),
      );
  if (rate > 0)
    shapes.push(
      line(
        [
          [at.range[0], up.scale(0)],
          [at.range[1], up.scale(0)],
        ],
        { color: 'ink', width: 0.6 },
      ),
      text(at.range[1] - 2, up.range[0] - 4, 'below the line: rate of growth', 'end', 8, 'ink'),
    );
  const trace = (points: readonly (readonly [number, number])[], component: string) => {
    const i = names.indexOf(component);
    // straight segments between the computed values: nothing is smoothed that was not computed
    if (points.length > 1) shapes.push(line(points, { color: colorOf(i), width: 1.5, dash: dashOf(i) }, component));
  };
  // points in the order of the curve: where it turns back the parameter does too
  for (const path of figure.paths) {
    for (const run of runs(path.points, (p) => Math.abs(p.im) > 1e-12 * (1 + top)))
      trace(
        run.map((p) => [at.scale(p.at), up.scale(Math.abs(p.im))]),
        path.component,
      );
    for (const run of runs(path.points, (p) => Math.abs(p.re) > 1e-12 * (1 + rate)))
      trace(
        run.map((p) => [at.scale(p.at), up.scale(-Math.abs(p.re))]),
        path.component,
      );
  }
  for (const path of figure.paths)
    shapes.push(
      ...signMarks(path, names.indexOf(path.component), (p) => [at.scale(p.at), up.scale(p.im !== 0 ? Math.abs(p.im) : -Math.abs(p.re))]),
    );
  // the complex plane, symmetric in both axes
  const edge = 1.1 * (Math.max(top, rate) || 1);
  const re = await horizontalAxis([-edge, edge], [52, 52 + PLANE], 'real part', undefined, true);
  const im = await verticalAxis([-edge, edge], [HEIGHT + PLANE - 2, HEIGHT + 20], 'imaginary part', undefined);
  shapes.push(...drawAxes(re, im, re.range[1] + 8));
  shapes.push(
    line(
      [
        [re.scale(0), im.range[0]],
        [re.scale(0), im.range[1]],
      ],
      { color: 'faint', width: 0.7 },
    ),
    line(
      [
        [re.range[0], im.scale(0)],
        [re.range[1], im.scale(0)],
      ],
      { color: 'faint', width: 0.7 },
    ),
  );
  for (const path of figure.paths)
    for (const [sx, sy] of [
      [1, 1],
      [1, -1],
      [-1, 1],
      [-1, -1],
    ] as const)
      trace(
        throughZero(path.points).map((p) => [re.scale(sx * Math.abs(p.re)), im.scale(sy * Math.abs(p.im))]),
        path.component,
      );
  for (const path of figure.paths) {
    const end = path.points.at(-1);
    if (end !== undefined)
      for (const [sx, sy] of [
        [1, 1],
        [-1, -1],
      ] as const)
        shapes.push(
          ...marker(
            markerOf(end.sign),
            re.scale(sx * Math.abs(end.re)),
            im.scale(sy * Math.abs(end.im)),
            3,
            colorOf(names.indexOf(path.component)),
          ),
        );
  }
  shapes.push(...legend(names, figure, 52 + PLANE + 26, HEIGHT + 24));
  const height = Math.max(HEIGHT + PLANE + 30, HEIGHT + 40 + 15 * (names.length + 3));
  return {
    width: WIDTH,
    height,
    description: `Eigenvalues against ${figure.parameter} from ${at.from} to ${at.to}, components ${names.join(', ')}.`,
    shapes,
  };
}

/** With the origin put in where a path turns from one axis to the other between two computed values. */
function throughZero(points: readonly Point[]): readonly { readonly re: number; readonly im: number }[] {
  return points.flatMap((p, i) => {
    const next = points[i + 1];
    const turns =
      next !== undefined && p.re * next.re === 0 && p.im * next.im === 0 && (p.re !== 0 || p.im !== 0) && (p.re !== 0) !== (next.re !== 0);
    return turns ? [p, { re: 0, im: 0 }] : [p];
  });
}

type Point = EigenvaluePath['points'][number];

/** Stretches of points that satisfy a condition, each with its neighbours so that lines reach the meeting point. */
function runs(points: readonly Point[], holds: (p: Point) => boolean): readonly (readonly Point[])[] {
  const out: Point[][] = [];
  let current: Point[] = [];
  points.forEach((p, i) => {
    if (holds(p)) {
      if (current.length === 0 && i > 0) current.push({ ...points[i - 1]!, re: 0, im: 0 });
      current.push(p);
    } else if (current.length > 0) {
      out.push([...current, { ...p, re: 0, im: 0 }]);
      current = [];
    }
  });
  if (current.length > 0) out.push(current);
  return out;
}

const markerOf = (sign: -1 | 0 | 1 | undefined): Marker => (sign === undefined || sign === 0 ? 'diamond' : sign > 0 ? 'circle' : 'ring');

/** Marks of the sign of the energy, spread along the path and shifted so that those of different components do not cover each other. */
function signMarks(path: EigenvaluePath, index: number, place: (p: Point) => readonly [number, number]): readonly Shape[] {
  const step = Math.max(1, Math.floor(path.points.length / MARKS));
  const offset = (index * 2 + 1) % step;
  return path.points.flatMap((p, i) => {
    if (p.sign === undefined || p.sign === 0 || i % step !== offset % step || p.im === 0) return [];
    const [x, y] = place(p);
    return marker(markerOf(p.sign), x, y, 2.6, colorOf(index));
  });
}

function legend(names: readonly string[], figure: EigenvalueFigure, x: number, y: number): readonly Shape[] {
  const shapes: Shape[] = names.flatMap((name, i): Shape[] => [
    line(
      [
        [x, y + 15 * i - 3],
        [x + 24, y + 15 * i - 3],
      ],
      { color: colorOf(i), width: 1.5, dash: dashOf(i) },
    ),
    labelText(x + 30, y + 15 * i, name, 'start', 9.5),
  ]);
  const signed = figure.paths.some((p) => p.points.some((q) => q.sign !== undefined && q.sign !== 0));
  if (!signed) return shapes;
  const below = y + 15 * names.length + 4;
  return [
    ...shapes,
    ...marker('circle', x + 12, below - 3, 3, 'ink'),
    text(x + 30, below, 'positive energy', 'start', 9),
    ...marker('ring', x + 12, below + 12, 3, 'ink'),
    text(x + 30, below + 15, 'negative energy', 'start', 9),
  ];
}
