/**
 * Labels of the irreducibles of the group of a model: Mulliken's where it is a group of the catalogue that turns space or the plane,
 * alone or with time reversal; letters and numbers otherwise. Irreducibles that are odd under time reversal carry a minus sign
 * behind the label of their partner: E and E-.
 */
import { type Action, type Components, componentsOf, pointLabels, wholeGroup } from '../action/index.ts';
import { type CatalogueAction, loadCatalogueGroup } from '../group/catalogue.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { parseExpression } from '../model/expression/index.ts';
import { numericValue } from '../model/numeric-value.ts';

/** Groups beyond this order keep the plain labels: no molecule has them. */
export const POINT_ORDER_LIMIT = 5000;

const NEAR = 1e-6;

/** Where an element goes in the group of rotations and time reversal. */
interface Place {
  readonly matrix: readonly (readonly number[])[];
  /** -1 for elements that contain the reversal of time as declared by `timeReversal`. */
  readonly time: 1 | -1;
}

/** The components of a model's action under the labels of its group. */
export function labelledComponents(declaration: Declaration, action: Action): Components {
  return componentsOf(action, labelsFor(declaration, action));
}

/**
 * One label for each real irreducible of the group, present or not; undefined where the group is no point group
 * (then the plain labels serve). The generators of the action must be those of the declaration, in its order.
 */
export function labelsFor(declaration: Declaration, action: Action): string[] | undefined {
  const { group } = action;
  if (declaration.groups.length !== 1 || group.order > POINT_ORDER_LIMIT) return undefined;
  const generators = generatorPlaces(declaration);
  if (generators === undefined || generators.length !== action.generators.length) return undefined;
  const places = elementPlaces(action, generators);
  if (places === undefined) return undefined;
  const rotations = places.flatMap((p, i) => (p.time === 1 ? [i] : []));
  const reversal = places.findIndex((p) => p.time === -1 && isIdentity(p.matrix));
  if (rotations.length < group.order && (reversal < 0 || 2 * rotations.length !== group.order)) return undefined;
  const { irreducibles } = wholeGroup(action);
  const odd = (values: ArrayLike<number>) => reversal >= 0 && values[group.classOf[reversal]!]! < 0;
  const restricted = irreducibles.map((k) => ({
    dimension: k.dimension,
    values: rotations.map((e) => k.values[group.classOf[e]!]!),
    odd: odd(k.values),
  }));
  const labels = new Array<string>(irreducibles.length).fill('');
  for (const parity of [false, true]) {
    const some = restricted.filter((k) => k.odd === parity);
    if (some.length === 0) continue;
    const found = pointLabels(
      rotations.map((e) => places[e]!.matrix),
      some,
    );
    if (found === undefined) return undefined;
    some.forEach((k, i) => {
      labels[restricted.indexOf(k)] = `${found[i]!}${parity ? '-' : ''}`;
    });
  }
  return labels;
}

/** The generators in the order of the action: typed ones, those of the group, time reversal. */
function generatorPlaces(declaration: Declaration): Place[] | undefined {
  const declared = declaration.groups[0]!;
  const group = loadCatalogueGroup(declared.group, { folder: declaration.folder });
  const action = group.actions.get('space') ?? group.actions.get('plane');
  if (action === undefined || (action.dimension !== 2 && action.dimension !== 3)) return undefined;
  const one = identityOf(action);
  // a typed generator without a map is time reversal; any other may enlarge the group
  if (declaration.generators.some((g) => g.map !== undefined || g.matrix !== undefined || g.permutation !== undefined)) return undefined;
  const reversal: Place = { matrix: one, time: -1 };
  const texts = group.generators.map((name) => action.matrices.get(name));
  if (texts.some((t) => t === undefined)) return undefined;
  const turned = texts.map(
    (rows): Place => ({ matrix: rows!.map((row) => row.map((text) => numericValue(parseExpression(text), new Map()))), time: 1 }),
  );
  return [...declaration.generators.map(() => reversal), ...turned, ...(declaration.timeReversal ? [reversal] : [])];
}

const identityOf = (action: CatalogueAction): number[][] =>
  Array.from({ length: action.dimension }, (_, i) => Array.from({ length: action.dimension }, (_, j) => (i === j ? 1 : 0)));

const product = (a: Place, b: Place): Place => ({
  matrix: a.matrix.map((row) => b.matrix.map((_, j) => row.reduce((s, x, k) => s + x * b.matrix[k]![j]!, 0))),
  time: (a.time * b.time) as 1 | -1,
});

const same = (a: Place, b: Place): boolean =>
  a.time === b.time && a.matrix.every((row, i) => row.every((x, j) => Math.abs(x - b.matrix[i]![j]!) < NEAR));

const isIdentity = (m: Place['matrix']): boolean => m.every((row, i) => row.every((x, j) => Math.abs(x - (i === j ? 1 : 0)) < NEAR));

/** The places of all elements, if the generators' places extend to a homomorphism; undefined where the group acts with a kernel of its own. */
function elementPlaces(action: Action, generators: readonly Place[]): Place[] | undefined {
  const { group } = action;
  const dimension = generators[0]?.matrix.length ?? 0;
  if (dimension === 0) return undefined;
  const one = Array.from({ length: dimension }, (_, i) => Array.from({ length: dimension }, (_, j) => (i === j ? 1 : 0)));
  const places: Place[] = [{ matrix: one, time: 1 }];
  for (let i = 1; i < group.order; i++) places.push(product(generators[group.via[i]!]!, places[group.parent[i]!]!));
  for (let i = 0; i < group.order; i++)
    for (let s = 0; s < generators.length; s++)
      if (!same(product(generators[s]!, places[i]!), places[group.multiply(group.generators[s]!, i)]!)) return undefined;
  return places;
}
