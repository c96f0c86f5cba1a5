/**
 * The linear theory by brute force: spaces of invariant forms by linear equations, codimension as
 * dim P − rank(T ↦ [JT, L]) on the generalised kernel (Arnold 1971; Galin 1982), subgroups by closing sets of elements.
 */
import {
  characteristic,
  distinctRoots,
  echelon,
  identity,
  inverse,
  kernel,
  type Mat,
  P,
  plus,
  rank,
  reduce,
  times,
  transpose,
} from './modular.ts';

export interface Signed {
  readonly matrix: Mat;
  readonly sign: 1 | -1;
}
export interface LinearModel {
  readonly w: Mat;
  readonly s: Mat;
  readonly generators: readonly Signed[];
}

/** Basis of {X = ±Xᵀ : gᵀXg = sign(g) X}, each as a matrix. */
export function forms(n: number, generators: readonly Signed[], symmetric: boolean, twisted: boolean): Mat[] {
  const pairs: [number, number][] = [];
  for (let i = 0; i < n; i++) for (let j = 0; j <= (symmetric ? i : i - 1); j++) pairs.push([i, j]);
  const unit = (i: number, j: number): Mat => {
    const x = identity(n).map((row) => row.map(() => 0));
    x[j]![i] = symmetric ? 1 : -1;
    x[i]![j] = 1;
    return x;
  };
  const columns = pairs.map(([i, j]) => {
    const x = unit(i, j);
    return generators.flatMap((g) => plus(times(transpose(g.matrix), times(x, g.matrix)), x, twisted ? -g.sign : -1).flat());
  });
  const solutions =
    generators.length === 0 ? pairs.map((_, k) => pairs.map((_, l) => (k === l ? 1 : 0))) : kernel(transpose(columns), pairs.length);
  return solutions.map((v) => {
    const x = identity(n).map((row) => row.map(() => 0));
    pairs.forEach(([i, j], k) => {
      x[i]![j] = v[k]!;
      x[j]![i] = symmetric ? v[k]! : (P - v[k]!) % P;
    });
    return x;
  });
}
export const flow = (w: Mat, s: Mat): Mat => times(inverse(transpose(w)), s);

/** Basis of the maps that commute with all generators. */
function commutant(n: number, generators: readonly Signed[]): Mat[] {
  const unit = (i: number, j: number): Mat => identity(n).map((row, a) => row.map((_, b) => (a === i && b === j ? 1 : 0)));
  const units = Array.from({ length: n * n }, (_, k) => unit(Math.floor(k / n), k % n));
  if (generators.length === 0) return units;
  const columns = units.map((u) => generators.flatMap((g) => plus(times(g.matrix, u), times(u, g.matrix), -1).flat()));
  return kernel(transpose(columns), n * n).map((v) => Array.from({ length: n }, (_, i) => v.slice(i * n, (i + 1) * n)));
}

/**
 * Codimension of the zero event as that of the pair (W, S) on the generalised kernel under changes of basis that commute
 * with the group, and whether first derivatives (W′, S′) of a family span what is left: no flow and no Lie algebra enters.
 */
export function pairUnfolding(
  model: LinearModel,
  derivatives: readonly { readonly w: Mat; readonly s: Mat }[],
): { codimension: number; spans: boolean } {
  const basis = generalisedKernel(flow(model.w, model.s));
  if (basis.length === 0) return { codimension: 0, spans: true };
  const small = restrict(basis, model);
  const d = basis.length;
  const change = (x: Mat, a: Mat): Mat => plus(times(transpose(a), x), times(x, a));
  const tangent = commutant(d, small.generators).map((a) => [...change(small.w, a).flat(), ...change(small.s, a).flat()]);
  const total = forms(d, small.generators, false, true).length + forms(d, small.generators, true, false).length;
  const b = transpose(basis);
  const compress = (x: Mat): number[] => times(basis, times(x, b)).flat();
  const all = [...tangent, ...derivatives.map((x) => [...compress(x.w), ...compress(x.s)])];
  return { codimension: total - rank(tangent), spans: rank(all) === total };
}

/** Restriction of forms and maps to the span of the rows of `basis`. */
function restrict(basis: Mat, model: LinearModel): LinearModel {
  const b = transpose(basis);
  const form = (x: Mat): Mat => times(basis, times(x, b));
  const { pivots } = echelon(basis);
  // Left inverse of b on its pivot rows.
  const square = inverse(pivots.map((p) => b[p]!));
  const map = (g: Mat): Mat => {
    const image = times(g, b);
    return times(
      square,
      pivots.map((p) => image[p]!),
    );
  };
  return { w: form(model.w), s: form(model.s), generators: model.generators.map((g) => ({ matrix: map(g.matrix), sign: g.sign })) };
}

export interface Orbit {
  readonly dimP: number;
  readonly dimG: number;
  readonly codimension: number;
  /** Rows: the tangent space of the orbit, as symmetric forms. */
  readonly tangent: Mat;
}
/** Orbit codimension of L in the class of the group. */
export function orbit(model: LinearModel): Orbit {
  const n = model.w.length;
  if (n === 0) return { dimP: 0, dimG: 0, codimension: 0, tangent: [] };
  const p = forms(n, model.generators, true, false);
  const g = forms(n, model.generators, true, true);
  const l = flow(model.w, model.s);
  const wT = transpose(model.w);
  const tangent = g.map((t) => {
    const jt = flow(model.w, t);
    return times(wT, plus(times(jt, l), times(l, jt), -1)).flat();
  });
  return { dimP: p.length, dimG: g.length, codimension: p.length - rank(tangent), tangent };
}

export interface Expected {
  readonly dimP: number;
  readonly dimG: number;
  readonly order: number;
  readonly reversing: number;
  readonly zero: null | {
    readonly dimension: number;
    readonly kernel: number;
    readonly blocks: number[];
    readonly codimension: number;
    readonly codimensionWithoutSymmetry: number;
    readonly subgroups: { order: number; reversing: number; conjugates: number; codimension: number }[];
  };
  /** Orbit codimension of the whole of L minus the number of distinct nonzero squares of eigenvalues, minus that of zero. */
  readonly collisions: number;
  readonly inertia: { positive: number; zero: number; negative: number };
}

const key = (m: Mat): string => m.map((row) => row.join(',')).join(';');

/** All elements, with their multiplication table; undefined above the limit. */
export function closeGroup(generators: readonly Signed[], n: number, limit = 200): { elements: Signed[]; table: number[][] } | undefined {
  const elements: Signed[] = [{ matrix: identity(n), sign: 1 }];
  const index = new Map([[key(elements[0]!.matrix), 0]]);
  const gens = generators.map((g) => ({ matrix: reduce(g.matrix), sign: g.sign }));
  for (let i = 0; i < elements.length; i++) {
    for (const g of gens) {
      const matrix = times(elements[i]!.matrix, g.matrix);
      const k = key(matrix);
      if (!index.has(k)) {
        if (elements.length >= limit) return undefined;
        index.set(k, elements.length);
        elements.push({ matrix, sign: (elements[i]!.sign * g.sign) as 1 | -1 });
      }
    }
  }
  const table = elements.map((a) => elements.map((b) => index.get(key(times(a.matrix, b.matrix)))!));
  return { elements, table };
}

/** One subgroup of each conjugacy class, with the number of its conjugates. */
export function subgroupClasses(table: number[][]): { members: number[]; conjugates: number }[] {
  const n = table.length;
  const inverseOf = table.map((row) => row.indexOf(0));
  const close = (start: readonly number[]): number[] => {
    const set = new Set([0, ...start]);
    const list = [...set];
    for (let i = 0; i < list.length; i++)
      for (const s of start) {
        const x = table[list[i]!]![s]!;
        if (!set.has(x)) {
          set.add(x);
          list.push(x);
        }
      }
    return list.sort((a, b) => a - b);
  };
  const all = new Map<string, number[]>();
  const queue: number[][] = [[0]];
  all.set('0', [0]);
  for (const h of queue)
    for (let x = 1; x < n; x++)
      if (!h.includes(x)) {
        const bigger = close([...h, x]);
        const k = bigger.join();
        if (!all.has(k)) {
          all.set(k, bigger);
          queue.push(bigger);
        }
      }
  const result: { members: number[]; conjugates: number }[] = [];
  const seen = new Set<string>();
  for (const [k, h] of all) {
    if (seen.has(k)) continue;
    const orbitKeys = new Set<string>();
    for (let x = 0; x < n; x++)
      orbitKeys.add(
        h
          .map((y) => table[table[x]![y]!]![inverseOf[x]!]!)
          .sort((a, b) => a - b)
          .join(),
      );
    for (const o of orbitKeys) seen.add(o);
    result.push({ members: h, conjugates: orbitKeys.size });
  }
  return result;
}

/** Eigenvalues of a real symmetric matrix by Jacobi rotations (common practice). */
export function symmetricEigenvalues(a: Mat): number[] {
  const m = a.map((row) => row.slice());
  const n = m.length;
  for (let sweep = 0; sweep < 60; sweep++) {
    let off = 0;
    for (let i = 0; i < n; i++)
      for (let j = 0; j < i; j++) {
        const x = m[i]![j]!;
        off += x * x;
        if (Math.abs(x) < 1e-300) continue;
        const theta = (m[j]![j]! - m[i]![i]!) / (2 * x);
        const t = Math.sign(theta || 1) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
        const c = 1 / Math.sqrt(t * t + 1);
        const s = t * c;
        for (let k = 0; k < n; k++) {
          const [u, v] = [m[i]![k]!, m[j]![k]!];
          m[i]![k] = c * u - s * v;
          m[j]![k] = s * u + c * v;
        }
        for (let k = 0; k < n; k++) {
          const [u, v] = [m[k]![i]!, m[k]![j]!];
          m[k]![i] = c * u - s * v;
          m[k]![j] = s * u + c * v;
        }
      }
    if (off < 1e-24) break;
  }
  return m.map((row, i) => row[i]!);
}

/** Jordan blocks at zero, descending, from the ranks of the powers. */
export function zeroBlocks(l: Mat): number[] {
  const n = l.length;
  const nullities = [0];
  let power = identity(n);
  for (let k = 1; k <= n + 1; k++) {
    power = times(power, l);
    nullities.push(n - rank(power));
  }
  const blocks: number[] = [];
  for (let k = n; k >= 1; k--) {
    const exactly = 2 * nullities[k]! - nullities[k - 1]! - nullities[k + 1]!;
    for (let i = 0; i < exactly; i++) blocks.push(k);
  }
  return blocks;
}
/** Generalised kernel as rows. */
export function generalisedKernel(l: Mat): Mat {
  let power = l;
  for (let k = 1; k < l.length; k *= 2) power = times(power, power);
  return kernel(power, l.length);
}
export const onGeneralisedKernel = (model: LinearModel): LinearModel => restrict(generalisedKernel(flow(model.w, model.s)), model);

export function bruteForce(model: LinearModel, integerS: Mat): Expected {
  const n = model.w.length;
  const l = flow(model.w, model.s);
  const group = closeGroup(model.generators, n)!;
  const e0 = generalisedKernel(l);
  const whole = orbit(model);
  const small = e0.length > 0 ? restrict(e0, { ...model, generators: group.elements }) : undefined;
  const within = (members: readonly number[]): number =>
    orbit({ w: small!.w, s: small!.s, generators: members.map((i) => small!.generators[i]!) }).codimension;
  const classes = small === undefined ? [] : subgroupClasses(group.table);
  const zeroCodimension = small === undefined ? 0 : within(group.elements.map((_, i) => i));
  const chi = characteristic(l);
  const eigenvalues = distinctRoots(chi) - (e0.length > 0 ? 1 : 0);
  const nullity = n - rank(model.s);
  const sorted = symmetricEigenvalues(integerS)
    .sort((a, b) => Math.abs(a) - Math.abs(b))
    .slice(nullity);
  return {
    dimP: whole.dimP,
    dimG: whole.dimG,
    order: group.elements.length,
    reversing: group.elements.filter((g) => g.sign === -1).length,
    zero:
      small === undefined
        ? null
        : {
            dimension: e0.length,
            kernel: nullity,
            blocks: zeroBlocks(l),
            codimension: zeroCodimension,
            codimensionWithoutSymmetry: within([]),
            subgroups: classes.map((h) => ({
              order: h.members.length,
              reversing: h.members.filter((i) => group.elements[i]!.sign === -1).length,
              conjugates: h.conjugates,
              codimension: within(h.members),
            })),
          },
    collisions: whole.codimension - zeroCodimension - eigenvalues / 2,
    inertia: { positive: sorted.filter((x) => x > 0).length, zero: nullity, negative: sorted.filter((x) => x < 0).length },
  };
}
