/**
 * Which blocks of the flow may collide off zero, decided modulo a prime: where each characteristic polynomial in y = λ² is as
 * square-free as the class makes it, and no two have a common root modulo the prime, nothing collides over the field either.
 */
import type { RealField } from '../field/index.ts';
import type { SymmetryClass } from '../group/index.ts';
import { gcdModular } from '../polynomial/univariate-modular.ts';
import { reduceMatrix } from './adjoint-rank.ts';
import { characteristicModular, nonzeroSquares } from './characteristic.ts';
import type { BlockForms } from './zero-event.ts';

/** How often a root that nothing forces occurs in the characteristic polynomial of a block, in y. */
export function genericMultiplicity(classNumber: SymmetryClass, cut: number): number {
  switch (classNumber) {
    case 5:
      return 2 * cut;
    case 1:
    case 4:
    case 6:
    case 8:
    case 10:
      return cut;
    default:
      return cut / 2;
  }
}

/** Classes in which iω and −iω on χ are two places. */
export const complexClass = (c: SymmetryClass) => c === 2 || c === 7 || c === 8;

function derivativeModular(a: Int32Array, p: number): Int32Array {
  const out = Int32Array.from({ length: Math.max(0, a.length - 1) }, (_, e) => Number((BigInt(a[e + 1]!) * BigInt(e + 1)) % BigInt(p)));
  let n = out.length;
  while (n > 0 && out[n - 1] === 0) n--;
  return out.slice(0, n);
}

/** Numbers of the blocks that may take part in a collision; empty where the prime shows that there is none. */
export function suspectBlocks(forms: readonly BlockForms[], field: RealField): number[] {
  const reduction = field.reduction();
  const { p } = reduction;
  const squares = forms.map((b) =>
    Int32Array.from(nonzeroSquares(Array.from(characteristicModular(reduceMatrix(b.l, reduction))), (x) => x === 0)),
  );
  const suspects = new Set<number>();
  forms.forEach((b, i) => {
    const g = squares[i]!;
    if (g.length <= 1) return;
    const simple = g.length - gcdModular(g, derivativeModular(g, p), p).length;
    if (simple * genericMultiplicity(b.block.symmetryClass, b.block.cut) !== g.length - 1) suspects.add(i);
    for (let j = 0; j < i; j++)
      if (squares[j]!.length > 1 && gcdModular(g, squares[j]!, p).length > 1) {
        suspects.add(i);
        suspects.add(j);
      }
  });
  return [...suspects].sort((a, b) => a - b);
}
