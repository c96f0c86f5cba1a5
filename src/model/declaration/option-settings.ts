/** Options that settle how a model is studied; they stand beside a model file or beside a model declared by options. */
import type { Declaration, RangeDeclaration } from './declaration.ts';
import { all, assignment, count, nameList, type OptionUse, rangeOf, single, splitList, usage } from './option-values.ts';

/** What the setting options say. */
export interface Settings {
  readonly values: ReadonlyMap<string, string>;
  readonly vary: readonly string[] | undefined;
  readonly define: ReadonlyMap<string, string>;
  readonly range: ReadonlyMap<string, RangeDeclaration>;
  readonly rest: Partial<Pick<Declaration, 'degree' | 'codimension' | 'orderLimit' | 'tolerance' | 'parameterCount'>> & {
    timeReversal?: true;
    numbers?: 'floating';
    neutralFind?: true;
  };
}

export function settingsOf(uses: readonly OptionUse[]): Settings {
  const values = new Map<string, string>();
  for (const value of all(uses, 'set')) {
    for (const part of splitList(value)) {
      const [name, text] = assignment('set', part, 'mu=0');
      if (values.has(name)) throw usage('set', part, `${name} is set twice.`, 'one value for each parameter', 'remove one of them');
      values.set(name, text);
    }
  }
  const define = new Map<string, string>();
  for (const value of all(uses, 'define')) {
    const [name, text] = assignment('define', value, 'd=q1-q2');
    if (define.has(name)) throw usage('define', value, `${name} is defined twice.`, 'one definition for each name', 'remove one of them');
    define.set(name, text);
  }
  const varied = all(uses, 'vary');
  const range = new Map<string, RangeDeclaration>();
  for (const value of all(uses, 'range')) range.set(...rangeOf(value));
  const neutral = single(uses, 'neutral');
  if (neutral !== undefined && neutral !== 'find')
    throw usage('neutral', neutral, '--neutral knows one value.', 'find', 'write --neutral find, or declare the fields in a model file');
  const tolerance = single(uses, 'tolerance');
  if (tolerance !== undefined && (tolerance.trim() === '' || !(Number(tolerance) > 0 && Number.isFinite(Number(tolerance))))) {
    throw usage('tolerance', tolerance, '--tolerance needs a positive number.', 'a positive number', 'write --tolerance 1e-9');
  }
  const number = (name: string, least: number): number | undefined => {
    const value = single(uses, name);
    return value === undefined ? undefined : count(name, value, least);
  };
  const [degree, codimension, orderLimit, parameterCount] = [
    number('degree', 1),
    number('codimension', 0),
    number('order-limit', 1),
    number('parameters', 0),
  ];
  return {
    values,
    vary: varied.length === 0 ? undefined : [...new Set(varied.flatMap((value) => nameList('vary', value)))],
    define,
    range,
    rest: {
      ...(degree === undefined ? {} : { degree }),
      ...(codimension === undefined ? {} : { codimension }),
      ...(orderLimit === undefined ? {} : { orderLimit }),
      ...(parameterCount === undefined ? {} : { parameterCount }),
      ...(tolerance === undefined ? {} : { tolerance }),
      ...(uses.some(({ name }) => name === 'time-reversal') ? { timeReversal: true as const } : {}),
      ...(uses.some(({ name }) => name === 'floating') ? { numbers: 'floating' as const } : {}),
      ...(neutral === 'find' ? { neutralFind: true as const } : {}),
    },
  };
}
