/**
 * A finite group on the kernel, reduced modulo a prime that does not divide its order. Dimensions of fixed spaces and
 * of spaces of invariants are the same there as over the real field, so they are decided modulo p without error.
 */
import { ShapeError } from '../errors/index.ts';
import { type Algebraic, mulAddMod, RealField, type Reduction } from '../field/index.ts';
import type { LinearAction } from '../invariant/linear-action.ts';

export interface ModularAction {
  readonly action: LinearAction;
  readonly field: RealField;
  readonly reduction: Reduction;
  readonly p: number;
  readonly dimension: number;
  /** Row-major images of the generators. */
  readonly generators: readonly Int32Array[];
  /** Image of an element by its number. */
  matrix(element: number): Int32Array;
}

/** Throws ShapeError if the action is not over a real field. `index` picks the prime. */
export function modularAction(action: LinearAction, index = 0): ModularAction {
  const { field, group, dimension: n } = action;
  if (!(field instanceof RealField)) throw new ShapeError(`a kernel has real coordinates, not coordinates in ${field.name}`);
  let reduction = field.reduction(index);
  for (let i = index + 1; group.order % reduction.p === 0; i++) reduction = field.reduction(i);
  const p = reduction.p;
  const generators = action.generatorMatrices.map((m) => Int32Array.from(m.data, (x: Algebraic) => reduction.apply(x)));
  const one = new Int32Array(n * n);
  for (let i = 0; i < n; i++) one[i * n + i] = 1;
  const cache = new Map<number, Int32Array>([[0, one]]);
  return {
    action,
    field,
    reduction,
    p,
    dimension: n,
    generators,
    matrix(element) {
      const chain: number[] = [];
      let i = element;
      for (; !cache.has(i); i = group.parent[i]!) chain.push(i);
      let m = cache.get(i)!;
      for (const j of chain.reverse()) {
        m = squareProduct(generators[group.via[j]!]!, m, n, p);
        cache.set(j, m);
      }
      return m;
    },
  };
}

/** Product of two n x n matrices modulo p. */
export function squareProduct(a: Int32Array, b: Int32Array, n: number, p: number): Int32Array {
  const out = new Int32Array(n * n);
  for (let i = 0; i < n; i++)
    for (let k = 0; k < n; k++) {
      const x = a[i * n + k]!;
      if (x === 0) continue;
      for (let j = 0; j < n; j++) out[i * n + j] = mulAddMod(out[i * n + j]!, x, b[k * n + j]!, p);
    }
  return out;
}
