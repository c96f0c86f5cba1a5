/** Numerical reading of entry texts, and groups of floating matrices, independent of the exact route. */
import type { CatalogueAction, CatalogueGroup } from '../../src/group/catalogue.ts';
import { closeGroup } from '../../src/group/closure.ts';
import type { FiniteGroup } from '../../src/group/group.ts';

export type Numbers = readonly (readonly number[])[];

const FUNCTIONS: Readonly<Record<string, (x: number) => number>> = { cos: Math.cos, sin: Math.sin, tan: Math.tan, sqrt: Math.sqrt };

/** Value of a text made of numbers, pi, + - * / ^, parentheses, cos, sin, tan, sqrt. */
export function evaluate(text: string): number {
  const tokens = text.match(/\d+(?:\.\d+)?|[a-z]+|\S/g) ?? [];
  let at = 0;
  const atom = (): number => {
    const token = tokens[at++]!;
    if (/^\d/.test(token)) return Number(token);
    if (token === 'pi') return Math.PI;
    if (token === '-') return -factor();
    const apply = FUNCTIONS[token];
    if (apply !== undefined) return apply(atom());
    if (token !== '(') throw new Error(`unexpected ${token} in ${text}`);
    const value = sum();
    at++;
    return value;
  };
  const factor = (): number => {
    const base = atom();
    if (tokens[at] !== '^') return base;
    at++;
    return base ** atom();
  };
  const product = (): number => {
    let value = factor();
    while (tokens[at] === '*' || tokens[at] === '/') value = tokens[at++] === '*' ? value * factor() : value / factor();
    return value;
  };
  const sum = (): number => {
    let value = product();
    while (tokens[at] === '+' || tokens[at] === '-') value = tokens[at++] === '+' ? value + product() : value - product();
    return value;
  };
  const value = sum();
  if (at !== tokens.length) throw new Error(`${text} goes on after ${tokens.slice(0, at).join(' ')}`);
  return value;
}

export const numbers = (rows: readonly (readonly string[])[]): Numbers => rows.map((row) => row.map(evaluate));

/** Matrices of all generators, in their order. */
export const generatorNumbers = (action: CatalogueAction, generators: readonly string[]): Numbers[] =>
  generators.map((g) => numbers(action.matrices.get(g)!));

export const apply = (m: Numbers, x: readonly number[]): number[] => m.map((row) => row.reduce((s, a, j) => s + a * x[j]!, 0));

/** A text that agrees for vectors equal up to rounding; the shift keeps exact zeros and halves off the rounding edge. */
const keyOf = (x: readonly number[]): string => x.map((a) => Math.round((a + 1.234567e-3) * 1e5)).join(',');
export const matrixKey = (m: Numbers): string => keyOf(m.flat());

/** Images of the seeds under the group of these matrices. */
export function orbit(generators: readonly Numbers[], seeds: readonly (readonly number[])[]): number[][] {
  const found = new Map(seeds.map((x) => [keyOf(x), [...x]]));
  const queue = [...found.values()];
  for (let x = queue.pop(); x !== undefined; x = queue.pop())
    for (const g of generators) {
      const y = apply(g, x);
      const key = keyOf(y);
      if (!found.has(key)) {
        found.set(key, y);
        queue.push(y);
      }
    }
  return [...found.values()];
}

export const unit = (d: number): Numbers => Array.from({ length: d }, (_, i) => Array.from({ length: d }, (_, j) => (i === j ? 1 : 0)));

export const times = (a: Numbers, b: Numbers): Numbers =>
  a.map((row) => b[0]!.map((_, j) => row.reduce((s, x, k) => s + x * b[k]![j]!, 0)));

export const transpose = (a: Numbers): Numbers => (a[0] ?? []).map((_, j) => a.map((row) => row[j]!));

export function directSum(a: Numbers, b: Numbers): Numbers {
  return [...a.map((row) => [...row, ...b.map(() => 0)]), ...b.map((row) => [...a.map(() => 0), ...row])];
}

/** All elements of a small matrix group by their keys. */
export function elements(generators: readonly Numbers[]): Map<string, Numbers> {
  const d = generators[0]!.length;
  const found = new Map([[matrixKey(unit(d)), unit(d)]]);
  const queue = [unit(d)];
  for (let x = queue.pop(); x !== undefined; x = queue.pop())
    for (const g of generators) {
      const y = times(g, x);
      if (!found.has(matrixKey(y))) {
        found.set(matrixKey(y), y);
        queue.push(y);
      }
    }
  return found;
}

/** The group of these matrices as permutations of the orbits of the coordinate vectors, which span: a faithful action. */
export function asPermutationGroup(generators: readonly Numbers[]): FiniteGroup {
  const points = orbit(generators, unit(generators[0]!.length));
  const number = new Map(points.map((x, i) => [keyOf(x), i]));
  return closeGroup(
    generators.map((g) => Int32Array.from(points, (x) => number.get(keyOf(apply(g, x)))!)),
    points.length,
    20_000,
  );
}

/** Matrices of all declared actions side by side: faithful if any of them is, a homomorphic image of the group in any case. */
export function jointMatrices(group: CatalogueGroup): Numbers[] {
  const each = [...group.actions.values()].map((a) => generatorNumbers(a, group.generators));
  return group.generators.map((_, k) => each.map((m) => m[k]!).reduce(directSum));
}
