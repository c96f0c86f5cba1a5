/**
 * The symplectic slice of a continuous symmetry. T is spanned by the velocities ξ·x₀ of the fields at the equilibrium;
 * N = T^ω/(T ∩ T^ω), with the induced S and ω, carries all that the symmetry does not force (linear reduction,
 * common practice). N is realised inside V by a complement X of T ∩ T^ω in T^ω that Γ leaves
 * invariant. Fields that vanish at the equilibrium give no direction; their linear parts join the symmetry.
 */
import type { Algebraic, RealField } from '../field/index.ts';
import {
  above,
  build,
  dense,
  fromColumns,
  inverse,
  isZeroMatrix,
  kernel,
  type Matrix,
  multiply,
  rank,
  type SparseMatrix,
  sparse,
  sparseApply,
  sparseFromMaps,
  sparseIdentity,
  sparseMultiply,
  sparseTimes,
  sparseTranspose,
  transpose,
} from '../linear/index.ts';
import type { Action } from './action.ts';

/** An affine vector field about the equilibrium: ξ(x₀ + y) = value + linear·y. */
export interface AffineField {
  readonly linear: SparseMatrix<Algebraic>;
  readonly value: readonly Algebraic[];
}

export interface Slice {
  readonly field: RealField;
  /** dim V. */
  readonly dimension: number;
  /** Basis of T (columns) and fields whose velocities at x₀ are those columns. */
  readonly tangent: Matrix<Algebraic>;
  readonly movers: readonly AffineField[];
  /** T ∩ T^ω. */
  readonly radical: Matrix<Algebraic>;
  /** Linear parts, without zero ones, of the fields that vanish at x₀: a basis. */
  readonly isotropy: readonly SparseMatrix<Algebraic>[];
  /** Rows that vanish on X: those of TᵀW and of RᵀG. */
  readonly constraints: Matrix<Algebraic>;
  /** A positive definite form that Γ leaves invariant; undefined for the identity. */
  readonly metric: SparseMatrix<Algebraic> | undefined;
  /** dim V − dim N. */
  readonly neutral: number;
}

/** a·x + b·y for sparse matrices given with coefficients. */
export function combineSparse(
  field: RealField,
  cols: number,
  terms: readonly (readonly [Algebraic, SparseMatrix<Algebraic>])[],
): SparseMatrix<Algebraic> {
  const maps = Array.from({ length: terms[0]?.[1].rows ?? cols }, () => new Map<number, Algebraic>());
  for (const [c, m] of terms) {
    if (field.isZero(c)) continue;
    m.index.forEach((columns, i) => {
      columns.forEach((j, k) => {
        const x = field.mul(c, m.value[i]![k]!);
        const old = maps[i]!.get(j);
        maps[i]!.set(j, old === undefined ? x : field.add(old, x));
      });
    });
  }
  return sparseFromMaps(field, cols, maps);
}

function combine(field: RealField, fields: readonly AffineField[], c: readonly Algebraic[]): AffineField {
  const n = fields[0]!.value.length;
  return {
    linear: combineSparse(
      field,
      n,
      fields.map((x, i) => [c[i]!, x.linear] as const),
    ),
    value: Array.from({ length: n }, (_, r) => fields.reduce((s, x, i) => field.add(s, field.mul(c[i]!, x.value[r]!)), field.zero)),
  };
}

/** One column per field: its entries in a fixed order, those that vanish for all fields left out. */
export function fieldColumns(field: RealField, fields: readonly AffineField[]): Matrix<Algebraic> {
  const place = new Map<number, number>();
  const n = fields[0]?.value.length ?? 0;
  const columns = fields.map((x) => {
    const column = new Map<number, Algebraic>();
    const put = (key: number, v: Algebraic) => {
      if (field.isZero(v)) return;
      if (!place.has(key)) place.set(key, place.size);
      column.set(place.get(key)!, v);
    };
    x.value.forEach((v, i) => {
      put(i, v);
    });
    x.linear.index.forEach((cols, i) => {
      cols.forEach((j, k) => {
        put(n + i * n + j, x.linear.value[i]![k]!);
      });
    });
    return column;
  });
  return build(field, place.size, fields.length, (i, j) => columns[j]!.get(i) ?? field.zero);
}

/** The fields without those that are combinations of the ones before them. */
export function independentFields(field: RealField, fields: readonly AffineField[]): AffineField[] {
  const out: AffineField[] = [];
  for (const x of fields) if (rank(fieldColumns(field, [...out, x])) > out.length) out.push(x);
  return out;
}

const velocities = (field: RealField, fields: readonly AffineField[], n: number) =>
  fromColumns<Algebraic>(
    field,
    fields.map((x) => x.value),
    n,
  );

/** Fields that vanish at x₀. */
function vanishing(field: RealField, fields: readonly AffineField[], n: number): AffineField[] {
  if (fields.length === 0) return [];
  const k = kernel(velocities(field, fields, n));
  return Array.from({ length: k.cols }, (_, j) =>
    combine(
      field,
      fields,
      fields.map((_, i) => k.data[i * k.cols + j]!),
    ),
  );
}

/** Σ ρ(g)ᵀρ(g), or undefined where all generators are orthogonal and the identity will do. */
export function invariantMetric(action: Action): SparseMatrix<Algebraic> | undefined {
  const { field, dimension: n } = action;
  const one = sparseIdentity<Algebraic>(field, n);
  const orthogonal = action.generators.every((g) => {
    const m = sparseMultiply(sparseTranspose(g.matrix), g.matrix);
    return m.index.every((c, i) => c.length === 1 && c[0] === i && field.equal(m.value[i]![0]!, field.one));
  });
  if (orthogonal) return undefined;
  let sum = one;
  for (let e = 1; e < action.group.order; e++) {
    const m = action.matrix(e);
    sum = combineSparse(field, n, [
      [field.one, sum],
      [field.one, sparseMultiply(sparseTranspose(m), m)],
    ]);
  }
  return sum;
}

/**
 * The slice of fields whose span Γ leaves invariant, at an equilibrium that Γ fixes. The fields that vanish at x₀ must map T to itself;
 * where the declared span is not closed under brackets with them, the brackets, symmetries too, are added.
 */
export function sliceOf(action: Action, declared: readonly AffineField[]): Slice {
  const { field, dimension: n, form } = action;
  let fields = independentFields(field, declared);
  let isotropy = vanishing(field, fields, n);
  for (let grown = true; grown && isotropy.length > 0 && isotropy.length < fields.length; ) {
    grown = false;
    const t = velocities(field, fields, n);
    const known = rank(t);
    for (const xi of isotropy)
      for (const eta of fields) {
        const moved = sparseApply(xi.linear, eta.value);
        if (rank(fromColumns<Algebraic>(field, [...fields.map((x) => x.value), moved], n)) === known || grown) continue;
        const commutator = combineSparse(field, n, [
          [field.one, sparseMultiply(xi.linear, eta.linear)],
          [field.neg(field.one), sparseMultiply(eta.linear, xi.linear)],
        ]);
        fields = [...fields, { linear: commutator, value: moved }];
        grown = true;
      }
    isotropy = vanishing(field, fields, n);
  }
  const metric = invariantMetric(action);
  const movers = moversOf(field, fields, isotropy, metric, n);
  const tangent = velocities(field, movers, n);
  const tw = multiply(transpose(tangent), dense(form));
  const inner = multiply(tw, tangent);
  const radical = tangent.cols === 0 ? tangent : multiply(tangent, kernel(inner));
  const rg = transpose(metric === undefined ? radical : sparseTimes(metric, radical));
  return {
    field,
    dimension: n,
    tangent,
    movers,
    radical,
    isotropy: isotropy.map((x) => x.linear),
    constraints: above(tw, rg),
    metric,
    neutral: tangent.cols + radical.cols,
  };
}

/** Fields that span a Γ-invariant complement of those that vanish at x₀: orthogonal to them for an invariant product of fields. */
function moversOf(
  field: RealField,
  fields: readonly AffineField[],
  isotropy: readonly AffineField[],
  metric: SparseMatrix<Algebraic> | undefined,
  n: number,
): AffineField[] {
  if (isotropy.length === 0) return [...fields];
  if (isotropy.length === fields.length) return [];
  const back = metric === undefined ? undefined : sparse(inverse(dense(metric)));
  const lowered = fields.map((x) => ({
    linear: metric === undefined ? x.linear : sparseMultiply(metric, sparseMultiply(x.linear, back!)),
    value: metric === undefined ? x.value : sparseApply(metric, x.value),
  }));
  const product = (x: AffineField, y: AffineField) => {
    let s = field.zero;
    for (let i = 0; i < n; i++) {
      s = field.add(s, field.mul(x.value[i]!, y.value[i]!));
      const other = new Map(y.linear.index[i]!.map((j, k) => [j, y.linear.value[i]![k]!]));
      x.linear.index[i]!.forEach((j, k) => {
        const v = other.get(j);
        if (v !== undefined) s = field.add(s, field.mul(x.linear.value[i]![k]!, v));
      });
    }
    return s;
  };
  const gram = build<Algebraic>(field, isotropy.length, fields.length, (i, j) => product(isotropy[i]!, lowered[j]!));
  const k = kernel(gram);
  return Array.from({ length: k.cols }, (_, j) =>
    combine(
      field,
      fields,
      fields.map((_, i) => k.data[i * k.cols + j]!),
    ),
  );
}

/** Coordinates c such that the columns of basis·c are a basis of span(basis) ∩ X; the span must be a multiplicity space or all of V. */
export function sliceCoordinates(slice: Slice, basis: Matrix<Algebraic>): Matrix<Algebraic> {
  return kernel(multiply(slice.constraints, basis));
}

/** Whether a space of the slice is all of span(basis). */
export function untouched(slice: Slice, basis: Matrix<Algebraic>): boolean {
  return slice.neutral === 0 || isZeroMatrix(multiply(slice.constraints, basis));
}
