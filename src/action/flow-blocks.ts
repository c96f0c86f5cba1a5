/**
 * The blocks of the linearised flow. L commutes with Γ₀ = ker σ, so V splits into the components of the
 * real irreducibles of Γ₀; an element that reverses time maps the component of χ to that of χᵗ. One flow
 * block is such an orbit: one component, or two that a reversing element exchanges (then one of them says
 * it all). On each block the pair (symplectic maps commuting with Γ₀, with Γ) is one of the ten classes.
 */
import type { Algebraic } from '../field/index.ts';
import type { SymmetryClass } from '../group/index.ts';
import { type Matrix, modularRank, scale, sparseTimes } from '../linear/index.ts';
import type { Action } from './action.ts';
import { type Irreducible, irreduciblesOf, type RestrictedGroup, restrictedGroup } from './irreducibles.ts';
import { coordinateMap, cutterMatrix, multiplicityBasis } from './multiplicity-space.ts';
import { type Represented, representedBy } from './seed-orbits.ts';
import { type Cutter, findCutters } from './subspace-search.ts';
import { conjugationOnClasses, symmetryClass } from './symmetry-class.ts';

/** h(g) and h(g⁻¹) on a multiplicity space, with σ(g). */
export interface CompressedElement {
  readonly matrix: Matrix<Algebraic>;
  readonly inverse: Matrix<Algebraic>;
  readonly sign: 1 | -1;
}

export interface FlowBlock {
  /** The irreducible of Γ₀ whose component is used. */
  readonly irreducible: Irreducible;
  /** True if a reversing element exchanges this component with that of another irreducible. */
  readonly exchanged: boolean;
  /** Number of the other irreducible of Γ₀ if exchanged, else that of `irreducible`. */
  readonly partner: number;
  /** dim eK. */
  readonly cut: number;
  /** How many spaces like the multiplicity space make up the block: dim K / dim eK, twice that if exchanged. */
  readonly copies: number;
  /** Basis of the multiplicity space, n × u. */
  readonly basis: Matrix<Algebraic>;
  /** Spanning set of the compressed group algebra: without the scalars where they are all of it. */
  readonly operators: readonly CompressedElement[];
  /** Number of the symmetry class, 1 to 10. */
  readonly symmetryClass: SymmetryClass;
}

/** Γ₀ with its irreducibles present in V, as seen by an action. */
export interface SymplecticPart {
  readonly part: RestrictedGroup;
  readonly irreducibles: readonly Irreducible[];
}

/** The irreducibles of Γ₀ in V. The field of the action must contain their characters (see irreducibles.ts). */
export function symplecticPart(action: Action): SymplecticPart {
  const elements: number[] = [];
  for (let i = 0; i < action.group.order; i++) if (action.signs[i] === 1) elements.push(i);
  const part = restrictedGroup(action, elements);
  return { part, irreducibles: irreduciblesOf(action, part) };
}

/** All flow blocks of an action, in the order of the irreducibles of Γ₀. */
export function flowBlocks(action: Action, symplectic: SymplecticPart = symplecticPart(action)): FlowBlock[] {
  const { part, irreducibles } = symplectic;
  const rep = representedBy(action, part);
  const reversing = action.signs.indexOf(-1);
  const reversingElements = Array.from(action.signs, (x, i) => (x === -1 ? i : -1)).filter((i) => i >= 0);
  const partners = irreducibles.map((k) => (reversing < 0 ? k.index : twisted(action, part, irreducibles, k, reversing)));
  const cutters = findCutters(
    part.group,
    irreducibles.map((k) => ({ values: k.values, beta: k.beta, multiplicity: k.multiplicity })),
  );
  const blocks: FlowBlock[] = [];
  irreducibles.forEach((k, i) => {
    const partner = partners[i]!;
    if (partner !== k.index && irreducibles.findIndex((x) => x.index === partner) < i) return;
    const cutter = cutters[i]!;
    const basis = multiplicityBasis(rep, irreducibles, i, cutter);
    const exchanged = partner !== k.index;
    const cut = cutter.dimensions[i]!;
    blocks.push({
      irreducible: k,
      exchanged,
      partner,
      cut,
      copies: (k.dimension / cut) * (exchanged ? 2 : 1),
      basis,
      operators: compressedOperators(action, rep, basis, cutter, cut, k.beta, reversing >= 0 && !exchanged),
      symmetryClass: exchanged ? symmetryClass(action.group, part, k, []) : symmetryClass(action.group, part, k, reversingElements),
    });
  });
  return blocks;
}

/** Index of the irreducible g ↦ K(t⁻¹ g t) of Γ₀ among those present. */
function twisted(action: Action, part: RestrictedGroup, irreducibles: readonly Irreducible[], k: Irreducible, t: number): number {
  const map = conjugationOnClasses(action.group, part, t);
  const f = action.field;
  const found = irreducibles.find((x) => x.dimension === k.dimension && x.character.every((v, c) => f.equal(v, k.character[map[c]!]!)));
  if (found === undefined) throw new Error('a reversing element maps an irreducible of the phase space to one that is not there');
  return found.index;
}

/** Elements g whose compressions span: dim (eK)²/β for Γ₀, the same again for the reversing elements. */
function compressedOperators(
  action: Action,
  rep: Represented,
  basis: Matrix<Algebraic>,
  cutter: Cutter,
  cut: number,
  beta: number,
  withReversing: boolean,
): CompressedElement[] {
  const f = action.field;
  const out: CompressedElement[] = [];
  const target = (cut * cut) / beta;
  if (target === 1 && !withReversing) return out;
  const e = cutterMatrix(rep, cutter);
  const norm = f.fromRational(1n, BigInt(cutter.elements.length));
  const coordinates = coordinateMap(basis, f);
  const compress = (g: number) => scale(coordinates(sparseTimes(e, sparseTimes(action.matrix(g), basis))), norm);
  const reduction = f.reduction();
  const collect = (sign: 1 | -1, candidates: Iterable<number>, want: number) => {
    const rows: Int32Array[] = [];
    const width = basis.cols * basis.cols;
    if (sign === 1) {
      const one = new Int32Array(width);
      for (let i = 0; i < basis.cols; i++) one[i * basis.cols + i] = 1;
      rows.push(one);
    }
    for (const g of candidates) {
      if (rows.length >= want) return;
      const m = compress(g);
      const v = Int32Array.from(m.data, (x) => reduction.apply(x));
      const data = new Int32Array((rows.length + 1) * width);
      rows.forEach((r, i) => {
        data.set(r, i * width);
      });
      data.set(v, rows.length * width);
      if (modularRank({ p: reduction.p, rows: rows.length + 1, cols: width, data }) <= rows.length) continue;
      rows.push(v);
      out.push({ matrix: m, inverse: compress(action.group.inverse(g)), sign });
    }
    if (rows.length < want) throw new Error(`the compressed group algebra has dimension ${rows.length}, expected ${want}`);
  };
  const ofSign = function* (sign: number): Iterable<number> {
    for (let g = 1; g < action.group.order; g++) if (action.signs[g] === sign) yield g;
  };
  collect(1, target > 1 ? ofSign(1) : [], target);
  if (withReversing) collect(-1, ofSign(-1), target);
  return out;
}
