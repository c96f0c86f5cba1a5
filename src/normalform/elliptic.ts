/**
 * Symplectic diagonalisation at an elliptic equilibrium; brackets are normalised where the root lies in the field: linear forms ζ = a + i b with
 * {ζ, H2} = -iω ζ and {ζ, ζ̄} = -2i c, c > 0, so that H2 = Σ ω |ζ|²/(2c); the sign of ω is that of the energy of the mode
 * (Krein's sign). (K. R. Meyer, G. R. Hall, D. Offin, Introduction to Hamiltonian Dynamical Systems and the N-Body Problem,
 * 2009; place from memory.)
 */
import { InputError } from '../errors/index.ts';
import { type Algebraic, type OrderedField, type Rational, RealField, rational, rationals, ratioToNumber } from '../field/index.ts';
import {
  apply,
  at,
  identity,
  inverse,
  kernel,
  type Matrix,
  mapMatrix,
  multiply,
  scale,
  add as sumOf,
  trace,
  transpose,
} from '../linear/index.ts';
import { doubles } from '../model/expression/constants.ts';
import { RealRoots } from '../polynomial/index.ts';

export interface Mode<T> {
  /** Signed frequency. */
  readonly frequency: T;
  readonly a: readonly T[];
  readonly b: readonly T[];
  /** {a, b}, positive. */
  readonly bracket: T;
}

export interface Diagonalisation<T> {
  readonly field: OrderedField<T>;
  readonly modes: readonly Mode<T>[];
}

/** A squared frequency: exactly if it is rational, and to the last digits of a double. */
interface Square {
  readonly exact: Rational | undefined;
  readonly value: number;
  readonly multiplicity: number;
}

/** Coefficients of det(s - m), constant term first (U. Le Verrier 1840, D. K. Faddeev). */
function characteristicPolynomial(m: Matrix<Algebraic>): Algebraic[] {
  const f = m.field;
  const n = m.rows;
  const out = new Array<Algebraic>(n + 1).fill(f.zero);
  out[n] = f.one;
  let power = identity(f, n);
  for (let k = 1; k <= n; k++) {
    const mp = multiply(m, power);
    out[n - k] = f.neg(f.div(trace(mp), f.fromInteger(k)));
    power = sumOf(mp, scale(identity(f, n), out[n - k]!));
  }
  return out;
}

/**
 * Squares of the frequencies of x' = L x. Throws InputError unless all eigenvalues are imaginary and not zero.
 */
function squares(l: Matrix<Algebraic>, field: RealField): Square[] {
  // det(s - L^2) is the square of the polynomial in s = -ω^2
  const minus = scale(multiply(l, l), field.fromInteger(-1));
  const p = characteristicPolynomial(minus);
  const roots = new RealRoots(field);
  const found = roots.isolate(p);
  if (
    found.reduce((s, r) => s + r.multiplicity, 0) !== l.rows ||
    found.some((r) => r.exact !== undefined && r.exact.n <= 0n) ||
    found.some((r) => r.exact === undefined && r.high.n <= 0n)
  )
    throw notElliptic();
  return found.map((root): Square => {
    const fine = roots.refine(p, root, 34);
    const mid = fine.exact ?? rational(fine.low.n * fine.high.d + fine.high.n * fine.low.d, 2n * fine.low.d * fine.high.d);
    if (mid.n <= 0n) throw notElliptic();
    const guess = fine.exact ?? simplest(fine.low, fine.high);
    const exact = field.isZero(roots.ring.evaluate(p, field.fromRational(guess.n, guess.d))) ? guess : undefined;
    return { exact, value: ratioToNumber(mid.n, mid.d), multiplicity: root.multiplicity };
  });
}
function notElliptic(): InputError {
  return new InputError('the equilibrium is not elliptic', {
    expected: 'nonzero imaginary eigenvalues of the linear part, each with a full set of eigenvectors',
    next: 'run symcodim codim for the event at zero or the collision that is met',
  });
}
/** The rational with the smallest denominator in an interval. */
function simplest(low: Rational, high: Rational): Rational {
  const floor = low.n >= 0n ? low.n / low.d : -((-low.n + low.d - 1n) / low.d);
  const whole = rational(floor);
  if (rationals.equal(whole, low) || rationals.compare(rational(floor + 1n), high) <= 0)
    return rationals.equal(whole, low) ? whole : rational(floor + 1n);
  const rest = simplest(rationals.inv(rationals.sub(high, whole)), rationals.inv(rationals.sub(low, whole)));
  return rationals.add(whole, rationals.inv(rest));
}

/**
 * Modes of H2 = ½ xᵀ S x with x' = J S x, J = W⁻ᵀ. Exact where the squares of all frequencies are rational (the field is extended by
 * their roots), in doubles otherwise. Modes are taken from the `preferred` forms that lie in an eigenspace, as far as they go. Throws InputError unless the equilibrium is elliptic and semisimple.
 */
export function diagonalise(
  hessian: Matrix<Algebraic>,
  form: Matrix<Algebraic>,
  preferred: readonly (readonly Algebraic[])[] = [],
): Diagonalisation<Algebraic> | Diagonalisation<number> {
  const field = hessian.field as RealField;
  const poisson = transpose(inverse(form));
  const l = multiply(poisson, hessian);
  const list = squares(l, field);
  if (list.every((s) => s.exact !== undefined)) {
    const extended = list.reduce((f, s) => RealField.join(f, RealField.of({ squareRoots: [s.exact!.n * s.exact!.d] })), field);
    const lift = (m: Matrix<Algebraic>) => mapMatrix(m, extended, (x) => extended.embed(field, x));
    const frequencies = list.map((s) => ({ value: extended.sqrt(s.exact!)!, multiplicity: s.multiplicity / 2 }));
    return {
      field: extended,
      modes: modesOf(
        extended,
        lift(l),
        lift(poisson),
        frequencies,
        (m) => kernel(m),
        preferred.map((v) => v.map((x) => extended.embed(field, x))),
        (c) => extended.sqrtElement(c),
      ),
    };
  }
  const toDoubles = (m: Matrix<Algebraic>) => mapMatrix(m, doubles, (x) => field.toNumber(x));
  const frequencies = list.map((s) => ({ value: Math.sqrt(s.value), multiplicity: s.multiplicity / 2 }));
  return {
    field: doubles,
    modes: modesOf(
      doubles,
      toDoubles(l),
      toDoubles(poisson),
      frequencies,
      floatingKernel,
      preferred.map((v) => v.map((x) => field.toNumber(x))),
      Math.sqrt,
    ),
  };
}

function modesOf<T>(
  f: OrderedField<T>,
  l: Matrix<T>,
  poisson: Matrix<T>,
  frequencies: readonly { readonly value: T; readonly multiplicity: number }[],
  nullSpace: (m: Matrix<T>, dimension: number) => Matrix<T>,
  preferred: readonly (readonly T[])[],
  root: (c: T) => T | undefined,
): Mode<T>[] {
  const lt = transpose(l);
  const n = l.rows;
  const dot = (x: readonly T[], y: readonly T[]) => x.reduce((s, v, i) => f.add(s, f.mul(v, y[i]!)), f.zero);
  const modes: Mode<T>[] = [];
  for (const { value: w, multiplicity } of frequencies) {
    const shifted = sumOf(multiply(lt, lt), scale(identity(f, n), f.mul(w, w)));
    const space = nullSpace(shifted, 2 * multiplicity);
    const size = (x: readonly T[]) => x.reduce((m, v) => Math.max(m, Math.abs(f.toNumber(v))), 0);
    const vanishes = (x: readonly T[], against: number) => (f.exact ? x.every((v) => f.isZero(v)) : size(x) <= 1e-9 * against);
    const inside = preferred.filter((v) => vanishes(apply(shifted, v), size(v) * f.toNumber(f.mul(w, w))));
    if (space.cols !== 2 * multiplicity) throw notElliptic();
    const partner = (a: readonly T[]) => apply(lt, a).map((x) => f.div(x, w));
    const bracket = (a: readonly T[], b: readonly T[]) => dot(a, apply(poisson, b));
    // the symmetric form a ↦ {a, b(a')}
    const product = (a: readonly T[], c: readonly T[]) => bracket(a, partner(c));
    let pool = [
      ...inside.map((v) => v.slice()),
      ...Array.from({ length: space.cols }, (_, j) => Array.from({ length: n }, (_, i) => at(space, i, j))),
    ];
    for (let k = 0; k < multiplicity; k++) {
      const candidates = [...pool, ...pool.flatMap((x, i) => pool.slice(i + 1).map((y) => x.map((v, t) => f.add(v, y[t]!))))];
      const best = f.exact
        ? candidates.find((x) => !f.isZero(product(x, x)))
        : candidates.reduce((s, x) => (Math.abs(f.toNumber(product(x, x))) > Math.abs(f.toNumber(product(s, s))) * 1.5 ? x : s));
      if (best === undefined || f.isZero(product(best, best))) throw notElliptic();
      const b = partner(best);
      const c = product(best, best);
      const positive = f.sign(c) > 0;
      const magnitude = positive ? c : f.neg(c);
      // bracket 1 where its root is at hand
      const divisor = root(magnitude);
      const by = (x: readonly T[], negative: boolean) =>
        x.map((v) => (divisor === undefined ? (negative ? f.neg(v) : v) : f.div(negative ? f.neg(v) : v, divisor)));
      modes.push({
        frequency: positive ? w : f.neg(w),
        a: by(best, false),
        b: by(b, !positive),
        bracket: divisor === undefined ? magnitude : f.one,
      });
      const project = (x: readonly T[]) => {
        const s = f.div(product(x, best), c);
        const t = f.div(product(x, b), c);
        return x.map((v, i) => f.sub(v, f.add(f.mul(s, best[i]!), f.mul(t, b[i]!))));
      };
      pool = pool.map(project).filter((x) => (f.exact ? x.some((v) => !f.isZero(v)) : size(x) > 1e-9));
    }
  }
  return modes;
}

/** Null space of known dimension of a floating matrix, by elimination with complete pivoting. */
function floatingKernel(m: Matrix<number>, dimension: number): Matrix<number> {
  const n = m.cols;
  const a = Float64Array.from(m.data);
  const order = Array.from({ length: n }, (_, i) => i);
  const rank = n - dimension;
  for (let k = 0; k < rank; k++) {
    let best = -1;
    let row = k;
    let col = k;
    for (let i = k; i < n; i++)
      for (let j = k; j < n; j++) {
        const x = Math.abs(a[i * n + order[j]!]!);
        if (x > best) [best, row, col] = [x, i, j];
      }
    [order[k], order[col]] = [order[col]!, order[k]!];
    for (let j = 0; j < n; j++) [a[k * n + j], a[row * n + j]] = [a[row * n + j]!, a[k * n + j]!];
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const g = a[i * n + order[k]!]! / a[k * n + order[k]!]!;
      if (g !== 0) for (let j = 0; j < n; j++) a[i * n + j]! -= g * a[k * n + j]!;
    }
  }
  const data = new Array<number>(n * dimension).fill(0);
  for (let d = 0; d < dimension; d++) {
    const free = order[rank + d]!;
    data[free * dimension + d] = 1;
    for (let k = 0; k < rank; k++) data[order[k]! * dimension + d] = -a[k * n + free]! / a[k * n + order[k]!]!;
  }
  return { field: m.field, rows: n, cols: dimension, data };
}
