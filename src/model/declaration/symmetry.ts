/** The key `symmetry`: generators typed by hand, a group with what it acts on, time reversal. */
import type { GeneratorDeclaration, GroupDeclaration, SiteDeclaration } from './declaration.ts';
import { asList, asMap, assertKeys, asText, booleanOf, expressionMap, integerOf, namesOf, squareTableOf } from './keys.ts';
import { didYouMean, listed } from './nearest.ts';
import { refuse, type YamlMap, type YamlNode } from './yaml-reader.ts';

export interface SymmetryDeclaration {
  readonly generators: readonly GeneratorDeclaration[];
  readonly groups: readonly GroupDeclaration[];
  readonly timeReversal: boolean;
}

/** What the symmetry may refer to. */
export interface PhaseNames {
  readonly coordinates: readonly string[];
  readonly momenta: readonly string[];
  /** Whether the model has points that a group can move. */
  readonly points: boolean;
}

function permutationOf(node: YamlNode, n: number): number[] {
  const expected = `the numbers 1 to ${n} (coordinates) or 1 to ${2 * n} (coordinates, momenta) in some order`;
  const list = asList(node, expected).items;
  const numbers = list.map((item) => integerOf(item, 1));
  if (numbers.length !== n && numbers.length !== 2 * n) throw refuse(node, `${node.key} has ${numbers.length} entries`, expected);
  numbers.forEach((value, k) => {
    if (value > numbers.length) throw refuse(list[k]!, `${value} exceeds the length of ${node.key}`, expected);
    if (numbers.indexOf(value) !== k) throw refuse(list[k]!, `${value} stands twice in ${node.key}`, expected);
  });
  return numbers;
}

function generatorOf(node: YamlNode, number: number, phase: PhaseNames): GeneratorDeclaration {
  const map = asMap(node, 'a generator such as {name: r, map: {q1: q2, q2: q1}}');
  assertKeys(map, ['name', 'reversing', 'map', 'matrix', 'permutation']);
  const n = phase.coordinates.length;
  const get = (key: string): YamlNode | undefined => map.entries.get(key);
  const forms = ['map', 'matrix', 'permutation'].filter((key) => map.entries.has(key));
  if (forms.length > 1)
    throw refuse(node, `${node.key} gives ${forms.join(' and ')}`, 'one of map, matrix, permutation', 'keep one of them');
  const named = get('name');
  const reversed = get('reversing');
  const reversing = reversed === undefined ? undefined : booleanOf(reversed);
  if (forms.length === 0 && reversing !== true) {
    throw refuse(
      node,
      `${node.key} says nothing: it has no map and does not reverse time`,
      'map, matrix or permutation, or reversing: true',
      'add a map',
    );
  }
  const [typed, matrix, permutation] = [get('map'), get('matrix'), get('permutation')];
  const known = { names: [...phase.coordinates, ...phase.momenta], kind: 'a coordinate or momentum' };
  return {
    name: named === undefined ? `g${number}` : asText(named, 'a name').text,
    where: node.key,
    ...(reversing === undefined ? {} : { reversing }),
    ...(typed === undefined ? {} : { map: expressionMap(typed, 'coordinates', known) }),
    ...(matrix === undefined ? {} : { matrix: squareTableOf(matrix, [n, 2 * n], 'the coordinates, or coordinates and momenta') }),
    ...(permutation === undefined ? {} : { permutation: permutationOf(permutation, n) }),
  };
}

function sitesOf(map: YamlMap, node: YamlNode, phase: PhaseNames): readonly SiteDeclaration[] | 'points' {
  if (node.kind === 'text' && node.text === 'points') {
    if (!phase.points)
      throw refuse(node, 'There are no points to act on', 'a list of coordinates; points belong to network', 'write on: [[q1, q2]]');
    return 'points';
  }
  const expected = 'lists of coordinates, [[q1, q2, q3]], or points';
  const list = asList(node, expected);
  const nested = list.items.length > 0 && list.items.every((item) => item.kind === 'list');
  const known = [...phase.coordinates, ...phase.momenta];
  const lists = (nested ? list.items : [list]).map((item) => {
    const names = namesOf(item);
    if (names.length === 0) throw refuse(item, `${item.key} is empty`, expected);
    for (const name of names) {
      if (!known.includes(name))
        throw refuse(
          item,
          `${name} is not a coordinate or momentum.${didYouMean(name, known)}`,
          `names among ${listed(known)}`,
          'correct the name',
        );
    }
    return names;
  });
  const actions = map.entries.get('action');
  if (actions === undefined) return lists.map((on) => ({ on }));
  if (actions.kind !== 'list') {
    const action = asText(actions, 'the name of an action').text;
    return lists.map((on) => ({ action, on }));
  }
  if (actions.items.length !== lists.length) {
    throw refuse(
      actions,
      `${actions.key} names ${actions.items.length} actions for ${lists.length} lists`,
      'one action, or one for each list of on',
    );
  }
  return lists.map((on, k) => ({ action: asText(actions.items[k]!, 'the name of an action').text, on }));
}

function groupOf(map: YamlMap, phase: PhaseNames): GroupDeclaration | undefined {
  const node = map.entries.get('group');
  const on = map.entries.get('on');
  if (node === undefined) {
    for (const key of ['action', 'on', 'reversing']) {
      const stray = map.entries.get(key);
      if (stray !== undefined)
        throw refuse(stray, `${stray.key} is given without a group`, 'group beside it', 'add group: dihedral:3 or the like');
    }
    return undefined;
  }
  const group = asText(node, 'the name of a group or a group file').text;
  if (on === undefined && !phase.points)
    throw refuse(map, `${map.key} names a group but not what it acts on`, 'on: [[q1, q2, q3]]', 'add on');
  const sites = on === undefined ? 'points' : sitesOf(map, on, phase);
  const action = map.entries.get('action');
  const reversing = map.entries.get('reversing');
  return {
    group,
    on: sites,
    ...(sites === 'points' && action !== undefined ? { action: asText(action, 'the name of an action').text } : {}),
    reversing:
      reversing === undefined
        ? []
        : reversing.kind === 'text'
          ? [asText(reversing, 'a generator name').text]
          : asList(reversing, 'generator names').items.map((item) => asText(item, 'a generator name').text),
    where: map.key,
  };
}

/** Reads the key `symmetry`, one mapping or a list of them. Throws InputError. */
export function symmetryOf(node: YamlNode, phase: PhaseNames): SymmetryDeclaration {
  const generators: GeneratorDeclaration[] = [];
  const groups: GroupDeclaration[] = [];
  let timeReversal = false;
  for (const part of node.kind === 'list' ? node.items : [node]) {
    const map = asMap(part, 'a mapping with generators or group');
    assertKeys(map, ['generators', 'group', 'action', 'on', 'reversing', 'timeReversal']);
    const typed = map.entries.get('generators');
    if (typed !== undefined) {
      for (const item of asList(typed, 'a list of generators').items) {
        const generator = generatorOf(item, generators.length + 1, phase);
        if (generators.some(({ name }) => name === generator.name))
          throw refuse(item, `Two generators are called ${generator.name}`, 'different names', 'rename one');
        generators.push(generator);
      }
    }
    const group = groupOf(map, phase);
    if (group !== undefined) groups.push(group);
    const reversal = map.entries.get('timeReversal');
    if (reversal !== undefined && booleanOf(reversal)) timeReversal = true;
  }
  return { generators, groups, timeReversal };
}
