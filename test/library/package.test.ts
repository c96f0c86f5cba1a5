/** The package as npm makes it, unpacked outside of the checkout beside its dependencies. */
import { execFileSync, spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const root = new URL('../../', import.meta.url).pathname;
const manifest = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')) as { dependencies: Record<string, string>; name: string };
let folder = '';
let files: string[] = [];

/** Production dependencies with all that they need. */
function closure(): Set<string> {
  const found = new Set<string>();
  const open = Object.keys(manifest.dependencies);
  for (let name = open.pop(); name !== undefined; name = open.pop()) {
    if (found.has(name)) continue;
    found.add(name);
    const own = JSON.parse(readFileSync(join(root, 'node_modules', name, 'package.json'), 'utf8')) as {
      dependencies?: Record<string, string>;
    };
    open.push(...Object.keys(own.dependencies ?? {}));
  }
  return found;
}

beforeAll(() => {
  if (!existsSync(join(root, 'dist/cli/main.js'))) execFileSync('npm', ['run', '--silent', 'build'], { cwd: root, stdio: 'ignore' });
  folder = mkdtempSync(join(tmpdir(), 'package-'));
  const packed = JSON.parse(
    execFileSync('npm', ['pack', '--json', '--ignore-scripts', '--pack-destination', folder], {
      cwd: root,
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
    }),
  ) as { filename: string; files: { path: string }[] }[];
  files = packed[0]!.files.map((f) => f.path);
  const modules = join(folder, 'node_modules');
  mkdirSync(join(modules, manifest.name), { recursive: true });
  execFileSync('tar', ['-xzf', join(folder, packed[0]!.filename), '--strip-components=1', '-C', join(modules, manifest.name)]);
  for (const name of closure()) {
    if (name.includes('/')) mkdirSync(join(modules, name.split('/')[0]!), { recursive: true });
    symlinkSync(join(root, 'node_modules', name), join(modules, name));
  }
}, 60_000);

afterAll(() => {
  if (folder !== '') rmSync(folder, { recursive: true });
});

const run = (words: readonly string[], input = '') =>
  spawnSync(process.execPath, [join(folder, 'node_modules', manifest.name, 'dist/cli/main.js'), ...words], {
    cwd: folder,
    encoding: 'utf8',
    input,
  });

describe('package', () => {
  it('holds the program, the library with its types, the catalogue and the samples, and no tests', () => {
    for (const file of [
      'dist/cli/main.js',
      'dist/cli/program.cjs',
      'dist/index.js',
      'dist/index.d.ts',
      'package.json',
      'LICENSE',
      'README.md',
    ])
      expect(files).toContain(file);
    expect(files.filter((f) => f.startsWith('groups/')).length).toBe(readdirSync(join(root, 'groups')).length);
    expect(files.some((f) => f.startsWith('samples/'))).toBe(true);
    expect(files.filter((f) => /^(test|src|\.)/.test(f))).toEqual([]);
  });

  it('runs with its catalogue', () => {
    const result = run([
      'codim',
      '--group',
      'cyclic:3',
      '--on',
      'q1,p1',
      '--quadratic',
      'mu*(q1^2+p1^2)/2',
      '--set',
      'mu=0',
      '--vary',
      'mu',
      '--json',
    ]);
    expect(result.stderr).toBe('');
    expect(JSON.parse(result.stdout)).toMatchObject({ zero: { codimension: 1, motion: 'passes' }, verdict: { answer: 'generic' } });
    expect(result.status).toBe(0);
    expect(run(['groups', 'Oh']).status).toBe(0);
  });

  it('sweeps, with its picture', () => {
    const model = join(folder, 'node_modules', manifest.name, 'samples/three-resonator-ring.yaml');
    const result = run(['sweep', model, '--svg', 'paths.svg', '--json', '--quiet']);
    expect(result.stderr).toBe('');
    expect(JSON.parse(result.stdout)).toMatchObject({ crossings: [{ exact: '-1/3' }] });
    expect(readFileSync(join(folder, 'paths.svg'), 'utf8')).toContain('<svg');
  });

  it('is imported by its name', () => {
    writeFileSync(
      join(folder, 'use.mjs'),
      `import { codim, declareOptions, SymcodimError } from 'symcodim';
       const result = await codim(declareOptions({ group: 'dihedral:3', on: [['q1', 'q2']], timeReversal: true, hamiltonian: '(p1^2+p2^2)/2 + a*(q1^3-3*q1*q2^2)', set: { a: 1 } }));
       console.log(JSON.stringify([result.zero.codimension, typeof SymcodimError]));`,
    );
    const result = spawnSync(process.execPath, ['use.mjs'], { cwd: folder, encoding: 'utf8' });
    expect(result.stderr).toBe('');
    expect(JSON.parse(result.stdout)).toEqual([1, 'function']);
  });
});
