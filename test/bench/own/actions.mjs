/** Exact generator matrices by name, and point sets they permute; all made before the clock starts. */
import { RealField } from '../../../dist/field/index.js';
import { build, directSum } from '../../../dist/linear/index.js';

/** Rows of numbers [a, b] = a + b r, or plain integers, over a field with r. */
const over = (field, r, rows) =>
  build(field, rows.length, rows.length, (i, j) => {
    const [a, b = 0] = [rows[i][j]].flat();
    return field.add(field.fromInteger(a), field.mul(field.fromInteger(b), r));
  });
const rationals = RealField.of();
const golden = RealField.of({ squareRoots: [5n] });
const phi = golden.mul(golden.add(golden.one, golden.sqrt({ n: 5n, d: 1n })), golden.fromRational(1n, 2n));
const integral = (rows) => over(rationals, rationals.zero, rows);

/** The permutation that sends basis vector j to images[j]. */
const permutation = (images) => integral(images.map((_, i) => images.map((to) => (to === i ? 1 : 0))));
const cycle = (n) => permutation(Array.from({ length: n }, (_, i) => (i + 1) % n));
const turn3 = [
  [0, 0, 1],
  [1, 0, 0],
  [0, 1, 0],
];

const swap3 = [
  [0, 1, 0],
  [1, 0, 0],
  [0, 0, 1],
];

/** The plane turned by 2π/n and reflected. */
function plane(n) {
  const field = RealField.of({ cosines: [n, 4 * n] });
  const [c, s] = [field.cos(1, n), field.sin(1, n)];
  const turn = build(field, 2, 2, (i, j) => (i === j ? c : i < j ? field.neg(s) : s));
  return [turn, build(field, 2, 2, (i, j) => (i !== j ? field.zero : i === 0 ? field.one : field.fromInteger(-1)))];
}

/** Simple reflections in the basis of simple roots; entries of the Cartan matrix a + bφ as [a, b]. */
function reflections(field, r, cartan) {
  return cartan.map((row, i) => {
    const minus = row.map((x) => [x].flat().map((y) => -y));
    return over(
      field,
      r,
      cartan.map((_, k) => cartan.map((__, j) => (k === i ? [(k === j ? 1 : 0) + minus[j][0], minus[j][1] ?? 0] : k === j ? 1 : 0))),
    );
  });
}

// the rotation by a fifth of a turn, times 2: entries a + bφ, 1/φ = φ - 1
const fifth = [
  [
    [-1, 1],
    [0, -1],
    [1, 0],
  ],
  [
    [0, 1],
    [1, 0],
    [-1, 1],
  ],
  [
    [-1, 0],
    [-1, 1],
    [0, 1],
  ],
];
const diagonal = (...x) => x.map((d, i) => x.map((_, j) => (i === j ? d : 0)));
const halved = (m) => ({ ...m, data: m.data.map((x) => golden.mul(x, golden.fromRational(1n, 2n))) });

export const actions = {
  O_h: () => [turn3, diagonal(-1, 1, 1), swap3].map(integral),
  I_h: () => [over(golden, phi, turn3), over(golden, phi, diagonal(-1, -1, -1)), halved(over(golden, phi, fifth))],
  D3: () => plane(3),
  D6: () => plane(6),
  C4: () => plane(4).slice(0, 1),
  'D6 ring': () => [cycle(6), permutation([0, 5, 4, 3, 2, 1])],
  S5: () => [cycle(5), permutation([1, 0, 2, 3, 4])],
  F4: () =>
    reflections(rationals, rationals.zero, [
      [2, -1, 0, 0],
      [-1, 2, -2, 0],
      [0, -1, 2, -1],
      [0, 0, -1, 2],
    ]),
  H4: () =>
    reflections(golden, phi, [
      [2, [0, -1], 0, 0],
      [[0, -1], 2, -1, 0],
      [0, -1, 2, -1],
      [0, 0, -1, 2],
    ]),
};

/** Several copies of one action. */
export const copies = (matrices, count) => matrices.map((m) => Array.from({ length: count - 1 }).reduce((sum) => directSum(sum, m), m));

export const names = (n) => Array.from({ length: n }, (_, i) => `x${i + 1}`);

/** Orbit of a point under 3 x 3 matrices, exact; per generator the image of each point. */
export function orbitOfPoint(matrices, seed) {
  const field = matrices[0].field;
  const apply = (m, v) => [0, 1, 2].map((i) => v.reduce((s, x, j) => field.add(s, field.mul(m.data[3 * i + j], x)), field.zero));
  const key = (v) => v.map((x) => field.key(x)).join(' ');
  const points = [seed];
  const place = new Map([[key(seed), 0]]);
  const images = matrices.map(() => []);
  for (let i = 0; i < points.length; i++)
    matrices.forEach((m, g) => {
      const v = apply(m, points[i]);
      const k = key(v);
      if (!place.has(k)) {
        place.set(k, points.length);
        points.push(v);
      }
      images[g].push(place.get(k));
    });
  return { points: points.map((v) => v.map((x) => field.toNumber(x))), images };
}

/** Displacements of permuted points, 3 each; `sets` copies, coordinates of one copy first. */
export function displacements(matrices, images, sets) {
  const field = matrices[0].field;
  const n = 3 * images[0].length;
  return matrices.map((m, g) => {
    const index = [];
    const value = [];
    for (let c = 0; c < sets; c++)
      images[g].forEach((to, from) => {
        for (let i = 0; i < 3; i++) {
          const cols = [0, 1, 2].filter((j) => !field.isZero(m.data[3 * i + j]));
          index[c * n + 3 * to + i] = cols.map((j) => c * n + 3 * from + j);
          value[c * n + 3 * to + i] = cols.map((j) => m.data[3 * i + j]);
        }
      });
    return { field, rows: sets * n, cols: sets * n, index, value };
  });
}

/** Stiffness of springs between the points, k by distance (0: none), row-major doubles. */
export function stiffness(points, k) {
  const n = 3 * points.length;
  const out = new Float64Array(n * n);
  points.forEach((a, s) => {
    points.forEach((b, t) => {
      if (s === t) return;
      const d = a.map((x, i) => x - b[i]);
      const length = Math.hypot(...d);
      const strength = k(length);
      if (strength === 0) return;
      for (let i = 0; i < 3; i++)
        for (let j = 0; j < 3; j++) {
          const x = (strength * d[i] * d[j]) / length ** 2;
          out[(3 * s + i) * n + 3 * s + j] += x;
          out[(3 * s + i) * n + 3 * t + j] -= x;
        }
    });
  });
  return out;
}

/** The canonical form on (q, p) as a sparse matrix. */
export function canonical(field, half) {
  const minus = field.neg(field.one);
  return {
    field,
    rows: 2 * half,
    cols: 2 * half,
    index: Array.from({ length: 2 * half }, (_, i) => [i < half ? i + half : i - half]),
    value: Array.from({ length: 2 * half }, (_, i) => [i < half ? field.one : minus]),
  };
}
