import { makeAction } from '../../../dist/action/index.js';
import { normalModes } from '../../../dist/study/modes.js';
import { actions, canonical, displacements, orbitOfPoint, stiffness } from './actions.mjs';
import { done, expect, timed } from './clock.mjs';

const point = actions.I_h();
const { field } = point[0];
const phi = field.mul(field.add(field.one, field.sqrt({ n: 5n, d: 1n })), field.fromRational(1n, 2n));
const { points, images } = orbitOfPoint(point, [field.zero, field.one, field.mul(field.fromInteger(3), phi)]);
expect(points.length, 60, 'masses');
const matrices = displacements(point, images, 1);
// edges of length 2, second neighbours
const k = stiffness(points, (d) => (d < 2.01 ? 1 : d < 3.5 ? 0.25 : 0));
const modes = timed('60 masses, components and 360 eigenvalues', () =>
  normalModes(
    makeAction(
      field,
      canonical(field, 180),
      displacements(point, images, 2).map((matrix, i) => ({ name: `g${i}`, matrix })),
    ),
    k,
  ),
);
expect(matrices.length > 0, true, 'generators');
expect(modes.length, 10, 'components');
done();
