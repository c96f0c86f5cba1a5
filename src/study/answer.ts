/** What a study hands back: a result, the status it stands for, and what a report is made of. */
import type { OutcomeStatus } from './outcome.ts';
import type { StudyResult } from './result.ts';

export interface Answer {
  readonly result: StudyResult;
  readonly status: OutcomeStatus;
  readonly text?: string;
  /** Stage results that a report is made of. */
  readonly stages?: readonly StudyResult[];
  readonly notes: readonly string[];
}
