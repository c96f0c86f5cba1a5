/**
 * A finite group acting linearly: exact matrices of the generators beside the group they generate. The
 * coordinates fall into blocks, the smallest sets whose spans the action preserves; they give every ring of
 * invariants a grading by the degrees in the blocks.
 *
 * Convention: (ρ(g)f)(x) = f(ρ(g)⁻¹x). All elements count, also those that reverse time.
 */
import { ShapeError } from '../errors/index.ts';
import type { Algebraic, CyclotomicField, RealField } from '../field/index.ts';
import type { FiniteGroup } from '../group/index.ts';
import { at, build, identity, inverse, type Matrix, multiply, transpose } from '../linear/index.ts';

export type ScalarField = RealField | CyclotomicField;

export interface LinearAction {
  readonly field: ScalarField;
  readonly dimension: number;
  /** Names of the coordinates. */
  readonly names: readonly string[];
  readonly group: FiniteGroup;
  /** In the order of group.generators. */
  readonly generatorMatrices: readonly Matrix<Algebraic>[];
  /** Coordinates of each block, increasing; blocks by their first coordinate. */
  readonly blocks: readonly (readonly number[])[];
  /** ρ of an element by its number. */
  matrix(element: number): Matrix<Algebraic>;
}

/** Throws ShapeError unless there is one square matrix of the right size for each generator. */
export function linearAction(
  field: ScalarField,
  names: readonly string[],
  group: FiniteGroup,
  generatorMatrices: readonly Matrix<Algebraic>[],
): LinearAction {
  const n = names.length;
  if (generatorMatrices.length !== group.generators.length)
    throw new ShapeError(`${generatorMatrices.length} matrices for ${group.generators.length} generators`);
  for (const m of generatorMatrices)
    if (m.rows !== n || m.cols !== n) throw new ShapeError(`a ${m.rows} x ${m.cols} matrix cannot act on ${n} coordinates`);
  const cache = new Map<number, Matrix<Algebraic>>([[0, identity(field, n)]]);
  return {
    field,
    dimension: n,
    names,
    group,
    generatorMatrices,
    blocks: blocksOf(generatorMatrices, n),
    matrix(element) {
      const chain: number[] = [];
      let i = element;
      for (; !cache.has(i); i = group.parent[i]!) chain.push(i);
      let m = cache.get(i)!;
      for (const j of chain.reverse()) {
        m = multiply(generatorMatrices[group.via[j]!]!, m);
        cache.set(j, m);
      }
      return m;
    },
  };
}

function blocksOf(matrices: readonly Matrix<Algebraic>[], n: number): number[][] {
  const root = Array.from({ length: n }, (_, i) => i);
  const find = (i: number): number => {
    while (root[i] !== i) i = root[i] = root[root[i]!]!;
    return i;
  };
  for (const m of matrices)
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++)
        if (i !== j && !m.field.isZero(at(m, i, j))) {
          const [a, b] = [find(i), find(j)];
          root[Math.max(a, b)] = Math.min(a, b);
        }
  const blocks = new Map<number, number[]>();
  for (let i = 0; i < n; i++) {
    const r = find(i);
    const list = blocks.get(r);
    if (list === undefined) blocks.set(r, [i]);
    else list.push(i);
  }
  return [...blocks.values()];
}

/** The contragredient action, g ↦ ρ(g)⁻ᵀ. */
export function dualAction(action: LinearAction, names: readonly string[]): LinearAction {
  const matrices = action.generatorMatrices.map((m) => transpose(inverse(m)));
  return linearAction(action.field, names, action.group, matrices);
}

/** Two actions of one group on the direct sum. Throws ShapeError if the groups or the fields differ. */
export function sumOfActions(a: LinearAction, b: LinearAction): LinearAction {
  if (a.group !== b.group || a.field !== b.field) throw new ShapeError('a direct sum needs two actions of one group over one field');
  const n = a.dimension;
  const matrices = a.generatorMatrices.map((x, g) => {
    const y = b.generatorMatrices[g]!;
    return build(a.field, n + b.dimension, n + b.dimension, (i, j) =>
      i < n && j < n ? at(x, i, j) : i >= n && j >= n ? at(y, i - n, j - n) : a.field.zero,
    );
  });
  return linearAction(a.field, [...a.names, ...b.names], a.group, matrices);
}

/** The action on a union of blocks, given by their coordinates in increasing order. */
export function restrictToCoordinates(action: LinearAction, coordinates: readonly number[]): LinearAction {
  const matrices = action.generatorMatrices.map((m) =>
    build(action.field, coordinates.length, coordinates.length, (i, j) => at(m, coordinates[i]!, coordinates[j]!)),
  );
  return linearAction(
    action.field,
    coordinates.map((c) => action.names[c]!),
    action.group,
    matrices,
  );
}
