/** Along a parameter: where components meet zero or collide, and the pictures of it. */
import { type Block, column, joined, type Line, math, paragraph, type Section } from '../document.ts';
import { formula, label, relation, sign } from '../mathematics/index.ts';
import type { CrossingView, FilesView, ReportView } from '../view.ts';
import { components, inertia, integer, orDash, pair, yesNo } from './words.ts';

export function sweepSection(view: ReportView): Section | null {
  if (view.crossings === undefined) return null;
  const blocks: Block[] = [...rangeBlocks(view), ...crossingBlocks(view.crossings), ...meetingBlocks(view), ...fileBlocks(view.files)];
  const singular = view.singular ?? [];
  if (singular.length > 0)
    blocks.push(
      paragraph(
        singular.length === 1 ? 'The block of ' : 'The blocks of ',
        ...joined(singular.map((name) => math(label(name)))),
        singular.length === 1 ? ' is' : ' are',
        ' singular for every value of the parameter.',
      ),
    );
  if (view.ends !== undefined && view.ends.length > 0) blocks.push({ kind: 'list', items: view.ends.map((words) => [words]) });
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

function rangeBlocks(view: ReportView): readonly Block[] {
  if (view.range === undefined) return [];
  const { parameter, from, to, steps } = view.range;
  return [
    paragraph(
      math(formula(parameter)),
      ' runs from ',
      math(formula(from)),
      ' to ',
      math(formula(to)),
      ...(steps === undefined ? [] : [' in ', integer(steps), ' steps']),
      view.followed === true
        ? '; the equilibrium moves and is followed.'
        : view.followed === false
          ? '; the equilibrium stays where it is.'
          : '.',
    ),
  ];
}

function place(c: CrossingView): Line {
  if (c.exact === null || c.exact === undefined) return [math(relation(formula(c.parameter), '~', formula(c.value)))];
  const exact = math(relation(formula(c.parameter), '=', formula(c.exact)));
  // an integer says it all
  if (/^-?\d+$/.test(c.exact)) return [exact];
  return [exact, ' ', math(sign('~', '\\approx', 1)), ' ', math(formula(c.value))];
}

function crossingBlocks(crossings: readonly CrossingView[]): readonly Block[] {
  if (crossings.length === 0) return [paragraph('No eigenvalue meets zero in the range.')];
  const observed = crossings.some((c) => c.observed !== undefined);
  const inFiles = crossings.some((c) => c.between !== undefined || c.file !== undefined);
  const versal = crossings.some((c) => c.versal !== undefined && c.versal !== null);
  const table: Block = {
    kind: 'table',
    caption: 'Zero events along the parameter, with the inertia of S (positive, zero, negative) on both sides.',
    columns: [
      column('at'),
      column('component'),
      column('kernel', 'right'),
      column('motion'),
      ...(observed ? [column('observed')] : []),
      ...(inFiles ? [column('files')] : []),
      column('codimension', 'right'),
      ...(versal ? [column('versal')] : []),
      column('before'),
      column('after'),
    ],
    rows: crossings.map((c): readonly Line[] => [
      place(c),
      components(typeof c.component === 'string' ? [c.component] : c.component),
      [integer(c.kernel)],
      [c.motion],
      ...(observed ? [[`${c.observed?.motion ?? '–'}${c.agrees === false ? ' (not as predicted)' : ''}`]] : []),
      ...(inFiles ? [[c.between === undefined ? `at ${c.file}` : c.between.join(' to ')]] : []),
      orDash(c.codimension),
      ...(versal ? [[c.versal === undefined || c.versal === null ? '–' : yesNo(c.versal)]] : []),
      [inertia(c.inertiaBefore)],
      [inertia(c.inertiaAfter)],
    ]),
  };
  const notes = crossings.flatMap((c): readonly Line[] => {
    const out: Line[] = [];
    if (c.fold === true) out.push(['At ', ...place(c), ' the branch of equilibria turns back.']);
    if (c.polynomial !== undefined)
      out.push([
        'The value ',
        math(formula(c.digits ?? c.value)),
        ' is a root of ',
        math(formula(c.polynomial)),
        '; it has no closed form here.',
      ]);
    return out;
  });
  return notes.length === 0 ? [table] : [table, { kind: 'list', items: notes }];
}

function meetingBlocks(view: ReportView): readonly Block[] {
  const meetings = view.meetings ?? [];
  if (meetings.length === 0) return [];
  return [
    {
      kind: 'table',
      caption: 'Eigenvalues that meet off zero along the parameter; the value is the frequency or the rate.',
      columns: [
        column('at'),
        column('kind'),
        column('value', 'right'),
        column('components'),
        column('motion'),
        column('codimension', 'right'),
        column('signs'),
      ],
      rows: meetings.map((m): readonly Line[] => [
        [math(relation(formula(m.parameter), '~', formula(m.at)))],
        [m.kind],
        [math(formula(m.value))],
        components(m.components),
        [m.motion],
        orDash(m.codimension),
        m.signs === undefined ? ['–'] : [pair(m.signs)],
      ]),
    },
  ];
}

/** More files than this are in the data and not in the table. */
const FILES = 60;

function fileBlocks(files: FilesView | undefined): readonly Block[] {
  if (files === undefined) return [];
  const { parameter, note, points } = files;
  const shown = points.slice(0, FILES);
  const names = points[0]?.eigenvalues.map((e) => e.component) ?? [];
  const text = ({ re, im }: { readonly re: number; readonly im: number }): Line[number][] => [
    ...(re === 0 ? [] : ['rate ', math(formula(short(re)))]),
    ...(im === 0 && re !== 0 ? [] : [re === 0 ? '' : ', ', math(formula(short(im)))]),
  ];
  return [
    paragraph(
      `The matrices are those of numbered files; ${note}.`,
      points.length > FILES ? ` The first ${FILES} of ${points.length} files:` : '',
    ),
    {
      kind: 'table',
      caption: 'Frequencies at each file by component, or rates where a mode grows, with the inertia of S (positive, zero, negative).',
      columns: [
        column([math(formula(parameter))], 'right'),
        column('file'),
        ...names.map((name) => column(components(name.split(' + ')))),
        column('inertia'),
      ],
      rows: shown.map((p): readonly Line[] => [
        [math(formula(p.value))],
        [p.files.join(', ')],
        ...p.eigenvalues.map((e): Line => e.values.flatMap((v, k) => [...(k === 0 ? [] : ['; ']), ...text(v)])),
        [inertia(p.inertia)],
      ]),
    },
  ];
}

const short = (x: number): number => Number(x.toPrecision(6));
