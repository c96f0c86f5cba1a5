/**
 * The error tree. Every error that a user can cause carries what is needed to say
 * where it was found, what was found, what was expected and what to do next.
 * Nothing here prints; `cli` turns an error into a message and an exit status.
 */

/** Where and what went wrong; every field is optional, the message alone must make sense. */
export interface Culprit {
  readonly file?: string;
  readonly key?: string;
  readonly value?: string;
  readonly expected?: string;
  readonly next?: string;
}

export type ErrorKind =
  | 'usage'
  | 'input'
  | 'shape'
  | 'not-a-group'
  | 'not-symplectic'
  | 'not-invariant'
  | 'not-an-equilibrium'
  | 'undecided'
  | 'limit';

/** Base of all errors that are somebody's input or a stated limit, never a defect of the program. */
export class SymcodimError extends Error {
  readonly kind: ErrorKind;
  readonly culprit: Culprit;
  constructor(kind: ErrorKind, message: string, culprit: Culprit = {}) {
    super(message);
    this.name = 'SymcodimError';
    this.kind = kind;
    this.culprit = culprit;
  }
}

/** Wrong command line. */
export class UsageError extends SymcodimError {
  constructor(message: string, culprit: Culprit = {}) {
    super('usage', message, culprit);
  }
}

/** Wrong content of a model file, option, group file or matrix file. */
export class InputError extends SymcodimError {
  constructor(message: string, culprit: Culprit = {}) {
    super('input', message, culprit);
  }
}

/** Matrices whose sizes or fields do not fit. */
export class ShapeError extends SymcodimError {
  constructor(message: string, culprit: Culprit = {}) {
    super('shape', message, culprit);
  }
}

/** Generators that do not close into a finite group below the limit. */
export class NotAGroupError extends SymcodimError {
  constructor(message: string, culprit: Culprit = {}) {
    super('not-a-group', message, culprit);
  }
}

/** A generator that is neither symplectic nor antisymplectic, or a form that is not symplectic. */
export class NotSymplecticError extends SymcodimError {
  constructor(message: string, culprit: Culprit = {}) {
    super('not-symplectic', message, culprit);
  }
}

/** A Hamiltonian that a generator does not leave invariant. */
export class NotInvariantError extends SymcodimError {
  constructor(message: string, culprit: Culprit = {}) {
    super('not-invariant', message, culprit);
  }
}

/** A declared point where the gradient of H does not vanish. */
export class NotAnEquilibriumError extends SymcodimError {
  constructor(message: string, culprit: Culprit = {}) {
    super('not-an-equilibrium', message, culprit);
  }
}

/** An answer that the data do not decide at the stated tolerance (exit status 3). */
export class UndecidedError extends SymcodimError {
  constructor(message: string, culprit: Culprit = {}) {
    super('undecided', message, culprit);
  }
}

/** A stated limit (size, order, time) was reached. */
export class LimitError extends SymcodimError {
  constructor(message: string, culprit: Culprit = {}) {
    super('limit', message, culprit);
  }
}
