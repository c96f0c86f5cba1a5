/** Monomials with given degrees in the blocks, and the lists of such degrees. */
import { type Monomial, multiplyMonomials, UNIT } from '../polynomial/index.ts';
import type { MonomialLayers } from './monomial-layers.ts';

/** All monomials with these degrees in these blocks of variables: the last block runs fastest. */
export function gradedMonomials(
  layers: readonly MonomialLayers[],
  blocks: readonly (readonly number[])[],
  degrees: readonly number[],
): Monomial[] {
  let list: readonly Monomial[] | undefined;
  blocks.forEach((block, b) => {
    if (degrees[b] === 0) return;
    const own = layers[b]!.names(degrees[b]!, block);
    list = list === undefined ? own : list.flatMap((x) => own.map((y) => multiplyMonomials(x, y)));
  });
  return list === undefined ? [UNIT] : [...list];
}

/** All lists of `parts` non-negative integers with a given sum, the first ones largest first. */
export function compositions(parts: number, sum: number): number[][] {
  if (parts === 0) return sum === 0 ? [[]] : [];
  if (parts === 1) return [[sum]];
  const out: number[][] = [];
  for (let first = sum; first >= 0; first--) for (const rest of compositions(parts - 1, sum - first)) out.push([first, ...rest]);
  return out;
}

/** Degrees of a monomial in the blocks. */
export function degreesOf(m: Monomial, blockOf: readonly number[], count: number): number[] {
  const out = new Array<number>(count).fill(0);
  for (let i = 0; i < m.length; i++) {
    const b = blockOf[m.charCodeAt(i)]!;
    out[b] = out[b]! + 1;
  }
  return out;
}
