/**
 * Random exact models over the catalogue groups of order at most 48: the codimension by blocks (rank and formula, compared inside)
 * against brute force: the rank of the adjoint map on the whole generalised kernel with the generators as they are.
 */
import { describe, expect, it } from 'vitest';
import { coordinateMap, embedSparse, flowBlocks, symplecticPart } from '../../src/action/index.ts';
import { adjointRank } from '../../src/event/adjoint-rank.ts';
import { zeroChain } from '../../src/event/chain.ts';
import { generalisedKernel, poisson } from '../../src/event/generalised-kernel.ts';
import { codimensionUnder, eventCharacters } from '../../src/event/subgroup-codimension.ts';
import { blockForms, zeroEvent } from '../../src/event/zero-event.ts';
import { congruence, inverse, multiply, sparse } from '../../src/linear/index.ts';
import { action } from '../support/actions.ts';
import { randomModel } from '../support/random-models.ts';

const SEED = 20261201;
const MODELS = Number(process.env.SYMCODIM_RANDOM_MODELS ?? 2000);

describe(`two routes to the codimension, ${MODELS} random models, seed ${SEED}`, () => {
  it('blocks, formula and brute force agree; so do Jordan blocks by kernels and by reduction, and the subgroups Γ and 1', () => {
    const seen = { models: 0, events: 0 };
    for (let i = 0; seen.models < MODELS; i++) {
      const model = randomModel(SEED + i);
      if (model === undefined) continue;
      seen.models++;
      const { field, s, w } = model;
      const act = action(field, w, model.generators);
      const part = symplecticPart(act);
      const event = zeroEvent(blockForms(flowBlocks(act, part), embedSparse(sparse(s), field, act.field), act.form), act.field);
      const l = multiply(poisson(w), s);
      const whole = generalisedKernel(l);
      const where = `model ${SEED + i} (${model.spec})`;
      expect(whole.basis.cols, where).toBe(event.dimension);
      if (event.dimension === 0) continue;
      seen.events++;
      const sizes = zeroChain(s, w, field).blocks.flatMap((b) => new Array<number>(b.count).fill(b.size));
      expect(event.sizes, where).toEqual(sizes.sort((a, b) => b - a));
      const e = whole.basis;
      const coordinates = coordinateMap(e, field);
      const restricted = coordinates(multiply(l, e));
      const operators = model.generators.map((g) => ({
        matrix: coordinates(multiply(g, e)),
        inverse: coordinates(multiply(inverse(g), e)),
        sign: field.equal(
          congruence(g, w).data.find((x) => !field.isZero(x))!,
          w.data[congruence(g, w).data.findIndex((x) => !field.isZero(x))]!,
        )
          ? (1 as const)
          : (-1 as const),
      }));
      expect(adjointRank(restricted, operators, field.reduction()).codimension, where).toBe(event.codimension);
      if (event.dimension <= 12)
        expect(adjointRank(restricted, [], field.reduction()).codimension, where).toBe(event.codimensionWithoutSymmetry);
      const characters = eventCharacters(
        act,
        part.part,
        event.blocks.map((b) => ({ block: b.block, counts: b.kernel.blocks })),
      );
      expect(
        codimensionUnder(
          act,
          Array.from({ length: act.group.order }, (_, k) => k),
          characters,
        ),
        where,
      ).toBe(event.codimension);
      expect(codimensionUnder(act, [0], characters), where).toBe(event.codimensionWithoutSymmetry);
    }
    expect(seen.events).toBeGreaterThan(MODELS / 4);
  }, 600_000);
});
