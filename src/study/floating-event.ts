/**
 * The zero event of a floating model on its generalised kernel E₀ in the whole space: the second route to the codimension, by the rank
 * of the adjoint map on all of E₀ under the generators, and versality. Each number counted as zero or as nonzero is on record.
 */
import { gapRatio, LARGEST_GAP_RATIO, type Reading, reading } from '../event/floating/readings.ts';
import { generalisedKernelBasis } from '../event/floating/zero.ts';
import {
  largestEntry,
  type NumberMatrix,
  numberBuild,
  numberColumns,
  numberCombine,
  numberCongruence,
  numberMatrix,
  numberMultiply,
  numberScale,
  numberSolve,
  numberTranspose,
} from '../linear/index.ts';
import { rightSingular, symmetricEigen } from '../linear/spectral.ts';
import { floatingCubicAlong } from '../model/floating-energy.ts';
import { applyNumeric, denseBasis, type NumberSparse } from './floating-action.ts';
import type { FloatingBlockZero, FloatingStudy } from './floating-linear.ts';
import { fixedColumns } from './floating-prepare.ts';

/** Larger generalised kernels are not gone over a second time. */
export const SECOND_ROUTE_DIMENSION = 40;

/** E₀ of one block of the flow in the whole space, with the orbit of L there. */
export interface EventSpace {
  readonly zero: FloatingBlockZero;
  /** Orthonormal columns, n × d. */
  readonly basis: NumberMatrix;
  /** Orthonormal basis (columns) of the tangent space of the orbit, in coordinates of symmetric matrices. */
  readonly tangent: NumberMatrix;
  readonly dimensionOfClass: number;
  readonly codimension: number;
  readonly readings: readonly Reading[];
}

const places = (n: number): [number, number][] =>
  Array.from({ length: n }, (_, i) => Array.from({ length: i + 1 }, (_, j) => [i, j] as [number, number])).flat();
const place = (i: number, j: number) => (i >= j ? (i * (i + 1)) / 2 + j : (j * (j + 1)) / 2 + i);

/** Symmetric matrices as vectors; entries off the diagonal are weighted so that lengths agree. */
function coordinates(t: NumberMatrix): Float64Array {
  return Float64Array.from(
    places(t.rows),
    ([i, j]) => ((t.data[i * t.cols + j]! + t.data[j * t.cols + i]!) / 2) * (i === j ? 1 : Math.SQRT2),
  );
}

function fromCoordinates(v: ArrayLike<number>, n: number): NumberMatrix {
  return numberBuild(n, n, (i, j) => v[place(i, j)]! / (i === j ? 1 : Math.SQRT2));
}

/** The span of the images of the columns under the group, orthonormal, `dimension` columns. */
function orbitSpan(start: NumberMatrix, generators: readonly NumberSparse[], dimension: number): NumberMatrix {
  const n = start.rows;
  const out: Float64Array[] = [];
  const queue: Float64Array[] = Array.from({ length: start.cols }, (_, j) =>
    Float64Array.from({ length: n }, (_, i) => start.data[i * start.cols + j]!),
  );
  const dot = (a: Float64Array, b: Float64Array) => a.reduce((s, x, i) => s + x * b[i]!, 0);
  for (let next: Float64Array | undefined = queue.shift(); next !== undefined && out.length < dimension; next = queue.shift()) {
    const size = Math.sqrt(dot(next, next));
    for (let pass = 0; pass < 2; pass++)
      for (const q of out) {
        const c = dot(q, next);
        next = next.map((x, i) => x - c * q[i]!);
      }
    const length = Math.sqrt(dot(next, next));
    if (length < 1e-3 * size) continue;
    const unit = next.map((x) => x / length);
    out.push(unit);
    for (const g of generators) queue.push(applyNumeric(g, unit));
  }
  return numberBuild(n, out.length, (i, j) => out[j]![i]!);
}

/** Symmetric T with gᵀTg = τ(g)T, as orthonormal columns. */
function invariantForms(n: number, generators: readonly { g: NumberMatrix; sign: number }[], readings: Reading[]): NumberMatrix {
  const all = places(n);
  const m = all.length;
  const normal = new Float64Array(m * m);
  for (const { g, sign } of generators) {
    const images = numberBuild(m, m, () => 0);
    all.forEach(([k, l], c) => {
      const v = new Float64Array(m);
      v[c] = 1;
      const t = fromCoordinates(v, n);
      const d = coordinates(numberCombine(numberCongruence(g, t), t, -sign));
      d.forEach((x, r) => {
        images.data[r * m + c] = x;
      });
      if (k < l) throw new RangeError('places run over i ≥ j');
    });
    const product = numberMultiply(numberTranspose(images), images);
    for (let i = 0; i < normal.length; i++) normal[i]! += product.data[i]!;
  }
  const { values, vectors } = symmetricEigen(normal, m);
  const r = reading(
    0,
    'form',
    values.map((x) => Math.sqrt(Math.max(0, x))),
    1e-4,
  );
  readings.push(r);
  return numberColumns(vectors, 0, r.zero.length);
}

/** Orthonormal columns whose span is the image of a, by the cut; the reading is added. */
function imageOf(a: NumberMatrix, scale: number, cut: number, readings: Reading[]): NumberMatrix {
  if (a.cols === 0 || a.rows === 0) return numberMatrix(a.rows, 0);
  const { values, v } = rightSingular(numberTranspose(a));
  const r = reading(
    1,
    'staircase',
    values.map((x) => x / scale),
    cut,
  );
  readings.push(r);
  return numberColumns(v, 0, r.nonzero.length);
}

function eventSpace(study: FloatingStudy, zero: FloatingBlockZero): EventSpace {
  const { block } = zero;
  const e0 = generalisedKernelBasis(zero.s, zero.w, zero.zero.blocks);
  const start = numberMultiply(denseBasis(block.basis, study.action.dimension), numberMultiply(zero.transform, e0));
  const basis = orbitSpan(start, study.numeric.generators, e0.cols * block.copies);
  const readings: Reading[] = [];
  const d = basis.cols;
  const s = numberCongruence(basis, study.hessian);
  const w = numberCongruence(basis, study.form);
  const l = numberSolve(numberTranspose(w), s);
  const generators = study.numeric.generators.map((g, i) => ({
    g: numberMultiply(
      numberTranspose(basis),
      numberTranspose(
        numberBuild(
          d,
          basis.rows,
          (() => {
            const images = Array.from({ length: d }, (_, j) =>
              applyNumeric(
                g,
                Float64Array.from({ length: basis.rows }, (_, r) => basis.data[r * d + j]!),
              ),
            );
            return (j: number, r: number) => images[j]![r]!;
          })(),
        ),
      ),
    ),
    sign: study.action.generators[i]!.sign,
  }));
  const algebra = invariantForms(d, generators, readings);
  const dimensionOfClass = generators.every((g) => g.sign === 1)
    ? algebra.cols
    : invariantForms(
        d,
        generators.map(({ g }) => ({ g, sign: 1 })),
        readings,
      ).cols;
  const images = Array.from({ length: algebra.cols }, (_, c) => {
    const t = fromCoordinates(
      Array.from({ length: algebra.rows }, (_, i) => algebra.data[i * algebra.cols + c]!),
      d,
    );
    const tl = numberMultiply(t, l);
    return coordinates(numberCombine(tl, numberTranspose(tl)));
  });
  const tangent = imageOf(
    numberBuild(places(d).length, images.length, (i, j) => images[j]![i]!),
    zero.scale > 0 ? zero.scale : 1,
    study.prepared.tolerance * 10,
    readings,
  );
  return { zero, basis, tangent, dimensionOfClass, codimension: dimensionOfClass - tangent.cols, readings };
}

/** E₀ of every block that has one; undefined where it is too large. */
export function eventSpaces(study: FloatingStudy): EventSpace[] | undefined {
  const active = study.blocks.filter((b) => b.zero.generalisedDimension > 0);
  if (active.some((b) => b.zero.generalisedDimension * b.block.copies > SECOND_ROUTE_DIMENSION)) return undefined;
  return active.map((b) => eventSpace(study, b));
}

/** The readings that lie too near the cut to decide. */
export function doubtOf(readings: readonly Reading[]): string | null {
  const worst = readings.find((r) => gapRatio(r) > LARGEST_GAP_RATIO);
  if (worst === undefined) return null;
  return `${worst.zero.at(-1)!.toExponential(1)} was counted as zero and ${worst.nonzero[0]!.toExponential(1)} as nonzero`;
}

export interface FloatingVersality {
  /** null where the numbers do not decide. */
  readonly versal: boolean | null;
  readonly alongBranch: boolean;
  readonly spanned: number;
  readonly codimension: number;
  readonly onto: boolean;
  readonly doubt: string | null;
}

/** Versality of the family, as event/versality.ts decides it exactly. */
export function floatingVersality(study: FloatingStudy, spaces: readonly EventSpace[], codimension: number): FloatingVersality {
  if (study.slice !== undefined && study.slice.neutral > 0)
    return {
      versal: null,
      alongBranch: false,
      spanned: 0,
      codimension,
      onto: false,
      doubt: 'beside neutral directions it is decided for exact numbers only',
    };
  const { prepared, scaling, hessian } = study;
  const { local, tolerance } = prepared;
  const scale = study.scale > 0 ? study.scale : 1;
  const n = scaling.length;
  const readings: Reading[] = [];
  // units of each parameter such that its largest derivative is the scale
  const by = local.hessianBy.map((m, k) => {
    const h = numberBuild(n, n, (i, j) => m.data[i * n + j]! * scaling[i]! * scaling[j]!);
    const g = local.gradientBy[k]!.map((x, i) => x * scaling[i]!);
    const size = Math.max(largestEntry(h), ...g.map(Math.abs));
    const unit = size > 0 ? scale / size : 1;
    return { unit, hessian: numberScale(h, unit), gradient: g.map((x) => x * unit) };
  });
  const fixed = fixedColumns(prepared.components!, study.numeric);
  const f = fixed.cols;
  const k = by.length;
  const tangents: { x: Float64Array; mu: Float64Array }[] = [];
  let onto = true;
  let alongBranch = false;
  if (f === 0) {
    const unit = (j: number) => Float64Array.from({ length: k }, (_, i) => (i === j ? 1 : 0));
    tangents.push(...by.map((_, j) => ({ x: new Float64Array(n), mu: unit(j) })));
  } else {
    const s = numberCongruence(fixed, hessian);
    const system = numberBuild(f, f + k, (i, j) => {
      if (j < f) return s.data[i * f + j]!;
      let sum = 0;
      for (let r = 0; r < n; r++) sum += fixed.data[r * f + i]! * by[j - f]!.gradient[r]!;
      return sum;
    });
    const { values, v } = rightSingular(system);
    const r = reading(
      0,
      'hessian',
      values.slice(0, f).map((x) => x / scale),
      tolerance,
    );
    readings.push(r);
    onto = r.nonzero.length === f;
    for (let c = r.nonzero.length; c < f + k && onto; c++) {
      const x = new Float64Array(n);
      for (let i = 0; i < n; i++) for (let a = 0; a < f; a++) x[i]! += fixed.data[i * f + a]! * v.data[a * (f + k) + c]!;
      tangents.push({ x, mu: Float64Array.from({ length: k }, (_, j) => v.data[(f + j) * (f + k) + c]!) });
    }
    if (!onto) {
      // the declared branch, where it is one to first order
      const branch = prepared.branch.map((x, j) => x.map((y, i) => (y / scaling[i]!) * by[j]!.unit));
      const left = branch.map((x, j) => numberMultiply(hessian, numberMatrix(n, 1, x)).data.map((y, i) => y + by[j]!.gradient[i]!));
      alongBranch = left.every((v) => largestEntry(numberMatrix(n, 1, v)) <= tolerance * scale);
      if (alongBranch) tangents.push(...branch.map((x, j) => ({ x, mu: Float64Array.from({ length: k }, (_, i) => (i === j ? 1 : 0)) })));
    }
  }
  const rows = tangents.map(({ x, mu }) => {
    const cubic =
      x.every((y) => y === 0) || local.higher === undefined
        ? undefined
        : floatingCubicAlong(
            local,
            x.map((y, i) => y * scaling[i]!),
          );
    return spaces.flatMap((space) => {
      let form = numberMatrix(space.basis.cols, space.basis.cols);
      if (cubic !== undefined)
        form = numberCongruence(
          space.basis,
          numberBuild(n, n, (i, j) => cubic.data[i * n + j]! * scaling[i]! * scaling[j]!),
        );
      mu.forEach((m, j) => {
        if (m !== 0) form = numberCombine(form, numberCongruence(space.basis, by[j]!.hessian), m);
      });
      const v = coordinates(form);
      // off the tangent space of the orbit
      const c = numberMultiply(numberTranspose(space.tangent), numberMatrix(v.length, 1, v));
      const inside = numberMultiply(space.tangent, c);
      return Array.from(v, (y, i) => y - inside.data[i]!);
    });
  });
  let spanned = 0;
  if (rows.length > 0 && rows[0]!.length > 0) {
    const { values } = rightSingular(numberBuild(rows[0]!.length, rows.length, (i, j) => rows[j]![i]!));
    const r = reading(
      2,
      'staircase',
      values.map((x) => x / scale),
      tolerance * 10,
    );
    readings.push(r);
    spanned = r.nonzero.length;
  }
  const doubt = doubtOf([...readings, ...spaces.flatMap((x) => x.readings)]);
  const versal = (onto || alongBranch) && spanned === codimension;
  return { versal: doubt === null ? versal : null, alongBranch: alongBranch && versal, spanned, codimension, onto, doubt };
}
