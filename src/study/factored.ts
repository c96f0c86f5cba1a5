/**
 * Polynomials in parameters as products: contents and square-free parts by greatest common divisors, quadratic factors
 * by their discriminants, the rest by nerdamer under names of its own. Its answer is kept only if our own expansion
 * of it is the polynomial it was asked about, so that a wrong one costs a factor its form, never its value.
 */
import type { Algebraic, RealField } from '../field/index.ts';
import { type Expression, fold, parseExpression } from '../model/expression/index.ts';
import { divideExactly, isSum, PolynomialRing, writeTerm } from '../polynomial/index.ts';
import { type FactorHelper, nerdamerFactors } from './factored-nerdamer.ts';
import {
  type Factor,
  type Factored,
  joinFactors,
  normalised,
  type Poly,
  type Ring,
  squareFreeFactors,
  squarePart,
} from './factored-squares.ts';

export type { Factor, Factored } from './factored-squares.ts';

/** What is put to the helper: terms, degree and size of the coefficients; beyond, it takes seconds or loses digits. */
const TERMS = 20;
const DEGREE = 10;
const SIZE = 2n ** 40n;

/** The product of the polynomials as a product of powers of coprime factors. Throws RangeError if one is zero. */
export async function factored(ring: Ring, parts: readonly Poly[], helper: FactorHelper = nerdamerFactors): Promise<Factored> {
  return powersFactored(
    ring,
    parts.map((polynomial) => ({ polynomial, power: 1 })),
    helper,
  );
}

/** The same for a product of powers of any polynomials. */
export async function powersFactored(ring: Ring, parts: readonly Factor[], helper: FactorHelper = nerdamerFactors): Promise<Factored> {
  const f = ring.field;
  let constant = f.one;
  const times = (c: Algebraic, power: number): void => {
    for (let i = 0; i < Math.abs(power); i++) constant = f.mul(constant, power < 0 ? f.inv(c) : c);
  };
  const list: Factor[] = [];
  for (const part of parts) {
    const head = normalised(ring, part.polynomial);
    let rest = head.polynomial;
    for (const { polynomial, power } of squareFreeFactors(ring, rest))
      for (const piece of await split(ring, polynomial, helper)) {
        const q = normalised(ring, piece).polynomial;
        rest = divideExactly(ring, rest, ring.power(q, power))!;
        list.push({ polynomial: q, power: power * part.power });
      }
    times(f.mul(head.constant, ring.constantTerm(rest)), part.power);
  }
  const factors = joinFactors(ring, list).map(
    ({ polynomial, power }): Factor => ({ polynomial: normalised(ring, polynomial).polynomial, power }),
  );
  return { constant: f.mul(constant, correction(ring, list, factors)), factors: factors.sort((a, b) => compare(ring, a, b)) };
}

/** The number by which a list of factors differs from the same list made coprime. */
function correction(ring: Ring, list: readonly Factor[], joined: readonly Factor[]): Algebraic {
  const f = ring.field;
  const lead = (factors: readonly Factor[]): Algebraic =>
    factors.reduce((c, { polynomial, power }) => {
      let x = c;
      for (let i = 0; i < Math.abs(power); i++)
        x = power < 0 ? f.div(x, polynomial.coefficients[0]!) : f.mul(x, polynomial.coefficients[0]!);
      return x;
    }, f.one);
  return f.div(lead(list), lead(joined));
}

/** Short factors first. */
function compare(ring: Ring, a: Factor, b: Factor): number {
  const [p, q] = [a.polynomial, b.polynomial];
  return ring.degree(p) - ring.degree(q) || p.monomials.length - q.monomials.length || (ring.format(p) < ring.format(q) ? -1 : 1);
}

/** Factors of a square-free polynomial without contents, their product is a constant times it. */
async function split(ring: Ring, p: Poly, helper: FactorHelper): Promise<Poly[]> {
  if (p.monomials.length < 2) return [p];
  // in x^n alone: first as a polynomial in x
  for (const v of ring.support(p)) {
    const powers = ring.coefficientsIn(p, v).flatMap((c, e) => (ring.isZero(c) ? [] : [e]));
    const step = powers.reduce(greatest, 0);
    if (step === 1) continue;
    const pieces = await split(ring, respaced(ring, p, v, 1 / step), helper);
    if (pieces.length > 1) return (await Promise.all(pieces.map((q) => split(ring, respaced(ring, q, v, step), helper)))).flat();
  }
  const degrees = ring.support(p).map((v) => [v, ring.degreeIn(p, v)] as const);
  if (degrees.some(([, d]) => d === 1)) return [p];
  const quadratic = degrees.find(([, d]) => d === 2);
  if (quadratic !== undefined) return splitQuadratic(ring, p, quadratic[0]) ?? [p];
  const found = await askHelper(ring, p, helper);
  if (found === undefined) return [p];
  return (await Promise.all(found.map((q) => split(ring, q, helper)))).flat();
}

const greatest = (a: number, b: number): number => (b === 0 ? a : greatest(b, a % b));

/** The exponents of variable v multiplied by a number. */
function respaced(ring: Ring, p: Poly, v: number, by: number): Poly {
  const c = String.fromCharCode(v);
  return ring.fromTerms(
    p.monomials.map((m, i) => {
      const e = Math.round((m.lastIndexOf(c) - m.indexOf(c) + (m.includes(c) ? 1 : 0)) * by);
      return [[...m.replaceAll(c, ''), ...c.repeat(e)].sort().join(''), p.coefficients[i]!] as const;
    }),
  );
}

/** Both factors of a x² + b x + c where its discriminant is a square. */
function splitQuadratic(ring: Ring, p: Poly, v: number): Poly[] | undefined {
  const [c, b, a] = ring.coefficientsIn(p, v) as [Poly, Poly, Poly];
  const four = ring.mul(ring.integer(4), ring.mul(a, c));
  const { square, rest } = squarePart(ring, ring.sub(ring.mul(b, b), four));
  if (!ring.equal(rest, ring.one)) return undefined;
  // 4 a p = (2 a x + b + s)(2 a x + b - s)
  const line = ring.add(ring.mul(ring.mul(ring.integer(2), a), ring.variable(v)), b);
  const one = squareFreeFactors(ring, ring.add(line, square)).find((f) => ring.degreeIn(f.polynomial, v) > 0);
  if (one === undefined) return undefined;
  const other = divideExactly(ring, p, one.polynomial);
  return other === undefined ? undefined : [one.polynomial, other];
}

/** The factors the helper finds, if there are several and their product, expanded by us, is a constant times p. */
async function askHelper(ring: Ring, p: Poly, helper: FactorHelper): Promise<Poly[] | undefined> {
  const f = ring.field as RealField;
  const { polynomial } = normalised(ring, p);
  const fits = (c: Algebraic) => f.toRational(c) !== undefined && c.c[0]! < SIZE && -c.c[0]! < SIZE;
  if (polynomial.monomials.length > TERMS || ring.degree(p) > DEGREE || !polynomial.coefficients.every(fits)) return undefined;
  // a polynomial that is homogeneous is known by its values where one variable is 1
  const homogeneous = ring.order(p) === ring.degree(p);
  const last = ring.support(p).at(-1)!;
  const variables = ring.variables.map((_, i) => `v_${i}`);
  const hidden = new PolynomialRing(ring.field, variables);
  const asked = homogeneous
    ? hidden.fromTerms(
        polynomial.monomials.map((m, i) => [m.replaceAll(String.fromCharCode(last), ''), polynomial.coefficients[i]!] as const),
      )
    : polynomial;
  const answer = await helper(hidden.format(asked));
  if (answer === undefined || answer.length > 100 * TERMS) return undefined;
  const factors = readFactors(answer, hidden);
  if (factors === undefined || factors.length < 2) return undefined;
  const product = factors.reduce((x, y) => hidden.mul(x, y));
  if (hidden.isZero(product) || !ring.equal(normalised(hidden, product).polynomial, normalised(hidden, asked).polynomial)) return undefined;
  if (!homogeneous) return factors;
  return factors.map((q) => {
    const d = hidden.degree(q);
    const term = (m: string) => (m + String.fromCharCode(last).repeat(d - m.length)).split('').sort().join('');
    return ring.fromTerms(q.monomials.map((m, i) => [term(m), q.coefficients[i]!] as const));
  });
}

/** The factors of positive degree of a product as text, each as often as it occurs; undefined for anything else. */
function readFactors(text: string, ring: Ring): Poly[] | undefined {
  try {
    return factorsOfTree(parseExpression(text)).flatMap(({ base, power }) => {
      const polynomial = polynomialOf(base, ring);
      return ring.isConstant(polynomial) ? [] : new Array<Poly>(power).fill(polynomial);
    });
  } catch {
    // not a product of polynomials in these variables: it is no answer
    return undefined;
  }
}

function factorsOfTree(e: Expression): { base: Expression; power: number }[] {
  if (e.kind === 'product') return e.factors.flatMap(factorsOfTree);
  if (e.kind === 'negate') return factorsOfTree(e.argument);
  if (e.kind === 'quotient' && e.denominator.kind === 'number') return factorsOfTree(e.numerator);
  if (e.kind === 'power') {
    const power = exponentOf(e.exponent);
    return factorsOfTree(e.base).map((f) => ({ base: f.base, power: f.power * power }));
  }
  return [{ base: e, power: 1 }];
}

function exponentOf(e: Expression): number {
  if (e.kind !== 'number' || e.d !== 1n || e.n < 1n || e.n > BigInt(DEGREE)) throw new RangeError('not a power of a polynomial');
  return Number(e.n);
}

function polynomialOf(e: Expression, ring: Ring): Poly {
  return fold<Poly | Expression>(e, (node, parts) => {
    const all = parts as Poly[];
    switch (node.kind) {
      case 'number':
        return ring.constant(ring.field.fromRational(node.n, node.d));
      case 'symbol':
        return ring.variable(node.name);
      case 'sum':
        return all.reduce((a, b) => ring.add(a, b));
      case 'product':
        return all.reduce((a, b) => ring.mul(a, b));
      case 'negate':
        return ring.neg(all[0]!);
      case 'power':
        return ring.power(all[0]!, exponentOf(node.exponent));
      case 'quotient':
        if (!ring.isConstant(all[1]!)) throw new RangeError('not a polynomial');
        return ring.scale(all[0]!, ring.field.inv(ring.constantTerm(all[1]!)));
      default:
        throw new RangeError('not a polynomial');
    }
  }) as Poly;
}

/** In the language of model files, e.g. `-2*k*(1 + 3*c)^2/(1 + c)`. */
export function formatFactored(ring: Ring, { constant, factors }: Factored): string {
  const f = ring.field as RealField;
  const above = factors.filter((x) => x.power > 0);
  const below = factors.filter((x) => x.power < 0);
  const r = f.toRational(constant);
  const denominator = r === undefined ? 1n : r.d;
  const alone = above.length === 1 && (r === undefined ? f.equal(constant, f.one) : r.n === 1n);
  const numerator = writeTerm(f.format(r === undefined ? constant : f.fromRational(r.n, 1n)), productText(ring, above, alone));
  const under = writeTerm(`${denominator}`, productText(ring, below, below.length === 1 && denominator === 1n));
  if (under === '1') return numerator;
  return `${isSum(numerator) ? `(${numerator})` : numerator}/${/^[A-Za-z0-9_^]+$/.test(under) ? under : `(${under})`}`;
}

function productText(ring: Ring, factors: readonly Factor[], alone: boolean): string {
  return factors
    .map(({ polynomial, power }) => {
      const text = ring.format(polynomial);
      const n = Math.abs(power);
      const simple = polynomial.monomials.length === 1 && ring.degree(polynomial) === 1;
      return `${simple || (alone && n === 1) ? text : `(${text})`}${n === 1 ? '' : `^${n}`}`;
    })
    .join('*');
}
