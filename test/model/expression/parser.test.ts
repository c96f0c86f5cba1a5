import { createRequire } from 'node:module';
import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors/index.ts';
import { type GrammarNode, Literal, parseTree } from '../../../src/model/expression/grammar.ts';
import { type Expression, parseExpression, symbolsOf } from '../../../src/model/expression/index.ts';

const num = (n: number, d = 1): Expression => ({ kind: 'number', n: BigInt(n), d: BigInt(d) });
const sym = (name: string): Expression => ({ kind: 'symbol', name });

// biome-ignore format: a corpus reads better in lines
const CORPUS = [
  'x', '12', '0.5', '.5', '2.', '1e-3', '2.5E+7', 'pi', 'e', 'i', 'constructor', '__proto__', 'toString', 'λ1', 'q_1', 'e1', 'end',
  'a+b', 'a-b-c', 'a-(b-c)', 'a*b/c*d', 'a/b/c', 'a/(b*c)', '-x^2', '(-x)^2', '2^-3', '2^3^2', '-a*b', 'a*-b', 'a--b', '+x', '- - x', 'a^-b^c',
  '2q1', '2 q1', '2q1^2', '-2x', '3pi', 'a+2b-3c', 'a*2x', 'x^2*3y', '2x/3', '1e', '2e', '2sin(x)', '2/3*x',
  'sqrt(3)/2', 'sin(cos(tan(x)))', 'exp(-x^2/2)', 'sinh(x)^2-cosh(x)^2+tanh(x)', 'log (x)', '((x))', '(a+b)*(c-d)', '1/2*(p1^2+p2^2)',
  'c*((q1-q2)^2+(q2-q3)^2+(q3-q1)^2)/2', 'a \n+\r\n b\t* c', '-1/3*x', '(1+2)/(3)', '1/2/3*x', 'x/2/3',
];

/** The tree of either parser, reduced to what the walk looks at. */
function shape(n: GrammarNode): unknown {
  const args = () => n.args!.map(shape);
  switch (n.type) {
    case 'ConstantNode':
      return { value: n.value instanceof Literal ? Number(n.value.text) : n.value };
    case 'SymbolNode':
      return { name: n.name };
    case 'ParenthesisNode':
      return { content: shape(n.content!) };
    case 'FunctionNode':
      return { call: shape(n.fn as GrammarNode), args: args() };
    case 'OperatorNode':
      return { fn: n.fn, implicit: n.implicit, args: args() };
    default:
      return { type: n.type };
  }
}

describe('the grammar is that of the whole mathjs', () => {
  const mathjs = createRequire(import.meta.url)('mathjs/lib/browser/math.js') as { parse(text: string): GrammarNode; version: string };
  it('in the pinned version', () => expect(mathjs.version).toBe('15.2.0'));
  it.each(CORPUS)('%j', (text) => {
    const flat = text.replace(/\s/g, ' ');
    expect(shape(parseTree(flat))).toEqual(shape(mathjs.parse(flat)));
  });
  it('refuses what the five nodes cannot express', () => {
    for (const text of ['[1,2]', 'a.b', 'x=1', 'f(x)=x', 'a;b', 'a?b:c', '1:2', 'a<b<c', '{a:1}'])
      expect(() => parseTree(text), text).toThrow(SyntaxError);
  });
});

describe('expressions that are accepted', () => {
  it.each(CORPUS)('%j', (text) => {
    expect(parseExpression(text)).toBeDefined();
  });
  it('literals are exact', () => {
    expect(parseExpression('0.1')).toEqual(num(1, 10));
    expect(parseExpression('1e-3')).toEqual(num(1, 1000));
    expect(parseExpression('2.50E2')).toEqual(num(250));
    expect(parseExpression('.5')).toEqual(num(1, 2));
    expect(parseExpression('-0.75')).toEqual(num(-3, 4));
    expect(parseExpression('12345678901234567890123456789')).toEqual({ kind: 'number', n: 12345678901234567890123456789n, d: 1n });
    expect(parseExpression('1e400')).toEqual({ kind: 'number', n: 10n ** 400n, d: 1n });
    expect(parseExpression('1e-400')).toEqual({ kind: 'number', n: 1n, d: 10n ** 400n });
  });
  it('sums and products are flat', () => {
    expect(parseExpression('a-b+c')).toEqual({ kind: 'sum', terms: [sym('a'), { kind: 'negate', argument: sym('b') }, sym('c')] });
    expect(parseExpression('a-2')).toEqual({ kind: 'sum', terms: [sym('a'), num(-2)] });
    expect(parseExpression('2q1')).toEqual({ kind: 'product', factors: [num(2), sym('q1')] });
    expect(parseExpression('a/b/c')).toEqual({
      kind: 'quotient',
      numerator: sym('a'),
      denominator: { kind: 'product', factors: [sym('b'), sym('c')] },
    });
    expect(parseExpression('-x^2')).toEqual({ kind: 'negate', argument: { kind: 'power', base: sym('x'), exponent: num(2) } });
  });
  it('pi is the only reserved name', () => {
    expect(parseExpression('pi')).toEqual({ kind: 'pi' });
    expect(symbolsOf(parseExpression('e^i + constructor*__proto__ - hasOwnProperty'))).toEqual(
      new Set(['e', 'i', 'constructor', '__proto__', 'hasOwnProperty']),
    );
    expect(parseExpression('sin + 1')).toEqual({ kind: 'sum', terms: [sym('sin'), num(1)] });
  });
  it('long sums and products, and 200 levels of brackets', () => {
    expect(symbolsOf(parseExpression(Array.from({ length: 5000 }, (_, i) => `q${i}`).join('+'))).size).toBe(5000);
    expect(parseExpression(`${'x/2*'.repeat(20000)}x`).kind).toBe('product');
    expect(parseExpression(`${'('.repeat(200)}x${')'.repeat(200)}`)).toEqual(sym('x'));
    expect(parseExpression(`${'-sin(2^('.repeat(100)}x${'))'.repeat(100)}`).kind).toBe('negate');
  });
});

const refusal = (text: string): InputError => {
  try {
    parseExpression(text, { file: 'model.yaml', key: 'hamiltonian' });
  } catch (error) {
    expect(error).toBeInstanceOf(InputError);
    return error as InputError;
  }
  throw new Error(`'${text.slice(0, 40)}' was accepted`);
};

describe('expressions that are refused, with the place and the remedy', () => {
  it.each([
    ['a/2x', 'column 4', '/(2*x)'],
    ['2/3x', 'column 4', '/(3*x)'],
    ['2/3/4x', 'column 6', '/(4*x)'],
    ['a/b*2x', 'column 6', '*'],
    ['x^2y', 'column 4', '^(2*y)'],
    ['x^-2y', 'column 5', '^(2*y)'],
    ['q1(q2+q3)', 'column 1', 'write q1*('],
    ['q1 (q2+q3)', 'column 1', 'write q1*('],
    ['2(q1+q2)', 'column 2', 'write 2*('],
    ['(a)(b)', 'column 4', '*'],
    ['(a)b', 'column 4', '*b'],
    ['a b', 'column 3', 'a*b'],
    ['a 2', 'column 3', 'a*2'],
    ['2 3', 'column 3', '2*3'],
    ['2 x y', 'column 5', 'x*y'],
    ['sin x', 'column 5', 'sin(x)'],
    ['sn(x)', 'column 1', 'sin('],
    ['Sqrt(x)', 'column 1', 'sqrt('],
    ['ln(x)', 'column 1', 'log('],
    ['abs(x)', 'column 1', 'sqrt('],
    ['constructor(x)', 'column 1', 'constructor*('],
    ['x**2', 'column 2', '^'],
    ['x²', 'column 2', '^2'],
    ['−x', 'column 1', '-'],
    ['a×b', 'column 2', '*'],
    ['2π', 'column 2', 'pi'],
    ['x!', 'column 2', 'factorial'],
    ['5%', 'column 2', '100'],
    ['x # note', 'column 3', 'outside'],
    ["x'", 'column 2', 'remove'],
    ['"s"', 'column 1', 'remove'],
    ['a;b', 'column 2', 'one expression'],
    ['x=3', 'column 2', 'define'],
    ['f(x)=x', 'column 1', 'f*('],
    ['a.b', 'column 2', '0.5'],
    ['a[1]', 'column 2', 'round'],
    ['[1,2]', 'column 1', 'round'],
    ['1:2', 'column 2', ''],
    ['a?b:c', 'column 2', ''],
    ['a<b', 'column 2', ''],
    ['2.*x', 'column 2', ''],
    ['x to y', 'column 3', 'another name'],
    ['not x', 'column 1', 'another name'],
    ['true', 'column 1', 'another name'],
    ['null', 'column 1', 'another name'],
    ['NaN', 'column 1', 'another name'],
    ['1+Infinity', 'column 3', 'another name'],
    ['0x1F', 'column 1', 'decimal digits'],
    ['0b11', 'column 1', 'decimal digits'],
    ['1_000', 'column 1', 'decimal digits'],
    ['1.2.3', 'column 4', ''],
    ['1e401', 'column 1', 'units'],
    ['1e-401', 'column 1', 'units'],
    ['1e99999999999999999999', 'column 1', 'units'],
    ['sin()', 'column 5', ''],
    ['sin(x,y)', 'column 6', 'one argument'],
    ['()', 'column 2', ''],
    ['(a', 'column 1', 'close'],
    ['a)', 'column 2', 'earlier'],
    ['a+', 'column 2', 'complete'],
    ['*a', 'column 1', 'complete'],
    ['a*/b', 'column 3', 'complete'],
    ['a+\n b c', 'line 2, column 4', 'b*c'],
    ['', '', 'write 0'],
    [' \n ', '', 'write 0'],
  ])('%j', (text, place, next) => {
    const error = refusal(text);
    expect(error.message).toContain(place);
    expect(error.culprit.next ?? '').toContain(next);
    expect(error.culprit).toMatchObject({ file: 'model.yaml', key: 'hamiltonian' });
    expect(error.culprit.expected).toBeTruthy();
  });
  it('hostile sizes', () => {
    expect(refusal(`${'('.repeat(10_000)}x${')'.repeat(10_000)}`).message).toContain('nested too deeply (column 201)');
    expect(refusal(`${'2^'.repeat(10_000)}x`).message).toContain('nested too deeply');
    expect(refusal(`${'-'.repeat(10_000)}x`).message).toContain('nested too deeply');
    expect(refusal(`${'x+'.repeat(2_500_000)}x`).message).toContain('too long');
    expect(refusal('1'.repeat(5000)).message).toContain('too many digits');
    expect(refusal('x'.repeat(300_000)).culprit.value!.length).toBeLessThan(80);
  });
});
