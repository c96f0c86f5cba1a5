import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { CyclotomicField } from '../../src/field/index.ts';
import { characterTable } from '../../src/group/index.ts';
import {
  expandFraction,
  GradedDimensions,
  InvariantSpaces,
  type LinearAction,
  linearAction,
  molien,
  sumOfActions,
} from '../../src/invariant/index.ts';
import {
  binaryCodes,
  binaryIcosahedral,
  binaryOctahedral,
  binaryTetrahedral,
  chain,
  complexAction,
  copies,
  coxeter,
  cyclicPlane,
  diagonal,
  dicyclic,
  dihedralPlane,
  leftQuaternions,
  mat,
  minusOne,
  O,
  Oh,
  permutation,
  Q,
  quaternaryCodes,
  quaternionPlane,
  symmetric,
  T,
  Td,
  Th,
  ternaryCodes,
} from './actions.ts';

interface Series {
  name: string;
  kind: 'invariants' | 'equivariants';
  group_order: number;
  numerator: Record<string, number>;
  denominator_degrees: number[];
  coeffs_0_24: number[];
}
const data = JSON.parse(readFileSync(new URL('../data/molien-series.json', import.meta.url), 'utf8')) as {
  series: Series[];
  coxeter: { type: string; degrees: number[]; order: number }[];
};

const alternating4 = () => copies([permutation([1, 2, 0, 3]), permutation([1, 0, 3, 2])]);
const alternating5 = () => copies([permutation([1, 2, 3, 4, 0]), permutation([1, 2, 0, 3, 4])]);
const a = (rank: number) => coxeter(rank, chain(new Array<number>(rank - 1).fill(3)));
const h3 = coxeter(3, chain([5, 3]));

const actions: Record<string, () => LinearAction> = {
  ...Object.fromEntries([3, 4, 5, 7, 8].map((n) => [`C_${n} on R^2 (rotation)`, () => copies(cyclicPlane(n))])),
  'C_2 = -1 on R^2': () => copies([minusOne(2)]),
  '-1 on R^3': () => copies([minusOne(3)]),
  ...Object.fromEntries([4, 5, 6, 7].map((n) => [`D_${n} on R^2`, () => copies(dihedralPlane(n))])),
  ...Object.fromEntries([3, 4, 5, 6].map((n) => [`D_${n} on R^2: equivariants R^2->R^2`, () => copies(dihedralPlane(n))])),
  ...Object.fromEntries([4, 5, 6].map((n) => [`C_${n} on R^2: equivariants R^2->R^2`, () => copies(cyclicPlane(n))])),
  ...Object.fromEntries([2, 3, 4].map((n) => [`C_${n} scalar on C^2: diag(z,z)`, () => diagonal(n, [1, 1])])),
  ...Object.fromEntries([3, 4, 5].map((n) => [`C_${n} in SL(2,C): diag(z,1/z)`, () => diagonal(n, [1, n - 1])])),
  ...Object.fromEntries([3, 4, 5].map((n) => [`D_${n} diagonal on R^2+R^2 (q,p)`, () => copies(dihedralPlane(n), 2)])),
  ...Object.fromEntries([3, 4, 5].map((n) => [`C_${n} diagonal on R^2+R^2 (q,p)`, () => copies(cyclicPlane(n), 2)])),
  'C_3 on R^2+R^2 = C_3 diag: same': () => copies(cyclicPlane(3), 2),
  'O on R^3': () => copies(O),
  'T on R^3': () => copies(T),
  'T_h on R^3': () => copies(Th),
  'T_d on R^3 (=A3)': () => copies(Td),
  'O_h on R^3: equivariants R^3->R^3': () => copies(Oh),
  'T_d on R^3: equivariants': () => copies(Td),
  'O_h diagonal on R^3+R^3 (q,p)': () => copies(Oh, 2),
  'O diagonal on R^3+R^3 (q,p)': () => copies(O, 2),
  'T_d diagonal on R^3+R^3 (q,p)': () => copies(Td, 2),
  'I_h on R^3 (=H3)': () => copies(h3),
  'I_h on R^3: equivariants': () => copies(h3),
  'I_h diagonal on R^3+R^3 (q,p)': () => copies(h3, 2),
  'S_3 permutation rep on R^3': () => copies(symmetric(3)),
  'S_5 permutation rep on R^5': () => copies(symmetric(5)),
  'S_3 standard rep on R^2 (=A2)': () => copies(a(2)),
  'S_4 standard rep on R^3 (=A3)': () => copies(a(3)),
  'S_5 standard rep on R^4 (=A4)': () => copies(a(4)),
  'S_4 standard: equivariants': () => copies(a(3)),
  'S_5 standard: equivariants': () => copies(a(4)),
  'A_4 permutation rep': alternating4,
  'A_5 permutation rep': alternating5,
  'C_4 cyclic permutation rep': () => copies([permutation([1, 2, 3, 0])]),
  'S_3 diagonal on two copies of R^3 (permutation)': () => copies(symmetric(3), 2),
  'S_3 diagonal on two copies of standard R^2': () => copies(a(2), 2),
  'S_4 diagonal on two copies of standard R^3': () => copies(a(3), 2),
  'Q8 on C^2': quaternionPlane,
  'Dic_2 (binary dihedral, order 8) on C^2': () => dicyclic(2),
  'Dic_3 (binary dihedral, order 12) on C^2': () => dicyclic(3),
  'Dic_4 (binary dihedral, order 16) on C^2': () => dicyclic(4),
  'Dic_6 (binary dihedral, order 24) on C^2': () => dicyclic(6),
  '2T on C^2': binaryTetrahedral,
  '2O on C^2': binaryOctahedral,
  '2I on C^2': binaryIcosahedral,
  '2T on R^4=H': () => leftQuaternions(true),
  'order-16 code group <H2,diag(1,-1)> (binary self-dual)': binaryCodes,
  'order-48 code group <H3,diag(1,w)> (ternary self-dual)': ternaryCodes,
  'order-12 code group <(1/2)[[1,3],[1,-1]],diag(1,-1)> (GF(4) Hermitian)': quaternaryCodes,
};

describe('Molien series in the literature (sources in test/data/molien-series.json)', () => {
  it('most of the list can be built here', () => {
    expect(data.series.filter((s) => actions[s.name] === undefined).map((s) => s.name)).toEqual(['Dic_3 on R^4=H']);
  });
  it.each(data.series.filter((s) => actions[s.name] !== undefined).map((s) => [s.name, s] as const))('%s', (name, fact) => {
    const action = actions[name]!();
    expect(action.group.order).toBe(fact.group_order);
    const found = molien(action, { degree: 24, ...(fact.kind === 'equivariants' ? { target: action } : {}) });
    expect(found.series).toEqual(fact.coeffs_0_24);
    expect(expandFraction(found.numerator, found.denominator, 24)).toEqual(fact.coeffs_0_24);
    // another denominator may serve; the published one does in all cases but one
    if (name === 'C_4 cyclic permutation rep') expect(found.denominator).toEqual([1, 2, 2, 4]);
    else {
      expect(found.denominator).toEqual(fact.denominator_degrees);
      expect(found.numerator.flatMap((c, d) => (c === 0 ? [] : [[`${d}`, c]]))).toEqual(Object.entries(fact.numerator));
    }
    expect(found.numerator.every((c) => c >= 0)).toBe(true);
  });
});

describe('Coxeter groups (Humphreys 1990, 3.7 table 1): 1/Π(1 - t^d)', () => {
  const diagrams: Record<string, () => ReturnType<typeof coxeter>> = {
    A1: () => coxeter(1, []),
    ...Object.fromEntries([2, 3, 4, 5].map((n) => [`A${n}`, () => a(n)])),
    ...Object.fromEntries([2, 3, 4].map((n) => [`B${n}`, () => coxeter(n, chain([...new Array<number>(n - 2).fill(3), 4]))])),
    D4: () => coxeter(4, [[0, 2, 3], [1, 2, 3], [2, 3, 3]]), // biome-ignore format: a diagram
    D5: () => coxeter(5, [[0, 2, 3], [1, 2, 3], [2, 3, 3], [3, 4, 3]]), // biome-ignore format: a diagram
    F4: () => coxeter(4, chain([3, 4, 3])),
    G2: () => coxeter(2, chain([6])),
    H3: () => h3,
    H4: () => coxeter(4, chain([5, 3, 3])),
    'I2(5)': () => coxeter(2, chain([5])),
    'I2(7)': () => coxeter(2, chain([7])),
    'I2(8)': () => coxeter(2, chain([8])),
  };
  it.each(data.coxeter.filter((c) => diagrams[c.type] !== undefined).map((c) => [c.type, c] as const))('%s', (type, fact) => {
    const action = copies(diagrams[type]!());
    expect(action.group.order).toBe(fact.order);
    const found = molien(action, { degree: 30 });
    expect(found.denominator).toEqual(fact.degrees);
    expect(found.numerator).toEqual([1]);
  });
});

describe('twisted series', () => {
  it('all characters of D_3 together rebuild all polynomials: Σ χ(1) M_χ(t) = 1/(1 - t)^n', () => {
    const action = copies(dihedralPlane(3), 2);
    const table = characterTable(action.group);
    const sums = new Array<number>(9).fill(0);
    table.values.forEach((values, i) => {
      const degree = table.degrees[i]!;
      const { series } = molien(action, { degree: 8, character: { field: table.field, values, degree } });
      for (let d = 0; d <= 8; d++) sums[d] = sums[d]! + degree * series[d]!;
    });
    expect(sums).toEqual(Array.from({ length: 9 }, (_, d) => ((d + 1) * (d + 2) * (d + 3)) / 6));
  });
  it('complex characters of C_5 on the plane: z and its conjugate first occur in degree 1, z^2 in degree 2', () => {
    const action = copies(cyclicPlane(5));
    const table = characterTable(action.group);
    const first = table.values.map((values) =>
      molien(action, { degree: 4, character: { field: table.field, values, degree: 1 } }).series.findIndex((c) => c > 0),
    );
    expect(first.sort()).toEqual([0, 1, 1, 2, 2]);
  });
});

describe('degenerate actions', () => {
  it('no coordinates, the trivial group, a group that acts trivially', () => {
    const none = linearAction(Q, [], copies([minusOne(1)]).group, [mat(Q, [])]);
    expect(molien(none)).toMatchObject({ numerator: [1], denominator: [], text: '1' });
    const trivial = copies([mat(Q, [[1, 0], [0, 1]])]); // biome-ignore format: a matrix
    expect(molien(trivial, { degree: 3 })).toMatchObject({
      numerator: [1],
      denominator: [1, 1],
      series: [1, 2, 3, 4],
      text: '1/(1 - t)^2',
    });
    const two = copies([minusOne(1)]);
    const idle = linearAction(Q, ['x'], two.group, [mat(Q, [[1]])]);
    expect(new GradedDimensions(idle).kernelOrder).toBe(2);
    expect(molien(idle, { degree: 2 }).series).toEqual([1, 1, 1]);
    expect(molien(sumOfActions(two, idle), { degree: 4 }).series).toEqual([1, 1, 2, 2, 3]);
  });
  it('text and LaTeX', () => {
    const m = molien(copies(dihedralPlane(3), 2));
    expect(m.text).toBe('(1 + t^2 + 2t^3 + t^4 + t^6)/((1 - t^2)^2(1 - t^3)^2)');
    expect(m.latex).toBe('\\frac{1 + t^{2} + 2t^{3} + t^{4} + t^{6}}{(1 - t^{2})^{2}(1 - t^{3})^{2}}');
  });
});

describe('two routes: Molien against linear algebra', () => {
  it.each([
    ['D_5 2+2', () => copies(dihedralPlane(5), 2), 6],
    ['T_d 3+3', () => copies(Td, 2), 4],
    ['H3', () => copies(h3), 7],
    ['2T on H', () => leftQuaternions(true), 6],
    ['2T on C^2', binaryTetrahedral, 8],
    ['diag(z, z^2, w) of order 6', () => complexAction(CyclotomicField.of(6), diagonal(6, [1, 2, 3]).generatorMatrices), 6],
  ] as const)('%s: a basis of each degree has the dimension that the series says', (_, make, top) => {
    const action = make();
    const spaces = new InvariantSpaces(action);
    const { series } = molien(action, { degree: top });
    for (let d = 0; d <= top; d++) {
      const basis = spaces.basisOfDegree(d);
      expect(basis.length).toBe(series[d]);
      for (const { polynomial } of basis)
        for (const g of action.generatorMatrices)
          expect(spaces.ring.equal(spaces.ring.linearSubstitution(polynomial, g), polynomial)).toBe(true);
    }
  });
});
