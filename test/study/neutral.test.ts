/** Neutral directions and the symplectic slice, end to end. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readModelFile, readModelText } from '../../src/model/declaration/index.ts';
import { codimResult } from '../../src/study/codim.ts';
import { floatingCodimResult, floatingStudy } from '../../src/study/floating.ts';
import { linearStudy } from '../../src/study/linear-study.ts';
import { isExact, prepare } from '../../src/study/prepare.ts';
import type { CodimResult } from '../../src/study/result.ts';

function codim(text: string, parameters = 1): CodimResult {
  const prepared = prepare(readModelText(text));
  if (!isExact(prepared)) throw new Error(prepared.because);
  return codimResult(linearStudy(prepared), parameters);
}

const sample = (name: string) => {
  const prepared = prepare(readModelFile(`samples/${name}.yaml`));
  if (!isExact(prepared)) throw new Error(prepared.because);
  return codimResult(linearStudy(prepared), 1);
};

describe('neutral dimension: dim T + dim(T ∩ T^ω)', () => {
  const plane = '{q1: 1, q3: 1}, {q2: 1, q4: 1}, {q1: -q2, q2: q1, q3: -q4, q4: q3}';
  const spring = '((q1-q3)^2+(q2-q4)^2-1)^2';
  // three vortices on a line with Γ1Γ2 + Γ1Γ3 + Γ2Γ3 = 0 stand still (H. Aref, Motion of three vortices, Phys. Fluids 22, 1979; place from memory)
  const vortices = `
coordinates: [x1, x2, x3]
momenta: [y1, y2, y3]
symplectic:
  - [0, 0, 0, 1, 0, 0]
  - [0, 0, 0, 0, -1/2, 0]
  - [0, 0, 0, 0, 0, 1]
  - [-1, 0, 0, 0, 0, 0]
  - [0, 1/2, 0, 0, 0, 0]
  - [0, 0, -1, 0, 0, 0]
hamiltonian: log((x1-x2)^2+(y1-y2)^2)/2 - log((x1-x3)^2+(y1-y3)^2) + log((x2-x3)^2+(y2-y3)^2)/2
equilibrium: {x1: -1, x3: 1}
neutral: [{x1: 1, x2: 1, x3: 1}, {y1: 1, y2: 1, y3: 1}, {x1: -y1, x2: -y2, x3: -y3, y1: x1, y2: x2, y3: x3}]`;
  it.each([
    ['one translation', 'hamiltonian: p1^2/2 + p2^2/2 + q2^2/2\nneutral: [{q1: 1}]', 2],
    ['translations in q1 and p1', 'coordinates: [q1, q2]\nhamiltonian: p2^2/2 + q2^2/2\nneutral: [{q1: 1}, {p1: 1}]', 2],
    ['two q-translations', 'hamiltonian: (p1^2 + p2^2 + p3^2)/2 + q3^2/2\nneutral: [{q1: 1}, {q2: 1}]', 4],
    ['plane Euclidean group on vortices with circulation', vortices, 4],
    [
      'two bodies at rest in the plane',
      `hamiltonian: (p1^2+p2^2+p3^2+p4^2)/2 + ${spring}\nequilibrium: {q1: 1/2, q3: -1/2}\nneutral: [${plane}]`,
      6,
    ],
  ])('%s', (_, text, dimension) => {
    const result = codim(text);
    expect(result.neutral.dimension).toBe(dimension);
    const { positive, zero, negative } = result.inertia;
    expect(positive + zero + negative).toBe(2 * result.model.degreesOfFreedom - dimension);
  });

  it('a field declared twice counts once', () => {
    expect(codim('hamiltonian: p1^2/2 + p2^2/2 + q2^2/2\nneutral: [{q1: 1}, {q1: 2}]').neutral.dimension).toBe(2);
  });

  it('the whole phase space may be neutral', () => {
    const result = codim('hamiltonian: p1^2/2\nneutral: [{q1: 1}]');
    expect(result.neutral.dimension).toBe(2);
    expect(result.zero).toBeNull();
    expect(result.verdict.answer).toBe('no event');
    expect(result.inertia).toEqual({ positive: 0, zero: 0, negative: 0 });
  });
});

describe('the event on the slice', () => {
  it('a block of size 4 in V is one of size 2 in N: H = p1 q2 + p2²/2 with translation in q1', () => {
    const whole = codim('hamiltonian: p1*q2 + p2^2/2');
    expect(whole.zero).toMatchObject({ blocks: [4], codimension: 2 });
    const result = codim('hamiltonian: p1*q2 + p2^2/2\nneutral: [{q1: 1}]');
    expect(result.neutral.dimension).toBe(2);
    expect(result.zero).toMatchObject({ dimension: 2, blocks: [2], codimension: 1, motion: 'splits' });
  });

  it('heptagon of vortices (T. H. Havelock 1931): 2 in the slice, one more than symmetry explains', () => {
    const result = sample('vortex-heptagon-slice');
    expect(result.neutral.dimension).toBe(2);
    expect(result.zero).toMatchObject({ dimension: 4, kernel: 2, blocks: [2, 2], codimension: 2 });
    expect(result.inertia).toEqual({ positive: 10, zero: 2, negative: 0 });
    expect(result.group).toMatchObject({ order: 14, reversing: 7 });
    expect(result.verdict.answer).toBe('not generic');
    expect(result.verdict.because).toContain('not generic under the declared symmetry');
    expect(result.components.reduce((n, c) => n + c.dimension * c.multiplicity, 0)).toBe(14);
    expect(result.zero!.subgroups.find((s) => s.order === 14)!.codimension).toBe(2);
    expect(result.zero!.subgroups.find((s) => s.order === 1)!.codimension).toBe(4);
  });

  it('water at rest has no zero beside its six rigid motions (Wilson, Decius & Cross 1955)', () => {
    const result = sample('water');
    expect(result.neutral.dimension).toBe(12);
    expect(result.zero).toBeNull();
    expect(result.inertia).toEqual({ positive: 6, zero: 0, negative: 0 });
  });

  it('methane without bending springs: E and T2 at once', () => {
    const result = sample('methane');
    expect(result.neutral.dimension).toBe(12);
    expect(result.zero).toMatchObject({ kernel: 5, codimension: 2, components: ['E', 'T2'] });
  });
});

describe('fields that vanish at the equilibrium', () => {
  const plane = 'hamiltonian: (p1^2+p2^2)/2';
  it('|p|²/2 on R⁴: 4 without the rotation, 2 with it', () => {
    expect(codim(plane).zero!.codimension).toBe(4);
    const result = codim(`${plane}\nneutral: [{q1: -q2, q2: q1}]`);
    expect(result.neutral.dimension).toBe(0);
    expect(result.zero).toMatchObject({ blocks: [2, 2], codimension: 2, codimensionWithoutSymmetry: 4 });
    expect(result.zero!.subgroups).toMatchObject([{ order: 1, codimension: 2 }]);
    expect(result.group.order).toBe(1);
  });

  it('with time reversal the pair splits at codimension 1, as for the group of all turns and mirrors', () => {
    const result = codim(`${plane}\nneutral: [{q1: -q2, q2: q1}]\nsymmetry: {generators: [{name: t, reversing: true}]}`);
    expect(result.zero).toMatchObject({ codimension: 1, motion: 'splits' });
    expect(result.verdict.answer).toBe('generic');
    expect(result.zero!.subgroups.map((s) => [s.order, s.codimension])).toEqual([
      [1, 2],
      [2, 1],
    ]);
  });

  it('a phase rotation makes S = 0 on a plane generic: 3 without, 1 with', () => {
    const text = 'quadratic: mu*(q1^2+p1^2)/2\nparameters: {mu: 0}\nvary: [mu]';
    expect(codim(text).zero!.codimension).toBe(3);
    const result = codim(`${text}\nneutral: [{q1: -p1, p1: q1}]`);
    expect(result.zero).toMatchObject({ codimension: 1, motion: 'passes', codimensionWithoutSymmetry: 3 });
    expect(result.verdict).toMatchObject({ answer: 'generic', versal: true });
  });

  it('all rotations of space: the vector is of real type, 1 instead of 9', () => {
    const space = 'hamiltonian: (p1^2+p2^2+p3^2)/2 + k*(q1^2+q2^2+q3^2)/2 + (q1^2+q2^2+q3^2)^2\nparameters: {k: 0}\nvary: [k]';
    expect(codim(space).zero!.codimension).toBe(9);
    const result = codim(`${space}\nneutral: [{q1: -q2, q2: q1}, {q2: -q3, q3: q2}, {q1: -q3, q3: q1}]`);
    expect(result.zero).toMatchObject({ codimension: 1, motion: 'splits', codimensionWithoutSymmetry: 9 });
    expect(result.verdict.versal).toBe(true);
  });

  it('two rotations of weights 1 and 2 together, an oblique one, and one that is not periodic', () => {
    const four = 'hamiltonian: (p1^2+p2^2+p3^2+p4^2)/2';
    // weights 1 and 2: two different irreducibles of complex type, each with [2]: 2 + 2
    expect(codim(`${four}\nneutral: [{q1: -q2, q2: q1, q3: -2*q4, q4: 2*q3}]`).zero!.codimension).toBe(4);
    // equal weights: u(2,2) with [2,2]: 8
    expect(codim(`${four}\nneutral: [{q1: -q2, q2: q1, q3: -q4, q4: q3}]`).zero!.codimension).toBe(8);
    expect(codim(`${four}\nneutral: [{q1: -sqrt(2)*q2, q2: sqrt(2)*q1, q3: -sqrt(2)*q4, q4: sqrt(2)*q3}]`).zero!.codimension).toBe(8);
    // incommensurable weights have no finite stand-in; the rank alone finds the torus
    expect(codim(`${four}\nneutral: [{q1: -q2, q2: q1, q3: -sqrt(2)*q4, q4: sqrt(2)*q3}]`).zero!.codimension).toBe(4);
  });

  it('a shear leaves less room than a rotation: H = p1²/2 with q1 ↦ q1 + s p1', () => {
    const result = codim('hamiltonian: p1^2/2\nneutral: [{q1: p1, p1: 0}]');
    // forms that the shear leaves invariant are multiples of p1²; no map commuting with it moves them
    expect(result.zero).toMatchObject({ blocks: [2], codimension: 1 });
  });

  it('translations moved by an isotropy rotation are added: T is all of the plane', () => {
    expect(codim(`${plane}\nneutral: [{q1: 1}, {q1: -q2, q2: q1}]`).neutral.dimension).toBe(4);
  });
});

describe('versality on the slice', () => {
  it('two bodies on a line: a distance spring that softens', () => {
    const text = (v: string) => `hamiltonian: (p1^2+p2^2)/2 + ${v}\nparameters: {mu: 0}\nvary: [mu]\nneutral: [{q1: 1, q2: 1}]`;
    const pitchfork = codim(text('mu*(q1-q2)^2/2 + (q1-q2)^4'));
    expect(pitchfork.neutral.dimension).toBe(2);
    expect(pitchfork.zero).toMatchObject({ blocks: [2], codimension: 1 });
    expect(codim(text('mu*(q1-q2) + (q1-q2)^3')).verdict).toMatchObject({ answer: 'generic', versal: true });
    expect(codim(text('mu*(q1-q2) + (q1-q2)^4')).verdict.versal).toBe(false);
    expect(codim(text('mu*(q1-q2)^2 + (q1-q2)^3')).verdict).toMatchObject({ versal: true });
  });

  // A particle in the plane with potential V in the frame that turns at rate 1: at fixed momentum J the radius moves in
  // U(r) = J²/(2r²) + V(r); at r = 1, J = 1, V' = 1 the event is U'' = 3 + V'' = 0.
  const orbit = (v: string) => `
hamiltonian: (p1^2+p2^2)/2 - (q1*p2 - q2*p1) + ${v}
equilibrium: {q1: 1, p2: 1}
parameters: {mu: 0}
vary: [mu]
neutral: [{q1: -q2, q2: q1}]`;
  const s = '(q1^2+q2^2-1)'; // r² − 1

  it('circular orbit that loses its epicyclic motion: fold of the radius at fixed momentum', () => {
    // V = s/2 − s²/2: V' = r − 2rs = 1 and V'' = 1 − 4 = −3 at r = 1
    const result = codim(orbit(`${s}/2 - ${s}^2/2 + mu*${s}`));
    expect(result.neutral.dimension).toBe(2);
    expect(result.zero).toMatchObject({ blocks: [2], codimension: 1, motion: 'splits' });
    expect(result.verdict).toMatchObject({ answer: 'generic', versal: true });
  });

  it('a parameter that leaves U as it is unfolds nothing', () => {
    // μ s³ has no gradient and no second derivative at r = 1
    expect(codim(orbit(`${s}/2 - ${s}^2/2 + mu*${s}^3`)).verdict.versal).toBe(false);
  });

  it('the fold needs U‴ ≠ 0', () => {
    // U = 1/(2(1+s)) + V(s), in s: V = s/2 − s²/2 + s³/2 cancels the cubic term too: 1/(2(1+s)) = (1 − s + s² − s³ + …)/2
    expect(codim(orbit(`${s}/2 - ${s}^2/2 + ${s}^3/2 + mu*${s}`)).verdict.versal).toBe(false);
    expect(codim(orbit(`${s}/2 - ${s}^2/2 + ${s}^3/3 + mu*${s}`)).verdict.versal).toBe(true);
  });

  it('along the trivial branch the second derivative must move: μ s² keeps the circle', () => {
    const result = codim(orbit(`${s}/2 - ${s}^2/2 + mu*${s}^2`));
    expect(result.verdict.versal).toBe(true);
    expect(result.verdict.versality).toContain('along this branch');
  });

  it('a mirror pair in the turning frame: the momentum moves with the radius, and so does the mode', () => {
    // two particles on one orbit, a mode that exchanges them is even under nothing: it feels the radius r(μ) only
    const text = (w: string) => `
hamiltonian: (p1^2+p2^2)/2 - (q1*p2 - q2*p1) + ${s}/2 + mu*${s} + (p3^2)/2 + ${w}
equilibrium: {q1: 1, p2: 1}
parameters: {mu: 0}
vary: [mu]
symmetry: {generators: [{name: m, map: {q3: -q3}}]}
neutral: [{q1: -q2, q2: q1}]`;
    // V = s/2 + μs: at J = 1 the radius satisfies r⁴(1 + 2μ) = 1, so r² − 1 = −μ + …; the stiffness of q3 is 2(r² − 1)
    expect(codim(text(`${s}*q3^2`)).verdict).toMatchObject({ answer: 'generic', versal: true });
    // here it is 2(r² − 1) + 2μ = 0 to first order
    expect(codim(text(`(${s}+mu)*q3^2`)).verdict).toMatchObject({ answer: 'generic', versal: false });
    expect(codim(text(`(${s}+2*mu)*q3^2`)).verdict).toMatchObject({ answer: 'generic', versal: true });
  });
});

describe('wrong fields', () => {
  const model = 'hamiltonian: (p1^2+p2^2)/2 + (q1-q2)^2/2\n';
  it.each([
    ['H not invariant', `${model}neutral: [{q1: 1}]`, /not invariant under the field neutral\[1\].*q/],
    ['ω not preserved', `${model}neutral: [{q1: q1, p1: p1}]`, /does not preserve the symplectic form/],
    ['not affine', `${model}neutral: [{q1: q1^2}]`, /not linear/],
    ['only at one parameter value', 'hamiltonian: p1^2/2 + c*q1^2/2\nparameters: {c: 0}\nvary: [c]\nneutral: [{q1: 1}]', /when c varies/],
    [
      'span not invariant',
      'hamiltonian: (p1^2+p2^2)/2\nneutral: [{q1: 1}]\nsymmetry: {generators: [{name: s, map: {q1: q2, q2: q1}}]}',
      /not invariant: s maps the field neutral\[1\]/,
    ],
  ])('%s', (_, text, message) => {
    expect(() => codim(text)).toThrow(message);
  });
});

describe('neutral: find', () => {
  it('translation of two bodies on a line', () => {
    const result = codim('hamiltonian: (p1^2+p2^2)/2 + (q1-q2)^4 + (q1-q2)^2\nneutral: find');
    expect(result.neutral).toEqual({ dimension: 2, directions: ['q1: 1, q2: 1'] });
  });
  it('rotation of the turning frame', () => {
    const text = 'hamiltonian: (p1^2+p2^2)/2 - (q1*p2 - q2*p1) + (q1^2+q2^2)/2 - (q1^2+q2^2)^2/8\nequilibrium: {}\nneutral: find';
    expect(codim(text).neutral.directions).toEqual(['q1: -q2, q2: q1, p1: -p2, p2: p1']);
  });
  it('a turn in coordinates weighted by masses is periodic, and found', () => {
    const result = codim('hamiltonian: p1^2/2 + p2^2/8 + (q1^2+4*q2^2)/2 + (q1^2+4*q2^2)^2\nneutral: find');
    expect(result.neutral.directions).toHaveLength(1);
  });
  it('nothing in a generic well', () => {
    expect(codim('hamiltonian: p1^2/2 + p2^2/3 + q1^2 + q1*q2^2 + q2^2\nneutral: find').neutral).toEqual({ dimension: 0, directions: [] });
  });
  it('heptagon: the rotation of all vortices, to the degree of the series', () => {
    const declaration = { ...readModelFile('samples/vortex-heptagon-slice.yaml'), neutral: [], neutralFind: true };
    const prepared = prepare(declaration);
    if (!isExact(prepared)) throw new Error(prepared.because);
    expect(prepared.neutral!.directions).toEqual([
      'x1: -y1, x2: -y2, x3: -y3, x4: -y4, x5: -y5, x6: -y6, x7: -y7, y1: x1, y2: x2, y3: x3, y4: x4, y5: x5, y6: x6, y7: x7',
    ]);
  });
  it('water: six rigid motions', () => {
    const prepared = prepare({ ...readModelFile('samples/water.yaml'), neutral: [], neutralFind: true });
    if (!isExact(prepared)) throw new Error(prepared.because);
    expect(prepared.neutral!.fields).toHaveLength(6);
    expect(codimResult(linearStudy(prepared), 1).neutral.dimension).toBe(12);
  });
  it('an event is not taken for a symmetry: the translation holds at one parameter value only', () => {
    const result = codim('hamiltonian: p1^2/2 + c*q1^2/2 + q1^4\nparameters: {c: 0}\nvary: [c]\nneutral: find');
    expect(result.neutral.dimension).toBe(0);
    expect(result.zero!.codimension).toBe(1);
  });
});

describe('floating numbers', () => {
  const floating = (text: string) => floatingCodimResult(floatingStudy(notExact(text)), 1);
  const notExact = (text: string) => {
    const prepared = prepare(readModelText(`${text}\nnumbers: floating`));
    if (isExact(prepared)) throw new Error('exact');
    return prepared;
  };
  it.each(['vortex-heptagon-slice', 'water', 'methane'])('%s: the same slice and event as with exact numbers', (name) => {
    const source = prepare({ ...readModelFile(`samples/${name}.yaml`), numbers: 'floating' });
    if (isExact(source)) throw new Error('exact');
    const result = floatingCodimResult(floatingStudy(source), 1);
    const exact = sample(name);
    expect(result.neutral).toEqual(exact.neutral);
    expect(result.inertia).toEqual(exact.inertia);
    const numbers = (z: CodimResult['zero']) =>
      z === null ? null : [z.blocks, z.codimension, z.codimensionWithoutSymmetry, z.subgroups.map((s) => [s.order, s.codimension])];
    expect(numbers(result.zero)).toEqual(numbers(exact.zero));
    expect(result.verdict.answer).toBe(exact.verdict.answer);
    expect(result.verdict.versal).toBeNull();
  });
  it('generators that are not orthogonal: the complement is invariant all the same', () => {
    // three particles on a line in the coordinates q1, q2 − q1, q3 of the permuted model
    const text = `hamiltonian: p1^2/2 + p2^2/2 + p3^2/2 + ((q1-q2)^2 + (q2-q3)^2 + (q3-q1)^2)/2
symmetry: {generators: [{name: r, map: {q1: q3, q2: q1, q3: q2}}]}
neutral: [{q1: 1, q2: 1, q3: 1}]`;
    // q2 = q1 + x: symplectic, and the cyclic permutation becomes a shear
    const sheared = `hamiltonian: (p1-p2)^2/2 + p2^2/2 + p3^2/2 + (q2^2 + (q1+q2-q3)^2 + (q3-q1)^2)/2
symmetry: {generators: [{name: r, map: {q1: q3, q2: q1 - q3, q3: q1 + q2}}]}
neutral: [{q1: 1, q3: 1}]`;
    for (const t of [text, sheared]) {
      expect(codim(t).inertia).toEqual({ positive: 4, zero: 0, negative: 0 });
      expect(floating(t).inertia).toEqual({ positive: 4, zero: 0, negative: 0 });
    }
  });
  it('wrong fields, and those that need exact numbers', () => {
    const model = 'hamiltonian: (p1^2+p2^2)/2 + (q1-q2)^2/2 + (q1-q2)^3\n';
    expect(() => floating(`${model}neutral: [{q1: 1}]`)).toThrow(/not invariant under the field neutral\[1\]/);
    expect(() => floating(`${model}neutral: [{q1: q1, p1: p1}]`)).toThrow(/does not preserve/);
    expect(() => floating(`${model}neutral: find`)).toThrow(/needs exact numbers/);
    expect(() => floating('hamiltonian: (p1^2+p2^2)/2 + (q1^2+q2^2)^2\nneutral: [{q1: -q2, q2: q1}]')).toThrow(
      /vanishes at the equilibrium/,
    );
  });
});

describe('laws', () => {
  it('declaring translations of a chain leaves the event of the distances (fast-check)', () => {
    const coefficient = fc.integer({ min: -2, max: 2 });
    fc.assert(
      fc.property(fc.array(coefficient, { minLength: 3, maxLength: 3 }), ([a, b, c]) => {
        const chain = codim(
          `hamiltonian: (p1^2+p2^2+p3^2)/2 + ${a}*(q1-q2)^2/2 + ${b}*(q2-q3)^2/2 + ${c}*(q3-q1)^2/2\nneutral: [{q1: 1, q2: 1, q3: 1}]`,
        );
        // Jacobi coordinates: x = (q1−q2)/√2, y = (q1+q2−2q3)/√6
        const [x, y] = ['sqrt(2)*q1', '(sqrt(6)*q2/2 - sqrt(2)*q1/2)'];
        const reduced = codim(`hamiltonian: (p1^2+p2^2)/2 + ${a}*(${x})^2/2 + ${b}*(${y})^2/2 + ${c}*(sqrt(6)*q2/2 + sqrt(2)*q1/2)^2/2`);
        expect(chain.inertia).toEqual(reduced.inertia);
        expect(chain.zero?.blocks ?? []).toEqual(reduced.zero?.blocks ?? []);
        expect(chain.zero?.codimension).toEqual(reduced.zero?.codimension);
      }),
      { numRuns: 20 },
    );
  });
});
