/** The family of Hamiltonians over the varied parameters, as versality needs it. */
import { embedSparse } from '../action/index.ts';
import type { Family } from '../event/versality.ts';
import type { Algebraic } from '../field/index.ts';
import { add, dense, inverse, multiply, type SparseMatrix, scale, sparse, transpose } from '../linear/index.ts';
import { formDerivatives } from '../model/form-family.ts';
import { cubicAlong } from '../model/local.ts';
import { fixedSpace, hessianOf, type LinearStudy } from './linear-study.ts';
import { sliceFixed } from './neutral-slice.ts';

/**
 * ∂S/∂μ as it would be in coordinates that keep the form fixed: S_μ + BᵀS + SB with B = −½ W⁻¹W_μ where the form depends on
 * the parameters.
 */
function canonicalDerivatives(study: LinearStudy, hessianBy: readonly SparseMatrix<Algebraic>[]): readonly SparseMatrix<Algebraic>[] {
  const { prepared, action } = study;
  const by = formDerivatives(prepared.declaration, prepared.quantities, prepared.field);
  if (by === undefined) return hessianBy;
  const f = action.field;
  const s = dense(hessianOf(study));
  const back = inverse(dense(action.form));
  return hessianBy.map((m, j) => {
    const b = scale(multiply(back, dense(embedSparse(by[j]!, prepared.field, f))), f.fromRational(-1n, 2n));
    const sb = multiply(s, b);
    return sparse(add(dense(m), add(sb, transpose(sb))));
  });
}

export function family(study: LinearStudy): Family {
  const { prepared, action, components } = study;
  const { local, field: from } = prepared;
  const to = action.field;
  const move = (x: Algebraic) => to.embed(from, x);
  return {
    field: to,
    hessian: embedSparse(local.hessian, from, to),
    hessianBy: canonicalDerivatives(
      study,
      local.hessianBy.map((m) => embedSparse(m, from, to)),
    ),
    gradientBy: local.gradientBy.map((g) => g.map(move)),
    cubicAlong: (v) => {
      const back = v.map((x) => x);
      const lifted = { ...local, field: to, higher: { ...local.higher, coefficients: local.higher.coefficients.map(move) } };
      return cubicAlong(lifted, back);
    },
    fixed: study.slicing === undefined ? fixedSpace(action, components) : sliceFixed(study.slicing, fixedSpace(action, components)),
    branch: local.pointBy?.map((x) => x.map(move)),
    ...(study.slicing === undefined ? {} : { slice: { ...study.slicing.slice, form: action.form } }),
  };
}
