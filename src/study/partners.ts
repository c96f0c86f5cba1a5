/**
 * A whole symmetry-adapted basis of a component. The multiplicity space W = eV_K is one of several alike: from a group element g comes
 * the next one, gW with its parts in the spaces before taken off. Projections on them are elements of the group algebra that every
 * invariant form makes self-adjoint, so every invariant S is block diagonal, with the block on W times a positive number each time.
 * Symmetry-adapted bases: J.-P. Serre, Linear Representations of Finite Groups, 1977, section 2.7 (place from memory).
 */
import { type Action, type Components, coordinateMap, cutterMatrix, findCutters, tidy } from '../action/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { at, isZeroMatrix, type Matrix, multiply, scale, sparseTimes, sub } from '../linear/index.ts';

/** A copy of the multiplicity space: invariant forms on it are `factor` times those on the first one. */
export interface Partner {
  readonly basis: Matrix<Algebraic>;
  readonly factor: Algebraic;
}

/** For each component the copies beside the first one, whose basis is given. */
export function partnersOf(action: Action, components: Components, bases: readonly Matrix<Algebraic>[]): Partner[][] {
  const f = action.field;
  const { group } = action;
  const irreducibles = components.present.map((c) => c.irreducible);
  const cutters = findCutters(
    components.whole.group,
    irreducibles.map((k) => ({ values: k.values, beta: k.beta, multiplicity: k.multiplicity })),
  );
  const rep = { field: f, dimension: action.dimension, group, matrix: (e: number) => action.matrix(e) };
  return irreducibles.map((k, i) => {
    const first = bases[i]!;
    const cutter = cutters[i]!;
    const wanted = k.dimension / cutter.dimensions[i]!;
    if (wanted === 1) return [];
    const e = cutterMatrix(rep, cutter);
    const norm = f.fromRational(1n, BigInt(cutter.elements.length));
    const coordinates = coordinateMap(first, f);
    const onFirst = (x: Matrix<Algebraic>) => coordinates(scale(sparseTimes(e, x), norm));
    const found: { basis: Matrix<Algebraic>; back: number; inverse: Algebraic; factor: Algebraic }[] = [
      { basis: first, back: 0, inverse: f.one, factor: f.one },
    ];
    for (let g = 1; g < group.order && found.length < wanted; g++) {
      let x = sparseTimes(action.matrix(g), first);
      for (const { basis, back, inverse } of found)
        x = sub(x, scale(multiply(basis, onFirst(sparseTimes(action.matrix(back), x))), inverse));
      if (isZeroMatrix(x)) continue;
      const back = group.inverse(g);
      const own = onFirst(sparseTimes(action.matrix(back), x));
      const factor = at(own, 0, 0);
      if (own.data.some((y, j) => !f.equal(y, j % (own.cols + 1) === 0 ? factor : f.zero)))
        throw new Error(`two copies of the multiplicity space of ${components.present[i]!.label} are not alike`);
      found.push({ basis: x, back, inverse: f.inv(factor), factor });
    }
    if (found.length < wanted) throw new Error(`${found.length} copies of a multiplicity space found, expected ${wanted}`);
    return found.slice(1).map(({ basis, factor }) => cleared({ basis, factor }, f));
  });
}

/** The whole basis times the number that makes it integral without a common factor. */
function cleared(p: Partner, f: RealField): Partner {
  const { basis } = p;
  const column: Matrix<Algebraic> = { field: f, rows: basis.data.length, cols: 1, data: basis.data };
  const { data } = tidy(column, f);
  const k = basis.data.findIndex((x) => !f.isZero(x));
  const ratio = f.div(data[k]!, basis.data[k]!);
  return { basis: { ...basis, data }, factor: f.mul(p.factor, f.mul(ratio, ratio)) };
}
