/**
 * The linear analysis of a floating model: balanced coordinates, S and ω on one multiplicity space for each block of the flow, and on
 * each the decision of what happens at zero.
 */
import { type Action, type Component, type Components, componentsOfBlock, type SymplecticPart, symplecticPart } from '../action/index.ts';
import { InputError } from '../errors/index.ts';
import { blocksKey } from '../event/floating/readings.ts';
import { balanceScaling, type CanonicalPair } from '../event/floating/scaling.ts';
import { decideZeroEvent, type FloatingZero } from '../event/floating/zero.ts';
import { zeroCodimensionOfPartition } from '../event/partition-codimension.ts';
import { largestEntry, type NumberMatrix, numberAt, numberBuild, numberCongruence, numberIdentity, numberMatrix } from '../linear/index.ts';
import { symmetricEigen } from '../linear/spectral.ts';
import {
  coordinateCells,
  type FloatingBlock,
  floatingBlocks,
  type NumericAction,
  numberSparse,
  numericAction,
  restrictNumeric,
} from './floating-action.ts';
import type { FloatingPrepared } from './floating-prepare.ts';
import { cutBasis, type FloatingSlice, floatingSlice } from './neutral-floating.ts';

/** What happens at zero on one block, on the multiplicity space. */
export interface FloatingBlockZero {
  readonly block: FloatingBlock;
  readonly components: readonly Component[];
  /** On the sparse basis of the block. */
  readonly raw: { readonly s: NumberMatrix; readonly w: NumberMatrix };
  /** In canonical coordinates: columns `transform` over the basis of the block. */
  readonly transform: NumberMatrix;
  readonly s: NumberMatrix;
  readonly w: NumberMatrix;
  /** Scale that zero is measured against. */
  readonly scale: number;
  readonly zero: FloatingZero;
  /** counts[j] Jordan blocks of size j. */
  readonly counts: readonly number[];
  /** Partition on the complex multiplicity space, and the codimension by the formula of the class; undefined where it does not occur there. */
  readonly partition: readonly number[];
  readonly formula: number | undefined;
  /** Why the block is undecided, or null. */
  readonly doubt: string | null;
}

export interface FloatingStudy {
  readonly prepared: FloatingPrepared;
  readonly action: Action;
  readonly components: Components;
  readonly symplectic: SymplecticPart;
  /** x = scaling · x'. */
  readonly scaling: Float64Array;
  readonly numeric: NumericAction;
  readonly hessian: NumberMatrix;
  readonly form: NumberMatrix;
  /** Largest term of the balanced Hessian. */
  readonly scale: number;
  readonly blocks: readonly FloatingBlockZero[];
  /** The symplectic slice, where continuous symmetries are declared; the blocks are then those of the slice. */
  readonly slice?: FloatingSlice;
}

/** Cells of coordinates that ω pairs with one another cell. */
function canonicalCells(action: Action): CanonicalPair[] {
  const cells = coordinateCells(action);
  const cellOf = new Int32Array(action.dimension);
  cells.forEach((cell, c) => {
    for (const i of cell) cellOf[i] = c;
  });
  return cells.flatMap((cell, c) => {
    const partners = new Set(cell.flatMap((i) => action.form.index[i]!.map((j) => cellOf[j]!)));
    const [other] = partners;
    return partners.size === 1 && other! > c ? [{ q: cell, p: cells[other!]! }] : [];
  });
}

/** Diagonal scaling to like units, and S, ω and the scale in the new coordinates. */
function balancedForms(p: FloatingPrepared, action: Action, terms: NumberMatrix) {
  const n = action.dimension;
  const sparse = numberSparse(action.form, action.field);
  const w = numberMatrix(n, n);
  sparse.index.forEach((cols, i) => {
    cols.forEach((j, k) => {
      w.data[i * n + j] = sparse.value[i]![k]!;
    });
  });
  const monomial = sparse.index.every((cols) => cols.length === 1);
  const scaling = new Float64Array(n).fill(1);
  if (monomial) {
    const { transform } = balanceScaling(p.hessian, w, terms, canonicalCells(action));
    for (let i = 0; i < n; i++) scaling[i] = numberAt(transform, i, i);
  } else scaling.fill(1 / Math.sqrt(largestEntry(w)));
  const scaled = (m: NumberMatrix) => numberBuild(n, n, (i, j) => m.data[i * n + j]! * scaling[i]! * scaling[j]!);
  const hessian = scaled(p.hessian);
  return { scaling, hessian, form: scaled(w), scale: Math.max(largestEntry(scaled(terms)), largestEntry(hessian)) };
}

/** t with tᵀwt canonical up to the order of the columns, near to orthogonal where w is; and the largest square of a column. */
export function canonicalBasis(w: NumberMatrix): { transform: NumberMatrix; form: NumberMatrix; stretch: number } {
  const n = w.rows;
  const cut = 1e-12 * largestEntry(w);
  const partner = Array.from({ length: n }, (_, i) => {
    const found: number[] = [];
    for (let j = 0; j < n; j++) if (Math.abs(numberAt(w, i, j)) > cut) found.push(j);
    return found.length === 1 ? found[0]! : -1;
  });
  if (partner.every((j, i) => j >= 0 && partner[j] === i)) {
    const size = (i: number) => Math.abs(numberAt(w, i, partner[i]!));
    return {
      transform: numberBuild(n, n, (i, j) => (i === j ? 1 / Math.sqrt(size(i)) : 0)),
      form: numberBuild(n, n, (i, j) => (j === partner[i] ? Math.sign(numberAt(w, Math.min(i, j), Math.max(i, j))) * (i < j ? 1 : -1) : 0)),
      stretch: partner.reduce((m, _, i) => Math.max(m, 1 / size(i)), 0),
    };
  }
  const square = numberCongruence(w, numberIdentity(n));
  const { values, vectors } = symmetricEigen(square.data, n);
  const column = (j: number) => Float64Array.from({ length: n }, (_, i) => numberAt(vectors, i, j));
  const dot = (a: Float64Array, b: Float64Array) => a.reduce((s, x, i) => s + x * b[i]!, 0);
  const units: Float64Array[] = [];
  const columns: Float64Array[] = [];
  let stretch = 0;
  // eigenvectors of wᵀw, each with its image; those already spanned are passed over
  for (let j = n - 1; j >= 0 && columns.length < n; j--) {
    let u = column(j);
    for (let pass = 0; pass < 2; pass++)
      for (const q of units) {
        const c = dot(q, u);
        u = u.map((x, i) => x - c * q[i]!);
      }
    const length = Math.sqrt(dot(u, u));
    if (length < 0.05) continue;
    u = u.map((x) => x / length);
    const sigma = Math.sqrt(Math.max(values[j]!, 0));
    const image = Float64Array.from({ length: n }, (_, i) => {
      let s = 0;
      for (let k = 0; k < n; k++) s += numberAt(w, k, i) * u[k]!;
      return s;
    });
    const size = Math.sqrt(dot(image, image));
    units.push(
      u,
      image.map((x) => x / size),
    );
    const root = Math.sqrt(size);
    columns.push(
      u.map((x) => x / root),
      image.map((x) => x / (size * root)),
    );
    stretch = Math.max(stretch, 1 / Math.max(sigma, size));
  }
  return {
    transform: numberBuild(n, n, (i, j) => columns[j]![i]!),
    form: numberBuild(n, n, (i, j) => (j === i + 1 && i % 2 === 0 ? 1 : j === i - 1 && i % 2 === 1 ? -1 : 0)),
    stretch,
  };
}

const diagonal = (m: NumberMatrix) => {
  for (let i = 0; i < m.rows; i++) for (let j = 0; j < m.cols; j++) if (i !== j && m.data[i * m.cols + j] !== 0) return false;
  return true;
};

/** tᵀ s t, cheaply where t is diagonal. */
function transformed(t: NumberMatrix, s: NumberMatrix): NumberMatrix {
  const n = s.rows;
  const out = diagonal(t)
    ? numberBuild(n, n, (i, j) => s.data[i * n + j]! * t.data[i * n + i]! * t.data[j * n + j]!)
    : numberCongruence(t, s);
  return numberBuild(n, n, (i, j) => (numberAt(out, i, j) + numberAt(out, j, i)) / 2);
}

function blockZero(
  block: FloatingBlock,
  components: readonly Component[],
  forms: { readonly hessian: NumberMatrix; readonly form: NumberMatrix; readonly scale: number },
  tolerance: number,
): FloatingBlockZero {
  const raw = { s: restrictNumeric(block.basis, forms.hessian), w: restrictNumeric(block.basis, forms.form) };
  const { transform, form: w, stretch } = canonicalBasis(raw.w);
  const s = transformed(transform, raw.s);
  const scale = forms.scale * stretch;
  const zero = decideZeroEvent(s, w, { scale, tolerance });
  const counts: number[] = [];
  for (const b of zero.blocks) counts[b.size] = b.count;
  for (let j = 0; j < counts.length; j++) counts[j] ??= 0;
  const times = block.irreducible.beta === 4 ? 2 : 1;
  const whole = counts.every((c) => Number.isInteger((c / block.cut) * times));
  const partition = whole ? counts.flatMap((c, j) => new Array<number>((c / block.cut) * times).fill(j)).reverse() : [];
  let formula: number | undefined;
  let doubt = zero.reason;
  if (!whole) doubt ??= `${counts.join(', ')} Jordan blocks of size 0, 1, … are no multiple of ${block.cut}`;
  else
    try {
      formula = zeroCodimensionOfPartition(block.symmetryClass, partition);
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      doubt ??= error.message;
    }
  return { block, components, raw, transform, s, w, scale, zero, counts, partition, formula, doubt };
}

/** Everything measured against the given sizes of the terms. */
function measured(
  prepared: FloatingPrepared & { readonly action: Action; readonly components: Components },
  symplectic: SymplecticPart,
  terms: NumberMatrix,
): FloatingStudy {
  const { action, components } = prepared;
  const { scaling, hessian, form, scale } = balancedForms(prepared, action, terms);
  const numeric = numericAction(action, scaling);
  const slice = prepared.neutral === undefined ? undefined : floatingSlice(prepared.neutral, numeric, scaling, form);
  const whole = floatingBlocks(action, symplectic, numeric);
  const own = slice === undefined ? whole : whole.map((b) => ({ ...b, basis: cutBasis(slice, b.basis) })).filter((b) => b.basis.length > 0);
  const blocks = own.map((block) =>
    blockZero(
      block,
      componentsOfBlock(action, components, symplectic.part, block.irreducible),
      { hessian, form, scale },
      prepared.tolerance,
    ),
  );
  return {
    prepared,
    action,
    components,
    symplectic,
    scaling,
    numeric,
    hessian,
    form,
    scale,
    blocks,
    ...(slice === undefined ? {} : { slice }),
  };
}

/**
 * The blocks of a floating model and what happens at zero on each. Numbers from matrices are measured against the largest entry of their
 * matrix, and once more entry by entry, as if small entries were due to units and not to noise; where that gives another answer,
 * the block is undecided.
 */
export function floatingLinear(prepared: FloatingPrepared & { readonly action: Action; readonly components: Components }): FloatingStudy {
  const symplectic = symplecticPart(prepared.action);
  const { hessian, common } = prepared.sizes;
  const study = measured(prepared, symplectic, common ?? hessian);
  if (common === undefined) return study;
  const other = measured(prepared, symplectic, hessian);
  const blocks = study.blocks.map((b, i): FloatingBlockZero => {
    const [here, there] = [blocksKey(b.zero.blocks), blocksKey(other.blocks[i]!.zero.blocks)];
    if (b.doubt !== null || here === there) return b;
    const doubt = `the blocks at zero are ${here} if small entries of the matrices are noise, and ${there} if they are due to units; give masses and stiffness as matrices of their own, or in like units`;
    return { ...b, doubt };
  });
  return { ...study, blocks };
}
