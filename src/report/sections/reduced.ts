/** The reduced Hamiltonian on the kernel and its germ. */
import { type Block, cite, column, type Line, math, paragraph, type Section } from '../document.ts';
import { formula, relation } from '../mathematics/index.ts';
import type { ReducedView, ReportView } from '../view.ts';
import { integer, orDash, sideBySide } from './words.ts';

export function reducedSection(view: ReportView): Section | null {
  const reduced = view.reduced;
  if (reduced === undefined || reduced === null) return null;
  const blocks: Block[] = [
    paragraph(
      'Reduced Hamiltonian on the kernel, by the splitting lemma',
      ...(reduced.degree === undefined ? [] : [' to degree ', integer(reduced.degree)]),
      '; its critical points are the equilibria nearby ',
      cite('golubitsky-stewart-schaeffer-1988'),
      ':',
    ),
    { kind: 'display', formula: relation(formula('h'), '=', formula(reduced.expression)) },
  ];
  if (reduced.kinetic !== undefined) blocks.push(paragraph('Kinetic part of the reduced system: ', math(formula(reduced.kinetic)), '.'));
  if (reduced.brackets !== undefined && reduced.brackets.length > 0)
    blocks.push(paragraph(`Brackets of the kernel coordinates: ${reduced.brackets.join('; ')}.`));
  blocks.push(...tables(reduced));
  if (reduced.polynomial !== undefined) {
    blocks.push(paragraph('In the coordinates of the kernel, at the event:'));
    blocks.push({ kind: 'display', formula: relation(formula('h'), '=', formula(reduced.polynomial)) });
  }
  blocks.push({ kind: 'facts', rows: germRows(reduced) });
  if (reduced.because !== undefined && reduced.because !== '') blocks.push(paragraph(sentence(reduced.because)));
  return { id: 'reduced', title: 'Reduced Hamiltonian', blocks };
}

function tables(reduced: ReducedView): readonly Block[] {
  const blocks: Block[] = [];
  if (reduced.coordinates !== undefined && reduced.coordinates.length > 0)
    blocks.push({
      kind: 'table',
      caption: 'Coordinates of the kernel.',
      columns: [column('name'), column('direction')],
      rows: reduced.coordinates.map((c) => [[math(formula(c.name))], [math(formula(c.vector))]]),
    });
  if (reduced.invariants !== undefined && reduced.invariants.length > 0)
    blocks.push({
      kind: 'table',
      caption: 'Invariants on the kernel.',
      columns: [column('name'), column('polynomial')],
      rows: reduced.invariants.map((i) => [[math(formula(i.name))], [math(formula(i.polynomial))]]),
    });
  return blocks;
}

function germRows(reduced: ReducedView): readonly { readonly name: string; readonly line: Line }[] {
  const determined = reduced.determinedAt;
  const rows: { name: string; line: Line }[] = [
    { name: 'Leading degree', line: orDash(reduced.leadingDegree) },
    { name: 'Germ codimension', line: orDash(reduced.codimension) },
    { name: 'Moduli', line: orDash(reduced.moduli) },
    { name: 'Stratum codimension', line: orDash(reduced.stratumCodimension) },
    {
      name: 'Determined at degree',
      line:
        determined === null || determined === undefined
          ? ['not up to the degree computed']
          : typeof determined === 'number'
            ? [integer(determined)]
            : [determined],
    },
  ];
  if (reduced.unfolding.length > 0) rows.push({ name: 'Unfolding', line: [sideBySide(reduced.unfolding)] });
  if (reduced.moduliTerms !== undefined && reduced.moduliTerms.length > 0)
    rows.push({ name: 'Terms with moduli', line: [sideBySide(reduced.moduliTerms)] });
  if (reduced.conditions !== undefined && reduced.conditions.length > 0)
    rows.push({ name: 'Must not vanish', line: [sideBySide(reduced.conditions)] });
  if (reduced.generic !== undefined)
    rows.push({
      name: 'Nonlinear genericity',
      line: [
        reduced.generic === null
          ? 'not decided'
          : reduced.generic
            ? 'generic in the parameters of the study'
            : 'not generic in the parameters of the study',
      ],
    });
  return rows;
}

/** With a capital and a full stop. */
const sentence = (words: string): string => `${words[0]!.toUpperCase()}${words.slice(1)}${/[.!?]$/.test(words) ? '' : '.'}`;
