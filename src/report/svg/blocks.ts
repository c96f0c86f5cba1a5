/** The components as a picture of the matrix of S in an adapted basis: equal blocks down the diagonal. */

import { colorOf, dashOf, labelText, rectangle, type Scene, type Shape, text } from './scene.ts';

export interface BlockComponent {
  readonly label: string;
  readonly dimension: number;
  readonly type: 'real' | 'complex' | 'quaternionic';
  readonly multiplicity: number;
}

export interface BlockFigure {
  readonly kind: 'blocks';
  readonly components: readonly BlockComponent[];
}

const SIDE = 180;
/** Real dimension of the commuting algebra of one irreducible. */
const BETA = { real: 1, complex: 2, quaternionic: 4 } as const;
const LINES_IN_KEY = 12;
const COLUMN = 168;

/** Draws the blocks with a key; on a component of dimension d and type β there are d/β equal blocks of size β·multiplicity. */
export function drawBlocks(figure: BlockFigure): Scene {
  const components = figure.components.filter((c) => c.multiplicity > 0);
  const size = components.reduce((total, c) => total + c.dimension * c.multiplicity, 0);
  const scale = SIDE / Math.max(1, size);
  const columns = Math.max(1, Math.ceil(components.length / LINES_IN_KEY));
  const shapes: Shape[] = [rectangle(8, 8, SIDE, SIDE, { color: 'faint', width: 0.8 }, null)];
  const words: string[] = [];
  let at = 8;
  components.forEach((c, i) => {
    const beta = BETA[c.type];
    const copies = Math.max(1, Math.round(c.dimension / beta));
    const side = beta * c.multiplicity * scale;
    const sentence = `${copies} ${copies === 1 ? 'block' : 'equal blocks'} of size ${beta * c.multiplicity}`;
    for (let k = 0; k < copies; k++) {
      shapes.push(
        rectangle(
          at,
          at,
          side,
          side,
          { color: colorOf(i), width: side > 6 ? 1 : 0.5, ...(side > 12 ? { dash: dashOf(Math.floor(i / 8)) } : {}) },
          colorOf(i),
          0.35,
          `${c.label}: ${sentence}`,
        ),
      );
      if (side > 8 + c.label.length * 5) shapes.push(labelText(at + side / 2, at + side / 2 + 3, c.label, 'middle', 9));
      at += side;
    }
    const x = SIDE + 26 + COLUMN * Math.floor(i / LINES_IN_KEY);
    const y = 18 + 15 * (i % LINES_IN_KEY);
    shapes.push(rectangle(x, y - 8, 10, 10, { color: colorOf(i), width: 1 }, colorOf(i), 0.35));
    shapes.push(labelText(x + 16, y, c.label, 'start', 9.5));
    shapes.push(text(x + 42, y, `${copies} × ${beta * c.multiplicity}`, 'start', 9));
    words.push(`${c.label}: ${sentence}`);
  });
  return {
    width: SIDE + 26 + COLUMN * columns,
    height: SIDE + 16,
    description: `Block picture of S, ${size} by ${size}. ${words.join('; ')}.`,
    shapes,
  };
}
