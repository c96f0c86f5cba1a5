/**
 * What a person declared, checked for its structure and for nothing else: names, texts of expressions,
 * matrices as texts. One immutable value, whether it came from a model file or from options.
 * The exact layer turns the texts into numbers and polynomials.
 */
import type { MatrixText } from '../matrix-file/matrix-text.ts';

/** One file of a family and the value of the parameter it belongs to, an integer or a fraction as text. */
export interface NumberedFile {
  readonly value: string;
  /** `source` is the path as typed. */
  readonly matrix: MatrixText;
}

/** A matrix at some values of a parameter, each from a file; between them it is interpolated, piece by piece linearly. */
export interface NumberedFiles {
  readonly parameter: string;
  /** Ascending in value, at least two, of one size. */
  readonly nodes: readonly NumberedFile[];
  readonly where: string;
}

/**
 * A matrix that is constant or affine in parameters: constant + Σ name · terms[name]; or given by numbered files, then
 * without constant and terms. All of one size.
 */
export interface MatrixFamily {
  readonly rows: number;
  readonly cols: number;
  readonly constant?: MatrixText;
  readonly terms: ReadonlyMap<string, MatrixText>;
  readonly files?: NumberedFiles;
  readonly where: string;
}

/** Points of a spring network with their positions (texts, 1, 2 or 3 of them, the same number for each). */
export interface NetworkDeclaration {
  readonly dimension: number;
  readonly points: ReadonlyMap<string, readonly string[]>;
  readonly masses: ReadonlyMap<string, string>;
  readonly bonds: readonly { readonly from: string; readonly to: string; readonly stiffness: string; readonly where: string }[];
}

/** Where the Hamiltonian comes from. */
export type EnergyDeclaration =
  | { readonly kind: 'hamiltonian'; readonly text: string }
  | { readonly kind: 'quadratic'; readonly text: string }
  /** S with H = ½ xᵀSx in the order coordinates, momenta; `matrix` is the first of `files` where there are some. */
  | { readonly kind: 'hessian'; readonly matrix: MatrixText; readonly files?: NumberedFiles }
  /** M q″ + G q′ + K q = 0. */
  | { readonly kind: 'mechanical'; readonly mass: MatrixFamily; readonly gyroscopic?: MatrixFamily; readonly stiffness: MatrixFamily }
  | ({ readonly kind: 'network' } & NetworkDeclaration)
  | { readonly kind: 'none' };

/**
 * One generator typed by hand. At most one of `map`, `matrix`, `permutation` is present; none means
 * q ↦ q, p ↦ −p and then `reversing` is true. `matrix` is n × n (on the coordinates, momenta follow) or
 * 2n × 2n; `permutation` is of length n or 2n, counts from 1 and sends the value at place i to place
 * permutation[i]. `where` is the key path for messages.
 */
export interface GeneratorDeclaration {
  readonly name: string;
  readonly where: string;
  readonly reversing?: boolean;
  readonly map?: ReadonlyMap<string, string>;
  readonly matrix?: readonly (readonly string[])[];
  readonly permutation?: readonly number[];
}

/** One list of coordinates with the matrix action that moves them (the group's first action if absent). */
export interface SiteDeclaration {
  readonly action?: string;
  readonly on: readonly string[];
}

/** A group of the catalogue or of a group file, and what it acts on. */
export interface GroupDeclaration {
  /** Catalogue name, product of names, or path as typed (relative to `Declaration.folder`). */
  readonly group: string;
  /** For `on: points` (networks): the action named for the points, if any. */
  readonly action?: string;
  readonly on: readonly SiteDeclaration[] | 'points';
  /** Names of the generators that reverse time. */
  readonly reversing: readonly string[];
  readonly where: string;
}

/** Interval of a parameter for `sweep`; ends are expression texts. */
export interface RangeDeclaration {
  readonly from: string;
  readonly to: string;
  readonly steps?: number;
}

export interface Declaration {
  /** File name as typed, '-' for standard input, or 'options'. */
  readonly source: string;
  /** Folder that relative paths of the declaration start from. */
  readonly folder: string;
  readonly title: string;
  /** Paired: momenta[k] belongs to coordinates[k]; ω = Σ dq∧dp unless `form` says otherwise. */
  readonly coordinates: readonly string[];
  readonly momenta: readonly string[];
  /** W of ω(u,v) = uᵀWv, 2n × 2n expression texts. */
  readonly form?: readonly (readonly string[])[];
  /** Parameters that have a value. */
  readonly parameters: ReadonlyMap<string, string>;
  /** Parameters without a value: declared empty, only named by `vary`, or found in the expressions. */
  readonly unset: readonly string[];
  readonly vary: readonly string[];
  readonly range: ReadonlyMap<string, RangeDeclaration>;
  readonly define: ReadonlyMap<string, string>;
  readonly energy: EnergyDeclaration;
  /** Coordinates not listed are 0. */
  readonly equilibrium: ReadonlyMap<string, string>;
  readonly generators: readonly GeneratorDeclaration[];
  readonly groups: readonly GroupDeclaration[];
  /** Adds q ↦ q, p ↦ −p. */
  readonly timeReversal: boolean;
  /** Components of each declared vector field; unlisted coordinates 0, momenta by the lift. */
  readonly neutral: readonly ReadonlyMap<string, string>[];
  readonly neutralFind: boolean;
  readonly numbers: 'exact' | 'floating';
  readonly tolerance?: string;
  readonly degree?: number;
  readonly codimension?: number;
  readonly orderLimit?: number;
  /** How many parameters the study may tune. */
  readonly parameterCount: number;
}
