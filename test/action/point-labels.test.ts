import { describe, expect, it } from 'vitest';
import { type PointMatrix, pointLabels } from '../../src/action/index.ts';
import { loadCatalogueGroup } from '../../src/group/catalogue.ts';
import { characterTable, closeGroup, type FiniteGroup, type RealIrreducible, realIrreducibles } from '../../src/group/index.ts';
import { parseExpression } from '../../src/model/expression/index.ts';
import { numericValue } from '../../src/model/numeric-value.ts';
import { MOLECULES, TABLES } from './published.ts';

type Rows = number[][];
const multiply = (a: Rows, b: Rows): Rows => a.map((row) => b[0]!.map((_, j) => row.reduce((s, x, k) => s + x * b[k]![j]!, 0)));
const key = (m: Rows): string => m.map((r) => r.map((x) => (Math.abs(x) < 1e-9 ? 0 : x).toFixed(6)).join()).join(';');

interface PointGroup {
  readonly group: FiniteGroup;
  readonly matrices: Rows[];
  readonly irreducibles: RealIrreducible[];
  readonly labels: string[] | undefined;
  element(word: string): number;
}

/** A group of the catalogue through one of its actions: its matrices by left multiplication on themselves. */
function pointGroup(name: string, action = 'space', turn?: Rows): PointGroup {
  const declared = loadCatalogueGroup(name);
  const moved = (m: Rows): Rows =>
    turn === undefined
      ? m
      : multiply(
          multiply(turn, m),
          turn[0]!.map((_, j) => turn.map((r) => r[j]!)),
        );
  const generators = declared.generators.map((g) =>
    moved(
      declared
        .action(action)
        .matrices.get(g)!
        .map((row) => row.map((text) => numericValue(parseExpression(text), new Map()))),
    ),
  );
  const size = generators[0]!.length;
  const all: Rows[] = [Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, j) => (i === j ? 1 : 0)))];
  const known = new Map([[key(all[0]!), 0]]);
  const images = generators.map((): number[] => []);
  for (let i = 0; i < all.length; i++)
    generators.forEach((g, s) => {
      const m = multiply(g, all[i]!);
      let at = known.get(key(m));
      if (at === undefined) {
        at = all.push(m) - 1;
        known.set(key(m), at);
      }
      images[s]![i] = at;
    });
  const group = closeGroup(
    images.map((row) => Int32Array.from(row)),
    all.length,
  );
  const matrices = Array.from({ length: group.order }, (_, i) => all[group.permutation(i)[0]!]!);
  const irreducibles = realIrreducibles(group, characterTable(group));
  return {
    group,
    matrices,
    irreducibles,
    labels: labelled(group, matrices, irreducibles),
    element: (word) => elementOf(group, declared.generators, word),
  };
}

const labelled = (group: FiniteGroup, matrices: readonly PointMatrix[], irreducibles: readonly RealIrreducible[]) =>
  pointLabels(
    matrices,
    irreducibles.map((k) => ({ dimension: k.dimension, values: matrices.map((_, i) => k.values[group.classOf[i]!]!) })),
  );

function elementOf(group: FiniteGroup, names: readonly string[], word: string): number {
  return [...word].reduceRight((e, letter) => group.multiply(group.generators[names.indexOf(letter)]!, e), 0);
}

/** A rotation that moves every axis to a general place. */
const TILT: Rows = multiply(
  [
    [Math.cos(0.7), -Math.sin(0.7), 0],
    [Math.sin(0.7), Math.cos(0.7), 0],
    [0, 0, 1],
  ],
  [
    [1, 0, 0],
    [0, Math.cos(0.4), -Math.sin(0.4)],
    [0, Math.sin(0.4), Math.cos(0.4)],
  ],
);

describe('character tables with labels, Wilson, Decius & Cross 1955, appendix X', () => {
  for (const [name, table] of Object.entries(TABLES))
    it(name, () => {
      const g = pointGroup(name);
      const words = Object.values(table.classes);
      expect(g.labels?.toSorted()).toEqual(Object.keys(table.irreducibles).toSorted());
      g.labels!.forEach((label, i) => {
        const row = words.map((w) => g.irreducibles[i]!.values[g.group.classOf[g.element(w)]!]!);
        const published = table.irreducibles[label]!;
        row.forEach((x, c) => {
          expect(x, `${label} at ${Object.keys(table.classes)[c]}`).toBeCloseTo(published[c]!, 6);
        });
      });
    });
});

describe('sets of labels of further groups, Herzberg 1945, from memory', () => {
  const SETS: Readonly<Record<string, string>> = {
    C1: 'A',
    Ci: 'Ag Au',
    Cs: "A' A''",
    C2: 'A B',
    C3: 'A E',
    C4: 'A B E',
    C5: 'A E1 E2',
    C6: 'A B E1 E2',
    C8: 'A B E1 E2 E3',
    C2h: 'Ag Au Bg Bu',
    C3h: "A' A'' E' E''",
    C4h: 'Ag Au Bg Bu Eg Eu',
    C5h: "A' A'' E1' E1'' E2' E2''",
    C6h: 'Ag Au Bg Bu E1g E1u E2g E2u',
    C4v: 'A1 A2 B1 B2 E',
    C5v: 'A1 A2 E1 E2',
    C6v: 'A1 A2 B1 B2 E1 E2',
    D2: 'A B1 B2 B3',
    D3: 'A1 A2 E',
    D4: 'A1 A2 B1 B2 E',
    D6: 'A1 A2 B1 B2 E1 E2',
    D2h: 'Ag Au B1g B1u B2g B2u B3g B3u',
    D5h: "A1' A1'' A2' A2'' E1' E1'' E2' E2''",
    D2d: 'A1 A2 B1 B2 E',
    D3d: 'A1g A1u A2g A2u Eg Eu',
    D4d: 'A1 A2 B1 B2 E1 E2 E3',
    D5d: 'A1g A1u A2g A2u E1g E1u E2g E2u',
    D6d: 'A1 A2 B1 B2 E1 E2 E3 E4 E5',
    S4: 'A B E',
    S6: 'Ag Au Eg Eu',
    S8: 'A B E1 E2 E3',
    T: 'A E T',
    Th: 'Ag Au Eg Eu Tg Tu',
    O: 'A1 A2 E T1 T2',
    I: 'A G H T1 T2',
  };
  for (const [name, labels] of Object.entries(SETS))
    it(name, () => {
      expect(pointGroup(name).labels?.toSorted().join(' ')).toBe(labels);
    });

  it('the labels stay a set of different ones wherever the axes lie', () => {
    for (const name of ['D6h', 'D2h', 'D3h', 'Td', 'Ih', 'C4v', 'S8'])
      expect(pointGroup(name, 'space', TILT).labels?.length, name).toBe(pointGroup(name).labels?.length);
    for (const name of ['Td', 'Ih', 'Oh', 'C4h', 'D3d'])
      expect(pointGroup(name, 'space', TILT).labels, name).toEqual(pointGroup(name).labels);
  });
});

describe('choices that the rules leave open', () => {
  const value = (name: string, label: string, word: string): number => {
    const g = pointGroup(name);
    return g.irreducibles[g.labels!.indexOf(label)]!.values[g.group.classOf[g.element(word)]!]!;
  };
  it('C4v: B1 is even under the mirrors that contain x', () => {
    expect(value('C4v', 'B1', 'm')).toBe(1);
    expect(value('C4v', 'B1', 'r')).toBe(-1);
  });
  it('D2: B1, B2, B3 are even under the half turns about z, y, x', () => {
    expect(value('D2', 'B1', 'r')).toBe(1);
    expect(value('D2', 'B3', 'd')).toBe(1);
    expect(value('D2', 'B2', 'rd')).toBe(1);
  });
  it('D4d: E1 turns by a quarter of a half turn under S8', () => {
    expect(value('D4d', 'E1', 'f')).toBeCloseTo(Math.SQRT2, 9);
    expect(value('D4d', 'E3', 'f')).toBeCloseTo(-Math.SQRT2, 9);
  });
  it('planar groups: D5 as rotations and two-fold axes', () => {
    expect(pointGroup('dihedral:5', 'plane').labels?.toSorted().join(' ')).toBe('A1 A2 E1 E2');
    expect(pointGroup('cyclic:4', 'plane').labels?.toSorted().join(' ')).toBe('A B E');
  });
});

it('no labels where elements share a matrix or a matrix is not orthogonal', () => {
  const one = [
    [1, 0],
    [0, 1],
  ];
  const trivial = { dimension: 1, values: [1, 1] };
  expect(pointLabels([one, one], [trivial])).toBeUndefined();
  expect(
    pointLabels(
      [
        one,
        [
          [0, 2],
          [0.5, 0],
        ],
      ],
      [trivial],
    ),
  ).toBeUndefined();
  expect(pointLabels([[[1]]], [{ dimension: 1, values: [1] }])).toBeUndefined();
});

describe('displacements of molecules, Herzberg 1945; Wilson, Decius & Cross 1955', () => {
  const groups = new Map<string, PointGroup>();
  for (const molecule of MOLECULES)
    it(`${molecule.name}`, () => {
      let g = groups.get(molecule.group);
      if (g === undefined) {
        g = pointGroup(molecule.group);
        groups.set(molecule.group, g);
      }
      const atoms = new Map<string, Rows>();
      for (const seed of molecule.seeds)
        for (const m of g.matrices) {
          const image = multiply(
            m,
            seed.map((x) => [x]),
          );
          atoms.set(key(image), image);
        }
      // the trace of a displacement representation: atoms that stay, times the trace of the matrix
      const traces = g.group.classes.map(({ representative }) => {
        const m = g.matrices[representative]!;
        let fixed = 0;
        for (const [k, x] of atoms) if (key(multiply(m, x)) === k) fixed++;
        return fixed * (m[0]![0]! + m[1]![1]! + m[2]![2]!);
      });
      const found: Record<string, number> = {};
      g.irreducibles.forEach((k, i) => {
        let s = 0;
        g.group.classes.forEach(({ size }, c) => {
          s += size * traces[c]! * k.values[c]!;
        });
        const count = Math.round(s / g.group.order / k.beta);
        if (count > 0) found[g.labels![i]!] = count;
      });
      expect(found).toEqual(molecule.displacements);
    });
});
