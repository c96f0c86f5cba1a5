/** Expressions written as a person would: laws and a few by hand. */
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { compileNumeric, type Expression, formatExpression, parseExpression, tidy } from '../../../src/model/expression/index.ts';

const tidied = (text: string) => formatExpression(tidy(parseExpression(text)));

describe('tidy', () => {
  it('multiplies numbers out, gathers like terms and powers, keeps brackets', () => {
    expect(tidied('1/2*1/1*(p1 - 1/2*(-2)*q2)^2')).toBe('(p1 + q2)^2/2');
    expect(tidied('1/2*k*(-1)*q1*q3 + 1/2*k*(-1)*q3*q1')).toBe('-k*q1*q3');
    expect(tidied('1/2*(-1 + k*2)*q1*q1')).toBe('(-1 + 2*k)*q1^2/2');
    expect(tidied('x - x')).toBe('0');
    expect(tidied('0*x + 3/4')).toBe('3/4');
    expect(tidied('sin(2*x*1/2)/3 - 1/(x*1)')).toBe('sin(x)/3 - 1/x');
    expect(tidied('2*(x + 1) - (x + 1)')).toBe('x + 1');
  });

  const leaf = fc.oneof(
    fc.constantFrom('x', 'y', 'pi').map((name): Expression => (name === 'pi' ? { kind: 'pi' } : { kind: 'symbol', name })),
    fc.integer({ min: -3, max: 3 }).map((n): Expression => ({ kind: 'number', n: BigInt(n), d: 1n })),
  );
  const { tree } = fc.letrec<{ tree: Expression }>((tie) => ({
    tree: fc.oneof(
      { depthSize: 'small', withCrossShrink: true },
      leaf,
      fc.array(tie('tree'), { minLength: 1, maxLength: 3 }).map((terms): Expression => ({ kind: 'sum', terms })),
      fc.array(tie('tree'), { minLength: 1, maxLength: 3 }).map((factors): Expression => ({ kind: 'product', factors })),
      tie('tree').map((argument): Expression => ({ kind: 'negate', argument })),
      tie('tree').map((argument): Expression => ({ kind: 'call', name: 'sin', argument })),
      fc
        .tuple(tie('tree'), fc.integer({ min: 1, max: 3 }))
        .map(([base, n]): Expression => ({ kind: 'power', base, exponent: { kind: 'number', n: BigInt(n), d: 1n } })),
      fc
        .tuple(tie('tree'), fc.integer({ min: 1, max: 3 }))
        .map(([numerator, n]): Expression => ({ kind: 'quotient', numerator, denominator: { kind: 'number', n: BigInt(n), d: 1n } })),
    ),
  }));

  it('is the same function', () => {
    fc.assert(
      fc.property(tree, (e) => {
        const before = compileNumeric(e, ['x', 'y'])([0.7, -0.4]);
        const after = compileNumeric(tidy(e), ['x', 'y'])([0.7, -0.4]);
        expect(Math.abs(after - before)).toBeLessThanOrEqual(1e-9 * (1 + Math.abs(before)));
      }),
      { seed: 11, numRuns: 400 },
    );
  });

  it('is read back as it was written, and done twice is done once', () => {
    fc.assert(
      fc.property(tree, (e) => {
        const text = formatExpression(tidy(e));
        expect(formatExpression(tidy(parseExpression(text)))).toBe(text);
      }),
      { seed: 12, numRuns: 400 },
    );
  });
});
