/** The blocks of the flow, and of the components, cut down to the symplectic slice: one multiplicity space at a time. */
import { build, multiply } from '../linear/index.ts';
import type { AdaptedBlock } from './components.ts';
import type { FlowBlock } from './flow-blocks.ts';
import { coordinateMap } from './multiplicity-space.ts';
import { type Slice, sliceCoordinates, untouched } from './slice.ts';

/** The blocks of the flow on the slice; a block that is neutral altogether is left out. */
export function sliceFlowBlocks(slice: Slice, blocks: readonly FlowBlock[]): FlowBlock[] {
  return blocks.flatMap((block) => {
    if (untouched(slice, block.basis)) return [block];
    const c = sliceCoordinates(slice, block.basis);
    if (c.cols === 0) return [];
    const coordinates = coordinateMap(c, slice.field);
    return [
      {
        ...block,
        basis: multiply(block.basis, c),
        operators: block.operators.map((o) => ({
          matrix: coordinates(multiply(o.matrix, c)),
          inverse: coordinates(multiply(o.inverse, c)),
          sign: o.sign,
        })),
      },
    ];
  });
}

/** The same for the components of Γ; components that are neutral altogether keep an empty basis. */
export function sliceAdaptedBlocks(slice: Slice, blocks: readonly AdaptedBlock[]): AdaptedBlock[] {
  return blocks.map((b) => {
    if (untouched(slice, b.basis)) return b;
    const c = sliceCoordinates(slice, b.basis);
    return { ...b, basis: c.cols === 0 ? build(slice.field, b.basis.rows, 0, () => slice.field.zero) : multiply(b.basis, c) };
  });
}
