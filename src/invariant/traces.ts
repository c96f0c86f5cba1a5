/** Traces of an action by conjugacy class and block, modulo a prime. */
import { mulAddMod } from '../field/index.ts';
import type { CommonReduction } from './common-reduction.ts';
import type { LinearAction } from './linear-action.ts';

/** traces[b][c]: trace of block b on class c. */
export function classTraces(
  action: LinearAction,
  reduction: CommonReduction,
  blocks: readonly (readonly number[])[] = action.blocks,
): Int32Array[] {
  const { group } = action;
  const { p } = reduction;
  const out = blocks.map(() => new Int32Array(group.classes.length));
  const n = action.dimension;
  const generators = action.generatorMatrices.map((m) => {
    const index: number[][] = [];
    const value: number[][] = [];
    for (let i = 0; i < n; i++) {
      const cols: number[] = [];
      const vals: number[] = [];
      for (let j = 0; j < n; j++) {
        const x = m.data[i * n + j]!;
        if (m.field.isZero(x)) continue;
        cols.push(j);
        vals.push(reduction.apply(x));
      }
      index.push(cols);
      value.push(vals);
    }
    return { index, value };
  });
  const one = new Int32Array(n * n);
  for (let i = 0; i < n; i++) one[i * n + i] = 1;
  const cache = new Map<number, Int32Array>([[0, one]]);
  const matrix = (element: number): Int32Array => {
    const chain: number[] = [];
    let i = element;
    for (; !cache.has(i); i = group.parent[i]!) chain.push(i);
    let m = cache.get(i)!;
    for (const j of chain.reverse()) {
      const g = generators[group.via[j]!]!;
      const next = new Int32Array(n * n);
      for (let r = 0; r < n; r++)
        g.index[r]!.forEach((k, q) => {
          const x = g.value[r]![q]!;
          for (let c = 0; c < n; c++) {
            const y = m[k * n + c]!;
            if (y !== 0) next[r * n + c] = mulAddMod(next[r * n + c]!, x, y, p);
          }
        });
      m = next;
      cache.set(j, m);
    }
    return m;
  };
  group.classes.forEach((c, k) => {
    const m = matrix(c.representative);
    blocks.forEach((block, b) => {
      let s = 0;
      for (const i of block) s = (s + m[i * n + i]!) % p;
      out[b]![k] = s;
    });
  });
  return out;
}

/** powers[c][k]: class of the k-th power of class c, 0 <= k < its element order. */
export function powerClasses(action: LinearAction): Int32Array[] {
  const { group } = action;
  return group.classes.map((c) => {
    const out = new Int32Array(c.order);
    for (let k = 1, x = 0; k < c.order; k++) {
      x = group.multiply(c.representative, x);
      out[k] = group.classOf[x]!;
    }
    return out;
  });
}
