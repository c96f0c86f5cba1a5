import { describe, expect, it } from 'vitest';
import { compose, REFERENCES, referenceText } from '../../src/report/index.ts';
import { plainInline } from '../../src/report/printers/lines.ts';
import { ringAll, ringCheck } from './fixtures/ring.ts';
import { ringSweep } from './fixtures/sweep.ts';

describe('references', () => {
  it('every key that a document cites is in the list', () => {
    for (const results of [ringAll, ringSweep, ringCheck])
      for (const key of compose(results).citations) expect(Object.hasOwn(REFERENCES, key), key).toBe(true);
    expect(compose(ringAll).citations).toContain('golubitsky-stewart-1987');
  });
  it('entries have author, title, place and year, and keys end with the year', () => {
    for (const [key, entry] of Object.entries(REFERENCES)) {
      expect(key).toMatch(new RegExp(`^[a-z-]+-${entry.year}$`));
      for (const part of [entry.authors, entry.title, entry.where]) expect(part.length).toBeGreaterThan(3);
      expect(referenceText(entry)).toContain(String(entry.year));
    }
  });
  it('citations are numbered in the order of first citation', () => {
    const { citations } = compose(ringAll);
    expect(new Set(citations).size).toBe(citations.length);
    const numbers = new Map(citations.map((key, i) => [key, i + 1]));
    expect(plainInline({ kind: 'cite', keys: [citations[0]!, citations[1]!] }, numbers)).toBe('[1, 2]');
  });
});
