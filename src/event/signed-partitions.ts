/**
 * Signed types of zero events: the nilpotent orbits of the ten classes. On the heads of the blocks of size j lives a form that is
 * symmetric for even j: for each irreducible K a signature, any number of blocks. For odd j: classes 1, 5 an even number without sign;
 * 2, 7, 8 a signature; 3, 9 any number without sign; 4, 6, 10 (K⊗σ ≇ K) K and K⊗σ equally often, no sign.
 * Without reversing elements: Collingwood & McGovern 1993, theorems 9.3.3 to 9.3.5.
 */
import { InputError } from '../errors/index.ts';
import { type ClassNumber, partitions } from './partition-codimension.ts';

/** Blocks of one size in `count` copies of K (and K⊗σ); which of them are signed depends on class and parity. */
export interface SignedPart {
  readonly size: number;
  readonly count: number;
  /** (positive, negative) of the copies of K; null where there is no sign. */
  readonly signs: readonly [number, number] | null;
  /** The same for the copies of K⊗σ whose kernel they are, in classes 4, 6, 10; else null. */
  readonly partnerSigns: readonly [number, number] | null;
}

export interface SignedType {
  /** By descending size. */
  readonly parts: readonly SignedPart[];
  /** Signature (a, b) of ω on the multiplicity space in classes 2, 7, 8; else null. */
  readonly signature: readonly [number, number] | null;
}

export type Multiplicity = number | { readonly a: number; readonly b: number };

function splits(n: number, pieces: number): number[][] {
  if (pieces === 1) return [[n]];
  return Array.from({ length: n + 1 }, (_, k) => splits(n - k, pieces - 1).map((rest) => [k, ...rest])).flat();
}

/**
 * Signature (a, b) of ω(I·,·) taken up by the blocks: halves for even sizes; a block of odd size j and sign ε has one more of the sign
 * (-1)^((j-1)/2) ε, that of the middle of its chain (signs as in ./chain.ts).
 */
export function signatureOfParts(parts: readonly SignedPart[]): [number, number] {
  let a = 0;
  let b = 0;
  for (const { size, count, signs } of parts) {
    const half = Math.floor(size / 2);
    a += half * count;
    b += half * count;
    if (size % 2 === 0 || signs === null) continue;
    const turned = half % 2 === 1;
    a += turned ? signs[1] : signs[0];
    b += turned ? signs[0] : signs[1];
  }
  return [a, b];
}

function choices(classNumber: ClassNumber, size: number, count: number): SignedPart[] {
  const paired = classNumber === 4 || classNumber === 6 || classNumber === 10;
  const plain: SignedPart = { size, count, signs: null, partnerSigns: null };
  if (size % 2 === 0)
    return paired
      ? splits(count, 4).map(([p, q, r, s]) => ({ size, count, signs: [p!, q!], partnerSigns: [r!, s!] }))
      : splits(count, 2).map(([p, q]) => ({ size, count, signs: [p!, q!], partnerSigns: null }));
  if (classNumber === 2 || classNumber === 7 || classNumber === 8)
    return splits(count, 2).map(([p, q]) => ({ size, count, signs: [p!, q!], partnerSigns: null }));
  if (classNumber === 3 || classNumber === 9) return [plain];
  return count % 2 === 0 ? [plain] : [];
}

/**
 * All signed types whose generalised kernel fills the given multiplicity, 0 included: the number of copies of K in it (classes 1, 3, 5, 9;
 * 4, 6, 10: of K and of K⊗σ each), or the signature {a, b} of ω on the multiplicity space (classes 2, 7, 8). Partitions in reverse
 * lexicographic order. Throws InputError where the multiplicity is of the wrong kind.
 */
export function signedPartitions(classNumber: ClassNumber, multiplicity: Multiplicity): SignedType[] {
  const hermitian = classNumber === 2 || classNumber === 7 || classNumber === 8;
  if (hermitian !== (typeof multiplicity === 'object'))
    throw new InputError(`class ${classNumber} takes ${hermitian ? 'a signature' : 'a number'} as multiplicity`, {
      expected: hermitian ? '{a, b}' : 'a non-negative integer',
    });
  const numbers = typeof multiplicity === 'object' ? [multiplicity.a, multiplicity.b] : [multiplicity];
  if (numbers.some((n) => !Number.isSafeInteger(n) || n < 0))
    throw new InputError('multiplicities are non-negative integers', { value: numbers.join(', ') });
  const paired = classNumber === 4 || classNumber === 6 || classNumber === 10;
  const total = numbers.reduce((x, y) => x + y, 0) * (paired ? 2 : 1);
  const out: SignedType[] = [];
  for (const parts of partitions(total)) {
    const sizes = [...new Set(parts)];
    let types: SignedPart[][] = [[]];
    for (const size of sizes) {
      const options = choices(classNumber, size, parts.filter((p) => p === size).length);
      types = types.flatMap((t) => options.map((o) => [...t, o]));
    }
    for (const t of types) {
      if (typeof multiplicity === 'number') {
        out.push({ parts: t, signature: null });
        continue;
      }
      const [a, b] = signatureOfParts(t);
      if (a === multiplicity.a && b === multiplicity.b) out.push({ parts: t, signature: [a, b] });
    }
  }
  return out;
}
