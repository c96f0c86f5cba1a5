/** JSON that a person can read: what fits on a line stays on one. */

/** Longest line of a list or object that is not broken. */
const LINE = 100;

/**
 * The value as JSON, broken where a line would be longer than LINE. Throws where the value holds what JSON
 * cannot say (NaN, an infinity, a bigint): those must have been turned into text before.
 */
export function readableJson(value: unknown): string {
  return render(plain(value, 'result'), '').text;
}

export type Plain = null | boolean | number | string | Plain[] | { [key: string]: Plain };

/** The value without undefined members, as JSON has it. Throws, naming the path, where it holds what JSON cannot say. */
export function plain(value: unknown, path: string): Plain {
  if (value === null || typeof value === 'boolean' || typeof value === 'string') return value;
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new Error(`${path} is ${value}, which JSON cannot say`);
    return value === 0 ? 0 : value;
  }
  if (Array.isArray(value)) return value.map((item, index) => plain(item, `${path}[${index}]`));
  if (typeof value === 'object') {
    const entries = Object.entries(value).filter(([, member]) => member !== undefined);
    return Object.fromEntries(entries.map(([key, member]) => [key, plain(member, `${path}.${key}`)]));
  }
  throw new Error(`${path} is a ${typeof value}, which JSON cannot say`);
}

interface Rendered {
  readonly text: string;
  /** Whether it stands on one line. */
  readonly flat: boolean;
}

function render(value: Plain, indent: string): Rendered {
  if (value === null || typeof value !== 'object') return { text: JSON.stringify(value), flat: true };
  const inner = `${indent}  `;
  const [open, close] = Array.isArray(value) ? ['[', ']'] : ['{', '}'];
  const parts = Array.isArray(value)
    ? value.map((item) => render(item, inner))
    : Object.entries(value).map(([key, member]) => {
        const { text, flat } = render(member, inner);
        return { text: `${JSON.stringify(key)}: ${text}`, flat };
      });
  const pad = Array.isArray(value) || parts.length === 0 ? '' : ' ';
  if (parts.every(({ flat }) => flat)) {
    const line = `${open}${pad}${parts.map(({ text }) => text).join(', ')}${pad}${close}`;
    if (indent.length + line.length <= LINE) return { text: line, flat: true };
  }
  return { text: `${open}\n${parts.map(({ text }) => inner + text).join(',\n')}\n${indent}${close}`, flat: false };
}
