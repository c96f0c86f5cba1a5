/**
 * `components`: the isotypic decomposition with a symmetry-adapted basis, the small blocks of S with parameters as symbols, and the
 * blocks of the flow with their symmetry classes and the blocks of ω and L.
 */
import { type Action, adaptedBlocks, type Components, makeAction, tidy, withCharacters } from '../action/index.ts';
import { poisson } from '../event/generalised-kernel.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import {
  column,
  echelon,
  type Matrix,
  mapMatrix,
  multiply,
  type NumberMatrix,
  numberCongruence,
  numberMultiply,
  sparseTimes,
  toNumberMatrix,
  transpose,
} from '../linear/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { formOf, type MeasuredBlock, measuredBlocks } from './capacity.ts';
import { type BlockDeterminant, determinantOf } from './factored-block.ts';
import { labelledComponents } from './labels.ts';
import { partnersOf } from './partners.ts';
import { isExact, type NotExact, prepare } from './prepare.ts';
import type { ClassSummary, ComponentSummary, ComponentsResult, StudyResult, Value } from './result.ts';
import { CAUTION, componentSummaries, generatorSummaries, groupSummary, linearText, modelSummary } from './summary.ts';
import {
  type Coefficient,
  embedHessian,
  prepareSymbolic,
  requireSymbolicHolds,
  type SymbolicHessian,
  type SymbolicModel,
} from './symbolic.ts';

/** Blocks larger than this are left out of the result. */
export const BLOCK_LIMIT = 40;
/** In larger phase spaces only the first of the alike spaces of each component is written down. */
export const PARTNER_DIMENSION = 100;

/** A model with its group, S as far as it is known. */
export interface Structure {
  readonly head: Omit<StudyResult, 'command'>;
  readonly action: Action;
  readonly components: Components;
  readonly names: readonly string[];
  /** S and L on the columns of a basis; undefined without H. `form` is ω there. */
  blocks(basis: Matrix<Algebraic>, form: Matrix<Algebraic> | undefined): Blocks | undefined;
  /** Parameters that stay symbols in the blocks. */
  readonly symbols: readonly string[];
  /** The determinant of S on the columns of a basis made of `cut` alike ones; absent where S is floating. */
  determinant?(basis: Matrix<Algebraic>, cut: number): Promise<BlockDeterminant>;
}

export interface Blocks {
  readonly s: readonly (readonly Value[])[];
  readonly l?: readonly (readonly Value[])[];
}

/** S on the columns of a basis; each is asked for twice. */
function restriction(hessian: SymbolicHessian): (basis: Matrix<Algebraic>) => Matrix<Coefficient> {
  const f = hessian.coefficients;
  const known = new WeakMap<Matrix<Algebraic>, Matrix<Coefficient>>();
  return (basis) => {
    let s = known.get(basis);
    if (s === undefined) {
      const b = mapMatrix(basis, f, (x) => f.fromConstant(x));
      s = multiply(transpose(b), sparseTimes(hessian.matrix, b));
      known.set(basis, s);
    }
    return s;
  };
}

/** Throws the errors of `check` where the model is not what it claims. */
export async function structureOf(declaration: Declaration): Promise<Structure> {
  const model = prepareSymbolic(declaration);
  if (isFloating(model)) {
    const prepared = prepare(declaration);
    if (!isExact(prepared)) return floatingStructure(prepared);
  }
  requireSymbolicHolds(model);
  const action = withCharacters(
    makeAction(
      model.field,
      model.form,
      model.generators.map((g) => ({ name: g.name, matrix: g.matrix })),
      declaration.orderLimit,
    ),
  );
  const hessian = model.hessian === undefined ? undefined : embedHessian(model.hessian, model.field, action.field);
  const restricted = hessian === undefined ? undefined : restriction(hessian);
  return {
    head: symbolicHead(model, action),
    action,
    components: labelledComponents(declaration, action),
    names: model.quantities.names,
    symbols: hessian?.symbols ?? [],
    blocks: (basis, form) => {
      if (hessian === undefined || restricted === undefined) return undefined;
      const f = hessian.coefficients;
      const s = restricted(basis);
      const texts = (m: typeof s) => rowsOf(m, (x) => f.format(x));
      if (form === undefined) return { s: texts(s) };
      const j = mapMatrix(poisson(form), f, (x) => f.fromConstant(x));
      return { s: texts(s), l: texts(multiply(j, s)) };
    },
    ...(hessian === undefined || restricted === undefined
      ? {}
      : { determinant: (basis, cut) => determinantOf(hessian, model, restricted(basis), cut) }),
  };
}

/** Numbers that have no exact form and no parameter left open: the blocks are floating. */
function isFloating(model: SymbolicModel): boolean {
  const { declaration, quantities, hessian, hamiltonian } = model;
  if (declaration.unset.length > 0 || declaration.energy.kind === 'none') return false;
  return (
    declaration.numbers === 'floating' || quantities.inexact !== undefined || hamiltonian === undefined || (hessian?.atoms.length ?? 0) > 0
  );
}

async function floatingStructure(source: NotExact): Promise<Structure> {
  const floating: typeof import('./floating-prepare.ts') = await import('./floating-prepare.ts');
  const { floatingHead } = await import('./floating.ts');
  const p = floating.prepareFloating(source);
  floating.requireFloatingHolds(p);
  const { action, components, hessian } = p;
  const { command: _, ...head } = floatingHead(
    'components',
    p,
    groupSummary(action, { generators: p.generators, declaration: source.declaration }),
  );
  return {
    head,
    action,
    components,
    names: source.quantities.names,
    symbols: [],
    blocks: (basis, form) => {
      const s = numberCongruence(toNumberMatrix(basis, action.field), hessian);
      return {
        s: numberRowsOf(s),
        ...(form === undefined ? {} : { l: numberRowsOf(numberMultiply(toNumberMatrix(poisson(form), action.field), s)) }),
      };
    },
  };
}

function symbolicHead(model: SymbolicModel, action: Action): Structure['head'] {
  const { declaration, quantities, field, hessian } = model;
  const kind = declaration.energy.kind;
  const atom = hessian?.atoms[0];
  const point = quantities.names.map((n, i) => [n, quantities.field.format(quantities.point[i]!)] as const);
  const summary = modelSummary({ declaration, quantities, hamiltonian: model.hamiltonian });
  return {
    schema: 'symcodim/1',
    model: { ...summary, parameters: { ...summary.parameters, ...Object.fromEntries(model.dependent) } },
    arithmetic: atom === undefined ? 'exact' : 'floating',
    ...(atom === undefined ? {} : { floatingBecause: atom }),
    field: field.name,
    group: groupSummary(action, model),
    equilibrium: { holds: model.equilibriumHolds, gradient: model.gradient, point: Object.fromEntries(point) },
    symmetry: { holds: model.symmetryHolds, generators: generatorSummaries(model) },
    ...(kind === 'mechanical' || kind === 'network' ? { caution: CAUTION } : {}),
  };
}

const rowsOf = <T>(m: Matrix<T>, text: (x: T) => Value): Value[][] =>
  Array.from({ length: m.rows }, (_, i) => Array.from({ length: m.cols }, (_, j) => text(m.data[i * m.cols + j]!)));

const numberRowsOf = (m: NumberMatrix): number[][] =>
  Array.from({ length: m.rows }, (_, i) => Array.from(m.data.subarray(i * m.cols, (i + 1) * m.cols)));

/** The same space with as few coordinates in each column as elimination gives, small integers where possible. */
export function readableBasis(basis: Matrix<Algebraic>, field: RealField): Matrix<Algebraic> {
  const reduced = tidy(transpose(echelon(transpose(basis)).matrix), field);
  const weight = (m: Matrix<Algebraic>) => m.data.reduce((s, x) => s + (field.isZero(x) ? 0 : field.format(x).length + 1), 0);
  return weight(reduced) <= weight(basis) ? reduced : basis;
}

const formsOf = (basis: Matrix<Algebraic>, names: readonly string[], field: RealField): string[] =>
  Array.from({ length: basis.cols }, (_, j) => linearText(column(basis, j), names, field));

async function componentList(s: Structure): Promise<ComponentSummary[]> {
  const { action, names } = s;
  const f = action.field;
  const plain = componentSummaries(s.components);
  const blocks = adaptedBlocks(action, s.components);
  const bases = blocks.map((b) => readableBasis(b.basis, f));
  const partners = action.dimension > PARTNER_DIMENSION ? undefined : partnersOf(action, s.components, bases);
  const list: ComponentSummary[] = [];
  for (const [i, b] of blocks.entries()) {
    const basis = bases[i]!;
    const shown = basis.cols > BLOCK_LIMIT ? undefined : s.blocks(basis, undefined);
    list.push({
      ...plain[i]!,
      basis: formsOf(basis, names, f),
      copies: b.component.irreducible.dimension / b.cut,
      ...(partners === undefined || partners[i]!.length === 0
        ? {}
        : { partners: partners[i]!.map((p) => ({ basis: formsOf(p.basis, names, f), factor: f.format(p.factor) })) }),
      ...(shown === undefined ? {} : { block: shown.s, ...(await s.determinant?.(basis, b.cut)) }),
    });
  }
  return list;
}

function classOf(s: Structure, m: MeasuredBlock): ClassSummary {
  const { action } = s;
  const { block, capacity, algebra } = m;
  const basis = readableBasis(block.basis, action.field);
  const small = basis.cols <= BLOCK_LIMIT;
  const form = small ? formOf(action, { ...block, basis }) : undefined;
  const shown = form === undefined ? undefined : s.blocks(basis, form);
  return {
    number: capacity.classNumber,
    algebra: algebra.algebra,
    subalgebra: algebra.subalgebra,
    components: capacity.labels,
    dimensionOfClass: algebra.dimensionOfClass,
    dimensionOfGroup: algebra.dimensionOfGroup,
    ...(capacity.signature === null ? {} : { signature: capacity.signature }),
    copies: block.copies,
    basis: formsOf(basis, s.names, action.field),
    ...(form === undefined ? {} : { form: rowsOf(form, (x) => action.field.format(x)) }),
    ...(shown === undefined ? {} : { stiffness: shown.s, flow: shown.l! }),
  };
}

/** The result of `components`. Throws the typed errors of the library for a model that cannot be read or does not hold. */
export async function componentsResult(declaration: Declaration): Promise<ComponentsResult> {
  const structure = await structureOf(declaration);
  const blocks = measuredBlocks(structure.action, structure.components);
  const { schema, ...head } = structure.head;
  return {
    schema,
    command: 'components',
    ...head,
    ...(structure.symbols.length === 0 ? {} : { symbols: structure.symbols }),
    components: await componentList(structure),
    classes: blocks.map((b) => classOf(structure, b)),
  };
}
