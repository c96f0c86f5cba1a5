/**
 * Every zero event that an action allows up to a given codimension: on each flow block a signed type that fits into it, jointly on
 * several blocks with the codimensions added. Codimensions are those of ./partition-codimension.ts, signed types those of
 * ./signed-partitions.ts; the least codimension of n copies of an irreducible bounds the search (regular nilpotent elements).
 */
import { LimitError } from '../errors/index.ts';
import { type ClassNumber, codimensionByClass } from './partition-codimension.ts';
import { type Multiplicity, type SignedType, signedPartitions } from './signed-partitions.ts';

/** Longer lists are refused. */
export const EVENT_LIMIT = 20_000;
/** Partitions of larger numbers are not gone through: 24 has 1575, and each has many signs. */
export const PARTITION_LIMIT = 24;

/** What a flow block offers: its class, how often K occurs, and the signature of ω in copies of K. */
export interface BlockCapacity {
  readonly classNumber: ClassNumber;
  /** Copies of K in the phase space (in classes 4, 6, 10 of K and of K⊗σ each). */
  readonly copies: number;
  /** (a, b) with a + b = copies in classes 2, 7, 8; else null. */
  readonly signature: readonly [number, number] | null;
  /** dim K over R. */
  readonly dimension: number;
  /** Labels of K and, where it is another irreducible, of K⊗σ. */
  readonly labels: readonly string[];
}

export interface Inertia {
  readonly positive: number;
  readonly zero: number;
  readonly negative: number;
}

/** One signed type on one block. */
export interface BlockEvent {
  readonly block: number;
  readonly type: SignedType;
  readonly codimension: number;
}

export interface ListedEvent {
  readonly codimension: number;
  /** Irreducibles in the kernel of S. */
  readonly components: readonly string[];
  readonly kernel: number;
  readonly dimension: number;
  /** Real Jordan blocks, descending. */
  readonly blocks: readonly number[];
  readonly signs: string;
  readonly semisimple: boolean;
  /** Inertia of S on the generalised kernel. */
  readonly inertia: Inertia;
  readonly parts: readonly BlockEvent[];
}

/** A block of size j and sign ε (0: none) gives S this inertia: pairs of both signs, and for even j one more of the sign of the middle. */
export function inertiaOfBlock(size: number, sign: 1 | -1 | 0): Inertia {
  const half = Math.floor((size - 1) / 2);
  if (size % 2 === 1) return { positive: half, zero: 1, negative: half };
  const positive = (size / 2) % 2 === 1 ? sign > 0 : sign < 0;
  return { positive: half + (positive ? 1 : 0), zero: 1, negative: half + (positive ? 0 : 1) };
}

function tooMany(limit: number): LimitError {
  return new LimitError(`there are too many zero events up to codimension ${limit} to list them`, {
    key: 'codimension',
    value: String(limit),
    expected: `at most ${EVENT_LIMIT} events`,
    next: 'ask for a smaller one with --codimension',
  });
}

/** Nonzero signed types on one block up to a codimension, by codimension, then by size. */
export function blockEvents(block: BlockCapacity, limit: number): { readonly type: SignedType; readonly codimension: number }[] {
  const { classNumber: c, copies, signature } = block;
  // n copies cost at least n/2 in classes 1 and 5, n elsewhere
  const most = Math.min(copies, c === 1 || c === 5 ? 2 * limit : limit);
  if (most * (c === 4 || c === 6 || c === 10 ? 2 : 1) > PARTITION_LIMIT) throw tooMany(limit);
  const out: { type: SignedType; codimension: number }[] = [];
  const add = (m: Multiplicity) => {
    for (const type of signedPartitions(c, m)) {
      const codimension = codimensionByClass(c, type.parts);
      if (codimension <= limit) out.push({ type, codimension });
    }
  };
  for (let n = 1; n <= most; n++) {
    if (signature === null) add(n);
    else for (let a = Math.min(n, signature[0]); a >= 0; a--) if (n - a <= signature[1]) add({ a, b: n - a });
  }
  return out.sort((x, y) => x.codimension - y.codimension || plusFirst(x.type, y.type));
}

/** Types with the same blocks: positive ones first, those of K before those of K⊗σ. */
function plusFirst(x: SignedType, y: SignedType): number {
  const shape = (t: SignedType) => t.parts.map((p) => `${p.size}x${p.count}`).join();
  if (shape(x) !== shape(y)) return 0;
  const signs = (t: SignedType) => t.parts.flatMap((p) => [...(p.signs ?? []), ...(p.partnerSigns ?? [])]);
  const [a, b] = [signs(x), signs(y)];
  const i = a.findIndex((n, k) => n !== b[k]);
  return i < 0 ? 0 : b[i]! - a[i]!;
}

/** All events up to a codimension, 0 excluded: by codimension, then by the number of blocks that take part. Throws LimitError. */
export function zeroEvents(blocks: readonly BlockCapacity[], limit: number): ListedEvent[] {
  const choices = blocks.map((b, i) => blockEvents(b, limit).map((e): BlockEvent => ({ block: i, ...e })));
  const found: BlockEvent[][] = [];
  const extend = (parts: BlockEvent[], next: number, left: number) => {
    if (parts.length > 0 && found.push(parts) > EVENT_LIMIT) throw tooMany(limit);
    for (let i = next; i < choices.length; i++)
      for (const e of choices[i]!) if (e.codimension <= left) extend([...parts, e], i + 1, left - e.codimension);
  };
  extend([], 0, limit);
  return found.map((parts) => listed(blocks, parts)).sort((x, y) => x.codimension - y.codimension || x.parts.length - y.parts.length);
}

/** Blocks of one size and sign whose kernel consists of copies of the same irreducibles. */
interface Run {
  readonly labels: readonly string[];
  readonly size: number;
  readonly count: number;
  readonly sign: 1 | -1 | 0;
}

function runsOf(block: BlockCapacity, type: SignedType): Run[] {
  const [own, partner] = [block.labels.slice(0, 1), block.labels.slice(1)];
  return type.parts.flatMap(({ size, count, signs, partnerSigns }): Run[] => {
    if (signs === null) return [{ labels: block.labels, size, count, sign: 0 }];
    const runs: Run[] = [
      { labels: own, size, count: signs[0], sign: 1 },
      { labels: own, size, count: signs[1], sign: -1 },
      { labels: partner, size, count: partnerSigns?.[0] ?? 0, sign: 1 },
      { labels: partner, size, count: partnerSigns?.[1] ?? 0, sign: -1 },
    ];
    return runs.filter((r) => r.count > 0);
  });
}

/** `[2]+ [2]-`; with the labels before them where the kernel is not one irreducible's. */
function signText(runs: readonly Run[]): string {
  const groups = new Map<string, string[]>();
  for (const { labels, size, count, sign } of runs) {
    const key = labels.join(' + ');
    const texts = groups.get(key) ?? [];
    groups.set(key, texts);
    for (let i = 0; i < count; i++) texts.push(`[${size}]${sign > 0 ? '+' : sign < 0 ? '-' : ''}`);
  }
  if (groups.size === 1) return [...groups.values()][0]!.join(' ');
  return [...groups].map(([label, texts]) => `${label}: ${texts.join(' ')}`).join('; ');
}

function listed(blocks: readonly BlockCapacity[], parts: readonly BlockEvent[]): ListedEvent {
  const runs = parts.flatMap((p) => runsOf(blocks[p.block]!, p.type));
  const sizes: number[] = [];
  const inertia = { positive: 0, zero: 0, negative: 0 };
  for (const p of parts) {
    const { dimension } = blocks[p.block]!;
    for (const { size, count, sign } of runsOf(blocks[p.block]!, p.type)) {
      const one = inertiaOfBlock(size, sign);
      const n = count * dimension;
      for (let i = 0; i < n; i++) sizes.push(size);
      inertia.positive += n * one.positive;
      inertia.zero += n * one.zero;
      inertia.negative += n * one.negative;
    }
  }
  sizes.sort((x, y) => y - x);
  return {
    codimension: parts.reduce((s, p) => s + p.codimension, 0),
    components: [...new Set(runs.flatMap((r) => r.labels))],
    kernel: sizes.length,
    dimension: sizes.reduce((s, x) => s + x, 0),
    blocks: sizes,
    signs: signText(runs),
    semisimple: sizes.every((x) => x === 1),
    inertia,
    parts,
  };
}
