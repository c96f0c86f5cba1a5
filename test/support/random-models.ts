/** Random exact models with a catalogue group, a random sign, and a Hessian with a planted kernel, in mixed coordinates. */
import type { Algebraic, RealField } from '../../src/field/index.ts';
import { loadCatalogueGroup } from '../../src/group/catalogue.ts';
import {
  add,
  build,
  directSum,
  fromRows,
  identity,
  inverse,
  kernel,
  type Matrix,
  multiply,
  rank,
  scale,
  transpose,
  zeroMatrix,
} from '../../src/linear/index.ts';
import { exactValue, parseExpression, withField } from '../../src/model/expression/index.ts';

/** A small linear congruential generator, so that a seed is a model. */
export class Random {
  #state: number;
  constructor(seed: number) {
    this.#state = (seed ^ 0x9e3779b9) >>> 0;
    for (let i = 0; i < 8; i++) this.below(2);
  }
  below(n: number): number {
    this.#state = (Math.imul(this.#state, 1664525) + 1013904223) >>> 0;
    return Math.floor((this.#state / 2 ** 32) * n);
  }
  pick<T>(list: readonly T[]): T {
    return list[this.below(list.length)]!;
  }
}

/** Catalogue groups of order at most 48, with actions of dimension at most 4. */
export const SPECS = [
  'cyclic:1',
  'cyclic:2',
  'cyclic:3',
  'cyclic:4',
  'cyclic:5',
  'cyclic:6',
  'cyclic:8',
  'cyclic:12',
  'dihedral:2',
  'dihedral:3',
  'dihedral:4',
  'dihedral:5',
  'dihedral:6',
  'dihedral:8',
  'dihedral:12',
  'reflection',
  'symmetric:3',
  'symmetric:4',
  'alternating:4',
  'tetrahedral',
  'octahedral',
  'quaternion',
  'dicyclic:3',
  'dicyclic:4',
  'dicyclic:5',
  'binary-tetrahedral',
  'hyperoctahedral:2',
  'hyperoctahedral:3',
  'Ci',
  'Cs',
  'C2h',
  'C4h',
  'S4',
  'S6',
  'D2d',
  'D3d',
  'D2h',
  'D3h',
  'C3h',
  'C3v',
  'C4v',
  'Th',
  'Td',
  'Oh',
  'C6h',
  'cyclic:2*cyclic:4',
  'cyclic:3*reflection',
] as const;

export interface RandomModel {
  readonly spec: string;
  readonly field: RealField;
  readonly w: Matrix<Algebraic>;
  readonly s: Matrix<Algebraic>;
  readonly generators: readonly Matrix<Algebraic>[];
}

/** The action of a catalogue group as exact matrices. */
export function catalogueMatrices(spec: string, action?: string): { field: RealField; matrices: Matrix<Algebraic>[] } {
  const group = loadCatalogueGroup(spec);
  const a = group.action(action);
  const { field, result } = withField((f) =>
    group.generators.map((g) =>
      fromRows(
        f,
        a.matrices.get(g)!.map((row) => row.map((text) => exactValue(parseExpression(text), new Map(), f))),
        a.dimension,
      ),
    ),
  );
  return { field, matrices: result };
}

/** Basis of the forms with gᵀXg = sign·X for every generator, symmetric or skew. */
function invariantForms(
  field: RealField,
  generators: readonly Matrix<Algebraic>[],
  signs: readonly number[],
  n: number,
  symmetric: boolean,
): Matrix<Algebraic>[] {
  const pairs: [number, number][] = [];
  for (let i = 0; i < n; i++) for (let j = 0; j <= (symmetric ? i : i - 1); j++) pairs.push([i, j]);
  const unit = (k: number) =>
    build<Algebraic>(field, n, n, (i, j) => {
      const [a, b] = pairs[k]!;
      if (i === a && j === b) return field.one;
      if (i === b && j === a) return symmetric ? field.one : field.neg(field.one);
      return field.zero;
    });
  const columns = pairs.map((_, k) =>
    generators.flatMap((g, m) => {
      const u = unit(k);
      const image = multiply(transpose(g), multiply(u, g));
      return image.data.map((x, t) => field.sub(x, signs[m] === 1 ? u.data[t]! : field.neg(u.data[t]!)));
    }),
  );
  const equations = build<Algebraic>(field, generators.length * n * n, pairs.length, (i, j) => columns[j]![i]!);
  const solutions = kernel(equations);
  return Array.from({ length: solutions.cols }, (_, c) =>
    pairs.reduce(
      (sum, _p, k) => {
        const x = solutions.data[k * solutions.cols + c]!;
        return field.isZero(x) ? sum : add(sum, scale(unit(k), x));
      },
      zeroMatrix<Algebraic>(field, n, n),
    ),
  );
}

/** A model from a seed, or undefined where the draw admits no symplectic form. */
export function randomModel(seed: number): RandomModel | undefined {
  const random = new Random(seed);
  const spec = random.pick(SPECS);
  const { field, matrices } = catalogueMatrices(spec);
  const d = matrices[0]!.rows;
  if (d > 4) return undefined;
  const signs = matrices.map(() => (random.below(2) === 0 ? 1 : -1));
  const cotangent = random.below(2) === 0;
  const one = field.one;
  let generators: Matrix<Algebraic>[];
  let w: Matrix<Algebraic> | undefined;
  const negateHalf = (m: Matrix<Algebraic>, sign: number) => (sign === 1 ? m : scale(m, field.neg(one)));
  if (cotangent) {
    // p ↦ σ A^{-T} p, possibly with a time reversal on top
    generators = matrices.map((a, i) => directSum(a, negateHalf(transpose(inverse(a)), signs[i]!)));
    if (random.below(3) === 0)
      generators.push(directSum(identity<Algebraic>(field, d), scale(identity<Algebraic>(field, d), field.neg(one))));
    const n = 2 * d;
    w = build<Algebraic>(field, n, n, (i, j) => (j === i + d ? one : i === j + d ? field.neg(one) : field.zero));
  } else {
    const copies = 1 + random.below(d <= 2 ? 3 : 2);
    generators = matrices.map((a) => Array.from({ length: copies }, () => a).reduce((x, y) => directSum(x, y)));
    const n = d * copies;
    if (n % 2 === 1) return undefined;
    const forms = invariantForms(field, generators, signs, n, false);
    if (forms.length === 0) return undefined;
    for (let attempt = 0; attempt < 6 && w === undefined; attempt++) {
      const candidate = forms.reduce(
        (sum, f) => add(sum, scale(f, field.fromInteger(random.below(7) - 3))),
        zeroMatrix<Algebraic>(field, n, n),
      );
      if (rank(candidate) === n) w = candidate;
    }
    if (w === undefined) return undefined;
  }
  const n = w.rows;
  const forms = invariantForms(
    field,
    generators,
    generators.map(() => 1),
    n,
    true,
  );
  let s = zeroMatrix<Algebraic>(field, n, n);
  const kind = random.below(4);
  if (kind > 0) for (const f of forms) s = add(s, scale(f, field.fromInteger(random.below(kind === 1 ? 2 : 5) - (kind === 1 ? 0 : 2))));
  if (kind === 3 && forms.length > 1) {
    // a singular element: S − x F for an eigenvalue-like ratio found where one pivot vanishes
    for (let t = -4; t <= 4; t++) {
      const shifted = add(s, scale(forms[0]!, field.fromInteger(t)));
      if (rank(shifted) < n) {
        s = shifted;
        break;
      }
    }
  }
  let mix = identity<Algebraic>(field, n);
  for (let tries = 0; tries < 5; tries++) {
    const m = add(
      identity<Algebraic>(field, n),
      build<Algebraic>(field, n, n, (i, j) => (j > i ? field.fromInteger(random.below(3) - 1) : field.zero)),
    );
    if (random.below(2) === 0) mix = multiply(mix, random.below(2) === 0 ? m : transpose(m));
    else break;
  }
  const back = inverse(mix);
  return {
    spec,
    field,
    w: multiply(transpose(mix), multiply(w, mix)),
    s: multiply(transpose(mix), multiply(s, mix)),
    generators: generators.map((g) => multiply(back, multiply(g, mix))),
  };
}
