/** A predicted branch looked for on the full equations ∇H(x, mu) = 0 by Newton's iteration, close to the event. */
import { type NumberMatrix, symmetricEigenvalues } from '../linear/index.ts';
import type { Branch } from './branches.ts';
import { newton, norm } from './numeric-polynomial.ts';

export interface FullEquations {
  readonly dimension: number;
  /** Gradient and Hessian of H by the coordinates at a point of phase space and a value of the parameter. */
  gradient(x: Float64Array, mu: number): Float64Array;
  hessian(x: Float64Array, mu: number): NumberMatrix;
  /** The event. */
  readonly point: Float64Array;
  readonly mu: number;
  /** Basis of the kernel, dimension x k, in the coordinates in which the branches were computed. */
  readonly kernel: NumberMatrix;
  /** How far the other coordinates move with the parameter, to first order; default not at all. */
  readonly drift?: Float64Array;
}

export interface Confirmation {
  readonly side: 1 | -1;
  readonly confirmed: boolean;
  /** mu - mu0 where the search ended. */
  readonly step: number;
  readonly point: Float64Array | null;
  readonly residual: number;
  /** Negative eigenvalues of the full Hessian there. */
  readonly index: number | null;
}

/** Steps of the parameter that are tried, largest first; relative to the parameter's own scale. */
const STEPS = [1e-2, 1e-3, 1e-4, 1e-5, 1e-6];

/** One search for each side on which the branch exists. `scale` is a typical size of the parameter. */
export function confirmBranch(equations: FullEquations, branch: Branch, scale = 1): Confirmation[] {
  return branch.sides.map(({ side }) => {
    let last: Confirmation = { side, confirmed: false, step: 0, point: null, residual: Infinity, index: null };
    for (const e of STEPS) {
      last = search(equations, branch, side, e * scale);
      if (last.confirmed) return last;
    }
    return last;
  });
}

function search(
  { dimension: n, gradient, hessian, point, mu, kernel, drift }: FullEquations,
  branch: Branch,
  side: 1 | -1,
  epsilon: number,
): Confirmation {
  const step = side * epsilon;
  // mu = coefficient s^power; on the other side of a branch with both sides s changes its sign
  const amplitude = (epsilon / Math.abs(branch.coefficient)) ** (1 / branch.power);
  const forward = branch.side === 'both' && Math.sign(branch.coefficient) !== side ? -1 : 1;
  const shift = Float64Array.from(
    { length: n },
    (_, i) => branch.direction.reduce((s, y, k) => s + kernel.data[i * kernel.cols + k]! * y, 0) * amplitude * forward,
  );
  const start = point.map((x, i) => x + shift[i]! + step * (drift?.[i] ?? 0));
  const size = norm(hessian(start, mu + step).data) * norm(shift);
  const end = newton(
    start,
    (x) => gradient(x, mu + step),
    (x) => hessian(x, mu + step),
    1e-12 * size,
    80,
  );
  const moved = norm(end.point.map((x, i) => x - start[i]!));
  const near = moved <= 0.35 * norm(shift);
  const confirmed = end.converged && near;
  const index = confirmed ? symmetricEigenvalues(hessian(end.point, mu + step)).filter((x) => x < 0).length : null;
  return { side, confirmed, step, point: confirmed ? end.point : null, residual: end.residual, index };
}
