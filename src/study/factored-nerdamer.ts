/**
 * Factors of a polynomial with integer coefficients as nerdamer sees them: guesses, which the caller checks. It runs in
 * a thread of its own, so that it can be stopped after a time, started at the first question and not before.
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
parentPort.on('message', (polynomial) => {
  let answer = null;
  try {
    answer = nerdamer('factor(' + polynomial + ')').toString();
  } catch {}
  nerdamer.flush();
  parentPort.postMessage(answer);
});`;

let thread: Worker | undefined;
/** Questions are put one after the other. */
let last: Promise<unknown> = Promise.resolve();

/** Asks nerdamer. The text holds digits, + - * ^ and the names v_0, v_1, … only; anything else is not passed on. */
export const nerdamerFactors: FactorHelper = (polynomial) => {
  if (!/^(?:v_\d+|[0-9+\-*^ ])+$/.test(polynomial)) return Promise.resolve(undefined);
  const answer = last.then(() => ask(polynomial));
  last = answer;
  return answer;
};

function ask(polynomial: string): Promise<string | undefined> {
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
    worker.postMessage(polynomial);
  });
}

function started(): Worker {
  const { resolve } = createRequire(import.meta.url);
  const workerData = { core: resolve('nerdamer'), algebra: resolve('nerdamer/Algebra.js') };
  return new Worker(THREAD, { eval: true, workerData, resourceLimits: { maxOldGenerationSizeMb: HEAP } });
}
