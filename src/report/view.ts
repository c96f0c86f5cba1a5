/**
 * What a report can say, gathered from one result or from the results of several stages: each key is taken
 * from the first result that has it, so the stages may come in any selection.
 */
import type { BrokenSummary } from '../study/broken.ts';
import type { FoundSymmetry } from '../study/find.ts';
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
  readonly leadingDegree: number | null;
  readonly expression: string;
  readonly codimension: number | null;
  readonly moduli: number | null;
  readonly stratumCodimension: number | null;
  readonly unfolding: readonly string[];
  readonly determinedAt: number | string | null;
  /** Degree to which it was computed. */
  readonly degree?: number;
  readonly coordinates?: readonly { readonly name: string; readonly vector: string }[];
  readonly invariants?: readonly { readonly name: string; readonly polynomial: string }[];
  /** Expressions that must not vanish. */
  readonly conditions?: readonly string[];
  readonly moduliTerms?: readonly string[];
  /** In the coordinates of the kernel, at the event. */
  readonly polynomial?: string;
  /** Kinetic part of a pair that splits, or brackets of the kernel coordinates where it passes. */
  readonly kinetic?: string;
  readonly brackets?: readonly string[];
  readonly generic?: boolean | null;
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
  readonly axial?: boolean;
  readonly copies: number;
  readonly direction: string | readonly Value[];
  readonly side: string | number;
  readonly morseIndex: number | null;
  readonly confirmed: boolean | null;
  /** Amplitude as a power of the parameter. */
  readonly exponent?: string;
  readonly stability?: string;
}

export interface CrossingView {
  readonly parameter: string;
  readonly value: number;
  readonly exact: string | null;
  /** Defining polynomial of a value without closed form, and the value to 30 digits. */
  readonly polynomial?: string;
  readonly digits?: string;
  readonly component: string | readonly string[];
  readonly kernel: number;
  readonly motion: Motion;
  readonly codimension: number | null;
  readonly versal?: boolean | null;
  readonly observed?: { readonly motion: string };
  readonly agrees?: boolean | null;
  readonly inertiaBefore: InertiaSummary | readonly number[];
  readonly inertiaAfter: InertiaSummary | readonly number[];
  readonly fold?: boolean;
  /** The numbered files around the event, or the one it happens at. */
  readonly between?: readonly [string, string];
  readonly file?: string;
}

/** What was found at each of the numbered files of a sweep. */
export interface FilesView {
  readonly parameter: string;
  readonly note: string;
  readonly points: readonly {
    readonly value: string;
    readonly files: readonly string[];
    readonly inertia: InertiaSummary;
    readonly eigenvalues: readonly {
      readonly component: string;
      readonly values: readonly { readonly re: number; readonly im: number }[];
    }[];
  }[];
}

/** Two eigenvalues off zero that meet along the parameter. */
export interface MeetingView {
  readonly parameter: string;
  readonly at: number;
  readonly kind: string;
  readonly value: number;
  readonly components: readonly string[];
  readonly motion: Motion;
  readonly codimension: number;
  readonly signs?: readonly [number, number];
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
  /** Degree of the Taylor terms to which invariance was compared; 'all' where H was compared as a whole. */
  readonly invarianceDegree?: number | 'all';
  readonly found?: FoundSymmetry;
  readonly broken?: BrokenSummary;
  readonly caution?: string;
  readonly components?: readonly ComponentSummary[];
  readonly classes?: readonly ClassSummary[];
  readonly inertia?: InertiaSummary;
  readonly neutral?: CodimResult['neutral'];
  /** What a reduction beside neutral directions keeps fixed. */
  readonly momenta?: { readonly fixed: readonly string[]; readonly because: string };
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
  /** The kernel coordinates and the parameter that branches speak of, and what is open about them. */
  readonly parameter?: string;
  readonly coordinates?: readonly { readonly name: string; readonly vector: string }[];
  readonly undecided?: readonly string[];
  readonly topologicalDegree?: { readonly below: number; readonly above: number } | null;
  readonly crossings?: readonly CrossingView[];
  readonly meetings?: readonly MeetingView[];
  readonly range?: { readonly parameter: string; readonly from: Value; readonly to: Value; readonly steps?: number };
  readonly files?: FilesView;
  readonly followed?: boolean;
  readonly singular?: readonly string[];
  readonly ends?: readonly string[];
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
    for (const [name, value] of Object.entries(result)) {
      // a sweep lists collisions along the parameter, every other command those at the point
      const key = name === 'collisions' && result.command === 'sweep' ? 'meetings' : name;
      if (value !== undefined && !Object.hasOwn(merged, key)) merged[key] = value;
      else if (key === 'components') merged[key] = withDeterminants(merged[key] as ComponentSummary[], value as ComponentSummary[]);
    }
  return { ...(merged as Omit<ReportView, 'commands'>), commands: list.map((result) => result.command) };
}

/** Determinants from the stage that has them. */
function withDeterminants(list: readonly ComponentSummary[], from: readonly ComponentSummary[] | undefined): readonly ComponentSummary[] {
  return list.map((component) => {
    const { determinant, thresholds } = from?.find((other) => other.label === component.label) ?? {};
    if (component.determinant !== undefined || determinant === undefined) return component;
    return { ...component, determinant, ...(thresholds === undefined ? {} : { thresholds }) };
  });
}
