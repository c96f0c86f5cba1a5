/**
 * Branches of equilibria of h(u) + mu ℓ(u) + … that leave u = 0 at mu = 0, by isotropy type and leading order
 * (M. Golubitsky, I. Stewart, D. Schaeffer, Singularities and Groups in Bifurcation Theory II, 1988, ch. XIII; M. Field,
 * R. Richardson, Symmetry breaking and the maximal isotropy subgroup conjecture, 1989; places from memory).
 *
 * In the fixed space of an isotropy subgroup u = s y, mu = λ s^m. On a line everything is exact. In a plane the directions are
 * isolated exactly, in higher dimensions found by search. Where the leading form is a function of the invariant quadratic form
 * the next form that is not fixes the direction.
 */
import type { RealField } from '../field/index.ts';
import { numberMatrix, symmetricEigenvalues } from '../linear/index.ts';
import { axialBranches } from './axial-branches.ts';
import type { Branch, BranchDiagram, BranchInput, Forms } from './branch.ts';
import { isotropyLattice } from './isotropy.ts';
import { NumericPolynomial } from './numeric-polynomial.ts';
import { submaximalBranches } from './submaximal-branches.ts';

export type { Branch, BranchDiagram, BranchInput, BranchSide } from './branch.ts';

/** All branches at leading order. */
export function branchDiagram(input: BranchInput): BranchDiagram {
  const { action, ring } = input;
  const field = action.field as RealField;
  const lattice = input.lattice ?? isotropyLattice(action);
  const matrices = Array.from({ length: action.group.order }, (_, g) => Float64Array.from(action.matrix(g).data, (x) => field.toNumber(x)));
  const forms: Forms = {
    input,
    field,
    matrices,
    h: NumericPolynomial.of(ring, input.h),
    unfolding: NumericPolynomial.of(ring, input.unfolding),
  };
  const branches: Branch[] = [];
  const undecided: string[] = [];
  let complete = true;
  lattice.classes.forEach((c, k) => {
    if (c.fixedDimension === 0) return;
    const found = c.fixedDimension === 1 ? axialBranches(forms, c, k) : submaximalBranches(forms, c, k);
    branches.push(...found.branches);
    undecided.push(...found.undecided);
    complete &&= found.complete;
  });
  branches.sort((a, b) => b.isotropyOrder - a.isotropyOrder || a.isotropyClass - b.isotropyClass || a.copies - b.copies);
  return { lattice, branches, undecided, complete, topologicalDegree: degrees(forms, branches, undecided) };
}

/** Sum of (-1)^index over the equilibria near 0, on both sides. */
function degrees({ input }: Forms, branches: readonly Branch[], undecided: readonly string[]): { below: number; above: number } | null {
  if (undecided.length > 0) return null;
  const n = input.action.dimension;
  const l = input.unfolding;
  const order = input.ring.order(l);
  let below = 0;
  let above = 0;
  if (order === 2) {
    const quadratic = input.ring.homogeneousPart(l, 2);
    const values = symmetricEigenvalues(numberMatrix(n, n, NumericPolynomial.of(input.ring, quadratic).hessian(new Float64Array(n))));
    if (values.some((x) => Math.abs(x) < 1e-9)) return null;
    const negative = values.filter((x) => x < 0).length;
    above += (-1) ** negative;
    below += (-1) ** (n - negative);
  } else if (order !== 1) return null;
  for (const b of branches)
    for (const s of b.sides) {
      const term = b.copies * (-1) ** s.negative;
      if (s.side === 1) above += term;
      else below += term;
    }
  return { below, above };
}
