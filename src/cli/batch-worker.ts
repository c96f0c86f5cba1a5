/** A thread of a batch: answers the lines that it is sent. */
import { parentPort, workerData } from 'node:worker_threads';
import { answerLine, type BatchLine, type BatchSetup } from './batch-line.ts';
import { runCommand } from './run-command.ts';

const setup = workerData as BatchSetup;
parentPort?.on('message', async (line: BatchLine) => {
  parentPort?.postMessage(await answerLine(setup, line, runCommand));
});
