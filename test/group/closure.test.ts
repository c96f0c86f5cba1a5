import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { NotAGroupError, ShapeError } from '../../src/errors/errors.ts';
import { closeGroup } from '../../src/group/closure.ts';
import { conjugateBy, derivedSubgroup, leftCosets } from '../../src/group/generate.ts';
import type { FiniteGroup } from '../../src/group/group.ts';
import { classMembers, powerClasses, signFromGenerators, signOnClasses } from '../../src/group/powers.ts';
import * as make from './permutations.ts';

const permutation = (n: number): fc.Arbitrary<Int32Array> =>
  fc
    .shuffledSubarray(
      Array.from({ length: n }, (_, i) => i),
      { minLength: n, maxLength: n },
    )
    .map((p) => Int32Array.from(p));

/** Random groups of permutations of at most 6 points. */
export const randomGenerators = fc
  .integer({ min: 0, max: 6 })
  .chain((degree) => fc.record({ degree: fc.constant(degree), generators: fc.array(permutation(degree), { maxLength: 3 }) }));

const compose = (p: Int32Array, q: Int32Array): Int32Array => q.map((x) => p[x]!);

/** Every product of a generator and an element, by plain comparison of all images. */
function naiveOrder(g: make.Generators): number {
  const seen = new Set<string>();
  const list: Int32Array[] = [Int32Array.from({ length: g.degree }, (_, i) => i)];
  seen.add(list[0]!.join());
  for (let i = 0; i < list.length; i++)
    for (const s of g.generators) {
      const p = compose(s, list[i]!);
      if (!seen.has(p.join())) {
        seen.add(p.join());
        list.push(p);
      }
    }
  return list.length;
}

describe('closure of permutations', () => {
  it('handles no points, no generators, the identity and repeated generators', () => {
    for (const g of [closeGroup([], 0), closeGroup([], 3), closeGroup([Int32Array.of(0, 1, 2)], 3), closeGroup([new Int32Array(0)], 0)]) {
      expect(g.order).toBe(1);
      expect(g.exponent).toBe(1);
      expect(g.classes).toEqual([{ representative: 0, size: 1, order: 1, inverse: 0 }]);
      expect(g.inverse(0)).toBe(0);
      expect(Array.from(g.via)).toEqual([-1]);
    }
    const swap = Int32Array.of(1, 0, 2);
    const g = closeGroup([swap, Int32Array.of(0, 1, 2), swap], 3);
    expect(g.order).toBe(2);
    expect(g.generators).toEqual([1, 0, 1]);
  });

  it.each([
    ['S5', make.symmetric(5), 120, 7],
    ['S6', make.symmetric(6), 720, 11],
    ['B3', make.coxeterB3(), 48, 10],
    ['H3', make.coxeterH3(), 120, 10],
    ['F4', make.coxeterF4(), 1152, 25],
    ['H4', make.coxeterH4(), 14400, 34],
    ['D100', make.dihedral(100), 200, 53],
    ['2^{1+4}+', make.extraspecialPlus(), 32, 17],
    ['2^{1+4}-', make.extraspecialMinus(), 32, 17],
  ])(
    '%s: order and class number (J. E. Humphreys, Reflection Groups and Coxeter Groups, 1990, and elementary counts; from memory)',
    (_, g, order, classes) => {
      const group = make.close(g);
      expect(group.order).toBe(order);
      expect(group.classes.length).toBe(classes);
    },
  );

  it('refuses what exceeds the limit and names the limit', () => {
    expect(() => make.close(make.symmetric(6), 719)).toThrow(NotAGroupError);
    expect(() => make.close(make.symmetric(6), 719)).toThrow(/719/);
    expect(make.close(make.symmetric(6), 720).order).toBe(720);
  });

  it('refuses generators that are no permutations', () => {
    for (const p of [Int32Array.of(0, 0), Int32Array.of(0, 2), Int32Array.of(0), Int32Array.of(-1, 0)])
      expect(() => closeGroup([p], 2)).toThrow(ShapeError);
  });

  it('group laws, words and classes on random permutation groups', () => {
    fc.assert(
      fc.property(randomGenerators, fc.nat(), fc.nat(), fc.integer({ min: -9, max: 9 }), (g, a, b, k) => {
        const group = make.close(g);
        expect(group.order).toBe(naiveOrder(g));
        const i = a % group.order;
        const j = b % group.order;
        expect(group.permutation(group.multiply(i, j))).toEqual(compose(group.permutation(i), group.permutation(j)));
        expect(group.multiply(i, group.inverse(i))).toBe(0);
        expect(group.indexOf(group.permutation(i))).toBe(i);
        let power = 0;
        for (let m = 0; m < Math.abs(k); m++) power = group.multiply(power, k < 0 ? group.inverse(i) : i);
        expect(group.power(i, k)).toBe(power);
        if (i > 0) {
          expect(group.parent[i]!).toBeLessThan(i);
          expect(group.permutation(i)).toEqual(compose(g.generators[group.via[i]!]!, group.permutation(group.parent[i]!)));
        }
        g.generators.forEach((p, s) => {
          expect(group.permutation(group.generators[s]!)).toEqual(p);
        });
        expect(group.classOf[conjugateBy(group, j, i)]).toBe(group.classOf[i]);
        checkClasses(group);
      }),
      { numRuns: 60, seed: 1 },
    );
  });

  it('an element outside the group has no number', () => {
    const group = make.close(make.alternating(4));
    expect(group.indexOf(Int32Array.of(1, 0, 2, 3))).toBe(-1);
    expect(group.indexOf(Int32Array.of(1, 0))).toBe(-1);
  });
});

/** Class equation, Burnside's count of classes by commuting pairs, orders, inverses, power maps. */
function checkClasses(group: FiniteGroup): void {
  const { classes, classOf, order } = group;
  expect(classes.reduce((s, c) => s + c.size, 0)).toBe(order);
  const powers = powerClasses(group);
  const members = classMembers(group);
  classes.forEach((c, r) => {
    expect(order % c.size).toBe(0);
    expect(classOf[c.representative]).toBe(r);
    expect(members[r]!.length).toBe(c.size);
    expect(Math.min(...members[r]!)).toBe(c.representative);
    expect(group.power(c.representative, c.order)).toBe(0);
    expect(classOf[group.inverse(c.representative)]).toBe(c.inverse);
    expect(powers[r]![c.order - 1]).toBe(c.order === 1 ? 0 : c.inverse);
    if (r > 0) expect(c.order).toBeGreaterThanOrEqual(classes[r - 1]!.order);
    expect(group.exponent % c.order).toBe(0);
  });
  if (order > 120) return;
  let commuting = 0;
  for (let i = 0; i < order; i++) for (let j = 0; j < order; j++) if (group.multiply(i, j) === group.multiply(j, i)) commuting++;
  expect(commuting).toBe(order * classes.length);
}

describe('signs, cosets and the commutator subgroup', () => {
  it('the sign of permutations, on elements and classes', () => {
    const group = make.close(make.symmetric(4));
    const sigma = signFromGenerators(group, [-1, -1]);
    for (let i = 0; i < group.order; i++) {
      const p = group.permutation(i);
      let inversions = 0;
      for (let x = 0; x < 4; x++) for (let y = 0; y < x; y++) if (p[y]! > p[x]!) inversions++;
      expect(sigma[i]).toBe(inversions % 2 === 0 ? 1 : -1);
    }
    expect(Array.from(signOnClasses(group, sigma)).reduce((s, x, c) => s + x * group.classes[c]!.size, 0)).toBe(0);
  });

  it('refuses signs that break a relation', () => {
    expect(() => signFromGenerators(make.close(make.cyclic(3)), [-1])).toThrow(/homomorphism|extend/);
    const twice = make.cyclic(2).generators[0]!;
    expect(() => signFromGenerators(closeGroup([twice, twice], 2), [1, -1])).toThrow(/extend/);
    expect(() => signFromGenerators(make.close(make.dihedral(3)), [-1, -1])).toThrow(/extend/);
  });

  it.each([
    ['S4 / A4', make.symmetric(4), 12],
    ['A4 / V4', make.alternating(4), 4],
    ['A5 perfect', make.alternating(5), 60],
    ['SL(2,3) / Q8', make.special(3), 8],
    ['Q8 / C2', make.quaternion(), 2],
    ['C6 abelian', make.cyclic(6), 1],
  ])('commutator subgroup of %s (elementary)', (_, g, order) => {
    const group = make.close(g);
    const { elements } = derivedSubgroup(group);
    expect(elements.length).toBe(order);
    const { representatives, cosetOf } = leftCosets(group, elements);
    expect(representatives.length).toBe(group.order / order);
    for (let i = 0; i < group.order; i++) expect(elements).toContain(group.multiply(group.inverse(representatives[cosetOf[i]!]!), i));
  });
});
