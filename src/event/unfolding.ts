/**
 * A basis of the normal space of a zero event as quadratic Hamiltonians on the whole phase space, in the user's
 * coordinates: with the symmetry (as many as the codimension) and without. A form B on the multiplicity part X of E₀
 * is carried to V by the projection along X^ω and averaged over Γ; on X the average is B times dim eK/dim K.
 */
import type { Action } from '../action/index.ts';
import { type Algebraic, gcd, type RealField } from '../field/index.ts';
import {
  above,
  at,
  build,
  congruence,
  echelon,
  inverse,
  kernel,
  type Matrix,
  multiply,
  rank,
  scale,
  sparseTimes,
  sparseTranspose,
  transpose,
  zeroMatrix,
} from '../linear/index.ts';
import type { ClassOperator } from './adjoint-rank.ts';
import { generalisedKernel, poisson } from './generalised-kernel.ts';
import type { BlockZero, ZeroEvent } from './zero-event.ts';

/** Averages over larger groups are not formed. */
export const AVERAGE_ORDER_LIMIT = 2000;
/** The unfolding without symmetry is written out up to this many terms and this dimension of the phase space. */
export const FREE_TERMS_LIMIT = 16;
export const FREE_DIMENSION_LIMIT = 16;

const pairs = (n: number): [number, number][] => {
  const out: [number, number][] = [];
  for (let i = 0; i < n; i++) for (let j = 0; j <= i; j++) out.push([i, j]);
  return out;
};

/** Symmetric X with hᵀX = s X h⁻ for every operator, s = 1 or σ; as symmetric matrices. */
function invariantForms(field: RealField, n: number, operators: readonly ClassOperator[], twisted: boolean): Matrix<Algebraic>[] {
  const places = pairs(n);
  const unit = (k: number) => {
    const [a, b] = places[k]!;
    return build<Algebraic>(field, n, n, (i, j) => ((i === a && j === b) || (i === b && j === a) ? field.one : field.zero));
  };
  if (operators.length === 0) return places.map((_, k) => unit(k));
  const columns = places.map((_, k) => {
    const u = unit(k);
    return operators.flatMap((o) => {
      const left = multiply(transpose(o.matrix), u);
      const right = multiply(u, o.inverse);
      return left.data.map((x, t) => (twisted && o.sign === -1 ? field.add(x, right.data[t]!) : field.sub(x, right.data[t]!)));
    });
  });
  const solutions = kernel(build<Algebraic>(field, operators.length * n * n, places.length, (i, j) => columns[j]![i]!));
  return Array.from({ length: solutions.cols }, (_, c) => {
    const index = new Map(places.map(([a, b], k) => [a * n + b, k]));
    return build<Algebraic>(field, n, n, (i, j) => at(solutions, index.get(Math.max(i, j) * n + Math.min(i, j))!, c));
  });
}

const coordinates = (m: Matrix<Algebraic>): Algebraic[] => pairs(m.rows).map(([i, j]) => at(m, i, j));

/** Members of P that complement the image of 𝔤₀ under T ↦ TL + LᵀT, simplest first. */
function normalForms(field: RealField, l: Matrix<Algebraic>, operators: readonly ClassOperator[]): Matrix<Algebraic>[] {
  const n = l.rows;
  const p = invariantForms(field, n, operators, false);
  const g = invariantForms(field, n, operators, true);
  const width = (n * (n + 1)) / 2;
  const image = g.map((t) => {
    const tl = multiply(t, l);
    return coordinates(build<Algebraic>(field, n, n, (i, j) => field.add(at(tl, i, j), at(tl, j, i))));
  });
  let rows: Matrix<Algebraic> = { field, rows: image.length, cols: width, data: image.flat() };
  rows = echelon(rows).matrix;
  const out: Matrix<Algebraic>[] = [];
  const weight = (m: Matrix<Algebraic>) => m.data.reduce((s, x) => s + (field.isZero(x) ? 0 : 1), 0);
  for (const b of [...p].sort((x, y) => weight(x) - weight(y))) {
    const next = above(rows, { field, rows: 1, cols: width, data: coordinates(b) });
    if (rank(next) === rows.rows) continue;
    rows = echelon(next).matrix;
    out.push(b);
  }
  return out;
}

/** The form x ↦ B(c(x), c(x)), c the coordinates of the projection onto the columns of X along X^ω; as an n × n matrix. */
function carried(x: Matrix<Algebraic>, b: Matrix<Algebraic>, action: Action): { c: Matrix<Algebraic>; form: Matrix<Algebraic> } {
  const wx = sparseTimes(sparseTranspose(action.form), x); // Wᵀx, so that (wx)ᵀ v = ω(x, v)
  const gram = multiply(transpose(wx), x);
  const c = multiply(inverse(gram), transpose(wx));
  return { c, form: congruence(c, b) };
}

function averaged(c: Matrix<Algebraic>, b: Matrix<Algebraic>, action: Action): Matrix<Algebraic> {
  const f = action.field;
  let sum = zeroMatrix<Algebraic>(f, action.dimension, action.dimension);
  for (let g = 0; g < action.group.order; g++) {
    const moved = transpose(sparseTimes(sparseTranspose(action.matrix(g)), transpose(c)));
    const q = congruence(moved, b);
    sum = { ...sum, data: sum.data.map((x, i) => (f.isZero(q.data[i]!) ? x : f.add(x, q.data[i]!))) };
  }
  return scale(sum, f.fromRational(1n, BigInt(action.group.order)));
}

function blockUnfolding(block: BlockZero, action: Action): Matrix<Algebraic>[] {
  if (block.kernel.basis.cols === 0) return [];
  const x = multiply(block.block.basis, block.kernel.basis);
  return normalForms(action.field, block.event.l, block.event.operators).map((b) => {
    const { c } = carried(x, b, action);
    return averaged(c, b, action);
  });
}

/** Symmetric matrices Q, ½xᵀQx spanning the normal space in the class; undefined where the group is too large to average over. */
export function unfoldingForms(event: ZeroEvent, action: Action): Matrix<Algebraic>[] | undefined {
  if (action.group.order > AVERAGE_ORDER_LIMIT) return undefined;
  return event.blocks.flatMap((b) => blockUnfolding(b, action));
}

/** The same without symmetry; undefined where there are too many. */
export function freeUnfoldingForms(event: ZeroEvent, action: Action, hessian: Matrix<Algebraic>): Matrix<Algebraic>[] | undefined {
  if (event.codimensionWithoutSymmetry > FREE_TERMS_LIMIT || action.dimension > FREE_DIMENSION_LIMIT) return undefined;
  const w = sparseTimes(
    action.form,
    build<Algebraic>(action.field, action.dimension, action.dimension, (i, j) => (i === j ? action.field.one : action.field.zero)),
  );
  const l = multiply(poisson(w), hessian);
  const e = generalisedKernel(l).basis;
  const gram = congruence(e, w);
  const c = multiply(inverse(gram), multiply(transpose(e), w));
  const restricted = multiply(c, multiply(l, e));
  return normalForms(action.field, restricted, []).map((b) => congruence(c, b));
}

/** A quadratic form ½xᵀQx as text in the coordinates, scaled to small integers, positive first coefficient. */
export function quadraticText(q: Matrix<Algebraic>, names: readonly string[], field: RealField): string {
  const n = q.rows;
  const entries: { i: number; j: number; x: Algebraic }[] = [];
  for (let i = 0; i < n; i++)
    for (let j = i; j < n; j++) {
      const x = at(q, i, j);
      if (!field.isZero(x)) entries.push({ i, j, x: i === j ? x : field.add(x, x) });
    }
  if (entries.length === 0) return '0';
  const unit = field.inv(entries[0]!.x);
  const normal = entries.map((e) => ({ ...e, x: field.mul(e.x, unit) }));
  let common = 1n;
  for (const e of normal) common = (common * e.x.d) / gcd(common, e.x.d);
  const factor = field.fromInteger(common);
  let text = '';
  for (const e of normal) {
    const x = field.mul(e.x, factor);
    const negative = field.sign(x) < 0;
    const size = negative ? field.neg(x) : x;
    const written = field.format(size);
    const monomial = e.i === e.j ? `${names[e.i]}^2` : `${names[e.i]}*${names[e.j]}`;
    const body = field.equal(size, field.one) ? monomial : `${/ [+-] /.test(written) ? `(${written})` : written}*${monomial}`;
    text += text === '' ? (negative ? `-${body}` : body) : negative ? ` - ${body}` : ` + ${body}`;
  }
  return text;
}
