/** Claims of the catalogue: orders, numbers of classes, actions, conventions. */
import { readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { listCatalogue, loadCatalogueGroup } from '../../src/group/catalogue.ts';
import {
  apply,
  asPermutationGroup,
  elements,
  evaluate,
  generatorNumbers,
  jointMatrices,
  matrixKey,
  type Numbers,
  numbers,
  orbit,
  times,
  transpose,
  unit,
} from './catalogue-support.ts';

const CRYSTALLOGRAPHIC =
  'C1 Ci C2 Cs C2h D2 C2v D2h C4 S4 C4h D4 C4v D2d D4h C3 S6 D3 C3v D3d C6 C3h C6h D6 C6v D3h D6h T Th O Td Oh'.split(' ');

/** [name, order, number of classes]. */
type Row = readonly [string, number, number];

/** International Tables for Crystallography A; Altmann & Herzig, Point-Group Theory Tables (1994). */
const POINT_GROUPS: readonly Row[] = [
  ['C1', 1, 1],
  ['Ci', 2, 2],
  ['C2', 2, 2],
  ['Cs', 2, 2],
  ['C2h', 4, 4],
  ['D2', 4, 4],
  ['C2v', 4, 4],
  ['D2h', 8, 8],
  ['C4', 4, 4],
  ['S4', 4, 4],
  ['C4h', 8, 8],
  ['D4', 8, 5],
  ['C4v', 8, 5],
  ['D2d', 8, 5],
  ['D4h', 16, 10],
  ['C3', 3, 3],
  ['S6', 6, 6],
  ['D3', 6, 3],
  ['C3v', 6, 3],
  ['D3d', 12, 6],
  ['C6', 6, 6],
  ['C3h', 6, 6],
  ['C6h', 12, 12],
  ['D6', 12, 6],
  ['C6v', 12, 6],
  ['D3h', 12, 6],
  ['D6h', 24, 12],
  ['T', 12, 4],
  ['Th', 24, 8],
  ['O', 24, 5],
  ['Td', 24, 5],
  ['Oh', 48, 10],
  ['I', 60, 5],
  ['Ih', 120, 10],
];

/** Fulton & Harris, Representation Theory (1991), ch. 2-3; James & Liebeck, Representations and Characters of Groups (2001), ch. 23. */
const ABSTRACT_GROUPS: readonly Row[] = [
  ['cyclic:5', 5, 5],
  ['cyclic:7', 7, 7],
  ['cyclic:8', 8, 8],
  ['cyclic:9', 9, 9],
  ['cyclic:10', 10, 10],
  ['cyclic:12', 12, 12],
  ['dihedral:5', 10, 4],
  ['dihedral:7', 14, 5],
  ['dihedral:8', 16, 7],
  ['dihedral:9', 18, 6],
  ['dihedral:10', 20, 8],
  ['dihedral:12', 24, 9],
  ['quaternion', 8, 5],
  ['dicyclic:2', 8, 5],
  ['dicyclic:3', 12, 6],
  ['dicyclic:4', 16, 7],
  ['dicyclic:5', 20, 8],
  ['dicyclic:6', 24, 9],
  ['dicyclic:8', 32, 11],
  ['binary-tetrahedral', 24, 7],
  ['binary-icosahedral', 120, 9],
  ['symmetric:3', 6, 3],
  ['symmetric:4', 24, 5],
  ['symmetric:5', 120, 7],
  ['symmetric:6', 720, 11],
  ['alternating:4', 12, 4],
  ['alternating:5', 60, 5],
  ['tetrahedral', 12, 4],
  ['octahedral', 24, 5],
  ['icosahedral', 60, 5],
  ['quaternion*cyclic:3', 24, 15],
  ['cyclic:4*cyclic:2', 8, 8],
];

/** Degrees of the reflection groups multiply to the order (Humphreys, Reflection Groups and Coxeter Groups, 1990, section 3.9). */
const REFLECTION_GROUPS: readonly Row[] = [
  ['coxeter:H3', 2 * 6 * 10, 10],
  ['coxeter:F4', 2 * 6 * 8 * 12, 25],
  ['coxeter:H4', 2 * 12 * 20 * 30, 34],
  ['hyperoctahedral:2', 2 * 4, 5],
  ['hyperoctahedral:3', 2 * 4 * 6, 10],
  ['hyperoctahedral:4', 2 * 4 * 6 * 8, 20],
];

/** Small, odd, even and degenerate members of every family, and the rest of the names. */
const MORE = (
  'cyclic:1 cyclic:2 cyclic:3 dihedral:1 dihedral:2 dihedral:3 dihedral:4 dicyclic:1 symmetric:2 alternating:3 alternating:6 ' +
  'reflection binary-octahedral C1v C1h C5v C5h C8v D1 D1h D1d D5 D5h D5d D6d D4d S2 S8 S10'
).split(' ');

describe('orders and classes against the published tables', () => {
  it.each([...POINT_GROUPS, ...ABSTRACT_GROUPS, ...REFLECTION_GROUPS])('%s has order %i and %i classes', (name, order, classes) => {
    const group = loadCatalogueGroup(name);
    expect(group.expectedOrder).toBe(order);
    expect(group.expectedClasses).toBe(classes);
    const closed = asPermutationGroup(jointMatrices(group));
    expect(closed.order).toBe(order);
    expect(closed.classes.length).toBe(classes);
  });

  it('covers the 32 crystallographic groups', () => {
    expect(new Set(CRYSTALLOGRAPHIC).size).toBe(32);
    expect(POINT_GROUPS.map(([name]) => name)).toEqual(expect.arrayContaining(CRYSTALLOGRAPHIC));
  });

  it.each(MORE)('%s closes to what its file claims', (name) => {
    const group = loadCatalogueGroup(name);
    const closed = asPermutationGroup(jointMatrices(group));
    expect([closed.order, closed.classes.length]).toEqual([group.expectedOrder, group.expectedClasses]);
  });

  it('every file of the catalogue is among the groups tested here', () => {
    const tested = [...POINT_GROUPS, ...ABSTRACT_GROUPS, ...REFLECTION_GROUPS].map(([name]) => name).concat(MORE);
    for (const { name } of listCatalogue()) {
      const pattern = new RegExp(`^${name.replace('N', '\\d+')}$`);
      expect(
        tested.some((t) => pattern.test(t)),
        name,
      ).toBe(true);
    }
  });
});

const ALL = [...POINT_GROUPS, ...ABSTRACT_GROUPS, ...REFLECTION_GROUPS].map(([name]) => name).concat(MORE);
const distance = (a: Numbers, b: Numbers) => Math.max(0, ...a.flatMap((row, i) => row.map((x, j) => Math.abs(x - b[i]![j]!))));

describe('every action', () => {
  it.each(ALL)('of %s is by orthogonal matrices, its image has order |G|/|kernel|', (name) => {
    const group = loadCatalogueGroup(name);
    const order = group.expectedOrder!;
    for (const action of group.actions.values()) {
      const matrices = generatorNumbers(action, group.generators);
      for (const m of matrices) {
        expect(m.length).toBe(action.dimension);
        expect(distance(times(m, transpose(m)), unit(action.dimension))).toBeLessThan(1e-10);
      }
      // a second route to the order: the orbit of a vector in general position (of the spanning images for products)
      if (action.kernel === undefined) continue;
      const general = Array.from({ length: action.dimension }, (_, i) => Math.sqrt(i + 2) + 0.1 * i * i);
      if (order <= 1200) expect(orbit(matrices, [general]).length).toBe(order / action.kernel);
    }
  });

  it.each(ALL)('of %s that permutes coordinates agrees with its matrices', (name) => {
    const group = loadCatalogueGroup(name);
    for (const action of group.actions.values())
      for (const [g, images] of action.permutations ?? []) {
        const m = numbers(action.matrices.get(g)!);
        images.forEach((to, from) => {
          expect(m[to]![from]).toBe(1);
        });
        expect(m.flat().filter((x) => x !== 0).length).toBe(images.length);
      }
  });
});

describe('conventions', () => {
  it('plane: r turns by +2 pi/N, s is (x, y) -> (x, -y)', () => {
    for (const n of [1, 2, 3, 5, 8]) {
      const { matrices } = loadCatalogueGroup(`dihedral:${n}`).action('plane');
      const angle = (2 * Math.PI) / n;
      expect(apply(numbers(matrices.get('r')!), [1, 0])[0]).toBeCloseTo(Math.cos(angle), 12);
      expect(apply(numbers(matrices.get('r')!), [1, 0])[1]).toBeCloseTo(Math.sin(angle), 12);
      expect(matrices.get('s')).toEqual([
        ['1', '0'],
        ['0', '-1'],
      ]);
      expect(loadCatalogueGroup(`cyclic:${n}`).action().matrices.get('r')).toEqual(matrices.get('r'));
    }
  });

  it('ring: r sends the value at site i to site i+1, s fixes site 1', () => {
    const { matrices } = loadCatalogueGroup('dihedral:5').action('ring');
    expect(apply(numbers(matrices.get('r')!), [10, 20, 30, 40, 50])).toEqual([50, 10, 20, 30, 40]);
    expect(apply(numbers(matrices.get('s')!), [10, 20, 30, 40, 50])).toEqual([10, 50, 40, 30, 20]);
  });

  it('ring*plane: sites with two components, listed site by site', () => {
    const action = loadCatalogueGroup('dihedral:3').action('ring*plane', 6);
    const r = numbers(action.matrices.get('r')!);
    const turned = apply(numbers(loadCatalogueGroup('dihedral:3').action('plane').matrices.get('r')!), [7, 11]);
    // the vector (7, 11) at site 1 goes, turned, to site 2
    const image = apply(r, [7, 11, 0, 0, 0, 0]);
    [0, 0, turned[0]!, turned[1]!, 0, 0].forEach((x, i) => {
      expect(image[i]).toBeCloseTo(x, 12);
    });
    expect(asPermutationGroup(['r', 's'].map((g) => numbers(action.matrices.get(g)!))).order).toBe(6);
  });

  it('space: main axis z, two-fold axes of D_n along x, vertical mirrors contain x, Cs mirrors z', () => {
    const holds = (name: string, m: Numbers) =>
      elements(generatorNumbers(loadCatalogueGroup(name).action('space'), loadCatalogueGroup(name).generators)).has(matrixKey(m));
    const diagonal = (a: number, b: number, c: number): Numbers => [
      [a, 0, 0],
      [0, b, 0],
      [0, 0, c],
    ];
    for (const n of [2, 3, 4, 5, 6]) {
      const [c, s] = [Math.cos((2 * Math.PI) / n), Math.sin((2 * Math.PI) / n)];
      for (const name of [`C${n}`, `C${n}v`, `C${n}h`, `D${n}`, `D${n}h`, `D${n}d`])
        expect(
          holds(name, [
            [c, -s, 0],
            [s, c, 0],
            [0, 0, 1],
          ]),
          name,
        ).toBe(true);
      for (const name of [`D${n}`, `D${n}h`, `D${n}d`]) expect(holds(name, diagonal(1, -1, -1)), name).toBe(true);
      for (const name of [`C${n}v`, `D${n}h`]) expect(holds(name, diagonal(1, -1, 1)), name).toBe(true);
      for (const name of [`C${n}h`, `D${n}h`]) expect(holds(name, diagonal(1, 1, -1)), name).toBe(true);
      expect(holds(`D${n}d`, diagonal(1, -1, 1)), `mirrors of D${n}d lie between the axes`).toBe(false);
    }
    expect(holds('Cs', diagonal(1, 1, -1))).toBe(true);
    expect(holds('Ci', diagonal(-1, -1, -1))).toBe(true);
    for (const name of ['T', 'Th', 'Td', 'O', 'Oh', 'I', 'Ih']) expect(holds(name, diagonal(-1, -1, 1)), name).toBe(true);
    expect(
      holds('Td', [
        [0, 1, 0],
        [1, 0, 0],
        [0, 0, 1],
      ]),
    ).toBe(true);
    expect(holds('Th', diagonal(1, 1, -1))).toBe(true);
    expect(
      holds('S4', [
        [0, -1, 0],
        [1, 0, 0],
        [0, 0, -1],
      ]),
    ).toBe(true);
  });

  it('T, O, I and tetrahedral, octahedral, icosahedral are the same matrices', () => {
    for (const [symbol, word] of [
      ['T', 'tetrahedral'],
      ['O', 'octahedral'],
      ['I', 'icosahedral'],
    ] as const)
      expect([...loadCatalogueGroup(symbol).action('space').matrices]).toEqual([...loadCatalogueGroup(word).action('space').matrices]);
  });

  it('reflection: -1 on each listed coordinate', () => {
    const group = loadCatalogueGroup('reflection');
    for (const d of [1, 2, 5])
      expect(numbers(group.action(undefined, d).matrices.get('s')!)).toEqual(
        unit(d).map((row, i) => row.map((x, j) => (i === j ? -x : 0))),
      );
  });

  it('left multiplication on (1, i, j, k): i.1 = i, i.j = k, j.i = -k', () => {
    const { matrices } = loadCatalogueGroup('quaternion').action();
    const [i, j] = [numbers(matrices.get('i')!), numbers(matrices.get('j')!)];
    expect(apply(i, [1, 0, 0, 0])).toEqual([0, 1, 0, 0]);
    expect(apply(i, [0, 0, 1, 0])).toEqual([0, 0, 0, 1]);
    expect(apply(j, [0, 1, 0, 0])).toEqual([0, 0, 0, -1]);
    // dicyclic:2 is the quaternion group with a = i
    expect(matrixKey(numbers(loadCatalogueGroup('dicyclic:2').action().matrices.get('a')!))).toBe(matrixKey(i));
  });

  it('left actions of the binary groups fix no vector: the only element with eigenvalue 1 is 1', () => {
    for (const name of ['quaternion', 'dicyclic:3', 'binary-tetrahedral', 'binary-octahedral', 'binary-icosahedral']) {
      const group = loadCatalogueGroup(name);
      // trace 4 q0 with |q0| <= 1
      const all = [...elements(generatorNumbers(group.action(), group.generators)).values()];
      expect(all.filter((m) => m[0]![0]! + m[1]![1]! + m[2]![2]! + m[3]![3]! > 3.999).length).toBe(1);
      for (const m of all) expect(m[1]![1]).toBeCloseTo(m[0]![0]!, 12);
    }
  });

  it('the simple reflections of the Coxeter groups satisfy exactly the Coxeter relations (Humphreys 1990, section 2.4)', () => {
    for (const [name, labels] of [
      ['H3', [5, 3]],
      ['H4', [5, 3, 3]],
      ['F4', [3, 4, 3]],
    ] as const) {
      const group = loadCatalogueGroup(`coxeter:${name}`);
      const m = generatorNumbers(group.action(), group.generators);
      const order = (a: Numbers) => elements([a]).size;
      for (let i = 0; i < m.length; i++)
        for (let j = i; j < m.length; j++) expect(order(times(m[i]!, m[j]!))).toBe(i === j ? 1 : j === i + 1 ? labels[i] : 2);
    }
  });

  it('H3 and Ih are the same group of matrices, so are hyperoctahedral:3 and Oh', () => {
    const keys = (name: string) => {
      const group = loadCatalogueGroup(name);
      return [...elements(generatorNumbers(group.action(), group.generators)).keys()].sort();
    };
    expect(keys('coxeter:H3')).toEqual(keys('Ih'));
    expect(keys('hyperoctahedral:3')).toEqual(keys('Oh'));
    // the standard action of S_4 is T_d with the corner (1, 1, 1)
    const s4 = loadCatalogueGroup('symmetric:4');
    expect([...elements(generatorNumbers(s4.action('standard'), s4.generators)).keys()].sort()).toEqual(keys('Td'));
  });

  it('standard action: character = fixed points - 1 (Fulton & Harris 1991, section 3.1)', () => {
    for (const name of ['symmetric:2', 'symmetric:3', 'symmetric:5', 'symmetric:9', 'alternating:4', 'alternating:7']) {
      const group = loadCatalogueGroup(name);
      const [permutation, standard] = [group.action('permutation'), group.action('standard')];
      const trace = (m: Numbers) => m.reduce((s, row, i) => s + row[i]!, 0);
      const [p, q] = [permutation, standard].map((a) => generatorNumbers(a, group.generators));
      const words: [Numbers, Numbers][] = [
        [p![0]!, q![0]!],
        [p![1]!, q![1]!],
      ];
      for (let k = 0; k < 12; k++) words.push([times(words.at(-1)![0], words.at(-2)![0]), times(words.at(-1)![1], words.at(-2)![1])]);
      for (const [a, b] of words) expect(trace(b)).toBeCloseTo(trace(a) - 1, 9);
    }
  });
});

/** Explicit generators of the point groups, as in Wilson, Decius & Cross, Molecular Vibrations (1955), with the axes stated above. */
const COS5 = (Math.sqrt(5) - 1) / 4;
const GOLDEN_HALF = (1 + Math.sqrt(5)) / 4;
const INVERSION: Numbers = [
  [-1, 0, 0],
  [0, -1, 0],
  [0, 0, -1],
];
const CYCLE: Numbers = [
  [0, 0, 1],
  [1, 0, 0],
  [0, 1, 0],
];
const EXPLICIT: readonly (readonly [string, readonly Numbers[]])[] = [
  [
    'C2v',
    [
      [
        [-1, 0, 0],
        [0, -1, 0],
        [0, 0, 1],
      ],
      [
        [1, 0, 0],
        [0, -1, 0],
        [0, 0, 1],
      ],
    ],
  ],
  [
    'S4',
    [
      [
        [0, 1, 0],
        [-1, 0, 0],
        [0, 0, -1],
      ],
    ],
  ],
  [
    'D2d',
    [
      [
        [0, 1, 0],
        [-1, 0, 0],
        [0, 0, -1],
      ],
      [
        [1, 0, 0],
        [0, -1, 0],
        [0, 0, -1],
      ],
    ],
  ],
  [
    'D4h',
    [
      [
        [0, -1, 0],
        [1, 0, 0],
        [0, 0, 1],
      ],
      [
        [1, 0, 0],
        [0, -1, 0],
        [0, 0, -1],
      ],
      INVERSION,
    ],
  ],
  [
    'D6h',
    [
      [
        [0.5, -Math.sqrt(0.75), 0],
        [Math.sqrt(0.75), 0.5, 0],
        [0, 0, 1],
      ],
      [
        [1, 0, 0],
        [0, -1, 0],
        [0, 0, -1],
      ],
      INVERSION,
    ],
  ],
  [
    'T',
    [
      [
        [-1, 0, 0],
        [0, -1, 0],
        [0, 0, 1],
      ],
      CYCLE,
    ],
  ],
  [
    'Th',
    [
      [
        [-1, 0, 0],
        [0, -1, 0],
        [0, 0, 1],
      ],
      CYCLE,
      INVERSION,
    ],
  ],
  [
    'Td',
    [
      [
        [0, 1, 0],
        [-1, 0, 0],
        [0, 0, -1],
      ],
      CYCLE,
    ],
  ],
  [
    'O',
    [
      [
        [0, -1, 0],
        [1, 0, 0],
        [0, 0, 1],
      ],
      CYCLE,
    ],
  ],
  [
    'Oh',
    [
      [
        [0, -1, 0],
        [1, 0, 0],
        [0, 0, 1],
      ],
      CYCLE,
      INVERSION,
    ],
  ],
  [
    'Ih',
    [
      [
        [-1, 0, 0],
        [0, -1, 0],
        [0, 0, 1],
      ],
      CYCLE,
      [
        [0.5, COS5, -GOLDEN_HALF],
        [COS5, GOLDEN_HALF, 0.5],
        [GOLDEN_HALF, -0.5, COS5],
      ],
      INVERSION,
    ],
  ],
];

describe('point groups, element by element', () => {
  it.each(EXPLICIT)('%s', (name, generators) => {
    const group = loadCatalogueGroup(name);
    const mine = [...elements(generatorNumbers(group.action('space'), group.generators)).keys()].sort();
    expect(mine).toEqual([...elements(generators).keys()].sort());
  });
});

/** Herzberg, Infrared and Raman Spectra (1945); Wilson, Decius & Cross (1955); C60: Weeks & Harter, J. Chem. Phys. 90 (1989). */
const P = (1 + Math.sqrt(5)) / 2;
const MOLECULES: readonly (readonly [string, string, number, readonly (readonly number[])[]])[] = [
  [
    'water in the yz plane',
    'C2v',
    3,
    [
      [0, 0, 0],
      [0, 1, -1],
    ],
  ],
  [
    'water in the xz plane',
    'C2v',
    3,
    [
      [0, 0, 0],
      [1, 0, -1],
    ],
  ],
  [
    'ammonia',
    'C3v',
    4,
    [
      [0, 0, 1],
      [1, 0, 0],
    ],
  ],
  [
    'boron trifluoride',
    'D3h',
    4,
    [
      [0, 0, 0],
      [1, 0, 0],
    ],
  ],
  [
    'methane',
    'Td',
    5,
    [
      [0, 0, 0],
      [1, 1, 1],
    ],
  ],
  ['white phosphorus', 'Td', 4, [[1, 1, 1]]],
  [
    'xenon tetrafluoride',
    'D4h',
    5,
    [
      [0, 0, 0],
      [1, 0, 0],
    ],
  ],
  [
    'benzene',
    'D6h',
    12,
    [
      [1, 0, 0],
      [2, 0, 0],
    ],
  ],
  [
    'sulfur hexafluoride',
    'Oh',
    7,
    [
      [0, 0, 0],
      [1, 0, 0],
    ],
  ],
  [
    'cubane',
    'Oh',
    16,
    [
      [1, 1, 1],
      [2, 2, 2],
    ],
  ],
  [
    'adamantane',
    'Td',
    26,
    [
      [1, 1, 1],
      [2, 0, 0],
      [8 / 5, 8 / 5, 8 / 5],
      [13 / 5, 3 / 5, -3 / 5],
    ],
  ],
  [
    'dodecahedrane',
    'Ih',
    40,
    [
      [1, 1, 1],
      [2, 2, 2],
    ],
  ],
  [
    'icosahedral borane',
    'Ih',
    24,
    [
      [0, 1, P],
      [0, 2, 2 * P],
    ],
  ],
  ['buckminsterfullerene', 'Ih', 60, [[0, 1, 3 * P]]],
  [
    'nickel tetracarbonyl',
    'Td',
    9,
    [
      [0, 0, 0],
      [1, 1, 1],
      [2, 2, 2],
    ],
  ],
  [
    'phosphorus(III) oxide',
    'Td',
    10,
    [
      [1, 1, 1],
      [2, 0, 0],
    ],
  ],
  [
    'neopentane',
    'Td',
    17,
    [
      [0, 0, 0],
      [1, 1, 1],
      [8 / 5, 8 / 5, 2 / 5],
    ],
  ],
];

describe('seeds of molecules give all atoms', () => {
  it.each(MOLECULES)('%s under %s: %i atoms', (_, name, atoms, seeds) => {
    const group = loadCatalogueGroup(name);
    expect(orbit(generatorNumbers(group.action('space'), group.generators), seeds).length).toBe(atoms);
  });

  it('permutation actions of T, O, I and their extensions permute the corners named in their titles', () => {
    const corners: Readonly<Record<string, Numbers>> = {
      T: [
        [1, 1, 1],
        [1, -1, -1],
        [-1, 1, -1],
        [-1, -1, 1],
      ],
      O: [
        [1, 0, 0],
        [-1, 0, 0],
        [0, 1, 0],
        [0, -1, 0],
        [0, 0, 1],
        [0, 0, -1],
      ],
      I: [
        [0, 1, P],
        [0, 1, -P],
        [0, -1, P],
        [0, -1, -P],
        [P, 0, 1],
        [-P, 0, 1],
        [P, 0, -1],
        [-P, 0, -1],
        [1, P, 0],
        [1, -P, 0],
        [-1, P, 0],
        [-1, -P, 0],
      ],
    };
    for (const [name, of] of [
      ['T', 'T'],
      ['Td', 'T'],
      ['O', 'O'],
      ['Oh', 'O'],
      ['Th', 'O'],
      ['I', 'I'],
      ['Ih', 'I'],
    ] as const) {
      const group = loadCatalogueGroup(name);
      for (const g of group.generators) {
        const m = numbers(group.action('space').matrices.get(g)!);
        corners[of]!.forEach((x, k) => {
          const to = corners[of]![group.action('permutation').permutations!.get(g)![k]!]!;
          apply(m, x).forEach((y, c) => {
            expect(y).toBeCloseTo(to[c]!, 12);
          });
        });
      }
    }
  });
});

describe('the list', () => {
  it('has one entry per file, each with a title and a source', () => {
    const files = readdirSync(new URL('../../groups', import.meta.url)).filter((f) => f.endsWith('.json'));
    const list = listCatalogue();
    expect(list.length).toBe(files.length);
    expect(new Set(list.map((e) => e.name)).size).toBe(files.length);
    for (const entry of list) expect([entry.title, entry.source].every((x) => x.length > 5)).toBe(true);
  });

  it('the evaluator of these tests reads nested texts', () => {
    expect(evaluate('-(1+sqrt(5))/4')).toBeCloseTo(-GOLDEN_HALF, 14);
    expect(evaluate('2^3-2*3/4')).toBeCloseTo(6.5, 14);
    expect(() => evaluate('1 2')).toThrow();
  });
});
