/** What the project holds and what it does not. */
import { execFileSync } from 'node:child_process';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { commands, options } from '../../src/cli/records/index.ts';
import { referenceTable } from '../../src/cli/reference-table.ts';
import { DECLARING_OPTIONS, SETTING_OPTIONS } from '../../src/model/declaration/options.ts';

const root = new URL('../../', import.meta.url).pathname;
const read = (file: string): string => readFileSync(join(root, file), 'utf8');

/** Files under version control, or all but the ignored ones where there is no repository (an unpacked archive). */
function tracked(): string[] {
  try {
    return execFileSync('git', ['ls-files', '--cached', '--others', '--exclude-standard'], {
      cwd: root,
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
    })
      .split('\n')
      .filter((file) => file !== '' && existsSync(join(root, file)));
  } catch {
    return readdirSync(root, { recursive: true, encoding: 'utf8' }).filter((file) => !/^(node_modules|dist)\b/.test(file));
  }
}

/** Files are to have 60 to 300 lines; beyond this one a file is to be parted. */
const LONGEST_FILE = 600;

describe('project', () => {
  it('the top level holds what it should, and nothing else but files with a dot', () => {
    const allowed = [
      'package.json',
      'package-lock.json',
      'tsconfig.json',
      'README.md',
      'DEVELOPERS.md',
      'LICENSE',
      'src',
      'groups',
      'test',
      'samples',
    ];
    const found = new Set(tracked().map((file) => file.split('/')[0]!));
    expect([...found].filter((name) => !name.startsWith('.') && !allowed.includes(name))).toEqual([]);
    for (const name of allowed) expect(existsSync(join(root, name)), name).toBe(true);
  });

  it('no source file holds more than one notion could fill', () => {
    const long = tracked()
      .filter((file) => /^src\/.*\.ts$/.test(file))
      .map((file) => [file, read(file).split('\n').length] as const)
      .filter(([, lines]) => lines > LONGEST_FILE);
    expect(long).toEqual([]);
  });

  it('every source file opens with what it is about', () => {
    const opens = (file: string): boolean =>
      read(file)
        .split('\n')
        .slice(0, 4)
        .some((line) => line.startsWith('/**'));
    expect(tracked().filter((file) => /^src\/.*\.ts$/.test(file) && !opens(file))).toEqual([]);
  });

  it('README holds the reference that the records make', () => {
    const readme = read('README.md');
    const part = /<!-- reference -->\n([\s\S]*?)\n<!-- end of reference -->/.exec(readme)?.[1];
    expect(part, 'write it with: npm run build && node .build/readme.mjs').toBe(referenceTable());
  });

  it('README names no command or option that does not exist', () => {
    const names = new Set(options.map(({ name }) => name));
    const lines = [...read('README.md').matchAll(/symcodim ([a-z]+)([^`\n]*)/g)].filter((match) => match[1] !== 'is');
    for (const match of lines) {
      if (commands.some(({ name }) => name === match[1])) {
        for (const option of match[2]!.matchAll(/\s--([a-z-]+)/g)) expect([...names, 'version'], match[0]).toContain(option[1]);
      }
    }
    expect(lines.length).toBeGreaterThan(0);
  });

  it('every option of the model layer has a record', () => {
    for (const name of [...DECLARING_OPTIONS, ...SETTING_OPTIONS]) expect(options.map((option) => option.name)).toContain(name);
  });
});
