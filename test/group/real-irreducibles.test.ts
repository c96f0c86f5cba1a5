import { describe, expect, it } from 'vitest';
import { InputError } from '../../src/errors/errors.ts';
import { characterTable, type Indicator } from '../../src/group/characters.ts';
import { decompose } from '../../src/group/decompose.ts';
import type { FiniteGroup } from '../../src/group/group.ts';
import { signFromGenerators, signOnClasses } from '../../src/group/powers.ts';
import { carriedForms, realIrreducibles, realMultiplicities, twists } from '../../src/group/real-irreducibles.ts';
import { classFromForms, classFromKernel, type ReversedCharacter, signClasses } from '../../src/group/sign-class.ts';
import * as make from './permutations.ts';
import { generatorsOf, publishedTables } from './published.ts';

/** All homomorphisms to {+1, -1}, by trying all signs of the generators. */
function allSigns(group: FiniteGroup): Int8Array[] {
  const n = group.generators.length;
  const out: Int8Array[] = [];
  for (let mask = 0; mask < 2 ** n; mask++)
    try {
      out.push(
        signFromGenerators(
          group,
          group.generators.map((_, s) => ((mask >> s) & 1 ? -1 : 1)),
        ),
      );
    } catch (error) {
      expect(error).toBeInstanceOf(InputError);
    }
  return out;
}

describe('real irreducibles', () => {
  it.each(publishedTables.map((t) => [`${t.name} of order ${t.order}`, t] as const))(
    '%s: type, regular representation, every sign',
    (_, t) => {
      const group = make.close(generatorsOf(t));
      const table = characterTable(group);
      const reals = realIrreducibles(group, table);
      expect(reals[0]!.values.every((x) => x === 1)).toBe(true);
      const mean = (f: (c: number) => number): number => group.classes.reduce((s, x, c) => s + x.size * f(c), 0) / group.order;
      for (const k of reals) {
        expect(mean((c) => k.values[c]! ** 2)).toBeCloseTo(k.beta, 9);
        k.character.forEach((x, c) => {
          expect(table.field.toComplex(x).re).toBeCloseTo(k.values[c]!, 9);
          expect(table.field.toComplex(x).im).toBeCloseTo(0, 9);
        });
        expect(k.values[0]).toBe(k.dimension);
      }
      // The regular representation holds K dim K / beta times.
      const regular = decompose(
        table,
        group.classes.map((_, c) => (c === 0 ? group.order : 0)),
      );
      expect(realMultiplicities(reals, regular)).toEqual(reals.map((k) => k.dimension / k.beta));
      for (const sigma of allSigns(group)) {
        const onClasses = signOnClasses(group, sigma);
        const twist = twists(table, reals, onClasses);
        twist.forEach((j, i) => {
          expect(twist[j]).toBe(i);
          const s = mean(
            (c) =>
              (onClasses[c]! *
                (reals[i]!.values[c]! ** 2 - reals[i]!.values[group.classOf[group.power(group.classes[c]!.representative, 2)]!]!)) /
              2,
          );
          expect(carriedForms(table, reals[i]!, onClasses)).toBeCloseTo(s, 9);
        });
        // Both routes are compared inside; the class numbers depend on K and K tensor sigma together.
        const classes = signClasses(group, table, reals, sigma);
        classes.forEach((c) => {
          expect(classes[c.twist]!.symmetryClass).toBe(c.symmetryClass);
          expect(c.twist === classes.indexOf(c) || c.carried === classes[c.twist]!.carried).toBe(true);
          if (!sigma.includes(-1)) expect(c.symmetryClass).toBeLessThanOrEqual(3);
        });
      }
    },
  );

  it('a character that is not real is refused', () => {
    const group = make.close(make.cyclic(3));
    const reals = realIrreducibles(group, characterTable(group));
    expect(realMultiplicities(reals, [1, 2, 2])).toEqual([1, 2]);
    expect(() => realMultiplicities(reals, [1, 2, 1])).toThrow(InputError);
    expect(() => realMultiplicities(reals, [-1, 0, 0])).toThrow(InputError);
    const q8 = make.close(make.quaternion());
    const table = characterTable(q8);
    expect(() => realMultiplicities(realIrreducibles(q8, table), [0, 0, 0, 0, 1])).toThrow(InputError);
    expect(() => realIrreducibles(group, table)).toThrow(RangeError);
  });
});

describe('the ten symmetry classes (Hoveijn, Lamb and Roberts 2003; realisations by hand)', () => {
  const rightJ = [
    [0, 0, -1, 0],
    [0, 0, 0, -1],
    [1, 0, 0, 0],
    [0, 1, 0, 0],
  ];
  const leftI = [
    [0, -1, 0, 0],
    [1, 0, 0, 0],
    [0, 0, 0, -1],
    [0, 0, 1, 0],
  ];
  const leftJ = [
    [0, 0, -1, 0],
    [0, 0, 0, 1],
    [1, 0, 0, 0],
    [0, -1, 0, 0],
  ];
  const c2 = make.cyclic(2);
  it.each<[number, string, make.Generators, (1 | -1)[], number]>([
    [1, 'no symmetry', { degree: 0, generators: [] }, [], 1],
    [1, 'D3 in the plane', make.dihedral(3), [1, 1], 2],
    [2, 'C3 rotating the plane', make.cyclic(3), [1], 2],
    [3, 'Q8 by left multiplication', make.quaternion(), [1, 1], 4],
    [4, 'one reversing involution', c2, [-1], 1],
    [5, 'a reversing element of order 4 in the plane', make.cyclic(4), [-1], 2],
    [6, 'C3 with a commuting reversing involution', make.disjoint(make.cyclic(3), c2), [1, -1], 2],
    [7, 'C3 with reversing mirrors', make.dihedral(3), [1, -1], 2],
    [8, 'C6 with a reversing element of square -1', make.dicyclic(3), [1, -1], 4],
    [9, 'Q8 with a commuting reversing element of square -1', make.matrices([leftI, leftJ, rightJ]), [1, 1, -1], 4],
    [10, 'Q8 with a commuting reversing involution', make.disjoint(make.quaternion(), c2), [1, 1, -1], 4],
  ])('%i: %s', (number, _, generators, signs, dimension) => {
    const group = make.close(generators);
    const table = characterTable(group);
    const reals = realIrreducibles(group, table);
    const classes = signClasses(group, table, reals, signFromGenerators(group, signs));
    const last = reals.findLastIndex((k) => k.dimension === dimension);
    expect(reals.every((k) => k.dimension <= dimension)).toBe(true);
    expect(classes[last]!.symmetryClass).toBe(number);
  });

  it('impossible combinations have no class', () => {
    const impossible: [Indicator, Indicator, ReversedCharacter][] = [
      [1, 1, 'none'],
      [0, -1, 'other'],
      [0, 1, 'same'],
      [1, 0, 'same'],
      [0, 0, 'conjugate'],
      [-1, 0, 'same'],
    ];
    for (const [nu, eta, reversed] of impossible) expect(classFromKernel(nu, eta, reversed)).toBeUndefined();
    expect(classFromForms(1, true, 2)).toBeUndefined();
    expect(classFromForms(4, true, 0)).toBeUndefined();
    expect([classFromForms(1, false, 0), classFromForms(2, false, 0), classFromForms(4, false, 0)]).toEqual([4, 6, 10]);
  });

  it('a sign that is no homomorphism is refused', () => {
    const group = make.close(make.symmetric(4));
    const table = characterTable(group);
    const reals = realIrreducibles(group, table);
    expect(() => twists(table, reals, Int8Array.of(1, 1, -1, 1, 1))).toThrow(InputError);
  });
});
