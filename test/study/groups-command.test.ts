/** `groups`: orders, classes and exact characters of the catalogue as printed. */
import { describe, expect, it } from 'vitest';
import { CyclotomicField } from '../../src/field/index.ts';
import { listCatalogue, loadCatalogueGroup } from '../../src/group/catalogue.ts';
import { characterTable, closeGroup } from '../../src/group/index.ts';
import { parseExpression } from '../../src/model/expression/index.ts';
import { compileNumeric } from '../../src/model/expression/numeric.ts';
import { characterText, summariseGroup, wordOf } from '../../src/study/catalogue-group.ts';
import { groupsOutcome } from '../../src/study/groups-command.ts';
import { textTable } from '../../src/study/text-table.ts';

/** Real and imaginary part of a printed value, in doubles; it is linear in i. */
function complexOf(text: string): [number, number] {
  const value = compileNumeric(parseExpression(text), ['i']);
  const real = value([0]);
  return [real, value([1]) - real];
}

describe('one group', () => {
  it('S4: character table of J.-P. Serre, Linear Representations of Finite Groups, 1977, section 5.8', () => {
    const { order, exponent, classes, characters } = summariseGroup(loadCatalogueGroup('symmetric:4'));
    expect([order, exponent]).toEqual([24, 12]);
    expect(classes.map(({ size, order: of }) => [of, size])).toEqual([
      [1, 1],
      [2, 3],
      [2, 6],
      [3, 8],
      [4, 6],
    ]);
    const rows = characters.map(({ values }) => values.join(' ')).sort();
    expect(rows).toEqual(['1 1 1 1 1', '1 1 -1 1 -1', '2 2 0 -1 0', '3 -1 1 0 -1', '3 -1 -1 0 1'].sort());
    expect(characters.every(({ indicator }) => indicator === 1)).toBe(true);
  });

  it('quaternion group: one character of degree 2 and quaternionic type', () => {
    const { characters } = summariseGroup(loadCatalogueGroup('quaternion'));
    expect(characters.map(({ degree, indicator }) => [degree, indicator])).toEqual([
      [1, 1],
      [1, 1],
      [1, 1],
      [1, 1],
      [2, -1],
    ]);
  });

  it.each(['cyclic:1', 'cyclic:3', 'cyclic:7', 'cyclic:12', 'dihedral:5', 'dicyclic:3', 'binary-octahedral', 'T', 'dihedral:3*cyclic:5'])(
    '%s: printed values are those of the table',
    (name) => {
      const declared = loadCatalogueGroup(name);
      const { characters, classes } = summariseGroup(declared);
      for (const { degree, values } of characters) {
        expect(values[0]).toBe(String(degree));
        // first orthogonality relation, in doubles
        const norm = values.reduce((sum, text, k) => sum + classes[k]!.size * (complexOf(text)[0] ** 2 + complexOf(text)[1] ** 2), 0);
        expect(norm).toBeCloseTo(
          classes.reduce((sum, { size }) => sum + size, 0),
          9,
        );
      }
    },
  );

  it('values of the cyclic group of order 5 are its roots of unity', () => {
    const group = closeGroup([Int32Array.from([1, 2, 3, 4, 0])], 5);
    const table = characterTable(group);
    table.values.forEach((row, i) => {
      row.forEach((value, c) => {
        const [re, im] = complexOf(characterText(table, value));
        expect(re).toBeCloseTo(table.real[i]![c]!, 12);
        expect(im).toBeCloseTo(table.imaginary[i]![c]!, 12);
      });
    });
    const field = CyclotomicField.of(4);
    expect(characterText({ field }, field.root(1))).toBe('i');
    expect(characterText({ field }, field.root(3))).toBe('-i');
    expect(characterText({ field }, field.zero)).toBe('0');
  });

  it('representatives multiply out to themselves', () => {
    const names = ['a', 'b'];
    const swap = Int32Array.from([1, 0, 2, 3]);
    const turn = Int32Array.from([1, 2, 3, 0]);
    const group = closeGroup([turn, swap], 4);
    for (let element = 0; element < group.order; element++) {
      const word = wordOf(group, element, names);
      const image =
        word === '1'
          ? 0
          : word.split('*').reduce((left, part) => {
              const [letter, power] = part.split('^');
              return group.multiply(left, group.power(group.generators[names.indexOf(letter!)]!, Number(power ?? '1')));
            }, 0);
      expect(image).toBe(element);
    }
  });

  it('the printed group names its generators, actions, classes and characters', () => {
    const { text, result, status } = groupsOutcome('dihedral:5');
    expect(status).toBe(0);
    for (const piece of ['order 10', 'plane, 2 coordinates', 'r: (1 2 3 4 5)', 's: (2 5)(3 4)', 'χ4', 'a = (-1 + sqrt(5))/2'])
      expect(text()).toContain(piece);
    expect(result).toMatchObject({ command: 'groups', group: { name: 'dihedral:5', order: 10, defaultAction: 'plane' } });
  });

  it('refuses unknown names and orders past the limit', () => {
    expect(() => groupsOutcome('dihedrall:3')).toThrow(/dihedrall:3/);
    expect(() => groupsOutcome('symmetric:6', 700)).toThrow(/more than 700 elements/);
  });
});

describe('the catalogue', () => {
  it('lists every group of the folder', () => {
    const text = String(groupsOutcome(undefined).text());
    for (const { name } of listCatalogue()) expect(text).toContain(name);
  });
});

describe('tables', () => {
  it('pad their columns and break into parts where they are too wide', () => {
    expect(
      textTable(
        ['', 'a', 'b'],
        [
          ['x', '1', '22'],
          ['yy', '333', ''],
        ],
        100,
      ),
    ).toBe('    a    b\nx   1    22\nyy  333');
    expect(textTable(['', 'a', 'b'], [['x', '1', '22']], 5)).toBe('   a\nx  1\n\n   b\nx  22');
    expect(textTable(['a'], [], 5)).toBe('a');
  });
});
