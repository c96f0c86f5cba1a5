/** Dense univariate polynomials modulo a prime: index = exponent, no trailing zero, [] is zero. */
import { addRowInPlace, invMod, mulMod } from '../field/index.ts';

/** Without trailing zeros. */
function trimmed(a: Int32Array): Int32Array {
  let n = a.length;
  while (n > 0 && a[n - 1] === 0) n--;
  return n === a.length ? a : a.slice(0, n);
}

/** a mod b; b nonzero. */
export function remainderModular(a: Int32Array, b: Int32Array, p: number): Int32Array {
  const r = a.slice();
  const n = b.length;
  const inverse = invMod(b[n - 1]!, p);
  const joined = new Int32Array(r.length + n);
  joined.set(r);
  joined.set(b, r.length);
  for (let d = r.length - n; d >= 0; d--) {
    const top = joined[d + n - 1]!;
    if (top === 0) continue;
    const g = p - mulMod(top, inverse, p);
    // row at offset d gets g times b
    addRowInPlace(joined, d, r.length, 0, n, g === p ? 0 : g, p);
  }
  return trimmed(joined.slice(0, Math.min(r.length, n - 1)));
}

/** Monic greatest common divisor. */
export function gcdModular(a: Int32Array, b: Int32Array, p: number): Int32Array {
  let x = trimmed(a);
  let y = trimmed(b);
  while (y.length > 0) [x, y] = [y, remainderModular(x, y, p)];
  if (x.length === 0) return x;
  const inverse = invMod(x.at(-1)!, p);
  return x.map((c) => mulMod(c, inverse, p));
}
