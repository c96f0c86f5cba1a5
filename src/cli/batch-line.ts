/** One line of a batch: a model, or values of parameters for the model of the command line. */
import { InputError, SymcodimError, UsageError } from '../errors/index.ts';
import { declare, type ModelSource, type OptionUse } from '../model/declaration/options.ts';
import type { Outcome, StudyCommand, StudyOptions } from '../study/outcome.ts';
import { plain } from './json.ts';
import { DEFECT } from './messages.ts';

/** What is the same for all lines; plain data, so that it can be handed to another thread. */
export interface BatchSetup {
  readonly command: StudyCommand;
  /** The model to which each line gives values; absent where each line is a model. */
  readonly model?: ModelSource;
  readonly uses: readonly OptionUse[];
  readonly study: StudyOptions;
}

export interface BatchLine {
  /** Counted from 1. */
  readonly number: number;
  readonly text: string;
}

/** An answer, as one line of JSON without its end. */
export interface BatchAnswer {
  readonly json: string;
  readonly status: number;
}

/** How a declaration is studied; see runCommand of the study layer. */
export type Study = (command: StudyCommand, declaration: ReturnType<typeof declare>, options: StudyOptions) => Promise<Outcome>;

/** Answers one line. Never throws: what goes wrong is the answer. */
export async function answerLine(setup: BatchSetup, line: BatchLine, study: Study): Promise<BatchAnswer> {
  try {
    const declaration =
      setup.model === undefined ? declare({ text: line.text }, setup.uses) : declare(setup.model, [...setup.uses, ...valuesOf(line.text)]);
    const outcome = await study(setup.command, declaration, setup.study);
    return {
      json: JSON.stringify(plain({ line: line.number, status: outcome.status, ...outcome.result }, 'result')),
      status: outcome.status,
    };
  } catch (error) {
    return errorAnswer(setup, line.number, error);
  }
}

/** The answer to a line that cannot be answered. */
export function errorAnswer(setup: BatchSetup, line: number, error: unknown): BatchAnswer {
  const known = error instanceof SymcodimError;
  const status = known ? (error.kind === 'undecided' ? 3 : 2) : DEFECT;
  const message = error instanceof Error ? error.message : String(error);
  const told = known ? { kind: error.kind, message, ...error.culprit } : { kind: 'defect', message };
  return { json: JSON.stringify({ line, status, schema: 'symcodim/1', command: setup.command, error: told }), status };
}

/** Strings and numbers of a JSON text; what stands in a string is matched whole, so that digits in it are left alone. */
const TOKEN = /"(?:[^"\\]|\\.)*"|-?\d[\d.eE+-]*/g;

/** `{"c": "-1/3", "k": 0.1}` as uses of --set; numbers are taken as typed, digit for digit. */
export function valuesOf(text: string): readonly OptionUse[] {
  const wrong = (message: string): InputError =>
    new InputError(message, { value: text, expected: 'values of parameters as a JSON object', next: 'write {"mu": "1/3"}' });
  let values: unknown;
  try {
    JSON.parse(text);
    values = JSON.parse(text.replace(TOKEN, (token) => (token.startsWith('"') ? token : `"${token}"`)));
  } catch {
    throw wrong('the line is not JSON');
  }
  if (typeof values !== 'object' || values === null || Array.isArray(values)) throw wrong('the line is not a JSON object');
  return Object.entries(values).map(([name, value]) => {
    if (typeof value !== 'string' || value.trim() === '') throw wrong(`the value of ${name} is neither a number nor a text`);
    if (/[,=]/.test(value) || /[,=]/.test(name)) {
      throw new UsageError(`the value of ${name} holds a comma or an equals sign`, { key: name, value, expected: 'one exact number' });
    }
    return { name: 'set', value: `${name}=${value}` };
  });
}
