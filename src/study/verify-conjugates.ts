/** Subgroups given by words in the generators, as matrices modulo a prime, and the number of their conjugates. */
import { type ModularMatrix, modularEchelon, modularMultiply } from '../linear/index.ts';
import { orbitOf, type SignedMatrix } from './verify-modular.ts';

/** w⁻¹ s modulo p for n × n matrices. */
export function solveModular(w: ModularMatrix, s: ModularMatrix): ModularMatrix {
  // rows of [w | s] reduced: w⁻¹ s
  const n = w.rows;
  const data = new Int32Array(n * 2 * n);
  for (let i = 0; i < n; i++) {
    data.set(w.data.subarray(i * n, (i + 1) * n), i * 2 * n);
    data.set(s.data.subarray(i * n, (i + 1) * n), i * 2 * n + n);
  }
  const { matrix } = modularEchelon({ p: w.p, rows: n, cols: 2 * n, data });
  const out = new Int32Array(n * n);
  for (let i = 0; i < n; i++) out.set(matrix.data.subarray(i * 2 * n + n, (i + 1) * 2 * n), i * n);
  return { p: w.p, rows: n, cols: n, data: out };
}

/** `r^2 s`: the rightmost letter acts first. */
export function wordMatrix(
  word: string,
  named: ReadonlyMap<string, SignedMatrix>,
  n: number,
  p: number,
  order: number,
): SignedMatrix | undefined {
  let matrix: ModularMatrix = { p, rows: n, cols: n, data: Int32Array.from({ length: n * n }, (_, i) => (i % (n + 1) === 0 ? 1 : 0)) };
  let sign: 1 | -1 = 1;
  if (word === '1') return { matrix, sign };
  for (const letter of word.split(' ')) {
    const [name, power = '1'] = letter.split('^');
    const g = named.get(name!);
    if (g === undefined || !/^\d{1,6}$/.test(power) || Number(power) > order) return undefined;
    for (let k = Number(power); k > 0; k--) {
      matrix = modularMultiply(matrix, g.matrix);
      sign = (sign * g.sign) as 1 | -1;
    }
  }
  return { matrix, sign };
}

/** Number of conjugates of a subgroup: orbits of the vector under the conjugates, told apart by their sorted images. */
export function conjugatesOf(own: readonly SignedMatrix[], order: number, generators: readonly SignedMatrix[], vector: Int32Array): number {
  const keyOf = (h: readonly SignedMatrix[]) =>
    orbitOf(h, vector, order + 1)
      ?.keys.slice()
      .sort()
      .join(';') ?? '';
  const seen = new Map([[keyOf(own), own]]);
  const open = [own];
  for (let h = open.pop(); h !== undefined; h = open.pop())
    for (const g of generators) {
      const inverse = inverseOf(g.matrix);
      const moved = h.map((x) => ({ matrix: modularMultiply(g.matrix, modularMultiply(x.matrix, inverse)), sign: x.sign }));
      const key = keyOf(moved);
      if (seen.has(key)) continue;
      seen.set(key, moved);
      open.push(moved);
    }
  return seen.size;
}

function inverseOf(a: ModularMatrix): ModularMatrix {
  const n = a.rows;
  return solveModular(a, { p: a.p, rows: n, cols: n, data: Int32Array.from({ length: n * n }, (_, i) => (i % (n + 1) === 0 ? 1 : 0)) });
}
