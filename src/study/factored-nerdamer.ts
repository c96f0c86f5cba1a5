/**
 * Factors and roots of polynomials as nerdamer sees them: guesses, which the caller checks. It runs in a thread of its
 * own, so that it can be stopped after a time, started at the first question and not before.
 */
import { createRequire } from 'node:module';
import { Worker } from 'node:worker_threads';

/** The factored form of a polynomial in names v_0, v_1, …, or undefined where there is no answer in time. */
export type FactorHelper = (polynomial: string) => Promise<string | undefined>;

/** Milliseconds for one answer; loading takes a few tenths of a second of the first. */
const PATIENCE = 2500;
const HEAP = 256;

/** Answers with a text, or with null for what cannot be factored. All expressions it stores are flushed each time. */
const THREAD = `
const { parentPort, workerData } = require('node:worker_threads');
const nerdamer = require(workerData.core);
require(workerData.algebra);
parentPort.on('message', (question) => {
  let answer = null;
  try {
    if (question.startsWith('solve')) workerData.solve.forEach((part) => require(part));
    answer = nerdamer(question).toString();
  } catch {}
  nerdamer.flush();
  parentPort.postMessage(answer);
});`;

let thread: Worker | undefined;
/** Questions are put one after the other. */
let last: Promise<unknown> = Promise.resolve();

/** The factors of a polynomial with integer coefficients. */
export const nerdamerFactors: FactorHelper = (polynomial) =>
  /^(?:v_\d+|[0-9+\-*^ ])+$/.test(polynomial) ? inTurn(`factor(${polynomial})`) : Promise.resolve(undefined);

/** The roots in x_0 of a polynomial in x_0, v_0, v_1, …, as a list in brackets. */
export const nerdamerRoots = (polynomial: string): Promise<string | undefined> =>
  /^(?:v_\d+|x_0|(?:sqrt|cos)(?=\()|pi|[0-9+\-*/^() ])+$/.test(polynomial)
    ? inTurn(`solve(${polynomial},x_0)`)
    : Promise.resolve(undefined);

function inTurn(question: string): Promise<string | undefined> {
  const answer = last.then(() => ask(question));
  last = answer;
  return answer;
}

function ask(question: string): Promise<string | undefined> {
  try {
    thread ??= started();
  } catch {
    // without the package there is no second opinion
    return Promise.resolve(undefined);
  }
  const worker = thread;
  worker.ref();
  return new Promise((resolve) => {
    const settle = (answer: string | undefined, keep: boolean): void => {
      clearTimeout(timer);
      worker.off('message', answered).off('error', lost).off('exit', lost);
      if (keep) worker.unref();
      else {
        thread = undefined;
        worker.on('error', () => {});
        void worker.terminate();
      }
      resolve(answer);
    };
    const answered = (answer: string | null): void => settle(answer ?? undefined, true);
    const lost = (): void => settle(undefined, false);
    const timer = setTimeout(lost, PATIENCE);
    worker.on('message', answered).on('error', lost).on('exit', lost);
    worker.postMessage(question);
  });
}

function started(): Worker {
  const { resolve } = createRequire(import.meta.url);
  const workerData = {
    core: resolve('nerdamer'),
    algebra: resolve('nerdamer/Algebra.js'),
    solve: [resolve('nerdamer/Calculus.js'), resolve('nerdamer/Solve.js')],
  };
  return new Worker(THREAD, { eval: true, workerData, resourceLimits: { maxOldGenerationSizeMb: HEAP } });
}
