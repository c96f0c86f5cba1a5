/** Every key of the model file, read by the built program. Numbers by hand unless a source is named. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { components, json, refusal, root, run, scratch } from './support/program.ts';

const { write, folder } = scratch();
const planar = (symmetry: string, h = '(p1^2+p2^2)/2 + a*(q1^3 - 3*q1*q2^2)'): string =>
  `coordinates: [q1, q2]\nmomenta: [p1, p2]\nparameters: {a: 1}\nhamiltonian: ${h}\nsymmetry:\n${symmetry}`;
const generators = (...list: string[]): string => `  generators:\n${list.map((g) => `    - ${g}\n`).join('')}`;

describe.concurrent('generators', () => {
  it('map, matrix of the coordinates, matrix of all, permutation: the same ring', async () => {
    const head =
      'coordinates: [q1, q2, q3]\nmomenta: [p1, p2, p3]\nhamiltonian: (p1^2+p2^2+p3^2)/2 + (q1-q2)^2*(q2-q3)^2*(q3-q1)^2 + (q1+q2+q3)^2 + q1^2*q2 + q2^2*q3 + q3^2*q1\nsymmetry:\n';
    const texts = [
      generators('{name: r, map: {q1: q3, q2: q1, q3: q2}}'),
      generators('{name: r, matrix: [[0, 0, 1], [1, 0, 0], [0, 1, 0]]}'),
      generators('{name: r, permutation: [2, 3, 1]}'),
      generators('{name: r, map: {q1: q3, q2: q1, q3: q2, p1: p3, p2: p1, p3: p2}}'),
      generators(
        '{name: r, matrix: [[0, 0, 1, 0, 0, 0], [1, 0, 0, 0, 0, 0], [0, 1, 0, 0, 0, 0], [0, 0, 0, 0, 0, 1], [0, 0, 0, 1, 0, 0], [0, 0, 0, 0, 1, 0]]}',
      ),
      '  {group: "cyclic:3", action: ring, on: [[q1, q2, q3]]}\n',
      '  {group: "cyclic:3", action: ring, on: [q1, q2, q3]}\n',
    ];
    for (const text of texts) {
      const r = await json('codim - --parameters 2', head + text);
      expect([r.group.order, r.zero.codimension, r.zero.blocks], text).toEqual([3, 2, [2, 2]]);
      expect(components(r)).toEqual(['1 real 2 false', '2 complex 2 true']);
    }
  });
  it('a map without momenta follows by the cotangent lift p -> A^-T p', async () => {
    // new q1 = 2 q1: p1 -> p1/2; of infinite order. new q1 = 2 q2, new q2 = q1/2: p1 -> p2/2, p2 -> 2 p1; order 2
    const r = await json('components -', planar(generators('{name: g, map: {q1: 2*q2, q2: q1/2}}'), 'q1*p1 + q2*p2'));
    expect([r.group.order, components(r)]).toEqual([2, ['1 real 2 false', '1 real 2 false']]);
    // and H must be carried along: p1^2 + p2^2 is not invariant, p1^2 + p2^2/4 is: p1^2 -> p2^2/4
    const check = await json('check -', planar(generators('{name: g, map: {q1: 2*q2, q2: q1/2}}'), 'p1^2 + p2^2/4 + q1^2 + 4*q2^2'));
    expect(check.symmetry.holds).toBe(true);
  });
  it('as soon as one momentum is listed, unlisted ones stay', async () => {
    const lifted = await json('check -', planar(generators('{name: g, map: {q1: -q1}}'), 'p1^2 + p2^2 + q1^2 + q2^2'));
    expect(lifted.symmetry.holds).toBe(true);
    // q1 -> −q1, and p1 stays because it is listed: neither symplectic nor antisymplectic
    const broken = await json('check -', planar(generators('{name: g, map: {q1: -q1, p1: p1}}'), 'p1^2 + p2^2 + q1^2 + q2^2'), 1);
    expect(broken.symmetry.generators[0]).toMatchObject({ symplectic: false, invariant: true });
    expect(broken.symmetry.holds).toBe(false);
    expect(await refusal('codim -', planar(generators('{name: g, map: {q1: -q1, p1: p1}}'), 'p1^2 + q2^2'))).toContain('symcodim check');
  });
  it('reversing without a map: q stays, p -> −p; with a map of coordinates p -> −A^-T p', async () => {
    const r = await json(
      'codim - --parameters 9',
      planar(generators('{name: t, reversing: true}', '{name: m, reversing: true, map: {q2: -q2}}')),
    );
    expect(r.group).toMatchObject({ order: 4, reversing: 2 });
    expect(r.symmetry.generators).toMatchObject([
      { name: 't', reversing: true, symplectic: true },
      { name: 'm', reversing: true, symplectic: true },
    ]);
  });
  it('the sign is read where the map is full', async () => {
    const r = await json('components -', planar(generators('{name: t, map: {q1: q1, q2: q2, p1: -p1, p2: -p2}}'), 'p1^2 + p2^2'));
    expect(r.group).toMatchObject({ order: 2, reversing: 1 });
    const full = await json(
      'components -',
      planar(generators('{name: t, matrix: [[1,0,0,0],[0,1,0,0],[0,0,-1,0],[0,0,0,-1]]}'), 'p1^2 + p2^2'),
    );
    expect(full.group).toMatchObject({ order: 2, reversing: 1 });
  });
  it('a `reversing` that disagrees is wrong input naming both', async () => {
    const no = await refusal(
      'codim -',
      planar(generators('{name: tt, reversing: false, map: {q1: q1, q2: q2, p1: -p1, p2: -p2}}'), 'p1^2 + p2^2'),
    );
    expect(no).toMatch(/tt/);
    expect(no).toMatch(/reversing|reverse/);
    expect(no).toMatch(/W/);
    await refusal('codim -', planar(generators('{name: tt, reversing: true, map: {q1: -q1, q2: -q2, p1: -p1, p2: -p2}}'), 'p1^2 + p2^2'));
    // check gives its full answer: no
    const text = planar(generators('{name: tt, reversing: true, map: {q1: -q1, q2: -q2, p1: -p1, p2: -p2}}'), 'p1^2 + p2^2');
    expect([1, 2]).toContain((await run(['check', '-', '--json'], text)).status);
  });
  it('maps with surds and parameters', async () => {
    const r = await json(
      'codim - --parameters 2',
      planar(generators('{name: r, map: {q1: -q1/2 - sqrt(3)/2*q2, q2: sqrt(3)/2*q1 - q2/2}}', '{name: s, map: {q2: c*q2}}')).replace(
        '{a: 1}',
        '{a: 1, c: -1}',
      ),
    );
    expect([r.group.order, r.arithmetic, r.zero.codimension]).toEqual([6, 'exact', 1]);
  });
  it('wrong maps', async () => {
    await refusal('codim -', planar(generators('{name: r, map: {q1: q2^2}}')));
    await refusal('codim -', planar(generators('{name: r, map: {q1: q1 + 1}}')));
    await refusal('codim -', planar(generators('{name: r, map: {q3: q1}}')));
    await refusal('codim -', planar(generators('{name: r, map: {q1: q2}}'))); // singular
    await refusal('codim -', planar(generators('{name: r, map: {q1: p1}}'))); // a momentum, and nothing about momenta
    await refusal('codim -', planar(generators('{name: r, permutation: [1, 1]}')));
    await refusal('codim -', planar(generators('{name: r, permutation: [1, 3]}')));
    await refusal('codim -', planar(generators('{name: r, matrix: [[1, 0], [0]]}')));
    await refusal('codim -', planar(generators('{name: r, matrix: [[1, 0, 0], [0, 1, 0], [0, 0, 1]]}')));
    await refusal('codim -', planar(generators('{name: r, matrix: [[1, 0], [0, 1]], permutation: [2, 1]}')));
    await refusal('codim -', planar(generators('{name: r}')));
    await refusal('codim -', planar(generators('{name: r, mapp: {q1: -q1}}')));
  });
  it('an infinite group is refused, quickly', async () => {
    const text = await refusal('codim -', planar(generators('{name: r, matrix: [[3/5, -4/5], [4/5, 3/5]]}'), 'p1^2 + p2^2 + q1^2 + q2^2'));
    expect(text).toMatch(/finite|infinite|order/);
    await refusal('codim -', planar(generators('{name: r, map: {q1: q1 + q2, p2: p2 - p1}}'), 'p1^2'));
  });
  it('group, own generators and timeReversal together', async () => {
    const r = await json(
      'codim -',
      planar('  group: cyclic:3\n  on: [[q1, q2]]\n  timeReversal: true\n  generators:\n    - {name: s, map: {q2: -q2}}\n'),
    );
    expect([r.group.order, r.group.reversing, r.zero.codimension]).toEqual([12, 6, 1]);
  });
  it('reversing in the block of a group', async () => {
    const r = await json(
      'codim -',
      'coordinates: [q]\nmomenta: [p]\nquadratic: 0*q^2\nsymmetry: {group: "dihedral:3", on: [q, p], reversing: [s]}\n',
    );
    expect([r.group.order, r.group.reversing, r.zero.codimension, r.zero.motion]).toEqual([6, 3, 1, 'passes']);
  });
});

describe.concurrent('the symplectic form', () => {
  it('own W, in the order coordinates, momenta; L = W^-T S', async () => {
    // W = 2 dq∧dp; H = (q^2 + p^2)/2: frequency 1/2
    const r = await json('codim -', 'coordinates: [q]\nmomenta: [p]\nsymplectic: [[0, 2], [-2, 0]]\nquadratic: (q^2+p^2)/2\n');
    expect(r.spectrum[0]).toMatchObject({ re: 0 });
    expect(r.spectrum[0].im).toBeCloseTo(0.5, 12);
  });
  it('entries with parameters', async () => {
    const text = (g: string): string =>
      `coordinates: [x, y]\nmomenta: [u, v]\nparameters: {g: ${g}, k: 1}\nvary: [k]\nsymplectic: [[0, g, 1, 0], [-g, 0, 0, 1], [-1, 0, 0, 0], [0, -1, 0, 0]]\nquadratic: (u^2 + v^2)/2 + (k-1)*(x^2 + y^2)/2\nsymmetry: {generators: [{name: r, matrix: [[0, -1, 0, 0], [1, 0, 0, 0], [0, 0, 0, -1], [0, 0, 1, 0]]}]}\n`;
    // kernel the (x, y)-plane; ω on it is g: semisimple for g ≠ 0, blocks [2, 2] for g = 0. C4 of complex type: [1] 1, [2] 2
    const turning = await json('codim - --parameters 2', text('1/3'));
    expect([turning.zero.blocks, turning.zero.codimension, turning.zero.motion]).toEqual([[1, 1], 1, 'passes']);
    const still = await json('codim - --parameters 2', text('0'));
    expect([still.zero.blocks, still.zero.codimension]).toEqual([[2, 2], 2]);
  });
  it('no lift: a map lists every coordinate that it moves', async () => {
    const text = (map: string): string =>
      `coordinates: [q]\nmomenta: [p]\nsymplectic: [[0, 2], [-2, 0]]\nquadratic: q^2 + p^2\nsymmetry: {generators: [{name: m, map: ${map}}]}\n`;
    expect((await json('components -', text('{q: -q, p: -p}'))).group).toMatchObject({ order: 2, reversing: 0 });
    // q -> −q alone leaves p where it is: antisymplectic
    expect((await json('components -', text('{q: -q}'))).group).toMatchObject({ order: 2, reversing: 1 });
    await refusal(
      'codim -',
      'coordinates: [q]\nmomenta: [p]\nsymplectic: [[0, 2], [-2, 0]]\nquadratic: q^2 + p^2\nsymmetry: {generators: [{name: m, matrix: [[-1]]}]}\n',
    );
  });
  it('singular, not skew, of the wrong size', async () => {
    const text = (w: string): string => `coordinates: [q]\nmomenta: [p]\nsymplectic: ${w}\nquadratic: q^2 + p^2\n`;
    expect(await refusal('codim -', text('[[0, 0], [0, 0]]'))).toMatch(/singular|nondegenerate|degenerate/);
    await refusal('codim -', text('[[0, 1], [1, 0]]'));
    await refusal('codim -', text('[[0, 1, 0], [-1, 0, 0], [0, 0, 0]]'));
    await refusal('codim -', text('[[0, 1]]'));
  });
});

describe.concurrent('equilibrium, define, parameters', () => {
  it('expressions in parameters', async () => {
    const text = 'coordinates: [q]\nmomenta: [p]\nparameters: {m: 1/4}\nhamiltonian: p^2/2 + q^3/3 - m*q\nequilibrium: {q: sqrt(m)}\n';
    const r = await json('codim -', text);
    expect([r.equilibrium.holds, r.zero, r.spectrum[0].im]).toEqual([true, null, 1]);
    const fold = await json('codim - --set m=0 --vary m', text);
    expect([fold.zero.blocks, fold.verdict.answer, fold.verdict.versal]).toEqual([[2], 'generic', true]);
    await refusal('codim - --set m=1/4', text.replace('sqrt(m)', 'm'));
    const check = await json('check -', text.replace('sqrt(m)', 'm'), 1);
    expect(check.equilibrium).toMatchObject({ holds: false, gradient: '-3/16' });
  });
  it('define: names for expressions, exact', async () => {
    const r = await json(
      'codim -',
      'coordinates: [q1, q2]\nmomenta: [p1, p2]\ndefine: {d: q1 - q2, e2: d^2}\nhamiltonian: p1^2 + p2^2 + 0.1*e2\n',
    );
    expect([r.arithmetic, r.zero.blocks]).toEqual(['exact', [2]]);
  });
  it('line breaks in an expression are blanks', async () => {
    await json('codim -', 'coordinates: [q]\nmomenta: [p]\nhamiltonian: |\n  p^2/2\n  + q^2/2\n');
    await json('codim -', 'coordinates: [q]\nmomenta: [p]\nhamiltonian: >-\n  p^2/2\n\n  + q^2/2\n');
  });
  it('default names q1, p1, … found in the expression of a file too', async () => {
    const r = await json('codim -', 'hamiltonian: p2^2/2 + q10^2 + q2^2 + p10^2\n');
    expect(r.model.coordinates).toEqual(['q2', 'q10']);
  });
  it('JSON is read by the same reader; digits are never rounded', async () => {
    const r = await json(
      'codim -',
      '{"coordinates": ["q"], "momenta": ["p"], "parameters": {"a": 0.1000000000000000000000000001, "b": "1/3", "c": 1e-3}, "hamiltonian": "a*p^2 + b*q^2 + c*q^2"}',
    );
    expect([r.arithmetic, r.model.parameters.b, r.model.parameters.c]).toEqual(['exact', '1/3', '1/1000']);
    expect(r.model.parameters.a).toBe('1000000000000000000000000001/10000000000000000000000000000');
  });
  it('a quadratic as a matrix: H = x^T S x/2', async () => {
    const r = await json('codim -', 'coordinates: [q]\nmomenta: [p]\nquadratic: [[4, 0], [0, 1]]\n');
    expect(r.spectrum[0].im).toBe(2);
    await refusal('codim -', 'coordinates: [q]\nmomenta: [p]\nquadratic: [[4, 1], [0, 1]]\n');
  });
  it('a quadratic as a file', async () => {
    write('s.mtx', '%%MatrixMarket matrix coordinate integer symmetric\n2 2 1\n1 1 4\n');
    const file = write('quadratic-file.yaml', 'coordinates: [q]\nmomenta: [p]\nquadratic: s.mtx\n');
    const r = await json(['codim', file]);
    expect([r.arithmetic, r.zero.blocks]).toEqual(['exact', [2]]);
  });
});

describe.concurrent('mass, gyroscopic, stiffness', () => {
  const rotor = (g: string, k: string): string =>
    `parameters: {k: ${k}}\nvary: [k]\nmass: [[1, 0], [0, 1]]\ngyroscopic: [[0, ${g}], [-${g}, 0]]\nstiffness: {constant: [[0, 0], [0, 0]], k: [[1, 0], [0, 1]]}\nsymmetry: {generators: [{name: r, matrix: [[0, -1], [1, 0]]}]}\n`;
  it('H = (p − Gq/2)^T M^-1 (p − Gq/2)/2 + q^T K q/2; whirling rotor at zero stiffness', async () => {
    // q″ + G q′ = 0: eigenvalues 0, 0, ±2i; kernel (q, p = Gq/2), ω on it is G: semisimple, C4 passes
    const r = await json('codim -', rotor('2', '0'));
    expect(r.model.coordinates).toEqual(['q1', 'q2']);
    expect(r.zero).toMatchObject({ dimension: 2, kernel: 2, blocks: [1, 1], codimension: 1, motion: 'passes' });
    expect(r.verdict).toMatchObject({ answer: 'generic', versal: true });
    expect(r.spectrum.map((x: { im: number }) => x.im)).toEqual([2]);
    // G = 0: blocks [2, 2], complex type [2] costs 2
    expect((await json('codim - --parameters 2', rotor('0', '0'))).zero).toMatchObject({ blocks: [2, 2], codimension: 2 });
  });
  it('the mass counts: M q″ + K q = 0', async () => {
    const r = await json('codim -', 'mass: [[4]]\nstiffness: [[1]]\n');
    expect(r.spectrum[0].im).toBe(0.5);
  });
  it('files, affine in a parameter', async () => {
    write('m.mtx', '%%MatrixMarket matrix coordinate integer general\n2 2 2\n1 1 1\n2 2 1\n');
    write('k0.mtx', '%%MatrixMarket matrix array integer general\n2 2\n1\n-1\n-1\n1\n');
    write('k1.json', '[[1, 0], [0, 1]]');
    write('g.csv', '0,1\n-1,0\n');
    const r = await json([
      'codim',
      write('files.yaml', 'parameters: {c: 0}\nvary: c\nmass: m.mtx\ngyroscopic: g.csv\nstiffness: {constant: k0.mtx, c: k1.json}\n'),
    ]);
    expect(r.arithmetic).toBe('exact');
    // kernel (1, 1) of K: q″ + G q′ + K q = 0 has det(λ² + K + λG) = λ⁴ + 3λ²: one block [2]
    expect(r.zero).toMatchObject({ blocks: [2], codimension: 1 });
    expect(r.verdict.versal).toBe(true);
  });
  it('a point in a CSV or JSON matrix, or "real", makes it floating', async () => {
    write('k.csv', '1.0,0\n0,2\n');
    const r = await json(['codim', write('float.yaml', 'mass: [[1, 0], [0, 1]]\nstiffness: k.csv\n')]);
    expect(r.arithmetic).toBe('floating');
    write('k.mtx', '%%MatrixMarket matrix array real general\n1 1\n2\n');
    expect((await json(['codim', write('real.yaml', 'mass: [[1]]\nstiffness: k.mtx\n')])).arithmetic).toBe('floating');
  });
  it('damping is refused with the reason', async () => {
    expect(await refusal('codim -', 'mass: [[1]]\nstiffness: [[1]]\ndamping: [[1]]\n')).toMatch(/damp/);
  });
  it('wrong matrices', async () => {
    await refusal('codim -', 'mass: [[0]]\nstiffness: [[1]]\n');
    await refusal('codim -', 'mass: [[1, 0], [0, 1]]\nstiffness: [[1]]\n');
    await refusal('codim -', 'mass: [[1, 0], [0, 1]]\nstiffness: [[1, 2], [0, 1]]\n');
    await refusal('codim -', 'mass: [[1, 0], [0, 1]]\ngyroscopic: [[0, 1], [1, 0]]\nstiffness: [[1, 0], [0, 1]]\n');
    expect(await refusal('codim -', 'mass: [[1]]\nstiffness: nowhere.mtx\n')).toContain('nowhere.mtx');
    write('pattern.mtx', '%%MatrixMarket matrix coordinate pattern general\n1 1 1\n1 1\n');
    expect(await refusal(['codim', write('pattern.yaml', 'mass: [[1]]\nstiffness: pattern.mtx\n')])).toMatch(/pattern/);
    write('complex.mtx', '%%MatrixMarket matrix coordinate complex general\n1 1 1\n1 1 1 0\n');
    await refusal(['codim', write('complex.yaml', 'mass: [[1]]\nstiffness: complex.mtx\n')]);
  });
});

describe.concurrent('network', () => {
  const triangle =
    'network:\n  points: {a: [1, 0], b: [-1/2, sqrt(3)/2], c: [-1/2, -sqrt(3)/2]}\n  masses: {a: 1, b: 1, c: 1}\n  bonds: [[a, b, 1], [b, c, 1], [c, a, 1]]\n';
  it('triangle of springs: frequencies sqrt(3) once, sqrt(3/2) twice, and rigid motions', async () => {
    const r = await json('codim - --parameters 99', `${triangle}symmetry: {group: "dihedral:3", on: points}\n`, null);
    expect(r.group.order).toBe(6);
    // Γ = permutation ⊗ plane = A1 + A2 + 2E on coordinates
    expect(components(r)).toEqual(['1 real 2 false', '1 real 2 false', '2 real 4 false']);
    expect(r.zero).toMatchObject({ kernel: 3, blocks: [2, 2, 2] });
    const found = await json('codim - --neutral find', `${triangle}symmetry: {group: "dihedral:3", on: points}\n`, null);
    expect([found.neutral.dimension, found.zero]).toEqual([6, null]);
    expect(found.neutral.directions).toHaveLength(3);
    const squares = found.spectrum
      .map((x: { im: number; multiplicity: number }) => `${Math.round(x.im * x.im * 1e6) / 1e6} ×${x.multiplicity}`)
      .sort();
    expect(squares.map((x: string) => x.split(' ')[0])).toEqual(['1.5', '3']);
  });
  it('a tetrahedron in space, by Td', async () => {
    const text =
      'network:\n  points: {a: [1, 1, 1], b: [1, -1, -1], c: [-1, 1, -1], d: [-1, -1, 1]}\n  masses: {a: 1, b: 1, c: 1, d: 1}\n  bonds: [[a, b, 1], [a, c, 1], [a, d, 1], [b, c, 1], [b, d, 1], [c, d, 1]]\nsymmetry: {group: Td, on: points}\n';
    const r = await json('codim - --neutral find', text, null);
    // 12 coordinates: A1 + E + T1 + 2 T2; vibrations A1 + E + T2 (G. Herzberg, Infrared and Raman Spectra, 1945, from memory)
    expect(r.group.order).toBe(24);
    expect([r.neutral.dimension, r.zero, r.inertia]).toEqual([12, null, { positive: 12, zero: 0, negative: 0 }]);
  });
  it('wrong networks', async () => {
    await refusal('codim -', triangle.replace('[c, a, 1]', '[c, z, 1]'));
    await refusal('codim -', triangle.replace('[c, a, 1]', '[c, c, 1]'));
    await refusal('codim -', triangle.replace('c: 1}', 'c: 0}'));
    await refusal('codim -', triangle.replace('a: [1, 0]', 'a: [1, 0, 0]'));
    await refusal('codim -', triangle.replace('c: [-1/2, -sqrt(3)/2]', 'c: [1, 0]'));
    await refusal('codim -', `${triangle}symmetry: {group: "dihedral:4", on: points}\n`);
    await refusal('codim -', `hamiltonian: q1^2\n${triangle}`);
  });
});

describe.concurrent('reading', () => {
  it('unknown, misspelt and doubled keys, with the nearest known key', async () => {
    expect(await refusal('codim -', 'hamiltonain: p1^2 + q1^2\n')).toContain('hamiltonian');
    expect(await refusal('codim -', 'hamiltonian: p1^2 + q1^2\nsymetry: {}\n')).toContain('symmetry');
    expect(await refusal('codim -', 'hamiltonian: p1^2 + q1^2\nhamiltonian: p1^2\n')).toMatch(/hamiltonian/);
    expect(
      await refusal(
        'codim -',
        'coordinates: [q]\nmomenta: [p]\nhamiltonian: p^2 + q^2\nsymmetry: {generators: [{name: t, reversing: maybe}]}\n',
      ),
    ).toMatch(/true/);
    await refusal('codim -', 'coordinates: [q]\nmomenta: [p, u]\nhamiltonian: p^2 + q^2\n');
    await refusal('codim -', 'coordinates: [q, q]\nmomenta: [p, u]\nhamiltonian: p^2 + q^2\n');
    await refusal('codim -', 'coordinates: [q]\nmomenta: [q]\nhamiltonian: q^2\n');
    await refusal('codim -', 'coordinates: [q]\nmomenta: [p]\nparameters: {q: 1}\nhamiltonian: q^2\n');
    await refusal('codim -', 'coordinates: [q]\nmomenta: [p]\nvary: [nu]\nhamiltonian: q^2\n');
    await refusal('codim -', 'coordinates: [q]\nmomenta: [p]\nequilibrium: {z: 1}\nhamiltonian: q^2\n');
    await refusal('codim -', '');
    await refusal('codim -', '[1, 2]\n');
    await refusal('codim -', 'title: nothing else\n');
    await refusal('codim -', 'hamiltonian: [unclosed\n');
    await refusal('codim -', '\u0000\u0001\u0002');
  });
  it('a folder, a missing file, a file that is no text', async () => {
    expect(await refusal(['codim', folder])).toContain(folder);
    expect(await refusal(['codim', join(folder, 'none.yaml')])).toContain('none.yaml');
    expect(await refusal(['codim', join(root, 'samples')])).toContain('samples');
  });
  it('every option example of a sample: a model from standard input equals the file', async () => {
    const path = 'samples/three-resonator-ring.yaml';
    const a = await json(['codim', path]);
    const b = await json(['codim', '-'], readFileSync(join(root, path), 'utf8'));
    for (const key of ['zero', 'verdict', 'components', 'group', 'inertia']) expect(b[key]).toEqual(a[key]);
  });
});

describe.concurrent('neutral', () => {
  const pair = (more: string): string =>
    `coordinates: [q1, q2]\nmomenta: [p1, p2]\nparameters: {k: 1}\nhamiltonian: (p1^2 + p2^2)/2 + k*(q1 - q2)^2/2\n${more}`;
  it('one translation: dimension 2, split off', async () => {
    const r = await json('codim -', pair('neutral: [{q1: 1, q2: 1}]\n'));
    expect([r.neutral.dimension, r.neutral.directions.length, r.zero, r.inertia]).toEqual([
      2,
      1,
      null,
      { positive: 2, zero: 0, negative: 0 },
    ]);
    const event = await json('codim - --set k=0', pair('neutral: [{q1: 1, q2: 1}]\n'));
    expect([event.neutral.dimension, event.zero.blocks, event.zero.codimension]).toEqual([2, [2], 1]);
    const plain = await json('codim -', pair(''));
    expect([plain.neutral.dimension, plain.zero.blocks]).toEqual([0, [2]]);
  });
  it('found on request, in the file or by the option', async () => {
    expect((await json('codim - --neutral find', pair(''))).neutral.dimension).toBe(2);
    expect((await json('codim -', pair('neutral: find\n'))).neutral.dimension).toBe(2);
  });
  it('momenta follow by p -> −A^T p; a rotation at the origin gives no direction but belongs to the symmetry', async () => {
    const free = 'coordinates: [q1, q2]\nmomenta: [p1, p2]\nhamiltonian: (p1^2 + p2^2)/2\n';
    expect((await json('codim - --parameters 9', free)).zero.codimension).toBe(4);
    const r = await json('codim - --parameters 9', `${free}neutral: [{q1: -q2, q2: q1}]\n`);
    expect([r.neutral.dimension, r.zero.codimension]).toEqual([0, 2]);
  });
  it('refused: not a symmetry of H, not symplectic, span not invariant', async () => {
    await refusal('codim -', pair('neutral: [{q1: 1}]\n'));
    await refusal('codim -', pair('neutral: [{q1: q1, q2: q2, p1: p1, p2: p2}]\n'));
    await refusal(
      'codim -',
      'coordinates: [q1, q2]\nmomenta: [p1, p2]\nhamiltonian: (p1^2 + p2^2)/2\nneutral: [{q1: 1}]\nsymmetry: {generators: [{name: s, map: {q1: q2, q2: q1}}]}\n',
    );
  });
});
