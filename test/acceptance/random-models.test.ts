/**
 * Random exact models with their own symplectic forms, in coordinates that know nothing of the symmetry, against
 * brute force: every key of codim and components that linear algebra alone decides. A failure names its seed.
 */
import { describe, expect, it } from 'vitest';
import { bruteForce } from './support/brute-force.ts';
import { compareCodim, compareComponents, type Result } from './support/compare.ts';
import { run } from './support/program.ts';
import { ABSTRACT, modelFile, type RandomModel, randomModel } from './support/realisations.ts';

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

async function answers(command: string, models: readonly RandomModel[]): Promise<Result[]> {
  const got = await run(['batch', '--command', command], `${models.map((m) => JSON.stringify(modelFile(m))).join('\n')}\n`);
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
    const models = list.map((x) => x.model);
    const [codim, components] = await Promise.all([answers('codim', models), answers('components', models)]);
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
});
