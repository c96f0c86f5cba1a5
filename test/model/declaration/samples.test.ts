import { readdirSync, readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';
import { readModelFile, readModelText } from '../../../src/model/declaration/index.ts';
import { modelSchema, resultSchema } from '../../../src/model/declaration/schema.ts';

const SAMPLES = new URL('../../../samples/', import.meta.url).pathname;
const files = readdirSync(SAMPLES).filter((name) => name.endsWith('.yaml'));
const ajv = new Ajv2020({ allErrors: true, strictTypes: false, strictRequired: false, strictTuples: false });
const model = ajv.compile(modelSchema);
const result = ajv.compile(resultSchema);

describe('samples', () => {
  it('are about fifteen', () => expect(files.length).toBeGreaterThanOrEqual(14));
  for (const file of files) {
    it(`${file} is read, has a title, and every name in it is declared`, () => {
      const sample = readModelFile(SAMPLES + file);
      expect(sample.title).not.toBe(SAMPLES + file);
      expect(sample.unset).toEqual([]);
      expect(sample.coordinates.length).toBe(sample.momenta.length);
      expect(readFileSync(SAMPLES + file, 'utf8')).toMatch(/^# [\s\S]*Expected/);
    });
    it(`${file} is valid under the JSON Schema, with numbers as texts and as numbers`, () => {
      const text = readFileSync(SAMPLES + file, 'utf8');
      expect(model(parse(text, { schema: 'failsafe' })) || model.errors).toBe(true);
      expect(model(parse(text, { schema: 'core' })) || model.errors).toBe(true);
    });
  }
});

describe('the JSON Schema for models and the reader agree', () => {
  const H = 'hamiltonian: q1^2 + mu*p1^2\n';
  it.each([
    [`${H}parameters: {mu: }`, true],
    [`${H}vary: mu`, true],
    [`${H}neutral: find`, true],
    [`${H}symmetry: {generators: [{permutation: [1]}, {reversing: true}], timeReversal: true}`, true],
    ['quadratic: [[1, 0], [0, 1]]', true],
    ['mass: [[1]]\nstiffness: {constant: [[1]], c: [[2]]}', true],
    ['network: {points: {a: [0, 0], b: [1, 0]}, masses: 1, bonds: [[a, b, 1]]}', true],
    [`${H}hamiltonan: q1`, false],
    [`${H}quadratic: q1`, false],
    [`${H}mass: [[1]]\nstiffness: [[1]]`, false],
    ['mass: [[1]]\nstiffness: [[1]]\ndamping: [[1]]', false],
    ['stiffness: [[1]]', false],
    [`${H}parameters: {pi: 1}`, false],
    [`${H}parameters: {2x: 1}`, false],
    [`${H}range: {mu: [0]}`, false],
    [`${H}symmetry: {generators: [{name: r}]}`, false],
    [`${H}symmetry: {generators: [{map: {q1: q1}, permutation: [1]}]}`, false],
    [`${H}symmetry: {on: [[q1]]}`, false],
    [`${H}numbers: float`, false],
    ['network: {points: {a: [0, 0]}, masses: 1}', false],
    ['network: {points: {a: [0, 0], b: [1, 0]}, masses: 1, bonds: [[a, b]]}', false],
    ['momenta: [p1]', false],
  ])('%s', (text, valid) => {
    expect(model(parse(text))).toBe(valid);
    const read = (): unknown => readModelText(text);
    if (valid) expect(read).not.toThrow();
    else expect(read).toThrow();
  });
});

describe('the JSON Schema for results', () => {
  const codim = {
    schema: 'symcodim/1',
    command: 'codim',
    model: { title: 'x', degreesOfFreedom: 3, parameters: { c: '-1/3' }, vary: ['c'] },
    arithmetic: 'exact',
    group: { order: 12, reversing: 6 },
    equilibrium: { holds: true, gradient: '0' },
    symmetry: { holds: true, generators: [{ name: 'r', reversing: false, symplectic: true, invariant: true }] },
    components: [{ label: 'E', dimension: 2, type: 'real', multiplicity: 1, carriesForm: false }],
    inertia: { positive: 4, zero: 2, negative: 0 },
    neutral: { dimension: 0 },
    zero: {
      dimension: 4,
      kernel: 2,
      blocks: [2, 2],
      semisimple: false,
      codimension: 1,
      codimensionWithoutSymmetry: 4,
      motion: 'splits',
      subgroups: [{ order: 1, reversing: 0, conjugates: 1, codimension: 4, motion: 'degenerate' }],
    },
    collisions: [],
    verdict: { answer: 'generic', parameters: 1, versal: true, because: 'codimension 1' },
  };
  it('accepts a codim result, further keys, and no event', () => {
    expect(result(codim) || result.errors).toBe(true);
    expect(result({ ...codim, zero: null, verdict: { ...codim.verdict, answer: 'no event' }, spectrum: [] })).toBe(true);
  });
  it.each(['model', 'group', 'inertia', 'zero', 'collisions', 'verdict', 'components', 'equilibrium'])('asks for %s', (key) => {
    const { [key as 'zero']: _, ...rest } = codim;
    expect(result(rest)).toBe(false);
  });
  it('refuses other words and signs', () => {
    expect(result({ ...codim, verdict: { ...codim.verdict, answer: 'maybe' } })).toBe(false);
    expect(result({ ...codim, inertia: { ...codim.inertia, zero: -1 } })).toBe(false);
    expect(result({ ...codim, schema: 'symcodim/2' })).toBe(false);
  });
  it('knows the keys of sweep', () => {
    const { zero: _, ...head } = codim;
    const crossing = {
      parameter: 'c',
      value: -0.5,
      exact: '-1/2',
      component: 'E',
      kernel: 2,
      motion: 'splits',
      codimension: 1,
      inertiaBefore: {},
      inertiaAfter: {},
    };
    expect(result({ ...head, command: 'sweep', crossings: [crossing] }) || result.errors).toBe(true);
    expect(result({ ...head, command: 'sweep', crossings: [{ ...crossing, value: '-1/2' }] })).toBe(false);
  });
});

describe('JSON Schema 2020-12 (Wright, Andrews, Hutton, Dennis): what our schemas rely on', () => {
  // Ten instances, verdicts from python3-jsonschema 4.10.3.
  const schema = {
    type: 'object',
    required: ['n', 'matrix'],
    properties: {
      n: { type: 'integer', minimum: 1 },
      matrix: { type: 'array', items: { $ref: '#/$defs/row' } },
      pair: { type: 'array', prefixItems: [{ type: 'string' }, { type: 'integer' }], items: false },
    },
    $defs: { row: { type: 'array', items: { type: 'number' } } },
    unevaluatedProperties: false,
  };
  const check = new Ajv2020({ strict: false }).compile(schema);
  it.each([
    [
      {
        n: 2,
        matrix: [
          [1, 2],
          [3, 4],
        ],
      },
      true,
    ],
    [{ n: 2.0, matrix: [] }, true],
    [{ n: 2.5, matrix: [] }, false],
    [{ n: 0, matrix: [] }, false],
    [{ matrix: [] }, false],
    [{ n: 1, matrix: [['a']] }, false],
    [{ n: 1, matrix: [], pair: ['a', 1] }, true],
    [{ n: 1, matrix: [], pair: ['a', 1, 2] }, false],
    [{ n: 1, matrix: [], pair: ['a'] }, true],
    [{ n: 1, matrix: [], extra: 1 }, false],
  ])('%j', (instance, valid) => expect(check(instance)).toBe(valid));
});
