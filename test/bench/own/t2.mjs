import { groupOfMatrices } from '../../../dist/action/index.js';
import { linearAction, molien } from '../../../dist/invariant/index.js';
import { sparse } from '../../../dist/linear/index.js';
import { actions, copies, names } from './actions.mjs';
import { done, expect, timed } from './clock.mjs';

// from generators to the rational function and its expansion
const tasks = [
  ['O_h 3+3', copies(actions.O_h(), 2)],
  ['D6 2+2', copies(actions.D6(), 2)],
  ['I_h 3+3', copies(actions.I_h(), 2)],
  ['S5 5+5', copies(actions.S5(), 2)],
  ['F4', actions.F4()],
  ['H4', actions.H4()],
];
const series = timed('Molien series, six actions', () =>
  tasks.map(([, matrices]) => {
    const { field, rows } = matrices[0];
    const group = groupOfMatrices(field, rows, matrices.map(sparse), 100_000);
    return molien(linearAction(field, names(rows), group, matrices), { degree: 30 });
  }),
);
expect(series[4].denominator.join(), '2,6,8,12', 'degrees of F4');
expect(series[5].denominator.join(), '2,12,20,30', 'degrees of H4');
expect(series.length, tasks.length, 'series');
done();
