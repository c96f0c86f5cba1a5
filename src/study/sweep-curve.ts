/**
 * The equilibria along a range: a point declared for every value of the parameter, or a branch followed by predictor
 * and corrector on ∇H = 0 inside Fix(Γ), with its length as the variable, so that it goes on through a fold
 * (pseudo-arclength continuation; H. B. Keller 1977, from memory).
 */
import { NotAnEquilibriumError } from '../errors/index.ts';
import { type NumberMatrix, numberCongruence, numberMatrix, numberSolve, orthonormalise, toNumberMatrix } from '../linear/index.ts';
import { rightSingular } from '../linear/spectral.ts';
import { gradientNumeric, hessianNumeric } from '../model/expression/index.ts';
import { blockFunction, restrictedCoefficients, type SweepFamily } from './sweep-family.ts';

/** An equilibrium on the curve. */
export interface CurvePoint {
  readonly mu: number;
  readonly x: Float64Array;
}

export interface Curve {
  readonly points: readonly CurvePoint[];
  /** The point between points i and i + 1 at the share θ of the way; on the curve, not on the chord. */
  readonly between: (i: number, theta: number) => CurvePoint;
  /** True where the equilibrium was followed. */
  readonly followed: boolean;
  /** Why a followed branch ends inside the range. */
  readonly ends: readonly string[];
}

/** S on the components and S, ω on the flow blocks, at one point. */
export interface BlocksAt {
  readonly component: (i: number) => NumberMatrix;
  readonly flow: (i: number) => { readonly s: NumberMatrix; readonly w: NumberMatrix };
}

const RESIDUAL = 1e-9;

/** The curve of a family. Throws NotAnEquilibriumError where no equilibrium is found to start from. */
export function sweepCurve(family: SweepFamily): Curve {
  const { range } = family;
  const step = (range.to - range.from) / range.steps;
  const at = (mu: number): CurvePoint => ({ mu, x: family.pointAt(mu) });
  const grid = () => Array.from({ length: range.steps + 1 }, (_, i) => at(i === range.steps ? range.to : range.from + i * step));
  const straight = (points: readonly CurvePoint[]): Curve => ({
    points,
    between: (i, theta) => at(points[i]!.mu + theta * (points[i + 1]!.mu - points[i]!.mu)),
    followed: false,
    ends: [],
  });
  if (family.rational !== undefined) return straight(grid());
  const gradient = gradientAt(family);
  const points = grid();
  const size = Math.max(1e-300, ...points.map((p) => scaleOf(family, p)));
  const holds = (p: CurvePoint) => gradient(p).every((g) => Math.abs(g) <= RESIDUAL * size);
  if (points.every(holds)) return straight(points);
  return follow(family, gradient, size);
}

const placed = (p: CurvePoint, rest: readonly number[]): number[] => [...p.x, p.mu, ...rest];

/** Declared values of the parameters beyond the first. */
export function heldValues(family: SweepFamily): number[] {
  return [...family.held];
}

const slots = (family: SweepFamily): string[] => [...family.names, ...family.ranges.map((r) => r.parameter)];

function gradientAt(family: SweepFamily): (p: CurvePoint) => Float64Array {
  const rest = heldValues(family);
  const g = gradientNumeric(family.hamiltonian, slots(family));
  return (p) => g(placed(p, rest)).slice(0, family.names.length);
}

/** Largest entry of the Hessian, as the unit of gradients. */
function scaleOf(family: SweepFamily, p: CurvePoint): number {
  const h = fullHessian(family)(p);
  return h.data.reduce((m, x) => (Number.isFinite(x) ? Math.max(m, Math.abs(x)) : m), 0);
}

const compiled = new WeakMap<SweepFamily, (x: ArrayLike<number>) => Float64Array>();

/** Second derivatives by coordinates and by the swept parameter, (n + 1) × (n + 1). */
function fullHessian(family: SweepFamily): (p: CurvePoint) => NumberMatrix {
  let h = compiled.get(family);
  if (h === undefined) {
    h = hessianNumeric(family.hamiltonian, slots(family));
    compiled.set(family, h);
  }
  const run = h;
  const rest = heldValues(family);
  const n = family.names.length;
  const all = n + family.ranges.length;
  return (p) => {
    const data = run(placed(p, rest));
    const out = new Float64Array((n + 1) * (n + 1));
    for (let i = 0; i <= n; i++) for (let j = 0; j <= n; j++) out[i * (n + 1) + j] = data[i * all + j]!;
    return { rows: n + 1, cols: n + 1, data: out };
  };
}

/** S at a point, by automatic differentiation. */
export function numericHessian(family: SweepFamily): (p: CurvePoint) => NumberMatrix {
  const n = family.names.length;
  const full = fullHessian(family);
  return (p) => {
    const h = full(p);
    const out = new Float64Array(n * n);
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) out[i * n + j] = h.data[i * (n + 1) + j]!;
    return numberMatrix(n, n, out);
  };
}

/** The blocks of the family as functions of the point. */
export function blockEvaluator(family: SweepFamily): (p: CurvePoint) => BlocksAt {
  const { field, adapted, flow, rational } = family;
  const flowBases = flow.map((b) => toNumberMatrix(b.basis, field));
  const constant = new Map<number, NumberMatrix>();
  const first = family.formAt(family.range.from);
  const fixedForm = first === family.formAt(family.range.to);
  const form = (i: number, mu: number) => {
    if (!fixedForm) return numberCongruence(flowBases[i]!, family.formAt(mu));
    let w = constant.get(i);
    if (w === undefined) {
      w = numberCongruence(flowBases[i]!, first);
      constant.set(i, w);
    }
    return w;
  };
  if (rational !== undefined) {
    const make = (basis: (typeof flow)[number]['basis']) =>
      blockFunction(restrictedCoefficients(rational, basis), rational.denominator, field);
    const components = adapted.map((b) => make(b.basis));
    const flows = flow.map((b) => make(b.basis));
    return ({ mu }) => ({ component: (i) => components[i]!(mu), flow: (i) => ({ s: flows[i]!(mu), w: form(i, mu) }) });
  }
  const bases = adapted.map((b) => toNumberMatrix(b.basis, field));
  const hessian = numericHessian(family);
  return (p) => {
    const s = hessian(p);
    return {
      component: (i) => numberCongruence(bases[i]!, s),
      flow: (i) => ({ s: numberCongruence(flowBases[i]!, s), w: form(i, p.mu) }),
    };
  };
}

interface Follower {
  readonly value: (y: Float64Array) => Float64Array;
  /** f × (f + 1): derivatives of the gradient on Fix(Γ) by its coordinates and the parameter. */
  readonly jacobian: (y: Float64Array) => NumberMatrix;
  readonly point: (y: Float64Array) => CurvePoint;
}

/** ∇H restricted to Fix(Γ) in orthonormal coordinates y = (a, μ scaled by the range). */
function follower(family: SweepFamily, gradient: (p: CurvePoint) => Float64Array): Follower {
  const n = family.names.length;
  const f = family.fixed.cols;
  const basis = f === 0 ? numberMatrix(n, 0) : orthonormalise(toNumberMatrix(family.fixed, family.field));
  const width = family.range.to - family.range.from;
  const point = (y: Float64Array): CurvePoint => {
    const x = new Float64Array(n);
    for (let i = 0; i < n; i++) for (let j = 0; j < f; j++) x[i]! += basis.data[i * f + j]! * y[j]!;
    return { mu: family.range.from + y[f]! * width, x };
  };
  const full = fullHessian(family);
  return {
    point,
    value: (y) => {
      const g = gradient(point(y));
      return Float64Array.from({ length: f }, (_, j) => {
        let s = 0;
        for (let i = 0; i < n; i++) s += basis.data[i * f + j]! * g[i]!;
        return s;
      });
    },
    jacobian: (y) => {
      const h = full(point(y));
      const out = numberMatrix(f, f + 1);
      for (let j = 0; j < f; j++) {
        const row = new Float64Array(n + 1);
        for (let i = 0; i < n; i++) for (let k = 0; k <= n; k++) row[k]! += basis.data[i * f + j]! * h.data[i * (n + 1) + k]!;
        for (let k = 0; k < f; k++) {
          let s = 0;
          for (let i = 0; i < n; i++) s += row[i]! * basis.data[i * f + k]!;
          out.data[j * (f + 1) + k] = s;
        }
        out.data[j * (f + 1) + f] = row[n]! * width;
      }
      return out;
    },
  };
}

const dot = (a: Float64Array, b: Float64Array) => a.reduce((s, x, i) => s + x * b[i]!, 0);

/** Newton in the hyperplane through `start` orthogonal to `direction`; undefined where it does not converge. */
function correct(f: Follower, start: Float64Array, direction: Float64Array, unit: number): Float64Array | undefined {
  const y = start.slice();
  const m = y.length;
  for (let k = 0; k < 20; k++) {
    const g = f.value(y);
    const j = f.jacobian(y);
    const system = numberMatrix(m, m);
    system.data.set(j.data);
    system.data.set(direction, (m - 1) * m);
    const off = dot(direction, y) - dot(direction, start);
    let d: NumberMatrix;
    try {
      d = numberSolve(system, numberMatrix(m, 1, [...g, off]));
    } catch (error) {
      if (!(error instanceof RangeError)) throw error;
      return undefined;
    }
    let size = 0;
    for (let i = 0; i < m; i++) {
      y[i]! -= d.data[i]!;
      size = Math.max(size, Math.abs(d.data[i]!));
    }
    if (!Number.isFinite(size) || size > 1) return undefined;
    if (size < 1e-14 * (1 + Math.max(...y.map(Math.abs)))) break;
    if (k === 19 && size > 1e-10) return undefined;
  }
  return f.value(y).every((g) => Math.abs(g) <= RESIDUAL * unit) ? y : undefined;
}

/** Unit tangent of the curve at y, turned along `along`: the direction that the derivatives shrink most. */
function tangent(f: Follower, y: Float64Array, along: Float64Array): Float64Array {
  const { v } = rightSingular(f.jacobian(y));
  const m = y.length;
  const t = Float64Array.from({ length: m }, (_, i) => v.data[i * m + m - 1]!);
  return dot(t, along) < 0 ? t.map((x) => -x) : t;
}

function follow(family: SweepFamily, gradient: (p: CurvePoint) => Float64Array, unit: number): Curve {
  const f = follower(family, gradient);
  const dimension = family.fixed.cols;
  const { range } = family;
  const start = startOf(family, f, unit);
  const step = 1 / range.steps;
  const ends: string[] = [];
  const walk = (first: Float64Array): Float64Array[] => {
    const out: Float64Array[] = [];
    let y = start;
    let direction = first;
    let size = step;
    for (let count = 0; count < 8 * range.steps; ) {
      const guess = y.map((v, i) => v + size * direction[i]!);
      const next = correct(f, guess, direction, unit);
      if (next === undefined) {
        size /= 2;
        if (size < 1e-6 * step) {
          ends.push(`the branch cannot be followed beyond ${range.parameter} = ${f.point(y).mu}`);
          break;
        }
        continue;
      }
      const mu = next[dimension]!;
      const inside = mu > 0 && mu < 1;
      if (!inside) {
        const end = atEnd(f, y, next, dimension, mu >= 1 ? 1 : 0, unit);
        if (end !== undefined) out.push(end);
        break;
      }
      out.push(next);
      direction = tangent(f, next, direction);
      y = next;
      size = Math.min(step, size * 1.5);
      count++;
      if (count === 8 * range.steps) ends.push(`the branch was left at ${range.parameter} = ${f.point(y).mu}, after ${count} steps`);
    }
    return out;
  };
  const upward = new Float64Array(dimension + 1);
  upward[dimension] = 1;
  const t = tangent(f, start, upward);
  const before = walk(t.map((x) => -x)).reverse();
  const after = walk(t);
  const ys = [...before, start, ...after];
  return {
    points: ys.map(f.point),
    between: (i, theta) => {
      const [a, b] = [ys[i]!, ys[i + 1]!];
      const chord = b.map((x, k) => x - a[k]!);
      const norm = Math.hypot(...chord);
      const direction = chord.map((x) => x / norm);
      const y = correct(
        f,
        a.map((x, k) => x + theta * chord[k]!),
        direction,
        unit,
      );
      return f.point(y ?? a.map((x, k) => x + theta * chord[k]!));
    },
    followed: true,
    ends,
  };
}

/** The point of the branch at an end of the range. */
function atEnd(f: Follower, y: Float64Array, next: Float64Array, dimension: number, end: number, unit: number): Float64Array | undefined {
  const [a, b] = [y[dimension]!, next[dimension]!];
  const share = (end - a) / (b - a);
  const guess = y.map((v, i) => v + share * (next[i]! - v));
  guess[dimension] = end;
  const across = new Float64Array(y.length);
  across[dimension] = 1;
  return correct(f, guess, across, unit);
}

/** An equilibrium on the branch: at the declared value of the parameter, or the first found by Newton along the range. */
function startOf(family: SweepFamily, f: Follower, unit: number): Float64Array {
  const { range } = family;
  const width = range.to - range.from;
  const dimension = family.fixed.cols;
  const basis = dimension === 0 ? undefined : orthonormalise(toNumberMatrix(family.fixed, family.field));
  const place = (mu: number): Float64Array => {
    const x = family.pointAt(mu);
    const y = new Float64Array(dimension + 1);
    for (let j = 0; j < dimension; j++) for (let i = 0; i < x.length; i++) y[j]! += basis!.data[i * dimension + j]! * x[i]!;
    y[dimension] = (mu - range.from) / width;
    return y;
  };
  const candidates = [family.declared, ...Array.from({ length: 21 }, (_, i) => range.from + (i / 20) * width)];
  const across = new Float64Array(dimension + 1);
  across[dimension] = 1;
  for (const mu of candidates) {
    if (!(mu >= range.from && mu <= range.to)) continue;
    const y = place(mu);
    if (f.value(y).every((g) => Math.abs(g) <= RESIDUAL * unit)) return y;
    const found = correct(f, y, across, unit);
    if (found !== undefined) return found;
  }
  throw new NotAnEquilibriumError(`no equilibrium was found for ${range.parameter} between ${range.from} and ${range.to}`, {
    file: family.declaration.source,
    key: 'equilibrium',
    expected: 'an equilibrium in the fixed space of the group at one value of the range',
    next: 'declare the equilibrium at the value of the parameter in the file',
  });
}
