// Writes V8's code cache of the bundled command line: runs typical commands, so that their functions are compiled,
// and stores what V8 then holds. src/cli/start.ts reads it.
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { Script } from 'node:vm';

const bundle = new URL('../dist/cli/program.cjs', import.meta.url);
const sample = new URL('../samples/three-resonator-ring.yaml', import.meta.url).pathname;
const planar = [
  '--group',
  'dihedral:3',
  '--on',
  'q1,q2',
  '--hamiltonian',
  '(p1^2+p2^2)/2 + mu*(q1^2+q2^2)/2 + q1^3-3*q1*q2^2 + (q1^2+q2^2)^2',
  '--set',
  'mu=0',
];
const runs = [
  ['--help'],
  ['codim', ...planar, '--vary', 'mu', '--json'],
  ['report', ...planar, '--vary', 'mu', '--latex', '-'],
  ...(existsSync(sample) ? [['codim', sample]] : []),
];

const script = new Script(readFileSync(bundle, 'latin1'), { filename: bundle.pathname });
const start = script.runInThisContext();
for (const words of runs) {
  process.argv.splice(2, process.argv.length, ...words);
  await start(createRequire(bundle), bundle.href).finished;
}
process.exitCode = 0;
writeFileSync(new URL(`program-${process.version}-${process.arch}.cache`, bundle), script.createCachedData());
