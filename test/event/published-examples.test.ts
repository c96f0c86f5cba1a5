/** Zero events in symmetric classes: matrices with their codimensions, from the literature on generic bifurcation. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { adjointRank } from '../../src/event/adjoint-rank.ts';
import { poisson } from '../../src/event/generalised-kernel.ts';
import { motionOf } from '../../src/event/zero-event.ts';
import { type Algebraic, RealField } from '../../src/field/index.ts';
import { build, inverse, type Matrix, multiply } from '../../src/linear/index.ts';
import { action, eventOf } from '../support/actions.ts';

interface Example {
  readonly example: string;
  readonly group_order: number;
  readonly dim_spG: number;
  readonly orbit_codim_in_spG: number;
  readonly ker_dim: number;
  readonly gen_ker_dim: number;
  readonly codim: number;
  readonly movement: string;
  readonly generators: readonly (readonly (readonly number[])[])[];
  readonly Omega: readonly (readonly number[])[];
  readonly S: readonly (readonly number[])[];
}
const { examples, source } = JSON.parse(readFileSync(new URL('./data/symmetric-zero-events.json', import.meta.url), 'utf8')) as {
  examples: Example[];
  source: string;
};

/** Doubles that are cosines or sines of multiples of 2 pi/n, n ≤ 12, or small fractions, as exact numbers of one field. */
function exactly(tables: readonly (readonly (readonly number[])[])[]): { field: RealField; matrices: Matrix<Algebraic>[] } {
  const values = new Set(tables.flat(2));
  const angles: number[] = [];
  const found = (x: number): [number, number] | undefined => {
    for (let n = 1; n <= 12; n++)
      for (let k = 0; k < 4 * n; k++) if (Math.abs(Math.cos((2 * Math.PI * k) / (4 * n)) - x) < 1e-9) return [k, 4 * n];
    return undefined;
  };
  const isFraction = (x: number) => Math.abs(4 * x - Math.round(4 * x)) < 1e-9;
  for (const x of values) if (!isFraction(x)) angles.push(found(x)![1]);
  const field = RealField.of({ cosines: angles });
  const convert = (x: number) => (isFraction(x) ? field.fromRational(BigInt(Math.round(4 * x)), 4n) : field.cos(...found(x)!)!);
  return { field, matrices: tables.map((t) => build<Algebraic>(field, t.length, t.length, (i, j) => convert(t[i]![j]!))) };
}

describe(source, () => {
  for (const x of examples)
    it(x.example, () => {
      const { field, matrices } = exactly([x.Omega, x.S, ...x.generators]);
      const [w, s, ...generators] = matrices;
      const act = action(field, w!, generators);
      expect(act.group.order).toBe(x.group_order);
      const event = eventOf(act, s!);
      expect(event.kernel).toBe(x.ker_dim);
      expect(event.dimension).toBe(x.gen_ker_dim);
      // dim of the algebra of symmetric quadratic Hamiltonians, and the orbit codimension of the whole L in it
      const operators = generators.map((g) => ({ matrix: g, inverse: inverse(g), sign: 1 as const }));
      const whole = adjointRank(multiply(poisson(w!), s!), operators, field.reduction());
      expect(whole.dimensionOfClass).toBe(x.dim_spG);
      expect(whole.codimension).toBe(x.orbit_codim_in_spG);
      expect(event.codimension).toBe(x.codim);
      if (x.movement === 'passing' || x.movement === 'splitting')
        expect(motionOf(event.codimension, event.semisimple)).toBe(x.movement === 'passing' ? 'passes' : 'splits');
    });
});
