/** Families by numbered files: both forms, the values they are given at, and what is refused. */
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Ajv2020 } from 'ajv/dist/2020.js';
import fc from 'fast-check';
import { afterAll, describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors/index.ts';
import { rationals } from '../../../src/field/index.ts';
import { declareFile } from '../../../src/index.ts';
import { type Declaration, readModelText } from '../../../src/model/declaration/index.ts';
import modelSchema from '../../../src/model/declaration/model.schema.json' with { type: 'json' };
import { exactNumber } from '../../../src/model/declaration/numbered-files.ts';

const folder = mkdtempSync(join(tmpdir(), 'numbered-'));
afterAll(() => rmSync(folder, { recursive: true }));
const csv = (name: string, rows: readonly (readonly (number | string)[])[]) =>
  writeFileSync(join(folder, name), rows.map((row) => row.join(',')).join('\n'));
const schema = new Ajv2020({ strict: false }).compile(modelSchema);

for (const k of [0, 1, 2, 9, 10])
  csv(`S-${k}.csv`, [
    [k, 1],
    [1, k],
  ]);
for (const k of [8, 9, 10, 11]) csv(`T-${k}.csv`, [[k]]);
csv('M.csv', [
  [1, 0],
  [0, 1],
]);
csv('crooked.csv', [
  [1, 1],
  [2, 1],
]);
csv('nearly.csv', [
  [1.5, 0.1],
  [0.1000000000001, 1],
]);
csv('skew.csv', [
  [0, 1],
  [-1, 0],
]);
csv('wide.csv', [
  [1, 0, 0],
  [0, 1, 0],
]);
csv('three.csv', [
  [1, 0, 0],
  [0, 1, 0],
  [0, 0, 1],
]);
csv('twice-1.csv', [[1]]);
csv('twice-01.csv', [[1]]);

const model = (stiffness: string, more = 'vary: [c]', mass = 'M.csv'): Declaration =>
  readModelText(`mass: ${mass}\nstiffness: ${stiffness}\n${more}\n`, 'model.yaml', folder);
const nodesOf = (d: Declaration) =>
  d.energy.kind === 'mechanical' ? d.energy.stiffness.files?.nodes.map((n) => [n.value, n.matrix.source]) : undefined;
const refusal = (work: () => unknown): InputError => {
  try {
    work();
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error('not refused');
};

describe('numbered files', () => {
  it('listed with their values, which are exact and come in order', () => {
    const d = model('{parameter: c, files: {1: S-2.csv, 0: S-0.csv, 0.5: S-1.csv, -1e-1: S-9.csv, 4/6: S-10.csv}}');
    expect(nodesOf(d)).toEqual([
      ['-1/10', 'S-9.csv'],
      ['0', 'S-0.csv'],
      ['1/2', 'S-1.csv'],
      ['2/3', 'S-10.csv'],
      ['1', 'S-2.csv'],
    ]);
    expect(d.unset).toEqual(['c']);
  });

  it('found by a star, in the order of their numbers', () => {
    expect(nodesOf(model('{parameter: c, files: T-*.csv}', 'parameters: {c: 9}', '[[1]]'))).toEqual([
      ['8', 'T-8.csv'],
      ['9', 'T-9.csv'],
      ['10', 'T-10.csv'],
      ['11', 'T-11.csv'],
    ]);
  });

  it('for the matrix of a quadratic energy', () => {
    const { energy, coordinates } = readModelText(
      'quadratic: {parameter: c, files: {0: S-0.csv, 1: S-1.csv}}\nvary: c\n',
      'model.yaml',
      folder,
    );
    expect(coordinates).toEqual(['q1']);
    expect(energy).toMatchObject({ kind: 'hessian', files: { parameter: 'c', nodes: [{ value: '0' }, { value: '1' }] } });
  });

  it('a family affine in parameters that are called parameter and files stays one', () => {
    const d = model('{parameter: S-0.csv, files: S-1.csv}', 'parameters: {parameter: 1, files: 2}');
    expect(d.energy.kind === 'mechanical' && [...d.energy.stiffness.terms.keys()]).toEqual(['parameter', 'files']);
  });

  it('a floating file may be symmetric to rounding', () => {
    expect(nodesOf(model('{parameter: c, files: {0: nearly.csv, 1: S-1.csv}}'))).toHaveLength(2);
  });

  it('follow the JSON Schema', () => {
    const valid = (stiffness: unknown) => schema({ mass: 'M.csv', stiffness });
    expect(valid({ parameter: 'c', files: { '0': 'a.mtx', '1/2': 'b.mtx', '-1e-1': 'c.csv' } })).toBe(true);
    expect(valid({ parameter: 'n', files: 'runs/K-*.mtx' })).toBe(true);
    expect(valid({ parameter: 'n', files: { '0': 'a.mtx' } })).toBe(false);
    expect(valid({ parameter: 'n', files: { '0': 'a.mtx', one: 'b.mtx' } })).toBe(false);
    expect(valid({ parameter: 'n', files: 'K-*-*.mtx' })).toBe(false);
    expect(schema({ quadratic: { parameter: 'c', files: { '0': 'a.mtx', '1': 'b.mtx' } } })).toBe(true);
  });
});

describe('refused, with the key and the file', () => {
  it.each([
    ['{parameter: c, files: S-*.csv}', /numbers 3 to 8 are missing/, 'stiffness.files'],
    ['{parameter: c, files: nothing-*.csv}', /No file in/, 'stiffness.files'],
    ['{parameter: c, files: nowhere/S-*.csv}', /cannot be read/, 'stiffness.files'],
    ['{parameter: c, files: S-*-*.csv}', /must hold one star/, 'stiffness.files'],
    ['{parameter: c, files: twice-*.csv}', /twice-01.csv and twice-1.csv/, 'stiffness.files'],
    ['{parameter: c, files: {1/2: S-0.csv, 0.5: S-1.csv}}', /1\/2 of c has two files, S-0.csv and S-1.csv/, 'stiffness.files.0.5'],
    ['{parameter: c, files: {0: S-0.csv}}', /one file/, 'stiffness.files'],
    ['{parameter: c, files: {0: S-0.csv, 1: S-3.csv}}', /There is no file .*S-3.csv/, 'stiffness.files.1'],
    ['{parameter: c, files: {0: S-0.csv, 1: three.csv}}', /three.csv is 3 × 3 and S-0.csv is 2 × 2/, 'stiffness.files.1'],
    ['{parameter: c, files: {0: S-0.csv, 1: wide.csv}}', /wide.csv is 2 × 3/, 'stiffness.files.1'],
    ['{parameter: c, files: {0: S-0.csv, 1: crooked.csv}}', /crooked.csv is not symmetric: entry \(1, 2\) is 1/, 'stiffness.files.1'],
    ['{parameter: c, files: {0: S-0.csv, one: S-1.csv}}', /one is not a value/, 'stiffness.files.one'],
    ['{parameter: c, files: {0: S-0.csv, 1: S-1.txt}}', /S-1.txt is not the name of a matrix file/, 'stiffness.files.1'],
    ['{parameter: c, files: {0: S-0.csv, 1: S-1.csv}, step: 2}', /no key step/, 'stiffness.step'],
    ['{files: {0: S-0.csv, 1: S-1.csv}}', /files and no parameter/, 'stiffness'],
    ['{parameter: c}', /a parameter and no files/, 'stiffness'],
    ['{parameter: d, files: {0: S-0.csv, 1: S-1.csv}}', /numbered by d, which is no parameter/, 'stiffness.parameter'],
  ])('%s', (stiffness, message, key) => {
    const error = refusal(() => model(stiffness));
    expect(error.message).toMatch(message);
    expect(error.culprit.key).toBe(key);
    expect(error.culprit.file).toMatch(/model\.yaml|S-3\.csv/);
  });

  it('one missing number is named; a matrix of velocities must be skew', () => {
    csv('U-1.csv', [[1]]);
    csv('U-3.csv', [[1]]);
    expect(refusal(() => model('{parameter: c, files: U-*.csv}', 'vary: [c]', '[[1]]')).message).toContain('number 2 is missing');
    const gyro = (files: string) => () => model('M.csv', `vary: [c]\ngyroscopic: {parameter: c, files: ${files}}`);
    expect(refusal(gyro('{0: skew.csv, 1: S-1.csv}')).message).toContain('S-1.csv is not skew-symmetric');
    expect(gyro('{0: skew.csv, 1: skew.csv}')().energy.kind).toBe('mechanical');
  });

  it('from a file on disk too, beside which the matrices stand', () => {
    writeFileSync(join(folder, 'm.yaml'), 'mass: [[1]]\nstiffness: {parameter: n, files: T-*.csv}\nvary: n\n');
    expect(nodesOf(declareFile(join(folder, 'm.yaml')))).toHaveLength(4);
  });
});

describe('exactNumber', () => {
  it('reads decimals with exponents as fractions', () => {
    fc.assert(
      fc.property(fc.bigInt(-(10n ** 12n), 10n ** 12n), fc.integer({ min: 0, max: 8 }), fc.integer({ min: -9, max: 9 }), (n, places, e) => {
        const digits = `${n < 0n ? -n : n}`.padStart(places + 1, '0');
        const cut = digits.length - places;
        const text = `${n < 0n ? '-' : ''}${digits.slice(0, cut)}.${digits.slice(cut)}e${e}`;
        const value = exactNumber(text)!;
        const power = places - e;
        const scaled = power >= 0 ? rationals.fromRational(n, 10n ** BigInt(power)) : rationals.fromRational(n * 10n ** BigInt(-power), 1n);
        return rationals.equal(value, scaled);
      }),
    );
    expect(exactNumber('+3/6')).toEqual({ n: 1n, d: 2n });
    expect(exactNumber('.5')).toEqual({ n: 1n, d: 2n });
    for (const text of ['', 'x', '1/0', '1e', '--1', '1/2/3']) expect(exactNumber(text)).toBeUndefined();
  });
});
