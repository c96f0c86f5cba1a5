/** `report`: every stage that applies to the model, each with the result of its own command. */
import { SymcodimError } from '../errors/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import type { Answer } from './answer.ts';
import type { OutcomeStatus, StudyOptions } from './outcome.ts';
import type { CodimResult, StudyResult } from './result.ts';

/** A report is one document; its result is that of `codim` with the other stages beside it. */
export interface ReportResult extends StudyResult {
  readonly command: 'report';
  readonly verdict: CodimResult['verdict'];
  readonly stages: readonly StudyResult[];
  /** Stages that could not be carried out, and why. */
  readonly left: readonly { readonly stage: string; readonly reason: string }[];
}

type Stage = (
  stage: 'components' | 'codim' | 'invariants' | 'reduce' | 'branches' | 'sweep',
  declaration: Declaration,
  options: StudyOptions,
) => Promise<Answer>;

/** Runs the stages. Throws what `codim` throws; a later stage that is out of reach is left out with its reason. */
export async function reportAnswer(run: Stage, declaration: Declaration, options: StudyOptions): Promise<Answer> {
  const codim = await run('codim', declaration, options);
  const result = codim.result as CodimResult;
  const stages: StudyResult[] = [result];
  const left: { stage: string; reason: string }[] = [];
  const wanted = [
    'components',
    'invariants',
    ...(result.zero === null && options.elliptic !== true ? [] : ['reduce']),
    ...(result.zero === null ? [] : ['branches']),
    ...(declaration.range.size === 0 ? [] : ['sweep']),
  ] as const;
  for (const stage of wanted as readonly ('components' | 'invariants' | 'reduce' | 'branches' | 'sweep')[]) {
    try {
      stages.push((await run(stage, declaration, options)).result);
    } catch (error) {
      if (!(error instanceof SymcodimError)) throw error;
      left.push({ stage, reason: error.message });
    }
  }
  const whole: ReportResult = { ...result, command: 'report', verdict: result.verdict, stages, left };
  return {
    result: whole,
    status: codim.status as OutcomeStatus,
    stages,
    notes: [...codim.notes, ...left.map((l) => `${l.stage} is left out: ${l.reason}`)],
  };
}
