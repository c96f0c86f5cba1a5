/**
 * H in double precision near a point: gradient, Hessian, the sizes of the terms in them, the derivatives by the parameters that
 * vary, and the higher terms of the Taylor expansion.
 */
import { InputError } from '../errors/index.ts';
import { type NumberMatrix, numberBuild, numberMatrix } from '../linear/index.ts';
import { factorsOf, type Polynomial, type PolynomialRing } from '../polynomial/index.ts';
import { type Expression, floatingTaylor, gradientNumeric, hessianNumeric } from './expression/index.ts';
import { type TermSizes, termSizes } from './floating-addends.ts';
import { polynomialDegree } from './polynomial-energy.ts';

/** Terms of H of degree 3 and more at a point. */
export interface FloatingHigher {
  readonly ring: PolynomialRing<number>;
  readonly polynomial: Polynomial<number>;
}

/** What versality and the check of invariance need at one point. */
export interface FloatingLocal {
  /** ∂S/∂μ and ∂∇H/∂μ for each varied parameter. */
  readonly hessianBy: readonly NumberMatrix[];
  readonly gradientBy: readonly Float64Array[];
  /** Absent where H is quadratic. */
  readonly higher?: FloatingHigher;
}

export interface FloatingEnergy {
  /** Coordinates, then momenta. */
  readonly names: readonly string[];
  gradient(x: Float64Array): Float64Array;
  hessian(x: Float64Array): NumberMatrix;
  /** Largest terms before they cancelled. */
  sizes(x: Float64Array): TermSizes;
  local(x: Float64Array, vary: readonly string[]): FloatingLocal;
}

/** Highest degree to which the invariance of H is looked at. */
export const FLOATING_DEGREE = 4;
/** With more coordinates than this only terms up to degree 3 are expanded. */
export const QUARTIC_LIMIT = 40;

function requireSmooth(data: Float64Array, what: string): Float64Array {
  if (data.every(Number.isFinite)) return data;
  throw new InputError(`${what} is not a finite number at the equilibrium`, {
    key: 'equilibrium',
    expected: 'a point at which H is smooth',
    next: 'check the declared equilibrium and the parameter values',
  });
}

/** The energy of an expression; `values` are those of all parameters in it. */
export function energyOfExpression(h: Expression, names: readonly string[], values: ReadonlyMap<string, number>): FloatingEnergy {
  const n = names.length;
  const others = [...values.keys()].filter((v) => !names.includes(v));
  const all = [...names, ...others];
  const width = all.length;
  const extended = (x: Float64Array) => Float64Array.from([...x, ...others.map((v) => values.get(v)!)]);
  const gradient = gradientNumeric(h, all);
  const hessian = hessianNumeric(h, all);
  return {
    names,
    gradient: (x) => requireSmooth(gradient(extended(x)).slice(0, n), 'the gradient of H'),
    hessian: (x) => {
      const full = hessian(extended(x));
      const data = numberBuild(n, n, (i, j) => full[i * width + j]!);
      requireSmooth(data.data, 'the Hessian of H');
      return data;
    },
    sizes: (x) => termSizes(h, names, x, values),
    local: (x, vary) => {
      const polynomial = polynomialDegree(h, new Set(names));
      const wanted = polynomial ?? (n <= QUARTIC_LIMIT ? FLOATING_DEGREE : 3);
      const point = new Map([...names.map((name, i) => [name, x[i]!] as const), ...vary.map((v) => [v, values.get(v)!] as const)]);
      const t = floatingTaylor(h, { names: [...names, ...vary], point, parameters: values, degree: Math.max(3, Math.min(wanted, 6)) });
      const hessianBy = vary.map(() => new Float64Array(n * n));
      const gradientBy = vary.map(() => new Float64Array(n));
      const higher: [string, number][] = [];
      t.polynomial.monomials.forEach((m, k) => {
        const c = t.polynomial.coefficients[k]!;
        const flat = factorsOf(m).flatMap(([v, e]) => new Array<number>(e).fill(v));
        const own = flat.filter((v) => v < n);
        const mu = flat.filter((v) => v >= n).map((v) => v - n);
        if (mu.length === 0 && own.length > 2) higher.push([m, c]);
        if (mu.length !== 1) return;
        if (own.length === 1) gradientBy[mu[0]!]![own[0]!] = c;
        if (own.length !== 2) return;
        const [i, j] = own as [number, number];
        hessianBy[mu[0]!]![i * n + j] = i === j ? 2 * c : c;
        hessianBy[mu[0]!]![j * n + i] = i === j ? 2 * c : c;
      });
      return {
        hessianBy: hessianBy.map((d) => numberMatrix(n, n, d)),
        gradientBy,
        ...(higher.length === 0 ? {} : { higher: { ring: t.ring, polynomial: t.ring.fromTerms(higher) } }),
      };
    },
  };
}

/** D³H·v as a symmetric matrix, from the higher terms. */
export function floatingCubicAlong(local: FloatingLocal, v: Float64Array): NumberMatrix {
  const n = v.length;
  const data = new Float64Array(n * n);
  const { higher } = local;
  higher?.polynomial.monomials.forEach((m, k) => {
    const flat = factorsOf(m).flatMap(([x, e]) => new Array<number>(e).fill(x));
    if (flat.length !== 3) return;
    const c = higher.polynomial.coefficients[k]!;
    const [a, b, d] = flat as [number, number, number];
    for (const [i, j, w] of [
      [a, b, d],
      [a, d, b],
      [b, a, d],
      [b, d, a],
      [d, a, b],
      [d, b, a],
    ] as const)
      data[i * n + j]! += c * v[w]!;
  });
  return numberMatrix(n, n, data);
}
