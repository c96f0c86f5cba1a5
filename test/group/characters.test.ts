import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputError, LimitError } from '../../src/errors/errors.ts';
import { CyclotomicField } from '../../src/field/cyclotomic.ts';
import { type CharacterTable, characterTable } from '../../src/group/characters.ts';
import { decompose, innerProduct, integerInnerProduct } from '../../src/group/decompose.ts';
import type { FiniteGroup } from '../../src/group/group.ts';
import { realIrreducibles } from '../../src/group/real-irreducibles.ts';
import * as make from './permutations.ts';
import { generatorsOf, parseRow, publishedTables, sameTable } from './published.ts';

/** Exact orthogonality of rows, conjugates, squares, in the field of the table. */
function checkTable(group: FiniteGroup, table: CharacterTable): void {
  const { field } = table;
  expect(table.degrees.reduce((s, d) => s + d * d, 0)).toBe(group.order);
  expect(table.values[0]!.every((x) => field.equal(x, field.one))).toBe(true);
  table.values.forEach((row, i) => {
    expect(field.equal(row[0]!, field.fromInteger(table.degrees[i]!))).toBe(true);
    for (let j = 0; j <= i; j++) expect(field.format(innerProduct(table, row, table.values[j]!))).toBe(i === j ? '1' : '0');
    row.forEach((x, c) => {
      expect(field.equal(field.conj(x), table.values[table.conjugate[i]!]![c]!)).toBe(true);
      expect(field.equal(field.conj(x), row[group.classes[c]!.inverse]!)).toBe(true);
      const { re, im } = field.toComplex(x);
      expect(table.real[i]![c]).toBeCloseTo(re, 9);
      expect(table.imaginary[i]![c]).toBeCloseTo(im, 9);
      expect(table.eigenvalues(i, c).multiplicities.reduce((s, m) => s + m, 0)).toBe(table.degrees[i]);
    });
  });
  // Frobenius and Schur 1906: sum of indicator * degree counts the solutions of g^2 = 1.
  let involutions = 0;
  for (let g = 0; g < group.order; g++) if (group.multiply(g, g) === 0) involutions++;
  expect(table.indicators.reduce<number>((s, nu, i) => s + nu * table.degrees[i]!, 0)).toBe(involutions);
}

describe('published character tables (International Tables A; Altmann and Herzig 1994; Fulton and Harris 1991; James and Liebeck 2001; places from memory)', () => {
  it('covers 65 groups', () => {
    expect(publishedTables.length).toBe(65);
  });

  it.each(publishedTables.map((t) => [`${t.name} of order ${t.order}`, t] as const))('%s', (_, t) => {
    const group = make.close(generatorsOf(t));
    expect(group.order).toBe(t.order);
    const labels = group.classes.map((c) => `${c.order}:${c.size}`);
    const expected = t.orders.map((o, c) => `${o}:${t.sizes[c]}`);
    expect(labels.toSorted()).toEqual(expected.toSorted());
    const table = characterTable(group);
    checkTable(group, table);
    expect(table.degrees.map((d, i) => `${d}:${table.indicators[i]}`).toSorted()).toEqual(
      t.degrees.map((d, i) => `${d}:${t.indicators[i]}`).toSorted(),
    );
    const field = CyclotomicField.of(group.exponent);
    const rows = table.values.map((row, i) => [...row.map((x) => field.key(x)), `${table.indicators[i]}`]);
    const published = t.characters.map((text, i) => [...parseRow(text, field).map((x) => field.key(x)), `${t.indicators[i]}`]);
    expect(sameTable(rows, [...labels, 'nu'], published, [...expected, 'nu'])).toBe(true);
    const types = realIrreducibles(group, table).map((k) => k.type);
    expect(['real', 'complex', 'quaternionic'].map((type) => types.filter((x) => x === type).length)).toEqual(t.realTypes);
  });

  it('the comparison sees a wrong entry, a wrong column and swapped labels', () => {
    const a = [
      ['1', '1'],
      ['1', '-1'],
    ];
    expect(
      sameTable(
        a,
        ['x', 'y'],
        [
          ['1', '-1'],
          ['1', '1'],
        ],
        ['x', 'y'],
      ),
    ).toBe(true);
    expect(
      sameTable(
        a,
        ['x', 'y'],
        [
          ['1', '1'],
          ['1', '1'],
        ],
        ['x', 'y'],
      ),
    ).toBe(false);
    expect(sameTable(a, ['x', 'y'], a, ['y', 'x'])).toBe(false);
  });
});

describe('larger groups', () => {
  it.each([
    ['F4', make.coxeterF4(), [1, 1, 1, 1, 2, 2, 2, 2, 4, 4, 4, 4, 4, 6, 6, 8, 8, 8, 8, 9, 9, 9, 9, 12, 16]],
    [
      'H4',
      make.coxeterH4(),
      [1, 1, 4, 4, 4, 4, 6, 6, 8, 8, 9, 9, 9, 9, 10, 16, 16, 16, 16, 16, 16, 18, 24, 24, 24, 24, 25, 25, 30, 30, 36, 36, 40, 48],
    ],
  ])(
    '%s: degrees, all indicators 1 (M. Geck, G. Pfeiffer, Characters of Finite Coxeter Groups and Iwahori-Hecke Algebras, 2000, appendix C; from memory)',
    (_, g, degrees) => {
      const table = characterTable(make.close(g));
      expect(table.degrees).toEqual(degrees);
      expect(table.indicators.every((nu) => nu === 1)).toBe(true);
    },
  );

  it('extraspecial groups of order 32 differ in one indicator (D. Gorenstein, Finite Groups, 1968; from memory)', () => {
    const plus = characterTable(make.close(make.extraspecialPlus()));
    const minus = characterTable(make.close(make.extraspecialMinus()));
    expect([plus.degrees.at(-1), plus.indicators.at(-1)]).toEqual([4, 1]);
    expect([minus.degrees.at(-1), minus.indicators.at(-1)]).toEqual([4, -1]);
    expect(minus.indicators.slice(0, 16).every((nu) => nu === 1)).toBe(true);
  });

  it.each([5, 8, 12, 100])('dihedral of order 2 * %i: planes with 2 cos(2 pi j k/n) (Serre 1977, 5.3; from memory)', (n) => {
    const group = make.close(make.dihedral(n));
    const table = characterTable(group);
    const rotation = group.classOf[group.generators[0]!]!;
    const got = table.real.filter((_, i) => table.degrees[i] === 2).map((row) => row[rotation]!);
    const want = Array.from({ length: Math.ceil(n / 2) - 1 }, (_, k) => 2 * Math.cos((2 * Math.PI * (k + 1)) / n));
    expect(got.length).toBe(want.length);
    got
      .sort((a, b) => b - a)
      .forEach((x, i) => {
        expect(x).toBeCloseTo(want[i]!, 9);
      });
  });

  it('abelian groups with many classes: C200 and C2^7', () => {
    const cyclic = characterTable(make.close(make.cyclic(200)));
    expect(cyclic.degrees.length).toBe(200);
    expect(cyclic.indicators.filter((nu) => nu === 1).length).toBe(2);
    const elementary = characterTable(make.close(make.disjoint(...Array.from({ length: 7 }, () => make.cyclic(2)))));
    expect(elementary.degrees.length).toBe(128);
    expect(elementary.indicators.every((nu) => nu === 1)).toBe(true);
  });

  it('S7: degrees (G. James, A. Kerber, The Representation Theory of the Symmetric Group, 1981; from memory)', () => {
    expect(characterTable(make.close(make.symmetric(7))).degrees).toEqual([1, 1, 6, 6, 14, 14, 14, 14, 15, 15, 20, 21, 21, 35, 35]);
  });

  it('refuses too many classes', () => {
    expect(() => characterTable(make.close(make.cyclic(3001)))).toThrow(LimitError);
  });

  it('the trivial group', () => {
    const table = characterTable(make.close({ degree: 0, generators: [] }));
    expect(table.degrees).toEqual([1]);
    expect(table.indicators).toEqual([1]);
  });
});

describe('laws on random permutation groups', () => {
  const permutation = fc.shuffledSubarray([0, 1, 2, 3, 4, 5], { minLength: 6, maxLength: 6 }).map((p) => Int32Array.from(p));
  it('orthogonality, and the permutation character splits and rebuilds', () => {
    fc.assert(
      fc.property(fc.array(permutation, { minLength: 1, maxLength: 2 }), (generators) => {
        const group = make.close({ degree: 6, generators });
        const table = characterTable(group);
        checkTable(group, table);
        const fixed = group.classes.map((c) => group.permutation(c.representative).reduce((s, y, x) => s + (x === y ? 1 : 0), 0));
        const m = decompose(table, fixed);
        expect(m.every((x) => x >= 0)).toBe(true);
        expect(m.reduce((s, x, i) => s + x * table.degrees[i]!, 0)).toBe(6);
        expect(m.reduce((s, x) => s + x * x, 0)).toBe(Number(integerInnerProduct(table, fixed, fixed).n));
        // the three routes agree
        expect(
          decompose(
            table,
            fixed.map((x) => table.field.fromInteger(x)),
          ),
        ).toEqual(m);
        expect(
          decompose(
            table,
            fixed.map((x, c) => (c === 0 ? x + 1e-10 : x)),
          ),
        ).toEqual(m);
      }),
      { numRuns: 25, seed: 2 },
    );
  });

  it('refuses a class function that is no character, a wrong length; handles large multiplicities', () => {
    const group = make.close(make.symmetric(4));
    const table = characterTable(group);
    expect(() => decompose(table, [1, 0, 0, 0, 0])).toThrow(InputError);
    expect(() => decompose(table, [1, 0.5, 0, 0, 0])).toThrow(InputError);
    expect(() => decompose(table, [1, 1])).toThrow(InputError);
    const huge = 24 * 10 ** 9;
    expect(decompose(table, [huge, 0, 0, 0, 0])).toEqual(table.degrees.map((d) => d * 10 ** 9));
    expect(decompose(table, [-24, 0, 0, 0, 0])).toEqual(table.degrees.map((d) => -d));
  });
});
