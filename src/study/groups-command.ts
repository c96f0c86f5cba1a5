/** `groups`: the catalogue, or one group with its generators, classes and characters. */
import { type CatalogueEntry, type CatalogueGroup, listCatalogue, loadCatalogueGroup } from '../group/catalogue.ts';
import { type GroupSummary, summariseGroup } from './catalogue-group.ts';
import type { Outcome } from './outcome.ts';
import { textTable } from './text-table.ts';

/** Matrices of more columns are left to the JSON result. */
const WIDEST_MATRIX = 8;
/** Longer character values stand under a letter. */
const LONGEST_VALUE = 8;
/** Columns of a terminal that is not asked for its width. */
const WIDTH = 100;

/** The outcome of `symcodim groups` and `symcodim groups NAME`. Throws InputError for an unknown name, NotAGroupError past the limit. */
export function groupsOutcome(name: string | undefined, orderLimit?: number): Outcome {
  if (name === undefined) {
    const groups = listCatalogue();
    return { result: { schema: 'symcodim/1', command: 'groups', groups }, status: 0, text: () => catalogueText(groups), documents: {} };
  }
  const declared = loadCatalogueGroup(name);
  const summary = summariseGroup(declared, orderLimit);
  const { title, source, parameter, generators, defaultAction } = declared;
  const actions = [...declared.actions.values()].map((action) => ({
    name: action.name,
    title: action.title,
    dimension: action.dimension,
    matrices: Object.fromEntries(action.matrices),
  }));
  const group = {
    name: declared.name,
    title,
    source,
    ...(parameter === undefined ? {} : { parameter }),
    ...summary,
    generators,
    defaultAction,
    actions,
  };
  return { result: { schema: 'symcodim/1', command: 'groups', group }, status: 0, text: () => groupText(declared, summary), documents: {} };
}

function catalogueText(groups: readonly CatalogueEntry[]): string {
  const rows = groups.map(({ name, order, generators, actions, title }) => [
    name,
    order ?? '',
    generators.join(', '),
    actions.join(', '),
    title,
  ]);
  return [
    textTable(['group', 'order', 'generators', 'actions', ''], rows, Number.POSITIVE_INFINITY),
    '',
    'N stands for a number: dihedral:5, C3v. Products: dihedral:3*reflection. The first action is the default.',
    'One group with its matrices, classes and characters: symcodim groups NAME',
  ].join('\n');
}

function groupText(declared: CatalogueGroup, summary: GroupSummary): string {
  const { order, exponent, classes, characters } = summary;
  const number = declared.parameter === undefined ? '' : `, N = ${declared.parameter}`;
  const lines = [
    `${declared.name}: ${declared.title}${number}`,
    `order ${order}, exponent ${exponent}, ${classes.length} conjugacy ${classes.length === 1 ? 'class' : 'classes'}`,
    `source: ${declared.source}`,
    '',
    'Actions (the first is the default)',
  ];
  for (const action of declared.actions.values()) {
    lines.push(`  ${action.name}, ${action.dimension} ${action.dimension === 1 ? 'coordinate' : 'coordinates'}: ${action.title}`);
    for (const [generator, matrix] of action.matrices) {
      const images = action.permutations?.get(generator);
      if (images !== undefined) lines.push(`    ${generator}: ${cycles(images)}`);
      else if (matrix.length <= WIDEST_MATRIX) lines.push(...matrixLines(generator, matrix));
      else lines.push(`    ${generator}: a matrix of ${matrix.length} rows; --json shows it`);
    }
  }
  const legend = new Map<string, string>();
  const short = (text: string): string => {
    if (text.length <= LONGEST_VALUE) return text;
    if (!legend.has(text)) legend.set(text, letterOf(legend.size));
    return legend.get(text)!;
  };
  const head = ['', 'indicator', ...classes.map((_, k) => String(k + 1))];
  const rows = [
    ['size', '', ...classes.map(({ size }) => String(size))],
    ['order', '', ...classes.map((entry) => String(entry.order))],
    ...characters.map(({ values, indicator }, i) => [`χ${i + 1}`, String(indicator), ...values.map(short)]),
  ];
  lines.push('', 'Classes: a representative of each, as a product of generators (the right one acts first)');
  lines.push(...classes.map(({ representative }, k) => `  ${k + 1}: ${representative}`));
  lines.push('', 'Characters by class; indicator 1 real, 0 complex, -1 quaternionic', textTable(head, rows, WIDTH));
  if (legend.size > 0) lines.push('', ...[...legend].map(([text, letter]) => `  ${letter} = ${text}`));
  return lines.join('\n');
}

/** A matrix on one line, or a row to a line where that would be too long. */
function matrixLines(name: string, matrix: readonly (readonly string[])[]): string[] {
  const rows = matrix.map((row) => `[${row.join(', ')}]`);
  const line = `    ${name} = [${rows.join(', ')}]`;
  if (line.length <= WIDTH) return [line];
  const indent = ' '.repeat(`    ${name} = [`.length);
  return rows.map((row, k) => `${k === 0 ? `    ${name} = [` : indent}${row}${k === rows.length - 1 ? ']' : ','}`);
}

/** a, b, …, z, a1, b1, …; `i` is left to the imaginary unit. */
function letterOf(index: number): string {
  const letters = 'abcdefghjklmnopqrstuvwxyz';
  const round = Math.floor(index / letters.length);
  return `${letters[index % letters.length]}${round === 0 ? '' : round}`;
}

/** A permutation of 0 … d−1 as cycles of 1 … d. */
function cycles(images: readonly number[]): string {
  const seen = new Set<number>();
  const parts: string[] = [];
  for (let start = 0; start < images.length; start++) {
    if (seen.has(start) || images[start] === start) continue;
    const cycle: number[] = [];
    for (let i = start; !seen.has(i); i = images[i]!) {
      seen.add(i);
      cycle.push(i + 1);
    }
    parts.push(`(${cycle.join(' ')})`);
  }
  return parts.length === 0 ? 'fixes every coordinate' : parts.join('');
}
