/** Signed permutations that leave a structure invariant: orders known in closed form, planted groups, exactness. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { RealField } from '../../src/field/index.ts';
import { build, sparse } from '../../src/linear/index.ts';
import { type SymmetryGroup, signedSymmetries } from '../../src/model/find-symmetry.ts';
import { structureOfHessian } from '../../src/model/find-symmetry-model.ts';
import type { SignedStructure, StructureTerm } from '../../src/model/find-symmetry-structure.ts';

const Q = RealField.of();
const weight = (x: number) => ({ size: Math.abs(x), sign: (x < 0 ? -1 : 1) as 1 | -1 });
const term = (x: number, ...factors: [number, number][]): StructureTerm => {
  const sorted = factors.sort((a, b) => a[0] - b[0]);
  return { variables: sorted.map((f) => f[0]), exponents: sorted.map((f) => f[1]), weight: weight(x) };
};

/** Σ p²/2 + V(q), V given by its terms: coordinates first, then momenta. */
function natural(n: number, potential: readonly StructureTerm[]): SignedStructure {
  return {
    count: 2 * n,
    terms: [...potential, ...Array.from({ length: n }, (_, i) => term(7, [n + i, 2]))],
    form: Array.from({ length: n }, (_, i) => ({ i, j: n + i, weight: weight(1) })),
    kinds: Array.from({ length: 2 * n }, (_, i) => (i < n ? 0 : 1)),
    values: new Array<undefined>(2 * n).fill(undefined),
  };
}

/** Edges of a graph as couplings c·q_i q_j together with q_i³, which keeps the signs. */
function graph(n: number, edges: readonly (readonly [number, number, number?])[]): SignedStructure {
  return natural(n, [...edges.map(([i, j, c]) => term(c ?? 1, [i, 1], [j, 1])), ...Array.from({ length: n }, (_, i) => term(5, [i, 3]))]);
}

const factorial = (n: number): bigint => (n < 2 ? 1n : BigInt(n) * factorial(n - 1));
const all = <T>(n: number, f: (i: number, j: number) => T): T[] =>
  Array.from({ length: n }, (_, i) => Array.from({ length: i }, (_, j) => f(i, j))).flat();
const ring = (n: number): [number, number][] => Array.from({ length: n }, (_, i) => [i, (i + 1) % n]);

/** Order of the group by brute force over all signed permutations of few coordinates, with and without reversal of time. */
function bruteForce(s: SignedStructure, g: SymmetryGroup): bigint {
  const n = s.count / 2;
  let count = 0n;
  const images = new Array<number>(n).fill(-1);
  const visit = (i: number) => {
    if (i < n) {
      for (let k = 0; k < n; k++)
        if (!images.includes(k)) {
          images[i] = k;
          visit(i + 1);
          images[i] = -1;
        }
      return;
    }
    for (let mask = 0; mask < 1 << n; mask++)
      for (const sigma of [1, -1]) {
        const sign = (k: number) => (mask & (1 << k) ? -1 : 1);
        const to = Int32Array.from([...images, ...images.map((x) => x + n), 2 * n]);
        const signs = Int8Array.from([...images.map((_, k) => sign(k)), ...images.map((_, k) => sign(k) * sigma), sigma]);
        if (g.index.isSymmetry({ images: to, signs })) count++;
      }
  };
  visit(0);
  return count;
}

describe('orders in closed form, reversal of time included', () => {
  it('one coordinate, p² + q⁴: sign and time', () => expect(signedSymmetries(natural(1, [term(1, [0, 4])])).order).toBe(4n));
  it('one coordinate, p² + q³: time alone', () => expect(signedSymmetries(natural(1, [term(1, [0, 3])])).order).toBe(2n));
  it('no coordinate', () => expect(signedSymmetries(natural(0, [])).order).toBe(2n));

  it.each([2, 3, 4, 6])('hyperoctahedral: Σ q⁴ + Σ qi²qj² in %i coordinates, 2ⁿ n!', (n) => {
    const quartic = natural(n, [...Array.from({ length: n }, (_, i) => term(1, [i, 4])), ...all(n, (i, j) => term(3, [i, 2], [j, 2]))]);
    expect(signedSymmetries(quartic).order).toBe(2n * 2n ** BigInt(n) * factorial(n));
  });

  it.each([3, 4, 5, 7, 12])('ring of %i springs with cubic terms: D_n and time', (n) => {
    expect(signedSymmetries(graph(n, ring(n))).order).toBe(2n * 2n * BigInt(n));
  });

  it('ring of springs, quadratic: the sign of all coordinates too', () => {
    const s = natural(6, [...ring(6).map(([i, j]) => term(1, [i, 1], [j, 1])), ...Array.from({ length: 6 }, (_, i) => term(5, [i, 2]))]);
    // every coupling may change its sign with every second coordinate only if all do: signs (+) and (−)
    expect(signedSymmetries(s).order).toBe(2n * 2n * 12n);
  });

  it('Petersen graph: 120 (F. Harary, Graph Theory, 1969; place from memory)', () => {
    const outer = ring(5);
    const inner = Array.from({ length: 5 }, (_, i) => [5 + i, 5 + ((i + 2) % 5)] as [number, number]);
    const spokes = Array.from({ length: 5 }, (_, i) => [i, 5 + i] as [number, number]);
    expect(signedSymmetries(graph(10, [...outer, ...inner, ...spokes])).order).toBe(240n);
  });

  it('cube graph 48, and 4 × 4 rook graph 1152', () => {
    const cube = all(8, (i, j) => [i, j] as const).filter(([i, j]) => [1, 2, 4].includes(i ^ j));
    expect(signedSymmetries(graph(8, cube)).order).toBe(96n);
    const rook = all(16, (i, j) => [i, j] as const).filter(([i, j]) => i >> 2 === j >> 2 || (i & 3) === (j & 3));
    expect(signedSymmetries(graph(16, rook)).order).toBe(2n * 1152n);
  });

  it('eight separate pairs: wreath product 2⁸ 8!', () => {
    const pairs = Array.from({ length: 8 }, (_, i) => [2 * i, 2 * i + 1] as const);
    expect(signedSymmetries(graph(16, pairs)).order).toBe(2n * 2n ** 8n * factorial(8));
  });

  it('a cubic xyz: even sign changes and all permutations, 24', () => {
    expect(signedSymmetries(natural(3, [term(1, [0, 1], [1, 1], [2, 1])])).order).toBe(48n);
  });

  it('all pairs of 200 coordinates coupled alike: 200!', () => {
    const n = 200;
    const { order, generators } = signedSymmetries(
      graph(
        n,
        all(n, (i, j) => [i, j] as const),
      ),
    );
    expect(order).toBe(2n * factorial(n));
    expect(generators.length).toBe(n);
  });

  it('200 coordinates without coupling: 2²⁰⁰ 200!', () => {
    const n = 200;
    const s = natural(
      n,
      Array.from({ length: n }, (_, i) => term(1, [i, 4])),
    );
    expect(signedSymmetries(s).order).toBe(2n * 2n ** 200n * factorial(n));
  });

  it('a chain of 200: reflection and time; with one bond changed: time alone', () => {
    const chain = Array.from({ length: 199 }, (_, i) => [i, i + 1, 1] as const);
    expect(signedSymmetries(graph(200, chain)).order).toBe(4n);
    expect(signedSymmetries(graph(200, [...chain.slice(0, 50), [50, 51, 2], ...chain.slice(51)])).order).toBe(2n);
  });
});

describe('exactness', () => {
  it('generators are symmetries, and the order is that of brute force (fast-check)', () => {
    const coefficient = fc.integer({ min: -1, max: 1 });
    const model = fc.integer({ min: 1, max: 4 }).chain((n) =>
      fc.record({
        n: fc.constant(n),
        pairs: fc.array(coefficient, { minLength: (n * (n - 1)) / 2, maxLength: (n * (n - 1)) / 2 }),
        squares: fc.array(fc.integer({ min: 1, max: 2 }), { minLength: n, maxLength: n }),
        cubic: fc.array(fc.tuple(fc.nat(n - 1), fc.nat(n - 1), coefficient), { maxLength: 2 }),
      }),
    );
    fc.assert(
      fc.property(model, ({ n, pairs, squares, cubic }) => {
        const terms = new Map<string, StructureTerm>();
        const put = (t: StructureTerm) => terms.set(t.variables.map((v, k) => `${v}^${t.exponents[k]}`).join(' '), t);
        all(n, (i, j) => [i, j] as const).forEach(([i, j], k) => {
          if (pairs[k] !== 0) put(term(pairs[k]!, [i, 1], [j, 1]));
        });
        squares.forEach((c, i) => {
          put(term(c, [i, 2]));
        });
        for (const [i, j, c] of cubic) if (c !== 0) put(i === j ? term(c, [i, 3]) : term(c, [i, 1], [j, 2]));
        const s = natural(n, [...terms.values()]);
        const g = signedSymmetries(s);
        expect(g.generators.every((x) => g.index.isSymmetry(x))).toBe(true);
        expect(g.order).toBe(bruteForce(s, g));
      }),
      { numRuns: 60 },
    );
  });

  it('a random graph repeated k times has at least the planted group, and exactly it when the graph is rigid (fast-check)', () => {
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 4 }), fc.array(fc.boolean(), { minLength: 15, maxLength: 15 }), (k, bits) => {
        const inside = all(6, (i, j) => [i, j] as const).filter((_, e) => bits[e]);
        // a tail of different lengths at every vertex makes each copy rigid
        const marks = Array.from({ length: 6 }, (_, i) => term(11 + i, [i, 2]));
        const copies = Array.from({ length: k }, (_, c) => c * 6);
        const s = natural(6 * k, [
          ...copies.flatMap((o) => inside.map(([i, j]) => term(1, [o + i, 1], [o + j, 1]))),
          ...copies.flatMap((o) => marks.map((m) => term(m.weight.size, [o + m.variables[0]!, 2]))),
          ...copies.flatMap((o) => Array.from({ length: 6 }, (_, i) => term(5, [o + i, 3]))),
        ]);
        const parts = components(6, inside);
        // copies of each connected part may be exchanged on their own
        expect(signedSymmetries(s).order).toBe(2n * factorial(k) ** BigInt(parts));
      }),
      { numRuns: 25 },
    );
  });
});

function components(n: number, edges: readonly (readonly [number, number])[]): number {
  const head = Array.from({ length: n }, (_, i) => i);
  const find = (x: number): number => (head[x] === x ? x : find(head[x]!));
  for (const [i, j] of edges) head[find(i)] = find(j);
  return head.filter((h, i) => h === i).length;
}

describe('floating Hessians', () => {
  const n = 5;
  const form = sparse(build(Q, 2 * n, 2 * n, (i, j) => (j === i + n ? Q.one : i === j + n ? Q.neg(Q.one) : Q.zero)));
  const s = new Float64Array(4 * n * n);
  let noise = 1e-12;
  const jitter = () => {
    noise = -noise * 0.9;
    return noise;
  };
  for (let i = 0; i < n; i++) {
    s[i * 2 * n + i] = 2.5 + jitter();
    const j = (i + 1) % n;
    s[i * 2 * n + j] = s[j * 2 * n + i] = -0.7 + jitter();
    s[(n + i) * 2 * n + n + i] = 1 + jitter();
  }
  const order = (point: number[], tolerance: number) => signedSymmetries(structureOfHessian(s, form, point, Q, tolerance, true)).order;
  it('entries within the tolerance are equal: a ring of five, its sign and time', () => {
    expect(order(new Array(2 * n).fill(0), 1e-9)).toBe(2n * 2n * 10n);
    expect(order(new Array(2 * n).fill(0), 1e-14)).toBeLessThan(40n);
  });
  it('the equilibrium must stay: equal coordinates keep the ring, one that differs its mirror, and no sign', () => {
    const point = [0.3, 0.3 + 1e-13, 0.3, 0.3, 0.3, 0, 0, 0, 0, 0];
    expect(order(point, 1e-9)).toBe(2n * 10n);
    expect(order([0.4, ...point.slice(1)], 1e-9)).toBe(2n * 2n);
  });
});
