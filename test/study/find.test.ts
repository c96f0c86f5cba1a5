/** `check --find`, end to end: what is declared against what is there. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readModelFile, readModelText } from '../../src/model/declaration/index.ts';
import { checkResult } from '../../src/study/check.ts';
import { type FoundSymmetry, findSymmetry } from '../../src/study/find.ts';
import { isExact, prepare } from '../../src/study/prepare.ts';

function find(declaration: ReturnType<typeof readModelText>): FoundSymmetry {
  const prepared = prepare(declaration);
  if (!isExact(prepared)) throw new Error(prepared.because);
  return findSymmetry(prepared, checkResult(prepared).group.order);
}

const ring = (n: number, bond: (d: string) => string): string =>
  [
    ...Array.from({ length: n }, (_, i) => `p${i + 1}^2/2`),
    ...Array.from({ length: n }, (_, i) => bond(`(q${i + 1} - q${((i + 1) % n) + 1})`)),
  ].join(' + ');
const turn = (n: number) =>
  `symmetry: {generators: [{name: r, map: {${Array.from({ length: n }, (_, i) => `q${((i + 1) % n) + 1}: q${i + 1}`).join(', ')}}}]}`;

describe('rings of resonators', () => {
  it.each([3, 4, 5, 6])('%i of them: C_n declared; D_n, the sign and time found', (n) => {
    const found = find(readModelText(`hamiltonian: ${ring(n, (d) => `${d}^2 + ${d}^4`)}\n${turn(n)}`));
    expect(found).toMatchObject({ declaredOrder: n, order: 8 * n, contains: true, outside: [], degree: 'all', reversing: true });
    expect(found.undeclared.length).toBeGreaterThan(0);
  });
  it('springs with a cubic part: the reflection takes the sign with it, D_n and time', () => {
    expect(find(readModelText(`hamiltonian: ${ring(5, (d) => `${d}^2 + ${d}^3`)}\n${turn(5)}`))).toMatchObject({
      order: 20,
      declaredOrder: 5,
    });
  });
  it('nothing to add to a full declaration', () => {
    const found = find(readModelFile('samples/cubic-cage.yaml'));
    expect(found).toMatchObject({ order: 96, declaredOrder: 96, contains: true, undeclared: [] });
  });
});

describe('what the search respects', () => {
  it('only the identity: a gyroscopic term and a cubic one', () => {
    const found = find(readModelText('hamiltonian: p1^2/2 + p2^2/3 + q1*p2 + q1^2 + q2^2 + q1^3 + q2^3'));
    expect(found).toMatchObject({ order: 1, generators: [], undeclared: [], contains: true, reversing: false });
  });
  it('a rotating frame keeps the quarter turn and reverses time with a mirror', () => {
    const found = find(readModelText('hamiltonian: (p1^2+p2^2)/2 - (q1*p2 - q2*p1)/3 + q1^2 + q2^2 + q1^4 + q2^4'));
    expect(found).toMatchObject({ order: 8, reversing: true });
  });
  it('the equilibrium stays where it is', () => {
    // wells at ±1: about q1 = 1 the sign of q1 is no symmetry
    expect(find(readModelText('hamiltonian: p1^2/2 + (q1^2 - 1)^2\nequilibrium: {q1: 1}')).order).toBe(2);
    expect(find(readModelText('hamiltonian: p1^2/2 + (q1^2 - 1)^2')).order).toBe(4);
    expect(find(readModelText('hamiltonian: (p1^2+p2^2)/2 + (q1^2 - 1)^2 + (q2^2 - 1)^2\nequilibrium: {q1: 1, q2: -1}')).order).toBe(4);
  });
  it('vortices of unequal circulation are told apart by ω', () => {
    const text = (w: number) =>
      `coordinates: [x1, x2]\nmomenta: [y1, y2]\nsymplectic: [[0,0,1,0],[0,0,0,${w}],[-1,0,0,0],[0,${-w},0,0]]\nquadratic: x1^2 + y1^2 + x2^2 + y2^2`;
    // each plane keeps its eight signed permutations, both with the same sign of time: 8·8/2; equal ones are exchanged too
    expect(find(readModelText(text(2))).order).toBe(32);
    expect(find(readModelText(text(1))).order).toBe(64);
    expect(find(readModelText(text(-1))).order).toBe(64);
  });
  it('at these values, and for the whole family', () => {
    const found = find(readModelText('hamiltonian: (p1^2+p2^2)/2 + q1^4 + q2^4 + c*q1\nparameters: {c: 0}\nvary: [c]'));
    expect(found).toMatchObject({ order: 16, familyOrder: 4 });
    expect(found.words).toContain('when c varies');
  });
  it('a declared generator that is no signed permutation is kept and joined', () => {
    const text = (h: string) => `hamiltonian: (p1^2+p2^2)/2 + ${h}\nsymmetry: {group: cyclic:3, action: plane, on: [[q1, q2]]}`;
    // Re z³ has the mirror q2 ↦ −q2 among signed permutations, and time
    const found = find(readModelText(text('q1^3 - 3*q1*q2^2')));
    expect(found).toMatchObject({ signedOrder: 4, order: 12, declaredOrder: 3, contains: true, outside: ['r'] });
    // |z|⁴ has quarter turns too: D12 and time
    expect(find(readModelText(text('(q1^2+q2^2)^2')))).toMatchObject({ signedOrder: 16, order: 48 });
  });
  it('no polynomial: compared to degree 4', () => {
    const found = find(readModelFile('samples/pendulum-ring.yaml'));
    expect(found).toMatchObject({ degree: 4, order: 40, declaredOrder: 20, contains: true });
  });
  it('orders beyond 2⁵³ are texts', () => {
    const n = 20;
    const names = Array.from({ length: n }, (_, i) => i + 1);
    const h = names.map((i) => `p${i}^2/2 + q${i}^3`).join(' + ');
    const factorial = names.reduce((a, b) => a * BigInt(b), 1n);
    expect(find(readModelText(`hamiltonian: ${h}`)).order).toBe((2n * factorial).toString());
  });
});

describe('laws', () => {
  it('what is found passes as a declaration, and then nothing is left to find (fast-check)', () => {
    const coefficient = fc.integer({ min: -1, max: 1 });
    fc.assert(
      fc.property(
        fc.array(coefficient, { minLength: 3, maxLength: 3 }),
        fc.array(coefficient, { minLength: 3, maxLength: 3 }),
        fc.integer({ min: -1, max: 1 }),
        (pairs, cubes, twist) => {
          const terms = [
            ...[1, 2, 3].map((i) => `p${i}^2/2 + q${i}^2 + ${cubes[i - 1]}*q${i}^3`),
            `${pairs[0]}*q1*q2 + ${pairs[1]}*q2*q3 + ${pairs[2]}*q3*q1 + ${twist}*(q1*p2 - q2*p1)`,
          ];
          const model = `hamiltonian: ${terms.join(' + ')}`;
          const found = find(readModelText(model));
          if (found.generators.length === 0) return;
          const generators = found.generators.map(
            (g) => `{name: ${g.name}, ${g.reversing ? 'reversing: true' : 'reversing: false'}${g.map === '' ? '' : `, map: {${g.map}}`}}`,
          );
          const prepared = prepare(readModelText(`${model}\nsymmetry: {generators: [${generators.join(', ')}]}`));
          if (!isExact(prepared)) throw new Error(prepared.because);
          const result = checkResult(prepared);
          expect(result.symmetry.holds).toBe(true);
          expect(result.group.order).toBe(found.order);
          expect(findSymmetry(prepared, result.group.order).undeclared).toEqual([]);
        },
      ),
      { numRuns: 40 },
    );
  });
});
