/** Words and small phrases that several sections share. */

import type { InertiaSummary, Motion, Value } from '../../study/result.ts';
import { type Inline, type Line, math } from '../document.ts';
import { type Formula, formula, label, labels, list, numberText } from '../mathematics/index.ts';

/** The number with its noun. */
export const count = (n: number, one: string, many = `${one}s`): string => `${n} ${n === 1 ? one : many}`;

export const yesNo = (value: boolean): string => (value ? 'yes' : 'no');

/** A number or an exact text as a formula. */
export const value = (v: Value): Inline => math(formula(v));

/** An integer, in the type of formulas. */
export const integer = (n: number): Inline => math(formula(n));

/** A dash for what is not known or does not apply. */
export const DASH: Line = ['–'];

export const orDash = (v: Value | null | undefined): Line => (v === null || v === undefined ? DASH : [value(v)]);

/** A partition such as [2, 2]. */
export const partition = (parts: readonly number[]): Inline =>
  math(
    list(
      parts.map((p) => formula(p)),
      '[',
      ']',
    ),
  );

/** Labels of components, side by side. */
export const components = (names: readonly string[]): Line =>
  names.length === 0 ? DASH : names.length === 1 ? [math(label(names[0]!))] : [math(labels(names))];

/** The numbers of positive, vanishing and negative squares. */
export const inertia = (i: InertiaSummary | readonly number[]): Inline => {
  const parts = Array.isArray(i)
    ? (i as readonly number[])
    : [(i as InertiaSummary).positive, (i as InertiaSummary).zero, (i as InertiaSummary).negative];
  return math(list(parts.map((p) => formula(p))));
};

/** A pair of counts, as in a signature. */
export const pair = (p: readonly [number, number]): Inline => math(list(p.map((n) => formula(n))));

const MOTIONS: Readonly<Record<Motion, string>> = {
  passes: 'the eigenvalues pass through zero along the imaginary axis',
  splits: 'the eigenvalues leave the imaginary axis and split along the real axis',
  degenerate: 'the motion of the eigenvalues is not one of the two generic ones',
};
export const motionSentence = (motion: Motion): string => MOTIONS[motion];

/** A number of parameters in words. */
export const inParameters = (n: number): string => `in ${n === 1 ? 'one parameter' : `${numberText(n)} parameters`}`;

/** Expressions with commas between them. */
export const sideBySide = (texts: readonly string[]): Inline =>
  math(
    list(
      texts.map((text) => formula(text)),
      '',
      '',
    ),
  );

/** As many items from the beginning as have no more than `budget` signs together; at least one. */
export function within<T>(items: readonly T[], length: (item: T) => number, budget: number): readonly T[] {
  let total = 0;
  const end = items.findIndex((item) => (total += length(item)) > budget);
  return end < 0 ? items : items.slice(0, Math.max(1, end));
}

/** An element of the group as a word in the generators, such as r^2 s. */
export function groupElement(word: string): Formula {
  const product = formula(word.trim().replace(/\s+/g, '*'));
  return product.tree.kind === 'words' ? formula(word) : { ...product, text: word };
}
