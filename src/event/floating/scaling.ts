/**
 * Symplectic coordinates in which the terms of the Hessian are of like size. Units that differ by 10³ fake a kernel; the cure
 * is q ↦ s q, p ↦ p/s, one s per irreducible copy, and canonical coordinates where ω is not canonical.
 */
import { InputError, NotSymplecticError, ShapeError } from '../../errors/index.ts';
import { largestEntry, type NumberMatrix, numberAt, numberBuild, numberCongruence, numberIdentity } from '../../linear/floating.ts';

/** Coordinate numbers (from 0) of one irreducible copy and of the copy that ω pairs with it. */
export interface CanonicalPair {
  readonly q: readonly number[];
  readonly p: readonly number[];
}

export interface Balanced {
  /** New coordinates x' with x = transform x'. */
  readonly transform: NumberMatrix;
  readonly s: NumberMatrix;
  readonly w: NumberMatrix;
  /** Bounds of the terms that went into the entries of the new s. */
  readonly terms: NumberMatrix;
  /** Largest entry of `terms`. */
  readonly scale: number;
}

/** The partner of each coordinate where every row of w has exactly one nonzero entry, else undefined. */
function partners(w: NumberMatrix): number[] | undefined {
  const out: number[] = [];
  for (let i = 0; i < w.rows; i++) {
    const nonzero: number[] = [];
    for (let j = 0; j < w.cols; j++) if (numberAt(w, i, j) !== 0) nonzero.push(j);
    if (nonzero.length !== 1) return undefined;
    out.push(nonzero[0]!);
  }
  return out.every((j, i) => out[j] === i) ? out : undefined;
}

/** Matrix of the new form, exactly skew and, where t is diagonal, exactly monomial. */
function pulledBack(t: NumberMatrix, w: NumberMatrix): NumberMatrix {
  const v = numberCongruence(t, w);
  return numberBuild(w.rows, w.cols, (i, j) => (numberAt(v, i, j) - numberAt(v, j, i)) / 2);
}

/**
 * t with tᵀ w t canonical up to the order of the coordinates (e₁, f₁, e₂, f₂, …), by skew elimination with complete pivoting
 * (Darboux; the symplectic Gram-Schmidt process). Diagonal, in the given order, where w couples each coordinate with one other.
 * Throws NotSymplecticError where w is degenerate to rounding.
 */
export function canonicalCoordinates(w: NumberMatrix): NumberMatrix {
  const n = w.rows;
  const partner = partners(w);
  if (partner !== undefined) return numberBuild(n, n, (i, j) => (i === j ? 1 / Math.sqrt(Math.abs(numberAt(w, i, partner[i]!))) : 0));
  const size = largestEntry(w);
  const vectors = Array.from({ length: n }, (_, i) => Float64Array.from({ length: n }, (_, k) => (k === i ? 1 : 0)));
  const form = Array.from({ length: n }, (_, i) => Float64Array.from({ length: n }, (_, j) => numberAt(w, i, j)));
  let active = Array.from({ length: n }, (_, i) => i);
  const chosen: Float64Array[] = [];
  while (active.length > 1) {
    let a = -1;
    let b = -1;
    let best = 0;
    for (const i of active)
      for (const j of active)
        if (form[i]![j]! > best) {
          best = form[i]![j]!;
          a = i;
          b = j;
        }
    if (best <= n * Number.EPSILON * size) break;
    const root = Math.sqrt(best);
    const e = vectors[a]!.map((x) => x / root);
    const f = vectors[b]!.map((x) => x / root);
    chosen.push(e, f);
    active = active.filter((i) => i !== a && i !== b);
    // v ↦ v + ω(f, v) e - ω(e, v) f is ω-orthogonal to e and f
    const left = active.map((i) => ({ i, onE: form[a]![i]! / root, onF: form[b]![i]! / root }));
    for (const { i, onE, onF } of left) {
      const v = vectors[i]!;
      for (let k = 0; k < n; k++) v[k] = v[k]! + onF * e[k]! - onE * f[k]!;
    }
    for (const x of left) for (const y of left) form[x.i]![y.i]! += x.onF * y.onE - x.onE * y.onF;
  }
  if (chosen.length < n)
    throw new NotSymplecticError('the symplectic form is degenerate', { key: 'symplectic', expected: 'a nondegenerate skew matrix' });
  return numberBuild(n, n, (i, j) => chosen[j]![i]!);
}

/** Minimiser of the convex function a s⁴ + b s² + c s⁻² + d s⁻⁴ of log s, as a power of 2; a + b and c + d positive. */
function bestPower(a: number, b: number, c: number, d: number): number {
  const slope = (x: number) => 4 * a * 2 ** (4 * x) + 2 * b * 2 ** (2 * x) - 2 * c * 2 ** (-2 * x) - 4 * d * 2 ** (-4 * x);
  let low = -300;
  let high = 300;
  for (let k = 0; k < 30; k++) {
    const middle = (low + high) / 2;
    if (slope(middle) > 0) high = middle;
    else low = middle;
  }
  return Math.round((low + high) / 2);
}

/**
 * The powers of 2 by which q ↦ s q, p ↦ p/s bring the squares of all terms to the least sum (as B. N. Parlett & C. Reinsch 1969 balance
 * a matrix, here under the constraint of being symplectic). A copy whose q- or p-rows are wholly zero is brought to the largest of the
 * other terms. Returns one factor per coordinate.
 */
function balancingFactors(terms: NumberMatrix, pairs: readonly CanonicalPair[]): Float64Array {
  const n = terms.rows;
  const factor = new Float64Array(n).fill(1);
  const value = (i: number, j: number) => numberAt(terms, i, j) * factor[i]! * factor[j]!;
  const sums = (copy: CanonicalPair) => {
    const side = new Map<number, number>([...copy.q.map((i) => [i, 1] as const), ...copy.p.map((i) => [i, -1] as const)]);
    const by = { '2': 0, '1': 0, '0': 0, '-1': 0, '-2': 0 };
    let largest = 0;
    for (const [i, x] of side)
      for (let j = 0; j < n; j++) {
        const y = side.get(j) ?? 0;
        const weight = side.has(j) ? 1 : 2;
        const v = value(i, j);
        if (x + y !== 0) largest = Math.max(largest, v);
        by[`${x + y}` as keyof typeof by] += weight * v * v;
      }
    return { by, largest };
  };
  const move = (copy: CanonicalPair, power: number) => {
    for (const i of copy.q) factor[i]! *= 2 ** power;
    for (const i of copy.p) factor[i]! *= 2 ** -power;
  };
  const oneSided: CanonicalPair[] = [];
  const twoSided: CanonicalPair[] = [];
  for (const copy of pairs) {
    const { by } = sums(copy);
    const up = by['2'] + by['1'] > 0;
    const down = by['-1'] + by['-2'] > 0;
    if (up && down) twoSided.push(copy);
    else if (up || down) oneSided.push(copy);
  }
  for (let sweep = 0, changed = true; changed && sweep < 60; sweep++) {
    changed = false;
    for (const copy of twoSided) {
      const { by } = sums(copy);
      const power = bestPower(by['2'], by['1'], by['-1'], by['-2']);
      if (power === 0) continue;
      move(copy, power);
      changed = true;
    }
  }
  const free = new Set(oneSided.flatMap((c) => [...c.q, ...c.p]));
  let target = 0;
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) if (!free.has(i) && !free.has(j)) target = Math.max(target, value(i, j));
  for (const copy of oneSided) {
    const { by, largest } = sums(copy);
    const quadratic = by['2'] + by['-2'] >= by['1'] + by['-1'];
    const sign = by['2'] + by['1'] > 0 ? 1 : -1;
    move(copy, sign * Math.round(Math.log2((target > 0 ? target : 1) / largest) / (quadratic ? 2 : 1)));
  }
  return factor;
}

function transformed(s: NumberMatrix, w: NumberMatrix, terms: NumberMatrix, transform: NumberMatrix): Balanced {
  const n = s.rows;
  const newS = numberCongruence(transform, s);
  const columns = Array.from({ length: n }, (_, j) =>
    Array.from({ length: n }, (_, i) => i).filter((i) => numberAt(transform, i, j) !== 0),
  );
  const newTerms = numberBuild(n, n, (i, j) => {
    let best = 0;
    for (const k of columns[i]!)
      for (const l of columns[j]!)
        best = Math.max(best, Math.abs(numberAt(transform, k, i) * numberAt(terms, k, l) * numberAt(transform, l, j)));
    return Math.max(best, Math.abs(numberAt(newS, i, j)));
  });
  return { transform, s: newS, w: pulledBack(transform, w), terms: newTerms, scale: largestEntry(newTerms) };
}

/**
 * Canonical, balanced coordinates for (s, w), both n x n. `terms` (n x n, default: the largest entry of s everywhere, so that nothing is
 * balanced) bounds the terms that went into each entry of s before they cancelled. `pairs` (default: each coordinate with its partner)
 * are the copies that scale together; where w is not monomial there is no default and the coordinates are made canonical only.
 * Throws ShapeError, InputError (terms not finite or negative), NotSymplecticError (w degenerate).
 */
export function balanceScaling(s: NumberMatrix, w: NumberMatrix, terms?: NumberMatrix, pairs?: readonly CanonicalPair[]): Balanced {
  const n = s.rows;
  for (const m of [s, w, terms ?? s])
    if (m.rows !== n || m.cols !== n) throw new ShapeError(`a ${m.rows} x ${m.cols} matrix on a space of dimension ${n}`);
  if (terms?.data.some((x) => !(x >= 0 && x < Infinity))) throw new InputError('the sizes of the terms must be finite and not negative');
  const size = largestEntry(s);
  const bounds = terms ?? numberBuild(n, n, () => size);
  const partner = partners(w);
  const first = transformed(s, w, bounds, n === 0 ? numberIdentity(0) : canonicalCoordinates(w));
  const copies = pairs ?? partner?.flatMap((j, i) => (i < j ? [{ q: [i], p: [j] }] : []));
  if (terms === undefined || partner === undefined || copies === undefined) return first;
  const factor = balancingFactors(first.terms, copies);
  const t = numberBuild(n, n, (i, j) => (i === j ? numberAt(first.transform, i, i) * factor[i]! : 0));
  return transformed(s, w, bounds, t);
}
