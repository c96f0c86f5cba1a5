/** One group of the catalogue worked out: order, conjugacy classes, exact characters. */
import { groupOfMatrices } from '../action/orbit.ts';
import { InputError } from '../errors/index.ts';
import { type Algebraic, CyclotomicField, lcmInt, RealField } from '../field/index.ts';
import type { CatalogueAction, CatalogueGroup } from '../group/catalogue.ts';
import { type CharacterTable, characterTable, closeGroup, type FiniteGroup, ORDER_LIMIT } from '../group/index.ts';
import { fromRows, type SparseMatrix, sparse } from '../linear/index.ts';
import { exactValue, parseExpression, withField } from '../model/expression/index.ts';

export interface ClassRow {
  readonly size: number;
  readonly order: number;
  /** A product of generators, read as maps from right to left; `1` is the identity. */
  readonly representative: string;
}

export interface CharacterRow {
  readonly degree: number;
  /** Frobenius–Schur: 1 real, 0 complex, −1 quaternionic. */
  readonly indicator: 1 | 0 | -1;
  readonly values: readonly string[];
}

export interface GroupSummary {
  readonly order: number;
  readonly exponent: number;
  readonly classes: readonly ClassRow[];
  readonly characters: readonly CharacterRow[];
}

/**
 * The abstract group, from an action that is faithful (or from all actions together where none is known to be).
 * Throws NotAGroupError past the order limit, LimitError where the table would be too large,
 * InputError where the declaration claims another order.
 */
export function summariseGroup(declared: CatalogueGroup, orderLimit = ORDER_LIMIT): GroupSummary {
  const group = closed(declared, orderLimit);
  if (declared.expectedOrder !== undefined && declared.expectedOrder !== group.order) {
    throw new InputError(
      `the matrices of ${declared.name} generate ${group.order} elements, its declaration says ${declared.expectedOrder}`,
      {
        key: 'order',
        value: String(declared.expectedOrder),
        expected: String(group.order),
        next: 'correct the order in the group file, or give it an action that is faithful',
      },
    );
  }
  const table = characterTable(group);
  return {
    order: group.order,
    exponent: group.exponent,
    classes: group.classes.map(({ size, order, representative }) => ({
      size,
      order,
      representative: wordOf(group, representative, declared.generators),
    })),
    characters: table.values.map((row, i) => ({
      degree: table.degrees[i]!,
      indicator: table.indicators[i]!,
      values: row.map((value) => characterText(table, value)),
    })),
  };
}

function closed(declared: CatalogueGroup, limit: number): FiniteGroup {
  const actions = [...declared.actions.values()];
  const faithful = actions
    .filter(({ kernel }) => kernel === 1)
    .sort((a, b) => Number(a.permutations === undefined) - Number(b.permutations === undefined));
  const action =
    faithful[0] ?? (declared.actions.has('sum') ? declared.action('sum') : declared.action([...declared.actions.keys()].join('+')));
  const permutations = declared.generators.map((name) => action.permutations?.get(name));
  if (permutations.every((images) => images !== undefined)) {
    return closeGroup(
      permutations.map((images) => Int32Array.from(images)),
      action.dimension,
      limit,
    );
  }
  const { field, result } = withField((larger) => exactMatrices(action, declared.generators, larger));
  return groupOfMatrices(field, action.dimension, result, limit);
}

function exactMatrices(action: CatalogueAction, generators: readonly string[], field: RealField): SparseMatrix<Algebraic>[] {
  return generators.map((name) => {
    const rows = action.matrices.get(name)!.map((row) => row.map((text) => exactValue(parseExpression(text), undefined, field)));
    return sparse(fromRows(field, rows));
  });
}

/** An element as a product of generators, powers put together. */
export function wordOf(group: FiniteGroup, element: number, names: readonly string[]): string {
  const letters: string[] = [];
  for (let i = element; i > 0; i = group.parent[i]!) letters.push(names[group.via[i]!]!);
  const parts: string[] = [];
  for (let i = 0; i < letters.length; ) {
    let end = i + 1;
    while (end < letters.length && letters[end] === letters[i]) end++;
    parts.push(end - i === 1 ? letters[i]! : `${letters[i]}^${end - i}`);
    i = end;
  }
  return parts.length === 0 ? '1' : parts.join('*');
}

/** A value in Q(ζ_e) as real part and imaginary part, each in the language of the models. */
export function characterText(table: Pick<CharacterTable, 'field'>, value: Algebraic): string {
  const { field } = table;
  if (field.isZero(value)) return '0';
  const e = field.conductor;
  const large = CyclotomicField.of(lcmInt(4, e));
  const step = large.conductor / e;
  const z = large.mul(large.fromPowers(spread(value.c, step)), large.fromRational(1n, value.d));
  const half = large.fromRational(1n, 2n);
  const real = large.mul(half, large.add(z, large.conj(z)));
  const imaginary = large.mul(large.mul(half, large.sub(z, large.conj(z))), large.root(-large.conductor / 4));
  const [re, im] = [real, imaginary].map((part) => {
    const home = RealField.of({ cosines: [large.conductor] });
    const found = home.fromCyclotomic(large, part);
    if (found === undefined) throw new Error(`a character value of ${large.name} has no real part in ${home.name}`);
    return home.format(found);
  });
  if (im === '0') return re!;
  const times = im === '1' ? 'i' : im === '-1' ? '-i' : /^-?[^-+]*$/.test(im!) ? `${im}*i` : `(${im})*i`;
  return re === '0' ? times : times.startsWith('-') ? `${re} - ${times.slice(1)}` : `${re} + ${times}`;
}

/** Coefficients of powers of ζ_e as coefficients of powers of ζ_{e·step}. */
function spread(c: readonly bigint[], step: number): bigint[] {
  const out = new Array<bigint>(c.length * step).fill(0n);
  c.forEach((x, k) => {
    out[k * step] = x;
  });
  return out;
}
