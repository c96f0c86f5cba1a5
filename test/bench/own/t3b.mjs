import { groupOfMatrices } from '../../../dist/action/index.js';
import { linearAction, minimalGenerators } from '../../../dist/invariant/index.js';
import { sparse } from '../../../dist/linear/index.js';
import { actions, copies, names } from './actions.mjs';
import { done, expect, timed } from './clock.mjs';

const which = process.argv[2];
const tasks = [
  ['generators D3 2+2', copies(actions.D3(), 2)],
  ['generators C4 2+2', copies(actions.C4(), 2)],
  ['generators O_h 3+3', copies(actions.O_h(), 2)],
];
for (const [name, matrices] of which === undefined ? tasks : tasks.filter(([n]) => n === which)) {
  const { field, rows } = matrices[0];
  const found = timed(name, () => {
    const group = groupOfMatrices(field, rows, matrices.map(sparse), 1000);
    return minimalGenerators(linearAction(field, names(rows), group, matrices));
  });
  expect(found.complete, true, name);
}
done();
