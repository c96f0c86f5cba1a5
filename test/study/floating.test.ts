/**
 * Floating models against the exact analysis: the sample models with all numbers floating, random models with noise, and decisions that
 * stay open. Two routes to every verdict: the same matrices over an exact field and in doubles.
 */
import { mkdtempSync, readdirSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { embedSparse, flowBlocks, symplecticPart } from '../../src/action/index.ts';
import { InputError, NotAnEquilibriumError, NotInvariantError, UsageError } from '../../src/errors/index.ts';
import { collisionsOf } from '../../src/event/collisions.ts';
import { exactPlaces } from '../../src/event/collisions-exact.ts';
import { blockForms, zeroEvent } from '../../src/event/zero-event.ts';
import { sparse } from '../../src/linear/index.ts';
import { type Declaration, readModelFile, readModelText } from '../../src/model/declaration/index.ts';
import { floatingStudy } from '../../src/study/floating.ts';
import { doubtOf, eventSpaces } from '../../src/study/floating-event.ts';
import { toleranceOf } from '../../src/study/floating-prepare.ts';
import { floatingSpectrumSummary } from '../../src/study/floating-spectrum.ts';
import { isExact, type NotExact, prepare } from '../../src/study/prepare.ts';
import type { CodimResult } from '../../src/study/result.ts';
import { study } from '../../src/study/study.ts';
import { action } from '../support/actions.ts';
import { Random, type RandomModel, randomModel } from '../support/random-models.ts';

const codim = async (d: Declaration) => (await study('codim', d)).result as CodimResult;
const floating = (d: Declaration): Declaration => ({ ...d, numbers: 'floating' });
const text = (yaml: string) => readModelText(yaml, 'model.yaml');
const RING = `
coordinates: [q1, q2, q3]
momenta: [p1, p2, p3]
parameters: {c: -1/3, k: 1}
vary: [c]
hamiltonian: (p1^2+p2^2+p3^2)/2 + c*((q1-q2)^2+(q2-q3)^2+(q3-q1)^2)/2 + k*(q1^2+q2^2+q3^2)/2
symmetry: {group: dihedral:3, action: ring, on: [[q1, q2, q3]], timeReversal: true}
`;

/** What must not depend on the arithmetic. */
function essence(r: CodimResult) {
  const { zero } = r;
  return {
    inertia: r.inertia,
    components: r.components.map((c) => [c.label, c.multiplicity, c.inertia]),
    zero:
      zero === null
        ? null
        : [zero.blocks, zero.codimension, zero.codimensionWithoutSymmetry, zero.motion, zero.components, zero.signs, zero.subgroups],
    collisions: r.collisions.map((c) => [c.kind, Number(c.value).toFixed(6), c.blocks, c.signature, c.codimension, c.motion, c.components]),
    spectrum: r.spectrum!.map((e) => [e.components, e.re.toFixed(5), e.im.toFixed(5), e.multiplicity, e.krein]),
    stability: r.stability,
    answer: r.verdict.answer,
  };
}

const samples = new URL('../../samples/', import.meta.url).pathname;
const LARGE = new Set(['truncated-icosahedron.yaml', 'benzene.yaml', 'cubic-cage.yaml']);

describe('sample models with all numbers floating', () => {
  const files = readdirSync(samples).filter((f) => f.endsWith('.yaml') && !LARGE.has(f));
  it.each(files)('%s', async (file) => {
    const declaration = readModelFile(join(samples, file));
    const [exact, doubles] = [await codim(declaration), await codim(floating(declaration))];
    expect(doubles.arithmetic).toBe('floating');
    expect(essence(doubles)).toEqual(essence(exact));
    // versality may be left open, but is never contradicted
    if (doubles.verdict.versal !== null) expect(doubles.verdict.versal).toBe(exact.verdict.versal);
    for (const r of doubles.zero?.routes ?? []) expect(r.rank).toBe(r.formula);
  });
});

/** A random exact model as a declaration, its Hessian in doubles with noise. */
function noisy(model: RandomModel, random: Random, noise: number): Declaration {
  const { field, s, w, generators } = model;
  const n = s.rows;
  const size = Math.max(1, ...s.data.map((x) => Math.abs(field.toNumber(x))));
  const h = Array.from({ length: n }, () => new Array<number>(n).fill(0));
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++)
      h[i]![j] = h[j]![i] = field.toNumber(s.data[i * n + j]!) + noise * size * (random.below(20001) / 10000 - 1);
  const texts = (m: typeof s) => Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => field.format(m.data[i * n + j]!)));
  const half = n / 2;
  return text(
    JSON.stringify({
      coordinates: Array.from({ length: half }, (_, i) => `q${i + 1}`),
      momenta: Array.from({ length: half }, (_, i) => `p${i + 1}`),
      symplectic: texts(w),
      quadratic: h.map((row) => row.map((x) => x.toFixed(17))),
      numbers: 'floating',
      symmetry: { generators: generators.map((g, i) => ({ name: `g${i + 1}`, matrix: texts(g) })) },
    }),
  );
}

/** SYMCODIM_FLOATING_MODELS=4000 makes it a long run. */
const MODELS = Number(process.env.SYMCODIM_FLOATING_MODELS ?? 500);

/** Relative to the largest entry of the Hessian. */
const NOISE = 1e-9;

describe(`${MODELS} random models, seed 20261202, noise 1e-9 of the largest entry`, () => {
  it('no wrong verdict; what is undecided is counted', () => {
    const seen = { models: 0, events: 0, undecided: 0, collisions: 0, apart: 0, unexplained: 0, withinNoise: 0, refused: 0 };
    const random = new Random(7);
    for (let seed = 20261202; seen.models < MODELS; seed++) {
      const model = randomModel(seed);
      // noise on a Hessian that is zero has nothing to be measured against
      if (model === undefined || model.w.rows > 8 || model.s.data.every((x) => model.field.isZero(x))) continue;
      seen.models++;
      const act = action(model.field, model.w, model.generators);
      const forms = blockForms(flowBlocks(act, symplecticPart(act)), embedSparse(sparse(model.s), model.field, act.field), act.form);
      const event = zeroEvent(forms, act.field);
      let linear: ReturnType<typeof floatingStudy>;
      try {
        linear = floatingStudy(prepare(noisy(model, random, NOISE)) as NotExact);
      } catch (error) {
        // far from orthogonal generators make the noise larger than the tolerance
        if (!(error instanceof NotInvariantError)) throw error;
        seen.refused++;
        continue;
      }
      const where = `seed ${seed} (${model.spec})`;
      if (linear.blocks.some((b) => b.doubt !== null)) {
        seen.undecided++;
        continue;
      }
      const sizes = linear.blocks
        .flatMap((b) => b.counts.flatMap((c, j) => new Array<number>(c * b.block.copies).fill(j)))
        .sort((x, y) => y - x);
      // an exact Hessian that is singular but for less than ten times the noise cannot be told from one that is
      const smallest = Math.max(
        ...linear.blocks.flatMap((b) => b.zero.readings.filter((r) => r.quantity === 'hessian').map((r) => r.zero.at(-1) ?? 0)),
      );
      if (sizes.join() !== event.sizes.join() && smallest < 10 * NOISE) {
        seen.withinNoise++;
        continue;
      }
      expect(sizes, where).toEqual(event.sizes);
      expect(
        linear.blocks.reduce((t, b) => t + b.formula!, 0),
        where,
      ).toBe(event.codimension);
      if (event.dimension > 0) seen.events++;
      if (event.dimension <= 8)
        // where the two routes differ the verdict is undecided
        for (const space of eventSpaces(linear)!)
          if (space.codimension !== space.zero.formula) seen[doubtOf(space.readings) === null ? 'unexplained' : 'apart']++;
      const places = exactPlaces(forms, act.field);
      const spectrum = floatingSpectrumSummary(linear);
      if (places === undefined || spectrum.stability.includes('open')) continue;
      seen.collisions++;
      const expected = collisionsOf(places).map((c) => [c.kind, c.sizes, c.codimension, c.motion, c.krein]);
      expect(
        spectrum.collisions.map((c) => [c.kind, c.blocks, c.codimension, c.motion, c.signature]),
        where,
      ).toEqual(expected);
    }
    expect(seen.events).toBeGreaterThan(0.3 * MODELS);
    // mostly a whole side of S that is zero but for the noise: it could as well be due to units
    expect(seen.undecided).toBeLessThan(0.25 * MODELS);
    expect(seen.apart).toBeLessThan(0.05 * MODELS);
    expect(seen.withinNoise).toBeLessThanOrEqual(0.001 * MODELS);
    expect(seen.refused).toBeLessThanOrEqual(0.001 * MODELS);
    expect(seen.unexplained).toBeLessThan(0.01 * MODELS);
    expect(seen.collisions).toBeGreaterThan(0.5 * MODELS);
    if (MODELS > 500) console.log(seen);
  }, 900_000);
});

describe('decisions in floating point', () => {
  it('a critical value typed with 4 digits is undecided or nonsingular, never a zero event', async () => {
    const near = await codim(floating({ ...text(RING), parameters: new Map([...text(RING).parameters, ['c', '-0.3333']]) }));
    expect(near.zero).toBeNull();
    const close = await study('codim', floating({ ...text(RING), parameters: new Map([...text(RING).parameters, ['c', '-0.3333332']]) }));
    expect((close.result as CodimResult).verdict.answer).toBe('undecided');
    expect(close.status).toBe(3);
    expect((close.result as CodimResult).verdict.because).toMatch(/\d\.\de-[78].*tolerance/);
    expect((close.result as CodimResult).zero?.codimension ?? null).toBeNull();
  });
  it('generators of no finite group: check answers no, codim stops', async () => {
    const d = floating(
      text(
        'coordinates: [q1, q2]\nmomenta: [p1, p2]\nhamiltonian: (p1^2+p2^2+q1^2+q2^2)/2\nsymmetry: {generators: [{name: r, matrix: [[3/5,-4/5,0,0],[4/5,3/5,0,0],[0,0,3/5,-4/5],[0,0,4/5,3/5]]}]}\n',
      ),
    );
    for (const each of [d, { ...d, numbers: 'exact' as const }]) {
      const { result, status } = await study('check', each);
      expect([status, result.symmetry.holds, result.group.order]).toEqual([1, false, 0]);
    }
    await expect(codim(d)).rejects.toThrow(/infinite group/);
  });
  it('a larger tolerance decides the same model', async () => {
    const d = floating({ ...text(RING), parameters: new Map([...text(RING).parameters, ['c', '-0.3333332']]) });
    const r = await codim({ ...d, tolerance: '1e-3' });
    expect(r.tolerance).toBe(1e-3);
    expect(r.verdict.answer).toBe('generic');
    expect(r.zero!.codimension).toBe(1);
  });
  it('a term such as exp(1) makes a model floating, and is named', async () => {
    const r = await codim(
      text('coordinates: [q1]\nmomenta: [p1]\nparameters: {a: exp(1)}\nhamiltonian: p1^2/2 + (a - exp(1))*q1^2/2 + q1^4\nvary: [a]\n'),
    );
    expect(r.arithmetic).toBe('floating');
    expect(r.floatingBecause).toContain('exp(1)');
    expect(r.zero).toMatchObject({ blocks: [2], codimension: 1 });
    expect(r.verdict).toMatchObject({ answer: 'generic', versal: true });
    expect(r.model.parameters.a).toBeCloseTo(Math.E, 14);
  });
  it('units that differ by 10⁶ do not fake a kernel', async () => {
    const r = await codim(
      floating(text('coordinates: [q1, q2]\nmomenta: [p1, p2]\nhamiltonian: 1e-6*(p1^2+p2^2)/2 + 1e6*q1^2/2 + 1e6*q2^2\n')),
    );
    expect(r.zero).toBeNull();
    expect(r.verdict.answer).toBe('no event');
  });
});

describe('the equilibrium of a floating model', () => {
  const pendulum = (at: string) => `
coordinates: [q1]
momenta: [p1]
hamiltonian: p1^2/2 - cos(q1) - q1/2
equilibrium: {q1: ${at}}
numbers: floating
`;
  it('is polished by Newton and the step is reported', async () => {
    const r = await codim(text(pendulum('0.5236')));
    expect(r.equilibrium.point!.q1).toBeCloseTo(Math.PI / 6, 14);
    expect(r.equilibrium.polished!.step).toBeCloseTo(0.5236 - Math.PI / 6, 12);
    expect(r.equilibrium.holds).toBe(true);
    expect(Math.abs(r.equilibrium.gradient as number)).toBeLessThan(1e-15);
  });
  it('a point that is not near one is refused by codim and reported by check', async () => {
    await expect(codim(text(pendulum('0')))).rejects.toThrow(NotAnEquilibriumError);
    const check = await study('check', text(pendulum('0')));
    expect(check.status).toBe(1);
    expect(check.result.equilibrium.holds).toBe(false);
  });
});

describe('matrices from files', () => {
  const folder = mkdtempSync(join(tmpdir(), 'symcodim-floating-'));
  const market = (name: string, n: number, entries: readonly (readonly [number, number, number])[]) =>
    writeFileSync(
      join(folder, name),
      `%%MatrixMarket matrix coordinate real general\n${n} ${n} ${entries.length}\n${entries.map((e) => e.join(' ')).join('\n')}\n`,
    );
  market('mass.mtx', 2, [
    [1, 1, 2.5],
    [2, 2, 2.5],
  ]);
  market('gyro.mtx', 2, [
    [1, 2, -1.5],
    [2, 1, 1.5],
  ]);
  market('spring.mtx', 2, [
    [1, 1, 0.75],
    [2, 2, 0.75],
  ]);
  market('load.mtx', 2, [
    [1, 1, -1],
    [2, 2, -1],
  ]);
  const model = (more: string) =>
    readModelText(
      `mass: mass.mtx\ngyroscopic: gyro.mtx\nstiffness: {constant: spring.mtx, c: load.mtx}\nparameters: {c: 0.75}\nvary: [c]\nsymmetry: {group: cyclic:3, on: [[q1, q2]]}\n${more}`,
      join(folder, 'model.yaml'),
      folder,
    );
  it('gyroscopic force with a spring that vanishes: one plane of complex type passes (rotating-frame oscillator)', async () => {
    const r = await codim(model(''));
    expect(r.arithmetic).toBe('floating');
    expect(r.floatingBecause).toContain('mass.mtx');
    expect(r.zero).toMatchObject({ kernel: 2, blocks: [1, 1], codimension: 1, motion: 'passes' });
    expect(r.verdict).toMatchObject({ answer: 'generic', versal: true });
    // M q″ + G q′ = 0: the other frequency is G/M
    expect(r.spectrum).toHaveLength(1);
    expect(r.spectrum![0]!.im).toBeCloseTo(1.5 / 2.5, 12);
    expect(r.caution).toBeDefined();
  });
  it('a stiffness without the symmetry is refused with the term', async () => {
    market('crooked.mtx', 2, [
      [1, 1, 0.75],
      [2, 2, 0.8],
    ]);
    const d = readModelText(
      'mass: mass.mtx\nstiffness: crooked.mtx\nsymmetry: {group: cyclic:3, on: [[q1, q2]]}\n',
      join(folder, 'model.yaml'),
      folder,
    );
    await expect(codim(d)).rejects.toThrow(NotInvariantError);
    expect((await study('check', d)).status).toBe(1);
  });
  it('a skew stiffness is no Hamiltonian, a singular mass is refused', async () => {
    const skew = readModelText('mass: mass.mtx\nstiffness: gyro.mtx\n', join(folder, 'model.yaml'), folder);
    await expect(codim(skew)).rejects.toThrow(InputError);
    market('flat.mtx', 2, [[1, 1, 1.5]]);
    const flat = readModelText('mass: flat.mtx\nstiffness: spring.mtx\n', join(folder, 'model.yaml'), folder);
    await expect(codim(flat)).rejects.toThrow(/mass matrix is singular/);
  });
});

describe('noise and units in one matrix', () => {
  const hessian = (small: string) => `coordinates: [q1]\nmomenta: [p1]\nquadratic: [['${small}', '0'], ['0', '1']]\nnumbers: floating\n`;
  it('an entry of 1e-9 beside 1 may be either: undecided', async () => {
    const r = await codim(text(hessian('1e-9')));
    expect(r.verdict.answer).toBe('undecided');
    expect(r.verdict.because).toMatch(/units/);
  });
  it('an entry that is zero, or within a million, is decided', async () => {
    expect((await codim(text(hessian('0')))).zero).toMatchObject({ blocks: [2], codimension: 1 });
    expect((await codim(text(hessian('1e-5')))).zero).toBeNull();
  });
  it('mass and stiffness in matrices of their own are each measured by their own', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'symcodim-units-'));
    writeFileSync(join(folder, 'mass.csv'), '1e6,0\n0,1e6\n');
    writeFileSync(join(folder, 'spring.csv'), '2e-6,-2e-6\n-2e-6,2e-6\n');
    const r = await codim(readModelText('mass: mass.csv\nstiffness: spring.csv\n', join(folder, 'model.yaml'), folder));
    expect(r.zero).toMatchObject({ blocks: [2], codimension: 1 });
    expect(r.inertia).toEqual({ positive: 3, zero: 1, negative: 0 });
  });
});

describe('what floating models cannot have', () => {
  it('commands that need exact numbers say so', async () => {
    await expect(study('branches', floating(text(RING)))).rejects.toThrow(UsageError);
  });
  it('a tolerance outside (0, 1), a parameter without a value', async () => {
    expect(() => toleranceOf('2')).toThrow(InputError);
    expect(toleranceOf('1e-9')).toBe(1e-9);
    expect(toleranceOf(undefined)).toBe(1e-7);
    await expect(codim(floating(text('coordinates: [q1]\nmomenta: [p1]\nhamiltonian: p1^2/2 + a*q1^2\nvary: [a]\n')))).rejects.toThrow(
      InputError,
    );
  });
  it('exact numbers stay exact', () => {
    expect(isExact(prepare(text(RING)))).toBe(true);
  });
});
