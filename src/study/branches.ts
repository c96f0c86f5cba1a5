/**
 * `branches`: isotropy subgroups of Γ on the kernel, branches of equilibria at leading order, each looked for by Newton's
 * iteration on the full equations on its side of the parameter, with its stability there.
 */
import { UsageError } from '../errors/index.ts';
import { poisson } from '../event/generalised-kernel.ts';
import type { Algebraic } from '../field/index.ts';
import { column, dense, type Matrix, type NumberMatrix, numberMatrix, numberMultiply, toNumberMatrix } from '../linear/index.ts';
import { type Expression, gradientNumeric, hessianNumeric, substituteSymbols } from '../model/expression/index.ts';
import { type Branch, branchDiagram } from '../normalform/branches.ts';
import { type Confirmation, confirmBranch, type FullEquations } from '../normalform/confirm-branch.ts';
import type { IsotropyLattice } from '../normalform/isotropy.ts';
import { factorsOf, type Polynomial } from '../polynomial/index.ts';
import type { LinearStudy } from './linear-study.ts';
import { type Reduction, reductionOf } from './reduction.ts';
import { type FixedMomenta, type MomentaSummary, momentaSummary } from './reduction-neutral.ts';
import { augmentedEquations, sliceStability } from './reduction-neutral-branches.ts';
import type { StudyResult } from './result.ts';
import { groupSummary, head, linearText } from './summary.ts';

export interface IsotropySummary {
  readonly order: number;
  readonly conjugates: number;
  readonly fixedDimension: number;
  readonly axial: boolean;
  /** Indices of the classes next above in the lattice. */
  readonly coveredBy: readonly number[];
}

export type Stability = 'stable' | 'spectral' | 'unstable' | 'unknown';

export interface BranchSummary {
  readonly isotropyOrder: number;
  readonly axial: boolean;
  readonly copies: number;
  /** In the coordinates of the kernel: exact on a line, else rounded numbers of a unit vector. */
  readonly direction: readonly (string | number)[];
  /** Side of the parameter on which it exists. */
  readonly side: 'positive' | 'negative' | 'both';
  /** Negative squares of the reduced potential along the branch; null where the terms known do not decide. */
  readonly morseIndex: number | null;
  /** Found by Newton's iteration on the full equations. */
  readonly confirmed: boolean;
  /** The amplitude grows like |μ − μ₀| to this power. */
  readonly exponent: string;
  /** On the whole phase space at the point found: by the energy criterion, spectrally, or unstable. */
  readonly stability: Stability;
  /** Value of μ − μ₀ at which it was found, and the equilibrium. */
  readonly found?: { readonly step: number; readonly point: Readonly<Record<string, number>> };
}

/** With `momenta` where a continuous symmetry moves the equilibrium: the branches are of relative equilibria at fixed momenta. */
export interface BranchesResult extends StudyResult, Partial<MomentaSummary> {
  readonly parameter: string;
  readonly coordinates: readonly { readonly name: string; readonly vector: string }[];
  readonly isotropy: readonly IsotropySummary[];
  readonly branches: readonly BranchSummary[];
  /** What the terms known do not decide. */
  readonly undecided: readonly string[];
  /** Sum of (−1)^index over the equilibria near the event on either side of the parameter; equal where nothing is missing. */
  readonly topologicalDegree: { readonly below: number; readonly above: number } | null;
  readonly diagram: {
    readonly kind: 'bifurcation';
    readonly parameter: string;
    readonly amplitude: string;
    readonly branches: readonly {
      readonly name: string;
      readonly points: readonly { readonly at: number; readonly amplitude: number; readonly stability: Stability }[];
    }[];
  };
}

/** Throws UsageError where nothing is at zero or no parameter varies, LimitError where the reduction is out of reach. */
export async function branchesResult(study: LinearStudy, degree?: number): Promise<BranchesResult> {
  const { prepared } = study;
  const vary = prepared.declaration.vary;
  if (vary.length === 0)
    throw new UsageError('no parameter varies, so there are no branches to follow', {
      file: prepared.declaration.source,
      key: 'vary',
      expected: 'a parameter',
      next: 'add vary: [NAME] or --vary NAME',
    });
  const reduction = reductionOf(study, degree);
  const choice = chosenParameter(reduction);
  const parameter = vary[choice]!;
  const diagram = branchDiagram({
    action: reduction.action,
    ring: reduction.ring,
    h: withoutLow(reduction),
    degree: reduction.degree,
    unfolding: unfoldingBy(reduction, choice),
  });
  const { fixed } = reduction;
  const plain = fullEquations(study, reduction, parameter);
  const equations = { ...(fixed === undefined ? plain : augmentedEquations(plain, fixed)), drift: driftBy(reduction, choice) };
  const spectrum = await spectrumOf(study, fixed);
  const branches: BranchSummary[] = [];
  const curves: { name: string; points: { at: number; amplitude: number; stability: Stability }[] }[] = [];
  for (const branch of diagram.branches) {
    const found: Judged[] = [];
    for (const c of confirmBranch(equations, branch))
      found.push({
        ...c,
        stability: c.confirmed ? await spectrum(equations.hessian(c.point!, equations.mu + c.step), c.index!) : 'unknown',
      });
    branches.push(...summaries(branch, found, prepared.quantities.names));
    curves.push({ name: `${curves.length + 1}`, points: curve(branch, found) });
  }
  return {
    ...head('branches', prepared, groupSummary(study.action, prepared)),
    parameter,
    coordinates: reduction.ring.variables.map((name, j) => ({
      name,
      vector: linearText(column(reduction.space.basis, j), prepared.quantities.names, reduction.field),
    })),
    isotropy: isotropySummaries(diagram.lattice),
    branches,
    undecided: diagram.undecided,
    topologicalDegree: diagram.topologicalDegree,
    diagram: { kind: 'bifurcation', parameter, amplitude: 'amplitude', branches: curves },
    ...(fixed === undefined ? {} : momentaSummary(study, fixed)),
  };
}

/** The first varied parameter that acts on the kernel at first order. */
function chosenParameter(reduction: Reduction<Algebraic>): number {
  for (let j = 0; j < reduction.parameters.length; j++) if (unfoldingBy(reduction, j).monomials.length > 0) return j;
  return 0;
}

/** ∂h/∂μ_j at the event, as a polynomial in the kernel coordinates. */
function unfoldingBy(reduction: Reduction<Algebraic>, j: number): Polynomial<Algebraic> {
  const k = reduction.ring.variables.length;
  return reduction.ring.fromTerms(
    reduction.reduced.h.monomials.flatMap((m, i) => {
      const factors = factorsOf(m);
      const parameters = factors.filter(([v]) => v >= k);
      if (parameters.length !== 1 || parameters[0]![0] !== k + j || parameters[0]![1] !== 1) return [];
      const exponents = new Array<number>(k).fill(0);
      for (const [v, e] of factors) if (v < k) exponents[v] = e;
      return [[exponents, reduction.reduced.h.coefficients[i]!] as [number[], Algebraic]];
    }),
  );
}

/** How the slaved coordinates move with μ_j where the kernel coordinates stay 0, in the coordinates of the full equations. */
function driftBy({ fixed, field, reduced, space }: Reduction<Algebraic>, j: number): Float64Array {
  const complement = toNumberMatrix(fixed?.complement ?? space.complement, field);
  const own = String.fromCharCode(reduced.dimension + j);
  const rates = reduced.slaved.map((v) => {
    const i = v.monomials.indexOf(own);
    return i < 0 ? 0 : field.toNumber(v.coefficients[i]!);
  });
  return Float64Array.from({ length: complement.rows }, (_, i) =>
    rates.reduce((s, x, c) => s + x * complement.data[i * complement.cols + c]!, 0),
  );
}

function withoutLow({ ring, germ }: Reduction<Algebraic>): Polynomial<Algebraic> {
  return ring.sub(germ, ring.truncate(germ, 2));
}

function isotropySummaries(lattice: IsotropyLattice): IsotropySummary[] {
  return lattice.classes.map((c, i) => ({
    order: c.order,
    conjugates: c.conjugates,
    fixedDimension: c.fixedDimension,
    axial: c.axial,
    coveredBy: lattice.edges.filter(([, smaller]) => smaller === i).map(([larger]) => larger),
  }));
}

/** ∇H and D²H in doubles as functions of the point and of one parameter, the others at their values. */
function fullEquations(study: LinearStudy, reduction: Reduction<Algebraic>, parameter: string): FullEquations {
  const { quantities, hamiltonian } = study.prepared;
  const { names } = quantities;
  const n = names.length;
  const fixed = new Map<string, Expression>([...quantities.valueExpressions].filter(([k]) => k !== parameter));
  // values may refer to each other: replace until only the parameter is left
  let h = hamiltonian;
  for (let i = 0; i <= fixed.size; i++) h = substituteSymbols(h, fixed);
  const all = [...names, parameter];
  const gradient = gradientNumeric(h, all);
  const hessian = hessianNumeric(h, all);
  const at = (x: Float64Array, mu: number) => [...x, mu];
  return {
    dimension: n,
    gradient: (x, mu) => gradient(at(x, mu)).slice(0, n),
    hessian: (x, mu) => {
      const full = hessian(at(x, mu));
      const out = new Float64Array(n * n);
      for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) out[i * n + j] = full[i * (n + 1) + j]!;
      return numberMatrix(n, n, out);
    },
    point: Float64Array.from(quantities.point, (x) => quantities.field.toNumber(x)),
    mu: quantities.field.toNumber(quantities.values.get(parameter)!),
    kernel: toNumberMatrix(reduction.space.basis as Matrix<Algebraic>, reduction.field),
  };
}

type Spectrum = (hessian: NumberMatrix, index: number) => Promise<Stability>;
/** A confirmation with the stability at the point found. */
type Judged = Confirmation & { readonly stability: Stability };

/** Stability of an equilibrium with this Hessian, of a relative one modulo the symmetry at fixed momenta: the energy criterion first, then the spectrum of L. */
async function spectrumOf(study: LinearStudy, fixed: FixedMomenta | undefined): Promise<Spectrum> {
  const { prepared } = study;
  const j = toNumberMatrix(poisson(dense(prepared.form)), prepared.field);
  const onSlice = fixed === undefined ? undefined : await sliceStability(study, fixed);
  return async (hessian, whole) => {
    const slice = onSlice?.(hessian);
    const index = slice?.index ?? whole;
    if (index === 0 || index === (slice?.dimension ?? hessian.rows)) return 'stable';
    // det S < 0 makes det L < 0: a real pair at least
    if (index % 2 === 1) return 'unstable';
    const { hamiltonianEigenvalues } = await import('../linear/spectral.ts');
    const l = slice?.flow() ?? numberMultiply(j, hessian);
    const { values } = hamiltonianEigenvalues(l);
    const size = values.reduce((s, z) => Math.max(s, Math.hypot(z.re, z.im)), 0);
    return values.some((z) => Math.abs(z.re) > 1e-7 * size) ? 'unstable' : 'spectral';
  };
}

const rounded = (x: number): number => Math.round(x * 1e9) / 1e9 || 0;

function summaries(branch: Branch, found: readonly Judged[], names: readonly string[]): BranchSummary[] {
  const direction = branch.exactDirection ?? Array.from(branch.direction, rounded);
  const one = (side: BranchSummary['side'], morseIndex: number | null, c: Judged | undefined): BranchSummary => ({
    isotropyOrder: branch.isotropyOrder,
    axial: branch.axial,
    copies: branch.copies,
    direction,
    side,
    morseIndex,
    confirmed: c?.confirmed ?? false,
    exponent: branch.exponent,
    stability: c?.stability ?? 'unknown',
    ...(c?.confirmed ? { found: { step: c.step, point: Object.fromEntries(names.map((n, i) => [n, rounded(c.point![i]!)])) } } : {}),
  });
  const index = (s: Branch['sides'][number]) => (s.undecided > 0 ? null : s.negative);
  const parts = branch.sides.map((s) => ({ ...s, index: index(s), c: found.find((c) => c.side === s.side) }));
  const summary = parts.map((p) => one(p.side === 1 ? 'positive' : 'negative', p.index, p.c));
  // one entry for both sides where they have the same index and the same stability
  if (summary.length === 2 && summary[0]!.morseIndex === summary[1]!.morseIndex && summary[0]!.stability === summary[1]!.stability)
    return [{ ...summary[0]!, side: 'both', confirmed: summary[0]!.confirmed && summary[1]!.confirmed }];
  return summary;
}

/** A few points of the predicted curve, the amplitude against μ − μ₀, with the stability found at the confirmed point. */
function curve(branch: Branch, found: readonly Judged[]): { at: number; amplitude: number; stability: Stability }[] {
  const out: { at: number; amplitude: number; stability: Stability }[] = [];
  for (const { side } of branch.sides) {
    const stability = found.find((x) => x.side === side)?.stability ?? 'unknown';
    for (let i = 0; i <= 24; i++) {
      const at = (side * i) / 24;
      out.push({ at: rounded(at), amplitude: rounded((Math.abs(at) / Math.abs(branch.coefficient)) ** (1 / branch.power)), stability });
    }
  }
  return out.sort((a, b) => a.at - b.at);
}
