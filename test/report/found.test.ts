/** The section of `check --find`. */
import { describe, expect, it } from 'vitest';
import { foundSection } from '../../src/report/sections/found.ts';
import type { FoundSymmetry } from '../../src/study/find.ts';

const found: FoundSymmetry = {
  order: 24,
  reversing: true,
  signedOrder: 24,
  generators: [
    { name: 'f1', reversing: false, map: 'q1: -q1, q2: -q2' },
    { name: 'f2', reversing: true, map: '' },
    { name: 'f3', reversing: false, map: Array.from({ length: 40 }, (_, i) => `q${i}: q${i + 1}`).join(', ') },
  ],
  declaredOrder: 12,
  contains: true,
  undeclared: ['f1'],
  outside: [],
  degree: 4,
  words: 'H is invariant under a group of order 24; the declared one has order 12.',
};

describe('symmetry found', () => {
  it('is left out where nothing was looked for', () => expect(foundSection({ commands: ['check'] })).toBeNull());
  it('tells what is declared from what is not, and shortens long maps', () => {
    const section = foundSection({ commands: ['check'], found })!;
    const text = JSON.stringify(section.blocks);
    expect(text).toContain('order 24');
    expect(text).toContain('degree 4');
    expect(text).toContain('q1: -q1, q2: -q2');
    expect(text).toContain('all coordinates stay');
    expect(text).toContain('40 coordinates move');
    const table = section.blocks.find((b) => b.kind === 'table')!;
    expect(table.rows.map((r) => r[2])).toEqual([['no'], ['yes'], ['yes']]);
  });
  it('says how many generators are not shown', () => {
    const many = { ...found, generators: Array.from({ length: 30 }, (_, i) => ({ name: `f${i}`, reversing: false, map: 'q1: q2' })) };
    expect(JSON.stringify(foundSection({ commands: ['check'], found: many })!.blocks)).toContain('6 more generators');
  });
});
