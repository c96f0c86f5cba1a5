/** A model file, YAML or JSON, to a declaration. The layout is that of model.schema.json. */
import { dirname } from 'node:path';
import { InputError } from '../../errors/index.ts';
import { namesMatrixFile } from '../matrix-file/index.ts';
import { complete, type Draft, sourceLabel } from './complete.ts';
import type { Declaration, EnergyDeclaration, RangeDeclaration } from './declaration.ts';
import { asList, asMap, assertKeys, assertName, asText, expressionMap, expressionOf, integerOf, namesOf, squareTableOf } from './keys.ts';
import { matrixOf } from './matrix-value.ts';
import { mechanicalOf } from './mechanical.ts';
import { momentumOf, namesIn, numberedNames, pairedNames } from './names.ts';
import { networkOf } from './network.ts';
import { numberedFilesOf, numberedNode } from './numbered-files.ts';
import { symmetryOf } from './symmetry.ts';
import { assertPlainText, MODEL_BYTES, readTextFile } from './text-file.ts';
import { readYaml, refuse, type YamlMap, type YamlNode } from './yaml-reader.ts';

/** The keys of a model file, in the order of the documentation. */
export const MODEL_KEYS = [
  'title',
  'coordinates',
  'momenta',
  'symplectic',
  'parameters',
  'vary',
  'range',
  'define',
  'hamiltonian',
  'quadratic',
  'mass',
  'gyroscopic',
  'stiffness',
  'damping',
  'network',
  'equilibrium',
  'symmetry',
  'neutral',
  'numbers',
  'tolerance',
] as const;

const MECHANICAL = ['mass', 'gyroscopic', 'stiffness', 'damping'];

function energyOf(top: YamlMap, folder: string): EnergyDeclaration {
  const { entries } = top;
  const sources = [
    ...['hamiltonian', 'quadratic', 'network'].filter((key) => entries.has(key)),
    ...(MECHANICAL.some((key) => entries.has(key)) ? [MECHANICAL.find((key) => entries.has(key))!] : []),
  ];
  if (sources.length > 1) {
    throw refuse(
      entries.get(sources[1]!)!,
      `The energy is given by ${sources.join(' and ')}`,
      'one of hamiltonian, quadratic, mass with stiffness, network',
      'keep one of them',
    );
  }
  const [hamiltonian, quadratic, network] = [entries.get('hamiltonian'), entries.get('quadratic'), entries.get('network')];
  if (hamiltonian !== undefined) return { kind: 'hamiltonian', text: expressionOf(hamiltonian) };
  if (network !== undefined) return networkOf(network);
  if (quadratic === undefined) return sources.length === 0 ? { kind: 'none' } : mechanicalOf(top, folder);
  if (quadratic.kind === 'text' && !namesMatrixFile(quadratic.text)) return { kind: 'quadratic', text: expressionOf(quadratic) };
  const numbered = numberedNode(quadratic);
  const files = numbered === undefined ? undefined : numberedFilesOf(numbered, folder, 1);
  const matrix = files?.nodes[0]?.matrix ?? matrixOf(quadratic, folder);
  if (matrix.rows !== matrix.cols || matrix.rows % 2 !== 0) {
    throw refuse(
      quadratic,
      `quadratic is ${matrix.rows} × ${matrix.cols}`,
      'a square matrix of even size, for coordinates and momenta',
      'correct the matrix',
    );
  }
  return { kind: 'hessian', matrix, ...(files === undefined ? {} : { files }) };
}

/** Degrees of freedom that the energy itself fixes; undefined for expressions. */
function degreesOf(energy: EnergyDeclaration): { readonly n: number; readonly why: string } | undefined {
  if (energy.kind === 'hessian') return { n: energy.matrix.rows / 2, why: `quadratic is ${energy.matrix.rows} × ${energy.matrix.cols}` };
  if (energy.kind === 'mechanical') return { n: energy.mass.rows, why: `mass is ${energy.mass.rows} × ${energy.mass.cols}` };
  if (energy.kind === 'network')
    return { n: energy.points.size * energy.dimension, why: `network has ${energy.points.size} points of dimension ${energy.dimension}` };
  return undefined;
}

function phaseOf(
  top: YamlMap,
  energy: EnergyDeclaration,
  parameters: ReadonlySet<string>,
  define: ReadonlyMap<string, string>,
): { coordinates: string[]; momenta: string[] } {
  const [first, second] = [top.entries.get('coordinates'), top.entries.get('momenta')];
  const degrees = degreesOf(energy);
  if (first === undefined) {
    if (second !== undefined)
      throw refuse(second, 'momenta are given without coordinates', 'coordinates in the same order', 'add coordinates');
    if (degrees !== undefined) return numberedNames(degrees.n);
    const texts = energy.kind === 'hamiltonian' || energy.kind === 'quadratic' ? [energy.text, ...define.values()] : [];
    const found = texts.flatMap((text) => [...namesIn(text)]);
    const pairs = pairedNames(found.filter((name) => !parameters.has(name) && !define.has(name)));
    if (pairs.coordinates.length === 0)
      throw refuse(top, 'The model has no coordinates', 'coordinates: [q1, …] and momenta: [p1, …]', 'add coordinates');
    return pairs;
  }
  const coordinates = namesOf(first);
  if (coordinates.length === 0) throw refuse(first, 'coordinates is empty', 'at least one coordinate');
  if (degrees !== undefined && coordinates.length !== degrees.n) {
    throw refuse(
      first,
      `coordinates has ${coordinates.length} names and ${degrees.why}`,
      `${degrees.n} names`,
      'correct the list or leave it out',
    );
  }
  if (second === undefined) {
    const momenta = coordinates.map((name) => {
      const momentum = momentumOf(name);
      if (momentum === undefined)
        throw refuse(first, `The momentum of ${name} cannot be guessed`, 'momenta in the order of coordinates', 'add momenta: […]');
      return momentum;
    });
    return { coordinates, momenta };
  }
  const momenta = namesOf(second);
  if (momenta.length !== coordinates.length) {
    throw refuse(
      second,
      `There are ${coordinates.length} coordinates and ${momenta.length} momenta`,
      'one momentum for each coordinate, in the same order',
    );
  }
  return { coordinates, momenta };
}

function parametersOf(node: YamlNode | undefined): { values: Map<string, string>; empty: string[] } {
  const values = new Map<string, string>();
  const empty: string[] = [];
  if (node === undefined) return { values, empty };
  for (const [name, value] of asMap(node, 'a mapping from names to values, {c: -1/3}').entries) {
    assertName(value, name);
    if (value.kind === 'text' && /^(~|null|)$/.test(value.text)) empty.push(name);
    else values.set(name, expressionOf(value));
  }
  return { values, empty };
}

function rangesOf(node: YamlNode | undefined): Map<string, RangeDeclaration> {
  const ranges = new Map<string, RangeDeclaration>();
  if (node === undefined) return ranges;
  for (const [name, value] of asMap(node, 'a mapping from parameters to intervals, {c: [-1, 1]}').entries) {
    assertName(value, name);
    const { items } = asList(value, 'an interval [from, to] or [from, to, steps]');
    if (items.length !== 2 && items.length !== 3)
      throw refuse(value, `${value.key} has ${items.length} entries`, '[from, to] or [from, to, steps]');
    const [from, to, steps] = items;
    ranges.set(name, { from: expressionOf(from!), to: expressionOf(to!), ...(steps === undefined ? {} : { steps: integerOf(steps, 1) }) });
  }
  return ranges;
}

/** Text of a model file to a draft; `folder` is where relative paths start. Throws InputError. */
export function draftFromText(text: string, source: string, folder: string): Draft {
  const label = sourceLabel(source);
  assertPlainText(text, label, MODEL_BYTES);
  const root = readYaml(text, label);
  if (root.kind !== 'map')
    throw refuse(root, `${label} is not a model: it has no keys`, 'a mapping with hamiltonian, coordinates and so on');
  const top = root;
  assertKeys(top, MODEL_KEYS);
  const { entries } = top;
  const get = (key: (typeof MODEL_KEYS)[number]): YamlNode | undefined => entries.get(key);

  const energy = energyOf(top, folder);
  const { values: parameters, empty } = parametersOf(get('parameters'));
  const vary = get('vary') === undefined ? [] : namesOf(get('vary')!);
  const define = get('define') === undefined ? new Map<string, string>() : expressionMap(get('define')!, 'names');
  const { coordinates, momenta } = phaseOf(top, energy, new Set([...parameters.keys(), ...empty, ...vary]), define);
  const phase = { names: [...coordinates, ...momenta], kind: 'a coordinate or momentum' };

  const symplectic = get('symplectic');
  const equilibrium = get('equilibrium');
  const symmetry = get('symmetry');
  const neutral = get('neutral');
  const numbers = get('numbers');
  const tolerance = get('tolerance');
  const title = get('title');
  const find = neutral?.kind === 'text' && neutral.text === 'find';
  if (numbers !== undefined && !['exact', 'floating'].includes(asText(numbers, 'exact or floating').text)) {
    throw refuse(numbers, 'numbers must be exact or floating', 'exact or floating');
  }
  return {
    source,
    folder,
    title: title === undefined ? label : asText(title, 'a text').text,
    coordinates,
    momenta,
    ...(symplectic === undefined ? {} : { form: squareTableOf(symplectic, [2 * coordinates.length], 'coordinates, then momenta') }),
    parameters,
    empty,
    vary,
    range: rangesOf(get('range')),
    define,
    energy,
    equilibrium: equilibrium === undefined ? new Map() : expressionMap(equilibrium, 'coordinates', phase),
    ...(symmetry === undefined
      ? { generators: [], groups: [], timeReversal: false }
      : symmetryOf(symmetry, { coordinates, momenta, points: energy.kind === 'network' })),
    neutral:
      neutral === undefined || find
        ? []
        : asList(neutral, 'a list of vector fields such as {q1: 1, q2: 1}, or find').items.map((field) =>
            expressionMap(field, 'coordinates', phase),
          ),
    neutralFind: find,
    numbers: numbers?.kind === 'text' && numbers.text === 'floating' ? 'floating' : 'exact',
    ...(tolerance === undefined ? {} : { tolerance: toleranceOf(tolerance) }),
  };
}

function toleranceOf(node: YamlNode): string {
  const { text } = asText(node, 'a positive number');
  if (!(Number(text) > 0) || !Number.isFinite(Number(text)))
    throw refuse(node, 'tolerance must be a positive number', 'a positive number such as 1e-9');
  return text;
}

/** The draft of a model file on disk. Throws InputError when it cannot be read. */
export function draftFromFile(path: string): Draft {
  if (path === '')
    throw new InputError('The name of the model file is empty.', {
      expected: 'a path, or - for standard input',
      next: 'name a model file',
    });
  return draftFromText(readTextFile(path, MODEL_BYTES), path, dirname(path));
}

/** A model file to a declaration. Throws InputError with file, key, value, expectation and advice. */
export function readModelFile(path: string): Declaration {
  return complete(draftFromFile(path));
}

/** The text of a model (standard input, an editor) to a declaration; relative paths start from `folder`. */
export function readModelText(text: string, source = '-', folder = '.'): Declaration {
  return complete(draftFromText(text, source, folder));
}
