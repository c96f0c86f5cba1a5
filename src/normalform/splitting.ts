/**
 * The splitting lemma (Lyapunov-Schmidt reduction of a gradient): the critical points of H near the event are those of a
 * function h on K = ker S (D. Gromoll, W. Meyer 1969; M. Golubitsky, D. Schaeffer, Singularities and Groups in
 * Bifurcation Theory I, 1985, ch. VII; places from memory).
 *
 * x = K u + C v(u, mu) with C'∇H = 0. H is stationary in v, so an error of order m + 1 in v is an error of order 2m + 2 in h:
 * v is needed to half the degree only. H is composed with the series x(u, mu) in the few variables u, mu; it is never
 * expanded in the coordinates u, v.
 */
import { InputError, ShapeError } from '../errors/index.ts';
import type { Field } from '../field/index.ts';
import { at, build, inverse, type Matrix, minor, numberIdentity, numberMatrix, numberSolve } from '../linear/index.ts';
import { factorsOf, type Monomial, type Polynomial, PolynomialRing, RationalFunctionField } from '../polynomial/index.ts';
import { type Composer, denseComposer, sparseComposer } from './composition.ts';
import { withoutFractions } from './fraction-free.ts';
import { SeriesAlgebra } from './truncated-series.ts';

/** Relative size below which an entry of a floating Hessian counts as rounding. */
const ROUNDING = 1e-12;

export interface ReductionInput<T> {
  /** The first `dimension` variables are the coordinates x - x0, the others unfolding parameters mu - mu0. */
  readonly ring: PolynomialRing<T>;
  readonly dimension: number;
  /** Taylor polynomial at the event: no constant term, no linear term in x alone. */
  readonly hamiltonian: Polynomial<T>;
  /** Columns: basis of ker S and of a complement (Γ-invariant for an invariant h). */
  readonly kernel: Matrix<T>;
  readonly complement: Matrix<T>;
  /** Weighted degree to which h is wanted: a coordinate of the kernel weighs 1, parameter i weighs weights[i]. */
  readonly degree: number;
  /** Default 2 for each parameter. */
  readonly weights?: readonly number[];
  /** Names of the coordinates on the kernel; default u1, u2, … */
  readonly names?: readonly string[];
}

export interface ReducedHamiltonian<T> {
  /** Coordinates on the kernel, then the parameters. */
  readonly ring: PolynomialRing<T>;
  readonly dimension: number;
  readonly h: Polynomial<T>;
  /** The slaved coordinates v, to half the degree. */
  readonly slaved: readonly Polynomial<T>[];
  readonly degree: number;
}

/** Throws ShapeError if the pieces do not fit, InputError if K is not the kernel of the Hessian. */
export function reduceToKernel<T>(input: ReductionInput<T>): ReducedHamiltonian<T> {
  check(input);
  const { ring, dimension, kernel } = input;
  const names = input.names ?? Array.from({ length: kernel.cols }, (_, i) => `u${i + 1}`);
  const target = new PolynomialRing(ring.field, [...names, ...ring.variables.slice(dimension)]);
  const field: Field<unknown> = ring.field as Field<unknown>;
  const inverses = invertBlocks(complementForm(input), ring.field);
  if (field instanceof RationalFunctionField) {
    const plain = withoutFractions(field, ring as unknown as PolynomialRing<never>, {
      hamiltonian: input.hamiltonian as never,
      kernel: kernel as never,
      complement: input.complement as never,
      inverse: inverses as never,
    });
    const raw = reduceWith({ ...input, ...plain } as unknown as ReductionInput<unknown>, plain.inverse as Matrix<unknown>);
    const back = (p: Polynomial<unknown>) => target.map(p as Polynomial<T>, plain.restore as unknown as (c: T) => T, target);
    return { ring: target, dimension: kernel.cols, h: back(raw.h), slaved: raw.slaved.map(back), degree: input.degree };
  }
  return { ring: target, dimension: kernel.cols, degree: input.degree, ...reduceWith(input, inverses) };
}

function check<T>(input: ReductionInput<T>): void {
  const { ring, dimension: n, hamiltonian, kernel, complement } = input;
  if (kernel.rows !== n || complement.rows !== n || kernel.cols + complement.cols !== n)
    throw new ShapeError(`a kernel of dimension ${kernel.cols} and a complement of dimension ${complement.cols} in ${n} coordinates`);
  const parameters = ring.variables.length - n;
  if (input.weights !== undefined && (input.weights.length !== parameters || input.weights.some((w) => !(Number.isInteger(w) && w > 0))))
    throw new ShapeError(`${input.weights.length} weights for ${parameters} parameters; each is a positive integer`);
  for (const m of hamiltonian.monomials)
    if (m.length < 2 && (m.length === 0 || m.charCodeAt(0) < n))
      throw new InputError('the point of the reduction is not an equilibrium', {
        value: m.length === 0 ? 'a constant term' : `a linear term in ${ring.variables[m.charCodeAt(0)]}`,
      });
  const s = hessianForm(input);
  const f = ring.field;
  for (let j = 0; j < kernel.cols; j++)
    for (const [i, row] of s) {
      let sum = f.zero;
      for (const [k, c] of row) sum = f.add(sum, f.mul(c, at(kernel, k, j)));
      if (f.exact && !f.isZero(sum))
        throw new InputError('a vector of the kernel is not in the kernel of the Hessian', {
          key: `${ring.variables[i]}`,
          value: f.format(sum),
        });
    }
}

/** The Hessian at the event, sparse by rows. */
function hessianForm<T>({ ring, dimension, hamiltonian }: ReductionInput<T>): Map<number, Map<number, T>> {
  const f = ring.field;
  const rows = new Map<number, Map<number, T>>();
  const put = (i: number, j: number, c: T) => {
    const row = rows.get(i) ?? new Map<number, T>();
    rows.set(i, row);
    const old = row.get(j);
    row.set(j, old === undefined ? c : f.add(old, c));
  };
  for (const [m, c] of ring.terms(hamiltonian)) {
    if (m.length > 2) break;
    if (m.length < 2) continue;
    const [i, j] = [m.charCodeAt(0), m.charCodeAt(1)];
    if (j >= dimension) continue;
    put(i, j, c);
    put(j, i, c);
  }
  return rows;
}

/** C'SC. */
function complementForm<T>(input: ReductionInput<T>): Matrix<T> {
  const f = input.ring.field;
  const c = input.complement;
  const s = hessianForm(input);
  const sc = Array.from({ length: c.cols }, () => new Map<number, T>());
  for (const [i, row] of s)
    for (const [k, x] of row)
      for (let j = 0; j < c.cols; j++) {
        const y = at(c, k, j);
        if (f.isZero(y)) continue;
        const old = sc[j]!.get(i);
        sc[j]!.set(i, old === undefined ? f.mul(x, y) : f.add(old, f.mul(x, y)));
      }
  return build(f, c.cols, c.cols, (a, b) => {
    let sum = f.zero;
    for (const [i, x] of sc[b]!) {
      const y = at(c, i, a);
      if (!f.isZero(y)) sum = f.add(sum, f.mul(y, x));
    }
    return sum;
  });
}

/** Inverse of a symmetric matrix, by the connected blocks of its nonzero entries. Throws InputError if it is singular. */
function invertBlocks<T>(q: Matrix<T>, f: Field<T>): Matrix<T> {
  const n = q.rows;
  if (!f.exact) q = withoutRounding(q);
  const out = new Array<T>(n * n).fill(f.zero);
  const done = new Uint8Array(n);
  for (let start = 0; start < n; start++) {
    if (done[start] === 1) continue;
    const block = [start];
    done[start] = 1;
    for (let b = 0; b < block.length; b++)
      for (let j = 0; j < n; j++)
        if (done[j] === 0 && !f.isZero(at(q, block[b]!, j))) {
          done[j] = 1;
          block.push(j);
        }
    let inv: Matrix<T>;
    try {
      inv = f.exact ? inverse(minor(q, block, block)) : floatingInverse(minor(q, block, block));
    } catch (error) {
      if (!(error instanceof RangeError)) throw error;
      throw new InputError('the Hessian is singular on the complement of the kernel', { expected: 'the whole kernel of the Hessian' });
    }
    block.forEach((i, a) => {
      block.forEach((j, b) => {
        out[i * n + j] = at(inv, a, b);
      });
    });
  }
  return { field: f, rows: n, cols: n, data: out };
}

/** Entries of a floating form that are rounding (below ROUNDING of the largest) set to zero, so that its blocks come apart. */
function withoutRounding<T>(q: Matrix<T>): Matrix<T> {
  const most = q.data.reduce((s, x) => Math.max(s, Math.abs(x as number)), 0);
  return { ...q, data: q.data.map((x) => (Math.abs(x as number) <= ROUNDING * most ? q.field.zero : x)) };
}
/** Inverse by partial pivoting. */
function floatingInverse<T>(a: Matrix<T>): Matrix<T> {
  const x = numberSolve(numberMatrix(a.rows, a.cols, a.data as readonly number[]), numberIdentity(a.rows));
  return { ...a, data: Array.from(x.data) as T[] };
}

/** The reduction with the inverse of C'SC given; uses no division. */
function reduceWith<T>(input: ReductionInput<T>, inverseForm: Matrix<T>): { h: Polynomial<T>; slaved: Polynomial<T>[] } {
  const variables = input.kernel.cols + input.ring.variables.length - input.dimension;
  const work = new PolynomialRing(
    input.ring.field,
    Array.from({ length: variables }, (_, i) => `t${i}`),
  );
  return SeriesAlgebra.fits(variables, input.degree)
    ? compose(input, inverseForm, work, denseComposer(work.field, work, input.degree))
    : compose(input, inverseForm, work, sparseComposer(work.field, work, input.degree));
}

function compose<T, S>(
  input: ReductionInput<T>,
  inverseForm: Matrix<T>,
  work: PolynomialRing<T>,
  series: Composer<T, S>,
): { h: Polynomial<T>; slaved: Polynomial<T>[] } {
  const { ring, dimension: n, hamiltonian, kernel, complement, degree } = input;
  const f = ring.field;
  const k = kernel.cols;
  const weights = input.weights ?? new Array<number>(ring.variables.length - n).fill(2);
  // a parameter of weight w is t^w: the truncation by degree is then the truncation by weight
  const parameters = weights.map((w, i) => series.power(k + i, w));
  const linear = Array.from({ length: n }, (_, i) => series.linear(Array.from({ length: k }, (_, j) => at(kernel, i, j))));
  // the quadratic part in x alone acts through C'SC only
  const rest = ring.fromTerms([...ring.terms(hamiltonian)].filter(([m]) => m.length !== 2 || m.charCodeAt(1) >= n));
  const rows = Array.from({ length: n }, (_, i) =>
    Array.from({ length: complement.cols }, (_, j) => [j, at(complement, i, j)] as const).filter(([, c]) => !f.isZero(c)),
  );
  const gradient = rows.map((row, i) => (row.length === 0 ? ring.zero : ring.derivative(rest, i)));
  const half = Math.floor(degree / 2);
  const v: S[] = Array.from({ length: complement.cols }, () => series.zero);
  const forces: S[] = Array.from({ length: complement.cols }, () => series.zero);
  const images = (): S[] => [
    ...linear.map((x, i) => {
      const moved = rows[i]!.filter(([j]) => !series.isZero(v[j]!));
      return moved.length === 0 ? x : series.combination([[f.one, x], ...moved.map(([j, c]) => [c, v[j]!] as const)]);
    }),
    ...parameters,
  ];
  for (let m = 1; m <= half && complement.cols > 0; m++) {
    if (m === 1 && !weights.includes(1)) continue;
    const x = images();
    const residues = gradient.map((g) => (ring.isZero(g) ? series.zero : series.part(series.evaluate(g, x, m), m)));
    const force = v.map((_, j) =>
      series.combination(
        rows.flatMap((row, i) => row.filter(([l]) => l === j && !series.isZero(residues[i]!)).map(([, c]) => [c, residues[i]!] as const)),
      ),
    );
    const active = force.map((_, l) => l).filter((l) => !series.isZero(force[l]!));
    for (let j = 0; j < v.length; j++) {
      const parts = active.filter((l) => !f.isZero(at(inverseForm, j, l))).map((l) => [f.neg(at(inverseForm, j, l)), force[l]!] as const);
      if (parts.length > 0) v[j] = series.combination([[f.one, v[j]!], ...parts]);
    }
    for (const l of active)
      forces[l] = series.combination([
        [f.one, forces[l]!],
        [f.one, force[l]!],
      ]);
  }
  // C'SC v = -forces for the terms of v that were computed, so that ½ v'(C'SC)v = -½ Σ v_j forces_j
  const minusHalf = f.fromRational(-1n, 2n);
  const quadratic = v.flatMap((x, j) =>
    series.isZero(x) || series.isZero(forces[j]!) ? [] : [[minusHalf, series.multiply(x, forces[j]!)] as const],
  );
  const h = series.combination([[f.one, series.evaluate(rest, images(), degree)], ...quadratic]);
  const unweigh = (p: Polynomial<T>): Polynomial<T> =>
    weights.every((w) => w === 1)
      ? p
      : work.fromTerms(
          p.monomials.map((m, i) => {
            let out: Monomial = '';
            for (const [variable, e] of factorsOf(m))
              out += String.fromCharCode(variable).repeat(variable < k ? e : e / weights[variable - k]!);
            return [out, p.coefficients[i]!] as const;
          }),
        );
  return { h: unweigh(series.toPolynomial(h)), slaved: v.map((x) => unweigh(series.toPolynomial(x))) };
}
