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
import { SPAN_WORK } from './orbit.ts';
import type { Cutter } from './subspace-search.ts';

/** Representation of a group by sparse matrices. */
export interface Represented {
  readonly field: RealField;
  readonly dimension: number;
  readonly group: FiniteGroup;
  matrix(element: number): SparseMatrix<Algebraic>;
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
    out = { field, dimension, group: part.group, matrix: (e) => action.matrix(part.inclusion[e]!) };
    known.set(part.group, out);
  }
  return out;
}

/** Coefficients by element of e P_K up to a factor, Σ_h λ(h) χ(h⁻¹x); P_K is the projector onto the component of K. */
export function cutProjector(group: FiniteGroup, character: readonly Algebraic[], cutter: Cutter, f: RealField): Algebraic[] {
  const known = new Map<string, Algebraic>();
  const counts = new Int32Array(group.classes.length);
  const inverses = cutter.elements.map((h) => group.inverse(h));
  const { classOf } = group;
  return Array.from({ length: group.order }, (_, x) => {
    counts.fill(0);
    for (let i = 0; i < inverses.length; i++) counts[classOf[group.multiply(inverses[i]!, x)]!]! += cutter.signs[i]!;
    const key = counts.join();
    let sum = known.get(key);
    if (sum === undefined) {
      sum = f.zero;
      for (let c = 0; c < counts.length; c++) if (counts[c] !== 0) sum = f.add(sum, f.mul(f.fromInteger(counts[c]!), character[c]!));
      known.set(key, sum);
    }
    return sum;
  });
}

/** A vector by its nonzero entries. */
export interface ExactVector {
  readonly at: readonly number[];
  readonly value: readonly Algebraic[];
}

/** ρ(x) of one basis vector for every element x. */
export interface OrbitVectors {
  readonly exact: readonly ExactVector[];
  readonly modular: readonly ModularVector[];
}

export interface SeedOrbits {
  readonly reduction: Reduction;
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
  const span = new ModularSpan(dimension, reduction.p, SPAN_WORK);
  const columns = group.generators.map((g) => sparseTranspose(rep.matrix(g)));
  const reducedColumns = columns.map((m) => m.value.map((col) => col.map((x) => reduction.apply(x))));
  const orbits: OrbitVectors[] = [];
  for (let seed = 0; seed < dimension; seed++) {
    if (span.contains(Int32Array.of(seed, 1))) continue;
    const exact: ExactVector[] = [{ at: [seed], value: [f.one] }];
    const modular: ModularVector[] = [Int32Array.of(seed, 1)];
    span.add(modular[0]!);
    for (let x = 1; x < group.order; x++) {
      const g = group.via[x]!;
      const parent = group.parent[x]!;
      exact.push(exactImage(columns[g]!, exact[parent]!, f));
      const m = modularImage(columns[g]!, reducedColumns[g]!, modular[parent]!, reduction.p);
      modular.push(m);
      span.add(m);
    }
    orbits.push({ exact, modular });
  }
  return { reduction, orbits };
}

/** A v for A given by its columns, zeros left out. */
function exactImage(columns: SparseMatrix<Algebraic>, v: ExactVector, f: RealField): ExactVector {
  if (v.at.length === 1) {
    const y = v.value[0]!;
    const j = v.at[0]!;
    return { at: columns.index[j]!, value: y === f.one ? columns.value[j]! : columns.value[j]!.map((x) => f.mul(x, y)) };
  }
  const sum = new Map<number, Algebraic>();
  v.at.forEach((j, q) => {
    const y = v.value[q]!;
    columns.index[j]!.forEach((i, k) => {
      const t = f.mul(columns.value[j]![k]!, y);
      const old = sum.get(i);
      sum.set(i, old === undefined ? t : f.add(old, t));
    });
  });
  const at = [...sum.keys()].filter((i) => !f.isZero(sum.get(i)!)).sort((a, b) => a - b);
  return { at, value: at.map((i) => sum.get(i)!) };
}

function modularImage(
  columns: SparseMatrix<Algebraic>,
  values: readonly (readonly number[])[],
  v: ModularVector,
  p: number,
): ModularVector {
  const sum = new Map<number, number>();
  for (let q = 0; q < v.length; q += 2) {
    const j = v[q]!;
    columns.index[j]!.forEach((i, k) => {
      sum.set(i, mulAddMod(sum.get(i) ?? 0, values[j]![k]!, v[q + 1]!, p));
    });
  }
  const at = [...sum.keys()].filter((i) => sum.get(i) !== 0).sort((a, b) => a - b);
  return Int32Array.from({ length: 2 * at.length }, (_, q) => (q % 2 === 0 ? at[q >> 1]! : sum.get(at[q >> 1]!)!));
}
