/** Linear coordinates adapted to the leading form of a germ modulo p: few variables, or a multiple line on an axis. */
import { PrimeField } from '../field/index.ts';
import { modularEchelon } from '../linear/index.ts';
import { UnivariateRing } from '../polynomial/index.ts';
import type { ModularPolynomial } from './coinvariants.ts';
import { derivativeOf, orderOf } from './tangent.ts';

/**
 * Rows: new coordinates as forms in the old ones. In the plane the first coordinate vanishes on the line of highest multiplicity of
 * the leading form; in more variables the first coordinates span the forms that the leading form depends on. Undefined where nothing
 * is gained or the line is not defined modulo p.
 */
export function adaptedCoordinates(h: ModularPolynomial, n: number, p: number): Int32Array | undefined {
  const d = orderOf(h);
  const leading = new Map([...h].filter(([m]) => m.length === d));
  const forms = n === 2 ? multipleLine(leading, d, p) : essentialForms(leading, n, d, p);
  if (forms === undefined || forms.length === 0 || forms.length === n) return undefined;
  const data = new Int32Array((forms.length + n) * n);
  forms.forEach((f, i) => {
    data.set(f, i * n);
  });
  // complete by coordinates: pivots of the echelon form are the coordinates to leave out
  const { pivots } = modularEchelon({ p, rows: forms.length, cols: n, data: data.slice(0, forms.length * n) });
  const rest = Array.from({ length: n }, (_, j) => j).filter((j) => !pivots.includes(j));
  const out = new Int32Array(n * n);
  forms.forEach((f, i) => {
    out.set(f, i * n);
  });
  rest.forEach((j, k) => {
    out[(forms.length + k) * n + j] = 1;
  });
  return out;
}

function multipleLine(leading: ModularPolynomial, d: number, p: number): Int32Array[] | undefined {
  const ring = new UnivariateRing(new PrimeField(p));
  const dense = new Array<number>(d + 1).fill(0);
  for (const [m, c] of leading) dense[m.lastIndexOf('\u0000') + 1] = c;
  const f = ring.trim(dense);
  const atInfinity = d - ring.degree(f);
  const factors = ring.squareFree(f).filter((s) => s.multiplicity > 1 && s.factor.length === 2);
  const best = factors.reduce((s, x) => Math.max(s, x.multiplicity), 1);
  if (atInfinity > best) return [Int32Array.from([0, 1])];
  const line = factors.find((s) => s.multiplicity === best);
  // x + c y for the factor t + c
  return line === undefined ? undefined : [Int32Array.from([1, line.factor[0]!])];
}

function essentialForms(leading: ModularPolynomial, n: number, d: number, p: number): Int32Array[] {
  let layer: ModularPolynomial[] = [leading];
  for (let k = 0; k < d - 1; k++) {
    const next = new Map<string, ModularPolynomial>();
    for (const f of layer)
      for (let i = 0; i < n; i++) {
        const g = derivativeOf(f, i, p);
        if (g.size > 0)
          next.set(
            [...g]
              .map(([m, c]) => `${m}:${c}`)
              .sort()
              .join(' '),
            g,
          );
      }
    layer = [...next.values()];
  }
  const data = new Int32Array(layer.length * n);
  layer.forEach((f, r) => {
    for (const [m, c] of f) data[r * n + m.charCodeAt(0)] = c;
  });
  const { matrix } = modularEchelon({ p, rows: layer.length, cols: n, data });
  return Array.from({ length: matrix.rows }, (_, i) => matrix.data.slice(i * n, (i + 1) * n));
}
