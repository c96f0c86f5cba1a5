/**
 * Molien series M(t) = |Γ|⁻¹ Σ ψ̄(g)/det(1 - tρ(g)) as a rational function with a denominator of degrees, and its
 * expansion; ψ = 1 counts invariants, ψ = the character of a second action counts equivariants.
 */
import { LimitError, ShapeError } from '../errors/index.ts';
import { denominatorDegrees, poleOrders } from './degrees.ts';
import { GradedDimensions, type Twist } from './dimensions.ts';
import { dualAction, type LinearAction, sumOfActions } from './linear-action.ts';

export interface MolienSeries {
  /** Coefficients of the numerator, constant term first. */
  readonly numerator: readonly number[];
  /** The d of the factors 1 - t^d, increasing. */
  readonly denominator: readonly number[];
  /** Coefficients of the expansion, degrees 0 … the degree asked for. */
  readonly series: readonly number[];
  readonly text: string;
  readonly latex: string;
}

/** Highest degree of a numerator. */
export const NUMERATOR_MOST = 400;

export interface MolienOptions {
  /** Highest degree of the expansion; 12 by default. */
  readonly degree?: number;
  /** Count polynomial maps into this action of the same group that commute with the group. */
  readonly target?: LinearAction;
  /** Count polynomials that transform by this character. */
  readonly character?: Twist;
}

/** The series of invariants, or a twisted one. Throws ShapeError if the target belongs to another group. */
export function molien(action: LinearAction, options: MolienOptions = {}): MolienSeries {
  const { degree = 12, target, character } = options;
  const n = action.dimension;
  const all = [Array.from({ length: n }, (_, i) => i)];
  const invariants = new GradedDimensions(action, all);
  let count = (d: number) => invariants.dimension([d]);
  const degrees = denominatorDegrees(n, poleOrders(invariants), count);
  if (target !== undefined) {
    if (target.group !== action.group)
      throw new ShapeError('equivariant maps lead from one action of a group to another of the same group');
    const dual = dualAction(
      target,
      target.names.map((_, i) => `y${i}`),
    );
    const both = new GradedDimensions(sumOfActions(action, dual), [all[0]!, Array.from({ length: target.dimension }, (_, i) => n + i)]);
    count = (d) => both.dimension([d, 1]);
  } else if (character !== undefined) {
    const twisted = new GradedDimensions(action, all, character);
    count = (d) => twisted.dimension([d]);
  }
  const top = degrees.reduce((s, d) => s + d - 1, 0);
  if (top > NUMERATOR_MOST)
    throw new LimitError(`the numerator of the Molien series would have degree ${top}; the limit is ${NUMERATOR_MOST}`, {
      next: 'ask for the invariants of a component, not of the whole space',
    });
  const numerator = Array.from({ length: top + 1 }, (_, d) => count(d));
  for (const e of degrees) for (let i = top; i >= e; i--) numerator[i] = numerator[i]! - numerator[i - e]!;
  while (numerator.length > 1 && numerator.at(-1) === 0) numerator.pop();
  const series = Array.from({ length: degree + 1 }, (_, d) => count(d));
  return { numerator, denominator: degrees, series, ...writeFraction(numerator, degrees) };
}

/** The expansion of numerator/Π(1 - t^d) up to a degree: the inverse of what `molien` found. */
export function expandFraction(numerator: readonly number[], denominator: readonly number[], degree: number): number[] {
  const out = Array.from({ length: degree + 1 }, (_, d) => numerator[d] ?? 0);
  for (const e of denominator) for (let i = e; i <= degree; i++) out[i] = out[i]! + out[i - e]!;
  return out;
}

function writeFraction(numerator: readonly number[], degrees: readonly number[]): { text: string; latex: string } {
  const terms = numerator.flatMap((c, d) => (c === 0 ? [] : [{ c, d }]));
  const sum = (power: (d: number) => string) =>
    terms
      .map(({ c, d }, i) => {
        const magnitude = Math.abs(c);
        const body = d === 0 ? `${magnitude}` : magnitude === 1 ? power(d) : `${magnitude}${power(d)}`;
        return i === 0 ? (c < 0 ? `-${body}` : body) : c < 0 ? ` - ${body}` : ` + ${body}`;
      })
      .join('') || '0';
  const groups = [...new Set(degrees)].map((d) => ({ d, e: degrees.filter((x) => x === d).length }));
  const text = groups.map(({ d, e }) => `(1 - t${d === 1 ? '' : `^${d}`})${e === 1 ? '' : `^${e}`}`).join('');
  const latex = groups.map(({ d, e }) => `(1 - t${d === 1 ? '' : `^{${d}}`})${e === 1 ? '' : `^{${e}}`}`).join('');
  const top = sum((d) => (d === 1 ? 't' : `t^${d}`));
  const bottom = groups.length === 1 ? text : `(${text})`;
  return {
    text: text === '' ? top : `${terms.length > 1 ? `(${top})` : top}/${bottom}`,
    latex: latex === '' ? sum((d) => (d === 1 ? 't' : `t^{${d}}`)) : `\\frac{${sum((d) => (d === 1 ? 't' : `t^{${d}}`))}}{${latex}}`,
  };
}
