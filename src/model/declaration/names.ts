/** Names in expressions, found lexically, and the pairing of coordinates with momenta by their endings. */
import { FUNCTION_NAMES } from '../expression/ast.ts';

const TOKEN = /(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?|([\p{L}_][\p{L}\p{M}\p{N}_]*)(\s*\()?/gu;

const FUNCTIONS: ReadonlySet<string> = new Set(FUNCTION_NAMES);

/** The names in an expression, `pi` and functions apart, in order of appearance. */
export function namesIn(text: string): Set<string> {
  const names = new Set<string>();
  for (const match of text.matchAll(TOKEN)) {
    const name = match[1];
    if (name === undefined || name === 'pi' || (match[2] !== undefined && FUNCTIONS.has(name))) continue;
    names.add(name);
  }
  return names;
}

/** Order in which q2 comes before q10: runs of digits compare as numbers. */
export function naturalOrder(a: string, b: string): number {
  const parts = (text: string): string[] => text.match(/\d+|\D+/g) ?? [];
  const [left, right] = [parts(a), parts(b)];
  for (let k = 0; k < Math.min(left.length, right.length); k++) {
    const [x, y] = [left[k]!, right[k]!];
    if (x === y) continue;
    if (/^\d/.test(x) && /^\d/.test(y)) {
      const [m, n] = [BigInt(x), BigInt(y)];
      if (m !== n) return m < n ? -1 : 1;
      return x.length - y.length;
    }
    return x < y ? -1 : 1;
  }
  return left.length - right.length;
}

/** Coordinates and momenta among names: q… and p… with equal endings are a pair, a missing partner is supplied. */
export function pairedNames(names: Iterable<string>): { coordinates: string[]; momenta: string[] } {
  const endings = new Set<string>();
  for (const name of names) if (/^[qp]/.test(name) && name !== 'pi') endings.add(name.slice(1));
  // The ending i would need the momentum pi, which is the number.
  endings.delete('i');
  const sorted = [...endings].sort(naturalOrder);
  return { coordinates: sorted.map((e) => `q${e}`), momenta: sorted.map((e) => `p${e}`) };
}

/** The momentum that belongs to a coordinate by its ending; undefined where the name does not begin with q. */
export function momentumOf(coordinate: string): string | undefined {
  return /^q/.test(coordinate) && coordinate !== 'qi' ? `p${coordinate.slice(1)}` : undefined;
}

/** The coordinates q1…qn and momenta p1…pn of models given by matrices. */
export function numberedNames(n: number): { coordinates: string[]; momenta: string[] } {
  const numbers = Array.from({ length: n }, (_, k) => String(k + 1));
  return { coordinates: numbers.map((k) => `q${k}`), momenta: numbers.map((k) => `p${k}`) };
}
