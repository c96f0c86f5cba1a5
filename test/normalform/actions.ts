/** Real actions of small groups on a kernel, from matrices of generators. */
import { groupOfMatrices } from '../../src/action/orbit.ts';
import { type Algebraic, gcdInt, RealField } from '../../src/field/index.ts';
import { type LinearAction, linearAction } from '../../src/invariant/linear-action.ts';
import { build, directSum, type Matrix, sparse } from '../../src/linear/index.ts';
import { mat, quaternion, rotation } from '../support/actions.ts';

export const Q = RealField.of({});

export function onKernel(field: RealField, generators: readonly Matrix<Algebraic>[], names?: readonly string[]): LinearAction {
  const n = generators[0]?.rows ?? names!.length;
  const group = groupOfMatrices(
    field,
    n,
    generators.map((g) => sparse(g)),
    100_000,
  );
  const letters = n <= 3 ? ['x', 'y', 'z'].slice(0, n) : Array.from({ length: n }, (_, i) => `x${i + 1}`);
  return linearAction(field, names ?? letters, group, generators);
}
export const trivial = (n: number) =>
  onKernel(Q, [], n <= 3 ? ['x', 'y', 'z'].slice(0, n) : Array.from({ length: n }, (_, i) => `x${i + 1}`));
/** The smallest field with cos and sin of 2 pi/n = cos 2 pi (n - 4)/(4n). */
const fieldOf = (n: number) => RealField.of({ cosines: [n, (4 * n) / gcdInt(n - 4, 4 * n)] });
export const cyclic = (n: number) => onKernel(fieldOf(n), [rotation(fieldOf(n), 1, n)]);
export const dihedral = (n: number) =>
  onKernel(fieldOf(n), [
    rotation(fieldOf(n), 1, n),
    mat(fieldOf(n), [
      [1, 0],
      [0, -1],
    ]),
  ]);
export const dihedralTwice = (n: number) => {
  const r = rotation(fieldOf(n), 1, n);
  const s = mat(fieldOf(n), [
    [1, 0],
    [0, -1],
  ]);
  return onKernel(fieldOf(n), [directSum(r, r), directSum(s, s)]);
};
const third = [
  [0, 0, 1],
  [1, 0, 0],
  [0, 1, 0],
];
export const octahedral = () =>
  onKernel(Q, [
    mat(Q, third),
    mat(Q, [
      [0, -1, 0],
      [1, 0, 0],
      [0, 0, 1],
    ]),
  ]);
export const octahedralFull = () =>
  onKernel(Q, [
    mat(Q, third),
    mat(Q, [
      [0, -1, 0],
      [1, 0, 0],
      [0, 0, 1],
    ]),
    mat(Q, [
      [-1, 0, 0],
      [0, -1, 0],
      [0, 0, -1],
    ]),
  ]);
export const tetrahedral = () =>
  onKernel(Q, [
    mat(Q, third),
    mat(Q, [
      [1, 0, 0],
      [0, -1, 0],
      [0, 0, -1],
    ]),
  ]);
export const tetrahedralFull = () =>
  onKernel(Q, [
    mat(Q, third),
    mat(Q, [
      [1, 0, 0],
      [0, -1, 0],
      [0, 0, -1],
    ]),
    mat(Q, [
      [0, 1, 0],
      [1, 0, 0],
      [0, 0, 1],
    ]),
  ]);
/** Rotations of the icosahedron: the cyclic shift of the axes and a five-fold rotation. */
export const icosahedral = () => {
  const f = RealField.of({ squareRoots: [5n] });
  const h = f.fromRational(1n, 2n);
  const r5 = f.sqrt({ n: 5n, d: 1n })!;
  const phi = f.mul(h, f.add(f.one, r5)); // golden ratio
  const a = f.mul(h, phi);
  const b = f.mul(h, f.sub(phi, f.one));
  const m = f.neg;
  // rotation by 2 pi/5 about (1, 0, phi)/|.| in the frame whose two-fold axes are the coordinate axes
  return onKernel(f, [
    mat(f, third),
    mat(f, [
      [1, 0, 0],
      [0, -1, 0],
      [0, 0, -1],
    ]),
    mat(f, [
      [h, m(a), b],
      [a, b, m(h)],
      [b, h, a],
    ]),
  ]);
};
/** S_n on sum x = 0, basis e_i - e_n. */
export const symmetric = (n: number) => {
  const k = n - 1;
  const matrixOf = (perm: readonly number[]) =>
    build<Algebraic>(Q, k, k, (i, j) => Q.fromInteger((perm[j] === i ? 1 : 0) - (perm[n - 1] === i ? 1 : 0)));
  const swap = Array.from({ length: n }, (_, i) => (i === 0 ? 1 : i === 1 ? 0 : i));
  const cycle = Array.from({ length: n }, (_, i) => (i + 1) % n);
  return onKernel(Q, [matrixOf(swap), matrixOf(cycle)]);
};
export const quaternionGroup = () => {
  const { li, lj } = quaternion(Q);
  return onKernel(Q, [li, lj]);
};
export const signs = (...rows: readonly (readonly number[])[]) =>
  onKernel(
    Q,
    rows.map((r) =>
      mat(
        Q,
        r.map((x, i) => r.map((_, j) => (i === j ? x : 0))),
      ),
    ),
  );
