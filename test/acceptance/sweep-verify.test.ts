/** sweep on families whose crossings are known by hand; verify on results that were altered. */
import { describe, expect, it } from 'vitest';
import type { Result } from './support/compare.ts';
import { json, refusal, run, scratch, words } from './support/program.ts';

const { write } = scratch();
const brief = (r: Result): string[] =>
  r.crossings.map(
    (c: Result) =>
      `${c.exact ?? Math.round(c.value * 1e9) / 1e9} ${c.kernel} ${c.motion} ${c.inertiaBefore.negative}->${c.inertiaAfter.negative}`,
  );

describe.concurrent('sweep', () => {
  it.each<[string, string, string[]]>([
    ['C3 on (q, p) passes', '--group cyclic:3 --on q1,p1 --quadratic "mu*(q1^2+p1^2)/2" --range mu=-1:1', ['0 2 passes 2->0']],
    [
      'D3 oscillator splits',
      '--group dihedral:3 --on q1,q2 --quadratic "(p1^2+p2^2)/2 + mu*(q1^2+q2^2)/2" --range mu=-1:1',
      ['0 2 splits 2->0'],
    ],
    ['surds', '--quadratic "p1^2/2 + (k^2-2)*q1^2/2" --range k=-2:2', ['-sqrt(2) 1 splits 0->1', 'sqrt(2) 1 splits 1->0']],
    ['a cube root has no exact form', '--quadratic "p1^2/2 + (k^3-2)*q1^2/2" --range k=-2:2', ['1.25992105 1 splits 1->0']],
    ['no crossing', '--quadratic "p1^2/2 + (k^2+1)*q1^2/2" --range k=-2:2', []],
    ['a touch does not change the inertia', '--quadratic "p1^2/2 + (k-1)^2*q1^2/2" --range k=-2:2', ['1 1 splits 0->0']],
  ])('%s', async (_name, line, expected) => {
    expect(brief(await json(`sweep ${line}`))).toEqual(expected);
  });
  it('two frequencies of one component that agree are not of codimension 1', async () => {
    const r = await json('sweep --quadratic "(p1^2+p2^2)/2 + (1+k)*q1^2/2 + (1-k)*q2^2/2" --range k=-1/2:1/2');
    // S = 1 at k = 0: definite, codimension 3 (D. M. Galin)
    for (const c of r.collisions) expect(c.codimension).not.toBe(1);
  });
  it('the range of the file, overridden by --range; wrong ranges', async () => {
    const model =
      'coordinates: [q]\nmomenta: [p]\nparameters: {k: 0}\nvary: [k]\nrange: {k: [-1, 1]}\nquadratic: p^2/2 + (k^2 - 1/4)*q^2/2\n';
    expect(brief(await json('sweep -', model))).toEqual(['-1/2 1 splits 0->1', '1/2 1 splits 1->0']);
    expect(brief(await json('sweep - --range k=0:1', model))).toEqual(['1/2 1 splits 1->0']);
    for (const range of ['k=1:0', 'k=0', 'k=0:1:0', 'k=0:1:2:3', 'z=0:1', 'k=0:x', '=0:1', 'k=0:0'])
      await refusal(['sweep', '-', '--range', range], model);
    await refusal('sweep --quadratic "p1^2 + k*q1^2" --vary k');
  });
});

describe.concurrent('verify', () => {
  it('agrees with what it is given, and finds each number that was altered', async () => {
    const got = await run(words('codim samples/three-resonator-ring.yaml --json'));
    const same = await run(['verify', write('same.json', got.stdout)]);
    expect([same.status, same.stderr]).toEqual([0, '']);
    const alterations: [string, string][] = [
      ['"codimension": 1', '"codimension": 2'],
      ['[2, 2]', '[2, 1, 1]'],
      ['"codimensionWithoutSymmetry": 4', '"codimensionWithoutSymmetry": 3'],
      ['"multiplicity": 1', '"multiplicity": 2'],
      ['"versal": true', '"versal": false'],
      ['"carriesForm": false', '"carriesForm": true'],
    ];
    for (const [k, [from, to]] of alterations.entries()) {
      expect(got.stdout).toContain(from);
      const other = await run(['verify', write(`other${k}.json`, got.stdout.replace(from, to))]);
      expect([from, other.status]).toEqual([from, 1]);
    }
  });
  it('what is no result', async () => {
    await refusal(['verify', write('half.json', '{')]);
    await refusal(['verify', write('list.json', '[]')]);
    await refusal(['verify', write('bare.json', '{"schema": "symcodim/1", "command": "codim"}')]);
    expect(await refusal('verify none.json')).toContain('none.json');
    await refusal('verify');
  });
});
