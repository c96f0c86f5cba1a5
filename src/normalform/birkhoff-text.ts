/** A Birkhoff normal form in words: actions, real and imaginary parts of resonant monomials, and plain data. */
import type { OrderedField } from '../field/index.ts';
import { exponentsOf, joinTerms, writeTerm } from '../polynomial/index.ts';
import { type AnyBirkhoffForm, actionPart, type BirkhoffForm, twistOf } from './birkhoff.ts';
import { type Resonance, resonancesOf } from './resonance.ts';

export interface BirkhoffSummary {
  readonly arithmetic: 'exact' | 'floating';
  readonly degree: number;
  /** Signed by the energy of the mode. */
  readonly frequencies: readonly { readonly value: number; readonly exact: string | null }[];
  /** z_j as a form on phase space and the constant c_j of I_j = |z_j|^2/(2 c_j). */
  readonly modes: readonly { readonly real: string; readonly imaginary: string; readonly bracket: string }[];
  readonly resonances: readonly Resonance[];
  readonly expression: string;
  /** The part in the actions alone. */
  readonly actions: string;
  /** Determinants of the twist; null below degree 4. */
  readonly twist: { readonly kolmogorov: string; readonly arnold: string; readonly value: number } | null;
}

/** The normal form as text: products of I1, …, Re(m), Im(m). */
export function birkhoffExpression<T>(b: BirkhoffForm<T>): string {
  const { field: f, modes, ring } = b;
  const n = modes.length;
  const terms: string[] = [];
  const write = (c: T, product: string) => {
    if (!f.isZero(c)) terms.push(writeTerm(f.format(c), product));
  };
  for (const [m, c] of ring.terms(b.normalForm)) {
    const e = exponentsOf(m, 2 * n);
    const k = modes.map((_, j) => e[j]! - e[j + n]!);
    const lead = k.find((x) => x !== 0);
    if (lead !== undefined && lead < 0) continue; // the conjugate of a term that is written
    let factor = f.one;
    const actions: string[] = [];
    modes.forEach(({ bracket }, j) => {
      const times = Math.min(e[j]!, e[j + n]!);
      for (let i = 0; i < times; i++) factor = f.mul(factor, f.mul(f.fromInteger(2), bracket));
      if (times > 0) actions.push(times === 1 ? `I${j + 1}` : `I${j + 1}^${times}`);
    });
    const join = (last: string) => [...actions, ...(last === '' ? [] : [last])].join('*');
    if (lead === undefined) {
      write(f.mul(factor, c.re), join(''));
      continue;
    }
    const monomial = k
      .map((x, j) => (x === 0 ? '' : `${x > 0 ? `z${j + 1}` : `conj(z${j + 1})`}${Math.abs(x) === 1 ? '' : `^${Math.abs(x)}`}`))
      .filter((s) => s !== '')
      .join('*');
    const twice = f.mul(f.fromInteger(2), factor);
    write(f.mul(twice, c.re), join(`Re(${monomial})`));
    write(f.neg(f.mul(twice, c.im)), join(`Im(${monomial})`));
  }
  return joinTerms(terms);
}

/** Plain data of a normal form; `coordinates` are the names on phase space. */
export function birkhoffSummary(b: AnyBirkhoffForm, coordinates: readonly string[]): BirkhoffSummary {
  return b.arithmetic === 'exact' ? summarise(b, coordinates, b.arithmetic) : summarise(b, coordinates, b.arithmetic);
}
function summarise<T>(b: BirkhoffForm<T>, coordinates: readonly string[], arithmetic: 'exact' | 'floating'): BirkhoffSummary {
  const f: OrderedField<T> = b.field;
  const form = (v: readonly T[]) => joinTerms(v.flatMap((c, i) => (f.isZero(c) ? [] : [writeTerm(f.format(c), coordinates[i]!)])));
  const { ring, polynomial } = actionPart(b);
  const twist = b.degree < 4 ? undefined : twistOf(b);
  return {
    arithmetic,
    degree: b.degree,
    frequencies: b.modes.map((m) => ({ value: f.toNumber(m.frequency), exact: arithmetic === 'exact' ? f.format(m.frequency) : null })),
    modes: b.modes.map((m) => ({ real: form(m.a), imaginary: form(m.b), bracket: f.format(m.bracket) })),
    resonances: resonancesOf(f, b.modes, b.degree),
    expression: birkhoffExpression(b),
    actions: ring.format(polynomial),
    twist:
      twist === undefined
        ? null
        : { kolmogorov: f.format(twist.kolmogorov), arnold: f.format(twist.arnold), value: f.toNumber(twist.arnold) },
  };
}
