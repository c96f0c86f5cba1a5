/** The zero event: kernel, Jordan blocks, codimension by two routes, under every class of subgroups, unfolding. */
import { type Block, cite, column, type Line, math, type Section } from '../document.ts';
import { formula, label, relation } from '../mathematics/index.ts';
import type { ReportView } from '../view.ts';
import { subgroupBlocks } from './subgroups.ts';
import { components, inertia, integer, motionSentence, orDash, partition, within } from './words.ts';

/** Signs of unfolding terms in a document. */
const BUDGET = 6000;

export function zeroSection(view: ReportView): Section | null {
  const zero = view.zero;
  if (zero === undefined) return null;
  const blocks: Block[] = [];
  if (zero === null) {
    blocks.push({
      kind: 'paragraph',
      line: [
        'The Hessian ',
        math(formula('S')),
        ' is nonsingular',
        ...(view.neutral !== undefined && view.neutral.dimension > 0 ? [' apart from the neutral directions'] : []),
        ': no eigenvalue is at zero.',
      ],
    });
    if (view.inertia !== undefined)
      blocks.push({ kind: 'facts', rows: [{ name: 'Inertia of S', line: [inertia(view.inertia), ' (positive, zero, negative)'] }] });
    blocks.push(...neutralBlocks(view));
    return { id: 'zero-event', title: 'Zero event', blocks };
  }
  const rows: { name: string; line: Line }[] = [
    { name: 'Generalised kernel', line: ['dimension ', integer(zero.dimension)] },
    {
      name: 'Kernel',
      line: [
        'dimension ',
        integer(zero.kernel),
        ...(zero.components === undefined || zero.components.length === 0 ? [] : [', component ', ...components(zero.components)]),
      ],
    },
    { name: 'Jordan blocks', line: [partition(zero.blocks), zero.semisimple ? ' (semisimple)' : ''] },
    {
      name: 'Codimension',
      line: [...orDash(zero.codimension), ' in the symmetric class, ', ...orDash(zero.codimensionWithoutSymmetry), ' without symmetry'],
    },
    { name: 'Motion', line: [zero.motion, ': ', motionSentence(zero.motion)] },
  ];
  if (view.inertia !== undefined) rows.push({ name: 'Inertia of S', line: [inertia(view.inertia), ' (positive, zero, negative)'] });
  blocks.push({ kind: 'facts', rows });
  if (zero.signs !== undefined && zero.signs.length > 0) {
    blocks.push({
      kind: 'table',
      caption: 'Jordan blocks at zero with their signs; blocks of odd size on components without a form have none.',
      columns: [
        column('component'),
        column('size', 'right'),
        column('number', 'right'),
        column('positive', 'right'),
        column('negative', 'right'),
      ],
      rows: zero.signs.map((s) => [
        [math(label(s.component))],
        [integer(s.size)],
        [integer(s.count)],
        [integer(s.positive)],
        [integer(s.negative)],
      ]),
    });
  }
  if (zero.routes !== undefined && zero.routes.length > 0) {
    blocks.push({
      kind: 'paragraph',
      line: [
        'Codimension block by block, by the rank of the adjoint map ',
        cite('arnold-1971'),
        ' and by the formula of the class ',
        cite('galin-1982', 'collingwood-mcgovern-1993'),
        '; the two routes share nothing and agree.',
      ],
      aside: true,
    });
    blocks.push({
      kind: 'table',
      caption: 'Codimension of the event on each block of the flow, by two routes.',
      columns: [
        column('components'),
        column('class', 'right'),
        column('partition'),
        column('by rank', 'right'),
        column('by formula', 'right'),
      ],
      rows: zero.routes.map((r) => [
        components(r.components),
        [integer(r.class)],
        [partition(r.partition)],
        [integer(r.rank)],
        [integer(r.formula)],
      ]),
    });
  }
  blocks.push(...subgroupBlocks(view));
  blocks.push(...unfoldingBlocks(view));
  blocks.push(...neutralBlocks(view));
  return { id: 'zero-event', title: 'Zero event', blocks };
}

function unfoldingBlocks(view: ReportView): readonly Block[] {
  const zero = view.zero!;
  const blocks: Block[] = [];
  const part = (terms: readonly string[] | undefined, words: string, letter: string, extra: { aside?: true }) => {
    if (terms === undefined || terms.length === 0) return;
    const shown = within(terms, (t) => t.length, BUDGET);
    blocks.push({ kind: 'paragraph', line: [words], ...extra });
    blocks.push({ kind: 'list', items: shown.map((t, i) => [math(relation(formula(`${letter}${i + 1}`), '=', formula(t)))]), ...extra });
    if (shown.length < terms.length)
      blocks.push({ kind: 'paragraph', line: [`${terms.length - shown.length} more are left to the JSON result.`], ...extra });
  };
  part(zero.unfolding, 'A versal unfolding in the symmetric class adds combinations of these quadratic Hamiltonians:', 'h', {});
  part(zero.unfoldingWithoutSymmetry, 'Without symmetry it takes all of these:', 'k', { aside: true });
  return blocks;
}

function neutralBlocks(view: ReportView): readonly Block[] {
  const neutral = view.neutral;
  if (neutral === undefined || neutral.dimension === 0) return [];
  const directions = neutral.directions ?? [];
  return [
    {
      kind: 'paragraph',
      line: [
        'Continuous symmetries force zeros of total dimension ',
        integer(neutral.dimension),
        '; they are split off, and kernel, inertia and codimension speak of the symplectic slice',
        ...(directions.length === 0 ? ['.'] : [`. Directions: ${directions.join('; ')}.`]),
      ],
    },
  ];
}
