/**
 * Actions of catalogue groups: from a declaration to texts of matrices, built only when they are looked at;
 * tensor products (sites with several components) and direct sums of actions; products of groups.
 */
import { InputError } from '../errors/errors.ts';
import { integerValue } from './catalogue-arithmetic.ts';
import {
  directSumTexts,
  kroneckerTexts,
  permutationTexts,
  type SignedPermutation,
  scalarTexts,
  sumZeroTexts,
  type TextMatrix,
} from './catalogue-entries.ts';
import type { ActionDeclaration, GroupDeclaration, PermutationDeclaration } from './catalogue-file.ts';

/** A matrix action of a group; column j of a matrix holds the image of coordinate vector j. */
export interface CatalogueAction {
  readonly name: string;
  readonly title: string;
  readonly dimension: number;
  /** True if the action exists on any number of coordinates (`reflection`); `dimension` is then the one asked for, 1 by default. */
  readonly anyDimension: boolean;
  /** Claimed order of the kernel, 1 where a declaration claims an order of the group and no kernel; absent where nothing is claimed. */
  readonly kernel?: number;
  /** Matrices by generator, entries as exact texts of the model language. */
  readonly matrices: ReadonlyMap<string, TextMatrix>;
  /** Where every generator permutes the coordinates without signs: images of 0 … dimension-1, value at i to images[i]. */
  readonly permutations?: ReadonlyMap<string, readonly number[]>;
}

const DIMENSION_LIMIT = 5000;

function checkDimension(dimension: number, file: string, key: string): number {
  if (dimension >= 0 && dimension <= DIMENSION_LIMIT) return dimension;
  throw new InputError(`an action of dimension ${dimension} is out of bounds`, {
    file,
    key,
    value: String(dimension),
    expected: `at most ${DIMENSION_LIMIT} coordinates`,
  });
}

type Head = Pick<CatalogueAction, 'name' | 'title' | 'dimension' | 'anyDimension'> & { readonly kernel?: number | undefined };

/** An action whose matrices and permutations are computed at first sight. */
class LazyAction implements CatalogueAction {
  readonly name: string;
  readonly title: string;
  readonly dimension: number;
  readonly anyDimension: boolean;
  declare readonly kernel?: number;
  declare readonly permutations?: ReadonlyMap<string, readonly number[]>;
  readonly #build: () => ReadonlyMap<string, TextMatrix>;
  #matrices: ReadonlyMap<string, TextMatrix> | undefined;
  constructor(head: Head, build: () => ReadonlyMap<string, TextMatrix>, permutations?: ReadonlyMap<string, readonly number[]>) {
    this.name = head.name;
    this.title = head.title;
    this.dimension = head.dimension;
    this.anyDimension = head.anyDimension;
    if (head.kernel !== undefined) this.kernel = head.kernel;
    if (permutations !== undefined) this.permutations = permutations;
    this.#build = build;
  }
  get matrices(): ReadonlyMap<string, TextMatrix> {
    this.#matrices ??= this.#build();
    return this.#matrices;
  }
}

const mapValues = <A, B>(map: ReadonlyMap<string, A>, f: (a: A, key: string) => B): Map<string, B> =>
  new Map([...map].map(([key, a]) => [key, f(a, key)]));

/** The signed permutation that a declaration means on d sites. @throws InputError if it is none. */
function signedPermutation(
  p: PermutationDeclaration,
  d: number,
  names: Readonly<Record<string, number>>,
  file: string,
  key: string,
): SignedPermutation {
  const where = { file, key };
  const fail = (message: string, value?: string): never => {
    throw new InputError(`${key}: ${message}`, {
      ...where,
      ...(value === undefined ? {} : { value }),
      expected: `a permutation of the sites 1 … ${d}`,
    });
  };
  const site = (value: number, text: string): number =>
    value >= 1 && value <= d ? value - 1 : fail(`site ${value} is outside 1 … ${d}`, text);
  const at = (text: string) => site(integerValue(text, names, where), text);
  let images = Array.from({ length: d }, (_, i) => i);
  if (p.rule !== undefined) {
    const rule = p.rule;
    images = images.map((i) => site(integerValue(rule, { ...names, i: i + 1 }, where), rule));
  } else if (p.images !== undefined) {
    if (p.images.length !== d) fail(`${p.images.length} images`);
    images = p.images.map(at);
  } else {
    const moved = new Set<number>();
    for (const cycle of p.cycles ?? []) {
      const sites = cycle.flatMap((item) => {
        const [from, to, more] = item.split('..');
        if (to === undefined) return [at(item)];
        if (more !== undefined) fail('a range has two ends', item);
        const [a, b] = [integerValue(from!, names, where), integerValue(to, names, where)];
        return Array.from({ length: Math.max(0, Math.min(b - a + 1, d + 1)) }, (_, k) => site(a + k, item));
      });
      for (const s of sites) {
        if (moved.has(s)) fail(`site ${s + 1} occurs twice in the cycles`);
        moved.add(s);
      }
      sites.forEach((s, k) => {
        images[s] = sites[(k + 1) % sites.length]!;
      });
    }
  }
  if (new Set(images).size !== d) fail('two sites have the same image');
  const signs = new Array<number>(d).fill(1);
  for (const text of p.negate ?? []) signs[at(text)] = -1;
  return { images, signs };
}

/** Replaces the name N in an expression text by its value. */
const substitute = (text: string, n: number | undefined): string =>
  n === undefined ? text : text.replace(/(?<![\w.])N(?!\w)/g, String(n));

/** Every action of a declaration, N replaced by its value; checked for shape, matrices built at first sight. */
export function buildActions(group: GroupDeclaration, n: number | undefined): Map<string, CatalogueAction> {
  const names: Readonly<Record<string, number>> = n === undefined ? {} : { N: n };
  return new Map([...group.actions].map(([name, a]) => [name, buildAction(group, name, a, names, n)]));
}

function buildAction(
  group: GroupDeclaration,
  name: string,
  a: ActionDeclaration,
  names: Readonly<Record<string, number>>,
  n: number | undefined,
  asked?: number,
): CatalogueAction {
  const { file } = group;
  const key = `actions.${name}`;
  const anyDimension = a.dimension === 'any';
  const dimension = anyDimension ? (asked ?? 1) : integerValue(a.dimension, names, { file, key: `${key}.dimension` });
  checkDimension(dimension, file, `${key}.dimension`);
  const unclaimed = group.order === undefined ? undefined : 1;
  const kernel = a.kernel === undefined ? unclaimed : integerValue(a.kernel, names, { file, key: `${key}.kernel` });
  const head = { name, title: a.title ?? name, dimension, anyDimension, kernel };
  const permutations = (declared: ReadonlyMap<string, PermutationDeclaration>, d: number, where: string) =>
    mapValues(declared, (p, g) => signedPermutation(p, d, names, file, `${where}.${g}`));
  if (a.permutations !== undefined) {
    const signed = permutations(a.permutations, dimension, `${key}.permutations`);
    const plain = [...signed.values()].every(({ signs }) => signs.every((s) => s === 1));
    return new LazyAction(head, () => mapValues(signed, permutationTexts), plain ? mapValues(signed, ({ images }) => images) : undefined);
  }
  if (a.sumZero !== undefined) {
    const base = group.actions.get(a.sumZero);
    const declared = base?.permutations;
    if (base === undefined || declared === undefined || [...declared.values()].some((p) => p.negate !== undefined))
      throw new InputError(`${key}.sumZero: "${a.sumZero}" is no permutation action`, {
        file,
        key: `${key}.sumZero`,
        value: a.sumZero,
        expected: 'a permutation action without signs',
      });
    const d = checkDimension(integerValue(base.dimension, names, { file, key: `actions.${a.sumZero}.dimension` }), file, key);
    if (dimension !== d - 1)
      throw new InputError(`${key}.dimension: ${dimension} on the hyperplane of sum zero of ${d} coordinates`, {
        file,
        key: `${key}.dimension`,
        value: a.dimension,
        expected: String(d - 1),
      });
    return new LazyAction(head, () =>
      mapValues(permutations(declared, d, `actions.${a.sumZero}.permutations`), ({ images }) => sumZeroTexts(images)),
    );
  }
  if (a.scalars !== undefined) {
    const scalars = a.scalars;
    return new LazyAction(head, () => mapValues(scalars, (x) => scalarTexts(substitute(x, n), dimension)));
  }
  const matrices = a.matrices ?? new Map<string, TextMatrix>();
  for (const [g, m] of matrices)
    if (m.length !== dimension || m.some((row) => row.length !== dimension))
      throw new InputError(`${key}.matrices.${g}: ${m.length} rows of ${[...new Set(m.map((row) => row.length))].join(', ')} entries`, {
        file,
        key: `${key}.matrices.${g}`,
        expected: `${dimension} rows of ${dimension} entries`,
      });
  return new LazyAction(head, () => mapValues(matrices, (m) => m.map((row) => row.map((x) => substitute(x, n)))));
}

/** The same action on another number of coordinates, where it exists on any. */
export function resizedAction(group: GroupDeclaration, name: string, n: number | undefined, dimension: number): CatalogueAction {
  return buildAction(group, name, group.actions.get(name)!, n === undefined ? {} : { N: n }, n, dimension);
}

/** The action in which nothing moves. */
export function trivialAction(generators: readonly string[], dimension: number): CatalogueAction {
  const still = Array.from({ length: dimension }, (_, i) => i);
  return new LazyAction(
    { name: 'trivial', title: 'nothing moves', dimension, anyDimension: true },
    () => new Map(generators.map((g) => [g, scalarTexts('1', dimension)])),
    new Map(generators.map((g) => [g, still])),
  );
}

type Combine = 'tensor' | 'sum';

/** Two actions of the same generators side by side (sum) or as sites and components (tensor). */
export function combineActions(how: Combine, a: CatalogueAction, b: CatalogueAction): CatalogueAction {
  const dimension = how === 'sum' ? a.dimension + b.dimension : a.dimension * b.dimension;
  const name = `${a.name}${how === 'sum' ? '+' : '*'}${b.name}`;
  checkDimension(dimension, '', name);
  const matrix = how === 'sum' ? directSumTexts : kroneckerTexts;
  const join = (p: readonly number[], q: readonly number[]) =>
    how === 'sum' ? [...p, ...q.map((x) => x + p.length)] : p.flatMap((x) => q.map((y) => x * q.length + y));
  const title = how === 'sum' ? `${a.title}, beside it ${b.title}` : `sites: ${a.title}; components: ${b.title}`;
  const [p, q] = [a.permutations, b.permutations];
  return new LazyAction(
    { name, title, dimension, anyDimension: false },
    () => mapValues(a.matrices, (m, g) => matrix(m, b.matrices.get(g)!)),
    p === undefined || q === undefined ? undefined : mapValues(p, (images, g) => join(images, q.get(g)!)),
  );
}

/** An action of one factor as an action of the whole product: the other factors' generators stay still. */
export function extendedAction(a: CatalogueAction, rename: ReadonlyMap<string, string>, generators: readonly string[]): CatalogueAction {
  const still = trivialAction(generators, a.dimension);
  const extend = <T extends object>(own: ReadonlyMap<string, T>, others: ReadonlyMap<string, T>) => {
    const out = new Map(generators.map((g) => [g, others.get(g)!]));
    for (const [g, value] of own) out.set(rename.get(g)!, value);
    return out;
  };
  return new LazyAction(
    { name: a.name, title: a.title, dimension: a.dimension, anyDimension: a.anyDimension },
    () => extend(a.matrices, still.matrices),
    a.permutations === undefined ? undefined : extend(a.permutations, still.permutations!),
  );
}
