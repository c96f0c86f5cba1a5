/**
 * From a declaration with floating numbers to what the commands start from: H in doubles, the exact action, the equilibrium polished by
 * Newton's method inside the fixed space of the group, and the invariance of H within the tolerance.
 */
import { type Action, type Components, makeAction, signOf, withCharacters } from '../action/index.ts';
import { InputError, NotAGroupError, NotAnEquilibriumError } from '../errors/index.ts';
import { DEFAULT_TOLERANCE } from '../event/floating/readings.ts';
import { largestEntry, type NumberMatrix, numberCombine, numberMatrix } from '../linear/index.ts';
import { symmetricEigen } from '../linear/spectral.ts';
import { doubles, gradientNumeric, parseExpression } from '../model/expression/index.ts';
import type { TermSizes } from '../model/floating-addends.ts';
import { energyOfExpression, type FloatingEnergy, type FloatingLocal } from '../model/floating-energy.ts';
import { energyOfMatrices } from '../model/floating-matrices.ts';
import { numericValue } from '../model/numeric-value.ts';
import {
  applyNumeric,
  congruenceNumeric,
  type NumericAction,
  numberSparse,
  numericAction,
  numericMultiplicityBasis,
} from './floating-action.ts';
import { labelledComponents } from './labels.ts';
import { type FloatingNeutral, floatingNeutral } from './neutral-floating.ts';
import { formFailure, type GeneratorCheck, type NotExact, requireGenerators } from './prepare.ts';

/** A declared point that polishing moves by more than this share of 1 + |x| is not near an equilibrium. */
export const LONGEST_STEP = 1e-2;
const NEWTON_STEPS = 40;

export interface FloatingEquilibrium {
  readonly holds: boolean;
  /** Largest entry of ∇H at the declared and at the polished point. */
  readonly declaredGradient: number;
  readonly gradient: number;
  /** Distance between the two. */
  readonly step: number;
  readonly iterations: number;
  readonly point: Float64Array;
}

export interface FloatingPrepared {
  readonly source: NotExact;
  readonly because: string;
  readonly tolerance: number;
  readonly generators: readonly GeneratorCheck[];
  /** Absent where a generator is neither symplectic nor antisymplectic. */
  readonly action?: Action;
  /** Generators of no finite group declare no symmetry, whatever each of them keeps. */
  readonly notAGroup?: NotAGroupError;
  readonly components?: Components;
  readonly equilibrium: FloatingEquilibrium;
  readonly hessian: NumberMatrix;
  readonly sizes: TermSizes;
  readonly local: FloatingLocal;
  /** Derivative of the declared point by each varied parameter. */
  readonly branch: readonly Float64Array[];
  readonly symmetryHolds: boolean;
  /** Declared continuous symmetries. */
  readonly neutral?: FloatingNeutral;
}

/** `--tolerance`, or the default. Throws InputError. */
export function toleranceOf(text: string | undefined): number {
  if (text === undefined) return DEFAULT_TOLERANCE;
  const t = numericValue(parseExpression(text, { key: 'tolerance' }), new Map());
  if (t > 0 && t < 1) return t;
  throw new InputError('the tolerance must lie between 0 and 1', { key: 'tolerance', value: text, expected: 'a number such as 1e-7' });
}

function energyOf(source: NotExact, values: ReadonlyMap<string, number>): FloatingEnergy {
  const { declaration, quantities, hamiltonian } = source;
  const { kind } = declaration.energy;
  if (hamiltonian === undefined || kind === 'hessian' || kind === 'mechanical')
    return energyOfMatrices(declaration, quantities.definitions, values, declaration.vary);
  return energyOfExpression(hamiltonian, quantities.names, values);
}

/** Fix(Γ) in orthonormal columns; the vectors are those of the numeric action. */
function fixedVectors(components: Components, numeric: NumericAction): Float64Array[] {
  const trivial = components.present.find((c) => c.irreducible.index === 0);
  if (trivial === undefined) return [];
  const k = trivial.irreducible;
  return numericMultiplicityBasis(numeric, components.whole, k, undefined, k.multiplicity).map((v) => {
    const out = new Float64Array(numeric.dimension);
    v.index.forEach((i, q) => {
      out[i] = v.value[q]!;
    });
    return out;
  });
}

const dot = (a: ArrayLike<number>, b: ArrayLike<number>) => {
  let s = 0;
  for (let i = 0; i < a.length; i++) s += a[i]! * b[i]!;
  return s;
};
const largest = (v: Float64Array) => v.reduce((m, x) => Math.max(m, Math.abs(x)), 0);
const length = (v: Float64Array) => Math.sqrt(dot(v, v));

/** Newton's method for ∇H = 0 in the span of `fixed`; directions in which S is below the tolerance are left alone. */
function polish(energy: FloatingEnergy, declared: Float64Array, fixed: readonly Float64Array[], tolerance: number): FloatingEquilibrium {
  const f = fixed.length;
  const declaredGradient = largest(energy.gradient(declared));
  let x = new Float64Array(declared.length);
  for (const v of fixed) {
    const s = dot(v, declared);
    for (let i = 0; i < x.length; i++) x[i]! += s * v[i]!;
  }
  const { gradient: scale, hessian: terms } = energy.sizes(x);
  const floor = 4 * Number.EPSILON * scale;
  const hessianScale = largestEntry(terms);
  let g = energy.gradient(x);
  let iterations = 0;
  for (; iterations < NEWTON_STEPS && largest(g) > floor && f > 0; iterations++) {
    const s = energy.hessian(x);
    const images = fixed.map((v) =>
      Float64Array.from({ length: x.length }, (_, i) => dot(s.data.subarray(i * x.length, (i + 1) * x.length), v)),
    );
    const small = new Float64Array(f * f);
    for (let a = 0; a < f; a++) for (let b = 0; b < f; b++) small[a * f + b] = dot(fixed[a]!, images[b]!);
    const { values, vectors } = symmetricEigen(small, f);
    const right = fixed.map((v) => dot(v, g));
    const step = new Float64Array(f);
    values.forEach((value, k) => {
      if (Math.abs(value) <= tolerance * hessianScale) return;
      let c = 0;
      for (let a = 0; a < f; a++) c += vectors.data[a * f + k]! * right[a]!;
      for (let a = 0; a < f; a++) step[a]! -= (c / value) * vectors.data[a * f + k]!;
    });
    const next = x.slice();
    fixed.forEach((v, a) => {
      for (let i = 0; i < next.length; i++) next[i]! += step[a]! * v[i]!;
    });
    const after = energy.gradient(next);
    if (!(largest(after) < largest(g))) break;
    x = next;
    g = after;
    if (length(step) <= 4 * Number.EPSILON * (1 + length(x))) break;
  }
  const step = length(x.map((v, i) => v - declared[i]!));
  const gradient = largest(g);
  const small = gradient <= Math.max(tolerance * tolerance, 1e-11) * Math.max(scale, hessianScale * length(x));
  return {
    holds: small && step <= LONGEST_STEP * (1 + length(declared)),
    declaredGradient,
    gradient,
    step,
    iterations,
    point: x,
  };
}

/** x'(μ) of the declared equilibrium. */
function branchDerivatives(source: NotExact, values: ReadonlyMap<string, number>): Float64Array[] {
  const { names, pointExpressions } = source.quantities;
  const parameters = [...values.keys()];
  const at = [...values.values()];
  const gradients = names.map((name) => {
    const e = pointExpressions.get(name);
    return e === undefined ? undefined : gradientNumeric(e, parameters)(at);
  });
  return source.declaration.vary.map((v) => Float64Array.from(gradients, (g) => g?.[parameters.indexOf(v)] ?? 0));
}

/** The action of the declared group, or why the generators make none. */
function groupAction({ field, form, generators }: NotExact['quantities'], orderLimit: number | undefined): Action | NotAGroupError {
  try {
    return withCharacters(
      makeAction(
        field,
        form,
        generators.map((g) => ({ name: g.name, matrix: g.matrix })),
        orderLimit,
      ),
    );
  } catch (error) {
    if (error instanceof NotAGroupError) return error;
    throw error;
  }
}

/** Reads a floating model. Throws InputError for what cannot be read; checks that fail are recorded. */
export function prepareFloating(source: NotExact): FloatingPrepared {
  const { declaration, quantities, because } = source;
  const tolerance = toleranceOf(declaration.tolerance);
  if (declaration.unset.length > 0) {
    const name = declaration.unset[0]!;
    throw new InputError(`the parameter ${name} has no value`, {
      file: declaration.source,
      key: `parameters.${name}`,
      value: name,
      expected: 'a value for every parameter',
      next: `give it one in the file or with --set ${name}=…`,
    });
  }
  const { field, form } = quantities;
  const values = new Map([...quantities.values].map(([k, v]) => [k, field.toNumber(v)]));
  const energy = energyOf(source, values);
  const n = quantities.names.length;
  const signs = quantities.generators.map((g) => signOf(g.matrix, form));
  const group = signs.includes(undefined) ? undefined : groupAction(quantities, declaration.orderLimit);
  const notAGroup = group instanceof NotAGroupError ? group : undefined;
  const action = group instanceof NotAGroupError ? undefined : group;
  const components = action === undefined ? undefined : labelledComponents(declaration, action);
  const declared = Float64Array.from(quantities.point, (x) => field.toNumber(x));
  const plain = action === undefined ? undefined : numericAction(action, new Float64Array(n).fill(1));
  const fixed = plain === undefined ? [] : fixedVectors(components!, plain);
  const equilibrium =
    plain === undefined
      ? { ...polish(energy, declared, [], tolerance), point: declared, step: 0 }
      : polish(energy, declared, fixed, tolerance);
  const hessian = energy.hessian(equilibrium.point);
  const sizes = energy.sizes(equilibrium.point);
  const local = energy.local(equilibrium.point, declaration.vary);
  const scale = largestEntry(sizes.hessian);
  const generators = quantities.generators.map((g, i): GeneratorCheck => {
    const sign = signs[i];
    const matrix = numberSparse(g.matrix, field);
    const reason = formFailure(g.name, sign, g.declared);
    const fail = (text: string): GeneratorCheck => ({ ...base, invariant: false, reason: reason ?? text });
    const base = {
      name: g.name,
      where: g.where,
      matrix: g.matrix,
      sign,
      ...(g.declared === undefined ? {} : { declared: g.declared }),
      invariant: true,
      ...(reason === undefined ? {} : { reason }),
    };
    const moved = applyNumeric(matrix, declared);
    const where = moved.findIndex((x, k) => Math.abs(x - declared[k]!) > LONGEST_STEP * (1 + length(declared)));
    if (where >= 0) return fail(`${g.name} moves the equilibrium: ${quantities.names[where]} changes`);
    const difference = numberCombine(congruenceNumeric(matrix, hessian), hessian, -1);
    const worst = difference.data.reduce((best, x, k) => (Math.abs(x) > Math.abs(difference.data[best]!) ? k : best), 0);
    // the terms of ρᵀSρ before they cancel, where ρ mixes coordinates
    const spread = { index: matrix.index, value: matrix.value.map((row) => row.map(Math.abs)) };
    const bound = Math.max(scale, largestEntry(congruenceNumeric(spread, sizes.hessian)));
    if (Math.abs(difference.data[worst] ?? 0) > tolerance * bound) {
      const [a, b] = [Math.floor(worst / n), worst % n];
      return fail(
        `H is not invariant under ${g.name}: the coefficient of ${a === b ? `${quantities.names[a]}^2` : `${quantities.names[b]}*${quantities.names[a]}`} changes by ${(difference.data[worst]! / (a === b ? 2 : 1)).toPrecision(3)}, terms of size ${bound.toPrecision(3)}`,
      );
    }
    if (local.higher === undefined) return base;
    const { ring, polynomial } = local.higher;
    const size = polynomial.coefficients.reduce((m, c) => Math.max(m, Math.abs(c)), 0);
    const width = ring.variables.length;
    const data = new Array<number>(width * width).fill(0);
    for (let r = 0; r < width; r++) {
      if (r >= n) data[r * width + r] = 1;
      else
        matrix.index[r]!.forEach((c, k) => {
          data[r * width + c] = matrix.value[r]![k]!;
        });
    }
    const change = ring.sub(ring.linearSubstitution(polynomial, { field: doubles, rows: width, cols: width, data }), polynomial);
    let top = -1;
    change.coefficients.forEach((c, k) => {
      if (Math.abs(c) > (top < 0 ? tolerance * size : Math.abs(change.coefficients[top]!))) top = k;
    });
    if (top < 0) return base;
    const term = { ...change, monomials: [change.monomials[top]!], coefficients: [change.coefficients[top]!] };
    return fail(`H is not invariant under ${g.name}: H∘ρ − H contains ${ring.format(term)}`);
  });
  const neutral = floatingNeutral(source, { point: equilibrium.point, hessian, local, scale, tolerance }, generators);
  return {
    source,
    because,
    tolerance,
    generators,
    ...(action === undefined ? {} : { action, components: components! }),
    equilibrium,
    hessian,
    sizes,
    local,
    ...(neutral === undefined ? {} : { neutral }),
    branch: branchDerivatives(source, values),
    ...(notAGroup === undefined ? {} : { notAGroup }),
    symmetryHolds: notAGroup === undefined && generators.every((g) => g.reason === undefined),
  };
}

/** Stops where the model is not what it claims, with the words of `check`. */
export function requireFloatingHolds(p: FloatingPrepared): asserts p is FloatingPrepared & { action: Action; components: Components } {
  if (p.notAGroup !== undefined) throw p.notAGroup;
  const file = p.source.declaration.source;
  const next = 'see all of it with symcodim check';
  requireGenerators(p.generators, file, next);
  const e = p.equilibrium;
  if (!e.holds)
    throw new NotAnEquilibriumError(
      `the point is not near an equilibrium: ∇H is ${e.declaredGradient.toPrecision(3)} there, and ${e.gradient.toPrecision(3)} after Newton's method moved it by ${e.step.toPrecision(3)}`,
      { file, key: 'equilibrium', expected: '∇H = 0', next },
    );
}

/** Fix(Γ) as columns in the coordinates x'. */
export function fixedColumns(components: Components, numeric: NumericAction): NumberMatrix {
  const vectors = fixedVectors(components, numeric);
  const n = numeric.dimension;
  const data = new Float64Array(n * vectors.length);
  vectors.forEach((v, j) => {
    for (let i = 0; i < n; i++) data[i * vectors.length + j] = v[i]!;
  });
  return numberMatrix(n, vectors.length, data);
}
