/**
 * The linear analysis of a model with continuous symmetries: the blocks of the flow on the symplectic slice, under Γ
 * and, where fields vanish at the equilibrium, under finite turns that stand for them. Subgroups are those of Γ; the
 * continuous symmetry is kept under each of them.
 */
import {
  type Action,
  type Component,
  type Components,
  embedAction,
  embedSparse,
  type FlowBlock,
  finiteTurn,
  flowBlocks,
  makeAction,
  periodicField,
  type Slice,
  type SymplecticPart,
  sliceFlowBlocks,
  sliceOf,
  standsFor,
  symplecticPart,
  withCharacters,
} from '../action/index.ts';
import { NotAGroupError } from '../errors/index.ts';
import { pieceCodimension, sliceEvent, slicePiece } from '../event/slice-rank.ts';
import { codimensionUnder, eventCharacters } from '../event/subgroup-codimension.ts';
import type { EventPiece } from '../event/versality.ts';
import { RoutesDisagree, type ZeroEvent } from '../event/zero-event.ts';
import { type Algebraic, RealField } from '../field/index.ts';
import type { SubgroupClass } from '../group/index.ts';
import { above, dense, kernel, type Matrix, multiply, type SparseMatrix } from '../linear/index.ts';
import type { Prepared } from './prepare.ts';

/** Groups with turns larger than this are not formed. */
export const TURNED_ORDER_LIMIT = 4000;
/** Up to this dimension of E₀ the rank with the fields themselves is compared with the finite stand-in. */
export const COMPARED_DIMENSION = 16;

export interface SliceStudy {
  /** Γ over the field of the analysis. */
  readonly action: Action;
  readonly slice: Slice;
  /** Γ together with the turns; Γ itself where no field vanishes at the equilibrium, or no finite group stands for those that do. */
  readonly wide: Action;
  readonly symplectic: SymplecticPart;
  /** Blocks of the flow of `wide` on the slice. */
  readonly blocks: readonly FlowBlock[];
  /** Whether `wide` says all about the symmetry. */
  readonly complete: boolean;
  readonly directions: readonly string[];
}

/** Undefined where the model declares no continuous symmetry and none was found. */
export function sliceStudy(prepared: Prepared, given: Action): SliceStudy | undefined {
  const { neutral, field: from } = prepared;
  if (neutral === undefined) return undefined;
  const fieldsOver = (to: RealField) =>
    neutral.fields.map((x) => ({ linear: embedSparse(x.linear, from, to), value: x.value.map((v) => to.embed(from, v)) }));
  const first = sliceOf(given, fieldsOver(given.field));
  const turned = first.isotropy.length === 0 ? undefined : turnedAction(given, first.isotropy);
  const wide = turned ?? given;
  const action = embedAction(given, wide.field);
  const slice = wide === given ? first : sliceOf(wide, fieldsOver(wide.field));
  const symplectic = symplecticPart(wide);
  return {
    action,
    slice,
    wide,
    symplectic,
    blocks: sliceFlowBlocks(slice, flowBlocks(wide, symplectic)),
    complete: first.isotropy.length === 0 || turned !== undefined,
    directions: neutral.directions,
  };
}

/** Γ with a finite turn for every field that vanishes at the equilibrium; undefined where they do not stand for the fields. */
function turnedAction(action: Action, isotropy: readonly SparseMatrix<Algebraic>[]): Action | undefined {
  const turns = isotropy.map((xi) => {
    const periodic = periodicField(xi, action.field);
    return periodic === undefined ? undefined : finiteTurn(periodic, action.field);
  });
  let field = action.field;
  for (const t of turns) {
    if (t === undefined) return undefined;
    field = RealField.join(field, t.field);
  }
  const form = embedSparse(action.form, action.field, field);
  const matrices = turns.map((t, i) => ({ name: `turn${i + 1}`, matrix: embedSparse(t!.matrix, t!.field, field) }));
  try {
    const alone = makeAction(field, form, matrices, TURNED_ORDER_LIMIT);
    const moved = isotropy.map((m) => embedSparse(m, action.field, field));
    if (!standsFor(alone, moved)) return undefined;
    const own = action.generators.map((g) => ({ name: g.name, matrix: embedSparse(g.matrix, action.field, field) }));
    return withCharacters(makeAction(field, form, [...own, ...matrices], Math.max(TURNED_ORDER_LIMIT, 4 * action.group.order)));
  } catch (error) {
    if (!(error instanceof NotAGroupError)) throw error;
    return undefined;
  }
}

/** The event with the codimension that the continuous symmetry gives, both routes compared where both are there. */
export function withContinuous(study: SliceStudy, event: ZeroEvent, hessian: SparseMatrix<Algebraic>): ZeroEvent {
  if (study.slice.isotropy.length === 0 || event.dimension === 0) return event;
  if (study.complete && event.dimension > COMPARED_DIMENSION) return event;
  const whole = sliceEvent(study.slice, study.wide.form, hessian);
  const rank = pieceCodimension(slicePiece(whole, study.action.generators), study.slice.field);
  if (study.complete && rank !== event.codimension)
    throw new RoutesDisagree(`codimension with the continuous symmetry: ${rank} by its fields, ${event.codimension} by finite turns`);
  return { ...event, codimension: rank };
}

/** Components of Γ in a block of the flow of `wide`. */
export function sliceComponents(study: SliceStudy, components: Components, block: FlowBlock): Component[] {
  const { action, symplectic } = study;
  const places = elementsInWide(study);
  return components.present.filter(({ irreducible: k }) => {
    let s = 0;
    let count = 0;
    for (let g = 0; g < action.group.order; g++) {
      if (action.signs[g] !== 1) continue;
      count++;
      const own = symplectic.part.group.classOf[symplectic.part.position(places[g]!)]!;
      s += block.irreducible.values[own]! * k.values[action.group.classOf[g]!]!;
    }
    return Math.round(s / count) > 0;
  });
}

/** The number in `wide` of each element of Γ; generators come in the same order. */
function elementsInWide({ wide, action }: SliceStudy): Int32Array {
  const out = new Int32Array(action.group.order);
  for (let g = 1; g < out.length; g++)
    out[g] = wide.group.multiply(wide.group.generators[action.group.via[g]!]!, out[action.group.parent[g]!]!);
  return out;
}

/** Codimension of the event under each subgroup of Γ, the continuous symmetry kept. */
export function sliceSubgroups(
  study: SliceStudy,
  event: ZeroEvent,
  classes: readonly SubgroupClass[],
  hessian: SparseMatrix<Algebraic>,
): number[] {
  const { wide, action, symplectic } = study;
  if (!study.complete) {
    const whole = sliceEvent(study.slice, wide.form, hessian);
    return classes.map((h) =>
      pieceCodimension(
        slicePiece(
          whole,
          h.generators.map((g) => ({ matrix: action.matrix(g), sign: action.signs[g] as 1 | -1 })),
        ),
        study.slice.field,
      ),
    );
  }
  const characters = eventCharacters(
    wide,
    symplectic.part,
    event.blocks.map((b) => ({ block: b.block, counts: b.kernel.blocks })),
  );
  const places = elementsInWide(study);
  const turns = wide.group.generators.slice(action.generators.length);
  return classes.map((h) => codimensionUnder(wide, generated(wide, [...h.generators.map((g) => places[g]!), ...turns]), characters));
}

function generated(action: Action, generators: readonly number[]): number[] {
  const seen = new Set([0]);
  const out = [0];
  for (let i = 0; i < out.length; i++)
    for (const g of generators) {
      const x = action.group.multiply(g, out[i]!);
      if (seen.has(x)) continue;
      seen.add(x);
      out.push(x);
    }
  return out.sort((a, b) => a - b);
}

/** Fix(Γ) within the slice, vectors that the fields with a zero at the equilibrium move left out. */
export function sliceFixed(study: SliceStudy, fixed: Matrix<Algebraic>): Matrix<Algebraic> {
  if (fixed.cols === 0) return fixed;
  let conditions = study.slice.constraints;
  for (const xi of study.slice.isotropy) conditions = above(conditions, dense(xi));
  return multiply(fixed, kernel(multiply(conditions, fixed)));
}

/** The whole event as one piece, for versality where no finite group stands for the fields; else undefined. */
export function wholePiece(study: SliceStudy, hessian: SparseMatrix<Algebraic>): EventPiece[] | undefined {
  if (study.complete) return undefined;
  return [slicePiece(sliceEvent(study.slice, study.wide.form, hessian), study.action.generators)];
}
