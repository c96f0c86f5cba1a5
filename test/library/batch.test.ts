/** The batch of the built program on a stream without end: order, bad lines, bounded memory and backlog. */
import { spawn } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { describe, expect, it } from 'vitest';

const root = new URL('../../', import.meta.url).pathname;
const ANSWERS = 240;
/** Lines that may wait in pipes and threads: two pipes of 64 kB and some more. */
const BACKLOG = 6000;
const GROWTH = 150;

describe('batch', () => {
  it('answers in order without end, whatever stands in a line, in bounded memory', async () => {
    const child = spawn(
      process.execPath,
      [join(root, 'dist/cli/main.js'), 'batch', join(root, 'samples/three-resonator-ring.yaml'), '--jobs', '2'],
      {
        stdio: ['pipe', 'pipe', 'ignore'],
      },
    );
    let [written, stopped] = [0, false];
    const feed = async () => {
      while (!stopped) {
        written++;
        const line =
          written % 50 === 7 ? 'not a line of JSON' : written % 50 === 8 ? '{"d": 1}' : `{"c": "-1/${written % 9 === 0 ? 3 : 7}"}`;
        if (!child.stdin.write(`${line}\n`)) await new Promise((resolve) => child.stdin.once('drain', resolve));
      }
    };
    child.stdin.on('error', () => {
      stopped = true;
    });
    void feed();
    const memory = (): number => {
      const status = `/proc/${child.pid}/status`;
      return existsSync(status) ? Number(/VmRSS:\s+(\d+)/.exec(readFileSync(status, 'utf8'))?.[1] ?? 0) / 1024 : 0;
    };
    let [answers, early] = [0, 0];
    for await (const text of createInterface({ input: child.stdout })) {
      const answer = JSON.parse(text) as { line: number; status: number };
      answers++;
      expect(answer.line).toBe(answers);
      expect(answer.status).toBe(answers % 50 === 7 || answers % 50 === 8 ? 2 : 0);
      expect(written - answers).toBeLessThan(BACKLOG);
      if (answers === ANSWERS / 3) early = memory();
      if (answers < ANSWERS) continue;
      expect(memory() - early).toBeLessThan(GROWTH);
      break;
    }
    stopped = true;
    child.kill();
    expect(answers).toBe(ANSWERS);
  });
});
