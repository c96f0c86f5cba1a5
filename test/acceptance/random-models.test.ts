/**
 * Random exact models with their own symplectic forms, in coordinates that know nothing of the symmetry, against
 * brute force: every key of codim and components that linear algebra alone decides. A failure names its seed.
 */
import { describe, expect, it } from 'vitest';
import { bruteForce, pairUnfolding } from './support/brute-force.ts';
import { compareCodim, compareComponents, type Result } from './support/compare.ts';
import { run } from './support/program.ts';
import { ABSTRACT, familyFile, modelFile, type RandomModel, randomFamily, randomModel } from './support/realisations.ts';

const draw = (): { seed: number; model: RandomModel }[] => {
  const list: { seed: number; model: RandomModel }[] = [];
  for (let seed = 1; seed <= 60; seed++) {
    const model = randomModel(seed, 6);
    if (model !== undefined) list.push({ seed, model });
  }
  // the two classes that a free draw meets rarely
  for (const name of ['C3 x C2', 'C4', 'Q8 o C4', 'Q8 x C2', 'Dic3'])
    for (let seed = 100, found = 0; seed < 160 && found < 3; seed++) {
      const model = randomModel(seed, 8, name);
      if (model === undefined) continue;
      found++;
      list.push({ seed, model });
    }
  return list;
};

async function answers(command: string, models: readonly unknown[]): Promise<Result[]> {
  const got = await run(['batch', '--command', command], `${models.map((m) => JSON.stringify(m)).join('\n')}\n`);
  return got.stdout
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line));
}

describe('random models against brute force', () => {
  it('codim and components agree with it', async () => {
    const list = draw();
    expect(list.length).toBeGreaterThan(30);
    expect(new Set(list.map((x) => x.model.name)).size).toBeGreaterThan(ABSTRACT.length - 5);
    const files = list.map((x) => modelFile(x.model));
    const [codim, components] = await Promise.all([answers('codim', files), answers('components', files)]);
    const wrong = list.flatMap(({ seed, model }, i) => {
      const want = bruteForce(model, model.s);
      const [a, b] = [codim[i].result ?? codim[i], components[i].result ?? components[i]];
      if (a.zero === undefined || b.classes === undefined)
        return [`${model.name}, seed ${seed}: ${JSON.stringify(a.error ?? b.error ?? a).slice(0, 300)}`];
      return [...compareCodim(a, want), ...compareComponents(b, want, model.w.length)].map(
        (text) => `${model.name}, seed ${seed}: ${text}`,
      );
    });
    expect(wrong).toEqual([]);
  });
  it('floating: the same answers, noise of 1e-10 in S included, or undecided', async () => {
    const list = draw().filter((x) => x.model.s.some((row) => row.some((v) => v !== 0)));
    let state = 1;
    const noisy = list.map(({ model }) => {
      const size = 1e-10 * Math.max(...model.s.flat().map(Math.abs));
      const s = model.s.map((row) => row.map(String));
      s.forEach((row, i) => {
        for (let j = 0; j <= i; j++) {
          state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
          const text = (model.s[i]![j]! + size * (state / 2 ** 31 - 1)).toPrecision(17);
          row[j] = text;
          s[j]![i] = text;
        }
      });
      return modelFile(model, { numbers: 'floating', quadratic: s });
    });
    const got = await answers('codim', noisy);
    let undecided = 0;
    const wrong = list.flatMap(({ seed, model }, i) => {
      const a = got[i].result ?? got[i];
      if (a.verdict?.answer === 'undecided') undecided++;
      if (a.verdict?.answer === 'undecided') return [];
      if (a.zero === undefined) return [`${model.name}, seed ${seed}: ${JSON.stringify(a.error ?? a).slice(0, 300)}`];
      return compareCodim(a, bruteForce(model, model.s)).map((text) => `${model.name}, seed ${seed}: ${text}`);
    });
    expect(wrong).toEqual([]);
    expect(undecided).toBeLessThan(list.length / 4);
  });
  it('versality of random families, moving forms included, against changes of basis of the pair (W, S)', async () => {
    const list = draw().map((x) => ({ ...x, family: randomFamily(x.model, x.seed) }));
    const got = await answers(
      'codim',
      list.map((x) => familyFile(x.model, x.family)),
    );
    const wrong = list.flatMap(({ seed, model, family }, i) => {
      const a = got[i].result ?? got[i];
      if (a.zero === null) return [];
      const want = pairUnfolding(model, family);
      return a.zero?.codimension === want.codimension && a.verdict.versal === want.spans
        ? []
        : [`${model.name}, seed ${seed}: got ${a.zero?.codimension} ${a.verdict?.versal}, expected ${want.codimension} ${want.spans}`];
    });
    expect(wrong).toEqual([]);
    expect(list.some((x) => x.family.some((f) => f.w.some((row) => row.some((v) => v !== 0))))).toBe(true);
  });
});
