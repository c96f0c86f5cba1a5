/** One command on one declaration: the study, its status, and the documents that can be made of it. */
import type { Declaration } from '../model/declaration/declaration.ts';
import type { Outcome, ResultObject, StudyCommand, StudyOptions } from '../study/outcome.ts';
import { study } from '../study/study.ts';

/** Answers one command. Throws the typed errors of the library for wrong input. */
export async function runCommand(command: StudyCommand, declaration: Declaration, options: StudyOptions): Promise<Outcome> {
  const { result, stages, status, notes, text } = await study(command, declaration, options);
  // A report speaks of all stages; every other command of its own result.
  const results = (stages ?? [result]) as unknown as readonly ResultObject[];
  const report = () => import('../report/render.ts');
  return {
    result: result as unknown as ResultObject,
    status,
    text: async (width) => text ?? (await report()).renderText(results, width === undefined ? {} : { width }),
    documents: {
      latex: async ({ fragment }) => (await report()).renderLatex(results, { fragment }),
      html: async () => (await report()).renderHtml(results),
      markdown: async () => (await report()).renderMarkdown(results),
      svg: async () => (await report()).renderSvg(results),
    },
    notes,
  };
}
