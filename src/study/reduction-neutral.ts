/**
 * Reduction beside a continuous symmetry: relative equilibria at fixed momenta, modulo the symmetry. With J_a the momentum of
 * the field ξ_a (∇J_a = Wᵀξ_a), T spanned by the independent velocities v_a = ξ_a(x₀), R = T ∩ T^ω and G an inner product
 * that Γ preserves,
 *
 *   F(y, λ, ν) = H(x₀ + y) − Σ λ_a (J_a(x₀ + y) − J_a(x₀)) + Σ ν_b r_b·Gy
 *
 * is stationary exactly at the relative equilibria near x₀ with the momenta of x₀, one on each orbit of the fields that
 * keep the momenta: r_b, a basis of R, are the directions of that group (Marsden–Weinstein reduction), and where the
 * fields are closed under brackets ν vanishes at every solution near 0. The Hessian of F has the kernel
 * {(u, λ(u), 0)}, u in ker(S|N), N = T^ω/R, Su = Σ λ_a(u) ∇J_a. So the splitting lemma on F, λ and ν among the slaved
 * variables, gives h on the kernel of the slice (J. E. Marsden, Lectures on Mechanics, 1992, from memory).
 */
import { type AffineField, combineSparse, embedSparse, fieldColumns, type InvariantBasis, type Slice } from '../action/index.ts';
import { InputError, LimitError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import {
  at,
  build,
  dense,
  identity,
  inverse,
  kernel,
  type Matrix,
  mapMatrix,
  multiply,
  rank,
  type SparseMatrix,
  solve,
  sparseApply,
  sparseMultiply,
  sparseTimes,
  sparseTranspose,
  sub,
  transpose,
} from '../linear/index.ts';
import { parseExpression, symbolsOf } from '../model/expression/index.ts';
import { type Monomial, type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import type { LinearStudy } from './linear-study.ts';

/** The extension of the phase space by multipliers of momenta and of gauge conditions. */
export interface FixedMomenta {
  readonly field: RealField;
  /** dim V. */
  readonly dimension: number;
  /** dim T, the number of multipliers λ. */
  readonly momenta: number;
  /** dim T ∩ T^ω, the number of multipliers ν. */
  readonly gauge: number;
  /** (n + momenta + gauge) × k: the vectors (u, λ(u), 0). */
  readonly kernel: Matrix<Algebraic>;
  /** A Γ-invariant complement. */
  readonly complement: Matrix<Algebraic>;
  /** ∇J_a at the equilibrium, n × momenta. */
  readonly gradients: Matrix<Algebraic>;
  /** D²J_a. */
  readonly second: readonly SparseMatrix<Algebraic>[];
  /** G r_b, n × gauge. */
  readonly conditions: Matrix<Algebraic>;
  /** −Σ λ_a J_a + Σ ν_b r_b·Gy in the variables y, λ, ν. */
  readonly terms: readonly (readonly [Monomial, Algebraic])[];
  readonly movers: readonly AffineField[];
  /** J_a in the coordinates and momenta of the model. */
  readonly texts: readonly string[];
}

/** Longer expressions are not repeated in a sentence. */
const MOMENTA_LENGTH = 100;

/** What a result says of the reduction. */
export interface MomentaSummary {
  readonly neutral: { readonly dimension: number; readonly directions: readonly string[] };
  readonly momenta: {
    /** Kept at their values at the equilibrium. */
    readonly fixed: readonly string[];
    readonly because: string;
  };
}

/** The slice, where there is one that differs from the phase space. */
export function properSlice(study: LinearStudy): Slice | undefined {
  const slice = study.slicing?.slice;
  return slice !== undefined && slice.neutral > 0 ? slice : undefined;
}

/** An invariant form whose kernel is ker(S|N) within the complement of T ∩ T^ω in T^ω that the slice chooses. */
export function sliceKernelForm(slice: Slice, hessian: SparseMatrix<Algebraic>): Matrix<Algebraic> {
  const x = kernel(slice.constraints);
  const metric = metricOf(slice);
  const u = multiply(x, kernel(multiply(transpose(x), sparseTimes(hessian, x))));
  const gu = multiply(metric, u);
  return sub(metric, multiply(multiply(gu, inverse(multiply(transpose(u), gu))), transpose(gu)));
}

const metricOf = (slice: Slice): Matrix<Algebraic> =>
  slice.metric === undefined ? identity<Algebraic>(slice.field, slice.dimension) : dense(slice.metric);

/** Throws LimitError where the momenta do not determine a reduced space by the rules above: see the module. */
export function requireTreatable(study: LinearStudy, slice: Slice, symbols: readonly string[] = []): void {
  const { declaration } = study.prepared;
  const file = declaration.source;
  const moving = [...declaration.vary, ...symbols];
  const used = symbolsOfForm(study);
  const tied = moving.filter((name) => used.has(name));
  if (tied.length > 0)
    throw new LimitError(
      `a reduction at fixed momenta is not done where the symplectic form depends on ${tied.join(', ')}: the momenta do too`,
      {
        file,
        key: 'symplectic',
        value: tied.join(', '),
        expected: 'a constant symplectic form beside neutral directions',
        next: 'give these parameters fixed values, or write the model in coordinates that keep the form constant',
      },
    );
  const { field, movers } = slice;
  const known = rank(fieldColumns(field, movers));
  for (const [i, xi] of movers.entries())
    for (const eta of movers.slice(i + 1)) {
      if (rank(fieldColumns(field, [...movers, bracket(field, xi, eta)])) === known) continue;
      throw new LimitError(
        slice.isotropy.length === 0
          ? 'the neutral fields are not closed under brackets, so the momenta that they fix are not all'
          : 'a bracket of neutral fields that move the equilibrium is not one of these: fields that vanish at the equilibrium are treated to first order only, and here they are needed beyond that',
        {
          file,
          key: 'neutral',
          expected: 'fields that move the equilibrium and are closed under brackets',
          next:
            slice.isotropy.length === 0
              ? 'declare the brackets of the fields too'
              : 'fix the conserved momenta in the model, for instance by relative coordinates',
        },
      );
    }
}

/** Names in the entries of a declared symplectic form. */
function symbolsOfForm({ prepared }: LinearStudy): ReadonlySet<string> {
  const out = new Set<string>();
  const seen = new Set<string>();
  const visit = (e: ReturnType<typeof parseExpression>) => {
    for (const s of symbolsOf(e)) {
      if (seen.has(s)) continue;
      seen.add(s);
      out.add(s);
      const inner = prepared.quantities.definitions.get(s) ?? prepared.quantities.valueExpressions.get(s);
      if (inner !== undefined) visit(inner);
    }
  };
  prepared.declaration.form?.forEach((line, i) => {
    line.forEach((text, j) => {
      visit(parseExpression(text, { file: prepared.declaration.source, key: `symplectic[${i + 1}][${j + 1}]` }));
    });
  });
  return out;
}

/** The commutator of the affine fields: linear part BA − AB, value Bv − Aw for ξ = v + Ay, η = w + By. */
function bracket(field: RealField, xi: AffineField, eta: AffineField): AffineField {
  const minus = field.neg(field.one);
  const [b, a] = [sparseApply(eta.linear, xi.value), sparseApply(xi.linear, eta.value)];
  return {
    linear: combineSparse(field, xi.value.length, [
      [field.one, sparseMultiply(eta.linear, xi.linear)],
      [minus, sparseMultiply(xi.linear, eta.linear)],
    ]),
    value: b.map((x, i) => field.sub(x, a[i]!)),
  };
}

/** The extension for a basis of ker(S|N) as `sliceKernelForm` describes it. `hessian` over the field of the slice. */
export function fixedMomenta(study: LinearStudy, slice: Slice, space: InvariantBasis, hessian: SparseMatrix<Algebraic>): FixedMomenta {
  const from = slice.field;
  const field = space.action.field;
  const move = (m: Matrix<Algebraic>) => mapMatrix(m, field, (x) => field.embed(from, x));
  const n = slice.dimension;
  const wt = sparseTranspose(space.action.form);
  const gradients = sparseTimes(wt, move(slice.tangent));
  const second = slice.movers.map((m) => sparseMultiply(wt, embedSparse(m.linear, from, field)));
  const conditions = move(multiply(metricOf(slice), slice.radical));
  const [r, s, k] = [gradients.cols, conditions.cols, space.basis.cols];
  const speeds = solve(gradients, sparseTimes(embedSparse(hessian, from, field), space.basis));
  if (speeds === undefined) throw new Error('a vector of the kernel of the slice is not in the kernel beside multipliers');
  const tops = space.complement.cols;
  return {
    field,
    dimension: n,
    momenta: r,
    gauge: s,
    kernel: build(field, n + r + s, k, (i, j) => (i < n ? at(space.basis, i, j) : i < n + r ? at(speeds, i - n, j) : field.zero)),
    complement: build(field, n + r + s, tops + r + s, (i, j) =>
      i < n && j < tops ? at(space.complement, i, j) : i >= n && j - tops === i - n ? field.one : field.zero,
    ),
    gradients,
    second,
    conditions,
    terms: multiplierTerms(field, n, gradients, second, conditions),
    movers: slice.movers.map((m) => ({ linear: embedSparse(m.linear, from, field), value: m.value.map((x) => field.embed(from, x)) })),
    texts: momentumTexts(study, field, gradients, second),
  };
}

function multiplierTerms(
  field: RealField,
  n: number,
  gradients: Matrix<Algebraic>,
  second: readonly SparseMatrix<Algebraic>[],
  conditions: Matrix<Algebraic>,
): (readonly [Monomial, Algebraic])[] {
  const terms: (readonly [Monomial, Algebraic])[] = [];
  const put = (variables: readonly number[], c: Algebraic) => {
    if (!field.isZero(c)) terms.push([String.fromCharCode(...variables), c]);
  };
  const half = field.fromRational(-1n, 2n);
  second.forEach((q, a) => {
    for (let i = 0; i < n; i++) put([i, n + a], field.neg(at(gradients, i, a)));
    q.index.forEach((columns, i) => {
      columns.forEach((j, e) => {
        const c = q.value[i]![e]!;
        if (i === j) put([i, i, n + a], field.mul(half, c));
        else if (i < j) put([i, j, n + a], field.neg(c));
      });
    });
  });
  for (let b = 0; b < conditions.cols; b++) for (let i = 0; i < n; i++) put([i, n + second.length + b], at(conditions, i, b));
  return terms;
}

/** J_a as polynomials in the coordinates of the model, without constants and up to their signs: ∇J_a = gradient + D²J_a (x − x₀). */
function momentumTexts(
  { prepared }: LinearStudy,
  field: RealField,
  gradients: Matrix<Algebraic>,
  second: readonly SparseMatrix<Algebraic>[],
): string[] {
  const { names, point, field: own } = prepared.quantities;
  const ring = new PolynomialRing<Algebraic>(field, names);
  const x0 = point.map((x) => field.embed(own, x));
  return second.map((q, a) => {
    const moved = sparseApply(q, x0);
    const linear = ring.linearForm(names.map((_, i) => field.sub(at(gradients, i, a), moved[i]!)));
    const half = field.fromRational(1n, 2n);
    const quadratic = ring.fromTerms(
      q.index.flatMap((columns, i) =>
        columns.map((j, e) => [String.fromCharCode(Math.min(i, j), Math.max(i, j)), field.mul(half, q.value[i]![e]!)] as const),
      ),
    );
    const momentum = ring.add(linear, quadratic);
    const first = momentum.coefficients[0];
    return ring.format(first !== undefined && field.sign(first) < 0 ? ring.neg(momentum) : momentum);
  });
}

/** F for the Taylor polynomial of H at the equilibrium; parameters, after the `dimension` coordinates, come after the multipliers. */
export function withMultipliers<C>(
  fixed: FixedMomenta,
  ring: PolynomialRing<C>,
  polynomial: Polynomial<C>,
  embed: (a: Algebraic) => C,
): { ring: PolynomialRing<C>; polynomial: Polynomial<C> } {
  const { dimension: n, momenta, gauge, terms } = fixed;
  const extra = momenta + gauge;
  // names with a blank are in no model
  const names = Array.from({ length: extra }, (_, i) => (i < momenta ? `multiplier ${i + 1}` : `gauge ${i - momenta + 1}`));
  const wide = new PolynomialRing<C>(ring.field, [...ring.variables.slice(0, n), ...names, ...ring.variables.slice(n)]);
  const places = ring.variables.map((_, i) => (i < n ? i : i + extra));
  const moved = wide.renumber(polynomial, places);
  return { ring: wide, polynomial: wide.add(moved, wide.fromTerms(terms.map(([m, c]) => [m, embed(c)] as const))) };
}

/**
 * Throws InputError where a field is not a symmetry for every value of the symbols, which the coefficients of the
 * polynomial contain: H to the degree given, about the equilibrium.
 */
export function requireSymbolicSymmetry<C>(
  fixed: FixedMomenta,
  ring: PolynomialRing<C>,
  polynomial: Polynomial<C>,
  embed: (a: Algebraic) => C,
  degree: number,
  file: string,
  symbols: readonly string[],
): void {
  const f = ring.field;
  const n = fixed.dimension;
  for (const xi of fixed.movers) {
    const along = Array.from({ length: n }, (_, i) => {
      const component = ring.add(
        ring.constant(embed(xi.value[i]!)),
        ring.fromTerms(xi.linear.index[i]!.map((j, e) => [String.fromCharCode(j), embed(xi.linear.value[i]![e]!)] as const)),
      );
      return ring.isZero(component) ? ring.zero : ring.mulTruncated(ring.derivative(polynomial, i), component, degree - 1);
    });
    const change = ring.truncate(ring.sum(along), degree - 1);
    if (change.coefficients.every((c) => f.isZero(c))) continue;
    throw new InputError(`a neutral field depends on ${symbols.join(', ')}, or is a symmetry for some values only`, {
      file,
      key: 'neutral',
      value: symbols.join(', '),
      expected: 'fields along which H does not change for every value of the parameters without one',
      next: 'give these parameters values',
    });
  }
}

/** What a result says beside its answer. */
export function momentaSummary(study: LinearStudy, fixed: FixedMomenta): MomentaSummary {
  const { slice, directions } = study.slicing!;
  const written = fixed.texts.join(', ');
  const [what, keep, them] = fixed.texts.length > 1 ? ['momenta', 'keep their values', 'them'] : ['momentum', 'keeps its value', 'it'];
  const subject = written.length <= MOMENTA_LENGTH ? `the ${what} ${written}` : `the ${what} of the neutral fields`;
  const because =
    `at fixed momenta: ${subject} ${keep} at the equilibrium, and motions along the continuous symmetry that leave ${them} alone are divided out; critical points are relative equilibria` +
    (slice.isotropy.length === 0
      ? ''
      : '; fields that vanish at the equilibrium count in the linear analysis only, here the declared finite symmetry alone is used');
  return { neutral: { dimension: slice.neutral, directions }, momenta: { fixed: fixed.texts, because } };
}
