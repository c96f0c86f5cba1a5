/** A scene as SVG, to stand alone or in a page; ink and paper follow the surroundings. */
import type { Color, Scene, Shape, Stroke } from './scene.ts';

export const escapeXml = (text: string): string =>
  text
    // biome-ignore lint/suspicious/noControlCharactersInRegex: XML forbids them, so they are dropped
    .replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/g, '')
    .replace(/[&<>"']/g, (sign) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' })[sign]!);

const number = (x: number): string => String(Math.round(x * 100) / 100);

/** Pixels of a screen to a point of the scene. */
const PIXELS = 4 / 3;

function paint(color: Color): string {
  if (color === 'ink') return 'currentColor';
  if (color === 'faint') return '#8a8a8a';
  if (color === 'paper') return 'var(--paper, #fff)';
  return color;
}

const strokeAttributes = (stroke: Stroke | null): string =>
  stroke === null
    ? ''
    : ` stroke="${paint(stroke.color)}" stroke-width="${number(stroke.width)}"${stroke.dash === undefined || stroke.dash.length === 0 ? '' : ` stroke-dasharray="${stroke.dash.map(number).join(' ')}"`}`;

type PathWriter = (points: readonly (readonly [number, number])[], closed: boolean) => string;

/** Path data by the generators of d3-shape, to hundredths of a point. */
async function pathWriter(): Promise<PathWriter> {
  const { curveLinear, curveLinearClosed, line } = await import('d3-shape');
  const writers = [curveLinear, curveLinearClosed].map((curve) =>
    line<readonly [number, number]>(
      ([x]) => x,
      ([, y]) => y,
    )
      .curve(curve)
      .digits(2),
  );
  return (points, closed) => writers[closed ? 1 : 0]!(points) ?? '';
}

function element(shape: Shape, write: PathWriter): string {
  if (shape.kind === 'text') {
    const anchor = shape.anchor === 'start' ? '' : ` text-anchor="${shape.anchor}"`;
    return `<text x="${number(shape.x)}" y="${number(shape.y)}" font-size="${number(shape.size)}"${anchor} fill="${paint(shape.color)}"${shape.bold === true ? ' font-weight="bold"' : ''}>${escapeXml(shape.text)}</text>`;
  }
  const fill = ` fill="${shape.fill === null ? 'none' : paint(shape.fill)}"${shape.kind === 'path' && shape.opacity !== undefined && shape.opacity !== 1 ? ` fill-opacity="${number(shape.opacity)}"` : ''}`;
  const title = shape.title === undefined ? '' : `<title>${escapeXml(shape.title)}</title>`;
  if (shape.kind === 'circle')
    return close(
      `circle cx="${number(shape.x)}" cy="${number(shape.y)}" r="${number(shape.r)}"${fill}${strokeAttributes(shape.stroke)}`,
      'circle',
      title,
    );
  return close(
    `path d="${write(shape.points, shape.closed)}"${fill}${strokeAttributes(shape.stroke)} stroke-linejoin="round"`,
    'path',
    title,
  );
}

const close = (head: string, name: string, inside: string): string => (inside === '' ? `<${head}/>` : `<${head}>${inside}</${name}>`);

/** The picture. Alone it brings its own ink and paper, light and dark; inside a page it takes those of the page. */
export async function sceneToSvg(scene: Scene, alone: boolean): Promise<string> {
  const write = await pathWriter();
  const size = `viewBox="0 0 ${number(scene.width)} ${number(scene.height)}" width="${number(scene.width * PIXELS)}" height="${number(scene.height * PIXELS)}"`;
  const style = alone
    ? '<style>svg{color:#111;--paper:#fff;background:#fff}@media (prefers-color-scheme:dark){svg{color:#eee;--paper:#1b1b1b;background:#1b1b1b}}</style>'
    : '';
  const head = alone ? ' xmlns="http://www.w3.org/2000/svg"' : '';
  return [
    `<svg${head} ${size} role="img" aria-label="${escapeXml(scene.description)}" font-family="system-ui, sans-serif">`,
    ...(alone ? [`<title>${escapeXml(scene.description)}</title>`, style] : []),
    ...scene.shapes.map((shape) => element(shape, write)),
    '</svg>',
  ].join('\n');
}

/** Several pictures below each other in one file. */
export function stackScenes(scenes: readonly Scene[]): Scene {
  if (scenes.length === 1) return scenes[0]!;
  let top = 0;
  const shapes: Shape[] = [];
  for (const scene of scenes) {
    const dy = top;
    for (const shape of scene.shapes) {
      if (shape.kind === 'path') shapes.push({ ...shape, points: shape.points.map(([x, y]) => [x, y + dy] as const) });
      else shapes.push({ ...shape, y: shape.y + dy });
    }
    top += scene.height + 20;
  }
  return {
    width: scenes.reduce((w, s) => Math.max(w, s.width), 1),
    height: Math.max(1, top - 20),
    description: scenes.map((s) => s.description).join(' '),
    shapes,
  };
}
