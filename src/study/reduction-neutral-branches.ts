/**
 * The full equations beside a continuous symmetry, in the point and the multipliers: ∇F(y, λ, ν) = 0 with F of
 * reduction-neutral.ts in doubles, and the stability of a relative equilibrium on its own symplectic slice.
 * The Hessian of F is that of H − Σ λ_a J_a bordered by independent rows, so it has as many negative squares more than the
 * form on the slice as there are rows (bordered Hessians, common practice).
 */
import {
  dense,
  type NumberMatrix,
  numberBuild,
  numberCongruence,
  numberMatrix,
  numberSolve,
  numberTranspose,
  symmetricEigenvalues,
  toNumberMatrix,
} from '../linear/index.ts';
import type { FullEquations } from '../normalform/confirm-branch.ts';
import type { LinearStudy } from './linear-study.ts';
import type { FixedMomenta } from './reduction-neutral.ts';

/** ∇F and D²F from ∇H and D²H; the point is followed by the multipliers. */
export function augmentedEquations(plain: FullEquations, fixed: FixedMomenta): FullEquations {
  const { field, dimension: n, momenta: r, gauge: s } = fixed;
  const gradients = toNumberMatrix(fixed.gradients, field);
  const conditions = toNumberMatrix(fixed.conditions, field);
  const second = fixed.second.map((q) => toNumberMatrix(dense(q), field));
  const origin = plain.point;
  /** ∇J_a at a point, row a. */
  const momentumGradients = (x: Float64Array) =>
    second.map((q, a) =>
      Float64Array.from({ length: n }, (_, i) => {
        let sum = gradients.data[i * r + a]!;
        for (let j = 0; j < n; j++) sum += q.data[i * n + j]! * (x[j]! - origin[j]!);
        return sum;
      }),
    );
  const whole = n + r + s;
  return {
    dimension: whole,
    gradient(x, mu) {
      const out = new Float64Array(whole);
      out.set(plain.gradient(x.slice(0, n), mu));
      momentumGradients(x).forEach((g, a) => {
        let value = 0;
        for (let i = 0; i < n; i++) {
          out[i]! -= x[n + a]! * g[i]!;
          // J_a is quadratic: J(x) - J(x0) = ½ (∇J(x0) + ∇J(x))·(x - x0)
          value += ((gradients.data[i * r + a]! + g[i]!) / 2) * (x[i]! - origin[i]!);
        }
        out[n + a] = -value;
      });
      for (let b = 0; b < s; b++)
        for (let i = 0; i < n; i++) {
          const c = conditions.data[i * s + b]!;
          out[i]! += x[n + r + b]! * c;
          out[n + r + b]! += c * (x[i]! - origin[i]!);
        }
      return out;
    },
    hessian(x, mu) {
      const out = new Float64Array(whole * whole);
      const top = plain.hessian(x.slice(0, n), mu);
      const rows = momentumGradients(x);
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) {
          let sum = top.data[i * n + j]!;
          for (let a = 0; a < r; a++) sum -= x[n + a]! * second[a]!.data[i * n + j]!;
          out[i * whole + j] = sum;
        }
        for (let a = 0; a < r; a++) out[i * whole + n + a] = out[(n + a) * whole + i] = -rows[a]![i]!;
        for (let b = 0; b < s; b++) out[i * whole + n + r + b] = out[(n + r + b) * whole + i] = conditions.data[i * s + b]!;
      }
      return numberMatrix(whole, whole, out);
    },
    point: Float64Array.from({ length: whole }, (_, i) => origin[i] ?? 0),
    mu: plain.mu,
    kernel: toNumberMatrix(fixed.kernel, field),
  };
}

/** What decides stability at a relative equilibrium with this Hessian of F. */
export interface SliceStability {
  /** Negative squares on the slice. */
  readonly index: number;
  readonly dimension: number;
  /** The linear flow on the slice. */
  readonly flow: () => NumberMatrix;
}

/** A function of the Hessian of F. ω is that of the model; it must not depend on the parameters. */
export async function sliceStability(study: LinearStudy, fixed: FixedMomenta): Promise<(hessian: NumberMatrix) => SliceStability> {
  const { nullSpaceOfDimension } = await import('../linear/spectral.ts');
  const { prepared } = study;
  const w = toNumberMatrix(dense(prepared.form), prepared.field);
  const n = fixed.dimension;
  const rows = fixed.momenta + fixed.gauge;
  return (hessian) => {
    const border = numberBuild(rows, n, (a, i) => hessian.data[(n + a) * (n + rows) + i]!);
    const x = nullSpaceOfDimension(border, n - rows);
    const block = numberBuild(n, n, (i, j) => hessian.data[i * (n + rows) + j]!);
    const s = numberCongruence(x, block);
    const index = symmetricEigenvalues(s).filter((v) => v < 0).length;
    return { index, dimension: n - rows, flow: () => numberSolve(numberTranspose(numberCongruence(x, w)), s) };
  };
}
