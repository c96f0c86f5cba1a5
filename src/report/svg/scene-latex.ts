/** A scene as a LaTeX picture: lines by the drawing operators of PDF, words by LaTeX in its own fonts. */
import { latexText } from '../mathematics/index.ts';
import type { Color, Scene, Shape, Stroke } from './scene.ts';

const number = (x: number): string => String(Math.round(x * 100) / 100);

function rgb(color: Color): string {
  if (color === 'ink') return '0 0 0';
  if (color === 'faint') return '0.6 0.6 0.6';
  if (color === 'paper') return '1 1 1';
  return [1, 3, 5].map((i) => number(Number.parseInt(color.slice(i, i + 2), 16) / 255)).join(' ');
}

/** The picture; widths are in points of TeX, close enough to those of the scene. */
export function sceneToLatex(scene: Scene): string {
  const { width, height } = scene;
  const parts = scene.shapes.map((shape) =>
    shape.kind === 'text' ? textPart(shape, height) : `\\put(0,0){\\symcodimdraw{${pathPart(shape, height)}}}`,
  );
  return `{\\setlength{\\unitlength}{1bp}\\begin{picture}(${number(width)},${number(height)})\n${parts.join('\n')}\n\\end{picture}}`;
}

function strokePart(stroke: Stroke): string {
  return `${rgb(stroke.color)} RG ${number(stroke.width)} w [${(stroke.dash ?? []).map(number).join(' ')}] 0 d`;
}

function paint(
  shape: { readonly stroke: Stroke | null; readonly fill: Color | null; readonly opacity?: number },
  closed: boolean,
): { before: string; after: string } {
  const before = [
    shape.stroke === null ? '' : strokePart(shape.stroke),
    shape.fill === null ? '' : `${fillColor(shape.fill, shape.opacity ?? 1)} rg`,
  ]
    .filter((s) => s !== '')
    .join(' ');
  const after = shape.fill !== null ? (shape.stroke !== null ? (closed ? 'b' : 'B') : 'f') : closed ? 's' : 'S';
  return { before, after };
}

/** Thin colours are mixed with white: the operators used here know no transparency. */
function fillColor(color: Color, opacity: number): string {
  return rgb(color)
    .split(' ')
    .map((c) => number(1 - opacity * (1 - Number(c))))
    .join(' ');
}

function pathPart(shape: Exclude<Shape, { kind: 'text' }>, height: number): string {
  const at = (x: number, y: number): string => `${number(x)} ${number(height - y)}`;
  if (shape.kind === 'circle') {
    const { x, y, r } = shape;
    const k = 0.5523 * r;
    const { before, after } = paint(shape, true);
    return `${before} ${at(x + r, y)} m ${at(x + r, y - k)} ${at(x + k, y - r)} ${at(x, y - r)} c ${at(x - k, y - r)} ${at(x - r, y - k)} ${at(x - r, y)} c ${at(x - r, y + k)} ${at(x - k, y + r)} ${at(x, y + r)} c ${at(x + k, y + r)} ${at(x + r, y + k)} ${at(x + r, y)} c ${after}`;
  }
  if (shape.points.length === 0) return '';
  const { before, after } = paint(shape, shape.closed);
  const points = shape.points.map(([x, y], i) => `${at(x, y)} ${i === 0 ? 'm' : 'l'}`);
  // long paths in several lines, so that no line of the source grows beyond what editors like
  return `${before} 1 J 1 j ${points.map((p, i) => (i % 12 === 11 ? `${p}\n` : `${p} `)).join('')}${after}`;
}

function textPart(shape: Extract<Shape, { kind: 'text' }>, height: number): string {
  const place = { start: 'l', middle: '', end: 'r' }[shape.anchor];
  const words = shape.latex === undefined ? latexText(shape.text) : `$${shape.latex}$`;
  const size = `\\fontsize{${number(shape.size)}}{${number(shape.size * 1.2)}}\\selectfont`;
  return `\\put(${number(shape.x)},${number(height - shape.y)}){\\makebox(0,0)[b${place}]{\\smash{${size}${shape.color === 'faint' ? '\\color{gray}' : ''}${shape.bold === true ? '\\bfseries ' : ' '}${words}}}}`;
}
