/**
 * The zero event on the slice as one space, under any part of Γ and a continuous symmetry that fixes the equilibrium:
 * the orbit codimension by the rank of the adjoint map with ξᵀS + Sξ = 0 added to the class and ξᵀT + Tξ = 0 to 𝔤₀.
 */
import { type ActionGenerator, coordinateMap, type Slice, sliceCoordinates } from '../action/index.ts';
import type { Algebraic } from '../field/index.ts';
import {
  beside,
  build,
  identity,
  inverse,
  type Matrix,
  minor,
  multiply,
  type SparseMatrix,
  sparseTimes,
  transpose,
} from '../linear/index.ts';
import { adjointRank, type ClassOperator } from './adjoint-rank.ts';
import { generalisedKernel, poisson } from './generalised-kernel.ts';
import type { EventPiece } from './versality.ts';

/** E₀ of the slice: a basis in V, L on it, and how linear maps and fields act on it. */
export interface SliceEvent {
  readonly basis: Matrix<Algebraic>;
  readonly l: Matrix<Algebraic>;
  readonly fields: readonly Matrix<Algebraic>[];
  operator(map: SparseMatrix<Algebraic>, sign: 1 | -1): ClassOperator;
}

export function sliceEvent(slice: Slice, form: SparseMatrix<Algebraic>, hessian: SparseMatrix<Algebraic>): SliceEvent {
  const { field, dimension: n } = slice;
  const x = sliceCoordinates(slice, identity<Algebraic>(field, n));
  const w = multiply(transpose(x), sparseTimes(form, x));
  const s = multiply(transpose(x), sparseTimes(hessian, x));
  const l = multiply(poisson(w), s);
  const e = generalisedKernel(l).basis;
  const basis = multiply(x, e);
  const whole = coordinateMap(beside(basis, slice.radical), field);
  const own = Array.from({ length: basis.cols }, (_, i) => i);
  // a map of V that preserves T^ω and T ∩ T^ω, on E₀: coordinates along E₀, those along the radical dropped
  const onEvent = (map: SparseMatrix<Algebraic>) => {
    if (basis.cols === 0) return build<Algebraic>(field, 0, 0, () => field.zero);
    return minor(whole(sparseTimes(map, basis)), own, own);
  };
  return {
    basis,
    l: e.cols === 0 ? build<Algebraic>(field, 0, 0, () => field.zero) : coordinateMap(e, field)(multiply(l, e)),
    fields: slice.isotropy.map(onEvent),
    operator: (map, sign) => {
      const m = onEvent(map);
      return { matrix: m, inverse: inverse(m), sign };
    },
  };
}

/** The event as one piece, with the operators of some generators. */
export function slicePiece(event: SliceEvent, generators: readonly Pick<ActionGenerator, 'matrix' | 'sign'>[]): EventPiece {
  return { basis: event.basis, l: event.l, operators: generators.map((g) => event.operator(g.matrix, g.sign)), fields: event.fields };
}

/** Orbit codimension of the piece in its class; two primes must agree, else the smaller rank was unlucky. */
export function pieceCodimension(piece: EventPiece, field: Slice['field']): number {
  const one = adjointRank(piece.l, piece.operators, field.reduction(), piece.fields);
  const two = adjointRank(piece.l, piece.operators, field.reduction(1), piece.fields);
  return Math.min(one.codimension, two.codimension);
}
