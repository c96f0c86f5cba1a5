/** Labels that a model's group gives to its components. */
import { describe, expect, it } from 'vitest';
import { type Declaration, declare, type OptionUse } from '../../src/model/declaration/index.ts';
import { componentsResult } from '../../src/study/components.ts';

const options = (...pairs: [string, string][]): Declaration =>
  declare(
    {},
    pairs.map(([name, value]): OptionUse => ({ name, value })),
  );
const labels = async (d: Declaration) =>
  (await componentsResult(d)).components
    .map((c) => `${c.multiplicity}${c.label}`)
    .sort()
    .join(' ');
const text = (symmetry: string) =>
  declare({ text: `coordinates: [q1, q2, q3]\n${symmetry}\nquadratic: q1^2+q2^2+q3^2+p1^2+p2^2+p3^2` }, []);

describe('Mulliken 1955, the vector of the group doubled for coordinates and momenta', () => {
  it.each([
    ['C2v', '2A1 2B1 2B2'],
    ['C3v', '2A1 2E'],
    ['D3h', "2A2'' 2E'"],
    ['D4h', '2A2u 2Eu'],
    ['D6h', '2A2u 2E1u'],
    ['D2d', '2B2 2E'],
    ['D2', '2B1 2B2 2B3'],
    ['S4', '2B 2E'],
    ['Td', '2T2'],
    ['Oh', '2T1u'],
    ['Ih', '2T1u'],
    ['I', '2T1'],
    ['Cs', "2A'' 4A'"],
  ])('%s', async (group, expected) => {
    const found = await labels(text(`symmetry: {group: ${group}, on: [[q1, q2, q3]], action: space}`));
    // the complex pair of S4 is one irreducible of dimension 2
    expect(found).toBe(expected);
  });
});

describe('products with time reversal', () => {
  it('labels of momenta carry a minus, however time reversal is declared', async () => {
    expect(await labels(text('symmetry: {group: Td, on: [[q1, q2, q3]], timeReversal: true}'))).toBe('1T2 1T2-');
    expect(await labels(text('symmetry: [{group: Td, on: [[q1, q2, q3]]}, {generators: [{name: t, reversing: true}]}]'))).toBe('1T2 1T2-');
  });
  it('mirrors that reverse time leave the group as it is', async () => {
    const d = options(['group', 'dihedral:5'], ['on', 'q1,p1'], ['reversing', 's'], ['quadratic', 'q1^2 + p1^2']);
    expect(await labels(d)).toBe('1E1');
  });
});

describe('plain labels where no point group is in sight', () => {
  it('a group that acts with a kernel, other generators, other groups', async () => {
    const ring = options(['group', 'dihedral:2'], ['action', 'ring'], ['on', 'q1,q2'], ['quadratic', 'q1^2+q2^2+p1^2+p2^2']);
    expect(await labels(ring)).toBe('2A 2B');
    expect(await labels(text('symmetry: [{group: C2v, on: [[q1, q2, q3]]}, {generators: [{name: g, map: {q1: q2, q2: q1}}]}]'))).toMatch(
      /A/,
    );
    expect(await labels(text('symmetry: {group: symmetric:3, on: [[q1, q2, q3]]}'))).toBe('2A1 2E');
  });
});
