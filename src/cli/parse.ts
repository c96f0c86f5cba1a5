/**
 * Reads a command line with commander, wired from the records. Only the form is checked here:
 * what a name or an expression means is found out later, by the layers that know.
 */
import { Command, CommanderError, Option } from 'commander';
import { UsageError } from '../errors/index.ts';
import { nearest } from '../model/declaration/nearest.ts';
import { interpret } from './interpret.ts';
import type { Invocation, Typed } from './invocation.ts';
import { type CommandName, commandNames, commandRecord, options, optionsOf } from './records/index.ts';

/** A command line asks for help, for the version, or for something to be done. */
export type Parsed =
  | { readonly kind: 'help'; readonly command?: CommandName }
  | { readonly kind: 'version' }
  | { readonly kind: 'invocation'; readonly invocation: Invocation };

const isCommand = (word: string | undefined): word is CommandName => commandNames.some((name) => name === word);

/** What the command line says. Throws UsageError with the nearest known name and the next step. */
export function parse(words: readonly string[]): Parsed {
  const first = words[0];
  if (first === undefined || first === '--help' || first === '-h') return { kind: 'help' };
  if (first === '--version' || first === '-V') return { kind: 'version' };
  if (first === 'help') return helpFor(words[1]);
  if (first.startsWith('-') && first !== '-') {
    throw new UsageError(`the command is missing before '${first}'`, {
      expected: 'symcodim COMMAND [MODEL] [OPTIONS]',
      next: 'see symcodim --help',
    });
  }
  if (!isCommand(first)) throw unknownCommand(first);
  const typed: Typed[] = [];
  const operands: string[] = [];
  const command = wire(first, typed, operands);
  try {
    command.parse([...words.slice(1)], { from: 'user' });
  } catch (error) {
    if (!(error instanceof CommanderError)) throw error;
    throw usageError(first, error);
  }
  if (typed.some(({ option }) => option.name === 'help')) return { kind: 'help', command: first };
  return { kind: 'invocation', invocation: interpret(first, operands, typed) };
}

function helpFor(word: string | undefined): Parsed {
  if (word === undefined) return { kind: 'help' };
  if (!isCommand(word)) throw unknownCommand(word);
  return { kind: 'help', command: word };
}

/** A commander command that takes the options of the record and notes what was typed, in order. */
function wire(name: CommandName, typed: Typed[], operands: string[]): Command {
  const record = commandRecord(name);
  const command = new Command(name).helpOption(false).exitOverride().allowExcessArguments(true);
  command.configureOutput({ writeOut: () => {}, writeErr: () => {}, outputError: () => {} }).showSuggestionAfterError(false);
  if (record.argument !== undefined) command.argument(`[${record.argument.name}]`);
  for (const option of optionsOf(name)) {
    const dashed = option.letter === undefined ? `--${option.name}` : `-${option.letter}, --${option.name}`;
    command.addOption(new Option(option.value === undefined ? dashed : `${dashed} <value>`));
    command.on(`option:${option.name}`, (value: string | null | undefined) => {
      typed.push(typeof value === 'string' ? { option, value } : { option });
    });
  }
  return command.action(() => {
    operands.push(...command.args);
  });
}

function unknownCommand(word: string): UsageError {
  const meant = nearest(word, commandNames);
  const file = /\.(ya?ml|json)$/.test(word);
  return new UsageError(`unknown command '${word}'`, {
    value: word,
    expected: file ? 'a command before the model file' : `one of ${commandNames.join(', ')}`,
    next: meant === undefined ? (file ? `symcodim codim ${word}` : 'see symcodim --help') : `did you mean 'symcodim ${meant}'?`,
  });
}

/** Commander's complaint in our words. */
function usageError(command: CommandName, error: CommanderError): UsageError {
  const quoted = /'([^']*)'/.exec(error.message)?.[1] ?? '';
  if (error.code === 'commander.unknownOption') return unknownOption(command, quoted);
  if (error.code === 'commander.optionMissingArgument') {
    const name = /--([a-z-]+)/.exec(quoted)?.[1];
    const option = options.find((entry) => entry.name === name);
    return new UsageError(`--${name} has no value`, {
      key: `--${name}`,
      expected: option?.value ?? 'a value',
      next: `for example ${option?.example}`,
    });
  }
  return new UsageError(error.message.replace(/^error: /, ''), { next: `see symcodim ${command} --help` });
}

function unknownOption(command: CommandName, flag: string): UsageError {
  const word = flag.replace(/^-+/, '').replace(/=.*$/, '');
  const elsewhere = options.find((option) => option.name === word);
  if (elsewhere !== undefined) {
    const switchWithValue = elsewhere.commands.includes(command);
    return new UsageError(switchWithValue ? `--${word} takes no value` : `${command} has no option --${word}`, {
      key: `--${word}`,
      expected: switchWithValue ? `--${word}` : `--${word} belongs to ${elsewhere.commands.join(', ')}`,
      next: `see symcodim ${command} --help`,
    });
  }
  const meant = nearest(
    word,
    optionsOf(command).map((option) => option.name),
  );
  return new UsageError(`unknown option '${flag}'`, {
    key: flag,
    expected: `an option of ${command}`,
    next: meant === undefined ? `see symcodim ${command} --help` : `did you mean --${meant}?`,
  });
}
