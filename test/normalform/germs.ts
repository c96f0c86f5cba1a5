/** Potentials on a kernel, their full equations, random invariant germs, and an independent search for equilibria near 0. */
import type { Algebraic, RealField } from '../../src/field/index.ts';
import { minimalGenerators } from '../../src/invariant/generators.ts';
import type { LinearAction } from '../../src/invariant/linear-action.ts';
import { numberIdentity, numberMatrix, symmetricEigenvalues } from '../../src/linear/index.ts';
import type { FullEquations } from '../../src/normalform/confirm-branch.ts';
import { NumericPolynomial, newton, norm, randomSource } from '../../src/normalform/numeric-polynomial.ts';
import { type Polynomial, PolynomialRing } from '../../src/polynomial/index.ts';

export type Ring = PolynomialRing<Algebraic>;
export type Make = (r: Ring) => Polynomial<Algebraic>;
export const fraction = (r: Ring, x: number): Algebraic => r.field.fromRational(BigInt(Math.round(x * 2520000)), 2520000n);
export const terms =
  (...list: [number[], number][]): Make =>
  (r) =>
    r.fromTerms(list.map(([e, c]) => [e, fraction(r, c)] as const));
export const r2: Make = (r) => r.sum(r.variables.map((_, i) => r.power(r.variable(i), 2)));
export const power =
  (f: Make, e: number): Make =>
  (r) =>
    r.power(f(r), e);
export const sum =
  (...list: [number, Make][]): Make =>
  (r) =>
    r.sum(list.map(([c, f]) => r.scale(f(r), fraction(r, c))));
/** Re z^n or Im z^n. */
export const zPower =
  (n: number, imaginary = false): Make =>
  (r) => {
    let re = r.one;
    let im = r.zero;
    for (let k = 0; k < n; k++)
      [re, im] = [r.sub(r.mul(re, r.variable(0)), r.mul(im, r.variable(1))), r.add(r.mul(re, r.variable(1)), r.mul(im, r.variable(0)))];
    return imaginary ? im : re;
  };
export const ringOf = (action: LinearAction): Ring => new PolynomialRing<Algebraic>(action.field as RealField, action.names);

/** The reduced equations as if they were the full ones. */
export function equationsOf(ring: Ring, h: Polynomial<Algebraic>, unfolding: Polynomial<Algebraic>): FullEquations {
  const n = ring.variables.length;
  const a = NumericPolynomial.of(ring, h);
  const b = NumericPolynomial.of(ring, unfolding);
  return {
    dimension: n,
    gradient: (x, mu) => {
      const l = b.gradient(x);
      return a.gradient(x).map((v, i) => v + mu * l[i]!);
    },
    hessian: (x, mu) => {
      const l = b.hessian(x);
      return numberMatrix(
        n,
        n,
        a.hessian(x).map((v, i) => v + mu * l[i]!),
      );
    },
    point: new Float64Array(n),
    mu: 0,
    kernel: numberIdentity(n),
  };
}

export interface Found {
  readonly point: Float64Array;
  readonly radius: number;
  readonly index: number;
}
/** Equilibria with radius in (low, high) by Newton from many starts spread over the shells between. */
export function search(e: FullEquations, mu: number, low: number, high: number, starts: number, seed = 5): Found[] {
  const random = randomSource(seed);
  const out: Found[] = [];
  for (let k = 0; k < starts; k++) {
    const x = Float64Array.from({ length: e.dimension }, random);
    const r = low * (high / low) ** Math.abs(random());
    const size = norm(x);
    const start = x.map((v) => (v * r) / size);
    const end = newton(
      start,
      (y) => e.gradient(y, mu),
      (y) => e.hessian(y, mu),
      Infinity,
    );
    const radius = norm(end.point);
    if (radius < low || radius > high || end.residual > 1e-10 * (norm(e.hessian(end.point, mu).data) * radius)) continue;
    if (out.some((f) => norm(f.point.map((v, i) => v - end.point[i]!)) < 1e-5 * radius)) continue;
    out.push({
      point: end.point,
      radius,
      index: symmetricEigenvalues(e.hessian(end.point, mu)).filter((v) => v < 0).length,
    });
  }
  return out;
}

/** A random combination of all products of generators of the degrees given. */
export function randomGerm(action: LinearAction, degrees: readonly number[], seed: number): Polynomial<Algebraic> {
  const ring = ringOf(action);
  const random = randomSource(seed);
  for (let k = 0; k < 5; k++) random();
  const { generators } = minimalGenerators(action, { degree: Math.max(...degrees) });
  const parts: Polynomial<Algebraic>[] = [];
  const extend = (from: number, degree: number, p: Polynomial<Algebraic>) => {
    if (degrees.includes(degree)) {
      const c = random();
      parts.push(ring.scale(p, fraction(ring, Math.sign(c) * (0.3 + Math.abs(c)))));
    }
    for (let g = from; g < generators.length; g++)
      if (degree + generators[g]!.degree <= Math.max(...degrees))
        extend(g, degree + generators[g]!.degree, ring.mul(p, generators[g]!.polynomial));
  };
  extend(0, 0, ring.one);
  return ring.sum(parts);
}
/** The invariant quadratic form of an irreducible action. */
export function quadraticInvariant(action: LinearAction): Polynomial<Algebraic> {
  return minimalGenerators(action, { degree: 2 }).generators.find((g) => g.degree === 2)!.polynomial;
}

/** Images of a vector under the group, in doubles. */
export function images(action: LinearAction, y: Float64Array): Float64Array[] {
  const f = action.field as RealField;
  const n = action.dimension;
  return Array.from({ length: action.group.order }, (_, g) => {
    const m = action.matrix(g).data;
    return Float64Array.from({ length: n }, (_, i) => y.reduce((s, v, k) => s + f.toNumber(m[i * n + k]!) * v, 0));
  });
}
