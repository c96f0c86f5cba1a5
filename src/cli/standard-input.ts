/** Standard input as one text, or line by line, within bounds. */
import { InputError, LimitError } from '../errors/index.ts';

/** Largest model on standard input and longest line of a batch, in bytes. */
export const INPUT_BYTES = 16 * 2 ** 20;

function decode(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    throw new InputError('standard input is not UTF-8 text', {
      file: '-',
      expected: 'text in UTF-8',
      next: 'save it as plain text in UTF-8',
    });
  }
}

const tooLong = (what: string): LimitError =>
  new LimitError(`${what} is larger than ${INPUT_BYTES / 2 ** 20} MB`, { file: '-', expected: `at most ${INPUT_BYTES / 2 ** 20} MB` });

/** All of standard input. Throws LimitError above INPUT_BYTES, InputError where it is not text. */
export async function readAll(input: AsyncIterable<Uint8Array>): Promise<string> {
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of input) {
    size += chunk.length;
    if (size > INPUT_BYTES) throw tooLong('standard input');
    chunks.push(chunk);
  }
  return decode(Buffer.concat(chunks));
}

/** A line, or what is wrong with it. */
export type InputLine = { readonly text: string } | { readonly error: InputError | LimitError };

/** Lines of the input, ends of line left off; a line that is too long or no text is given as an error, and the next ones follow. */
export async function* readLines(input: AsyncIterable<Uint8Array>): AsyncGenerator<InputLine> {
  let chunks: Uint8Array[] = [];
  let size = 0;
  const take = (): InputLine => {
    const bytes = Buffer.concat(chunks);
    const over = size > INPUT_BYTES;
    chunks = [];
    size = 0;
    if (over) return { error: tooLong('a line') };
    try {
      return { text: decode(bytes).replace(/\r$/, '') };
    } catch (error) {
      return { error: error as InputError };
    }
  };
  const add = (part: Uint8Array): void => {
    size += part.length;
    if (size <= INPUT_BYTES) chunks.push(part);
    else chunks = [];
  };
  for await (const chunk of input) {
    let from = 0;
    for (let at = chunk.indexOf(10); at >= 0; at = chunk.indexOf(10, from)) {
      add(chunk.subarray(from, at));
      yield take();
      from = at + 1;
    }
    if (from < chunk.length) add(chunk.subarray(from));
  }
  if (size > 0) yield take();
}
