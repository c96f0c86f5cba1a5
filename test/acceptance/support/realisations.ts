/**
 * Integer representations with signs that together reach all ten symmetry classes of linear Hamiltonian systems with
 * reversing elements, and random exact models on sums of them, in coordinates that know nothing of the symmetry.
 */
import { flow, forms, generalisedKernel, type LinearModel, onGeneralisedKernel, type Signed } from './brute-force.ts';
import { identity, inverse, type Mat, P, plus, rank, timesExact, transpose } from './modular.ts';

/** A seed is a model. */
export class Random {
  #state: number;
  constructor(seed: number) {
    this.#state = (Math.imul(seed, 0x85ebca6b) ^ 0x9e3779b9) >>> 0;
    for (let i = 0; i < 8; i++) this.below(2);
  }
  below(n: number): number {
    this.#state = (Math.imul(this.#state, 1664525) + 1013904223) >>> 0;
    return Math.floor((this.#state / 2 ** 32) * n);
  }
  pick<T>(list: readonly T[]): T {
    return list[this.below(list.length)]!;
  }
}

const scalar = (x: number): Mat => [[x]];
const R3: Mat = [
  [0, -1],
  [1, -1],
];
const R4: Mat = [
  [0, -1],
  [1, 0],
];
const R6: Mat = [
  [0, -1],
  [1, 1],
];
const swap: Mat = [
  [0, 1],
  [1, 0],
];
const flip: Mat = [
  [1, 0],
  [0, -1],
];
const negative = (a: Mat): Mat => a.map((row) => row.map((x) => -x));
export function directSum(...list: Mat[]): Mat {
  const n = list.reduce((s, a) => s + a.length, 0);
  const out = identity(n).map((row) => row.map(() => 0));
  let at = 0;
  for (const a of list) {
    a.forEach((row, i) => {
      row.forEach((x, j) => {
        out[at + i]![at + j] = x;
      });
    });
    at += a.length;
  }
  return out;
}
const corner = (a: Mat, b: Mat): Mat => [
  ...a.map((row) => [...row.map(() => 0), ...row]),
  ...b.map((row) => [...row, ...row.map(() => 0)]),
];
const one2 = identity(2);
// Multiplication from the left by i and j and from the right by i and j on R^4 = H, basis 1, i, j, k.
export const LI: Mat = directSum(R4, R4);
export const LJ: Mat = [
  [0, 0, -1, 0],
  [0, 0, 0, 1],
  [1, 0, 0, 0],
  [0, -1, 0, 0],
];
export const RI: Mat = directSum(R4, negative(R4));
export const RJ: Mat = [
  [0, 0, -1, 0],
  [0, 0, 0, -1],
  [1, 0, 0, 0],
  [0, 1, 0, 0],
];
const inverseR6: Mat = [
  [1, 1],
  [-1, 0],
];

interface Abstract {
  readonly name: string;
  readonly signs: readonly (readonly (1 | -1)[])[];
  /** Each representation gives one matrix for each generator. */
  readonly representations: readonly (readonly Mat[])[];
}
const s1 = scalar(1);
const m1 = scalar(-1);
const plain: readonly (1 | -1)[][] = [[1], [-1]];
const two: readonly (1 | -1)[][] = [
  [1, 1],
  [1, -1],
  [-1, 1],
  [-1, -1],
];
export const ABSTRACT: readonly Abstract[] = [
  { name: 'trivial', signs: [[]], representations: [[]] },
  { name: 'C2', signs: plain, representations: [[s1], [m1]] },
  { name: 'C3', signs: [[1]], representations: [[s1], [R3]] },
  { name: 'C4', signs: plain, representations: [[s1], [m1], [R4]] },
  { name: 'C6', signs: plain, representations: [[s1], [m1], [R3], [R6]] },
  {
    name: 'D3',
    signs: two.slice(0, 2),
    representations: [
      [s1, s1],
      [s1, m1],
      [R3, swap],
    ],
  },
  {
    name: 'D4',
    signs: two,
    representations: [
      [s1, s1],
      [s1, m1],
      [m1, s1],
      [m1, m1],
      [R4, flip],
    ],
  },
  {
    name: 'D6',
    signs: two,
    representations: [
      [s1, s1],
      [s1, m1],
      [m1, s1],
      [R3, swap],
      [R6, swap],
    ],
  },
  {
    name: 'Q8',
    signs: two,
    representations: [
      [s1, s1],
      [m1, s1],
      [s1, m1],
      [LI, LJ],
    ],
  },
  // a of order 6, x of order 4 with x² = a³: a(u, v) = (ζu, ζ̄v), x(u, v) = (−v, u)
  {
    name: 'Dic3',
    signs: two.slice(0, 2),
    representations: [
      [s1, s1],
      [s1, m1],
      [R3, swap],
      [directSum(R6, inverseR6), corner(negative(one2), one2)],
    ],
  },
  {
    name: 'C3 x C2',
    signs: two.slice(0, 2),
    representations: [
      [s1, s1],
      [s1, m1],
      [R3, one2],
      [R3, negative(one2)],
    ],
  },
  {
    name: 'C4 x C2',
    signs: two,
    representations: [
      [s1, m1],
      [R4, one2],
      [R4, negative(one2)],
    ],
  },
  {
    name: 'D3 x C2',
    signs: two.slice(0, 2).flatMap((s) => [[...s, 1] as (1 | -1)[], [...s, -1] as (1 | -1)[]]),
    representations: [
      [s1, s1, m1],
      [R3, swap, one2],
      [R3, swap, negative(one2)],
    ],
  },
  {
    name: 'Q8 x C2',
    signs: two.flatMap((s) => [[...s, 1] as (1 | -1)[], [...s, -1] as (1 | -1)[]]),
    representations: [
      [s1, s1, m1],
      [LI, LJ, identity(4)],
      [LI, LJ, negative(identity(4))],
    ],
  },
  // Central product of the quaternion group with C4, acting from both sides; also by its quotients.
  {
    name: 'Q8 o C4',
    signs: two.flatMap((s) => [[...s, 1] as (1 | -1)[], [...s, -1] as (1 | -1)[]]),
    representations: [
      [s1, s1, m1],
      [m1, s1, s1],
      [LI, LJ, RJ],
    ],
  },
];

export interface RandomModel extends LinearModel {
  readonly name: string;
  readonly generators: readonly Signed[];
}
const combine = (basis: readonly Mat[], coefficients: readonly number[], n: number): Mat =>
  basis.reduce(
    (s, x, i) => plus(s, x, coefficients[i]!),
    identity(n).map((row) => row.map(() => 0)),
  );
/** From residues to small integers, where they are small fractions times a common factor; undefined otherwise. */
function integral(x: Mat): Mat | undefined {
  for (const factor of [1, 2, 3, 4, 6, 12]) {
    const y = x.map((row) =>
      row.map((v) => {
        const r = (((v * factor) % P) + P) % P;
        return r > P / 2 ? r - P : r;
      }),
    );
    if (y.every((row) => row.every((v) => Math.abs(v) < 2000))) return y;
  }
  return undefined;
}
const allSmall = (x: Mat, bound: number): boolean => x.every((row) => row.every((v) => Math.abs(v) <= bound));

/** A model from a seed: dimension at most `limit`; undefined where the draw admits no symplectic form. */
export function randomModel(seed: number, limit = 8, only?: string): RandomModel | undefined {
  const random = new Random(seed);
  const group = only === undefined ? random.pick(ABSTRACT) : ABSTRACT.find((g) => g.name === only)!;
  const signs = random.pick(group.signs);
  const pieces: (readonly Mat[])[] = [];
  let n = 0;
  const sizeOf = (r: readonly Mat[]): number => r[0]?.length ?? 1;
  const usable = group.representations.filter((r) => sizeOf(r) <= limit);
  // Favour the largest representations, and several copies of one.
  for (let tries = 0; tries < 8; tries++) {
    const r = random.below(2) === 0 ? usable[usable.length - 1]! : random.pick(usable);
    const copies = 1 + random.below(3);
    for (let c = 0; c < copies; c++)
      if (n + sizeOf(r) <= limit) {
        pieces.push(r);
        n += sizeOf(r);
      }
    if (n >= 2 && random.below(3) === 0) break;
  }
  if (n % 2 === 1 || n === 0) return undefined;
  let generators: Signed[] = signs.map((sign, k) => ({ matrix: directSum(...pieces.map((r) => r[k]!)), sign }));
  const skew = forms(n, generators, false, true).map(integral);
  const even = forms(n, generators, true, false).map(integral);
  if (skew.some((x) => x === undefined) || even.some((x) => x === undefined)) return undefined;
  let w: Mat | undefined;
  for (let tries = 0; tries < 8 && w === undefined; tries++) {
    const candidate = combine(
      skew as Mat[],
      skew.map(() => random.below(5) - 2),
      n,
    );
    if (rank(candidate) === n) w = candidate;
  }
  if (w === undefined) return undefined;
  let s = combine([], [], n);
  let best = -1;
  const kind = random.below(8);
  const attempts = kind === 0 ? 1 : 24;
  for (let tries = 0; tries < attempts && kind !== 7; tries++) {
    const sparse = random.below(2) === 0;
    const candidate = combine(
      even as Mat[],
      even.map(() => (sparse && random.below(2) === 0 ? 0 : random.below(3) - 1)),
      n,
    );
    const nullity = n - rank(candidate);
    // A long chain over a small kernel is the rare case: prefer it.
    const chain = nullity === 0 ? 0 : generalisedKernel(flow(w, candidate)).length;
    const score = kind === 0 ? 1 : nullity === 0 || nullity === n ? 0 : kind < 4 ? 1 + chain - nullity : 1 + nullity;
    if (score > best) {
      best = score;
      s = candidate;
    }
  }
  // Unadapted coordinates.
  let mix = identity(n);
  for (let k = 0; k < 2 * n; k++) {
    const i = random.below(n);
    const j = random.below(n);
    const f = random.below(2) === 0 ? 1 : -1;
    if (i === j) continue;
    const next = mix.map((row) => row.slice());
    for (let c = 0; c < n; c++) next[i]![c] = next[i]![c]! + f * next[j]![c]!;
    if (allSmall(next, 6)) mix = next;
  }
  const back = inverse(mix).map((row) => row.map((v) => (v > P / 2 ? v - P : v)));
  const t = transpose(mix);
  generators = generators.map((g) => ({ matrix: timesExact(back, timesExact(g.matrix, mix)), sign: g.sign }));
  return { name: group.name, w: timesExact(t, timesExact(w, mix)), s: timesExact(t, timesExact(s, mix)), generators };
}

/** A random family through the model: S and, for some seeds, W linear in parameters a, b, …, at zero. */
export function randomFamily(model: RandomModel, seed: number): { readonly w: Mat; readonly s: Mat }[] {
  const random = new Random(seed + 1000003);
  const n = model.w.length;
  const even = forms(n, model.generators, true, false).map(integral);
  const skew = forms(n, model.generators, false, true).map(integral);
  const count = 1 + random.below(3);
  const moving = random.below(3) === 0;
  const draw = (basis: readonly (Mat | undefined)[]): Mat =>
    combine(
      basis.filter((x) => x !== undefined),
      basis.map(() => random.below(3) - 1),
      n,
    );
  return Array.from({ length: count }, () => ({ w: moving ? draw(skew) : combine([], [], n), s: draw(even) }));
}

/** The model with a family through it, in the form of a model file. */
export function familyFile(model: RandomModel, family: readonly { readonly w: Mat; readonly s: Mat }[]): Record<string, unknown> {
  const names = family.map((_, k) => 'abc'[k]!);
  const text = (m: Mat, by: (x: { readonly w: Mat; readonly s: Mat }) => Mat): string[][] =>
    m.map((row, i) => row.map((x, j) => [String(x), ...family.map((f, k) => `(${by(f)[i]![j]!})*${names[k]}`)].join(' + ')));
  return modelFile(model, {
    symplectic: text(model.w, (f) => f.w),
    quadratic: text(model.s, (f) => f.s),
    parameters: Object.fromEntries(names.map((name) => [name, '0'])),
    vary: names,
  });
}

/** The model in the form of a model file. */
export function modelFile(model: RandomModel, more: Record<string, unknown> = {}): Record<string, unknown> {
  const n = model.w.length;
  const text = (m: Mat): string[][] => m.map((row) => row.map(String));
  return {
    coordinates: Array.from({ length: n / 2 }, (_, i) => `x${i + 1}`),
    momenta: Array.from({ length: n / 2 }, (_, i) => `y${i + 1}`),
    symplectic: text(model.w),
    quadratic: text(model.s),
    ...(model.generators.length === 0
      ? {}
      : { symmetry: { generators: model.generators.map((g, i) => ({ name: `g${i + 1}`, matrix: text(g.matrix) })) } }),
    ...more,
  };
}
export { onGeneralisedKernel };
