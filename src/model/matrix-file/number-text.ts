/** The spellings of numbers in matrix files, and the bounds on their sizes. */

export const INTEGER = /^[+-]?\d+$/;
/** Decimal with an optional exponent of at most three digits. */
export const REAL = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d{1,3})?$/;
export const FRACTION = /^[+-]?\d+\/\d*[1-9]\d*$/;

/** Largest number of rows or columns, and of written entries, of one matrix. */
export const MAX_DIMENSION = 20_000;
export const MAX_ENTRIES = 4_000_000;
