/**
 * The results of the commands as plain data: what `--json` prints and what documents are made of.
 * Exact values are texts in the language of model files, floating ones are numbers.
 */

/** An exact value as text, or a floating one. */
export type Value = string | number;

export interface ModelSummary {
  readonly title: string;
  readonly degreesOfFreedom: number;
  readonly coordinates: readonly string[];
  readonly momenta: readonly string[];
  /** Values by name; null where a parameter is kept as a symbol. */
  readonly parameters: Readonly<Record<string, Value | null>>;
  readonly vary: readonly string[];
  /** H as typed (or how it was given). */
  readonly hamiltonian?: string;
  /** Where the declared value lies between numbered files: that the matrix is interpolated there. */
  readonly interpolated?: readonly string[];
}

export interface GeneratorSummary {
  readonly name: string;
  readonly reversing: boolean;
  /** ρᵀWρ = σW. */
  readonly symplectic: boolean;
  readonly invariant: boolean;
  /** What fails and by how much, where something fails. */
  readonly reason?: string;
}

export interface ComponentSummary {
  readonly label: string;
  readonly dimension: number;
  readonly type: 'real' | 'complex' | 'quaternionic';
  readonly multiplicity: number;
  /** s(K) > 0. */
  readonly carriesForm: boolean;
  /** Labels of K and of K⊗σ differ when L maps this component to another one. */
  readonly flowsTo: string;
  readonly inertia?: InertiaSummary;
  /** Symmetry-adapted basis: columns as linear forms in the coordinates, and the blocks of S on it. */
  readonly basis?: readonly string[];
  readonly block?: readonly (readonly Value[])[];
  /** How many spaces like that of the basis make up the component; S looks the same on each. */
  readonly copies?: number;
  /** Bases of the other spaces; S on them is `factor` times the block. */
  readonly partners?: readonly { readonly basis: readonly string[]; readonly factor: Value }[];
  /** Determinant of the block in factors. */
  readonly determinant?: string;
  /** Where it vanishes, in the first parameter that varies. */
  readonly thresholds?: readonly ThresholdSummary[];
}

/** A zero of the determinant of a component. */
export interface ThresholdSummary {
  readonly parameter: string;
  /** In the language of models, or null where there is no closed form. */
  readonly exact: string | null;
  /** Null where it depends on parameters that have no value. */
  readonly value: number | null;
  /** What vanishes there, and the value to 30 digits, where there is no closed form. */
  readonly polynomial?: string;
  readonly digits?: string;
  /** Whether the determinant changes its sign (that of S on one of the alike spaces of the block); it touches zero otherwise. */
  readonly signChange: boolean;
}

/** One block of the flow: what `classes` of the contract lists, with the block of L. */
export interface ClassSummary {
  readonly number: number;
  /** E.g. `sp(4,R)`, `u(1,1)`. */
  readonly algebra: string;
  /** The subalgebra of maps that commute with Γ, where reversing elements make it smaller. */
  readonly subalgebra: string;
  readonly components: readonly string[];
  readonly dimensionOfClass: number;
  readonly dimensionOfGroup: number;
  readonly signature?: readonly [number, number];
  readonly basis?: readonly string[];
  readonly form?: readonly (readonly Value[])[];
  readonly stiffness?: readonly (readonly Value[])[];
  readonly flow?: readonly (readonly Value[])[];
  readonly copies?: number;
}

export interface InertiaSummary {
  readonly positive: number;
  readonly zero: number;
  readonly negative: number;
}

export type Motion = 'passes' | 'splits' | 'degenerate';

export interface SubgroupSummary {
  readonly order: number;
  readonly reversing: number;
  readonly conjugates: number;
  readonly codimension: number;
  readonly motion: Motion;
  readonly generators?: readonly string[];
  /** Places in the list of the classes next above: those that contain a conjugate of this one, none between. */
  readonly coveredBy?: readonly number[];
}

export interface SignedBlockSummary {
  readonly component: string;
  readonly size: number;
  readonly count: number;
  readonly positive: number;
  readonly negative: number;
}

export interface ZeroSummary {
  readonly dimension: number;
  readonly kernel: number;
  readonly blocks: readonly number[];
  readonly semisimple: boolean;
  readonly codimension: number | null;
  readonly codimensionWithoutSymmetry: number | null;
  readonly motion: Motion;
  readonly subgroups: readonly SubgroupSummary[];
  readonly components: readonly string[];
  readonly signs: readonly SignedBlockSummary[];
  /** Both routes, block by block of the flow. */
  readonly routes: readonly {
    readonly components: readonly string[];
    readonly class: number;
    readonly partition: readonly number[];
    readonly formula: number;
    readonly rank: number;
  }[];
  /** Normal space as quadratic Hamiltonians in the user's coordinates. */
  readonly unfolding?: readonly string[];
  readonly unfoldingWithoutSymmetry?: readonly string[];
}

export interface CollisionSummary {
  readonly kind: 'imaginary' | 'real' | 'quadruple';
  readonly value: number | readonly [number, number];
  readonly exact: string | null;
  readonly multiplicity: number;
  readonly blocks: readonly number[];
  readonly signature?: readonly [number, number];
  readonly codimension: number;
  readonly codimensionWithoutSymmetry: number;
  readonly motion: Motion;
  readonly components: readonly string[];
}

export interface VerdictSummary {
  readonly answer: 'generic' | 'not generic' | 'no event' | 'undecided';
  readonly parameters: number;
  readonly versal: boolean | null;
  readonly because: string;
  /** What is missing for versality, or on which branch it holds. */
  readonly versality?: string;
}

/** Spectrum of L by component: frequencies and rates at the stated parameter values. */
export interface SpectrumEntry {
  readonly components: readonly string[];
  readonly re: number;
  readonly im: number;
  readonly multiplicity: number;
  /** Krein signature of an imaginary pair: numbers of pairs with positive and negative energy. */
  readonly krein?: readonly [number, number];
}

/** What every result of a study begins with. */
export interface StudyResult {
  readonly schema: 'symcodim/1';
  readonly command: string;
  readonly model: ModelSummary;
  readonly arithmetic: 'exact' | 'floating';
  /** The term that made the answer floating. */
  readonly floatingBecause?: string;
  /** What floating decisions were made at. */
  readonly tolerance?: number;
  readonly field?: string;
  readonly group: { readonly order: number; readonly reversing: number; readonly generators?: readonly string[]; readonly name?: string };
  readonly equilibrium: {
    readonly holds: boolean;
    readonly gradient: Value;
    readonly point?: Readonly<Record<string, Value>>;
    /** Newton's method on a floating model: how far the declared point was moved. */
    readonly polished?: { readonly step: number; readonly iterations: number; readonly gradientBefore: number };
  };
  readonly symmetry: { readonly holds: boolean; readonly generators: readonly GeneratorSummary[] };
  readonly caution?: string;
  /** What `verify` needs; see certificate.ts. */
  readonly certificate?: object;
}

export interface CodimResult extends StudyResult {
  readonly components: readonly ComponentSummary[];
  readonly inertia: InertiaSummary;
  readonly neutral: { readonly dimension: number; readonly directions?: readonly string[] };
  readonly zero: ZeroSummary | null;
  readonly collisions: readonly CollisionSummary[];
  readonly spectrum?: readonly SpectrumEntry[];
  /** Energy criterion and spectral stability in words. */
  readonly stability?: string;
  readonly verdict: VerdictSummary;
}

export interface ComponentsResult extends StudyResult {
  readonly components: readonly ComponentSummary[];
  readonly classes: readonly ClassSummary[];
  /** Parameters that stay symbols in the blocks. */
  readonly symbols?: readonly string[];
}

export interface EventSummary {
  readonly codimension: number;
  readonly components: readonly string[];
  readonly kernel: number;
  readonly dimension: number;
  readonly blocks: readonly number[];
  readonly signs: string;
  readonly motion: Motion;
}

export interface InvariantsResult extends StudyResult {
  readonly molien: { readonly numerator: readonly number[]; readonly denominator: readonly number[]; readonly series: readonly number[] };
  readonly equivariants?: {
    readonly numerator: readonly number[];
    readonly denominator: readonly number[];
    readonly series: readonly number[];
    readonly generators?: readonly { readonly degree: number; readonly field: readonly string[] }[];
  };
  readonly generators: readonly {
    readonly name: string;
    readonly degree: number;
    readonly polynomial: string;
    readonly latex?: string;
    readonly readable?: string;
  }[];
  readonly complete: boolean;
  readonly proof: string;
  readonly relations: readonly string[];
  readonly hamiltonian: {
    readonly expression: string;
    readonly latex?: string;
    readonly remainder: string;
    readonly breaking?: string;
    readonly degree?: number;
  } | null;
}
