/**
 * Versality of a parametrised family at a zero event. M is the space of (x', μ') with x' fixed by Γ and
 * S x' + ∂_μ∇H μ' = 0, the tangent space of the symmetric equilibria over the parameters. The family is versal iff
 * (i) S and ∂_μ∇H together are onto the fixed space and (ii) the forms S_μ μ' + D³H x' span the normal space of the
 * orbit in the class (V. I. Arnold 1971, section 3.2, for the class; transversality along the curve of equilibria).
 * @source Arnold1971
 */
import type { Algebraic, RealField } from '../field/index.ts';
import {
  add,
  beside,
  fromColumns,
  kernel,
  type Matrix,
  modularRank,
  multiply,
  rank,
  type SparseMatrix,
  scale,
  sparseApply,
  sparseTimes,
  transpose,
  zeroMatrix,
} from '../linear/index.ts';
import { adjointImage, type ClassOperator, formCoordinates } from './adjoint-rank.ts';
import { type SliceFamily, sliceDerivative } from './slice-family.ts';
import type { ZeroEvent } from './zero-event.ts';

/** What versality needs to know of the family; derivatives by each varied parameter. */
export interface Family {
  readonly field: RealField;
  readonly hessian: SparseMatrix<Algebraic>;
  readonly hessianBy: readonly SparseMatrix<Algebraic>[];
  readonly gradientBy: readonly (readonly Algebraic[])[];
  /** D³H·v. */
  readonly cubicAlong: (v: readonly Algebraic[]) => SparseMatrix<Algebraic>;
  /** Basis of Fix(Γ), n × f. */
  readonly fixed: Matrix<Algebraic>;
  /** x'(μ) of the declared equilibrium for each varied parameter. */
  readonly branch: readonly (readonly Algebraic[])[] | undefined;
  /** Continuous symmetries that move the equilibrium; `fixed` then lies in the slice. */
  readonly slice?: SliceFamily;
}

/** A part of E₀ that carries its own normal space: a basis in V, L on it, and the symmetry as seen there. */
export interface EventPiece {
  readonly basis: Matrix<Algebraic>;
  readonly l: Matrix<Algebraic>;
  readonly operators: readonly ClassOperator[];
  readonly fields?: readonly Matrix<Algebraic>[];
}

/** The pieces of an event block by block of the flow. */
export function eventPieces(event: ZeroEvent): EventPiece[] {
  return event.blocks
    .filter((b) => b.kernel.basis.cols > 0)
    .map((b) => ({ basis: multiply(b.block.basis, b.kernel.basis), l: b.event.l, operators: b.event.operators }));
}

export interface Versality {
  readonly versal: boolean;
  /** True if versal only along the declared branch because (i) fails. */
  readonly alongBranch: boolean;
  /** Dimension of the span of the family in the normal space, of the codimension it should have. */
  readonly spanned: number;
  readonly codimension: number;
  /** Whether S and ∂_μ∇H are onto Fix(Γ). */
  readonly onto: boolean;
}

export function versality(event: ZeroEvent, family: Family, pieces: readonly EventPiece[] = eventPieces(event)): Versality {
  const { field, fixed } = family;
  const k = family.hessianBy.length;
  const f = fixed.cols;
  let onto = true;
  let alongBranch = false;
  let tangents: Array<{ x: readonly Algebraic[]; mu: readonly Algebraic[] }> = [];
  const n = fixed.rows;
  const unit = (j: number) => Array.from({ length: k }, (_, i) => (i === j ? field.one : field.zero));
  if (f === 0) tangents = family.hessianBy.map((_, j) => ({ x: new Array<Algebraic>(n).fill(field.zero), mu: unit(j) }));
  else {
    const s = multiply(transpose(fixed), sparseTimes(family.hessian, fixed));
    const g = multiply(
      transpose(fixed),
      fromColumns(
        field,
        family.gradientBy.map((c) => c.slice()),
        n,
      ),
    );
    const system = beside(s, g);
    onto = rank(system) === f;
    if (onto) {
      const solutions = kernel(system);
      for (let c = 0; c < solutions.cols; c++) {
        const a = fromColumns(field, [Array.from({ length: f }, (_, i) => solutions.data[i * solutions.cols + c]!)], f);
        tangents.push({
          x: multiply(fixed, a).data,
          mu: Array.from({ length: k }, (_, i) => solutions.data[(f + i) * solutions.cols + c]!),
        });
      }
    } else {
      // the declared branch, where it is one to first order
      const branch = family.branch?.every((x, j) => {
        const sx = sparseApply(family.hessian, x);
        return sx.every((v, i) => field.isZero(field.add(v, family.gradientBy[j]![i]!)));
      })
        ? family.branch
        : undefined;
      if (branch !== undefined) {
        alongBranch = true;
        tangents = branch.map((x, j) => ({ x, mu: unit(j) }));
      }
    }
  }
  const spanned = spanInNormalSpace(pieces, family, tangents, field);
  const versal = (onto || alongBranch) && spanned === event.codimension;
  return { versal, alongBranch: alongBranch && versal, spanned, codimension: event.codimension, onto };
}

function spanInNormalSpace(
  pieces: readonly EventPiece[],
  family: Family,
  tangents: readonly { readonly x: readonly Algebraic[]; readonly mu: readonly Algebraic[] }[],
  field: RealField,
): number {
  if (pieces.length === 0) return 0;
  const reduction = field.reduction();
  const widths = pieces.map((b) => (b.basis.cols * (b.basis.cols + 1)) / 2);
  const total = widths.reduce((a, b) => a + b, 0);
  const rows: Int32Array[] = [];
  let offset = 0;
  pieces.forEach((b, i) => {
    const { image } = adjointImage(b.l, b.operators, reduction, b.fields);
    for (let r = 0; r < image.rows; r++) {
      const row = new Int32Array(total);
      row.set(image.data.subarray(r * image.cols, (r + 1) * image.cols), offset);
      rows.push(row);
    }
    offset += widths[i]!;
  });
  const stack = (list: readonly Int32Array[]) => {
    const data = new Int32Array(list.length * total);
    list.forEach((r, i) => {
      data.set(r, i * total);
    });
    return modularRank({ p: reduction.p, rows: list.length, cols: total, data });
  };
  const base = stack(rows);
  for (const { x, mu } of tangents) {
    const derivative = formDerivative(family, x, mu);
    const row = new Int32Array(total);
    let at = 0;
    pieces.forEach(({ basis }, i) => {
      row.set(formCoordinates(derivative(basis), reduction), at);
      at += widths[i]!;
    });
    rows.push(row);
  }
  return stack(rows) - base;
}

/** The change of the form on the columns of a basis along a tangent (x', μ') of the family. */
function formDerivative(family: Family, x: readonly Algebraic[], mu: readonly Algebraic[]): (e: Matrix<Algebraic>) => Matrix<Algebraic> {
  const { field } = family;
  const cubic = x.every((v) => field.isZero(v)) ? undefined : family.cubicAlong(x);
  const change = (e: Matrix<Algebraic>): Matrix<Algebraic> => {
    let out = cubic === undefined ? zeroMatrix<Algebraic>(field, e.rows, e.cols) : sparseTimes(cubic, e);
    mu.forEach((m, j) => {
      if (!field.isZero(m)) out = add(out, scale(sparseTimes(family.hessianBy[j]!, e), m));
    });
    return out;
  };
  if (family.slice === undefined) return (e) => multiply(transpose(e), change(e));
  const residual = sparseApply(family.hessian, x);
  mu.forEach((m, j) => {
    family.gradientBy[j]!.forEach((g, i) => {
      residual[i] = field.add(residual[i]!, field.mul(m, g));
    });
  });
  return sliceDerivative(field, family.slice, family.hessian, x, residual, change);
}
