import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { SymcodimError, UsageError } from '../../../src/errors/index.ts';
import { type Declaration, declare, type OptionUse } from '../../../src/model/declaration/index.ts';

const folder = mkdtempSync(join(tmpdir(), 'options-'));
afterAll(() => rmSync(folder, { recursive: true }));

/** Options typed as on a command line, flags with '' as their value. */
const uses = (...words: string[]): OptionUse[] =>
  Array.from({ length: words.length / 2 }, (_, k) => ({ name: words[2 * k]!, value: words[2 * k + 1]! }));
const options = (...words: string[]): Declaration => declare({}, uses(...words));
const refusal = (work: () => unknown): SymcodimError => {
  try {
    work();
  } catch (error) {
    if (error instanceof SymcodimError) return error;
    throw error;
  }
  throw new Error('not refused');
};

describe('a model declared by options', () => {
  it('takes coordinates from the expression and --on, parameters never', () => {
    const model = options('group', 'cyclic:3', 'on', 'q1,p1', 'quadratic', 'mu*(q1^2+p1^2)/2 + q*pp', 'set', 'mu=0,q=1', 'vary', 'mu,pp');
    expect(model).toMatchObject({
      source: 'options',
      coordinates: ['q1'],
      momenta: ['p1'],
      vary: ['mu', 'pp'],
      unset: ['pp'],
      parameterCount: 2,
    });
    expect([...model.parameters]).toEqual([
      ['mu', '0'],
      ['q', '1'],
    ]);
  });
  it('pairs by endings in natural order', () => {
    expect(options('hamiltonian', 'p10^2 + q2 + p1').coordinates).toEqual(['q1', 'q2', 'q10']);
    expect(options('group', 'cyclic:2', 'on', 'q').momenta).toEqual(['p']);
  });
  it('gives each --on the --action before it', () => {
    const model = options(
      'group',
      'dihedral:3',
      'on',
      'q1,q2',
      'action',
      'ring',
      'on',
      'q3,q4,q5',
      'on',
      'q6,q7',
      'reversing',
      's',
      'time-reversal',
      '',
    );
    expect(model.groups).toEqual([
      {
        group: 'dihedral:3',
        on: [{ on: ['q1', 'q2'] }, { action: 'ring', on: ['q3', 'q4', 'q5'] }, { on: ['q6', 'q7'] }],
        reversing: ['s'],
        where: '--group',
      },
    ]);
    expect([model.timeReversal, model.energy.kind]).toEqual([true, 'none']);
  });
  it('names other coordinates', () => {
    const model = options('coordinates', 'x,y', 'momenta', 'u,v', 'hamiltonian', 'u^2 + x*q1');
    expect([model.coordinates, model.momenta, model.unset]).toEqual([['x', 'y'], ['u', 'v'], ['q1']]);
    expect(options('coordinates', 'q2,q1', 'hamiltonian', 'q1').momenta).toEqual(['p2', 'p1']);
  });
  it('reads the numbers of a study', () => {
    expect(
      options(
        'hamiltonian',
        'a*q1',
        'parameters',
        '3',
        'degree',
        '6',
        'codimension',
        '2',
        'order-limit',
        '500',
        'tolerance',
        '1e-8',
        'floating',
        '',
        'neutral',
        'find',
        'range',
        'a=-1/2:1:20',
      ),
    ).toMatchObject({
      parameterCount: 3,
      degree: 6,
      codimension: 2,
      orderLimit: 500,
      tolerance: '1e-8',
      numbers: 'floating',
      neutralFind: true,
      range: new Map([['a', { from: '-1/2', to: '1', steps: 20 }]]),
    });
    expect(options('hamiltonian', 'q1').parameterCount).toBe(1);
  });
  it('splits assignments at commas outside brackets and at the first equals sign', () => {
    const model = options('hamiltonian', 'd^2 + a*b', 'set', 'a=max(1,2),b=3', 'define', 'd=q1-q2');
    expect([...model.parameters]).toEqual([
      ['a', 'max(1,2)'],
      ['b', '3'],
    ]);
    expect([model.coordinates, [...model.define]]).toEqual([['q1', 'q2'], [['d', 'q1-q2']]]);
  });
  it('reads --quadratic from a file', () => {
    writeFileSync(join(folder, 'S.csv'), '1,0\n0,1\n');
    expect(options('quadratic', join(folder, 'S.csv'))).toMatchObject({ coordinates: ['q1'], energy: { kind: 'hessian' } });
  });
  it.each([
    ['nothing', [], '--coordinates'],
    ['two energies', ['hamiltonian', 'q1', 'quadratic', 'q1'], '--quadratic'],
    ['an energy twice', ['hamiltonian', 'q1', 'hamiltonian', 'q2'], '--hamiltonian'],
    ['a group acting on nothing', ['group', 'cyclic:3', 'hamiltonian', 'q1'], '--group'],
    ['--on without a group', ['on', 'q1', 'hamiltonian', 'q1'], '--on'],
    ['--reversing without a group', ['reversing', 's', 'hamiltonian', 'q1'], '--reversing'],
    ['an action with no --on after it', ['group', 'dihedral:3', 'on', 'q1,q2,q3', 'action', 'ring'], '--action'],
    ['two actions in a row', ['group', 'dihedral:3', 'action', 'ring', 'action', 'plane', 'on', 'q1,q2'], '--action'],
    ['a stranger in --on', ['group', 'cyclic:3', 'on', 'q1,x', 'hamiltonian', 'q1'], '--on'],
    ['a coordinate twice in --on', ['group', 'cyclic:3', 'on', 'q1,q1'], '--on'],
    ['a parameter in --on', ['group', 'cyclic:3', 'on', 'q1,q2', 'set', 'q2=1'], '--on'],
    ['--set without a value', ['hamiltonian', 'q1', 'set', 'a'], '--set'],
    ['--set of pi', ['hamiltonian', 'q1', 'set', 'pi=3'], '--set'],
    ['a parameter set twice', ['hamiltonian', 'q1', 'set', 'a=1', 'set', 'a=2'], '--set'],
    ['an empty name', ['hamiltonian', 'q1', 'vary', 'a,,b'], '--vary'],
    ['a negative count', ['hamiltonian', 'q1', 'parameters', '-1'], '--parameters'],
    ['a count that is no number', ['hamiltonian', 'q1', 'degree', 'four'], '--degree'],
    ['no tolerance', ['hamiltonian', 'q1', 'tolerance', '0'], '--tolerance'],
    ['half a range', ['hamiltonian', 'a*q1', 'range', 'a=1'], '--range'],
    ['another neutral', ['hamiltonian', 'q1', 'neutral', 'all'], '--neutral'],
    ['an empty energy', ['hamiltonian', ' '], '--hamiltonian'],
    ['momenta alone', ['hamiltonian', 'p', 'momenta', 'p'], '--momenta'],
    ['lists of different length', ['hamiltonian', 'x', 'coordinates', 'x,y', 'momenta', 'u'], '--momenta'],
    ['momenta that cannot be guessed', ['hamiltonian', 'x', 'coordinates', 'x'], '--coordinates'],
    ['an unknown option', ['hamiltonian', 'q1', 'rang', 'a=0:1'], '--rang'],
  ])('refuses %s', (_, words, key) => {
    const error = refusal(() => options(...words));
    expect(error).toBeInstanceOf(UsageError);
    expect(error.culprit.key).toBe(key);
    expect(error.culprit.expected).toBeTruthy();
    expect(error.culprit.next).toBeTruthy();
  });
  it('refuses to vary what no expression uses', () => {
    expect(refusal(() => options('hamiltonian', 'mu*q1', 'vary', 'nu')).message).toMatch(/Did you mean mu\?/);
  });
});

describe('options over a model', () => {
  const text = 'hamiltonian: a*q1^2 + b*p1^2 + c*q1\nparameters: {a: 1, b: 2, c: }\nvary: [a]\nrange: {a: [0, 1]}\n';
  const over = (...words: string[]): Declaration => declare({ text }, uses(...words));
  it('overrides values, replaces vary, fills in what has no value', () => {
    const model = over('set', 'b=5,c=1/2', 'vary', 'b', 'vary', 'c', 'range', 'b=0:2');
    expect(Object.fromEntries(model.parameters)).toEqual({ a: '1', b: '5', c: '1/2' });
    expect([model.vary, model.unset, model.parameterCount]).toEqual([['b', 'c'], [], 2]);
    expect([...model.range.keys()]).toEqual(['a', 'b']);
  });
  it('leaves the model alone without options', () =>
    expect(over()).toMatchObject({ vary: ['a'], unset: ['c'], parameterCount: 1, numbers: 'exact' }));
  it('adds time reversal and floating numbers', () =>
    expect(over('time-reversal', '', 'floating', '')).toMatchObject({ timeReversal: true, numbers: 'floating' }));
  it('refuses unknown parameters with the nearest', () => {
    const error = refusal(() => declare({ text: 'hamiltonian: mu*q1\nparameters: {mu: 0}' }, uses('set', 'nu=1')));
    expect(error.message).toMatch(/Did you mean mu\?/);
    expect(refusal(() => over('set', 'q1=1')).message).toMatch(/q1 is a coordinate/);
  });
  it('refuses to declare a second model', () => expect(refusal(() => over('hamiltonian', 'q1')).culprit.key).toBe('--hamiltonian'));
  it('reads a path', () => {
    writeFileSync(join(folder, 'm.yaml'), text);
    expect(declare({ path: join(folder, 'm.yaml') }, uses('set', 'a=7')).parameters.get('a')).toBe('7');
  });
});
