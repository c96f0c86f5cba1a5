/** `batch`: JSON lines in, JSON lines out, in order, on all cores. */
import { availableParallelism } from 'node:os';
import { type BatchAnswer, type BatchSetup, errorAnswer } from './batch-line.ts';
import { inOrder } from './in-order.ts';
import { readLines } from './standard-input.ts';
import type { World } from './world.ts';

/** Lines under way or waiting to be written, for each thread. */
const WINDOW = 8;

/** Answers one line; rejects only where a thread was lost. */
export type Ask = (line: { readonly number: number; readonly text: string }) => Promise<BatchAnswer>;

/**
 * Answers every line of standard input that is not blank. The status is the gravest of the lines: 2 where one was
 * wrong, 70 where one met a defect, else 0; answers such as "not generic" stand in their lines and do not count.
 */
export async function runBatch(setup: BatchSetup, jobs: number, ask: Ask, world: World): Promise<number> {
  let status = 0;
  let number = 0;
  async function* lines(): AsyncGenerator<() => Promise<BatchAnswer>> {
    for await (const line of readLines(world.input())) {
      number++;
      const at = number;
      if ('error' in line) yield () => Promise.resolve(errorAnswer(setup, at, line.error));
      else if (line.text.trim() !== '') {
        yield () => ask({ number: at, text: line.text }).catch((error: unknown) => errorAnswer(setup, at, error));
      }
    }
  }
  await inOrder(
    lines(),
    WINDOW * jobs,
    (start) => start(),
    async (answer) => {
      if (answer.status !== 1 && answer.status !== 3) status = Math.max(status, answer.status);
      await world.write(`${answer.json}\n`);
    },
  );
  return status;
}

/** One thread for each core. */
export const defaultJobs = (): number => availableParallelism();
