/** The values of options: lists, assignments, counts, ranges. Each reader throws UsageError naming the option. */
import { UsageError } from '../../errors/index.ts';
import type { RangeDeclaration } from './declaration.ts';
import { isName } from './keys.ts';

/** One use of an option, without the dashes; `value` is '' for flags. */
export interface OptionUse {
  readonly name: string;
  readonly value: string;
}

export function usage(option: string, value: string, message: string, expected: string, next: string): UsageError {
  return new UsageError(message, { key: `--${option}`, value: value.length > 200 ? `${value.slice(0, 200)}…` : value, expected, next });
}

const reserved = (option: string, value: string): UsageError =>
  usage(option, value, 'pi is reserved: it is the number pi.', 'another name', 'rename it');

/** Splits at commas outside brackets. */
export function splitList(text: string): string[] {
  const parts: string[] = [];
  let depth = 0;
  let start = 0;
  for (let k = 0; k <= text.length; k++) {
    const c = text[k];
    if (c === '(' || c === '[') depth++;
    else if (c === ')' || c === ']') depth--;
    else if (c === undefined || (c === ',' && depth <= 0)) {
      parts.push(text.slice(start, k).trim());
      start = k + 1;
    }
  }
  return parts;
}

export function nameList(option: string, value: string): string[] {
  const names = splitList(value);
  for (const name of names) {
    if (name === 'pi') throw reserved(option, value);
    if (!isName(name))
      throw usage(
        option,
        value,
        name === '' ? `--${option} has an empty name.` : `${name} is not a name.`,
        'names separated by commas',
        `write --${option} q1,q2`,
      );
  }
  return names;
}

export function assignment(option: string, part: string, example: string): [string, string] {
  const at = part.indexOf('=');
  const name = part.slice(0, Math.max(0, at)).trim();
  const text = part.slice(at + 1).trim();
  if (at >= 0 && name === 'pi') throw reserved(option, part);
  if (at < 0 || text === '' || !isName(name))
    throw usage(option, part, `--${option} needs NAME=VALUE.`, 'a name, an equals sign, an expression', `write --${option} ${example}`);
  return [name, text];
}

export function count(option: string, value: string, least: number, example = String(Math.max(least, 4))): number {
  if (!/^\d{1,9}$/.test(value) || Number(value) < least)
    throw usage(
      option,
      value,
      `--${option} needs an integer not below ${least}.`,
      `an integer not below ${least}`,
      `write --${option} ${example}`,
    );
  return Number(value);
}

export function rangeOf(value: string): [string, RangeDeclaration] {
  const [name, text] = assignment('range', value, 'mu=-1:1');
  const parts = text.split(':').map((part) => part.trim());
  if (parts.length < 2 || parts.length > 3 || parts.includes(''))
    throw usage(
      'range',
      value,
      '--range needs NAME=FROM:TO or NAME=FROM:TO:STEPS.',
      'two ends and perhaps a number of steps',
      'write --range mu=-1:1:100',
    );
  const [from, to, steps] = parts;
  return [name, { from: from!, to: to!, ...(steps === undefined ? {} : { steps: count('range', steps, 1, `${name}=${from}:${to}:100`) }) }];
}

/** The last value of an option that may be given once. */
export function single(uses: readonly OptionUse[], name: string): string | undefined {
  const found = uses.filter((use) => use.name === name);
  if (found.length > 1) throw usage(name, found[1]!.value, `--${name} is given twice.`, 'it once', 'remove one of them');
  return found[0]?.value;
}

export function all(uses: readonly OptionUse[], name: string): string[] {
  return uses.filter((use) => use.name === name).map((use) => use.value);
}
