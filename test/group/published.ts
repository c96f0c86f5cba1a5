/** The published tables of data/character-tables.json, with generators for those groups that are named only. */
import { readFileSync } from 'node:fs';
import type { CyclotomicField } from '../../src/field/cyclotomic.ts';
import type { Algebraic } from '../../src/field/number-field.ts';
import * as make from './permutations.ts';

export interface PublishedTable {
  readonly name: string;
  readonly symbol?: string;
  readonly order: number;
  readonly sizes: readonly number[];
  readonly orders: readonly number[];
  readonly degrees: readonly number[];
  readonly indicators: readonly number[];
  readonly characters: readonly string[];
  /** Real irreducibles of real, complex, quaternionic type. */
  readonly realTypes: readonly [number, number, number];
  readonly generators?: readonly (readonly (readonly number[])[])[];
}

const file = new URL('./data/character-tables.json', import.meta.url);
export const publishedTables = (JSON.parse(readFileSync(file, 'utf8')) as { groups: PublishedTable[] }).groups;

const named: Readonly<Record<string, () => make.Generators>> = {
  I: make.icosahedral,
  Ih: make.coxeterH3,
  '2T': () => make.special(3),
  '2I': () => make.special(5),
  'C7:C3': make.frobenius21,
  C4xC2: () => make.disjoint(make.cyclic(4), make.cyclic(2)),
  He3: make.heisenberg,
  Q8xC3: () => make.disjoint(make.quaternion(), make.cyclic(3)),
  'Q8oQ8=2^{1+4}_+': make.extraspecialPlus,
};

export function generatorsOf(t: PublishedTable): make.Generators {
  if (t.generators !== undefined) return make.matrices(t.generators);
  const family = /^(C|D|Dic|S|A)(\d+)$/.exec(t.name);
  if (named[t.name] !== undefined) return named[t.name]!();
  const n = Number(family?.[2]);
  switch (family?.[1]) {
    case 'C':
      return make.cyclic(n);
    case 'D':
      return make.dihedral(n);
    case 'Dic':
      return make.dicyclic(n);
    case 'S':
      return make.symmetric(n);
    case 'A':
      return make.alternating(n);
    default:
      throw new Error(`no generators for ${t.name}`);
  }
}

/** `[ 1, -E(5)-E(5)^4, 2*E(3) ]` in a cyclotomic field. */
export function parseRow(text: string, field: CyclotomicField): Algebraic[] {
  return text
    .slice(1, -1)
    .split(',')
    .map((value) => {
      const terms = value.replaceAll(' ', '').match(/[+-]?(?:\d+\*)?E\(\d+\)(?:\^\d+)?|[+-]?\d+/g);
      if (terms === null || terms.join('') !== value.replaceAll(' ', '')) throw new Error(`cannot read ${value}`);
      return terms.reduce((sum, term) => field.add(sum, parseTerm(term, field)), field.zero);
    });
}

function parseTerm(term: string, field: CyclotomicField): Algebraic {
  const m = /^([+-]?)(?:(\d+)\*)?E\((\d+)\)(?:\^(\d+))?$/.exec(term);
  if (m === null) return field.fromInteger(Number(term));
  const coefficient = field.fromInteger(Number(`${m[1]}${m[2] ?? 1}`));
  return field.mul(coefficient, field.root((field.conductor / Number(m[3])) * Number(m[4] ?? 1)));
}

/**
 * Whether two tables (rows of keys) agree after permuting rows, and columns of equal label:
 * columns are matched one by one, and the multisets of row beginnings must agree at each step.
 */
export function sameTable(
  a: readonly (readonly string[])[],
  labelsA: readonly string[],
  b: readonly (readonly string[])[],
  labelsB: readonly string[],
): boolean {
  const n = labelsA.length;
  const used = new Array<boolean>(n).fill(false);
  const match = (c: number, startA: readonly string[], startB: readonly string[]): boolean => {
    if (c === n) return true;
    const nextA = startA.map((s, i) => `${s}|${a[i]![c]}`);
    const sortedA = nextA.toSorted().join(';');
    for (let d = 0; d < n; d++) {
      if (used[d] || labelsA[c] !== labelsB[d]) continue;
      const nextB = startB.map((s, i) => `${s}|${b[i]![d]}`);
      if (nextB.toSorted().join(';') !== sortedA) continue;
      used[d] = true;
      if (match(c + 1, nextA, nextB)) return true;
      used[d] = false;
    }
    return false;
  };
  return (
    labelsB.length === n &&
    a.length === b.length &&
    match(
      0,
      a.map(() => ''),
      b.map(() => ''),
    )
  );
}
