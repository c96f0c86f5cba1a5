/** Real numbers of abelian fields as text: u + v sqrt(w) where they are quadratic, else sums of cosines and roots. */
import { gcdInt } from './arithmetic.ts';
import { gcd } from './rational.ts';

/** How roots, cosines 2 pi k/n, products and fractions are spelt. */
export interface NumberStyle {
  readonly root: (r: bigint) => string;
  readonly cosine: (k: number, n: number) => string;
  readonly times: string;
  readonly over: (numerator: string, denominator: string) => string;
}

const reducedAngle = (k: number, n: number) => {
  const g = gcdInt(2 * k, n);
  return { factor: (2 * k) / g, denominator: n / g };
};

/** The language of model files: `(1 + sqrt(5))/2`, `2*cos(2*pi/7)`. */
export const MODEL_STYLE: NumberStyle = {
  root: (r) => `sqrt(${r})`,
  cosine: (k, n) => {
    const { factor, denominator } = reducedAngle(k, n);
    return `cos(${factor === 1 ? '' : `${factor}*`}pi/${denominator})`;
  },
  times: '*',
  over: (numerator, denominator) => `${/ [+-] /.test(numerator) ? `(${numerator})` : numerator}/${denominator}`,
};

export const LATEX_STYLE: NumberStyle = {
  root: (r) => `\\sqrt{${r}}`,
  cosine: (k, n) => {
    const { factor, denominator } = reducedAngle(k, n);
    return `\\cos\\tfrac{${factor === 1 ? '' : factor}\\pi}{${denominator}}`;
  },
  times: '',
  over: (numerator, denominator) => {
    const negative = numerator.startsWith('-') && !/ [+-] /.test(numerator);
    return `${negative ? '-' : ''}\\tfrac{${negative ? numerator.slice(1) : numerator}}{${denominator}}`;
  },
};

/** A sum of integers times products of roots and cosines, over one denominator. */
export function writeSum(terms: readonly { readonly x: bigint; readonly body: string }[], d: bigint, { times, over }: NumberStyle): string {
  if (terms.length === 0) return '0';
  if (terms.length === 1) {
    const { x, body } = terms[0]!;
    const g = gcd(x, d);
    const n = x / g;
    const den = d / g;
    const num = body === '' ? `${n}` : n === 1n ? body : n === -1n ? `-${body}` : `${n}${times}${body}`;
    return den === 1n ? num : over(num, `${den}`);
  }
  let sum = '';
  for (const { x, body } of terms) {
    const n = x < 0n ? -x : x;
    const t = body === '' ? `${n}` : n === 1n ? body : `${n}${times}${body}`;
    sum += sum === '' ? (x < 0n ? `-${t}` : t) : x < 0n ? ` - ${t}` : ` + ${t}`;
  }
  return d === 1n ? sum : over(sum, `${d}`);
}
