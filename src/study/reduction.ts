/**
 * The reduced Hamiltonian of a zero event: coordinates on the kernel, the splitting lemma with the varied parameters as
 * unfolding variables, the invariants of Γ on the kernel, and the germ. Shared by `reduce` and `branches`.
 */
import { coordinateMap, embedSparse, type InvariantBasis, invariantBasis } from '../action/index.ts';
import { LimitError, UsageError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { type GeneratorSet, type LinearAction, linearAction, minimalGenerators } from '../invariant/index.ts';
import { congruence, dense, type Matrix, sparseTimes } from '../linear/index.ts';
import { taylor, withField } from '../model/expression/index.ts';
import { squareRoot } from '../model/expression/square-root.ts';
import { polynomialDegree } from '../model/polynomial-energy.ts';
import { analyseGerm, type Germ } from '../normalform/germ.ts';
import { type ReducedHamiltonian, reduceToKernel } from '../normalform/splitting.ts';
import { factorsOf, type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import type { LinearStudy } from './codim.ts';

/** Degrees tried until the germ is determined, where none is asked for. */
const DEGREES = [4, 6, 8];
/** On kernels of more dimensions the series are cut at degree 6. */
const WIDE_KERNEL = 3;
/** Phase spaces beyond this dimension are not expanded to high degree. */
export const REDUCTION_DIMENSION_LIMIT = 40;

export interface Reduction {
  readonly space: InvariantBasis;
  readonly field: RealField;
  /** Γ on the kernel; its names are the coordinates u1, u2, … */
  readonly action: LinearAction;
  readonly generators: GeneratorSet;
  /** Names of the varied parameters and their values at the event. */
  readonly parameters: readonly { readonly name: string; readonly value: Algebraic }[];
  readonly reduced: ReducedHamiltonian<Algebraic>;
  /** h at the event: no parameters. */
  readonly ring: PolynomialRing<Algebraic>;
  readonly germ: Polynomial<Algebraic>;
  readonly analysis: Germ;
  readonly degree: number;
  /** ω on the kernel. */
  readonly form: Matrix<Algebraic>;
  /** D³ and higher are complete because H is a polynomial of at most this degree. */
  readonly complete: boolean;
}

/** Square roots of numbers such as 5 - sqrt(5), which are multiples of cosines. */
function rootsByTrigonometry(from: RealField, squares: readonly Algebraic[]): { field: RealField; roots: Algebraic[] } | undefined {
  try {
    const { field, result } = withField((f) => {
      const roots = squares.map((x) => squareRoot(f, f.embed(from, x)));
      return roots.includes(undefined) ? undefined : (roots as Algebraic[]);
    }, from);
    return result === undefined ? undefined : { field, roots: result };
  } catch (error) {
    if (error instanceof LimitError) return undefined;
    throw error;
  }
}

/** Throws UsageError where nothing is at zero, LimitError where the phase space is too large. */
export function reductionOf(study: LinearStudy, degree?: number): Reduction {
  const { prepared, action: linear, components, event } = study;
  const source = prepared.declaration.source;
  if (event.dimension === 0)
    throw new UsageError('nothing to reduce: the Hessian is nonsingular at these values', {
      file: source,
      next: 'move a parameter to a crossing (symcodim sweep finds them), or use reduce --elliptic',
    });
  if (linear.dimension > REDUCTION_DIMENSION_LIMIT)
    throw new LimitError(`a reduction in ${linear.dimension} coordinates is out of reach`, {
      file: source,
      expected: `at most ${REDUCTION_DIMENSION_LIMIT} coordinates`,
    });
  const hessian = embedSparse(prepared.local.hessian, prepared.field, linear.field);
  const space = invariantBasis(linear, components, dense(hessian), rootsByTrigonometry);
  const field = space.action.field;
  const k = space.basis.cols;
  const taken = new Set([...prepared.quantities.names, ...prepared.declaration.parameters.keys()]);
  const letter =
    ['u', 'v', 'y', 'k'].find((l) => Array.from({ length: k }, (_, i) => `${l}${i + 1}`).every((n) => !taken.has(n))) ?? 'kernel';
  const names = Array.from({ length: k }, (_, i) => `${letter}${i + 1}`);
  const coordinates = coordinateMap(space.basis, field);
  const action = linearAction(
    field,
    names,
    linear.group,
    space.action.generators.map((g) => coordinates(sparseTimes(g.matrix, space.basis))),
  );
  const own = polynomialDegree(prepared.hamiltonian, new Set(prepared.quantities.names));
  const parameters = prepared.declaration.vary.map((name) => ({
    name,
    value: field.embed(prepared.quantities.field, prepared.quantities.values.get(name)!),
  }));
  const form = congruence(space.basis, dense(space.action.form));
  const reserved = [...names, ...taken];
  let generators = minimalGenerators(action, { reserved });
  const degrees = degree !== undefined ? [degree] : k >= WIDE_KERNEL ? DEGREES.slice(0, 2) : DEGREES;
  for (const d of degrees) {
    if (!generators.complete && generators.upTo < d) generators = minimalGenerators(action, { reserved, degree: d });
    const { reduced, ring, germ } = expand(study, space, names, parameters, d);
    const analysis = analyseGerm({ action, generators, ring, h: germ, degree: d });
    const last = d === degrees.at(-1) || analysis.codimension !== null;
    if (last)
      return {
        space,
        field,
        action,
        generators,
        parameters,
        reduced,
        ring,
        germ,
        analysis,
        degree: d,
        form,
        complete: own !== undefined && own <= d,
      };
  }
  throw new Error('no degree was tried');
}

function expand(study: LinearStudy, space: InvariantBasis, names: readonly string[], parameters: Reduction['parameters'], degree: number) {
  const { prepared } = study;
  const field = space.action.field;
  const { quantities, hamiltonian } = prepared;
  const vary = parameters.map((p) => p.name);
  const point = new Map([...quantities.pointExpressions, ...vary.map((v) => [v, quantities.valueExpressions.get(v)!] as const)]);
  const t = taylor(hamiltonian, { names: [...quantities.names, ...vary], point, parameters: quantities.valueExpressions, degree, field });
  if (t.kind !== 'exact' || t.field !== field) throw new Error('an exact model has an expansion that is not exact');
  const n = quantities.names.length;
  // constants and terms in the parameters alone do not matter; a linear term in x that a parameter brings does
  const polynomial = t.ring.fromTerms(
    t.polynomial.monomials.flatMap((m, i) =>
      factorsOf(m).some(([v]) => v < n) ? [[m, t.polynomial.coefficients[i]!] as [string, Algebraic]] : [],
    ),
  );
  const reduced = reduceToKernel({
    ring: t.ring,
    dimension: n,
    hamiltonian: polynomial,
    kernel: space.basis,
    complement: space.complement,
    degree,
    names,
  });
  const ring = new PolynomialRing<Algebraic>(field, names);
  const germ = ring.fromTerms(
    reduced.h.monomials.flatMap((m, i) =>
      factorsOf(m).every(([v]) => v < names.length) ? [[m, reduced.h.coefficients[i]!] as [string, Algebraic]] : [],
    ),
  );
  return { reduced, ring, germ };
}
