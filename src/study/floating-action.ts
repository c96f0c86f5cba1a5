/**
 * An exact action in double precision, in coordinates x' with x = D x', and orthonormal bases of its multiplicity spaces. Which spaces
 * there are and how large is exact (characters); only their bases are rounded, from idempotents of the group algebra cell by cell,
 * a cell being a set of coordinates that the generators do not leave.
 */
import {
  type Action,
  type Cutter,
  conjugationOnClasses,
  findCutters,
  type Irreducible,
  type RestrictedGroup,
  type SymplecticPart,
  symmetryClass,
} from '../action/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import type { FiniteGroup, SymmetryClass } from '../group/index.ts';
import { type NumberMatrix, numberMatrix, type SparseMatrix } from '../linear/index.ts';

/** Rows of nonzero entries. */
export interface NumberSparse {
  readonly index: readonly (readonly number[])[];
  readonly value: readonly (readonly number[])[];
}

/** ρ in doubles. */
export interface NumericAction {
  readonly dimension: number;
  matrix(element: number): NumberSparse;
  readonly generators: readonly NumberSparse[];
  readonly cells: readonly (readonly number[])[];
}

/** A vector with few entries. */
export interface SparseVector {
  readonly index: readonly number[];
  readonly value: Float64Array;
}

/** One block of the flow, see FlowBlock; `basis` orthonormal in x'. */
export interface FloatingBlock {
  readonly irreducible: Irreducible;
  readonly exchanged: boolean;
  readonly cut: number;
  readonly copies: number;
  readonly symmetryClass: SymmetryClass;
  readonly basis: readonly SparseVector[];
}

export function numberSparse(a: SparseMatrix<Algebraic>, field: RealField, scaling?: Float64Array): NumberSparse {
  return {
    index: a.index,
    value: a.value.map((row, i) =>
      row.map((x, k) => {
        const y = field.toNumber(x);
        return scaling === undefined ? y : (y * scaling[a.index[i]![k]!]!) / scaling[i]!;
      }),
    ),
  };
}

export function applyNumeric(a: NumberSparse, v: ArrayLike<number>): Float64Array {
  return Float64Array.from(a.index, (cols, i) => {
    let s = 0;
    const vals = a.value[i]!;
    for (let k = 0; k < cols.length; k++) s += vals[k]! * v[cols[k]!]!;
    return s;
  });
}

/** aᵀ m a. */
export function congruenceNumeric(a: NumberSparse, m: NumberMatrix): NumberMatrix {
  const n = m.cols;
  const right = new Float64Array(n * n); // m a, by rows of m
  const size = a.index.length;
  for (let i = 0; i < size; i++)
    for (let k = 0; k < size; k++) {
      const x = m.data[i * n + k]!;
      if (x === 0) continue;
      const cols = a.index[k]!;
      const vals = a.value[k]!;
      for (let q = 0; q < cols.length; q++) right[i * n + cols[q]!]! += x * vals[q]!;
    }
  const out = new Float64Array(n * n);
  for (let k = 0; k < size; k++) {
    const cols = a.index[k]!;
    const vals = a.value[k]!;
    for (let q = 0; q < cols.length; q++) {
      const to = cols[q]! * n;
      const x = vals[q]!;
      for (let j = 0; j < n; j++) out[to + j]! += x * right[k * n + j]!;
    }
  }
  return numberMatrix(n, n, out);
}

/** Sets of coordinates that no generator leaves. */
export function coordinateCells(action: Action): number[][] {
  const parent = Array.from({ length: action.dimension }, (_, i) => i);
  const root = (i: number): number => {
    while (parent[i] !== i) i = parent[i] = parent[parent[i]!]!;
    return i;
  };
  for (const g of action.generators)
    g.matrix.index.forEach((cols, i) => {
      for (const j of cols) parent[root(i)] = root(j);
    });
  const cells = new Map<number, number[]>();
  for (let i = 0; i < action.dimension; i++) {
    const r = root(i);
    const cell = cells.get(r);
    if (cell === undefined) cells.set(r, [i]);
    else cell.push(i);
  }
  return [...cells.values()];
}

export function numericAction(action: Action, scaling: Float64Array): NumericAction {
  const cache = new Map<number, NumberSparse>();
  return {
    dimension: action.dimension,
    cells: coordinateCells(action),
    generators: action.generators.map((g) => numberSparse(g.matrix, action.field, scaling)),
    matrix: (element) => {
      let m = cache.get(element);
      if (m === undefined) {
        m = numberSparse(action.matrix(element), action.field, scaling);
        cache.set(element, m);
      }
      return m;
    },
  };
}

/** Σ c(g) ρ(g) on each cell, dense. */
function combination(numeric: NumericAction, elements: Iterable<readonly [element: number, coefficient: number]>): Float64Array[] {
  const place = new Int32Array(numeric.dimension);
  const out = numeric.cells.map((cell) => {
    cell.forEach((i, k) => {
      place[i] = k;
    });
    return new Float64Array(cell.length * cell.length);
  });
  for (const [element, c] of elements) {
    if (c === 0) continue;
    const m = numeric.matrix(element);
    numeric.cells.forEach((cell, b) => {
      const data = out[b]!;
      cell.forEach((i, r) => {
        const cols = m.index[i]!;
        const vals = m.value[i]!;
        for (let k = 0; k < cols.length; k++) data[r * cell.length + place[cols[k]!]!]! += c * vals[k]!;
      });
    });
  }
  return out;
}

/** Orthonormal basis of the column space of a square matrix, by the modified Gram-Schmidt process with pivots, done twice. */
function columnSpace(data: Float64Array, size: number): Float64Array[] {
  const left = Array.from({ length: size }, (_, j) => Float64Array.from({ length: size }, (_, i) => data[i * size + j]!));
  const norm = (v: Float64Array) => Math.sqrt(v.reduce((s, x) => s + x * x, 0));
  const largest = Math.max(0, ...left.map(norm));
  const out: Float64Array[] = [];
  while (out.length < size) {
    let best = -1;
    let length = 1e-6 * Math.max(largest, 1e-3);
    left.forEach((v, j) => {
      const l = norm(v);
      // the first of nearly equal ones, so that bases stay sparse
      if (l > length * 1.001) {
        best = j;
        length = l;
      }
    });
    if (best < 0) break;
    let v = left.splice(best, 1)[0]!;
    for (let pass = 0; pass < 2; pass++)
      for (const q of out) {
        const s = q.reduce((t, x, i) => t + x * v[i]!, 0);
        v = v.map((x, i) => x - s * q[i]!);
      }
    const l = norm(v);
    const unit = v.map((x) => x / l);
    out.push(unit);
    left.forEach((w, j) => {
      const s = unit.reduce((t, x, i) => t + x * w[i]!, 0);
      if (s !== 0) left[j] = w.map((x, i) => x - s * unit[i]!);
    });
  }
  return out;
}

/** Orthonormal basis of e V_K, `expected` vectors: e of the cutter, V_K the component of the irreducible of a subgroup. */
export function numericMultiplicityBasis(
  numeric: NumericAction,
  part: RestrictedGroup,
  k: Irreducible,
  cutter: Cutter | undefined,
  expected: number,
): SparseVector[] {
  const { group } = part;
  const trivial = group.order === 1;
  const weight = k.dimension / k.beta / group.order;
  const elements = function* (): Iterable<readonly [number, number]> {
    for (let e = 0; e < group.order; e++) yield [part.inclusion[e]!, weight * k.values[group.classOf[e]!]!];
  };
  const projector = trivial ? undefined : combination(numeric, elements());
  const cuts =
    cutter === undefined || cutter.elements.length === 1
      ? undefined
      : combination(
          numeric,
          cutter.elements.map((e, i) => [part.inclusion[e]!, cutter.signs[i]! / cutter.elements.length] as const),
        );
  const out: SparseVector[] = [];
  numeric.cells.forEach((cell, b) => {
    const n = cell.length;
    let data = projector?.[b];
    if (data === undefined) {
      data = new Float64Array(n * n);
      for (let i = 0; i < n; i++) data[i * n + i] = 1;
    }
    const cut = cuts?.[b];
    if (cut !== undefined) {
      const p = data;
      const product = new Float64Array(n * n);
      for (let i = 0; i < n; i++)
        for (let l = 0; l < n; l++) {
          const x = cut[i * n + l]!;
          if (x !== 0) for (let j = 0; j < n; j++) product[i * n + j]! += x * p[l * n + j]!;
        }
      data = product;
    }
    for (const v of columnSpace(data, n)) out.push({ index: cell, value: v });
  });
  if (out.length !== expected) throw new Error(`a multiplicity space has dimension ${out.length}, its character says ${expected}`);
  return out;
}

/** Index of the irreducible g ↦ K(t⁻¹gt) of Γ₀ for each of those present. */
function partnersOf(action: Action, symplectic: SymplecticPart): number[] {
  const { part, irreducibles } = symplectic;
  const t = action.signs.indexOf(-1);
  if (t < 0) return irreducibles.map((k) => k.index);
  const map = conjugationOnClasses(action.group, part, t);
  const f = action.field;
  return irreducibles.map((k) => {
    const found = irreducibles.find((x) => x.dimension === k.dimension && x.character.every((v, c) => f.equal(v, k.character[map[c]!]!)));
    if (found === undefined) throw new Error('a reversing element maps an irreducible of the phase space to one that is not there');
    return found.index;
  });
}

function cuttersFor(group: FiniteGroup, irreducibles: readonly Irreducible[]): Cutter[] {
  return findCutters(
    group,
    irreducibles.map((k) => ({ values: k.values, beta: k.beta, multiplicity: k.multiplicity })),
  );
}

/** The blocks of the flow, as flowBlocks gives them exactly. */
export function floatingBlocks(action: Action, symplectic: SymplecticPart, numeric: NumericAction): FloatingBlock[] {
  const { part, irreducibles } = symplectic;
  const partners = partnersOf(action, symplectic);
  const reversing = Array.from(action.signs, (x, i) => (x === -1 ? i : -1)).filter((i) => i >= 0);
  const cutters = cuttersFor(part.group, irreducibles);
  return irreducibles.flatMap((k, i): FloatingBlock[] => {
    const exchanged = partners[i] !== k.index;
    if (exchanged && irreducibles.findIndex((x) => x.index === partners[i]) < i) return [];
    const cut = cutters[i]!.dimensions[i]!;
    return [
      {
        irreducible: k,
        exchanged,
        cut,
        copies: (k.dimension / cut) * (exchanged ? 2 : 1),
        symmetryClass: symmetryClass(action.group, part, k, exchanged ? [] : reversing),
        basis: numericMultiplicityBasis(numeric, part, k, cutters[i], k.multiplicity * cut),
      },
    ];
  });
}

/** Basis of e V_K for each component of Γ, with dim eK. */
export function floatingComponentBases(
  whole: RestrictedGroup,
  irreducibles: readonly Irreducible[],
  numeric: NumericAction,
): { readonly cut: number; readonly basis: readonly SparseVector[] }[] {
  const cutters = cuttersFor(whole.group, irreducibles);
  return irreducibles.map((k, i) => {
    const cut = cutters[i]!.dimensions[i]!;
    return { cut, basis: numericMultiplicityBasis(numeric, whole, k, cutters[i], k.multiplicity * cut) };
  });
}

/** Dense columns, dimension × basis.length. */
export function denseBasis(basis: readonly SparseVector[], dimension: number): NumberMatrix {
  const data = new Float64Array(dimension * basis.length);
  basis.forEach((v, j) => {
    v.index.forEach((i, k) => {
      data[i * basis.length + j] = v.value[k]!;
    });
  });
  return numberMatrix(dimension, basis.length, data);
}

/** eᵀ m e for the columns e of a sparse basis. */
export function restrictNumeric(basis: readonly SparseVector[], m: NumberMatrix): NumberMatrix {
  const n = m.cols;
  const u = basis.length;
  const out = new Float64Array(u * u);
  const row = new Float64Array(n);
  basis.forEach((v, i) => {
    row.fill(0);
    v.index.forEach((k, q) => {
      const x = v.value[q]!;
      if (x === 0) return;
      const from = k * n;
      for (let j = 0; j < n; j++) row[j]! += x * m.data[from + j]!;
    });
    basis.forEach((w, j) => {
      let s = 0;
      const { index, value } = w;
      for (let q = 0; q < index.length; q++) s += value[q]! * row[index[q]!]!;
      out[i * u + j] = s;
    });
  });
  return numberMatrix(u, u, out);
}
