/** Runs the built program in a child process; models go in through standard input or a folder of their own. */
import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Ajv2020 } from 'ajv/dist/2020.js';
import { afterAll, expect } from 'vitest';
import type { Result } from './compare.ts';

export const root = new URL('../../../', import.meta.url).pathname;
const program = process.env.SYMCODIM_PROGRAM ?? join(root, 'dist/cli/main.js');

export interface Run {
  readonly status: number | null;
  readonly stdout: string;
  readonly stderr: string;
  readonly seconds: number;
}

export function run(words: readonly string[], input = ''): Promise<Run> {
  return new Promise((resolve, reject) => {
    const started = Date.now();
    const child = spawn(process.execPath, [program, ...words], { cwd: root });
    const out: Buffer[] = [];
    const err: Buffer[] = [];
    child.stdout.on('data', (x: Buffer) => out.push(x));
    child.stderr.on('data', (x: Buffer) => err.push(x));
    child.on('error', reject);
    child.stdin.on('error', () => undefined);
    child.on('close', (status) => {
      const text = (list: Buffer[]): string => Buffer.concat(list).toString('utf8');
      resolve({ status, stdout: text(out), stderr: text(err), seconds: (Date.now() - started) / 1000 });
    });
    child.stdin.end(input);
  });
}

/** Words of a command line without quotes inside words: `codim --set mu=0 --quadratic "p1^2 + q1^2"`. */
export const words = (line: string): string[] => [...line.matchAll(/"([^"]*)"|(\S+)/g)].map((m) => m[1] ?? m[2] ?? '');

/** The result of a command with --json; `expected` is the exit status, which must be as said. */
export async function json(line: string | readonly string[], input = '', expected: number | null = 0): Promise<Result> {
  const list = typeof line === 'string' ? words(line) : line;
  const got = await run([...list, '--json'], input);
  if (expected !== null) expect(got.status, `${list.join(' ')}: ${got.stderr}`).toBe(expected);
  return JSON.parse(got.stdout);
}
/** As `json`, without a look at the status. */
export const answer = (line: string | readonly string[], input = ''): Promise<Result> => json(line, input, null);

/** A refusal: status 2, nothing on standard output, a message without a stack trace. Gives the message. */
export async function refusal(line: string | readonly string[], input = ''): Promise<string> {
  const list = typeof line === 'string' ? words(line) : line;
  const got = await run([...list], input);
  const shown = list.join(' ').slice(0, 300);
  expect([got.status, got.stdout], `${shown}\n${got.stdout.slice(0, 300)}\n${got.stderr.slice(0, 600)}`).toEqual([2, '']);
  expect(got.stderr).not.toMatch(/\n\s+at |node:internal|Error:|undefined|\[object/);
  expect(got.stderr.length, shown).toBeGreaterThan(20);
  expect(got.stderr.length, shown).toBeLessThan(3000);
  return got.stderr;
}

/** A folder that goes when the file's tests are done. */
export function scratch(): { folder: string; write: (name: string, text: string) => string } {
  const folder = mkdtempSync(join(tmpdir(), 'symcodim-acceptance-'));
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  return {
    folder,
    write: (name, text) => {
      const path = join(folder, name);
      writeFileSync(path, text);
      return path;
    },
  };
}

const ajv = new Ajv2020({ allErrors: true, strict: false });
const schemaOf = (name: string): Result => JSON.parse(readFileSync(join(root, 'src/model/declaration', name), 'utf8'));
export const validResult = ajv.compile(schemaOf('result.schema.json'));
export const validModel = ajv.compile(schemaOf('model.schema.json'));
export const faults = (check: typeof validResult): string => (check.errors ?? []).map((e) => `${e.instancePath} ${e.message}`).join('\n');

/** Components without labels, as a sorted list of "dimension type multiplicity carriesForm". */
export const components = (result: Result): string[] =>
  result.components.map((c: Result) => `${c.dimension} ${c.type} ${c.multiplicity} ${c.carriesForm}`).sort();
