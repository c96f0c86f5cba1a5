/** Determinants of the blocks of S in factors, and where they vanish. */
import type { ComponentSummary, ThresholdSummary } from '../../study/result.ts';
import { type Block, type Line, math, paragraph } from '../document.ts';
import { formula, label, latexLabel, relation, sign } from '../mathematics/index.ts';

/** Determinants longer than so many signs are left to the JSON result. */
const PRINTED_LENGTH = 3000;
/** A longer name is no index. */
const LONGEST_INDEX = 24;

/** A list of the determinants that are not plain numbers; nothing where there are none. */
export function determinantBlocks(list: readonly ComponentSummary[]): readonly Block[] {
  const items = list.flatMap((c) => (c.determinant === undefined || isNumber(c.determinant) ? [] : [itemOf(c, c.determinant)]));
  if (items.length === 0) return [];
  return [paragraph('Determinants of the blocks of ', math(formula('S')), ' in factors, and where they vanish:'), { kind: 'list', items }];
}

/** Whether a determinant holds no parameter; one that vanishes identically is worth a line. */
const isNumber = (text: string): boolean => text !== '0' && !/[\p{L}_]/u.test(text.replace(/\b(?:sqrt|sin|cos|tan|pi)\b/g, ''));

function itemOf(c: ComponentSummary, determinant: string): Line {
  if (determinant === '0') return ['the block of ', math(label(c.label)), ' is singular for all values of the parameters'];
  const index = c.label.length > LONGEST_INDEX ? '' : `_{${latexLabel(c.label)}}`;
  const name = sign(`det S on ${c.label}`, `\\det S${index}`, 3 + Math.min(c.label.length, LONGEST_INDEX) * 0.4);
  const head: Line =
    determinant.length > PRINTED_LENGTH
      ? [math(name), ' is too long to be printed; the JSON result has it']
      : [math(relation(name, '=', formula(determinant)))];
  const [crossed, touched] = [true, false].map((change) => (c.thresholds ?? []).filter((t) => t.signChange === change)) as [
    ThresholdSummary[],
    ThresholdSummary[],
  ];
  const parts: Line[] = [];
  if (crossed.length > 0) parts.push(['changes sign at ', ...places(crossed, determinant)]);
  if (touched.length > 0) parts.push(['touches zero at ', ...places(touched, determinant)]);
  return [...head, ...parts.flatMap((part, i): Line => [i === 0 ? '; ' : ' and ', ...part])];
}

function places(list: readonly ThresholdSummary[], determinant: string): Line {
  return list.flatMap((t, i): Line => [...(i === 0 ? [] : [', ']), ...place(t, determinant)]);
}

function place(t: ThresholdSummary, determinant: string): Line {
  const name = formula(t.parameter);
  if (t.exact !== null) {
    const exact = math(relation(name, '=', formula(t.exact)));
    if (t.value === null || /^-?\d+$/.test(t.exact)) return [exact];
    return [exact, ' ', math(sign('~', '\\approx', 1)), ' ', math(formula(t.value))];
  }
  // what the determinant shows already is not repeated
  if (t.value === null && t.polynomial !== undefined && determinant.includes(t.polynomial))
    return ['zeros in ', math(name), ' that have no closed form'];
  const condition = t.polynomial === undefined ? [] : [math(formula(t.polynomial))];
  if (t.value === null) return ['the roots of ', ...condition, ' in ', math(name)];
  return [math(relation(name, '~', formula(t.digits ?? t.value))), ', a root of ', ...condition];
}
