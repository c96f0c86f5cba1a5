/**
 * The numbers of a linear analysis found again from the certified matrices alone, by routes that the analysis itself
 * does not take: no character table, no adapted basis for the group side, no symplectic reduction, no formula.
 */
import { InputError } from '../errors/index.ts';
import type { Algebraic, Reduction } from '../field/index.ts';
import { RealField } from '../field/index.ts';
import {
  congruence,
  inverse,
  isZeroMatrix,
  kernel,
  type Matrix,
  type ModularMatrix,
  modularRank,
  modularTranspose,
  multiply,
  transpose,
} from '../linear/index.ts';
import { exactValue, parseExpression, withField } from '../model/expression/index.ts';
import type { EntryTexts, LinearCertificate } from './certificate.ts';
import { conjugatesOf, solveModular, wordMatrix } from './verify-conjugates.ts';
import { inertiaByDescartes } from './verify-inertia.ts';
import {
  blocksOf,
  bruteCodimension,
  generalisedKernelModular,
  genericVector,
  inducedOn,
  nullities,
  type Orbit,
  orbitOf,
  orbitSpan,
  type SignedMatrix,
  traceMeans,
} from './verify-modular.ts';

/** A number that two routes do not agree on. */
export interface Disagreement {
  readonly key: string;
  readonly expected: string;
  readonly found: string;
  /** The route that gave the expected value. */
  readonly route: string;
}

/** What is compared: key, value in the file, value found, route. */
export type Compare = (key: string, found: unknown, expected: unknown, route: string) => void;

/** Largest space on which the adjoint map is set up without any decomposition. */
const BRUTE_DIMENSION = 20;
/** Largest number of field operations for the traces of all elements. */
const TRACE_WORK = 4e8;
/** Largest matrix whose characteristic polynomial is computed exactly. */
const EXACT_DIMENSION = 24;
const ORDER_LIMIT = 20_000;
/** Largest dimension that is read. */
const LARGEST = 5000;
/** Fields of a higher degree must be the one that the result names. */
const PLAIN_DEGREE = 32;

interface Exact {
  readonly field: RealField;
  readonly form: Matrix<Algebraic>;
  readonly hessian: Matrix<Algebraic>;
  readonly generators: readonly Matrix<Algebraic>[];
  readonly bases: readonly Matrix<Algebraic>[];
  readonly blocks: readonly Matrix<Algebraic>[];
  readonly kernel: Matrix<Algebraic> | undefined;
}

function exactMatrices(c: LinearCertificate): Exact {
  const { field, result } = withField((f) => {
    const cache = new Map<string, Algebraic>();
    const value = (text: string): Algebraic => {
      const known = cache.get(text);
      if (known !== undefined) return known;
      const x = exactValue(parseExpression(text), undefined, f);
      cache.set(text, x);
      return x;
    };
    const read = (rows: number, cols: number, entries: EntryTexts): Matrix<Algebraic> => {
      if (![rows, cols].every((x) => Number.isInteger(x) && x >= 0 && x <= LARGEST)) throw new InputError(`a matrix of ${rows} × ${cols}`);
      const data = new Array<Algebraic>(rows * cols).fill(f.zero);
      for (const [i, j, text] of entries) {
        if (!(Number.isInteger(i) && Number.isInteger(j) && i >= 1 && i <= rows && j >= 1 && j <= cols))
          throw new InputError(`an entry (${i}, ${j}) in a matrix of ${rows} × ${cols}`);
        data[(i - 1) * cols + (j - 1)] = value(text);
      }
      return { field: f, rows, cols, data };
    };
    const n = c.dimension;
    return {
      form: read(n, n, c.form),
      hessian: read(n, n, c.hessian),
      generators: c.generators.map((g) => read(n, n, g.matrix)),
      bases: c.components.map((x) => read(n, x.columns, x.basis)),
      blocks: c.components.map((x) => read(x.columns, x.columns, x.block)),
      kernel: c.rank.kernel === undefined ? undefined : read(n, c.rank.kernel.columns, c.rank.kernel.entries),
    };
  }, RealField.of());
  return { field, ...result };
}

const reduce = (a: Matrix<Algebraic>, r: Reduction): ModularMatrix => ({
  p: r.p,
  rows: a.rows,
  cols: a.cols,
  data: Int32Array.from(a.data, (x) => r.apply(x)),
});

const same = (a: Matrix<Algebraic>, b: Matrix<Algebraic>, sign: 1 | -1) =>
  a.data.every((x, i) => a.field.equal(x, sign === 1 ? b.data[i]! : a.field.neg(b.data[i]!)));

type Json = Record<string, unknown>;
const list = (x: unknown): Json[] => (Array.isArray(x) ? (x as Json[]) : []);

/** Compares every number of the linear part of a result with what the certified matrices give. */
export function checkLinear(result: Json, c: LinearCertificate, compare: Compare): void {
  const exact = exactMatrices(c);
  const { field } = exact;
  if (field.degree > PLAIN_DEGREE && field.name !== result.field) {
    compare('field', result.field, field.name, 'numbers of the certified matrices');
    return;
  }
  // primes that the analysis does not use
  const reductions = [field.reduction(2), field.reduction(3)];
  const r = reductions[0]!;
  // matrices that are not what they must be have no further numbers in common with the result
  if (!checkForms(result, c, exact, compare)) return;
  const generators = exact.generators.map((g, i): SignedMatrix => ({ matrix: reduce(g, r), sign: c.generators[i]!.sign }));
  const vector = genericVector(c.dimension, r.p);
  const group = (result.group ?? {}) as Json;
  // an order that is too small shows itself by one point more
  const orbit = orbitOf(generators, vector, Math.min(ORDER_LIMIT, 4 * Number(group.order) + 16));
  if (orbit === undefined && Number(group.order) < ORDER_LIMIT / 4) {
    compare('group.order', group.order, 'more', 'orbit of a generic vector');
    return;
  }
  if (orbit !== undefined) {
    compare('group.order', group.order, orbit.order, 'orbit of a generic vector');
    compare('group.reversing', group.reversing, orbit.reversing, 'orbit of a generic vector');
    checkComponents(result, c, exact, generators, orbit, r, compare);
  }
  checkInertia(result, c, exact, compare);
  for (const reduction of reductions) checkZero(result, c, exact, reduction, orbit, compare);
  checkSigns(result, exact, compare);
}

function checkForms(result: Json, c: LinearCertificate, exact: Exact, compare: Compare): boolean {
  const route = 'products of the certified matrices';
  const symmetry = (result.symmetry ?? {}) as Json;
  const listed = list(symmetry.generators);
  compare('symmetry.generators.length', listed.length, c.generators.length, route);
  compare('model.degreesOfFreedom', ((result.model ?? {}) as Json).degreesOfFreedom, c.dimension / 2, route);
  let holds = true;
  c.generators.forEach((g, i) => {
    const rho = exact.generators[i]!;
    const w = congruence(rho, exact.form);
    const symplectic = same(w, exact.form, g.sign);
    const invariant = same(congruence(rho, exact.hessian), exact.hessian, 1);
    holds &&= symplectic && invariant;
    const key = `symmetry.generators[${i}]`;
    compare(`${key}.name`, listed[i]?.name, g.name, route);
    compare(`${key}.reversing`, listed[i]?.reversing, same(w, exact.form, -1), route);
    compare(`${key}.symplectic`, listed[i]?.symplectic, symplectic, route);
    compare(`${key}.invariant`, listed[i]?.invariant, invariant, route);
  });
  compare('symmetry.holds', symmetry.holds, true, 'the command');
  compare('certificate.linear.generators', holds, true, route);
  const skew = same(exact.form, transpose(exact.form), -1);
  const symmetric = same(exact.hessian, transpose(exact.hessian), 1);
  compare('certificate.linear.form', skew, true, route);
  compare('certificate.linear.hessian', symmetric, true, route);
  return holds && skew && symmetric && listed.length === c.generators.length;
}

/** Dimension, type, multiplicity and s(K) of each component from traces on the span of its basis under the group. */
function checkComponents(
  result: Json,
  c: LinearCertificate,
  exact: Exact,
  generators: readonly SignedMatrix[],
  orbit: Orbit,
  r: Reduction,
  compare: Compare,
): void {
  const route = 'traces of all elements on the span of the basis';
  const listed = list(result.components);
  compare('components.length', listed.length, c.components.length, route);
  let total = 0;
  c.components.forEach((component, i) => {
    const key = `components[${i}]`;
    const space = orbitSpan(generators, reduce(exact.bases[i]!, r));
    total += space.rows;
    compare(`${key}.label`, listed[i]?.label, component.label, 'the certificate');
    if (orbit.order * space.rows ** 3 > TRACE_WORK || generators.length === 0) return;
    const means = traceMeans(
      orbit,
      generators.map((g) => inducedOn(space, g.matrix)),
      r.p,
    );
    // mean of χ(g²) is m, 0 or −2m for the real, complex and quaternionic type; that of χ(g)² is m²β
    const beta = means.powers > 0 ? 1 : means.powers < 0 ? 4 : 2;
    const m = Math.round(Math.sqrt(means.squares / beta));
    compare(`${key}.multiplicity`, listed[i]?.multiplicity, m, route);
    compare(`${key}.type`, listed[i]?.type, beta === 1 ? 'real' : beta === 2 ? 'complex' : 'quaternionic', route);
    compare(`${key}.dimension`, listed[i]?.dimension, space.rows / m, route);
    const carried = (means.signedSquares / (m * m) - means.signedPowers / m) / 2;
    compare(`${key}.carriesForm`, listed[i]?.carriesForm, carried > 0, route);
    // L maps K to K⊗σ: the image of the space under W⁻¹ is the space of that component
    const image = solveModular(reduce(exact.form, r), transposeRows(space, c.dimension));
    const flows = c.components.findIndex((_, j) => contains(orbitSpan(generators, reduce(exact.bases[j]!, r)), image, space.rows));
    if (flows >= 0) compare(`${key}.flowsTo`, listed[i]?.flowsTo, c.components[flows]!.label, 'image of the component under ω');
  });
  compare('components: dimensions', total, c.dimension, route);
}

/** Rows as the first columns of a square matrix, zeros after them. */
function transposeRows(rows: ModularMatrix, n: number): ModularMatrix {
  const data = new Int32Array(n * n);
  for (let i = 0; i < rows.rows; i++) for (let j = 0; j < n; j++) data[j * n + i] = rows.data[i * n + j]!;
  return { p: rows.p, rows: n, cols: n, data };
}

/** Whether the span of some rows contains the first `count` columns of a matrix. */
function contains(space: ModularMatrix, columns: ModularMatrix, count: number): boolean {
  if (space.rows !== count) return false;
  const n = space.cols;
  const data = new Int32Array((space.rows + count) * n);
  data.set(space.data);
  for (let j = 0; j < count; j++) for (let i = 0; i < n; i++) data[(space.rows + j) * n + i] = columns.data[i * n + j]!;
  return modularRank({ p: space.p, rows: space.rows + count, cols: n, data }) === space.rows;
}

function checkInertia(result: Json, c: LinearCertificate, exact: Exact, compare: Compare): void {
  const { field } = exact;
  const listed = list(result.components);
  const total = { positive: 0, zero: 0, negative: 0 };
  let all = true;
  // beside neutral directions the inertia listed is that of the slice, the certified blocks are those of the whole space
  const neutral = Number(((result.neutral ?? {}) as Json).dimension ?? 0);
  c.components.forEach((component, i) => {
    const basis = exact.bases[i]!;
    const block = congruence(basis, exact.hessian);
    compare(`certificate.linear.components[${i}].block`, same(block, exact.blocks[i]!, 1), true, 'S on the basis');
    const dimension = Number(listed[i]?.dimension);
    if (block.rows > EXACT_DIMENSION || !Number.isInteger(dimension)) {
      all = false;
      return;
    }
    const once = inertiaByDescartes(block, field);
    const copies = dimension / component.cut;
    for (const k of ['positive', 'zero', 'negative'] as const) {
      total[k] += once[k] * copies;
      const given = listed[i]?.inertia as Json | undefined;
      if (given !== undefined && neutral === 0)
        compare(`components[${i}].inertia.${k}`, given[k], once[k] * copies, "Descartes' rule on a characteristic polynomial");
    }
  });
  const given = (result.inertia ?? {}) as Json;
  if (all && neutral === 0)
    for (const k of ['positive', 'zero', 'negative'] as const)
      compare(`inertia.${k}`, given[k], total[k], "Descartes' rule on a characteristic polynomial");
}

function checkZero(result: Json, c: LinearCertificate, exact: Exact, r: Reduction, orbit: Orbit | undefined, compare: Compare): void {
  const n = c.dimension;
  const s = reduce(exact.hessian, r);
  const w = reduce(exact.form, r);
  const minor = c.rank.minor.map((i) => i - 1);
  const witness = minor.flatMap((i) => minor.map((j) => s.data[i * n + j]!));
  compare(
    'certificate.linear.rank.minor',
    modularRank({ p: r.p, rows: minor.length, cols: minor.length, data: Int32Array.from(witness) }),
    minor.length,
    'a minor that does not vanish',
  );
  if (exact.kernel !== undefined) {
    compare('certificate.linear.rank.kernel', isZeroMatrix(multiply(exact.hessian, exact.kernel)), true, 'S times the kernel');
    compare('certificate.linear.rank', modularRank(reduce(exact.kernel, r)) + minor.length, n, 'rank and nullity');
  }
  if (Number(((result.neutral ?? {}) as Json).dimension ?? 0) !== 0) return;
  const zero = result.zero as Json | null | undefined;
  // L = JS, J = W^{-T}
  const l = solveModular(modularTranspose(w), s);
  const dimensions = nullities(l);
  const blocks = blocksOf(dimensions);
  const route = 'ranks of the powers of L modulo another prime';
  if (zero === null || zero === undefined) {
    compare('zero', zero === null ? 'none' : 'missing', blocks.length === 0 ? 'none' : 'an event', route);
    return;
  }
  compare('zero.kernel', zero.kernel, dimensions[0] ?? 0, route);
  compare('zero.dimension', zero.dimension, dimensions.at(-1) ?? 0, route);
  compare('zero.blocks', JSON.stringify(zero.blocks), JSON.stringify(blocks), route);
  compare(
    'zero.semisimple',
    zero.semisimple,
    blocks.every((x) => x === 1),
    route,
  );
  const e = generalisedKernelModular(l);
  if (e.rows > BRUTE_DIMENSION || zero.codimension === null) return;
  const restricted = inducedOn(e, l);
  const signed = exact.generators.map((g, i): SignedMatrix => ({ matrix: inducedOn(e, reduce(g, r)), sign: c.generators[i]!.sign }));
  const brute = 'adjoint map on the whole generalised kernel';
  const codimension = bruteCodimension(restricted, signed);
  compare('zero.codimension', zero.codimension, codimension, brute);
  compare('zero.codimensionWithoutSymmetry', zero.codimensionWithoutSymmetry, bruteCodimension(restricted, []), brute);
  const motion = (k: number) => (k !== 1 ? 'degenerate' : blocks.every((x) => x === 1) ? 'passes' : 'splits');
  compare('zero.motion', zero.motion, motion(codimension), brute);
  if (orbit === undefined) return;
  checkSubgroups(
    list(zero.subgroups),
    c,
    exact,
    r,
    orbit,
    (own) => {
      const k = bruteCodimension(
        restricted,
        own.map((g) => ({ matrix: inducedOn(e, g.matrix), sign: g.sign })),
      );
      return { codimension: k, motion: motion(k) };
    },
    compare,
  );
}

/** Each subgroup from its generators as words: order, sign, number of conjugates, codimension. */
function checkSubgroups(
  subgroups: readonly Json[],
  c: LinearCertificate,
  exact: Exact,
  r: Reduction,
  orbit: Orbit,
  codimensionOf: (generators: readonly SignedMatrix[]) => { codimension: number; motion: string },
  compare: Compare,
): void {
  const named = new Map(c.generators.map((g, i) => [g.name, { matrix: reduce(exact.generators[i]!, r), sign: g.sign }]));
  const vector = genericVector(c.dimension, r.p);
  subgroups.forEach((sub, i) => {
    if (!Array.isArray(sub.generators)) return;
    const own: SignedMatrix[] = [];
    for (const word of sub.generators as string[]) {
      const g = wordMatrix(word, named, c.dimension, r.p, orbit.order);
      if (g === undefined) {
        compare(`zero.subgroups[${i}].generators`, word, 'a word in the generators', 'reading the word');
        return;
      }
      own.push(g);
    }
    const key = `zero.subgroups[${i}]`;
    const inner = orbitOf(own, vector, orbit.order + 1);
    if (inner === undefined) return;
    const route = 'orbit of a generic vector under the subgroup';
    compare(`${key}.order`, sub.order, inner.order, route);
    compare(`${key}.reversing`, sub.reversing, inner.reversing, route);
    if (own.length > 0 && orbit.order <= 400) {
      const conjugates = conjugatesOf(own, inner.order, [...named.values()], vector);
      compare(`${key}.conjugates`, sub.conjugates, conjugates, 'conjugation by the generators');
    }
    const brute = codimensionOf(own);
    compare(`${key}.codimension`, sub.codimension, brute.codimension, 'adjoint map on the whole generalised kernel');
    compare(`${key}.motion`, sub.motion, brute.motion, 'adjoint map on the whole generalised kernel');
  });
}

/** Signs of the blocks of even size j: the signature of S L^{j−2} on ker L^j, over all components together. */
function checkSigns(result: Json, exact: Exact, compare: Compare): void {
  const zero = result.zero as Json | null | undefined;
  if (zero === null || zero === undefined || !Array.isArray(zero.signs) || exact.hessian.rows > EXACT_DIMENSION) return;
  if (Number(((result.neutral ?? {}) as Json).dimension ?? 0) !== 0) return;
  const { field } = exact;
  const signs = zero.signs as Json[];
  const l = multiply(transpose(inverse(exact.form)), exact.hessian);
  let power = l;
  let form = exact.hessian;
  const longest = Math.max(0, ...signs.map((x) => Number(x.size)));
  for (let j = 2; j <= Math.min(longest, l.rows); j++) {
    power = multiply(power, l);
    if (j > 2) form = multiply(form, l);
    if (j % 2 === 1) continue;
    const k = kernel(power);
    const found = inertiaByDescartes(congruence(k, form), field);
    const own = signs.filter((x) => x.size === j);
    for (const side of ['positive', 'negative'] as const)
      compare(
        `zero.signs (size ${j}, ${side})`,
        own.reduce((sum, x) => sum + Number(x[side]), 0),
        found[side],
        'signature of S times a power of L',
      );
  }
}
