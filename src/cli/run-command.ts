/** One command on one declaration: the study, its status, and the documents that can be made of it. */
import type { Declaration } from '../model/declaration/declaration.ts';
import type { DocumentFormat, DocumentMaker, Outcome, OutcomeStatus, ResultObject, StudyCommand, StudyOptions } from '../study/outcome.ts';
import { study } from '../study/study.ts';

/** Answers one command. Throws the typed errors of the library for wrong input. */
export async function runCommand(command: StudyCommand, declaration: Declaration, options: StudyOptions): Promise<Outcome> {
  const results = await study(command, declaration, options);
  return {
    result: results.result as unknown as ResultObject,
    status: results.status as OutcomeStatus,
    text: results.text ?? '',
    documents: {} as Partial<Record<DocumentFormat, DocumentMaker>>,
    ...(results.notes.length === 0 ? {} : { notes: results.notes }),
  };
}
