/**
 * Multiplicity spaces: for each irreducible K of a subgroup acting on V an exact basis of e V_K (see
 * subspace-search.ts). The forms S and ω restricted to it carry all that happens on the component of K.
 */
import { type Algebraic, gcd, mulAddMod, type RealField } from '../field/index.ts';
import {
  build,
  fromColumns,
  inverse,
  type Matrix,
  minor,
  modularEchelon,
  multiply,
  type SparseMatrix,
  sparseFromMaps,
} from '../linear/index.ts';
import { ModularSpan, modularVector } from './modular-span.ts';
import { cutProjector, type OrbitVectors, orbitsOf, type Represented } from './seed-orbits.ts';
import { type Cutter, smallProduct } from './subspace-search.ts';

/** An irreducible as the construction needs it. */
export interface PresentIrreducible {
  readonly dimension: number;
  readonly beta: 1 | 2 | 4;
  readonly multiplicity: number;
  /** Real character by class, exact in the field of the action. */
  readonly character: readonly Algebraic[];
}

/** e = Σ λ(h) ρ(h), not divided by |H|. */
export function cutterMatrix(rep: Represented, cutter: Cutter): SparseMatrix<Algebraic> {
  const f = rep.field;
  const maps = Array.from({ length: rep.dimension }, () => new Map<number, Algebraic>());
  cutter.elements.forEach((e, i) => {
    const m = rep.matrix(e);
    const negative = cutter.signs[i] === -1;
    m.index.forEach((cols, r) => {
      const map = maps[r]!;
      cols.forEach((j, k) => {
        const x = negative ? f.neg(m.value[r]![k]!) : m.value[r]![k]!;
        const old = map.get(j);
        map.set(j, old === undefined ? x : f.add(old, x));
      });
    });
  });
  return sparseFromMaps(f, rep.dimension, maps);
}

/** Pivot columns of a matrix modulo a prime: independent over the field because they are modulo p. */
function pivotColumns(a: Matrix<Algebraic>, field: RealField): number[] {
  const r = field.reduction();
  return modularEchelon({ p: r.p, rows: a.rows, cols: a.cols, data: Int32Array.from(a.data, (x) => r.apply(x)) }).pivots;
}

/** Coordinates: X with basis·X = images, for images in the span; rows chosen once. */
export function coordinateMap(basis: Matrix<Algebraic>, field: RealField): (images: Matrix<Algebraic>) => Matrix<Algebraic> {
  const rows = pivotColumns(
    build(field, basis.cols, basis.rows, (i, j) => basis.data[j * basis.cols + i]!),
    field,
  );
  const all = Array.from({ length: basis.cols }, (_, j) => j);
  const inv = inverse(minor(basis, rows, all));
  return (images) =>
    multiply(
      inv,
      minor(
        images,
        rows,
        Array.from({ length: images.cols }, (_, j) => j),
      ),
    );
}

/** Candidates in a row that may add nothing before the next orbit is tried. */
const PATIENCE = 6;

/**
 * Basis of e V_K for the irreducible number k of `present`; columns, dimension × (multiplicity · dim eK): images of a few
 * basis vectors of V under e P_K ρ(g), P_K the projector onto the component. Independence is seen modulo a prime, the
 * dimension is that of the character.
 */
export function multiplicityBasis(rep: Represented, present: readonly PresentIrreducible[], k: number, cutter: Cutter): Matrix<Algebraic> {
  const key = `${present[k]!.character.map((x) => rep.field.key(x)).join(' ')} ${cutter.elements.join()} ${cutter.signs.join()}`;
  let known = bases.get(rep);
  if (known === undefined) {
    known = new Map();
    bases.set(rep, known);
  }
  let basis = known.get(key);
  if (basis === undefined) {
    basis = makeBasis(rep, present[k]!, present[k]!.multiplicity * cutter.dimensions[k]!, cutter);
    known.set(key, basis);
  }
  return basis;
}

/** Bases made so far: the flow and the components often ask for the same ones. */
const bases = new WeakMap<Represented, Map<string, Matrix<Algebraic>>>();

/** A column of a basis: coefficients and the vectors of an orbit that they belong to. */
interface Recipe {
  readonly orbit: OrbitVectors;
  /** Numbers of vectors of the orbit, in the order of `coefficients`. */
  readonly images: Int32Array;
  readonly coefficients: readonly Algebraic[];
}

/** `expected` independent images of basis vectors under e P_K ρ(g), as sums still to be carried out. */
function findRecipes(rep: Represented, irreducible: PresentIrreducible, expected: number, cutter: Cutter): Recipe[] {
  const f = rep.field;
  const { group, dimension } = rep;
  const { orbits, reduction } = orbitsOf(rep);
  const { p } = reduction;
  const all = cutProjector(group, irreducible.character, cutter, f);
  const support = all.map((_, x) => x).filter((x) => !f.isZero(all[x]!));
  const coefficients = support.map((x) => all[x]!);
  const reduced = coefficients.map((x) => reduction.apply(x));
  const span = new ModularSpan(dimension, p);
  const scratch = new Int32Array(dimension);
  const step = strideOf(group.order);
  const product = smallProduct(group);
  const out: Recipe[] = [];
  for (const patience of [PATIENCE, group.order])
    for (const orbit of orbits)
      for (let i = 0, g = 0, failures = 0; i < group.order && failures < patience; i++, g = (g + step) % group.order) {
        if (out.length === expected) return out;
        const images = new Int32Array(support.length);
        scratch.fill(0);
        for (let q = 0; q < images.length; q++) {
          images[q] = orbit.of[product(support[q]!, g)]!;
          const v = orbit.modular[images[q]!]!;
          for (let j = 0; j < v.length; j += 2) scratch[v[j]!] = mulAddMod(scratch[v[j]!]!, reduced[q]!, v[j + 1]!, p);
        }
        if (span.add(modularVector(scratch))) {
          failures = 0;
          out.push({ orbit, images, coefficients });
        } else failures++;
      }
  if (out.length === expected) return out;
  throw new Error(`a multiplicity space has dimension ${out.length}, its character says ${expected}`);
}

function makeBasis(rep: Represented, irreducible: PresentIrreducible, expected: number, cutter: Cutter): Matrix<Algebraic> {
  const f = rep.field;
  const { values } = orbitsOf(rep);
  const columns = findRecipes(rep, irreducible, expected, cutter).map(({ orbit, images, coefficients }) => {
    const numbers = coefficients.map((x) => values.number(x));
    const places: number[] = [];
    const terms: number[] = [];
    for (let q = 0; q < images.length; q++) {
      const v = orbit.exact[images[q]!]!;
      for (let l = 0; l < v.length; l += 2) {
        places.push(v[l]!);
        terms.push(values.mul(numbers[q]!, v[l + 1]!));
      }
    }
    return values.sums(rep.dimension, places, terms);
  });
  return tidy(fromColumns(f, columns, rep.dimension), f);
}

/** The columns of `multiplicityBasis` in doubles, each up to a factor; which ones are independent is decided exactly. */
export function numericMultiplicityColumns(
  rep: Represented,
  present: readonly PresentIrreducible[],
  k: number,
  cutter: Cutter,
): Float64Array[] {
  const recipes = findRecipes(rep, present[k]!, present[k]!.multiplicity * cutter.dimensions[k]!, cutter);
  const { values } = orbitsOf(rep);
  return recipes.map(({ orbit, images, coefficients }) => {
    const column = new Float64Array(rep.dimension);
    for (let q = 0; q < images.length; q++) {
      const v = orbit.exact[images[q]!]!;
      const c = values.double(values.number(coefficients[q]!));
      for (let l = 0; l < v.length; l += 2) column[v[l]!]! += c * values.double(v[l + 1]!);
    }
    return column;
  });
}

/** A step that visits all elements, far apart: neighbours in the numbering tend to give the same vector again. */
function strideOf(order: number): number {
  let step = Math.max(1, Math.round(order * 0.618));
  while (gcd(BigInt(step), BigInt(order)) !== 1n) step++;
  return step % order;
}

/** The same column space with integral columns, echelon from the top, common factors removed. */
export function tidy(basis: Matrix<Algebraic>, field: RealField): Matrix<Algebraic> {
  const columns: Algebraic[][] = [];
  for (let j = 0; j < basis.cols; j++) {
    let common = 1n;
    const col: Algebraic[] = [];
    for (let i = 0; i < basis.rows; i++) {
      const x = basis.data[i * basis.cols + j]!;
      col.push(x);
      if (x.d !== 1n && common % x.d !== 0n) common = lcm(common, x.d);
    }
    let content = 0n;
    const cleared = common === 1n ? col : col.map((x) => (x === field.zero ? x : { c: x.c.map((y) => y * (common / x.d)), d: 1n }));
    for (const x of cleared) {
      if (content === 1n) break;
      if (x !== field.zero) for (const y of x.c) if (y !== 0n) content = gcd(content, y);
    }
    columns.push(content > 1n ? cleared.map((x) => (x === field.zero ? x : { c: x.c.map((y) => y / content), d: 1n })) : cleared);
  }
  return fromColumns(field, columns, basis.rows);
}

function lcm(a: bigint, b: bigint): bigint {
  return (a / gcd(a, b)) * b;
}
