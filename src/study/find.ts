/** `check --find`: the signed permutations of the coordinates that leave H invariant, against what was declared. */
import { groupOfMatrices } from '../action/index.ts';
import { LimitError, NotAGroupError } from '../errors/index.ts';
import { type Algebraic, mulAddMod, type RealField } from '../field/index.ts';
import { largestEntry, type SparseMatrix } from '../linear/index.ts';
import { signedSymmetries } from '../model/find-symmetry.ts';
import {
  asSignedPermutation,
  permutationMatrix,
  permutationText,
  structureOfHessian,
  structureOfPolynomial,
} from '../model/find-symmetry-model.ts';
import type { SignedStructure } from '../model/find-symmetry-structure.ts';
import { energySeries } from '../model/neutral.ts';
import type { FloatingPrepared } from './floating-prepare.ts';
import type { Prepared } from './prepare.ts';

/** Groups are joined and compared element by element up to this order. */
export const JOIN_LIMIT = 20_000;

export interface FoundGenerator {
  readonly name: string;
  readonly reversing: boolean;
  /** In the language of model files; empty where all coordinates stay (time reversal alone). */
  readonly map: string;
}

export interface FoundSymmetry {
  /** Order of the group of all symmetries found, declared ones that are no signed permutations joined; a text beyond 2⁵³. */
  readonly order: number | string;
  readonly reversing: boolean;
  /** Order of the signed permutations alone. */
  readonly signedOrder: number | string;
  /** Order of the signed permutations that leave H invariant whatever the varied parameters are; only where some vary. */
  readonly familyOrder?: number | string;
  readonly generators: readonly FoundGenerator[];
  readonly declaredOrder: number;
  /** Whether the declared group lies in the one found. */
  readonly contains: boolean;
  /** Generators found that the declared group does not contain, by name. */
  readonly undeclared: readonly string[];
  /** Declared generators that are no signed permutations; they are kept and joined. */
  readonly outside: readonly string[];
  /** To which degree H was compared. */
  readonly degree: number | 'all';
  readonly words: string;
}

interface Declared {
  readonly field: RealField;
  readonly form: SparseMatrix<Algebraic>;
  readonly names: readonly string[];
  readonly generators: Prepared['generators'];
  readonly order: number;
}

/** Exact models. Throws LimitError where the search is too long. */
export function findSymmetry(p: Prepared, declaredOrder: number): FoundSymmetry {
  const { field, form } = p;
  const point = p.quantities.point.map((x) => field.embed(p.quantities.field, x));
  const series = energySeries(p.hamiltonian, p.quantities, [], field);
  if (series === undefined)
    throw new LimitError('the Taylor series of H has coefficients outside the field of the model', {
      expected: 'an H whose fourth derivatives are exact too',
      next: 'compare with --floating',
    });
  const lift = p.declaration.form === undefined;
  const structure = structureOfPolynomial(series.polynomial, form, point, field, lift);
  const { vary } = p.declaration;
  const family = vary.length === 0 ? undefined : energySeries(p.hamiltonian, p.quantities, vary, field);
  const familyOrder =
    family === undefined ? undefined : signedSymmetries(structureOfPolynomial(family.polynomial, form, point, field, lift)).order;
  return compared(
    { field, form, names: p.quantities.names, generators: p.generators, order: declaredOrder },
    structure,
    Number.isFinite(series.known) ? series.known + 1 : 'all',
    familyOrder === undefined ? undefined : { order: familyOrder, vary },
  );
}

/** Floating models: signed permutations that leave S, ω and the equilibrium invariant within the tolerance. */
export function findFloatingSymmetry(p: FloatingPrepared, declaredOrder: number): FoundSymmetry {
  const { declaration, quantities } = p.source;
  const scale = Math.max(largestEntry(p.hessian), Number.MIN_VALUE);
  const structure = structureOfHessian(
    p.hessian.data,
    quantities.form,
    p.equilibrium.point,
    quantities.field,
    p.tolerance * scale,
    declaration.form === undefined,
  );
  return compared(
    { field: quantities.field, form: quantities.form, names: quantities.names, generators: p.generators, order: declaredOrder },
    structure,
    2,
    undefined,
  );
}

function compared(
  declared: Declared,
  structure: SignedStructure,
  degree: number | 'all',
  family: { readonly order: bigint; readonly vary: readonly string[] } | undefined,
): FoundSymmetry {
  const { field } = declared;
  const n = declared.form.rows;
  const group = signedSymmetries(structure);
  const matrices = group.generators.map((g) => permutationMatrix(g, field));
  const generators = group.generators.map(
    (g, i): FoundGenerator => ({ name: `f${i + 1}`, reversing: g.signs[n] === -1, map: permutationText(g, declared.names) }),
  );
  const valid = declared.generators.filter((g) => g.reason === undefined && g.sign !== undefined);
  const outside = valid.filter((g) => {
    const s = asSignedPermutation(g.matrix, field, g.sign!);
    return s === undefined || !inKinds(structure.kinds, s.images) || !group.index.isSymmetry(s);
  });
  const joined = outside.length === 0 ? group.order : joinedOrder(field, n, [...matrices, ...outside.map((g) => g.matrix)], group.order);
  const elements =
    declared.order === 0
      ? undefined
      : orbitOf(
          field,
          n,
          valid.map((g) => g.matrix),
          declared.order,
        );
  const undeclared = elements === undefined ? generators : generators.filter((_, i) => !elements.has(matrices[i]!));
  const order = joined ?? group.order;
  return {
    order: readable(order),
    reversing: generators.some((g) => g.reversing),
    signedOrder: readable(group.order),
    ...(family === undefined ? {} : { familyOrder: readable(family.order) }),
    generators,
    declaredOrder: declared.order,
    contains: valid.length === declared.generators.length && joined !== undefined,
    undeclared: undeclared.map((g) => g.name),
    outside: outside.map((g) => g.name),
    degree,
    words: [
      words(order, declared.order, undeclared, joined === undefined),
      ...(family === undefined || family.order === group.order
        ? []
        : [
            `Of the ${shortly(group.order)} signed permutations ${shortly(family.order)} stay symmetries when ${family.vary.join(', ')} varies.`,
          ]),
      ...(outside.length === 0 ? [] : [`${outside.map((g) => g.name).join(', ')}: no signed permutation, kept as declared.`]),
    ].join(' '),
  };
}

/** Long orders by their size. */
function shortly(x: bigint): string {
  const text = x.toString();
  return text.length <= 15 ? text : `${text[0]}.${text.slice(1, 3)}·10^${text.length - 1}`;
}

const readable = (x: bigint): number | string => (x <= BigInt(Number.MAX_SAFE_INTEGER) ? Number(x) : x.toString());

/** Whether a permutation maps coordinates to coordinates where the search did. */
function inKinds(kinds: readonly number[], images: Int32Array): boolean {
  return kinds.every((k, i) => kinds[images[i]!] === k);
}

/** Order of the group generated, or undefined where it is infinite or too large to tell. */
function joinedOrder(field: RealField, n: number, matrices: readonly SparseMatrix<Algebraic>[], least: bigint): bigint | undefined {
  if (least > BigInt(JOIN_LIMIT)) return undefined;
  try {
    return BigInt(groupOfMatrices(field, n, matrices, JOIN_LIMIT).order);
  } catch (error) {
    if (!(error instanceof NotAGroupError)) throw error;
    return undefined;
  }
}

/**
 * The elements of a finite matrix group as images of one random vector modulo a prime; undefined where the vector is not moved
 * by all of them or there are too many.
 */
function orbitOf(
  field: RealField,
  n: number,
  generators: readonly SparseMatrix<Algebraic>[],
  order: number,
): { has(matrix: SparseMatrix<Algebraic>): boolean } | undefined {
  if (order > JOIN_LIMIT * 5) return undefined;
  const reduction = field.reduction();
  const { p } = reduction;
  let seed = 987_654_321;
  const start = Int32Array.from({ length: n }, () => {
    seed = (seed * 48271) % 2147483647;
    return seed % p;
  });
  const times = (m: SparseMatrix<Algebraic>, v: Int32Array) =>
    Int32Array.from(m.index, (cols, i) => {
      let s = 0;
      cols.forEach((j, k) => {
        s = mulAddMod(s, reduction.apply(m.value[i]![k]!), v[j]!, p);
      });
      return s;
    });
  const seen = new Set([start.join(' ')]);
  const list = [start];
  for (let i = 0; i < list.length && list.length <= order; i++)
    for (const g of generators) {
      const w = times(g, list[i]!);
      const key = w.join(' ');
      if (seen.has(key)) continue;
      seen.add(key);
      list.push(w);
    }
  return list.length === order ? { has: (m) => seen.has(times(m, start).join(' ')) } : undefined;
}

/** Longer maps are not written out in the summary. */
const SHOWN_LENGTH = 120;

function words(order: bigint, declaredOrder: number, undeclared: readonly FoundGenerator[], unbounded: boolean): string {
  if (unbounded)
    return `The signed permutations of the coordinates that leave H invariant form a group of order ${shortly(order)}; together with the declared generators they generate an infinite group, or one of more than ${JOIN_LIMIT} elements: H may have a continuous symmetry (--neutral find).`;
  if (undeclared.length === 0)
    return `The declared group of order ${declaredOrder} is all there is among signed permutations of the coordinates.`;
  const shown = undeclared.slice(0, 4).map((g) => {
    if (g.map === '') return `${g.name}, time reversal`;
    const time = g.reversing ? ', reversing time' : '';
    return g.map.length > SHOWN_LENGTH ? `${g.name}, ${g.map.split(', ').length} coordinates moved${time}` : `${g.name}, {${g.map}}${time}`;
  });
  const rest = undeclared.length - shown.length;
  return `H is invariant under a group of order ${shortly(order)}; the declared one has order ${declaredOrder}. Not declared: ${shown.join('; ')}${rest > 0 ? `; and ${rest} more` : ''}.`;
}
