import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Algebraic, RealField } from '../../src/field/index.ts';
import { equivariants, minimalGenerators, molien, relations, rewriteInInvariants, reynolds } from '../../src/invariant/index.ts';
import { type Polynomial, PolynomialRing, type RationalFunction, RationalFunctionField } from '../../src/polynomial/index.ts';
import { binaryTetrahedral, chain, copies, coxeter, cyclicPlane, dihedralPlane, O, Oh, Td } from './actions.ts';

const d3 = copies(dihedralPlane(3), 2);
const set = minimalGenerators(d3);

function parametric(action: typeof d3, symbols: string[]) {
  const field = new RationalFunctionField(new PolynomialRing<Algebraic>(action.field, symbols));
  const ring = new PolynomialRing<RationalFunction<Algebraic>>(field, action.names);
  return { field, ring, embed: (a: Algebraic) => field.fromConstant(a) };
}

describe('planar oscillator with D_3: H = ½ p·p + μ/2 q·q + a Re z³ + b (q·q)²', () => {
  const { field, ring, embed } = parametric(d3, ['mu', 'a', 'b']);
  const [q1, q2, p1, p2] = d3.names.map((n) => ring.variable(n));
  const half = field.fromRational(1n, 2n);
  const square = (p: Polynomial<RationalFunction<Algebraic>>) => ring.mul(p, p);
  const qq = ring.add(square(q1!), square(q2!));
  const cubic = ring.sub(ring.power(q1!, 3), ring.scale(ring.mul(q1!, square(q2!)), field.fromInteger(3)));
  const h = ring.sum([
    ring.scale(ring.add(square(p1!), square(p2!)), half),
    ring.scale(qq, field.mul(half, field.symbol('mu'))),
    ring.scale(cubic, field.symbol('a')),
    ring.scale(square(qq), field.symbol('b')),
  ]);
  it('generators of degrees 2, 2, 2, 3, 3, 3, 3; remainder 0', () => {
    expect(set.generators.map((g) => g.degree)).toEqual([2, 2, 2, 3, 3, 3, 3]);
    const form = rewriteInInvariants(h, ring, set, embed);
    expect(form.ring.format(form.expression)).toBe('mu*I1/2 + I3/2 + a*I4 + b*I1^2');
    expect(ring.isZero(form.remainder)).toBe(true);
    expect(ring.isZero(form.breaking)).toBe(true);
  });
  it('on the kernel, q alone: μ/2 I + a R + b I²', () => {
    const plane = copies(dihedralPlane(3));
    const own = minimalGenerators(plane);
    const { field: f, ring: r, embed: e } = parametric(plane, ['mu', 'a', 'b']);
    const [x, y] = [r.variable(0), r.variable(1)];
    const xx = r.add(r.mul(x, x), r.mul(y, y));
    const reduced = r.sum([
      r.scale(xx, f.mul(f.fromRational(1n, 2n), f.symbol('mu'))),
      r.scale(r.sub(r.power(x, 3), r.scale(r.mul(x, r.mul(y, y)), f.fromInteger(3))), f.symbol('a')),
      r.scale(r.mul(xx, xx), f.symbol('b')),
    ]);
    const form = rewriteInInvariants(reduced, r, own, e);
    expect(form.ring.format(form.expression)).toBe('mu*I/2 + a*R + b*I^2');
  });
  it('what breaks the symmetry is named, the rest is rewritten', () => {
    const form = rewriteInInvariants(ring.add(h, ring.scale(square(q1!), field.symbol('a'))), ring, set, embed);
    expect(form.ring.format(form.expression)).toBe('(mu/2 + a/2)*I1 + I3/2 + a*I4 + b*I1^2');
    expect(ring.format(form.breaking)).toBe('a*q1^2/2 - a*q2^2/2');
    expect(ring.equal(form.remainder, form.breaking)).toBe(true);
  });
  it('zero, constants, and a generator list that is too short', () => {
    expect(ring.isZero(rewriteInInvariants(ring.zero, ring, set, embed).expression)).toBe(true);
    const constant = rewriteInInvariants(ring.constant(field.symbol('a')), ring, set, embed);
    expect(constant.ring.format(constant.expression)).toBe('a');
    const short = minimalGenerators(d3, { degree: 2 });
    const form = rewriteInInvariants(h, ring, short, embed);
    expect(ring.isZero(form.breaking)).toBe(true);
    expect(ring.equal(form.remainder, ring.scale(cubic, field.symbol('a')))).toBe(true);
  });
});

describe('a unique normal form', () => {
  it.each([
    ['D_3 2+2', d3, 6],
    ['C_4 2+2', copies(cyclicPlane(4), 2), 4],
    ['O on R^3', copies(O), 9],
    ['T_d 3+3', copies(Td, 2), 4],
  ] as const)('%s: equal invariants have equal expressions, and these give the invariants back', (_, action, top) => {
    const own = minimalGenerators(action);
    const { ring } = own.spaces;
    const names = new PolynomialRing<Algebraic>(
      action.field,
      own.generators.map((g) => g.name),
    );
    const images = own.generators.map((g) => g.polynomial);
    const word = fc.array(fc.tuple(fc.array(fc.nat({ max: images.length - 1 }), { maxLength: 4 }), fc.integer({ min: -3, max: 3 })), {
      maxLength: 4,
    });
    fc.assert(
      fc.property(word, (list) => {
        const p = names.sum(
          list
            .filter(([factors]) => factors.reduce((s, g) => s + own.generators[g]!.degree, 0) <= top)
            .map(([factors, c]) =>
              names.scale(
                factors.reduce((m, g) => names.mul(m, names.variable(g)), names.one),
                action.field.fromInteger(c),
              ),
            ),
        );
        const h = names.substitute(p, images, ring);
        const form = rewriteInInvariants(h, ring, own, (a) => a);
        expect(ring.isZero(form.remainder)).toBe(true);
        expect(ring.equal(names.substitute(form.expression, images, ring), h)).toBe(true);
        const again = rewriteInInvariants(names.substitute(form.expression, images, ring), ring, own, (a) => a);
        expect(names.key(again.expression)).toBe(names.key(form.expression));
      }),
      { numRuns: 25 },
    );
  });
});

describe('relations', () => {
  it('D_3 2+2: five up to degree 6, so that degrees 5 and 6 hold 10 and 17 invariants of 12 and 20 products', () => {
    const list = relations(set, 6);
    expect(list.map((r) => r.degree)).toEqual([5, 5, 6, 6, 6]);
    expect(list.upTo).toBe(6);
    expect(list[0]!.text).toBe('I1*I6 - 2*I2*I5 + I3*I4');
    expect(molien(d3).series.slice(5, 7)).toEqual([10, 17]);
  });
  it('one relation of degree 2n for C_n and its degree for O and 2T (Klein 1884: degree 24)', () => {
    expect(relations(minimalGenerators(copies(cyclicPlane(5))), 10).map((r) => r.degree)).toEqual([10]);
    expect(relations(minimalGenerators(copies(O)), 18).map((r) => r.degree)).toEqual([18]);
    const klein = relations(minimalGenerators(binaryTetrahedral()), 24);
    expect(klein.map((r) => r.degree)).toEqual([24]);
  });
  it('none for reflection groups', () => {
    expect(relations(minimalGenerators(copies(Oh)), 12)).toHaveLength(0);
  });
});

describe('equivariants', () => {
  it('D_3 on the plane: z and conj(z)^2 (Golubitsky, Stewart and Schaeffer 1988, ch. XIII)', () => {
    const found = equivariants(minimalGenerators(copies(dihedralPlane(3))));
    expect(found.complete).toBe(true);
    expect(found.generators.map((g) => g.text)).toEqual([
      ['q1', 'q2'],
      ['q1^2 - q2^2', '-2*q1*q2'],
    ]);
  });
  it.each([
    ['O_h on R^3 (gradients of the invariants, Solomon 1963)', () => copies(Oh), [1, 3, 5]],
    ['I_h on R^3', () => copies(coxeter(3, chain([5, 3]))), [1, 5, 9]],
    ['C_4 on R^2', () => copies(cyclicPlane(4)), [1, 1, 3, 3]],
    ['D_5 on R^2', () => copies(dihedralPlane(5)), [1, 4]],
  ] as const)('%s', (_, make, degrees) => {
    const action = make();
    const own = minimalGenerators(action);
    const found = equivariants(own);
    expect(found.complete).toBe(true);
    expect(found.generators.map((g) => g.degree)).toEqual(degrees);
    const { ring } = own.spaces;
    for (const { components } of found.generators)
      for (const g of action.generatorMatrices) {
        // f(gx) = g f(x)
        const n = action.dimension;
        for (let i = 0; i < n; i++) {
          const left = ring.linearSubstitution(components[i]!, g);
          const right = ring.sum(components.map((c, j) => ring.scale(c, g.data[i * n + j]!)));
          expect(ring.equal(left, right)).toBe(true);
        }
      }
  });
  it('up to a degree only, and with another target', () => {
    const own = minimalGenerators(d3);
    const low = equivariants(own, { degree: 1 });
    expect(low.complete).toBe(false);
    expect(low.generators.map((g) => g.degree)).toEqual([1, 1, 1, 1]);
    const all = equivariants(own);
    expect(all.complete).toBe(true);
    expect(all.generators.filter((g) => g.degree === 1)).toHaveLength(4);
  });
});

describe('the Reynolds operator', () => {
  it('is a projection onto the invariants, linear over them', () => {
    const field = RealField.of({ squareRoots: [3n] });
    expect(d3.field).toBe(field);
    const { ring } = set.spaces;
    const average = (p: Polynomial<Algebraic>) => reynolds(d3, ring, p, (a) => a);
    const terms = fc.array(fc.tuple(fc.array(fc.nat({ max: 2 }), { minLength: 4, maxLength: 4 }), fc.integer({ min: -4, max: 4 })), {
      maxLength: 4,
    });
    fc.assert(
      fc.property(terms, (list) => {
        const p = ring.fromTerms(list.map(([e, c]) => [e, field.fromInteger(c)] as const));
        const r = average(p);
        expect(ring.equal(average(r), r)).toBe(true);
        const i = set.generators[3]!.polynomial;
        expect(ring.equal(average(ring.mul(i, p)), ring.mul(i, r))).toBe(true);
      }),
      { numRuns: 20 },
    );
  });
});
