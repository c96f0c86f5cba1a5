/**
 * `invariants`: Molien series, generators of the invariant ring, relations, equivariants, and H in its invariant
 * form with every parameter kept as a symbol.
 */
import { embedSparse, makeAction } from '../action/index.ts';
import { InputError, LimitError, NotAnEquilibriumError, NotInvariantError } from '../errors/index.ts';
import type { Algebraic } from '../field/index.ts';
import {
  type EquivariantSet,
  equivariants,
  type GeneratorSet,
  linearAction,
  minimalGenerators,
  molien,
  relations,
  rewriteInInvariants,
} from '../invariant/index.ts';
import { dense } from '../linear/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { energyExpression } from '../model/energy.ts';
import { type Expression, latexExpression, parseExpression, taylor } from '../model/expression/index.ts';
import { polynomialDegree } from '../model/polynomial-energy.ts';
import { type Quantities, readQuantities } from '../model/quantities.ts';
import type { Polynomial, PolynomialRing } from '../polynomial/index.ts';
import type { InvariantsResult } from './result.ts';
import { modelSummary } from './summary.ts';

/** Degree of H that is no polynomial, where none is asked for. */
export const DEFAULT_DEGREE = 4;
/** More coordinates than this are not worth a ring of invariants. */
export const DIMENSION_LIMIT = 24;
/** Relations and equivariants are listed up to this degree where nothing else is asked for. */
const RELATION_DEGREE = 8;

/** Throws the typed errors of the library for a model that cannot be read, LimitError for a phase space that is too large. */
export function invariantsResult(declaration: Declaration, degree?: number): InvariantsResult {
  const quantities = readQuantities(declaration);
  const { names } = quantities;
  if (names.length > DIMENSION_LIMIT)
    throw new LimitError(`a ring of invariants in ${names.length} coordinates is out of reach`, {
      file: declaration.source,
      value: `${names.length} coordinates`,
      expected: `at most ${DIMENSION_LIMIT}`,
      next: 'reduce the model to its kernel first: symcodim reduce',
    });
  const hamiltonian = energyExpression(declaration, quantities.definitions);
  const expansion = hamiltonian === undefined ? undefined : symbolicExpansion(hamiltonian, quantities, declaration, degree);
  const field = expansion?.field ?? quantities.field;
  const action = makeAction(
    field,
    embedSparse(quantities.form, quantities.field, field),
    quantities.generators.map((g) => ({ name: g.name, matrix: embedSparse(g.matrix, quantities.field, field) })),
    declaration.orderLimit,
  );
  const linear = linearAction(
    field,
    names,
    action.group,
    action.generators.map((g) => dense(g.matrix)),
  );
  const order = action.group.order;
  const reserved = [...names, ...declaration.parameters.keys(), ...declaration.unset];
  const shown = degree ?? 12;
  const series = molien(linear, { degree: Math.max(shown, 12) });
  const wanted = degree ?? expansion?.degree;
  let set = minimalGenerators(linear, { reserved, ...(degree === undefined ? {} : { degree }) });
  if (!set.complete && wanted !== undefined && set.upTo < wanted) set = minimalGenerators(linear, { reserved, degree: wanted });
  if (expansion !== undefined)
    requireHolding(
      expansion,
      set,
      declaration,
      action.generators.map((g) => g.name),
    );
  const maps = equivariants(set, { degree: Math.min(degree ?? 3, 3) });
  const relationList = relations(set, Math.min(set.complete ? RELATION_DEGREE : set.upTo, RELATION_DEGREE));
  const twisted = molien(linear, { degree: Math.max(shown, 12), target: linear });
  return {
    schema: 'symcodim/1',
    command: 'invariants',
    model: modelSummary({ declaration, quantities, hamiltonian }),
    arithmetic: expansion !== undefined && expansion.atoms.length > 0 ? 'floating' : 'exact',
    ...(expansion !== undefined && expansion.atoms.length > 0 ? { floatingBecause: expansion.atoms[0]! } : {}),
    field: field.name,
    group: { order, reversing: reversingCount(action.signs), generators: action.generators.map((g) => g.name) },
    equilibrium: {
      holds: expansion?.linearPart === undefined,
      gradient: expansion?.linearPart ?? '0',
      point: Object.fromEntries(quantities.names.map((n, i) => [n, quantities.field.format(quantities.point[i]!)])),
    },
    symmetry: {
      holds: expansion === undefined || expansion.invariant(set),
      generators: action.generators.map((g) => ({
        name: g.name,
        reversing: g.sign === -1,
        symplectic: true,
        invariant: expansion === undefined || expansion.invariant(set),
      })),
    },
    molien: { numerator: series.numerator, denominator: series.denominator, series: series.series },
    equivariants: {
      numerator: twisted.numerator,
      denominator: twisted.denominator,
      series: twisted.series,
      generators: equivariantSummaries(maps),
    },
    generators: set.generators.map((g) => ({
      name: g.name,
      degree: g.degree,
      polynomial: set.spaces.ring.format(g.polynomial),
      latex: g.readable.complexLatex ?? g.readable.realLatex,
      ...(g.readable.complex === undefined ? {} : { readable: g.readable.complex }),
    })),
    complete: set.complete,
    proof: set.proof,
    relations: relationList.map((r) => r.text),
    hamiltonian: expansion === undefined ? null : expansion.rewrite(set),
  };
}

/** Every command but `check` stops at a model that is not what it claims. */
function requireHolding(expansion: Expansion, set: GeneratorSet, declaration: Declaration, generators: readonly string[]): void {
  const next = 'see all of it with symcodim check';
  if (!expansion.invariant(set)) {
    const { breaking } = expansion.rewrite(set);
    const shown = breaking === undefined ? 'a part of H' : breaking.length > 120 ? `${breaking.slice(0, 117)}…` : breaking;
    throw new NotInvariantError(`H is not invariant under the group of ${generators.join(', ')}: ${shown} breaks the symmetry`, {
      file: declaration.source,
      key: 'symmetry',
      value: shown,
      expected: 'generators that leave H invariant',
      next,
    });
  }
  if (expansion.linearPart !== undefined)
    throw new NotAnEquilibriumError(`the point is not an equilibrium: H has the linear terms ${expansion.linearPart}`, {
      file: declaration.source,
      key: 'equilibrium',
      expected: '∇H = 0',
      next,
    });
}

const reversingCount = (signs: Int8Array): number => signs.reduce((n, s) => n + (s === -1 ? 1 : 0), 0);

function equivariantSummaries(maps: EquivariantSet): { degree: number; field: readonly string[] }[] {
  return maps.generators.map((g) => ({ degree: g.degree, field: g.text }));
}

interface Expansion {
  readonly field: Quantities['field'];
  readonly degree: number;
  readonly atoms: readonly string[];
  /** The linear term, where there is one. */
  readonly linearPart: string | undefined;
  rewrite(set: GeneratorSet): NonNullable<InvariantsResult['hamiltonian']>;
  invariant(set: GeneratorSet): boolean;
}

/** H about its equilibrium with all parameters as symbols. */
function symbolicExpansion(h: Expression, quantities: Quantities, declaration: Declaration, degree: number | undefined): Expansion {
  const own = polynomialDegree(h, new Set(quantities.names));
  const d = degree ?? own ?? DEFAULT_DEGREE;
  const keep = [...declaration.parameters.keys(), ...declaration.unset];
  const moved = quantities.pointExpressions.size > 0;
  const request = {
    names: quantities.names,
    point: quantities.pointExpressions,
    parameters: quantities.valueExpressions,
    degree: d,
    field: quantities.field,
  };
  // an equilibrium that was declared holds at the declared values, so these are put in
  const t = taylor(h, moved ? { ...request, keep: declaration.unset } : { ...request, keep });
  if (t.kind === 'exact') return expansionOf(t.ring, t.polynomial, t.field, d, [], (a) => a);
  const symbols = t.constants.field;
  return expansionOf(t.ring, t.polynomial, t.field, d, t.atoms, (a: Algebraic) => symbols.fromConstant(a));
}

function expansionOf<C>(
  ring: PolynomialRing<C>,
  polynomial: Polynomial<C>,
  field: Quantities['field'],
  degree: number,
  atoms: readonly string[],
  embed: (a: Algebraic) => C,
): Expansion {
  let done: { set: GeneratorSet; form: ReturnType<typeof rewriteInInvariants<C>> } | undefined;
  const form = (set: GeneratorSet) => {
    if (done?.set !== set) done = { set, form: rewriteInInvariants(polynomial, ring, set, embed) };
    return done.form;
  };
  const linear = ring.homogeneousPart(polynomial, 1);
  return {
    field,
    degree,
    atoms,
    linearPart: ring.isZero(linear) ? undefined : ring.format(linear),
    invariant: (set) => ring.isZero(form(set).breaking),
    rewrite: (set) => {
      const f = form(set);
      const expression = f.ring.format(f.expression);
      return {
        expression,
        latex: safeLatex(expression) ?? f.ring.latex(f.expression),
        remainder: ring.format(f.remainder),
        degree,
        ...(ring.isZero(f.breaking) ? {} : { breaking: ring.format(f.breaking) }),
      };
    },
  };
}

function safeLatex(text: string): string | undefined {
  try {
    return latexExpression(parseExpression(text));
  } catch (error) {
    if (error instanceof InputError) return undefined;
    throw error;
  }
}
