/**
 * Birkhoff normal form at an elliptic equilibrium by Lie series: exp(ad G_3), exp(ad G_4), … with no resonant terms in the
 * generators (G. D. Birkhoff 1927; A. Deprit 1969; K. R. Meyer, G. R. Hall, D. Offin, Introduction to Hamiltonian Dynamical
 * Systems and the N-Body Problem, 2009; places from memory). Coordinates ζ_j = a_j + i b_j and their conjugates, with
 * {ζ_j, ζ̄_j} = -2i c_j; actions I_j = |ζ_j|²/(2 c_j).
 */
import { ShapeError } from '../errors/index.ts';
import type { Algebraic, OrderedField, RealField } from '../field/index.ts';
import { build, determinant, fromRows, inverse, type Matrix } from '../linear/index.ts';
import { exponentsOf, type Monomial, type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import { type Diagonalisation, diagonalise, type Mode } from './elliptic.ts';
import { type Gaussian, GaussianField } from './gaussian-field.ts';

export interface BirkhoffInput {
  /** Coordinates of phase space; numbers of the model. */
  readonly ring: PolynomialRing<Algebraic>;
  /** Taylor polynomial at the equilibrium; constant and linear terms are ignored. */
  readonly hamiltonian: Polynomial<Algebraic>;
  /** ω(u,v) = uᵀ W v. */
  readonly form: Matrix<Algebraic>;
  readonly degree: number;
  /**
   * Linear forms on phase space that modes should be taken from where they are equally good, e.g. symmetry-adapted coordinates;
   * without them the coordinates themselves come first.
   */
  readonly preferred?: readonly (readonly Algebraic[])[];
}

/** Relative size of ω·k below which floating frequencies count as resonant. */
export const RESONANCE_TOLERANCE = 1e-9;
/** Size of a floating coefficient, against the largest of its degree, below which it counts as rounding. */
const ROUNDING = 1e-11;

export interface BirkhoffForm<T> {
  readonly field: OrderedField<T>;
  readonly modes: readonly Mode<T>[];
  /** Variables z1 … zn, then their conjugates. */
  readonly ring: PolynomialRing<Gaussian<T>>;
  readonly normalForm: Polynomial<Gaussian<T>>;
  readonly degree: number;
}
export type AnyBirkhoffForm =
  | ({ readonly arithmetic: 'exact' } & BirkhoffForm<Algebraic>)
  | ({ readonly arithmetic: 'floating' } & BirkhoffForm<number>);

/** Throws InputError unless the equilibrium is elliptic and semisimple, ShapeError if sizes differ. */
export function birkhoffNormalForm(input: BirkhoffInput): AnyBirkhoffForm {
  const { ring, form, hamiltonian } = input;
  const size = ring.variables.length;
  if (form.rows !== size || form.cols !== size) throw new ShapeError(`a ${form.rows} x ${form.cols} form on ${size} coordinates`);
  const field = ring.field as RealField;
  const quadratic = ring.homogeneousPart(hamiltonian, 2);
  const hessian = build(field, size, size, (i, j) => {
    const c = ring.coefficient(quadratic, i <= j ? String.fromCharCode(i, j) : String.fromCharCode(j, i));
    return i === j ? field.add(c, c) : c;
  });
  const d = diagonalise(hessian, form, input.preferred);
  if (d.field.exact) {
    const own = d as Diagonalisation<Algebraic>;
    const to = own.field as RealField;
    return { arithmetic: 'exact', ...normalise(input, own, (c) => to.embed(field, c)) };
  }
  return { arithmetic: 'floating', ...normalise(input, d as Diagonalisation<number>, (c) => field.toNumber(c)) };
}

/** Whether Σ ω_j k_j = 0: exactly, or within RESONANCE_TOLERANCE of the largest term. */
export function isResonant<T>(f: OrderedField<T>, modes: readonly Mode<T>[], k: readonly number[]): boolean {
  if (f.exact) return f.isZero(k.reduce((s, x, j) => (x === 0 ? s : f.add(s, f.mul(f.fromInteger(x), modes[j]!.frequency))), f.zero));
  let sum = 0;
  let largest = 0;
  k.forEach((x, j) => {
    const t = x * f.toNumber(modes[j]!.frequency);
    sum += t;
    largest = Math.max(largest, Math.abs(t));
  });
  return Math.abs(sum) <= RESONANCE_TOLERANCE * largest;
}

function normalise<T>(input: BirkhoffInput, { field: f, modes }: Diagonalisation<T>, lift: (c: Algebraic) => T): BirkhoffForm<T> {
  const n = modes.length;
  const complex = new GaussianField(f);
  const ring = new PolynomialRing<Gaussian<T>>(complex, [...modes.map((_, j) => `z${j + 1}`), ...modes.map((_, j) => `zc${j + 1}`)]);
  const { degree } = input;
  let parts = inModes(input, f, modes, ring, lift);
  const differences = (m: Monomial) => {
    const e = exponentsOf(m, 2 * n);
    return modes.map((_, j) => e[j]! - e[j + n]!);
  };
  const known = new Map<string, Gaussian<T> | undefined>();
  /** i ω·k, or undefined if it vanishes. */
  const divisor = (m: Monomial): Gaussian<T> | undefined => {
    const k = differences(m);
    const key = k.join(',');
    if (!known.has(key))
      known.set(
        key,
        isResonant(f, modes, k)
          ? undefined
          : { re: f.zero, im: k.reduce((s, x, j) => (x === 0 ? s : f.add(s, f.mul(f.fromInteger(x), modes[j]!.frequency))), f.zero) },
      );
    return known.get(key);
  };
  for (let k = 3; k <= degree; k++) {
    const terms: Array<[Monomial, Gaussian<T>]> = [];
    const kept: Array<[Monomial, Gaussian<T>]> = [];
    for (const [m, c] of ring.terms(parts[k]!)) {
      const by = divisor(m);
      if (by === undefined) kept.push([m, c]);
      // {H2, ζ^a ζ̄^b} = i ω·(a - b) ζ^a ζ̄^b
      else terms.push([m, complex.neg(complex.div(c, by))]);
    }
    if (terms.length === 0) continue;
    const generator = ring.fromTerms(terms);
    const removed = ring.sub(ring.fromTerms(kept), parts[k]!);
    const next = parts.slice();
    let layer: Polynomial<Gaussian<T>>[] = parts;
    for (let m = 1; 2 + m * (k - 2) <= degree; m++) {
      const step: Polynomial<Gaussian<T>>[] = Array.from({ length: degree + 1 }, () => ring.zero);
      const factor = complex.fromRational(1n, BigInt(m));
      for (let e = 2 + (m - 1) * (k - 2); e + k - 2 <= degree; e++) {
        // {H2, G} is known without computing it
        const value =
          m === 1 && e === 2
            ? removed
            : ring.isZero(layer[e]!)
              ? ring.zero
              : ring.scale(bracket(ring, complex, modes, layer[e]!, generator), factor);
        step[e + k - 2] = value;
        next[e + k - 2] = ring.add(next[e + k - 2]!, value);
      }
      layer = step;
    }
    parts = next;
  }
  return { field: f, modes, ring, normalForm: ring.sum(f.exact ? parts : parts.map((p) => withoutRounding(ring, f, p))), degree };
}

/** A homogeneous part without the terms that are rounding. */
function withoutRounding<T>(ring: PolynomialRing<Gaussian<T>>, f: OrderedField<T>, p: Polynomial<Gaussian<T>>): Polynomial<Gaussian<T>> {
  const size = (c: Gaussian<T>) => Math.hypot(f.toNumber(c.re), f.toNumber(c.im));
  const largest = p.coefficients.reduce((s, c) => Math.max(s, size(c)), 0);
  return ring.fromTerms([...ring.terms(p)].filter(([, c]) => size(c) > ROUNDING * largest));
}

/** {f, g}. */
export function bracket<T>(
  ring: PolynomialRing<Gaussian<T>>,
  complex: GaussianField<T>,
  modes: readonly Mode<T>[],
  f: Polynomial<Gaussian<T>>,
  g: Polynomial<Gaussian<T>>,
): Polynomial<Gaussian<T>> {
  const n = modes.length;
  const parts: Polynomial<Gaussian<T>>[] = [];
  modes.forEach(({ bracket: c }, j) => {
    const factor = { re: complex.base.zero, im: complex.base.mul(complex.base.fromInteger(-2), c) };
    const first = ring.mul(ring.derivative(f, j), ring.derivative(g, j + n));
    const second = ring.mul(ring.derivative(f, j + n), ring.derivative(g, j));
    parts.push(ring.scale(ring.sub(first, second), factor));
  });
  return ring.sum(parts);
}

/** Homogeneous parts, by degree, of H in the coordinates ζ, ζ̄. */
function inModes<T>(
  input: BirkhoffInput,
  f: OrderedField<T>,
  modes: readonly Mode<T>[],
  ring: PolynomialRing<Gaussian<T>>,
  lift: (c: Algebraic) => T,
): Polynomial<Gaussian<T>>[] {
  const n = modes.length;
  const back = inverse(
    fromRows(
      f,
      modes.flatMap((m) => [m.a, m.b]),
    ),
  );
  const half = f.fromRational(1n, 2n);
  // x = Σ (column 2j) (ζ + ζ̄)/2 + (column 2j + 1) (ζ - ζ̄)/(2i)
  const images = Array.from({ length: 2 * n }, (_, i) => {
    const coefficients = new Array<Gaussian<T>>(2 * n);
    for (let j = 0; j < n; j++) {
      const re = f.mul(half, back.data[i * 2 * n + 2 * j]!);
      const im = f.mul(half, back.data[i * 2 * n + 2 * j + 1]!);
      coefficients[j] = { re, im: f.neg(im) };
      coefficients[j + n] = { re, im };
    }
    return ring.linearForm(coefficients);
  });
  const h = input.ring.substitute(input.hamiltonian, images, ring, (c) => ({ re: lift(c), im: f.zero }), input.degree);
  const parts = Array.from({ length: input.degree + 1 }, (_, e) => (e < 2 ? ring.zero : ring.homogeneousPart(h, e)));
  // the quadratic part is known: rounding left over from floating modes is not kept
  parts[2] = ring.fromTerms(
    modes.map((m, j) => [String.fromCharCode(j, j + n), { re: f.mul(half, f.div(m.frequency, m.bracket)), im: f.zero }] as const),
  );
  return parts;
}

/** The normal form in the coordinates of phase space (near-identity changes undone only in their linear part). */
export function inPhaseSpace<T>(b: BirkhoffForm<T>, names: readonly string[]): { ring: PolynomialRing<T>; polynomial: Polynomial<T> } {
  const { field: f, modes, ring } = b;
  const complex = ring.field as GaussianField<T>;
  const target = new PolynomialRing<Gaussian<T>>(complex, names);
  const form = (m: Mode<T>, sign: 1 | -1) => target.linearForm(m.a.map((x, i) => ({ re: x, im: sign === 1 ? m.b[i]! : f.neg(m.b[i]!) })));
  const images = [...modes.map((m) => form(m, 1)), ...modes.map((m) => form(m, -1))];
  const p = ring.substitute(b.normalForm, images, target);
  const real = new PolynomialRing<T>(f, names);
  return { ring: real, polynomial: target.map(p, (c) => c.re, real) };
}

/** The part of the normal form in the actions alone, as a polynomial in I1 … In; and whether that is all of it. */
export function actionPart<T>(b: BirkhoffForm<T>): { ring: PolynomialRing<T>; polynomial: Polynomial<T>; whole: boolean } {
  const { field: f, modes, ring } = b;
  const n = modes.length;
  const actions = new PolynomialRing<T>(
    f,
    modes.map((_, j) => `I${j + 1}`),
  );
  const terms: Array<[number[], T]> = [];
  let whole = true;
  for (const [m, c] of ring.terms(b.normalForm)) {
    const e = exponentsOf(m, 2 * n);
    const a = e.slice(0, n);
    if (a.some((x, j) => x !== e[j + n])) {
      whole = false;
      continue;
    }
    let factor = c.re;
    a.forEach((x, j) => {
      const twice = f.mul(f.fromInteger(2), modes[j]!.bracket);
      for (let k = 0; k < x; k++) factor = f.mul(factor, twice);
    });
    terms.push([a, factor]);
  }
  return { ring: actions, polynomial: actions.fromTerms(terms), whole };
}

export interface Twist<T> {
  /** Second derivatives of the normal form by the actions at 0. */
  readonly matrix: Matrix<T>;
  /** Kolmogorov's determinant det(matrix). */
  readonly kolmogorov: T;
  /** Arnold's determinant det [[matrix, ω], [ωᵀ, 0]]: the condition on one energy level. */
  readonly arnold: T;
}

/** Twist of the normal form to degree 4 in the actions. */
export function twistOf<T>(b: BirkhoffForm<T>): Twist<T> {
  const { field: f, modes } = b;
  const n = modes.length;
  const { ring, polynomial } = actionPart(b);
  const second = (i: number, j: number): T => {
    const c = ring.coefficient(polynomial, i <= j ? String.fromCharCode(i, j) : String.fromCharCode(j, i));
    return i === j ? f.add(c, c) : c;
  };
  const m = build(f, n, n, second);
  const bordered = build(f, n + 1, n + 1, (i, j) =>
    i < n && j < n ? second(i, j) : i === n && j === n ? f.zero : modes[Math.min(i, j)]!.frequency,
  );
  return { matrix: m, kolmogorov: determinant(m), arnold: determinant(bordered) };
}
