/** From an error to a message and an exit status. */
import { type Culprit, SymcodimError } from '../errors/index.ts';
import { bold, red } from './world.ts';

/** Exit status of a defect of the program (EX_SOFTWARE in sysexits.h of BSD). */
export const DEFECT = 70;

/** Values longer than this are cut in a message. */
const LONGEST_VALUE = 200;

export interface Message {
  readonly text: string;
  readonly status: number;
}

const culpritKeys = ['file', 'key', 'value', 'expected', 'next'] as const satisfies readonly (keyof Culprit)[];

/** Signs that a terminal would obey are shown instead. */
export function visible(text: string): string {
  return text.replace(/[\p{Cc}\p{Bidi_Control}]/gu, (sign) =>
    sign === '\n' || sign === '\t' ? sign : `\\u${sign.charCodeAt(0).toString(16).padStart(4, '0')}`,
  );
}

/** The message of an error; status 2 for what the user can mend, 3 for what the data leave open, 70 for a defect. */
export function messageOf(error: unknown, color: boolean, trace = false): Message {
  const name = color ? bold(red('symcodim:')) : 'symcodim:';
  if (error instanceof SymcodimError) {
    const lines = [`${name} ${visible(error.message)}`];
    for (const key of culpritKeys) {
      const value = error.culprit[key];
      if (value === undefined || value === '') continue;
      const shown = value.length > LONGEST_VALUE ? `${value.slice(0, LONGEST_VALUE)}… (${value.length} characters)` : value;
      lines.push(`  ${`${key}:`.padEnd(10)}${visible(shown)}`);
    }
    return { text: lines.join('\n'), status: error.kind === 'undecided' ? 3 : 2 };
  }
  const what = error instanceof Error ? error.message : String(error);
  const lines = [
    `${name} this is a defect of the program, not of your input: ${visible(what.slice(0, LONGEST_VALUE))}`,
    '  next:     please report it with the command line and the model; SYMCODIM_TRACE=1 shows where it happened',
  ];
  if (trace && error instanceof Error && error.stack !== undefined) lines.push(error.stack);
  return { text: lines.join('\n'), status: DEFECT };
}
