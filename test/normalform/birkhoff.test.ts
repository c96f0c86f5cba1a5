import { describe, expect, it } from 'vitest';
import { InputError } from '../../src/errors/index.ts';
import { type Algebraic, RealField } from '../../src/field/index.ts';
import type { Matrix } from '../../src/linear/index.ts';
import { actionPart, type BirkhoffForm, birkhoffNormalForm, bracket, inPhaseSpace, twistOf } from '../../src/normalform/birkhoff.ts';
import { birkhoffSummary } from '../../src/normalform/birkhoff-text.ts';
import { diagonalise } from '../../src/normalform/elliptic.ts';
import { type Gaussian, GaussianField } from '../../src/normalform/gaussian-field.ts';
import { resonancesOf, resonantMonomials, torusInvariants } from '../../src/normalform/resonance.ts';
import { type Polynomial, PolynomialRing } from '../../src/polynomial/index.ts';
import { canonical, diag, lift, mat, rotation } from '../support/actions.ts';
import { Q } from './actions.ts';

type Exact = BirkhoffForm<Algebraic>;
type Poly = Polynomial<Algebraic>;
const half = Q.fromRational(1n, 2n);
const oscillator = new PolynomialRing<Algebraic>(Q, ['q', 'p']);
const plane = new PolynomialRing<Algebraic>(Q, ['q1', 'q2', 'p1', 'p2']);
const fraction = (text: string) => {
  const [n, d] = text.split('/');
  return Q.fromRational(BigInt(n!), BigInt(d ?? '1'));
};

describe('Birkhoff normal forms of one degree of freedom: coefficients of I, …, I^5', () => {
  const kinetic = oscillator.scale(oscillator.power(oscillator.variable(1), 2), half);
  const q = (e: number, c: string) => oscillator.scale(oscillator.power(oscillator.variable(0), e), fraction(c));
  const cosine = [2, 4, 6, 8, 10].map((e, k) => q(e, `${k % 2 === 0 ? 1 : -1}/${[2, 24, 720, 40320, 3628800][k]}`));
  it.each([
    ['quartic oscillator p^2/2 + q^2/2 + q^4', [q(2, '1/2'), q(4, '1')], ['1', '3/2', '-17/4', '375/16', '-10689/64']],
    ['cubic oscillator p^2/2 + q^2/2 + q^3', [q(2, '1/2'), q(3, '1')], ['1', '-15/4', '-705/16', '-115755/128', '-23968161/1024']],
    ['pendulum p^2/2 + 1 - cos q', cosine, ['1', '-1/16', '-1/256', '-5/8192', '-33/262144']],
  ] as [string, Poly[], string[]][])('%s', (_, potential, expected) => {
    const b = birkhoffNormalForm({
      ring: oscillator,
      hamiltonian: oscillator.sum([kinetic, ...potential]),
      form: canonical(Q, 1),
      degree: 10,
    });
    expect(b.arithmetic).toBe('exact');
    const { ring, polynomial, whole } = actionPart(b as Exact);
    expect(whole).toBe(true);
    expect([1, 2, 3, 4, 5].map((e) => ring.field.format(ring.coefficient(polynomial, [e])))).toEqual(
      expected.map((x) => Q.format(fraction(x))),
    );
  });
});

describe('Hénon and Heiles 1964; Churchill, Kummer, Rod 1983 (places from memory): normal form in N, L, S', () => {
  const v = [0, 1, 2, 3].map((i) => plane.variable(i)) as [Poly, Poly, Poly, Poly];
  const [q1, q2, p1, p2] = v;
  const times = (...list: Poly[]) => list.reduce((a, b) => plane.mul(a, b));
  const N = plane.scale(plane.sum(v.map((x) => plane.mul(x, x))), half);
  const L = plane.sub(times(q1, p2), times(q2, p1));
  const X = plane.sub(plane.add(times(q1, q1), times(p1, p1)), plane.add(times(q2, q2), times(p2, p2)));
  const Y = plane.scale(plane.add(times(q1, q2), times(p1, p2)), Q.fromInteger(2));
  const S = plane.sub(plane.power(X, 3), plane.scale(times(X, Y, Y), Q.fromInteger(3)));
  const hamiltonian = plane.sum([N, times(q1, q1, q2), plane.scale(plane.power(q2, 3), Q.fromRational(-1n, 3n))]);
  const b = birkhoffNormalForm({ ring: plane, hamiltonian, form: canonical(Q, 2), degree: 8 }) as Exact;
  const { ring, polynomial } = inPhaseSpace(b, plane.variables);
  const combination = (...list: [string, Poly][]) => plane.sum(list.map(([c, f]) => plane.scale(f, fraction(c))));
  it.each([
    [2, combination(['1', N])],
    [4, combination(['-5/12', times(N, N)], ['7/12', times(L, L)])],
    [6, combination(['-67/432', plane.power(N, 3)], ['-7/144', times(N, L, L)], ['7/144', S])],
    [
      8,
      combination(
        ['-42229/155520', plane.power(N, 4)],
        ['-76447/25920', times(N, N, L, L)],
        ['115171/31104', plane.power(L, 4)],
        ['2093/17280', times(N, S)],
      ),
    ],
  ])('degree %i', (degree, expected) => {
    expect(ring.format(ring.homogeneousPart(polynomial, degree))).toBe(plane.format(expected));
  });
  it('odd degrees vanish, every term is resonant and the normal form commutes with H2', () => {
    expect([3, 5, 7].every((d) => ring.isZero(ring.homogeneousPart(polynomial, d)))).toBe(true);
    const complex = b.ring.field as GaussianField<Algebraic>;
    const h2 = b.ring.homogeneousPart(b.normalForm, 2);
    expect(b.ring.isZero(bracket(b.ring, complex, b.modes, h2, b.normalForm))).toBe(true);
  });
});

describe('Resonances of two oscillators: generators and dimensions in degrees 0 … 12', () => {
  it.each([
    ['1:1', 1, 1, 'z1*conj(z2)', [1, 0, 4, 0, 9, 0, 16, 0, 25, 0, 36, 0, 49]],
    ['1:2', 1, 2, 'z1^2*conj(z2)', [1, 0, 2, 2, 3, 4, 6, 6, 9, 10, 12, 14, 17]],
    ['1:3', 1, 3, 'z1^3*conj(z2)', [1, 0, 2, 0, 5, 0, 8, 0, 13, 0, 18, 0, 25]],
    ['2:3', 2, 3, 'z1^3*conj(z2)^2', [1, 0, 2, 0, 3, 2, 4, 4, 5, 6, 8, 8, 11]],
    ['1:-1', 1, -1, 'z1*z2', [1, 0, 4, 0, 9, 0, 16, 0, 25, 0, 36, 0, 49]],
    ['1:-2', 1, -2, 'z1^2*z2', [1, 0, 2, 2, 3, 4, 6, 6, 9, 10, 12, 14, 17]],
    ['1:4', 1, 4, 'z1^4*conj(z2)', [1, 0, 2, 0, 3, 2, 4, 4, 5, 6, 8, 8, 11]],
  ] as [string, number, number, string, number[]][])('%s', (_, k, l, generator, dimensions) => {
    const d = diagonalise(diag(Q, k, l, k, l), canonical(Q, 2));
    const field = d.field as RealField;
    const modes = [...(d.modes as Exact['modes'])].sort(
      (a, b) =>
        Math.abs(field.toNumber(a.frequency)) - Math.abs(field.toNumber(b.frequency)) ||
        field.toNumber(b.frequency) - field.toNumber(a.frequency),
    );
    expect(modes.map((m) => field.toNumber(m.frequency))).toEqual([k, l]);
    expect(resonancesOf(field, modes, 7).map((r) => r.generator)).toEqual([generator]);
    expect(dimensions.map((_, e) => resonantMonomials(field, modes, e).length)).toEqual(dimensions);
  });
  it('D_n x S^1 on the semisimple 1:1 resonance: numbers of invariants of degree 2, 4, 6, 8 (Golubitsky, Stewart, Schaeffer 1988, ch. XVIII; place from memory)', () => {
    const expected: Record<number, number[]> = { 3: [1, 2, 3, 5], 4: [1, 3, 4, 7], 5: [1, 2, 2, 3], 6: [1, 2, 3, 5], 8: [1, 2, 2, 4] };
    for (const [n, list] of Object.entries(expected)) {
      const F = RealField.of({ cosines: [Number(n), 4 * Number(n)] });
      const ring = new PolynomialRing<Algebraic>(F, plane.variables);
      const h2 = ring.scale(ring.sum(ring.variables.map((_, i) => ring.power(ring.variable(i), 2))), F.fromRational(1n, 2n));
      const b = birkhoffNormalForm({ ring, hamiltonian: h2, form: canonical(F, 2), degree: 2 }) as Exact;
      const generators = [lift(rotation(F, 1, Number(n))), lift(diag(F, 1, -1))].map(
        (m): Matrix<Algebraic> => ({ ...m, data: m.data.map((x) => (b.field as RealField).embed(F, x)) }),
      );
      expect([2, 4, 6, 8].map((d) => torusInvariants(b, generators, d).length)).toEqual(list);
      expect(torusInvariants(b, [], 2).length).toBe(4);
    }
  });
});

describe('Elliptic equilibria', () => {
  it('modes: {ζ, H2} = -i ω ζ, {ζ, ζ̄} = -2i c, brackets between modes vanish', () => {
    // H2 with a gyroscopic term and equal frequencies of both energies
    const s = mat(Q, [
      [2, 0, 0, -1],
      [0, 2, 1, 0],
      [0, 1, 1, 0],
      [-1, 0, 0, 1],
    ]);
    const hamiltonian = plane.sum(
      [0, 1, 2, 3].flatMap((i) =>
        [0, 1, 2, 3].map((j) => plane.scale(plane.mul(plane.variable(i), plane.variable(j)), Q.mul(half, s.data[4 * i + j]!))),
      ),
    );
    const b = birkhoffNormalForm({ ring: plane, hamiltonian, form: canonical(Q, 2), degree: 2 });
    expect(b.modes.length).toBe(2);
    if (b.arithmetic === 'exact')
      expect(inPhaseSpace(b, plane.variables).ring.format(inPhaseSpace(b, plane.variables).polynomial)).toBe(plane.format(hamiltonian));
    else expect(b.modes.map((m) => m.frequency).reduce((x, y) => x + y)).toBeCloseTo(2 * Math.SQRT2, 12);
  });
  it('square roots of rationals stay exact, others become floating and agree with the exact route', () => {
    const h = (k: number) =>
      plane.sum([
        plane.scale(plane.sum([2, 3].map((i) => plane.power(plane.variable(i), 2))), half),
        plane.scale(plane.power(plane.variable(0), 2), half),
        plane.scale(plane.power(plane.variable(1), 2), Q.fromInteger(k)),
        plane.mul(plane.variable(0), plane.power(plane.variable(1), 2)),
        plane.power(plane.variable(0), 4),
      ]);
    const exact = birkhoffNormalForm({ ring: plane, hamiltonian: h(1), form: canonical(Q, 2), degree: 4 });
    expect(exact.arithmetic).toBe('exact');
    expect(exact.modes.map((m) => (exact.field as RealField).format(m.frequency as Algebraic)).sort()).toEqual(['1', 'sqrt(2)']);
    // a coupling makes the squared frequencies quadratic irrationals
    const coupled = (c: number) =>
      plane.add(h(1), plane.scale(plane.mul(plane.variable(0), plane.variable(1)), Q.fromRational(BigInt(c), 1000n)));
    const floating = birkhoffNormalForm({ ring: plane, hamiltonian: coupled(1), form: canonical(Q, 2), degree: 4 });
    expect(floating.arithmetic).toBe('floating');
    const t = twistOf(floating as BirkhoffForm<number>);
    const u = twistOf(exact as Exact);
    expect(Math.abs(t.arnold - (exact.field as RealField).toNumber(u.arnold))).toBeLessThan(1e-3);
    expect(Math.abs(t.kolmogorov - (exact.field as RealField).toNumber(u.kolmogorov))).toBeLessThan(1e-3);
  });
  it('twist of a sum of two oscillators: K = I1 + 2 I2 + 3/2 I1^2 + 3/8 I2^2', () => {
    const ring = plane;
    const h = ring.sum([
      ring.scale(ring.sum([0, 2].map((i) => ring.power(ring.variable(i), 2))), half),
      ring.power(ring.variable(0), 4),
      ring.scale(ring.power(ring.variable(3), 2), half),
      ring.scale(ring.power(ring.variable(1), 2), Q.fromInteger(2)),
      ring.power(ring.variable(1), 4),
    ]);
    const b = birkhoffNormalForm({ ring, hamiltonian: h, form: canonical(Q, 2), degree: 4 }) as Exact;
    const { ring: actions, polynomial, whole } = actionPart(b);
    expect(whole).toBe(true);
    expect(actions.format(polynomial)).toBe('I1 + 2*I2 + 3*I1^2/2 + 3*I2^2/8');
    // det [[3, 0, 1], [0, 3/4, 2], [1, 2, 0]] = -12 - 3/4
    const F = b.field as RealField;
    expect([F.format(twistOf(b).kolmogorov), F.format(twistOf(b).arnold)]).toEqual(['9/4', '-51/4']);
  });
  it('summary: frequencies, resonances, expression and twist of Hénon and Heiles, and of a 1:2 resonance', () => {
    const [q1, q2] = [plane.variable(0), plane.variable(1)];
    const h2 = plane.scale(plane.sum([0, 1, 2, 3].map((i) => plane.power(plane.variable(i), 2))), half);
    const heiles = plane.sum([h2, plane.mul(plane.mul(q1, q1), q2), plane.scale(plane.power(q2, 3), Q.fromRational(-1n, 3n))]);
    const s = birkhoffSummary(birkhoffNormalForm({ ring: plane, hamiltonian: heiles, form: canonical(Q, 2), degree: 4 }), plane.variables);
    expect(s.frequencies).toEqual([
      { value: 1, exact: '1' },
      { value: 1, exact: '1' },
    ]);
    expect(s.resonances.map((r) => r.generator)).toEqual(['z1*conj(z2)']);
    expect(s.modes[0]).toEqual({ real: 'q1', imaginary: 'p1', bracket: '1' });
    // N = I1 + I2, L^2 = 4 I1 I2 - (Re z1 conj z2)^2 … = 2 I1 I2 - Re (z1 conj z2)^2 / 2
    expect(s.actions).toBe('I1 + I2 - 5*I1^2/12 + I1*I2/3 - 5*I2^2/12');
    expect(s.expression).toContain('Re(z1^2*conj(z2)^2)');
    const resonant = plane.sum([
      plane.scale(plane.add(plane.power(q1, 2), plane.power(plane.variable(2), 2)), half),
      plane.add(plane.power(q2, 2), plane.power(plane.variable(3), 2)),
      plane.mul(plane.mul(q1, q1), q2),
    ]);
    const t = birkhoffSummary(
      birkhoffNormalForm({ ring: plane, hamiltonian: resonant, form: canonical(Q, 2), degree: 3 }),
      plane.variables,
    );
    expect(t.expression).toBe('I1 + 2*I2 + Re(z1^2*conj(z2))/4');
    expect([t.twist, t.arithmetic]).toEqual([null, 'exact']);
  });
  it('modes are taken from the preferred forms, with bracket 1 where the root is in the field', () => {
    const h2 = plane.scale(plane.sum([0, 1, 2, 3].map((i) => plane.power(plane.variable(i), 2))), half);
    const sum = [1, 1, 0, 0].map((x) => Q.fromInteger(x));
    const difference = [1, -1, 0, 0].map((x) => Q.fromInteger(x));
    const s = birkhoffSummary(
      birkhoffNormalForm({ ring: plane, hamiltonian: h2, form: canonical(Q, 2), degree: 2, preferred: [sum, difference] }),
      plane.variables,
    );
    expect(s.modes).toEqual([
      { real: 'q1 + q2', imaginary: 'p1 + p2', bracket: '2' },
      { real: 'q1 - q2', imaginary: 'p1 - p2', bracket: '2' },
    ]);
    expect(s.expression).toBe('I1 + I2');
    const scaled = birkhoffSummary(
      birkhoffNormalForm({
        ring: oscillator,
        hamiltonian: oscillator.sum(
          [0, 1].map((i) =>
            oscillator.scale(oscillator.power(oscillator.variable(i), 2), Q.fromRational(i === 0 ? 2n : 1n, i === 0 ? 1n : 8n)),
          ),
        ),
        form: canonical(Q, 1),
        degree: 2,
      }),
      oscillator.variables,
    );
    expect(scaled.modes).toEqual([{ real: '2*q', imaginary: 'p/2', bracket: '1' }]);
  });
  it('a form that is not canonical: W = 2J halves the frequency', () => {
    const w = { ...canonical(Q, 1), data: canonical(Q, 1).data.map((x) => Q.mul(Q.fromInteger(2), x)) };
    const h = oscillator.scale(oscillator.sum([0, 1].map((i) => oscillator.power(oscillator.variable(i), 2))), half);
    const b = birkhoffNormalForm({ ring: oscillator, hamiltonian: h, form: w, degree: 2 }) as Exact;
    expect((b.field as RealField).format(b.modes[0]!.frequency)).toBe('1/2');
    expect(actionPart(b).ring.format(actionPart(b).polynomial)).toBe('I1/2');
  });
  it('refuses saddles, zero eigenvalues and nilpotent collisions', () => {
    for (const entries of [
      [1, -1],
      [0, 1],
    ] as const)
      expect(() => diagonalise(diag(Q, ...entries), canonical(Q, 1))).toThrow(InputError);
    // q1 p2 - q2 p1 + (q1^2 + q2^2)/2: double frequency with a Jordan block
    expect(() =>
      diagonalise(
        mat(Q, [
          [1, 0, 0, 1],
          [0, 1, -1, 0],
          [0, -1, 0, 0],
          [1, 0, 0, 0],
        ]),
        canonical(Q, 2),
      ),
    ).toThrow(InputError);
  });
  it('Gaussian numbers: inverse and conjugate', () => {
    const G = new GaussianField(Q);
    const z: Gaussian<Algebraic> = { re: Q.fromInteger(3), im: Q.fromInteger(-4) };
    expect(G.equal(G.mul(z, G.inv(z)), G.one)).toBe(true);
    expect(G.equal(G.mul(z, G.conj(z)), G.fromInteger(25))).toBe(true);
    expect(G.equal(G.mul(G.i, G.i), G.fromInteger(-1))).toBe(true);
    expect([G.format(z), G.format(G.i), G.format(G.one)]).toEqual(['3 + (-4)*i', 'i', '1']);
  });
});
