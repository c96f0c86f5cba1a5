/** Batches: order, bounds, bad lines. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { runBatch } from '../../src/cli/batch.ts';
import { answerLine, type BatchSetup, valuesOf } from '../../src/cli/batch-line.ts';
import { inOrder } from '../../src/cli/in-order.ts';
import { INPUT_BYTES, readAll, readLines } from '../../src/cli/standard-input.ts';
import { ClosedPipe, type World } from '../../src/cli/world.ts';
import { InputError, LimitError, UndecidedError } from '../../src/errors/index.ts';

async function* chunks(...parts: (string | Uint8Array)[]): AsyncGenerator<Uint8Array> {
  for (const part of parts) yield typeof part === 'string' ? new TextEncoder().encode(part) : part;
}
const setup: BatchSetup = { command: 'codim', uses: [], study: {} };
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

describe('answers in order', () => {
  it('whatever order the work ends in, and never more under way than the window', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.integer({ min: 0, max: 3 }), { maxLength: 30 }),
        fc.integer({ min: 1, max: 5 }),
        async (delays, window) => {
          let [busy, most] = [0, 0];
          const written: number[] = [];
          async function* items() {
            for (const [index, delay] of delays.entries()) yield { index, delay };
          }
          await inOrder(
            items(),
            window,
            async ({ index, delay }) => {
              most = Math.max(most, ++busy);
              await pause(delay);
              busy--;
              return index;
            },
            async (index) => {
              written.push(index);
            },
          );
          expect(written).toEqual(delays.map((_, index) => index));
          expect(most).toBeLessThanOrEqual(window);
        },
      ),
      { numRuns: 20, seed: 1 },
    );
  });

  it('an answer is written though no further question comes', async () => {
    let [end, written] = [() => {}, () => {}];
    const first = new Promise<void>((resolve) => {
      written = resolve;
    });
    async function* items() {
      yield 1;
      await new Promise<void>((resolve) => {
        end = resolve;
      });
    }
    const all = inOrder(
      items(),
      8,
      async (item) => item,
      async () => written(),
    );
    await first;
    end();
    await all;
  });

  it('a reader that has gone ends the work at once', async () => {
    async function* items() {
      yield 1;
      await new Promise(() => {});
    }
    const attempt = inOrder(
      items(),
      8,
      async (item) => item,
      async () => {
        throw new ClosedPipe();
      },
    );
    await expect(attempt).rejects.toThrow(ClosedPipe);
  });
});

describe('standard input', () => {
  it('gives lines however the bytes are cut', async () => {
    const text = 'a\r\n\nπ ↦ 2\nlast';
    const bytes = new TextEncoder().encode(text);
    for (const size of [1, 2, 3, 100]) {
      const parts = Array.from({ length: Math.ceil(bytes.length / size) }, (_, i) => bytes.subarray(i * size, (i + 1) * size));
      const lines: unknown[] = [];
      for await (const line of readLines(chunks(...parts))) lines.push(line);
      expect(lines).toEqual([{ text: 'a' }, { text: '' }, { text: 'π ↦ 2' }, { text: 'last' }]);
    }
  });

  it('refuses a line that is too long or no text, and goes on', async () => {
    const lines: unknown[] = [];
    for await (const line of readLines(chunks(new Uint8Array(INPUT_BYTES).fill(97), 'a\n', new Uint8Array([255, 10]), 'b\n')))
      lines.push(line);
    expect(lines).toEqual([{ error: expect.any(LimitError) }, { error: expect.any(InputError) }, { text: 'b' }]);
  });

  it('reads a whole text within bounds', async () => {
    expect(await readAll(chunks('a', 'b'))).toBe('ab');
    await expect(readAll(chunks(new Uint8Array([195])))).rejects.toThrow(InputError);
    await expect(readAll(chunks(new Uint8Array(INPUT_BYTES), 'x'))).rejects.toThrow(LimitError);
  });
});

describe('lines of a batch', () => {
  it('values are taken digit for digit', () => {
    expect(valuesOf('{"a": 0.10000000000000000000001, "b": "-1/3", "c": 12345678901234567890, "d": -1e-3}')).toEqual([
      { name: 'set', value: 'a=0.10000000000000000000001' },
      { name: 'set', value: 'b=-1/3' },
      { name: 'set', value: 'c=12345678901234567890' },
      { name: 'set', value: 'd=-1e-3' },
    ]);
    expect(valuesOf('{"a\\"1": "2\\"3"}')).toEqual([{ name: 'set', value: 'a"1=2"3' }]);
  });

  it.each(['', '[1]', '{"a": null}', '{"a": [1]}', '{"a": ""}', '{"a": "1,b=2"}', '{"a": 01}', '{a: 1}', '3'])('refuses %s', (text) => {
    expect(() => valuesOf(text)).toThrow(/JSON|value/);
  });

  it('errors are answers with the status that the command would have had', async () => {
    const fail = (error: Error) =>
      answerLine({ ...setup, model: { text: '{coordinates: [q1], hamiltonian: p1^2}' } }, { number: 7, text: '{}' }, () =>
        Promise.reject(error),
      );
    expect(JSON.parse((await fail(new UndecidedError('too near', { next: 'tighten' }))).json)).toEqual({
      line: 7,
      status: 3,
      schema: 'symcodim/1',
      command: 'codim',
      error: { kind: 'undecided', message: 'too near', next: 'tighten' },
    });
    expect(JSON.parse((await fail(new TypeError('x'))).json)).toMatchObject({ status: 70, error: { kind: 'defect' } });
    expect(
      JSON.parse((await answerLine(setup, { number: 1, text: '{nonsense' }, () => Promise.reject(new Error('not reached')))).json),
    ).toMatchObject({ status: 2, error: { kind: 'input' } });
  });

  it('blank lines have no answer, bad ones do, and the gravest status is handed on', async () => {
    let out = '';
    const world = {
      input: () => chunks('a\n\n', new Uint8Array([255, 10]), 'b\n'),
      write: async (text: string) => void (out += text),
    } as unknown as World;
    const status = await runBatch(setup, 2, async ({ number, text }) => ({ json: `${number}${text}`, status: 1 }), world);
    expect(status).toBe(2);
    const lines = out.trim().split('\n');
    expect([lines[0], lines[2]]).toEqual(['1a', '4b']);
    expect(JSON.parse(lines[1]!)).toMatchObject({ line: 3, status: 2 });
  });
});
