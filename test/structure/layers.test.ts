/** The layers of src, as DEVELOPERS.md lists them: imports point downward, or sideways without cycles. */
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { dirname, join, normalize, relative } from 'node:path';
import { describe, expect, it } from 'vitest';

const root = new URL('../../', import.meta.url).pathname;

/** From the lowest to the highest; index.ts, the public surface, stands above all but cli. */
const layers = [
  'errors',
  'field',
  'linear',
  'polynomial',
  'group',
  'action',
  'model',
  'event',
  'invariant',
  'normalform',
  'study',
  'report',
  'cli',
];

function filesBelow(folder: string): string[] {
  return readdirSync(join(root, folder)).flatMap((name) => {
    const path = join(folder, name);
    return statSync(join(root, path)).isDirectory() ? filesBelow(path) : [path];
  });
}

const sources = filesBelow('src').filter((file) => file.endsWith('.ts'));
const layerOf = (file: string): string => file.split('/')[1]!;

interface Import {
  readonly from: string;
  readonly to: string;
  /** Types vanish before the program runs, so that they make no cycle. */
  readonly typeOnly: boolean;
}

/** Local imports of a file, with paths from the root; comments and strings hold none in our style. */
function importsOf(file: string): Import[] {
  const text = readFileSync(join(root, file), 'utf8');
  const found = [...text.matchAll(/(?:\b(import|export)\s+(type\s+)?[^'";]*?\bfrom\s*|\bimport\s*\(?\s*)'(\.[^']+)'/g)];
  return found.map((match) => ({ from: file, to: normalize(join(dirname(file), match[3]!)), typeOnly: match[2] !== undefined }));
}

const imports = sources.flatMap(importsOf);

/** A cycle among the imports, or undefined. */
function findCycle(edges: readonly Import[]): string[] | undefined {
  const next = new Map<string, string[]>();
  for (const { from, to } of edges) next.set(from, [...(next.get(from) ?? []), to]);
  const state = new Map<string, 'open' | 'done'>();
  const visit = (file: string, path: readonly string[]): string[] | undefined => {
    if (state.get(file) === 'done') return undefined;
    if (state.get(file) === 'open') return [...path.slice(path.indexOf(file)), file];
    state.set(file, 'open');
    for (const target of next.get(file) ?? []) {
      const cycle = visit(target, [...path, file]);
      if (cycle !== undefined) return cycle;
    }
    state.set(file, 'done');
    return undefined;
  };
  for (const file of next.keys()) {
    const cycle = visit(file, []);
    if (cycle !== undefined) return cycle;
  }
  return undefined;
}

describe('layers', () => {
  it('every file of src lies in a layer, or is index.ts', () => {
    for (const file of sources) expect([...layers, 'index.ts'], file).toContain(layerOf(file));
  });

  it('every local import names a file that exists', () => {
    for (const { from, to } of imports) expect(existsSync(join(root, to)), `${from} imports ${to}`).toBe(true);
  });

  it('imports point downward', () => {
    const rank = (file: string): number => (layerOf(file) === 'index.ts' ? layers.indexOf('cli') - 0.5 : layers.indexOf(layerOf(file)));
    const upward = imports.filter(({ from, to }) => rank(to) > rank(from)).map(({ from, to }) => `${from} imports ${to}`);
    expect(upward).toEqual([]);
  });

  it('imports make no cycle', () => {
    expect(findCycle(imports.filter(({ typeOnly }) => !typeOnly))).toBeUndefined();
  });

  it('a cycle would be found', () => {
    const edge = (from: string, to: string): Import => ({ from, to, typeOnly: false });
    expect(findCycle([edge('a', 'b'), edge('b', 'c'), edge('d', 'a')])).toBeUndefined();
    expect(findCycle([edge('d', 'a'), edge('a', 'b'), edge('b', 'c'), edge('c', 'a')])).toEqual(['a', 'b', 'c', 'a']);
  });

  it('DEVELOPERS.md lists the same layers in the same order', () => {
    const text = readFileSync(join(root, 'DEVELOPERS.md'), 'utf8');
    const table = [...text.matchAll(/^\| `([a-z]+)` \|/gm)].map((match) => match[1]!).filter((name) => layers.includes(name));
    expect(table).toEqual(layers);
  });

  it('no library code prints, exits or reads the command line', () => {
    const loud = /\bconsole\.|\bprocess\.(stdout|stderr|exit|exitCode|argv)\b/;
    const offenders = sources
      .filter((file) => file !== 'src/cli/main.ts')
      .filter((file) => loud.test(readFileSync(join(root, file), 'utf8').replace(/\/\*[\s\S]*?\*\/|\/\/.*/g, '')));
    expect(offenders).toEqual([]);
  });

  it('tests mirror the layers', () => {
    const folders = readdirSync(join(root, 'test'), { withFileTypes: true }).flatMap((entry) => (entry.isDirectory() ? [entry.name] : []));
    const others = ['structure', 'support', 'data', 'bench', 'samples', 'library', 'acceptance'];
    for (const folder of folders) expect([...layers, ...others], relative(root, folder)).toContain(folder);
  });
});
