import { readdirSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  didYouMean,
  expressionTexts,
  listed,
  namesIn,
  naturalOrder,
  pairedNames,
  readModelFile,
} from '../../../src/model/declaration/index.ts';
import { parseExpression, symbolsOf } from '../../../src/model/expression/index.ts';

const SAMPLES = new URL('../../../samples/', import.meta.url).pathname;

describe('names in expressions', () => {
  it('skips numbers with exponents, functions and pi', () => {
    expect([...namesIn('1e3*q1 + 2.5E-4*x_2 - cos(2*pi/5)*sqrt(mu) + .5e2')]).toEqual(['q1', 'x_2', 'mu']);
    expect([...namesIn('exp + cos(e)*i')]).toEqual(['exp', 'e', 'i']);
    expect([...namesIn('')]).toEqual([]);
  });
  it('agrees with the parsed expression on every text of the samples', () => {
    let count = 0;
    for (const file of readdirSync(SAMPLES).filter((name) => name.endsWith('.yaml'))) {
      for (const text of new Set(expressionTexts(readModelFile(SAMPLES + file)))) {
        expect([...namesIn(text)].sort(), text).toEqual([...symbolsOf(parseExpression(text))].sort());
        count++;
      }
    }
    expect(count).toBeGreaterThan(100);
  });
});

describe('natural order and pairing', () => {
  it('puts q2 before q10', () => {
    expect(['q10', 'q2', 'q1', 'q', 'qb', 'qa2', 'qa10'].sort(naturalOrder)).toEqual(['q', 'q1', 'q2', 'q10', 'qa2', 'qa10', 'qb']);
  });
  it('is a total order', () => {
    const name = fc.stringMatching(/^q[a-b0-2]{0,4}$/);
    fc.assert(
      fc.property(name, name, name, (a, b, c) => {
        expect(Math.sign(naturalOrder(a, b))).toBe(-Math.sign(naturalOrder(b, a)) + 0);
        expect(naturalOrder(a, b) === 0).toBe(a === b);
        if (naturalOrder(a, b) < 0 && naturalOrder(b, c) < 0) expect(naturalOrder(a, c)).toBeLessThan(0);
      }),
    );
  });
  it('pairs by endings and supplies partners', () => {
    expect(pairedNames(['p10', 'q2', 'q10', 'mu', 'p1', 'pi'])).toEqual({ coordinates: ['q1', 'q2', 'q10'], momenta: ['p1', 'p2', 'p10'] });
    expect(pairedNames(['q', 'p'])).toEqual({ coordinates: ['q'], momenta: ['p'] });
    expect(pairedNames([])).toEqual({ coordinates: [], momenta: [] });
  });
});

describe('did you mean', () => {
  it('names slips and stays silent otherwise', () => {
    expect(didYouMean('hamiltonain', ['hamiltonian', 'stiffness'])).toBe(' Did you mean hamiltonian?');
    expect(didYouMean('zzz', ['hamiltonian'])).toBe('');
    expect(didYouMean('x'.repeat(100), ['x'.repeat(99)])).toBe('');
  });
  it('shortens long lists', () => {
    expect(listed(['a', 'b'])).toBe('a, b');
    expect(listed(['a', 'b', 'c'], 2)).toBe('a, b, … (3 in all)');
  });
});
