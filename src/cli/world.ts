/** What surrounds the program: streams, terminal, clock. `main` hands in the real one, tests one of their own. */

export interface World {
  /** Writes to standard output; rejects with ClosedPipe when nobody reads any more. */
  readonly write: (text: string) => Promise<void>;
  /** Writes to standard error. */
  readonly tell: (text: string) => void;
  /** Standard input, as it comes. */
  readonly input: () => AsyncIterable<Uint8Array>;
  /** Columns of the terminal that shows standard output; undefined where it is no terminal. */
  readonly width: number | undefined;
  /** Whether standard output may be coloured. */
  readonly colorOutput: boolean;
  /** Whether standard error may be coloured. */
  readonly colorMessages: boolean;
  /** Shows how far a long study has come, from 0 to 1; does nothing where standard error is no terminal. */
  readonly progress: (share: number) => void;
  /** Version of the package. */
  readonly version: () => string;
  /** Where a defect is shown with its stack, for those who mend it. */
  readonly trace: boolean;
}

/** Standard output was closed by its reader, as `head` does: nothing is wrong. */
export class ClosedPipe extends Error {
  constructor() {
    super('standard output was closed');
    this.name = 'ClosedPipe';
  }
}

/** Text that stands out on a terminal. */
export const bold = (text: string): string => `\u001b[1m${text}\u001b[22m`;
/** Text that warns on a terminal. */
export const red = (text: string): string => `\u001b[31m${text}\u001b[39m`;
