/** An example of each command through the public surface; each shows how the function is called. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
  branches,
  check,
  codim,
  components,
  declareFile,
  declareObject,
  declareOptions,
  declareText,
  events,
  groups,
  InputError,
  invariants,
  reduce,
  renderHtml,
  renderLatex,
  renderMarkdown,
  renderSvg,
  renderText,
  report,
  sweep,
  UsageError,
  verify,
} from '../../src/index.ts';

const sample = (name: string) => new URL(`../../samples/${name}.yaml`, import.meta.url).pathname;
const ring = () => declareFile(sample('three-resonator-ring'));

describe('declarations', () => {
  it('from a file, a text, an object and options are the same model', async () => {
    const text =
      'coordinates: [q]\nmomenta: [p]\nparameters: {mu: 0}\nvary: [mu]\nquadratic: mu*(q^2+p^2)/2\nsymmetry: {group: cyclic:3, on: [[q, p]]}\n';
    const object = {
      coordinates: ['q'],
      momenta: ['p'],
      parameters: { mu: 0 },
      vary: ['mu'],
      quadratic: 'mu*(q^2+p^2)/2',
      symmetry: { group: 'cyclic:3', on: [['q', 'p']] },
    };
    const options = { group: 'cyclic:3', on: [['q', 'p']], quadratic: 'mu*(q^2+p^2)/2', set: { mu: 0 }, vary: ['mu'] };
    for (const declaration of [declareText(text), declareObject(object), declareOptions(options)]) {
      const result = await codim(declaration);
      expect(result.zero).toMatchObject({ kernel: 2, blocks: [1, 1], codimension: 1, motion: 'passes' });
    }
  });

  it('settings go over the file', async () => {
    expect((await codim(declareFile(sample('three-resonator-ring'), { set: { c: '1/7' } }))).verdict.answer).toBe('no event');
    expect(() => declareFile(sample('three-resonator-ring'), { set: { d: 1 } })).toThrow(UsageError);
    expect(() => declareText('coordinates: [q]\ncolour: red\n')).toThrow(InputError);
  });
});

describe('commands', () => {
  it('check', async () => {
    const result = await check(ring());
    expect([result.equilibrium.holds, result.symmetry.holds, result.group.order]).toEqual([true, true, 12]);
  });
  it('components', async () => {
    expect((await components(ring())).components.map((c) => c.dimension)).toEqual([1, 1, 2, 2]);
  });
  it('codim', async () => {
    const result = await codim(ring());
    expect(result.zero).toMatchObject({ kernel: 2, blocks: [2, 2], codimension: 1, codimensionWithoutSymmetry: 4, motion: 'splits' });
    expect(result.verdict).toMatchObject({ answer: 'generic', versal: true });
  });
  it('events', async () => {
    const result = await events(declareOptions({ group: 'dihedral:3', on: [['q1', 'q2']], codimension: 1 }));
    expect(result.events.every((e) => e.codimension <= 1)).toBe(true);
    expect(result.events.length).toBeGreaterThan(0);
  });
  it('invariants', async () => {
    const result = await invariants(declareFile(sample('three-resonator-ring'), { degree: 2 }));
    expect(result.generators.length).toBeGreaterThan(0);
  });
  it('reduce', async () => {
    expect((await reduce(ring())).reduced).toMatchObject({ leadingDegree: 4 });
  });
  it('branches', async () => {
    expect((await branches(ring())).branches.length).toBeGreaterThan(0);
  });
  it('sweep', async () => {
    const told: number[] = [];
    const result = await sweep(declareFile(sample('three-resonator-ring'), { range: { c: [-1, 1, 40] } }), {
      progress: (share) => told.push(share),
    });
    expect(result.crossings).toMatchObject([{ exact: '-1/3', component: 'E1', motion: 'splits', observed: { motion: 'splits' } }]);
    expect(told.at(-1)).toBe(1);
    expect(told).toEqual([...told].sort((a, b) => a - b));
  });
  it('report', async () => {
    const { stages } = await report(ring());
    expect(stages.map((s) => s.command)).toContain('codim');
    expect(await renderMarkdown(stages)).toContain('Three resonators on a ring');
  });
  it('verify', async () => {
    const text = JSON.stringify(await codim(ring()));
    expect((await verify(text)).agrees).toBe(true);
    expect((await verify(text.replace('"codimension":1', '"codimension":2'))).disagreements.length).toBeGreaterThan(0);
  });
  it('groups', async () => {
    expect(await groups('dihedral:5')).toMatchObject({ schema: 'symcodim/1', command: 'groups' });
  });
});

describe('renderers', () => {
  it('make every kind of document of a result', async () => {
    const result = await sweep(ring());
    expect(await renderText(result, { width: 80 })).toContain('-1/3');
    expect(await renderLatex(result)).toContain('\\begin{document}');
    expect(await renderLatex(result, { fragment: true })).not.toContain('\\begin{document}');
    expect(await renderHtml(result)).toMatch(/^<!doctype html>/i);
    expect(await renderSvg(result)).toContain('<svg');
  });
});

describe('surface', () => {
  it('the example in its module comment is that of a file that is there', () => {
    const text = readFileSync(new URL('../../src/index.ts', import.meta.url), 'utf8');
    expect(text).toContain("from 'symcodim'");
    expect(text).not.toMatch(/\bprocess\./);
  });
});
