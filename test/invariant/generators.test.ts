import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { FixedForms } from '../../src/invariant/fixed-forms.ts';
import {
  expandFraction,
  findLetters,
  InvariantSpaces,
  isParameterSystem,
  type LinearAction,
  linearAction,
  minimalGenerators,
  molien,
} from '../../src/invariant/index.ts';
import { MonomialLayers } from '../../src/invariant/monomial-layers.ts';
import { build, rank } from '../../src/linear/index.ts';
import {
  binaryOctahedral,
  binaryTetrahedral,
  chain,
  copies,
  coxeter,
  cyclicPlane,
  diagonal,
  dihedralPlane,
  leftQuaternions,
  mat,
  minusOne,
  O,
  Oh,
  permutation,
  Q,
  quaternionPlane,
  symmetric,
  T,
  Td,
} from './actions.ts';

interface Counts {
  name: string;
  order: number;
  to: number;
  byDegree: Record<string, number>;
}
const facts = (JSON.parse(readFileSync(new URL('../data/molien-series.json', import.meta.url), 'utf8')) as { generators: Counts[] })
  .generators;

const actions: Record<string, () => LinearAction> = {
  ...Object.fromEntries([3, 4, 5, 6].map((n) => [`C_${n} on R^2 (rotation)`, () => copies(cyclicPlane(n))])),
  ...Object.fromEntries([3, 4, 5, 6].map((n) => [`D_${n} on R^2`, () => copies(dihedralPlane(n))])),
  ...Object.fromEntries([3, 4, 5].map((n) => [`C_${n} diagonal on R^2+R^2 (q,p)`, () => copies(cyclicPlane(n), 2)])),
  ...Object.fromEntries([3, 4, 5, 6].map((n) => [`D_${n} diagonal on R^2+R^2 (q,p)`, () => copies(dihedralPlane(n), 2)])),
  'O on R^3': () => copies(O),
  'O_h on R^3 (=B3)': () => copies(Oh),
  'T on R^3': () => copies(T),
  'O_h diagonal on R^3+R^3 (q,p)': () => copies(Oh, 2),
  'Q8 on C^2': quaternionPlane,
  'Q8 on R^4=H (real irrep of quaternionic type)': () => leftQuaternions(false),
  '2T on C^2': binaryTetrahedral,
  '2O on C^2': binaryOctahedral,
  'S_3 diagonal on two copies of R^3 (permutation)': () => copies(symmetric(3), 2),
  'C_4 cyclic permutation rep': () => copies([permutation([1, 2, 3, 0])]),
  'C_3 cyclic permutation rep': () => copies([permutation([1, 2, 0])]),
  'C_3 scalar on C^2: diag(z,z)': () => diagonal(3, [1, 1]),
};

/** Every generator is invariant, and none is a repeat. */
function check(action: LinearAction, set: ReturnType<typeof minimalGenerators>): void {
  const { ring } = set.spaces;
  for (const { polynomial, degree } of set.generators) {
    expect(ring.degree(polynomial)).toBe(degree);
    for (const g of action.generatorMatrices) expect(ring.equal(ring.linearSubstitution(polynomial, g), polynomial)).toBe(true);
  }
  expect(new Set(set.generators.map((g) => g.name)).size).toBe(set.generators.length);
}

describe('minimal generators by degree (computed elsewhere modulo primes; Noether, Weyl and Klein for completeness)', () => {
  it.each(facts.map((f) => [f.name, f] as const))('%s', (name, fact) => {
    const action = actions[name]!();
    const set = minimalGenerators(action);
    check(action, set);
    expect(set.complete).toBe(true);
    const counts: Record<string, number> = {};
    for (const g of set.generators) counts[g.degree] = (counts[g.degree] ?? 0) + 1;
    expect(counts).toEqual(fact.byDegree);
    // the same, only up to a degree
    const most = Math.max(...set.generators.map((g) => g.degree));
    const partial = minimalGenerators(action, { degree: most });
    expect(partial.generators.map((g) => g.degree)).toEqual(set.generators.map((g) => g.degree));
  });
});

describe('proofs', () => {
  it('Hironaka: the degrees rebuild the series of O_h on R^3 + R^3', () => {
    const action = copies(Oh, 2);
    const set = minimalGenerators(action);
    expect(set.proof).toContain('Hironaka');
    const { parameters, secondaryDegrees } = set.hironaka!;
    const numerator: number[] = [];
    for (const d of secondaryDegrees) numerator[d] = (numerator[d] ?? 0) + 1;
    const series = expandFraction(
      Array.from(numerator, (c) => c ?? 0),
      parameters.map((f) => f.degree),
      24,
    );
    expect(series).toEqual(molien(action, { degree: 24 }).series);
  });
  it('T_d on R^3 + R^3: 2·3·4 = 24 on each half; generators are the polarisations (Weyl 1939, from memory)', () => {
    const set = minimalGenerators(copies(Td, 2));
    expect(set.complete).toBe(true);
    expect(set.generators.map((g) => g.degree)).toEqual([2, 2, 2, 3, 3, 3, 3, 4, 4, 4, 4, 4]);
  });
  it('reflection groups: independent invariants whose degrees multiply to the order', () => {
    for (const [generators, degrees] of [
      [coxeter(3, chain([5, 3])), [2, 6, 10]],
      [coxeter(4, chain([3, 3, 3])), [2, 3, 4, 5]],
      [symmetric(5), [1, 2, 3, 4, 5]],
      [dihedralPlane(12), [2, 12]],
    ] as const) {
      const action = copies(generators);
      const set = minimalGenerators(action);
      check(action, set);
      expect(set.complete).toBe(true);
      expect(set.generators.map((g) => g.degree)).toEqual(degrees);
    }
  });
  it("Noether's bound where it is near: 2T on H has 8 - 1 generators of degree 6", () => {
    const set = minimalGenerators(leftQuaternions(true));
    expect(set.complete).toBe(true);
    // degree 6 holds 8 invariants, one of them the cube of the norm
    expect(set.generators.filter((g) => g.degree <= 6).map((g) => g.degree)).toEqual([2, 6, 6, 6, 6, 6, 6, 6]);
  });
  it('what is out of reach is said: D_6 permuting six sites, q and p', () => {
    const action = copies([permutation([1, 2, 3, 4, 5, 0]), permutation([0, 5, 4, 3, 2, 1])], 2);
    const set = minimalGenerators(action, { degree: 3 });
    expect(set.complete).toBe(false);
    expect(set.upTo).toBe(3);
    expect(set.proof).toContain('at most 3');
    check(action, set);
    // the linear ones, and the missing quadratic ones: 4 + 4 + 4 invariants less 3 products (q^2, qp, p^2 of the sums)
    expect(set.generators.filter((g) => g.degree === 1)).toHaveLength(2);
    expect(set.generators.filter((g) => g.degree === 2)).toHaveLength(molien(action, { degree: 2 }).series[2]! - 3);
  });
});

describe('degenerate actions', () => {
  it('no coordinates; the trivial group; a group that acts trivially', () => {
    const none = linearAction(Q, [], copies([minusOne(1)]).group, [mat(Q, [])]);
    expect(minimalGenerators(none)).toMatchObject({ generators: [], complete: true });
    const trivial = copies([mat(Q, [[1, 0], [0, 1]])]); // biome-ignore format: a matrix
    expect(minimalGenerators(trivial).generators.map((g) => g.readable.real)).toEqual(['q1', 'q2']);
  });
  it('-1 on R^3: all quadratic monomials', () => {
    const set = minimalGenerators(copies([minusOne(3)]));
    expect(set.complete).toBe(true);
    expect(set.generators.map((g) => g.readable.real)).toEqual(['q1^2', 'q1*q2', 'q1*q3', 'q2^2', 'q2*q3', 'q3^2']);
  });
});

describe('readable forms', () => {
  it('D_3 on the plane: |z|^2 and Re z^3, named I and R', () => {
    const set = minimalGenerators(copies(dihedralPlane(3)));
    expect(set.generators.map((g) => [g.name, g.readable.real, g.readable.complex])).toEqual([
      ['I', 'q1^2 + q2^2', '|z|^2'],
      ['R', 'q1^3 - 3*q1*q2^2', 'Re(z^3)'],
    ]);
    expect(set.generators[1]!.readable.complexLatex).toBe('\\operatorname{Re} z^{3}');
    expect(minimalGenerators(copies(dihedralPlane(3)), { reserved: ['R'] }).generators.map((g) => g.name)).toEqual(['I1', 'I2']);
  });
  it('C_4 on the plane: I, R and S', () => {
    const set = minimalGenerators(copies(cyclicPlane(4)));
    expect(set.generators.map((g) => [g.name, g.readable.complex])).toEqual([
      ['I', '|z|^2'],
      ['R', 'Re(z^4)'],
      ['S', 'Im(z^4)'],
    ]);
  });
  it('D_3 on R^2 + R^2: q·q, q·p, p·p, then the polarisations of Re z^3', () => {
    const set = minimalGenerators(copies(dihedralPlane(3), 2));
    expect(set.generators.map((g) => g.readable.complex)).toEqual([
      '|z|^2',
      'Re(z*conj(w))',
      '|w|^2',
      'Re(z^3)',
      'Re(z^2*w)',
      'Re(z*w^2)',
      'Re(w^3)',
    ]);
    expect(set.generators[1]!.readable.real).toBe('q1*p1 + q2*p2');
  });
  it('letters exist for planes and for signed permutations, not for the icosahedral group', () => {
    expect(findLetters(copies(dihedralPlane(5), 2))!.planes).toEqual([[0, 1], [2, 3]]); // biome-ignore format: pairs
    expect(findLetters(copies(Oh))!.planes).toEqual([]);
    expect(findLetters(copies(coxeter(3, chain([5, 3]))))).toBeUndefined();
  });
  it('sites that move in the plane: three masses with D_3 permuting and turning them', () => {
    const [r, s] = dihedralPlane(3);
    const sites = (images: number[], g: typeof r) =>
      build(g!.field, 6, 6, (i, j) => (Math.floor(i / 2) === images[Math.floor(j / 2)] ? g!.data[(i % 2) * 2 + (j % 2)]! : g!.field.zero));
    const action = copies([sites([1, 2, 0], r), sites([0, 2, 1], s)]);
    expect(findLetters(action)!.planes).toHaveLength(3);
    const spaces = new InvariantSpaces(action);
    for (let d = 0; d <= 3; d++) expect(spaces.basisOfDegree(d)).toHaveLength(molien(action, { degree: 3 }).series[d]!);
  });
});

describe('two routes to a basis: orbit sums and kernels span the same space', () => {
  it.each([
    ['D_4 2+2', () => copies(dihedralPlane(4), 2), [2, 2]],
    ['D_5 2+2', () => copies(dihedralPlane(5), 2), [3, 2]],
    ['C_3 2+2', () => copies(cyclicPlane(3), 2), [2, 1]],
    ['O_h 3+3', () => copies(Oh, 2), [3, 3]],
    ['S_3 3+3', () => copies(symmetric(3), 2), [2, 2]],
  ] as const)('%s', (_, make, degrees) => {
    const action = make();
    const spaces = new InvariantSpaces(action);
    expect(spaces.letters).toBeDefined();
    const first = spaces.basis(degrees).map((b) => b.polynomial);
    const second = new FixedForms(
      action,
      spaces.ring,
      action.blocks.map((b) => new MonomialLayers(b.length)),
    ).basis(degrees);
    expect(second.length).toBe(first.length);
    const both = [...first, ...second];
    const monomials = [...new Set(both.flatMap((p) => p.monomials))];
    const m = build(action.field, both.length, monomials.length, (i, j) => spaces.ring.coefficient(both[i]!, monomials[j]!));
    expect(rank(m)).toBe(first.length);
  });
});

describe('systems of parameters (Macaulay)', () => {
  it('x^2 + y^2 with Re z^3 has the common zero 0 only; with its square it has more', () => {
    const action = copies(dihedralPlane(3));
    const [i, r] = minimalGenerators(action).generators.map((g) => g.polynomial);
    const { ring } = new InvariantSpaces(action);
    expect(isParameterSystem(action, [0, 1], [i!, r!])).toBe(true);
    expect(isParameterSystem(action, [0, 1], [i!, ring.mul(i!, i!)])).toBe(false);
    expect(isParameterSystem(action, [0, 1], [i!])).toBe(false);
  });
});
