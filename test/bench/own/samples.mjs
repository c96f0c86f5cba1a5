import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { done, expect, timed } from './clock.mjs';

const here = (name) => fileURLToPath(new URL(`../../../${name}`, import.meta.url));
for (const name of ['three-resonator-ring', 'truncated-icosahedron']) {
  const words = [here('dist/cli/main.js'), 'codim', here(`samples/${name}.yaml`), '--json'];
  const run = timed(`codim ${name}, wall`, () => spawnSync(process.execPath, words, { encoding: 'utf8', maxBuffer: 1 << 26 }));
  expect(JSON.parse(run.stdout).command, 'codim', name);
}
done();
