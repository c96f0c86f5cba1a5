/**
 * Orbits of a few basis vectors that together span the space, exactly and modulo a prime, and the coefficients of
 * idempotents of the group algebra: what bases of multiplicity spaces are combined from.
 */
import { type Algebraic, mulAddMod, type RealField, type Reduction } from '../field/index.ts';
import type { FiniteGroup } from '../group/index.ts';
import { type SparseMatrix, sparseTranspose } from '../linear/index.ts';
import type { Action } from './action.ts';
import type { RestrictedGroup } from './irreducibles.ts';
import { ModularSpan, type ModularVector } from './modular-span.ts';
import { SPAN_WORK, type VectorPoints, vectorPoints } from './orbit.ts';
import { type Cutter, smallProduct } from './subspace-search.ts';
import { ValueTable } from './value-table.ts';

/** Representation of a group by sparse matrices. */
export interface Represented {
  readonly field: RealField;
  readonly dimension: number;
  readonly group: FiniteGroup;
  matrix(element: number): SparseMatrix<Algebraic>;
  /** Vectors that it permutes as the group permutes its points, where they are known. */
  readonly points?: VectorPoints | undefined;
}

const represented = new WeakMap<Action, Map<FiniteGroup, Represented>>();

/** The action restricted to a subgroup; the same object each time, so that its orbits are made once. */
export function representedBy(action: Action, part: RestrictedGroup): Represented {
  let known = represented.get(action);
  if (known === undefined) {
    known = new Map();
    represented.set(action, known);
  }
  let out = known.get(part.group);
  if (out === undefined) {
    const { field, dimension } = action;
    out = { field, dimension, group: part.group, matrix: (e) => action.matrix(part.inclusion[e]!), points: pointsOf(action, part) };
    known.set(part.group, out);
  }
  return out;
}

/** The points of the group if they are vectors of just this action, and the part permutes the same ones. */
function pointsOf(action: Action, { group, inclusion }: RestrictedGroup): VectorPoints | undefined {
  const points = vectorPoints(action.group);
  if (points?.values.field !== action.field || points.matrices.length !== action.generators.length || group.degree !== action.group.degree)
    return undefined;
  if (!action.generators.every((g, i) => g.matrix === points.matrices[i])) return undefined;
  const same = (x: number) => {
    const own = group.permutation(x);
    return action.group.permutation(inclusion[x]!).every((y, i) => y === own[i]);
  };
  return group === action.group || group.generators.every(same) ? points : undefined;
}

/**
 * Coefficients by element of e P_K up to a factor, c(x) = Σ_h λ(h) χ(h⁻¹x); P_K is the projector onto the component of K.
 * One for each coset of H: c(hx) = λ(h) c(x).
 */
export function cutProjector(group: FiniteGroup, character: readonly Algebraic[], cutter: Cutter, f: RealField): Algebraic[] {
  const known = new Map<string, Algebraic>();
  const counts = new Int32Array(group.classes.length);
  const { elements, signs } = cutter;
  const inverses = elements.map((h) => group.inverse(h));
  const { classOf } = group;
  const product = smallProduct(group);
  const out = new Array<Algebraic | undefined>(group.order).fill(undefined);
  for (let x = 0; x < group.order; x++) {
    if (out[x] !== undefined) continue;
    counts.fill(0);
    for (let i = 0; i < inverses.length; i++) counts[classOf[product(inverses[i]!, x)]!]! += signs[i]!;
    const key = counts.join();
    let sum = known.get(key);
    if (sum === undefined) {
      sum = f.zero;
      for (let c = 0; c < counts.length; c++) if (counts[c] !== 0) sum = f.add(sum, f.mul(f.fromInteger(counts[c]!), character[c]!));
      known.set(key, sum);
    }
    const minus = f.isZero(sum) ? sum : f.neg(sum);
    for (let i = 0; i < elements.length; i++) out[product(elements[i]!, x)] = signs[i] === 1 ? sum : minus;
  }
  return out as Algebraic[];
}

/** The images of one basis vector under all elements. */
export interface OrbitVectors {
  /** For every element x the number of ρ(x) of the basis vector among the vectors. */
  readonly of: Int32Array;
  /** The vectors by their nonzero entries: place, number of the value, … */
  readonly exact: readonly Int32Array[];
  readonly modular: readonly ModularVector[];
}

export interface SeedOrbits {
  readonly reduction: Reduction;
  readonly values: ValueTable;
  /** Together they span V. */
  readonly orbits: readonly OrbitVectors[];
}

const cache = new WeakMap<Represented, SeedOrbits>();

/** Made once for each representation. */
export function orbitsOf(rep: Represented): SeedOrbits {
  let out = cache.get(rep);
  if (out === undefined) {
    out = makeOrbits(rep);
    cache.set(rep, out);
  }
  return out;
}

function makeOrbits(rep: Represented): SeedOrbits {
  const f = rep.field;
  const { group, dimension } = rep;
  const reduction = f.reduction();
  const { points } = rep;
  if (points?.spanned && points.order === group.order)
    return { reduction, values: points.values, orbits: Array.from(points.first.values(), (first) => knownOrbit(group, points, first)) };
  const span = new ModularSpan(dimension, reduction.p, SPAN_WORK);
  const values = points?.values ?? new ValueTable(f);
  const walk = lazily(() => walker(rep, values, reduction));
  const orbits: OrbitVectors[] = [];
  for (let seed = 0; seed < dimension; seed++) {
    if (span.contains(Int32Array.of(seed, 1))) continue;
    const first = points?.first.get(seed);
    const orbit = points !== undefined && first !== undefined ? knownOrbit(group, points, first) : walk()(seed);
    for (const v of orbit.modular) span.add(v);
    orbits.push(orbit);
  }
  return { reduction, values, orbits };
}

function lazily<T>(make: () => T): () => T {
  let made: { readonly value: T } | undefined;
  return () => (made ??= { value: make() }).value;
}

/** The orbit of a point on which the group acts already. */
function knownOrbit(group: FiniteGroup, points: VectorPoints, first: number): OrbitVectors {
  const number = new Map<number, number>();
  const exact: Int32Array[] = [];
  const modular: ModularVector[] = [];
  const moves = group.generators.map((g) => group.permutation(g));
  const pointOf = new Int32Array(group.order);
  const of = Int32Array.from(pointOf, (_, x) => {
    const point = x === 0 ? first : moves[group.via[x]!]![pointOf[group.parent[x]!]!]!;
    pointOf[x] = point;
    let k = number.get(point);
    if (k === undefined) {
      k = exact.push(points.exact[point]!) - 1;
      modular.push(points.modular[point]!);
      number.set(point, k);
    }
    return k;
  });
  return { of, exact, modular };
}

/** Finds the orbit of a basis vector by multiplication with the generators. */
function walker(rep: Represented, values: ValueTable, reduction: Reduction): (seed: number) => OrbitVectors {
  const { group } = rep;
  const columns = group.generators.map((g) => sparseTranspose(rep.matrix(g)));
  const numbers = columns.map((m) => m.value.map((col) => col.map((x) => values.number(x))));
  const residues = columns.map((m) => m.value.map((col) => col.map((x) => reduction.apply(x))));
  return (seed) => {
    const exact: Int32Array[] = [Int32Array.of(seed, 1)];
    const modular: Int32Array[] = [Int32Array.of(seed, 1)];
    const add = (old: number | undefined, a: number, b: number) => values.add(old ?? 0, values.mul(a, b));
    const addModular = (old: number | undefined, a: number, b: number) => mulAddMod(old ?? 0, a, b, reduction.p);
    for (let x = 1; x < group.order; x++) {
      const g = group.via[x]!;
      const parent = group.parent[x]!;
      exact.push(image(columns[g]!.index, numbers[g]!, exact[parent]!, add));
      modular.push(image(columns[g]!.index, residues[g]!, modular[parent]!, addModular));
    }
    return { of: Int32Array.from({ length: group.order }, (_, x) => x), exact, modular };
  };
}

/** A v for A given by its columns; entries are numbers that `add` multiplies and adds, 0 is zero. */
function image(
  index: readonly (readonly number[])[],
  values: readonly (readonly number[])[],
  v: Int32Array,
  add: (old: number | undefined, a: number, b: number) => number,
): Int32Array {
  const sum = new Map<number, number>();
  for (let q = 0; q < v.length; q += 2) {
    const j = v[q]!;
    index[j]!.forEach((i, k) => {
      sum.set(i, add(sum.get(i), values[j]![k]!, v[q + 1]!));
    });
  }
  const at = [...sum.keys()].filter((i) => sum.get(i) !== 0).sort((a, b) => a - b);
  return Int32Array.from({ length: 2 * at.length }, (_, q) => (q % 2 === 0 ? at[q >> 1]! : sum.get(at[q >> 1]!)!));
}
