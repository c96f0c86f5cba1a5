/**
 * The number of moduli of a germ of finite codimension: directions of the quotient along which the codimension stays
 * (V. I. Arnold, S. M. Gusein-Zade, A. N. Varchenko, Singularities of Differentiable Maps I, 1985, part II; place from memory).
 * (a) the leading form is finitely determined: elements of its degree and above; (b) weights, constant on the blocks of the
 * action, make a principal part of finite codimension: elements of weight 1 and above; (c) elements on or above the Newton
 * boundary, in the coordinates of the action or in z, z̄ on its planes. Whatever the rule, adding all of them must keep the codimension
 * and adding any other element must lower it.
 */
import { mulMod, rationals } from '../field/index.ts';
import { exponentsOf, type Monomial } from '../polynomial/index.ts';
import { adaptedCoordinates } from './adapted-coordinates.ts';
import type { GrowingEchelon, ModularPolynomial } from './coinvariants.ts';
import {
  type Codimension,
  codimensionOf,
  complexPlanes,
  type GermInput,
  type GermModel,
  germModel,
  gradedBasis,
  inCoordinates,
  type Product,
  productsUpTo,
  valuesOf,
} from './germ-model.ts';
import { compactFacets, onOrAbove, weightOf } from './newton.ts';
import { combine, orderOf } from './tangent.ts';

export type ModuliRule = 'leading form' | 'weights' | 'Newton boundary' | 'Newton boundary in z and its conjugate';

export interface Moduli {
  readonly count: number;
  readonly rule: ModuliRule;
  /** Basis of the quotient in products of generators: first the directions that lower the codimension, then the moduli. */
  readonly unfolding: readonly string[];
  readonly terms: readonly string[];
}

interface Candidate {
  readonly rule: ModuliRule;
  readonly model: GermModel;
  readonly allow: (m: Monomial) => boolean;
}

/** Primes tried for one where the quadratic forms of all planes split. */
const PRIMES_TRIED = 12;

/** The moduli, or the reason why none of the rules applies. */
export function moduliOf<T>(
  input: GermInput<T>,
  model: GermModel,
  codimension: Codimension,
  step: number,
  most: number,
): Moduli | { readonly reason: string } {
  let tried = 0;
  for (const candidate of candidates(input, model, step, most)) {
    tried++;
    const own = candidate.model === model ? codimension : codimensionOf(candidate.model, candidate.model.h, step, most);
    if (own === undefined || own.codimension !== codimension.codimension) continue;
    const found = check(candidate, own, step, most);
    if (found !== undefined) return found;
  }
  return {
    reason:
      tried === 0
        ? 'no weights or Newton boundary in the coordinates at hand single out a principal part'
        : 'the elements found by weights or the Newton boundary do not keep the codimension, or others keep it too',
  };
}

function* candidates<T>(input: GermInput<T>, model: GermModel, step: number, most: number): Generator<Candidate> {
  const { n, h, p } = model;
  const d = orderOf(h);
  if (
    codimensionOf(
      model,
      part(h, (m) => m.length === d),
      step,
      most,
    ) !== undefined
  )
    yield { rule: 'leading form', model, allow: (m) => m.length >= d };
  const { blocks } = input.action;
  const blockDegrees = (m: Monomial) => {
    const e = exponentsOf(m, n);
    return blocks.map((b) => b.reduce((s, i) => s + e[i]!, 0));
  };
  for (const w of compactFacets([...h.keys()].map(blockDegrees), blocks.length) ?? []) {
    const principal = part(h, (m) => rationals.equal(weightOf(w, blockDegrees(m)), rationals.one));
    if (codimensionOf(model, principal, step, most) !== undefined)
      yield { rule: 'weights', model, allow: (m) => rationals.compare(weightOf(w, blockDegrees(m)), rationals.one) >= 0 };
  }
  const newton = (rule: ModuliRule, inside: GermModel): Candidate[] => {
    const facets = compactFacets(
      [...inside.h.keys()].map((m) => exponentsOf(m, n)),
      n,
    );
    return facets === undefined || facets.length === 0 ? [] : [{ rule, model: inside, allow: (m) => onOrAbove(facets, exponentsOf(m, n)) }];
  };
  yield* newton('Newton boundary', model);
  const adapted = blocks.every((b) => b.length === 1) ? adaptedCoordinates(h, n, p) : undefined;
  if (adapted !== undefined) yield* newton('Newton boundary', inCoordinates(model, adapted));
  for (let index = 0; index < PRIMES_TRIED; index++) {
    const real = germModel(input, index).model;
    const planes = complexPlanes(real, blocks);
    if (planes === 'no plane') break;
    if (planes === 'does not split') continue;
    yield* newton('Newton boundary in z and its conjugate', inCoordinates(real, planes.matrix));
    break;
  }
}
function part(h: ModularPolynomial, keep: (m: Monomial) => boolean): ModularPolynomial {
  return new Map([...h].filter(([m]) => keep(m)));
}

/** The moduli by one rule, or undefined if the check fails. */
function check({ rule, model, allow }: Candidate, own: Codimension, step: number, most: number): Moduli | undefined {
  const { p, h, coinvariants } = model;
  const { space, codimension, top } = own;
  const independent = (echelon: GrowingEchelon, f: ModularPolynomial) => echelon.addInPlace(valuesOf(model, f, space));
  const withModuli = space.echelon.copy();
  let deformed = h;
  let count = 0;
  let t = 3;
  const next = () => (t = mulMod(t, 16_807, p));
  for (let e = 1; e <= top; e++)
    for (const f of coinvariants.invariants(e, allow))
      if (independent(withModuli, f)) {
        count++;
        deformed = combine(deformed, f, next(), p);
      }
  if (count > 0 && codimensionOf(model, deformed, step, most)?.codimension !== codimension) return undefined;
  const all = withModuli.copy();
  for (let e = 1; e <= top; e++)
    for (const f of coinvariants.invariants(e))
      if (independent(all, f)) {
        const lowered = codimensionOf(model, combine(h, f, next(), p), step, most);
        if (lowered === undefined || lowered.codimension >= codimension) return undefined;
      }
  const products = productsUpTo(model, top);
  const inside = (f: Product) => [...f.polynomial.keys()].every(allow);
  // the graded basis if it shows the moduli, else any basis that starts with them
  let basis = gradedBasis(model, products, own);
  let terms = basis.filter(inside);
  if (terms.length !== count) {
    const chosen = space.echelon.copy();
    terms = products.filter((f) => inside(f) && independent(chosen, f.polynomial));
    basis = [...products.filter((f) => independent(chosen, f.polynomial)), ...terms].sort((x, y) => x.degree - y.degree);
  }
  return {
    count,
    rule,
    terms: terms.map((f) => f.name),
    unfolding: basis.map((f) => f.name),
  };
}
