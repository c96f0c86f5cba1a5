/**
 * Polynomials in several variables over a field of ours taken apart by greatest common divisors: contents, square-free
 * parts (Yun 1976, from memory), square roots, and lists of powers of coprime square-free polynomials.
 */
import { type Algebraic, gcd, type RealField } from '../field/index.ts';
import { divideExactly, gcdOfList, gcdPolynomials, type Polynomial, type PolynomialRing } from '../polynomial/index.ts';

export type Poly = Polynomial<Algebraic>;
export type Ring = PolynomialRing<Algebraic>;

export interface Factor {
  readonly polynomial: Poly;
  /** Not 0; negative in a denominator. */
  readonly power: number;
}

/** constant · Π polynomial^power. */
export interface Factored {
  readonly constant: Algebraic;
  readonly factors: readonly Factor[];
}

const fieldOf = (ring: Ring): RealField => ring.field as RealField;

/**
 * p = constant · polynomial with a positive first coefficient of the polynomial and coprime integers in its coefficients,
 * these rational if they can be, else the shortest to write. The same for all multiples of p. Throws RangeError for zero.
 */
export function normalised(ring: Ring, p: Poly): { constant: Algebraic; polynomial: Poly } {
  if (ring.isZero(p)) throw new RangeError('the zero polynomial has no factors');
  const f = fieldOf(ring);
  const shapes = [ring.scale(p, f.inv(p.coefficients[0]!))];
  // the last coefficient made ±1 where the first one is not enough
  if (shapes[0]!.coefficients.some((c) => f.toRational(c) === undefined)) {
    const shape = ring.scale(p, f.inv(p.coefficients.at(-1)!));
    shapes.push(f.sign(shape.coefficients[0]!) > 0 ? shape : ring.neg(shape));
  }
  const written = shapes.map((shape) => {
    const polynomial = withIntegers(ring, shape);
    return { polynomial, length: ring.format(polynomial).length };
  });
  const { polynomial } = written.reduce((a, b) => (b.length < a.length ? b : a));
  return { constant: f.div(p.coefficients[0]!, polynomial.coefficients[0]!), polynomial };
}

/** A positive rational multiple with coprime integer coordinates. */
function withIntegers(ring: Ring, shape: Poly): Poly {
  let d = 1n;
  for (const c of shape.coefficients) d *= c.d / gcd(d, c.d);
  let g = 0n;
  for (const c of shape.coefficients) for (const x of c.c) g = gcd(g, x * (d / c.d));
  return ring.scale(shape, fieldOf(ring).fromRational(d, g));
}

/** Square-free factors that are pairwise coprime, each without content in any of its variables; constants are left out. */
export function squareFreeFactors(ring: Ring, p: Poly): Factor[] {
  const v = ring.support(p)[0];
  if (v === undefined) return [];
  const content = contentIn(ring, p, v);
  return joinFactors(ring, [...yun(ring, divideExactly(ring, p, content)!, v), ...squareFreeFactors(ring, content)]).flatMap((f) =>
    withoutContents(ring, f.polynomial).map((polynomial) => ({ polynomial, power: f.power })),
  );
}

function contentIn(ring: Ring, p: Poly, v: number): Poly {
  return gcdOfList(
    ring,
    ring.coefficientsIn(p, v).filter((c) => !ring.isZero(c)),
  );
}

/** Square-free parts of a polynomial that is primitive in variable v. */
function yun(ring: Ring, a: Poly, v: number): Factor[] {
  const out: Factor[] = [];
  const over = (x: Poly, y: Poly) => divideExactly(ring, x, y)!;
  const da = ring.derivative(a, v);
  const g = gcdPolynomials(ring, a, da);
  let b = over(a, g);
  let d = ring.sub(over(da, g), ring.derivative(b, v));
  for (let power = 1; !ring.isConstant(b); power++) {
    const polynomial = gcdPolynomials(ring, b, d);
    if (!ring.isConstant(polynomial)) out.push({ polynomial, power });
    b = over(b, polynomial);
    d = ring.sub(over(d, polynomial), ring.derivative(b, v));
  }
  return out;
}

/** A square-free polynomial split into its contents in each variable and the rest. */
function withoutContents(ring: Ring, p: Poly): Poly[] {
  for (const v of ring.support(p)) {
    const content = contentIn(ring, p, v);
    if (ring.isConstant(content)) continue;
    const rest = divideExactly(ring, p, content)!;
    return [content, rest].filter((q) => !ring.isConstant(q)).flatMap((q) => withoutContents(ring, q));
  }
  return [p];
}

/** The same product of powers of square-free polynomials with coprime ones; powers that add up to 0 vanish. */
export function joinFactors(ring: Ring, list: readonly Factor[]): Factor[] {
  let out: Factor[] = [];
  const insert = (polynomial: Poly, power: number): void => {
    if (ring.isConstant(polynomial)) return;
    for (const old of out) {
      const common = gcdPolynomials(ring, old.polynomial, polynomial);
      if (ring.isConstant(common)) continue;
      out = out.filter((f) => f !== old);
      out.push({ polynomial: common, power: old.power + power });
      insert(divideExactly(ring, old.polynomial, common)!, old.power);
      insert(divideExactly(ring, polynomial, common)!, power);
      return;
    }
    out.push({ polynomial, power });
  };
  for (const f of list) insert(f.polynomial, f.power);
  return out.filter((f) => f.power !== 0);
}

/** p = square² · rest, rest without square factors (its constant a square-free integer where it is rational). */
export function squarePart(ring: Ring, p: Poly): { square: Poly; rest: Poly } {
  if (ring.isZero(p)) return { square: ring.zero, rest: ring.one };
  const f = fieldOf(ring);
  let square = ring.one;
  for (const { polynomial, power } of squareFreeFactors(ring, p))
    square = ring.mul(square, ring.power(normalised(ring, polynomial).polynomial, power >> 1));
  const { constant, polynomial } = normalised(ring, divideExactly(ring, p, ring.mul(square, square))!);
  const r = f.toRational(constant);
  if (r === undefined) {
    const root = f.sign(constant) > 0 ? f.sqrtElement(constant) : undefined;
    return root === undefined ? { square, rest: ring.scale(polynomial, constant) } : { square: ring.scale(square, root), rest: polynomial };
  }
  // n/d = (s/d)² · t with n d = s² t
  let t = r.n * r.d;
  let s = 1n;
  for (let q = 2n; q < 1000n && q * q <= (t < 0n ? -t : t); q++)
    while (t % (q * q) === 0n) {
      t /= q * q;
      s *= q;
    }
  const left = t < 0n ? undefined : f.sqrt({ n: t, d: 1n });
  const whole = left === undefined ? undefined : f.toRational(left);
  if (left !== undefined && (whole !== undefined || ring.isConstant(polynomial)))
    return { square: ring.scale(square, f.mul(left, f.fromRational(s, r.d))), rest: polynomial };
  return { square: ring.scale(square, f.fromRational(s, r.d)), rest: ring.scale(polynomial, f.fromInteger(t)) };
}
