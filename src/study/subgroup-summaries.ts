/** The same event in the class of every subgroup up to conjugacy. */
import type { Action, SymplecticPart } from '../action/index.ts';
import { LimitError } from '../errors/index.ts';
import { type EventBlock, eventCharacters, subgroupCodimensions } from '../event/subgroup-codimension.ts';
import { motionOf } from '../event/zero-event.ts';
import { isPrime } from '../field/index.ts';
import { isSubconjugate, type SubgroupClass, subgroupClasses } from '../group/index.ts';
import { hessianOf, type LinearStudy } from './linear-study.ts';
import { type SliceStudy, sliceSubgroups } from './neutral-slice.ts';
import type { SubgroupSummary } from './result.ts';

/** Subgroups of larger groups are not enumerated. */
export const SUBGROUP_ORDER_LIMIT = 2000;

/**
 * The same event in the class of every subgroup up to conjugacy, by order; counts[j] blocks of size j on the multiplicity space
 * of each block of the flow.
 */
export function subgroupSummaries(
  action: Action,
  part: SymplecticPart['part'],
  blocks: readonly { readonly block: EventBlock; readonly counts: readonly number[] }[],
  semisimple: boolean,
): SubgroupSummary[] {
  const characters = eventCharacters(action, part, blocks);
  const words = elementWords(action);
  const classes = subgroupsOf(action);
  const covers = coveringClasses(action, classes);
  return subgroupCodimensions(action, classes, characters).map((x, i) => ({
    order: x.order,
    reversing: x.reversing,
    conjugates: x.conjugates,
    codimension: x.codimension,
    motion: motionOf(x.codimension, semisimple),
    generators: x.generators.map(words),
    ...(covers === undefined ? {} : { coveredBy: covers[i]! }),
  }));
}

/** For each class the numbers of those next above it, up to conjugacy; undefined where there are too many to be drawn. */
function coveringClasses(action: Action, classes: readonly SubgroupClass[]): number[][] | undefined {
  if (classes.length > COVER_CLASSES) return undefined;
  const above = classes.map((a, i) =>
    classes.flatMap((b, j) => (j !== i && b.order > a.order && b.order % a.order === 0 && isSubconjugate(action.group, a, b) ? [j] : [])),
  );
  return above.map((list) => list.filter((j) => !list.some((k) => above[k]!.includes(j))));
}

/** Inclusions among more classes of subgroups than this are not worked out. */
const COVER_CLASSES = 60;

/** The same where continuous symmetries fix the equilibrium: they are kept under every subgroup. */
export function continuousSubgroups(study: LinearStudy, slicing: SliceStudy): SubgroupSummary[] {
  const { action, event } = study;
  const classes = subgroupsOf(action);
  const words = elementWords(action);
  const codimensions = sliceSubgroups(slicing, event, classes, hessianOf(study));
  return classes.map((h, i) => ({
    order: h.order,
    reversing: h.elements.reduce((n, e) => n + (action.signs[e] === -1 ? 1 : 0), 0),
    conjugates: h.conjugates,
    codimension: codimensions[i]!,
    motion: motionOf(codimensions[i]!, event.semisimple),
    generators: h.generators.map(words),
  }));
}

/** A remark where only 1 and Γ are listed though there are others: a group with no other subgroups has prime order. */
export function subgroupRemark(order: number, listed: number): string | undefined {
  if (listed !== 2 || isPrime(order)) return undefined;
  return `The group of order ${order} has too many subgroups to be listed: only the trivial one and the whole group are.`;
}

/** All classes of subgroups, or only 1 and Γ where there are too many. */
function subgroupsOf(action: Action): SubgroupClass[] {
  const { group } = action;
  const whole: SubgroupClass = {
    order: group.order,
    elements: Int32Array.from({ length: group.order }, (_, i) => i),
    generators: [...new Set(group.generators)],
    conjugates: 1,
  };
  const trivial: SubgroupClass = { order: 1, elements: Int32Array.of(0), generators: [], conjugates: 1 };
  if (group.order === 1) return [trivial];
  if (group.order > SUBGROUP_ORDER_LIMIT) return [trivial, whole];
  try {
    return subgroupClasses(group);
  } catch (error) {
    if (!(error instanceof LimitError)) throw error;
    return [trivial, whole];
  }
}

/** An element as a word in the generators, rightmost first to act. */
export function elementWords(action: Action): (element: number) => string {
  const { group } = action;
  return (element) => {
    const letters: string[] = [];
    for (let i = element; i !== 0; i = group.parent[i]!) letters.push(action.generators[group.via[i]!]!.name);
    const out: string[] = [];
    for (let i = 0; i < letters.length; ) {
      let j = i;
      while (j < letters.length && letters[j] === letters[i]) j++;
      out.push(j - i > 1 ? `${letters[i]}^${j - i}` : letters[i]!);
      i = j;
    }
    return out.length === 0 ? '1' : out.join(' ');
  };
}
