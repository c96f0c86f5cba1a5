/**
 * Branches of equilibria of h(u) + mu ℓ(u) + … that leave u = 0 at mu = 0, by isotropy type and leading order
 * (M. Golubitsky, I. Stewart, D. Schaeffer, Singularities and Groups in Bifurcation Theory II, 1988, ch. XIII; M. Field,
 * R. Richardson, Symmetry breaking and the maximal isotropy subgroup conjecture, 1989; places from memory).
 *
 * In the fixed space of an isotropy subgroup u = s y, mu = λ s^m. On a line everything is exact. In a plane the directions are
 * isolated exactly, in higher dimensions found by search. Where the leading form is a function of the invariant quadratic form
 * the next form that is not fixes the direction.
 */
import type { Algebraic, RealField } from '../field/index.ts';
import type { LinearAction } from '../invariant/linear-action.ts';
import { at, type Matrix, numberMatrix } from '../linear/index.ts';
import { type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import { criticalDirections, dependentGradients } from './critical-directions.ts';
import { type IsotropyClass, type IsotropyLattice, isotropyLattice } from './isotropy.ts';
import { NumericPolynomial, newton, norm, symmetricEigenvalues } from './numeric-polynomial.ts';
import { seriesInertia } from './series-inertia.ts';

export interface BranchInput {
  /** Γ on the kernel. */
  readonly action: LinearAction;
  /** Its variables are the coordinates on the kernel; numbers in the field of the action. */
  readonly ring: PolynomialRing<Algebraic>;
  /** Taylor polynomial of the reduced potential at the event, without constant, linear and quadratic terms. */
  readonly h: Polynomial<Algebraic>;
  /** Degree up to which h is known. */
  readonly degree: number;
  /** Derivative of the reduced potential by the parameter at the event. */
  readonly unfolding: Polynomial<Algebraic>;
  readonly lattice?: IsotropyLattice;
}

/** Numbers of positive and negative eigenvalues of the Hessian of h along a branch, on one side of the parameter. */
export interface BranchSide {
  readonly side: 1 | -1;
  readonly positive: number;
  readonly negative: number;
  /** Not decided by the terms known. */
  readonly undecided: number;
}

export interface Branch {
  /** Number of the isotropy class in the lattice. */
  readonly isotropyClass: number;
  readonly isotropyOrder: number;
  readonly axial: boolean;
  /** Equilibria on each side where the branch exists: the orbit of one of them. */
  readonly copies: number;
  /** Unit vector in the coordinates of the kernel, for mu > 0 if the branch exists there. */
  readonly direction: Float64Array;
  /** The same line exactly, not normalised, where the fixed space is a line. */
  readonly exactDirection: readonly string[] | null;
  readonly side: 'both' | 'positive' | 'negative';
  /** mu = coefficient * s^power + …, u = s * direction + …; for 'both' s and the coefficient are positive for mu > 0. */
  readonly coefficient: number;
  readonly power: number;
  /** The amplitude grows like |mu|^exponent: "1", "1/2", … */
  readonly exponent: string;
  readonly sides: readonly BranchSide[];
}

export interface BranchDiagram {
  readonly lattice: IsotropyLattice;
  readonly branches: readonly Branch[];
  /** What the terms known do not decide, in words. */
  readonly undecided: readonly string[];
  /** All directions were found by exact root isolation. */
  readonly complete: boolean;
  /** Sum of (-1)^index over the equilibria near 0 on either side; null where something is undecided. */
  readonly topologicalDegree: { readonly below: number; readonly above: number } | null;
}

interface Forms {
  readonly input: BranchInput;
  readonly field: RealField;
  readonly matrices: readonly Float64Array[];
  readonly h: NumericPolynomial;
  readonly unfolding: NumericPolynomial;
}

/** All branches at leading order. */
export function branchDiagram(input: BranchInput): BranchDiagram {
  const { action, ring } = input;
  const field = action.field as RealField;
  const lattice = input.lattice ?? isotropyLattice(action);
  const matrices = Array.from({ length: action.group.order }, (_, g) => Float64Array.from(action.matrix(g).data, (x) => field.toNumber(x)));
  const forms: Forms = {
    input,
    field,
    matrices,
    h: NumericPolynomial.of(ring, input.h),
    unfolding: NumericPolynomial.of(ring, input.unfolding),
  };
  const branches: Branch[] = [];
  const undecided: string[] = [];
  let complete = true;
  lattice.classes.forEach((c, k) => {
    if (c.fixedDimension === 0) return;
    const found = c.fixedDimension === 1 ? axialBranches(forms, c, k) : submaximalBranches(forms, c, k);
    branches.push(...found.branches);
    undecided.push(...found.undecided);
    complete &&= found.complete;
  });
  branches.sort((a, b) => b.isotropyOrder - a.isotropyOrder || a.isotropyClass - b.isotropyClass || a.copies - b.copies);
  return { lattice, branches, undecided, complete, topologicalDegree: degrees(forms, branches, undecided) };
}

interface Found {
  readonly branches: Branch[];
  readonly undecided: string[];
  readonly complete: boolean;
}
const nothing = (reason: string): Found => ({ branches: [], undecided: [reason], complete: true });
const typeName = (c: IsotropyClass) => `isotropy of order ${c.order}, fixed space of dimension ${c.fixedDimension}`;

/** h and ℓ on the fixed space. */
function restricted(
  { input, field }: Forms,
  basis: Matrix<Algebraic>,
): { ring: PolynomialRing<Algebraic>; h: Polynomial<Algebraic>; l: Polynomial<Algebraic> } {
  const ring = new PolynomialRing<Algebraic>(
    field,
    Array.from({ length: basis.cols }, (_, i) => `v${i + 1}`),
  );
  const images = Array.from({ length: basis.rows }, (_, i) =>
    ring.linearForm(Array.from({ length: basis.cols }, (_, j) => at(basis, i, j))),
  );
  return { ring, h: input.ring.substitute(input.h, images, ring), l: input.ring.substitute(input.unfolding, images, ring) };
}

const exponentText = (power: number) => (power === 1 ? '1' : `1/${power}`);

function axialBranches(forms: Forms, c: IsotropyClass, number: number): Found {
  const { input, field } = forms;
  const { ring, h, l } = restricted(forms, c.fixedSpace);
  if (ring.isZero(l)) return nothing(`${typeName(c)}: the parameter does not act at first order`);
  if (ring.isZero(h)) return nothing(`${typeName(c)}: h vanishes on the line up to degree ${input.degree}`);
  const e = ring.order(h);
  const j = ring.order(l);
  const m = e - j;
  if (m < 1) return nothing(`${typeName(c)}: the unfolding is of higher order than h`);
  const line = Array.from({ length: c.fixedSpace.rows }, (_, i) => at(c.fixedSpace, i, 0));
  const numeric = Float64Array.from(line, (x) => field.toNumber(x));
  const length = norm(numeric);
  const coefficientOf = (sign: 1 | -1): number => {
    // mu = -h'/l' at v = sign * s / length
    const a = field.toNumber(h.coefficients[0]!) * e;
    const b = field.toNumber(l.coefficients[0]!) * j;
    return ((-a / b) * sign ** m) / length ** m;
  };
  const orbit = input.action.group.order / c.order;
  const flips = orbit === 2 * c.conjugates;
  const undecided: string[] = [];
  const half = (sign: 1 | -1): BranchSide => {
    const coefficient = coefficientOf(sign);
    const found = axialInertia(forms, line, sign);
    if (found.undecided > 0)
      undecided.push(`${typeName(c)}: ${found.undecided} eigenvalues along the branch need terms of degree above ${input.degree}`);
    return { side: coefficient > 0 ? 1 : -1, ...found };
  };
  const branch = (sign: 1 | -1, sides: BranchSide[]): Branch => {
    const coefficient = coefficientOf(sign);
    return {
      isotropyClass: number,
      isotropyOrder: c.order,
      axial: true,
      copies: orbit,
      direction: numeric.map((x) => (sign * x) / length),
      exactDirection: line.map((x) => field.format(sign === 1 ? x : field.neg(x))),
      side: sides.length === 2 ? 'both' : coefficient > 0 ? 'positive' : 'negative',
      coefficient,
      power: m,
      exponent: exponentText(m),
      sides,
    };
  };
  if (flips) return { branches: [branch(1, [half(1)])], undecided, complete: true };
  if (m % 2 === 1) {
    const first = coefficientOf(1) > 0 ? 1 : -1;
    return { branches: [branch(first, [half(first), half(first === 1 ? -1 : 1)])], undecided, complete: true };
  }
  return { branches: [branch(1, [half(1)]), branch(-1, [half(-1)])], undecided, complete: true };
}

/** Signature of the Hessian along u = v line, mu = -h'(v)/l'(v), for small v of one sign, exactly. */
function axialInertia(
  { input, field }: Forms,
  line: readonly Algebraic[],
  sign: 1 | -1,
): { positive: number; negative: number; undecided: number } {
  const n = line.length;
  const ring = new PolynomialRing<Algebraic>(field, ['e']);
  const images = line.map((x) => ring.scale(ring.variable(0), sign === 1 ? x : field.neg(x)));
  const along = (p: Polynomial<Algebraic>) => input.ring.substitute(p, images, ring);
  const slope = (p: Polynomial<Algebraic>) => ring.derivative(along(p), 0);
  const dh = slope(input.h);
  const dl = slope(input.unfolding);
  const second = (p: Polynomial<Algebraic>, i: number, k: number) => along(input.ring.derivative(input.ring.derivative(p, i), k));
  // multiplied by l'(v)^2 > 0
  const rows = Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (_, k) =>
      ring.mul(dl, ring.sub(ring.mul(dl, second(input.h, i, k)), ring.mul(dh, second(input.unfolding, i, k)))),
    ),
  );
  // the Hessian of h is known below e^(degree - 1), h' below e^degree
  const known = 2 * ring.order(dl) + input.degree - 1;
  const series = (q: Polynomial<Algebraic>) => Array.from({ length: known }, (_, t) => ring.coefficient(q, '\u0000'.repeat(t)));
  return seriesInertia(
    field,
    rows.map((row) => row.map(series)),
  );
}

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

function submaximalBranches(forms: Forms, c: IsotropyClass, number: number): Found {
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
    const values = symmetricEigenvalues(hessian(end.point), n);
    const largest = Math.max(Math.abs(values[0]!), Math.abs(values[n - 1]!));
    const cut = largest * 1e-11;
    patterns.push([values.filter((x) => x > cut).length, values.filter((x) => x < -cut).length]);
  }
  const positive = Math.min(...patterns.map(([p]) => p));
  const negative = Math.min(...patterns.map(([, q]) => q));
  return { positive, negative, undecided: n - positive - negative };
}

/** Sum of (-1)^index over the equilibria near 0, on both sides. */
function degrees({ input }: Forms, branches: readonly Branch[], undecided: readonly string[]): { below: number; above: number } | null {
  if (undecided.length > 0) return null;
  const n = input.action.dimension;
  const l = input.unfolding;
  const order = input.ring.order(l);
  let below = 0;
  let above = 0;
  if (order === 2) {
    const quadratic = input.ring.homogeneousPart(l, 2);
    const values = symmetricEigenvalues(NumericPolynomial.of(input.ring, quadratic).hessian(new Float64Array(n)), n);
    if (values.some((x) => Math.abs(x) < 1e-9)) return null;
    const negative = values.filter((x) => x < 0).length;
    above += (-1) ** negative;
    below += (-1) ** (n - negative);
  } else if (order !== 1) return null;
  for (const b of branches)
    for (const s of b.sides) {
      const term = b.copies * (-1) ** s.negative;
      if (s.side === 1) above += term;
      else below += term;
    }
  return { below, above };
}
