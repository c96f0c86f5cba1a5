import { describe, expect, it } from 'vitest';
import { ShapeError } from '../../src/errors/index.ts';
import { type Algebraic, RealField } from '../../src/field/index.ts';
import { minimalGenerators } from '../../src/invariant/generators.ts';
import type { LinearAction } from '../../src/invariant/linear-action.ts';
import { analyseGerm, type Germ } from '../../src/normalform/germ.ts';
import { type Polynomial, PolynomialRing, type RationalFunction, RationalFunctionField } from '../../src/polynomial/index.ts';
import { cyclic, dihedral, octahedral, signs, tetrahedralFull, trivial } from './actions.ts';

type Ring = PolynomialRing<Algebraic>;
type Make = (r: Ring) => Polynomial<Algebraic>;
/** Terms by exponents with integer coefficients. */
const terms =
  (...list: [number[], number][]): Make =>
  (r) =>
    r.fromTerms(list.map(([e, c]) => [e, r.field.fromInteger(c)] as const));
const r2: Make = (r) => r.sum(r.variables.map((_, i) => r.power(r.variable(i), 2)));
const power =
  (f: Make, e: number): Make =>
  (r) =>
    r.power(f(r), e);
const times =
  (f: Make, g: Make): Make =>
  (r) =>
    r.mul(f(r), g(r));
const sum =
  (...list: [number, Make][]): Make =>
  (r) =>
    r.sum(list.map(([c, f]) => r.scale(f(r), r.field.fromInteger(c))));
/** Re z^n or Im z^n. */
const zPower =
  (n: number, imaginary = false): Make =>
  (r) => {
    let re = r.one;
    let im = r.zero;
    for (let k = 0; k < n; k++)
      [re, im] = [r.sub(r.mul(re, r.variable(0)), r.mul(im, r.variable(1))), r.add(r.mul(re, r.variable(1)), r.mul(im, r.variable(0)))];
    return imaginary ? im : re;
  };
const germ = (action: LinearAction, make: Make, degree: number): Germ => {
  const ring = new PolynomialRing<Algebraic>(action.field as RealField, action.names);
  const generators = minimalGenerators(action);
  const g = analyseGerm({ action, generators, ring, h: make(ring), degree });
  // a generator that is a coordinate is written as that coordinate here
  const readable = (text: string) =>
    generators.generators.reduce(
      (t, { name, degree: d, polynomial }) => (d === 1 ? t.replaceAll(new RegExp(`\\b${name}\\b`, 'g'), ring.format(polynomial)) : t),
      text,
    );
  return { ...g, unfolding: g.unfolding.map(readable), missing: g.missing.map(readable), because: readable(g.because) };
};
/** codimension, moduli, stratum, determinacy. */
const numbers = (g: Germ) => [g.codimension, g.moduli, g.stratumCodimension, g.determinedAt];

describe('Arnold, Gusein-Zade, Varchenko 1985: simple singularities without symmetry', () => {
  const plane = trivial(2);
  it.each([
    ['fold', trivial(1), terms([[3], 1]), 3, [1, 0, 1, 3], ['x']],
    ['cusp', trivial(1), terms([[4], -1]), 4, [2, 0, 2, 4], ['x', 'x^2']],
    ['A4', trivial(1), terms([[5], 2]), 6, [3, 0, 3, 5], ['x', 'x^2', 'x^3']],
    ['D4-', plane, terms([[3, 0], 1], [[1, 2], -3]), 4, [3, 0, 3, 3], ['x', 'y', 'x^2']],
    ['D4+', plane, terms([[2, 1], 1], [[0, 3], 1]), 3, [3, 0, 3, 3], ['x', 'y', 'x^2']],
    ['D5', plane, terms([[2, 1], 1], [[0, 4], 1]), 4, [4, 0, 4, 4], undefined],
    ['D6', plane, terms([[2, 1], 1], [[0, 5], -1]), 5, [5, 0, 5, 5], undefined],
    ['D7', plane, terms([[2, 1], 1], [[0, 6], 1]), 7, [6, 0, 6, 6], undefined],
    ['E6', plane, terms([[3, 0], 1], [[0, 4], 1]), 4, [5, 0, 5, 4], undefined],
    ['E7', plane, terms([[3, 0], 1], [[1, 3], 1]), 5, [6, 0, 6, 4], undefined],
    ['E8', plane, terms([[3, 0], 1], [[0, 5], 1]), 5, [7, 0, 7, 5], undefined],
    ['X9', plane, terms([[4, 0], 1], [[2, 2], 1], [[0, 4], 1]), 4, [8, 1, 7, 4], undefined],
  ] as [string, LinearAction, Make, number, number[], string[] | undefined][])('%s', (_, action, make, degree, expected, unfolding) => {
    const g = germ(action, make, degree);
    expect(numbers(g)).toEqual(expected);
    expect(g.unfolding.length).toBe(expected[0]);
    if (unfolding !== undefined) expect(g.unfolding).toEqual(unfolding);
  });
  it.each([
    ['P8', trivial(3), terms([[3, 0, 0], 1], [[0, 3, 0], 1], [[0, 0, 3], 1], [[1, 1, 1], 1]), 3, [7, 1, 6, 3]],
    ['J10', plane, terms([[3, 0], 1], [[2, 2], 1], [[0, 6], 1]), 6, [9, 1, 8, 6]],
    ['E12', plane, terms([[3, 0], 1], [[0, 7], 1]), 7, [11, 1, 10, 7]],
    ['Z11', plane, terms([[3, 1], 1], [[0, 5], 1]), 5, [10, 1, 9, 5]],
    ['W12', plane, terms([[4, 0], 1], [[0, 5], 1]), 5, [11, 1, 10, 5]],
    ['T_{2,4,5}', plane, terms([[4, 0], 1], [[2, 2], 1], [[0, 5], 1]), 5, [9, 1, 8, 5]],
  ] as [string, LinearAction, Make, number, number[]][])('unimodal %s', (_, action, make, degree, expected) => {
    expect(numbers(germ(action, make, degree))).toEqual(expected);
  });
  it('in other linear coordinates: E6 with (x + 2y)^3 is determined at 4 too', () => {
    const line: Make = (r) => r.linearForm([r.field.one, r.field.fromInteger(2)]);
    expect(numbers(germ(plane, sum([1, power(line, 3)], [1, terms([[0, 4], 1])]), 4))).toEqual([5, 0, 5, 4]);
    const twice: Make = (r) => r.mul(power(line, 2)(r), r.variable(1));
    expect(numbers(germ(plane, sum([1, twice], [1, terms([[4, 0], 1])]), 4))).toEqual([4, 0, 4, 4]);
  });
  it('x^2 y alone is not finitely determined; y^3 would do', () => {
    const g = germ(plane, terms([[2, 1], 1]), 3);
    expect(numbers(g)).toEqual([null, null, null, null]);
    expect(g.missing).toEqual(['y^3']);
    expect(g.because).toBe('not determined up to degree 3: add the term y^3');
  });
  it('h = 0', () => {
    const g = germ(plane, terms(), 4);
    expect([g.leadingDegree, g.codimension]).toEqual([null, null]);
    expect(g.because).toMatch(/vanishes up to degree 4/);
  });
  it('terms above the degree that is known do not count', () => {
    expect(germ(plane, terms([[2, 1], 1], [[0, 4], 1]), 3).codimension).toBe(null);
  });
});

describe('Golubitsky, Stewart, Schaeffer 1988: germs with symmetry (places from memory)', () => {
  const pairs: [string, () => LinearAction, Make, number, (number | null)[]][] = [
    ['Z2 x^4', () => signs([-1]), terms([[4], 1]), 4, [1, 0, 1]],
    ['Z2, x ↦ -x: x^4 + y^3', () => signs([-1, 1]), terms([[4, 0], 1], [[0, 3], 1]), 5, [3, 0, 3]],
    ['Z2 x Z2: x^4 + y^6', () => signs([-1, 1], [1, -1]), terms([[4, 0], 1], [[0, 6], 1]), 6, [5, 1, 4]],
    ['D3 Re z^3', () => dihedral(3), zPower(3), 3, [1, 0, 1]],
    ['D3 with Re z^3 = 0: r^4 + r^2 Re z^3', () => dihedral(3), sum([1, power(r2, 2)], [3, times(r2, zPower(3))]), 5, [3, 1, 2]],
    ['D4 a r^4 + b Re z^4', () => dihedral(4), sum([3, power(r2, 2)], [1, zPower(4)]), 4, [2, 1, 1]],
    ['D5 r^4 + c Re z^5', () => dihedral(5), sum([1, power(r2, 2)], [2, zPower(5)]), 5, [2, 1, 1]],
    ['D5 r^4 + c (Re z^5)^2', () => dihedral(5), sum([1, power(r2, 2)], [2, power(zPower(5), 2)]), 10, [3, 1, 2]],
    ['D6 a r^4 + b Re z^6', () => dihedral(6), sum([1, power(r2, 2)], [2, zPower(6)]), 6, [2, 1, 1]],
    ['C3 on the (q,p) plane: Re (c z^3)', () => cyclic(3), sum([1, zPower(3)], [2, zPower(3, true)]), 3, [1, 0, 1]],
    [
      'C4 on the (q,p) plane: a r^4 + Re (c z^4)',
      () => cyclic(4),
      sum([5, power(r2, 2)], [1, zPower(4)], [2, zPower(4, true)]),
      4,
      [2, 1, 1],
    ],
    [
      'O on R^3: a r^4 + b sum x^4',
      octahedral,
      sum([1, power(r2, 2)], [2, terms([[4, 0, 0], 1], [[0, 4, 0], 1], [[0, 0, 4], 1])]),
      4,
      [3, 2, 1],
    ],
    ['T_d on R^3: xyz + a r^4', tetrahedralFull, sum([1, terms([[1, 1, 1], 1])], [2, power(r2, 2)]), 4, [2, 1, 1]],
  ];
  it.each(pairs)('%s', (_, make, h, degree, expected) => {
    const g = germ(make(), h, degree);
    expect([g.codimension, g.moduli, g.stratumCodimension]).toEqual(expected);
    expect(g.unfolding.length).toBe(g.codimension);
    expect(g.moduliTerms.length).toBe(g.moduli);
  });
  it('D5 r^4 alone and xyz alone are not finitely determined, and the missing term is named', () => {
    const five = germ(dihedral(5), power(r2, 2), 4);
    expect(five.codimension).toBe(null);
    expect(five.missing).toEqual(['R']);
    const cage = germ(tetrahedralFull(), terms([[1, 1, 1], 1]), 3);
    expect(cage.codimension).toBe(null);
    expect(cage.missing.length).toBeGreaterThan(0);
  });
  it('unfoldings in the generators', () => {
    expect(germ(dihedral(3), zPower(3), 3).unfolding).toEqual(['I']);
    const four = germ(dihedral(4), sum([3, power(r2, 2)], [1, zPower(4)]), 4);
    expect([four.unfolding, four.moduliTerms]).toEqual([['I', 'I^2'], ['I^2']]);
  });
  it('conditions on symbols: a for D3, b, a + b and a - b for D4, both coefficients for D5 and T_d', () => {
    const conditions = (
      action: LinearAction,
      make: (
        r: PolynomialRing<RationalFunction<Algebraic>>,
        f: RationalFunctionField<Algebraic>,
      ) => Polynomial<RationalFunction<Algebraic>>,
      degree: number,
    ) => {
      const f = new RationalFunctionField(new PolynomialRing<Algebraic>(action.field as RealField, ['a', 'b']));
      const ring = new PolynomialRing(f, action.names);
      const g = analyseGerm({ action, generators: minimalGenerators(action), ring, h: make(ring, f), degree });
      return [g.codimension, g.moduli, g.conditions];
    };
    const [I, R] = [r2, zPower(5)] as unknown as [
      (r: PolynomialRing<RationalFunction<Algebraic>>) => Polynomial<RationalFunction<Algebraic>>,
      (r: PolynomialRing<RationalFunction<Algebraic>>) => Polynomial<RationalFunction<Algebraic>>,
    ];
    const z = (n: number) => zPower(n) as unknown as typeof R;
    expect(conditions(dihedral(3), (r, f) => r.scale(z(3)(r), f.symbol('a')), 3)).toEqual([1, 0, ['a']]);
    expect(conditions(dihedral(4), (r, f) => r.add(r.scale(r.power(I(r), 2), f.symbol('a')), r.scale(z(4)(r), f.symbol('b'))), 4)).toEqual([
      2,
      1,
      ['b', 'a + b', 'a - b'],
    ]);
    expect(conditions(dihedral(5), (r, f) => r.add(r.scale(r.power(I(r), 2), f.symbol('a')), r.scale(R(r), f.symbol('b'))), 5)).toEqual([
      2,
      1,
      ['a', 'b'],
    ]);
    expect(conditions(trivial(1), (r, f) => r.scale(r.power(r.variable(0), 3), f.div(f.symbol('a'), f.symbol('b'))), 3)).toEqual([
      1,
      0,
      ['a', 'b'],
    ]);
    const quartic = terms([[4, 0, 0], 1], [[0, 4, 0], 1], [[0, 0, 4], 1]) as unknown as typeof R;
    expect(
      conditions(octahedral(), (r, f) => r.add(r.scale(r.power(I(r), 2), f.symbol('a')), r.scale(quartic(r), f.symbol('b'))), 4),
    ).toEqual([3, 2, ['b', 'a + b', '2*a + b', '3*a + b']]);
    const cage = terms([[1, 1, 1], 1]) as unknown as typeof R;
    expect(
      conditions(tetrahedralFull(), (r, f) => r.add(r.scale(cage(r), f.symbol('a')), r.scale(r.power(I(r), 2), f.symbol('b'))), 4),
    ).toEqual([2, 1, ['a', 'b']]);
  });
  it('a germ that needs too many terms is left undecided, with the reason', () => {
    const g = germ(trivial(7), (r) => r.sum(r.variables.map((_, i) => r.power(r.variable(i), 4))), 4);
    expect([g.leadingDegree, g.codimension]).toEqual([4, null]);
    expect(g.because).toMatch(/more terms than are looked at/);
  });
  it('refuses coefficients of another field', () => {
    const action = dihedral(3);
    const other = RealField.of({ squareRoots: [7n] });
    const ring = new PolynomialRing<Algebraic>(other, ['x', 'y']);
    expect(() => analyseGerm({ action, generators: minimalGenerators(action), ring, h: zPower(3)(ring), degree: 3 })).toThrow(ShapeError);
  });
});
