/**
 * Coordinates in which every generator is a monomial matrix: it sends each letter to a root of unity times a
 * letter. Over a real field a letter is a coordinate (then the root is ±1), or z = x + iy or z̄ for a plane (x, y)
 * that the generators rotate, reflect and permute; over a cyclotomic field it is a coordinate. Invariants are then
 * orbit sums of monomials in the letters, whatever the order of the group.
 */
import { type Algebraic, lcmInt, RealField } from '../field/index.ts';
import { at, type Matrix } from '../linear/index.ts';
import type { LinearAction, ScalarField } from './linear-action.ts';

export interface LetterMap {
  /** Letter k composed with the generator is exp(2 pi i phase[k]/order) times letter image[k]. */
  readonly image: readonly number[];
  readonly phase: readonly number[];
}

export interface Letters {
  /** Phases are counted in exp(2 pi i/order). */
  readonly order: number;
  /** Planes (x, y): letter x is z, letter y is z̄. */
  readonly planes: readonly (readonly [number, number])[];
  /** The complex conjugate of each letter. */
  readonly conjugate: readonly number[];
  readonly generators: readonly LetterMap[];
}

/** Letters for an action, or undefined if there are none of this kind. */
export function findLetters(action: LinearAction): Letters | undefined {
  const n = action.dimension;
  const base = 2 * lcmInt(4, lcmInt(action.group.exponent, action.field.conductor));
  const planes = action.field instanceof RealField ? planesOf(action) : [];
  if (planes === undefined) return undefined;
  const partner = Array.from({ length: n }, (_, i) => i);
  for (const [x, y] of planes) {
    partner[x] = y;
    partner[y] = x;
  }
  const phaseOf = phaseFinder(action.field, base);
  const generators: LetterMap[] = [];
  for (const m of action.generatorMatrices) {
    const image = new Array<number>(n).fill(-1);
    const phase = new Array<number>(n).fill(0);
    for (let i = 0; i < n; i++) {
      if (partner[i]! < i) continue;
      const found = partner[i] === i ? scalarRow(m, i, partner, phaseOf) : planeRow(m, i, partner[i]!, partner, phaseOf);
      if (found === undefined) return undefined;
      image[i] = found.image;
      phase[i] = found.phase;
      if (partner[i] === i) continue;
      image[partner[i]!] = partner[found.image]!;
      phase[partner[i]!] = (base - found.phase) % base;
    }
    generators.push({ image, phase });
  }
  return { order: base, planes, conjugate: partner, generators };
}

/** Pairs of coordinates that rows of the generators mix, and blocks of two; undefined if they overlap. */
function planesOf(action: LinearAction): [number, number][] | undefined {
  const partner = new Map<number, number>();
  const join = (a: number, b: number): boolean => {
    if ((partner.get(a) ?? b) !== b || (partner.get(b) ?? a) !== a) return false;
    partner.set(a, b);
    partner.set(b, a);
    return true;
  };
  const pairs: [number, number][] = action.blocks.filter((b) => b.length === 2).map((b) => [b[0]!, b[1]!]);
  for (const m of action.generatorMatrices)
    for (let i = 0; i < m.rows; i++) {
      const support: number[] = [];
      for (let j = 0; j < m.cols; j++) if (!m.field.isZero(at(m, i, j))) support.push(j);
      if (support.length > 2) return undefined;
      if (support.length === 2) pairs.push([support[0]!, support[1]!]);
    }
  for (let k = 0; k < pairs.length; k++) {
    const [a, b] = pairs[k]!;
    if (partner.get(a) === b) continue;
    if (!join(a, b)) return undefined;
    // the generators carry planes to planes
    for (const m of action.generatorMatrices) {
      const support = new Set<number>();
      for (const i of [a, b]) for (let j = 0; j < m.cols; j++) if (!m.field.isZero(at(m, i, j))) support.add(j);
      if (support.size !== 2) return undefined;
      const [x, y] = [...support] as [number, number];
      pairs.push([Math.min(x, y), Math.max(x, y)]);
    }
  }
  return [...partner].filter(([a, b]) => a < b).sort(([a], [b]) => a - b);
}

type PhaseFinder = (c: Algebraic, s: Algebraic) => number | undefined;

/** Finds k with c + is = exp(2 pi i k/order), k even. */
function phaseFinder(field: ScalarField, order: number): PhaseFinder {
  if (field instanceof RealField)
    return (c, s) => {
      const angle = Math.atan2(field.toNumber(s), field.toNumber(c)) / (2 * Math.PI);
      const k = ((Math.round((angle * order) / 2) % (order / 2)) + order / 2) % (order / 2);
      const [x, y] = [field.cos(k, order / 2), field.sin(k, order / 2)];
      return x !== undefined && y !== undefined && field.equal(x, c) && field.equal(y, s) ? 2 * k : undefined;
    };
  const table = new Map<string, number>();
  const n = field.conductor;
  for (let k = 0; k < n; k++) {
    table.set(field.key(field.root(k)), (k * order) / n);
    const minus = field.key(field.neg(field.root(k)));
    if (!table.has(minus)) table.set(minus, ((k * order) / n + order / 2) % order);
  }
  return (c) => table.get(field.key(c));
}

function scalarRow(
  m: Matrix<Algebraic>,
  i: number,
  partner: readonly number[],
  phaseOf: PhaseFinder,
): { image: number; phase: number } | undefined {
  let image = -1;
  for (let j = 0; j < m.cols; j++)
    if (!m.field.isZero(at(m, i, j))) {
      if (image >= 0) return undefined;
      image = j;
    }
  if (image < 0 || partner[image] !== image) return undefined;
  const phase = phaseOf(at(m, i, image), m.field.zero);
  return phase === undefined ? undefined : { image, phase };
}

/** z = x_a + i x_b composed with m: (α + iβ)z' where the rows are (α, -β), (β, α); (α + iβ)z̄' where they are (α, β), (β, -α). */
function planeRow(
  m: Matrix<Algebraic>,
  a: number,
  b: number,
  partner: readonly number[],
  phaseOf: PhaseFinder,
): { image: number; phase: number } | undefined {
  const f = m.field;
  let c = -1;
  for (let j = 0; j < m.cols && c < 0; j++) if (!f.isZero(at(m, a, j)) || !f.isZero(at(m, b, j))) c = j;
  if (c < 0) return undefined;
  const d = partner[c]!;
  if (d === c) return undefined;
  for (let j = 0; j < m.cols; j++) if (j !== c && j !== d && !(f.isZero(at(m, a, j)) && f.isZero(at(m, b, j)))) return undefined;
  const alpha = at(m, a, c);
  const beta = at(m, b, c);
  const [u, v] = [at(m, a, d), at(m, b, d)];
  const phase = phaseOf(alpha, beta);
  if (phase === undefined) return undefined;
  if (f.equal(u, f.neg(beta)) && f.equal(v, alpha)) return { image: c, phase };
  return f.equal(u, beta) && f.equal(v, f.neg(alpha)) ? { image: d, phase } : undefined;
}
