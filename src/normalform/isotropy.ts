/**
 * Isotropy subgroups on the kernel up to conjugacy. Their fixed spaces are the intersections of the fixed spaces of single
 * elements; these are found modulo a prime, orbit by orbit (M. Golubitsky, I. Stewart, D. Schaeffer, Singularities and
 * Groups in Bifurcation Theory II, 1988, ch. XIII; place from memory). A subspace is kept as the echelon form of its equations.
 */
import { LimitError } from '../errors/index.ts';
import { type Algebraic, mulAddMod } from '../field/index.ts';
import type { LinearAction } from '../invariant/linear-action.ts';
import { fromRows, identity, kernel, type Matrix, modularEchelon, row, sub } from '../linear/index.ts';
import { type ModularAction, modularAction } from './modular-action.ts';

export interface IsotropyClass {
  /** Order in Γ; elements that act trivially on the kernel count. */
  readonly order: number;
  /** Number of conjugate subgroups. */
  readonly conjugates: number;
  readonly fixedDimension: number;
  /** The fixed space is a line. */
  readonly axial: boolean;
  /** Element numbers of a representative, increasing. */
  readonly elements: Int32Array;
  /** Basis of its fixed space, dimension x fixedDimension. */
  readonly fixedSpace: Matrix<Algebraic>;
  /** Order of N(Σ)/Σ. */
  readonly normaliserQuotient: number;
}

export interface IsotropyLattice {
  /** By descending order of the subgroup, then by the dimension of the fixed space. */
  readonly classes: readonly IsotropyClass[];
  /** Pairs (larger, smaller) of class numbers with no class between. */
  readonly edges: readonly (readonly [larger: number, smaller: number])[];
}

/** Most fixed spaces (conjugates counted). */
export const FIXED_SPACE_LIMIT = 50_000;

/** A subspace by its equations in reduced echelon form. */
interface Equations {
  readonly rows: number;
  readonly pivots: readonly number[];
  readonly data: Int32Array;
  readonly key: string;
}

function echelonOf(data: Int32Array, rows: number, n: number, p: number): Equations {
  const { matrix, pivots } = modularEchelon({ p, rows, cols: n, data });
  return { rows: pivots.length, pivots, data: matrix.data, key: matrix.data.join(' ') };
}
function stacked(a: Equations, b: Equations, n: number, p: number): Equations {
  const data = new Int32Array((a.rows + b.rows) * n);
  data.set(a.data);
  data.set(b.data, a.rows * n);
  return echelonOf(data, a.rows + b.rows, n, p);
}
/** Whether all rows lie in the span of the equations. */
function spans(e: Equations, data: Int32Array, rows: number, n: number, p: number): boolean {
  const v = new Int32Array(n);
  for (let r = 0; r < rows; r++) {
    for (let j = 0; j < n; j++) v[j] = data[r * n + j]!;
    for (let i = 0; i < e.rows; i++) {
      const x = v[e.pivots[i]!]!;
      if (x === 0) continue;
      for (let j = 0; j < n; j++) v[j] = mulAddMod(v[j]!, p - x, e.data[i * n + j]!, p);
    }
    if (v.some((x) => x !== 0)) return false;
  }
  return true;
}
function timesMatrix(e: Equations, g: Int32Array, n: number, p: number): Equations {
  const out = new Int32Array(e.rows * n);
  for (let i = 0; i < e.rows; i++)
    for (let k = 0; k < n; k++) {
      const x = e.data[i * n + k]!;
      if (x === 0) continue;
      for (let j = 0; j < n; j++) out[i * n + j] = mulAddMod(out[i * n + j]!, x, g[k * n + j]!, p);
    }
  return echelonOf(out, e.rows, n, p);
}

/** ρ(g) - 1 of every element, modulo p. */
function differences(m: ModularAction): Int32Array[] {
  const n = m.dimension;
  return Array.from({ length: m.action.group.order }, (_, g) => {
    const d = m.matrix(g).slice();
    for (let i = 0; i < n; i++) d[i * n + i] = d[i * n + i] === 0 ? m.p - 1 : d[i * n + i]! - 1;
    return d;
  });
}

/** All isotropy subgroups up to conjugacy with their lattice. Throws LimitError past FIXED_SPACE_LIMIT fixed spaces. */
export function isotropyLattice(action: LinearAction): IsotropyLattice {
  const m = modularAction(action);
  const { dimension: n, p } = m;
  const { group } = action;
  const moved = differences(m);
  const single = new Map<string, Equations>();
  for (const d of moved) {
    const e = echelonOf(d, n, n, p);
    single.set(e.key, e);
  }
  const seen = new Set<string>();
  const orbits: Equations[][] = [];
  const enter = (e: Equations) => {
    if (seen.has(e.key)) return;
    seen.add(e.key);
    const orbit = [e];
    for (let i = 0; i < orbit.length; i++)
      for (const g of m.generators) {
        const image = timesMatrix(orbit[i]!, g, n, p);
        if (seen.has(image.key)) continue;
        if (seen.size >= FIXED_SPACE_LIMIT)
          throw new LimitError(`more than ${FIXED_SPACE_LIMIT} fixed spaces of isotropy subgroups`, {
            value: `a group of order ${group.order} on ${n} coordinates`,
          });
        seen.add(image.key);
        orbit.push(image);
      }
    orbits.push(orbit);
  };
  enter(echelonOf(new Int32Array(0), 0, n, p));
  for (let q = 0; q < orbits.length; q++) for (const e of single.values()) enter(stacked(orbits[q]![0]!, e, n, p));

  const found = orbits.map((orbit) => {
    const e = orbit[0]!;
    const elements = Int32Array.from({ length: group.order }, (_, g) => g).filter((g) => spans(e, moved[g]!, n, n, p));
    return { orbit, elements };
  });
  found.sort((a, b) => b.elements.length - a.elements.length || b.orbit[0]!.rows - a.orbit[0]!.rows || a.orbit.length - b.orbit.length);
  const classes = found.map(({ orbit, elements }): IsotropyClass => {
    const e = orbit[0]!;
    return {
      order: elements.length,
      conjugates: orbit.length,
      fixedDimension: n - e.rows,
      axial: n - e.rows === 1,
      elements,
      fixedSpace: fixedSpaceOf(action, elements, moved, e.rows, p),
      normaliserQuotient: group.order / orbit.length / elements.length,
    };
  });
  return {
    classes,
    edges: coverings(
      found.map((f) => f.orbit),
      n,
      p,
    ),
  };
}

/** Exact fixed space of a subgroup, from as few elements as give all equations. */
function fixedSpaceOf(
  action: LinearAction,
  elements: Int32Array,
  moved: readonly Int32Array[],
  equations: number,
  p: number,
): Matrix<Algebraic> {
  const n = action.dimension;
  let e = echelonOf(new Int32Array(0), 0, n, p);
  const rows: (readonly Algebraic[])[] = [];
  const one = identity(action.field, n);
  for (const g of elements) {
    if (e.rows === equations) break;
    const next = stacked(e, echelonOf(moved[g]!, n, n, p), n, p);
    if (next.rows === e.rows) continue;
    e = next;
    const d = sub(action.matrix(g), one);
    for (let i = 0; i < n; i++) rows.push(row(d, i));
  }
  return kernel(fromRows(action.field, rows, n));
}

/** Covering pairs: the fixed space of the larger subgroup lies in a conjugate of that of the smaller. */
function coverings(orbits: readonly (readonly Equations[])[], n: number, p: number): [number, number][] {
  const below = orbits.map((small, j) =>
    orbits.map(
      (large, i) => i !== j && large[0]!.rows > small[0]!.rows && large.some((e) => spans(e, small[0]!.data, small[0]!.rows, n, p)),
    ),
  );
  const edges: [number, number][] = [];
  for (let i = 0; i < orbits.length; i++)
    for (let j = 0; j < orbits.length; j++) if (below[j]![i]! && !orbits.some((_, k) => below[k]![i]! && below[j]![k]!)) edges.push([i, j]);
  return edges;
}
