// Builds the library with tsc, the command line with esbuild, and the code cache of the command line.
import { spawnSync } from 'node:child_process';
import { chmodSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { build } from 'esbuild';

const root = new URL('..', import.meta.url).pathname;
const node = (...words) => spawnSync(process.execPath, words, { stdio: ['ignore', 'ignore', 'inherit'], cwd: root }).status;

rmSync(`${root}dist`, { recursive: true, force: true });
const tsc = spawnSync(process.execPath, [`${root}node_modules/typescript/bin/tsc`, '-p', `${root}tsconfig.json`], { stdio: 'inherit' });
if (tsc.status !== 0) process.exit(tsc.status ?? 1);

// The command line is bundled; what tsc made of it is no part of the library.
rmSync(`${root}dist/cli`, { recursive: true, force: true });
const common = { bundle: true, platform: 'node', target: 'node20', logLevel: 'warning' };

// What the grammar takes from mathjs, bundled by itself: inside a module that is loaded on demand esbuild keeps all of
// a package, and of this one we need a tenth.
const names = /import \{([^}]*)\} from 'mathjs'/.exec(readFileSync(`${root}src/model/expression/grammar.ts`, 'utf8'))[1];
const grammar = await build({
  ...common,
  stdin: { contents: `export {${names}} from 'mathjs';`, resolveDir: root },
  format: 'esm',
  write: false,
});
const mathjs = {
  name: 'mathjs',
  setup(bundle) {
    bundle.onResolve({ filter: /^mathjs$/ }, () => ({ path: 'mathjs', namespace: 'bundled' }));
    bundle.onLoad({ filter: /.*/, namespace: 'bundled' }, () => ({ contents: grammar.outputFiles[0].text }));
  },
};

await build({
  ...common,
  plugins: [mathjs],
  entryPoints: [`${root}src/cli/main.ts`],
  outfile: `${root}dist/cli/program.cjs`,
  format: 'cjs',
  // Loaded where they are used, from node_modules. No import() is left in the bundle, so that it can run as a script.
  external: ['katex', 'ml-matrix', 'nerdamer', 'nerdamer/*'],
  supported: { 'dynamic-import': false },
  define: { 'import.meta.url': '__url' },
  banner: { js: '(function (require, __url) { const module = { exports: {} };' },
  footer: { js: 'return module.exports; })' },
});
// The starter is CommonJS, which Node starts some milliseconds sooner than a module.
await build({
  ...common,
  entryPoints: [`${root}src/cli/start.ts`],
  outfile: `${root}dist/cli/main.js`,
  format: 'cjs',
  define: { 'import.meta.url': '__url' },
  banner: { js: "const __url = require('node:url').pathToFileURL(__filename).href;" },
});
writeFileSync(`${root}dist/cli/package.json`, '{ "type": "commonjs" }\n');
chmodSync(`${root}dist/cli/main.js`, 0o755);

const cache = node(`${root}.build/code-cache.mjs`);
if (cache !== 0) process.exit(cache ?? 1);
