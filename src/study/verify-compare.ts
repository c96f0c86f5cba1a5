/** Two JSON values leaf by leaf: what differs, and where. */
import type { Encoded } from './certificate.ts';

export interface Difference {
  readonly key: string;
  readonly expected: string;
  readonly found: string;
}

const shown = (value: unknown): string => (value === undefined ? 'nothing' : typeof value === 'string' ? value : JSON.stringify(value));

/** Compares a file with what it should be; numbers may differ by a relative tolerance where neither is an integer. */
export function differences(
  found: unknown,
  expected: Encoded | undefined,
  tolerance: number,
): { readonly differences: readonly Difference[]; readonly compared: number } {
  const out: Difference[] = [];
  let compared = 0;
  const differ = (key: string, a: unknown, b: unknown) =>
    out.push({ key: key === '' ? 'result' : key, expected: shown(b), found: shown(a) });
  const walk = (key: string, a: unknown, b: unknown): void => {
    const object = (x: unknown): x is Record<string, unknown> => typeof x === 'object' && x !== null && !Array.isArray(x);
    if (Array.isArray(a) && Array.isArray(b)) {
      if (a.length !== b.length) differ(`${key}.length`, a.length, b.length);
      for (let i = 0; i < Math.min(a.length, b.length); i++) walk(`${key}[${i}]`, a[i], b[i]);
    } else if (object(a) && object(b)) {
      for (const name of new Set([...Object.keys(a), ...Object.keys(b)])) walk(key === '' ? name : `${key}.${name}`, a[name], b[name]);
    } else {
      compared++;
      if (a === b) return;
      const close =
        tolerance > 0 &&
        typeof a === 'number' &&
        typeof b === 'number' &&
        !(Number.isInteger(a) && Number.isInteger(b)) &&
        Math.abs(a - b) <= tolerance * Math.max(Math.abs(a), Math.abs(b));
      if (!close) differ(key, a, b);
    }
  };
  walk('', found, expected);
  return { differences: out, compared };
}
