/** Writing files so that a reader finds the old content or the new, never a part. */
import { randomBytes } from 'node:crypto';
import { chmod, realpath, rename, rm, stat, writeFile } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import { InputError } from '../errors/index.ts';

export interface FileContent {
  readonly path: string;
  readonly text: string;
}

/** A content that lies complete beside its place. */
interface Staged {
  readonly path: string;
  readonly temporary: string;
}

const codeOf = (error: unknown): string => (error as { code?: string }).code ?? 'unknown error';

/** The error of a file that cannot be written. */
function refused(path: string, error: unknown): InputError {
  const code = codeOf(error);
  const reasons: Record<string, string> = {
    ENOENT: `there is no folder ${dirname(path)}`,
    ENOTDIR: `${dirname(path)} is not a folder`,
    EISDIR: 'it is a folder',
    EACCES: 'it may not be written',
    EPERM: 'it may not be written',
    EROFS: 'the file system is read-only',
    ENOSPC: 'the disk is full',
    ENAMETOOLONG: 'the name is too long',
  };
  return new InputError(`cannot write ${path}: ${reasons[code] ?? code}`, {
    file: path,
    expected: 'a file in a folder that may be written',
    next: 'name another file, or - for standard output',
  });
}

/** Writes beside the place; devices and pipes are written at once and give nothing to be moved. */
async function stage({ path, text }: FileContent): Promise<Staged | undefined> {
  let target = path;
  let mode: number | undefined;
  try {
    target = await realpath(path);
    const status = await stat(target);
    if (status.isDirectory()) throw Object.assign(new Error('folder'), { code: 'EISDIR' });
    if (!status.isFile()) {
      await writeFile(target, text);
      return undefined;
    }
    mode = status.mode & 0o7777;
  } catch (error) {
    if (codeOf(error) !== 'ENOENT') throw refused(path, error);
  }
  const temporary = join(dirname(target), `.${basename(target).slice(0, 100)}.${randomBytes(6).toString('hex')}.tmp`);
  try {
    await writeFile(temporary, text, { flag: 'wx' });
    if (mode !== undefined) await chmod(temporary, mode);
  } catch (error) {
    await rm(temporary, { force: true });
    throw refused(path, error);
  }
  return { path: target, temporary };
}

/** Writes all files or, when one cannot be written, none. Throws InputError naming the file. */
export async function writeFiles(contents: readonly FileContent[]): Promise<void> {
  const staged: Staged[] = [];
  try {
    for (const content of contents) {
      const one = await stage(content);
      if (one !== undefined) staged.push(one);
    }
  } catch (error) {
    await Promise.all(staged.map(({ temporary }) => rm(temporary, { force: true })));
    throw error;
  }
  for (const { path, temporary } of staged) {
    try {
      await rename(temporary, path);
    } catch (error) {
      await Promise.all(staged.map((one) => rm(one.temporary, { force: true })));
      throw refused(path, error);
    }
  }
}
