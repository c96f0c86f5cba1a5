/**
 * The zero event of an exact Hessian: block by block of the flow the generalised kernel, the Jordan
 * structure with signs, and the codimension in the symmetric class by two routes, the rank of the adjoint
 * map and the formula by class. The routes must agree, or the program stops.
 */
import { coordinateMap, type FlowBlock, restrictForm } from '../action/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { congruence, type Matrix, multiply, type SparseMatrix } from '../linear/index.ts';
import { type AdjointRank, adjointRank, adjointRankWithoutSymmetry, type ClassOperator } from './adjoint-rank.ts';
import { type SignedBlocks, zeroChain } from './chain.ts';
import { type GeneralisedKernel, generalisedKernel, poisson } from './generalised-kernel.ts';
import { zeroCodimensionOfPartition } from './partition-codimension.ts';

/** S, ω and L on one multiplicity space, with the compressed symmetry. */
export interface BlockForms {
  readonly block: FlowBlock;
  readonly s: Matrix<Algebraic>;
  readonly w: Matrix<Algebraic>;
  readonly l: Matrix<Algebraic>;
}

/** What happens at zero on one block of the flow. */
export interface BlockZero extends BlockForms {
  readonly kernel: GeneralisedKernel;
  /** Everything restricted to E₀. */
  readonly event: {
    readonly s: Matrix<Algebraic>;
    readonly w: Matrix<Algebraic>;
    readonly l: Matrix<Algebraic>;
    readonly operators: readonly ClassOperator[];
  };
  /** Signed blocks on the multiplicity space (empty where the kernel is 0). */
  readonly signed: readonly SignedBlocks[];
  /** Jordan partition on the multiplicity space of one complex constituent χ of Γ₀, descending. */
  readonly partition: readonly number[];
  readonly rank: AdjointRank;
  readonly formula: number;
}

export interface ZeroEvent {
  readonly blocks: readonly BlockZero[];
  /** dim E₀ and dim ker L on the whole space. */
  readonly dimension: number;
  readonly kernel: number;
  /** Real Jordan blocks at zero, descending. */
  readonly sizes: readonly number[];
  readonly semisimple: boolean;
  readonly codimension: number;
  readonly codimensionWithoutSymmetry: number;
}

/** Two routes to one number that give two numbers: a defect, never an answer. */
export class RoutesDisagree extends Error {}

/** Restriction of the Hessian and the form to the blocks of the flow. */
export function blockForms(blocks: readonly FlowBlock[], hessian: SparseMatrix<Algebraic>, form: SparseMatrix<Algebraic>): BlockForms[] {
  return blocks.map((block) => {
    const s = restrictForm(block.basis, hessian);
    const w = restrictForm(block.basis, form);
    return { block, s, w, l: multiply(poisson(w), s) };
  });
}

/** Multiplicity of χ in the block space per complex multiplicity: a real irreducible of type H is 2χ. */
const chiCount = (block: FlowBlock): number => (block.irreducible.beta === 4 ? 2 : 1);

function blockZero(b: BlockForms, field: RealField): BlockZero {
  const kernel = generalisedKernel(b.l);
  const e = kernel.basis;
  const reduction = field.reduction();
  const operatorsOn = (): ClassOperator[] => {
    if (e.cols === 0) return [];
    const coordinates = coordinateMap(e, field);
    return b.block.operators.map((o) => ({
      matrix: coordinates(multiply(o.matrix, e)),
      inverse: coordinates(multiply(o.inverse, e)),
      sign: o.sign,
    }));
  };
  const s = congruence(e, b.s);
  const w = congruence(e, b.w);
  const l = e.cols === 0 ? s : coordinateMap(e, field)(multiply(b.l, e));
  const event = { s, w, l, operators: operatorsOn() };
  const signed = e.cols === 0 ? [] : zeroChain(s, w, field).blocks;
  for (let j = 1; j < kernel.blocks.length; j++) {
    const counted = signed.find((x) => x.size === j)?.count ?? 0;
    if (counted !== kernel.blocks[j])
      throw new RoutesDisagree(`blocks of size ${j}: ${kernel.blocks[j]} by kernels, ${counted} by symplectic reduction`);
  }
  const partition = kernel.blocks.flatMap((count, j) => new Array<number>((count / b.block.cut) * chiCount(b.block)).fill(j)).reverse();
  const rank = adjointRank(l, event.operators, reduction);
  const formula = zeroCodimensionOfPartition(b.block.symmetryClass, partition);
  if (rank.codimension !== formula) {
    // a prime can be unlucky; a second one decides
    const again = adjointRank(l, event.operators, field.reduction(1));
    if (again.codimension !== formula)
      throw new RoutesDisagree(
        `codimension of class ${b.block.symmetryClass}: ${again.codimension} by the adjoint map, ${formula} by the partition ${partition.join(',')}`,
      );
  }
  return { ...b, kernel, event, signed, partition, rank, formula };
}

/** The zero event, exactly. An empty generalised kernel gives dimension 0. */
export function zeroEvent(forms: readonly BlockForms[], field: RealField): ZeroEvent {
  const blocks = forms.map((b) => blockZero(b, field));
  const sizes: number[] = [];
  let kernel = 0;
  for (const b of blocks)
    b.kernel.blocks.forEach((count, j) => {
      for (let i = 0; i < count * b.block.copies; i++) sizes.push(j);
      kernel += count * b.block.copies;
    });
  sizes.sort((x, y) => y - x);
  const codimension = blocks.reduce((s, b) => s + b.formula, 0);
  const formula = zeroCodimensionOfPartition(1, sizes);
  const active = blocks.filter((b) => b.kernel.basis.cols > 0).map((b) => ({ l: b.event.l, copies: b.block.copies }));
  const rank = adjointRankWithoutSymmetry(active, field.reduction());
  if (rank !== formula && adjointRankWithoutSymmetry(active, field.reduction(1)) !== formula)
    throw new RoutesDisagree(`codimension without symmetry: ${rank} by the adjoint map, ${formula} by the partition ${sizes.join(',')}`);
  return {
    blocks,
    dimension: sizes.reduce((s, x) => s + x, 0),
    kernel,
    sizes,
    semisimple: sizes.every((x) => x === 1),
    codimension,
    codimensionWithoutSymmetry: formula,
  };
}

/** What the pair at zero does in a versal family of one parameter. */
export function motionOf(codimension: number, semisimple: boolean): 'passes' | 'splits' | 'degenerate' {
  return codimension !== 1 ? 'degenerate' : semisimple ? 'passes' : 'splits';
}
