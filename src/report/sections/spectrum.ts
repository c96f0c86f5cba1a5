/** The spectrum off zero: collisions, stability, and the list of zero events that an action allows. */
import { type Block, cite, column, type Line, math, type Section } from '../document.ts';
import { formula, sign } from '../mathematics/index.ts';
import type { ReportView } from '../view.ts';
import { components, integer, pair, partition } from './words.ts';

/** Clusters of equal eigenvalues off zero. */
export function collisionsSection(view: ReportView): Section | null {
  const collisions = view.collisions;
  if (collisions === undefined || collisions.length === 0) return null;
  const signed = collisions.some((c) => c.signature !== undefined);
  const names = { imaginary: 'imaginary', real: 'real', quadruple: 'quadruple' };
  return {
    id: 'collisions',
    title: 'Collisions off zero',
    blocks: [
      {
        kind: 'paragraph',
        line: [
          'Equal eigenvalues off zero, apart from the multiplicity that one irreducible forces. The codimension is that of the bundle: the value itself is free ',
          cite('galin-1982', 'kocak-1984'),
          '.',
        ],
        aside: true,
      },
      {
        kind: 'table',
        caption: 'Collisions of eigenvalues off zero; the value is the frequency, the rate, or both for a quadruple.',
        columns: [
          column('kind'),
          column('value'),
          column('multiplicity', 'right'),
          column('blocks'),
          ...(signed ? [column('signature')] : []),
          column('codimension', 'right'),
          column('without symmetry', 'right'),
          column('motion'),
          column('components'),
        ],
        rows: collisions.map((c): readonly Line[] => [
          [names[c.kind]],
          [
            ...(c.exact === null ? [] : [math(formula(c.exact)), ' ', math(sign('~', '\\approx', 1)), ' ']),
            ...(typeof c.value === 'number' ? [math(formula(c.value))] : [math(formula(c.value[0])), ', ', math(formula(c.value[1]))]),
          ],
          [integer(c.multiplicity)],
          [partition(c.blocks)],
          ...(signed ? [c.signature === undefined ? ['–'] : [pair(c.signature)]] : []),
          [integer(c.codimension)],
          [integer(c.codimensionWithoutSymmetry)],
          [c.motion],
          components(c.components),
        ]),
      },
    ],
  };
}

/** Frequencies and rates, and what they say about stability. */
export function spectrumSection(view: ReportView): Section | null {
  const spectrum = view.spectrum;
  if ((spectrum === undefined || spectrum.length === 0) && view.stability === undefined) return null;
  const blocks: Block[] = [];
  if (view.stability !== undefined) blocks.push({ kind: 'facts', rows: [{ name: 'Stability', line: [view.stability] }] });
  if (spectrum !== undefined && spectrum.length > 0) {
    const krein = spectrum.some((e) => e.krein !== undefined);
    blocks.push({
      kind: 'table',
      caption: 'Eigenvalues of L by component; multiplicities are those of the listed value.',
      columns: [
        column('components'),
        column('real part', 'right'),
        column('imaginary part', 'right'),
        column('multiplicity', 'right'),
        ...(krein ? [column('positive energy', 'right'), column('negative energy', 'right')] : []),
      ],
      rows: spectrum.map((e): readonly Line[] => [
        components(e.components),
        [math(formula(e.re))],
        [math(formula(e.im))],
        [integer(e.multiplicity)],
        ...(krein ? (e.krein === undefined ? [['–'], ['–']] : [[integer(e.krein[0])], [integer(e.krein[1])]]) : []),
      ]),
    });
  }
  return { id: 'spectrum', title: 'Spectrum and stability', blocks };
}

/** Every zero event that an action allows. */
export function eventsSection(view: ReportView): Section | null {
  const events = view.events;
  if (events === undefined) return null;
  if (events.length === 0)
    return {
      id: 'events',
      title: 'Zero events',
      blocks: [{ kind: 'paragraph', line: ['The action allows no zero event up to the codimension asked for.'] }],
    };
  return {
    id: 'events',
    title: 'Zero events',
    blocks: [
      { kind: 'paragraph', line: ['Every zero event that the action allows, one line for each signed type.'] },
      {
        kind: 'table',
        caption: 'Zero events by codimension.',
        columns: [
          column('codimension', 'right'),
          column('components'),
          column('kernel', 'right'),
          column('dimension', 'right'),
          column('blocks'),
          column('signs'),
          column('motion'),
        ],
        rows: events.map((e) => [
          [integer(e.codimension)],
          components(e.components),
          [integer(e.kernel)],
          [integer(e.dimension)],
          [partition(e.blocks)],
          [e.signs === '' ? '–' : e.signs],
          [e.motion],
        ]),
      },
    ],
  };
}
