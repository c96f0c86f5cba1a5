/**
 * What a result file carries so that somebody else can check it: the whole declaration with its digest, and for the
 * linear analysis S, ω and the generators as exact texts, the adapted bases, and witnesses of the rank of S (the
 * columns of a minor that does not vanish, and vectors that S maps to zero).
 */
import { createHash } from 'node:crypto';
import { type AdaptedBlock, adaptedBlocks, embedSparse, restrictForm } from '../action/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { dense, kernel, type Matrix, modularEchelon, type SparseMatrix } from '../linear/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import type { LinearStudy } from './linear-study.ts';

/** Entries that are not zero, rows and columns counted from 1. */
export type EntryTexts = readonly (readonly [number, number, string])[];

export interface LinearCertificate {
  readonly dimension: number;
  readonly form: EntryTexts;
  readonly hessian: EntryTexts;
  readonly generators: readonly { readonly name: string; readonly sign: 1 | -1; readonly matrix: EntryTexts }[];
  /** Columns that span the space on which S is an m × m block over R, C or H, and S on them. */
  readonly components: readonly {
    readonly label: string;
    readonly columns: number;
    readonly cut: number;
    readonly basis: EntryTexts;
    readonly block: EntryTexts;
  }[];
  /** Rows and columns of a principal minor of S that does not vanish, and columns that span ker S. */
  readonly rank: { readonly minor: readonly number[]; readonly kernel?: { readonly columns: number; readonly entries: EntryTexts } };
}

/** A declaration as JSON: maps as lists of pairs under the key `map`. */
export type Encoded = null | boolean | number | string | readonly Encoded[] | { readonly [key: string]: Encoded };

export interface Certificate {
  readonly declaration: Encoded;
  /** SHA-256 of the declaration as JSON without blanks. */
  readonly digest: string;
  /** What the run added to the declaration. */
  readonly options: { readonly [key: string]: Encoded };
  readonly linear?: LinearCertificate;
}

/** Plain data for JSON; reversed by `decode`. */
export function encode(value: unknown): Encoded {
  if (value === null || typeof value === 'boolean' || typeof value === 'number' || typeof value === 'string') return value;
  if (value instanceof Map) return { map: [...value].map(([k, v]) => [encode(k), encode(v)]) };
  if (Array.isArray(value)) return value.map(encode);
  if (typeof value === 'object')
    return Object.fromEntries(
      Object.entries(value)
        .filter(([, v]) => v !== undefined)
        .map(([k, v]) => [k, encode(v)]),
    );
  throw new Error(`a ${typeof value} cannot be written as JSON`);
}

/** What `encode` made, as it was. */
export function decode(value: Encoded): unknown {
  if (value === null || typeof value !== 'object') return value;
  if (Array.isArray(value)) return (value as readonly Encoded[]).map(decode);
  const entries = Object.entries(value as { readonly [key: string]: Encoded });
  const map = entries.length === 1 && entries[0]![0] === 'map' ? entries[0]![1] : undefined;
  if (Array.isArray(map)) return new Map((map as readonly (readonly [Encoded, Encoded])[]).map(([k, v]) => [decode(k), decode(v)]));
  return Object.fromEntries(entries.map(([k, v]) => [k, decode(v)]));
}

export function digestOf(declaration: Encoded): string {
  return createHash('sha256').update(JSON.stringify(declaration)).digest('hex');
}

/** The certificate that every result of a model can carry. */
export function declarationCertificate(declaration: Declaration, options: Readonly<Record<string, unknown>>): Certificate {
  const encoded = encode({ ...declaration });
  const { progress: _, ...kept } = options;
  return { declaration: encoded, digest: digestOf(encoded), options: encode(kept) as Certificate['options'] };
}

/** The result with its certificate, to which a command may have added parts of its own. */
export function certified<R extends { readonly certificate?: object }>(result: R, declaration: Declaration, options: object): R {
  return { ...result, certificate: { ...declarationCertificate(declaration, { ...options }), ...result.certificate } };
}

function sparseTexts(a: SparseMatrix<Algebraic>, field: RealField): EntryTexts {
  return a.index.flatMap((cols, i) => cols.map((j, k) => [i + 1, j + 1, field.format(a.value[i]![k]!)] as const));
}

export function denseTexts(a: Matrix<Algebraic>, field: RealField): EntryTexts {
  const out: [number, number, string][] = [];
  for (let i = 0; i < a.rows; i++)
    for (let j = 0; j < a.cols; j++) {
      const x = a.data[i * a.cols + j]!;
      if (!field.isZero(x)) out.push([i + 1, j + 1, field.format(x)]);
    }
  return out;
}

/** Above this dimension the kernel is left out of the certificate: it would be larger than all else. */
const KERNEL_DIMENSION = 60;

/** The exact data of a linear analysis. `blocks` are those of `adaptedBlocks`, where they are known already. */
export function linearCertificate(study: LinearStudy, blocks?: readonly AdaptedBlock[]): LinearCertificate {
  const { prepared, action } = study;
  const { field } = prepared;
  const s = dense(prepared.local.hessian);
  const reduction = field.reduction();
  const { pivots } = modularEchelon({
    p: reduction.p,
    rows: s.rows,
    cols: s.cols,
    data: Int32Array.from(s.data, (x) => reduction.apply(x)),
  });
  const null_ = s.rows <= KERNEL_DIMENSION ? kernel(s) : undefined;
  return {
    dimension: action.dimension,
    form: sparseTexts(prepared.form, field),
    hessian: sparseTexts(prepared.local.hessian, field),
    generators: action.generators.map((g, i) => ({
      name: g.name,
      sign: g.sign,
      matrix: sparseTexts(prepared.generators[i]!.matrix, field),
    })),
    components: (blocks ?? adaptedBlocks(action, study.components)).map((b) => ({
      label: b.component.label,
      columns: b.basis.cols,
      cut: b.cut,
      basis: denseTexts(b.basis, action.field),
      block: denseTexts(restricted(b, study), action.field),
    })),
    rank: {
      minor: pivots.map((j) => j + 1),
      ...(null_ === undefined ? {} : { kernel: { columns: null_.cols, entries: denseTexts(null_, field) } }),
    },
  };
}

function restricted(block: AdaptedBlock, study: LinearStudy): Matrix<Algebraic> {
  const { action, prepared } = study;
  return restrictForm(block.basis, embedSparse(prepared.local.hessian, prepared.field, action.field));
}
