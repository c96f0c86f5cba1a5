/**
 * YAML 1.2 (and so JSON) to a tree of texts, lists and mappings that remembers file, key path and line.
 * The failsafe schema keeps every scalar as the text that was typed, so digits are never rounded
 * (O. Ben-Kiki, C. Evans, I. döt Net, YAML Ain't Markup Language, version 1.2, section 10.1).
 */
import { isAlias, isMap, isScalar, isSeq, LineCounter, type Node, parseDocument } from 'yaml';
import { InputError } from '../../errors/index.ts';

interface Place {
  readonly file: string;
  /** Path such as `symmetry.generators[1].map.q1`; places in lists count from 1. */
  readonly key: string;
  readonly line: number;
}
export interface YamlText extends Place {
  readonly kind: 'text';
  readonly text: string;
}
export interface YamlList extends Place {
  readonly kind: 'list';
  readonly items: readonly YamlNode[];
}
export interface YamlMap extends Place {
  readonly kind: 'map';
  readonly entries: ReadonlyMap<string, YamlNode>;
}
export type YamlNode = YamlText | YamlList | YamlMap;

/** Deepest nesting of lists and mappings; a model needs four or five. */
export const YAML_DEPTH = 64;
/** Most nodes that aliases may unfold to, over and above those written. */
export const ALIAS_NODES = 100_000;

const NEXT = 'see the model files in samples/ for the layout';

/** An InputError about one node, with its file, key, line and value. */
export function refuse(node: YamlNode, message: string, expected: string, next: string = NEXT): InputError {
  const value =
    node.kind === 'text' ? node.text : node.kind === 'list' ? `a list of ${node.items.length}` : `a mapping of ${node.entries.size}`;
  const shown = value.length > 200 ? `${value.slice(0, 200)}…` : value;
  return new InputError(`${message} (line ${node.line})`, {
    file: node.file,
    ...(node.key === '' ? {} : { key: node.key }),
    value: shown,
    expected,
    next,
  });
}

/** Line breaks and runs of blanks around them become one blank. */
function flat(text: string): string {
  return text.replace(/[ \t]*[\r\n\u0085\u2028\u2029]+[ \t]*/g, ' ').trim();
}

/** Most columns before the content of a line: the parser builds a pattern of that size and can run out of memory on it. */
const INDENT = 1000;

/** Brackets and indentation are bounded before parsing, so that a hostile text exhausts neither stack nor memory. */
function assertShallow(text: string, file: string): void {
  let depth = 0;
  let indent = 0;
  for (let k = 0; k < text.length; k++) {
    const c = text[k]!;
    if (c === '[' || c === '{') depth++;
    else if (c === ']' || c === '}') depth = Math.max(0, depth - 1);
    if (c === '\n' || c === '\r') indent = 0;
    else if (indent >= 0) indent = ' \t-?:'.includes(c) ? indent + 1 : -1;
    if (depth > 4 * YAML_DEPTH || indent > INDENT) {
      throw new InputError(`${file} is nested too deeply to be read.`, { file, expected: `nesting up to ${YAML_DEPTH}`, next: NEXT });
    }
  }
}

class Converter {
  private readonly file: string;
  private readonly lines: LineCounter;
  private readonly anchors = new Map<string, Node>();
  private aliased = 0;

  constructor(file: string, lines: LineCounter) {
    this.file = file;
    this.lines = lines;
  }

  private place(node: Node | null | undefined, key: string, line: number): Place {
    const offset = node?.range?.[0];
    return { file: this.file, key, line: offset === undefined ? line : this.lines.linePos(offset).line };
  }

  private wrong(place: Place, message: string, expected: string): InputError {
    return refuse({ ...place, kind: 'text', text: '' }, message, expected);
  }

  convert(node: unknown, key: string, line: number, depth: number, insideAlias: boolean): YamlNode {
    const given = node as Node | null;
    const place = this.place(given, key, line);
    if (depth > YAML_DEPTH)
      throw this.wrong(place, `Lists and mappings are nested deeper than ${YAML_DEPTH}`, `nesting up to ${YAML_DEPTH}`);
    if (insideAlias && ++this.aliased > ALIAS_NODES) {
      throw this.wrong(place, `Aliases unfold to more than ${ALIAS_NODES} entries`, 'a file without runaway aliases');
    }
    if (given === null || given === undefined) return { ...place, kind: 'text', text: '' };
    if (isAlias(given)) {
      const target = this.anchors.get(given.source);
      if (target === undefined)
        throw this.wrong(place, `The alias *${given.source} has no anchor before it`, `&${given.source} earlier in the file`);
      return this.convert(target, key, place.line, depth + 1, true);
    }
    if ('anchor' in given && typeof given.anchor === 'string') this.anchors.set(given.anchor, given);
    if (isScalar(given))
      return { ...place, kind: 'text', text: flat(given.value === null || given.value === undefined ? '' : String(given.value)) };
    if (isSeq(given)) {
      const items = given.items.map((item, k) => this.convert(item, `${key}[${k + 1}]`, place.line, depth + 1, insideAlias));
      return { ...place, kind: 'list', items };
    }
    if (!isMap(given)) throw this.wrong(place, 'This entry is none of text, list or mapping', 'text, a list or a mapping');
    const entries = new Map<string, YamlNode>();
    for (const pair of given.items) {
      if (!isScalar(pair.key))
        throw this.wrong(this.place(pair.key as Node | null, key, place.line), 'A key must be a plain name', 'a name before the colon');
      const name = flat(String(pair.key.value ?? ''));
      const at = this.place(pair.key, key === '' ? name : `${key}.${name}`, place.line);
      if (name === '') throw this.wrong(at, 'A key is empty', 'a name before the colon');
      if (entries.has(name)) throw this.wrong(at, `The key ${name} is written twice`, 'each key once');
      entries.set(name, this.convert(pair.value, at.key, at.line, depth + 1, insideAlias));
    }
    return { ...place, kind: 'map', entries };
  }
}

/**
 * Reads one YAML or JSON text. Throws InputError, with file and line, on syntax errors, several documents,
 * duplicate keys, tags, runaway aliases and nesting, and on an empty text.
 */
export function readYaml(text: string, file: string): YamlNode {
  if (text.trim() === '') throw new InputError(`${file} is empty.`, { file, expected: 'a model in YAML or JSON', next: NEXT });
  assertShallow(text, file);
  const lines = new LineCounter();
  const document = (() => {
    try {
      return parseDocument(text, {
        schema: 'failsafe',
        version: '1.2',
        uniqueKeys: true,
        lineCounter: lines,
        prettyErrors: false,
        logLevel: 'error',
      });
    } catch {
      throw new InputError(`${file} is nested too deeply to be read.`, { file, expected: `nesting up to ${YAML_DEPTH}`, next: NEXT });
    }
  })();
  const problem = document.errors[0] ?? document.warnings[0];
  if (problem !== undefined) {
    const { line, col } = lines.linePos(problem.pos[0]);
    const shown = text.split('\n')[line - 1]?.trim().slice(0, 120) ?? '';
    const what = problem.code === 'DUPLICATE_KEY' ? 'a key is written twice' : problem.message.replace(/\s+/g, ' ');
    throw new InputError(`${file} is not valid YAML at line ${line}, column ${col}: ${what}.`, {
      file,
      value: shown,
      expected: 'YAML 1.2 or JSON',
      next: NEXT,
    });
  }
  if (document.directives?.yaml.explicit === true && document.directives.yaml.version !== '1.2') {
    throw new InputError(`${file} asks for YAML ${document.directives.yaml.version}.`, {
      file,
      key: '%YAML',
      expected: 'YAML 1.2',
      next: 'remove the %YAML line',
    });
  }
  if (document.contents === null) throw new InputError(`${file} holds no data.`, { file, expected: 'a model in YAML or JSON', next: NEXT });
  return new Converter(file, lines).convert(document.contents, '', 1, 0, false);
}
