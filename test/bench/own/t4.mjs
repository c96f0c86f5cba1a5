import { normalModes } from '../../../dist/study/modes.js';
import { actions, displacements, orbitOfPoint, stiffness } from './actions.mjs';
import { done, expect, timed } from './clock.mjs';

const point = actions.I_h();
const { field } = point[0];
const phi = field.mul(field.add(field.one, field.sqrt({ n: 5n, d: 1n })), field.fromRational(1n, 2n));
const { points, images } = orbitOfPoint(point, [field.zero, field.one, field.mul(field.fromInteger(3), phi)]);
expect(points.length, 60, 'masses');
const generators = displacements(point, images, 1);
// edges of length 2, second neighbours
const k = { rows: 180, cols: 180, data: stiffness(points, (d) => (d < 2.01 ? 1 : d < 3.5 ? 0.25 : 0)) };
const modes = timed('60 masses: components, frequencies', () => {
  const found = normalModes(field, generators, k);
  // the eigenvalues ±iω of the phase space, component by component
  return found.map((c) => ({ ...c, frequencies: c.squares.map((x) => Math.sqrt(Math.max(x, 0))) }));
});
expect(
  modes
    .map((c) => c.multiplicity)
    .sort((a, b) => a - b)
    .join(),
  '1,2,4,4,5,5,6,6,7,8',
  'multiplicities',
);
expect(
  modes.reduce((sum, c) => sum + c.dimension * c.frequencies.filter((w) => w < 1e-6).length, 0),
  6,
  'rigid motions',
);
done();
