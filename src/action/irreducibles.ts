/**
 * Which real irreducibles of a group, or of a subgroup, occur in an action, how often, and the field
 * that their characters need. Multiplicities are found in doubles and proved exactly: the integers
 * must rebuild the character of the action class by class.
 */
import { type Algebraic, type FieldDemand, RealField } from '../field/index.ts';
import { type CharacterTable, characterTable, type FiniteGroup, type RealIrreducible, realIrreducibles, subgroup } from '../group/index.ts';
import type { SparseMatrix } from '../linear/index.ts';
import { type Action, assembleAction } from './action.ts';

/** A subgroup of Γ with its own numbering. */
export interface RestrictedGroup {
  readonly group: FiniteGroup;
  readonly table: CharacterTable;
  readonly irreducibles: readonly RealIrreducible[];
  /** Number in Γ of each element. */
  readonly inclusion: Int32Array;
  /** Number in the subgroup of an element of Γ, or -1. */
  position(element: number): number;
}

/** A real irreducible that occurs in an action. */
export interface Irreducible {
  /** Number among the real irreducibles of the group. */
  readonly index: number;
  readonly dimension: number;
  readonly beta: 1 | 2 | 4;
  readonly type: 'real' | 'complex' | 'quaternionic';
  readonly multiplicity: number;
  /** Real character by class: exact, and in doubles. */
  readonly character: readonly Algebraic[];
  readonly values: readonly number[];
  /** Character of one complex constituent, in doubles. */
  readonly complexValues: readonly { readonly re: number; readonly im: number }[];
}

const wholeCache = new WeakMap<FiniteGroup, RestrictedGroup>();

/** Γ itself in the same form. */
export function wholeGroup(action: Action): RestrictedGroup {
  const known = wholeCache.get(action.group);
  if (known !== undefined) return known;
  const group = action.group;
  const table = characterTable(group);
  const whole = {
    group,
    table,
    irreducibles: realIrreducibles(group, table),
    inclusion: Int32Array.from({ length: group.order }, (_, i) => i),
    position: (e: number) => e,
  };
  wholeCache.set(group, whole);
  return whole;
}

/** The subgroup with the given elements (all of them). */
export function restrictedGroup(action: Action, elements: readonly number[]): RestrictedGroup {
  if (elements.length === action.group.order) return wholeGroup(action);
  const { group, inclusion } = subgroup(action.group, elements);
  const table = characterTable(group);
  const place = new Int32Array(action.group.order).fill(-1);
  inclusion.forEach((e, i) => {
    place[e] = i;
  });
  return { group, table, irreducibles: realIrreducibles(group, table), inclusion, position: (e) => place[e]! };
}

/** Traces of the action on the classes of a subgroup. */
export function tracesOn(action: Action, part: RestrictedGroup): Algebraic[] {
  return part.group.classes.map((c) => action.traces[action.group.classOf[part.inclusion[c.representative]!]!]!);
}

/** Multiplicity of each real irreducible of the part in V, by rounding inner products; proved by `irreduciblesOf`. */
function multiplicities(action: Action, part: RestrictedGroup): number[] {
  const traces = tracesOn(action, part).map((x) => action.field.toNumber(x));
  return part.irreducibles.map((k) => {
    let s = 0;
    for (let c = 0; c < traces.length; c++) s += part.group.classes[c]!.size * traces[c]! * k.values[c]!;
    return Math.round(s / part.group.order / k.beta);
  });
}

/** What the field must contain for the characters of the irreducibles that occur. */
export function characterDemand(action: Action, part: RestrictedGroup): FieldDemand {
  const m = multiplicities(action, part);
  const { field } = part.table;
  const cosines: number[] = [];
  part.irreducibles.forEach((k, i) => {
    if (m[i] === 0) return;
    cosines.push(field.leastConductor(k.character));
  });
  return { cosines };
}

/** The irreducibles of the part that occur in V. Throws if the field of the action is too small. */
export function irreduciblesOf(action: Action, part: RestrictedGroup): Irreducible[] {
  const f = action.field;
  const cyclotomic = part.table.field;
  const m = multiplicities(action, part);
  const out: Irreducible[] = [];
  const moved = new Map<Algebraic, Algebraic>();
  part.irreducibles.forEach((k, i) => {
    if (m[i] === 0) return;
    const character = k.character.map((v) => {
      const x = moved.get(v) ?? f.fromCyclotomic(cyclotomic, v);
      if (x !== undefined) moved.set(v, x);
      else throw new Error(`a character value ${cyclotomic.format(v)} does not lie in ${f.name}`);
      return x;
    });
    out.push({
      index: i,
      dimension: k.dimension,
      beta: k.beta,
      type: k.type,
      multiplicity: m[i]!,
      character,
      values: k.character.map((v) => cyclotomic.toComplex(v).re),
      complexValues: part.table.values[k.complex[0]!]!.map((v) => cyclotomic.toComplex(v)),
    });
  });
  const traces = tracesOn(action, part);
  traces.forEach((t, c) => {
    let s = f.zero;
    for (const k of out) s = f.add(s, f.mul(f.fromInteger(k.multiplicity), k.character[c]!));
    if (!f.equal(s, t)) throw new Error('the multiplicities of the irreducibles do not rebuild the character of the action');
  });
  return out;
}

const embedded = new WeakMap<SparseMatrix<Algebraic>, Map<RealField, SparseMatrix<Algebraic>>>();

/** The same sparse matrix over a larger field; the same object each time. */
export function embedSparse(a: SparseMatrix<Algebraic>, from: RealField, to: RealField): SparseMatrix<Algebraic> {
  if (from === to) return a;
  let known = embedded.get(a);
  if (known === undefined) {
    known = new Map();
    embedded.set(a, known);
  }
  let out = known.get(to);
  if (out === undefined) {
    out = { ...a, field: to, value: a.value.map((r) => r.map((x) => to.embed(from, x))) };
    known.set(to, out);
  }
  return out;
}

/** The same action over a larger field; the group is kept. */
export function embedAction(action: Action, to: RealField): Action {
  if (action.field === to) return action;
  return assembleAction(
    to,
    embedSparse(action.form, action.field, to),
    action.generators.map((g) => ({ ...g, matrix: embedSparse(g.matrix, action.field, to) })),
    action.group,
  );
}

/** The action over the least field that also holds the characters of Γ and of Γ₀ that occur. */
export function withCharacters(action: Action): Action {
  const elements: number[] = [];
  for (let i = 0; i < action.group.order; i++) if (action.signs[i] === 1) elements.push(i);
  const demands = [action.field.demand, characterDemand(action, wholeGroup(action))];
  if (elements.length < action.group.order) demands.push(characterDemand(action, restrictedGroup(action, elements)));
  const field = RealField.of({
    cosines: demands.flatMap((d) => d.cosines ?? []),
    squareRoots: demands.flatMap((d) => d.squareRoots ?? []),
  });
  return embedAction(action, field);
}
