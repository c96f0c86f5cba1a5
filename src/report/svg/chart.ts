/** A chart in the plane of two parameters: the curves on which components meet zero. */
import { latexSymbol } from '../mathematics/index.ts';
import { drawAxes, horizontalAxis, verticalAxis } from './axes.ts';
import { colorOf, dashOf, labelText, line, type Scene, type Shape, text } from './scene.ts';

export interface ChartFigure {
  readonly kind: 'chart';
  readonly parameters: readonly [string, string];
  readonly ranges: readonly [readonly [number, number], readonly [number, number]];
  readonly curves: readonly { readonly component: string; readonly points: readonly (readonly [number, number])[] }[];
  /** Words that stand inside regions. */
  readonly regions?: readonly { readonly at: readonly [number, number]; readonly words: string }[];
}

const SIDE = 290;

export async function drawChart(figure: ChartFigure): Promise<Scene> {
  const [first, second] = figure.parameters;
  const x = await horizontalAxis(figure.ranges[0], [52, 52 + SIDE], first, latexSymbol(first), false);
  const y = await verticalAxis(figure.ranges[1], [22 + SIDE, 22], second, latexSymbol(second));
  const names = [...new Set(figure.curves.map((c) => c.component))];
  const shapes: Shape[] = [...drawAxes(x, y, 52 + SIDE)];
  for (const curve of figure.curves) {
    const points = curve.points.filter(([a, b]) => Number.isFinite(a) && Number.isFinite(b));
    const i = names.indexOf(curve.component);
    if (points.length > 1)
      shapes.push(
        line(
          points.map(([a, b]) => [x.scale(a), y.scale(b)]),
          { color: colorOf(i), width: 1.6, dash: dashOf(i) },
          curve.component,
        ),
      );
  }
  for (const region of figure.regions ?? []) shapes.push(text(x.scale(region.at[0]), y.scale(region.at[1]), region.words, 'middle', 9));
  names.forEach((name, i) => {
    const at = 24 + 15 * i;
    shapes.push(
      line(
        [
          [SIDE + 66, at - 3],
          [SIDE + 90, at - 3],
        ],
        { color: colorOf(i), width: 1.6, dash: dashOf(i) },
      ),
      labelText(SIDE + 96, at, name, 'start', 9.5),
    );
  });
  return {
    width: SIDE + 170,
    height: Math.max(SIDE + 60, 30 + 15 * names.length),
    description: `Zero curves in the plane of ${first} and ${second}: ${names.join(', ')}.`,
    shapes,
  };
}
