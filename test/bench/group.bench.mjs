/**
 * Time of exact character tables from generators, and of subgroup lists, once each (cold code).
 * Coxeter groups are given by their Cartan entries in Z[tau], tau^2 = tau + 1, and act on their roots.
 */
import { characterTable, closeGroup, subgroupClasses } from '../../dist/group/index.js';

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

/** Root coordinates a + b tau as pairs in one row; bonds [[up], [down]] along a chain. */
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

const plain = [
  [-1, 0],
  [-1, 0],
];
const double = [
  [-2, 0],
  [-1, 0],
];
const golden = [
  [0, -1],
  [0, -1],
];

const groups = [
  ['H4', () => coxeter([golden, plain, plain])],
  ['S5', () => [swap(5), cycle(5)]],
  ['S6', () => [swap(6), cycle(6)]],
  ['O_h', () => coxeter([plain, double])],
  ['I_h', () => coxeter([golden, plain])],
  ['F4', () => coxeter([plain, double, plain])],
  ['D100', () => [cycle(100), reverse(100)]],
  ['2^{1+4}+', () => matrices([turn, mirror].flatMap((m) => [kronecker(m, identity(2)), kronecker(identity(2), m)]))],
  ['2^{1+4}-', () => matrices([...[turn, mirror].map((m) => kronecker(m, identity(4))), ...left.map((m) => kronecker(identity(2), m))])],
];

const order = { H4: 14400, S5: 120, S6: 720, O_h: 48, I_h: 120, F4: 1152, D100: 200, '2^{1+4}+': 32, '2^{1+4}-': 32 };

/** Rows {task, seconds}. */
export async function run() {
  const rows = [];
  let total = 0;
  const closed = new Map();
  for (const [name, generators] of groups) {
    const start = performance.now();
    const list = generators();
    const group = closeGroup(list, list[0].length);
    characterTable(group);
    const seconds = (performance.now() - start) / 1000;
    if (group.order !== order[name]) throw new Error(`${name}: order ${group.order}`);
    closed.set(name, group);
    total += seconds;
    rows.push({ task: `character table ${name}`, seconds });
  }
  rows.push({ task: 'character tables, all nine', seconds: total });
  for (const name of ['O_h', 'I_h', 'S5']) {
    const start = performance.now();
    subgroupClasses(closed.get(name));
    rows.push({ task: `subgroup classes ${name}`, seconds: (performance.now() - start) / 1000 });
  }
  return rows;
}
