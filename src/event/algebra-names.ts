/**
 * The ten symmetry classes by name: the Lie algebra of the symplectic maps that commute with the elements that keep time, the part of it
 * that commutes with all, and their dimensions. Classes as in I. Hoveijn, J. S. W. Lamb, R. M. Roberts, Normal forms and unfoldings of
 * linear systems in eigenspaces of (anti)-automorphisms of order two, J. Differential Equations 190 (2003).
 */
import type { ClassNumber } from './partition-codimension.ts';

export interface ClassAlgebra {
  /** E.g. `sp(4,R)`, `u(1,1)`, `so*(4)`. */
  readonly algebra: string;
  /** E.g. `gl(2,R)`; the same as `algebra` in classes 1, 2, 3. */
  readonly subalgebra: string;
  /** dim P, the symmetric quadratic Hamiltonians, and dim 𝔤₀. */
  readonly dimensionOfClass: number;
  readonly dimensionOfGroup: number;
}

/**
 * `copies`: of K in the phase space (in classes 4, 6, 10 of K and of K⊗σ each), 2k in class 1; `signature` (a, b), a + b = copies,
 * of ω in classes 2, 7, 8. Throws RangeError for numbers that do not occur.
 */
export function classAlgebra(c: ClassNumber, copies: number, signature: readonly [number, number] | null): ClassAlgebra {
  const n = copies;
  const named = (algebra: string, subalgebra: string, dimensionOfClass: number, dimensionOfGroup: number): ClassAlgebra => ({
    algebra,
    subalgebra,
    dimensionOfClass,
    dimensionOfGroup,
  });
  const [a, b] = signature ?? [0, 0];
  if ((c === 2 || c === 7 || c === 8) !== (signature !== null) || (signature !== null && a + b !== n) || (c === 1 && n % 2 === 1))
    throw new RangeError(`class ${c} with ${n} copies and signature ${signature?.join(', ') ?? 'none'}`);
  switch (c) {
    case 1:
      return named(`sp(${n},R)`, `sp(${n},R)`, (n * (n + 1)) / 2, (n * (n + 1)) / 2);
    case 2:
      return named(`u(${a},${b})`, `u(${a},${b})`, n * n, n * n);
    case 3:
      return named(`so*(${2 * n})`, `so*(${2 * n})`, n * (2 * n - 1), n * (2 * n - 1));
    case 4:
      return named(`sp(${2 * n},R)`, `gl(${n},R)`, n * (n + 1), n * n);
    case 5:
      return named(`sp(${2 * n},R)`, `sp(${n},C)`, n * n, n * (n + 1));
    case 6:
      return named(`u(${n},${n})`, `gl(${n},C)`, 2 * n * n, 2 * n * n);
    case 7:
      return named(`u(${a},${b})`, `o(${a},${b})`, (n * (n + 1)) / 2, (n * (n - 1)) / 2);
    case 8:
      return named(`u(${2 * a},${2 * b})`, `sp(${a},${b})`, n * (2 * n - 1), n * (2 * n + 1));
    case 9:
      return named(`so*(${2 * n})`, `so(${n},C)`, n * n, n * (n - 1));
    case 10:
      return named(`so*(${4 * n})`, `gl(${n},H)`, 2 * n * (2 * n - 1), 4 * n * n);
  }
}
