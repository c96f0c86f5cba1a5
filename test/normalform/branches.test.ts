import { describe, expect, it } from 'vitest';
import type { LinearAction } from '../../src/invariant/linear-action.ts';
import { symmetricEigenvalues } from '../../src/linear/index.ts';
import { type Branch, branchDiagram } from '../../src/normalform/branches.ts';
import { confirmBranch } from '../../src/normalform/confirm-branch.ts';
import { newton, norm } from '../../src/normalform/numeric-polynomial.ts';
import { cyclic, dihedral, octahedral, octahedralFull, signs, symmetric, tetrahedralFull, trivial } from './actions.ts';
import {
  equationsOf,
  type Found,
  images,
  type Make,
  power,
  quadraticInvariant,
  r2,
  randomGerm,
  ringOf,
  search,
  sum,
  terms,
  zPower,
} from './germs.ts';

/** Germs of each family; more in a long run. */
const GERMS = Number(process.env.SYMCODIM_GERMS ?? 4);
const half: Make = sum([0.5, r2]);
const quartic: Make = terms([[4, 0, 0], 1], [[0, 4, 0], 1], [[0, 0, 4], 1]);
const diagram = (action: LinearAction, h: Make, degree: number, unfolding: Make = half) => {
  const ring = ringOf(action);
  return branchDiagram({ action, ring, h: h(ring), degree, unfolding: unfolding(ring) });
};
const on = (b: Branch, side: 1 | -1) => b.sides.find((s) => s.side === side);

describe('Golubitsky, Stewart, Schaeffer 1988, ch. XIII; Melbourne 1986 (places from memory): critical points of explicit potentials', () => {
  /** radius, Morse index, number at mu = -1 unless said otherwise. */
  const cases: [string, () => LinearAction, Make, number, number, [number, number, number][]][] = [
    [
      'D_4',
      () => dihedral(4),
      sum([0.25, power(r2, 2)], [0.1, zPower(4)]),
      4,
      -1,
      [
        [0.84515, 1, 4],
        [1.29099, 0, 4],
      ],
    ],
    [
      'D_5',
      () => dihedral(5),
      sum([0.25, power(r2, 2)], [0.05, zPower(5)]),
      5,
      -1,
      [
        [0.90321, 1, 5],
        [1.19394, 0, 5],
      ],
    ],
    [
      'D_6',
      () => dihedral(6),
      sum([0.25, power(r2, 2)], [0.005, zPower(6)]),
      6,
      -1,
      [
        [0.98574, 1, 6],
        [1.01585, 0, 6],
      ],
    ],
    [
      'D_8',
      () => dihedral(8),
      sum([0.25, power(r2, 2)], [0.005, zPower(8)]),
      8,
      -1,
      [
        [0.98191, 1, 8],
        [1.02262, 0, 8],
      ],
    ],
    ['D_3, mu = -1/10', () => dihedral(3), sum([1 / 3, zPower(3)]), 3, -0.1, [[0.1, 1, 3]]],
    ['D_3, mu = 1/10', () => dihedral(3), sum([1 / 3, zPower(3)]), 3, 0.1, [[0.1, 1, 3]]],
    [
      'O_h, easy axis sign +',
      octahedralFull,
      sum([0.25, power(r2, 2)], [0.1, quartic]),
      4,
      -1,
      [
        [0.84515, 2, 6],
        [0.91287, 1, 12],
        [0.93934, 0, 8],
      ],
    ],
    [
      'O_h, other sign',
      octahedralFull,
      sum([0.25, power(r2, 2)], [-0.05, quartic]),
      4,
      -1,
      [
        [1.0351, 2, 8],
        [1.05409, 1, 12],
        [1.11803, 0, 6],
      ],
    ],
    ['T_d, mu = 1/10', tetrahedralFull, terms([[1, 1, 1], 1]), 3, 0.1, [[0.17321, 1, 4]]],
  ];
  it.each(cases)('%s', (_, make, h, degree, mu, expected) => {
    const action = make();
    const ring = ringOf(action);
    const e = equationsOf(ring, h(ring), half(ring));
    const side = mu > 0 ? 1 : -1;
    const rows = diagram(action, h, degree)
      .branches.filter((b) => on(b, side) !== undefined)
      .map((b) => {
        // leading order gives the start, Newton the radius at this value of mu
        const forward = b.side === 'both' && Math.sign(b.coefficient) !== side ? -1 : 1;
        const s = (Math.abs(mu) / Math.abs(b.coefficient)) ** (1 / b.power) * forward;
        const end = newton(
          b.direction.map((y) => s * y),
          (x) => e.gradient(x, mu),
          (x) => e.hessian(x, mu),
          1e-12,
        );
        expect(end.converged).toBe(true);
        expect(symmetricEigenvalues(e.hessian(end.point, mu)).filter((v) => v < 0).length).toBe(on(b, side)!.negative);
        return [Number(norm(end.point).toFixed(5)), on(b, side)!.negative, b.copies];
      });
    expect(rows.sort((x, y) => x[0]! - y[0]!)).toEqual(expected);
  });
  it('S_n on sum x = 0: 2^(n-1) - 1 axes, those with p = q carry no quadratic term', () => {
    for (const [n, expected, axes] of [
      [3, 3, 3],
      [4, 4, 7],
      [5, 15, 15],
    ] as const) {
      const action = symmetric(n);
      const ring = ringOf(action);
      // x_n = -(x_1 + … + x_{n-1})
      const all = [...ring.variables.map((_, i) => ring.variable(i)), ring.neg(ring.sum(ring.variables.map((_, i) => ring.variable(i))))];
      const powers = (e: number) => ring.sum(all.map((x) => ring.power(x, e)));
      const third = ring.scale(powers(3), ring.field.fromRational(1n, 3n));
      const d = branchDiagram({ action, ring, h: third, degree: 3, unfolding: ring.scale(powers(2), ring.field.fromRational(1n, 2n)) });
      expect(d.branches.reduce((s, b) => s + b.copies, 0)).toBe(expected);
      expect(d.branches.every((b) => b.axial && b.side === 'both')).toBe(true);
      expect(d.lattice.classes.filter((c) => c.axial).reduce((s, c) => s + c.conjugates, 0)).toBe(axes);
    }
  });
});

describe('Three-fold planar oscillator: branches', () => {
  it('isotropy of order 2, 3 copies, both sides, x = -mu/(3a) + …, Morse index 1', () => {
    const d = diagram(dihedral(3), sum([1, zPower(3)], [1, power(r2, 2)]), 4);
    expect(d.branches.length).toBe(1);
    const [b] = d.branches as [Branch];
    expect([b.isotropyOrder, b.copies, b.side, b.exponent, b.axial]).toEqual([2, 3, 'both', '1', true]);
    expect(b.sides.map((s) => s.negative)).toEqual([1, 1]);
    expect(b.coefficient).toBeCloseTo(3, 12);
    expect(d.topologicalDegree).toEqual({ below: -2, above: -2 });
    // x = (-3 + sqrt(7.4))/8 at mu = 1/10
    const ring = ringOf(dihedral(3));
    const e = equationsOf(ring, sum([1, zPower(3)], [1, power(r2, 2)])(ring), half(ring));
    const end = newton(
      Float64Array.of(-1 / 30, 0),
      (x) => e.gradient(x, 0.1),
      (x) => e.hessian(x, 0.1),
      1e-14,
    );
    expect(end.point[0]).toBeCloseTo((-3 + Math.sqrt(7.4)) / 8, 12);
    expect(confirmBranch(e, b).map((c) => [c.side, c.confirmed, c.index])).toEqual([
      [1, true, 1],
      [-1, true, 1],
    ]);
  });
});

describe('Branches', () => {
  it('fold: two halves on one side, index 0 and 1, and the degree is 0', () => {
    const d = diagram(trivial(1), terms([[3], 1]), 3, terms([[1], 1]));
    expect(d.branches.map((b) => [b.side, b.exponent, b.copies, b.isotropyOrder, b.sides[0]!.negative]).sort()).toEqual([
      ['negative', '1/2', 1, 1, 0],
      ['negative', '1/2', 1, 1, 1],
    ]);
    expect(d.topologicalDegree).toEqual({ below: 0, above: 0 });
  });
  it('pitchfork of Z2: sub- and supercritical', () => {
    for (const [c, side, negative] of [
      [1, 'negative', 0],
      [-1, 'positive', 1],
    ] as const) {
      const d = diagram(signs([-1]), terms([[4], c]), 4);
      expect(d.branches.map((b) => [b.side, b.exponent, b.copies, b.sides[0]!.negative])).toEqual([[side, '1/2', 2, negative]]);
      expect(d.topologicalDegree).toEqual({ below: c, above: c });
    }
  });
  it('T_d with a quartic term: four transcritical branches and six half branches on the axes where the cubic vanishes', () => {
    const d = diagram(tetrahedralFull(), sum([1, terms([[1, 1, 1], 1])], [1, power(r2, 2)]), 4);
    expect(d.branches.map((b) => [b.isotropyOrder, b.copies, b.side, b.exponent])).toEqual([
      [6, 4, 'both', '1'],
      [4, 6, 'negative', '1/2'],
    ]);
    expect(on(d.branches[0]!, 1)!.negative).toBe(1);
    expect(on(d.branches[0]!, -1)!.negative).toBe(2);
    expect(d.branches[1]!.sides[0]!.negative).toBe(1);
    expect(d.topologicalDegree!.above).toBe(d.topologicalDegree!.below);
  });
  it('C_5 rotating the plane: no axes; the fifth-degree term fixes the phase of two half branches', () => {
    const d = diagram(cyclic(5), sum([0.25, power(r2, 2)], [0.05, zPower(5)], [0.02, zPower(5, true)]), 5);
    expect(d.branches.map((b) => [b.isotropyOrder, b.copies, b.side, b.axial, b.sides[0]!.negative]).sort()).toEqual([
      [1, 5, 'negative', false, 0],
      [1, 5, 'negative', false, 1],
    ]);
    expect(d.topologicalDegree).toEqual({ below: 1, above: 1 });
  });
  it('C_3 rotating the plane: three transcritical saddles in a direction of no symmetry', () => {
    const d = diagram(cyclic(3), sum([1, zPower(3)], [2, zPower(3, true)]), 3);
    expect(d.branches.map((b) => [b.copies, b.side, b.sides.map((s) => s.negative)])).toEqual([[3, 'both', [1, 1]]]);
  });
  it('Z2 on the plane with a fixed line: the fold and a pair of branches off it, y^3/3 + x^2 y + mu y', () => {
    const d = diagram(signs([-1, 1]), terms([[0, 3], 1 / 3], [[2, 1], 1]), 3, terms([[0, 1], 1]));
    // y^2 + x^2 + mu = 0 and 2 x y = 0: four equilibria for mu < 0
    expect(d.branches.map((b) => [b.isotropyOrder, b.copies, b.side, b.exponent, b.sides[0]!.negative]).sort()).toEqual([
      [1, 2, 'negative', '1/2', 1],
      [2, 1, 'negative', '1/2', 0],
      [2, 1, 'negative', '1/2', 2],
    ]);
    expect(d.topologicalDegree).toEqual({ below: 0, above: 0 });
    const ring = ringOf(signs([-1, 1]));
    const e = equationsOf(ring, terms([[0, 3], 1 / 3], [[2, 1], 1])(ring), terms([[0, 1], 1])(ring));
    expect(d.branches.every((b) => confirmBranch(e, b).every((c) => c.confirmed))).toBe(true);
  });
  it('no symmetry: the umbilic x^2 y + y^3/3 + mu (x + 2y) has four equilibria on one side or two on each', () => {
    const h = terms([[2, 1], 1], [[0, 3], 1 / 3]);
    const l = terms([[1, 0], 1], [[0, 1], 2]);
    const d = diagram(trivial(2), h, 3, l);
    const ring = ringOf(trivial(2));
    const e = equationsOf(ring, h(ring), l(ring));
    for (const side of [1, -1] as const) {
      const count = d.branches.filter((b) => on(b, side) !== undefined).length;
      expect(search(e, side * 1e-4, 1e-4, 1, 200).length).toBe(count);
    }
    expect(d.branches.every((b) => confirmBranch(e, b).every((c) => c.confirmed))).toBe(true);
    expect(d.topologicalDegree!.above).toBe(d.topologicalDegree!.below);
  });
  it('says what the terms do not decide: D_5 to degree 4, a line where h vanishes, a parameter that does not act', () => {
    const five = diagram(dihedral(5), sum([0.25, power(r2, 2)]), 4);
    expect(five.branches.every((b) => b.sides[0]!.undecided === 1)).toBe(true);
    expect(five.topologicalDegree).toBe(null);
    expect(five.undecided.join('\n')).toMatch(/degree above 4/);
    expect(diagram(signs([-1]), terms(), 4).undecided[0]).toMatch(/vanishes on the line up to degree 4/);
    expect(diagram(signs([-1]), terms([[4], 1]), 4, terms()).undecided[0]).toMatch(/does not act/);
  });
  it('a prediction that is wrong is not confirmed', () => {
    const ring = ringOf(dihedral(3));
    const h = zPower(3)(ring);
    const [b] = diagram(dihedral(3), zPower(3), 3).branches as [Branch];
    const e = equationsOf(ring, h, half(ring));
    expect(confirmBranch(e, { ...b, direction: b.direction.map((x) => -x) }).every((c) => c.confirmed)).toBe(false);
    expect(confirmBranch(e, { ...b, coefficient: 7 * b.coefficient }).every((c) => c.confirmed)).toBe(false);
  });
});

describe('Random invariant germs: every predicted branch is found by Newton, and a search near the event finds no other equilibrium', () => {
  const families: [string, () => LinearAction, number[]][] = [
    ['D_3', () => dihedral(3), [3, 4, 5]],
    ['D_4', () => dihedral(4), [4, 6]],
    ['D_5', () => dihedral(5), [4, 5, 6]],
    ['D_6', () => dihedral(6), [4, 6]],
    ['O', octahedral, [4, 6]],
    ['T_d', tetrahedralFull, [3, 4, 5]],
    ['S_4', () => symmetric(4), [3, 4, 5]],
    ['S_5', () => symmetric(5), [3, 4]],
  ];
  it.each(families)('%s', (_, make, degrees) => {
    const action = make();
    const ring = ringOf(action);
    const unfolding = ring.scale(quadraticInvariant(action), ring.field.fromRational(1n, 2n));
    for (let seed = 1; seed <= GERMS; seed++) {
      const h = randomGerm(action, degrees, 977 * seed);
      const d = branchDiagram({ action, ring, h, degree: Math.max(...degrees), unfolding });
      const where = `${ring.format(h)}\n${d.undecided.join('\n')}`;
      expect(d.undecided, where).toEqual([]);
      expect(d.topologicalDegree!.above, where).toBe(d.topologicalDegree!.below);
      const e = equationsOf(ring, h, unfolding);
      const epsilon = 1e-6;
      for (const side of [1, -1] as const) {
        const predicted = d.branches.filter((b) => on(b, side) !== undefined);
        for (const b of predicted) {
          const c = confirmBranch(e, b, 1e-3).find((x) => x.side === side)!;
          expect(c.confirmed, `${where}\n${JSON.stringify(b)}`).toBe(true);
          expect(c.index, where).toBe(on(b, side)!.negative);
        }
        const amplitudes = predicted.map((b) => (epsilon / Math.abs(b.coefficient)) ** (1 / b.power));
        const low = Math.min(...amplitudes, 1e-4) / 4;
        const high = Math.max(...amplitudes, 1e-7) * 4;
        const found = search(e, side * epsilon, low, high, 60, seed);
        expect(found.length, where).toBeLessThanOrEqual(predicted.reduce((s, b) => s + b.copies, 0));
        // each one found is near an image of a prediction, with its index
        const isPredicted = (f: Found) =>
          predicted.some((b, k) => {
            const s = amplitudes[k]! * (b.side === 'both' && Math.sign(b.coefficient) !== side ? -1 : 1);
            return (
              on(b, side)!.negative === f.index &&
              images(action, b.direction).some((y) => norm(y.map((v, i) => s * v - f.point[i]!)) < 0.25 * f.radius)
            );
          });
        for (const f of found) expect(isPredicted(f), `${where}\nradius ${f.radius} index ${f.index}`).toBe(true);
      }
    }
  });
});
