/** Results of every command on the samples: they keep to the schema, and to what any such result must satisfy. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';
import type { Result } from './support/compare.ts';
import { components, faults, json, root, run, validModel, validResult } from './support/program.ts';

const SMALL = [
  'three-resonator-ring',
  'turntable-bead',
  'pull-in-fold',
  'quaternion-oscillator',
  'square-lattice-cell',
  'strut-on-foundation',
  'whirling-shaft',
];
const file = (sample: string): string => `samples/${sample}.yaml`;
const sum = (list: Result[], f: (x: Result) => number): number => list.reduce((s, x) => s + f(x), 0);
const beta: Record<string, number> = { real: 1, complex: 2, quaternionic: 4 };

async function ask(command: string, sample: string, status: number[] = [0]): Promise<Result> {
  const got = await run([command, file(sample), '--json']);
  expect(status, `${command} ${sample}: ${got.stderr}`).toContain(got.status);
  const r = JSON.parse(got.stdout);
  validResult(r);
  expect(faults(validResult), `${command} ${sample}`).toBe('');
  expect([r.schema, r.command]).toEqual(['symcodim/1', command]);
  return r;
}

function codimLaws(r: Result): void {
  const n = 2 * r.model.degreesOfFreedom - r.neutral.dimension;
  expect(r.inertia.positive + r.inertia.zero + r.inertia.negative).toBe(n);
  expect(sum(r.components, (c) => c.multiplicity * c.dimension)).toBe(2 * r.model.degreesOfFreedom);
  expect(new Set(r.components.map((c: Result) => c.label)).size).toBe(r.components.length);
  expect(r.inertia.zero).toBe(r.zero?.kernel ?? 0);
  if (r.zero === null) {
    expect(r.verdict.answer).toBe('no event');
    return;
  }
  const z = r.zero;
  expect(sum(z.blocks, (b) => b)).toBe(z.dimension);
  expect(z.blocks.length).toBe(z.kernel);
  expect([...z.blocks].sort((a: number, b: number) => b - a)).toEqual(z.blocks);
  expect(z.semisimple).toBe(z.blocks.every((b: number) => b === 1));
  expect(z.codimension).toBeLessThanOrEqual(z.codimensionWithoutSymmetry);
  const whole = z.subgroups.filter((s: Result) => s.order === r.group.order);
  expect(whole).toMatchObject([{ reversing: r.group.reversing, conjugates: 1, codimension: z.codimension, motion: z.motion }]);
  expect(z.subgroups.filter((s: Result) => s.order === 1)).toMatchObject([
    { reversing: 0, conjugates: 1, codimension: z.codimensionWithoutSymmetry },
  ]);
  const orders = z.subgroups.map((s: Result) => s.order);
  expect([...orders].sort((a: number, b: number) => a - b)).toEqual(orders);
  for (const s of z.subgroups) {
    expect(r.group.order % s.order).toBe(0);
    expect(s.codimension).toBeLessThanOrEqual(z.codimensionWithoutSymmetry);
    expect(s.reversing === 0 || 2 * s.reversing === s.order).toBe(true);
    expect(s.motion !== 'degenerate').toBe(s.codimension === 1);
  }
  expect(z.motion !== 'degenerate').toBe(z.codimension === 1);
  if (z.motion === 'passes') expect(z.semisimple).toBe(true);
  if (z.motion === 'splits') expect(z.blocks.every((b: number) => b === 2)).toBe(true);
  if (r.verdict.answer !== 'undecided') expect(r.verdict.answer === 'generic').toBe(z.codimension <= r.verdict.parameters);
  expect(r.verdict.versal === null).toBe(r.model.vary.length === 0);
  if (r.verdict.versal) expect(z.codimension).toBeLessThanOrEqual(r.model.vary.length);
  for (const c of r.collisions) expect(c.codimension).toBeGreaterThanOrEqual(1);
}

describe.concurrent.each(SMALL)('%s', (sample) => {
  it('is a model by the schema of model files', () => {
    validModel(parse(readFileSync(join(root, file(sample)), 'utf8')));
    expect(faults(validModel)).toBe('');
  });
  it('check, codim, components', async () => {
    const check = await ask('check', sample);
    expect([check.equilibrium.holds, check.symmetry.holds]).toEqual([true, true]);
    const codim = await ask('codim', sample);
    codimLaws(codim);
    expect(codim.group).toEqual(expect.objectContaining({ order: check.group.order, reversing: check.group.reversing }));
    const r = await ask('components', sample);
    expect(components(r)).toEqual(components(codim));
    const labels = new Set(r.components.map((c: Result) => c.label));
    for (const k of r.classes) for (const label of k.components) expect(labels).toContain(label);
    // every component in one class; dim P from the multiplicities, m + β m(m−1)/2 each
    expect(r.classes.flatMap((k: Result) => k.components).sort()).toEqual([...labels].sort());
    expect(sum(r.classes, (k) => k.dimensionOfClass)).toBe(
      sum(r.components, (c) => c.multiplicity + (beta[c.type]! * c.multiplicity * (c.multiplicity - 1)) / 2),
    );
  });
  it('events: needs no H, sorted, every event of codimension 1 passes or splits', async () => {
    const r = await ask('events', sample);
    for (const e of r.events) {
      expect(e.codimension).toBeLessThanOrEqual(2);
      expect(sum(e.blocks, (b) => b)).toBe(e.dimension);
      expect(e.blocks.length).toBe(e.kernel);
      expect(e.motion !== 'degenerate').toBe(e.codimension === 1);
    }
    const order = r.events.map((e: Result) => e.codimension);
    expect([...order].sort()).toEqual(order);
  });
  it('invariants: the Molien series is the series of its rational function; generators are of its degrees', async () => {
    const r = await ask('invariants', sample);
    // multiply the series by the denominator and compare with the numerator
    const { numerator, denominator, series } = r.molien;
    let product: number[] = series.slice();
    for (const d of denominator) product = product.map((x, i) => x - (i >= d ? product[i - d]! : 0));
    expect(product.slice(0, numerator.length + 1)).toEqual([...numerator, 0].slice(0, product.length));
    expect(series[0]).toBe(1);
    const degrees = r.generators.map((g: Result) => g.degree);
    // the number of generators of the least positive degree is the coefficient there
    const least = Math.min(...degrees);
    expect(degrees.filter((d: number) => d === least).length).toBe(series[least]);
    expect(r.hamiltonian.remainder).toBe('0');
  });
  it('reduce and branches', async () => {
    const r = await ask('reduce', sample);
    if (r.reduced.codimension !== null && r.reduced.moduli !== null)
      expect(r.reduced.stratumCodimension).toBe(r.reduced.codimension - r.reduced.moduli);
    const b = await ask('branches', sample);
    for (const i of b.isotropy) expect(b.group.order % i.order).toBe(0);
    for (const x of b.branches) {
      expect(b.isotropy.some((i: Result) => i.order === x.isotropyOrder)).toBe(true);
      expect(x.copies).toBeGreaterThan(0);
    }
  });
  it('sweep', async () => {
    const r = await ask('sweep', sample);
    for (const c of r.crossings) {
      expect(c.inertiaBefore.positive + c.inertiaBefore.zero + c.inertiaBefore.negative).toBe(
        c.inertiaAfter.positive + c.inertiaAfter.zero + c.inertiaAfter.negative,
      );
      if (c.exact !== null) expect(typeof c.exact).toBe('string');
    }
  });
});

describe.concurrent('larger samples', () => {
  it('heptagon of vortices: codimension 3 with the rotation, 2 in the slice (T. H. Havelock 1931)', async () => {
    const whole = await ask('codim', 'vortex-heptagon', [1]);
    codimLaws(whole);
    expect(whole.group).toMatchObject({ order: 14, reversing: 7 });
    expect(whole.zero).toMatchObject({ dimension: 6, blocks: [2, 2, 2], codimension: 3 });
    expect(whole.arithmetic).toBe('exact');
    const slice = await ask('codim', 'vortex-heptagon-slice', [1]);
    codimLaws(slice);
    expect(slice.neutral.dimension).toBe(2);
    expect(slice.zero).toMatchObject({ dimension: 4, blocks: [2, 2], codimension: 2 });
    expect([slice.verdict.answer, slice.verdict.versal]).toEqual(['not generic', null]);
    expect(slice.verdict.because).toMatch(/symmetry/);
    // the translations seen in the rotating frame turn with it: ±3i once more
    const values = slice.collisions.map((c: Result) => c.value as number);
    for (const v of values) expect(typeof v).toBe('number');
  });
  it('benzene: D6h, 36 coordinates as in G. Herzberg, Infrared and Raman Spectra (1945), from memory', async () => {
    const r = await ask('codim', 'benzene', [1]);
    codimLaws(r);
    expect(r.group.order).toBe(24);
    // Γ = 2A1g + 2A2g + 2B2g + E1g + 4E2g + 2A2u + 2B1u + 2B2u + 4E1u + 2E2u less the doubled gerade ones of z: by dimension
    expect(sum(r.components, (c) => c.dimension * c.multiplicity)).toBe(72);
  });
  it('report --json and groups --json', async () => {
    const got = await run(['report', file('three-resonator-ring'), '--json']);
    const r = JSON.parse(got.stdout);
    validResult(r);
    expect([got.status, faults(validResult), r.command]).toEqual([0, '', 'report']);
    const g = await json(['groups', 'dihedral:5']);
    expect([g.command, g.group.order]).toEqual(['groups', 10]);
    const q = await json(['groups', 'binary-icosahedral']);
    expect(q.group.order).toBe(120);
  });
});

describe.concurrent('documents and streams', () => {
  it('report without a format prints Markdown; FILE - is standard output', async () => {
    const plain = await run(['report', file('square-lattice-cell')]);
    expect([plain.status, plain.stdout.startsWith('#')]).toEqual([0, true]);
    const latex = await run(['codim', file('square-lattice-cell'), '--latex', '-']);
    expect(latex.stdout).toMatch(/\\documentclass[\s\S]*\\end\{document\}\s*$/);
    const fragment = await run(['codim', file('square-lattice-cell'), '--latex', '-', '--fragment']);
    expect(fragment.stdout).not.toMatch(/\\documentclass|\\begin\{document\}/);
    const html = await run(['codim', file('square-lattice-cell'), '--html', '-']);
    expect(html.stdout).toMatch(/^<!doctype html>[\s\S]*<\/html>\s*$/i);
    expect(html.stdout).not.toMatch(/(src|href)="https?:/);
    const svg = await run(['codim', file('square-lattice-cell'), '--svg', '-']);
    expect(svg.stdout).toMatch(/<svg[\s\S]*<\/svg>\s*$/);
  });
  it('--json is alone on standard output, also beside remarks', async () => {
    const got = await run(['codim', '--quadratic', 'p1^2 + exp(1)*q1^2', '--json']);
    expect(JSON.parse(got.stdout).arithmetic).toBe('floating');
    expect(got.stderr).toMatch(/exp\(1\)/);
  });
});
