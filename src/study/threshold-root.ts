/** Isolating intervals of real roots: their middle, and bisection to any number of digits. */
import type { Algebraic, Rational } from '../field/index.ts';
import { rational, rationals } from '../field/index.ts';
import type { RealRoot, RealRoots, Univariate } from '../polynomial/index.ts';

/** The root of a square-free polynomial in its isolating interval, narrowed to 10^-digits. */
export function bisected(roots: RealRoots<Algebraic>, factor: Univariate<Algebraic>, root: RealRoot, digits: number): RealRoot {
  if (root.exact !== undefined) return root;
  const width = rational(1n, 10n ** BigInt(digits));
  let { low, high } = root;
  const right = roots.signAt(factor, high);
  while (rationals.compare(rationals.sub(high, low), width) > 0) {
    const mid = middle({ ...root, low, high });
    const sign = roots.signAt(factor, mid);
    if (sign === 0) return { ...root, low: mid, high: mid, exact: mid };
    if (sign === right) high = mid;
    else low = mid;
  }
  return { ...root, low, high };
}

export function middle(root: RealRoot): Rational {
  return root.exact ?? rational(root.low.n * root.high.d + root.high.n * root.low.d, 2n * root.low.d * root.high.d);
}
