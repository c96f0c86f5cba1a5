/**
 * A Hamiltonian about its equilibrium as a structure for the search of signed permutations. Where H is a function of
 * the momenta plus one of the coordinates and the model gives no form of its own, coordinates go to coordinates and the momenta follow;
 * else all variables of the phase space may be exchanged as long as ω is kept up to the sign of time.
 */
import type { Algebraic, RealField } from '../field/index.ts';
import type { SparseMatrix } from '../linear/index.ts';
import { factorsOf, type Polynomial } from '../polynomial/index.ts';
import type { FormEntry, SignedPermutation, SignedStructure, StructureTerm, Weight } from './find-symmetry-structure.ts';

/** Numbers the absolute values that occur. */
class Sizes<T> {
  readonly #known = new Map<string, number>();
  readonly #key: (size: T) => string;
  readonly #sign: (x: T) => number;
  readonly #negate: (x: T) => T;
  constructor(key: (size: T) => string, sign: (x: T) => number, negate: (x: T) => T) {
    this.#key = key;
    this.#sign = sign;
    this.#negate = negate;
  }
  /** Undefined for zero. */
  of(x: T): Weight | undefined {
    const sign = this.#sign(x);
    if (sign === 0) return undefined;
    const key = this.#key(sign < 0 ? this.#negate(x) : x);
    let size = this.#known.get(key);
    if (size === undefined) {
      size = this.#known.size + 1;
      this.#known.set(key, size);
    }
    return { size, sign: sign < 0 ? -1 : 1 };
  }
}

const exactSizes = (field: RealField) =>
  new Sizes<Algebraic>(
    (x) => field.key(x),
    (x) => field.sign(x),
    (x) => field.neg(x),
  );

function separable(terms: readonly { readonly variables: readonly number[] }[], half: number): boolean {
  return terms.every(({ variables: v }) => v.length === 0 || v.every((x) => x < half) || v.every((x) => x >= half));
}

const kindsOf = (n: number, lifted: boolean) => Array.from({ length: n }, (_, i) => (lifted && i >= n / 2 ? 1 : 0));

/**
 * From an exact polynomial in the n phase variables and, after them, parameters that no symmetry moves; W; and the point that must
 * stay. A coefficient is then a polynomial in the parameters. `lift`: momenta follow the coordinates where H allows it.
 */
export function structureOfPolynomial(
  polynomial: Polynomial<Algebraic>,
  form: SparseMatrix<Algebraic>,
  point: readonly Algebraic[],
  field: RealField,
  lift: boolean,
): SignedStructure {
  const n = form.rows;
  const coefficients = new Map<string, [parameters: string, value: Algebraic][]>();
  polynomial.monomials.forEach((m, k) => {
    let split = 0;
    while (split < m.length && m.charCodeAt(split) < n) split++;
    const phase = m.slice(0, split);
    const part = [m.slice(split), polynomial.coefficients[k]!] as [string, Algebraic];
    const known = coefficients.get(phase);
    if (known === undefined) coefficients.set(phase, [part]);
    else known.push(part);
  });
  // monomials come in one order, so equal polynomials give equal lists
  const sizes = new Sizes<readonly (readonly [string, Algebraic])[]>(
    (parts) => parts.map(([m, c]) => `${m}:${field.key(c)}`).join(';'),
    (parts) => field.sign(parts[0]![1]),
    (parts) => parts.map(([m, c]) => [m, field.neg(c)] as const),
  );
  const terms: StructureTerm[] = [];
  for (const [phase, parts] of coefficients) {
    if (phase === '') continue;
    const factors = factorsOf(phase);
    terms.push({ variables: factors.map((f) => f[0]), exponents: factors.map((f) => f[1]), weight: sizes.of(parts)! });
  }
  const places = exactSizes(field);
  return {
    count: n,
    terms,
    form: formEntries(form, field),
    kinds: kindsOf(n, lift && separable(terms, n / 2)),
    values: point.map((x) => places.of(x)),
  };
}

/** Classes of floating sizes: sorted, a new class starts where the gap to the value before exceeds the tolerance; 0 for those below it. */
function clusters(sizes: readonly number[], tolerance: number): (x: number) => number {
  const starts: number[] = [];
  let last = Number.NEGATIVE_INFINITY;
  for (const x of sizes.filter((v) => v > tolerance).sort((a, b) => a - b)) {
    if (x - last > tolerance) starts.push(x);
    last = x;
  }
  return (x) => {
    if (x <= tolerance) return 0;
    let [low, high] = [0, starts.length];
    while (low < high) {
      const middle = (low + high) >> 1;
      if (starts[middle]! <= x) low = middle + 1;
      else high = middle;
    }
    return low;
  };
}

/** From a floating Hessian, W and the equilibrium: what differs by at most `tolerance` counts as equal. */
export function structureOfHessian(
  hessian: ArrayLike<number>,
  form: SparseMatrix<Algebraic>,
  point: ArrayLike<number>,
  field: RealField,
  tolerance: number,
  lift: boolean,
): SignedStructure {
  const n = form.rows;
  const entry = (i: number, j: number) => (hessian[i * n + j]! + hessian[j * n + i]!) / 2;
  const sizes: number[] = [];
  for (let i = 0; i < n; i++) for (let j = i; j < n; j++) sizes.push(Math.abs(entry(i, j)));
  const classOf = clusters(sizes, tolerance);
  const weightOf = (x: number, size: number): Weight | undefined => (size === 0 ? undefined : { size, sign: x < 0 ? -1 : 1 });
  const terms: StructureTerm[] = [];
  for (let i = 0; i < n; i++)
    for (let j = i; j < n; j++) {
      const x = entry(i, j);
      const weight = weightOf(x, classOf(Math.abs(x)));
      if (weight === undefined) continue;
      terms.push(i === j ? { variables: [i], exponents: [2], weight } : { variables: [i, j], exponents: [1, 1], weight });
    }
  const places = clusters(Array.from(point, Math.abs), tolerance);
  return {
    count: n,
    terms,
    form: formEntries(form, field),
    kinds: kindsOf(n, lift && separable(terms, n / 2)),
    values: Array.from(point, (x) => weightOf(x, places(Math.abs(x)))),
  };
}

function formEntries(form: SparseMatrix<Algebraic>, field: RealField): FormEntry[] {
  const sizes = exactSizes(field);
  return form.index.flatMap((cols, i) => cols.flatMap((j, k) => (j > i ? [{ i, j, weight: sizes.of(form.value[i]![k]!)! }] : [])));
}

/** A signed permutation as a matrix on the phase space is one entry ±1 in each row; undefined for any other matrix. */
export function asSignedPermutation(matrix: SparseMatrix<Algebraic>, field: RealField, sign: 1 | -1): SignedPermutation | undefined {
  const n = matrix.rows;
  const images = new Int32Array(n + 1);
  const signs = new Int8Array(n + 1);
  const minus = field.neg(field.one);
  for (let i = 0; i < n; i++) {
    if (matrix.index[i]!.length !== 1) return undefined;
    const from = matrix.index[i]![0]!;
    const x = matrix.value[i]![0]!;
    if (field.equal(x, field.one)) signs[from] = 1;
    else if (field.equal(x, minus)) signs[from] = -1;
    else return undefined;
    images[from] = i;
  }
  images[n] = n;
  signs[n] = sign;
  return { images, signs };
}

/** ρ with x ↦ ρx: new x_{images[i]} = signs[i] · old x_i. */
export function permutationMatrix(g: SignedPermutation, field: RealField): SparseMatrix<Algebraic> {
  const n = g.images.length - 1;
  const index: number[][] = Array.from({ length: n }, () => []);
  const value: Algebraic[][] = Array.from({ length: n }, () => []);
  for (let i = 0; i < n; i++) {
    index[g.images[i]!]!.push(i);
    value[g.images[i]!]!.push(g.signs[i] === 1 ? field.one : field.neg(field.one));
  }
  return { field, rows: n, cols: n, index, value };
}

/** In the language of model files: `q1: q2, q2: -q1`; momenta are left out where they follow by the lift. Empty for the identity. */
export function permutationText(g: SignedPermutation, names: readonly string[]): string {
  const n = g.images.length - 1;
  const half = n / 2;
  const sigma = g.signs[n]!;
  let lifted = true;
  for (let i = 0; i < half; i++)
    if (g.images[i]! >= half || g.images[i + half] !== g.images[i]! + half || g.signs[i + half] !== g.signs[i]! * sigma) lifted = false;
  const parts: string[] = [];
  const from = new Int32Array(n);
  for (let i = 0; i < n; i++) from[g.images[i]!] = i;
  for (let j = 0; j < (lifted ? half : n); j++) {
    const i = from[j]!;
    if (i !== j || g.signs[i] !== 1) parts.push(`${names[j]}: ${g.signs[i] === 1 ? '' : '-'}${names[i]}`);
  }
  return parts.join(', ');
}
