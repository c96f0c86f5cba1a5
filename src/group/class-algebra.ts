/**
 * Irreducible characters modulo a prime p = 1 mod exponent, as common eigenvectors of the class
 * matrices: J. D. Dixon, High speed computation of group characters, Numer. Math. 10 (1967). Only the
 * columns of a class matrix at the pivots of a space are computed, as in G. J. A. Schneider, Dixon's
 * character table algorithm revisited, J. Symbolic Comput. 9 (1990). The characters of degree 1 are
 * known beforehand, so the search starts in their orthogonal complement.
 */
import { type EchelonRows, eigenspaces } from './eigenspaces.ts';
import type { FiniteGroup } from './group.ts';
import { inverseModulo, reduce, rowTimes } from './modular.ts';
import { classMembers } from './powers.ts';

/** Entries of a sparse column: class s occurs count times. */
interface SparseColumn {
  readonly classes: Int32Array;
  readonly counts: Int32Array;
}

/**
 * For every irreducible of degree > 1 its degree and its values modulo p on the classes.
 * `cosetOfClass`: the coset of the commutator subgroup that each class lies in.
 */
export function nonlinearCharacters(group: FiniteGroup, cosetOfClass: Int32Array, p: number): { degree: number; values: Float64Array }[] {
  const n = group.classes.length;
  let open = [complementOfLinear(group, cosetOfClass, p)].filter((s) => s.rows.length > 0);
  const lines: Float64Array[] = [];
  const sortOut = (spaces: EchelonRows[]): EchelonRows[] => {
    for (const s of spaces) if (s.rows.length === 1) lines.push(s.rows[0]!);
    return spaces.filter((s) => s.rows.length > 1);
  };
  open = sortOut(open);
  if (open.length > 0) {
    const members = classMembers(group);
    const bySize = group.classes.map((_, r) => r).filter((r) => r > 0 && group.classes[r]!.inverse >= r);
    bySize.sort((a, b) => group.classes[a]!.size - group.classes[b]!.size || a - b);
    for (const r of bySize) {
      if (open.length === 0) break;
      const columns = new Map<number, SparseColumn>();
      const column = (t: number): SparseColumn => {
        let c = columns.get(t);
        if (c === undefined) columns.set(t, (c = classColumn(group, members[r]!, t)));
        return c;
      };
      open = sortOut(open.flatMap((space) => split(space, column, n, p)));
    }
  }
  if (open.length > 0) throw new Error(`the class matrices do not separate the characters modulo ${p}`);
  return lines.map((u) => normalised(group, u, p));
}

/**
 * The rows orthogonal to all characters of degree 1: those whose sum over every coset of G',
 * weighted by class sizes, vanishes.
 */
function complementOfLinear(group: FiniteGroup, cosetOfClass: Int32Array, p: number): EchelonRows {
  const n = group.classes.length;
  const first = new Map<number, number>();
  const rows: Float64Array[] = [];
  const pivots: number[] = [];
  cosetOfClass.forEach((coset, t) => {
    const head = first.get(coset);
    if (head === undefined) {
      first.set(coset, t);
      return;
    }
    const row = new Float64Array(n);
    row[t] = 1;
    row[head] = reduce((p - (group.classes[t]!.size % p)) * inverseModulo(group.classes[head]!.size % p, p), p);
    rows.push(row);
    pivots.push(t);
  });
  return { rows, pivots };
}

/** Column t of a class matrix: in which classes y g_t lies, y running over a class. */
function classColumn(group: FiniteGroup, members: Int32Array, t: number): SparseColumn {
  const g = group.classes[t]!.representative;
  const { classOf } = group;
  const count = new Map<number, number>();
  for (let i = 0; i < members.length; i++) {
    const s = classOf[group.multiply(members[i]!, g)]!;
    count.set(s, (count.get(s) ?? 0) + 1);
  }
  return { classes: Int32Array.from(count.keys()), counts: Int32Array.from(count.values()) };
}

/** The eigenspaces of a class matrix in an invariant space of rows. */
function split(space: EchelonRows, column: (t: number) => SparseColumn, n: number, p: number): EchelonRows[] {
  const k = space.rows.length;
  const columns = space.pivots.map(column);
  let scalar = true;
  const restricted = space.rows.map((row, i) => {
    const out = new Float64Array(k);
    for (let j = 0; j < k; j++) {
      const { classes, counts } = columns[j]!;
      let sum = 0;
      for (let q = 0; q < classes.length; q++) sum += row[classes[q]!]! * counts[q]!;
      out[j] = reduce(sum, p);
      if (i !== j && out[j] !== 0) scalar = false;
    }
    return out;
  });
  if (scalar && restricted.every((row, i) => row[i] === restricted[0]![0])) return [space];
  return eigenspaces(restricted, p).map((part) => ({
    // Coordinates are the entries at the pivots, so the rows stay in reduced echelon form.
    rows: part.rows.map((x) => rowTimes(x, space.rows, n, p)),
    pivots: part.pivots.map((j) => space.pivots[j]!),
  }));
}

/** A row proportional to the conjugate of a character, scaled to that character. */
function normalised(group: FiniteGroup, u: Float64Array, p: number): { degree: number; values: Float64Array } {
  if (u[0] === 0) throw new Error('an eigenvector of the class matrices vanishes at the identity');
  const scale = inverseModulo(u[0]!, p);
  // sum |C| u u' = |G|/degree^2 for u = chi/degree; p > 2 sqrt|G| leaves one degree
  let norm = 0;
  const ratio = u.map((x) => reduce(x * scale, p));
  group.classes.forEach((c, t) => {
    norm = reduce(norm + reduce(ratio[t]! * ratio[c.inverse]!, p) * (c.size % p), p);
  });
  for (let d = 1; d * d <= group.order; d++) {
    if (group.order % d !== 0 || reduce(reduce(d * d, p) * norm, p) !== group.order % p) continue;
    return { degree: d, values: Float64Array.from(group.classes, (c) => reduce(ratio[c.inverse]! * d, p)) };
  }
  throw new Error('an eigenvector of the class matrices has no admissible degree');
}
