// Writes the golden files of the samples from what the program answers today: node test/samples/update.mjs [NAME …],
// NAME a sample or sample.command. Look at the difference before it is committed.
import { mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { register } from 'tsx/esm/api';

register();
const { answerOf, cases, goldenFolder, textOf } = await import('./cases.ts');
const names = process.argv.slice(2);
const wanted = (c) => names.length === 0 || names.includes(c.name) || names.includes(c.sample);

mkdirSync(goldenFolder, { recursive: true });
for (const file of readdirSync(goldenFolder)) if (!cases.some((c) => `${c.name}.json` === file)) rmSync(`${goldenFolder}${file}`);
for (const c of cases.filter(wanted)) {
  const began = performance.now();
  writeFileSync(`${goldenFolder}${c.name}.json`, `${textOf(await answerOf(c))}\n`);
  process.stderr.write(`${c.name} ${Math.round(performance.now() - began)} ms\n`);
}
