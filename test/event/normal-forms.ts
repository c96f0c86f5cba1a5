/**
 * A nilpotent element of each signed type, written down: a chain K ⊗ e_0 → (K⊗σ) ⊗ e_1 → … under a shift, with
 * ω(x ⊗ e_i, y ⊗ e_{j-1-i}) = (-1)^i B(x, y). B is the invariant inner product for even j; for odd j an invariant form with the sign
 * σ: skew on K, or symmetric on K and made skew by a second copy, or the pairing of K with K⊗σ.
 */
import type { ClassNumber } from '../../src/event/partition-codimension.ts';
import type { SignedType } from '../../src/event/signed-partitions.ts';
import { type Algebraic, RealField } from '../../src/field/index.ts';
import { build, directSum, identity, type Matrix, multiply, scale, transpose } from '../../src/linear/index.ts';
import { action, blocks, diag, kron, mat, quaternion, rotation } from '../support/actions.ts';

export interface ClassModel {
  /** K(g) and σ(g) of each generator. */
  readonly generators: readonly { readonly matrix: Matrix<Algebraic>; readonly sign: 1 | -1 }[];
  /** σ-invariant form on K: skew where K carries one, symmetric in classes 1 and 5; none in 4, 6, 10. */
  readonly form?: Matrix<Algebraic>;
  readonly skew: boolean;
}

/** Holds the cosines and sines of multiples of 2 pi/6. */
export const F = RealField.of({ squareRoots: [3n] });

const { li, lj, ri, rj } = quaternion(F);
const J = mat(F, [
  [0, -1],
  [1, 0],
]);
const c3 = rotation(F, 1, 3);
const c6 = rotation(F, 1, 6);
const keep = (matrix: Matrix<Algebraic>) => ({ matrix, sign: 1 as const });
const turn = (matrix: Matrix<Algebraic>) => ({ matrix, sign: -1 as const });

/** One irreducible in each of the ten classes. */
export const MODELS: Readonly<Record<ClassNumber, ClassModel>> = {
  1: { generators: [], form: diag(F, 1), skew: false },
  2: { generators: [keep(c3)], form: J, skew: true },
  3: { generators: [keep(li), keep(lj)], form: ri, skew: true },
  4: { generators: [turn(diag(F, 1))], skew: false },
  5: { generators: [turn(J)], form: diag(F, 1, -1), skew: false },
  6: { generators: [keep(c3), turn(diag(F, 1, 1))], skew: false },
  7: { generators: [keep(c3), turn(diag(F, 1, -1))], form: J, skew: true },
  8: {
    generators: [
      keep(blocks(c6, c6)),
      turn(
        mat(F, [
          [0, 0, -1, 0],
          [0, 0, 0, 1],
          [1, 0, 0, 0],
          [0, -1, 0, 0],
        ]),
      ),
    ],
    form: blocks(J, J),
    skew: true,
  },
  9: { generators: [keep(li), keep(lj), turn(rj)], form: ri, skew: true },
  10: { generators: [keep(li), keep(lj), turn(diag(F, 1, 1, 1, 1))], skew: false },
};

export interface NilpotentModel {
  readonly form: Matrix<Algebraic>;
  readonly flow: Matrix<Algebraic>;
  readonly generators: readonly Matrix<Algebraic>[];
}

const signed = (m: Matrix<Algebraic>, sign: number) => (sign === 1 ? m : scale(m, F.neg(F.one)));

/** Levels 0 … j-1 of a space X: shift, form (-1)^i B across the levels, generators that alternate by σ. */
function chain(size: number, form: Matrix<Algebraic>, generators: readonly { matrix: Matrix<Algebraic>; sign: 1 | -1 }[]): NilpotentModel {
  const one = identity<Algebraic>(F, form.rows);
  const level = (entry: (i: number, j: number) => number) => build<Algebraic>(F, size, size, (i, j) => F.fromInteger(entry(i, j)));
  return {
    flow: kron(
      level((i, j) => (i === j + 1 ? 1 : 0)),
      one,
    ),
    form: kron(
      level((i, j) => (i + j === size - 1 ? (i % 2 === 0 ? 1 : -1) : 0)),
      form,
    ),
    generators: generators.map(({ matrix, sign }) =>
      kron(
        level((i, j) => (i !== j ? 0 : i % 2 === 1 && sign === -1 ? -1 : 1)),
        matrix,
      ),
    ),
  };
}

/** [[0, B], [-B, 0]], or with ± so that the whole has the symmetry asked for. */
function hyperbolic(b: Matrix<Algebraic>, sign: 1 | -1): Matrix<Algebraic> {
  const n = b.rows;
  return build<Algebraic>(F, 2 * n, 2 * n, (i, j) =>
    i < n && j >= n ? b.data[i * n + j - n]! : i >= n && j < n ? signed(transpose(b), sign).data[(i - n) * n + j]! : F.zero,
  );
}

/** All blocks of a signed type together. */
export function nilpotentModel(classNumber: ClassNumber, type: SignedType): NilpotentModel {
  const model = MODELS[classNumber];
  const { generators } = model;
  const size = generators[0]?.matrix.rows ?? 1;
  const one = identity<Algebraic>(F, size);
  const twisted = generators.map((g) => ({ matrix: signed(g.matrix, g.sign), sign: g.sign }));
  const pieces: NilpotentModel[] = [];
  for (const { size: j, count, signs, partnerSigns } of type.parts) {
    if (j % 2 === 0) {
      // the kernel is the end of the chain, in K where the head is in K⊗σ; there ω(v, L^(1-j) v) = (-1)^(j-1) B(v, v)
      const add = (k: number, of: typeof generators, sign: 1 | -1) => {
        for (let i = 0; i < k; i++) pieces.push(chain(j, signed(one, -sign), of));
      };
      add(signs![0], twisted, 1);
      add(signs![1], twisted, -1);
      add(partnerSigns?.[0] ?? 0, generators, 1);
      add(partnerSigns?.[1] ?? 0, generators, -1);
    } else if (model.skew) {
      const list =
        signs === null
          ? new Array<1 | -1>(count).fill(1)
          : [...new Array<1 | -1>(signs[0]).fill(1), ...new Array<1 | -1>(signs[1]).fill(-1)];
      for (const sign of list) pieces.push(chain(j, signed(model.form!, sign), generators));
    } else if (model.form !== undefined) {
      const pair = generators.map((g) => ({ matrix: directSum(g.matrix, g.matrix), sign: g.sign }));
      for (let i = 0; i < count / 2; i++) pieces.push(chain(j, hyperbolic(model.form, -1), pair));
    } else {
      const pair = generators.map((g, i) => ({ matrix: directSum(g.matrix, twisted[i]!.matrix), sign: g.sign }));
      for (let i = 0; i < count / 2; i++) pieces.push(chain(j, hyperbolic(one, -1), pair));
    }
  }
  return {
    form: blocks(...pieces.map((p) => p.form)),
    flow: blocks(...pieces.map((p) => p.flow)),
    generators: generators.map((_, g) => blocks(...pieces.map((p) => p.generators[g]!))),
  };
}

/** The Hessian S with L = JS, J = W^(-T): S = Wᵀ L. */
export const hessianOf = (m: NilpotentModel): Matrix<Algebraic> => multiply(transpose(m.form), m.flow);

export const actionOfModel = (m: NilpotentModel) => action(F, m.form, m.generators);
