/**
 * The catalogue of groups: by name, with a number for the families, or from a user's own file; products of those.
 * Only the file of the group asked for is read. Entries of matrices stay texts of the model language here.
 *
 * Names: `dihedral:5` is groups/dihedral-N.json with N = 5, `C3v` is groups/CNv.json with N = 3 (Schoenflies 1891,
 * typed without underscores), `coxeter:H3` is groups/coxeter-H3.json.
 *
 * Products NAME*NAME: generators carry the number of their factor (r1, s1, r2). Their actions are sums `A+B`
 * (each factor moves its own coordinates; the default, `sum`, takes the first action of each factor) and tensor
 * products `A*B` (sites times components), one action per factor. Actions of a single group combine in the same way:
 * `ring*plane` acts on sites with two components each, coordinates listed site by site. The action `trivial`, on
 * any number of coordinates, belongs to every group.
 */
import { existsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { InputError } from '../errors/errors.ts';
import { buildActions, type CatalogueAction, combineActions, extendedAction, resizedAction, trivialAction } from './catalogue-actions.ts';
import { integerValue } from './catalogue-arithmetic.ts';
import { type GroupDeclaration, readCatalogueFile, readUserFile } from './catalogue-file.ts';
import { catalogueFileName, catalogueFolder, catalogueNames, nearestNames } from './catalogue-folder.ts';

export type { CatalogueAction } from './catalogue-actions.ts';

export interface CatalogueGroup {
  /** As one would type it, `dihedral:3`. */
  readonly name: string;
  readonly title: string;
  /** A published source, "common practice" or "from memory". */
  readonly source: string;
  readonly parameter?: number;
  readonly generators: readonly string[];
  /** What the declaration claims of the abstract group; absent where it claims nothing. */
  readonly expectedOrder?: number;
  readonly expectedClasses?: number;
  /** Declared actions by name, matrices built at first sight; of a product: `sum` and the tensor product of the first actions. */
  readonly actions: ReadonlyMap<string, CatalogueAction>;
  readonly defaultAction: string;
  /**
   * The action of that name or combination (`ring*plane`, `plane+sign`), the default one without a name.
   * @param dimension number of coordinates listed; fixes the size of an action that exists on any number.
   * @throws InputError for an unknown action, or one that does not act on that many coordinates.
   */
  action(name?: string, dimension?: number): CatalogueAction;
}

export interface CatalogueOptions {
  /** Folder from which relative paths to group files are taken; the working folder by default. */
  readonly folder?: string;
}

const FACTOR_LIMIT = 9;
const NAME_LIMIT = 60;
const EXAMPLE = 3;

/** One factor of a product, or the whole group. */
interface Factor {
  readonly name: string;
  readonly declaration: GroupDeclaration;
  readonly n: number | undefined;
  readonly order?: number;
  readonly classes?: number;
  readonly actions: ReadonlyMap<string, CatalogueAction>;
  /** Generators of this factor under their names in the whole group. */
  readonly rename: ReadonlyMap<string, string>;
}

/**
 * Reads a group: a name of the catalogue, a path to a group file (`file.json`, or `file.json:5` for a family), or a product of those.
 * @throws InputError for unknown names (with the nearest ones), numbers out of bounds and files that are not well formed.
 */
export function loadCatalogueGroup(spec: string, options: CatalogueOptions = {}): CatalogueGroup {
  const whole = spec.trim();
  const parts = isPath(whole) && existsSync(resolve(options.folder ?? '.', whole)) ? [whole] : whole.split('*').map((part) => part.trim());
  if (parts.length > FACTOR_LIMIT)
    throw new InputError(`a product of ${parts.length} groups`, {
      key: 'group',
      value: shown(spec),
      expected: `at most ${FACTOR_LIMIT} factors`,
    });
  if (parts.some((part) => part === ''))
    throw new InputError(`"${shown(spec)}" names no group`, {
      key: 'group',
      value: shown(spec),
      expected: 'a name of the catalogue, a path to a group file, or NAME*NAME',
      next: 'list them with: symcodim groups',
    });
  const factors = parts.map((part, k) => loadFactor(part, parts.length === 1 ? '' : String(k + 1), options));
  const generators = factors.flatMap(({ rename }) => [...rename.values()]);
  const action = (name?: string, dimension?: number) => resolveAction(factors, generators, name, dimension);
  const product = (values: readonly (number | undefined)[]) =>
    values.includes(undefined) ? undefined : values.reduce<number>((x, y) => x * y!, 1);
  const order = product(factors.map((f) => f.order));
  const classes = product(factors.map((f) => f.classes));
  const [only] = factors;
  const single = factors.length === 1 && only !== undefined;
  const first = factors.map((f) => [...f.actions.keys()][0]!);
  return {
    name: factors.map((f) => f.name).join('*'),
    title: single ? only.declaration.title : `direct product of: ${factors.map((f) => f.declaration.title).join('; ')}`,
    source: [...new Set(factors.map((f) => f.declaration.source))].join('; '),
    ...(single && only.n !== undefined ? { parameter: only.n } : {}),
    generators,
    ...(order === undefined ? {} : { expectedOrder: order }),
    ...(classes === undefined ? {} : { expectedClasses: classes }),
    actions: single ? only.actions : new Map(['sum', first.join('*')].map((name) => [name, action(name)])),
    defaultAction: single ? first[0]! : 'sum',
    action,
  };
}

/** What the list of groups shows of one file; orders and numbers of classes are texts in N. */
export interface CatalogueEntry {
  readonly name: string;
  readonly title: string;
  readonly source: string;
  readonly parameter?: { readonly from: number; readonly to: number; readonly multipleOf: number };
  readonly generators: readonly string[];
  readonly order?: string;
  readonly classes?: string;
  readonly actions: readonly string[];
}

/** Every group and family of the catalogue, words first, Schoenflies symbols after them. Reads all files. */
export function listCatalogue(): CatalogueEntry[] {
  const folder = catalogueFolder();
  return catalogueNames(folder).map((name) => {
    const { file: _file, actions, ...rest } = readCatalogueFile(join(folder, catalogueFileName(name)))!;
    return { ...rest, actions: [...actions.keys()] };
  });
}

/** Enough of what was typed to know it again. */
const shown = (typed: string): string => (typed.length > 80 ? `${typed.slice(0, 80)}…` : typed);

const isPath = (spec: string): boolean => /[\\/]/.test(spec) || /\.(?:json|ya?ml)(?::[^:]*)?$/.test(spec);

function loadFactor(spec: string, suffix: string, options: CatalogueOptions): Factor {
  const { declaration, typed } = isPath(spec) ? userDeclaration(spec, options) : catalogueDeclaration(spec);
  const { file, parameter } = declaration;
  const n = parameterValue(spec, declaration, typed);
  const names: Readonly<Record<string, number>> = n === undefined ? {} : { N: n };
  const claim = (key: 'order' | 'classes') => {
    const text = declaration[key];
    return text === undefined ? {} : { [key]: integerValue(text, names, { file, key }) };
  };
  return {
    name: parameter === undefined || isPath(spec) ? (isPath(spec) ? spec : declaration.name) : spec,
    declaration,
    n,
    ...claim('order'),
    ...claim('classes'),
    actions: buildActions(declaration, n),
    rename: new Map(declaration.generators.map((g) => [g, `${g}${suffix}`])),
  };
}

function userDeclaration(spec: string, options: CatalogueOptions): { declaration: GroupDeclaration; typed: string | undefined } {
  const [, path, typed] = /^(.*\.(?:json|ya?ml)):([^:\\/]*)$/.exec(spec) ?? [null, spec, undefined];
  return { declaration: readUserFile(resolve(options.folder ?? '.', path!)), typed };
}

/** The family that a typed name belongs to, N in place of its number, and that number as typed. */
function candidates(spec: string): { name: string; typed: string | undefined }[] {
  const colon = spec.indexOf(':');
  if (colon >= 0)
    return [
      { name: spec, typed: undefined },
      { name: `${spec.slice(0, colon)}:N`, typed: spec.slice(colon + 1) },
    ];
  const exact = { name: spec, typed: undefined };
  const digits = /\d+/.exec(spec);
  if (digits === null) return [exact];
  return [exact, { name: spec.replace(digits[0], 'N'), typed: digits[0] }];
}

function catalogueDeclaration(spec: string): { declaration: GroupDeclaration; typed: string | undefined } {
  const folder = catalogueFolder();
  for (const { name, typed } of candidates(spec)) {
    if (name.length > NAME_LIMIT || !/^[A-Za-z][\w-]*(?::\w+)?$/.test(name)) continue;
    const declaration = readCatalogueFile(join(folder, catalogueFileName(name)));
    // file systems may ignore case, the names do not
    if (declaration?.name === name) return { declaration, typed };
  }
  const number = /\d+/.exec(spec)?.[0] ?? String(EXAMPLE);
  const fill = (name: string) => name.replace('N', number);
  const near = nearestNames(
    spec,
    catalogueNames(folder).flatMap((name) => (/N/.test(name) ? [fill(name)] : [name])),
  );
  throw new InputError(`there is no group "${shown(spec)}" in the catalogue`, {
    key: 'group',
    value: shown(spec),
    expected: 'a name of the catalogue (case matters), a path to a group file, or NAME*NAME',
    next: near.length > 0 ? `did you mean ${near.join(' or ')}?` : 'list them with: symcodim groups',
  });
}

function parameterValue(spec: string, { name, parameter, file }: GroupDeclaration, typed: string | undefined): number | undefined {
  if (parameter === undefined) {
    if (typed === undefined) return undefined;
    throw new InputError(`"${shown(spec)}": this group takes no number`, {
      key: 'group',
      value: shown(spec),
      expected: isPath(spec) ? file : name,
    });
  }
  const { from, to, multipleOf } = parameter;
  const expected = `${multipleOf > 1 ? `N a multiple of ${multipleOf}` : 'a whole number N'} from ${from} to ${to}`;
  const example = String(Math.ceil(Math.max(from, EXAMPLE) / multipleOf) * multipleOf);
  const next = `write for instance ${isPath(spec) ? `${spec.split(':')[0]}:${example}` : name.replace('N', example)}`;
  if (typed === undefined || typed === '')
    throw new InputError(`"${shown(spec)}": the number of the family is missing`, { key: 'group', value: shown(spec), expected, next });
  const n = /^[1-9]\d{0,8}$/.test(typed) ? Number(typed) : Number.NaN;
  if (n >= from && n <= to && n % multipleOf === 0) return n;
  throw new InputError(`"${shown(spec)}": N = ${typed.slice(0, 40)} is not possible`, { key: 'group', value: shown(spec), expected, next });
}

/** An action that may still be resized, of one factor. */
interface Atom {
  readonly action: CatalogueAction;
  resized(dimension: number): CatalogueAction;
}

function resolveAction(
  factors: readonly Factor[],
  generators: readonly string[],
  name: string | undefined,
  dimension: number | undefined,
): CatalogueAction {
  const terms = actionTerms(factors, generators, name);
  const called = name ?? terms.map((term) => term.map((a) => a.action.name).join('*')).join('+');
  const size = (term: readonly Atom[]) => term.reduce((x, a) => x * a.action.dimension, 1);
  const free = terms.flat().filter((a) => a.action.anyDimension);
  let resized: CatalogueAction | undefined;
  if (dimension !== undefined && free.length === 1) {
    const term = terms.find((t) => t.includes(free[0]!))!;
    const left = dimension - terms.reduce((x, t) => (t === term ? x : x + size(t)), 0);
    const wanted = left / (size(term) / free[0]!.action.dimension);
    if (Number.isInteger(wanted) && wanted >= 1) resized = free[0]!.resized(wanted);
  }
  const chosen = (a: Atom) => (a === free[0] && resized !== undefined ? resized : a.action);
  const action = terms
    .map((term) => term.map(chosen).reduce((x, y) => combineActions('tensor', x, y)))
    .reduce((x, y) => combineActions('sum', x, y));
  if (dimension === undefined || action.dimension === dimension) return action;
  const group = factors.map((f) => f.name).join('*');
  throw new InputError(`the action ${called} of ${group} acts on ${action.dimension} coordinates, ${dimension} are listed`, {
    key: 'on',
    value: String(dimension),
    expected: `${action.dimension} coordinates`,
    next:
      factors.length > 1 || [...factors[0]!.actions.values()].length > 1
        ? `list ${action.dimension}, or choose another action: ${actionNames(factors)}`
        : `list ${action.dimension}; a second list takes further coordinates`,
  });
}

const actionNames = (factors: readonly Factor[]): string =>
  factors.length === 1
    ? [...factors[0]!.actions.keys(), 'trivial'].join(', ')
    : `sum, or one action per factor joined by + or *: ${factors.map((f) => `${f.name}: ${[...f.actions.keys(), 'trivial'].join(', ')}`).join('; ')}`;

/** Sum of tensor products that the text of an action means. */
function actionTerms(factors: readonly Factor[], generators: readonly string[], name: string | undefined): Atom[][] {
  const atom = (factor: Factor, typed: string): Atom => {
    const own = factor.declaration.generators;
    const known = [...factor.actions.keys()];
    const wanted = typed.trim();
    const extend = (a: CatalogueAction) => (factors.length === 1 ? a : extendedAction(a, factor.rename, generators));
    if (wanted === 'trivial') return { action: extend(trivialAction(own, 1)), resized: (d) => extend(trivialAction(own, d)) };
    const action = factor.actions.get(wanted);
    if (action !== undefined)
      return { action: extend(action), resized: (d) => extend(resizedAction(factor.declaration, wanted, factor.n, d)) };
    const [near] = nearestNames(wanted, known);
    throw new InputError(`${factor.name} has no action "${wanted}"`, {
      key: 'action',
      value: name ?? '',
      expected: `${[...known, 'trivial'].join(', ')}, or combinations A*B`,
      ...(near === undefined ? {} : { next: `did you mean ${near}?` }),
    });
  };
  const [only] = factors;
  if (factors.length === 1 && only !== undefined)
    return (name ?? [...only.actions.keys()][0]!).split('+').map((term) => term.split('*').map((typed) => atom(only, typed)));
  if (name === undefined || name.trim() === 'sum') return factors.map((f) => [atom(f, [...f.actions.keys()][0]!)]);
  const sum = name.split('+');
  if (sum.length === factors.length) return sum.map((term, k) => term.split('*').map((typed) => atom(factors[k]!, typed)));
  const tensor = name.split('*');
  if (sum.length === 1 && tensor.length === factors.length) return [tensor.map((typed, k) => atom(factors[k]!, typed))];
  throw new InputError(`"${name}" is no action of the product ${factors.map((f) => f.name).join('*')}`, {
    key: 'action',
    value: name,
    expected: actionNames(factors),
  });
}
