/**
 * Permutation generators of the groups in these tests, from textbook definitions. Coxeter groups act on
 * their roots (J. E. Humphreys, Reflection Groups and Coxeter Groups, 1990, sections 2.10 and 2.13; from memory).
 */
import { closeGroup } from '../../src/group/closure.ts';
import type { FiniteGroup } from '../../src/group/group.ts';

export interface Generators {
  readonly degree: number;
  readonly generators: Int32Array[];
}

export function close(g: Generators, limit?: number): FiniteGroup {
  return closeGroup(g.generators, g.degree, limit);
}

/** Permutations of the points reached from the seeds under some maps. */
export function orbit<P>(seeds: readonly P[], maps: readonly ((x: P) => P)[]): Generators {
  const points: P[] = [];
  const numbers = new Map<string, number>();
  const enter = (x: P): number => {
    const key = JSON.stringify(x);
    let i = numbers.get(key);
    if (i === undefined) {
      i = points.length;
      numbers.set(key, i);
      points.push(x);
    }
    return i;
  };
  for (const x of seeds) enter(x);
  const images: number[][] = maps.map(() => []);
  for (let i = 0; i < points.length; i++) for (const [s, f] of maps.entries()) images[s]!.push(enter(f(points[i]!)));
  return { degree: points.length, generators: images.map((p) => Int32Array.from(p)) };
}

/** The action of integer matrices on the orbits of the unit vectors. */
export function matrices(list: readonly (readonly (readonly number[])[])[], modulus = 0): Generators {
  const n = list[0]!.length;
  const units = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => (i === j ? 1 : 0)));
  const mod = (x: number): number => (modulus === 0 ? x + 0 : ((x % modulus) + modulus) % modulus);
  return orbit(
    units,
    list.map((m) => (v: number[]) => m.map((row) => mod(row.reduce((s, a, j) => s + a * v[j]!, 0)))),
  );
}

/** The regular action of a group given by its product on the points reached from the identity. */
export function regular<P>(one: P, generators: readonly P[], product: (a: P, b: P) => P): Generators {
  return orbit(
    [one],
    generators.map((g) => (x: P) => product(g, x)),
  );
}

export function cyclic(n: number): Generators {
  return { degree: n, generators: [Int32Array.from({ length: n }, (_, i) => (i + 1) % n)] };
}

export function dihedral(n: number): Generators {
  if (n < 3) return disjoint(...Array.from({ length: n }, () => cyclic(2)));
  return { degree: n, generators: [...cyclic(n).generators, Int32Array.from({ length: n }, (_, i) => (n - i) % n)] };
}

/** a^2n = 1, b^2 = a^n, b a b^-1 = a^-1, elements a^i b^j. */
export function dicyclic(n: number): Generators {
  const times = ([i, j]: [number, number], [k, l]: [number, number]): [number, number] => {
    const power = i + (j === 1 ? 2 * n - k : k) + (j + l === 2 ? n : 0);
    return [power % (2 * n), (j + l) % 2];
  };
  return regular<[number, number]>(
    [0, 0],
    [
      [1, 0],
      [0, 1],
    ],
    times,
  );
}

export function symmetric(n: number): Generators {
  const swap = Int32Array.from({ length: n }, (_, i) => (i === 0 ? 1 : i === 1 ? 0 : i));
  return n < 2 ? { degree: n, generators: [] } : { degree: n, generators: [swap, ...cyclic(n).generators] };
}

export function alternating(n: number): Generators {
  const cycles = Array.from({ length: n - 2 }, (_, k) =>
    Int32Array.from({ length: n }, (_, i) => (i === 0 ? 1 : i === 1 ? k + 2 : i === k + 2 ? 0 : i)),
  );
  return { degree: n, generators: cycles };
}

/** The direct product on disjoint sets of points. */
export function disjoint(...parts: readonly Generators[]): Generators {
  const degree = parts.reduce((s, g) => s + g.degree, 0);
  let offset = 0;
  const generators: Int32Array[] = [];
  for (const part of parts) {
    for (const g of part.generators)
      generators.push(
        Int32Array.from({ length: degree }, (_, i) => (i >= offset && i < offset + part.degree ? g[i - offset]! + offset : i)),
      );
    offset += part.degree;
  }
  return { degree, generators };
}

type Golden = readonly [number, number]; // a + b tau, tau^2 = tau + 1

/** The reflection group of a Coxeter diagram with Cartan entries in Z[tau], on the coordinates of its roots. */
function coxeter(cartan: readonly (readonly Golden[])[]): Generators {
  const n = cartan.length;
  const times = ([a, b]: Golden, [c, d]: Golden): Golden => [a * c + b * d, a * d + b * c + b * d];
  const simple = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j): Golden => [i === j ? 1 : 0, 0]));
  const reflections = cartan.map((row, i) => (v: Golden[]) => {
    let [x, y] = v[i]!;
    v.forEach((c, j) => {
      const [s, t] = times(row[j]!, c);
      x -= s;
      y -= t;
    });
    return v.map((c, j): Golden => (j === i ? [x + 0, y + 0] : c));
  });
  return orbit(simple, reflections);
}

function chain(bonds: readonly (readonly [Golden, Golden])[]): Golden[][] {
  const n = bonds.length + 1;
  const matrix = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j): Golden => [i === j ? 2 : 0, 0]));
  bonds.forEach(([up, down], i) => {
    matrix[i]![i + 1] = up;
    matrix[i + 1]![i] = down;
  });
  return matrix;
}

const plain: readonly [Golden, Golden] = [
  [-1, 0],
  [-1, 0],
];
const double: readonly [Golden, Golden] = [
  [-2, 0],
  [-1, 0],
];
const golden: readonly [Golden, Golden] = [
  [0, -1],
  [0, -1],
];

export const coxeterB3 = (): Generators => coxeter(chain([plain, double]));
export const coxeterH3 = (): Generators => coxeter(chain([golden, plain]));
export const coxeterF4 = (): Generators => coxeter(chain([plain, double, plain]));
export const coxeterH4 = (): Generators => coxeter(chain([golden, plain, plain]));

/** The rotations of the icosahedron: products of two reflections of H3. */
export function icosahedral(): Generators {
  const { degree, generators } = coxeterH3();
  const [a, b, c] = generators;
  return { degree, generators: [b!.map((x) => a![x]!), c!.map((x) => b![x]!)] };
}

/** Kronecker product of integer matrices. */
function kronecker(a: readonly (readonly number[])[], b: readonly (readonly number[])[]): number[][] {
  return a.flatMap((row) => b.map((other) => row.flatMap((x) => other.map((y) => x * y + 0))));
}

const rotation = [
  [0, -1],
  [1, 0],
];
const mirror = [
  [1, 0],
  [0, -1],
];
const one2 = [
  [1, 0],
  [0, 1],
];
const leftI = [
  [0, -1, 0, 0],
  [1, 0, 0, 0],
  [0, 0, 0, -1],
  [0, 0, 1, 0],
];
const leftJ = [
  [0, 0, -1, 0],
  [0, 0, 0, 1],
  [1, 0, 0, 0],
  [0, -1, 0, 0],
];
const one4 = [
  [1, 0, 0, 0],
  [0, 1, 0, 0],
  [0, 0, 1, 0],
  [0, 0, 0, 1],
];

/** D8 central product D8. */
export const extraspecialPlus = (): Generators =>
  matrices([kronecker(rotation, one2), kronecker(mirror, one2), kronecker(one2, rotation), kronecker(one2, mirror)]);
/** D8 central product Q8. */
export const extraspecialMinus = (): Generators =>
  matrices([kronecker(rotation, one4), kronecker(mirror, one4), kronecker(one2, leftI), kronecker(one2, leftJ)]);

export const quaternion = (): Generators => matrices([leftI, leftJ]);
export const special = (p: number): Generators =>
  matrices(
    [
      [
        [1, 1],
        [0, 1],
      ],
      [
        [1, 0],
        [1, 1],
      ],
    ],
    p,
  );
/** Upper unitriangular 3 x 3 matrices over GF(3), [x, y, z] with [x,y,z][a,b,c] = [x+a, y+b, z+c+xb]. */
export const heisenberg = (): Generators =>
  regular<number[]>(
    [0, 0, 0],
    [
      [1, 0, 0],
      [0, 1, 0],
    ],
    (g, h) => [(g[0]! + h[0]!) % 3, (g[1]! + h[1]!) % 3, (g[2]! + h[2]! + g[0]! * h[1]!) % 3],
  );
/** x -> x + 1, x -> 2x on the integers modulo 7. */
export const frobenius21 = (): Generators => ({
  degree: 7,
  generators: [Int32Array.from({ length: 7 }, (_, i) => (i + 1) % 7), Int32Array.from({ length: 7 }, (_, i) => (2 * i) % 7)],
});
