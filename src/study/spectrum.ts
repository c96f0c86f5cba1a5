/** Spectrum, collisions and stability of an exact model: eigenvalues by component with their Krein signatures, and what they mean in words. */
import { blockRoots } from '../event/block-spectrum.ts';
import { type ClusterPlace, type Collision, collisionsOf } from '../event/collisions.ts';
import { eigenvalueOf, exactPlaces } from '../event/collisions-exact.ts';
import { genericMultiplicity } from '../event/collisions-suspects.ts';
import { inertia } from '../linear/index.ts';
import type { LinearStudy } from './linear-study.ts';
import type { CodimResult, CollisionSummary, InertiaSummary, SpectrumEntry } from './result.ts';

export type SpectrumSummary = Required<Pick<CodimResult, 'collisions' | 'spectrum' | 'stability'>>;

/** A collision in the words of the result; `labels` are those of the components of each block of the flow. */
export function collisionSummary(c: Collision, labels: readonly (readonly string[])[]): CollisionSummary {
  return {
    kind: c.kind,
    value: c.kind === 'quadruple' ? [c.re, c.im] : c.kind === 'real' ? c.re : c.im,
    exact: c.exact,
    multiplicity: c.multiplicity,
    blocks: c.sizes,
    ...(c.krein === undefined ? {} : { signature: c.krein }),
    codimension: c.codimension,
    codimensionWithoutSymmetry: c.codimensionWithoutSymmetry,
    motion: c.motion,
    components: [...new Set(c.parts.flatMap((p) => labels[p.block]!))],
  };
}

/** What stability needs to know of the linear part. */
export interface StabilityFacts {
  readonly inertia: InertiaSummary;
  readonly zeroSizes: readonly number[];
  readonly spectrum: readonly SpectrumEntry[];
  readonly collisions: readonly CollisionSummary[];
  /** Dimension of the neutral directions, 0 without any. */
  readonly neutral: number;
  /** False where some eigenvalues are not known. */
  readonly complete: boolean;
}

/** The energy criterion and spectral stability in words. */
export function stabilityWords(f: StabilityFacts): string {
  const place = f.neutral > 0 ? ' on the symplectic slice' : '';
  const { positive, zero, negative } = f.inertia;
  const lines: string[] = [];
  if (positive + zero + negative === 0) return 'Nothing moves off the neutral directions.';
  if (positive === 0 && negative === 0)
    lines.push(`The Hessian vanishes${place}: the energy criterion does not decide; terms of higher order do.`);
  else if (zero === 0 && (negative === 0 || positive === 0))
    lines.push(
      `The Hessian is ${negative === 0 ? 'positive' : 'negative'} definite${place}: the equilibrium is ${f.neutral > 0 ? 'nonlinearly stable modulo its continuous symmetry' : 'nonlinearly stable'} by the energy criterion (Lagrange–Dirichlet).`,
    );
  else if (negative === 0 || positive === 0)
    lines.push(
      `The Hessian is ${negative === 0 ? 'positive' : 'negative'} semidefinite${place} with ${zero} zero ${zero === 1 ? 'direction' : 'directions'}: the energy criterion does not decide; terms of higher order do.`,
    );
  else
    lines.push(
      `The Hessian is indefinite${place} (${positive} positive, ${zero} zero, ${negative} negative): the energy criterion does not apply.`,
    );
  const unstable = f.spectrum.reduce((s, e) => s + (e.re > 0 ? e.multiplicity * (e.im > 0 ? 2 : 1) : 0), 0);
  const nilpotent = f.collisions.some((c) => c.kind === 'imaginary' && c.blocks.some((b) => b > 1));
  if (unstable > 0) lines.push(`Unstable: ${unstable} ${unstable === 1 ? 'eigenvalue has' : 'eigenvalues have'} a positive real part.`);
  else if (!f.complete) lines.push('Not all eigenvalues were computed; spectral stability is open.');
  else if (nilpotent || f.zeroSizes.some((s) => s > 1))
    lines.push(
      `All eigenvalues are imaginary, but there are Jordan blocks${nilpotent ? ' off zero' : ' at zero'}: solutions of the linear system grow like powers of time.`,
    );
  else {
    const mixed =
      f.spectrum.some((e) => e.krein !== undefined && e.krein[1] > 0) && f.spectrum.some((e) => e.krein !== undefined && e.krein[0] > 0);
    lines.push(
      `Spectrally stable: all eigenvalues are imaginary and semisimple${mixed ? '; modes of both Krein signs are present, so that resonances or damping may destabilise' : ''}.`,
    );
  }
  if (f.collisions.some((c) => c.codimension >= 1))
    lines.push(
      'Eigenvalues coincide off zero: at special parameter values, or because more than the declared symmetry forces them together.',
    );
  return lines.join(' ');
}

/** Entries by modulus, imaginary ones first among equals. */
export function sortedSpectrum(entries: readonly SpectrumEntry[]): SpectrumEntry[] {
  return [...entries].sort((a, b) => Math.hypot(a.re, a.im) - Math.hypot(b.re, b.im) || a.re - b.re);
}

/** Collisions, spectrum and stability of an exact model; `neutral` is the dimension of its neutral directions. */
export function spectrumSummary(study: LinearStudy, neutral = 0): SpectrumSummary {
  const { forms, action, blockComponents, event } = study;
  const field = action.field;
  const labels = blockComponents.map((list) => list.map((c) => c.label));
  const places = exactPlaces(forms, field);
  const collisions = collisionsOf(places ?? []).map((c) => collisionSummary(c, labels));
  let complete = places !== undefined;
  const entries: SpectrumEntry[] = [];
  let positive = 0;
  let zero = 0;
  let negative = 0;
  forms.forEach((b, i) => {
    const own = inertia(b.s, field);
    positive += own.positive * b.block.copies;
    zero += own.zero * b.block.copies;
    negative += own.negative * b.block.copies;
    const roots = blockRoots(b, field);
    if (roots === undefined) {
      complete = false;
      return;
    }
    for (const { y, multiplicity, krein } of roots) {
      const { re, im } = eigenvalueOf(y);
      const count = multiplicity * b.block.copies;
      const known = kreinAt(places ?? [], i, re, im);
      const simple = multiplicity === genericMultiplicity(b.block.symmetryClass, b.block.cut) || krein !== undefined;
      const signature = known ?? (krein === undefined || !simple ? undefined : krein === 1 ? ([count, 0] as const) : ([0, count] as const));
      entries.push({
        components: labels[i]!,
        re,
        im,
        multiplicity: count,
        ...(re !== 0 || signature === undefined ? {} : { krein: signature }),
      });
    }
  });
  const spectrum = sortedSpectrum(entries);
  const stability = stabilityWords({
    inertia: { positive, zero, negative },
    zeroSizes: event.sizes,
    spectrum,
    collisions,
    neutral,
    complete,
  });
  return { collisions, spectrum, stability };
}

/** The exact signature of a block at a place where it was determined. */
function kreinAt(places: readonly ClusterPlace[], block: number, re: number, im: number): readonly [number, number] | undefined {
  if (re !== 0) return undefined;
  const near = (p: ClusterPlace) => p.kind === 'imaginary' && Math.abs(p.im - im) <= 1e-6 * im && p.parts.some((x) => x.block === block);
  return places.find(near)?.parts.find((x) => x.block === block)?.krein;
}
