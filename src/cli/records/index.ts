/** The records of all commands and options, and look-ups in them. */
import { commands } from './commands.ts';
import { declarationOptions } from './declaration-options.ts';
import { outputOptions } from './output-options.ts';
import type { CommandName, CommandRecord, OptionRecord } from './record.ts';
import { studyOptions } from './study-options.ts';

export { commands } from './commands.ts';
export * from './record.ts';

/** All options, in the order in which they are listed. */
export const options: readonly OptionRecord[] = [...declarationOptions, ...studyOptions, ...outputOptions];

/** The record of a command. */
export function commandRecord(name: CommandName): CommandRecord {
  const record = commands.find((entry) => entry.name === name);
  if (record === undefined) throw new Error(`no record of the command ${name}`);
  return record;
}

/** The options that a command takes, in the order in which they are listed. */
export function optionsOf(name: CommandName): readonly OptionRecord[] {
  return options.filter((option) => option.commands.includes(name));
}

/** How an option is typed, with its value: `-q, --quiet` or `--group NAME`. */
export function spelling(option: OptionRecord): string {
  const dashed = option.letter === undefined ? `--${option.name}` : `-${option.letter}, --${option.name}`;
  return option.value === undefined ? dashed : `${dashed} ${option.value}`;
}

/** The line of usage of a command: `symcodim codim [MODEL] [OPTIONS]`. */
export function usage(command: CommandRecord): string {
  const argument = command.argument;
  const shown = argument === undefined ? '' : argument.required ? ` ${argument.name}` : ` [${argument.name}]`;
  return `symcodim ${command.name}${shown} [OPTIONS]`;
}
