/**
 * Group declarations as data: one group or family a file. Catalogue files are JSON whose numbers are texts or
 * small integers; a user's own file, JSON or YAML, is read by the YAML reader with the failsafe schema, so
 * that no digit is rounded. Both pass the same validation.
 */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { InputError } from '../errors/errors.ts';
import { nearestNames } from './catalogue-folder.ts';

/** How one generator permutes the sites 1 … d: a rule in i, a list of images, or cycles; then signs. */
export interface PermutationDeclaration {
  readonly rule?: string;
  readonly images?: readonly string[];
  /** Entries are whole-number texts or ranges `a .. b`. */
  readonly cycles?: readonly (readonly string[])[];
  /** Sites that change sign, after the move. */
  readonly negate?: readonly string[];
}

export interface ActionDeclaration {
  /** A text in N, or `any`: as many coordinates as are listed. */
  readonly dimension: string;
  readonly title?: string;
  /** Order of the kernel, a text in N. */
  readonly kernel?: string;
  /** One of the four forms. Rows of matrices are texts of the model language. */
  readonly matrices?: ReadonlyMap<string, readonly (readonly string[])[]>;
  readonly permutations?: ReadonlyMap<string, PermutationDeclaration>;
  readonly scalars?: ReadonlyMap<string, string>;
  /** Name of a permutation action, to be taken on the hyperplane of sum zero. */
  readonly sumZero?: string;
}

export interface ParameterDeclaration {
  readonly from: number;
  readonly to: number;
  readonly multipleOf: number;
}

export interface GroupDeclaration {
  readonly file: string;
  readonly name: string;
  readonly title: string;
  readonly source: string;
  readonly parameter?: ParameterDeclaration;
  readonly generators: readonly string[];
  readonly order?: string;
  readonly classes?: string;
  readonly actions: ReadonlyMap<string, ActionDeclaration>;
}

const FORMS = ['matrices', 'permutations', 'scalars', 'sumZero'] as const;
const NAME = /^[A-Za-z][A-Za-z0-9_]*$/;
const ENTRY_LIMIT = 1000;
const ENTRY_NAMES = new Set(['pi', 'sqrt', 'cos', 'sin', 'tan', 'N']);

type Tree = Readonly<Record<string, unknown>>;

/** Where in which file a value stands. */
class Place {
  readonly file: string;
  readonly key: string;
  constructor(file: string, key = '') {
    this.file = file;
    this.key = key;
  }
  in(key: string | number): Place {
    return new Place(this.file, typeof key === 'number' ? `${this.key}[${key}]` : this.key === '' ? key : `${this.key}.${key}`);
  }
  fail(message: string, expected: string, value?: unknown, next?: string): never {
    const shown = value === undefined ? undefined : String(JSON.stringify(value)).slice(0, 80);
    throw new InputError(`${this.key === '' ? 'the group declaration' : this.key}: ${message}`, {
      file: this.file,
      ...(this.key === '' ? {} : { key: this.key }),
      ...(shown === undefined ? {} : { value: shown }),
      expected,
      ...(next === undefined ? {} : { next }),
    });
  }
}

const isTree = (x: unknown): x is Tree => typeof x === 'object' && x !== null && !Array.isArray(x);

function tree(x: unknown, at: Place, known: readonly string[] | null, required: readonly string[] = []): Tree {
  if (!isTree(x)) at.fail('not a mapping', known === null ? 'a mapping from names' : `a mapping with the keys ${known.join(', ')}`, x);
  if (known !== null)
    for (const key of Object.keys(x))
      if (!known.includes(key)) {
        const [near] = nearestNames(key, known);
        at.in(key).fail('unknown key', known.join(', '), undefined, near === undefined ? undefined : `did you mean "${near}"?`);
      }
  for (const key of required) if (!Object.hasOwn(x, key)) at.fail(`the key "${key}" is missing`, `the key "${key}"`);
  return x;
}

/** A number or its text, as text. */
function text(x: unknown, at: Place, expected = 'a text'): string {
  if (typeof x === 'number' && Number.isSafeInteger(x)) return String(x);
  if (typeof x !== 'string' || x.trim() === '') at.fail('not a text', expected, x);
  if (x.length > ENTRY_LIMIT) at.fail(`longer than ${ENTRY_LIMIT} characters`, expected);
  return x.trim();
}

function list(x: unknown, at: Place, expected: string): readonly unknown[] {
  return Array.isArray(x) ? x : at.fail('not a list', expected, x);
}

function whole(x: unknown, at: Place): number {
  const value = text(x, at, 'a positive integer');
  return /^[1-9]\d{0,8}$/.test(value) ? Number(value) : at.fail('not a positive integer', 'a positive integer', value);
}

/** An entry of a matrix: no other names than those that stand for exact numbers. */
function entry(x: unknown, at: Place): string {
  const expected = 'an exact number: integers, fractions, decimals, sqrt, cos, sin, tan of rational multiples of pi';
  const value = text(x, at, expected);
  if (/[^\w\s.+\-*/^()]/.test(value)) at.fail('a sign that no number contains', expected, value);
  for (const name of value.replace(/\d+\.?\d*(?:[eE][+-]?\d+)?/g, ' ').match(/[A-Za-z_]\w*/g) ?? [])
    if (!ENTRY_NAMES.has(name)) at.fail(`the name "${name}" is no exact number`, expected, value);
  return value;
}

function permutation(x: unknown, at: Place): PermutationDeclaration {
  const expected = 'a rule in i and N, a list of images, or {cycles, negate}';
  const items = (y: unknown, where: Place) => list(y, where, expected).map((item, k) => text(item, where.in(k), expected));
  if (Array.isArray(x)) return { images: items(x, at) };
  if (!isTree(x)) return { rule: text(x, at, expected) };
  const t = tree(x, at, ['cycles', 'negate'], []);
  return {
    cycles: Object.hasOwn(t, 'cycles')
      ? list(t.cycles, at.in('cycles'), 'a list of cycles').map((c, k) => items(c, at.in('cycles').in(k)))
      : [],
    ...(Object.hasOwn(t, 'negate') ? { negate: items(t.negate, at.in('negate')) } : {}),
  };
}

function perGenerator<T>(x: unknown, at: Place, generators: readonly string[], read: (y: unknown, where: Place) => T): Map<string, T> {
  const t = tree(x, at, generators, generators);
  return new Map(generators.map((g) => [g, read(t[g], at.in(g))]));
}

function action(x: unknown, at: Place, generators: readonly string[], names: readonly string[]): ActionDeclaration {
  const t = tree(x, at, ['dimension', 'title', 'kernel', ...FORMS], ['dimension']);
  const forms = FORMS.filter((form) => Object.hasOwn(t, form));
  if (forms.length !== 1) at.fail(`${forms.length} of the forms ${FORMS.join(', ')}`, 'exactly one of them');
  const dimension = text(t.dimension, at.in('dimension'), 'a number, a text in N, or any');
  if ((dimension === 'any') !== Object.hasOwn(t, 'scalars'))
    at.in('dimension').fail('"any" and scalars go together', 'scalars with dimension any', dimension);
  const common = {
    dimension,
    ...(Object.hasOwn(t, 'title') ? { title: text(t.title, at.in('title')) } : {}),
    ...(Object.hasOwn(t, 'kernel') ? { kernel: text(t.kernel, at.in('kernel')) } : {}),
  };
  switch (forms[0]!) {
    case 'matrices':
      return {
        ...common,
        matrices: perGenerator(t.matrices, at.in('matrices'), generators, (m, where) =>
          list(m, where, 'a list of rows').map((row, i) =>
            list(row, where.in(i), 'a row of entries').map((y, j) => entry(y, where.in(i).in(j))),
          ),
        ),
      };
    case 'permutations':
      return { ...common, permutations: perGenerator(t.permutations, at.in('permutations'), generators, permutation) };
    case 'scalars':
      return { ...common, scalars: perGenerator(t.scalars, at.in('scalars'), generators, entry) };
    case 'sumZero': {
      const base = text(t.sumZero, at.in('sumZero'), 'the name of a permutation action');
      const of = names.includes(base) ? base : at.in('sumZero').fail('no action of this name', names.join(', '), base);
      return { ...common, sumZero: of };
    }
  }
}

/** Checks the form of a declaration. @throws InputError naming the file and the key. */
export function readDeclaration(x: unknown, file: string): GroupDeclaration {
  const at = new Place(file);
  const t = tree(
    x,
    at,
    ['name', 'title', 'source', 'parameter', 'generators', 'order', 'classes', 'actions'],
    ['name', 'generators', 'actions'],
  );
  const name = text(t.name, at.in('name'));
  const generators = list(t.generators, at.in('generators'), 'a list of names').map((g, k) => {
    const value = text(g, at.in('generators').in(k));
    return NAME.test(value) ? value : at.in('generators').in(k).fail('not a name', 'a letter, then letters, digits or _', value);
  });
  if (new Set(generators).size !== generators.length) at.in('generators').fail('a name occurs twice', 'different names', generators);
  const optional = (key: 'order' | 'classes') => (Object.hasOwn(t, key) ? { [key]: text(t[key], at.in(key)) } : {});
  const declared = tree(t.actions, at.in('actions'), null);
  const names = Object.keys(declared);
  if (names.length === 0) at.in('actions').fail('no action', 'at least one action');
  for (const key of names)
    if (!NAME.test(key) || key === 'sum' || key === 'trivial')
      at.in('actions').in(key).fail('not a name for an action', 'a letter, then letters, digits or _; sum and trivial are taken', key);
  let parameter: ParameterDeclaration | undefined;
  if (Object.hasOwn(t, 'parameter')) {
    const p = tree(t.parameter, at.in('parameter'), ['from', 'to', 'multipleOf'], ['from', 'to']);
    const bound = (key: 'from' | 'to' | 'multipleOf') => whole(p[key], at.in('parameter').in(key));
    parameter = { from: bound('from'), to: bound('to'), multipleOf: Object.hasOwn(p, 'multipleOf') ? bound('multipleOf') : 1 };
  }
  return {
    file,
    name,
    title: Object.hasOwn(t, 'title') ? text(t.title, at.in('title')) : name,
    source: Object.hasOwn(t, 'source') ? text(t.source, at.in('source')) : file,
    ...(parameter === undefined ? {} : { parameter }),
    generators,
    ...optional('order'),
    ...optional('classes'),
    actions: new Map(names.map((key) => [key, action(declared[key], at.in('actions').in(key), generators, names)])),
  };
}

/** A file of the catalogue, or undefined if there is none. */
export function readCatalogueFile(file: string): GroupDeclaration | undefined {
  let content: string;
  try {
    content = readFileSync(file, 'utf8');
  } catch (e) {
    if ((e as NodeJS.ErrnoException).code === 'ENOENT') return undefined;
    throw e;
  }
  return readDeclaration(JSON.parse(content), file);
}

const BYTE_LIMIT = 1 << 20;

/** A user's own group file, JSON or YAML. @throws InputError naming the file, and the line where the text is not well formed. */
export function readUserFile(file: string): GroupDeclaration {
  let content: string;
  try {
    content = readFileSync(file, 'utf8');
  } catch (e) {
    const code = (e as NodeJS.ErrnoException).code ?? 'unknown';
    const reason = code === 'ENOENT' ? 'there is no such file' : code === 'EISDIR' ? 'it is a folder' : `it cannot be read (${code})`;
    throw new InputError(`group file ${file}: ${reason}`, {
      file,
      expected: 'a readable group file, JSON or YAML',
      next: 'check the path',
    });
  }
  if (content.length > BYTE_LIMIT)
    throw new InputError(`group file ${file} has ${content.length} characters`, { file, expected: `at most ${BYTE_LIMIT} characters` });
  const yaml = createRequire(import.meta.url)('yaml') as typeof import('yaml');
  const document = yaml.parseDocument(content, { schema: 'failsafe', uniqueKeys: true });
  const [problem] = document.errors;
  if (problem !== undefined)
    throw new InputError(`group file ${file} is not well formed: ${problem.message.split('\n')[0]}`, {
      file,
      expected: 'JSON or YAML 1.2 with different keys',
    });
  let content_: unknown;
  try {
    content_ = document.toJS({ maxAliasCount: 100 });
  } catch (e) {
    throw new InputError(`group file ${file} is not well formed: ${(e as Error).message}`, { file, expected: 'JSON or YAML 1.2' });
  }
  return readDeclaration(content_, file);
}
