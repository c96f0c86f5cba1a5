/** What each block of the flow offers to events: its class, how often its irreducible occurs, and the signature of ω. */
import {
  type Action,
  type Component,
  type Components,
  componentsOfBlock,
  type FlowBlock,
  flowBlocks,
  restrictForm,
  type SymplecticPart,
  symplecticPart,
} from '../action/index.ts';
import { adjointImage } from '../event/adjoint-rank.ts';
import { type ClassAlgebra, classAlgebra } from '../event/algebra-names.ts';
import type { BlockCapacity } from '../event/event-list.ts';
import { RoutesDisagree } from '../event/zero-event.ts';
import type { Algebraic } from '../field/index.ts';
import { inertia, type Matrix, multiply, sparseTimes, transpose, zeroMatrix } from '../linear/index.ts';

/** Multiplicity spaces beyond this are not measured by linear algebra one by one; the sum over the blocks always is, by characters. */
export const MEASURED_DIMENSION = 24;

export interface MeasuredBlock {
  readonly block: FlowBlock;
  /** K, and K⊗σ where that is another irreducible. */
  readonly components: readonly Component[];
  readonly capacity: BlockCapacity;
  readonly algebra: ClassAlgebra;
}

/** All flow blocks with their classes. Throws RoutesDisagree where two routes to a dimension give two numbers. */
export function measuredBlocks(action: Action, components: Components): MeasuredBlock[] {
  const symplectic = symplecticPart(action);
  const blocks = flowBlocks(action, symplectic).map((block): MeasuredBlock => {
    const own = componentsOfBlock(action, components, symplectic.part, block.irreducible);
    const first = own[0]!;
    const copies = first.irreducible.multiplicity;
    const c = block.symmetryClass;
    if (own.some((k) => k.sign.symmetryClass !== c))
      throw new RoutesDisagree(`class ${c} by the part that keeps time, ${first.sign.symmetryClass} by the whole group`);
    const signature = c === 2 || c === 7 || c === 8 ? signatureOf(action, symplectic, block, c === 8 ? 2 : 1) : null;
    const algebra = classAlgebra(c, copies, signature);
    if (block.basis.cols <= MEASURED_DIMENSION) measure(action, block, algebra);
    return {
      block,
      components: own,
      capacity: { classNumber: c, copies, signature, dimension: first.irreducible.dimension, labels: own.map((k) => k.label) },
      algebra,
    };
  });
  compareSums(action, blocks);
  return blocks;
}

/** dim P and dim 𝔤₀ of one block by the forms on its multiplicity space that the symmetry leaves, modulo a prime. */
function measure(action: Action, block: FlowBlock, algebra: ClassAlgebra): void {
  const n = block.basis.cols;
  const { dimensionOfClass, dimensionOfGroup } = adjointImage(
    zeroMatrix<Algebraic>(action.field, n, n),
    block.operators,
    action.field.reduction(),
  );
  if (dimensionOfClass !== algebra.dimensionOfClass || dimensionOfGroup !== algebra.dimensionOfGroup)
    throw new RoutesDisagree(
      `class ${block.symmetryClass}: dimensions ${dimensionOfClass} and ${dimensionOfGroup} by linear algebra, ${algebra.dimensionOfClass} and ${algebra.dimensionOfGroup} by the table`,
    );
}

/** The same on the whole space, from the character: the forms on which Γ acts trivially, or by σ. */
function compareSums(action: Action, blocks: readonly MeasuredBlock[]): void {
  const { group, traces, signs, field } = action;
  let even = 0;
  let odd = 0;
  const values = traces.map((x) => field.toNumber(x));
  group.classes.forEach(({ representative, size }, c) => {
    const t = (values[c]! ** 2 + values[group.classOf[group.power(representative, 2)]!]!) / 2;
    even += size * t;
    odd += size * signs[representative]! * t;
  });
  const total = (pick: (a: ClassAlgebra) => number) => blocks.reduce((s, b) => s + pick(b.algebra), 0);
  const found = [Math.round(even / group.order), Math.round(odd / group.order)];
  const listed = [total((a) => a.dimensionOfClass), total((a) => a.dimensionOfGroup)];
  if (found[0] !== listed[0] || found[1] !== listed[1])
    throw new RoutesDisagree(`dimensions ${found.join(' and ')} by the character of the action, ${listed.join(' and ')} over the blocks`);
}

/**
 * Signature (a, b) of the Hermitian form iω on the multiplicity space of a complex χ. Up to a positive factor i acts as the central
 * element Σ (g - g⁻¹) over a class where χ is not real; each copy of χ counts for `dim eK` real dimensions. Of χ and its conjugate,
 * for which a and b change places, the one with a ≥ b is meant.
 */
function signatureOf(action: Action, symplectic: SymplecticPart, block: FlowBlock, per: 1 | 2): [number, number] {
  const { part } = symplectic;
  const { basis, cut } = block;
  const f = action.field;
  let best = -1;
  part.group.classes.forEach(({ size }, c) => {
    if (Math.abs(block.irreducible.complexValues[c]!.im) < 1e-6) return;
    if (best < 0 || size < part.group.classes[best]!.size) best = c;
  });
  if (best < 0) throw new RoutesDisagree(`class ${block.symmetryClass} with a real character`);
  const inverse = part.group.classes[best]!.inverse;
  let turned: Matrix<Algebraic> = zeroMatrix(f, basis.rows, basis.cols);
  for (let e = 0; e < part.group.order; e++) {
    const own = part.group.classOf[e]!;
    if (own !== best && own !== inverse) continue;
    const t = sparseTimes(action.matrix(part.inclusion[e]!), basis);
    turned = { ...turned, data: turned.data.map((x, i) => (own === best ? f.add(x, t.data[i]!) : f.sub(x, t.data[i]!))) };
  }
  // ω(Iu, v) is symmetric in u and v
  const form = multiply(transpose(turned), sparseTimes(action.form, basis));
  const i = inertia(form, f);
  const width = cut * per;
  if (i.zero > 0 || i.positive % width !== 0 || i.negative % width !== 0)
    throw new RoutesDisagree(`the form iω has inertia ${i.positive}, ${i.zero}, ${i.negative} on copies of dimension ${width}`);
  const [a, b] = [i.positive / width, i.negative / width];
  return a >= b ? [a, b] : [b, a];
}

/** ω restricted to the multiplicity space of a block. */
export const formOf = (action: Action, block: FlowBlock): Matrix<Algebraic> => restrictForm(block.basis, action.form);
