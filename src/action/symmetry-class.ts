/**
 * The symmetry class of a flow block by ν, η and χᵗ: ν the Frobenius–Schur indicator of a complex irreducible
 * χ of Γ₀, η = |Γ₀|⁻¹ Σ χ(g²) over the elements that reverse time, χᵗ(g) = χ(t⁻¹gt) for one of them.
 */
import type { FiniteGroup, SymmetryClass } from '../group/index.ts';
import type { RestrictedGroup } from './irreducibles.ts';

/** What is asked of an irreducible of Γ₀. */
export interface ClassedIrreducible {
  readonly beta: 1 | 2 | 4;
  readonly complexValues: readonly { readonly re: number; readonly im: number }[];
}

/** Class of t⁻¹ g t for a representative g of each class of the part; t an element of Γ that normalises it. */
export function conjugationOnClasses(group: FiniteGroup, part: RestrictedGroup, t: number): number[] {
  const back = group.inverse(t);
  return part.group.classes.map(
    (c) => part.group.classOf[part.position(group.multiply(back, group.multiply(part.inclusion[c.representative]!, t)))]!,
  );
}

/**
 * Class 1 to 10 of χ, given the elements that reverse time and map the component of χ to itself (none: the basic classes).
 * The squares g² are summed over all of them; the sum is an integer times |Γ₀|.
 */
export function symmetryClass(
  group: FiniteGroup,
  part: RestrictedGroup,
  k: ClassedIrreducible,
  reversing: readonly number[],
): SymmetryClass {
  if (reversing.length === 0) return k.beta === 1 ? 1 : k.beta === 2 ? 2 : 3;
  const chi = k.complexValues;
  let sum = 0;
  for (const e of reversing) sum += chi[part.group.classOf[part.position(group.multiply(e, e))]!]!.re;
  const eta = Math.round(sum / part.group.order);
  if (k.beta === 1) return eta === 1 ? 4 : 5;
  if (k.beta === 4) return eta === 1 ? 9 : 10;
  if (eta !== 0) return eta === 1 ? 7 : 8;
  return 6;
}
