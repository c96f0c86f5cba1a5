/** Groups by permutations: Coxeter groups on their roots, Cartan entries in Z[τ], τ² = τ + 1; and small matrices. */
const cycle = (n) => Int32Array.from({ length: n }, (_, i) => (i + 1) % n);
const swap = (n) => Int32Array.from({ length: n }, (_, i) => (i < 2 ? 1 - i : i));
const reverse = (n) => Int32Array.from({ length: n }, (_, i) => (n - i) % n);

/** Permutations of the points reached from the seeds. */
function orbit(seeds, maps) {
  const points = [];
  const numbers = new Map();
  const enter = (x) => {
    const key = x.join();
    if (!numbers.has(key)) {
      numbers.set(key, points.length);
      points.push(x);
    }
    return numbers.get(key);
  };
  for (const x of seeds) enter(x);
  const images = maps.map(() => []);
  for (let i = 0; i < points.length; i++) for (const [s, f] of maps.entries()) images[s].push(enter(f(points[i])));
  return images.map((p) => Int32Array.from(p));
}

/** Root coordinates a + bτ as pairs in one row; bonds [[up], [down]] along a chain. */
function coxeter(bonds) {
  const n = bonds.length + 1;
  const cartan = (i, j) => (i === j ? [2, 0] : j === i + 1 ? bonds[i][0] : i === j + 1 ? bonds[j][1] : [0, 0]);
  const reflect = (i) => (v) => {
    let [x, y] = [v[2 * i], v[2 * i + 1]];
    for (let j = 0; j < n; j++) {
      const [a, b] = cartan(i, j);
      const [c, d] = [v[2 * j], v[2 * j + 1]];
      x -= a * c + b * d;
      y -= a * d + b * c + b * d;
    }
    return v.map((value, k) => (k === 2 * i ? x : k === 2 * i + 1 ? y : value));
  };
  const roots = Array.from({ length: n }, (_, i) => Array.from({ length: 2 * n }, (_, k) => (k === 2 * i ? 1 : 0)));
  return orbit(
    roots,
    Array.from({ length: n }, (_, i) => reflect(i)),
  );
}

function matrices(list) {
  const n = list[0].length;
  const units = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => (i === j ? 1 : 0)));
  return orbit(
    units,
    list.map((m) => (v) => m.map((row) => row.reduce((s, a, j) => s + a * v[j], 0) + 0)),
  );
}

const kronecker = (a, b) => a.flatMap((row) => b.map((other) => row.flatMap((x) => other.map((y) => x * y))));
const identity = (n) => Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => (i === j ? 1 : 0)));
const turn = [
  [0, -1],
  [1, 0],
];
const mirror = [
  [1, 0],
  [0, -1],
];
const left = [kronecker(identity(2), turn), kronecker(turn, mirror)]; // two anticommuting square roots of -1
const bond = (up, down) => [
  [up, 0],
  [down, 0],
];
const golden = [
  [0, -1],
  [0, -1],
];

/** Name, order, generators. */
export const groups = [
  ['H4', 14400, () => coxeter([golden, bond(-1, -1), bond(-1, -1)])],
  ['S5', 120, () => [swap(5), cycle(5)]],
  ['S6', 720, () => [swap(6), cycle(6)]],
  ['O_h', 48, () => coxeter([bond(-1, -1), bond(-2, -1)])],
  ['I_h', 120, () => coxeter([golden, bond(-1, -1)])],
  ['F4', 1152, () => coxeter([bond(-1, -1), bond(-2, -1), bond(-1, -1)])],
  ['D100', 200, () => [cycle(100), reverse(100)]],
  ['2^{1+4}+', 32, () => matrices([turn, mirror].flatMap((m) => [kronecker(m, identity(2)), kronecker(identity(2), m)]))],
  [
    '2^{1+4}-',
    32,
    () => matrices([...[turn, mirror].map((m) => kronecker(m, identity(4))), ...left.map((m) => kronecker(identity(2), m))]),
  ],
];
