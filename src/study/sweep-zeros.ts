/**
 * Zeros of the components along the way. Where S is a rational function of the parameter they are the roots of the
 * determinants of its blocks, all of them; else the eigenvalues of the symmetric blocks are bracketed between the
 * points of the curve, one by one, so that double eigenvalues are not lost.
 */
import type { Algebraic } from '../field/index.ts';
import { largestEntry, type Matrix, minor, modularEchelon, type NumberMatrix } from '../linear/index.ts';
import { symmetricEigen } from '../linear/spectral.ts';
import type { Univariate } from '../polynomial/index.ts';
import type { ClosedForm } from './closed-form.ts';
import type { BlocksAt, Curve, CurvePoint } from './sweep-curve.ts';
import { restrictedCoefficients, type SweepFamily } from './sweep-family.ts';
import { bracketed } from './sweep-spectrum.ts';
import { polynomialDeterminant, thresholds } from './thresholds.ts';

export interface Zero {
  /** Place on the curve: point i at u = i. */
  readonly u: number;
  readonly point: CurvePoint;
  readonly value: number;
  readonly closed?: ClosedForm;
  readonly polynomial?: string;
  readonly digits?: string;
  /** Numbers of the components. */
  readonly components: readonly number[];
  /** The parameter turns back here. */
  readonly fold: boolean;
}

export interface Zeros {
  readonly zeros: readonly Zero[];
  /** Labels of components that are singular for every value. */
  readonly singular: readonly string[];
}

/** Nearer zeros than this share of the range are one. */
const MERGE = 1e-11;

/** All zeros of a rational family in its range, by Sturm sequences. */
export function zerosOfFamily(family: SweepFamily, blocks: (p: CurvePoint) => BlocksAt): Zeros {
  const { rational: exact, field, range } = family;
  const singular: string[] = [];
  const ranks: number[] = [];
  const determinants = family.adapted.map((b): Univariate<Algebraic> => {
    const coefficients = restrictedCoefficients(exact!, b.basis);
    const d = polynomialDeterminant(coefficients, field);
    ranks.push(b.basis.cols);
    if (d.length > 0) return d;
    singular.push(b.component.label);
    const rows = genericMinor(coefficients, family);
    ranks[ranks.length - 1] = rows.length;
    return rows.length === 0
      ? []
      : polynomialDeterminant(
          coefficients.map((m) => minor(m, rows, rows)),
          field,
        );
  });
  const poles = exact!.denominator;
  const found = thresholds(determinants, range.low, range.high, field);
  const width = range.to - range.from;
  const zeros = found.flatMap((t): Zero[] => {
    const point = { mu: t.value, x: family.pointAt(t.value) };
    if (poles.length > 1 && Math.abs(poles.reduceRight((s, c) => s * t.value + field.toNumber(c), 0)) < 1e-12) return [];
    const at = blocks(point);
    // a minor of a block that is singular everywhere may vanish without a further zero
    const scale = Math.max(...family.adapted.map((_, i) => largestEntry(at.component(i))));
    const components = t.blocks
      .map((b) => b.block)
      .filter((i) => ranks[i] === family.adapted[i]!.basis.cols || rankOf(at.component(i), scale) < ranks[i]!);
    if (components.length === 0) return [];
    return [
      {
        u: ((t.value - range.from) / width) * range.steps,
        point,
        value: t.value,
        ...(t.closed === undefined ? { polynomial: polynomialText(t.factor, family), digits: t.digits } : { closed: t.closed }),
        components,
        fold: false,
      },
    ];
  });
  return { zeros, singular };
}

function rankOf(m: NumberMatrix, scale: number): number {
  const cut = 1e-10 * scale;
  return symmetricEigen(m.data, m.rows).values.filter((x) => Math.abs(x) > cut).length;
}

/** Rows of a principal minor that does not vanish for general values of the parameter. */
function genericMinor(coefficients: readonly Matrix<Algebraic>[], family: SweepFamily): number[] {
  const { field } = family;
  const reduction = field.reduction();
  const x = reduction.apply(field.fromRational(104729n, 7919n));
  const { rows } = coefficients[0]!;
  const prime = BigInt(reduction.p);
  const data = new Int32Array(rows * rows);
  for (let i = 0; i < data.length; i++) {
    let s = 0n;
    for (let k = coefficients.length - 1; k >= 0; k--) s = (s * BigInt(x) + BigInt(reduction.apply(coefficients[k]!.data[i]!))) % prime;
    data[i] = Number(s);
  }
  return modularEchelon({ p: reduction.p, rows, cols: rows, data }).pivots;
}

function polynomialText(factor: Univariate<Algebraic>, family: SweepFamily): string {
  const { field } = family;
  const name = family.range.parameter;
  const lead = factor.at(-1)!;
  let out = '';
  for (let k = factor.length - 1; k >= 0; k--) {
    const c = field.div(factor[k]!, lead);
    if (field.isZero(c)) continue;
    const negative = field.sign(c) < 0;
    const text = field.format(negative ? field.neg(c) : c);
    const power = k === 0 ? '' : k === 1 ? name : `${name}^${k}`;
    const body = power === '' ? text : text === '1' ? power : `${/ [+-] /.test(text) ? `(${text})` : text}*${power}`;
    out += out === '' ? (negative ? `-${body}` : body) : `${negative ? ' - ' : ' + '}${body}`;
  }
  return out;
}

/**
 * Zeros along a curve in double precision. `noise` says what counts as zero at a point, relative to S, where its
 * numbers are known less well than to rounding.
 */
export function zerosOnCurve(
  family: SweepFamily,
  curve: Curve,
  blocks: (p: CurvePoint) => BlocksAt,
  noise: (j: number) => number = () => 0,
): Zeros {
  const cut = curve.points.map((_, j) => Math.max(1e-14, noise(j)));
  const eigen = (p: CurvePoint, i: number) => {
    const m = blocks(p).component(i);
    return symmetricEigen(m.data, m.rows).values;
  };
  const width = family.range.to - family.range.from;
  const found: { u: number; point: CurvePoint; component: number }[] = [];
  const singular: string[] = [];
  const scales = curve.points.map((p) => {
    const at = blocks(p);
    return Math.max(...family.adapted.map((_, i) => largestEntry(at.component(i))));
  });
  family.adapted.forEach((b, i) => {
    const full = curve.points.map((p) => eigen(p, i));
    const sizes = full.map((r, j) => r.reduce((m, x) => Math.max(m, Math.abs(x)), scales[j]!));
    const idle = Math.max(1e-11, family.tolerance ?? 0);
    // those that are zero for every value are left out, wherever they stand among the others
    const flat = full.reduce((least, r, j) => Math.min(least, r.filter((x) => Math.abs(x) <= idle * sizes[j]!).length), Infinity);
    if (flat > 0) singular.push(b.component.label);
    const rows = full.map((r) => withoutSmallest(r, flat));
    for (let k = 0; k < (rows[0]?.length ?? 0); k++) {
      for (let j = 0; j < rows.length; j++) {
        const v = rows[j]![k]!;
        if (Math.abs(v) <= cut[j]! * sizes[j]!) {
          found.push({ u: j, point: curve.points[j]!, component: i });
          continue;
        }
        const next = rows[j + 1]?.[k];
        if (next === undefined || Math.abs(next) <= cut[j + 1]! * sizes[j + 1]! || Math.sign(v) === Math.sign(next)) continue;
        const value = (p: CurvePoint) => withoutSmallest(eigen(p, i), flat)[k]!;
        const theta = bracketed((t) => value(curve.between(j, t)), v, next);
        const point = curve.between(j, theta);
        // through infinity is no zero
        if (!(Math.abs(value(point)) <= 1e-3 * Math.max(Math.abs(v), Math.abs(next)))) continue;
        found.push({ u: j + theta, point, component: i });
      }
    }
  });
  found.sort((a, b) => a.u - b.u);
  const zeros: Zero[] = [];
  for (const f of found) {
    const last = zeros.at(-1);
    if (
      last !== undefined &&
      Math.abs(last.u - f.u) <= MERGE * family.range.steps * 10 &&
      Math.abs(last.value - f.point.mu) <= MERGE * 10 * width
    ) {
      if (!last.components.includes(f.component))
        zeros[zeros.length - 1] = { ...last, components: [...last.components, f.component].sort((a, b) => a - b) };
      continue;
    }
    zeros.push({
      u: f.u,
      point: f.point,
      value: f.point.mu,
      components: [f.component],
      fold: turns(curve, f.u),
      ...declared(family, f.point.mu),
    });
  }
  return { zeros, singular };
}

/** A list of eigenvalues in order, without the `count` of least modulus. */
function withoutSmallest(values: ArrayLike<number>, count: number): number[] {
  const all = Array.from(values);
  if (count === 0) return all;
  const out = new Set([...all.keys()].sort((a, b) => Math.abs(all[a]!) - Math.abs(all[b]!)).slice(0, count));
  return all.filter((_, k) => !out.has(k));
}

function turns(curve: Curve, u: number): boolean {
  if (!curve.followed) return false;
  const i = Math.min(Math.max(Math.floor(u), 1), curve.points.length - 3);
  const [a, b, c, d] = [i - 1, i, i + 1, i + 2].map((k) => curve.points[Math.min(Math.max(k, 0), curve.points.length - 1)]!.mu);
  return Math.sign(b! - a!) !== Math.sign(d! - c!);
}

/** The declared value of the parameter, where the zero is found at it: the model may have been declared at its event. */
function declared(family: SweepFamily, mu: number): { value?: number; closed?: ClosedForm } {
  const width = family.range.to - family.range.from;
  if (Math.abs(mu - family.declared) > 1e-9 * width || family.declaredValue === undefined) return {};
  const { field, value } = family.declaredValue;
  return { value: family.declared, closed: { text: field.format(value), value: family.declared, element: { field, value } } };
}
