/** The last step for files and options alike: clashes of names, parameters without values, defaults; then it is frozen. */
import { InputError } from '../../errors/index.ts';
import type { Declaration } from './declaration.ts';
import { didYouMean, listed } from './nearest.ts';
import { numberedFamilies, usedNames } from './texts.ts';

/** A declaration whose `unset` and `parameterCount` are still to be found. */
export type Draft = Omit<Declaration, 'unset' | 'parameterCount'> & {
  /** Parameters declared without a value. */
  readonly empty: readonly string[];
  readonly parameterCount?: number;
};

/** How a source is called in messages. */
export function sourceLabel(source: string): string {
  return source === '-' ? 'standard input' : source;
}

function clash(draft: Draft, name: string, first: string, second: string): InputError {
  return new InputError(`${name} is both ${first} and ${second}.`, {
    file: sourceLabel(draft.source),
    value: name,
    expected: 'one meaning for each name',
    next: 'rename one of them',
  });
}

function assertDistinct(draft: Draft): void {
  const meaning = new Map<string, string>();
  const claim = (names: Iterable<string>, what: string): void => {
    for (const name of names) {
      const before = meaning.get(name);
      if (before !== undefined) throw clash(draft, name, before, before === what ? 'another' : what);
      meaning.set(name, what);
    }
  };
  claim(draft.coordinates, 'a coordinate');
  claim(draft.momenta, 'a momentum');
  claim([...new Set([...draft.parameters.keys(), ...draft.empty])], 'a parameter');
  claim(draft.define.keys(), 'a definition');
}

/** The parameter of numbered files is declared: a slip in its name must not make a second parameter. */
function assertNumbered(draft: Draft): void {
  const declared = new Set([...draft.parameters.keys(), ...draft.empty, ...draft.vary]);
  for (const { parameter, where } of numberedFamilies(draft.energy))
    if (!declared.has(parameter))
      throw new InputError(`${where} has files numbered by ${parameter}, which is no parameter.${didYouMean(parameter, declared)}`, {
        file: sourceLabel(draft.source),
        key: `${where}.parameter`,
        value: parameter,
        expected: declared.size === 0 ? 'a name under parameters or vary' : `one of ${listed(declared)}`,
        next: `add vary: [${parameter}], or a value under parameters`,
      });
}

/**
 * Checks the draft as a whole and completes it. A name in an expression that is nothing declared becomes a
 * parameter without a value: commands that need values ask for it. Throws InputError on clashing names and on
 * `vary` or `range` naming something that no expression uses.
 */
export function complete(draft: Draft): Declaration {
  assertDistinct(draft);
  assertNumbered(draft);
  const phase = new Set([...draft.coordinates, ...draft.momenta]);
  const used = usedNames(draft);
  const known = new Set([...draft.parameters.keys(), ...draft.empty]);
  for (const name of used) if (!phase.has(name) && !draft.define.has(name)) known.add(name);
  for (const [key, names] of [
    ['vary', draft.vary],
    ['range', [...draft.range.keys()]],
  ] as const) {
    for (const name of names) {
      if (known.has(name)) continue;
      const what = phase.has(name)
        ? `${name} is a coordinate, not a parameter.`
        : draft.define.has(name)
          ? `${name} is a definition, not a parameter.`
          : `There is no parameter ${name}.`;
      const options = draft.source === 'options';
      throw new InputError(`${what}${didYouMean(name, known)}`, {
        file: sourceLabel(draft.source),
        key: options ? `--${key}` : key,
        value: name,
        expected: known.size === 0 ? 'a parameter; the model has none' : `one of ${listed(known)}`,
        next: options ? `give it a value with --set ${name}=0 or use it in an expression` : `add it to parameters or correct the name`,
      });
    }
  }
  const { empty: _, parameterCount, ...rest } = draft;
  return Object.freeze({
    ...rest,
    unset: [...known].filter((name) => !draft.parameters.has(name)),
    parameterCount: parameterCount ?? Math.max(1, draft.vary.length),
  });
}
