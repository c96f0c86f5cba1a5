/** `check` and `codim` of models with floating numbers: the same pipeline as for exact ones, with decisions that may stay open. */
import { UsageError } from '../errors/index.ts';
import type { Reading } from '../event/floating/readings.ts';
import { zeroCodimensionOfPartition } from '../event/partition-codimension.ts';
import { motionOf } from '../event/zero-event.ts';
import { symmetricEigen } from '../linear/spectral.ts';
import { floatingComponentBases, restrictNumeric } from './floating-action.ts';
import { doubtOf, eventSpaces, type FloatingVersality, floatingVersality } from './floating-event.ts';
import { type FloatingBlockZero, type FloatingStudy, floatingLinear } from './floating-linear.ts';
import { type FloatingPrepared, prepareFloating, requireFloatingHolds } from './floating-prepare.ts';
import { floatingSpectrumSummary } from './floating-spectrum.ts';
import { cutBasis } from './neutral-floating.ts';
import type { OutcomeStatus, StudyCommand } from './outcome.ts';
import type { NotExact } from './prepare.ts';
import type { CodimResult, InertiaSummary, StudyResult, VerdictSummary, ZeroSummary } from './result.ts';
import { subgroupSummaries } from './subgroup-summaries.ts';
import { CAUTION, componentSummaries, generatorSummaries, groupSummary, modelSummary } from './summary.ts';
import { type VerdictFacts, verdict } from './verdict.ts';

/** What every result of a floating model begins with. */
export function floatingHead(command: string, p: FloatingPrepared, group: StudyResult['group']): StudyResult {
  const { declaration, quantities } = p.source;
  const { field, names, values } = quantities;
  const model = modelSummary(p.source);
  const e = p.equilibrium;
  const kind = declaration.energy.kind;
  return {
    schema: 'symcodim/1',
    command,
    model: {
      ...model,
      parameters: Object.fromEntries(Object.keys(model.parameters).map((k) => [k, values.has(k) ? field.toNumber(values.get(k)!) : null])),
    },
    arithmetic: 'floating',
    floatingBecause: p.because,
    group,
    equilibrium: {
      holds: e.holds,
      gradient: e.gradient,
      point: Object.fromEntries(names.map((n, i) => [n, e.point[i]!])),
      polished: { step: e.step, iterations: e.iterations, gradientBefore: e.declaredGradient },
    },
    symmetry: { holds: p.symmetryHolds, generators: generatorSummaries(p) },
    tolerance: p.tolerance,
    ...(kind === 'mechanical' || kind === 'network' ? { caution: CAUTION } : {}),
  };
}

/** ker S and the inertia of S on each component of Γ. */
function componentInertias(study: FloatingStudy) {
  const { components, hessian, numeric, prepared, scale } = study;
  const irreducibles = components.present.map((c) => c.irreducible);
  const cut = prepared.tolerance * scale;
  return floatingComponentBases(components.whole, irreducibles, numeric).map(({ cut: width, basis: whole }, i) => {
    const basis = study.slice === undefined ? whole : cutBasis(study.slice, whole);
    const { values } = symmetricEigen(restrictNumeric(basis, hessian).data, basis.length);
    const copies = irreducibles[i]!.dimension / width;
    const count = (test: (x: number) => boolean) => values.filter(test).length;
    const zero = count((x) => Math.abs(x) <= cut);
    return {
      component: components.present[i]!,
      kernelMultiplicity: zero / width,
      inertia: { positive: count((x) => x > cut) * copies, zero: zero * copies, negative: count((x) => x < -cut) * copies },
    };
  });
}

function wholeInertia(study: FloatingStudy): InertiaSummary {
  const sum = (pick: (b: FloatingBlockZero) => number) => study.blocks.reduce((s, b) => s + pick(b) * b.block.copies, 0);
  return {
    positive: sum((b) => b.zero.inertia.positive),
    zero: sum((b) => b.zero.inertia.zero),
    negative: sum((b) => b.zero.inertia.negative),
  };
}

const smallest = (readings: readonly Reading[]) => {
  const zero = Math.max(0, ...readings.flatMap((r) => r.zero));
  const nonzero = Math.min(Infinity, ...readings.flatMap((r) => r.nonzero));
  return { zero, nonzero };
};

/** The numbers on both sides of the cut, in words. */
function readingWords(study: FloatingStudy): string {
  const { zero, nonzero } = smallest(study.blocks.flatMap((b) => b.zero.readings));
  const shown = nonzero === Infinity ? 'none' : nonzero.toExponential(1);
  return `largest number counted as zero ${zero.toExponential(1)}, smallest counted as nonzero ${shown}, relative to the terms of the Hessian, at tolerance ${study.prepared.tolerance.toExponential(0)}`;
}

const label = (b: FloatingBlockZero) => b.components.map((c) => c.label).join(' + ');

/** The result of `codim`. */
export function floatingCodimResult(study: FloatingStudy, parameters: number): CodimResult {
  const { prepared, action, components, symplectic } = study;
  const vary = prepared.source.declaration.vary;
  const forms = componentInertias(study);
  const active = study.blocks.filter((b) => b.zero.generalisedDimension > 0);
  let doubt: string | null = null;
  for (const b of study.blocks) if (b.doubt !== null) doubt ??= `on ${label(b)}, ${b.doubt}`;
  const sizes = active.flatMap((b) => b.counts.flatMap((c, j) => new Array<number>(c * b.block.copies).fill(j))).sort((x, y) => y - x);
  const kernel = active.reduce((s, b) => s + b.zero.kernelDimension * b.block.copies, 0);
  const dimension = sizes.reduce((s, x) => s + x, 0);
  const semisimple = sizes.every((x) => x === 1);
  const spaces = doubt === null && dimension > 0 ? eventSpaces(study) : undefined;
  for (const space of spaces ?? [])
    if (space.codimension !== space.zero.formula)
      doubt ??= `the codimension on ${label(space.zero)} is ${space.zero.formula} by the Jordan blocks and ${space.codimension} by the rank of the adjoint map (${doubtOf(space.readings) ?? 'no reading near the cut'})`;
  const codimension = doubt !== null ? null : active.reduce((s, b) => s + b.formula!, 0);
  const without = doubt !== null ? null : zeroCodimensionOfPartition(1, sizes);
  const motion = codimension === null ? 'degenerate' : motionOf(codimension, semisimple);
  const unfolds =
    codimension === null || dimension === 0 || vary.length === 0 || spaces === undefined
      ? undefined
      : floatingVersality(study, spaces, codimension);
  const kernelComponents = forms
    .filter((f) => f.kernelMultiplicity > 0)
    .map(({ component: c, kernelMultiplicity }) => ({
      label: c.label,
      multiplicity: kernelMultiplicity,
      dimension: c.irreducible.dimension,
      carriesForm: c.carriesForm,
      trivial: c.irreducible.index === 0,
      type: c.irreducible.type,
    }));
  const facts: VerdictFacts | null =
    dimension === 0 || codimension === null
      ? null
      : {
          parameters,
          vary,
          order: action.group.order,
          kernel,
          sizes,
          codimension,
          codimensionWithoutSymmetry: without!,
          motion,
          kernelComponents,
          versality: unfolds === undefined || unfolds.versal === null ? undefined : { ...unfolds, versal: unfolds.versal },
        };
  const answer: VerdictSummary =
    doubt === null
      ? closed(verdict(facts, parameters, study.slice?.neutral), unfolds, readingWords(study))
      : { answer: 'undecided', parameters, versal: null, because: `Undecided: ${doubt}. (${readingWords(study)}.)` };
  const zero: ZeroSummary | null =
    dimension === 0
      ? null
      : {
          dimension,
          kernel,
          blocks: sizes,
          semisimple,
          codimension,
          codimensionWithoutSymmetry: without,
          motion,
          subgroups:
            codimension === null
              ? []
              : subgroupSummaries(
                  action,
                  symplectic.part,
                  study.blocks.map((b) => ({ block: b.block, counts: b.counts })),
                  semisimple,
                ),
          components: kernelComponents.map((k) => k.label),
          signs: active.flatMap((b) =>
            [...b.zero.blocks]
              .sort((x, y) => y.size - x.size)
              .map((x) => ({
                component: label(b),
                size: x.size,
                count: x.count * b.block.copies,
                positive: x.positive * b.block.copies,
                negative: x.negative * b.block.copies,
              })),
          ),
          routes: active.flatMap((b) => {
            const space = spaces?.find((x) => x.zero === b);
            if (b.formula === undefined || space === undefined) return [];
            return [
              {
                components: b.components.map((c) => c.label),
                class: b.block.symmetryClass,
                partition: b.partition,
                formula: b.formula,
                rank: space.codimension,
              },
            ];
          }),
        };
  const counted = new Map(forms.map((f) => [f.component.label, f.inertia]));
  return {
    ...floatingHead('codim', prepared, groupSummary(action, { generators: prepared.generators, declaration: prepared.source.declaration })),
    components: componentSummaries(components).map((c) => ({ ...c, inertia: counted.get(c.label)! })),
    inertia: wholeInertia(study),
    neutral: study.slice === undefined ? { dimension: 0 } : { dimension: study.slice.neutral, directions: study.slice.directions },
    zero,
    ...floatingSpectrumSummary(study),
    verdict: answer,
  };
}

/** A verdict with the readings behind it; versality null where the numbers leave it open. */
function closed(v: VerdictSummary, unfolds: FloatingVersality | undefined, readings: string): VerdictSummary {
  const open = unfolds !== undefined && unfolds.versal === null;
  return {
    ...v,
    ...(open ? { versal: null, versality: `Versality is undecided: ${unfolds.doubt}.` } : {}),
    because: `${v.because} (Decided in floating point: ${readings}.)`,
  };
}

/** The result of `check`. */
export function floatingCheckResult(p: FloatingPrepared): StudyResult {
  const order = p.action?.group.order ?? 0;
  const group =
    p.action === undefined
      ? { order, reversing: 0 }
      : groupSummary(p.action, { generators: p.generators, declaration: p.source.declaration });
  return floatingHead('check', p, group);
}

const STATUS: Readonly<Record<string, OutcomeStatus>> = { generic: 0, 'no event': 0, 'not generic': 1, undecided: 3 };

/** Reads a floating model and runs its linear analysis. Throws the errors of `check` where the model is not what it claims. */
export function floatingStudy(source: NotExact): FloatingStudy {
  const prepared = prepareFloating(source);
  requireFloatingHolds(prepared);
  return floatingLinear(prepared);
}

/** Answers a command about a floating model. Throws UsageError for commands that need exact numbers. */
export function floatingAnswer(
  command: StudyCommand,
  source: NotExact,
  parameters: number,
): { result: StudyResult; status: OutcomeStatus; notes: string[] } {
  const notes = [`floating arithmetic: ${source.because}`];
  if (command === 'check') {
    const result = floatingCheckResult(prepareFloating(source));
    return { result, status: result.equilibrium.holds && result.symmetry.holds ? 0 : 1, notes };
  }
  if (command !== 'codim')
    throw new UsageError(`${command} needs exact numbers, but ${source.because}`, {
      expected: 'integers, fractions, decimals, square roots, cosines of rational multiples of pi',
      next: 'run symcodim codim or symcodim check, which also take floating numbers, or write the number exactly',
    });
  const result = floatingCodimResult(floatingStudy(source), parameters);
  return { result, status: STATUS[result.verdict.answer]!, notes };
}
