/**
 * The spectrum of one block of a floating model: a symmetric problem where S is definite or where the block splits into positions and
 * momenta with a definite kinetic part, else the clusters of event/floating/spectrum.ts. In classes 2, 7, 8 the flow is turned by the complex
 * structure of χ, L + cI, so that iω and −iω on χ come to lie at different places.
 */
import type { ClusterPart } from '../event/collisions.ts';
import { complexClass, genericMultiplicity } from '../event/collisions-suspects.ts';
import { floatingSpectrum } from '../event/floating/spectrum.ts';
import type { EigenvalueKind } from '../event/partition-codimension.ts';
import {
  type NumberMatrix,
  numberBuild,
  numberCombine,
  numberCongruence,
  numberMatrix,
  numberMultiply,
  numberSolve,
  numberTranspose,
} from '../linear/index.ts';
import { type ComplexNumber, hamiltonianEigenvalues, symmetricEigen } from '../linear/spectral.ts';
import { applyNumeric } from './floating-action.ts';
import type { FloatingBlockZero, FloatingStudy } from './floating-linear.ts';

/** Larger blocks that are neither definite nor natural get eigenvalues, but no signatures and no collisions. */
export const CLUSTER_BLOCK_LIMIT = 100;

/** One place of the spectrum of a block. */
export interface BlockPlace {
  readonly kind: EigenvalueKind;
  readonly re: number;
  readonly im: number;
  readonly part: ClusterPart;
}

export interface BlockSpectrum {
  readonly places: readonly BlockPlace[];
  /** False where Jordan blocks or signatures are unknown. */
  readonly complete: boolean;
}

/** Copies of equal sizes thinned to one in `unit`, or undefined where they do not come so. */
function perUnit(sizes: readonly number[], unit: number): number[] | undefined {
  const out = sizes.filter((_, i) => i % unit === 0);
  return out.length * unit === sizes.length && sizes.every((s, i) => s === out[Math.floor(i / unit)]) ? out : undefined;
}

/** Values y = λ² of a semisimple block, ascending, gathered where they agree to the tolerance; `sign` is the Krein sign of negative ones. */
function gathered(b: FloatingBlockZero, index: number, ys: readonly number[], sign: 1 | -1, tolerance: number): BlockSpectrum {
  const { block } = b;
  const zeros = b.zero.generalisedDimension / 2;
  const largest = ys.reduce((m, y) => Math.max(m, Math.abs(y)), 0);
  const kept = [...ys]
    .sort((x, y) => Math.abs(x) - Math.abs(y))
    .slice(zeros)
    .sort((x, y) => x - y);
  const groups: number[][] = [];
  for (const y of kept) {
    const last = groups.at(-1);
    if (last !== undefined && y - last.at(-1)! <= tolerance * largest) last.push(y);
    else groups.push([y]);
  }
  const unit = block.irreducible.beta === 4 ? block.cut / 2 : block.cut;
  let complete = true;
  const places = groups.map((g): BlockPlace => {
    const y = g.reduce((s, x) => s + x, 0) / g.length;
    const kind = y < 0 ? 'imaginary' : 'real';
    const sizes = g.map(() => 1);
    const generic = genericMultiplicity(block.symmetryClass, block.cut);
    let members: number[][] = [];
    if (complexClass(block.symmetryClass) && kind === 'imaginary') {
      // alone it is on one of the two sides; more needs the complex structure
      members = g.length === generic ? [block.symmetryClass === 8 ? [1, 1] : [1]] : [];
      if (g.length !== generic) complete = false;
    } else {
      const m = perUnit(sizes, unit);
      if (m === undefined) complete = false;
      else members = [m];
    }
    const count = g.length * block.copies;
    return {
      kind,
      re: kind === 'real' ? Math.sqrt(y) : 0,
      im: kind === 'real' ? 0 : Math.sqrt(-y),
      part: {
        block: index,
        classNumber: block.symmetryClass,
        members,
        sizes: new Array<number>(count).fill(1),
        ...(kind === 'imaginary' ? { krein: sign === 1 ? ([count, 0] as const) : ([0, count] as const) } : {}),
      },
    };
  });
  return { places, complete };
}

/** Lower triangular c with c cᵀ = ±s, or undefined where s is not clearly definite. */
function definiteRoot(s: NumberMatrix, floor: number): { c: NumberMatrix; sign: 1 | -1 } | undefined {
  const n = s.rows;
  const sign = n > 0 && s.data[0]! < 0 ? -1 : 1;
  const c = new Float64Array(n * n);
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      let x = sign * s.data[i * n + j]!;
      for (let k = 0; k < j; k++) x -= c[i * n + k]! * c[j * n + k]!;
      if (i === j && !(x > floor)) return undefined;
      c[i * n + j] = i === j ? Math.sqrt(x) : x / c[j * n + j]!;
    }
  return { c: numberMatrix(n, n, c), sign };
}

/** The two halves of a block whose form couples only one with the other and whose Hessian does not couple them. */
function naturalHalves(s: NumberMatrix, w: NumberMatrix): { a: number[]; b: number[] } | undefined {
  const n = s.rows;
  const color = new Int8Array(n).fill(-1);
  for (let start = 0; start < n; start++) {
    if (color[start] !== -1) continue;
    color[start] = 0;
    const queue = [start];
    for (let i = queue.pop(); i !== undefined; i = queue.pop())
      for (let j = 0; j < n; j++) {
        const opposite = w.data[i * n + j] !== 0;
        const same = s.data[i * n + j] !== 0;
        if (!opposite && !same) continue;
        if (opposite && same) return undefined;
        const wanted = opposite ? 1 - color[i]! : color[i]!;
        if (color[j] === -1) {
          color[j] = wanted;
          queue.push(j);
        } else if (color[j] !== wanted) return undefined;
      }
  }
  const of = (c: number) => Array.from(color.keys()).filter((i) => color[i] === c);
  const [a, b] = [of(0), of(1)];
  return a.length === b.length ? { a, b } : undefined;
}

const submatrix = (m: NumberMatrix, rows: readonly number[], cols: readonly number[]) =>
  numberBuild(rows.length, cols.length, (i, j) => m.data[rows[i]! * m.cols + cols[j]!]!);

/** y of a natural block: with S = A ⊕ B and B definite, q″ = −w⁻ᵀBw⁻¹A q. */
function naturalSquares(b: FloatingBlockZero, floor: number): { ys: Float64Array; sign: 1 | -1 } | undefined {
  const halves = naturalHalves(b.raw.s, b.raw.w);
  if (halves === undefined) return undefined;
  for (const [a, k] of [
    [halves.a, halves.b],
    [halves.b, halves.a],
  ] as const) {
    const root = definiteRoot(submatrix(b.raw.s, k, k), floor);
    if (root === undefined) continue;
    // w⁻ᵀ B w⁻¹ = ±(w⁻ᵀc)(w⁻ᵀc)ᵀ
    const t = numberSolve(numberTranspose(submatrix(b.raw.w, a, k)), root.c);
    const { values } = symmetricEigen(numberCongruence(t, submatrix(b.raw.s, a, a)).data, a.length);
    return { ys: values.map((x) => -root.sign * x), sign: root.sign };
  }
  return undefined;
}

/** y of a definite block: L is similar to the skew matrix cᵀJc. */
function definiteSquares(b: FloatingBlockZero, floor: number): { ys: Float64Array; sign: 1 | -1 } | undefined {
  const root = definiteRoot(b.s, floor);
  if (root === undefined) return undefined;
  const skew = numberMultiply(numberTranspose(root.c), numberSolve(numberTranspose(b.w), root.c));
  const { values } = symmetricEigen(numberMultiply(skew, skew).data, skew.rows);
  return { ys: values.filter((_, i) => i % 2 === 0).map((y, i) => (y + values[2 * i + 1]!) / 2), sign: root.sign };
}

/** I with I² = −1 that commutes with L, in the coordinates of the block: i on χ, −i on its conjugate. */
function complexStructure(study: FloatingStudy, b: FloatingBlockZero): NumberMatrix {
  const { part } = study.symplectic;
  const { group, inclusion } = part;
  const k = b.block.irreducible;
  const degree = k.dimension / 2;
  const n = study.action.dimension;
  const columns = b.block.basis.map((v) => {
    const x = new Float64Array(n);
    v.index.forEach((i, q) => {
      x[i] = v.value[q]!;
    });
    return x;
  });
  const images = columns.map(() => new Float64Array(n));
  for (let e = 0; e < group.order; e++) {
    const c = (2 * degree * k.complexValues[group.classOf[e]!]!.im) / group.order;
    if (Math.abs(c) < 1e-14) continue;
    const m = study.numeric.matrix(inclusion[e]!);
    columns.forEach((v, j) => {
      const y = applyNumeric(m, v);
      const out = images[j]!;
      for (let i = 0; i < n; i++) out[i]! += c * y[i]!;
    });
  }
  const raw = numberBuild(columns.length, columns.length, (i, j) => columns[i]!.reduce((s, x, r) => s + x * images[j]![r]!, 0));
  return numberSolve(b.transform, numberMultiply(raw, b.transform));
}

/** Clusters of a general block. */
function clustered(study: FloatingStudy, b: FloatingBlockZero, index: number): BlockSpectrum {
  const { block } = b;
  const { tolerance } = study.prepared;
  let complete = true;
  const unit = block.irreducible.beta === 4 ? block.cut / 2 : block.cut;
  const place = (
    kind: EigenvalueKind,
    at: ComplexNumber,
    members: number[][],
    sizes: readonly number[],
    krein?: readonly [number, number],
  ) => ({
    kind,
    re: at.re,
    im: at.im,
    part: {
      block: index,
      classNumber: block.symmetryClass,
      members,
      sizes: sizes.flatMap((s) => new Array<number>(block.copies).fill(s)),
      ...(krein === undefined || kind !== 'imaginary' ? {} : { krein: [krein[0] * block.copies, krein[1] * block.copies] as const }),
    },
  });
  const sizesOf = (blocks: readonly { readonly size: number; readonly count: number }[]) =>
    blocks.flatMap((x) => new Array<number>(x.count).fill(x.size)).sort((x, y) => y - x);
  if (!complexClass(block.symmetryClass)) {
    const spectrum = floatingSpectrum(b.s, b.w, { scale: b.scale, tolerance }, b.zero);
    const places = spectrum.clusters.map((c) => {
      const sizes = sizesOf(c.blocks);
      const members = perUnit(sizes, unit);
      if (!c.decided || members === undefined) complete = false;
      return place(
        c.kind,
        c.value,
        c.decided && members !== undefined ? [members] : [],
        sizes,
        c.krein === null ? undefined : [c.krein.positive, c.krein.negative],
      );
    });
    return { places, complete };
  }
  const i = complexStructure(study, b);
  const l = numberSolve(numberTranspose(b.w), b.s);
  const c = 2 * Math.sqrt(l.data.reduce((s, x) => s + x * x, 0)) + b.scale;
  const turned = numberCombine(b.s, numberMultiply(numberTranspose(b.w), i), c);
  const spectrum = floatingSpectrum(turned, b.w, { scale: Math.max(c, b.scale), tolerance });
  let clusters = spectrum.clusters;
  if (b.zero.generalisedDimension > 0) {
    const distance = (x: ComplexNumber) => Math.hypot(x.re, x.im - c);
    const nearest = clusters.reduce((m, x) => (distance(x.value) < distance(m.value) ? x : m), clusters[0]!);
    clusters = clusters.filter((x) => x !== nearest);
  }
  const places = clusters.map((x) => {
    const sizes = sizesOf(x.blocks);
    const members = perUnit(sizes, block.cut / 2);
    const b0 = x.value.im - c;
    const real = x.value.re > 0 && Math.abs(b0) <= tolerance * c;
    const kind: EigenvalueKind = x.value.re === 0 ? 'imaginary' : real ? 'real' : 'quadruple';
    if (!x.decided || members === undefined) complete = false;
    const krein =
      x.krein === null
        ? undefined
        : b0 > 0
          ? ([x.krein.positive, x.krein.negative] as const)
          : ([x.krein.negative, x.krein.positive] as const);
    // χ and its conjugate both lie at a real eigenvalue
    const all = real ? [...sizes, ...sizes].sort((p, q) => q - p) : sizes;
    return place(kind, { re: x.value.re, im: real ? 0 : Math.abs(b0) }, x.decided && members !== undefined ? [members] : [], all, krein);
  });
  return { places, complete };
}

/** The places of one block off zero. */
export function blockSpectrum(study: FloatingStudy, b: FloatingBlockZero, index: number): BlockSpectrum {
  if (b.s.rows === 0) return { places: [], complete: true };
  const { tolerance } = study.prepared;
  const floor = tolerance * b.scale;
  const general = () => clustered(study, b, index);
  const semisimple = definiteSquares(b, floor) ?? naturalSquares(b, floor);
  if (semisimple !== undefined) {
    const direct = gathered(b, index, Array.from(semisimple.ys), semisimple.sign, tolerance);
    return direct.complete || b.s.rows > CLUSTER_BLOCK_LIMIT ? direct : general();
  }
  if (b.s.rows <= CLUSTER_BLOCK_LIMIT) return general();
  const zeros = b.zero.generalisedDimension;
  const { values } = hamiltonianEigenvalues(numberSolve(numberTranspose(b.w), b.s));
  const off = values.slice(zeros);
  const places = off
    .filter((z) => z.im >= 0 && (z.im > 0 || z.re > 0) && z.re >= 0)
    .map(
      (z): BlockPlace => ({
        kind: z.re <= floor ? 'imaginary' : z.im <= floor ? 'real' : 'quadruple',
        re: z.re <= floor ? 0 : z.re,
        im: z.im <= floor ? 0 : z.im,
        part: { block: index, classNumber: b.block.symmetryClass, members: [], sizes: new Array<number>(b.block.copies).fill(1) },
      }),
    );
  return { places, complete: false };
}
