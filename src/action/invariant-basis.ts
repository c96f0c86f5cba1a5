/**
 * A readable basis of an invariant subspace: copy by copy of the irreducibles in it, each spanned by the orbit of a vector
 * with large isotropy, orthogonal for a Γ-invariant inner product and of length 1 where the square roots allow it.
 */
import { type Algebraic, gcd, type Rational, RealField, squareFree } from '../field/index.ts';
import { congruence, dense, fromColumns, identity, kernel, type Matrix, multiply, sparseApply, transpose } from '../linear/index.ts';
import type { Action } from './action.ts';
import { adaptedBlocks, type Components } from './components.ts';
import { embedAction } from './irreducibles.ts';

/** Larger groups are not averaged over for the inner product. */
const AVERAGE_LIMIT = 2000;
/** Square roots are adjoined up to this degree of the field. */
const DEGREE_LIMIT = 32;

export interface InvariantBasis {
  /** The action over the field of the basis. */
  readonly action: Action;
  /** n × k, columns in the order of the copies. */
  readonly basis: Matrix<Algebraic>;
  /** Γ-invariant complement, orthogonal to the subspace. */
  readonly complement: Matrix<Algebraic>;
  /** True if the basis is orthonormal for an inner product that Γ preserves. */
  readonly orthonormal: boolean;
}

/** Inner product preserved by Γ: the identity for orthogonal generators, else the average of it. */
function innerProduct(action: Action): Matrix<Algebraic> {
  const f = action.field;
  const one = identity<Algebraic>(f, action.dimension);
  const orthogonal = action.generators.every((g) => {
    const m = dense(g.matrix);
    const gram = multiply(transpose(m), m);
    return gram.data.every((x, i) => f.equal(x, one.data[i]!));
  });
  if (orthogonal || action.group.order > AVERAGE_LIMIT) return one;
  let sum = one.data.map(() => f.zero);
  for (let g = 0; g < action.group.order; g++) {
    const m = dense(action.matrix(g));
    const gram = multiply(transpose(m), m);
    sum = sum.map((x, i) => f.add(x, gram.data[i]!));
  }
  return { ...one, data: sum };
}

/**
 * Basis of ker S for an invariant symmetric S (or of any invariant subspace given as the kernel of one). The result's
 * field contains the square roots that normalise it.
 */
export function invariantBasis(
  action: Action,
  components: Components,
  s: Matrix<Algebraic>,
  findRoots: RootFinder = () => undefined,
): InvariantBasis {
  const f = action.field;
  const b = innerProduct(action);
  const dot = (u: readonly Algebraic[], v: readonly Algebraic[]) => {
    let sum = f.zero;
    const bv = multiply(b, fromColumns(f, [v as Algebraic[]], v.length)).data;
    u.forEach((x, i) => {
      if (!f.isZero(x)) sum = f.add(sum, f.mul(x, bv[i]!));
    });
    return sum;
  };
  const columns: Algebraic[][] = [];
  for (const block of adaptedBlocks(action, components)) {
    const free = kernel(congruence(block.basis, s));
    const seeds = multiply(block.basis, free);
    const own: Algebraic[][] = []; // orthogonal vectors of this component
    for (let c = 0; c < seeds.cols && own.length < (free.cols / block.cut) * block.component.irreducible.dimension; c++) {
      const seed = orthogonalised(
        Array.from({ length: seeds.rows }, (_, i) => seeds.data[i * seeds.cols + c]!),
        own,
        dot,
        f,
      );
      if (seed.every((x) => f.isZero(x))) continue;
      own.push(...byIsotropy(action, orbitBasis(action, seed, block.component.irreducible.dimension, dot)));
    }
    columns.push(...own.map((v) => primitive(v, f)));
  }
  return normalised(action, columns, b, dot, findRoots);
}

function orthogonalised(
  v: readonly Algebraic[],
  basis: readonly (readonly Algebraic[])[],
  dot: (u: readonly Algebraic[], v: readonly Algebraic[]) => Algebraic,
  f: RealField,
): Algebraic[] {
  let out = v.slice();
  for (const u of basis) {
    const c = f.div(dot(u, v), dot(u, u));
    if (!f.isZero(c)) out = out.map((x, i) => f.sub(x, f.mul(c, u[i]!)));
  }
  return out;
}

/** Orthogonal basis of the span of an orbit, members of the orbit that are orthogonal already first. */
function orbitBasis(
  action: Action,
  seed: Algebraic[],
  dimension: number,
  dot: (u: readonly Algebraic[], v: readonly Algebraic[]) => Algebraic,
): Algebraic[][] {
  const f = action.field;
  const out = [seed];
  for (const exact of [true, false])
    for (let g = 1; g < action.group.order && out.length < dimension; g++) {
      const v = sparseApply(action.matrix(g), seed);
      if (exact) {
        if (out.every((u) => f.isZero(dot(u, v)))) out.push(v);
        continue;
      }
      const w = orthogonalised(v, out, dot, f);
      if (w.some((x) => !f.isZero(x))) out.push(w);
    }
  return out;
}

/** Vectors that more elements of Γ fix come first. */
function byIsotropy(action: Action, vectors: readonly Algebraic[][]): Algebraic[][] {
  const f = action.field;
  const fixing = (v: readonly Algebraic[]) => {
    let count = 0;
    for (let g = 0; g < action.group.order; g++) if (sparseApply(action.matrix(g), v).every((x, i) => f.equal(x, v[i]!))) count++;
    return count;
  };
  if (vectors.length === 1 || action.group.order > AVERAGE_LIMIT) return vectors.slice();
  return vectors
    .map((v) => ({ v, count: fixing(v) }))
    .sort((a, b) => b.count - a.count)
    .map((x) => x.v);
}

/** Integral, primitive, first coefficient positive. */
function primitive(v: readonly Algebraic[], f: RealField): Algebraic[] {
  let common = 1n;
  for (const x of v) common = (common * x.d) / gcd(common, x.d);
  const cleared = v.map((x) => f.mul(x, f.fromInteger(common)));
  let content = 0n;
  for (const x of cleared) for (const c of x.c) content = gcd(content, c);
  const first = cleared.find((x) => !f.isZero(x))!;
  const factor = f.fromRational(f.sign(first) < 0 ? -1n : 1n, content === 0n ? 1n : content);
  return cleared.map((x) => f.mul(x, factor));
}

/** Finds square roots of the given positive elements of a field: a larger field with the roots in it, or undefined. */
export type RootFinder = (
  field: RealField,
  squares: readonly Algebraic[],
) => { readonly field: RealField; readonly roots: readonly Algebraic[] } | undefined;

/** Roots of rationals; nothing else is looked for. */
const rationalRoots: RootFinder = (field, squares) => {
  const rationals = squares.map((x) => field.toRational(x));
  if (rationals.some((r) => r === undefined)) return undefined;
  const squareRoots = (rationals as Rational[]).map((r) => r.n * r.d);
  const primes = new Set(squareRoots.flatMap((r) => squareFree(r).primes));
  if (field.degree * 2 ** primes.size > DEGREE_LIMIT) return undefined;
  const wide = RealField.of({
    cosines: [...(field.demand.cosines ?? [])],
    squareRoots: [...(field.demand.squareRoots ?? []), ...squareRoots],
  });
  return { field: wide, roots: (rationals as Rational[]).map((r) => wide.sqrt(r)!) };
};

function normalised(
  action: Action,
  columns: readonly Algebraic[][],
  b: Matrix<Algebraic>,
  dot: (u: readonly Algebraic[], v: readonly Algebraic[]) => Algebraic,
  findRoots: RootFinder,
): InvariantBasis {
  const f = action.field;
  const n = action.dimension;
  const basis = fromColumns<Algebraic>(f, columns, n);
  const complement = kernel(multiply(transpose(basis), b));
  const norms = columns.map((v) => dot(v, v));
  const found = rationalRoots(f, norms) ?? findRoots(f, norms);
  if (found === undefined || found.field.degree > DEGREE_LIMIT) return { action, basis, complement, orthonormal: false };
  const { field, roots } = found;
  const move = (m: Matrix<Algebraic>): Matrix<Algebraic> => ({
    field,
    rows: m.rows,
    cols: m.cols,
    data: m.data.map((x) => field.embed(f, x)),
  });
  const wide = move(basis);
  const unit = { ...wide, data: wide.data.map((x, i) => field.div(x, roots[i % wide.cols]!)) };
  return { action: embedAction(action, field), basis: unit, complement: move(complement), orthonormal: true };
}
