/** Brings an outcome to where the command line wants it: standard output, files, remarks. */
import { UsageError } from '../errors/index.ts';
import type { DocumentFormat, Outcome } from '../study/outcome.ts';
import { type FileContent, writeFiles } from './files.ts';
import type { Invocation } from './invocation.ts';
import { readableJson } from './json.ts';
import type { World } from './world.ts';
import { wrapText } from './wrap.ts';

/** Text that ends with exactly one line break. */
const line = (text: string): string => `${text.replace(/\n+$/, '')}\n`;

async function document(outcome: Outcome, format: DocumentFormat, invocation: Invocation): Promise<string> {
  const make = outcome.documents[format];
  if (make === undefined) {
    const known = Object.keys(outcome.documents).map((name) => `--${name}`);
    throw new UsageError(`${invocation.command} cannot write --${format}`, {
      key: `--${format}`,
      expected: known.length === 0 ? '--json' : known.join(', '),
      next: `see symcodim ${invocation.command} --help`,
    });
  }
  const text = await make({ fragment: invocation.output.fragment });
  if (text !== null) return line(text);
  throw new UsageError(`this result holds nothing for --${format}`, {
    key: `--${format}`,
    expected: 'a command whose result has a picture',
    next: 'try sweep, branches or report',
  });
}

/** Everything is made before anything is written, and files are written before standard output. */
export async function deliver(outcome: Outcome, invocation: Invocation, world: World): Promise<void> {
  const { output, command } = invocation;
  const contents: FileContent[] = [];
  let standard: string | undefined = output.json ? line(readableJson(outcome.result)) : undefined;
  for (const [format, path] of Object.entries(output.files) as [DocumentFormat, string][]) {
    const text = await document(outcome, format, invocation);
    if (path === '-') standard = text;
    else contents.push({ path, text });
  }
  if (standard === undefined && !output.quiet) {
    if (command !== 'report') standard = line(wrapText(await outcome.text(world.width), world.width));
    else if (contents.length === 0) standard = await document(outcome, 'markdown', invocation);
  }
  await writeFiles(contents);
  if (!output.quiet) {
    for (const note of outcome.notes ?? []) world.tell(`symcodim: ${note}`);
    for (const { path } of contents) world.tell(`symcodim: wrote ${path}`);
  }
  if (standard !== undefined) await world.write(standard);
}
