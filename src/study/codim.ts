/** `codim`: the zero event of an exact model, its codimension, motion, subgroups, and the verdict. */
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
  sliceAdaptedBlocks,
  symplecticPart,
  tidy,
} from '../action/index.ts';
import { LimitError } from '../errors/index.ts';
import { type EventBlock, eventCharacters, subgroupCodimensions } from '../event/subgroup-codimension.ts';
import { freeUnfoldingForms, quadraticText, unfoldingForms } from '../event/unfolding.ts';
import { type Family, versality } from '../event/versality.ts';
import { type BlockForms, blockForms, motionOf, type ZeroEvent, zeroEvent } from '../event/zero-event.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { isSubconjugate, type SubgroupClass, subgroupClasses } from '../group/index.ts';
import {
  above,
  add,
  dense,
  fromColumns,
  identity,
  image,
  inertia,
  inverse,
  kernel,
  type Matrix,
  multiply,
  type SparseMatrix,
  scale,
  sparse,
  sub,
  transpose,
} from '../linear/index.ts';
import { formDerivatives } from '../model/form-family.ts';
import { cubicAlong } from '../model/local.ts';
import { linearCertificate } from './certificate.ts';
import { labelledComponents } from './labels.ts';
import { type SliceStudy, sliceComponents, sliceFixed, sliceStudy, sliceSubgroups, wholePiece, withContinuous } from './neutral-slice.ts';
import { actionOf, type Prepared, requireHolds } from './prepare.ts';
import type { CodimResult, InertiaSummary, SubgroupSummary, ZeroSummary } from './result.ts';
import { spectrumSummary } from './spectrum.ts';
import { componentSummaries, groupSummary, head } from './summary.ts';
import { type VerdictFacts, verdict } from './verdict.ts';

/** Subgroups of larger groups are not enumerated. */
export const SUBGROUP_ORDER_LIMIT = 2000;

/** Unfoldings are written out up to this many terms, on phase spaces up to this dimension. */
export const UNFOLDING_TERMS = 24;
export const UNFOLDING_DIMENSION = 40;
/** A term with a longer text is not readable in these coordinates; then none is written. */
export const UNFOLDING_LENGTH = 600;

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

/**
 * ∂S/∂μ as it would be in coordinates that keep the form fixed: S_μ + BᵀS + SB with B = −½ W⁻¹W_μ where the form depends on
 * the parameters.
 */
function canonicalDerivatives(study: LinearStudy, hessianBy: readonly SparseMatrix<Algebraic>[]): readonly SparseMatrix<Algebraic>[] {
  const { prepared, action } = study;
  const by = formDerivatives(prepared.declaration, prepared.quantities, prepared.field);
  if (by === undefined) return hessianBy;
  const f = action.field;
  const s = dense(hessianOf(study));
  const back = inverse(dense(action.form));
  return hessianBy.map((m, j) => {
    const b = scale(multiply(back, dense(embedSparse(by[j]!, prepared.field, f))), f.fromRational(-1n, 2n));
    const sb = multiply(s, b);
    return sparse(add(dense(m), add(sb, transpose(sb))));
  });
}

function family(study: LinearStudy): Family {
  const { prepared, action, components } = study;
  const { local, field: from } = prepared;
  const to = action.field;
  const move = (x: Algebraic) => to.embed(from, x);
  return {
    field: to,
    hessian: embedSparse(local.hessian, from, to),
    hessianBy: canonicalDerivatives(
      study,
      local.hessianBy.map((m) => embedSparse(m, from, to)),
    ),
    gradientBy: local.gradientBy.map((g) => g.map(move)),
    cubicAlong: (v) => {
      const back = v.map((x) => x);
      const lifted = { ...local, field: to, higher: { ...local.higher, coefficients: local.higher.coefficients.map(move) } };
      return cubicAlong(lifted, back);
    },
    fixed: study.slicing === undefined ? fixedSpace(action, components) : sliceFixed(study.slicing, fixedSpace(action, components)),
    branch: local.pointBy?.map((x) => x.map(move)),
    ...(study.slicing === undefined ? {} : { slice: { ...study.slicing.slice, form: action.form } }),
  };
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

/** The result of `codim`. */
export function codimResult(study: LinearStudy, parameters: number): CodimResult {
  const { prepared, action, components, event, symplectic } = study;
  const blocks = adaptedBlocks(action, components);
  const { slicing } = study;
  const forms = componentForms(study, slicing === undefined ? blocks : sliceAdaptedBlocks(slicing.slice, blocks));
  const vary = prepared.declaration.vary;
  const motion = motionOf(event.codimension, event.semisimple);
  const unfolds =
    event.dimension === 0 || vary.length === 0
      ? undefined
      : versality(event, family(study), slicing === undefined ? undefined : wholePiece(slicing, hessianOf(study)));
  const facts: VerdictFacts | null =
    event.dimension === 0
      ? null
      : {
          parameters,
          vary,
          order: action.group.order,
          continuous: (slicing?.slice.isotropy.length ?? 0) > 0,
          kernel: event.kernel,
          sizes: event.sizes,
          codimension: event.codimension,
          codimensionWithoutSymmetry: event.codimensionWithoutSymmetry,
          motion,
          kernelComponents: forms
            .filter((f) => f.kernelMultiplicity > 0)
            .map(({ component: c, kernelMultiplicity }) => ({
              label: c.label,
              multiplicity: kernelMultiplicity,
              dimension: c.irreducible.dimension,
              carriesForm: c.carriesForm,
              trivial: c.irreducible.index === 0,
              type: c.irreducible.type,
            })),
          versality: unfolds,
        };
  const counted = new Map(forms.map((f) => [f.component.label, f.inertia]));
  return {
    ...head('codim', prepared, groupSummary(action, prepared)),
    components: componentSummaries(components).map((c) => ({ ...c, inertia: counted.get(c.label)! })),
    inertia: inertiaOf(study.forms, action.field),
    neutral: slicing === undefined ? { dimension: 0 } : { dimension: slicing.slice.neutral, directions: slicing.directions },
    zero:
      facts === null
        ? null
        : zeroSummary(
            study,
            facts.kernelComponents.map((k) => k.label),
            motion,
          ),
    ...spectrumSummary(study, slicing?.slice.neutral),
    verdict: verdict(facts, parameters, slicing?.slice.neutral),
    certificate: { linear: linearCertificate(study, blocks) },
  };

  function zeroSummary(s: LinearStudy, labels: readonly string[], m: ReturnType<typeof motionOf>): ZeroSummary {
    const active = event.blocks
      .map((b, i) => ({ b, labels: s.blockComponents[i]!.map((c) => c.label) }))
      .filter(({ b }) => b.kernel.basis.cols > 0);
    return {
      dimension: event.dimension,
      kernel: event.kernel,
      blocks: event.sizes,
      semisimple: event.semisimple,
      codimension: event.codimension,
      codimensionWithoutSymmetry: event.codimensionWithoutSymmetry,
      motion: m,
      subgroups:
        s.slicing === undefined || s.slicing.slice.isotropy.length === 0
          ? subgroupSummaries(
              action,
              symplectic.part,
              event.blocks.map((b) => ({ block: b.block, counts: b.kernel.blocks })),
              event.semisimple,
            )
          : continuousSubgroups(s, s.slicing),
      components: labels,
      signs: active.flatMap(({ b, labels: l }) =>
        b.signed.map((x) => ({
          component: l.join(' + '),
          size: x.size,
          count: x.count * b.block.copies,
          positive: x.positive * b.block.copies,
          negative: x.negative * b.block.copies,
        })),
      ),
      ...unfoldings(s),
      routes: (s.slicing?.complete === false ? [] : active).map(({ b, labels: l }) => ({
        components: l,
        class: b.block.symmetryClass,
        partition: b.partition,
        formula: b.formula,
        rank: b.rank.codimension,
      })),
    };
  }
}

/** Normal spaces as quadratic Hamiltonians, with and without the symmetry, where they are small enough to be written out. */
function unfoldings(study: LinearStudy): { unfolding?: readonly string[]; unfoldingWithoutSymmetry?: readonly string[] } {
  const { action, event, prepared } = study;
  const { names } = prepared.quantities;
  const write = (forms: readonly Matrix<Algebraic>[]) => forms.map((q) => quadraticText(q, names, action.field));
  if (event.codimension > UNFOLDING_TERMS || action.dimension > UNFOLDING_DIMENSION) return {};
  const { slicing } = study;
  if (slicing?.complete === false) return {};
  const own = unfoldingForms(event, slicing?.wide ?? action);
  const free =
    slicing !== undefined
      ? undefined
      : freeUnfoldingForms(event, action, dense(embedSparse(prepared.local.hessian, prepared.field, action.field)));
  const readable = (forms: readonly Matrix<Algebraic>[] | undefined) => {
    const texts = forms === undefined ? [] : write(forms);
    return texts.length > 0 && texts.every((t) => t.length <= UNFOLDING_LENGTH) ? texts : undefined;
  };
  const [unfolding, unfoldingWithoutSymmetry] = [readable(own), readable(free)];
  return {
    ...(unfolding === undefined ? {} : { unfolding }),
    ...(unfoldingWithoutSymmetry === undefined ? {} : { unfoldingWithoutSymmetry }),
  };
}

/**
 * The same event in the class of every subgroup up to conjugacy, by order; counts[j] blocks of size j on the multiplicity space
 * of each block of the flow.
 */
export function subgroupSummaries(
  action: Action,
  part: SymplecticPart['part'],
  blocks: readonly { readonly block: EventBlock; readonly counts: readonly number[] }[],
  semisimple: boolean,
): SubgroupSummary[] {
  const characters = eventCharacters(action, part, blocks);
  const words = elementWords(action);
  const classes = subgroupsOf(action);
  const covers = coveringClasses(action, classes);
  return subgroupCodimensions(action, classes, characters).map((x, i) => ({
    order: x.order,
    reversing: x.reversing,
    conjugates: x.conjugates,
    codimension: x.codimension,
    motion: motionOf(x.codimension, semisimple),
    generators: x.generators.map(words),
    ...(covers === undefined ? {} : { coveredBy: covers[i]! }),
  }));
}

/** For each class the numbers of those next above it, up to conjugacy; undefined where there are too many to be drawn. */
function coveringClasses(action: Action, classes: readonly SubgroupClass[]): number[][] | undefined {
  if (classes.length > COVER_CLASSES) return undefined;
  const above = classes.map((a, i) =>
    classes.flatMap((b, j) => (j !== i && b.order > a.order && b.order % a.order === 0 && isSubconjugate(action.group, a, b) ? [j] : [])),
  );
  return above.map((list) => list.filter((j) => !list.some((k) => above[k]!.includes(j))));
}

/** Inclusions among more classes of subgroups than this are not worked out. */
const COVER_CLASSES = 60;

/** The same where continuous symmetries fix the equilibrium: they are kept under every subgroup. */
function continuousSubgroups(study: LinearStudy, slicing: SliceStudy): SubgroupSummary[] {
  const { action, event } = study;
  const classes = subgroupsOf(action);
  const words = elementWords(action);
  const codimensions = sliceSubgroups(slicing, event, classes, hessianOf(study));
  return classes.map((h, i) => ({
    order: h.order,
    reversing: h.elements.reduce((n, e) => n + (action.signs[e] === -1 ? 1 : 0), 0),
    conjugates: h.conjugates,
    codimension: codimensions[i]!,
    motion: motionOf(codimensions[i]!, event.semisimple),
    generators: h.generators.map(words),
  }));
}

const hessianOf = ({ prepared, action }: LinearStudy) => embedSparse(prepared.local.hessian, prepared.field, action.field);

/** All classes of subgroups, or only 1 and Γ where there are too many. */
function subgroupsOf(action: Action): SubgroupClass[] {
  const { group } = action;
  const whole: SubgroupClass = {
    order: group.order,
    elements: Int32Array.from({ length: group.order }, (_, i) => i),
    generators: [...new Set(group.generators)],
    conjugates: 1,
  };
  const trivial: SubgroupClass = { order: 1, elements: Int32Array.of(0), generators: [], conjugates: 1 };
  if (group.order === 1) return [trivial];
  if (group.order > SUBGROUP_ORDER_LIMIT) return [trivial, whole];
  try {
    return subgroupClasses(group);
  } catch (error) {
    if (!(error instanceof LimitError)) throw error;
    return [trivial, whole];
  }
}

/** An element as a word in the generators, rightmost first to act. */
function elementWords(action: Action): (element: number) => string {
  const { group } = action;
  return (element) => {
    const letters: string[] = [];
    for (let i = element; i !== 0; i = group.parent[i]!) letters.push(action.generators[group.via[i]!]!.name);
    const out: string[] = [];
    for (let i = 0; i < letters.length; ) {
      let j = i;
      while (j < letters.length && letters[j] === letters[i]) j++;
      out.push(j - i > 1 ? `${letters[i]}^${j - i}` : letters[i]!);
      i = j;
    }
    return out.length === 0 ? '1' : out.join(' ');
  };
}
