/** What a branch of equilibria is, and what the searches for it share. */
import type { Algebraic, RealField } from '../field/index.ts';
import type { LinearAction } from '../invariant/linear-action.ts';
import { at, type Matrix } from '../linear/index.ts';
import { type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import type { IsotropyClass, IsotropyLattice } from './isotropy.ts';
import type { NumericPolynomial } from './numeric-polynomial.ts';

export interface BranchInput {
  /** Γ on the kernel. */
  readonly action: LinearAction;
  /** Its variables are the coordinates on the kernel; numbers in the field of the action. */
  readonly ring: PolynomialRing<Algebraic>;
  /** Taylor polynomial of the reduced potential at the event, without constant, linear and quadratic terms. */
  readonly h: Polynomial<Algebraic>;
  /** Degree up to which h is known. */
  readonly degree: number;
  /** Derivative of the reduced potential by the parameter at the event. */
  readonly unfolding: Polynomial<Algebraic>;
  readonly lattice?: IsotropyLattice;
}

/** Numbers of positive and negative eigenvalues of the Hessian of h along a branch, on one side of the parameter. */
export interface BranchSide {
  readonly side: 1 | -1;
  readonly positive: number;
  readonly negative: number;
  /** Not decided by the terms known. */
  readonly undecided: number;
}

export interface Branch {
  /** Number of the isotropy class in the lattice. */
  readonly isotropyClass: number;
  readonly isotropyOrder: number;
  readonly axial: boolean;
  /** Equilibria on each side where the branch exists: the orbit of one of them. */
  readonly copies: number;
  /** Unit vector in the coordinates of the kernel, for mu > 0 if the branch exists there. */
  readonly direction: Float64Array;
  /** The same line exactly, not normalised, where the fixed space is a line. */
  readonly exactDirection: readonly string[] | null;
  readonly side: 'both' | 'positive' | 'negative';
  /** mu = coefficient * s^power + …, u = s * direction + …; for 'both' s and the coefficient are positive for mu > 0. */
  readonly coefficient: number;
  readonly power: number;
  /** The amplitude grows like |mu|^exponent: "1", "1/2", … */
  readonly exponent: string;
  readonly sides: readonly BranchSide[];
}

export interface BranchDiagram {
  readonly lattice: IsotropyLattice;
  readonly branches: readonly Branch[];
  /** What the terms known do not decide, in words. */
  readonly undecided: readonly string[];
  /** All directions were found by exact root isolation. */
  readonly complete: boolean;
  /** Sum of (-1)^index over the equilibria near 0 on either side; null where something is undecided. */
  readonly topologicalDegree: { readonly below: number; readonly above: number } | null;
}

/** The data of a diagram prepared for all isotropy types. */
export interface Forms {
  readonly input: BranchInput;
  readonly field: RealField;
  readonly matrices: readonly Float64Array[];
  readonly h: NumericPolynomial;
  readonly unfolding: NumericPolynomial;
}

/** What one isotropy type gives. */
export interface Found {
  readonly branches: Branch[];
  readonly undecided: string[];
  readonly complete: boolean;
}
export const nothing = (reason: string): Found => ({ branches: [], undecided: [reason], complete: true });
export const typeName = (c: IsotropyClass) => `isotropy of order ${c.order}, fixed space of dimension ${c.fixedDimension}`;

/** h and ℓ on the fixed space. */
export function restricted(
  { input, field }: Forms,
  basis: Matrix<Algebraic>,
): { ring: PolynomialRing<Algebraic>; h: Polynomial<Algebraic>; l: Polynomial<Algebraic> } {
  const ring = new PolynomialRing<Algebraic>(
    field,
    Array.from({ length: basis.cols }, (_, i) => `v${i + 1}`),
  );
  const images = Array.from({ length: basis.rows }, (_, i) =>
    ring.linearForm(Array.from({ length: basis.cols }, (_, j) => at(basis, i, j))),
  );
  return { ring, h: input.ring.substitute(input.h, images, ring), l: input.ring.substitute(input.unfolding, images, ring) };
}

export const exponentText = (power: number) => (power === 1 ? '1' : `1/${power}`);
