/**
 * Colour refinement on the literals of a structure (individualisation and refinement, common practice in
 * graph isomorphism). Cells are split by a hash of the terms that meet newly split cells; a sum over
 * the signs of the other variables factors, so a term costs one product whatever its degree. Equal structures
 * give equal numbers; a collision of hashes only splits less, since every symmetry is verified.
 */
import type { StructureIndex } from './find-symmetry-structure.ts';

const P = 67_108_859; // the largest prime below 2^26: products are exact in doubles

/** A fixed pseudo-random residue. */
function residue(a: number, b: number): number {
  let h = Math.imul(a ^ 0x9e3779b9, 0x85ebca6b) ^ Math.imul(b + 0x7f4a7c15, 0xc2b2ae35);
  h = Math.imul(h ^ (h >>> 15), 0x2c1b3c6d);
  h = Math.imul(h ^ (h >>> 12), 0x297a2d39);
  return ((h ^ (h >>> 15)) >>> 0) % P;
}

/** Colours of the literals with the members of each cell, and a fingerprint of how they came about. */
export interface Colouring {
  readonly colour: Int32Array;
  readonly cells: readonly (readonly number[])[];
  readonly trace: number;
}

const mix = (trace: number, x: number): number => (trace * 48271 + x + 1) % P;

export function initialColouring(index: StructureIndex): Colouring {
  const cells: number[][] = [];
  index.colours.forEach((c, l) => {
    cells[c] ??= [];
    cells[c].push(l);
  });
  const start: Colouring = { colour: index.colours, cells, trace: 1 };
  return refine(
    index,
    start,
    Array.from({ length: index.literals }, (_, l) => l),
  );
}

/** One literal set apart from its cell, and its negative with it where they shared the cell. */
export function individualise(index: StructureIndex, c: Colouring, literal: number): Colouring {
  const colour = Int32Array.from(c.colour);
  const cells = c.cells.slice();
  const old = colour[literal]!;
  cells[old] = cells[old]!.filter((l) => l !== literal);
  colour[literal] = cells.length;
  cells.push([literal]);
  return refine(index, { colour, cells, trace: mix(c.trace, old) }, [literal]);
}

/** Splits until nothing changes; `fresh` are the literals whose cell is new. */
function refine(index: StructureIndex, start: Colouring, fresh: readonly number[]): Colouring {
  const colour = start.colour === index.colours ? Int32Array.from(start.colour) : (start.colour as Int32Array);
  const cells = start.cells.slice();
  let trace = start.trace;
  let dirty = new Set(fresh.map((l) => l >> 1));
  const { tau, joined, structure } = index;
  const sums = new Float64Array(index.literals);
  while (dirty.size > 0) {
    const touched = new Set<number>();
    const bump = (literal: number, x: number) => {
      sums[literal] = (sums[literal]! + x) % P;
      touched.add(literal);
    };
    const seen = new Set<number>();
    // a literal and its negative see each other
    for (const v of dirty) {
      bump(2 * v, residue(colour[2 * v + 1]!, 7));
      bump(2 * v + 1, residue(colour[2 * v]!, 7));
      for (const k of index.incidence[v]!) seen.add(k);
    }
    for (const k of seen) {
      if (k < 0) {
        const { i, j, weight } = structure.form[-1 - k]!;
        const even = residue(weight.size, 101);
        const odd = (residue(weight.size, 103) * (weight.sign === 1 ? 1 : P - 1)) % P;
        const t = pair(colour, tau, 1);
        seeing(bump, colour, i, j, even, odd, t);
        seeing(bump, colour, j, i, even, (P - odd) % P, t);
        continue;
      }
      const term = joined[k]!;
      const even = residue(term.weight.size, 11);
      const odd = (residue(term.weight.size, 13) * (term.weight.sign === 1 ? 1 : P - 1)) % P;
      const parts = term.variables.map((v, q) => pair(colour, v, term.exponents[q]!));
      term.variables.forEach((v, q) => {
        let a = even;
        let b = odd;
        parts.forEach((x, r) => {
          if (r === q) return;
          a = (a * x.sum) % P;
          b = (b * (term.exponents[r]! % 2 === 1 ? x.difference : x.sum)) % P;
        });
        const e = residue(term.exponents[q]!, 17);
        const own = term.exponents[q]! % 2 === 1 ? P - b : b;
        bump(2 * v, (((a + b) % P) * e) % P);
        bump(2 * v + 1, (((a + own) % P) * e) % P);
      });
    }
    // split every touched cell by the sums
    const byCell = new Map<number, Map<number, number[]>>();
    for (const l of touched) {
      const c = colour[l]!;
      if (cells[c]!.length === 1) {
        trace = mixUnordered(trace, c, sums[l]!);
        continue;
      }
      let parts = byCell.get(c);
      if (parts === undefined) {
        parts = new Map();
        byCell.set(c, parts);
      }
      const s = sums[l]!;
      const list = parts.get(s);
      if (list === undefined) parts.set(s, [l]);
      else list.push(l);
    }
    const next = new Set<number>();
    for (const c of [...byCell.keys()].sort((x, y) => x - y)) {
      const parts = byCell.get(c)!;
      const members = cells[c]!;
      let count = 0;
      for (const p of parts.values()) count += p.length;
      if (count < members.length) {
        const rest = members.filter((l) => !touched.has(l));
        const zero = parts.get(0);
        parts.set(0, zero === undefined ? rest : [...zero, ...rest]);
      }
      const keys = [...parts.keys()].sort((x, y) => x - y);
      for (const k of keys) trace = mix(mix(mix(trace, c), k), parts.get(k)!.length);
      if (keys.length === 1) continue;
      let largest = keys[0]!;
      for (const k of keys) if (parts.get(k)!.length > parts.get(largest)!.length) largest = k;
      cells[c] = parts.get(largest)!;
      for (const k of keys) {
        if (k === largest) continue;
        const list = parts.get(k)!;
        for (const l of list) {
          colour[l] = cells.length;
          next.add(l >> 1);
        }
        cells.push(list);
      }
    }
    for (const l of touched) sums[l] = 0;
    dirty = next;
  }
  return { colour, cells, trace };
}

/** Sum and difference of the residues of the two literals of a variable. */
function pair(colour: Int32Array, v: number, exponent: number): { sum: number; difference: number } {
  const a = residue(colour[2 * v]!, 1000 + exponent);
  const b = residue(colour[2 * v + 1]!, 1000 + exponent);
  return { sum: (a + b) % P, difference: (a - b + P) % P };
}

function seeing(
  bump: (literal: number, x: number) => void,
  colour: Int32Array,
  i: number,
  j: number,
  even: number,
  odd: number,
  tau: { readonly sum: number; readonly difference: number },
): void {
  const x = pair(colour, j, 1);
  const a = (((even * x.sum) % P) * tau.sum) % P;
  const b = (((odd * x.difference) % P) * tau.difference) % P;
  bump(2 * i, (a + b) % P);
  bump(2 * i + 1, (a + P - b) % P);
}

/** For singletons, met in no particular order: the fingerprint must not depend on it. */
function mixUnordered(trace: number, c: number, s: number): number {
  return (trace + residue(c, s & 0x3ffffff)) % P;
}
