/** Axes with ticks at round numbers. */
import { numberText, symbolText } from '../mathematics/index.ts';
import { line, rectangle, type Shape, text } from './scene.ts';

export interface Axis {
  readonly from: number;
  readonly to: number;
  /** Places of the two ends, in points. */
  readonly range: readonly [number, number];
  readonly scale: (value: number) => number;
  readonly ticks: readonly { readonly value: number; readonly words: string }[];
  readonly name: string;
  readonly latex: string | undefined;
}

/** An axis over the values, extended to round numbers if `nice`. */
async function axis(
  values: readonly number[],
  range: readonly [number, number],
  name: string,
  latex: string | undefined,
  nice: boolean,
  count: number,
): Promise<Axis> {
  const { scaleLinear } = await import('d3-scale');
  const finite = values.filter((v) => Number.isFinite(v));
  let from = finite.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  let to = finite.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
  if (finite.length === 0) [from, to] = [0, 1];
  if (from === to) [from, to] = from === 0 ? [-1, 1] : [from - Math.abs(from) / 2, to + Math.abs(to) / 2];
  const scale = scaleLinear()
    .domain([from, to])
    .range([...range]);
  if (nice) scale.nice(count);
  const [a, b] = scale.domain() as [number, number];
  const ticks = scale.ticks(count).map((value) => ({ value, words: numberText(value).replace('-', '−') }));
  return { from: a, to: b, range, scale: (value) => scale(value), ticks, name: latex === undefined ? name : symbolText(name), latex };
}

export const horizontalAxis = (
  values: readonly number[],
  range: readonly [number, number],
  name: string,
  latex: string | undefined,
  nice: boolean,
): Promise<Axis> => axis(values, range, name, latex, nice, 6);
export const verticalAxis = (
  values: readonly number[],
  range: readonly [number, number],
  name: string,
  latex: string | undefined,
): Promise<Axis> => axis(values, range, name, latex, true, 5);

/** Frame, ticks and names; the name of the vertical axis stands above the frame, level, to be read without turning the head. */
export function drawAxes(x: Axis, y: Axis, right: number): readonly Shape[] {
  const [left, end] = x.range;
  const [bottom, top] = y.range;
  const shapes: Shape[] = [rectangle(left, top, end - left, bottom - top, { color: 'faint', width: 0.8 }, null)];
  for (const tick of x.ticks) {
    const place = x.scale(tick.value);
    shapes.push(
      line(
        [
          [place, bottom],
          [place, bottom + 3],
        ],
        { color: 'ink', width: 0.8 },
      ),
      text(place, bottom + 12, tick.words, 'middle', 8.5),
    );
  }
  for (const tick of y.ticks) {
    const place = y.scale(tick.value);
    shapes.push(
      line(
        [
          [left - 3, place],
          [left, place],
        ],
        { color: 'ink', width: 0.8 },
      ),
      text(left - 5, place + 3, tick.words, 'end', 8.5),
    );
  }
  shapes.push(text(Math.min((left + end) / 2, right), bottom + 24, x.name, 'middle', 9.5, 'ink', x.latex));
  shapes.push(text(left - 3, top - 6, y.name, 'start', 9.5, 'ink', y.latex));
  return shapes;
}
