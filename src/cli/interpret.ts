/**
 * From the options as typed to an invocation. Checked here is what concerns the command line alone: choices,
 * repetition, where output goes. What declares or settles a model is handed on as typed to the model layer.
 */
import { UsageError } from '../errors/index.ts';
import { nearest } from '../model/declaration/nearest.ts';
import type { DocumentFormat } from '../study/outcome.ts';
import type { Invocation, OutputOptions, Typed } from './invocation.ts';
import { type ArgumentRecord, type CommandName, commandNames, commandRecord, type OptionRecord } from './records/index.ts';

/** Builds the invocation. Throws UsageError for a value of the wrong form or options that exclude each other. */
export function interpret(command: CommandName, operands: readonly string[], typed: readonly Typed[]): Invocation {
  refuseRepetition(typed);
  for (const { option, value } of typed) {
    if (value !== undefined) checkChoice(`--${option.name}`, value, option.choices, option.example);
  }
  const argument = checkArgument(command, operands);
  const takesModel = commandRecord(command).argument?.name === 'MODEL';
  const declaring = typed.filter(({ option }) => option.model === true);
  const orderLimit = takesModel ? undefined : whole(typed, 'order-limit', 1);
  return {
    command,
    ...(argument === undefined ? {} : { argument }),
    uses: takesModel ? declaring.map(({ option, value }) => ({ name: option.name, value: value ?? '' })) : [],
    study: { find: given(typed, 'find'), elliptic: given(typed, 'elliptic') },
    output: outputOptions(typed),
    ...(orderLimit === undefined ? {} : { orderLimit }),
    ...(command === 'verify' ? relative(typed, 'tolerance') : {}),
    ...(command === 'batch' ? { batch: batchOptions(typed) } : {}),
  };
}

function refuseRepetition(typed: readonly Typed[]): void {
  const seen = new Map<string, string | undefined>();
  for (const { option, value } of typed) {
    if (option.repeatable !== true && option.value !== undefined && seen.has(option.name)) {
      throw new UsageError(`--${option.name} is given twice: '${shorten(seen.get(option.name) ?? '')}' and '${shorten(value ?? '')}'`, {
        key: `--${option.name}`,
        expected: 'it once',
        next: 'remove one of them',
      });
    }
    seen.set(option.name, value);
  }
}

function checkChoice(key: string, value: string, choices: readonly string[] | undefined, example: string): void {
  if (choices === undefined || choices.includes(value)) return;
  const meant = nearest(value, choices);
  throw new UsageError(`${key} does not know '${shorten(value)}'`, {
    key,
    value,
    expected: choices.join(', '),
    next: meant === undefined ? `for example ${example}` : `did you mean ${meant}?`,
  });
}

function checkArgument(command: CommandName, operands: readonly string[]): string | undefined {
  const record: ArgumentRecord | undefined = commandRecord(command).argument;
  const extra = operands[record === undefined ? 0 : 1];
  if (extra !== undefined) {
    throw new UsageError(`${command} does not know what to do with '${shorten(extra)}'`, {
      value: extra,
      expected: record === undefined ? 'no argument' : `one ${record.name}`,
      next: `see symcodim ${command} --help`,
    });
  }
  const argument = operands[0];
  if (argument === undefined) {
    if (record?.required !== true) return undefined;
    throw new UsageError(`${command} needs ${record.name}`, {
      key: record.name,
      expected: record.choices?.join(', ') ?? record.short,
      next: `see symcodim ${command} --help`,
    });
  }
  if (record !== undefined) checkChoice(record.name, argument, record.choices, commandRecord(command).examples[0] ?? '');
  return argument;
}

const single = (typed: readonly Typed[], name: string): Typed | undefined => typed.find(({ option }) => option.name === name);
const given = (typed: readonly Typed[], name: string): boolean => single(typed, name) !== undefined;
const shorten = (value: string): string => (value.length > 80 ? `${value.slice(0, 77)}…` : value);

function malformed(option: OptionRecord, value: string, expected: string): UsageError {
  return new UsageError(`--${option.name} cannot read '${shorten(value)}'`, {
    key: `--${option.name}`,
    value,
    expected,
    next: `for example ${option.example}`,
  });
}

/** A whole number of at least `least`. */
function whole(typed: readonly Typed[], name: string, least: number): number | undefined {
  const entry = single(typed, name);
  if (entry?.value === undefined) return undefined;
  const number = /^\d{1,9}$/.test(entry.value) ? Number(entry.value) : Number.NaN;
  if (!(number >= least)) throw malformed(entry.option, entry.value, `a whole number of at least ${least}`);
  return number;
}

/** A tolerance from 0 to below 1. */
function relative(typed: readonly Typed[], name: string): { readonly tolerance?: number } {
  const entry = single(typed, name);
  if (entry?.value === undefined) return {};
  const tolerance = /^[0-9.]+(?:[eE][+-]?[0-9]{1,3})?$/.test(entry.value) ? Number(entry.value) : Number.NaN;
  if (!(tolerance >= 0 && tolerance < 1)) throw malformed(entry.option, entry.value, 'a number from 0 to below 1');
  return { tolerance };
}

function batchOptions(typed: readonly Typed[]): NonNullable<Invocation['batch']> {
  const jobs = whole(typed, 'jobs', 1);
  const command = commandNames.find((name) => name === single(typed, 'command')?.value) ?? 'codim';
  return { command, ...(jobs === undefined ? {} : { jobs }) };
}

function outputOptions(typed: readonly Typed[]): OutputOptions {
  const files: Partial<Record<DocumentFormat, string>> = {};
  const json = given(typed, 'json');
  const standard: string[] = json ? ['--json'] : [];
  for (const format of ['latex', 'html', 'markdown', 'svg'] as const) {
    const file = single(typed, format)?.value;
    if (file === undefined) continue;
    if (file === '') {
      throw new UsageError(`--${format} has an empty file name`, { key: `--${format}`, expected: 'a file name, or - for standard output' });
    }
    files[format] = file;
    if (file === '-') standard.push(`--${format} -`);
  }
  if (standard.length > 1) {
    throw new UsageError(`${standard.join(' and ')} would both write to standard output`, {
      key: standard[1]!,
      expected: 'one of them',
      next: 'give the other a file name',
    });
  }
  if (given(typed, 'fragment') && files.latex === undefined) {
    throw new UsageError('--fragment goes with --latex', {
      key: '--fragment',
      expected: '--latex beside it',
      next: '--latex FILE --fragment',
    });
  }
  const shared = Object.values(files).find((file, index, all) => file !== '-' && all.indexOf(file) !== index);
  if (shared !== undefined) {
    throw new UsageError(`two documents would be written to '${shared}'`, {
      value: shared,
      expected: 'one file each',
      next: 'name another file',
    });
  }
  return { json, quiet: given(typed, 'quiet'), color: !given(typed, 'no-color'), fragment: given(typed, 'fragment'), files };
}
