import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors/index.ts';
import { PrimeField, primeCongruentToOne, RealField } from '../../../src/field/index.ts';
import {
  type Constants,
  type Expression,
  expandExpression,
  floatingCoefficients,
  floatingTaylor,
  JetAlgebra,
  parseExpression,
  type TaylorRequest,
  taylor,
} from '../../../src/model/expression/index.ts';
import { PolynomialRing } from '../../../src/polynomial/index.ts';

const expand = (text: string, names: string[], degree: number, more: Partial<TaylorRequest> = {}) => {
  const r = taylor(parseExpression(text), { names, degree, ...more });
  const polynomial = r.kind === 'exact' ? r.ring.format(r.polynomial) : r.ring.format(r.polynomial);
  return { ...r, text: polynomial, at: r.constants.field.format(r.value) };
};
const points = (point: Record<string, string>) =>
  new Map(Object.entries(point).map(([k, v]) => [k, parseExpression(v)] as [string, Expression]));

describe('expansions at a point', () => {
  // biome-ignore format: triples read better in lines
  it.each([
    ['(p1^2+q1^2)/2', 'q1^2/2 + p1^2/2', '0'],
    ['exp(q1)', 'q1 + q1^2/2 + q1^3/6 + q1^4/24', '1'],
    ['sin(q1)', 'q1 - q1^3/6', '0'],
    ['cos(q1)', '-q1^2/2 + q1^4/24', '1'],
    ['tan(q1)', 'q1 + q1^3/3', '0'],
    ['sinh(q1)', 'q1 + q1^3/6', '0'],
    ['cosh(q1)', 'q1^2/2 + q1^4/24', '1'],
    ['tanh(q1)', 'q1 - q1^3/3', '0'],
    ['log(1+q1)', 'q1 - q1^2/2 + q1^3/3 - q1^4/4', '0'],
    ['sqrt(1+q1)', 'q1/2 - q1^2/8 + q1^3/16 - 5*q1^4/128', '1'],
    ['1/(1-q1)', 'q1 + q1^2 + q1^3 + q1^4', '1'],
    ['(1+q1)^(1/3)', 'q1/3 - q1^2/9 + 5*q1^3/81 - 10*q1^4/243', '1'],
    ['(1+q1)^-20', '-20*q1 + 210*q1^2 - 1540*q1^3 + 8855*q1^4', '1'],
    ['(1+q1)^20', '20*q1 + 190*q1^2 + 1140*q1^3 + 4845*q1^4', '1'],
    ['(1+q1)^(1+q1)', 'q1 + q1^2 + q1^3/2 + q1^4/3', '1'],
    ['1-cos(q1-q2)', 'q1^2/2 - q1*q2 + q2^2/2 - q1^4/24 + q1^3*q2/6 - q1^2*q2^2/4 + q1*q2^3/6 - q2^4/24', '0'],
    ['q1^7', '0', '0'],
    ['q1^1000000', '0', '0'],
    ['log(2+q1)', 'q1/2 - q1^2/8 + q1^3/24 - q1^4/64', 'log(2)'],
    ['pi + q1', 'q1', 'pi'],
    ['exp(1+q1)/exp(1)', 'q1 + q1^2/2 + q1^3/6 + q1^4/24', '1'],
    ['2^(1/3)*q1*4^(1/3)', '2*q1', '0'],
    ['cos(pi/4+q1)*sqrt(2)', '-q1 - q1^2/2 + q1^3/6 + q1^4/24', '1'],
    ['sqrt((q1-2)^2)', '-q1', '2'],
  ])('%s = %s', (text, polynomial, value) => {
    const r = expand(text, ['q1', 'q2', 'p1'], 4);
    expect(r.kind).toBe('exact');
    expect(r.text).toBe(polynomial);
    expect(r.at).toBe(value);
  });
  it('about another point, with parameters and definitions in each other', () => {
    const parameters = points({ c: 'd/2', d: 'sqrt(5)' });
    expect(expand('c*q1^2', ['q1'], 2, { parameters, point: points({ q1: 'd' }) })).toMatchObject({
      text: '5*q1 + sqrt(5)*q1^2/2',
      at: '5*sqrt(5)/2',
    });
    expect(expand('q1^(3/2)', ['q1'], 3, { point: points({ q1: '4' }) })).toMatchObject({ text: '3*q1 + 3*q1^2/16 - q1^3/128', at: '8' });
  });
  it('parameters kept as symbols', () => {
    expect(expand('(1+q1)^k', ['q1'], 2, { keep: ['k'] })).toMatchObject({
      kind: 'symbolic',
      text: 'k*q1 + (-k/2 + k^2/2)*q1^2',
      symbols: ['k'],
      atoms: [],
    });
    expect(expand('k*q1^2/(1-k*q1)', ['q1'], 4, { keep: ['k'], parameters: points({ k: '3' }) }).text).toBe('k*q1^2 + k^2*q1^3 + k^3*q1^4');
    expect(expand('sqrt(k)^3*q1', ['q1'], 1, { keep: ['k'] })).toMatchObject({ text: 'k*sqrt(k)*q1', atoms: ['sqrt(k)'] });
    expect(expand('c*q1^2', ['q1'], 2, { keep: ['k'], parameters: points({ c: 'k^2' }) }).text).toBe('k^2*q1^2');
  });
  it('a parameter as an expansion variable', () => {
    expect(expand('c*q1^2/2', ['q1', 'c'], 3, { point: points({ c: '-1/3' }) }).text).toBe('-q1^2/6 + q1^2*c/2');
  });
  it('what stays floating is named', () => {
    const r = expand('exp(1+q1) + log(2)*q2', ['q1', 'q2'], 1);
    expect(r).toMatchObject({
      kind: 'symbolic',
      atoms: ['log(2)', 'exp(1)'].sort((a, b) => r.constants.atoms.indexOf(a) - r.constants.atoms.indexOf(b)),
    });
    expect(floatingCoefficients(r).coefficients).toEqual([Math.E, Math.LN2]);
  });
  it('floating coefficients with kept parameters', () => {
    const r = expand('sqrt(k)*q1 + exp(k)*2^(1/3)*q2', ['q1', 'q2'], 1, { keep: ['k'] });
    const c = floatingCoefficients(r, new Map([['k', 4]])).coefficients;
    expect(c[0]).toBeCloseTo(2, 14);
    expect(c[1]).toBeCloseTo(Math.exp(4) * 2 ** (1 / 3), 12);
    expect(() => floatingCoefficients(r)).toThrow();
  });
  it.each([
    ['1/q1', 'division by zero'],
    ['q1^-2', 'division by zero'],
    ['q2/q1', 'division by zero'],
    ['sqrt(q1)', 'not smooth'],
    ['sqrt(q1^2+q2^2)', 'not smooth'],
    ['q1^q2', 'power of zero'],
    ['log(q1)', 'logarithm'],
    ['log(q1-1)', 'logarithm'],
    ['sqrt(q1-1)', 'negative'],
    ['tan(pi/2+q1)', 'pole'],
    ['c*q1', "'c' has no value"],
    ['q3', "'q3' has no value"],
  ])('%s is refused: %s', (text, message) => {
    const attempt = () => expand(text, ['q1', 'q2'], 2, { parameters: new Map([['c', undefined]]) });
    expect(attempt).toThrow(InputError);
    expect(attempt).toThrow(message);
  });
  it('degrees 0 and 1, and no names', () => {
    expect(expand('1+q1+q1^2', ['q1'], 0)).toMatchObject({ text: '0', at: '1' });
    expect(expand('exp(q1)*(1+q1)', ['q1'], 1)).toMatchObject({ text: '2*q1', at: '1' });
    expect(expand('3/4', [], 5)).toMatchObject({ text: '0', at: '3/4' });
  });
});

describe('laws of jets', () => {
  const p = primeCongruentToOne(4);
  const prime = new PrimeField(p);
  const modular: Constants<number> = {
    field: prime,
    pi: 3,
    simplify: (v) => v,
    rational: (v) => (v < 10 ? { n: BigInt(v), d: 1n } : undefined),
    sign: () => undefined,
    power: (b, e) => {
      let out = 1;
      for (let k = 0n; k < e.n; k++) out = prime.mul(out, b);
      return out;
    },
    generalPower: () => Number.NaN,
    call: () => Number.NaN,
  };
  const names = ['x', 'y', 'z'];
  const polynomials = fc.letrec<{ e: Expression }>((tie) => ({
    e: fc.oneof(
      { maxDepth: 4 },
      fc.integer({ min: -9, max: 9 }).map((n) => ({ kind: 'number' as const, n: BigInt(n), d: 1n })),
      fc.constantFrom(...names).map((name) => ({ kind: 'symbol' as const, name })),
      fc.array(tie('e'), { minLength: 2, maxLength: 3 }).map((terms) => ({ kind: 'sum' as const, terms })),
      fc.array(tie('e'), { minLength: 2, maxLength: 3 }).map((factors) => ({ kind: 'product' as const, factors })),
      tie('e').map((argument) => ({ kind: 'negate' as const, argument })),
      fc
        .tuple(tie('e'), fc.integer({ min: 0, max: 3 }))
        .map(([base, n]) => ({ kind: 'power' as const, base, exponent: { kind: 'number' as const, n: BigInt(n), d: 1n } })),
    ),
  })).e;
  it('law: a polynomial expression expanded without truncation has its values (modulo a prime)', () => {
    const value = fc.integer({ min: 0, max: p - 1 });
    fc.assert(
      fc.property(polynomials, fc.tuple(value, value, value), fc.tuple(value, value, value), (e, at, shift) => {
        const flat = new JetAlgebra<number, number>(modular, new PolynomialRing(prime, []), 0, (v) => v);
        const direct = expandExpression(e, flat, (s) => flat.constant(prime.add(at[names.indexOf(s)]!, shift[names.indexOf(s)]!))).value;
        const full = new JetAlgebra<number, number>(modular, new PolynomialRing(prime, names), 400, (v) => v);
        const jet = expandExpression(e, full, (s) => full.variable(names.indexOf(s), at[names.indexOf(s)]!));
        expect(prime.add(jet.value, full.ring.evaluate(jet.rest, shift))).toBe(direct);
      }),
      { numRuns: 60 },
    );
  });
  const inner = ['x', 'x*y', 'x-2*y+y^2', 'x+y+x*y^2', '3*x^2-y'];
  // biome-ignore format: pairs read better in lines
  it.each([
    ['sin(U)^2+cos(U)^2', '1'], ['cosh(U)^2-sinh(U)^2', '1'], ['exp(log(2+U))', '2+U'], ['log(exp(U))', 'U'], ['exp(U)*exp(-U)', '1'], ['tan(U)*cos(U)', 'sin(U)'],
    ['tanh(U)*cosh(U)', 'sinh(U)'], ['sqrt(3+U)^2', '3+U'], ['(5+U)^(1/3)*(5+U)^(2/3)', '5+U'], ['(1+U)/(1+U)', '1'], ['sin(1+U)^2+cos(1+U)^2', '1'],
    ['sin(pi/7+U)*cos(pi/7)-cos(pi/7+U)*sin(pi/7)', 'sin(U)'], ['2*cosh(U)', 'exp(U)+exp(-U)'], ['(1+U)^(2+U)', '(1+U)^2*exp(U*log(1+U))'],
    ['tan(pi/4+U)', '(1+tan(U))/(1-tan(U))'], ['tanh(log(2)+U)*(1+3/5*tanh(U))', '3/5+tanh(U)'], ['(2+U)^17/(2+U)^16', '2+U'], ['sqrt((U-1)^2)', '1-U'],
  ])('identity %s = %s', (left, right) => {
    for (const u of inner) {
      const l = expand(left.replaceAll('U', `(${u})`), ['x', 'y'], 5);
      const r = expand(right.replaceAll('U', `(${u})`), ['x', 'y'], 5);
      expect(l.kind).toBe('exact');
      expect([l.text, l.at]).toEqual([r.text, r.at]);
    }
  });
  it('exact and floating expansions agree', () => {
    const text = 'exp(sin(x)/(2+y))*sqrt(3+x*y)+log(2+cos(y))^(1/3)+tanh(x+1/2)^2*(1+x)^y';
    const a = floatingCoefficients(taylor(parseExpression(text), { names: ['x', 'y'], degree: 4 }));
    const b = floatingTaylor(parseExpression(text), { names: ['x', 'y'], degree: 4 }).polynomial;
    const ring = floatingTaylor(parseExpression(text), { names: ['x', 'y'], degree: 4 }).ring;
    expect(b.monomials.length).toBeGreaterThanOrEqual(a.monomials.length);
    for (const [m, c] of ring.terms(b)) expect(Math.abs(c - ring.coefficient(a, m))).toBeLessThan(1e-12);
  });
});

describe('regular heptagon of vortices (Thomson 1883)', () => {
  // H = -Σ log |z_i - z_j| + (3/2) Σ |z_i|^2 in the frame turning with the ring: cos and sin of 2 pi k/7 at the vertices
  const sites = [0, 1, 2, 3, 4, 5, 6];
  const names = [...sites.map((i) => `x${i}`), ...sites.map((i) => `y${i}`)];
  const pairs = sites.flatMap((i) => sites.filter((j) => j < i).map((j) => `-log((x${i}-x${j})^2+(y${i}-y${j})^2)/2`));
  const text = `${pairs.join('')} + 3/2*(${sites.map((i) => `x${i}^2+y${i}^2`).join('+')})`;
  const point = points(
    Object.fromEntries(
      sites.flatMap((k) => [
        [`x${k}`, `cos(2*pi*${k}/7)`],
        [`y${k}`, `sin(2*pi*${k}/7)`],
      ]),
    ),
  );
  const r = taylor(parseExpression(text), { names, point, degree: 3 });
  it('is exact to degree 3 and an equilibrium', () => {
    expect(r.kind).toBe('exact');
    expect(r.field).toBe(RealField.of({ cosines: [28] }));
    expect(r.polynomial.monomials.filter((m) => m.length === 1)).toEqual([]);
    expect(r.polynomial.monomials.filter((m) => m.length === 2).length).toBe(98);
  });
  it('the pair of vortices at distance d has value -log d, the product of all distances is 7^(7/2)', () => {
    // product over i<j of |z_i - z_j| is sqrt(7^7), the root of the discriminant of z^7 - 1
    expect(r.constants.approximate(r.value)).toBeCloseTo(-3.5 * Math.log(7) + 10.5, 10);
  });
  it('agrees with the floating expansion', () => {
    const at = new Map(
      sites.flatMap(
        (k) =>
          [
            [`x${k}`, Math.cos((2 * Math.PI * k) / 7)],
            [`y${k}`, Math.sin((2 * Math.PI * k) / 7)],
          ] as Array<[string, number]>,
      ),
    );
    const f = floatingTaylor(parseExpression(text), { names, point: at, degree: 3 });
    const exact = floatingCoefficients(r);
    for (const [m, c] of f.ring.terms(f.polynomial)) expect(Math.abs(c - f.ring.coefficient(exact, m))).toBeLessThan(1e-12);
  });
});

describe('large inputs', () => {
  it('a dense quartic in 12 variables comes back as it was written', () => {
    const names = Array.from({ length: 12 }, (_, i) => `q${i + 1}`);
    const ring = new PolynomialRing(RealField.of(), names);
    const all: string[] = [];
    const extend = (product: string[], from: number) => {
      if (product.length > 0) all.push(product.join('*'));
      if (product.length < 4) for (let i = from; i < 12; i++) extend([...product, names[i]!], i);
    };
    extend([], 0);
    expect(all.length).toBe(1819);
    const text = all.map((m, i) => `${(i % 17) + 1}/${(i % 5) + 1}*${m}`).join(' + ');
    const r = expand(text, names, 4);
    expect(r.polynomial.monomials.length).toBe(1819);
    expect(expand(r.text, names, 4).text).toBe(r.text);
    expect(ring.variables).toEqual(r.ring.variables);
  });
  it('a quadratic form in 360 variables', () => {
    const names = Array.from({ length: 360 }, (_, i) => `q${i}`);
    const r = expand(Array.from({ length: 2000 }, (_, i) => `(q${(i * 37) % 360}-q${(i * 91 + 5) % 360})^2/2`).join('+'), names, 2);
    expect(r.kind).toBe('exact');
    expect(r.polynomial.monomials.every((m) => m.length === 2)).toBe(true);
  });
});
