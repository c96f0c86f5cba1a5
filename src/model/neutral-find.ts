/**
 * Continuous symmetries of a Hamiltonian found by exact linear algebra: within a linear space of affine fields that
 * preserve ω, those along which H does not change for any value of the varied parameters. H that is quadratic in the
 * coordinates has accidental symmetries of every linear kind, so only for a nonlinear H of few coordinates are all
 * affine fields tried; else translations, and rotations of all pairs and triples of coordinates together.
 */
import { fieldColumns, periodicField } from '../action/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import {
  build,
  columns,
  dense,
  echelon,
  inverse,
  kernel,
  type Matrix,
  rank,
  type SparseMatrix,
  sparse,
  sparseFromMaps,
  transpose,
} from '../linear/index.ts';
import type { Declaration } from './declaration/declaration.ts';
import { type Expression, exactValue } from './expression/index.ts';
import { atPoint, breaksForm, derivativeAlong, type EnergySeries } from './neutral.ts';
import type { VectorField } from './vector-field.ts';

/** Up to this dimension of the phase space all affine fields are tried. */
export const ALL_FIELDS_LIMIT = 12;

interface Frame {
  readonly field: RealField;
  readonly form: SparseMatrix<Algebraic>;
  readonly dimension: number;
  readonly half: number;
}

const none = (f: Frame) =>
  sparseFromMaps(
    f.field,
    f.dimension,
    Array.from({ length: f.dimension }, () => new Map<number, Algebraic>()),
  );
const zeros = (f: Frame) => new Array<Algebraic>(f.dimension).fill(f.field.zero);

/** The unit translations. */
function translations(f: Frame): VectorField[] {
  return Array.from({ length: f.dimension }, (_, i) => ({
    where: 'found',
    linear: none(f),
    constant: zeros(f).map((z, j) => (i === j ? f.field.one : z)),
  }));
}

/** Σ over the places: new i = −old j, new j = old i. */
function turning(f: Frame, pairs: readonly (readonly [number, number, Algebraic?])[]): VectorField {
  const rows = Array.from({ length: f.dimension }, () => new Map<number, Algebraic>());
  for (const [i, j, rate] of pairs) {
    const r = rate ?? f.field.one;
    rows[i]!.set(j, f.field.neg(r));
    rows[j]!.set(i, r);
  }
  return { where: 'found', linear: sparseFromMaps(f.field, f.dimension, rows), constant: zeros(f) };
}

/** Rotations of consecutive pairs and triples of coordinates with their momenta, of all pairs (q_i, p_i), and of each such pair alone. */
function rotations(f: Frame): VectorField[] {
  const { half } = f;
  const out: VectorField[] = [];
  for (const size of [2, 3]) {
    if (half % size !== 0) continue;
    for (let a = 0; a < size; a++)
      for (let b = a + 1; b < size; b++)
        out.push(
          turning(
            f,
            Array.from({ length: half / size }, (_, s) => [
              [s * size + a, s * size + b] as const,
              [half + s * size + a, half + s * size + b] as const,
            ]).flat(),
          ),
        );
  }
  const phase = (i: number): readonly [number, number] => [i, i + half];
  if (half <= 60) for (let i = 0; i < half; i++) out.push(turning(f, [phase(i)]));
  else
    out.push(
      turning(
        f,
        Array.from({ length: half }, (_, i) => phase(i)),
      ),
    );
  return out.filter((x) => breaksForm(x.linear, f.form) === undefined);
}

/** All linear fields that preserve ω: A = J D, D symmetric. */
function linearFields(f: Frame): VectorField[] {
  const j = transpose(inverse(dense(f.form)));
  const n = f.dimension;
  const out: VectorField[] = [];
  for (let a = 0; a < n; a++)
    for (let b = 0; b <= a; b++) {
      const m = build<Algebraic>(f.field, n, n, (r, c) => (c === a ? j.data[r * n + b]! : c === b ? j.data[r * n + a]! : f.field.zero));
      out.push({ where: 'found', linear: sparse(m), constant: zeros(f) });
    }
  return out;
}

/** Those combinations of the fields whose linear part is skew: translations and turns in the given coordinates. */
function turns(f: Frame, fields: readonly VectorField[]): VectorField[] {
  const place = new Map<number, number>();
  const entries = fields.map((x) => {
    const column = new Map<number, Algebraic>();
    x.linear.index.forEach((cols, i) => {
      cols.forEach((j, k) => {
        const key = i > j ? i * f.dimension + j : j * f.dimension + i;
        if (!place.has(key)) place.set(key, place.size);
        const at = place.get(key)!;
        column.set(at, f.field.add(column.get(at) ?? f.field.zero, x.linear.value[i]![k]!));
      });
    });
    return column;
  });
  const symmetricPart = build<Algebraic>(f.field, place.size, fields.length, (i, j) => entries[j]!.get(i) ?? f.field.zero);
  return reducedCombinations(f, fields, kernel(symmetricPart));
}

/**
 * Products of the momenta of translations generate shears, which say nothing new: kept are translations, turns, and of
 * the rest what is periodic.
 */
function withoutShears(f: Frame, fields: readonly VectorField[]): VectorField[] {
  const shape = (x: VectorField) => ({ linear: x.linear, value: x.constant });
  const out = turns(f, fields);
  for (const x of fields) {
    if (rank(fieldColumns(f.field, [...out, x].map(shape))) === out.length) continue;
    const periodic = x.constant.every((v) => f.field.isZero(v)) && periodicField(x.linear, f.field) !== undefined;
    if (periodic) out.push(x);
  }
  return out;
}

/** The combinations of the candidates along which H does not change, in echelon form: a basis with few terms. */
function unchanged(f: Frame, candidates: readonly VectorField[], series: EnergySeries, point: readonly Algebraic[]): VectorField[] {
  const derivatives = candidates.map((x) => derivativeAlong(series, atPoint(f.field, x, point)));
  const place = new Map<string, number>();
  for (const d of derivatives) for (const m of d.monomials) if (!place.has(m)) place.set(m, place.size);
  const data = new Array<Algebraic>(place.size * candidates.length).fill(f.field.zero);
  derivatives.forEach((d, j) => {
    d.monomials.forEach((m, k) => {
      data[place.get(m)! * candidates.length + j] = d.coefficients[k]!;
    });
  });
  const k = kernel<Algebraic>({ field: f.field, rows: place.size, cols: candidates.length, data });
  return reducedCombinations(f, candidates, k);
}

/** The combinations given by the columns of k, brought to echelon form; turns go from the first axis to the second. */
function reducedCombinations(f: Frame, fields: readonly VectorField[], k: Matrix<Algebraic>): VectorField[] {
  const reduced = echelon(transpose(k)).matrix;
  return columns(transpose(reduced)).map((c) => {
    const x = combination(f, fields, c);
    const first = x.linear.value.find((v) => v.length > 0)?.[0];
    const backwards = first !== undefined && f.field.sign(first) > 0 && x.constant.every((v) => f.field.isZero(v));
    const turned = c.map((v) => f.field.neg(v));
    return backwards ? combination(f, fields, turned) : x;
  });
}

function combination(f: Frame, fields: readonly VectorField[], c: readonly Algebraic[]): VectorField {
  const { field } = f;
  const rows = Array.from({ length: f.dimension }, () => new Map<number, Algebraic>());
  const constant = zeros(f);
  fields.forEach((x, i) => {
    if (field.isZero(c[i]!)) return;
    x.linear.index.forEach((cols, r) => {
      cols.forEach((j, k) => {
        rows[r]!.set(j, field.add(rows[r]!.get(j) ?? field.zero, field.mul(c[i]!, x.linear.value[r]![k]!)));
      });
    });
    x.constant.forEach((v, r) => {
      constant[r] = field.add(constant[r]!, field.mul(c[i]!, v));
    });
  });
  return { where: 'found', linear: sparseFromMaps(field, f.dimension, rows), constant };
}

/** The rigid motions of a network about its rest positions, as constant fields: translations, then rotations. */
function rigidMotions(f: Frame, positions: readonly (readonly Algebraic[])[], d: number): VectorField[] {
  const { field } = f;
  const out: VectorField[] = [];
  const constant = (entry: (point: number, axis: number) => Algebraic) => {
    const value = zeros(f);
    for (let i = 0; i < f.half; i++) value[i] = entry(Math.floor(i / d), i % d);
    out.push({ where: 'found', linear: none(f), constant: value });
  };
  for (let a = 0; a < d; a++) constant((_, axis) => (axis === a ? field.one : field.zero));
  for (let a = 0; a < d; a++)
    for (let b = a + 1; b < d; b++)
      constant((point, axis) => (axis === a ? field.neg(positions[point]![b]!) : axis === b ? positions[point]![a]! : field.zero));
  return out;
}

export interface SymmetrySearch {
  readonly declaration: Declaration;
  readonly field: RealField;
  readonly form: SparseMatrix<Algebraic>;
  readonly series: EnergySeries;
  readonly point: readonly Algebraic[];
  /** Text of the declaration to an expression, definitions replaced. */
  readonly parse: (text: string, key: string) => Expression;
  readonly values: ReadonlyMap<string, Algebraic>;
}

/** A basis of the fields found; each is a symmetry, exactly or to the degree of the series. */
export function findFields(search: SymmetrySearch): VectorField[] {
  const { declaration, field, form, series, point } = search;
  const f: Frame = { field, form, dimension: form.rows, half: form.rows / 2 };
  const { energy } = declaration;
  if (energy.kind === 'network') {
    const positions = [...energy.points].map(([label, texts]) =>
      texts.map((t, i) => exactValue(search.parse(t, `network.points.${label}[${i + 1}]`), search.values, field)),
    );
    return unchanged(f, rigidMotions(f, positions, energy.dimension), series, point).filter((x) =>
      x.constant.some((v) => !field.isZero(v)),
    );
  }
  const nonlinear = series.polynomial.monomials.some((m) => [...m].filter((c) => c.charCodeAt(0) < f.dimension).length > 2);
  const all = nonlinear && f.dimension <= ALL_FIELDS_LIMIT;
  const found = unchanged(f, [...translations(f), ...(all ? linearFields(f) : rotations(f))], series, point);
  return all ? withoutShears(f, found) : found;
}
