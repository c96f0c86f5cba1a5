/** Continuous symmetries of a prepared model: declared ones checked, or found, and their span closed under Γ. */
import { type AffineField, embedSparse, fieldColumns, independentFields } from '../action/index.ts';
import { InputError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { dense, inverse, rank, type SparseMatrix, sparse, sparseApply, sparseMultiply } from '../linear/index.ts';
import type { Declaration } from '../model/declaration/index.ts';
import { type Expression, parseExpression, substituteSymbols } from '../model/expression/index.ts';
import { atPoint, energySeries, fieldText, requireSymmetry } from '../model/neutral.ts';
import { findFields } from '../model/neutral-find.ts';
import type { Quantities } from '../model/quantities.ts';
import type { VectorField } from '../model/vector-field.ts';

export interface NeutralSymmetry {
  /** About the equilibrium. */
  readonly fields: readonly AffineField[];
  /** In the language of model files, one for each declared or found field. */
  readonly directions: readonly string[];
  readonly found: boolean;
}

export interface SpanGenerator {
  readonly name: string;
  readonly matrix: SparseMatrix<Algebraic>;
  readonly sign: 1 | -1 | undefined;
  readonly reason?: string;
}

/** Undefined where none is declared and none was asked for. Throws InputError for a declared field that is no symmetry. */
export function neutralSymmetry(
  declaration: Declaration,
  quantities: Quantities,
  hamiltonian: Expression,
  field: RealField,
  form: SparseMatrix<Algebraic>,
  point: readonly Algebraic[],
  generators: readonly SpanGenerator[],
): NeutralSymmetry | undefined {
  if (quantities.neutral.length === 0 && !declaration.neutralFind) return undefined;
  const series = energySeries(hamiltonian, quantities, declaration.vary, field);
  if (series === undefined) return undefined;
  const embed = (x: VectorField): VectorField => ({
    where: x.where,
    linear: embedSparse(x.linear, quantities.field, field),
    constant: x.constant.map((v) => field.embed(quantities.field, v)),
  });
  const good = generators.filter((g) => g.sign !== undefined && g.reason === undefined);
  const { names } = quantities;
  if (!declaration.neutralFind) {
    const fields = quantities.neutral.map(embed);
    for (const xi of fields) requireSymmetry(xi, form, series, point, quantities, declaration.vary, declaration.source);
    requireInvariantSpan(field, fields, good, names, declaration.source);
    return { fields: fields.map((x) => atPoint(field, x, point)), directions: fields.map((x) => fieldText(x, names, field)), found: false };
  }
  const found = findFields({
    declaration,
    field,
    form,
    series,
    point,
    parse: (text, key) => substituteSymbols(parseExpression(text, { file: declaration.source, key }), quantities.definitions),
    values: new Map([...quantities.values].map(([k, v]) => [k, field.embed(quantities.field, v)])),
  });
  const fields = closedUnder(
    field,
    found.map((x) => atPoint(field, x, point)),
    good.map((g) => g.matrix),
  );
  return { fields, directions: fields.map((x) => fieldText(original(field, x, point), names, field)), found: true };
}

/** The field about the origin from the one about the point. */
function original(field: RealField, x: AffineField, point: readonly Algebraic[]): VectorField {
  const moved = sparseApply(x.linear, point);
  return { where: 'found', linear: x.linear, constant: x.value.map((v, i) => field.sub(v, moved[i]!)) };
}

/** The image of a field under g is the field η with η(gx) = gξ(x): its linear part B satisfies Bg = gA. */
function conjugateTimes(g: SparseMatrix<Algebraic>, xi: AffineField): AffineField {
  return { linear: sparseMultiply(g, xi.linear), value: sparseApply(g, xi.value) };
}

/** Throws InputError naming a field and a generator that maps it out of the span. Exact. */
export function requireInvariantSpan(
  field: RealField,
  fields: readonly VectorField[],
  generators: readonly SpanGenerator[],
  names: readonly string[],
  file: string,
): void {
  // about the origin: generators are linear, and the answer does not depend on the point
  const shape = (x: VectorField): AffineField => ({ linear: x.linear, value: x.constant });
  const here = independentFields(field, fields.map(shape));
  for (const g of generators)
    for (const xi of fields) {
      const right = here.map((x) => ({ linear: sparseMultiply(x.linear, g.matrix), value: x.value }));
      const left = conjugateTimes(g.matrix, shape(xi));
      if (rank(fieldColumns(field, [...right, left])) === here.length) continue;
      throw new InputError(`the span of the neutral fields is not invariant: ${g.name} maps the field ${xi.where} to one outside it`, {
        file,
        key: xi.where,
        value: fieldText(xi, names, field),
        expected: 'fields whose span every generator of the symmetry maps to itself',
        next: `declare the image of ${xi.where} under ${g.name} too`,
      });
    }
}

/** Images of symmetries under Γ are symmetries: they are added until the span is invariant. */
function closedUnder(field: RealField, fields: readonly AffineField[], generators: readonly SparseMatrix<Algebraic>[]): AffineField[] {
  const out = independentFields(field, fields);
  const inverses = generators.map((g) => sparse(inverse(dense(g))));
  for (let i = 0; i < out.length; i++)
    generators.forEach((g, k) => {
      const moved = conjugateTimes(g, out[i]!);
      const image = { linear: sparseMultiply(moved.linear, inverses[k]!), value: moved.value };
      if (rank(fieldColumns(field, [...out, image])) > out.length) out.push(image);
    });
  return out;
}
