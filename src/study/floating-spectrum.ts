/** Spectrum, collisions and stability of a floating model. */
import type { FloatingStudy } from './floating-linear.ts';
import type { CodimResult } from './result.ts';

export function floatingSpectrumSummary(_study: FloatingStudy): Pick<CodimResult, 'collisions'> {
  return { collisions: [] };
}
