/**
 * Inertia without reducing a form to squares: all roots of the characteristic polynomial of a symmetric matrix are
 * real, so Descartes' rule of signs counts them exactly. The polynomial comes from traces of powers (U. Le Verrier's
 * method in the form of D. K. Faddeev; from memory), where no pivot is ever chosen.
 */
import type { Algebraic, RealField } from '../field/index.ts';
import { add, type Inertia, identity, type Matrix, multiply, scale, trace, zeroMatrix } from '../linear/index.ts';

/** Coefficients of det(x − a), from the constant term up. */
export function characteristicPolynomial(a: Matrix<Algebraic>, field: RealField): Algebraic[] {
  const n = a.rows;
  const c = new Array<Algebraic>(n + 1).fill(field.zero);
  c[n] = field.one;
  let m = zeroMatrix<Algebraic>(field, n, n);
  for (let k = 1; k <= n; k++) {
    m = add(multiply(a, m), scale(identity<Algebraic>(field, n), c[n - k + 1]!));
    c[n - k] = field.mul(field.fromRational(-1n, BigInt(k)), trace(multiply(a, m)));
  }
  return c;
}

function changes(signs: readonly number[]): number {
  const kept = signs.filter((s) => s !== 0);
  return kept.slice(1).filter((s, i) => s !== kept[i]).length;
}

/** Numbers of positive, zero and negative eigenvalues of a symmetric matrix. */
export function inertiaByDescartes(a: Matrix<Algebraic>, field: RealField): Inertia {
  if (a.rows === 0) return { positive: 0, zero: 0, negative: 0 };
  const signs = characteristicPolynomial(a, field).map((x) => field.sign(x));
  const zero = signs.findIndex((s) => s !== 0);
  return { zero, positive: changes(signs), negative: changes(signs.map((s, i) => (i % 2 === 0 ? s : -s))) };
}
