import { describe, expect, it } from 'vitest';
import type { LinearAction } from '../../src/invariant/linear-action.ts';
import { isotropyLattice } from '../../src/normalform/isotropy.ts';
import {
  cyclic,
  dihedral,
  dihedralTwice,
  icosahedral,
  octahedral,
  octahedralFull,
  quaternionGroup,
  signs,
  symmetric,
  tetrahedral,
  tetrahedralFull,
  trivial,
} from './actions.ts';

/** order, dim Fix, conjugates, |N/Σ| of each class, with the covering pairs. */
type Table = readonly (readonly [number, number, number, number])[];
const cases: readonly [string, () => LinearAction, Table, readonly string[]][] = [
  [
    'D_3 on R^2',
    () => dihedral(3),
    [
      [6, 0, 1, 1],
      [2, 1, 3, 1],
      [1, 2, 1, 6],
    ],
    ['6>2', '2>1'],
  ],
  [
    'D_4 on R^2',
    () => dihedral(4),
    [
      [8, 0, 1, 1],
      [2, 1, 2, 2],
      [2, 1, 2, 2],
      [1, 2, 1, 8],
    ],
    ['8>2', '8>2', '2>1', '2>1'],
  ],
  [
    'D_5 on R^2',
    () => dihedral(5),
    [
      [10, 0, 1, 1],
      [2, 1, 5, 1],
      [1, 2, 1, 10],
    ],
    ['10>2', '2>1'],
  ],
  [
    'D_6 on R^2',
    () => dihedral(6),
    [
      [12, 0, 1, 1],
      [2, 1, 3, 2],
      [2, 1, 3, 2],
      [1, 2, 1, 12],
    ],
    ['12>2', '12>2', '2>1', '2>1'],
  ],
  [
    'D_7 on R^2',
    () => dihedral(7),
    [
      [14, 0, 1, 1],
      [2, 1, 7, 1],
      [1, 2, 1, 14],
    ],
    ['14>2', '2>1'],
  ],
  [
    'C_3 on R^2',
    () => cyclic(3),
    [
      [3, 0, 1, 1],
      [1, 2, 1, 3],
    ],
    ['3>1'],
  ],
  [
    'C_4 on R^2',
    () => cyclic(4),
    [
      [4, 0, 1, 1],
      [1, 2, 1, 4],
    ],
    ['4>1'],
  ],
  [
    'C_5 on R^2',
    () => cyclic(5),
    [
      [5, 0, 1, 1],
      [1, 2, 1, 5],
    ],
    ['5>1'],
  ],
  [
    'O (24) on R^3',
    octahedral,
    [
      [24, 0, 1, 1],
      [4, 1, 3, 2],
      [3, 1, 4, 2],
      [2, 1, 6, 2],
      [1, 3, 1, 24],
    ],
    ['24>4', '24>3', '24>2', '4>1', '3>1', '2>1'],
  ],
  [
    'O_h (48) on R^3',
    octahedralFull,
    [
      [48, 0, 1, 1],
      [8, 1, 3, 2],
      [6, 1, 4, 2],
      [4, 1, 6, 2],
      [2, 2, 3, 8],
      [2, 2, 6, 4],
      [1, 3, 1, 48],
    ],
    ['48>8', '48>6', '48>4', '8>2', '8>2', '6>2', '4>2', '4>2', '2>1', '2>1'],
  ],
  [
    'T_d (24) on R^3',
    tetrahedralFull,
    [
      [24, 0, 1, 1],
      [6, 1, 4, 1],
      [4, 1, 3, 2],
      [2, 2, 6, 2],
      [1, 3, 1, 24],
    ],
    ['24>6', '24>4', '6>2', '4>2', '2>1'],
  ],
  [
    'T (12) on R^3',
    tetrahedral,
    [
      [12, 0, 1, 1],
      [3, 1, 4, 1],
      [2, 1, 3, 2],
      [1, 3, 1, 12],
    ],
    ['12>3', '12>2', '3>1', '2>1'],
  ],
  [
    'I (60) on R^3',
    icosahedral,
    [
      [60, 0, 1, 1],
      [5, 1, 6, 2],
      [3, 1, 10, 2],
      [2, 1, 15, 2],
      [1, 3, 1, 60],
    ],
    ['60>5', '60>3', '60>2', '5>1', '3>1', '2>1'],
  ],
  [
    'S_3 standard on R^2',
    () => symmetric(3),
    [
      [6, 0, 1, 1],
      [2, 1, 3, 1],
      [1, 2, 1, 6],
    ],
    ['6>2', '2>1'],
  ],
  [
    'S_4 standard on R^3',
    () => symmetric(4),
    [
      [24, 0, 1, 1],
      [6, 1, 4, 1],
      [4, 1, 3, 2],
      [2, 2, 6, 2],
      [1, 3, 1, 24],
    ],
    ['24>6', '24>4', '6>2', '4>2', '2>1'],
  ],
  [
    'S_5 standard on R^4',
    () => symmetric(5),
    [
      [120, 0, 1, 1],
      [24, 1, 5, 1],
      [12, 1, 10, 1],
      [6, 2, 10, 2],
      [4, 2, 15, 2],
      [2, 3, 10, 6],
      [1, 4, 1, 120],
    ],
    ['120>24', '120>12', '24>6', '24>4', '12>6', '12>4', '6>2', '4>2', '2>1'],
  ],
  [
    'Q8 on R^4',
    quaternionGroup,
    [
      [8, 0, 1, 1],
      [1, 4, 1, 8],
    ],
    ['8>1'],
  ],
  [
    'D_3 diagonal on R^2+R^2',
    () => dihedralTwice(3),
    [
      [6, 0, 1, 1],
      [2, 2, 3, 1],
      [1, 4, 1, 6],
    ],
    ['6>2', '2>1'],
  ],
  [
    'D_4 diagonal on R^2+R^2',
    () => dihedralTwice(4),
    [
      [8, 0, 1, 1],
      [2, 2, 2, 2],
      [2, 2, 2, 2],
      [1, 4, 1, 8],
    ],
    ['8>2', '8>2', '2>1', '2>1'],
  ],
  [
    'D_5 diagonal on R^2+R^2',
    () => dihedralTwice(5),
    [
      [10, 0, 1, 1],
      [2, 2, 5, 1],
      [1, 4, 1, 10],
    ],
    ['10>2', '2>1'],
  ],
];

describe('Golubitsky, Stewart, Schaeffer 1988, ch. XIII; Melbourne 1986; Field and Richardson 1989 (places from memory): isotropy subgroups', () => {
  it.each(cases)('%s', (_, make, table, edges) => {
    const lattice = isotropyLattice(make());
    const rows = (t: Table) => t.map((r) => r.join(',')).sort();
    expect(rows(lattice.classes.map((c) => [c.order, c.fixedDimension, c.conjugates, c.normaliserQuotient]))).toEqual(rows(table));
    expect(lattice.edges.map(([i, j]) => `${lattice.classes[i]!.order}>${lattice.classes[j]!.order}`).sort()).toEqual([...edges].sort());
  });
  it('the axial flag, the exact fixed space and orbits times isotropy', () => {
    for (const make of [() => dihedral(6), octahedralFull, () => symmetric(5)]) {
      const action = make();
      for (const c of isotropyLattice(action).classes) {
        expect(c.axial).toBe(c.fixedDimension === 1);
        expect(c.fixedSpace.cols).toBe(c.fixedDimension);
        expect(c.order * c.conjugates * c.normaliserQuotient).toBe(action.group.order);
        for (const g of c.elements)
          for (let j = 0; j < c.fixedSpace.cols; j++) {
            const v = Array.from({ length: action.dimension }, (_, i) => c.fixedSpace.data[i * c.fixedSpace.cols + j]!);
            const w = Array.from({ length: action.dimension }, (_, i) =>
              v.reduce(
                (s, x, k) => action.field.add(s, action.field.mul(action.matrix(g).data[i * action.dimension + k]!, x)),
                action.field.zero,
              ),
            );
            expect(w.every((x, i) => action.field.equal(x, v[i]!))).toBe(true);
          }
      }
    }
  });
  it('the trivial group on a line, on a plane, and a line fixed by an element of order two', () => {
    expect(isotropyLattice(trivial(1)).classes.map((c) => [c.order, c.fixedDimension, c.axial])).toEqual([[1, 1, true]]);
    expect(isotropyLattice(trivial(2)).classes.map((c) => [c.order, c.fixedDimension, c.axial])).toEqual([[1, 2, false]]);
    expect(isotropyLattice(signs([-1, 1])).classes.map((c) => [c.order, c.fixedDimension, c.axial])).toEqual([
      [2, 1, true],
      [1, 2, false],
    ]);
  });
});
