/** The verdict on a zero event in one plain sentence. */
import type { Versality } from '../event/versality.ts';
import type { Motion, VerdictSummary } from './result.ts';

export interface VerdictFacts {
  readonly parameters: number;
  readonly vary: readonly string[];
  readonly order: number;
  /** Continuous symmetries fix the equilibrium. */
  readonly continuous?: boolean;
  readonly kernel: number;
  readonly sizes: readonly number[];
  readonly codimension: number;
  readonly codimensionWithoutSymmetry: number;
  readonly motion: Motion;
  /** Labels of the irreducibles of the kernel with their multiplicities. */
  readonly kernelComponents: readonly {
    readonly label: string;
    readonly multiplicity: number;
    readonly dimension: number;
    readonly carriesForm: boolean;
    readonly trivial: boolean;
    readonly type: string;
  }[];
  readonly versality: Versality | undefined;
}

const plural = (n: number, one: string, many = `${one}s`) => `${n} ${n === 1 ? one : many}`;

function kernelWords(facts: VerdictFacts): string {
  return facts.kernelComponents.map((k) => (k.multiplicity === 1 ? k.label : `${k.multiplicity} ${k.label}`)).join(' + ');
}

/** `neutral` is the dimension of the part that continuous symmetries force and that is set aside. */
export function verdict(facts: VerdictFacts | null, parameters: number, neutral = 0): VerdictSummary {
  if (facts === null)
    return {
      answer: 'no event',
      parameters,
      versal: null,
      because:
        neutral === 0
          ? 'The Hessian is nonsingular: no eigenvalue of the linearised flow is zero.'
          : `Apart from the neutral directions (${neutral} of them, forced by continuous symmetries) the Hessian is nonsingular: no other eigenvalue of the linearised flow is zero.`,
    };
  const generic = facts.codimension <= parameters;
  const symmetric = facts.order > 1 || facts.continuous === true;
  const lines: string[] = [];
  const only = facts.kernelComponents.length === 1 && facts.kernelComponents[0]!.multiplicity === 1;
  const count =
    facts.kernel === 1
      ? 'the simple zero'
      : `the ${facts.kernel === 2 ? 'double' : facts.kernel === 3 ? 'triple' : `${facts.kernel}-fold`} zero`;
  if (generic && facts.codimension === 1 && facts.continuous === true && !only)
    lines.push(
      `The event has codimension 1 in the class of the finite and continuous symmetries (${facts.codimensionWithoutSymmetry} without symmetry); the pair ${facts.motion}.`,
    );
  else if (generic && facts.codimension === 1) {
    const how =
      facts.motion === 'passes'
        ? 'carries an invariant symplectic form, so the eigenvalues pass through zero and stay imaginary'
        : 'carries no invariant symplectic form, so the eigenvalues meet in Jordan blocks of size 2 and split from the imaginary to the real axis';
    if (symmetric)
      lines.push(
        `The kernel is one irreducible, ${kernelWords(facts)}, which ${how}; ${facts.kernel > 1 ? `${count} is forced by the symmetry and` : 'it'} has codimension 1 in the symmetric class (${facts.codimensionWithoutSymmetry} without symmetry).`,
      );
    else lines.push(`The kernel is simple and the zero block has size 2: codimension 1, met by any one-parameter family; the pair splits.`);
    if (only && facts.kernelComponents[0]!.trivial && facts.motion === 'splits')
      lines.push(
        facts.versality?.onto === false
          ? 'The mode has the full symmetry: in general the equilibrium itself would turn back at a fold; that it persists here is more than the symmetry explains.'
          : 'The mode has the full symmetry, so the equilibrium itself turns back at a fold.',
      );
  } else if (generic)
    lines.push(
      `The event has codimension ${facts.codimension}, no more than the ${plural(parameters, 'parameter')} of the study (${facts.codimensionWithoutSymmetry} without symmetry).`,
    );
  else {
    const why: string[] = [];
    if (!only) why.push(`the kernel is ${kernelWords(facts)}, more than one irreducible`);
    else {
      const k = facts.kernelComponents[0]!;
      if (k.carriesForm && facts.sizes.some((s) => s > 1))
        why.push(
          `${k.label} is of ${k.type} type and carries an invariant symplectic form, so its zeros pass without Jordan blocks in general, but here the blocks have size ${facts.sizes[0]}`,
        );
      else why.push(`the Jordan blocks ${facts.sizes.join(', ')} on ${k.label} are not those of a one-parameter family`);
    }
    lines.push(
      `The event has codimension ${facts.codimension}, more than the ${plural(parameters, 'parameter')} of the study: ${why.join('; ')}.`,
    );
    lines.push(
      'It is not generic under the declared symmetry: more than that symmetry ties these modes. A special form of the interaction may do so, a symmetry that was not declared (symcodim check --find looks for one), an accident of these values, or an error.',
    );
  }
  const v = facts.versality;
  return {
    answer: generic ? 'generic' : 'not generic',
    parameters,
    versal: v === undefined ? null : v.versal,
    because: lines.join(' '),
    ...(v === undefined ? {} : { versality: versalityWords(v, facts.vary) }),
  };
}

function versalityWords(v: Versality, vary: readonly string[]): string {
  const names = vary.join(', ');
  if (v.versal)
    return v.alongBranch ? `Varying ${names} unfolds the event along this branch of equilibria.` : `Varying ${names} unfolds the event.`;
  if (!v.onto && v.spanned === v.codimension)
    return `Varying ${names} moves the eigenvalues, but does not break the tie of the kernel vectors with full symmetry: the equilibria do not form a smooth family over the parameters.`;
  return `Varying ${names} does not unfold the event: it spans ${v.spanned} of the ${v.codimension} directions of the normal space.`;
}
