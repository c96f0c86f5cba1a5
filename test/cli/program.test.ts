/** The program from command line to exit status, with runners that answer at once. */
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { program, type Runners } from '../../src/cli/program.ts';
import { ClosedPipe, type World } from '../../src/cli/world.ts';
import { InputError, UndecidedError } from '../../src/errors/index.ts';
import type { Outcome } from '../../src/study/outcome.ts';

const text = 'not generic: two parameters are needed, and only one may be tuned here';
const outcome: Outcome = {
  result: { schema: 'symcodim/1', command: 'codim', verdict: { answer: 'not generic' } },
  status: 1,
  text: () => text,
  documents: { latex: ({ fragment }) => (fragment ? 'FRAGMENT' : 'DOCUMENT'), markdown: async () => '# Report' },
  notes: ['exp(1) made the answer floating'],
};

interface Seen {
  status: number;
  out: string;
  messages: string;
}

async function run(words: string[], answer: Runners['answer'] = async () => outcome, change: Partial<World> = {}): Promise<Seen> {
  let [out, messages] = ['', ''];
  const world: World = {
    write: async (text) => {
      out += text;
    },
    tell: (text) => {
      messages += `${text}\n`;
    },
    input: async function* () {
      yield new Uint8Array();
    },
    width: undefined,
    colorOutput: false,
    colorMessages: false,
    progress: () => {},
    version: () => '9.9.9',
    trace: false,
    ...change,
  };
  const status = await program(words, world, { answer, stream: async () => 0 });
  return { status, out, messages };
}

describe('program', () => {
  it('prints the text, tells the remarks and hands the status on', async () => {
    expect(await run(['codim', 'm.yaml'])).toEqual({
      status: 1,
      out: `${text}\n`,
      messages: 'symcodim: exp(1) made the answer floating\n',
    });
  });

  it('--json puts JSON on standard output and nothing else', async () => {
    const { out, status } = await run(['codim', 'm.yaml', '--json']);
    expect(JSON.parse(out)).toEqual(outcome.result);
    expect(status).toBe(1);
  });

  it('--quiet leaves text and remarks away, but not what was asked for', async () => {
    expect(await run(['codim', 'm.yaml', '--quiet'])).toEqual({ status: 1, out: '', messages: '' });
    expect((await run(['codim', 'm.yaml', '-q', '--latex', '-', '--fragment'])).out).toBe('FRAGMENT\n');
  });

  it('report prints Markdown where no format is named', async () => {
    expect((await run(['report', 'm.yaml'])).out).toBe('# Report\n');
  });

  it('writes documents to files and says so', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'symcodim-'));
    const file = join(folder, 'a.tex');
    const { out, messages } = await run(['report', 'm.yaml', '--latex', file]);
    expect(readFileSync(file, 'utf8')).toBe('DOCUMENT\n');
    expect(out).toBe('');
    expect(messages).toContain(`wrote ${file}`);
    rmSync(folder, { recursive: true });
  });

  it('a document that cannot be made leaves no file behind', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'symcodim-'));
    const file = join(folder, 'a.tex');
    const { status, messages, out } = await run(['codim', 'm.yaml', '--latex', file, '--svg', join(folder, 'a.svg')]);
    expect(status).toBe(2);
    expect(out).toBe('');
    expect(messages).toContain('codim cannot write --svg');
    expect(existsSync(file)).toBe(false);
    rmSync(folder, { recursive: true });
  });

  it('says where there is no picture', async () => {
    const seen = await run(['codim', 'm.yaml', '--svg', '-'], async () => ({ ...outcome, documents: { svg: () => null } }));
    expect([seen.status, seen.out]).toEqual([2, '']);
    expect(seen.messages).toContain('holds nothing for --svg');
  });

  it('wraps to the terminal', async () => {
    const { out } = await run(['codim', 'm.yaml'], undefined, { width: 40 });
    expect(out).toBe('not generic: two parameters are needed,\n  and only one may be tuned here\n');
  });

  it.each([
    [new InputError('no such file', { file: 'm.yaml' }), 2, 'symcodim: no such file\n  file:     m.yaml\n'],
    [new UndecidedError('too near'), 3, 'symcodim: too near\n'],
  ])('tells an error and prints nothing: %s', async (error, status, messages) => {
    const seen = await run(['codim', 'm.yaml', '--json'], async () => {
      throw error;
    });
    expect(seen).toEqual({ status, out: '', messages });
  });

  it('a defect has status 70 and no stack', async () => {
    const seen = await run(['codim', 'm.yaml'], async () => {
      throw new RangeError('Invalid array length');
    });
    expect(seen.status).toBe(70);
    expect(seen.out).toBe('');
    expect(seen.messages).toContain('defect');
    expect(seen.messages).not.toMatch(/\n\s+at /);
  });

  it('a closed pipe is success', async () => {
    const seen = await run(['codim', 'm.yaml'], undefined, {
      write: async () => {
        throw new ClosedPipe();
      },
    });
    expect(seen.status).toBe(0);
  });

  it('without a command the help goes to standard error', async () => {
    const seen = await run([]);
    expect(seen.status).toBe(2);
    expect(seen.out).toBe('');
    expect(seen.messages).toContain('Commands');
  });

  it('colours headings and messages only where a terminal may be coloured', async () => {
    expect((await run(['--help'], undefined, { colorOutput: true })).out).toContain('\u001b[1m');
    expect((await run(['codim', '--help', '--no-color'], undefined, { colorOutput: true })).out).not.toContain('\u001b');
    expect((await run(['cdoim'], undefined, { colorMessages: true })).messages).toContain('\u001b[');
    expect((await run(['cdoim'])).messages).not.toContain('\u001b');
  });

  it('prints the version', async () => {
    expect((await run(['--version'])).out).toBe('symcodim 9.9.9\n');
  });
});
