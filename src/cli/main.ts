/** Entry of the program: the only file that touches the streams of the process and its exit status. */
import { readFileSync } from 'node:fs';
import { isMainThread } from 'node:worker_threads';
import { runners } from './dispatch.ts';
import { program } from './program.ts';
import { ClosedPipe, type World } from './world.ts';

const { env } = process;
const plain = (env.NO_COLOR ?? '') !== '' || env.TERM === 'dumb';

/** Takes the line of a terminal away. */
const CLEAR = '\r\u001b[K';
let progressShown = false;
let inputUsed = false;

// The streams are touched only where they are used: each costs time at the start.
const world: World = {
  write: (text) =>
    new Promise((resolve, reject) => {
      // A reader that has gone is reported to whoever writes; the event itself must not end the process.
      if (process.stdout.listenerCount('error') === 0) process.stdout.on('error', () => {});
      process.stdout.write(text, (error) => {
        if (error === null || error === undefined) resolve();
        else reject((error as NodeJS.ErrnoException).code === 'EPIPE' ? new ClosedPipe() : error);
      });
    }),
  tell: (text) => {
    if (process.stderr.listenerCount('error') === 0) process.stderr.on('error', () => {});
    process.stderr.write(`${progressShown ? CLEAR : ''}${text}\n`);
    progressShown = false;
  },
  input: () => {
    inputUsed = true;
    return process.stdin;
  },
  get width() {
    return process.stdout.isTTY ? process.stdout.columns : undefined;
  },
  get colorOutput() {
    return process.stdout.isTTY && !plain;
  },
  get colorMessages() {
    return process.stderr.isTTY && !plain;
  },
  progress: (share) => {
    if (!process.stderr.isTTY) return;
    progressShown = share < 1;
    process.stderr.write(progressShown ? `\r${Math.floor(100 * share)} %` : CLEAR);
  },
  version: () => (JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8')) as { version: string }).version,
  trace: (env.SYMCODIM_TRACE ?? '') !== '',
};

/** Settled when the command line has been carried out; a thread of a batch has none of its own. */
export const finished: Promise<unknown> = isMainThread
  ? program(process.argv.slice(2), world, runners).then((status) => {
      process.exitCode = status;
      // A producer may hold standard input open behind an error; nothing is left to be read.
      if (inputUsed) process.stdin.destroy();
    })
  : import('./batch-worker.ts');
