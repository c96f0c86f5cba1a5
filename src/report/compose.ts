/** The document of one result or of the results of several stages. */
import type { ResultObject } from '../study/outcome.ts';
import { type Document, type Line, linesOf, type Section } from './document.ts';
import type { ReferenceKey } from './references.ts';
import { birkhoffSection } from './sections/birkhoff.ts';
import { branchesSection } from './sections/branches.ts';
import { brokenSection } from './sections/broken.ts';
import { classesSection, componentsSection } from './sections/components.ts';
import { foundSection } from './sections/found.ts';
import { headlineOf, verdictSection } from './sections/headline.ts';
import { hamiltonianSection, invariantsSection } from './sections/invariants.ts';
import { modelSection, symmetrySection } from './sections/model.ts';
import { reducedSection } from './sections/reduced.ts';
import { collisionsSection, eventsSection, spectrumSection } from './sections/spectrum.ts';
import { sweepSection } from './sections/sweep.ts';
import { zeroSection } from './sections/zero.ts';
import { type ReportView, viewOf } from './view.ts';

/** The order in which a reader wants it. */
const SECTIONS: readonly ((view: ReportView) => Section | null)[] = [
  modelSection,
  symmetrySection,
  brokenSection,
  foundSection,
  componentsSection,
  classesSection,
  zeroSection,
  verdictSection,
  collisionsSection,
  spectrumSection,
  eventsSection,
  invariantsSection,
  hamiltonianSection,
  reducedSection,
  branchesSection,
  birkhoffSection,
  sweepSection,
];

/** Composes the document; results of the same study, in any order. */
export function compose(results: ResultObject | readonly ResultObject[]): Document {
  const view = viewOf(results);
  const sections = SECTIONS.map((make) => make(view)).filter((section) => section !== null);
  const headline = headlineOf(view);
  const lines: readonly Line[] = [...(headline?.facts.map((f) => f.line) ?? []), ...sections.flatMap((s) => s.blocks.flatMap(linesOf))];
  const citations = new Set<ReferenceKey>();
  for (const line of lines)
    for (const part of line) if (typeof part !== 'string' && part.kind === 'cite') for (const key of part.keys) citations.add(key);
  return {
    title: view.model?.title ?? 'symcodim',
    subtitle: subtitleOf(view.commands),
    headline,
    sections,
    caution: view.caution ?? null,
    citations: [...citations],
  };
}

function subtitleOf(commands: readonly string[]): string {
  const names = [...new Set(commands)];
  return `symcodim ${names.length === 1 ? names[0] : 'report'}`;
}
