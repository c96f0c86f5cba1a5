/**
 * What a report can say, gathered from one result or from the results of several stages: each key is taken
 * from the first result that has it, so the stages may come in any selection.
 */
import type { ResultObject } from '../study/outcome.ts';
import type {
  ClassSummary,
  CodimResult,
  CollisionSummary,
  ComponentSummary,
  EventSummary,
  InertiaSummary,
  InvariantsResult,
  Motion,
  SpectrumEntry,
  StudyResult,
  Value,
  VerdictSummary,
  ZeroSummary,
} from '../study/result.ts';
import type { BifurcationFigure } from './svg/bifurcation.ts';
import type { ChartFigure } from './svg/chart.ts';
import type { EigenvalueFigure } from './svg/eigenvalues.ts';
import type { IsotropyFigure } from './svg/lattice.ts';

/** The reduced Hamiltonian on the kernel. */
export interface ReducedView {
  readonly leadingDegree: number;
  readonly expression: string;
  readonly codimension: number | null;
  readonly moduli: number | null;
  readonly stratumCodimension: number | null;
  readonly unfolding: readonly string[];
  readonly determinedAt: number | string | null;
  readonly invariants?: readonly { readonly name: string; readonly polynomial: string }[];
  /** Expressions that must not vanish. */
  readonly conditions?: readonly string[];
  /** Kinetic part of a pair that splits. */
  readonly kinetic?: string;
  readonly because?: string;
}

export interface IsotropyView {
  readonly order: number;
  readonly conjugates: number;
  readonly fixedDimension: number;
  readonly axial: boolean;
  readonly generators?: readonly string[];
  /** Indices of the classes that contain a conjugate of this one, next above. */
  readonly coveredBy?: readonly number[];
}

export interface BranchView {
  readonly isotropyOrder: number;
  readonly copies: number;
  readonly direction: string | readonly Value[];
  readonly side: string | number;
  readonly morseIndex: number | null;
  readonly confirmed: boolean | null;
  readonly exponent?: string;
  readonly stability?: string;
}

export interface CrossingView {
  readonly parameter: string;
  readonly value: number;
  readonly exact: string | null;
  readonly component: string | readonly string[];
  readonly kernel: number;
  readonly motion: Motion;
  readonly codimension: number;
  readonly inertiaBefore: InertiaSummary | readonly number[];
  readonly inertiaAfter: InertiaSummary | readonly number[];
  readonly kind?: string;
}

export interface BirkhoffView {
  readonly degree: number;
  readonly frequencies: readonly { readonly name: string; readonly value: Value; readonly component?: string; readonly sign?: number }[];
  readonly resonances: readonly { readonly relation: readonly number[]; readonly order: number; readonly generator?: string }[];
  readonly expression: string;
  readonly twist: Value | null;
  readonly stability?: string;
}

/** Everything any stage may have said. */
export interface ReportView {
  readonly commands: readonly string[];
  readonly model?: StudyResult['model'];
  readonly arithmetic?: StudyResult['arithmetic'];
  readonly floatingBecause?: string;
  readonly field?: string;
  readonly group?: StudyResult['group'];
  readonly equilibrium?: StudyResult['equilibrium'];
  readonly symmetry?: StudyResult['symmetry'];
  readonly caution?: string;
  readonly components?: readonly ComponentSummary[];
  readonly classes?: readonly ClassSummary[];
  readonly inertia?: InertiaSummary;
  readonly neutral?: CodimResult['neutral'];
  readonly zero?: ZeroSummary | null;
  readonly collisions?: readonly CollisionSummary[];
  readonly spectrum?: readonly SpectrumEntry[];
  readonly stability?: string;
  readonly verdict?: VerdictSummary;
  readonly events?: readonly EventSummary[];
  readonly molien?: InvariantsResult['molien'];
  readonly equivariants?: NonNullable<InvariantsResult['equivariants']>;
  readonly generators?: InvariantsResult['generators'];
  readonly complete?: boolean;
  readonly proof?: string;
  readonly relations?: readonly string[];
  readonly hamiltonian?: InvariantsResult['hamiltonian'];
  readonly reduced?: ReducedView | null;
  readonly birkhoff?: BirkhoffView | null;
  readonly isotropy?: readonly IsotropyView[];
  readonly branches?: readonly BranchView[];
  readonly crossings?: readonly CrossingView[];
  /** Pictures that a stage has prepared data for. */
  readonly paths?: EigenvalueFigure;
  readonly diagram?: BifurcationFigure;
  readonly lattice?: IsotropyFigure;
  readonly chart?: ChartFigure;
}

/** Gathers the results of the stages of one study. */
export function viewOf(results: ResultObject | readonly ResultObject[]): ReportView {
  const list = Array.isArray(results) ? (results as readonly ResultObject[]) : [results as ResultObject];
  const merged: Record<string, unknown> = {};
  for (const result of list)
    for (const [key, value] of Object.entries(result)) if (value !== undefined && !Object.hasOwn(merged, key)) merged[key] = value;
  return { ...(merged as Omit<ReportView, 'commands'>), commands: list.map((result) => result.command) };
}
