/** Classes of subgroups as a diagram: one level for each order, the whole group on top. */
import { type Color, line, type Scene, type Shape, text } from './scene.ts';

export interface LatticeNode {
  /** Nodes of one level stand side by side; the highest level is on top. */
  readonly level: number;
  readonly label: string;
  readonly detail: string;
  readonly mark: 'plain' | 'reversing';
  /** Filled, as opposed to open. */
  readonly good: boolean;
  /** Places of the nodes next above that contain this one; empty where it is not known. */
  readonly above: readonly number[];
}

export interface IsotropyFigure {
  readonly kind: 'lattice';
  readonly nodes: readonly LatticeNode[];
  readonly levelName: string;
  readonly legend: { readonly good: string; readonly other: string; readonly reversing: string; readonly plain: string };
}

const NODE_WIDTH = 62;
const NODE_HEIGHT = 30;
const GAP_X = 14;
const GAP_Y = 28;
const MARGIN_LEFT = 58;
/** At most so many nodes side by side; a fuller level goes over several lines. */
const PER_LINE = 6;

/** More nodes than this are gathered: those of one level that say the same become one. */
const MOST = 30;

function gathered(nodes: readonly LatticeNode[]): readonly LatticeNode[] {
  if (nodes.length <= MOST) return nodes;
  const keyOf = (n: LatticeNode) => [n.level, n.detail, n.mark, n.good].join(' ');
  const keys = [...new Set(nodes.map(keyOf))];
  return keys.map((key) => {
    const members = nodes.filter((n) => keyOf(n) === key);
    const first = members[0]!;
    const above = new Set(members.flatMap((n) => n.above.map((a) => keys.indexOf(keyOf(nodes[a] ?? first)))));
    above.delete(keys.indexOf(key));
    return { ...first, label: members.length === 1 ? first.label : `${first.label} (${members.length})`, above: [...above] };
  });
}

/** Draws the diagram. Nodes on the same level are put below the middle of what contains them. */
export function drawLattice(given: IsotropyFigure): Scene {
  const figure = { ...given, nodes: gathered(given.nodes) };
  const levels = [...new Set(figure.nodes.map((n) => n.level))].sort((a, b) => b - a);
  const rows: { level: number; first: boolean; members: number[] }[] = [];
  for (const level of levels) {
    const members = figure.nodes.flatMap((n, i) => (n.level === level ? [i] : []));
    for (let i = 0; i < members.length; i += PER_LINE) rows.push({ level, first: i === 0, members: members.slice(i, i + PER_LINE) });
  }
  const widest = Math.max(1, ...rows.map((r) => r.members.length));
  const inner = widest * NODE_WIDTH + (widest - 1) * GAP_X;
  const entries = legendEntries(figure);
  const width = Math.max(MARGIN_LEFT + inner + 10, 270, 4 + entries.reduce((sum, e) => sum + legendWidth(e), 0));
  const place = new Map<number, readonly [number, number]>();
  rows.forEach((row, r) => {
    const above = (i: number): number => {
      const xs = figure.nodes[i]!.above.map((a) => place.get(a)?.[0]).filter((x) => x !== undefined);
      return xs.length === 0 ? Number.POSITIVE_INFINITY : xs.reduce((a, b) => a + b, 0) / xs.length;
    };
    const members = row.members.map((i) => [i, above(i)] as const).sort((a, b) => (a[1] === b[1] ? a[0] - b[0] : a[1] - b[1]));
    const used = members.length * NODE_WIDTH + (members.length - 1) * GAP_X;
    members.forEach(([i], k) => {
      place.set(i, [
        MARGIN_LEFT + (width - MARGIN_LEFT - 10 - used) / 2 + k * (NODE_WIDTH + GAP_X) + NODE_WIDTH / 2,
        12 + r * (NODE_HEIGHT + GAP_Y) + NODE_HEIGHT / 2,
      ]);
    });
  });
  const shapes: Shape[] = [];
  figure.nodes.forEach((node, i) => {
    for (const a of node.above) {
      const from = place.get(a);
      const to = place.get(i)!;
      if (from !== undefined)
        shapes.push(
          line(
            [
              [from[0], from[1] + NODE_HEIGHT / 2],
              [to[0], to[1] - NODE_HEIGHT / 2],
            ],
            { color: 'faint', width: 1 },
          ),
        );
    }
  });
  rows.forEach((row, r) => {
    if (row.first)
      shapes.push(text(4, 12 + r * (NODE_HEIGHT + GAP_Y) + NODE_HEIGHT / 2 + 3, `${figure.levelName} ${row.level}`, 'start', 9));
  });
  for (const [i, node] of figure.nodes.entries()) shapes.push(...drawNode(node, place.get(i)!));
  const bottom = 12 + rows.length * (NODE_HEIGHT + GAP_Y) - GAP_Y + 22;
  const legend = drawLegend(entries, bottom);
  const levelsText = figure.nodes.map((n) => `${figure.levelName} ${n.level}: ${n.detail}`).join('; ');
  return {
    width,
    height: bottom + (legend.length > 0 ? 10 : -10),
    description: `Diagram of subgroup classes. ${levelsText}.`,
    shapes: [...shapes, ...legend],
  };
}

function box(x: number, y: number, w: number, h: number, good: boolean, reversing: boolean, title?: string): Shape {
  const color: Color = good ? '#0072b2' : '#d55e00';
  const cut = reversing ? Math.min(7, h / 3) : 0;
  const [l, t, r, b] = [x - w / 2, y - h / 2, x + w / 2, y + h / 2];
  const corners: (readonly [number, number])[] =
    cut === 0
      ? [
          [l, t],
          [r, t],
          [r, b],
          [l, b],
        ]
      : [
          [l + cut, t],
          [r - cut, t],
          [r, t + cut],
          [r, b - cut],
          [r - cut, b],
          [l + cut, b],
          [l, b - cut],
          [l, t + cut],
        ];
  return {
    kind: 'path',
    points: corners,
    closed: true,
    stroke: { color, width: good ? 1.8 : 1, ...(good ? {} : { dash: [4, 2] }) },
    fill: 'paper',
    ...(title === undefined ? {} : { title }),
  };
}

function drawNode(node: LatticeNode, [x, y]: readonly [number, number]): readonly Shape[] {
  return [
    box(x, y, NODE_WIDTH, NODE_HEIGHT, node.good, node.mark === 'reversing', `${node.label}: ${node.detail}`),
    text(x, y - 2, node.label, 'middle', 10),
    text(x, y + 10, node.detail, 'middle', 8.5),
  ];
}

interface LegendEntry {
  readonly good: boolean;
  readonly reversing: boolean;
  readonly words: string;
}

/** Box, words in small type, and a gap; wide enough for the widest of the usual faces. */
const legendWidth = (e: LegendEntry): number => 32 + e.words.length * 5.2;

function legendEntries(figure: IsotropyFigure): readonly LegendEntry[] {
  const entries: LegendEntry[] = [];
  if (figure.nodes.some((n) => n.good)) entries.push({ good: true, reversing: false, words: figure.legend.good });
  if (figure.nodes.some((n) => !n.good)) entries.push({ good: false, reversing: false, words: figure.legend.other });
  if (figure.nodes.some((n) => n.mark === 'reversing')) entries.push({ good: true, reversing: true, words: figure.legend.reversing });
  return entries;
}

function drawLegend(entries: readonly LegendEntry[], y: number): readonly Shape[] {
  let x = 4;
  return entries.flatMap((e) => {
    const shapes = [box(x + 8, y - 3, 16, 10, e.good, e.reversing), text(x + 20, y, e.words, 'start', 8.5)];
    x += legendWidth(e);
    return shapes;
  });
}
