/** Inner products of class functions with the irreducible characters, and multiplicities. */
import { InputError } from '../errors/errors.ts';
import type { Algebraic } from '../field/number-field.ts';
import { type Rational, rational } from '../field/rational.ts';
import type { CharacterTable } from './characters.ts';
import { inverseModulo, reduce } from './modular.ts';

/** (1/|G|) sum f(g) conj(h(g)) for class functions with values in the field of the table (one entry for each class). */
export function innerProduct(table: CharacterTable, f: readonly Algebraic[], h: readonly Algebraic[]): Algebraic {
  const { field } = table;
  let sum = field.zero;
  table.classSizes.forEach((size, c) => {
    if (field.isZero(f[c]!) || field.isZero(h[c]!)) return;
    sum = field.add(sum, field.mul(field.fromInteger(size), field.mul(f[c]!, field.conj(h[c]!))));
  });
  return field.div(sum, field.fromInteger(table.order));
}

/** (1/|G|) sum f(g) h(g) for integer class functions. */
export function integerInnerProduct(table: CharacterTable, f: readonly number[], h: readonly number[]): Rational {
  let sum = 0n;
  table.classSizes.forEach((size, c) => {
    sum += BigInt(size) * BigInt(f[c]!) * BigInt(h[c]!);
  });
  return rational(sum, BigInt(table.order));
}

/**
 * Multiplicities of the irreducibles in a (virtual) character given on the classes: as exact values in
 * the field of the table, as integers, or as real floating values (a trace, good to about 1e-7).
 * Throws InputError if the function is not an integer combination of irreducible characters.
 */
export function decompose(table: CharacterTable, f: readonly Algebraic[] | readonly number[]): number[] {
  if (f.length !== table.classSizes.length)
    throw new InputError('a class function needs one value for each conjugacy class', {
      value: `${f.length} values`,
      expected: `${table.classSizes.length} values`,
    });
  if (f.every((x) => typeof x === 'number')) return f.every(Number.isSafeInteger) ? decomposeInteger(table, f) : decomposeFloat(table, f);
  return decomposeExact(table, f as readonly Algebraic[]);
}

/** One modular sum for each irreducible while multiplicities stay below half the prime, then an exact check. */
function decomposeInteger(table: CharacterTable, f: readonly number[]): number[] {
  const { prime: p, classSizes, residues, order, degrees } = table;
  const largest = f.reduce((m, x) => Math.max(m, Math.abs(x)), 0);
  if (largest * degrees.at(-1)! >= p / 2) {
    const { field } = table;
    return decomposeExact(
      table,
      f.map((x) => field.fromInteger(x)),
    );
  }
  const inverseOrder = inverseModulo(order % p, p);
  const weights = classSizes.map((size, c) => reduce((f[c]! < 0 ? f[c]! + p : f[c]!) * (size % p), p));
  const multiplicities = residues.map((row) => {
    let sum = 0;
    // the conjugate of a character is its value at the inverse class
    for (let c = 0; c < weights.length; c++) sum = reduce(sum + weights[c]! * row[table.inverseClass[c]!]!, p);
    const m = reduce(sum * inverseOrder, p);
    return m > p / 2 ? m - p : m;
  });
  const { field } = table;
  verify(table, multiplicities, (c) => field.fromInteger(f[c]!));
  return multiplicities;
}

function decomposeFloat(table: CharacterTable, f: readonly number[]): number[] {
  const { classSizes, order } = table;
  return table.real.map((row, i) => {
    let re = 0;
    let im = 0;
    const imaginary = table.imaginary[i]!;
    for (let c = 0; c < classSizes.length; c++) {
      re += classSizes[c]! * f[c]! * row[c]!;
      im -= classSizes[c]! * f[c]! * imaginary[c]!;
    }
    const m = Math.round(re / order);
    if (!(Math.abs(re / order - m) < 1e-3 && Math.abs(im / order) < 1e-3))
      throw notACharacter(`multiplicity ${re / order} of irreducible ${i}`);
    return m;
  });
}

function decomposeExact(table: CharacterTable, f: readonly Algebraic[]): number[] {
  const { field } = table;
  return table.values.map((row, i) => {
    const q = field.toRational(innerProduct(table, f, row));
    if (q === undefined || q.d !== 1n) throw notACharacter(`multiplicity of irreducible ${i} not an integer`);
    return Number(q.n);
  });
}

/** sum of m_i chi_i equals f, as sums of roots of unity. */
function verify(table: CharacterTable, multiplicities: readonly number[], f: (c: number) => Algebraic): void {
  const { field } = table;
  const used = multiplicities.flatMap((m, i) => (m === 0 ? [] : [i]));
  for (let c = 0; c < table.classSizes.length; c++) {
    const powers = new Array<number>(field.conductor).fill(0);
    for (const i of used) {
      const { exponents, multiplicities: weights } = table.eigenvalues(i, c);
      exponents.forEach((k, q) => {
        powers[k] = powers[k]! + multiplicities[i]! * weights[q]!;
      });
    }
    if (!field.equal(field.fromPowers(powers), f(c))) throw notACharacter(`value at class ${c}`);
  }
}

function notACharacter(value: string): InputError {
  return new InputError('a class function is not an integer combination of irreducible characters', {
    value,
    expected: 'the character of a representation of the group',
  });
}
