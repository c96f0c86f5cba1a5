import { describe, expect, it } from 'vitest';
import { InputError, ShapeError } from '../../src/errors/index.ts';
import { type Algebraic, RealField, rational } from '../../src/field/index.ts';
import { fromColumns, identity, zeroMatrix } from '../../src/linear/index.ts';
import { doubles } from '../../src/model/expression/constants.ts';
import { reduceToKernel } from '../../src/normalform/splitting.ts';
import { SeriesAlgebra } from '../../src/normalform/truncated-series.ts';
import { type Polynomial, PolynomialRing, RationalFunctionField } from '../../src/polynomial/index.ts';
import { Q } from './actions.ts';
import { cosineIn, ringReduction, twelveField, twelveSites, twelveSymbolic } from './rings.ts';

/** On-site potential g(1 - cos q) + alpha q^3/3 to degree 4, coupling -1. */
const pendulums = (f: RealField, sites: number, mode: number, g: Algebraic, alpha: number, degree: number) =>
  ringReduction(
    f,
    cosineIn(f),
    sites,
    mode,
    {
      site: [f.mul(g, f.fromRational(1n, 2n)), f.fromRational(BigInt(alpha), 3n), f.mul(g, f.fromRational(-1n, 24n))],
      coupling: f.fromInteger(-1),
    },
    degree,
  );

describe('Rings of pendulums with repulsive coupling: reduced potentials of the critical plane, q_i = sqrt(2/N)(a cos + b sin)', () => {
  // kernel columns are cos and sin without the factor sqrt(2/N): r^2 = N/2 (u1^2 + u2^2)
  const F = RealField.of({ cosines: [5, 20], squareRoots: [3n] });
  const sqrt5 = F.sqrt(rational(5n))!;
  const q = (n: bigint, d: bigint) => F.fromRational(n, d);
  const cases: [string, number, number, Algebraic, (u: PolynomialRing<Algebraic>, g: Algebraic) => Polynomial<Algebraic>][] = [
    ['N = 3, k = 1: -g r^4/48', 3, 1, F.fromInteger(3), (u, g) => u.scale(u.power(square(u), 2), F.mul(g, q(-9n, 4n * 48n)))],
    [
      'N = 5, k = 2: -g r^4/80',
      5,
      2,
      F.mul(q(1n, 2n), F.add(F.fromInteger(5), sqrt5)),
      (u, g) => u.scale(u.power(square(u), 2), F.mul(g, q(-25n, 4n * 80n))),
    ],
    [
      'N = 4, k = 1: -g (a^4 + b^4)/48',
      4,
      1,
      F.fromInteger(2),
      (u, g) => u.scale(u.add(u.power(u.variable(0), 4), u.power(u.variable(1), 4)), F.mul(g, q(-4n, 48n))),
    ],
    ['N = 4, k = 2: -g c^4/96', 4, 2, F.fromInteger(4), (u, g) => u.scale(u.power(u.variable(0), 4), F.mul(g, q(-16n, 96n)))],
    ['N = 6, k = 3: -g c^4/144', 6, 3, F.fromInteger(4), (u, g) => u.scale(u.power(u.variable(0), 4), F.mul(g, q(-36n, 144n)))],
  ];
  const square = (u: PolynomialRing<Algebraic>) => u.add(u.power(u.variable(0), 2), u.power(u.variable(1), 2));
  it.each(cases)('%s', (_, sites, mode, g, expected) => {
    const r = reduceToKernel(pendulums(F, sites, mode, g, 0, 4));
    expect(r.ring.format(r.h)).toBe(r.ring.format(expected(r.ring, g)));
  });
  it('N = 3 with on-site alpha q^3/3: alpha r^3 cos 3 theta/(3 sqrt 6)', () => {
    const r = reduceToKernel(pendulums(F, 3, 1, F.fromInteger(3), 1, 3));
    // r^3 cos 3theta = (3/2)^{3/2} Re (u1 + i u2)^3 and (3/2)^{3/2}/(3 sqrt 6) = 1/4
    expect(r.ring.format(r.h)).toBe('u1^3/4 - 3*u1*u2^2/4');
  });
});

describe('Three-fold planar oscillator: p is slaved to zero and h = V(q)', () => {
  it('with symbols a, b and the unfolding parameter mu', () => {
    const f = new RationalFunctionField(new PolynomialRing<Algebraic>(Q, ['a', 'b']));
    const ring = new PolynomialRing(f, ['q1', 'q2', 'p1', 'p2', 'mu']);
    const [x, y, p1, p2, mu] = [0, 1, 2, 3, 4].map((i) => ring.variable(i)) as [
      Polynomial<never>,
      Polynomial<never>,
      Polynomial<never>,
      Polynomial<never>,
      Polynomial<never>,
    ];
    const r2 = ring.add(ring.mul(x, x), ring.mul(y, y));
    const half = f.fromRational(1n, 2n);
    const cubic = ring.sub(ring.power(x, 3), ring.scale(ring.mul(x, ring.mul(y, y)), f.fromInteger(3)));
    const h = ring.sum([
      ring.scale(ring.add(ring.mul(p1, p1), ring.mul(p2, p2)), half),
      ring.scale(ring.mul(mu, r2), half),
      ring.scale(cubic, f.symbol('a')),
      ring.scale(ring.mul(r2, r2), f.symbol('b')),
    ]);
    const e = identity(f, 4);
    const columns = (list: number[]) =>
      fromColumns(
        f,
        list.map((j) => Array.from({ length: 4 }, (_, i) => e.data[i * 4 + j]!)),
      );
    const r = reduceToKernel({
      ring,
      dimension: 4,
      hamiltonian: h,
      kernel: columns([0, 1]),
      complement: columns([2, 3]),
      degree: 4,
      weights: [1],
      names: ['x', 'y'],
    });
    expect(r.ring.format(r.h)).toBe('a*x^3 + x^2*mu/2 - 3*a*x*y^2 + y^2*mu/2 + b*x^4 + 2*b*x^2*y^2 + b*y^4');
    expect(r.slaved.every((v) => r.ring.isZero(v))).toBe(true);
  });
});

describe('Splitting lemma', () => {
  const ring = new PolynomialRing<Algebraic>(Q, ['x', 'y', 'm']);
  const parse = (terms: [number[], number][]) => ring.fromTerms(terms.map(([e, c]) => [e, Q.fromInteger(c)] as const));
  const unit = (j: number) => fromColumns(Q, [[j === 0 ? Q.one : Q.zero, j === 1 ? Q.one : Q.zero]]);
  it('y^2 + x^2 y: h = -x^4/4 (completing the square)', () => {
    const r = reduceToKernel({
      ring,
      dimension: 2,
      hamiltonian: parse([
        [[0, 2, 0], 1],
        [[2, 1, 0], 1],
      ]),
      kernel: unit(0),
      complement: unit(1),
      degree: 8,
      names: ['u'],
    });
    expect(r.ring.format(r.h)).toBe('-u^4/4');
  });
  it('y^2/2 + x^2 y + m y + m x^2: h = -(x^2 + m)^2/2 + m x^2, the slaved variable moves with the parameter alone', () => {
    const h = ring.add(
      parse([
        [[2, 1, 0], 1],
        [[0, 1, 1], 1],
        [[2, 0, 1], 1],
      ]),
      ring.scale(ring.power(ring.variable(1), 2), Q.fromRational(1n, 2n)),
    );
    for (const weights of [[1], [2]]) {
      const r = reduceToKernel({
        ring,
        dimension: 2,
        hamiltonian: h,
        kernel: unit(0),
        complement: unit(1),
        degree: 4,
        weights,
        names: ['u'],
      });
      expect(r.ring.format(r.h)).toBe('-m^2/2 - u^4/2');
    }
  });
  it('a fractional denominator that cancels: H = k y^2/2 + k x^2 y, h = -k x^4/2', () => {
    const f = new RationalFunctionField(new PolynomialRing<Algebraic>(Q, ['k']));
    const rk = new PolynomialRing(f, ['x', 'y']);
    const h = rk.fromTerms([
      [[0, 2], f.div(f.symbol('k'), f.fromInteger(2))],
      [[2, 1], f.symbol('k')],
    ]);
    const u = (j: number) => fromColumns(f, [[j === 0 ? f.one : f.zero, j === 1 ? f.one : f.zero]]);
    const r = reduceToKernel({ ring: rk, dimension: 2, hamiltonian: h, kernel: u(0), complement: u(1), degree: 6 });
    expect(r.ring.format(r.h)).toBe('-k*u1^4/2');
  });
  it('a wide kernel takes the sparse route: y^2/2 + y |u|^2, h = -|u|^4/2', () => {
    const names = ['y', 'u1', 'u2', 'u3', 'u4', 'u5', 'u6'];
    const wide = new PolynomialRing<Algebraic>(Q, names);
    const square = wide.sum([1, 2, 3, 4, 5, 6].map((i) => wide.power(wide.variable(i), 2)));
    const h = wide.add(wide.scale(wide.power(wide.variable(0), 2), Q.fromRational(1n, 2n)), wide.mul(wide.variable(0), square));
    const e = (j: number) => names.map((_, i) => (i === j ? Q.one : Q.zero));
    expect(SeriesAlgebra.fits(6, 6)).toBe(false);
    const r = reduceToKernel({
      ring: wide,
      dimension: 7,
      hamiltonian: h,
      kernel: fromColumns(Q, [1, 2, 3, 4, 5, 6].map(e)),
      complement: fromColumns(Q, [e(0)]),
      degree: 6,
    });
    const u2 = r.ring.sum([0, 1, 2, 3, 4, 5].map((i) => r.ring.power(r.ring.variable(i), 2)));
    expect(r.ring.format(r.h)).toBe(r.ring.format(r.ring.scale(r.ring.power(u2, 2), Q.fromRational(-1n, 2n))));
  });
  it('no complement and no kernel', () => {
    const cubic = parse([
      [[3, 0, 0], 1],
      [[0, 3, 0], 2],
    ]);
    const all = reduceToKernel({
      ring,
      dimension: 2,
      hamiltonian: cubic,
      kernel: identity(Q, 2),
      complement: zeroMatrix(Q, 2, 0),
      degree: 3,
      names: ['x', 'y'],
    });
    expect(all.ring.format(all.h)).toBe('x^3 + 2*y^3');
    const none = reduceToKernel({
      ring,
      dimension: 2,
      hamiltonian: parse([
        [[2, 0, 0], 1],
        [[0, 2, 0], 1],
      ]),
      kernel: zeroMatrix(Q, 2, 0),
      complement: identity(Q, 2),
      degree: 3,
    });
    expect(none.ring.isZero(none.h)).toBe(true);
  });
  it('refuses a point that is no equilibrium, a vector outside the kernel, a kernel that is too small, wrong shapes', () => {
    const base = { ring, dimension: 2, kernel: unit(0), complement: unit(1), degree: 3 };
    expect(() => reduceToKernel({ ...base, hamiltonian: parse([[[1, 0, 0], 1]]) })).toThrow(InputError);
    expect(() => reduceToKernel({ ...base, hamiltonian: parse([[[2, 0, 0], 1]]) })).toThrow(InputError);
    expect(() => reduceToKernel({ ...base, hamiltonian: parse([[[3, 0, 0], 1]]) })).toThrow(InputError);
    expect(() => reduceToKernel({ ...base, hamiltonian: parse([[[0, 2, 0], 1]]), complement: identity(Q, 2) })).toThrow(ShapeError);
    expect(() => reduceToKernel({ ...base, hamiltonian: parse([[[0, 2, 0], 1]]), weights: [0] })).toThrow(ShapeError);
  });
  it('twelve sites to degree 6: symbols, exact numbers and doubles agree', () => {
    const symbolic = reduceToKernel(twelveSymbolic());
    const f = symbolic.ring.field as RationalFunctionField<Algebraic>;
    const F = twelveField;
    const [c, a, b] = [-2, 1, 3];
    const exact = reduceToKernel(twelveSites(F, cosineIn(F), F.fromInteger(c), F.fromInteger(a), F.fromInteger(b)));
    const values = new Map([
      ['c', c],
      ['a', a],
      ['b', b],
    ]);
    const floats = reduceToKernel(twelveSites(doubles, (k, n) => Math.cos((2 * Math.PI * k) / n), c, a, b));
    expect(exact.h.monomials.length).toBeGreaterThan(5);
    for (const m of new Set([...symbolic.h.monomials, ...exact.h.monomials])) {
      const x = F.toNumber(exact.ring.coefficient(exact.h, m));
      expect(f.evaluateNumber(symbolic.ring.coefficient(symbolic.h, m), values)).toBeCloseTo(x, 9);
      expect(floats.ring.coefficient(floats.h, m)).toBeCloseTo(x, 9);
    }
  });
  it('the slaved series solves the equations of the complement to half the degree', () => {
    const F = twelveField;
    const input = twelveSites(F, cosineIn(F), F.fromInteger(-2), F.one, F.fromInteger(3));
    const r = reduceToKernel(input);
    const images = Array.from({ length: 12 }, (_, i) =>
      r.ring.add(
        r.ring.linearForm([0, 1].map((j) => input.kernel.data[i * 2 + j]!)),
        r.ring.sum(r.slaved.map((v, j) => r.ring.scale(v, input.complement.data[i * 10 + j]!))),
      ),
    );
    const gradient = images.map((_, i) => r.ring.substitute(input.ring.derivative(input.hamiltonian, i), images, r.ring, undefined, 3));
    for (let j = 0; j < 10; j++)
      expect(r.ring.isZero(r.ring.sum(gradient.map((g, i) => r.ring.scale(g, input.complement.data[i * 10 + j]!))))).toBe(true);
  });
});
