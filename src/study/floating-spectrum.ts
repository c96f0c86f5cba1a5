/** Spectrum, collisions and stability of a floating model: the places of its blocks gathered where they agree to the tolerance. */
import { InputError } from '../errors/index.ts';
import { type ClusterPart, type ClusterPlace, collisionAt, collisionsOf } from '../event/collisions.ts';
import type { EigenvalueKind } from '../event/partition-codimension.ts';
import { type BlockSpectrum, blockSpectrum } from './floating-block-spectrum.ts';
import type { FloatingBlockZero, FloatingStudy } from './floating-linear.ts';
import type { CodimResult, SpectrumEntry } from './result.ts';
import { collisionSummary, sortedSpectrum, stabilityWords } from './spectrum.ts';

/** Places of all blocks, gathered where they agree to the tolerance. */
function gatheredPlaces(blocks: readonly BlockSpectrum[], tolerance: number): ClusterPlace[] {
  const all = blocks.flatMap((b) => b.places);
  const reach = tolerance * all.reduce((m, p) => Math.max(m, Math.hypot(p.re, p.im)), 0);
  const out: { kind: EigenvalueKind; re: number; im: number; parts: ClusterPart[] }[] = [];
  for (const p of [...all].sort((x, y) => Math.hypot(x.re, x.im) - Math.hypot(y.re, y.im))) {
    const found = out.find((q) => q.kind === p.kind && Math.hypot(q.re - p.re, q.im - p.im) <= reach);
    if (found === undefined) {
      out.push({ kind: p.kind, re: p.re, im: p.im, parts: [p.part] });
      continue;
    }
    const same = found.parts.findIndex((x) => x.block === p.part.block);
    if (same < 0) found.parts.push(p.part);
    else {
      const old = found.parts[same]!;
      found.parts[same] = {
        ...old,
        members: [...old.members, ...p.part.members],
        sizes: [...old.sizes, ...p.part.sizes],
        ...(old.krein === undefined || p.part.krein === undefined
          ? {}
          : { krein: [old.krein[0] + p.part.krein[0], old.krein[1] + p.part.krein[1]] as const }),
      };
    }
  }
  return out.map((p) => ({ ...p, exact: null }));
}

/**
 * Distances up to this many times the tolerance are too near the cut to say that eigenvalues are apart; nor are distances within the
 * tolerance of the terms of a block, where coordinates are far from orthogonal.
 */
const NEARLY_EQUAL = 100;

/** A sentence for each pair of places that are neither equal to the tolerance nor clearly apart. */
function nearlyEqual(study: FloatingStudy, places: readonly ClusterPlace[], labels: readonly (readonly string[])[]): string[] {
  const { tolerance } = study.prepared;
  const largest = places.reduce((m, p) => Math.max(m, Math.hypot(p.re, p.im)), 0);
  const where = (p: ClusterPlace) => [...new Set(p.parts.flatMap((x) => labels[x.block]!))].join(' + ');
  return places.flatMap((p, i) =>
    places.slice(i + 1).flatMap((q) => {
      const apart = Math.hypot(p.re - q.re, p.im - q.im) / largest;
      const terms = Math.max(...[...p.parts, ...q.parts].map((x) => study.blocks[x.block]!.scale)) / largest;
      if (!(apart <= tolerance * Math.max(NEARLY_EQUAL, terms))) return [];
      const at = Math.hypot(p.re, p.im).toPrecision(6);
      return [
        `Whether eigenvalues of modulus ${at} meet is open (${where(p)} and ${where(q)} are ${apart.toExponential(1)} apart, relative to the largest, at tolerance ${tolerance.toExponential(0)}).`,
      ];
    }),
  );
}

/** Collisions, spectrum and stability of a floating model. */
export function floatingSpectrumSummary(study: FloatingStudy): Required<Pick<CodimResult, 'collisions' | 'spectrum' | 'stability'>> {
  const labels = study.blocks.map((b) => b.components.map((c) => c.label));
  const blocks = study.blocks.map((b, i) => blockSpectrum(study, b, i));
  const places = gatheredPlaces(blocks, study.prepared.tolerance);
  let complete = blocks.every((b) => b.complete);
  const known: ClusterPlace[] = [];
  for (const p of places) {
    if (p.parts.some((x) => x.members.length === 0)) continue;
    try {
      collisionAt(p);
      known.push(p);
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      complete = false;
    }
  }
  const collisions = collisionsOf(known).map((c) => collisionSummary(c, labels));
  const spectrum = sortedSpectrum(
    places.flatMap((p) =>
      p.parts.map(
        (x): SpectrumEntry => ({
          components: labels[x.block]!,
          re: p.re,
          im: p.im,
          multiplicity: x.sizes.reduce((s, y) => s + y, 0),
          ...(x.krein === undefined ? {} : { krein: x.krein }),
        }),
      ),
    ),
  );
  const sum = (pick: (b: FloatingBlockZero) => number) => study.blocks.reduce((s, b) => s + pick(b) * b.block.copies, 0);
  const words = stabilityWords({
    inertia: {
      positive: sum((b) => b.zero.inertia.positive),
      zero: sum((b) => b.zero.inertia.zero),
      negative: sum((b) => b.zero.inertia.negative),
    },
    zeroSizes: study.blocks.flatMap((b) => b.zero.blocks.map((x) => x.size)),
    spectrum,
    collisions,
    neutral: study.slice?.neutral ?? 0,
    complete,
  });
  const stability = [words, ...nearlyEqual(study, places, labels)].join(' ');
  return { collisions, spectrum, stability };
}
