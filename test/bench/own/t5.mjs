import { embedSparse, flowBlocks, makeAction, withCharacters } from '../../../dist/action/index.js';
import { blockForms, zeroEvent } from '../../../dist/event/zero-event.js';
import { build, directSum, sparse } from '../../../dist/linear/index.js';
import { actions, canonical, displacements, orbitOfPoint } from './actions.mjs';
import { done, expect, timed } from './clock.mjs';

/** S = diag(K, 1) for the exact symmetric matrix K of the entries. */
function hessian(field, half, entry) {
  return sparse(build(field, 2 * half, 2 * half, (i, j) => (i < half && j < half ? entry(i, j) : i === j ? field.one : field.zero)));
}

/** Equal springs along the shortest distances, every coordinate held so that translations are the kernel no longer alone. */
function cage(group, seed) {
  const matrices = actions[group]();
  const { field } = matrices[0];
  const { points, images } = orbitOfPoint(matrices, seed(field));
  const distance = (a, b) => Math.hypot(...points[a].map((x, i) => x - points[b][i]));
  const least = Math.min(...points.slice(1).map((_, i) => distance(0, i + 1)));
  const near = (a, b) => a !== b && distance(a, b) < 1.01 * least;
  const degree = points.filter((_, b) => near(0, b)).length;
  // isotropic springs: K is the Laplacian of the graph times the identity, its kernel the translations
  const k = (i, j) => {
    if (i % 3 !== j % 3) return field.zero;
    const [a, b] = [Math.floor(i / 3), Math.floor(j / 3)];
    return a === b ? field.fromInteger(degree) : near(a, b) ? field.fromInteger(-1) : field.zero;
  };
  return { field, matrices: displacements(matrices, images, 2), s: hessian(field, 3 * points.length, k) };
}

function ring(group, entry) {
  const plane = actions[group]();
  const { field, rows } = plane[0];
  return { field, matrices: plane.map((m) => sparse(directSum(m, m))), s: hessian(field, rows, (i, j) => field.fromInteger(entry(i, j))) };
}

const golden = (f) => f.mul(f.add(f.one, f.sqrt({ n: 5n, d: 1n })), f.fromRational(1n, 2n));
const tasks = [
  ['codimension D3 n=4', () => ring('D3', () => 0)],
  ['codimension D6 n=12', () => ring('D6 ring', (i, j) => (i === j ? 2 : (i - j + 6) % 6 === 1 || (j - i + 6) % 6 === 1 ? -1 : 0))],
  ['codimension O_h n=48', () => cage('O_h', (f) => [f.one, f.one, f.one])],
  ['codimension I_h n=72', () => cage('I_h', (f) => [f.zero, f.one, golden(f)])],
];
const which = process.argv[2];
for (const [name, model] of tasks) {
  if (which !== undefined && which !== name) continue;
  const { field, matrices, s } = model();
  const event = timed(name, () => {
    const action = withCharacters(
      makeAction(
        field,
        canonical(field, s.rows / 2),
        matrices.map((matrix, i) => ({ name: `g${i}`, matrix })),
      ),
    );
    return zeroEvent(blockForms(flowBlocks(action), embedSparse(s, field, action.field), action.form), action.field);
  });
  expect(event.codimension, 1, name);
}
done();
