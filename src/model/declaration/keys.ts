/** Small readers of tree nodes that the model file is made of; each throws InputError naming file, key, value, expectation. */
import { didYouMean, listed } from './nearest.ts';
import { refuse, type YamlList, type YamlMap, type YamlNode, type YamlText } from './yaml-reader.ts';

/** A name: a letter or underscore, then letters, digits, underscores. */
const NAME = /^[\p{L}_][\p{L}\p{M}\p{N}_]*$/u;

export function isName(text: string): boolean {
  return NAME.test(text) && text !== 'pi';
}

export function asText(node: YamlNode, expected: string): YamlText {
  if (node.kind !== 'text') throw refuse(node, `${node.key} must be ${expected}`, expected);
  if (node.text === '') throw refuse(node, `${node.key} is empty`, expected, 'give a value or remove the key');
  return node;
}

export function asList(node: YamlNode, expected: string): YamlList {
  if (node.kind !== 'list') throw refuse(node, `${node.key} must be ${expected}`, expected);
  return node;
}

export function asMap(node: YamlNode, expected: string): YamlMap {
  if (node.kind !== 'map') throw refuse(node, `${node.key === '' ? 'The file' : node.key} must be ${expected}`, expected);
  return node;
}

/** An expression: any text that is not empty; its grammar is checked where it is parsed. */
export function expressionOf(node: YamlNode): string {
  return asText(node, 'an expression').text;
}

export function booleanOf(node: YamlNode): boolean {
  const { text } = asText(node, 'true or false');
  if (/^(true|True|TRUE)$/.test(text)) return true;
  if (/^(false|False|FALSE)$/.test(text)) return false;
  throw refuse(node, `${node.key} must be true or false`, 'true or false', 'write true or false');
}

export function integerOf(node: YamlNode, least: number): number {
  const { text } = asText(node, `an integer not below ${least}`);
  if (!/^[+-]?\d{1,9}$/.test(text) || Number(text) < least)
    throw refuse(node, `${node.key} must be an integer not below ${least}`, `an integer not below ${least}`);
  return Number(text);
}

export function nameOf(node: YamlNode): string {
  const { text } = asText(node, 'a name');
  assertName(node, text);
  return text;
}

export function assertName(node: YamlNode, name: string): void {
  if (name === 'pi') throw refuse(node, 'pi is the number pi and cannot be a name', 'another name', 'rename it');
  if (!isName(name))
    throw refuse(node, `${name} is not a name`, 'a letter or underscore, then letters, digits or underscores', 'rename it');
}

/** A list of names, or one name alone; no name twice. */
export function namesOf(node: YamlNode, expected = 'a list of names such as [q1, q2]'): string[] {
  if (node.kind === 'text' && isName(node.text)) return [node.text];
  if (node.kind === 'text' && node.text !== '')
    throw refuse(node, `${node.key} must be ${expected}`, expected, 'write the names in brackets');
  const names = asList(node, expected).items.map(nameOf);
  asList(node, expected).items.forEach((item, k) => {
    if (names.indexOf(names[k]!) !== k) throw refuse(item, `${names[k]} is listed twice in ${node.key}`, 'each name once');
  });
  return names;
}

/** Refuses keys that are not known, naming the nearest known one. */
export function assertKeys(map: YamlMap, known: readonly string[]): void {
  for (const [key, node] of map.entries) {
    if (known.includes(key)) continue;
    const where = map.key === '' ? 'a model file' : map.key;
    throw refuse(node, `${where} has no key ${key}.${didYouMean(key, known)}`, `one of ${listed(known)}`, 'correct or remove the key');
  }
}

/** A mapping from names to expressions; every name must be among `known`, when given. */
export function expressionMap(
  node: YamlNode,
  what: string,
  known?: { readonly names: readonly string[]; readonly kind: string },
): Map<string, string> {
  const map = asMap(node, `a mapping from ${what} to expressions`);
  const result = new Map<string, string>();
  for (const [name, value] of map.entries) {
    assertName(value, name);
    if (known !== undefined && !known.names.includes(name)) {
      throw refuse(
        value,
        `${name} is not ${known.kind}.${didYouMean(name, known.names)}`,
        `one of ${listed(known.names)}`,
        'correct the name',
      );
    }
    result.set(name, expressionOf(value));
  }
  return result;
}

/** A table of expressions, rows of one length, at least one row. */
export function tableOf(node: YamlNode): string[][] {
  const expected = 'a matrix as a list of rows, [[1, 0], [0, 1]]';
  const rows = asList(node, expected).items.map((row) => asList(row, 'a row of expressions').items.map(expressionOf));
  if (rows.length === 0 || rows[0]!.length === 0) throw refuse(node, `${node.key} has no entries`, expected);
  rows.forEach((row, k) => {
    if (row.length !== rows[0]!.length) {
      const item = asList(node, expected).items[k]!;
      throw refuse(
        item,
        `Row ${k + 1} of ${node.key} has ${row.length} entries and the first has ${rows[0]!.length}`,
        `${rows[0]!.length} entries`,
      );
    }
  });
  return rows;
}

/** A square table of one of the given sizes. */
export function squareTableOf(node: YamlNode, sizes: readonly number[], why: string): string[][] {
  const table = tableOf(node);
  const [rows, cols] = [table.length, table[0]!.length];
  if (rows !== cols || !sizes.includes(rows)) {
    const wanted = sizes.map((size) => `${size} × ${size}`).join(' or ');
    throw refuse(node, `${node.key} is ${rows} × ${cols}`, `${wanted} (${why})`, 'correct the matrix');
  }
  return table;
}
