/** Reading a file that a person named: bounded, UTF-8, no surprises from folders, devices or binary data. */
import { closeSync, openSync, readdirSync, readSync, statSync } from 'node:fs';
import { basename, dirname } from 'node:path';
import { InputError } from '../../errors/index.ts';
import { didYouMean } from './nearest.ts';

/** Largest model file, and largest matrix file, in bytes. */
export const MODEL_BYTES = 16 * 2 ** 20;
export const MATRIX_BYTES = 64 * 2 ** 20;

const CHUNK = 1 << 16;

function neighbours(path: string): string[] {
  try {
    return readdirSync(dirname(path));
  } catch {
    return [];
  }
}

function refusal(path: string, error: unknown, key: string | undefined): InputError {
  const code = (error as { code?: string }).code ?? 'unknown error';
  const where = key === undefined ? {} : { key };
  if (code === 'ENOENT' || code === 'ENOTDIR') {
    return new InputError(`There is no file ${path}.${didYouMean(basename(path), neighbours(path))}`, {
      file: path,
      ...where,
      expected: 'the path of an existing file',
      next: `look at what is in ${dirname(path)}`,
    });
  }
  if (code === 'EISDIR') {
    return new InputError(`${path} is a folder, not a file.`, {
      file: path,
      ...where,
      expected: 'a file',
      next: 'name a file in that folder',
    });
  }
  return new InputError(`${path} cannot be read (${code}).`, {
    file: path,
    ...where,
    expected: 'a readable file',
    next: 'check its permissions',
  });
}

/** Bytes to text. Throws InputError on NUL bytes and on what is not UTF-8; a byte order mark is dropped. */
export function decodeText(bytes: Uint8Array, file: string): string {
  const expected = 'text in UTF-8';
  const next = 'save the file as plain text in UTF-8';
  if (bytes.includes(0)) throw new InputError(`${file} holds NUL bytes: it is a binary file or UTF-16 text.`, { file, expected, next });
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw new InputError(`${file} is not UTF-8 text.`, { file, expected, next });
  }
}

/** Refuses text from elsewhere (standard input) that is too long or is not plain text. Throws InputError. */
export function assertPlainText(text: string, file: string, limit: number): void {
  if (text.length > limit) {
    throw new InputError(`${file} is larger than ${limit / 2 ** 20} MB.`, {
      file,
      expected: `at most ${limit / 2 ** 20} MB`,
      next: 'put large matrices into files of their own',
    });
  }
  if (/[\0\uFFFD]/.test(text))
    throw new InputError(`${file} is not plain text in UTF-8.`, { file, expected: 'text in UTF-8', next: 'send a model in YAML or JSON' });
}

/** The text of a file. Throws InputError when it is missing, a folder, unreadable, larger than `limit` bytes or not text. */
export function readTextFile(path: string, limit: number, key?: string): string {
  if (path.includes('\0'))
    throw new InputError('A file name cannot hold a NUL character.', { ...(key === undefined ? {} : { key }), expected: 'a file name' });
  const chunks: Buffer[] = [];
  let size = 0;
  let handle: number | undefined;
  try {
    if (statSync(path).isDirectory()) throw Object.assign(new Error('folder'), { code: 'EISDIR' });
    handle = openSync(path, 'r');
    for (;;) {
      const chunk = Buffer.allocUnsafe(CHUNK);
      const count = readSync(handle, chunk, 0, CHUNK, null);
      if (count === 0) break;
      size += count;
      if (size > limit) break;
      chunks.push(chunk.subarray(0, count));
    }
  } catch (error) {
    throw refusal(path, error, key);
  } finally {
    if (handle !== undefined) closeSync(handle);
  }
  if (size > limit) {
    throw new InputError(`${path} is larger than ${limit / 2 ** 20} MB.`, {
      file: path,
      ...(key === undefined ? {} : { key }),
      expected: `a file of at most ${limit / 2 ** 20} MB`,
      next: 'give large matrices as sparse Matrix Market files',
    });
  }
  return decodeText(Buffer.concat(chunks), path);
}
