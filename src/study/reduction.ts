/**
 * The reduced Hamiltonian of a zero event: coordinates on the kernel, the splitting lemma with the varied parameters as
 * unfolding variables, the invariants of Γ on the kernel, and the germ. Shared by `reduce` and `branches`.
 */
import { coordinateMap, embedSparse, type InvariantBasis, invariantBasis } from '../action/index.ts';
import { InputError, LimitError, UsageError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { type GeneratorSet, type LinearAction, linearAction, minimalGenerators } from '../invariant/index.ts';
import { congruence, dense, type Matrix, sparseTimes } from '../linear/index.ts';
import { type Expression, taylor, withField } from '../model/expression/index.ts';
import { squareRoot } from '../model/expression/square-root.ts';
import { polynomialDegree } from '../model/polynomial-energy.ts';
import { analyseGerm, type Germ } from '../normalform/germ.ts';
import { type ReducedHamiltonian, reduceToKernel } from '../normalform/splitting.ts';
import { factorsOf, type Polynomial, PolynomialRing, type RationalFunction, RationalFunctionField } from '../polynomial/index.ts';
import type { LinearStudy } from './linear-study.ts';
import {
  type FixedMomenta,
  fixedMomenta,
  properSlice,
  requireSymbolicSymmetry,
  requireTreatable,
  sliceKernelForm,
  withMultipliers,
} from './reduction-neutral.ts';

/** Degrees tried until the germ is determined, where none is asked for. */
const DEGREES = [4, 6, 8, 10];
/** On kernels of more dimensions the series are cut at degree 6. */
const WIDE_KERNEL = 3;
/** Terms of an expansion times the degree of the field beyond which the next degree is not tried by itself: some seconds of work. */
const TERMS_MOST = 30_000;
/** Phase spaces beyond this dimension are not expanded to high degree. */
export const REDUCTION_DIMENSION_LIMIT = 40;

export interface Reduction<C> {
  readonly space: InvariantBasis;
  readonly field: RealField;
  /** Γ on the kernel; its names are the coordinates u1, u2, … */
  readonly action: LinearAction;
  readonly generators: GeneratorSet;
  /** Names of the varied parameters and their values at the event. */
  readonly parameters: readonly { readonly name: string; readonly value: Algebraic }[];
  readonly reduced: ReducedHamiltonian<C>;
  /** h at the event: no parameters. */
  readonly ring: PolynomialRing<C>;
  readonly germ: Polynomial<C>;
  /** Numbers of the field among the coefficients. */
  readonly embed: (a: Algebraic) => C;
  readonly analysis: Germ;
  readonly degree: number;
  /** ω on the kernel. */
  readonly form: Matrix<Algebraic>;
  /** D³ and higher are complete because H is a polynomial of at most this degree. */
  readonly complete: boolean;
  /** Beside a continuous symmetry: what is kept fixed, and the multipliers. */
  readonly fixed?: FixedMomenta;
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

/** Everything of a reduction but its coefficients. */
type Frame = Pick<Reduction<Algebraic>, 'space' | 'field' | 'action' | 'parameters' | 'form' | 'fixed'> & {
  readonly names: readonly string[];
  readonly reserved: readonly string[];
};

function frameOf(study: LinearStudy, symbols: readonly string[] = []): Frame {
  const { prepared, action: linear, components, event } = study;
  const source = prepared.declaration.source;
  if (event.dimension === 0)
    throw new UsageError('nothing to reduce: the Hessian is nonsingular at these values', {
      file: source,
      next: 'move a parameter to a crossing (symcodim sweep finds them), or use reduce --elliptic',
    });
  const slice = properSlice(study);
  if (slice !== undefined) requireTreatable(study, slice, symbols);
  if (linear.dimension > REDUCTION_DIMENSION_LIMIT)
    throw new LimitError(`a reduction in ${linear.dimension} coordinates is out of reach`, {
      file: source,
      expected: `at most ${REDUCTION_DIMENSION_LIMIT} coordinates`,
    });
  const hessian = embedSparse(prepared.local.hessian, prepared.field, linear.field);
  const own = slice === undefined ? dense(hessian) : sliceKernelForm(slice, hessian);
  const space = invariantBasis(linear, components, own, rootsByTrigonometry);
  const field = space.action.field;
  const k = space.basis.cols;
  const taken = [...prepared.quantities.names, ...prepared.declaration.parameters.keys()];
  const free = (l: string) => Array.from({ length: k }, (_, i) => `${l}${i + 1}`).every((n) => !taken.includes(n));
  const letter = ['u', 'v', 'y', 'k'].find(free) ?? 'kernel';
  const names = Array.from({ length: k }, (_, i) => `${letter}${i + 1}`);
  const coordinates = coordinateMap(space.basis, field);
  const action = linearAction(
    field,
    names,
    linear.group,
    space.action.generators.map((g) => coordinates(sparseTimes(g.matrix, space.basis))),
  );
  const parameters = prepared.declaration.vary.map((name) => ({
    name,
    value: field.embed(prepared.quantities.field, prepared.quantities.values.get(name)!),
  }));
  return {
    space,
    field,
    action,
    parameters,
    form: congruence(space.basis, dense(space.action.form)),
    names,
    reserved: [...names, ...taken],
    ...(slice === undefined ? {} : { fixed: fixedMomenta(study, slice, space, hessian) }),
  };
}

/** A Taylor expansion in the coordinates and the varied parameters. */
interface Expansion<C> {
  readonly ring: PolynomialRing<C>;
  readonly polynomial: Polynomial<C>;
  readonly embed: (a: Algebraic) => C;
}

function reduceAndAnalyse<C>(study: LinearStudy, frame: Frame, expand: (degree: number) => Expansion<C>, degree?: number): Reduction<C> {
  const { names, reserved, ...rest } = frame;
  const { action } = frame;
  const { fixed } = frame;
  const n = study.prepared.quantities.names.length + (fixed === undefined ? 0 : fixed.momenta + fixed.gauge);
  const own = polynomialDegree(study.prepared.hamiltonian, new Set(study.prepared.quantities.names));
  let generators = minimalGenerators(action, { reserved });
  const degrees = degree !== undefined ? [degree] : names.length >= WIDE_KERNEL ? DEGREES.slice(0, 2) : DEGREES;
  for (const d of degrees) {
    if (!generators.complete && generators.upTo < d) generators = minimalGenerators(action, { reserved, degree: d });
    const expansion = expand(d);
    const { embed } = expansion;
    const { ring: wide, polynomial } =
      fixed === undefined ? expansion : withMultipliers(fixed, expansion.ring, expansion.polynomial, embed);
    const part = (p: Polynomial<C>, r: PolynomialRing<C>, keep: (variables: readonly number[]) => boolean) =>
      r.fromTerms(p.monomials.flatMap((m, i) => (keep(factorsOf(m).map(([v]) => v)) ? [[m, p.coefficients[i]!] as [string, C]] : [])));
    const move = (m: Matrix<Algebraic>): Matrix<C> => ({ field: wide.field, rows: m.rows, cols: m.cols, data: m.data.map(embed) });
    const reduced = reduceToKernel({
      ring: wide,
      dimension: n,
      // terms in the parameters alone do not matter
      hamiltonian: part(polynomial, wide, (variables) => variables.some((v) => v < n)),
      kernel: move(fixed?.kernel ?? frame.space.basis),
      complement: move(fixed?.complement ?? frame.space.complement),
      degree: d,
      names,
    });
    const ring = new PolynomialRing<C>(wide.field, names);
    const germ = part(reduced.h, ring, (variables) => variables.every((v) => v < names.length));
    const analysis = analyseGerm({ action, generators, ring, h: germ, degree: d });
    const enough = polynomial.monomials.length * frame.field.degree > TERMS_MOST;
    if (d === degrees.at(-1) || analysis.codimension !== null || enough)
      return { ...rest, generators, reduced, ring, germ, analysis, degree: d, embed, complete: own !== undefined && own <= d };
  }
  throw new Error('no degree was tried');
}

/** Throws UsageError where nothing is at zero, LimitError where the phase space is too large. */
export function reductionOf(study: LinearStudy, degree?: number): Reduction<Algebraic> {
  const frame = frameOf(study);
  const { prepared } = study;
  const { quantities, hamiltonian } = prepared;
  const { names, point } = expansionPoint(study, frame);
  return reduceAndAnalyse(
    study,
    frame,
    (d) => {
      const t = taylor(hamiltonian, { names, point, parameters: quantities.valueExpressions, degree: d, field: frame.field });
      if (t.kind !== 'exact' || t.field !== frame.field) throw new Error('an exact model has an expansion that is not exact');
      return { ring: t.ring, polynomial: t.polynomial, embed: (a) => a };
    },
    degree,
  );
}

/**
 * The same with parameters that have no value: `study` is the model at some values of them, `symbols` their names; their kernel
 * must not depend on the values. Throws InputError where it does.
 */
export function symbolicReductionOf(
  study: LinearStudy,
  symbols: readonly string[],
  degree?: number,
): Reduction<RationalFunction<Algebraic>> {
  const frame = frameOf(study, symbols);
  const { prepared } = study;
  const { quantities, hamiltonian } = prepared;
  const { names, point } = expansionPoint(study, frame);
  const values = new Map([...quantities.valueExpressions].filter(([name]) => !symbols.includes(name)));
  return reduceAndAnalyse(
    study,
    frame,
    (d) => {
      const t = taylor(hamiltonian, { names, point, parameters: values, keep: symbols, degree: d, field: frame.field });
      const coefficients =
        t.kind === 'symbolic' ? t.constants.field : new RationalFunctionField<Algebraic>(new PolynomialRing(t.field, symbols));
      if (t.field !== frame.field) throw new Error('the symbols need a larger field than their values');
      const embed = (a: Algebraic) => coefficients.fromConstant(a);
      const ring = new PolynomialRing<RationalFunction<Algebraic>>(coefficients, t.ring.variables);
      const polynomial = t.kind === 'symbolic' ? t.polynomial : t.ring.map(t.polynomial, embed, ring);
      const { fixed } = frame;
      const file = prepared.declaration.source;
      if (fixed === undefined) requireKernel(ring, polynomial, frame.space.basis, symbols, file, quantities.names.length);
      else {
        requireSymbolicSymmetry(fixed, ring, polynomial, embed, d, file, symbols);
        const wide = withMultipliers(fixed, ring, polynomial, embed);
        requireKernel(wide.ring, wide.polynomial, fixed.kernel, symbols, file, fixed.kernel.rows);
      }
      return { ring, polynomial, embed };
    },
    degree,
  );
}

function expansionPoint(study: LinearStudy, frame: Frame): { names: readonly string[]; point: ReadonlyMap<string, Expression> } {
  const { quantities } = study.prepared;
  const vary = frame.parameters.map((p) => p.name);
  return {
    names: [...quantities.names, ...vary],
    point: new Map([...quantities.pointExpressions, ...vary.map((v) => [v, quantities.valueExpressions.get(v)!] as const)]),
  };
}

/** The quadratic part must vanish on the kernel for every value of the symbols. */
function requireKernel<C>(
  ring: PolynomialRing<C>,
  polynomial: Polynomial<C>,
  basis: Matrix<Algebraic>,
  symbols: readonly string[],
  file: string,
  n: number,
): void {
  const f = ring.field;
  const embed = (a: Algebraic) => (f as unknown as RationalFunctionField<Algebraic>).fromConstant(a) as unknown as C;
  const quadratic = ring.homogeneousPart(polynomial, 2);
  for (let i = 0; i < n; i++) {
    const row = ring.derivative(quadratic, i);
    for (let c = 0; c < basis.cols; c++) {
      let sum = f.zero;
      row.monomials.forEach((m, k) => {
        const v = factorsOf(m)[0]![0];
        if (v < n) sum = f.add(sum, f.mul(row.coefficients[k]!, embed(basis.data[v * basis.cols + c]!)));
      });
      if (!f.isZero(sum))
        throw new InputError(`the kernel of the Hessian depends on ${symbols.join(', ')}`, {
          file,
          key: 'parameters',
          value: symbols.join(', '),
          expected: 'an event that is there for every value of the parameters without one',
          next: 'give these parameters values',
        });
    }
  }
}
