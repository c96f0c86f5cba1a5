/** The Birkhoff normal form of an elliptic equilibrium. */
import { type Block, cite, column, type Line, math, type Section } from '../document.ts';
import { formula, label, list, relation, sign } from '../mathematics/index.ts';
import type { ReportView } from '../view.ts';
import { DASH, integer, value } from './words.ts';

export function birkhoffSection(view: ReportView): Section | null {
  const birkhoff = view.birkhoff;
  if (birkhoff === undefined || birkhoff === null) return null;
  const placed = birkhoff.frequencies.some((f) => f.component !== undefined);
  const signed = birkhoff.frequencies.some((f) => f.sign !== undefined);
  const blocks: Block[] = [
    { kind: 'paragraph', line: ['Normal form to degree ', integer(birkhoff.degree), ' ', cite('meyer-hall-offin-2009'), ':'] },
    { kind: 'display', formula: relation(formula('N'), '=', formula(birkhoff.expression)) },
    {
      kind: 'table',
      caption: 'Frequencies of the elliptic equilibrium.',
      columns: [
        column('name'),
        column('frequency'),
        ...(placed ? [column('component')] : []),
        ...(signed ? [column('sign of energy', 'right')] : []),
      ],
      rows: birkhoff.frequencies.map((f): readonly Line[] => [
        [math(formula(f.name))],
        [value(f.value)],
        ...(placed ? [f.component === undefined ? DASH : [math(label(f.component))]] : []),
        ...(signed ? [f.sign === undefined ? DASH : [f.sign > 0 ? math(sign('+', '+', 1)) : math(sign('-', '-', 1))]] : []),
      ]),
    },
  ];
  if (birkhoff.resonances.length === 0) blocks.push({ kind: 'paragraph', line: ['No resonance up to this degree.'] });
  else {
    const generators = birkhoff.resonances.some((r) => r.generator !== undefined);
    blocks.push({
      kind: 'table',
      caption: 'Integer relations among the frequencies.',
      columns: [column('relation'), column('order', 'right'), ...(generators ? [column('resonant term')] : [])],
      rows: birkhoff.resonances.map((r): readonly Line[] => [
        [math(list(r.relation.map((n) => formula(n))))],
        [integer(r.order)],
        ...(generators ? [r.generator === undefined ? DASH : [math(formula(r.generator))]] : []),
      ]),
    });
  }
  if (birkhoff.twist !== null && birkhoff.twist !== undefined)
    blocks.push({ kind: 'paragraph', line: ['Twist determinant: ', value(birkhoff.twist), '.'] });
  if (birkhoff.stability !== undefined) blocks.push({ kind: 'paragraph', line: [birkhoff.stability] });
  return { id: 'birkhoff', title: 'Birkhoff normal form', blocks };
}
