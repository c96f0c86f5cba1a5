import { describe, expect, it } from 'vitest';
import { LimitError } from '../../src/errors/errors.ts';
import { generate, leftCosets, normalizer, productOf } from '../../src/group/generate.ts';
import type { FiniteGroup } from '../../src/group/group.ts';
import { isSubconjugate, normalizerOrder, subgroup, subgroupClasses } from '../../src/group/subgroups.ts';
import * as make from './permutations.ts';

const divisorSum = (n: number, power: number): number =>
  Array.from({ length: n }, (_, i) => (n % (i + 1) === 0 ? (i + 1) ** power : 0)).reduce((s, x) => s + x, 0);

describe('subgroups up to conjugacy', () => {
  it.each([
    ['trivial', { degree: 0, generators: [] }, 1, 1],
    ['S3', make.symmetric(3), 4, 6],
    ['A4', make.alternating(4), 5, 10],
    ['S4', make.symmetric(4), 11, 30],
    ['A5', make.alternating(5), 9, 59],
    ['S5', make.symmetric(5), 19, 156],
    ['A6', make.alternating(6), 22, 501],
    ['S6', make.symmetric(6), 56, 1455],
    ['Q8', make.quaternion(), 6, 6],
    ['D4', make.dihedral(4), 8, 10],
    ['SL(2,3)', make.special(3), 7, 15],
    ['SL(2,5)', make.special(5), 12, 76],
    ['O_h', make.coxeterB3(), 33, 98],
    ['I_h', make.coxeterH3(), 22, 164],
  ])(
    '%s: classes and subgroups (G. Pfeiffer, tables of marks; International Tables A for O_h; from memory)',
    (_, g, classes, subgroups) => {
      const group = make.close(g);
      const list = subgroupClasses(group);
      expect([list.length, list.reduce((s, h) => s + h.conjugates, 0)]).toEqual([classes, subgroups]);
      checkClasses(group, list);
    },
  );

  it.each([3, 6, 12, 30])(
    'dihedral of order 2 * %i has d(n) + sigma(n) subgroups (S. Cavior, The subgroups of the dihedral group, 1975; from memory)',
    (n) => {
      const list = subgroupClasses(make.close(make.dihedral(n)));
      expect(list.reduce((s, h) => s + h.conjugates, 0)).toBe(divisorSum(n, 0) + divisorSum(n, 1));
    },
  );

  it.each([
    [3, 16],
    [4, 67],
    [5, 374],
  ])('C2^%i has %i subgroups (Galois numbers, J. Goldman and G.-C. Rota 1969; from memory)', (k, count) => {
    const list = subgroupClasses(make.close(make.disjoint(...Array.from({ length: k }, () => make.cyclic(2)))));
    expect(list.length).toBe(count);
    expect(list.every((h) => h.conjugates === 1)).toBe(true);
  });

  it.each([
    ['D6 x C2', make.disjoint(make.dihedral(6), make.cyclic(2))],
    ['2^{1+4}-', make.extraspecialMinus()],
    ['C4 x C2', make.disjoint(make.cyclic(4), make.cyclic(2))],
    ['Dic6', make.dicyclic(6)],
  ])('%s: the same as generating from every three elements', (name, g) => {
    const group = make.close(g);
    const found = new Set<string>();
    const limit = name === '2^{1+4}-' ? 2 : 3; // with 2 generators only a lower bound is compared
    const extend = (from: readonly number[], depth: number): void => {
      found.add(
        generate(group, from)
          .elements.toSorted((a, b) => a - b)
          .join(),
      );
      if (depth < limit) for (let x = (from.at(-1) ?? 0) + 1; x < group.order; x++) extend([...from, x], depth + 1);
    };
    extend([], 0);
    const total = subgroupClasses(group).reduce((s, h) => s + h.conjugates, 0);
    if (limit === 3) expect(total).toBe(found.size);
    else expect(total).toBeGreaterThan(found.size);
  });

  it('states the limit it reaches', () => {
    const group = make.close(make.symmetric(5));
    expect(() => subgroupClasses(group, { classes: 18 })).toThrow(LimitError);
    expect(subgroupClasses(group, { classes: 19 }).length).toBe(19);
    expect(() => subgroupClasses(group, { work: 1000 })).toThrow(/too long/);
  });
});

/** Order, closure, generators, normalisers, containment of representatives. */
function checkClasses(group: FiniteGroup, list: ReturnType<typeof subgroupClasses>): void {
  expect(list[0]!.order).toBe(1);
  expect(list.at(-1)!.order).toBe(group.order);
  for (const h of list) {
    expect(group.order % h.order).toBe(0);
    const made = generate(group, h.generators).elements.toSorted((a, b) => a - b);
    expect(made).toEqual(Array.from(h.elements));
    expect(normalizer(group, h.elements, h.generators).length).toBe(normalizerOrder(group, h));
    expect(isSubconjugate(group, list[0]!, h)).toBe(true);
    expect(isSubconjugate(group, h, list.at(-1)!)).toBe(true);
    for (const k of list) if (k !== h && k.order === h.order) expect(isSubconjugate(group, h, k)).toBe(false);
  }
}

describe('one subgroup', () => {
  it('has its own numbering and an inclusion that respects products', () => {
    const group = make.close(make.symmetric(5));
    const list = subgroupClasses(group);
    for (const h of list) {
      const { group: own, inclusion } = subgroup(group, h.elements);
      expect(own.order).toBe(h.order);
      expect(Array.from(inclusion).toSorted((a, b) => a - b)).toEqual(Array.from(h.elements));
      for (let i = 0; i < own.order; i += 3)
        for (let j = 0; j < own.order; j += 5) expect(inclusion[own.multiply(i, j)]).toBe(group.multiply(inclusion[i]!, inclusion[j]!));
      for (let i = 0; i < own.order; i++) expect(own.permutation(i)).toEqual(group.permutation(inclusion[i]!));
    }
  });

  it('cosets partition the group', () => {
    const group = make.close(make.alternating(5));
    const h = subgroupClasses(group).find((x) => x.order === 12)!;
    const { representatives, cosetOf } = leftCosets(group, h.elements);
    expect(representatives.length).toBe(5);
    expect(representatives[0]).toBe(0);
    for (const x of h.elements) expect(cosetOf[x]).toBe(0);
    expect(cosetOf.reduce((s, c) => s + c, 0)).toBe(12 * 10);
  });

  it('containment up to conjugacy in S4 (elementary): C4 and the normal four-group lie in D4, C4 not in A4', () => {
    const group = make.close(make.symmetric(4));
    const list = subgroupClasses(group);
    const d4 = list.find((h) => h.order === 8)!;
    const a4 = list.find((h) => h.order === 12)!;
    const fours = list.filter((h) => h.order === 4);
    expect(fours.map((h) => isSubconjugate(group, h, d4))).toEqual([true, true, true]);
    expect(fours.map((h) => isSubconjugate(group, h, a4) === (h.conjugates === 1))).toEqual([true, true, true]);
    expect(isSubconjugate(group, d4, a4)).toBe(false);
  });

  it('products by table and without', () => {
    const small = make.close(make.symmetric(5));
    const large = make.close(make.symmetric(7));
    for (const group of [small, large]) {
      const product = productOf(group);
      for (let k = 0; k < 200; k++) {
        const i = (k * 37) % group.order;
        const j = (k * 61) % group.order;
        expect(product(i, j)).toBe(group.multiply(i, j));
      }
    }
  });
});
