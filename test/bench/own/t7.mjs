import { makeAction } from '../../../dist/action/index.js';
import { directSum, sparse } from '../../../dist/linear/index.js';
import { stabilityTypes } from '../../../dist/study/stability-types.js';
import { actions, canonical } from './actions.mjs';
import { done, expect, timed } from './clock.mjs';

const COUNT = 10_000;
const ring = actions['D6 ring']();
const { field } = ring[0];
let state = 1;
const random = () => {
  state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
  return state / 2 ** 31 - 1;
};
// S = [[A, B], [Bᵀ, C]] with circulant symmetric A, B, C
const hessians = Array.from({ length: COUNT }, () => {
  const [a, b, c] = [0, 1, 2].map(() => Array.from({ length: 4 }, random));
  const data = new Float64Array(144);
  for (let i = 0; i < 12; i++)
    for (let j = 0; j < 12; j++) {
      const away = Math.abs((i % 6) - (j % 6));
      data[12 * i + j] = (i < 6 ? (j < 6 ? a : b) : j < 6 ? b : c)[Math.min(away, 6 - away)];
    }
  return { rows: 12, cols: 12, data };
});
const found = timed('classify 10 000 matrices under D6', () => {
  const type = stabilityTypes(
    makeAction(
      field,
      canonical(field, 6),
      ring.map((m, i) => ({ name: `g${i}`, matrix: sparse(directSum(m, m)) })),
    ),
  );
  return hessians.map(type);
});
expect(found.length, COUNT, 'types');
expect(
  found.every((t) => t.zero + t.imaginary + t.real + t.complex === 12),
  true,
  'eigenvalues add up',
);
done();
