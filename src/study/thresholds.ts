/**
 * Where a block S(μ) of a polynomial family becomes singular: the real roots of its determinant, isolated by Sturm
 * sequences over the field of the model, told apart exactly, and in closed form where there is one.
 */
import type { Algebraic, Rational, RealField } from '../field/index.ts';
import { rationals } from '../field/index.ts';
import { determinant, type Matrix } from '../linear/index.ts';
import { formatRoot, type RealRoot, RealRoots, type Univariate } from '../polynomial/index.ts';
import { type ClosedForm, closedForm } from './closed-form.ts';
import { bisected, middle } from './threshold-root.ts';

/** Digits after the point of a root that has no closed form. */
export const ROOT_DIGITS = 30;

/** A value of the parameter at which some blocks are singular. */
export interface Threshold {
  readonly value: number;
  /** An interval with this root of the factor and no other, narrower than 10^-30, or the root itself. */
  readonly root: RealRoot;
  /** Square-free, vanishes at the root. */
  readonly factor: Univariate<Algebraic>;
  readonly closed: ClosedForm | undefined;
  /** The root to 30 digits. */
  readonly digits: string;
  /** Blocks that are singular there, by number, with the multiplicity of the root in the determinant. */
  readonly blocks: readonly { readonly block: number; readonly multiplicity: number }[];
}

/** det Σ_k coefficients[k] μ^k as a polynomial, by interpolation at integers. */
export function polynomialDeterminant(coefficients: readonly Matrix<Algebraic>[], field: RealField): Univariate<Algebraic> {
  const n = coefficients[0]!.rows;
  const degree = n * (coefficients.length - 1);
  const values: Algebraic[] = [];
  for (let x = 0; x <= degree; x++) {
    const at = field.fromInteger(x - (degree >> 1));
    let m = coefficients.at(-1)!.data.slice();
    for (let k = coefficients.length - 2; k >= 0; k--) m = m.map((v, i) => field.add(field.mul(v, at), coefficients[k]!.data[i]!));
    values.push(determinant({ field, rows: n, cols: n, data: m }));
  }
  return interpolate(values, -(degree >> 1), field);
}

/** Newton's interpolation through (start + i, values[i]). */
function interpolate(values: readonly Algebraic[], start: number, field: RealField): Univariate<Algebraic> {
  const divided = values.slice();
  for (let k = 1; k < divided.length; k++) {
    const inverse = field.fromRational(1n, BigInt(k));
    for (let i = divided.length - 1; i >= k; i--) divided[i] = field.mul(field.sub(divided[i]!, divided[i - 1]!), inverse);
  }
  const { ring } = new RealRoots(field);
  let out: Univariate<Algebraic> = [];
  for (let k = divided.length - 1; k >= 0; k--) out = ring.add(ring.mul(out, [field.fromInteger(-(start + k)), field.one]), [divided[k]!]);
  return ring.trim(out);
}

/** Thresholds in [low, high], ascending. A determinant that vanishes identically is skipped: see `identicallySingular`. */
export function thresholds(determinants: readonly Univariate<Algebraic>[], low: Rational, high: Rational, field: RealField): Threshold[] {
  const roots = new RealRoots(field);
  const found: { block: number; root: RealRoot; factor: Univariate<Algebraic>; multiplicity: number }[] = [];
  determinants.forEach((d, block) => {
    if (d.length <= 1) return;
    const factors = roots.ring.squareFree(d);
    for (const root of roots.isolate(d)) {
      const { factor } = factors.find((f) => f.multiplicity === root.multiplicity)!;
      const narrow = narrowed(roots, factor, root, low, high);
      if (narrow !== undefined)
        found.push({ block, root: narrow, factor: isolated(roots, factor, narrow), multiplicity: root.multiplicity });
    }
  });
  found.sort((a, b) => rationals.compare(middle(a.root), middle(b.root)));
  const out: Threshold[] = [];
  for (let i = 0; i < found.length; ) {
    let { factor } = found[i]!;
    const { root } = found[i]!;
    const blocks = [{ block: found[i]!.block, multiplicity: found[i]!.multiplicity }];
    let j = i + 1;
    for (; j < found.length && overlap(root, found[j]!.root); j++) {
      const common = roots.ring.gcd(factor, found[j]!.factor);
      if (common.length <= 1 || !hasRoot(roots, common, root)) break;
      factor = common;
      blocks.push({ block: found[j]!.block, multiplicity: found[j]!.multiplicity });
    }
    const closed = closedForm(factor, root, field);
    out.push({
      value: closed?.value ?? numberOf(root),
      root,
      factor,
      closed,
      digits: formatRoot(root, ROOT_DIGITS),
      blocks,
    });
    i = j;
  }
  return out;
}

/** The root to the stated digits if it lies in [low, high]; both ends belong to the interval. */
function narrowed(
  roots: RealRoots<Algebraic>,
  factor: Univariate<Algebraic>,
  root: RealRoot,
  low: Rational,
  high: Rational,
): RealRoot | undefined {
  for (const end of [low, high])
    if (contains(root, end) && roots.signAt(factor, end) === 0) return { ...root, low: end, high: end, exact: end };
  const fine = bisected(roots, factor, root, ROOT_DIGITS + 6);
  const at = middle(fine);
  return rationals.compare(at, low) > 0 && rationals.compare(at, high) < 0 ? fine : undefined;
}

const contains = (root: RealRoot, x: Rational): boolean =>
  root.exact !== undefined ? rationals.equal(root.exact, x) : rationals.compare(root.low, x) < 0 && rationals.compare(x, root.high) < 0;

/** The linear factor where the root is rational and known, else the factor. */
function isolated(roots: RealRoots<Algebraic>, factor: Univariate<Algebraic>, root: RealRoot): Univariate<Algebraic> {
  if (root.exact === undefined) return factor;
  const { field } = roots.ring;
  return [field.fromRational(-root.exact.n, root.exact.d), field.one];
}

function hasRoot(roots: RealRoots<Algebraic>, p: Univariate<Algebraic>, root: RealRoot): boolean {
  if (root.exact !== undefined) return roots.signAt(p, root.exact) === 0;
  return roots.signAt(p, root.low) !== roots.signAt(p, root.high) || roots.signAt(p, root.low) === 0;
}

function overlap(a: RealRoot, b: RealRoot): boolean {
  return rationals.compare(a.low, b.high) <= 0 && rationals.compare(b.low, a.high) <= 0;
}

export function numberOf(root: RealRoot): number {
  return rationals.toNumber(middle(root));
}
