/** `check`: is the point an equilibrium, is each generator (anti)symplectic, does it leave H invariant. */
import { groupOfMatrices } from '../action/index.ts';
import { NotAGroupError } from '../errors/index.ts';
import { type BrokenSummary, brokenSymmetry } from './broken.ts';
import type { FoundSymmetry } from './find.ts';
import type { Prepared } from './prepare.ts';
import type { StudyResult } from './result.ts';
import { head } from './summary.ts';

export interface CheckResult extends StudyResult {
  /** Degree in the coordinates to which invariance was compared; 'all' for a polynomial H. */
  readonly invarianceDegree: number | 'all';
  readonly failures: readonly string[];
  /** Where H is not invariant: the part that breaks the symmetry, and the subgroup that survives. */
  readonly broken?: BrokenSummary;
  /** With --find: the symmetry that is there. */
  readonly found?: FoundSymmetry;
}

/** The full result, also where something fails; then `group` counts the matrices alone, 0 where they make no finite group. */
export function checkResult(p: Prepared): CheckResult {
  const failures = p.generators.flatMap((g) => (g.reason === undefined ? [] : [g.reason]));
  if (!p.equilibriumHolds) {
    const i = p.local.gradient.findIndex((x) => !p.field.isZero(x));
    failures.push(`the point is not an equilibrium: ∂H/∂${p.quantities.names[i]} = ${p.field.format(p.local.gradient[i]!)}`);
  }
  const plain = head('check', p, groupOrder(p, failures));
  // generators of no finite group declare no symmetry, whatever each of them keeps
  const symmetry = { ...plain.symmetry, holds: plain.symmetry.holds && plain.group.order > 0 };
  const broken = plain.group.order > 0 ? brokenSymmetry(p) : undefined;
  return { ...plain, symmetry, invarianceDegree: p.invarianceDegree, failures, ...(broken === undefined ? {} : { broken }) };
}

function groupOrder(p: Prepared, failures: string[]): StudyResult['group'] {
  const names = p.generators.map((g) => g.name);
  try {
    const group = groupOfMatrices(
      p.field,
      p.form.rows,
      p.generators.map((g) => g.matrix),
      p.declaration.orderLimit ?? 100_000,
    );
    let reversing = 0;
    const signs = new Int8Array(group.order);
    signs[0] = 1;
    for (let i = 1; i < group.order; i++) {
      signs[i] = (p.generators[group.via[i]!]!.sign ?? 1) * signs[group.parent[i]!]!;
      if (signs[i] === -1) reversing++;
    }
    return { order: group.order, reversing, generators: names };
  } catch (error) {
    if (!(error instanceof NotAGroupError)) throw error;
    failures.push(error.message);
    return { order: 0, reversing: 0, generators: names };
  }
}
