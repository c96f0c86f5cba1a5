/** The commands at work: each loads what it needs, and nothing else is loaded. */
import { UsageError } from '../errors/index.ts';
import type { ModelSource } from '../model/declaration/options.ts';
import type { Outcome, StudyCommand } from '../study/outcome.ts';
import type { Invocation } from './invocation.ts';
import type { Runners } from './program.ts';
import type { World } from './world.ts';

/** What stands for standard input. */
const STANDARD_INPUT = '-';

async function answer(invocation: Invocation, world: World): Promise<Outcome> {
  const { command, argument } = invocation;
  if (command === 'groups') {
    const { groupsOutcome } = await import('../study/groups-command.ts');
    return groupsOutcome(argument, invocation.orderLimit);
  }
  if (command === 'verify') {
    const { verifyOutcome } = await import('../study/verify.ts');
    return verifyOutcome(await textOf(argument!, world), argument!, invocation.tolerance);
  }
  const [{ declare }, { runCommand }] = await Promise.all([import('../model/declaration/options.ts'), import('./run-command.ts')]);
  const declaration = declare(await sourceOf(argument, world), invocation.uses);
  const progress = invocation.output.quiet ? {} : { progress: world.progress };
  return runCommand(command as StudyCommand, declaration, { ...invocation.study, ...progress });
}

async function sourceOf(argument: string | undefined, world: World): Promise<ModelSource> {
  if (argument === undefined) return {};
  if (argument !== STANDARD_INPUT) return { path: argument };
  const { readAll } = await import('./standard-input.ts');
  return { text: await readAll(world.input()) };
}

async function textOf(argument: string, world: World): Promise<string> {
  if (argument === STANDARD_INPUT) return (await import('./standard-input.ts')).readAll(world.input());
  const { MODEL_BYTES, readTextFile } = await import('../model/declaration/text-file.ts');
  return readTextFile(argument, MODEL_BYTES);
}

async function stream(invocation: Invocation, world: World): Promise<number> {
  if (invocation.command === 'batch') return batch(invocation, world);
  if (invocation.command === 'completions') {
    const [{ completionScript }, { catalogueNames }] = await Promise.all([
      import('./completions.ts'),
      import('../group/catalogue-folder.ts'),
    ]);
    await world.write(`${completionScript(invocation.argument as 'bash' | 'zsh' | 'fish', catalogueNames())}\n`);
    return 0;
  }
  const file = invocation.output.files.markdown;
  const text =
    file === undefined ? (await import('./man.ts')).manPage(world.version()) : (await import('./reference-table.ts')).referenceTable();
  if (file === undefined || file === STANDARD_INPUT) await world.write(`${text}\n`);
  else await (await import('./files.ts')).writeFiles([{ path: file, text: `${text}\n` }]);
  return 0;
}

async function batch(invocation: Invocation, world: World): Promise<number> {
  const [{ declare, DECLARING_OPTIONS }, { answerLine }, { runBatch, defaultJobs }] = await Promise.all([
    import('../model/declaration/options.ts'),
    import('./batch-line.ts'),
    import('./batch.ts'),
  ]);
  const { argument, uses } = invocation;
  if (argument === STANDARD_INPUT) {
    throw new UsageError('batch reads its lines from standard input, so MODEL cannot be -', {
      key: 'MODEL',
      expected: 'the path of a model file, or none',
    });
  }
  const declared = uses.some(({ name }) => (DECLARING_OPTIONS as readonly string[]).includes(name));
  const shared: ModelSource | undefined = argument !== undefined ? { path: argument } : declared ? {} : undefined;
  // A model that cannot be read stops the batch before its first line.
  if (shared !== undefined) declare(shared, uses);
  const setup = {
    command: (invocation.batch?.command ?? 'codim') as StudyCommand,
    ...(shared === undefined ? {} : { model: shared }),
    uses,
    study: invocation.study,
  };
  const jobs = invocation.batch?.jobs ?? defaultJobs();
  if (jobs === 1) {
    const { runCommand } = await import('./run-command.ts');
    return runBatch(setup, jobs, (line) => answerLine(setup, line, runCommand), world);
  }
  const { workerPool } = await import('./worker-pool.ts');
  const pool = workerPool<{ number: number; text: string }, { json: string; status: number }>(
    new URL('./main.js', import.meta.url),
    setup,
    jobs,
  );
  try {
    return await runBatch(setup, jobs, pool.ask, world);
  } finally {
    await pool.close();
  }
}

/** The real runners. */
export const runners: Runners = { answer, stream };
