import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputError, LimitError } from '../../../src/errors/index.ts';
import { invMod, mulMod, powModInt, reduceBigint } from '../../../src/field/index.ts';
import {
  childrenOf,
  type Expression,
  fold,
  formatExpression,
  latexExpression,
  latexName,
  nearest,
  parseExpression,
  resolveDefinitions,
  substituteSymbols,
  symbolsOf,
} from '../../../src/model/expression/index.ts';

const p = 2147483629;
/** Value modulo a prime, straight from the definition; NaN where a denominator vanishes. */
function valueMod(root: Expression, at: ReadonlyMap<string, number>): number {
  return fold<number>(root, (e, parts) => {
    if (parts.some(Number.isNaN)) return Number.NaN;
    const inverse = (x: number) => (x === 0 ? Number.NaN : invMod(x, p));
    switch (e.kind) {
      case 'number':
        return mulMod(reduceBigint(e.n, p), invMod(reduceBigint(e.d, p), p), p);
      case 'symbol':
        return at.get(e.name)!;
      case 'sum':
        return parts.reduce((a, b) => (a + b) % p, 0);
      case 'product':
        return parts.reduce((a, b) => mulMod(a, b, p), 1);
      case 'negate':
        return (p - parts[0]!) % p;
      case 'quotient':
        return Number.isNaN(inverse(parts[1]!)) ? Number.NaN : mulMod(parts[0]!, inverse(parts[1]!), p);
      case 'power': {
        const n = Number((e.exponent as { n: bigint }).n);
        const base = n < 0 ? inverse(parts[0]!) : parts[0]!;
        return Number.isNaN(base) ? base : powModInt(base, Math.abs(n), p);
      }
      default:
        throw new Error(e.kind);
    }
  });
}

const names = ['x', 'y1', 'beta_2'];
const expressions = fc.letrec<{ e: Expression }>((tie) => ({
  e: fc.oneof(
    { maxDepth: 5, withCrossShrink: true },
    fc
      .record({ kind: fc.constant('number' as const), n: fc.bigInt({ min: -20n, max: 20n }), d: fc.constantFrom(1n, 1n, 7n) })
      .map(({ n, d }) => ({ kind: 'number' as const, n: n % d === 0n ? n / d : n, d: n % d === 0n ? 1n : d })),
    fc.constantFrom(...names).map((name) => ({ kind: 'symbol' as const, name })),
    fc.array(tie('e'), { minLength: 2, maxLength: 4 }).map((terms) => ({ kind: 'sum' as const, terms })),
    fc.array(tie('e'), { minLength: 2, maxLength: 4 }).map((factors) => ({ kind: 'product' as const, factors })),
    tie('e').map((argument) => ({ kind: 'negate' as const, argument })),
    fc.tuple(tie('e'), tie('e')).map(([numerator, denominator]) => ({ kind: 'quotient' as const, numerator, denominator })),
    fc
      .tuple(tie('e'), fc.integer({ min: -3, max: 4 }))
      .map(([base, n]) => ({ kind: 'power' as const, base, exponent: { kind: 'number' as const, n: BigInt(n), d: 1n } })),
  ),
})).e;

describe('writing expressions', () => {
  it('law: reading what was written gives an equal expression', () => {
    fc.assert(
      fc.property(expressions, fc.array(fc.integer({ min: 1, max: p - 1 }), { minLength: 3, maxLength: 3 }), (e, at) => {
        const point = new Map(names.map((n, i) => [n, at[i]!]));
        expect(valueMod(parseExpression(formatExpression(e)), point)).toBe(valueMod(e, point));
      }),
      { numRuns: 300 },
    );
  });
  it.each([
    ['a - (b - c)', 'a - (b - c)'],
    ['-x^2/2 + 3*y', '-x^2/2 + 3*y'],
    ['2x^3/3', '2*x^3/3'],
    ['a/b/c', 'a/(b*c)'],
    ['(a+b)^-2', '(a + b)^(-2)'],
    ['x^(1/2)', 'x^(1/2)'],
    ['0.1*x', '1/10*x'],
    ['2^3^2', '2^3^2'],
    ['(2^3)^2', '(2^3)^2'],
    ['sin(x)*-1', 'sin(x)*(-1)'],
  ])('%s', (text, written) => expect(formatExpression(parseExpression(text))).toBe(written));
  it.each([
    ['(p1^2 + q1^2)/2', '\\frac{p_{1}^{2} + q_{1}^{2}}{2}'],
    ['-alpha_1*sqrt(3)*2', '-\\alpha_{1} \\sqrt{3} \\cdot 2'],
    ['(a+b)*sin(2*pi/3)', '\\left(a + b\\right) \\sin\\left(2 \\frac{\\pi}{3}\\right)'],
    ['0.5*lambda^-1', '\\tfrac{1}{2} \\lambda^{-1}'],
  ])('LaTeX of %s', (text, latex) => expect(latexExpression(parseExpression(text))).toBe(latex));
  it('names in LaTeX', () => {
    expect(['q12', 'omega0', 'k_r', 'mass', 'λ2', '__proto__', 'Omega', 'k_rot'].map(latexName)).toEqual(
      ['q_{12}', '\\omega_{0}', 'k_{r}', '\\mathit{mass}', '\\lambda_{2}', '\\mathit{\\_\\_proto\\_\\_}', '\\Omega', 'k_{\\mathit{rot}}'], // biome-ignore format: pairs
    );
  });
});

describe('substitution and definitions', () => {
  it('replaces all at once and keeps what does not change', () => {
    const e = parseExpression('x*y + sin(z)');
    const swapped = substituteSymbols(
      e,
      new Map([
        ['x', parseExpression('y')],
        ['y', parseExpression('x')],
      ]),
    );
    expect(formatExpression(swapped)).toBe('y*x + sin(z)');
    expect(childrenOf(swapped)[1]).toBe(childrenOf(e)[1]);
    expect(substituteSymbols(e, new Map([['w', e]]))).toBe(e);
  });
  it('definitions in any order', () => {
    const all = resolveDefinitions(
      new Map([
        ['a', parseExpression('b+1')],
        ['c', parseExpression('a*b')],
        ['b', parseExpression('x^2')],
      ]),
    );
    expect(formatExpression(all.get('c')!)).toBe('(x^2 + 1)*x^2');
    expect([...symbolsOf(all.get('c')!)]).toEqual(['x']);
  });
  it('a cycle names the way round', () => {
    const cycle = new Map([
      ['a', parseExpression('b')],
      ['b', parseExpression('2*c')],
      ['c', parseExpression('a-1')],
    ]);
    expect(() => resolveDefinitions(cycle)).toThrow(InputError);
    expect(() => resolveDefinitions(cycle)).toThrow('a -> b -> c -> a');
    expect(() => resolveDefinitions(new Map([['a', parseExpression('a')]]))).toThrow('a -> a');
  });
  it('a tower of doublings stays small in memory and is refused as text', () => {
    const tower = new Map(
      Array.from({ length: 200 }, (_, i) => [`d${i}`, parseExpression(i === 0 ? 'x' : `d${i - 1}+d${i - 1}`)] as const),
    );
    const top = resolveDefinitions(tower).get('d199')!;
    expect([...symbolsOf(top)]).toEqual(['x']);
    expect(valueMod(top, new Map([['x', 1]]))).toBe(powModInt(2, 199, p));
    expect(() => formatExpression(top)).toThrow(LimitError);
  });
  it('a long chain of definitions does not exhaust the stack', () => {
    const chain = new Map(
      Array.from({ length: 3000 }, (_, i) => [`d${i}`, parseExpression(i === 2999 ? 'x' : `1+sin(d${i + 1})`)] as const),
    );
    expect([...symbolsOf(resolveDefinitions(chain).get('d0')!)]).toEqual(['x']);
  });
});

describe('nearest name', () => {
  it.each([
    ['qs1', ['q1', 'p1'], 'q1'],
    ['hamiltonain', ['hamiltonian', 'quadratic'], 'hamiltonian'],
    ['zzz', ['q1', 'p1'], undefined],
    ['', [], undefined],
  ])('%s', (name, known, found) => expect(nearest(name, known)).toBe(found));
});
