/** Verdicts, motion, versality, collisions and events where the answer is known by hand or from a source. */
import { describe, expect, it } from 'vitest';
import type { Result } from './support/compare.ts';
import { answer, json, run, words } from './support/program.ts';

const status = async (line: string, input = ''): Promise<number | null> => (await run([...words(line), '--json'], input)).status;

describe.concurrent('worked zero events', () => {
  // Γ and action, S, Jordan blocks, codimension in the class, without symmetry, motion. Orders of magnitude by the
  // partition formulas of D. M. Galin (1975, 1982) and of D. Collingwood, W. McGovern (1993).
  it.each<[string, string, number[], number, number, string]>([
    ['', '0*q1*p1', [1, 1], 3, 3, 'degenerate'],
    ['', 'p1^2', [2], 1, 1, 'splits'],
    ['--group cyclic:3 --on q1,p1', '0*q1', [1, 1], 1, 3, 'passes'],
    ['--group cyclic:7 --on q1,p1', '0*q1', [1, 1], 1, 3, 'passes'],
    ['--group cyclic:2 --on q1,p1', '0*q1', [1, 1], 3, 3, 'degenerate'],
    ['--group dihedral:3 --on q1,p1 --reversing s', '0*q1', [1, 1], 1, 3, 'passes'],
    ['--group dihedral:3 --on q1,q2', 'p1^2+p2^2', [2, 2], 1, 4, 'splits'],
    ['--group cyclic:3 --on q1,q2', 'p1^2+p2^2', [2, 2], 2, 4, 'degenerate'],
    ['--group cyclic:3 --on q1,q2 --time-reversal', 'p1^2+p2^2', [2, 2], 1, 4, 'splits'],
    ['--group dihedral:3 --on q1,q2', '0*q1*q2', [1, 1, 1, 1], 3, 10, 'degenerate'],
    ['--group quaternion --on q1,q2,q3,q4', 'p1^2+p2^2+p3^2+p4^2', [2, 2, 2, 2], 4, 16, 'degenerate'],
    ['--group quaternion --on q1,q2,q3,q4 --time-reversal', 'p1^2+p2^2+p3^2+p4^2', [2, 2, 2, 2], 1, 16, 'splits'],
    ['', 'q1*p2 + p1^2', [4], 2, 2, 'degenerate'],
    ['', 'p1^2 - p2^2', [2, 2], 4, 4, 'degenerate'],
  ])('%s, %s', async (symmetry, s, blocks, codimension, without, motion) => {
    const r = await answer(`codim ${symmetry} --quadratic "${s}"`);
    expect(r.zero).toMatchObject({ blocks, codimension, codimensionWithoutSymmetry: without, motion });
    expect(r.verdict.answer).toBe(codimension === 1 ? 'generic' : 'not generic');
  });
  it('the quaternion group on R^4 with an invariant form: one irreducible passes', async () => {
    const text =
      'coordinates: [a, b]\nmomenta: [c, d]\nsymplectic: [[0, -1, 0, 0], [1, 0, 0, 0], [0, 0, 0, 1], [0, 0, -1, 0]]\nquadratic: 0*a\nsymmetry: {group: quaternion, on: [a, b, c, d]}\n';
    const r = await json('codim -', text);
    expect(r.zero).toMatchObject({ blocks: [1, 1, 1, 1], codimension: 1, codimensionWithoutSymmetry: 10, motion: 'passes' });
  });
});

describe.concurrent('K parameters, versality, statuses', () => {
  it('for K = 2 an event is generic though its motion is degenerate', async () => {
    const line = 'codim --group cyclic:3 --on q1,q2 --quadratic "p1^2+p2^2"';
    const r = await json(`${line} --parameters 2`);
    expect([r.verdict.answer, r.zero.motion, r.verdict.parameters]).toEqual(['generic', 'degenerate', 2]);
    expect(await status(line)).toBe(1);
    expect(await status(`${line} --parameters 1`)).toBe(1);
  });
  it('two parameters that unfold [4], and two that do not', async () => {
    // H = q1 p2 + p1^2/2 + ...: normal space of the [4] block is spanned by two quadratics; a q2^2 and b q1 q2... by rank
    const good = await json('codim --quadratic "q1*p2 + p1^2/2 + a*q2^2 + b*q1*q2 + c*q1^2" --set a=0,b=0,c=0 --vary a,b,c --parameters 2');
    expect([good.zero.blocks, good.verdict.answer]).toEqual([[4], 'generic']);
    const bad = await json('codim --quadratic "q1*p2 + p1^2/2 + a*p1^2 + b*p1*p2" --set a=0,b=0 --vary a,b');
    expect([bad.verdict.answer, bad.verdict.versal]).toEqual(['generic', false]);
  });
  it('versal is null where nothing varies, false where the parameter misses the event; status unchanged', async () => {
    const c3 = (more: string) =>
      `codim --group cyclic:3 --on q1,p1 --hamiltonian "mu*(q1^2+p1^2)/2 + nu*(q1^2+p1^2)^2" --set mu=0,nu=1 ${more}`;
    expect((await json(c3(''))).verdict).toMatchObject({ answer: 'generic', versal: null });
    expect((await json(c3('--vary mu'))).verdict).toMatchObject({ answer: 'generic', versal: true });
    expect((await json(c3('--vary nu'))).verdict).toMatchObject({ answer: 'generic', versal: false });
    expect((await json(c3('--vary mu,nu'))).verdict).toMatchObject({ answer: 'generic', parameters: 2, versal: true });
  });
  it('fold: versal by the cubic term; transcritical and pitchfork along the declared branch', async () => {
    const fold = await json('codim --hamiltonian "p1^2/2 + q1^3/3 - m*q1" --set m=0 --vary m');
    expect(fold.verdict).toMatchObject({ answer: 'generic', versal: true });
    // no cubic term: the cusp has codimension 2, one parameter cannot do
    const cusp = await json('codim --hamiltonian "p1^2/2 + q1^4 - m*q1" --set m=0 --vary m');
    expect(cusp.verdict.versal).toBe(false);
    const two = await json('codim --hamiltonian "p1^2/2 + q1^4 - m*q1 + n*q1^2" --set m=0,n=0 --vary m,n');
    expect(two.verdict).toMatchObject({ answer: 'generic', versal: true });
    const transcritical = await json('codim --hamiltonian "p1^2/2 + q1^3/3 - m*q1^2/2" --set m=0 --vary m');
    expect(transcritical.verdict.versal).toBe(true);
    expect(JSON.stringify(transcritical.verdict)).toMatch(/branch/);
    const pitchfork = await json('codim --group reflection --on q1 --hamiltonian "p1^2/2 + q1^4 - m*q1^2/2" --set m=0 --vary m');
    expect(pitchfork.verdict).toMatchObject({ answer: 'generic', versal: true });
  });
  it('no event, whatever collides', async () => {
    const r = await json('codim --quadratic "(q1^2+p1^2)/2 + (q2^2+p2^2)/2"');
    expect([r.zero, r.verdict.answer, r.collisions.length]).toEqual([null, 'no event', 1]);
  });
});

describe.concurrent('collisions', () => {
  const at = (r: Result, kind: string): Result => r.collisions.find((c: Result) => c.kind === kind);
  it('two equal oscillators: definite 3, nilpotent 1, same with a sign 3 (D. M. Galin)', async () => {
    const definite = await json('codim --quadratic "(q1^2+p1^2)/2 + (q2^2+p2^2)/2"');
    expect(at(definite, 'imaginary')).toMatchObject({
      value: 1,
      multiplicity: 2,
      blocks: [1, 1],
      codimension: 3,
      codimensionWithoutSymmetry: 3,
      motion: 'degenerate',
    });
    const mixed = await json('codim --quadratic "(q1^2+p1^2)/2 - (q2^2+p2^2)/2"');
    expect(at(mixed, 'imaginary')).toMatchObject({ value: 1, multiplicity: 2, codimension: 3 });
    // q1 p2 − q2 p1 + (q1^2 + q2^2)/2: a nilpotent part at ±i
    const nilpotent = await json('codim --quadratic "q1*p2 - q2*p1 + (q1^2+q2^2)/2"');
    expect(at(nilpotent, 'imaginary')).toMatchObject({ value: 1, multiplicity: 2, blocks: [2], codimension: 1, motion: 'splits' });
  });
  it('real pairs and quadruples', async () => {
    const real = await json('codim --quadratic "2*q1*p1 + 2*q2*p2 + q1*p2"');
    expect(at(real, 'real')).toMatchObject({ value: 2, multiplicity: 2, blocks: [2], codimension: 1, motion: 'splits' });
    const twice = await json('codim --quadratic "q1*p1 + q2*p2"');
    expect(at(twice, 'real')).toMatchObject({ value: 1, codimension: 3 });
    // rates 1 ± i in two copies
    const quadruple = await json('codim --quadratic "q1*p1 + q2*p2 + q1*p2 - q2*p1 + q3*p3 + q4*p4 + q3*p4 - q4*p3"');
    expect(at(quadruple, 'quadruple')).toMatchObject({ multiplicity: 2, blocks: [1, 1], codimension: 6 });
    expect(at(quadruple, 'quadruple').value.map((x: number) => Math.round(x * 1e9) / 1e9)).toEqual([1, 1]);
    const generic = await json('codim --quadratic "q1*p1 + q2*p2 + q1*p2 - q2*p1"');
    expect(generic.collisions).toEqual([]);
  });
  it('two different irreducibles at one frequency cost 1 and pass', async () => {
    const r = await json('codim --group reflection --on q1 --quadratic "(q1^2+p1^2)/2 + (q2^2+p2^2)/2"');
    expect(at(r, 'imaginary')).toMatchObject({ codimension: 1, motion: 'passes', multiplicity: 2 });
    expect(at(r, 'imaginary').components).toHaveLength(2);
  });
  it('an E mode of a group is no collision', async () => {
    const r = await json('codim --group dihedral:3 --on q1,q2 --quadratic "(q1^2+p1^2)/2 + (q2^2+p2^2)/2"');
    expect(r.collisions).toEqual([]);
  });
  it('complex type: V and its conjugate pass, whatever the signs; the definite class 7 case costs 2', async () => {
    const c3 = await json('codim --group cyclic:3 --on q1,q2 --quadratic "(q1^2+p1^2)/2 + (q2^2+p2^2)/2"');
    expect(at(c3, 'imaginary')).toMatchObject({ codimension: 1, motion: 'passes' });
    const seven = await json('codim --group dihedral:3 --on q1,p1 --on q2,p2 --reversing s --quadratic "(q1^2+p1^2)/2 + (q2^2+p2^2)/2"');
    expect(at(seven, 'imaginary')).toMatchObject({ codimension: 2 });
  });
  it('simple real pairs on a component that carries a form cost s(K)', async () => {
    // hyperbolic on the complex irreducible of C4: needs two copies with opposite signs; u(1,1) with eigenvalues ±1
    const r = await json('codim --group cyclic:4 --on q1,q2 --quadratic "q1*p1 + q2*p2"');
    expect(at(r, 'real')).toMatchObject({ value: 1, codimension: 1 });
  });
});

describe.concurrent('events', () => {
  const list = (r: Result): string[] => r.events.map((e: Result) => `${e.codimension} ${e.blocks.join('+')} ${e.motion}`).sort();
  it('no symmetry, codimension up to 2: [2] twice, [4] twice (D. M. Galin)', async () => {
    const r = await json('events --coordinates q1,q2,q3 --momenta p1,p2,p3');
    expect(list(r)).toEqual(['1 2 splits', '1 2 splits', '2 4 degenerate', '2 4 degenerate']);
  });
  it('codimension up to 4 adds 1+1, [6], [2,2] of three signatures and [8]', async () => {
    const r = await json('events --coordinates q1,q2,q3,q4 --momenta p1,p2,p3,p4 --codimension 4');
    expect(list(r)).toEqual(
      [
        '1 2 splits',
        '1 2 splits',
        '2 4 degenerate',
        '2 4 degenerate',
        '3 1+1 degenerate',
        '3 6 degenerate',
        '3 6 degenerate',
        '4 2+2 degenerate',
        '4 2+2 degenerate',
        '4 2+2 degenerate',
        '4 8 degenerate',
        '4 8 degenerate',
      ].sort(),
    );
  });
  it('one degree of freedom has room for [2] and 1+1 only', async () => {
    const r = await json('events --coordinates q --momenta p --codimension 9');
    expect(list(r)).toEqual(['1 2 splits', '1 2 splits', '3 1+1 degenerate']);
  });
  it('C3 on the plane (q, p): the pair passes; the sign of the energy is that of the form', async () => {
    const r = await json('events --group cyclic:3 --on q1,p1 --codimension 5');
    expect(list(r)).toEqual(['1 1+1 passes']);
  });
  it('C3 on R^4: [1] of either sign, [2] of either, both at once', async () => {
    // u(1,1): [1] on a definite line of either sign costs 1, [1,1] 4, [2] of two signs 2
    const r = await json('events --group cyclic:3 --on q1,q2 --codimension 4');
    expect(list(r)).toEqual(['1 1+1 passes', '1 1+1 passes', '2 2+2 degenerate', '2 2+2 degenerate', '4 1+1+1+1 degenerate']);
  });
});
