/**
 * The form of the records from which everything that lists commands and options is made:
 * the wiring of the parser, help, man page, shell completions and the table of the README.
 */

/** Every command, in the order in which they are listed. */
export const commandNames = [
  'check',
  'components',
  'codim',
  'events',
  'invariants',
  'reduce',
  'branches',
  'sweep',
  'report',
  'verify',
  'groups',
  'batch',
  'completions',
  'man',
] as const;
export type CommandName = (typeof commandNames)[number];

/** Headings under which options are listed, in this order. */
export const optionGroups = ['symmetry', 'Hamiltonian', 'study', 'output', 'general'] as const;
export type OptionGroup = (typeof optionGroups)[number];

/** What a shell offers after an option or in the place of an argument. */
export type Completion = 'file' | 'group' | 'none';

export interface OptionRecord {
  /** Without dashes: `group` is typed `--group`. */
  readonly name: string;
  /** One letter, typed with one dash. */
  readonly letter?: string;
  /** What stands for the value in help texts; an option without one is a switch. */
  readonly value?: string;
  readonly group: OptionGroup;
  /** One line, without a full stop. */
  readonly short: string;
  /** Whole sentences for the man page. */
  readonly long: string;
  /** How it is typed, as it would stand on a command line. */
  readonly example: string;
  readonly repeatable?: boolean;
  readonly choices?: readonly string[];
  readonly completion?: Completion;
  /** Whether it declares the model or settles how it is studied, and so is read by the model layer. */
  readonly model?: boolean;
  readonly commands: readonly CommandName[];
}

export interface ArgumentRecord {
  readonly name: string;
  readonly required: boolean;
  readonly short: string;
  readonly choices?: readonly string[];
  readonly completion?: Completion;
}

export interface CommandRecord {
  readonly name: CommandName;
  readonly argument?: ArgumentRecord;
  /** One line, without a full stop. */
  readonly short: string;
  /** Whole sentences for the command's own help and the man page. */
  readonly long: string;
  readonly examples: readonly string[];
}
