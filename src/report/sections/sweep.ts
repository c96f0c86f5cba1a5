/** Along a parameter: where components meet zero or collide, and the pictures of it. */
import { type Block, column, type Line, math, type Section } from '../document.ts';
import { formula, sign } from '../mathematics/index.ts';
import type { ReportView } from '../view.ts';
import { components, inertia, integer } from './words.ts';

export function sweepSection(view: ReportView): Section | null {
  const crossings = view.crossings;
  if (crossings === undefined) return null;
  const blocks: Block[] = [];
  if (crossings.length === 0) blocks.push({ kind: 'paragraph', line: ['No eigenvalue meets zero in the range.'] });
  else {
    const kinds = crossings.some((c) => c.kind !== undefined);
    blocks.push({
      kind: 'table',
      caption: 'Events along the parameter, with the inertia of S (positive, zero, negative) on both sides.',
      columns: [
        column('at'),
        ...(kinds ? [column('event')] : []),
        column('component'),
        column('kernel', 'right'),
        column('motion'),
        column('codimension', 'right'),
        column('before'),
        column('after'),
      ],
      rows: crossings.map((c): readonly Line[] => [
        [
          math(formula(c.parameter)),
          ' ',
          ...(c.exact === null || c.exact === undefined ? [] : [math(sign('=', '=', 1)), ' ', math(formula(c.exact)), ' ']),
          math(sign('~', '\\approx', 1)),
          ' ',
          math(formula(c.value)),
        ],
        ...(kinds ? [[c.kind ?? 'zero']] : []),
        components(typeof c.component === 'string' ? [c.component] : c.component),
        [integer(c.kernel)],
        [c.motion],
        [integer(c.codimension)],
        [inertia(c.inertiaBefore)],
        [inertia(c.inertiaAfter)],
      ]),
    });
  }
  if (view.paths !== undefined)
    blocks.push({
      kind: 'figure',
      figure: view.paths,
      caption: 'Eigenvalues along the parameter: frequencies and rates, and their paths in the complex plane.',
    });
  if (view.chart !== undefined)
    blocks.push({ kind: 'figure', figure: view.chart, caption: 'Curves in the plane of two parameters on which a component meets zero.' });
  return { id: 'sweep', title: 'Along the parameter', blocks };
}
