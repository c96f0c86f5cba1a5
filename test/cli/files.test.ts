/** Files appear whole or not at all. */
import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { writeFiles } from '../../src/cli/files.ts';
import { InputError } from '../../src/errors/index.ts';

let folder = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'symcodim-'));
});
afterEach(() => {
  rmSync(folder, { recursive: true });
});

describe('writing files', () => {
  it('writes all of them and leaves nothing beside them', async () => {
    await writeFiles([
      { path: join(folder, 'a'), text: 'one\n' },
      { path: join(folder, 'b'), text: 'two\n' },
    ]);
    expect(readdirSync(folder).sort()).toEqual(['a', 'b']);
    expect(readFileSync(join(folder, 'b'), 'utf8')).toBe('two\n');
  });

  it('writes none where one cannot be written', async () => {
    writeFileSync(join(folder, 'a'), 'old');
    mkdirSync(join(folder, 'sub'));
    for (const bad of [join(folder, 'sub'), join(folder, 'missing', 'b'), join(folder, 'a', 'b')]) {
      const attempt = writeFiles([
        { path: join(folder, 'a'), text: 'new' },
        { path: bad, text: 'x' },
      ]);
      await expect(attempt).rejects.toThrow(InputError);
      await expect(attempt).rejects.toMatchObject({ culprit: { file: bad } });
      expect(readFileSync(join(folder, 'a'), 'utf8')).toBe('old');
      expect(readdirSync(folder).sort()).toEqual(['a', 'sub']);
    }
  });

  it('keeps the mode of a file, follows a link, and writes to a device', async () => {
    writeFileSync(join(folder, 'a'), 'old', { mode: 0o600 });
    symlinkSync('a', join(folder, 'link'));
    await writeFiles([{ path: join(folder, 'link'), text: 'new' }]);
    expect(readFileSync(join(folder, 'a'), 'utf8')).toBe('new');
    expect(statSync(join(folder, 'a')).mode & 0o777).toBe(0o600);
    await writeFiles([{ path: '/dev/null', text: 'x' }]);
    expect(statSync('/dev/null').isCharacterDevice()).toBe(true);
  });

  it('writes nothing for an empty list', async () => {
    await writeFiles([]);
    expect(readdirSync(folder)).toEqual([]);
  });
});
