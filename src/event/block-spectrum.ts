/**
 * Eigenvalues of L on one multiplicity space in doubles, without a library of linear algebra: by a symmetric problem where S is definite,
 * else from the exact characteristic polynomial in y = λ², whose square-free factors carry the multiplicities.
 */
import type { Algebraic, RealField } from '../field/index.ts';
import {
  inertia,
  type NumberMatrix,
  numberBuild,
  numberCombine,
  numberIdentity,
  numberMultiply,
  numberSolve,
  symmetricEigenvalues,
  toNumberMatrix,
} from '../linear/index.ts';
import { RealRoots, UnivariateRing } from '../polynomial/index.ts';
import { characteristicPolynomial, nonzeroSquares } from './characteristic.ts';
import { type ComplexRoot, polynomialRoots } from './polynomial-roots.ts';
import type { BlockForms } from './zero-event.ts';

/** Indefinite blocks on larger multiplicity spaces have no spectrum here. */
export const SPECTRUM_BLOCK_LIMIT = 60;

/** A root y = λ² of a block: multiplicity of λ on the multiplicity space; `krein` the sign of S on an imaginary eigenplane, where it has one. */
export interface SquareRoot {
  readonly y: ComplexRoot;
  readonly multiplicity: number;
  readonly krein: 1 | -1 | undefined;
}

/** Lower triangular c with c cᵀ = s, for positive definite s. */
function cholesky(s: NumberMatrix): NumberMatrix {
  const n = s.rows;
  const c = new Float64Array(n * n);
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      let x = s.data[i * n + j]!;
      for (let k = 0; k < j; k++) x -= c[i * n + k]! * c[j * n + k]!;
      c[i * n + j] = i === j ? Math.sqrt(Math.max(x, Number.MIN_VALUE)) : x / c[j * n + j]!;
    }
  return { rows: n, cols: n, data: c };
}

/** S = C Cᵀ positive definite: L is similar to the skew matrix CᵀJC, whose square has the eigenvalues y, each twice. */
function definiteRoots(s: NumberMatrix, w: NumberMatrix, sign: 1 | -1): SquareRoot[] {
  const n = s.rows;
  const c = cholesky(sign === 1 ? s : { ...s, data: s.data.map((x) => -x) });
  const transposed = numberBuild(n, n, (i, j) => c.data[j * n + i]!);
  const form = numberBuild(n, n, (i, j) => w.data[j * n + i]!);
  const skew = numberMultiply(transposed, numberSolve(form, c));
  const values = symmetricEigenvalues(numberMultiply(skew, skew));
  const out: { y: number; multiplicity: number }[] = [];
  for (let i = 0; i < n; i += 2) {
    const y = (values[i]! + values[i + 1]!) / 2;
    const last = out.at(-1);
    if (last !== undefined && Math.abs(last.y - y) <= 1e-10 * Math.abs(y)) last.multiplicity++;
    else out.push({ y, multiplicity: 1 });
  }
  return out.map(({ y, multiplicity }) => ({ y: { re: y, im: 0 }, multiplicity, krein: sign }));
}

/** Sign of S on the eigenspace of a simple negative y, by inverse iteration with L². */
function signAt(s: NumberMatrix, l: NumberMatrix, y: number): 1 | -1 | undefined {
  const n = s.rows;
  const square = numberMultiply(l, l);
  const shifted = numberCombine(square, numberIdentity(n), -y * (1 + 1e-11));
  let v = numberBuild(n, 1, (i) => Math.cos(1 + i * i));
  for (let k = 0; k < 3; k++) {
    let next: NumberMatrix;
    try {
      next = numberSolve(shifted, v);
    } catch (error) {
      if (error instanceof RangeError) return undefined;
      throw error;
    }
    const length = Math.sqrt(next.data.reduce((t, x) => t + x * x, 0));
    if (!(length > 0 && length < Infinity)) return undefined;
    v = { ...next, data: next.data.map((x) => x / length) };
  }
  const sv = numberMultiply(s, v);
  const value = v.data.reduce((t, x, i) => t + x * sv.data[i]!, 0);
  return value > 0 ? 1 : value < 0 ? -1 : undefined;
}

/** The roots off zero of one block; undefined where the block is too large. */
export function blockRoots(b: BlockForms, field: RealField): SquareRoot[] | undefined {
  const n = b.s.rows;
  if (n === 0) return [];
  const i = inertia(b.s, field);
  const s = toNumberMatrix(b.s, field);
  if (i.positive === n || i.negative === n) return definiteRoots(s, toNumberMatrix(b.w, field), i.positive === n ? 1 : -1);
  if (n > SPECTRUM_BLOCK_LIMIT) return undefined;
  const ring = new UnivariateRing<Algebraic>(field);
  const sturm = new RealRoots<Algebraic>(field);
  const l = toNumberMatrix(b.l, field);
  return ring.squareFree(nonzeroSquares(characteristicPolynomial(b.l), (x) => field.isZero(x))).flatMap(({ factor, multiplicity }) =>
    polynomialRoots(
      factor.map((c) => field.toNumber(c)),
      factor.length === 2 ? 1 : sturm.count(factor),
    )
      .filter((y) => y.im >= 0)
      .map((y) => ({ y, multiplicity, krein: y.im === 0 && y.re < 0 ? signAt(s, l, y.re) : undefined })),
  );
}
