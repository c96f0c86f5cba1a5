/**
 * Multiplicity spaces: for each irreducible K of a subgroup acting on V an exact basis of e V_K (see
 * subspace-search.ts). The forms S and ω restricted to it carry all that happens on the component of K.
 */
import { type Algebraic, gcd, type RealField } from '../field/index.ts';
import type { FiniteGroup } from '../group/index.ts';
import {
  build,
  fromColumns,
  identity,
  inverse,
  kernel,
  type Matrix,
  minor,
  modularEchelon,
  multiply,
  type SparseMatrix,
  scale,
  sparseFromMaps,
  sparseTimes,
  sub,
} from '../linear/index.ts';
import type { Cutter } from './subspace-search.ts';

/** An irreducible as the construction needs it. */
export interface PresentIrreducible {
  readonly dimension: number;
  readonly beta: 1 | 2 | 4;
  readonly multiplicity: number;
  /** Real character by class, exact in the field of the action. */
  readonly character: readonly Algebraic[];
}

/** Representation of a group by sparse matrices. */
export interface Represented {
  readonly field: RealField;
  readonly dimension: number;
  readonly group: FiniteGroup;
  matrix(element: number): SparseMatrix<Algebraic>;
}

/** e = Σ λ(h) ρ(h), not divided by |H|. */
export function cutterMatrix(rep: Represented, cutter: Cutter): SparseMatrix<Algebraic> {
  const f = rep.field;
  const maps = Array.from({ length: rep.dimension }, () => new Map<number, Algebraic>());
  cutter.elements.forEach((e, i) => {
    const m = rep.matrix(e);
    const negative = cutter.signs[i] === -1;
    m.index.forEach((cols, r) => {
      const map = maps[r]!;
      cols.forEach((j, k) => {
        const x = negative ? f.neg(m.value[r]![k]!) : m.value[r]![k]!;
        const old = map.get(j);
        map.set(j, old === undefined ? x : f.add(old, x));
      });
    });
  });
  return sparseFromMaps(f, rep.dimension, maps);
}

/** Pivot columns of a matrix modulo a prime: independent over the field because they are modulo p. */
function pivotColumns(a: Matrix<Algebraic>, field: RealField): number[] {
  const r = field.reduction();
  return modularEchelon({ p: r.p, rows: a.rows, cols: a.cols, data: Int32Array.from(a.data, (x) => r.apply(x)) }).pivots;
}

/** Basis (columns) of the column space of e: `expected` independent columns of e. */
function columnBasis(e: SparseMatrix<Algebraic>, field: RealField, expected: number): Matrix<Algebraic> {
  const r = field.reduction();
  const n = e.rows;
  const data = new Int32Array(n * n);
  e.index.forEach((cols, i) => {
    cols.forEach((j, k) => {
      data[i * n + j] = r.apply(e.value[i]![k]!);
    });
  });
  const { pivots } = modularEchelon({ p: r.p, rows: n, cols: n, data });
  if (pivots.length !== expected) throw new Error(`the image of an idempotent has rank ${pivots.length}, its trace says ${expected}`);
  const place = new Map(pivots.map((j, k) => [j, k]));
  const out = new Array<Algebraic>(n * pivots.length).fill(field.zero);
  e.index.forEach((cols, i) => {
    cols.forEach((j, k) => {
      const c = place.get(j);
      if (c !== undefined) out[i * pivots.length + c] = e.value[i]![k]!;
    });
  });
  return { field, rows: n, cols: pivots.length, data: out };
}

/** Coordinates: X with basis·X = images, for images in the span; rows chosen once. */
export function coordinateMap(basis: Matrix<Algebraic>, field: RealField): (images: Matrix<Algebraic>) => Matrix<Algebraic> {
  const rows = pivotColumns(
    build(field, basis.cols, basis.rows, (i, j) => basis.data[j * basis.cols + i]!),
    field,
  );
  const all = Array.from({ length: basis.cols }, (_, j) => j);
  const inv = inverse(minor(basis, rows, all));
  return (images) =>
    multiply(
      inv,
      minor(
        images,
        rows,
        Array.from({ length: images.cols }, (_, j) => j),
      ),
    );
}

/**
 * Basis of e V_K for the irreducible number k of `present`; columns, dimension × (multiplicity · dim eK).
 * Other irreducibles that λ lets through are separated by the scalars of class sums.
 */
export function multiplicityBasis(rep: Represented, present: readonly PresentIrreducible[], k: number, cutter: Cutter): Matrix<Algebraic> {
  const f = rep.field;
  const group = rep.group;
  const total = present.reduce((s, x, i) => s + x.multiplicity * cutter.dimensions[i]!, 0);
  let basis = columnBasis(cutterMatrix(rep, cutter), f, total);
  let others = present.map((_, i) => i).filter((i) => i !== k && cutter.dimensions[i]! > 0);
  const scalar = (i: number, c: number) => {
    // the sum over a class acts on K as |C| χ(C)/χ(1)
    const size = f.fromRational(BigInt(group.classes[c]!.size), BigInt(present[i]!.dimension));
    return f.mul(size, present[i]!.character[c]!);
  };
  while (others.length > 0) {
    let best = -1;
    let score = 0;
    for (let c = 1; c < group.classes.length; c++) {
      const mine = scalar(k, c);
      const separated = others.filter((i) => !f.equal(scalar(i, c), mine)).length;
      if (separated === 0) continue;
      const value = separated / (group.classes[c]!.size + 4);
      if (value > score) {
        score = value;
        best = c;
      }
    }
    if (best < 0) throw new Error('two different irreducibles have the same central character');
    const image = classSumTimes(rep, best, basis);
    const z = coordinateMap(basis, f)(image);
    const free = kernel(sub(z, scale(identity<Algebraic>(f, basis.cols), scalar(k, best))));
    basis = tidy(multiply(basis, free), f);
    others = others.filter((i) => f.equal(scalar(i, best), scalar(k, best)));
  }
  const expected = present[k]!.multiplicity * cutter.dimensions[k]!;
  if (basis.cols !== expected) throw new Error(`a multiplicity space has dimension ${basis.cols}, its character says ${expected}`);
  return tidy(basis, f);
}

/** (real class sum)·basis: the mean of a class and of the class of inverses, times the class size. */
function classSumTimes(rep: Represented, c: number, basis: Matrix<Algebraic>): Matrix<Algebraic> {
  const f = rep.field;
  const { group } = rep;
  const inverseClass = group.classes[c]!.inverse;
  let sum: Matrix<Algebraic> | undefined;
  for (let e = 0; e < group.order; e++) {
    const own = group.classOf[e]!;
    if (own !== c && own !== inverseClass) continue;
    const t = sparseTimes(rep.matrix(e), basis);
    sum = sum === undefined ? t : { ...sum, data: sum.data.map((x, i) => f.add(x, t.data[i]!)) };
  }
  return inverseClass === c ? sum! : scale(sum!, f.fromRational(1n, 2n));
}

/** The same column space with integral columns, echelon from the top, common factors removed. */
export function tidy(basis: Matrix<Algebraic>, field: RealField): Matrix<Algebraic> {
  const columns: Algebraic[][] = [];
  for (let j = 0; j < basis.cols; j++) {
    let common = 1n;
    let content = 0n;
    const col: Algebraic[] = [];
    for (let i = 0; i < basis.rows; i++) {
      const x = basis.data[i * basis.cols + j]!;
      col.push(x);
      if (x.d !== 1n) common = lcm(common, x.d);
    }
    const cleared = common === 1n ? col : col.map((x) => field.mul(x, field.fromInteger(common)));
    for (const x of cleared) for (const y of x.c) if (y !== 0n) content = gcd(content, y);
    columns.push(content > 1n ? cleared.map((x) => field.mul(x, field.fromRational(1n, content))) : cleared);
  }
  return fromColumns(field, columns, basis.rows);
}

function lcm(a: bigint, b: bigint): bigint {
  return (a / gcd(a, b)) * b;
}
