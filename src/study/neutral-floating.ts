/**
 * Neutral directions of a floating model. The declared fields are exact; that ω is preserved and that Γ leaves their span
 * invariant is decided exactly, that H does not change within the tolerance, through third order. The slice is a matrix
 * of constraints in the balanced coordinates, and every multiplicity space is cut down by it.
 */
import { InputError, UsageError } from '../errors/index.ts';
import type { RealField } from '../field/index.ts';
import {
  largestEntry,
  type NumberMatrix,
  numberAbove,
  numberBuild,
  numberCombine,
  numberMatrix,
  numberMultiply,
  numberTranspose,
} from '../linear/index.ts';
import { nullSpace, rightSingular } from '../linear/spectral.ts';
import { type FloatingLocal, floatingCubicAlong } from '../model/floating-energy.ts';
import { breaksForm, fieldText } from '../model/neutral.ts';
import type { Quantities } from '../model/quantities.ts';
import { applyNumeric, denseBasis, type NumericAction, numberSparse, type SparseVector } from './floating-action.ts';
import { requireInvariantSpan, type SpanGenerator } from './neutral.ts';
import type { NotExact } from './prepare.ts';

/** Declared fields at the polished equilibrium: velocities, and texts for the result. */
export interface FloatingNeutral {
  readonly velocities: readonly Float64Array[];
  readonly directions: readonly string[];
}

/** Singular values of velocities and constraints, of unit size, below this count as zero; above its root as nonzero. */
const INDEPENDENT = 1e-8;

/** What the checks need to know of H near the equilibrium. */
export interface FloatingNeighbourhood {
  readonly point: Float64Array;
  readonly hessian: NumberMatrix;
  readonly local: FloatingLocal;
  /** Largest term of the Hessian. */
  readonly scale: number;
  readonly tolerance: number;
}

/** Undefined where the model declares no field. Throws InputError for a field that is no symmetry, UsageError for what needs exact numbers. */
export function floatingNeutral(
  source: NotExact,
  near: FloatingNeighbourhood,
  generators: readonly SpanGenerator[],
): FloatingNeutral | undefined {
  const { declaration, quantities } = source;
  if (declaration.neutralFind)
    throw new UsageError(`--neutral find needs exact numbers, but ${source.because}`, {
      file: declaration.source,
      key: 'neutral',
      next: 'declare the fields in the model, or write the numbers exactly',
    });
  if (quantities.neutral.length === 0) return undefined;
  const { field, names } = quantities;
  const velocities = quantities.neutral.map((xi) => {
    const off = breaksForm(xi.linear, quantities.form);
    const wrong = (message: string, expected: string): InputError =>
      new InputError(message, { file: declaration.source, key: xi.where, value: fieldText(xi, names, field), expected });
    if (off !== undefined)
      throw wrong(
        `the field ${xi.where} does not preserve the symplectic form: AᵀW + WA has an entry for ${names[off[0]]} and ${names[off[1]]}`,
        'a field whose linear part A satisfies AᵀW + WA = 0',
      );
    const a = numberSparse(xi.linear, field);
    const c = applyNumeric(a, near.point).map((x, i) => x + field.toNumber(xi.constant[i]!));
    const n = c.length;
    // second derivative of dH(ξ): D³H·c + AᵀS + SA; first: S c
    const sa = numberMatrix(n, n);
    a.index.forEach((cols, k) => {
      cols.forEach((j, q) => {
        for (let i = 0; i < n; i++) sa.data[i * n + j]! += near.hessian.data[i * n + k]! * a.value[k]![q]!;
      });
    });
    const second = numberCombine(numberCombine(sa, numberTranspose(sa)), floatingCubicAlong(near.local, c));
    const first = numberMultiply(near.hessian, numberMatrix(n, 1, c));
    const size = Math.max(1, ...c.map(Math.abs), ...a.value.flatMap((r) => r.map(Math.abs)));
    const cut = near.tolerance * near.scale * size * 10;
    if (largestEntry(first) > cut || largestEntry(second) > cut)
      throw wrong(
        `H is not invariant under the field ${xi.where}: dH along it has terms of size ${Math.max(largestEntry(first), largestEntry(second)).toPrecision(3)}`,
        'a field along which H does not change',
      );
    return c;
  });
  requireInvariantSpan(
    field,
    quantities.neutral,
    generators.filter((g) => g.sign !== undefined && g.reason === undefined),
    names,
    declaration.source,
  );
  requireMoving(velocities, quantities, declaration.source, field);
  return { velocities, directions: quantities.neutral.map((xi) => fieldText(xi, names, field)) };
}

/** Fields that vanish at the equilibrium join the symmetry, which is exact work. */
function requireMoving(velocities: readonly Float64Array[], quantities: Quantities, file: string, field: RealField): void {
  velocities.forEach((c, k) => {
    if (c.some((x) => Math.abs(x) > INDEPENDENT)) return;
    const xi = quantities.neutral[k]!;
    throw new UsageError(`the field ${xi.where} vanishes at the equilibrium: such a symmetry needs exact numbers`, {
      file,
      key: xi.where,
      value: fieldText(xi, quantities.names, field),
      next: 'write the numbers of the model exactly, or leave this field out',
    });
  });
}

/** The slice in balanced coordinates x', x = scaling · x'. */
export interface FloatingSlice {
  /** Orthonormal rows that vanish on the slice. */
  readonly constraints: NumberMatrix;
  readonly neutral: number;
  readonly directions: readonly string[];
}

/** T^ω and an invariant complement of T ∩ T^ω in it; `form` is ω in x'. */
export function floatingSlice(neutral: FloatingNeutral, numeric: NumericAction, scaling: Float64Array, form: NumberMatrix): FloatingSlice {
  const n = scaling.length;
  const raw = numberBuild(n, neutral.velocities.length, (i, j) => neutral.velocities[j]![i]! / scaling[i]!);
  const tangent = numberTranspose(rowSpace(numberTranspose(raw)));
  const tw = numberMultiply(numberTranspose(tangent), form);
  const inner = numberMultiply(tw, tangent);
  const radical = numberMultiply(tangent, nullSpace(inner, INDEPENDENT * Math.max(largestEntry(tw), Number.MIN_VALUE)));
  const metric = averagedMetric(numeric);
  const rg = numberMultiply(numberTranspose(radical), metric);
  const constraints = rowSpace(numberAbove(normalised(tw), normalised(rg)));
  return { constraints, neutral: tangent.cols + radical.cols, directions: neutral.directions };
}

const normalised = (a: NumberMatrix): NumberMatrix => {
  const size = largestEntry(a);
  return size === 0 ? a : numberBuild(a.rows, a.cols, (i, j) => a.data[i * a.cols + j]! / size);
};

/** Orthonormal rows with the span of the rows of a. */
function rowSpace(a: NumberMatrix): NumberMatrix {
  if (a.rows === 0) return a;
  const { values, v } = rightSingular(a);
  const cut = INDEPENDENT * (values[0] ?? 0);
  let rank = 0;
  while (rank < values.length && values[rank]! > cut) rank++;
  return numberBuild(rank, a.cols, (i, j) => v.data[j * v.cols + i]!);
}

/** Mean of ρ(g)ᵀρ(g) over the group generated: the identity for orthogonal generators, else by repeated averaging over the generators. */
function averagedMetric(numeric: NumericAction): NumberMatrix {
  const n = numeric.dimension;
  let m = numberBuild(n, n, (i, j) => (i === j ? 1 : 0));
  // each mean over a cyclic group is a projection; their product converges to the mean over the group
  for (let round = 0; round < 200; round++) {
    let change = 0;
    for (const g of numeric.generators) {
      const d = denseOf(g, n);
      const image = numberMultiply(numberTranspose(d), numberMultiply(m, d));
      const next = numberBuild(n, n, (i, j) => (m.data[i * n + j]! + image.data[i * n + j]!) / 2);
      change = Math.max(change, largestEntry(numberCombine(next, m, -1)));
      m = next;
    }
    if (change < 1e-13 * largestEntry(m)) break;
  }
  return m;
}

function denseOf(g: NumericAction['generators'][number], n: number): NumberMatrix {
  const out = numberMatrix(n, n);
  g.index.forEach((cols, i) => {
    cols.forEach((j, k) => {
      out.data[i * n + j] = g.value[i]![k]!;
    });
  });
  return out;
}

/** Orthonormal columns that span the part of an orthonormal basis in the slice. */
export function cutBasis(slice: FloatingSlice, basis: readonly SparseVector[]): readonly SparseVector[] {
  const n = slice.constraints.cols;
  const b = denseBasis(basis, n);
  const k = numberMultiply(slice.constraints, b);
  if (largestEntry(k) < INDEPENDENT) return basis;
  const c = nullSpace(k, INDEPENDENT);
  const cutDown = numberMultiply(b, c);
  return Array.from({ length: cutDown.cols }, (_, j) => {
    const index: number[] = [];
    const value: number[] = [];
    for (let i = 0; i < n; i++) {
      const x = cutDown.data[i * cutDown.cols + j]!;
      if (Math.abs(x) < 1e-15) continue;
      index.push(i);
      value.push(x);
    }
    return { index, value: Float64Array.from(value) };
  });
}
