// Builds the library with tsc and the command-line entry with esbuild.
import { spawnSync } from 'node:child_process';
import { chmodSync, rmSync, writeFileSync } from 'node:fs';
import { build } from 'esbuild';
import { bundleGrammar } from './grammar.mjs';

const root = new URL('..', import.meta.url).pathname;
rmSync(`${root}dist`, { recursive: true, force: true });
const tsc = spawnSync(process.execPath, [`${root}node_modules/typescript/bin/tsc`, '-p', `${root}tsconfig.json`], { stdio: 'inherit' });
if (tsc.status !== 0) process.exit(tsc.status ?? 1);
// the library gets the parser as one small file: importing the package whole takes about a second
writeFileSync(`${root}dist/model/expression/grammar.js`, await bundleGrammar());
rmSync(`${root}dist/model/expression/grammar.js.map`, { force: true });
await build({
  entryPoints: [`${root}src/cli/main.ts`],
  outdir: `${root}dist/cli`,
  bundle: true,
  splitting: true,
  format: 'esm',
  platform: 'node',
  target: 'node20',
  chunkNames: 'chunks/[name]-[hash]',
  sourcemap: false,
  minify: false,
  allowOverwrite: true,
  logLevel: 'warning',
  banner: { js: "import { createRequire as __createRequire } from 'node:module'; const require = __createRequire(import.meta.url);" },
});
chmodSync(`${root}dist/cli/main.js`, 0o755);
