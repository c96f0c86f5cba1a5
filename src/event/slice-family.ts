/**
 * How the quadratic form and ω on the symplectic slice change along a family: relative equilibria
 * S x' + ∂_μ∇H μ' = Σ ξ'_a ∇J_a at fixed momenta ∇J_a·x' = 0, J_a the momentum of the field ξ_a (∇J_a = Wᵀξ_a).
 * With D = S_μ μ' + D³H x' − Σ ξ'_a D²J_a, X a basis of the slice and Y a solution of ∇J_a·Y = −x'ᵀD²J_a X, the
 * form changes by XᵀDX + YᵀSX + XᵀSY and ω by YᵀWX + XᵀWY; the change of ω is moved into the form.
 */
import type { Algebraic, RealField } from '../field/index.ts';
import {
  add,
  dense,
  fromColumns,
  inverse,
  type Matrix,
  multiply,
  type SparseMatrix,
  scale,
  solve,
  sparseTimes,
  sparseTranspose,
  sub,
  transpose,
} from '../linear/index.ts';

/** Fields with their velocities at the equilibrium, a basis of T, and the metric that makes the choice of Y equivariant. */
export interface SliceFamily {
  readonly form: SparseMatrix<Algebraic>;
  readonly movers: readonly { readonly linear: SparseMatrix<Algebraic>; readonly value: readonly Algebraic[] }[];
  /** Undefined for the identity. */
  readonly metric: SparseMatrix<Algebraic> | undefined;
}

/** The change of the form on the columns of `e` along one tangent (x', μ'). */
export type SliceDerivative = (e: Matrix<Algebraic>) => Matrix<Algebraic>;

/**
 * `change` is S_μ μ' + D³H x' applied to columns, `residual` S x' + ∂_μ∇H μ'. Throws Error if the residual is no combination of the ∇J_a.
 */
export function sliceDerivative(
  field: RealField,
  slice: SliceFamily,
  hessian: SparseMatrix<Algebraic>,
  x: readonly Algebraic[],
  residual: readonly Algebraic[],
  change: (e: Matrix<Algebraic>) => Matrix<Algebraic>,
): SliceDerivative {
  const { form, movers } = slice;
  const n = form.rows;
  const wt = sparseTranspose(form);
  const c = fromColumns<Algebraic>(
    field,
    movers.map((m) => m.value),
    n,
  );
  const gradients = sparseTimes(wt, c); // ∇J_a as columns
  const speeds = solve(gradients, fromColumns<Algebraic>(field, [residual], n));
  if (speeds === undefined)
    throw new Error('the family leaves the space of relative equilibria: its gradient is no combination of momenta');
  const lifted = slice.metric === undefined ? gradients : multiply(inverse(dense(slice.metric)), gradients);
  const gram = inverse(multiply(transpose(gradients), lifted));
  const half = field.fromRational(-1n, 2n);
  return (e) => {
    let d = change(e);
    const sides: Matrix<Algebraic>[] = [];
    movers.forEach((m, a) => {
      const second = sparseTimes(wt, sparseTimes(m.linear, e)); // D²J_a e
      if (!field.isZero(speeds.data[a]!)) d = sub(d, scale(second, speeds.data[a]!));
      sides.push(scale(multiply(rowOf(field, x), second), field.neg(field.one)));
    });
    const rhs: Matrix<Algebraic> = { field, rows: movers.length, cols: e.cols, data: sides.flatMap((s) => s.data) };
    const y = multiply(lifted, multiply(gram, rhs));
    const se = sparseTimes(hessian, e);
    const cross = multiply(transpose(y), se);
    let f = add(multiply(transpose(e), d), add(cross, transpose(cross)));
    const we = sparseTimes(form, e);
    const mixed = multiply(transpose(y), we);
    const wChange = sub(mixed, transpose(mixed)); // YᵀWE + EᵀWY, W skew
    const b = scale(multiply(inverse(multiply(transpose(e), we)), wChange), half);
    const sb = multiply(multiply(transpose(e), se), b);
    f = add(f, add(sb, transpose(sb)));
    return f;
  };
}

const rowOf = (field: RealField, x: readonly Algebraic[]): Matrix<Algebraic> => ({ field, rows: 1, cols: x.length, data: x });
