/**
 * All complex roots of a square-free polynomial in doubles, by simultaneous iteration (O. Aberth, Iteration methods for finding all
 * zeros of a polynomial simultaneously, 1973, from memory). Roots of real polynomials come as reals and exact conjugate pairs.
 */

export interface ComplexRoot {
  readonly re: number;
  readonly im: number;
}

/** Coefficients by exponent, the last one nonzero. `reals`: how many roots are known to be real (by Sturm's theorem), else by size. */
export function polynomialRoots(coefficients: readonly number[], reals?: number): ComplexRoot[] {
  const n = coefficients.length - 1;
  if (n <= 0) return [];
  if (n === 1) return [{ re: -coefficients[0]! / coefficients[1]!, im: 0 }];
  const top = coefficients[n]!;
  const a = coefficients.map((c) => c / top);
  // x = s z: roots of like size
  const s = Math.max(...a.slice(0, n).map((c, e) => Math.abs(c) ** (1 / (n - e)))) || 1;
  const b = a.map((c, e) => c / s ** (n - e));
  let z = Array.from({ length: n }, (_, k) => {
    const angle = (2 * Math.PI * (k + 0.37)) / n;
    return { re: 0.9 * Math.cos(angle), im: 0.9 * Math.sin(angle) };
  });
  const div = (x: ComplexRoot, y: ComplexRoot): ComplexRoot => {
    const d = y.re * y.re + y.im * y.im;
    return { re: (x.re * y.re + x.im * y.im) / d, im: (x.im * y.re - x.re * y.im) / d };
  };
  for (let round = 0; round < 200; round++) {
    let change = 0;
    z = z.map((x, k) => {
      let value: ComplexRoot = { re: 0, im: 0 };
      let slope: ComplexRoot = { re: 0, im: 0 };
      for (let e = n; e >= 0; e--) {
        slope = { re: slope.re * x.re - slope.im * x.im + value.re, im: slope.re * x.im + slope.im * x.re + value.im };
        value = { re: value.re * x.re - value.im * x.im + b[e]!, im: value.re * x.im + value.im * x.re };
      }
      if (value.re === 0 && value.im === 0) return x;
      if (slope.re === 0 && slope.im === 0) return { re: x.re + 1e-3, im: x.im + 1e-3 };
      const newton = div(value, slope);
      let repel: ComplexRoot = { re: 0, im: 0 };
      z.forEach((y, j) => {
        if (j === k || (x.re === y.re && x.im === y.im)) return;
        const r = div({ re: 1, im: 0 }, { re: x.re - y.re, im: x.im - y.im });
        repel = { re: repel.re + r.re, im: repel.im + r.im };
      });
      const down = { re: 1 - (newton.re * repel.re - newton.im * repel.im), im: -(newton.re * repel.im + newton.im * repel.re) };
      const step = div(newton, down);
      change = Math.max(change, Math.hypot(step.re, step.im) / Math.max(1e-3, Math.hypot(x.re, x.im)));
      return { re: x.re - step.re, im: x.im - step.im };
    });
    if (change < 1e-15) break;
  }
  const scaled = z.map((x) => ({ re: x.re * s, im: x.im * s })).sort((x, y) => Math.abs(x.im) - Math.abs(y.im));
  const count = reals ?? scaled.filter((x) => Math.abs(x.im) <= 1e-9 * Math.hypot(x.re, x.im)).length;
  const real = scaled.slice(0, count).map((x) => ({ re: x.re, im: 0 }));
  const rest = scaled.slice(count);
  const upper = rest.sort((x, y) => y.im - x.im).slice(0, rest.length / 2);
  return [...real.sort((x, y) => x.re - y.re), ...upper.flatMap((x) => [x, { re: x.re, im: -x.im }])];
}
