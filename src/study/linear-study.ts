/** The linear analysis of one exact model: what codim, reduce, branches, report and verify start from. */
import {
  type Action,
  adaptedBlocks,
  type Component,
  type Components,
  componentsOfBlock,
  cutterMatrix,
  embedSparse,
  flowBlocks,
  restrictForm,
  type SymplecticPart,
  symplecticPart,
  tidy,
} from '../action/index.ts';
import { type BlockForms, blockForms, type ZeroEvent, zeroEvent } from '../event/zero-event.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { above, dense, fromColumns, identity, image, inertia, kernel, type Matrix, type SparseMatrix, sub } from '../linear/index.ts';
import { labelledComponents } from './labels.ts';
import { type SliceStudy, sliceComponents, sliceStudy, withContinuous } from './neutral-slice.ts';
import { actionOf, type Prepared, requireHolds } from './prepare.ts';
import type { InertiaSummary } from './result.ts';

/** The linear analysis of one exact model: what codim, report and verify share. */
export interface LinearStudy {
  readonly prepared: Prepared;
  readonly action: Action;
  readonly components: Components;
  readonly symplectic: SymplecticPart;
  readonly forms: readonly BlockForms[];
  /** Components of Γ in each flow block. */
  readonly blockComponents: readonly (readonly Component[])[];
  readonly event: ZeroEvent;
  /** The symplectic slice, where the model has continuous symmetries; `forms` and `event` are then those of the slice. */
  readonly slicing?: SliceStudy;
}

/** Runs the linear analysis. Throws the errors of `check` where the model is not what it claims. */
export function linearStudy(prepared: Prepared): LinearStudy {
  let out = linearStudies.get(prepared);
  if (out === undefined) {
    out = makeLinearStudy(prepared);
    linearStudies.set(prepared, out);
  }
  return out;
}

/** The stages of a report share one analysis. */
const linearStudies = new WeakMap<Prepared, LinearStudy>();

function makeLinearStudy(prepared: Prepared): LinearStudy {
  requireHolds(prepared);
  const given = actionOf(prepared);
  const slicing = sliceStudy(prepared, given);
  const action = slicing?.action ?? given;
  const components = labelledComponents(prepared.declaration, action);
  const symplectic = symplecticPart(action);
  const flow = slicing?.blocks ?? flowBlocks(action, symplectic);
  const hessian = embedSparse(prepared.local.hessian, prepared.field, action.field);
  const forms = blockForms(flow, hessian, action.form);
  const event = slicing === undefined ? zeroEvent(forms, action.field) : withContinuous(slicing, zeroEvent(forms, action.field), hessian);
  const blockComponents = flow.map((b) =>
    slicing === undefined ? componentsOfBlock(action, components, symplectic.part, b.irreducible) : sliceComponents(slicing, components, b),
  );
  return { prepared, action, components, symplectic, forms, blockComponents, event, ...(slicing === undefined ? {} : { slicing }) };
}

/** S over the field of the action. */
export const hessianOf = ({ prepared, action }: Pick<LinearStudy, 'prepared' | 'action'>): SparseMatrix<Algebraic> =>
  embedSparse(prepared.local.hessian, prepared.field, action.field);

/** Inertia of S on the whole space, block by block. */
export function inertiaOf(forms: readonly BlockForms[], field: RealField): InertiaSummary {
  let positive = 0;
  let zero = 0;
  let negative = 0;
  for (const b of forms) {
    const i = inertia(b.s, field);
    positive += i.positive * b.block.copies;
    zero += i.zero * b.block.copies;
    negative += i.negative * b.block.copies;
  }
  return { positive, zero, negative };
}

/** Basis of Fix(Γ), n × f. */
export function fixedSpace(action: Action, components: Components): Matrix<Algebraic> {
  const f = action.field;
  const n = action.dimension;
  const trivial = components.present.find((c) => c.irreducible.index === 0);
  if (trivial === undefined) return fromColumns<Algebraic>(f, [], n);
  if (action.group.order === 1) return identity<Algebraic>(f, n);
  if (action.group.order <= 500) {
    const elements = Array.from({ length: action.group.order }, (_, i) => i);
    const rep = { field: f, dimension: n, group: action.group, matrix: (e: number) => action.matrix(e) };
    return tidy(image(dense(cutterMatrix(rep, { elements, signs: elements.map(() => 1 as const), dimensions: [] }))), f);
  }
  let stacked: Matrix<Algebraic> | undefined;
  for (const g of action.generators) {
    const d = sub(dense(g.matrix), identity<Algebraic>(f, n));
    stacked = stacked === undefined ? d : above(stacked, d);
  }
  return kernel(stacked!);
}

/** ker S component by component under Γ: how often each irreducible occurs in it, and the inertia of S there. */
export interface ComponentForms {
  readonly component: Component;
  readonly kernelMultiplicity: number;
  readonly inertia: InertiaSummary;
}

export function componentForms(study: LinearStudy, blocks = adaptedBlocks(study.action, study.components)): ComponentForms[] {
  const { action, prepared } = study;
  const hessian = embedSparse(prepared.local.hessian, prepared.field, action.field);
  return blocks.map((b) => {
    const i = inertia(restrictForm(b.basis, hessian), action.field);
    const copies = b.component.irreducible.dimension / b.cut;
    return {
      component: b.component,
      kernelMultiplicity: i.zero / b.cut,
      inertia: { positive: i.positive * copies, zero: i.zero * copies, negative: i.negative * copies },
    };
  });
}
