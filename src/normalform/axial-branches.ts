/** Branches on the lines fixed by axial isotropy subgroups, exactly: direction, side, exponent and signature of the Hessian. */
import type { Algebraic } from '../field/index.ts';
import { at } from '../linear/index.ts';
import { type Polynomial, PolynomialRing } from '../polynomial/index.ts';
import { type Branch, type BranchSide, exponentText, type Forms, type Found, nothing, restricted, typeName } from './branch.ts';
import type { IsotropyClass } from './isotropy.ts';
import { norm } from './numeric-polynomial.ts';
import { seriesInertia } from './series-inertia.ts';

export function axialBranches(forms: Forms, c: IsotropyClass, number: number): Found {
  const { input, field } = forms;
  const { ring, h, l } = restricted(forms, c.fixedSpace);
  if (ring.isZero(l)) return nothing(`${typeName(c)}: the parameter does not act at first order`);
  if (ring.isZero(h)) return nothing(`${typeName(c)}: h vanishes on the line up to degree ${input.degree}`);
  const e = ring.order(h);
  const j = ring.order(l);
  const m = e - j;
  if (m < 1) return nothing(`${typeName(c)}: the unfolding is of higher order than h`);
  const line = Array.from({ length: c.fixedSpace.rows }, (_, i) => at(c.fixedSpace, i, 0));
  const numeric = Float64Array.from(line, (x) => field.toNumber(x));
  const length = norm(numeric);
  const coefficientOf = (sign: 1 | -1): number => {
    // mu = -h'/l' at v = sign * s / length
    const a = field.toNumber(h.coefficients[0]!) * e;
    const b = field.toNumber(l.coefficients[0]!) * j;
    return ((-a / b) * sign ** m) / length ** m;
  };
  const orbit = input.action.group.order / c.order;
  const flips = orbit === 2 * c.conjugates;
  const undecided: string[] = [];
  const half = (sign: 1 | -1): BranchSide => {
    const coefficient = coefficientOf(sign);
    const found = axialInertia(forms, line, sign);
    if (found.undecided > 0)
      undecided.push(`${typeName(c)}: ${found.undecided} eigenvalues along the branch need terms of degree above ${input.degree}`);
    return { side: coefficient > 0 ? 1 : -1, ...found };
  };
  const branch = (sign: 1 | -1, sides: BranchSide[]): Branch => {
    const coefficient = coefficientOf(sign);
    return {
      isotropyClass: number,
      isotropyOrder: c.order,
      axial: true,
      copies: orbit,
      direction: numeric.map((x) => (sign * x) / length),
      exactDirection: line.map((x) => field.format(sign === 1 ? x : field.neg(x))),
      side: sides.length === 2 ? 'both' : coefficient > 0 ? 'positive' : 'negative',
      coefficient,
      power: m,
      exponent: exponentText(m),
      sides,
    };
  };
  if (flips) return { branches: [branch(1, [half(1)])], undecided, complete: true };
  if (m % 2 === 1) {
    const first = coefficientOf(1) > 0 ? 1 : -1;
    return { branches: [branch(first, [half(first), half(first === 1 ? -1 : 1)])], undecided, complete: true };
  }
  return { branches: [branch(1, [half(1)]), branch(-1, [half(-1)])], undecided, complete: true };
}

/** Signature of the Hessian along u = v line, mu = -h'(v)/l'(v), for small v of one sign, exactly. */
function axialInertia(
  { input, field }: Forms,
  line: readonly Algebraic[],
  sign: 1 | -1,
): { positive: number; negative: number; undecided: number } {
  const n = line.length;
  const ring = new PolynomialRing<Algebraic>(field, ['e']);
  const images = line.map((x) => ring.scale(ring.variable(0), sign === 1 ? x : field.neg(x)));
  const along = (p: Polynomial<Algebraic>) => input.ring.substitute(p, images, ring);
  const slope = (p: Polynomial<Algebraic>) => ring.derivative(along(p), 0);
  const dh = slope(input.h);
  const dl = slope(input.unfolding);
  const second = (p: Polynomial<Algebraic>, i: number, k: number) => along(input.ring.derivative(input.ring.derivative(p, i), k));
  // multiplied by l'(v)^2 > 0
  const rows = Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (_, k) =>
      ring.mul(dl, ring.sub(ring.mul(dl, second(input.h, i, k)), ring.mul(dh, second(input.unfolding, i, k)))),
    ),
  );
  // the Hessian of h is known below e^(degree - 1), h' below e^degree
  const known = 2 * ring.order(dl) + input.degree - 1;
  const series = (q: Polynomial<Algebraic>) => Array.from({ length: known }, (_, t) => ring.coefficient(q, '\u0000'.repeat(t)));
  return seriesInertia(
    field,
    rows.map((row) => row.map(series)),
  );
}
