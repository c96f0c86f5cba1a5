import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors/index.ts';
import { readYaml, type YamlNode } from '../../../src/model/declaration/yaml-reader.ts';

const plain = (node: YamlNode): unknown =>
  node.kind === 'text'
    ? node.text
    : node.kind === 'list'
      ? node.items.map(plain)
      : Object.fromEntries([...node.entries].map(([k, v]) => [k, plain(v)]));
const read = (text: string): unknown => plain(readYaml(text, 'm.yaml'));
const refusal = (text: string): InputError => {
  try {
    readYaml(text, 'm.yaml');
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error('not refused');
};

describe('YAML 1.2 with the failsafe schema', () => {
  it('keeps every scalar as text, in JSON too', () => {
    expect(read('a: 0.10000000000000000000000001\nb: 1e3\nc: true\nd: 012\ne: null\nf:\n')).toEqual({
      a: '0.10000000000000000000000001',
      b: '1e3',
      c: 'true',
      d: '012',
      e: 'null',
      f: '',
    });
    expect(read('{"n": 12345678901234567890.50, "t": [false, null]}')).toEqual({ n: '12345678901234567890.50', t: ['false', 'null'] });
  });
  it('makes blanks of line breaks', () => {
    expect(read('a: >\n  x +\n  y\nb: |\n  x +\n    y\nc: x +\n  y\nd: "x\\ny"')).toEqual({ a: 'x + y', b: 'x + y', c: 'x + y', d: 'x y' });
  });
  it('follows aliases and remembers key paths and lines', () => {
    const root = readYaml('a: &x [1, 2]\nb:\n  c: *x\n', 'm.yaml');
    expect(plain(root)).toEqual({ a: ['1', '2'], b: { c: ['1', '2'] } });
    const item = root.kind === 'map' ? root.entries.get('a') : undefined;
    expect(item?.kind === 'list' && item.items[1]).toMatchObject({ key: 'a[2]', line: 1, file: 'm.yaml' });
  });
  it('has no special names', () => {
    expect(Object.keys(read('__proto__: 1\nconstructor: 2\n') as object)).toContain('constructor');
    expect(readYaml('__proto__: 1\n', 'm.yaml')).toMatchObject({ kind: 'map' });
    expect(read('<<: {a: 1}')).toEqual({ '<<': { a: '1' } });
  });
  it.each([
    ['duplicate keys', 'a: 1\na: 2', /written twice/],
    ['duplicate keys of JSON', '{"a": 1, "a": 2}', /written twice/],
    ['tags', 'a: !!int 3', /tag/],
    ['own tags', 'a: !exec ls', /tag/],
    ['YAML 1.1', '%YAML 1.1\n---\na: yes', /1\.1/],
    ['two documents', 'a: 1\n---\nb: 2', /document/],
    ['an unknown alias', 'a: *y', /alias/i],
    ['an alias inside its anchor', 'a: &x [*x]', /nested/],
    ['keys that are lists', '? [a]\n: b', /plain name/],
    ['an empty text', ' \n', /empty/],
    ['comments only', '# nothing\n', /no data/],
    ['open brackets', 'a: [1, 2', /not valid YAML at line 1/],
    ['a flood of brackets', '['.repeat(100_000), /nested too deeply/],
    ['a flood of dashes', '- '.repeat(100_000), /nested too deeply/],
    ['a staircase', Array.from({ length: 3000 }, (_, k) => `${' '.repeat(k)}a:`).join('\n'), /nested/],
    ['lists eighty deep', `${'['.repeat(80)}${']'.repeat(80)}`, /deeper than 64/],
  ])('refuses %s', (_, text, message) => {
    expect(refusal(text).message).toMatch(message);
    expect(refusal(text).culprit.file).toBe('m.yaml');
    expect(refusal(text).culprit.expected).toBeTruthy();
  });
  it('stops an alias bomb', () => {
    const levels = 'bcdefghi'.split('').map((name, k) => `${name}: &${name} [${Array(9).fill(`*${'abcdefghi'[k]}`).join(', ')}]`);
    expect(refusal(`a: &a [${Array(9).fill('x').join(', ')}]\n${levels.join('\n')}`).message).toMatch(/Aliases unfold/);
  });
});
