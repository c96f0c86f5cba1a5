/** Every sample's answers against its golden files; `node test/samples/update.mjs` writes these, after a look at what changed. */
import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { answerOf, cases, goldenFolder, samples } from './cases.ts';

describe('golden results', () => {
  it('one for each question, and no other', () => {
    expect(readdirSync(goldenFolder).sort()).toEqual(cases.map((c) => `${c.name}.json`).sort());
  });

  describe.each(samples)('%s', (sample) => {
    it.each(cases.filter((c) => c.sample === sample))('$command', async (asked) => {
      const golden: unknown = JSON.parse(readFileSync(`${goldenFolder}${asked.name}.json`, 'utf8'));
      expect(JSON.parse(JSON.stringify(await answerOf(asked)))).toEqual(golden);
    });
  });
});
