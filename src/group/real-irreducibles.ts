/**
 * Real irreducibles from the complex ones: chi itself (indicator 1), chi + conj chi (0) or 2 chi (-1);
 * the commuting algebra is R, C or H. J.-P. Serre, Linear Representations of Finite Groups, 1977,
 * section 13.2 (place from memory). Also what a sign homomorphism sigma does to them.
 */
import { InputError } from '../errors/errors.ts';
import type { Algebraic } from '../field/number-field.ts';
import { type CharacterTable, rowFinder } from './characters.ts';
import type { FiniteGroup } from './group.ts';
import { inverseModulo, reduce } from './modular.ts';

export type RealType = 'real' | 'complex' | 'quaternionic';

export interface RealIrreducible {
  readonly index: number;
  /** Numbers of its distinct complex constituents: one, or a conjugate pair. */
  readonly complex: readonly number[];
  /** Dimension over R. */
  readonly dimension: number;
  /** Dimension of the commuting algebra. */
  readonly beta: 1 | 2 | 4;
  readonly type: RealType;
  /** Values on the classes, in the field of the table (all real). */
  readonly character: readonly Algebraic[];
  /** The same in floating point. */
  readonly values: Float64Array;
  /** The same modulo the prime of the table. */
  readonly residues: Int32Array;
}

/** In the order of the table, each conjugate pair at the place of its first member; number 0 is trivial. */
export function realIrreducibles(group: FiniteGroup, table: CharacterTable): RealIrreducible[] {
  if (group.order !== table.order || group.classes.length !== table.classSizes.length)
    throw new RangeError('the character table belongs to another group');
  const { field, prime } = table;
  const out: RealIrreducible[] = [];
  table.degrees.forEach((degree, i) => {
    const j = table.conjugate[i]!;
    if (j < i) return;
    const row = table.values[i]!;
    const real = table.real[i]!;
    const residues = table.residues[i]!;
    const indicator = table.indicators[i]!;
    const index = out.length;
    if (indicator === 1)
      out.push({ index, complex: [i], dimension: degree, beta: 1, type: 'real', character: row, values: real, residues });
    else {
      const other = table.values[j]!;
      out.push({
        index,
        complex: indicator === 0 ? [i, j] : [i],
        dimension: 2 * degree,
        beta: indicator === 0 ? 2 : 4,
        type: indicator === 0 ? 'complex' : 'quaternionic',
        character: row.map((x, c) => field.add(x, other[c]!)),
        values: real.map((x) => 2 * x),
        residues: residues.map((x, c) => reduce(x + table.residues[j]![c]!, prime)),
      });
    }
  });
  return out;
}

/**
 * Multiplicities of the real irreducibles from those of the complex ones in a real representation.
 * Throws InputError if they do not belong to a real representation.
 */
export function realMultiplicities(reals: readonly RealIrreducible[], complex: readonly number[]): number[] {
  return reals.map((k) => {
    const m = complex[k.complex[0]!]!;
    const odd = k.type === 'quaternionic' && m % 2 !== 0;
    if (m < 0 || odd || k.complex.some((i) => complex[i] !== m))
      throw new InputError('a character does not belong to a real representation', {
        value: `multiplicities ${k.complex.map((i) => complex[i]).join(', ')} of the complex irreducibles ${k.complex.join(', ')}`,
        expected: k.type === 'quaternionic' ? 'an even multiplicity' : 'equal multiplicities of conjugates, none negative',
      });
    return k.type === 'quaternionic' ? m / 2 : m;
  });
}

/** For each real irreducible K the index of K tensor sigma; `sigma` has one entry for each class. */
export function twists(table: CharacterTable, reals: readonly RealIrreducible[], sigma: Int8Array): number[] {
  const { prime } = table;
  const find = rowFinder(
    reals.map((k) => k.residues),
    prime,
  );
  return reals.map((k) => {
    const i = find(k.residues.map((x, c) => (sigma[c] === 1 || x === 0 ? x : prime - x)));
    if (i < 0) throw new InputError('the signs are not a homomorphism: an irreducible times the sign is no irreducible');
    return i;
  });
}

/**
 * s(K) = (1/2|G|) sum sigma(g) (chi(g)^2 - chi(g^2)), the number of sigma-twisted invariant skew forms
 * on K (0 to 3); `sigma` has one entry for each class.
 */
export function carriedForms(table: CharacterTable, k: RealIrreducible, sigma: Int8Array): number {
  const { prime: p, classSizes, powers } = table;
  let sum = 0;
  for (let c = 0; c < classSizes.length; c++) {
    const row = powers[c]!;
    const x = k.residues[c]!;
    const y = k.residues[row[2 % row.length]!]!;
    const term = reduce(reduce(x * x + (p - y), p) * classSizes[c]!, p);
    sum = reduce(sum + (sigma[c] === 1 ? term : p - term), p);
  }
  const s = reduce(sum * inverseModulo((2 * table.order) % p, p), p);
  if (s > 3) throw new InputError('the signs are not a homomorphism: the count of skew forms is no small integer');
  return s;
}
