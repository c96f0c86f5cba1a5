import { describe, expect, it } from 'vitest';
import { compose, renderSvg, renderText } from '../../src/report/index.ts';
import { within } from '../../src/report/sections/words.ts';
import type { SubgroupSummary, ZeroSummary } from '../../src/study/result.ts';
import { largeInvariants } from './fixtures/large.ts';
import { ringAll, ringBranches, ringCodim, ringReduce } from './fixtures/ring.ts';
import { ringSweep } from './fixtures/sweep.ts';

const words = (text: string): string => text.replace(/\s+/g, ' ');

describe('sections', () => {
  it('stand in the order of a study, whatever the order of the results', () => {
    const ids = compose(ringAll).sections.map((s) => s.id);
    expect(ids).toEqual([
      'model',
      'symmetry',
      'components',
      'classes',
      'zero-event',
      'verdict',
      'spectrum',
      'invariants',
      'hamiltonian',
      'reduced',
      'branches',
    ]);
    expect(compose([...ringAll].reverse()).sections.map((s) => s.id)).toEqual(ids);
  });

  it('put what was asked before what was declared on a terminal', () => {
    const text = renderText(ringCodim);
    expect(text.indexOf('Zero event\n')).toBeLessThan(text.indexOf('Components\n'));
    expect(text.indexOf('Components\n')).toBeLessThan(text.indexOf('Model\n'));
  });

  it('say that there is no zero event', () => {
    const none = { ...ringCodim, zero: null, verdict: { answer: 'no event', parameters: 1, versal: null, because: 'S is nonsingular.' } };
    expect(renderText(none)).toContain('No zero event: S is nonsingular.');
    expect(words(renderText(none))).toContain('The Hessian S is nonsingular: no eigenvalue is at zero.');
  });

  it('name the neutral part', () => {
    const neutral = { ...ringCodim, neutral: { dimension: 4, directions: ['translation of q1', 'translation of q2'] } };
    expect(words(renderText(neutral))).toContain('Continuous symmetries force zeros of total dimension 4');
    expect(words(renderText(neutral))).toContain('Directions: translation of q1; translation of q2.');
  });

  it('gather many classes of subgroups in one table and one picture', async () => {
    const subgroups = Array.from(
      { length: 60 },
      (_, i): SubgroupSummary => ({
        order: 2 ** (i % 3),
        reversing: 0,
        conjugates: 2,
        codimension: 1 + (i % 2),
        motion: 'degenerate',
        coveredBy: i % 3 === 2 ? [] : [i + 1],
      }),
    );
    const result = { ...ringCodim, components: [], zero: { ...(ringCodim.zero as ZeroSummary), subgroups } };
    const text = renderText(result);
    expect(words(text)).toContain('The 60 classes are gathered');
    expect(text.split('\n').filter((line) => /^ +[124] +0 +10 +20 +[12] +degenerate$/.test(line))).toHaveLength(6);
    const svg = (await renderSvg(result))!;
    expect(svg.match(/<title>[124] \(10\): codim [12]<\/title>/g)).toHaveLength(6);
  });

  it('cut lists that nobody reads to the end, and say so', () => {
    const long = { name: 'K1', degree: 12, polynomial: Array.from({ length: 200 }, (_, i) => `q${i}^2`).join(' - ') };
    expect(words(renderText({ ...largeInvariants, generators: [long] }))).toMatch(/K1 12 200 terms, in the JSON result/);
    const generators = Array.from({ length: 400 }, (_, i) => ({ name: `I${i}`, degree: 2, polynomial: `${'q1^2 + '.repeat(9)}q${i}^2` }));
    expect(words(renderText({ ...largeInvariants, generators }))).toMatch(/[0-9]+ further generators are left to the JSON result/);
    expect(within([5, 5, 5], (x) => x, 11)).toEqual([5, 5]);
    expect(within([50], (x) => x, 11)).toEqual([50]);
    expect(within([], () => 1, 0)).toEqual([]);
  });

  it('keep the generators that H is made of', () => {
    const generators = Array.from({ length: 90 }, (_, i) => ({ name: `I${i + 1}`, degree: 2, polynomial: `q${i + 1}^2` }));
    const text = words(
      renderText({ ...largeInvariants, generators, hamiltonian: { expression: 'I1/2 + I77', remainder: '0', degree: 2 } }),
    );
    expect(text).toContain('I77 2 q77^2');
    expect(text).not.toContain('q76^2');
    expect(text).toContain('49 further generators are left to the JSON result');
  });

  it('ask nothing of H where none is studied', () => {
    const text = renderText({ ...ringCodim, command: 'events', zero: undefined, verdict: undefined, events: [] } as never);
    expect(text).not.toMatch(/keeps H|Gradient/);
    expect(renderText(ringCodim)).toMatch(/keeps H/);
  });

  it('tell what a sweep saw against what was predicted', () => {
    const crossing = (ringSweep.crossings as object[])[0]!;
    const sweep = {
      ...ringSweep,
      range: { parameter: 'c', from: '-1', to: '1', steps: 40 },
      followed: true,
      crossings: [
        {
          ...crossing,
          exact: null,
          polynomial: 'c^3 - c + 1',
          digits: '-1.32471795724474602596090885448',
          observed: { motion: 'passes' },
          agrees: false,
          versal: true,
          fold: true,
        },
      ],
      collisions: [
        {
          parameter: 'c',
          at: 0.25,
          kind: 'imaginary',
          value: 1.5,
          components: ["A1'", "E'"],
          motion: 'passes',
          codimension: 1,
          signs: [1, -1],
        },
      ],
      singular: ["E''"],
      ends: ['the branch ends at c = 0.9'],
    };
    const text = words(renderText(sweep, { width: 100 }));
    for (const part of [
      'passes (not as predicted)',
      'turns back',
      '-1.32471795724474602596090885448',
      'c^3 - c + 1',
      '(1, -1)',
      "The block of E'' is singular",
      'the branch ends at c = 0.9',
      'the equilibrium moves and is followed',
    ])
      expect(text).toContain(part);
  });

  it('tell what is open about germ and branches', () => {
    const reduce = {
      ...ringReduce,
      reduced: {
        ...(ringReduce.reduced as object),
        determinedAt: null,
        because: 'not determined up to degree 6: add the term R',
        brackets: ['{u1, u2} = 1'],
        generic: null,
      },
    };
    expect(words(renderText(reduce))).toContain('Not determined up to degree 6: add the term R.');
    expect(renderText(reduce)).toContain('{u1, u2} = 1');
    const branches = { ...ringBranches, undecided: ['isotropy of order 4'], topologicalDegree: { below: 1, above: -2 } };
    expect(words(renderText(branches))).toContain('Indices of the equilibria nearby add up to 1 below and -2 above: they differ');
    expect(renderText(branches)).toContain('isotropy of order 4');
  });
});
