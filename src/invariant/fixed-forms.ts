/**
 * Invariant forms of given degrees for any exact matrices: the kernel of all ρ(g) - 1, g a generator, found modulo
 * primes under every embedding of the field, reconstructed, and checked exactly. Monomials that the generators
 * never mix are kept apart, so each elimination is small.
 */
import { LimitError } from '../errors/index.ts';
import { type Algebraic, PrimeField } from '../field/index.ts';
import { modularKernel } from '../linear/index.ts';
import { chineseRemainder, type Monomial, type Polynomial, PolynomialRing, reconstructRational } from '../polynomial/index.ts';
import { CommonReduction } from './common-reduction.ts';
import { Embeddings } from './embeddings.ts';
import { gradedMonomials } from './graded-monomials.ts';
import type { LinearAction } from './linear-action.ts';

/** Most monomials of one multidegree, and most of them in one elimination. */
export const MONOMIALS_MOST = 20_000;
export const MIXED_MOST = 1_500;
const PRIMES_MOST = 40;

interface Image {
  /** Per mixed set of monomials: the free ones and the kernel, one row each. */
  readonly free: readonly (readonly number[])[];
  readonly rows: readonly Int32Array[];
}

/** A basis, each with coefficient 1 at a leading monomial that no other contains. Throws LimitError where it is too large. */
export function fixedForms(action: LinearAction, ring: PolynomialRing<Algebraic>, degrees: readonly number[]): Polynomial<Algebraic>[] {
  const monomials = gradedMonomials(action.blocks, degrees);
  if (monomials.length > MONOMIALS_MOST)
    throw new LimitError(`${monomials.length} monomials of degrees ${degrees.join(', ')}; the limit is ${MONOMIALS_MOST}`, {
      next: 'ask for a lower degree',
    });
  const { field } = action;
  let previous: { values: bigint[][][]; modulus: bigint; shape: string } | undefined;
  for (let index = 0; index < PRIMES_MOST; index++) {
    const embeddings = new Embeddings(field, CommonReduction.of(field, 1, index));
    const { p } = embeddings.reduction;
    const images = distinctImages(action, embeddings, (k) => kernelImage(action, embeddings, k, monomials));
    const shape = JSON.stringify(images[0]!.free);
    if (images.some((x) => JSON.stringify(x.free) !== shape) || (previous !== undefined && previous.shape !== shape)) continue;
    const values = images[0]!.rows.map((row, r) => Array.from(row, (_, j) => embeddings.coordinates(images.map((x) => x.rows[r]![j]!))));
    if (previous === undefined) previous = { values: values.map((r) => r.map((c) => c.map(BigInt))), modulus: BigInt(p), shape };
    else {
      const old = previous;
      previous = {
        values: values.map((r, a) => r.map((c, b) => c.map((x, i) => chineseRemainder(old.values[a]![b]![i]!, old.modulus, x, p)))),
        modulus: old.modulus * BigInt(p),
        shape,
      };
    }
    const forms = rebuild(ring, field, monomials, previous.values, previous.modulus);
    if (forms?.every((f) => action.generatorMatrices.every((g) => ring.equal(ring.linearSubstitution(f, g), f)))) return forms;
  }
  throw new LimitError(`the invariants of degrees ${degrees.join(', ')} have coefficients too large to reconstruct`, {
    next: 'ask for a lower degree',
  });
}

/** Embeddings that agree on the generators give the same kernel. */
function distinctImages(action: LinearAction, embeddings: Embeddings, make: (k: number) => Image): Image[] {
  const known = new Map<string, Image>();
  return Array.from({ length: embeddings.count }, (_, k) => {
    const key = action.generatorMatrices
      .map((m) => m.data.map((x) => (m.field.isZero(x) ? 0 : embeddings.apply(k, x))).join(','))
      .join(';');
    let image = known.get(key);
    if (image === undefined) known.set(key, (image = make(k)));
    return image;
  });
}

function kernelImage(action: LinearAction, embeddings: Embeddings, k: number, monomials: readonly Monomial[]): Image {
  const { p } = embeddings.reduction;
  const ring = new PolynomialRing<number>(new PrimeField(p), action.names);
  const place = new Map(monomials.map((m, i) => [m, i] as const));
  const root = Array.from(monomials.keys());
  const find = (i: number): number => {
    while (root[i] !== i) i = root[i] = root[root[i]!]!;
    return i;
  };
  const columns = action.generatorMatrices.map((g) => {
    const n = action.dimension;
    const forms = Array.from({ length: n }, (_, i) =>
      ring.linearForm(
        Array.from({ length: n }, (_, j) => (g.field.isZero(g.data[i * n + j]!) ? 0 : embeddings.apply(k, g.data[i * n + j]!))),
      ),
    );
    const cache = new Map<Monomial, Polynomial<number>>([['', ring.one]]);
    const image = (m: Monomial): Polynomial<number> => {
      let out = cache.get(m);
      if (out === undefined) cache.set(m, (out = ring.mul(image(m.slice(0, -1)), forms[m.charCodeAt(m.length - 1)]!)));
      return out;
    };
    return monomials.map((m, i) => {
      const q = image(m);
      for (const other of q.monomials) {
        const [a, b] = [find(i), find(place.get(other)!)];
        root[Math.max(a, b)] = Math.min(a, b);
      }
      return q;
    });
  });
  const sets = new Map<number, number[]>();
  monomials.forEach((_, i) => {
    const r = find(i);
    const list = sets.get(r);
    if (list === undefined) sets.set(r, [i]);
    else list.push(i);
  });
  const free: number[][] = [];
  const rows: Int32Array[] = [];
  for (const set of sets.values()) {
    const size = set.length;
    if (size > MIXED_MOST)
      throw new LimitError(`the action mixes ${size} monomials of one degree; the limit is ${MIXED_MOST}`, {
        next: 'ask for a lower degree',
      });
    // columns from the last monomial to the first, so that the first ones are free and lead
    const column = new Map(set.map((i, c) => [monomials[i]!, size - 1 - c] as const));
    const data = new Int32Array(columns.length * size * size);
    columns.forEach((images, g) => {
      for (const i of set) {
        const c = column.get(monomials[i]!)!;
        const q = images[i]!;
        q.monomials.forEach((m, t) => {
          data[(g * size + column.get(m)!) * size + c] = q.coefficients[t]!;
        });
        const diagonal = (g * size + c) * size + c;
        data[diagonal] = data[diagonal] === 0 ? p - 1 : data[diagonal]! - 1;
      }
    });
    const kernel = modularKernel({ p, rows: columns.length * size, cols: size, data });
    const leads: number[] = [];
    for (let r = kernel.rows - 1; r >= 0; r--) {
      const row = new Int32Array(monomials.length);
      let lead = -1;
      for (let c = size - 1; c >= 0; c--) {
        const x = kernel.data[r * size + c]!;
        if (x === 0) continue;
        if (lead < 0) lead = set[size - 1 - c]!;
        row[set[size - 1 - c]!] = x;
      }
      leads.push(lead);
      rows.push(row);
    }
    free.push(leads);
  }
  return { free, rows };
}

function rebuild(
  ring: PolynomialRing<Algebraic>,
  field: LinearAction['field'],
  monomials: readonly Monomial[],
  values: readonly (readonly (readonly bigint[])[])[],
  modulus: bigint,
): Polynomial<Algebraic>[] | undefined {
  const out: Polynomial<Algebraic>[] = [];
  for (const row of values) {
    const terms: Array<[Monomial, Algebraic]> = [];
    for (let j = 0; j < row.length; j++) {
      if (row[j]!.every((x) => x === 0n)) continue;
      const parts = row[j]!.map((x) => reconstructRational(x, modulus));
      if (parts.some((r) => r === undefined)) return undefined;
      const d = parts.reduce((m, r) => m * r!.d, 1n);
      terms.push([
        monomials[j]!,
        field.element(
          parts.map((r) => (r!.n * d) / r!.d),
          d,
        ),
      ]);
    }
    out.push(ring.fromTerms(terms));
  }
  return out;
}
