/**
 * The symmetry class 1 … 10 of the linear Hamiltonian problem on the component of a real irreducible K
 * and of K tensor sigma, sigma = -1 on the elements that reverse time. It is computed twice and must
 * agree: from the kernel of sigma (indicator of a complex constituent chi, its twisted indicator over
 * the reversing elements, its conjugate by one of them), and from K itself (type, K tensor sigma, number
 * of skew forms). I. Hoveijn, J. S. W. Lamb, R. M. Roberts, Normal forms and unfoldings of linear systems
 * in eigenspaces of (anti)-automorphisms of order two, J. Differential Equations 190 (2003).
 */
import { type CharacterTable, characterTable, type Indicator, rowFinder } from './characters.ts';
import { conjugateBy } from './generate.ts';
import type { FiniteGroup } from './group.ts';
import { inverseModulo, reduce } from './modular.ts';
import { signOnClasses } from './powers.ts';
import { carriedForms, type RealIrreducible, twists } from './real-irreducibles.ts';
import { subgroup } from './subgroups.ts';

export type SymmetryClass = 1 | 2 | 3 | 4 | 5 | 6 | 7 | 8 | 9 | 10;

/** How the conjugate of chi by a reversing element compares with chi. */
export type ReversedCharacter = 'none' | 'same' | 'conjugate' | 'other';

export interface SignClass {
  readonly symmetryClass: SymmetryClass;
  /** Index of K tensor sigma. */
  readonly twist: number;
  /** s(K): sigma-twisted invariant skew forms on K. */
  readonly carried: number;
  /** A complex constituent chi of K restricted to the kernel of sigma: its number in the kernel's table. */
  readonly constituent: number;
  readonly nu: Indicator;
  /** (1/|kernel|) sum over reversing g of chi(g^2); 0 without reversing elements. */
  readonly eta: Indicator;
  /** 'same' also where chi is real and both comparisons hold; 'none' without reversing elements. */
  readonly reversed: ReversedCharacter;
}

/** The classes of all real irreducibles for a sign given on the elements. Throws Error if the two routes disagree. */
export function signClasses(group: FiniteGroup, table: CharacterTable, reals: readonly RealIrreducible[], sigma: Int8Array): SignClass[] {
  const onClasses = signOnClasses(group, sigma);
  const twist = twists(table, reals, onClasses);
  const kernel = kernelData(group, table, sigma);
  return reals.map((k, i) => {
    const carried = carriedForms(table, k, onClasses);
    const constituent = kernel.constituentOf(k);
    const nu = kernel.table.indicators[constituent]!;
    const eta = kernel.eta(constituent);
    const reversed = kernel.reversed(constituent);
    const symmetryClass = classFromKernel(nu, eta, reversed);
    if (symmetryClass === undefined || symmetryClass !== classFromForms(k.beta, twist[i] === i, carried))
      throw new Error(
        `the symmetry class of irreducible ${i} is contradictory: nu ${nu}, eta ${eta}, reversed ${reversed}, beta ${k.beta}, twist ${twist[i]}, forms ${carried}`,
      );
    return { symmetryClass, twist: twist[i]!, carried, constituent, nu, eta, reversed };
  });
}

/** The class from the kernel of sigma; undefined if the combination cannot occur. */
export function classFromKernel(nu: Indicator, eta: Indicator, reversed: ReversedCharacter): SymmetryClass | undefined {
  if (reversed === 'none' || reversed === 'other') return eta !== 0 ? undefined : nu === 1 ? 1 : nu === 0 ? 2 : 3;
  if (nu === 0 && reversed === 'same') return eta === 0 ? 6 : undefined;
  if (eta === 0) return undefined;
  if (nu === 0) return eta === 1 ? 7 : 8;
  if (nu === 1) return eta === 1 ? 4 : 5;
  return eta === 1 ? 9 : 10;
}

/** The class from the real irreducible; undefined if the combination cannot occur. */
export function classFromForms(beta: 1 | 2 | 4, selfTwisted: boolean, carried: number): SymmetryClass | undefined {
  if (!selfTwisted) return beta === 1 ? 4 : beta === 2 ? 6 : 10;
  const known: Readonly<Record<string, SymmetryClass>> = { '1,0': 1, '1,1': 7, '2,0': 5, '2,1': 2, '2,2': 9, '4,1': 8, '4,3': 3 };
  return known[`${beta},${carried}`];
}

interface KernelData {
  readonly table: CharacterTable;
  constituentOf(k: RealIrreducible): number;
  eta(chi: number): Indicator;
  reversed(chi: number): ReversedCharacter;
}

function kernelData(group: FiniteGroup, table: CharacterTable, sigma: Int8Array): KernelData {
  const reversing = sigma.indexOf(-1);
  if (reversing < 0) return { table, constituentOf: (k) => k.complex[0]!, eta: () => 0, reversed: () => 'none' };
  const elements: number[] = [];
  for (let i = 0; i < group.order; i++) if (sigma[i] === 1) elements.push(i);
  const { group: kernel, inclusion } = subgroup(group, elements);
  const own = characterTable(kernel);
  const position = new Int32Array(group.order).fill(-1);
  inclusion.forEach((g, i) => {
    position[g] = i;
  });
  const classOf = (g: number): number => kernel.classOf[position[g]!]!;
  const representatives = kernel.classes.map((c) => inclusion[c.representative]!);
  const fusion = representatives.map((g) => group.classOf[g]!);
  const back = group.inverse(reversing);
  const moved = representatives.map((g) => classOf(conjugateBy(group, back, g)));
  // How many reversing elements square into each class of the kernel: t h, h in the kernel.
  const squares = new Float64Array(representatives.length);
  for (const h of elements) {
    const g = group.multiply(reversing, h);
    const c = classOf(group.multiply(g, g));
    squares[c] = squares[c]! + 1;
  }
  const p = own.prime;
  const inverseOrder = inverseModulo(own.order % p, p);
  const find = rowFinder(own.residues, p);
  return {
    table: own,
    constituentOf: (k) => {
      // The real values of K decide which kernel irreducibles occur: multiplicities are integers, read to the nearest one.
      const i = own.degrees.findIndex((_, chi) => {
        let sum = 0;
        fusion.forEach((c, t) => {
          sum += own.classSizes[t]! * k.values[c]! * own.real[chi]![t]!;
        });
        return sum > own.order / 2;
      });
      if (i < 0) throw new Error(`irreducible ${k.index} has no constituent over the kernel of the sign`);
      return i;
    },
    eta: (chi) => {
      let sum = 0;
      own.residues[chi]!.forEach((x, c) => {
        sum = reduce(sum + x * squares[c]!, p);
      });
      const eta = reduce(sum * inverseOrder, p);
      if (eta === 0 || eta === 1) return eta;
      if (eta === p - 1) return -1;
      throw new Error(`the twisted indicator of character ${chi} is not 1, 0 or -1`);
    },
    reversed: (chi) => {
      const image = find(Int32Array.from(moved, (c) => own.residues[chi]![c]!));
      return image === chi ? 'same' : image === own.conjugate[chi] ? 'conjugate' : 'other';
    },
  };
}
