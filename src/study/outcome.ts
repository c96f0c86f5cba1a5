/**
 * What a command hands back to whoever asked for it: the result as plain data, the exit
 * status it stands for, the text for a terminal, and the documents that can be made of it.
 * Documents are made on demand, so that an answer in JSON never pays for a picture.
 */

/** The commands that answer a question about one model. */
export type StudyCommand = 'check' | 'components' | 'codim' | 'events' | 'invariants' | 'reduce' | 'branches' | 'sweep' | 'report';

/** 0 answered; 1 answered and the answer is no; 3 undecided at the stated tolerance. Wrong input (2) is an error, never an outcome. */
export type OutcomeStatus = 0 | 1 | 3;

/** A result in the form that is printed by `--json`; every result names its schema and command. */
export interface ResultObject {
  readonly schema: 'symcodim/1';
  readonly command: string;
  readonly [key: string]: unknown;
}

/** The kinds of documents that can be written. */
export type DocumentFormat = 'latex' | 'html' | 'markdown' | 'svg';

/** A document made on demand, or null where the result holds nothing for it; `fragment` leaves the preamble off (LaTeX only). */
export type DocumentMaker = (options: { readonly fragment: boolean }) => string | null | Promise<string | null>;

export type TextMaker = (width?: number) => string | Promise<string>;

export interface Outcome {
  readonly result: ResultObject;
  readonly status: OutcomeStatus;
  /** For a terminal of that width, or of any; ends without a line break. Made on demand, as documents are. */
  readonly text: TextMaker;
  /** The formats this command can write; a format left out cannot be made of this result. */
  readonly documents: Readonly<Partial<Record<DocumentFormat, DocumentMaker>>>;
  /** Remarks for standard error, one sentence each, such as the term that made an answer floating. */
  readonly notes?: readonly string[];
}

/** What one run of a command adds to the declaration, which holds everything else (degree, tolerance, range, …). */
export interface StudyOptions {
  /** Number of parameters that may be tuned (K of the verdict), where it is not that of the declaration. */
  readonly parameters?: number;
  /** Look for signed permutations that leave H invariant (`check`). */
  readonly find?: boolean;
  /** Birkhoff normal form at an elliptic equilibrium (`reduce`, `report`). */
  readonly elliptic?: boolean;
  /** Told how far a long study has come, from 0 to 1. */
  readonly progress?: (share: number) => void;
}
