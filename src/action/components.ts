/**
 * Isotypic components of the phase space under Γ: real irreducibles of the whole abstract group, with the
 * sign of time ignored; σ enters only through the number s(K) of σ-twisted invariant skew forms.
 */
import type { Algebraic } from '../field/index.ts';
import { type SignClass, signClasses } from '../group/index.ts';
import type { Matrix } from '../linear/index.ts';
import type { Action } from './action.ts';
import { type Irreducible, irreduciblesOf, type RestrictedGroup, wholeGroup } from './irreducibles.ts';
import { genericLabels } from './labels.ts';
import { multiplicityBasis } from './multiplicity-space.ts';
import { representedBy } from './seed-orbits.ts';
import { findCutters } from './subspace-search.ts';

export interface Component {
  readonly label: string;
  readonly irreducible: Irreducible;
  /** Class, twist, s(K) and the like. */
  readonly sign: SignClass;
  /** s(K) > 0. */
  readonly carriesForm: boolean;
  /** Label of K⊗σ. */
  readonly flowsTo: string;
}

export interface Components {
  readonly whole: RestrictedGroup;
  /** Labels of all real irreducibles of Γ, whether they occur or not. */
  readonly labels: readonly string[];
  readonly signs: readonly SignClass[];
  readonly present: readonly Component[];
}

/** The components of an action over a field that holds its characters. `names` overrides the labels. */
export function componentsOf(action: Action, names?: readonly string[]): Components {
  const whole = wholeGroup(action);
  const first = action.group.generators[0];
  const labels = names ?? genericLabels(whole.irreducibles, first === undefined || first === 0 ? undefined : action.group.classOf[first]);
  const signs = signClasses(whole.group, whole.table, whole.irreducibles, action.signs);
  const present = irreduciblesOf(action, whole).map((irreducible): Component => {
    const sign = signs[irreducible.index]!;
    return { label: labels[irreducible.index]!, irreducible, sign, carriesForm: sign.carried > 0, flowsTo: labels[sign.twist]! };
  });
  return { whole, labels, signs, present };
}

/** A basis of the multiplicity space of each component under Γ, on which S is an m × m block over R, C or H. */
export interface AdaptedBlock {
  readonly component: Component;
  readonly basis: Matrix<Algebraic>;
  /** Dimension of the cut copy of K: β(K) at best. */
  readonly cut: number;
}

export function adaptedBlocks(action: Action, components: Components): AdaptedBlock[] {
  const irreducibles = components.present.map((c) => c.irreducible);
  const cutters = findCutters(
    components.whole.group,
    irreducibles.map((k) => ({ values: k.values, beta: k.beta, multiplicity: k.multiplicity })),
  );
  const rep = representedBy(action, components.whole);
  return components.present.map((component, i) => ({
    component,
    basis: multiplicityBasis(rep, irreducibles, i, cutters[i]!),
    cut: cutters[i]!.dimensions[i]!,
  }));
}

/** Components of Γ that make up a flow block, given by an irreducible of Γ₀: those whose restriction contains it. */
export function componentsOfBlock(action: Action, components: Components, part: RestrictedGroup, irreducible: Irreducible): Component[] {
  return components.present.filter(({ irreducible: k }) => {
    let s = 0;
    part.group.classes.forEach((c, i) => {
      s += c.size * irreducible.values[i]! * k.values[action.group.classOf[part.inclusion[c.representative]!]!]!;
    });
    return Math.round(s / part.group.order) > 0;
  });
}
