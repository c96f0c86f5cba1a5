/** Which questions are put to which sample, and the golden answers. */
import { readdirSync } from 'node:fs';
import { SymcodimError } from '../../src/errors/index.ts';
import { declareFile, renderMarkdown, report, type StudyCommand, study } from '../../src/index.ts';
import { coreOf, outlineOf, refusalOf } from './core.ts';

const folder = new URL('../../samples/', import.meta.url).pathname;
export const goldenFolder = new URL('./golden/', import.meta.url).pathname;

export const COMMANDS: readonly StudyCommand[] = ['check', 'components', 'codim', 'invariants', 'reduce', 'branches', 'sweep', 'report'];

/** Not asked: they take many seconds, and the same routines answer on the other samples. */
const LEFT_OUT: readonly string[] = [
  'truncated-icosahedron.report',
  'vortex-heptagon.invariants',
  'vortex-heptagon.reduce',
  'vortex-heptagon.report',
  'vortex-heptagon-slice.invariants',
  'vortex-heptagon-slice.reduce',
  'vortex-heptagon-slice.report',
];

export const samples: readonly string[] = readdirSync(folder)
  .filter((file) => file.endsWith('.yaml'))
  .map((file) => file.slice(0, -'.yaml'.length))
  .sort();

export interface Case {
  readonly sample: string;
  readonly command: StudyCommand;
  /** Name of the golden file. */
  readonly name: string;
}

export const cases: readonly Case[] = samples.flatMap((sample) =>
  COMMANDS.map((command) => ({ sample, command, name: `${sample}.${command}` })).filter(({ name }) => !LEFT_OUT.includes(name)),
);

/** What the program answers today. Errors that are not a user's are thrown on. */
export async function answerOf({ sample, command }: Case): Promise<unknown> {
  const declaration = declareFile(`${folder}${sample}.yaml`);
  try {
    if (command === 'report') return outlineOf(await renderMarkdown((await report(declaration)).stages));
    const { result, status } = await study(command, declaration);
    return { status, ...(coreOf(result as unknown as Record<string, unknown>) as object) };
  } catch (error) {
    if (error instanceof SymcodimError) return refusalOf(error);
    throw error;
  }
}

/** The text of a golden file: one key a line, and one element a line where a list would be long. */
export function textOf(value: unknown, indent = ''): string {
  const flat = JSON.stringify(value);
  if (typeof value !== 'object' || value === null || flat.length + indent.length < 130) return flat;
  const inner = `${indent} `;
  const [open, close] = Array.isArray(value) ? '[]' : '{}';
  const parts = Array.isArray(value)
    ? value.map((v) => textOf(v, inner))
    : Object.entries(value).map(([k, v]) => `${JSON.stringify(k)}: ${textOf(v, inner)}`);
  return `${open}\n${parts.map((p) => inner + p).join(',\n')}\n${indent}${close}`;
}
