/** Re-checking of result files: true ones agree, every altered number is found, and the other routes find it alone. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputError } from '../../src/errors/index.ts';
import { RealField } from '../../src/field/index.ts';
import { inertia } from '../../src/linear/index.ts';
import { declare } from '../../src/model/declaration/index.ts';
import { type Certificate, decode, encode } from '../../src/study/certificate.ts';
import type { StudyCommand } from '../../src/study/outcome.ts';
import { study } from '../../src/study/study.ts';
import { verifyOutcome, verifyResult } from '../../src/study/verify.ts';
import { inertiaByDescartes } from '../../src/study/verify-inertia.ts';
import { checkLinear, type Disagreement } from '../../src/study/verify-linear.ts';
import { altered, random } from './verify-alterations.ts';

const sample = (name: string) => ({ path: new URL(`../../samples/${name}.yaml`, import.meta.url).pathname });
const turning = [
  ['group', 'cyclic:3'],
  ['on', 'q1,p1'],
  ['quadratic', 'mu*(q1^2+p1^2)/2'],
  ['set', 'mu=0'],
  ['vary', 'mu'],
].map(([name, value]) => ({ name: name!, value: value! }));

async function textOf(command: StudyCommand, declaration = declare(sample('three-resonator-ring'), [])): Promise<string> {
  return JSON.stringify((await study(command, declaration)).result, null, 1);
}

async function found(text: string): Promise<boolean> {
  try {
    return (await verifyOutcome(text, 'altered')).status === 1;
  } catch (error) {
    if (error instanceof InputError) return true;
    throw error;
  }
}

describe('verify', () => {
  it.each([
    'cubic-cage',
    'pendulum-ring',
    'pull-in-fold',
    'quaternion-oscillator',
    'square-lattice-cell',
    'strut-on-foundation',
    'three-resonator-ring',
    'whirling-shaft',
  ])('agrees with the codimension of sample %s by every route', async (name) => {
    const result = await verifyResult(await textOf('codim', declare(sample(name), [])), name);
    expect(result.disagreements).toEqual([]);
    expect(result.agrees).toBe(true);
    expect(result.routes).toContain('orbit of a generic vector');
    expect(result.routes).toContain('adjoint map on the whole generalised kernel');
    expect(result.checks).toBeGreaterThan(50);
  });

  it.each(['check', 'components', 'invariants', 'reduce', 'branches', 'sweep'] as const)(
    'agrees with the result of %s',
    async (command) => {
      const result = await verifyResult(await textOf(command), command);
      expect(result.disagreements).toEqual([]);
    },
  );

  it('finds 200 random alterations of one number', async () => {
    const next = random(20);
    const texts = [await textOf('codim', declare({}, turning)), await textOf('codim'), await textOf('check')];
    for (let k = 0; k < 200; k++) {
      // most of them on the small file
      const change = altered(texts[k % 5 === 0 ? 1 : k % 5 === 1 ? 2 : 0]!, next);
      expect(await found(change.text), `${change.from} to ${change.to} at ${change.at}`).toBe(true);
    }
  });

  it('finds alterations of a sweep, to the last digit', async () => {
    const next = random(21);
    const text = await textOf('sweep', declare(sample('three-resonator-ring'), [{ name: 'range', value: 'c=-1:1:12' }]));
    for (let k = 0; k < 12; k++) {
      const change = altered(text, next);
      expect(await found(change.text), `${change.from} to ${change.to}`).toBe(true);
    }
  });

  it('names the key, what was expected and what was found', async () => {
    const text = (await textOf('codim')).replace('"codimensionWithoutSymmetry": 4', '"codimensionWithoutSymmetry": 5');
    const outcome = await verifyOutcome(text, 'ring.json');
    expect(outcome.status).toBe(1);
    expect(await outcome.text(80)).toMatch(/zero\.codimensionWithoutSymmetry: the file says 5, .* gives 4/);
  });

  it('refuses what is no result', async () => {
    for (const text of [
      '',
      '[]',
      '{"schema":"symcodim/2"}',
      '{"schema":"symcodim/1","command":"codim"}',
      '{"schema":"symcodim/1","command":"help"}',
    ])
      await expect(verifyOutcome(text, 'x')).rejects.toThrow(InputError);
  });
});

describe('the other routes alone', () => {
  type Json = Record<string, unknown>;
  const disagreements = (result: Json): Disagreement[] => {
    const out: Disagreement[] = [];
    checkLinear(result, (result.certificate as Certificate).linear!, (key, is, should, route) => {
      if (is !== should) out.push({ key, expected: String(should), found: String(is), route });
    });
    return out;
  };
  const change = (result: Json, path: readonly (string | number)[], value: unknown): Json => {
    const copy = structuredClone(result);
    let at: Json = copy;
    for (const key of path.slice(0, -1)) at = at[key as string] as Json;
    at[path.at(-1) as string] = value;
    return copy;
  };

  it.each([
    ['group.order', ['group', 'order'], 6],
    ['group.reversing', ['group', 'reversing'], 4],
    ['a multiplicity', ['components', 2, 'multiplicity'], 2],
    ['a dimension', ['components', 2, 'dimension'], 1],
    ['a type', ['components', 2, 'type'], 'complex'],
    ['a form', ['components', 0, 'carriesForm'], true],
    ['a twist', ['components', 2, 'flowsTo'], 'A1'],
    ['the inertia', ['inertia', 'positive'], 5],
    ['the inertia of a component', ['components', 0, 'inertia', 'positive'], 0],
    ['the kernel', ['zero', 'kernel'], 3],
    ['the blocks', ['zero', 'blocks'], [2, 1, 1]],
    ['the codimension', ['zero', 'codimension'], 2],
    ['the codimension without symmetry', ['zero', 'codimensionWithoutSymmetry'], 3],
    ['the motion', ['zero', 'motion'], 'passes'],
    ['the order of a subgroup', ['zero', 'subgroups', 3, 'order'], 5],
    ['the conjugates of a subgroup', ['zero', 'subgroups', 1, 'conjugates'], 7],
    ['the codimension of a subgroup', ['zero', 'subgroups', 1, 'codimension'], 9],
    ['a sign of a block', ['zero', 'signs', 0, 'positive'], 0],
    ['a generator', ['symmetry', 'generators', 2, 'reversing'], false],
    ['the minor', ['certificate', 'linear', 'rank', 'minor'], [1, 2, 3, 4, 5]],
  ] as const)('find %s', async (_, path, value) => {
    const result = JSON.parse(await textOf('codim')) as Json;
    expect(disagreements(result)).toEqual([]);
    expect(disagreements(change(result, path, value))).not.toEqual([]);
  });
});

describe("inertia by Descartes' rule", () => {
  it('is that of the reduction to squares, for random symmetric matrices over Q(√5)', () => {
    const field = RealField.of({ squareRoots: [5n] });
    const root = field.sqrt({ n: 5n, d: 1n })!;
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 5 }),
        fc.array(fc.integer({ min: -2, max: 2 }), { minLength: 50, maxLength: 50 }),
        (n, list) => {
          const at = (i: number, j: number) => (i >= j ? i * 5 + j : j * 5 + i);
          const data = Array.from({ length: n * n }, (_, k) => {
            const [i, j] = [Math.floor(k / n), k % n];
            return field.add(field.fromInteger(list[at(i, j)]!), field.mul(field.fromInteger(list[25 + at(i, j)]!), root));
          });
          const m = { field, rows: n, cols: n, data };
          expect(inertiaByDescartes(m, field)).toEqual(inertia(m, field));
        },
      ),
      { numRuns: 100, seed: 3 },
    );
  });
});

describe('declarations in certificates', () => {
  it.each(['three-resonator-ring', 'whirling-shaft', 'water', 'vortex-heptagon'])('%s comes back as it was', (name) => {
    const declaration = declare(sample(name), []);
    expect(decode(JSON.parse(JSON.stringify(encode({ ...declaration }))))).toEqual({ ...declaration });
  });
});
