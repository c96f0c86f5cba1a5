/** A command line that was understood: plain data, so that it can be handed to another thread. */
import type { OptionUse } from '../model/declaration/options.ts';
import type { DocumentFormat } from '../study/outcome.ts';
import type { CommandName, OptionRecord } from './records/index.ts';

/** One option as it was typed; switches have no value. */
export interface Typed {
  readonly option: OptionRecord;
  readonly value?: string;
}

/** Where results go; `-` stands for standard output. */
export interface OutputOptions {
  readonly json: boolean;
  readonly quiet: boolean;
  readonly color: boolean;
  readonly fragment: boolean;
  readonly files: Readonly<Partial<Record<DocumentFormat, string>>>;
}

export interface Invocation {
  readonly command: CommandName;
  /** MODEL, NAME, RESULT or SHELL. */
  readonly argument?: string;
  /** Options that declare the model or settle how it is studied, in the order typed; the model layer reads them. */
  readonly uses: readonly OptionUse[];
  /** Switches of one command. */
  readonly study: { readonly find: boolean; readonly elliptic: boolean };
  readonly output: OutputOptions;
  /** Of `groups`: largest order that is enumerated. */
  readonly orderLimit?: number;
  /** Of `verify`: how far floating numbers may differ, relative. */
  readonly tolerance?: number;
  /** Only of `batch`: the command that answers each line, and the number of threads. */
  readonly batch?: { readonly command: CommandName; readonly jobs?: number };
}
