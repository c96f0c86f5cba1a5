/** A generator of a ring of invariants. */
import type { Algebraic } from '../field/index.ts';
import type { Polynomial } from '../polynomial/index.ts';

/** A polynomial in real coordinates, and the same written in z and z̄ where the action has planes. */
export interface Readable {
  /** The polynomial in real coordinates. */
  readonly real: string;
  readonly realLatex: string;
  /** E.g. `|z|^2`, `Re(z^2*w)`; undefined where the action has no planes or the form is not short. */
  readonly complex: string | undefined;
  readonly complexLatex: string | undefined;
}

export interface Generator {
  readonly name: string;
  readonly degree: number;
  /** Degrees in the blocks of the action. */
  readonly degrees: readonly number[];
  readonly polynomial: Polynomial<Algebraic>;
  readonly readable: Readable;
}
