/**
 * Clusters of eigenvalues off zero, all components taken together: codimension in the class, without symmetry, and motion. The cost of a
 * cluster is the sum of the orbit codimensions of its members minus the free parameters of its kind, once (Arnold 1971; Galin 1975/1982).
 * Two members on different components, or on χ and on its conjugate, pass; one member with a Jordan block of size 2 splits.
 * @source Arnold1971
 */
import type { SymmetryClass } from '../group/index.ts';
import { clusterOrbitCodimension, type EigenvalueKind, freeParameters } from './partition-codimension.ts';

/** What one block of the flow has at one place ±λ, ±λ̄ of the spectrum. */
export interface ClusterPart {
  /** Number of the block of the flow. */
  readonly block: number;
  readonly classNumber: SymmetryClass;
  /** Jordan partitions on the complex multiplicity space of χ; two where χ has λ and λ̄ apart (classes 2, 7, 8). */
  readonly members: readonly (readonly number[])[];
  /** Jordan blocks at one eigenvalue λ in the whole space, descending. */
  readonly sizes: readonly number[];
  /** Krein signature of iω in the whole space: numbers of positive and negative directions. */
  readonly krein?: readonly [number, number];
}

/** The clusters of a spectrum at one place. */
export interface ClusterPlace {
  readonly kind: EigenvalueKind;
  readonly re: number;
  readonly im: number;
  /** The frequency or rate as exact text, or null. */
  readonly exact: string | null;
  readonly parts: readonly ClusterPart[];
}

export interface Collision extends ClusterPlace {
  readonly multiplicity: number;
  readonly sizes: readonly number[];
  readonly krein?: readonly [number, number];
  readonly codimension: number;
  readonly codimensionWithoutSymmetry: number;
  readonly motion: 'passes' | 'splits' | 'degenerate';
}

/** Codimensions and motion of one place. Throws InputError where a partition does not occur in its class. */
export function collisionAt(place: ClusterPlace): Collision {
  const { kind, parts } = place;
  const sizes = parts.flatMap((p) => p.sizes).sort((x, y) => y - x);
  const orbit = parts.reduce(
    (sum, p) => sum + p.members.reduce((s, m) => s + (m.length === 0 ? 0 : clusterOrbitCodimension(p.classNumber, kind, m)), 0),
    0,
  );
  const codimension = orbit - freeParameters(kind);
  const krein = parts.reduce<readonly [number, number] | undefined>(
    (k, p) => (k === undefined || p.krein === undefined ? undefined : [k[0] + p.krein[0], k[1] + p.krein[1]]),
    [0, 0],
  );
  return {
    ...place,
    multiplicity: sizes.reduce((s, x) => s + x, 0),
    sizes,
    ...(kind === 'imaginary' && krein !== undefined ? { krein } : {}),
    codimension,
    codimensionWithoutSymmetry: clusterOrbitCodimension(1, kind, sizes) - freeParameters(kind),
    motion: codimension !== 1 ? 'degenerate' : sizes.every((s) => s === 1) ? 'passes' : 'splits',
  };
}

/** The places whose codimension is at least 1, by kind, then by size. */
export function collisionsOf(places: readonly ClusterPlace[]): Collision[] {
  const order = { imaginary: 0, real: 1, quadruple: 2 };
  return places
    .map(collisionAt)
    .filter((c) => c.codimension >= 1)
    .sort((a, b) => order[a.kind] - order[b.kind] || Math.hypot(a.re, a.im) - Math.hypot(b.re, b.im));
}
