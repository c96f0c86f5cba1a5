/** Spectra, collisions and stability of whole models, each with the published source of its numbers. */
import { describe, expect, it } from 'vitest';
import { type Declaration, readModelFile, readModelText } from '../../src/model/declaration/index.ts';
import type { CodimResult } from '../../src/study/result.ts';
import { stabilityWords } from '../../src/study/spectrum.ts';
import { study } from '../../src/study/study.ts';

const codim = async (d: Declaration) => (await study('codim', d)).result as CodimResult;
const text = (yaml: string) => codim(readModelText(yaml, 'model.yaml'));
const sample = (name: string) => readModelFile(new URL(`../../samples/${name}`, import.meta.url).pathname);
const PLANAR = 'coordinates: [q1, q2]\nmomenta: [p1, p2]\n';

describe('Hill’s lunar problem at L1 (C. D. Murray, S. F. Dermott, Solar System Dynamics, 1999, ch. 3, from memory)', () => {
  it('eigenvalues ±√(1 + 2√7) and ±i√(2√7 − 1)', async () => {
    const r = await text(
      `${PLANAR}hamiltonian: (p1^2+p2^2)/2 + q2*p1 - q1*p2 - q1^2 + q2^2/2 - 1/sqrt(q1^2+q2^2)\nequilibrium: {q1: 3^(-1/3), p2: 3^(-1/3)}\n`,
    );
    expect(r.arithmetic).toBe('floating');
    expect(r.verdict.answer).toBe('no event');
    expect(r.spectrum).toHaveLength(2);
    expect(r.spectrum![0]).toMatchObject({ re: 0, im: expect.closeTo(2.071594224, 8) });
    expect(r.spectrum![1]).toMatchObject({ re: expect.closeTo(2.508286789, 8), im: 0 });
    expect(r.stability).toMatch(/^The Hessian is indefinite.*Unstable: 1 eigenvalue has/);
    expect(r.collisions).toEqual([]);
  });
});

describe('the isotropic planar oscillator (quadratic part of M. Hénon, C. Heiles 1964)', () => {
  const H = `${PLANAR}hamiltonian: (p1^2+p2^2+q1^2+q2^2)/2\n`;
  it.each([
    ['no symmetry', '', 3, 'degenerate'],
    ['C3', 'symmetry: {group: cyclic:3, on: [[q1, q2]]}\n', 1, 'passes'],
    ['a mirror', 'symmetry: {generators: [{name: s, map: {q2: -q2}}]}\n', 1, 'passes'],
    ['D3', 'symmetry: {group: dihedral:3, on: [[q1, q2]]}\n', 0, ''],
  ] as const)('%s: exact and floating', async (_, symmetry, codimension, motion) => {
    for (const more of ['', 'numbers: floating\n']) {
      const r = await text(H + symmetry + more);
      if (codimension === 0) expect(r.collisions).toEqual([]);
      else
        expect(r.collisions).toMatchObject([
          {
            kind: 'imaginary',
            value: expect.closeTo(1, 12),
            multiplicity: 2,
            blocks: [1, 1],
            signature: [2, 0],
            codimension,
            codimensionWithoutSymmetry: 3,
            motion,
          },
        ]);
      expect(r.stability).toMatch(/nonlinearly stable by the energy criterion/);
    }
  });
});

describe('Thomson’s heptagon (T. H. Havelock 1931)', () => {
  it('±3i and ±√5 i are listed as collisions of codimension 1, with the word that more than the symmetry may force them', async () => {
    const r = await codim(sample('vortex-heptagon.yaml'));
    expect(r.collisions.map((c) => [c.exact, c.multiplicity, c.codimension, c.motion])).toEqual([
      ['sqrt(5)', 2, 1, 'passes'],
      ['3', 2, 1, 'passes'],
    ]);
    expect(r.stability).toMatch(/more than the declared symmetry/);
  });
});

describe('gyroscopic systems', () => {
  const shaft = (k: string, w: string, more = '') =>
    text(
      `${PLANAR}parameters: {k: ${k}, w: ${w}}\nhamiltonian: (p1^2+p2^2)/2 + k*(q1^2+q2^2)/2 - w*(q1*p2 - q2*p1)\nsymmetry: {group: cyclic:5, on: [[q1, q2]]}\n${more}`,
    );
  it('Foucault’s pendulum: iω on V meets iω on its conjugate at w = 0 and passes', async () => {
    for (const more of ['', 'numbers: floating\n']) {
      const r = await shaft('1', '0', more);
      expect(r.collisions).toMatchObject([{ codimension: 1, motion: 'passes', signature: [2, 0], multiplicity: 2 }]);
    }
  });
  it('frequencies |√k ± w| of the rotating-frame oscillator; beyond w² = k modes of both signs', async () => {
    const r = await shaft('1', '2');
    expect(r.spectrum!.map((e) => [e.im, e.krein])).toEqual([
      [expect.closeTo(1, 12), [0, 1]],
      [expect.closeTo(3, 12), [1, 0]],
    ]);
    expect(r.stability).toMatch(/indefinite.*Spectrally stable.*both Krein signs/);
  });
  it('k = 0: a double −iw on V with a block of size 2 splits, and grows like time', async () => {
    for (const more of ['', 'numbers: floating\n']) {
      const r = await shaft('0', '1', more);
      expect(r.collisions).toMatchObject([{ blocks: [2], codimension: 1, motion: 'splits', signature: [1, 1] }]);
      expect(r.stability).toMatch(/Jordan blocks off zero/);
    }
  });
  it('k < 0 without rotation: a real pair on V and its conjugate, two unstable directions', async () => {
    const r = await shaft('-1', '0');
    expect(r.collisions).toMatchObject([{ kind: 'real', value: 1, codimension: 1, motion: 'passes' }]);
    expect(r.stability).toMatch(/Unstable: 2 eigenvalues/);
  });
  it('k < 0 with slow rotation: a quadruple, nothing collides', async () => {
    for (const more of ['', 'numbers: floating\n']) {
      const r = await shaft('-1', '1/2', more);
      expect(r.collisions).toEqual([]);
      expect(r.spectrum).toMatchObject([{ re: expect.closeTo(1, 10), im: expect.closeTo(0.5, 10), multiplicity: 1 }]);
      expect(r.stability).toMatch(/Unstable: 2 eigenvalues/);
    }
  });
});

describe('stability in words', () => {
  const facts = { inertia: { positive: 2, zero: 0, negative: 0 }, zeroSizes: [], spectrum: [], collisions: [], neutral: 0, complete: true };
  it('definite, on a slice, vanishing, nothing at all, and open', () => {
    expect(stabilityWords({ ...facts, inertia: { positive: 0, zero: 0, negative: 2 } })).toMatch(/negative definite/);
    expect(stabilityWords({ ...facts, neutral: 2 })).toMatch(/symplectic slice.*modulo its continuous symmetry/);
    expect(stabilityWords({ ...facts, inertia: { positive: 0, zero: 2, negative: 0 } })).toMatch(/vanishes/);
    expect(stabilityWords({ ...facts, inertia: { positive: 0, zero: 0, negative: 0 } })).toMatch(/Nothing moves/);
    expect(stabilityWords({ ...facts, complete: false })).toMatch(/open/);
  });
});
