/**
 * Continuous symmetries as affine vector fields, checked. A field ξ(x) = Ax + b preserves
 * ω iff AᵀW + WA = 0, and is a symmetry iff dH(ξ) = 0; both are compared term by term, for H with its varied
 * parameters free, on the polynomial H or on its Taylor series.
 */
import { InputError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { type SparseMatrix, sparseApply } from '../linear/index.ts';
import { exponentOf, type Polynomial, type PolynomialRing } from '../polynomial/index.ts';
import { type Expression, taylor } from './expression/index.ts';
import { polynomialDegree } from './polynomial-energy.ts';
import type { Quantities } from './quantities.ts';
import type { VectorField } from './vector-field.ts';

/** ξ(x₀ + y) = value + linear·y. */
export function atPoint(
  field: RealField,
  xi: VectorField,
  point: readonly Algebraic[],
): { linear: SparseMatrix<Algebraic>; value: Algebraic[] } {
  return { linear: xi.linear, value: sparseApply(xi.linear, point).map((x, i) => field.add(x, xi.constant[i]!)) };
}

/** An entry (i, j) where AᵀW + WA does not vanish, or undefined. */
export function breaksForm(linear: SparseMatrix<Algebraic>, form: SparseMatrix<Algebraic>): [number, number] | undefined {
  const field = form.field;
  const sum = new Map<number, Algebraic>();
  const n = form.rows;
  const add = (i: number, j: number, v: Algebraic) => {
    const old = sum.get(i * n + j);
    sum.set(i * n + j, old === undefined ? v : field.add(old, v));
  };
  // (WA)_ij and its transpose with the opposite sign: AᵀW = −(WA)ᵀ because W is skew
  form.index.forEach((cols, i) => {
    cols.forEach((k, q) => {
      linear.index[k]!.forEach((j, r) => {
        const v = field.mul(form.value[i]![q]!, linear.value[k]![r]!);
        add(i, j, v);
        add(j, i, field.neg(v));
      });
    });
  });
  for (const [key, v] of sum) if (!field.isZero(v)) return [Math.floor(key / n), key % n];
  return undefined;
}

/** H about the equilibrium, with the varied parameters as further variables after the coordinates and momenta. */
export interface EnergySeries {
  readonly ring: PolynomialRing<Algebraic>;
  readonly polynomial: Polynomial<Algebraic>;
  readonly gradient: readonly Polynomial<Algebraic>[];
  /** Number of phase coordinates. */
  readonly dimension: number;
  /** dH(ξ) is known up to this degree; Infinity for a polynomial. */
  readonly known: number;
}

/** Degree of the series where H is no polynomial. */
const SERIES_DEGREE = 4;

/** H to all degrees if it is a polynomial, else to degree 4; undefined if its coefficients are not numbers of the field. */
export function energySeries(h: Expression, quantities: Quantities, vary: readonly string[], field: RealField): EnergySeries | undefined {
  const { names } = quantities;
  const expansion = new Map<string, Expression>(quantities.pointExpressions);
  for (const v of vary) expansion.set(v, quantities.valueExpressions.get(v)!);
  const total = polynomialDegree(h, new Set([...names, ...vary]));
  for (const degree of total === undefined ? [SERIES_DEGREE, 3] : [total, 3]) {
    const t = taylor(h, { names: [...names, ...vary], point: expansion, parameters: quantities.valueExpressions, degree, field });
    if (t.kind !== 'exact' || t.field !== field) continue;
    let gradient: readonly Polynomial<Algebraic>[] | undefined;
    return {
      ring: t.ring,
      polynomial: t.polynomial,
      get gradient() {
        gradient ??= names.map((_, i) => t.ring.derivative(t.polynomial, i));
        return gradient;
      },
      dimension: names.length,
      known: total !== undefined && degree >= total ? Number.POSITIVE_INFINITY : degree - 1,
    };
  }
  return undefined;
}

/** dH(ξ) for ξ = value + linear·y, as far as it is known. */
export function derivativeAlong(
  series: EnergySeries,
  xi: { readonly linear: SparseMatrix<Algebraic>; readonly value: readonly Algebraic[] },
): Polynomial<Algebraic> {
  const { ring, known } = series;
  const parts: Polynomial<Algebraic>[] = [];
  const { field } = ring;
  for (let i = 0; i < series.dimension; i++) {
    const g = series.gradient[i]!;
    if (g.monomials.length === 0) continue;
    if (!field.isZero(xi.value[i]!)) parts.push(ring.scale(g, xi.value[i]!));
    if (xi.linear.index[i]!.length === 0) continue;
    const component = ring.fromTerms(xi.linear.index[i]!.map((j, k) => [String.fromCharCode(j), xi.linear.value[i]![k]!] as const));
    parts.push(known === Number.POSITIVE_INFINITY ? ring.mul(g, component) : ring.mulTruncated(g, component, known));
  }
  const sum = ring.sum(parts);
  return known === Number.POSITIVE_INFINITY ? sum : ring.truncate(sum, known);
}

/** Throws InputError unless ξ preserves ω and leaves H invariant for all values of the varied parameters near the given ones. */
export function requireSymmetry(
  xi: VectorField,
  form: SparseMatrix<Algebraic>,
  series: EnergySeries,
  point: readonly Algebraic[],
  quantities: Quantities,
  vary: readonly string[],
  file: string,
): void {
  const { names } = quantities;
  const ring = series.ring;
  const off = breaksForm(xi.linear, form);
  if (off !== undefined)
    throw new InputError(
      `the field ${xi.where} does not preserve the symplectic form: AᵀW + WA has an entry for ${names[off[0]]} and ${names[off[1]]}`,
      {
        file,
        key: xi.where,
        value: fieldText(xi, names, ring.field as RealField),
        expected: 'a field whose linear part A satisfies AᵀW + WA = 0',
        next: 'list the components of the momenta, or leave all of them out',
      },
    );
  const change = derivativeAlong(series, atPoint(ring.field as RealField, xi, point));
  if (ring.isZero(change)) return;
  const first = { ...change, monomials: change.monomials.slice(0, 1), coefficients: change.coefficients.slice(0, 1) };
  const moved = vary.filter((_, j) => exponentOf(change.monomials[0]!, names.length + j) > 0);
  throw new InputError(
    `H is not invariant under the field ${xi.where}${moved.length > 0 ? ` when ${moved.join(', ')} varies` : ''}: dH along it contains ${ring.format(first)}`,
    {
      file,
      key: xi.where,
      value: fieldText(xi, names, ring.field as RealField),
      expected: 'a field along which H does not change',
      next: 'correct the field, or let symcodim look for fields with --neutral find',
    },
  );
}

/** A field in the language of model files: `q1: -q2, q2: q1, p1: -p2, p2: p1`. */
export function fieldText(xi: VectorField, names: readonly string[], field: RealField): string {
  const parts: string[] = [];
  names.forEach((name, i) => {
    const terms = xi.linear.index[i]!.map((j, k) => [xi.linear.value[i]![k]!, names[j]!] as const);
    let out = '';
    const put = (c: Algebraic, body: string | undefined) => {
      const negative = field.sign(c) < 0;
      const size = negative ? field.neg(c) : c;
      const written = field.format(size);
      const wrapped = body !== undefined && / [+-] /.test(written) ? `(${written})` : written;
      const text = body === undefined ? wrapped : field.equal(size, field.one) ? body : `${wrapped}*${body}`;
      out +=
        out === ''
          ? negative
            ? `-${body === undefined && / [+-] /.test(text) ? `(${text})` : text}`
            : text
          : `${negative ? ' - ' : ' + '}${text}`;
    };
    for (const [c, body] of terms) put(c, body);
    if (!field.isZero(xi.constant[i]!)) put(xi.constant[i]!, undefined);
    if (out !== '') parts.push(`${name}: ${out}`);
  });
  return parts.length === 0 ? '0' : parts.join(', ');
}
