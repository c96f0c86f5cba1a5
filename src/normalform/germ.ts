/**
 * Invariant germs: leading degree, codimension for right equivalence by equivariant changes of coordinates, moduli, stratum,
 * degree of determinacy, unfolding (V. I. Arnold, S. M. Gusein-Zade, A. N. Varchenko, Singularities of Differentiable Maps I,
 * 1985; M. Golubitsky, I. Stewart, D. Schaeffer, Singularities and Groups in Bifurcation Theory II, 1988, ch. XV; places from
 * memory). Ranks are taken modulo a prime and confirmed modulo a second one.
 */
import { LimitError } from '../errors/index.ts';
import { mulMod } from '../field/index.ts';
import { germConditions } from './germ-conditions.ts';
import {
  type Codimension,
  codimensionOf,
  countIn,
  type GermInput,
  type GermModel,
  germModel,
  gradedBasis,
  productsUpTo,
  valuesOf,
} from './germ-model.ts';
import { type ModuliRule, moduliOf } from './moduli.ts';
import { combine, orderOf, tangentSpace, unipotentTangentSpace } from './tangent.ts';

/** How far beyond the degree known, and beyond the top of a homogeneous local algebra, the quotient may reach. */
const BEYOND = 6;

export type { GermInput } from './germ-model.ts';

export interface Germ {
  /** Least degree of a term; null if h vanishes to the degree known. */
  readonly leadingDegree: number | null;
  /** Null if not determined by the terms known. */
  readonly codimension: number | null;
  readonly moduli: number | null;
  /** Codimension less the moduli. */
  readonly stratumCodimension: number | null;
  /** Basis of the quotient in products of generators; as many as the codimension. */
  readonly unfolding: readonly string[];
  /** Those of the unfolding that are moduli. */
  readonly moduliTerms: readonly string[];
  readonly moduliRule: ModuliRule | null;
  /** The germ is equivalent to its Taylor polynomial of this degree. */
  readonly determinedAt: number | null;
  /** Expressions in the symbols that must not vanish for this answer; empty where no symbol occurs, null if not computed. */
  readonly conditions: readonly string[] | null;
  /** Where the germ is not determined: products of generators any of which would determine it. */
  readonly missing: readonly string[];
  readonly because: string;
}

/** Analyses a germ; one that needs too many terms is not determined. Throws ShapeError if the fields do not fit. */
export function analyseGerm<T>(input: GermInput<T>): Germ {
  try {
    return analyse(input);
  } catch (error) {
    if (!(error instanceof LimitError)) throw error;
    return undetermined(
      orderOf(germModel(input, 0).model.h),
      `not decided: ${error.message}${error.culprit.value === undefined ? '' : ` (${error.culprit.value})`}`,
      [],
    );
  }
}

function analyse<T>(input: GermInput<T>): Germ {
  let { model } = germModel(input, 0);
  const order = orderOf(model.h);
  if (order === Infinity) return undetermined(null, `h vanishes up to degree ${input.degree}`, []);
  const step = generatorStep(input);
  const most = Math.max(input.degree, model.n * (order - 2)) + BEYOND;
  let found = codimensionOf(model, model.h, step, most);
  const second = germModel(input, 1).model;
  const again = codimensionOf(second, second.h, step, most);
  if ((again?.codimension ?? Infinity) < (found?.codimension ?? Infinity)) {
    model = second;
    found = again;
  }
  if (found === undefined) {
    const missing = missingTerms(model, step, most);
    return undetermined(order, notDetermined(input.degree, missing), missing);
  }
  const determinedAt = determinacy(model, step, found);
  if (determinedAt > input.degree && generic(model, input.degree, determinedAt, step, most) !== found.codimension) {
    const missing = missingTerms(model, step, most);
    return undetermined(order, notDetermined(input.degree, missing), missing);
  }
  const moduli = moduliOf(input, model, found, step, most);
  const counted = 'count' in moduli ? moduli : undefined;
  return {
    leadingDegree: order,
    codimension: found.codimension,
    moduli: counted?.count ?? null,
    stratumCodimension: counted === undefined ? null : found.codimension - counted.count,
    unfolding: counted?.unfolding ?? unfoldingOf(model, found),
    moduliTerms: counted?.terms ?? [],
    moduliRule: counted?.rule ?? null,
    determinedAt,
    conditions: germConditions(input, determinedAt + step),
    missing: [],
    because: 'reason' in moduli ? `moduli not counted: ${moduli.reason}` : explanation(counted!.rule, input, step),
  };
}

function explanation<T>(rule: ModuliRule, input: GermInput<T>, step: number): string {
  const complete = input.generators.complete ? '' : `; generators of the invariants of degree above ${step} are assumed not to be needed`;
  return (
    (rule === 'leading form'
      ? 'the leading form is finitely determined'
      : `moduli by the ${rule === 'weights' ? 'weights of the principal part' : rule}`) + complete
  );
}
function undetermined(leadingDegree: number | null, because: string, missing: readonly string[]): Germ {
  return {
    leadingDegree,
    codimension: null,
    moduli: null,
    stratumCodimension: null,
    unfolding: [],
    moduliTerms: [],
    moduliRule: null,
    determinedAt: null,
    conditions: [],
    missing,
    because,
  };
}
function notDetermined(degree: number, missing: readonly string[]): string {
  return `not determined up to degree ${degree}${missing.length === 0 ? '' : `: add the term ${missing.join(' or ')}`}`;
}

/** Highest degree of a generator of the ring of invariants (the order of the group bounds it, E. Noether 1916). */
function generatorStep<T>({ generators, action }: GermInput<T>): number {
  const known = generators.generators.reduce((s, g) => Math.max(s, g.degree), 1);
  return generators.complete
    ? known
    : Math.min(action.group.order, Math.max(known, generators.upTo === Infinity ? known : generators.upTo));
}

/** Least r such that every invariant above degree r lies in the tangent space of the unipotent part. */
function determinacy(model: GermModel, step: number, found: Codimension): number {
  let degree = found.space.degree;
  for (;;) {
    const c = countIn(unipotentTangentSpace(model.coinvariants, model.h, degree));
    if (c.top + step <= degree) return Math.max(c.top, orderOf(model.h));
    degree = c.top + step;
  }
}

/** Codimension after adding random terms of the degrees that are not known. */
function generic(model: GermModel, known: number, top: number, step: number, most: number): number | undefined {
  let h = model.h;
  let t = 7;
  for (let e = known + 1; e <= top; e++)
    for (const f of model.coinvariants.invariants(e)) {
      t = mulMod(t, 16_807, model.p);
      h = combine(h, f, t, model.p);
    }
  return codimensionOf(model, h, step, most)?.codimension;
}

function unfoldingOf(model: GermModel, found: Codimension): string[] {
  return gradedBasis(model, productsUpTo(model, found.top), found).map((f) => f.name);
}

/** Products of generators of least degree that make the germ finitely determined; else those of least degree outside the tangent space. */
function missingTerms(model: GermModel, step: number, most: number): string[] {
  const order = orderOf(model.h);
  const last = Math.max(most, order + step);
  const space = tangentSpace(model.coinvariants, model.h, last);
  const outside = productsUpTo(model, last).filter(
    (f) => f.degree >= order && space.echelon.copy().addInPlace(valuesOf(model, f.polynomial, space)),
  );
  const degrees = [...new Set(outside.map((f) => f.degree))];
  for (const e of degrees) {
    const good = outside.filter(
      (f) =>
        f.degree === e && codimensionOf(model, combine(model.h, f.polynomial, 12_345, model.p), step, Math.max(most, e + 2)) !== undefined,
    );
    if (good.length > 0) return good.map((f) => f.name);
  }
  return outside.filter((f) => f.degree === degrees[0]).map((f) => f.name);
}
