/**
 * A picture as plain shapes in points, x to the right and y down, so that one drawing can be written as SVG
 * and as LaTeX. Colours are roles, not values: each output decides what ink and paper are.
 */

import { labelLatex } from '../mathematics/index.ts';

/** Colours that people with any common colour vision tell apart (Okabe and Ito), in the order of use; ink is the colour of the text. */
export const PALETTE = ['#0072b2', '#d55e00', '#009e73', '#cc79a7', '#e69f00', '#56b4e9', '#8c6d1f', '#7a7a7a'] as const;
export type Color = (typeof PALETTE)[number] | 'ink' | 'faint' | 'paper';

export interface Stroke {
  readonly color: Color;
  readonly width: number;
  /** Lengths of dashes and gaps; empty for a solid line. */
  readonly dash?: readonly number[];
}

export type Shape =
  | {
      readonly kind: 'path';
      readonly points: readonly (readonly [number, number])[];
      readonly closed: boolean;
      readonly stroke: Stroke | null;
      readonly fill: Color | null;
      readonly opacity?: number;
      readonly title?: string;
    }
  | {
      readonly kind: 'circle';
      readonly x: number;
      readonly y: number;
      readonly r: number;
      readonly stroke: Stroke | null;
      readonly fill: Color | null;
      readonly title?: string;
    }
  | {
      readonly kind: 'text';
      readonly x: number;
      readonly y: number;
      readonly text: string;
      readonly latex?: string;
      readonly size: number;
      readonly anchor: 'start' | 'middle' | 'end';
      readonly color: Color;
      readonly bold?: boolean;
    };

export interface Scene {
  readonly width: number;
  readonly height: number;
  /** What the picture shows, for those who do not see it. */
  readonly description: string;
  readonly shapes: readonly Shape[];
}

/** The colour of the i-th thing. */
export const colorOf = (i: number): Color => PALETTE[i % PALETTE.length]!;
/** Line styles in the order of use; with colour and marker they make three ways to tell lines apart. */
const DASHES: readonly (readonly number[])[] = [[], [6, 3], [2, 2], [8, 3, 2, 3], [4, 2], [10, 4]];
export const dashOf = (i: number): readonly number[] => DASHES[i % DASHES.length]!;

export const rectangle = (
  x: number,
  y: number,
  w: number,
  h: number,
  stroke: Stroke | null,
  fill: Color | null,
  opacity = 1,
  title?: string,
): Shape => ({
  kind: 'path',
  points: [
    [x, y],
    [x + w, y],
    [x + w, y + h],
    [x, y + h],
  ],
  closed: true,
  stroke,
  fill,
  opacity,
  ...(title === undefined ? {} : { title }),
});

export const line = (points: readonly (readonly [number, number])[], stroke: Stroke, title?: string): Shape => ({
  kind: 'path',
  points,
  closed: false,
  stroke,
  fill: null,
  ...(title === undefined ? {} : { title }),
});

export const text = (
  x: number,
  y: number,
  words: string,
  anchor: 'start' | 'middle' | 'end' = 'start',
  size = 10,
  color: Color = 'ink',
  latex?: string,
): Shape => ({
  kind: 'text',
  x,
  y,
  text: words,
  size,
  anchor,
  color,
  ...(latex === undefined ? {} : { latex }),
});

/** Marks that differ in form, so that signatures can be read without colour. */
export type Marker = 'circle' | 'square' | 'triangle' | 'cross' | 'diamond' | 'ring';

/** A marker of about 2r across. */
export function marker(sort: Marker, x: number, y: number, r: number, color: Color, title?: string): readonly Shape[] {
  const stroke: Stroke = { color, width: 1.2 };
  const extra = title === undefined ? {} : { title };
  const polygon = (points: readonly (readonly [number, number])[]): Shape => ({
    kind: 'path',
    points: points.map(([dx, dy]) => [x + dx * r, y + dy * r]),
    closed: true,
    stroke: null,
    fill: color,
    ...extra,
  });
  switch (sort) {
    case 'circle':
      return [{ kind: 'circle', x, y, r, stroke: null, fill: color, ...extra }];
    case 'ring':
      return [{ kind: 'circle', x, y, r, stroke, fill: 'paper', ...extra }];
    case 'square':
      return [
        polygon([
          [-0.9, -0.9],
          [0.9, -0.9],
          [0.9, 0.9],
          [-0.9, 0.9],
        ]),
      ];
    case 'triangle':
      return [
        polygon([
          [0, -1.15],
          [1, 0.75],
          [-1, 0.75],
        ]),
      ];
    case 'diamond':
      return [
        polygon([
          [0, -1.3],
          [1.1, 0],
          [0, 1.3],
          [-1.1, 0],
        ]),
      ];
    case 'cross':
      return [
        line(
          [
            [x - r, y - r],
            [x + r, y + r],
          ],
          stroke,
          title,
        ),
        line(
          [
            [x - r, y + r],
            [x + r, y - r],
          ],
          stroke,
          title,
        ),
      ];
  }
}

/** A name cut to what a picture has room for. */
export function shortened(name: string, length = 18): string {
  const signs = [...name];
  return signs.length <= length ? name : `${signs.slice(0, length - 1).join('')}…`;
}

/** The label of a component, or of several, in a picture; a long one is cut. */
export function labelText(x: number, y: number, label: string, anchor: 'start' | 'middle' | 'end', size: number): Shape {
  const parts = label.split(' + ').map(labelLatex);
  const latex = parts.every((part) => part !== null) ? parts.join('\\oplus ') : undefined;
  return text(x, y, shortened(label), anchor, size, 'ink', latex);
}
