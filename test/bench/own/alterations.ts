/**
 * How many random alterations of one number in result files `verify` finds, and how long it takes for one:
 * node --import tsx test/bench/own/alterations.ts [COUNT] [SEED]. Ends with status 1 where one is missed.
 */
import { declareFile, InputError, type StudyCommand, study, verify } from '../../../src/index.ts';
import { altered, random } from '../../study/verify-alterations.ts';

const samples: readonly (readonly [StudyCommand, string])[] = [
  ['codim', 'three-resonator-ring'],
  ['codim', 'pull-in-fold'],
  ['codim', 'quaternion-oscillator'],
  ['check', 'three-resonator-ring'],
  ['components', 'square-lattice-cell'],
  ['sweep', 'pull-in-fold'],
];

async function main(count: number, seed: number): Promise<number> {
  const texts = await Promise.all(
    samples.map(async ([command, name]) => {
      const declaration = declareFile(new URL(`../../../samples/${name}.yaml`, import.meta.url).pathname);
      return JSON.stringify((await study(command, declaration)).result);
    }),
  );
  const next = random(seed);
  let missed = 0;
  const start = performance.now();
  for (let k = 0; k < count; k++) {
    const which = k % texts.length;
    const change = altered(texts[which]!, next);
    const found = await verify(change.text).then(
      (r) => !r.agrees,
      (error: unknown) => {
        if (error instanceof InputError) return true;
        throw error;
      },
    );
    if (found) continue;
    missed++;
    console.log(`missed in ${samples[which]!.join(' of ')}: ${change.from} to ${change.to} at ${change.at}`);
  }
  console.log(`${count - missed} of ${count} alterations found, ${((performance.now() - start) / count).toFixed(0)} ms each, seed ${seed}`);
  return missed === 0 ? 0 : 1;
}

main(Number(process.argv[2] ?? 1000), Number(process.argv[3] ?? 1)).then((status) => {
  process.exitCode = status;
});
