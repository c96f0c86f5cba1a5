/**
 * Invariant forms of given degrees for any exact matrices: the kernel of all ρ(g) - 1, g a generator, found modulo
 * primes under every embedding of the field and reconstructed. Monomials that the generators never mix are kept
 * apart, so each elimination is small.
 *
 * The result is checked exactly: the coordinates of ρ(g)f - f over the integral basis are, up to a common
 * denominator, integers below a bound that is computed; they vanish if they do modulo primes whose product exceeds
 * twice the bound.
 */
import { LimitError } from '../errors/index.ts';
import { type Algebraic, mulAddMod } from '../field/index.ts';
import { modularKernel } from '../linear/index.ts';
import { chineseRemainder, type Monomial, type Polynomial, type PolynomialRing, reconstructRational } from '../polynomial/index.ts';
import { CommonReduction } from './common-reduction.ts';
import { Embeddings } from './embeddings.ts';
import { gradedMonomials } from './graded-monomials.ts';
import { boundOfDifferences } from './height-bound.ts';
import type { LinearAction } from './linear-action.ts';
import type { MonomialLayers } from './monomial-layers.ts';
import { isSigned, signedOrbits } from './signed-orbits.ts';
import { kroneckerRow, type SparseRow, SymmetricPowers } from './symmetric-powers.ts';

/** Most monomials of one multidegree, and most of them in one elimination. */
export const MONOMIALS_MOST = 8_000;
export const MIXED_MOST = 1_500;
const PRIMES_MOST = 40;

interface Kernel {
  /** Per mixed set of monomials the leading ones of its kernel. */
  readonly leads: readonly (readonly number[])[];
  /** One row for each form, entries by monomial. */
  readonly rows: readonly Int32Array[];
}

/** The generators of an action modulo one prime, one copy for each distinct embedding of the field. */
interface Images {
  readonly embeddings: Embeddings;
  /** Number of the copy that embedding k uses. */
  readonly copy: readonly number[];
  /** powers[copy][generator][block] */
  readonly powers: readonly (readonly (readonly SymmetricPowers[])[])[];
}

export class FixedForms {
  readonly #action: LinearAction;
  readonly #ring: PolynomialRing<Algebraic>;
  readonly #layers: readonly MonomialLayers[];
  readonly #images: Images[] = [];

  /** `layers` number the monomials of each block. */
  constructor(action: LinearAction, ring: PolynomialRing<Algebraic>, layers: readonly MonomialLayers[]) {
    this.#action = action;
    this.#ring = ring;
    this.#layers = layers;
  }

  /** A basis, each with coefficient 1 at a leading monomial that no other contains. Throws LimitError where it is too large. */
  basis(degrees: readonly number[]): Polynomial<Algebraic>[] {
    const { blocks } = this.#action;
    const monomials = gradedMonomials(this.#layers, blocks, degrees);
    if (monomials.length > MONOMIALS_MOST)
      throw new LimitError(`${monomials.length} monomials of degrees ${degrees.join(', ')}; the limit is ${MONOMIALS_MOST}`, {
        next: 'ask for a lower degree',
      });
    let previous: { values: bigint[][][]; modulus: bigint; shape: string } | undefined;
    for (let index = 0; index < PRIMES_MOST; index++) {
      const images = this.#image(index);
      const { embeddings } = images;
      const { p } = embeddings.reduction;
      const kernels = images.powers.map((powers) => this.#kernel(degrees, powers, p));
      const shape = JSON.stringify(kernels[0]!.leads);
      if (kernels.some((x) => JSON.stringify(x.leads) !== shape) || (previous !== undefined && previous.shape !== shape)) continue;
      const values = kernels[0]!.rows.map((row, r) =>
        Array.from(row, (_, j) => {
          const own = images.copy.map((c) => kernels[c]!.rows[r]![j]!);
          return own.every((x) => x === 0) ? own : embeddings.coordinates(own);
        }),
      );
      const old = previous;
      previous =
        old === undefined
          ? { values: values.map((r) => r.map((c) => c.map(BigInt))), modulus: BigInt(p), shape }
          : {
              values: values.map((r, a) => r.map((c, b) => c.map((x, i) => chineseRemainder(old.values[a]![b]![i]!, old.modulus, x, p)))),
              modulus: old.modulus * BigInt(p),
              shape,
            };
      const forms = this.#rebuild(monomials, previous.values, previous.modulus);
      if (forms !== undefined && this.#holds(degrees, monomials, forms)) return forms;
    }
    throw new LimitError(`the invariants of degrees ${degrees.join(', ')} have coefficients too large to reconstruct`, {
      next: 'ask for a lower degree',
    });
  }

  #image(index: number): Images {
    while (this.#images.length <= index) {
      const action = this.#action;
      const embeddings = new Embeddings(action.field, CommonReduction.of(action.field, 1, this.#images.length));
      const { p } = embeddings.reduction;
      const known = new Map<string, number>();
      const powers: SymmetricPowers[][][] = [];
      const copy = Array.from({ length: embeddings.count }, (_, k) => {
        const matrices = action.generatorMatrices.map((m) =>
          Int32Array.from(m.data, (x) => (m.field.isZero(x) ? 0 : embeddings.apply(k, x))),
        );
        const key = matrices.join(';');
        let c = known.get(key);
        if (c === undefined) {
          c = powers.length;
          known.set(key, c);
          powers.push(
            matrices.map((m) =>
              action.blocks.map((block, b) => {
                const own = new Int32Array(block.length ** 2);
                block.forEach((i, r) => {
                  block.forEach((j, s) => {
                    own[r * block.length + s] = m[i * action.dimension + j]!;
                  });
                });
                return new SymmetricPowers(this.#layers[b]!, own, p);
              }),
            ),
          );
        }
        return c;
      });
      this.#images.push({ embeddings, copy, powers });
    }
    return this.#images[index]!;
  }

  /** Rows of one generator on the monomials of these degrees. */
  #rows(degrees: readonly number[], powers: readonly SymmetricPowers[], p: number): readonly SparseRow[] {
    let rows: readonly SparseRow[] | undefined;
    degrees.forEach((d, b) => {
      if (d === 0) return;
      const size = this.#layers[b]!.layer(d).size;
      if (size > MONOMIALS_MOST / 4 && !powers[b]!.monomial)
        throw new LimitError(`forms of degree ${d} have ${size} monomials; the limit is ${MONOMIALS_MOST / 4}`, {
          next: 'ask for a lower degree',
        });
      const own = powers[b]!.rows(d);
      rows = rows === undefined ? own : rows.flatMap((x) => own.map((y) => kroneckerRow(x, y, own.length, p)));
    });
    return rows ?? [{ index: Int32Array.of(0), value: Int32Array.of(1) }];
  }

  #kernel(degrees: readonly number[], powers: readonly (readonly SymmetricPowers[])[], p: number): Kernel {
    const generators = powers.map((g) => this.#rows(degrees, g, p));
    const count = generators[0]?.length ?? gradedMonomials(this.#layers, this.#action.blocks, degrees).length;
    const root = Int32Array.from({ length: count }, (_, i) => i);
    const find = (i: number): number => {
      while (root[i] !== i) i = root[i] = root[root[i]!]!;
      return i;
    };
    for (const rows of generators)
      rows.forEach((row, i) => {
        for (const j of row.index) {
          const [a, b] = [find(i), find(j)];
          root[Math.max(a, b)] = Math.min(a, b);
        }
      });
    const sets = new Map<number, number[]>();
    for (let i = 0; i < count; i++) {
      const r = find(i);
      const list = sets.get(r);
      if (list === undefined) sets.set(r, [i]);
      else list.push(i);
    }
    const leads: number[][] = [];
    const out: Int32Array[] = [];
    const simple = generators.filter((g) => isSigned(g, p));
    const other = generators.filter((g) => !simple.includes(g));
    // one combination with random weights: for positive weights Σ w_g (ρ(g) - 1) has the common kernel (triangle
    // inequality), so all weights but those on a hypersurface give it
    const weights = other.map((_, g) => (Math.imul(g + 1, 0x9e3779b1) >>> 2) % p);
    const signOf = new Int8Array(count);
    for (const set of sets.values()) {
      const orbits = signedOrbits(set, simple, signOf);
      const size = orbits.length;
      if (size > MIXED_MOST)
        throw new LimitError(`the action mixes ${size} monomials of one degree; the limit is ${MIXED_MOST}`, {
          next: 'ask for a lower degree',
        });
      // columns from the last orbit to the first, so that the first ones are free and lead
      const place = new Map(set.map((m, r) => [m, r] as const));
      const data = new Int32Array(other.length === 0 ? 0 : set.length * size);
      other.forEach((rows, g) => {
        const w = weights[g]!;
        orbits.forEach((orbit, o) => {
          const c = size - 1 - o;
          for (const m of orbit) {
            const x = signOf[m] === 1 ? w : p - w;
            const row = rows[m]!;
            for (let t = 0; t < row.index.length; t++) {
              const at = place.get(row.index[t]!)! * size + c;
              data[at] = mulAddMod(data[at]!, row.value[t]!, x, p);
            }
            const at = place.get(m)! * size + c;
            data[at] = mulAddMod(data[at]!, p - 1, x, p);
          }
        });
      });
      const kernel = modularKernel({ p, rows: other.length === 0 ? 0 : set.length, cols: size, data });
      const own: number[] = [];
      for (let r = kernel.rows - 1; r >= 0; r--) {
        const row = new Int32Array(count);
        let lead = -1;
        for (let c = size - 1; c >= 0; c--) {
          const x = kernel.data[r * size + c]!;
          if (x === 0) continue;
          const orbit = orbits[size - 1 - c]!;
          if (lead < 0) lead = orbit[0]!;
          for (const m of orbit) row[m] = signOf[m] === 1 ? x : p - x;
        }
        own.push(lead);
        out.push(row);
      }
      leads.push(own);
    }
    return { leads, rows: out };
  }

  #rebuild(
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
        const c = this.#action.field.element(
          parts.map((r) => (r!.n * d) / r!.d),
          d,
        );
        terms.push([monomials[j]!, c]);
      }
      out.push(this.#ring.fromTerms(terms));
    }
    return out;
  }

  /** The exact check. */
  #holds(degrees: readonly number[], monomials: readonly Monomial[], forms: readonly Polynomial<Algebraic>[]): boolean {
    const bound = boundOfDifferences(
      this.#action,
      degrees.reduce((s, d) => s + d, 0),
      forms,
    );
    const place = new Map(monomials.map((m, i) => [m, i] as const));
    let modulus = 1n;
    for (let index = 0; modulus <= 2n * bound; index++) {
      if (index >= PRIMES_MOST) return false;
      const { embeddings, copy, powers } = this.#image(index);
      const { p } = embeddings.reduction;
      const rows = powers.map((generators) => generators.map((g) => this.#rows(degrees, g, p)));
      for (let k = 0; k < embeddings.count; k++)
        for (const form of forms) {
          const coefficients = form.coefficients.map((c) => embeddings.apply(k, c));
          for (const g of rows[copy[k]!]!) {
            const sum = new Int32Array(monomials.length);
            form.monomials.forEach((m, t) => {
              const i = place.get(m)!;
              const row = g[i]!;
              for (let a = 0; a < row.index.length; a++)
                sum[row.index[a]!] = mulAddMod(sum[row.index[a]!]!, row.value[a]!, coefficients[t]!, p);
              sum[i] = mulAddMod(sum[i]!, p - 1, coefficients[t]!, p);
            });
            if (sum.some((x) => x !== 0)) return false;
          }
        }
      modulus *= BigInt(p);
    }
    return true;
  }
}
