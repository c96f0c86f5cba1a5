import { groupOfMatrices } from '../../../dist/action/index.js';
import { InvariantSpaces, linearAction } from '../../../dist/invariant/index.js';
import { sparse } from '../../../dist/linear/index.js';
import { actions, copies, names } from './actions.mjs';
import { done, expect, timed } from './clock.mjs';

const which = process.argv[2];
const tasks = [
  ['invariants O_h R6 degree 8', copies(actions.O_h(), 2), 8],
  ['invariants D6 R12 degree 4', copies(actions['D6 ring'](), 2), 4],
  ['invariants S5 R10 degree 6', copies(actions.S5(), 2), 6],
];
for (const [name, matrices, degree] of which === undefined ? tasks : tasks.filter(([n]) => n === which)) {
  const { field, rows } = matrices[0];
  const basis = timed(name, () => {
    const group = groupOfMatrices(field, rows, matrices.map(sparse), 1000);
    return new InvariantSpaces(linearAction(field, names(rows), group, matrices)).basisOfDegree(degree);
  });
  expect(basis.length > 0, true, name);
}
done();
