/** Groups acting by matrices with signs on a symplectic space; irreducibles and multiplicity spaces. */
export * from './action.ts';
export * from './components.ts';
export * from './flow-blocks.ts';
export * from './invariant-basis.ts';
export * from './irreducibles.ts';
export * from './labels.ts';
export * from './multiplicity-space.ts';
export * from './orbit.ts';
export * from './point-labels.ts';
export * from './restrict-form.ts';
export * from './seed-orbits.ts';
export * from './slice.ts';
export * from './slice-blocks.ts';
export * from './slice-rotations.ts';
export * from './subspace-search.ts';
export * from './symmetry-class.ts';
export * from './value-table.ts';
