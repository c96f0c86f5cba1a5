/** Threads that answer one question each at a time; one that dies is replaced, and its question answered with the reason. */
import { Worker } from 'node:worker_threads';

/** Asks a thread; rejects when the thread died on the question. */
export interface Pool<Question, Answer> {
  readonly ask: (question: Question) => Promise<Answer>;
  readonly close: () => Promise<void>;
}

/** Heap of one thread, in megabytes: a question that needs more loses its thread, not the batch. */
const THREAD_HEAP = 2048;

interface Waiting {
  readonly resolve: (worker: Worker) => void;
}

/** A pool of at most `size` threads of the module, each started with `data` when it is first needed. */
export function workerPool<Question, Answer>(module: URL, data: unknown, size: number): Pool<Question, Answer> {
  const idle: Worker[] = [];
  const waiting: Waiting[] = [];
  const all = new Set<Worker>();

  const start = (): Worker => {
    const worker = new Worker(module, { workerData: data, resourceLimits: { maxOldGenerationSizeMb: THREAD_HEAP } });
    all.add(worker);
    return worker;
  };
  const hire = (): Promise<Worker> => {
    const worker = idle.pop() ?? (all.size < size ? start() : undefined);
    return worker === undefined ? new Promise((resolve) => waiting.push({ resolve })) : Promise.resolve(worker);
  };
  const release = (worker: Worker | undefined): void => {
    const next = waiting.shift();
    if (next !== undefined) next.resolve(worker ?? start());
    else if (worker !== undefined) idle.push(worker);
  };

  return {
    ask: async (question) => {
      const worker = await hire();
      return new Promise((resolve, reject) => {
        const settle = (): void => {
          worker.off('message', onMessage).off('error', onError).off('exit', onExit);
        };
        const onMessage = (answer: Answer): void => {
          settle();
          release(worker);
          resolve(answer);
        };
        const lost = (error: Error): void => {
          settle();
          all.delete(worker);
          worker.on('error', () => {});
          release(undefined);
          reject(error);
        };
        const onError = (error: Error): void => lost(error);
        const onExit = (code: number): void => lost(new Error(`a worker thread ended with code ${code}`));
        worker.on('message', onMessage).on('error', onError).on('exit', onExit);
        worker.postMessage(question);
      });
    },
    close: async () => {
      await Promise.all([...all].map((worker) => worker.terminate()));
    },
  };
}
