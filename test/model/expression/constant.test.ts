import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputError, LimitError } from '../../../src/errors/index.ts';
import { type Algebraic, RealField } from '../../../src/field/index.ts';
import {
  compileNumeric,
  exactValue,
  FieldTooSmall,
  located,
  parseExpression,
  primePowers,
  Transcendental,
  withField,
} from '../../../src/model/expression/index.ts';

const evaluate = (text: string) => withField((field) => exactValue(parseExpression(text), undefined, field));
const float = (text: string) => compileNumeric(parseExpression(text), [])([]);

describe('exact values', () => {
  // biome-ignore format: pairs read better in lines
  it.each([
    ['1/3 + 0.1', '13/30'], ['2^-3', '1/8'], ['(2/3)^-2', '9/4'], ['0^0', '1'], ['-2^2', '-4'], ['2^3^2', '512'],
    ['sqrt(12)', '2*sqrt(3)'], ['sqrt(16/25)', '4/5'], ['sqrt(0)', '0'], ['2^(1/2)*8^(1/2)', '4'], ['12^(3/2)', '24*sqrt(3)'], ['2^-0.5', 'sqrt(2)/2'],
    ['sqrt((1-sqrt(2))^2)', '-1 + sqrt(2)'], ['sqrt(2+sqrt(3))', '(sqrt(2) + sqrt(6))/2'], ['sqrt(3-2*sqrt(2))', '-1 + sqrt(2)'],
    ['cos(pi)', '-1'], ['sin(pi/6)', '1/2'], ['cos(2*pi/3)', '-1/2'], ['tan(pi/4)', '1'], ['tan(pi/8)', '-1 + sqrt(2)'], ['sin(-pi/3)', '-sqrt(3)/2'],
    ['sin(pi/6) + sqrt(3)*cos(pi/6)', '2'], ['cos(pi/5)', '(1 + sqrt(5))/4'], ['8*cos(2*pi/7)*cos(4*pi/7)*cos(6*pi/7)', '1'], ['cos(100*pi/3)', '-1/2'],
    ['4*sin(pi/5)*sin(2*pi/5)', 'sqrt(5)'], ['sqrt(2-2*cos(2*pi/7)) - 2*sin(pi/7)', '0'], ['sqrt(2+2*cos(2*pi/9)) - 2*cos(pi/9)', '0'],
    ['sqrt(3*(2-2*cos(2*pi/5)))/sin(pi/5)', '2*sqrt(3)'],
  ])('%s = %s', (text, value) => {
    const { field, result } = evaluate(text);
    expect(field.format(result)).toBe(value);
    expect(field.toNumber(result)).toBeCloseTo(float(text), 12);
  });
  // biome-ignore format: pairs read better in lines
  it.each([
    ['pi - pi', '0'], ['pi/pi', '1'], ['pi^2/(3*pi)/pi', '1/3'], ['(2^(1/3))^3', '2'], ['4^(1/3)*2^(1/3)', '2'], ['8^(2/3)', '4'], ['(8/27)^(-1/3)', '3/2'],
    ['1/2^(1/3)*2^(1/3)', '1'], ['3/(1+2^(1/3)) - (1-2^(1/3)+4^(1/3))', '0'], ['sqrt(2+sqrt(5))^2', '2 + sqrt(5)'],
    ['(sqrt(2+sqrt(5))+1)*(sqrt(2+sqrt(5))-1)', '1 + sqrt(5)'], ['1/(1+sqrt(2+sqrt(5))) - (sqrt(2+sqrt(5))-1)/(1+sqrt(5))', '0'],
    ['log(8)/log(2)', '3'], ['log(6)-log(2)-log(3)', '0'], ['log(sqrt(2))/log(2)', '1/2'], ['log(1)', '0'],
    ['exp(0)', '1'], ['exp(log(3)/2)', 'sqrt(3)'], ['exp(2)/exp(1)^2', '1'], ['exp(3/2)*exp(-3/2)', '1'], ['log(exp(5/3))', '5/3'], ['sqrt(exp(2))/exp(1)', '1'],
    ['cosh(1)^2-sinh(1)^2', '1'], ['sin(1)^2+cos(1)^2', '1'], ['tan(1)*cos(1)/sin(1)', '1'], ['sin(1+pi/2)-cos(1)', '0'], ['tanh(log(2))', '3/5'],
    ['2^sqrt(2)/2^sqrt(2)', '1'],
  ])('what is not exact cancels: %s = %s', (text, value) => {
    const { field, result } = evaluate(text);
    expect(field.format(result)).toBe(value);
    expect(float(text)).toBeCloseTo(field.toNumber(result), 12);
  });
  // biome-ignore format: pairs read better in lines
  it.each([
    ['pi', 'pi'], ['2^(1/3)', '2^(1/3)'], ['1+log(2)', 'log(2)'], ['exp(1)', 'exp(1)'], ['cos(1)', 'cos(1)'], ['cos(pi*sqrt(2))', 'cos(sqrt(2)*pi)'],
    ['sqrt(2+sqrt(5))', 'sqrt(2 + sqrt(5))'], ['1/(1+2^(1/3))', '2^(1/3)'], ['sqrt(pi)', 'sqrt(pi)'],
  ])('%s is not exact because of %s', (text, term) => {
    try {
      evaluate(text);
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(Transcendental);
      expect((error as Transcendental).term).toBe(term);
    }
  });
  it.each(['1/0', '0^-1', '1/(sqrt(2)^2-2)', 'log(0)', 'log(-1)', 'sqrt(-1)', '(-8)^(1/3)', 'tan(pi/2)', '1/(log(4)-2*log(2))'])(
    '%s has no value',
    (text) => {
      expect(() => evaluate(text)).toThrow(InputError);
    },
  );
  it.each(['10^10^10', '2^99999999', '(1+sqrt(2))^9999999', 'exp(800)', 'cos(pi/2003)', '(1+pi)^99999'])(
    '%s is refused as too large',
    (text) => {
      expect(() => evaluate(text)).toThrow(LimitError);
    },
  );
  it('names take their values, others get a suggestion', () => {
    const field = RealField.of({ squareRoots: [3n] });
    const values = new Map<string, Algebraic>([
      ['c', field.sqrt({ n: 3n, d: 1n })!],
      ['__proto__', field.one],
    ]);
    expect(field.format(exactValue(parseExpression('c^2 + c*__proto__'), values, field))).toBe('3 + sqrt(3)');
    expect(() => exactValue(parseExpression('cc'), values, field)).toThrow("'cc' has no value");
    expect(() => exactValue(parseExpression('constructor'), values, field)).toThrow(InputError);
  });
  it('errors say where the expression stands', () => {
    const attempt = () => located({ file: 'm.yaml', key: 'equilibrium.q1' }, () => evaluate('1/(2-2)'));
    expect(attempt).toThrow(
      expect.objectContaining({ culprit: expect.objectContaining({ file: 'm.yaml', key: 'equilibrium.q1', value: '1/(2 - 2)' }) }),
    );
    expect(() => located({}, () => evaluate('pi'))).toThrow(Transcendental);
  });
  it('the field grows only as far as needed, from where it started', () => {
    expect(() => exactValue(parseExpression('sqrt(2)'), undefined, RealField.of())).toThrow(FieldTooSmall);
    expect(evaluate('sqrt(2)*sqrt(3)').field).toBe(RealField.of({ squareRoots: [6n, 2n] }));
    const start = RealField.of({ squareRoots: [7n] });
    expect(withField((f) => exactValue(parseExpression('1/2'), undefined, f), start).field).toBe(start);
  });
  it('law: exact and floating evaluation agree', () => {
    const leaf = fc.constantFrom('1', '2', '3/2', 'sqrt(2)', 'sqrt(3)', 'cos(2*pi/5)', 'sin(pi/7)', 'tan(pi/3)');
    const tree = fc.letrec<{ e: string }>((tie) => ({
      e: fc.oneof(
        { maxDepth: 4 },
        leaf,
        fc.tuple(tie('e'), fc.constantFrom('+', '-', '*', '/'), tie('e')).map(([a, o, b]) => `((${a})${o}(${b}))`),
        fc.tuple(tie('e'), fc.integer({ min: -2, max: 3 })).map(([a, n]) => `(${a})^${n}`),
      ),
    })).e;
    fc.assert(
      fc.property(tree, (text) => {
        const expected = float(text);
        try {
          const { field, result } = evaluate(text);
          const exact = field.toNumber(result);
          if (Number.isFinite(expected) && Math.abs(exact) > 1e-6 && Math.abs(exact) < 1e6)
            expect(Math.abs(expected / exact - 1)).toBeLessThan(1e-6);
        } catch (error) {
          // division by zero only where the floating value is not a sound number either
          expect(error).toBeInstanceOf(InputError);
          expect(!Number.isFinite(expected) || Math.abs(expected) > 1e9 || text.includes('^-') || text.includes('/')).toBe(true);
        }
      }),
      { numRuns: 60 },
    );
  });
});

describe('prime powers', () => {
  it('rebuild the number', () => {
    fc.assert(
      fc.property(fc.bigInt({ min: 1n, max: 1n << 80n }), (n) => {
        expect(primePowers(n).reduce((x, [p, e]) => x * p ** BigInt(e), 1n)).toBe(n);
      }),
      { numRuns: 50 },
    );
  });
  it('of small and large numbers', () => {
    expect(primePowers(1n)).toEqual([]);
    expect(primePowers(360n)).toEqual([
      [2n, 3],
      [3n, 2],
      [5n, 1],
    ]);
    expect(primePowers(2n ** 70n * 3n)).toEqual([
      [2n, 70],
      [3n, 1],
    ]);
    expect(primePowers(1000000007n ** 2n)).toEqual([[1000000007n, 2]]);
  });
});
