import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors/index.ts';
import { compileNumeric, floatingTaylor, gradientNumeric, hessianNumeric, parseExpression } from '../../../src/model/expression/index.ts';

const names = ['x', 'y', 'z'];
const at = [0.3, -0.7, 1.1];
// biome-ignore format: a corpus reads better in lines
const CORPUS = [
  'x*y*z', 'x^2*y/z', '(x-y)^4', '(1+x)^-2', 'z^0.5', 'sqrt(z+x)', 'exp(x*y)', 'log(z^2+y^2)', 'sin(x+y)*cos(z)', 'tan(x)', 'sinh(y)', 'cosh(x*z)', 'tanh(y-z)',
  'z^x', '(1+x^2)^(y*z)', 'x/(y*z)', '-x*-y', 'y^3', 'x*x*x', '(x+y+z)^2/2 - x', 'pi*x + 1/3', '7', '(y-y)^2*x', '2^y',
];

describe('floating values', () => {
  it('of constants and names', () => {
    expect(compileNumeric(parseExpression('2*x^2 - y/4 + pi'), ['x', 'y'])([3, 8])).toBeCloseTo(16 + Math.PI, 14);
    expect(compileNumeric(parseExpression('(-2)^3 + (-2)^2'), [])([])).toBe(-4);
    expect(compileNumeric(parseExpression('1e-300*1e300'), [])([])).toBeCloseTo(1, 12);
    expect(compileNumeric(parseExpression('__proto__ + constructor'), ['constructor', '__proto__'])([1, 2])).toBe(3);
    expect(compileNumeric(parseExpression('1/x'), ['x'])([0])).toBe(Number.POSITIVE_INFINITY);
    expect(() => compileNumeric(parseExpression('w'), ['x'])).toThrow(InputError);
  });
  it('a sum of 5 000 terms and a deep tower', () => {
    const f = compileNumeric(parseExpression(Array.from({ length: 5000 }, () => 'x').join('+')), ['x']);
    expect(f([2])).toBe(10000);
    expect(gradientNumeric(parseExpression(`${'('.repeat(150)}x${'*x)'.repeat(150)}`), ['x'])([1])[0]).toBe(151);
  });
});

describe('gradient and Hessian', () => {
  it.each(CORPUS)('%s: three routes agree', (text) => {
    const e = parseExpression(text);
    const f = compileNumeric(e, names);
    const gradient = gradientNumeric(e, names)(at);
    const hessian = hessianNumeric(e, names)(at);
    // jets
    const jet = floatingTaylor(e, { names, degree: 2, point: new Map(names.map((n, i) => [n, at[i]!])) });
    for (let i = 0; i < 3; i++) {
      const c = (m: number[]) => jet.ring.coefficient(jet.polynomial, m);
      const unit = (k: number) => [0, 1, 2].map((j) => (j === k ? 1 : 0));
      expect(Math.abs(gradient[i]! - c(unit(i)))).toBeLessThan(1e-11);
      for (let j = 0; j < 3; j++) {
        const pair = unit(i).map((v, k) => v + unit(j)[k]!);
        expect(Math.abs(hessian[3 * i + j]! - c(pair) * (i === j ? 2 : 1))).toBeLessThan(1e-10);
      }
    }
    // central differences
    for (let i = 0; i < 3; i++) {
      const h = 1e-5;
      const moved = (s: number) => at.map((v, k) => (k === i ? v + s : v));
      expect(gradient[i]).toBeCloseTo((f(moved(h)) - f(moved(-h))) / (2 * h), 7);
      const column = gradientNumeric(e, names)(moved(h)).map((v, k) => (v - gradientNumeric(e, names)(moved(-h))[k]!) / (2 * h));
      for (let j = 0; j < 3; j++) expect(hessian[3 * j + i]).toBeCloseTo(column[j]!, 6);
    }
  });
  it('powers at zero', () => {
    expect([...hessianNumeric(parseExpression('x^2 + x^3 + x*y'), ['x', 'y'])([0, 0])]).toEqual([2, 1, 1, 0]);
    expect([...gradientNumeric(parseExpression('x^0 + x^1'), ['x'])([0])]).toEqual([1]);
  });
  it('no names', () => {
    expect(gradientNumeric(parseExpression('3'), [])([]).length).toBe(0);
    expect(hessianNumeric(parseExpression('3'), [])([]).length).toBe(0);
  });
});
