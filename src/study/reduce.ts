/** `reduce`: the reduced Hamiltonian on the kernel in its invariants, its germ and its dynamics. */
import type { Algebraic, Field } from '../field/index.ts';
import { rewriteInInvariants } from '../invariant/index.ts';
import { at, column, inverse as invert, transpose } from '../linear/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { factorsOf, type Polynomial, PolynomialRing, type RationalFunction, RationalFunctionField } from '../polynomial/index.ts';
import type { LinearStudy } from './linear-study.ts';
import { type Reduction, reductionOf, symbolicReductionOf } from './reduction.ts';
import { type MomentaSummary, momentaSummary } from './reduction-neutral.ts';
import type { StudyResult } from './result.ts';
import { groupSummary, head, linearText } from './summary.ts';

export interface ReducedSummary {
  readonly leadingDegree: number | null;
  /** h in the invariants, with the unfolding by the varied parameters. */
  readonly expression: string;
  readonly codimension: number | null;
  readonly moduli: number | null;
  readonly stratumCodimension: number | null;
  readonly unfolding: readonly string[];
  readonly determinedAt: number | null;
  /** Degree to which h was computed. */
  readonly degree: number;
  readonly coordinates: readonly { readonly name: string; readonly vector: string }[];
  readonly invariants: readonly { readonly name: string; readonly polynomial: string }[];
  readonly conditions?: readonly string[];
  readonly moduliTerms?: readonly string[];
  readonly because: string;
  /** h in the coordinates of the kernel, at the event. */
  readonly polynomial: string;
  /** Kinetic part where the pair splits; Poisson brackets of the kernel where it passes. */
  readonly kinetic?: string;
  readonly brackets?: readonly string[];
  /** Whether codimension does not exceed the number of parameters of the study. */
  readonly generic: boolean | null;
}

export interface ReduceResult extends StudyResult, Partial<MomentaSummary> {
  readonly reduced: ReducedSummary;
}

/** Throws UsageError where nothing is at zero. */
export function reduceResult(study: LinearStudy, parameters: number, degree?: number): ReduceResult {
  const reduction = reductionOf(study, degree);
  return {
    ...head('reduce', study.prepared, groupSummary(study.action, study.prepared)),
    reduced: reducedSummary(study, reduction, parameters),
    ...neutralPart(study, reduction),
  };
}

/** Values for the parameters that have none: fractions that no coincidence is likely to single out. */
export function withStandIns(declaration: Declaration): { declaration: Declaration; symbols: readonly string[] } {
  const symbols = declaration.unset;
  const values = symbols.map((name, i) => [name, `${STAND_INS[i % STAND_INS.length]}/${97 + i}`] as const);
  return { declaration: { ...declaration, parameters: new Map([...declaration.parameters, ...values]), unset: [] }, symbols };
}

const STAND_INS = [109, 131, 157, 181, 211];

/** The same where parameters have no value: `study` is the model at some values of the symbols. */
export function symbolicReduceResult(study: LinearStudy, symbols: readonly string[], parameters: number, degree?: number): ReduceResult {
  const reduction = symbolicReductionOf(study, symbols, degree);
  const whole = head('reduce', study.prepared, groupSummary(study.action, study.prepared));
  const shown = Object.fromEntries(Object.entries(whole.model.parameters).map(([k, v]) => [k, symbols.includes(k) ? null : v]));
  return {
    ...whole,
    model: { ...whole.model, parameters: shown },
    reduced: reducedSummary(study, reduction, parameters),
    ...neutralPart(study, reduction),
  };
}

type Coefficient = RationalFunction<Algebraic>;

/** h as a polynomial in the kernel coordinates over the symbols and the parameters, these shown as (mu - mu0). */
function overParameters<C>(reduction: Reduction<C>): {
  ring: PolynomialRing<Coefficient>;
  h: Polynomial<Coefficient>;
  symbols: RationalFunctionField<Algebraic>;
} {
  const { field, reduced, parameters } = reduction;
  const shown = parameters.map(({ name, value }) => {
    if (field.isZero(value)) return name;
    const text = field.format(field.sign(value) < 0 ? field.neg(value) : value);
    return `(${name} ${field.sign(value) < 0 ? '+' : '-'} ${/ [+-] /.test(text) ? `(${text})` : text})`;
  });
  const own: Field<unknown> = reduction.ring.field as Field<unknown>;
  const given = own instanceof RationalFunctionField ? (own as RationalFunctionField<Algebraic>) : undefined;
  const symbols = new RationalFunctionField<Algebraic>(new PolynomialRing(field, [...(given?.symbols ?? []), ...shown]));
  const lift = (c: C): Coefficient =>
    given === undefined
      ? symbols.fromConstant(c as Algebraic)
      : given.substituteInto(
          c as Coefficient,
          symbols,
          (s) => symbols.symbol(s),
          (a) => symbols.fromConstant(a),
        );
  const k = reduction.ring.variables.length;
  const ring = new PolynomialRing<Coefficient>(symbols, reduction.ring.variables);
  const terms = reduced.h.monomials.map((m, i): [number[], Coefficient] => {
    const exponents = new Array<number>(k).fill(0);
    let c = lift(reduced.h.coefficients[i]!);
    for (const [v, e] of factorsOf(m)) {
      if (v < k) exponents[v] = e;
      else for (let j = 0; j < e; j++) c = symbols.mul(c, symbols.symbol(shown[v - k]!));
    }
    return [exponents, c];
  });
  return { ring, h: ring.fromTerms(terms), symbols };
}

const neutralPart = <C>(study: LinearStudy, { fixed }: Reduction<C>): Partial<MomentaSummary> =>
  fixed === undefined ? {} : momentaSummary(study, fixed);

export function reducedSummary<C>(study: LinearStudy, reduction: Reduction<C>, parameters: number): ReducedSummary {
  const { analysis, generators, space, field, ring, germ } = reduction;
  const { ring: wide, h, symbols } = overParameters(reduction);
  const rewritten = rewriteInInvariants(h, wide, generators, (a) => symbols.fromConstant(a));
  const names = study.prepared.quantities.names;
  const motion = dynamics(study, reduction);
  const used = new Set(rewritten.expression.monomials.flatMap((m) => factorsOf(m).map(([v]) => v)));
  return {
    leadingDegree: analysis.leadingDegree,
    expression: rewritten.ring.format(rewritten.expression),
    codimension: analysis.codimension,
    moduli: analysis.moduli,
    stratumCodimension: analysis.stratumCodimension,
    unfolding: analysis.unfolding,
    determinedAt: analysis.determinedAt,
    degree: reduction.degree,
    coordinates: reduction.ring.variables.map((name, j) => ({ name, vector: linearText(column(space.basis, j), names, field) })),
    invariants: generators.generators
      .filter((g, i) => used.has(i) || analysis.unfolding.some((u) => new RegExp(`\\b${g.name}\\b`).test(u)))
      .map((g) => ({ name: g.name, polynomial: generators.spaces.ring.format(g.polynomial) })),
    ...(analysis.conditions === null || analysis.conditions.length === 0 ? {} : { conditions: analysis.conditions }),
    ...(analysis.moduliTerms.length === 0 ? {} : { moduliTerms: analysis.moduliTerms }),
    because: [
      analysis.because,
      ...(analysis.stratumCodimension !== null && analysis.stratumCodimension > parameters
        ? [
            'terms that the declared symmetry allows are missing, which a symmetry that was not declared would explain (symcodim check --find looks for one)',
          ]
        : []),
      ...(reduction.fixed === undefined ? [] : [momentaSummary(study, reduction.fixed).momenta.because]),
    ].join('; '),
    polynomial: ring.format(germ),
    ...motion,
    generic: analysis.stratumCodimension === null ? null : analysis.stratumCodimension <= parameters,
  };
}

/** ½ε|y|² beside h where the kernel is isotropic and the blocks have size 2; the brackets of u where ω|K is nondegenerate. */
function dynamics<C>(study: LinearStudy, reduction: Reduction<C>): { kinetic?: string; brackets?: readonly string[] } {
  const { form, field, ring } = reduction;
  const { event } = study;
  const k = ring.variables.length;
  if (form.data.every((x) => field.isZero(x))) {
    if (event.sizes.some((s) => s !== 2)) return {};
    const signs = event.blocks.flatMap((b) =>
      b.signed.map((s) => ({ positive: s.positive * b.block.copies, negative: s.negative * b.block.copies })),
    );
    const positive = signs.reduce((s, x) => s + x.positive, 0);
    const negative = signs.reduce((s, x) => s + x.negative, 0);
    const sum = (from: number, to: number) => Array.from({ length: to - from }, (_, i) => `y${from + i + 1}^2`).join(' + ');
    if (negative === 0) return { kinetic: `(${sum(0, positive)})/2` };
    if (positive === 0) return { kinetic: `-(${sum(0, negative)})/2` };
    return { kinetic: `(${sum(0, positive)})/2 - (${sum(positive, positive + negative)})/2` };
  }
  const brackets: string[] = [];
  try {
    const inverse = invertForm(reduction);
    for (let i = 0; i < k; i++)
      for (let j = i + 1; j < k; j++) {
        const x = at(inverse, i, j);
        if (!field.isZero(x)) brackets.push(`{${ring.variables[i]}, ${ring.variables[j]}} = ${field.format(x)}`);
      }
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return {};
  }
  return { brackets };
}

/** J = W^{-T} on the kernel: {u_i, u_j} = J_ij. */
const invertForm = <C>(reduction: Reduction<C>) => transpose(invert(reduction.form));
