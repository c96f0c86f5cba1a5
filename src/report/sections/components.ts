/** The isotypic decomposition and the blocks of the flow with their symmetry classes. */

import type { Value } from '../../study/result.ts';
import { type Block, type Column, cite, column, joined, type Line, type Matrix, math, paragraph, type Section } from '../document.ts';
import { algebra, formula, label, latexLabel, sign } from '../mathematics/index.ts';
import type { ReportView } from '../view.ts';
import { determinantBlocks } from './determinants.ts';
import { DASH, inertia, integer, components as labelLine, pair, yesNo } from './words.ts';

/** Blocks with more rows than this, or bases and blocks longer than so many signs, are left to the JSON result. */
const PRINTED = 20;
const PRINTED_LENGTH = 2500;
/** A longer name is no index. */
const LONGEST_INDEX = 24;

export function componentsSection(view: ReportView): Section | null {
  const list = view.components;
  if (list === undefined) return null;
  const flows = list.some((c) => c.flowsTo !== undefined && c.flowsTo !== c.label);
  const signed = list.some((c) => c.inertia !== undefined);
  const columns: Column[] = [
    column('component'),
    column('dimension', 'right'),
    column('type'),
    column('multiplicity', 'right'),
    column('carries a form'),
    ...(flows ? [column(['mapped by ', math(formula('L')), ' to'])] : []),
    ...(signed ? [column(['inertia of ', math(formula('S'))])] : []),
  ];
  const blocks: Block[] = [
    {
      kind: 'paragraph',
      line: [
        'Real irreducible representations in the phase space. A component carries a form where an invariant skew form lives on one copy of it; there the eigenvalues pass, elsewhere they split ',
        cite('golubitsky-stewart-1987', 'melbourne-dellnitz-1993'),
        '.',
      ],
      aside: true,
    },
    {
      kind: 'table',
      caption: 'Isotypic components of the phase space.',
      columns,
      rows: list.map((c): readonly Line[] => [
        [math(label(c.label))],
        [integer(c.dimension)],
        [c.type],
        [integer(c.multiplicity)],
        [yesNo(c.carriesForm)],
        ...(flows ? [[math(label(c.flowsTo ?? c.label))]] : []),
        ...(signed ? [c.inertia === undefined ? DASH : [inertia(c.inertia)]] : []),
      ]),
    },
  ];
  if (list.length > 0)
    blocks.push({
      kind: 'figure',
      figure: {
        kind: 'blocks',
        components: list.map((c) => ({ label: c.label, dimension: c.dimension, type: c.type, multiplicity: c.multiplicity })),
      },
      caption: 'Blocks of S in a symmetry-adapted basis; copies of one component have equal blocks.',
    });
  for (const c of list) blocks.push(...basisBlocks([c.label], c.basis), ...matrixBlocks([c.label], [['S', 'S', c.block]]));
  blocks.push(...determinantBlocks(list));
  return { id: 'components', title: 'Components', blocks };
}

export function classesSection(view: ReportView): Section | null {
  const list = view.classes;
  if (list === undefined) return null;
  const signed = list.some((c) => c.signature !== undefined);
  const blocks: Block[] = [
    {
      kind: 'paragraph',
      line: [
        'Each block of the flow belongs to one of ten classes: a Lie algebra of maps that commute with the elements that keep time, and the part of it that commutes with all ',
        cite('hoveijn-lamb-roberts-2003'),
        '.',
      ],
      aside: true,
    },
    {
      kind: 'table',
      caption:
        'Symmetry classes of the blocks of L; P is the class of Hamiltonians, its dimension and that of the group are those of the block.',
      columns: [
        column('components'),
        column('class', 'right'),
        column('algebra'),
        column('subalgebra'),
        column(['dim ', math(formula('P'))], 'right'),
        column('dim of group', 'right'),
        ...(signed ? [column('signature')] : []),
      ],
      rows: list.map((c): readonly Line[] => [
        labelLine(c.components),
        [integer(c.number)],
        [math(algebra(c.algebra))],
        [math(algebra(c.subalgebra))],
        [integer(c.dimensionOfClass)],
        [integer(c.dimensionOfGroup)],
        ...(signed ? [c.signature === undefined ? DASH : [pair(c.signature)]] : []),
      ]),
    },
  ];
  for (const c of list)
    blocks.push(
      ...basisBlocks(c.components, c.basis),
      ...matrixBlocks(c.components, [
        ['S', 'S', c.stiffness],
        ['omega', '\\omega', c.form],
        ['L', 'L', c.flow],
      ]),
    );
  return { id: 'classes', title: 'Classes of the blocks', blocks };
}

function basisBlocks(names: readonly string[], basis: readonly string[] | undefined): readonly Block[] {
  if (basis === undefined || basis.length === 0) return [];
  const length = basis.reduce((total, vector) => total + vector.length, 0);
  if (length > PRINTED_LENGTH)
    return [
      paragraph(
        'The adapted basis of ',
        ...labelLine(names),
        ` has ${basis.length} vectors, too long to be printed; the JSON result has them.`,
      ),
    ];
  return [paragraph('Adapted basis of ', ...labelLine(names), ': ', ...joined(basis.map((vector) => math(formula(vector)))), '.')];
}

type NamedRows = readonly [text: string, latex: string, rows: readonly (readonly Value[])[] | undefined];

function matrixBlocks(names: readonly string[], parts: readonly NamedRows[]): readonly Block[] {
  const name = names.join(' + ');
  const index = name.length > LONGEST_INDEX ? '' : `_{${names.map(latexLabel).join('\\oplus ')}}`;
  const present = parts.flatMap(([text, latex, rows]) => (rows === undefined || rows.length === 0 ? [] : [{ text, latex, rows }]));
  const printed = present.filter(
    ({ rows }) => rows.length <= PRINTED && rows.flat().reduce<number>((n, v) => n + String(v).length, 0) <= PRINTED_LENGTH,
  );
  const left = present.filter((part) => !printed.includes(part));
  const matrices = printed.map(
    ({ text, latex, rows }): Matrix => ({
      name: sign(`${text} on ${name}`, `${latex}${index}`, 2 + Math.min(name.length, LONGEST_INDEX) * 0.4),
      rows: rows.map((row) => row.map((v) => formula(v))),
    }),
  );
  return [
    ...(matrices.length === 0 ? [] : [{ kind: 'matrices' as const, matrices }]),
    ...left.map(({ text, rows }) =>
      paragraph(`${text} on `, ...labelLine(names), ` has ${rows.length} rows, too many to be printed; the JSON result has them.`),
    ),
  ];
}
