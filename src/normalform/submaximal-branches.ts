/**
 * Branches in fixed spaces of dimension two and more: critical directions of the leading form, or of the first form that is not a
 * function of the invariant quadratic form; signatures by Newton's iteration on the truncated potential.
 */
import { numberMatrix, symmetricEigenvalues } from '../linear/index.ts';
import { type Branch, type BranchSide, exponentText, type Forms, type Found, nothing, restricted, typeName } from './branch.ts';
import { criticalDirections, dependentGradients } from './critical-directions.ts';
import type { IsotropyClass } from './isotropy.ts';
import { NumericPolynomial, newton, norm } from './numeric-polynomial.ts';

/** How many elements fix u, and whether u lies in the orbit of w. */
function stabiliserOrder(forms: Forms, u: Float64Array): number {
  return forms.matrices.reduce((s, g) => s + (distance(g, u, u) < 1e-7 ? 1 : 0), 0);
}
function distance(g: Float64Array, u: Float64Array, w: Float64Array): number {
  const n = u.length;
  let d = 0;
  for (let i = 0; i < n; i++) {
    let s = -w[i]!;
    for (let k = 0; k < n; k++) s += g[i * n + k]! * u[k]!;
    d += s * s;
  }
  return Math.sqrt(d);
}

export function submaximalBranches(forms: Forms, c: IsotropyClass, number: number): Found {
  const { input, field } = forms;
  const { ring, h, l } = restricted(forms, c.fixedSpace);
  if (ring.isZero(l)) return nothing(`${typeName(c)}: the parameter does not act at first order`);
  if (ring.isZero(h)) return nothing(`${typeName(c)}: h vanishes there up to degree ${input.degree}`);
  const j = ring.order(l);
  const lowest = ring.homogeneousPart(l, j);
  const d = ring.order(h);
  if (d <= j) return nothing(`${typeName(c)}: the unfolding is of higher order than h`);
  const leading = ring.homogeneousPart(h, d);
  const undecided: string[] = [];
  let deciding = leading;
  if (dependentGradients(ring, leading, lowest)) {
    let e = d + 1;
    for (; e <= input.degree; e++) {
      deciding = ring.homogeneousPart(h, e);
      if (!ring.isZero(deciding) && !dependentGradients(ring, deciding, lowest)) break;
    }
    if (e > input.degree) return nothing(`${typeName(c)}: no term up to degree ${input.degree} fixes the direction`);
  }
  const directions = criticalDirections(ring, deciding, lowest);
  const basis = numberMatrix(
    c.fixedSpace.rows,
    c.fixedSpace.cols,
    c.fixedSpace.data.map((x) => field.toNumber(x)),
  );
  const lift = (v: Float64Array) =>
    Float64Array.from({ length: basis.rows }, (_, i) => v.reduce((s, x, k) => s + basis.data[i * basis.cols + k]! * x, 0));
  const own = (v: Float64Array): Float64Array | undefined => {
    const u = lift(v);
    const size = norm(u);
    const unit = u.map((x) => x / size);
    return stabiliserOrder(forms, unit) === c.order ? unit : undefined;
  };
  if (directions.multiple.some((v) => own(v) !== undefined))
    undecided.push(`${typeName(c)}: a critical direction of the leading form is degenerate`);
  const branches: Branch[] = [];
  const seen: Float64Array[] = [];
  const a = NumericPolynomial.of(ring, leading);
  const b = NumericPolynomial.of(ring, lowest);
  const next = NumericPolynomial.of(ring, ring.homogeneousPart(h, d + 1));
  for (const v of directions.found) {
    const unit = own(v);
    if (unit === undefined) continue;
    const scale = norm(lift(v));
    const y = v.map((x) => x / scale);
    const pull = b.gradient(y);
    const square = norm(pull) ** 2;
    if (square < 1e-18 * b.size ** 2) {
      undecided.push(`${typeName(c)}: the parameter does not act at first order along a critical direction`);
      continue;
    }
    // ∇f + λ∇ℓ = 0 holds along y: λ by projection on ∇ℓ
    const multiplier = (g: NumericPolynomial) => -g.gradient(y).reduce((s, x, i) => s + x * pull[i]!, 0) / square;
    let power = d - j;
    let coefficient = multiplier(a);
    if (Math.abs(coefficient) * Math.sqrt(square) < 1e-9 * a.size) {
      // f and ∇f vanish along y: the next form decides, if ℓ pulls along y itself
      const slope = j * b.value(y);
      const value = next.value(y);
      if (d + 1 > input.degree || next.isZero || Math.abs(value) < 1e-9 * next.size || Math.abs(slope) < 1e-9 * b.size) {
        undecided.push(`${typeName(c)}: the leading forms vanish along a critical direction`);
        continue;
      }
      power++;
      coefficient = (-(d + 1) * value) / slope;
    }
    // for odd powers -y belongs to the same branch on the other side
    if (power % 2 === 1 && coefficient < 0) continue;
    if (seen.some((w) => forms.matrices.some((g) => distance(g, unit, w) < 1e-6))) continue;
    seen.push(unit);
    const both = power % 2 === 1;
    const sides: BranchSide[] = [];
    for (const sign of both ? [1, -1] : [1]) {
      const signature = signatureAlong(
        forms,
        unit.map((x) => sign * x),
        coefficient * sign ** power,
        power,
      );
      if (signature.undecided > 0)
        undecided.push(`${typeName(c)}: ${signature.undecided} eigenvalues along a branch are not decided up to degree ${input.degree}`);
      sides.push({ side: coefficient * sign ** power > 0 ? 1 : -1, ...signature });
    }
    branches.push({
      isotropyClass: number,
      isotropyOrder: c.order,
      axial: false,
      copies: input.action.group.order / c.order,
      direction: unit,
      exactDirection: null,
      side: both ? 'both' : coefficient > 0 ? 'positive' : 'negative',
      coefficient,
      power,
      exponent: exponentText(power),
      sides,
    });
  }
  return { branches, undecided: [...new Set(undecided)], complete: directions.complete };
}

/** Signature of the Hessian near 0 along a branch with the given start, by Newton on the truncated potential at three amplitudes. */
function signatureAlong(
  forms: Forms,
  unit: Float64Array,
  coefficient: number,
  power: number,
): { positive: number; negative: number; undecided: number } {
  const n = unit.length;
  const { h, unfolding } = forms;
  const patterns: (readonly [number, number])[] = [];
  for (const s of [0.02, 0.01, 0.005]) {
    const mu = coefficient * s ** power;
    const total = (x: Float64Array) => {
      const g = h.gradient(x);
      const l = unfolding.gradient(x);
      return g.map((v, i) => v + mu * l[i]!);
    };
    const hessian = (x: Float64Array) => {
      const g = h.hessian(x);
      const l = unfolding.hessian(x);
      return g.map((v, i) => v + mu * l[i]!);
    };
    const start = unit.map((x) => s * x);
    const end = newton(
      start,
      total,
      (x) => numberMatrix(n, n, hessian(x)),
      1e-13 * norm(unfolding.gradient(start)) * Math.abs(mu) + 1e-300,
    );
    const moved = norm(end.point.map((x, i) => x - start[i]!));
    if (moved > 0.5 * s) return { positive: 0, negative: 0, undecided: n };
    const values = symmetricEigenvalues(numberMatrix(n, n, hessian(end.point)));
    const largest = Math.max(Math.abs(values[0]!), Math.abs(values[n - 1]!));
    const cut = largest * 1e-11;
    patterns.push([values.filter((x) => x > cut).length, values.filter((x) => x < -cut).length]);
  }
  const positive = Math.min(...patterns.map(([p]) => p));
  const negative = Math.min(...patterns.map(([, q]) => q));
  return { positive, negative, undecided: n - positive - negative };
}
