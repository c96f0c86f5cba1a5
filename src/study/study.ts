/** The commands as functions: a declaration in, a result and its status out. */
import { UsageError } from '../errors/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import type { Answer } from './answer.ts';
import { certified } from './certificate.ts';
import type { LinearStudy } from './linear-study.ts';
import type { OutcomeStatus, StudyCommand, StudyOptions } from './outcome.ts';
import { isExact, prepare } from './prepare.ts';
import type { StudyResult } from './result.ts';
import { groupSummary, head } from './summary.ts';

export const VERDICT_STATUS: Readonly<Record<string, OutcomeStatus>> = { generic: 0, 'no event': 0, 'not generic': 1, undecided: 3 };

export type { Answer } from './answer.ts';

/** Answers a command, with a certificate for `verify`. Throws the typed errors of the library for wrong input. */
export async function study(command: StudyCommand, declaration: Declaration, options: StudyOptions = {}): Promise<Answer> {
  const answer = await answerOf(command, declaration, options);
  return { ...answer, result: certified(answer.result, declaration, options) };
}

async function answerOf(command: StudyCommand, declaration: Declaration, options: StudyOptions): Promise<Answer> {
  switch (command) {
    // these keep parameters as symbols, or need no Hamiltonian
    case 'invariants': {
      const { invariantsResult } = await import('./invariants.ts');
      return { result: invariantsResult(declaration, declaration.degree), status: 0, notes: [] };
    }
    case 'components': {
      const { componentsResult } = await import('./components.ts');
      return { result: await componentsResult(declaration), status: 0, notes: [] };
    }
    case 'events': {
      const { eventsResult } = await import('./events.ts');
      return { result: await eventsResult(declaration), status: 0, notes: [] };
    }
  }
  if (command === 'sweep') {
    const { sweepResult } = await import('./sweep.ts');
    const result = await sweepResult(declaration, options);
    return { result, status: 0, notes: result.floatingBecause === undefined ? [] : [`floating: ${result.floatingBecause}`] };
  }
  if (command === 'report') {
    const { reportAnswer } = await import('./report.ts');
    return reportAnswer(answerOf, declaration, options);
  }
  const parameters = options.parameters ?? declaration.parameterCount;
  if (command === 'reduce' && declaration.unset.length > 0 && options.elliptic !== true) {
    const [{ linearStudy }, { symbolicReduceResult, withStandIns }] = await Promise.all([
      import('./linear-study.ts'),
      import('./reduce.ts'),
    ]);
    const { declaration: stated, symbols } = withStandIns(declaration);
    const prepared = prepare(stated);
    if (isExact(prepared))
      return { result: symbolicReduceResult(linearStudy(prepared), symbols, parameters, declaration.degree), status: 0, notes: [] };
  }
  const prepared = prepare(declaration);
  if (!isExact(prepared)) {
    const { floatingAnswer } = await import('./floating.ts');
    const answer = floatingAnswer(command, prepared, parameters);
    if (command !== 'check' || options.find !== true) return answer;
    const [{ findFloatingSymmetry }, { prepareFloating }] = await Promise.all([import('./find.ts'), import('./floating-prepare.ts')]);
    const found = findFloatingSymmetry(prepareFloating(prepared), answer.result.group.order);
    return { ...answer, result: { ...answer.result, found } as StudyResult };
  }
  switch (command) {
    case 'check': {
      const { checkResult } = await import('./check.ts');
      const plain = checkResult(prepared);
      const result =
        options.find === true ? { ...plain, found: (await import('./find.ts')).findSymmetry(prepared, plain.group.order) } : plain;
      return { result, status: result.equilibrium.holds && result.symmetry.holds ? 0 : 1, notes: [] };
    }
    case 'codim': {
      const [{ codimResult }, { linearStudy }, { subgroupRemark }] = await Promise.all([
        import('./codim.ts'),
        import('./linear-study.ts'),
        import('./subgroup-summaries.ts'),
      ]);
      const result = codimResult(linearStudy(prepared), parameters);
      const remark = result.zero === null ? undefined : subgroupRemark(result.group.order, result.zero.subgroups.length);
      return { result, status: VERDICT_STATUS[result.verdict.answer]!, notes: remark === undefined ? [] : [remark] };
    }
    case 'branches': {
      const [{ linearStudy }, { branchesResult }] = await Promise.all([import('./linear-study.ts'), import('./branches.ts')]);
      const nothing = nothingAtZero(command, linearStudy(prepared));
      if (nothing !== undefined) return nothing;
      return { result: await branchesResult(linearStudy(prepared), declaration.degree), status: 0, notes: [] };
    }
    case 'reduce': {
      if (options.elliptic === true) {
        const [{ linearStudy }, { ellipticResult }] = await Promise.all([import('./linear-study.ts'), import('./elliptic.ts')]);
        return { result: ellipticResult(linearStudy(prepared), declaration.degree), status: 0, notes: [] };
      }
      const [{ linearStudy }, { reduceResult }] = await Promise.all([import('./linear-study.ts'), import('./reduce.ts')]);
      const nothing = nothingAtZero(command, linearStudy(prepared));
      if (nothing !== undefined) return nothing;
      return { result: reduceResult(linearStudy(prepared), parameters, declaration.degree), status: 0, notes: [] };
    }
    default:
      throw new UsageError(`the command ${command} is not there`);
  }
}

/** The answer of `reduce` and `branches` where the Hessian is nonsingular. */
function nothingAtZero(command: 'reduce' | 'branches', { prepared, action, event }: LinearStudy): Answer | undefined {
  if (event.dimension > 0) return undefined;
  const common = head(command, prepared, groupSummary(action, prepared));
  const result = command === 'reduce' ? { ...common, reduced: null } : { ...common, isotropy: [], branches: [] };
  const notes = [
    'The Hessian is nonsingular at these values: no equilibria meet, and there is nothing to reduce. symcodim sweep finds the crossings; reduce --elliptic gives the Birkhoff normal form.',
  ];
  return { result, status: 0, notes };
}
