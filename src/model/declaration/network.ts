/** Point masses joined by central springs at rest length: the key `network` of a model file. */
import type { EnergyDeclaration } from './declaration.ts';
import { asList, asMap, assertKeys, asText, expressionOf } from './keys.ts';
import { didYouMean, listed } from './nearest.ts';
import { refuse, type YamlMap, type YamlNode } from './yaml-reader.ts';

type Network = EnergyDeclaration & { kind: 'network' };

function required(map: YamlMap, key: string): YamlNode {
  const node = map.entries.get(key);
  if (node === undefined) throw refuse(map, `${map.key} lacks ${key}`, 'points, masses and bonds', `add ${key}`);
  return node;
}

function pointsOf(node: YamlNode): Map<string, string[]> {
  const map = asMap(node, 'a mapping from point names to positions, {a: [0, 0, 1]}');
  const points = new Map<string, string[]>();
  let dimension: number | undefined;
  for (const [name, value] of map.entries) {
    const position = asList(value, 'a position such as [0, 0, 1]').items.map(expressionOf);
    if (position.length < 1 || position.length > 3)
      throw refuse(value, `The position of ${name} has ${position.length} entries`, 'one, two or three entries');
    dimension ??= position.length;
    if (position.length !== dimension)
      throw refuse(value, `The position of ${name} has ${position.length} entries, others have ${dimension}`, `${dimension} entries`);
    points.set(name, position);
  }
  if (points.size === 0) throw refuse(node, `${node.key} is empty`, 'at least one point');
  return points;
}

function massesOf(node: YamlNode, points: ReadonlyMap<string, unknown>): Map<string, string> {
  // One text is the mass of every point.
  if (node.kind === 'text') return new Map([...points.keys()].map((name) => [name, expressionOf(node)]));
  const map = asMap(node, 'one mass for all points, or a mapping {a: 1, b: 2}');
  const masses = new Map<string, string>();
  for (const [name, value] of map.entries) {
    if (!points.has(name))
      throw refuse(
        value,
        `There is no point ${name}.${didYouMean(name, points.keys())}`,
        `one of ${listed(points.keys())}`,
        'correct the name',
      );
    masses.set(name, expressionOf(value));
  }
  for (const name of points.keys())
    if (!masses.has(name)) throw refuse(node, `The point ${name} has no mass`, 'a mass for every point', `add ${name}: 1`);
  return masses;
}

function bondsOf(node: YamlNode, points: ReadonlyMap<string, unknown>): Network['bonds'] {
  const seen = new Map<string, number>();
  return asList(node, 'a list of bonds [a, b, stiffness]').items.map((item) => {
    const triple = asList(item, 'a bond [a, b, stiffness]').items;
    if (triple.length !== 3) throw refuse(item, `${item.key} has ${triple.length} entries`, 'two points and a stiffness, [a, b, 1]');
    const [from, to] = triple.slice(0, 2).map((end) => {
      const name = asText(end, 'the name of a point').text;
      if (!points.has(name))
        throw refuse(
          end,
          `There is no point ${name}.${didYouMean(name, points.keys())}`,
          `one of ${listed(points.keys())}`,
          'correct the name',
        );
      return name;
    }) as [string, string];
    if (from === to) throw refuse(item, `${item.key} joins ${from} to itself`, 'two different points');
    const pair = [from, to].sort().join('\n');
    if (seen.has(pair))
      throw refuse(
        item,
        `${from} and ${to} are joined twice, by bonds ${seen.get(pair)} and here`,
        'each pair once',
        'add the stiffnesses',
      );
    seen.set(pair, item.line);
    return { from, to, stiffness: expressionOf(triple[2]!), where: item.key };
  });
}

/** Reads the key `network`. Throws InputError. */
export function networkOf(node: YamlNode): Network {
  const map = asMap(node, 'a mapping with points, masses and bonds');
  assertKeys(map, ['points', 'masses', 'bonds']);
  const points = pointsOf(required(map, 'points'));
  const masses = massesOf(required(map, 'masses'), points);
  const bonds = bondsOf(required(map, 'bonds'), points);
  return { kind: 'network', dimension: points.values().next().value!.length, points, masses, bonds };
}
