/** Rings of pendulums with repulsive coupling, and a twelve-site quartic, ready for reduction. */
import { type Algebraic, type Field, RealField } from '../../src/field/index.ts';
import { fromColumns } from '../../src/linear/index.ts';
import type { ReductionInput } from '../../src/normalform/splitting.ts';
import { type Polynomial, PolynomialRing, type RationalFunction, RationalFunctionField } from '../../src/polynomial/index.ts';

export interface Sites<T> {
  /** Coefficients of the on-site potential by powers of q, from q^2. */
  readonly site: readonly T[];
  readonly coupling: T;
}

/** sum of the on-site potentials + coupling/2 (q_i - q_{i+1})^2, with the Fourier mode k (and its partner) as kernel. */
export function ringReduction<T>(
  f: Field<T>,
  cosine: (k: number, n: number) => T,
  sites: number,
  mode: number,
  { site, coupling }: Sites<T>,
  degree: number,
): ReductionInput<T> {
  const names = Array.from({ length: sites }, (_, i) => `q${i + 1}`);
  const ring = new PolynomialRing(f, names);
  const half = f.fromRational(1n, 2n);
  const parts: Polynomial<T>[] = [];
  for (let i = 0; i < sites; i++) {
    site.forEach((c, e) => {
      parts.push(ring.scale(ring.power(ring.variable(i), e + 2), c));
    });
    const d = ring.sub(ring.variable(i), ring.variable((i + 1) % sites));
    parts.push(ring.scale(ring.mul(d, d), f.mul(half, coupling)));
  }
  const columns: T[][] = [];
  const kernel: T[][] = [];
  for (let k = 0; 2 * k <= sites; k++) {
    const cos = Array.from({ length: sites }, (_, i) => cosine(k * i, sites));
    const sin = Array.from({ length: sites }, (_, i) => cosine(4 * k * i - sites, 4 * sites));
    const list = k === 0 || 2 * k === sites ? [cos] : [cos, sin];
    (k === mode ? kernel : columns).push(...list);
  }
  return {
    ring,
    dimension: sites,
    hamiltonian: ring.sum(parts),
    kernel: fromColumns(f, kernel, sites),
    complement: fromColumns(f, columns, sites),
    degree,
  };
}

/** cos(2 pi k/n) in a field that has it. */
export const cosineIn =
  (f: RealField) =>
  (k: number, n: number): Algebraic =>
    f.cos(((k % n) + n) % n, n)!;

/** Twelve sites, mode 2, the constant of the coupling c with q-stiffness fixed so that the mode is critical; c, a, b numbers or symbols. */
export function twelveSites<T>(f: Field<T>, cosine: (k: number, n: number) => T, c: T, a: T, b: T): ReductionInput<T> {
  // stiffness of mode k: 2 s + 4 c sin^2(pi k/12); zero at k = 2 for s = -c/2
  const site = [f.mul(f.fromRational(-1n, 2n), c), f.mul(f.fromRational(1n, 3n), a), f.mul(f.fromRational(1n, 4n), b)];
  return ringReduction(f, cosine, 12, 2, { site, coupling: c }, 6);
}
export const twelveField = RealField.of({ squareRoots: [3n] });
export function twelveSymbolic(): ReductionInput<RationalFunction<Algebraic>> {
  const f = new RationalFunctionField(new PolynomialRing<Algebraic>(twelveField, ['c', 'a', 'b']));
  const cosine = cosineIn(twelveField);
  return twelveSites(f, (k, n) => f.fromConstant(cosine(k, n)), f.symbol('c'), f.symbol('a'), f.symbol('b'));
}
