/** Small matrix groups for the tests of invariants, closed here by brute force or through their orbits. */
import { groupOfMatrices } from '../../src/action/index.ts';
import { type Algebraic, CyclotomicField, RealField, rational } from '../../src/field/index.ts';
import { closeGroup } from '../../src/group/index.ts';
import { type LinearAction, linearAction } from '../../src/invariant/index.ts';
import { build, directSum, identity, type Matrix, matrix, multiply, scale, sparse } from '../../src/linear/index.ts';

export const Q = RealField.of();
export const Q2 = RealField.of({ squareRoots: [2n] });
export const Q3 = RealField.of({ squareRoots: [3n] });
export const Q5 = RealField.of({ squareRoots: [5n] });

type Scalars = RealField | CyclotomicField;
export type Entry = number | Algebraic;

export function mat(field: Scalars, rows: readonly (readonly Entry[])[]): Matrix<Algebraic> {
  return build(field, rows.length, rows.length, (i, j) => {
    const x = rows[i]![j]!;
    return typeof x === 'number' ? field.fromInteger(x) : x;
  });
}
/** The matrix that sends basis vector j to basis vector images[j]. */
export const permutation = (images: readonly number[]): Matrix<Algebraic> =>
  build(Q, images.length, images.length, (i, j) => (images[j] === i ? Q.one : Q.zero));

/** Several copies of one real action on q…, p…, r…, s…. */
export function copies(generators: readonly Matrix<Algebraic>[], count = 1): LinearAction {
  const field = generators[0]!.field as RealField;
  const n = generators[0]!.rows;
  const matrices = generators.map((g) => {
    let m = g;
    for (let k = 1; k < count; k++) m = directSum(m, g);
    return m;
  });
  const names = Array.from({ length: n * count }, (_, i) => `${'qprs'[Math.floor(i / n)]}${(i % n) + 1}`);
  return linearAction(field, names, groupOfMatrices(field, n * count, matrices.map(sparse), 20_000), matrices);
}

/** Any matrices over a cyclotomic field, closed element by element; the group is its regular permutation action. */
export function complexAction(field: CyclotomicField, generators: readonly Matrix<Algebraic>[]): LinearAction {
  const n = generators[0]!.rows;
  const key = (m: Matrix<Algebraic>) => m.data.map((x) => field.key(x)).join(';');
  const list = [identity(field, n) as Matrix<Algebraic>];
  const place = new Map([[key(list[0]!), 0]]);
  const images = generators.map((): number[] => []);
  for (let i = 0; i < list.length; i++)
    generators.forEach((g, k) => {
      const m = multiply(g, list[i]!);
      let at = place.get(key(m));
      if (at === undefined) {
        at = list.push(m) - 1;
        place.set(key(m), at);
      }
      if (list.length > 500) throw new Error('too many elements');
      images[k]![i] = at;
    });
  const group = closeGroup(
    images.map((x) => Int32Array.from(x)),
    list.length,
  );
  return linearAction(
    field,
    Array.from({ length: n }, (_, i) => `x${i + 1}`),
    group,
    generators,
  );
}

export const rotation = (field: RealField, k: number, n: number): Matrix<Algebraic> =>
  mat(field, [
    [field.cos(k, n)!, field.neg(field.sin(k, n)!)],
    [field.sin(k, n)!, field.cos(k, n)!],
  ]);
export const cyclicPlane = (n: number): Matrix<Algebraic>[] => [rotation(RealField.of({ cosines: [n, 4 * n] }), 1, n)];
export const dihedralPlane = (n: number): Matrix<Algebraic>[] => {
  const r = cyclicPlane(n)[0]!;
  return [r, mat(r.field as RealField, [[1, 0], [0, -1]])]; // biome-ignore format: a matrix
};

export const O = [mat(Q, [[0, -1, 0], [1, 0, 0], [0, 0, 1]]), mat(Q, [[0, 0, 1], [1, 0, 0], [0, 1, 0]])]; // biome-ignore format: matrices
export const minusOne = (n: number): Matrix<Algebraic> => scale(identity(Q, n) as Matrix<Algebraic>, Q.fromInteger(-1));
export const Oh = [...O, minusOne(3)];
export const T = [mat(Q, [[-1, 0, 0], [0, -1, 0], [0, 0, 1]]), O[1]!]; // biome-ignore format: matrices
export const Th = [...T, minusOne(3)];
export const Td = [...T, mat(Q, [[0, 1, 0], [1, 0, 0], [0, 0, 1]])]; // biome-ignore format: matrices

/** The geometric representation of a Coxeter group in the basis of simple roots; bonds [i, j, m]. */
export function coxeter(rank: number, bonds: readonly (readonly [number, number, number])[]): Matrix<Algebraic>[] {
  const field = RealField.of({ cosines: bonds.map(([, , m]) => 2 * m) });
  const label = (i: number, j: number) => bonds.find(([a, b]) => (a === i && b === j) || (a === j && b === i))?.[2] ?? 2;
  return Array.from({ length: rank }, (_, k) =>
    build(field, rank, rank, (i, j) => {
      const diagonal = i === j ? field.one : field.zero;
      if (i !== k) return diagonal;
      // s_k(a_j) = a_j + 2cos(pi/m) a_k
      return k === j ? field.neg(field.one) : field.add(diagonal, field.mul(field.fromInteger(2), field.cos(1, 2 * label(k, j))!));
    }),
  );
}
export const chain = (labels: readonly number[]): (readonly [number, number, number])[] => labels.map((m, i) => [i, i + 1, m] as const);

const Qi = CyclotomicField.of(4);
const Q8 = CyclotomicField.of(8);
const zeta5 = CyclotomicField.of(5);
const c = (field: CyclotomicField, re: number, im: number, d = 1): Algebraic =>
  field.mul(
    field.add(field.fromInteger(re), field.mul(field.fromInteger(im), field.root(field.conductor / 4))),
    field.fromRational(1n, BigInt(d)),
  );
const unitQuaternions = (field: CyclotomicField) => ({
  i: mat(field, [[c(field, 0, 1), 0], [0, c(field, 0, -1)]]), // biome-ignore format: a matrix
  j: mat(field, [[0, 1], [-1, 0]]), // biome-ignore format: a matrix
  w: mat(field, [[c(field, 1, 1, 2), c(field, 1, 1, 2)], [c(field, -1, 1, 2), c(field, 1, -1, 2)]]), // biome-ignore format: a matrix
});
export const quaternionPlane = (): LinearAction => complexAction(Qi, [unitQuaternions(Qi).i, unitQuaternions(Qi).j]);
export const binaryTetrahedral = (): LinearAction => {
  const { i, j, w } = unitQuaternions(Qi);
  return complexAction(Qi, [i, j, w]);
};
export const binaryOctahedral = (): LinearAction => {
  const { j, w } = unitQuaternions(Q8);
  return complexAction(Q8, [mat(Q8, [[Q8.root(1), 0], [0, Q8.root(-1)]]), j, w]); // biome-ignore format: a matrix
};
/** Klein's generators, F. Klein, Lectures on the Icosahedron (1884). */
export const binaryIcosahedral = (): LinearAction => {
  const f = zeta5;
  const root5 = f.sub(f.add(f.root(1), f.root(4)), f.add(f.root(2), f.root(3)));
  const over = (x: Algebraic) => f.div(x, root5);
  const a = over(f.sub(f.root(4), f.root(1)));
  const b = over(f.sub(f.root(2), f.root(3)));
  return complexAction(f, [mat(f, [[f.neg(f.root(3)), 0], [0, f.neg(f.root(2))]]), mat(f, [[a, b], [b, f.neg(a)]])]); // biome-ignore format: matrices
};
export const diagonal = (n: number, exponents: readonly number[]): LinearAction => {
  const f = CyclotomicField.of(n);
  return complexAction(f, [build(f, exponents.length, exponents.length, (i, j) => (i === j ? f.root(exponents[i]!) : f.zero))]);
};
export const dicyclic = (n: number): LinearAction => {
  const f = CyclotomicField.of(2 * n);
  return complexAction(f, [mat(f, [[f.root(1), 0], [0, f.root(-1)]]), mat(f, [[0, 1], [-1, 0]])]); // biome-ignore format: matrices
};
/** MacWilliams' transforms of binary, ternary and quaternary self-dual codes (N. Sloane, Amer. Math. Monthly 84, 1977). */
export const binaryCodes = (): LinearAction => {
  const h = Q2.inv(Q2.sqrt(rational(2n))!);
  return copies([mat(Q2, [[h, h], [h, Q2.neg(h)]]), mat(Q2, [[1, 0], [0, -1]])]); // biome-ignore format: matrices
};
export const ternaryCodes = (): LinearAction => {
  const f = CyclotomicField.of(12);
  const root3 = f.add(f.root(1), f.root(-1));
  const m = scale(mat(f, [[1, 2], [1, -1]]), f.inv(root3)); // biome-ignore format: a matrix
  return complexAction(f, [m, mat(f, [[1, 0], [0, f.root(4)]])]); // biome-ignore format: a matrix
};
export const quaternaryCodes = (): LinearAction =>
  copies([scale(mat(Q, [[1, 3], [1, -1]]), Q.fromRational(1n, 2n)), mat(Q, [[1, 0], [0, -1]])]); // biome-ignore format: matrices
export const leftQuaternions = (withThird: boolean): LinearAction => {
  const i = mat(Q, [[0, -1, 0, 0], [1, 0, 0, 0], [0, 0, 0, -1], [0, 0, 1, 0]]); // biome-ignore format: a matrix
  const j = mat(Q, [[0, 0, -1, 0], [0, 0, 0, 1], [1, 0, 0, 0], [0, -1, 0, 0]]); // biome-ignore format: a matrix
  const k = multiply(i, j);
  const half = Q.fromRational(1n, 2n);
  const w = matrix(
    Q,
    4,
    4,
    i.data.map((x, at) => Q.mul(half, Q.add(at % 5 === 0 ? Q.one : Q.zero, Q.add(x, Q.add(j.data[at]!, k.data[at]!))))),
  );
  return copies(withThird ? [i, j, w] : [i, j]);
};
export const symmetric = (n: number): Matrix<Algebraic>[] => [
  permutation(Array.from({ length: n }, (_, i) => (i + 1) % n)),
  permutation(Array.from({ length: n }, (_, i) => (i === 0 ? 1 : i === 1 ? 0 : i))),
];
