/**
 * Multiplicity spaces: for each irreducible K of a subgroup acting on V an exact basis of e V_K (see
 * subspace-search.ts). The forms S and ω restricted to it carry all that happens on the component of K.
 */
import { type Algebraic, gcd, type RealField } from '../field/index.ts';
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
import { addMultipleInPlace, ModularSpan, modularVector } from './modular-span.ts';
import { cutProjector, type OrbitVectors, orbitsOf, type Represented } from './seed-orbits.ts';
import { type Cutter, smallProduct } from './subspace-search.ts';
import type { ValueTable } from './value-table.ts';

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

/** Columns of a basis: sums of vectors of an orbit with the same coefficients, still to be carried out. */
interface Recipes {
  readonly coefficients: readonly Algebraic[];
  /** For each column the numbers of vectors of the orbit, in the order of `coefficients`. */
  readonly columns: readonly { readonly orbit: OrbitVectors; readonly images: Int32Array }[];
}

/** `expected` independent images of basis vectors under e P_K ρ(g). */
function findRecipes(rep: Represented, irreducible: PresentIrreducible, expected: number, cutter: Cutter): Recipes {
  const f = rep.field;
  const { group, dimension } = rep;
  const { orbits, reduction } = orbitsOf(rep);
  const { p } = reduction;
  const all = cutProjector(group, irreducible.character, cutter, f);
  const support = Int32Array.from(all.keys()).filter((x) => !f.isZero(all[x]!));
  const coefficients = Array.from(support, (x) => all[x]!);
  const residues = new Map<Algebraic, number>();
  for (const c of coefficients) if (!residues.has(c)) residues.set(c, reduction.apply(c));
  const reduced = Int32Array.from(coefficients, (c) => residues.get(c)!);
  const span = new ModularSpan(dimension, p);
  const scratch = new Int32Array(dimension);
  const weights = new Int32Array(group.order); // by vector of the orbit
  const step = strideOf(group.order);
  const product = smallProduct(group);
  const columns: { orbit: OrbitVectors; images: Int32Array }[] = [];
  for (const patience of [PATIENCE, group.order])
    for (const orbit of orbits)
      for (let i = 0, g = 0, failures = 0; i < group.order && failures < patience; i++, g = (g + step) % group.order) {
        if (columns.length === expected) return { coefficients, columns };
        const images = new Int32Array(support.length);
        scratch.fill(0);
        for (let q = 0; q < images.length; q++) {
          const k = orbit.of[product(support[q]!, g)]!;
          images[q] = k;
          const sum = weights[k]! - p + reduced[q]!;
          weights[k] = sum < 0 ? sum + p : sum;
        }
        for (let k = 0; k < orbit.modular.length; k++) {
          const weight = weights[k]!;
          if (weight === 0) continue;
          weights[k] = 0;
          addMultipleInPlace(scratch, orbit.modular[k]!, weight, p);
        }
        if (span.add(modularVector(scratch))) {
          failures = 0;
          columns.push({ orbit, images });
        } else failures++;
      }
  if (columns.length === expected) return { coefficients, columns };
  throw new Error(`a multiplicity space has dimension ${columns.length}, its character says ${expected}`);
}

/** Numbers of the coefficients of recipes. */
function numbered(values: ValueTable, coefficients: readonly Algebraic[]): number[] {
  const known = new Map<Algebraic, number>();
  return coefficients.map((c) => {
    let k = known.get(c);
    if (k === undefined) known.set(c, (k = values.number(c)));
    return k;
  });
}

function makeBasis(rep: Represented, irreducible: PresentIrreducible, expected: number, cutter: Cutter): Matrix<Algebraic> {
  const { field, dimension } = rep;
  const { values } = orbitsOf(rep);
  const recipes = findRecipes(rep, irreducible, expected, cutter);
  const numbers = numbered(values, recipes.coefficients);
  const columns = recipes.columns.map(({ orbit, images }) => {
    const places: number[] = [];
    const terms: number[] = [];
    for (let q = 0; q < images.length; q++) {
      const v = orbit.exact[images[q]!]!;
      for (let l = 0; l < v.length; l += 2) {
        places.push(v[l]!);
        terms.push(values.mul(numbers[q]!, v[l + 1]!));
      }
    }
    return values.sums(dimension, places, terms);
  });
  return tidy(fromColumns(field, columns, dimension), field);
}

/** The columns of `multiplicityBasis` in doubles, each up to a factor; which ones are independent is decided exactly. */
export function numericMultiplicityColumns(
  rep: Represented,
  present: readonly PresentIrreducible[],
  k: number,
  cutter: Cutter,
): Float64Array[] {
  const { values } = orbitsOf(rep);
  const { coefficients, columns } = findRecipes(rep, present[k]!, present[k]!.multiplicity * cutter.dimensions[k]!, cutter);
  const factors = Float64Array.from(numbered(values, coefficients), (c) => values.double(c));
  return columns.map(({ orbit, images }) => {
    const column = new Float64Array(rep.dimension);
    for (let q = 0; q < images.length; q++) {
      const v = orbit.exact[images[q]!]!;
      const c = factors[q]!;
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
