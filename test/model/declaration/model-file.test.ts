import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors/index.ts';
import { readModelFile, readModelText } from '../../../src/model/declaration/index.ts';
import { denseTexts } from '../../../src/model/matrix-file/index.ts';

const folder = mkdtempSync(join(tmpdir(), 'model-'));
afterAll(() => rmSync(folder, { recursive: true }));
const write = (name: string, content: string | Uint8Array): string => {
  writeFileSync(join(folder, name), content);
  return join(folder, name);
};
const refusal = (work: () => unknown): InputError => {
  try {
    work();
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error('not refused');
};
const H = 'hamiltonian: p1^2/2 + mu*q1^2/2\n';

describe('a model file', () => {
  it('keeps names, texts and structure', () => {
    const model = readModelText(`
title: A pair
coordinates: [q1, q2]
momenta: [p1, p2]
symplectic: [[0, 0, 1, 0], [0, 0, 0, m], [-1, 0, 0, 0], [0, -m, 0, 0]]
parameters: {mu: 0.10, m: 2/3, free: }
vary: mu
range: {mu: [-1, 1, 50]}
define: {d: q1 - q2}
hamiltonian: |
  (p1^2+p2^2)/2
  + mu*d^2 + free*q1
equilibrium: {q1: sqrt(2)}
symmetry:
  generators:
    - {name: x, map: {q1: q2, q2: q1, p1: p2, p2: p1}}
    - {permutation: [2, 1]}
    - {name: t, reversing: true}
neutral: [{q1: 1, q2: 1}]
numbers: floating
tolerance: 1e-9
`);
    expect(model).toMatchObject({
      source: '-',
      title: 'A pair',
      vary: ['mu'],
      unset: ['free'],
      parameterCount: 1,
      energy: { kind: 'hamiltonian', text: '(p1^2+p2^2)/2 + mu*d^2 + free*q1' },
      numbers: 'floating',
      tolerance: '1e-9',
      neutralFind: false,
      timeReversal: false,
    });
    expect([...model.parameters]).toEqual([
      ['mu', '0.10'],
      ['m', '2/3'],
    ]);
    expect(model.range.get('mu')).toEqual({ from: '-1', to: '1', steps: 50 });
    expect(model.form?.[1]).toEqual(['0', '0', '0', 'm']);
    expect(model.generators.map(({ name, where, reversing }) => [name, where, reversing])).toEqual([
      ['x', 'symmetry.generators[1]', undefined],
      ['g2', 'symmetry.generators[2]', undefined],
      ['t', 'symmetry.generators[3]', true],
    ]);
    expect(model.generators[1]!.permutation).toEqual([2, 1]);
    expect([...model.neutral[0]!]).toEqual([
      ['q1', '1'],
      ['q2', '1'],
    ]);
    expect(Object.isFrozen(model)).toBe(true);
  });
  it('finds coordinates in the expression when none are listed', () => {
    const model = readModelText('parameters: {q0: 1}\nhamiltonian: p10^2 + q0*q2^2 + w*q10');
    expect([model.coordinates, model.momenta, model.unset]).toEqual([['q2', 'q10'], ['p2', 'p10'], ['w']]);
  });
  it('reads groups with one action or one for each list', () => {
    const group = (text: string): unknown => readModelText(`coordinates: [q1, q2, q3, q4]\n${text}`).groups;
    expect(group('symmetry: {group: dihedral:4, action: ring, on: [q1, q2, q3, q4], reversing: s, timeReversal: true}')).toEqual([
      { group: 'dihedral:4', on: [{ action: 'ring', on: ['q1', 'q2', 'q3', 'q4'] }], reversing: ['s'], where: 'symmetry' },
    ]);
    expect(group('symmetry: {group: dihedral:2, action: [ring, plane], on: [[q1, q2], [q3, q4]]}')).toMatchObject([
      {
        on: [
          { action: 'ring', on: ['q1', 'q2'] },
          { action: 'plane', on: ['q3', 'q4'] },
        ],
        reversing: [],
      },
    ]);
    expect(group('symmetry: [{group: reflection, on: [q1]}, {group: cyclic:3, on: [[q2, p2]]}]')).toHaveLength(2);
  });
  it('is a model without energy for events', () => expect(readModelText('coordinates: [q1]').energy).toEqual({ kind: 'none' }));
  it('knows neutral: find', () => expect(readModelText(`${H}neutral: find`)).toMatchObject({ neutral: [], neutralFind: true }));
  it('reads the quadratic form as an expression, as rows and as a file', () => {
    write('S.mtx', '%%MatrixMarket matrix coordinate real symmetric\n2 2 1\n2 2 1.5\n');
    const path = write('s.yaml', 'quadratic: S.mtx\n');
    expect(readModelText('quadratic: mu*q1^2').energy).toEqual({ kind: 'quadratic', text: 'mu*q1^2' });
    const typed = readModelText('quadratic: [[mu, 0], [0, 1]]');
    expect([typed.coordinates, typed.momenta, typed.unset]).toEqual([['q1'], ['p1'], ['mu']]);
    const { energy } = readModelFile(path);
    expect(energy.kind === 'hessian' && [energy.matrix.exact, energy.matrix.source, denseTexts(energy.matrix)]).toEqual([
      false,
      'S.mtx',
      [
        ['0', '0'],
        ['0', '1.5'],
      ],
    ]);
  });
});

describe('mass, gyroscopic, stiffness', () => {
  it('reads constants, files beside the model and affine families', () => {
    mkdirSync(join(folder, 'data'), { recursive: true });
    write('data/K1.csv', '1,-1\n-1,1\n');
    const path = write(
      'm.json',
      '{"mass": [[1, 0], [0, "m2"]], "gyroscopic": [[0, -1], [1, 0]], "stiffness": {"constant": [[1, 0], [0, 1]], "c": "data/K1.csv"}, "parameters": {"m2": 2, "c": 0}}',
    );
    const { energy, coordinates, unset } = readModelFile(path);
    expect(coordinates).toEqual(['q1', 'q2']);
    expect(unset).toEqual([]);
    if (energy.kind !== 'mechanical') throw new Error(energy.kind);
    expect(energy.stiffness.rows).toBe(2);
    expect(denseTexts(energy.stiffness.terms.get('c')!)).toEqual([
      ['1', '-1'],
      ['-1', '1'],
    ]);
    expect(denseTexts(energy.mass.constant!)).toEqual([
      ['1', '0'],
      ['0', 'm2'],
    ]);
  });
  it('refuses damping with the reason', () => {
    const error = refusal(() => readModelText('mass: [[1]]\ndamping: [[1]]\nstiffness: [[1]]'));
    expect(error.message).toMatch(/lose energy/);
    expect(error.culprit).toMatchObject({ key: 'damping', file: 'standard input' });
  });
  it.each([
    ['sizes that differ', 'mass: [[1]]\nstiffness: [[1, 0], [0, 1]]', 'stiffness'],
    ['sizes that differ in a family', 'mass: [[1]]\nstiffness: {constant: [[1]], c: [[1, 0], [0, 1]]}', 'stiffness.c'],
    ['a matrix that is not square', 'mass: [[1, 0]]\nstiffness: [[1]]', 'mass'],
    ['stiffness alone', 'stiffness: [[1]]', 'stiffness'],
    ['mass alone', 'mass: [[1]]', 'mass'],
    ['a bare number', 'mass: 1\nstiffness: [[1]]', 'mass'],
    ['a missing file', 'mass: [[1]]\nstiffness: nowhere.mtx', 'stiffness'],
    ['an empty family', 'mass: [[1]]\nstiffness: {}', 'stiffness'],
  ])('refuses %s', (_, text, key) => expect(refusal(() => readModelText(text)).culprit.key).toBe(key));
});

describe('network', () => {
  const net = (body: string): string => `network: {points: {a: [0, 0], b: [1, 0]}, ${body}}`;
  it('numbers the displacements and spreads one mass', () => {
    const model = readModelText(net('masses: 2, bonds: [[a, b, k]]'));
    expect(model.coordinates).toEqual(['q1', 'q2', 'q3', 'q4']);
    expect(model.energy).toMatchObject({
      kind: 'network',
      dimension: 2,
      bonds: [{ from: 'a', to: 'b', stiffness: 'k', where: 'network.bonds[1]' }],
    });
    expect(model.energy.kind === 'network' && [...model.energy.masses]).toEqual([
      ['a', '2'],
      ['b', '2'],
    ]);
    expect(model.unset).toEqual(['k']);
  });
  it.each([
    ['an unknown point', net('masses: 1, bonds: [[a, c, 1]]'), /no point c/],
    ['a bond to itself', net('masses: 1, bonds: [[a, a, 1]]'), /itself/],
    ['a bond twice', net('masses: 1, bonds: [[a, b, 1], [b, a, 1]]'), /twice/],
    ['a bond without stiffness', net('masses: 1, bonds: [[a, b]]'), /2 entries/],
    ['a missing mass', net('masses: {a: 1}, bonds: []'), /b has no mass/],
    ['a mass of nothing', net('masses: {a: 1, b: 1, c: 1}, bonds: []'), /no point c/],
    ['no bonds', net('masses: 1'), /lacks bonds/],
    ['mixed dimensions', 'network: {points: {a: [0], b: [1, 0]}, masses: 1, bonds: []}', /others have 1/],
  ])('refuses %s', (_, text, message) => expect(refusal(() => readModelText(text)).message).toMatch(message));
});

describe('wrong model files say what is wrong and what to do', () => {
  it.each([
    ['unknown keys with the nearest one', 'hamiltonan: q1', 'hamiltonan', /Did you mean hamiltonian\?/],
    ['unknown keys inside', `${H}symmetry: {generator: []}`, 'symmetry.generator', /Did you mean generators\?/],
    [
      'unknown coordinates in a map',
      `${H}symmetry: {generators: [{map: {q2: q1}}]}`,
      'symmetry.generators[1].map.q2',
      /q2 is not a coordinate/,
    ],
    ['unknown coordinates of the equilibrium', `${H}equilibrium: {Q1: 0}`, 'equilibrium.Q1', /Did you mean q1\?/],
    ['two energies', `${H}quadratic: q1^2`, 'quadratic', /hamiltonian and quadratic/],
    ['lists of different length', 'coordinates: [q1, q2]\nmomenta: [p1]', 'momenta', /2 coordinates and 1 momenta/],
    ['a name twice', 'coordinates: [q1, q1]', 'coordinates[2]', /twice/],
    ['pi as a name', 'parameters: {pi: 3}\nhamiltonian: q1', 'parameters.pi', /number pi/],
    ['a momentum that cannot be guessed', 'coordinates: [x]', 'coordinates', /momentum of x/],
    ['momenta alone', 'momenta: [p1]', 'momenta', /without coordinates/],
    ['a form of the wrong size', `${H}symplectic: [[0]]`, 'symplectic', /1 × 1/],
    ['an odd quadratic form', 'quadratic: [[1]]', 'quadratic', /1 × 1/],
    ['a generator that says nothing', `${H}symmetry: {generators: [{name: r}]}`, 'symmetry.generators[1]', /says nothing/],
    [
      'two forms of one generator',
      `${H}symmetry: {generators: [{map: {q1: -q1}, permutation: [1]}]}`,
      'symmetry.generators[1]',
      /map and permutation/,
    ],
    ['no permutation', `${H}symmetry: {generators: [{permutation: [2]}]}`, 'symmetry.generators[1].permutation[1]', /exceeds/],
    ['a value that is not a truth value', `${H}symmetry: {timeReversal: yes}`, 'symmetry.timeReversal', /true or false/],
    ['a group acting on nothing', `${H}symmetry: {group: cyclic:3}`, 'symmetry', /what it acts on/],
    ['on without a group', `${H}symmetry: {on: [q1]}`, 'symmetry.on', /without a group/],
    ['points where there are none', `${H}symmetry: {group: C3, on: points}`, 'symmetry.on', /no points/],
    ['an unknown vary', `${H}vary: [nu]`, 'vary', /Did you mean mu\?/],
    ['a coordinate to vary', `${H}vary: [q1]`, 'vary', /q1 is a coordinate/],
    ['an unknown range', `${H}range: {nu: [0, 1]}`, 'range', /no parameter nu/],
    ['half a range', `${H}range: {mu: [0]}`, 'range.mu', /1 entries/],
    ['ragged rows', 'quadratic: [[1, 0], [0]]', 'quadratic[2]', /Row 2/],
    ['numbers of another kind', `${H}numbers: float`, 'numbers', /exact or floating/],
    ['no tolerance', `${H}tolerance: 0`, 'tolerance', /positive/],
    ['an empty hamiltonian', 'hamiltonian:', 'hamiltonian', /empty/],
    ['a list', '[1, 2]', undefined, /not a model/],
    ['no coordinates at all', 'title: x', undefined, /no coordinates/],
  ])('refuses %s', (_, text, key, message) => {
    const error = refusal(() => readModelText(text));
    expect(error.culprit.key).toBe(key);
    expect(error.message).toMatch(message);
    expect(error.culprit.expected).toBeTruthy();
    expect(error.culprit.next).toBeTruthy();
  });
  it('refuses one name with two meanings', () => {
    expect(refusal(() => readModelText(`${H}parameters: {q1: 1}\ncoordinates: [q1]`)).message).toMatch(/both a coordinate and a parameter/);
    expect(refusal(() => readModelText(`${H}define: {mu: 1}\nparameters: {mu: 1}`)).message).toMatch(/both a parameter and a definition/);
    expect(refusal(() => readModelText('coordinates: [a]\nmomenta: [a]')).message).toMatch(/both a coordinate and a momentum/);
  });
  it.each([
    ['a missing file, naming the neighbour', () => write('near.yaml', H).replace('near', 'naer'), /Did you mean near\.yaml\?/],
    ['a folder', () => folder, /folder/],
    ['binary garbage', () => write('b.yaml', Uint8Array.from([0, 1, 2, 255])), /NUL/],
    ['another encoding', () => write('l.yaml', Uint8Array.from([0x74, 0xe9, 0x0a])), /UTF-8/],
    ['an empty file', () => write('e.yaml', ''), /empty/],
    ['a device without end', () => '/dev/zero', /larger than 16 MB/],
    ['a path through a file', () => join(write('f.yaml', H), 'x'), /no file/],
    ['no name', () => '', /name of the model file is empty/],
  ])('refuses %s', (_, path, message) => {
    const name = path();
    expect(refusal(() => readModelFile(name)).message).toMatch(message);
  });
  it('refuses binary text from standard input', () => {
    expect(refusal(() => readModelText('a: \0')).message).toMatch(/standard input is not plain text/);
    expect(refusal(() => readModelText('a: \uFFFD')).message).toMatch(/UTF-8/);
  });
  it('drops a byte order mark', () => expect(readModelFile(write('bom.yaml', `\uFEFF${H}`)).coordinates).toEqual(['q1']));
});
