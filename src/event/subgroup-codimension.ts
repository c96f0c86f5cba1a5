/**
 * The codimension of one zero event in the class of every subgroup Σ of Γ. The structure of the event is
 * carried by the representations M_j of Γ₀ on the heads of the Jordan blocks of size j; restricted to
 * Σ ∩ Γ₀ they give the partition of every irreducible there, and the formula by class gives the rest.
 */
import {
  type Action,
  conjugationOnClasses,
  type FlowBlock,
  type RestrictedGroup,
  restrictedGroup,
  symmetryClass,
} from '../action/index.ts';
import type { SubgroupClass } from '../group/index.ts';
import { zeroCodimensionOfPartition } from './partition-codimension.ts';

/** Character of M_j on the elements of Γ₀ (by number in Γ), one function for each block size j. */
export interface EventCharacter {
  readonly size: number;
  readonly value: (element: number) => number;
}

export interface SubgroupCodimension {
  readonly order: number;
  readonly reversing: number;
  readonly conjugates: number;
  readonly codimension: number;
  readonly generators: readonly number[];
}

/** What the characters need of a block of the flow. */
export type EventBlock = Pick<FlowBlock, 'irreducible' | 'exchanged' | 'cut'>;

/** The characters of the M_j from the blocks of the flow; counts[b][j] blocks of size j on the multiplicity space of block b. */
export function eventCharacters(
  action: Action,
  part: RestrictedGroup,
  blocks: readonly { readonly block: EventBlock; readonly counts: readonly number[] }[],
): EventCharacter[] {
  const sizes = Math.max(0, ...blocks.map((b) => b.counts.length - 1));
  const t = action.signs.indexOf(-1);
  const map = t < 0 ? [] : conjugationOnClasses(action.group, part, t);
  const out: EventCharacter[] = [];
  for (let j = 1; j <= sizes; j++) {
    const values = new Float64Array(part.group.classes.length);
    for (const { block, counts } of blocks) {
      const copies = (counts[j] ?? 0) / block.cut;
      if (copies === 0) continue;
      for (let c = 0; c < values.length; c++) {
        values[c] = values[c]! + copies * block.irreducible.values[c]!;
        if (block.exchanged) values[c] = values[c]! + copies * block.irreducible.values[map[c]!]!;
      }
    }
    if (values[0] === 0) continue;
    out.push({ size: j, value: (element) => values[part.group.classOf[part.position(element)]!]! });
  }
  return out;
}

/** Codimension in the class of one subgroup, given by its elements. */
export function codimensionUnder(action: Action, elements: ArrayLike<number>, characters: readonly EventCharacter[]): number {
  const own: number[] = [];
  const reversing: number[] = [];
  for (let i = 0; i < elements.length; i++) (action.signs[elements[i]!] === 1 ? own : reversing).push(elements[i]!);
  const part = restrictedGroup(action, own);
  const { table, group } = part;
  const onClasses = characters.map((m) => group.classes.map((c) => m.value(part.inclusion[c.representative]!)));
  const map = reversing.length === 0 ? [] : conjugationOnClasses(action.group, part, reversing[0]!);
  const done = new Set<number>();
  let total = 0;
  part.irreducibles.forEach((k, index) => {
    if (done.has(index)) return;
    done.add(index);
    const i = k.complex[0]!;
    const chi = table.values[i]!.map((_, c) => ({ re: table.real[i]![c]!, im: table.imaginary[i]![c]! }));
    let mine = reversing;
    if (reversing.length > 0) {
      // K ↦ Kᵗ; the real characters decide
      const partner = part.irreducibles.findIndex(
        (x) => x.dimension === k.dimension && x.beta === k.beta && x.residues.every((v, c) => v === k.residues[map[c]!]),
      );
      if (partner !== index) {
        done.add(partner);
        mine = [];
      }
    }
    const partition: number[] = [];
    onClasses.forEach((values, at) => {
      let s = 0;
      for (let c = 0; c < values.length; c++) s += group.classes[c]!.size * values[c]! * chi[c]!.re;
      const count = Math.round(s / group.order);
      for (let r = 0; r < count; r++) partition.push(characters[at]!.size);
    });
    if (partition.length === 0) return;
    partition.sort((x, y) => y - x);
    total += zeroCodimensionOfPartition(symmetryClass(action.group, part, { beta: k.beta, complexValues: chi }, mine), partition);
  });
  return total;
}

/** One entry per conjugacy class of subgroups. */
export function subgroupCodimensions(
  action: Action,
  classes: readonly SubgroupClass[],
  characters: readonly EventCharacter[],
): SubgroupCodimension[] {
  return classes.map((h) => {
    let reversing = 0;
    for (const e of h.elements) if (action.signs[e] === -1) reversing++;
    return {
      order: h.order,
      reversing,
      conjugates: h.conjugates,
      codimension: codimensionUnder(action, h.elements, characters),
      generators: h.generators,
    };
  });
}
