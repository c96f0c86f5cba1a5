/** What `check --find` found: the signed permutations that leave H invariant, against the declared group. */
import type { FoundSymmetry } from '../../study/find.ts';
import { type Block, code, column, paragraph, type Section } from '../document.ts';
import type { ReportView } from '../view.ts';

/** Longer maps say only how many coordinates move. */
const SHOWN_LENGTH = 160;
/** Most generators in the table. */
const SHOWN_GENERATORS = 24;

function moved(map: string): string {
  if (map === '') return 'all coordinates stay';
  return map.length <= SHOWN_LENGTH ? map : `${map.split(', ').length} coordinates move`;
}

function table(found: FoundSymmetry): Block {
  const undeclared = new Set(found.undeclared);
  return {
    kind: 'table',
    caption: 'Generators of the symmetry found.',
    columns: [column('generator'), column('time'), column('declared'), column('new coordinates')],
    rows: found.generators
      .slice(0, SHOWN_GENERATORS)
      .map((g) => [
        [g.name],
        [g.reversing ? 'reversed' : 'kept'],
        [undeclared.has(g.name) ? 'no' : 'yes'],
        [g.map === '' ? moved('') : code(moved(g.map))],
      ]),
  };
}

export function foundSection(view: ReportView): Section | null {
  const { found } = view;
  if (found === undefined) return null;
  const blocks: Block[] = [paragraph(found.words)];
  if (found.degree !== 'all') blocks.push(paragraph(`H was compared to degree ${found.degree}.`));
  if (found.generators.length > 0) blocks.push(table(found));
  const left = found.generators.length - SHOWN_GENERATORS;
  if (left > 0) blocks.push(paragraph(`${left} more generators are in the result as JSON.`));
  return { id: 'found', title: 'Symmetry found', blocks };
}
