/** Names, numbers, user files, products and combinations of actions: what is accepted, what is refused and how. */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { InputError } from '../../src/errors/errors.ts';
import { listCatalogue, loadCatalogueGroup } from '../../src/group/catalogue.ts';
import { integerValue } from '../../src/group/catalogue-arithmetic.ts';
import { multiplyTexts, negateText, sumZeroTexts } from '../../src/group/catalogue-entries.ts';
import { parseExpression } from '../../src/model/expression/index.ts';
import { asPermutationGroup, generatorNumbers, matrixKey, numbers } from './catalogue-support.ts';

function refusal(f: () => unknown): InputError {
  try {
    f();
  } catch (e) {
    if (e instanceof InputError) return e;
    throw e;
  }
  throw new Error('nothing was refused');
}

describe('unknown names', () => {
  it.each([
    ['cyclick:3', 'cyclic:3'],
    ['cyclic', 'cyclic:3'],
    ['cyclic5', 'cyclic:5'],
    ['cyclic-5', 'cyclic:5'],
    ['c3v', 'C3v'],
    ['C_3v', 'C3v'],
    ['oh', 'Oh'],
    ['TD', 'Td'],
    ['tetrahedron', 'tetrahedral'],
    ['reflection:2', 'reflection'],
    ['coxeter:H5', 'coxeter:H3'],
    ['binary-icosaedral', 'binary-icosahedral'],
    ['C3v*octaedral', 'octahedral'],
  ])('%s: did you mean %s?', (typed, meant) => {
    expect(refusal(() => loadCatalogueGroup(typed)).culprit.next).toContain(meant);
  });

  it.each(['', '*', 'C3v*', '__proto__', 'constructor', '%%%%', 'a'.repeat(100_000)])('%.20s is refused without a suggestion', (typed) => {
    const { culprit } = refusal(() => loadCatalogueGroup(typed));
    expect(culprit.next).toBe('list them with: symcodim groups');
    expect(culprit.value!.length).toBeLessThan(100);
  });

  it('more factors than nine', () => {
    expect(refusal(() => loadCatalogueGroup('C2*'.repeat(10).concat('C2'))).culprit.expected).toContain('9');
  });
});

describe('numbers out of bounds', () => {
  it.each([
    'cyclic:0',
    'cyclic:-1',
    'cyclic:1e9',
    'cyclic:2.5',
    'cyclic:',
    'cyclic:N',
    'cyclic:1000000000000',
    'cyclic:03',
    'symmetric:1',
    'symmetric:50',
    'C0',
    'CN',
  ])('%s', (typed) => {
    const { culprit } = refusal(() => loadCatalogueGroup(typed));
    expect(culprit.value).toBe(typed);
    expect(culprit.expected).toMatch(/whole number N from \d+ to \d+/);
    expect(loadCatalogueGroup(culprit.next!.replace('write for instance ', '')).generators.length).toBeGreaterThan(0);
  });

  it('rotary reflections of odd order are named otherwise', () => {
    expect(refusal(() => loadCatalogueGroup('S3')).culprit.expected).toContain('multiple of 2');
  });
});

describe('entries', () => {
  it('are texts of the model language, in every action of every group', () => {
    for (const { name, parameter } of listCatalogue()) {
      const n = parameter === undefined ? '' : String(Math.max(parameter.from, 6));
      for (const action of loadCatalogueGroup(name.replace('N', n)).actions.values())
        for (const m of action.matrices.values()) for (const x of new Set(m.flat())) expect(() => parseExpression(x)).not.toThrow();
    }
  });

  it('products and signs stay short', () => {
    expect(['0', '1', '-1', 'a'].map((x) => multiplyTexts(x, 'sqrt(2)/2'))).toEqual(['0', 'sqrt(2)/2', '-(sqrt(2)/2)', '(a)*(sqrt(2)/2)']);
    expect(['0', '-3/2', '7', 'a+b'].map(negateText)).toEqual(['0', '3/2', '-7', '-(a+b)']);
  });

  it('the hyperplane of sum zero of two coordinates is a line with sign change', () => {
    expect(sumZeroTexts([1, 0])).toEqual([['-1']]);
    expect(sumZeroTexts([0, 1])).toEqual([['1']]);
  });
});

describe('actions by name', () => {
  const d3 = () => loadCatalogueGroup('dihedral:3');

  it('the first one is the default', () => {
    expect(d3().defaultAction).toBe('plane');
    expect(d3().action().name).toBe('plane');
    expect(loadCatalogueGroup('C3v').action().name).toBe('space');
  });

  it('unknown ones are refused with the nearest', () => {
    const { culprit } = refusal(() => d3().action('rign'));
    expect(culprit).toMatchObject({ key: 'action', next: 'did you mean ring?' });
    expect(refusal(() => d3().action('ring*')).culprit.expected).toContain('plane');
  });

  it('a list of the wrong length is refused', () => {
    const { culprit } = refusal(() => d3().action('plane', 3));
    expect(culprit).toMatchObject({ key: 'on', value: '3', expected: '2 coordinates' });
    expect(refusal(() => loadCatalogueGroup('Oh').action('space', 4)).culprit.expected).toBe('3 coordinates');
  });

  it('sums and tensor products combine dimensions and permutations', () => {
    expect(d3().action('ring*plane').dimension).toBe(6);
    expect(d3().action('ring*ring').permutations!.get('r')).toEqual([4, 5, 3, 7, 8, 6, 1, 2, 0]);
    expect(d3().action('ring+plane').dimension).toBe(5);
    expect(d3().action('ring+trivial', 8).dimension).toBe(8);
    expect(d3().action('trivial*plane', 8).dimension).toBe(8);
    expect(refusal(() => d3().action('trivial*plane', 7)).culprit.value).toBe('7');
    expect(d3().action('ring*plane').permutations).toBeUndefined();
  });

  it('an unfaithful action says so: the ring of two sites', () => {
    expect(['dihedral:1', 'dihedral:2', 'dihedral:3'].map((name) => loadCatalogueGroup(name).action('ring').kernel)).toEqual([2, 2, 1]);
  });
});

describe('products', () => {
  const product = () => loadCatalogueGroup('cyclic:3*reflection');

  it('generators carry the number of their factor, orders and classes multiply', () => {
    expect(product().generators).toEqual(['r1', 's2']);
    expect([product().expectedOrder, product().expectedClasses]).toEqual([6, 6]);
    expect(loadCatalogueGroup('dihedral:3*dihedral:4').generators).toEqual(['r1', 's1', 'r2', 's2']);
  });

  it('default: each factor moves its own coordinates, and what is left over goes to the action of any size', () => {
    const { matrices, dimension } = product().action(undefined, 4);
    expect(dimension).toBe(4);
    expect(matrices.get('s2')!.map((row, i) => row[i])).toEqual(['1', '1', '-1', '-1']);
    expect(matrices.get('r1')![3]).toEqual(['0', '0', '0', '1']);
    expect(product().defaultAction).toBe('sum');
  });

  it('A*B: one action per factor, sites times components', () => {
    const action = product().action('ring*sign', 3);
    expect(action.matrices.get('s2')!.map((row, i) => row[i])).toEqual(['-1', '-1', '-1']);
    expect(product().action('plane*trivial').matrices.get('s2')).toEqual([
      ['1', '0'],
      ['0', '1'],
    ]);
    expect(asPermutationGroup(generatorNumbers(action, product().generators)).order).toBe(6);
  });

  it('C3 x Ci is S6, D3 x Ci is D3d up to isomorphism: classes 6 and 6', () => {
    for (const [name, order, classes] of [
      ['C3*Ci', 6, 6],
      ['D3*Ci', 12, 6],
      ['Td*Cs', 48, 10],
    ] as const) {
      const group = loadCatalogueGroup(name);
      const closed = asPermutationGroup(generatorNumbers(group.action(), group.generators));
      expect([closed.order, closed.classes.length]).toEqual([order, classes]);
    }
  });

  it('a combination that does not name one action per factor is refused', () => {
    for (const name of ['plane', 'ring*plane*sign', 'plane+sign+sign'])
      expect(refusal(() => product().action(name)).culprit.key).toBe('action');
    expect(product().action('ring*plane+sign').dimension).toBe(7);
  });
});

describe('user files', () => {
  let folder = '';
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'group-files-'));
  });
  afterAll(() => rmSync(folder, { recursive: true }));
  const write = (name: string, content: string): string => {
    writeFileSync(join(folder, name), content);
    return name;
  };
  const load = (name: string) => loadCatalogueGroup(name, { folder });
  const valid = {
    name: 'frobenius21',
    generators: ['a', 'b'],
    order: 21,
    actions: { sites: { dimension: 7, permutations: { a: 'i % 7 + 1', b: [1, 3, 5, 7, 2, 4, 6] } } },
  };
  const json = (change: object) => JSON.stringify({ ...valid, ...change });

  it('JSON: the Frobenius group of order 21 on seven sites has 5 classes (Frobenius groups: James & Liebeck 2001, ch. 25)', () => {
    const group = load(write('f21.json', json({})));
    const closed = asPermutationGroup(generatorNumbers(group.action(), group.generators));
    expect([closed.order, closed.classes.length]).toEqual([group.expectedOrder, 5]);
    expect(group.expectedClasses).toBeUndefined();
    expect(load('f21.json*reflection').expectedOrder).toBe(42);
  });

  it('YAML: a family with a number, decimals kept digit by digit', () => {
    const name = write(
      'turn.yaml',
      'name: turn\nparameter: {from: 2, to: 9}\ngenerators: [g]\nactions:\n  plane:\n    dimension: 2\n    matrices:\n      g: [[cos(2*pi/N), -sin(2*pi/N)], [sin(2*pi/N), cos(2*pi/N)]]\n  odd:\n    dimension: 1\n    matrices: {g: [[1.00000000000000000000000001]]}\n',
    );
    expect(load(`${name}:5`).parameter).toBe(5);
    expect(load(`${name}:5`).action('plane').matrices.get('g')![0]).toEqual(['cos(2*pi/5)', '-sin(2*pi/5)']);
    expect(load(`${name}:5`).action('odd').matrices.get('g')).toEqual([['1.00000000000000000000000001']]);
    expect(load(`${name}:5`).action().kernel).toBeUndefined();
    expect(refusal(() => load(name)).culprit.next).toContain(':3');
    expect(refusal(() => load(`${name}:1`)).culprit.expected).toContain('from 2 to 9');
    expect(refusal(() => load('f21.json:5')).message).toContain('takes no number');
  });

  it.each([
    ['unknown key', json({ actoins: {} }), 'actoins'],
    ['missing key', JSON.stringify({ name: 'x', generators: ['a'] }), undefined],
    ['generators not a list', json({ generators: 'a' }), 'generators'],
    ['a bad name', json({ generators: ['a', '2b'] }), 'generators[1]'],
    ['a name twice', json({ generators: ['a', 'a'] }), 'generators'],
    ['no action', json({ actions: {} }), 'actions'],
    ['a generator left out', json({ generators: ['a', 'b', 'c'] }), 'actions.sites.permutations'],
    ['two forms', json({ actions: { sites: { ...valid.actions.sites, sumZero: 'sites' } } }), 'actions.sites'],
    [
      'not a permutation',
      json({ actions: { sites: { dimension: 7, permutations: { a: 'i', b: [1, 1, 5, 7, 2, 4, 6] } } } }),
      'actions.sites.permutations.b',
    ],
    [
      'an image outside',
      json({ actions: { sites: { dimension: 7, permutations: { a: 'i + 1', b: 'i' } } } }),
      'actions.sites.permutations.a',
    ],
    ['too few images', json({ actions: { sites: { dimension: 7, permutations: { a: [1, 2], b: 'i' } } } }), 'actions.sites.permutations.a'],
    [
      'a site twice',
      json({
        actions: {
          sites: {
            dimension: 3,
            permutations: {
              a: {
                cycles: [
                  [1, 2],
                  [2, 3],
                ],
              },
              b: 'i',
            },
          },
        },
      }),
      'actions.sites.permutations.a',
    ],
    [
      'a ragged matrix',
      json({ generators: ['a'], actions: { m: { dimension: 2, matrices: { a: [[1, 0], [0]] } } } }),
      'actions.m.matrices.a',
    ],
    [
      'a parameter in an entry',
      json({ generators: ['a'], actions: { m: { dimension: 1, matrices: { a: [['mu']] } } } }),
      'actions.m.matrices.a[0][0]',
    ],
    [
      'code in an entry',
      json({ generators: ['a'], actions: { m: { dimension: 1, matrices: { a: [['process.exit()']] } } } }),
      'actions.m.matrices.a[0][0]',
    ],
    [
      'a rule with an unknown name',
      json({ actions: { sites: { dimension: 7, permutations: { a: 'k', b: 'i' } } } }),
      'actions.sites.permutations.a',
    ],
    [
      'a huge dimension',
      json({ actions: { sites: { dimension: 100000000, permutations: { a: 'i', b: 'i' } } } }),
      'actions.sites.dimension',
    ],
    ['sum zero of nothing', json({ actions: { s: { dimension: 2, sumZero: 't' } } }), 'actions.s.sumZero'],
    ['scalars of fixed size', json({ generators: ['a'], actions: { s: { dimension: 2, scalars: { a: -1 } } } }), 'actions.s.dimension'],
    ['a prototype', '{"name": "x", "generators": ["a"], "actions": {"__proto__": {"dimension": 1}}}', 'actions.__proto__'],
    ['a list', '[1, 2]', undefined],
    ['nothing', '', undefined],
  ])('%s is refused, the file and the key are named', (title, content, key) => {
    const name = write(`${title.replaceAll(' ', '-')}.json`, content);
    const { culprit } = refusal(() => load(name));
    expect(culprit.file).toBe(join(folder, name));
    expect(culprit.key).toBe(key);
    expect(culprit.expected!.length).toBeGreaterThan(0);
  });

  it('texts that are not well formed, duplicate keys, missing files, folders', () => {
    expect(refusal(() => load(write('broken.json', '{"name": '))).culprit.file).toContain('broken.json');
    expect(refusal(() => load(write('twice.yaml', 'name: a\nname: b\n'))).message).toContain('not well formed');
    expect(refusal(() => load('nowhere.json')).message).toContain('no such file');
    mkdtempSync(join(folder, 'dir'));
    expect(refusal(() => loadCatalogueGroup(`${folder}/`)).message).toContain('folder');
  });

  it('a path may contain a star', () => {
    expect(load(write('a*b.json', json({}))).generators).toEqual(['a', 'b']);
  });
});

describe('whole-number texts', () => {
  const value = (text: string, names: Record<string, number> = {}) => integerValue(text, names, { file: 'f', key: 'k' });

  it('precedence, remainder, functions', () => {
    expect(value('2 + 3*4 - 6/2')).toBe(11);
    expect(value('-7 % 5')).toBe(3);
    expect(value('(0 - 7) % 5')).toBe(3);
    expect(value('2^N*factorial(N)', { N: 4 })).toBe(384);
    expect(value('min(3, max(1, div(7, 2)))')).toBe(3);
    expect(value('--3')).toBe(3);
  });

  it('partitions: 1, 1, 2, 3, 5, 7, 11, 15 (OEIS A000041); pairs: 1, 2, 5, 10, 20, 36 (OEIS A000712)', () => {
    expect([0, 1, 2, 3, 4, 5, 6, 7].map((n) => value(`partitions(${n})`))).toEqual([1, 1, 2, 3, 5, 7, 11, 15]);
    expect([0, 1, 2, 3, 4, 5].map((n) => value(`bipartitions(${n})`))).toEqual([1, 2, 5, 10, 20, 36]);
    expect([1, 2, 3, 4, 8, 9].map((n) => value(`distinctOddPartitions(${n})`))).toEqual([1, 0, 1, 1, 2, 2]);
  });

  it.each([
    '',
    '1 +',
    '(1',
    '1)',
    '1 2',
    'x',
    '7/2',
    '1/0',
    '1%0',
    '2^9999',
    'factorial(101)',
    'min(1)',
    'constructor',
    '('.repeat(200),
    '1'.repeat(2000),
    '1;2',
  ])('%.30s is refused', (text) => {
    expect(refusal(() => value(text)).culprit).toMatchObject({ file: 'f', key: 'k' });
  });
});

describe('laziness', () => {
  it('matrices are built once, at first sight', () => {
    const { actions } = loadCatalogueGroup('cyclic:1000');
    expect(actions.get('ring')!.permutations!.get('r')!.length).toBe(1000);
    const small = loadCatalogueGroup('cyclic:4').action('ring');
    expect(small.matrices).toBe(small.matrices);
    expect(matrixKey(numbers(small.matrices.get('r')!))).not.toBe('');
  });
});
