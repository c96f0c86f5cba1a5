/** `codim`: the zero event of an exact model, its codimension, motion, subgroups, and the verdict. */
import { adaptedBlocks, embedSparse, sliceAdaptedBlocks } from '../action/index.ts';
import { freeUnfoldingForms, quadraticText, unfoldingForms } from '../event/unfolding.ts';
import { versality } from '../event/versality.ts';
import { motionOf } from '../event/zero-event.ts';
import type { Algebraic } from '../field/index.ts';
import { dense, type Matrix } from '../linear/index.ts';
import { linearCertificate } from './certificate.ts';
import { family } from './family.ts';
import { componentForms, hessianOf, inertiaOf, type LinearStudy } from './linear-study.ts';
import { wholePiece } from './neutral-slice.ts';
import type { CodimResult, ZeroSummary } from './result.ts';
import { spectrumSummary } from './spectrum.ts';
import { continuousSubgroups, subgroupSummaries } from './subgroup-summaries.ts';
import { componentSummaries, groupSummary, head } from './summary.ts';
import { type VerdictFacts, verdict } from './verdict.ts';

/** Unfoldings are written out up to this many terms, on phase spaces up to this dimension. */
export const UNFOLDING_TERMS = 24;
export const UNFOLDING_DIMENSION = 40;
/** A term with a longer text is not readable in these coordinates; then none is written. */
export const UNFOLDING_LENGTH = 600;

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
