/** The value of a constant expression in double precision. */
import { compileNumeric, type Expression } from './expression/index.ts';

/** `values` are those of the names. NaN or infinite outside the domain. */
export function numericValue(e: Expression, values: ReadonlyMap<string, number>): number {
  const names = [...values.keys()];
  return compileNumeric(e, names)(names.map((n) => values.get(n)!));
}
