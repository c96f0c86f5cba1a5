/** What an exact evaluation can run into: a larger field, a number that is in none, a point outside the domain. */
import { InputError, LimitError } from '../../errors/index.ts';
import { type FieldDemand, RealField } from '../../field/index.ts';
import type { Where } from './scan.ts';

/** A square root, cosine or sine needs a larger field; `withField` catches it, enlarges and repeats. */
export class FieldTooSmall extends Error {
  readonly demand: FieldDemand;
  constructor(demand: FieldDemand) {
    super('a larger field is needed');
    this.demand = demand;
  }
}

/** A value that is in no field of square roots and cosines: `term` (such as `log(2)`) makes it so. */
export class Transcendental extends Error {
  readonly term: string;
  constructor(term: string) {
    super(`${term} has no exact value here`);
    this.term = term;
  }
}

/**
 * Repeats `run` over larger and larger fields until it no longer throws FieldTooSmall.
 * Throws LimitError if the field would be too large.
 */
export function withField<R>(run: (field: RealField) => R, start: RealField = RealField.of()): { field: RealField; result: R } {
  for (let field = start; ; ) {
    try {
      return { field, result: run(field) };
    } catch (signal) {
      if (!(signal instanceof FieldTooSmall)) throw signal;
      const larger = enlarge(field, signal.demand);
      if (larger === field) throw new Error(`the field ${field.name} does not meet its own demand`);
      field = larger;
    }
  }
}

function enlarge(field: RealField, demand: FieldDemand): RealField {
  try {
    return RealField.join(field, RealField.of(demand));
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    throw new LimitError(error.message, { expected: 'fewer different square roots and angles', next: 'use floating numbers' });
  }
}

/** Runs an evaluation and says in its InputErrors where the expression stands, unless they know better. */
export function located<R>(where: Where, run: () => R): R {
  try {
    return run();
  } catch (error) {
    if (error instanceof InputError) throw new InputError(error.message, { ...where, ...error.culprit });
    throw error;
  }
}

/** The error for a value or a derivative that does not exist. */
export function outside(what: string, text: string, next = 'check the parameter values and the equilibrium'): InputError {
  return new InputError(what, {
    value: text.length > 80 ? `${text.slice(0, 77)}…` : text,
    expected: 'a function that is smooth at the point',
    next,
  });
}
