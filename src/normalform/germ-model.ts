/** A germ with its group modulo a prime: symbols get random residues, coordinates may be changed, codimensions are counted. */
import { LimitError, ShapeError } from '../errors/index.ts';
import { type Algebraic, type Field, invMod, mulAddMod, mulMod, powModInt, sqrtMod } from '../field/index.ts';
import type { GeneratorSet } from '../invariant/generators.ts';
import type { LinearAction } from '../invariant/linear-action.ts';
import { modularEchelon } from '../linear/index.ts';
import {
  type Monomial,
  multiplyMonomials,
  type Polynomial,
  type PolynomialRing,
  type RationalFunction,
  RationalFunctionField,
} from '../polynomial/index.ts';
import { Coinvariants, type ModularPolynomial } from './coinvariants.ts';
import { type ModularAction, modularAction, squareProduct } from './modular-action.ts';
import { combine, missingByDegree, orderOf, type TangentSpace, tangentSpace } from './tangent.ts';

export interface GermInput<T> {
  /** Γ on the kernel. */
  readonly action: LinearAction;
  readonly generators: GeneratorSet;
  /** Its variables are the coordinates of the action; coefficients in the field of the action, or rational functions over it. */
  readonly ring: PolynomialRing<T>;
  readonly h: Polynomial<T>;
  /** Degree up to which h is known. */
  readonly degree: number;
}

export interface GermModel {
  readonly p: number;
  readonly n: number;
  readonly coinvariants: Coinvariants;
  readonly h: ModularPolynomial;
  /** Images of the generators of the ring of invariants. */
  readonly generators: readonly { readonly name: string; readonly degree: number; readonly polynomial: ModularPolynomial }[];
}

/** Monomials of one degree beyond which a germ is not analysed. */
const MONOMIALS_MOST = 900;
/** Prefixed residues of symbols: powers of a fixed element, different for each prime. */
const SEED = 48_271;

/** The model modulo the prime with this index. Throws ShapeError if the coefficients do not fit the action. */
export function germModel<T>(input: GermInput<T>, index = 0): { model: GermModel; modular: ModularAction } {
  const modular = modularAction(input.action, index);
  const { p, reduction } = modular;
  const field = input.ring.field as Field<unknown>;
  let value: (c: T) => number;
  if (field instanceof RationalFunctionField) {
    if ((field.ring.field as unknown) !== modular.field)
      throw new ShapeError('the coefficients of the germ and the action have different fields');
    const residues = new Map(field.symbols.map((s, i) => [s, powModInt(SEED + index, 5 + 3 * i, p)]));
    const evaluate = (q: Polynomial<Algebraic>) => {
      let sum = 0;
      for (const [m, c] of field.ring.terms(q) as Iterable<[Monomial, Algebraic]>) {
        let t = reduction.apply(c);
        for (let i = 0; i < m.length; i++) t = mulMod(t, residues.get(field.symbols[m.charCodeAt(i)]!)!, p);
        sum = (sum + t) % p;
      }
      return sum;
    };
    value = (c) => {
      const r = c as unknown as RationalFunction<Algebraic>;
      return mulMod(evaluate(r.numerator), invMod(evaluate(r.denominator), p), p);
    };
  } else {
    if (field !== (modular.field as unknown)) throw new ShapeError('the coefficients of the germ and the action have different fields');
    value = (c) => reduction.apply(c as unknown as Algebraic);
  }
  const h = new Map<Monomial, number>();
  input.h.monomials.forEach((m, i) => {
    const x = value(input.h.coefficients[i]!);
    if (m.length <= input.degree && m.length > 0 && x !== 0) h.set(m, x);
  });
  const generators = input.generators.generators.map((g) => ({
    name: g.name,
    degree: g.degree,
    polynomial: new Map(g.polynomial.monomials.map((m, i) => [m, reduction.apply(g.polynomial.coefficients[i]!)] as const)),
  }));
  return {
    model: {
      p,
      n: modular.dimension,
      coinvariants: new Coinvariants({ n: modular.dimension, p, matrices: modular.generators }),
      h,
      generators,
    },
    modular,
  };
}

/** The model in coordinates y = m x. */
export function inCoordinates(model: GermModel, m: Int32Array): GermModel {
  const { n, p } = model;
  const inverse = inverseOf(m, n, p);
  const forms: ModularPolynomial[] = Array.from(
    { length: n },
    (_, i) =>
      new Map(Array.from({ length: n }, (_, j) => [String.fromCharCode(j), inverse[i * n + j]!] as const).filter(([, x]) => x !== 0)),
  );
  const change = (f: ModularPolynomial): ModularPolynomial => {
    const powers = new Map<Monomial, ModularPolynomial>([['', new Map([['', 1]])]]);
    const image = (mono: Monomial): ModularPolynomial => {
      let known = powers.get(mono);
      if (known === undefined) {
        known = multiplyModular(image(mono.slice(1)), forms[mono.charCodeAt(0)]!, p);
        powers.set(mono, known);
      }
      return known;
    };
    let out: ModularPolynomial = new Map();
    for (const [mono, c] of f) out = combine(out, image(mono), c, p);
    return out;
  };
  const matrices = model.coinvariants.generators.matrices.map((g) => squareProduct(m, squareProduct(g, inverse, n, p), n, p));
  return {
    p,
    n,
    coinvariants: new Coinvariants({ n, p, matrices }),
    h: change(model.h),
    generators: model.generators.map((g) => ({ ...g, polynomial: change(g.polynomial) })),
  };
}

export function multiplyModular(a: ModularPolynomial, b: ModularPolynomial, p: number): ModularPolynomial {
  const out = new Map<Monomial, number>();
  for (const [m, x] of a)
    for (const [k, y] of b) {
      const key = multiplyMonomials(m, k);
      const z = mulAddMod(out.get(key) ?? 0, x, y, p);
      if (z === 0) out.delete(key);
      else out.set(key, z);
    }
  return out;
}

function inverseOf(a: Int32Array, n: number, p: number): Int32Array {
  const wide = new Int32Array(n * 2 * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) wide[i * 2 * n + j] = a[i * n + j]!;
    wide[i * 2 * n + n + i] = 1;
  }
  const { matrix } = modularEchelon({ p, rows: n, cols: 2 * n, data: wide });
  const out = new Int32Array(n * n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) out[i * n + j] = matrix.data[i * 2 * n + n + j]!;
  return out;
}

/**
 * Coordinates z, z̄ on every plane among the blocks (the factors of its invariant quadratic form), others kept; undefined if
 * there is no plane, or a form does not split modulo this prime.
 */
export function complexPlanes(
  model: GermModel,
  blocks: readonly (readonly number[])[],
): { matrix: Int32Array } | 'no plane' | 'does not split' {
  const { n, p } = model;
  const planes = blocks.filter((b) => b.length === 2);
  if (planes.length === 0) return 'no plane';
  const matrix = new Int32Array(n * n);
  for (let i = 0; i < n; i++) matrix[i * n + i] = 1;
  for (const [x, y] of planes as [number, number][]) {
    const [cx, cy] = [String.fromCharCode(x), String.fromCharCode(y)];
    const forms = model.coinvariants.invariants(2, (m) => [...m].every((c) => c === cx || c === cy));
    if (forms.length !== 1) return 'no plane';
    const [a, b, c] = [cx + cx, cx + cy, cy + cy].map((m) => forms[0]!.get(m) ?? 0) as [number, number, number];
    if (a === 0) return 'does not split';
    const root = sqrtMod((mulMod(b, b, p) + p - mulMod(4, mulMod(a, c, p), p)) % p, p);
    if (root === undefined || root === 0) return 'does not split';
    // a x^2 + b x y + c y^2 = a (x + s y)(x + t y), s, t = (b ± root)/2a
    const scale = invMod(mulMod(2, a, p), p);
    matrix[x * n + y] = mulMod((b + root) % p, scale, p);
    matrix[y * n + x] = 1;
    matrix[y * n + y] = mulMod((b + p - root) % p, scale, p);
  }
  return { matrix };
}

export interface Codimension {
  readonly space: TangentSpace;
  /** Dimensions of the quotient by degree; degree 0 counts 1. */
  readonly missing: readonly number[];
  /** Without constants. */
  readonly codimension: number;
  /** Highest degree with something outside the tangent space. */
  readonly top: number;
}

/**
 * Codimension of h, looking as far as needed; undefined if it is not finite as far as degree `most` shows. The invariants of degree
 * above D lie in (maximal ideal)·(those of degree above D - step), step the highest degree of a generator, so by Nakayama's
 * lemma a stretch of `step` full degrees proves that everything above is full.
 */
export function codimensionOf(model: GermModel, h: ModularPolynomial, step: number, most: number): Codimension | undefined {
  const order = orderOf(h);
  if (order === Infinity) return undefined;
  for (let degree = order - 1 + step; ; ) {
    guard(model.n, degree);
    const c = countIn(tangentSpace(model.coinvariants, h, degree));
    if (c.top + step <= degree) return c;
    if (c.top > most) return undefined;
    degree = Math.max(degree + 1, c.top + step);
  }
}
export function countIn(space: TangentSpace): Codimension {
  const missing = missingByDegree(space);
  const codimension = missing.reduce((s, x) => s + x, 0) - missing[0]!;
  let top = missing.length - 1;
  while (top > 0 && missing[top] === 0) top--;
  return { space, missing, codimension, top };
}
function guard(n: number, degree: number): void {
  let count = 1;
  for (let i = 1; i < n; i++) count = (count * (degree + i)) / i;
  if (count > MONOMIALS_MOST)
    throw new LimitError('the germ needs more terms than are looked at', {
      value: `degree ${degree} in ${n} coordinates`,
      expected: `at most ${MONOMIALS_MOST} monomials of one degree`,
    });
}

/** Values of a polynomial in the coordinates of a tangent space. */
export function valuesOf(model: GermModel, f: ModularPolynomial, { offsets, degree }: TangentSpace): Int32Array {
  const v = new Int32Array(offsets.at(-1)!);
  model.coinvariants.addValuesInPlace(v, offsets, f, '', degree);
  return v;
}

export interface Product {
  readonly name: string;
  readonly degree: number;
  readonly polynomial: ModularPolynomial;
}

/**
 * Products that form a basis of the quotient graded by degree: in degree e, of what is left modulo the tangent space and the terms above e.
 * So a term is chosen that no change of coordinates trades for terms of higher degree.
 */
export function gradedBasis(model: GermModel, products: readonly Product[], { space, missing, top }: Codimension): Product[] {
  const width = space.offsets.at(-1)!;
  const out: Product[] = [];
  for (let e = 1; e <= top; e++) {
    if (missing[e] === 0) continue;
    const echelon = space.echelon.copy();
    for (let j = space.offsets[e + 1]!; j < width; j++) {
      const unit = new Int32Array(width);
      unit[j] = 1;
      echelon.addInPlace(unit);
    }
    for (const f of products) if (f.degree === e && echelon.addInPlace(valuesOf(model, f.polynomial, space))) out.push(f);
  }
  return out;
}

/** Products of the generators of degree at most d, by degree. */
export function productsUpTo(model: GermModel, d: number): Product[] {
  const out: Product[] = [];
  const extend = (from: number, name: string, degree: number, polynomial: ModularPolynomial) => {
    for (let g = from; g < model.generators.length; g++) {
      const { name: own, degree: e, polynomial: q } = model.generators[g]!;
      let f = polynomial;
      for (let k = 1; degree + k * e <= d; k++) {
        f = multiplyModular(f, q, model.p);
        const factor = k === 1 ? own : `${own}^${k}`;
        const label = name === '' ? factor : `${name}*${factor}`;
        out.push({ name: label, degree: degree + k * e, polynomial: f });
        extend(g + 1, label, degree + k * e, f);
      }
    }
  };
  extend(0, '', 0, new Map([['', 1]]));
  return out.sort((a, b) => a.degree - b.degree);
}
