/**
 * From declared generators to exact matrices on the phase space (q, p). Convention: a map says where the
 * point goes, x ↦ ρx, row by row: `q1: q3` puts the old q3 into the new q1.
 */
import { InputError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { loadCatalogueGroup } from '../group/catalogue.ts';
import { dense, fromRows, inverse, type Matrix, type SparseMatrix, sparse, sparseFromMaps, transpose } from '../linear/index.ts';
import type { Declaration, GeneratorDeclaration, GroupDeclaration } from './declaration/declaration.ts';
import { type Expression, exactValue, parseExpression } from './expression/index.ts';
import { affineForm } from './linear-form.ts';

/** A generator as a matrix; `declared` is what the declaration says about time, where it says anything. */
export interface ModelGenerator {
  readonly name: string;
  readonly where: string;
  readonly matrix: SparseMatrix<Algebraic>;
  readonly declared?: boolean;
}

interface Frame {
  readonly declaration: Declaration;
  readonly field: RealField;
  readonly values: ReadonlyMap<string, Algebraic>;
  readonly names: readonly string[];
  readonly index: ReadonlyMap<string, number>;
  readonly half: number;
  /** Text of the declaration to an expression, definitions replaced. */
  readonly parse: (text: string, key: string) => Expression;
}

/** All generators of a declaration, own ones first, then those of groups, then time reversal. */
export function modelGenerators(
  declaration: Declaration,
  field: RealField,
  values: ReadonlyMap<string, Algebraic>,
  parse: (text: string, key: string) => Expression,
): ModelGenerator[] {
  const names = [...declaration.coordinates, ...declaration.momenta];
  const frame: Frame = {
    declaration,
    field,
    values,
    names,
    index: new Map(names.map((n, i) => [n, i])),
    half: declaration.coordinates.length,
    parse,
  };
  const out: ModelGenerator[] = [];
  for (const g of declaration.generators) out.push(ownGenerator(frame, g));
  for (const g of declaration.groups) out.push(...groupGenerators(frame, g));
  if (declaration.timeReversal) out.push({ name: 'time', where: 'symmetry.timeReversal', matrix: timeReversal(frame), declared: true });
  const seen = new Map<string, number>();
  return out.map((g) => {
    const k = (seen.get(g.name) ?? 0) + 1;
    seen.set(g.name, k);
    return k === 1 ? g : { ...g, name: `${g.name}_${k}` };
  });
}

function timeReversal(frame: Frame): SparseMatrix<Algebraic> {
  const { field, half } = frame;
  const rows = frame.names.map((_, i) => new Map([[i, i < half ? field.one : field.neg(field.one)]]));
  return sparseFromMaps(field, frame.names.length, rows);
}

/** q ↦ Aq, p ↦ σA⁻ᵀp. Throws InputError for a singular A. */
function cotangentLift(frame: Frame, a: Matrix<Algebraic>, sigma: 1 | -1, where: string): SparseMatrix<Algebraic> {
  const { field, half } = frame;
  let contragredient: SparseMatrix<Algebraic>;
  try {
    contragredient = sparse(transpose(inverse(a)));
  } catch {
    throw new InputError(`the map of ${where} is singular`, {
      file: frame.declaration.source,
      key: where,
      expected: 'an invertible linear map',
    });
  }
  const q = sparse(a);
  const rows: Map<number, Algebraic>[] = [];
  for (let i = 0; i < half; i++) rows.push(new Map(q.index[i]!.map((j, k) => [j, q.value[i]![k]!])));
  for (let i = 0; i < half; i++)
    rows.push(
      new Map(
        contragredient.index[i]!.map((j, k) => [
          j + half,
          sigma === 1 ? contragredient.value[i]![k]! : field.neg(contragredient.value[i]![k]!),
        ]),
      ),
    );
  return sparseFromMaps(field, 2 * half, rows);
}

function ownGenerator(frame: Frame, g: GeneratorDeclaration): ModelGenerator {
  const { field, half, names, declaration } = frame;
  const declared = g.reversing === undefined ? {} : { declared: g.reversing };
  const head = { name: g.name, where: g.where, ...declared };
  const lifted = declaration.form === undefined;
  const sigma = g.reversing === true ? -1 : 1;
  const square = (rows: readonly (readonly Algebraic[])[]): SparseMatrix<Algebraic> => {
    if (rows.length === 2 * half) return sparse(fromRows(field, rows, 2 * half));
    if (!lifted)
      throw new InputError(`generator ${g.name} moves the coordinates only, but the model gives its own symplectic form`, {
        file: declaration.source,
        key: g.where,
        expected: `a map of all ${2 * half} coordinates`,
        next: 'write where the momenta go too',
      });
    return cotangentLift(frame, fromRows(field, rows, half), sigma, g.where);
  };
  if (g.permutation !== undefined) {
    const rows = g.permutation.map(() => new Array<Algebraic>(g.permutation!.length).fill(field.zero));
    g.permutation.forEach((to, from) => {
      rows[to - 1]![from] = field.one;
    });
    return { ...head, matrix: square(rows) };
  }
  if (g.matrix !== undefined) {
    const rows = g.matrix.map((row, i) =>
      row.map((text, j) => exactValue(frame.parse(text, `${g.where}.matrix[${i + 1}][${j + 1}]`), frame.values, field)),
    );
    return { ...head, matrix: square(rows) };
  }
  if (g.map === undefined) return { ...head, matrix: timeReversal(frame) };
  const known = new Set(names);
  const unit = (i: number) => new Map([[i, field.one]]);
  const rows = names.map((_, i) => unit(i));
  for (const [name, text] of g.map) {
    const where = { file: declaration.source, key: `${g.where}.map.${name}` };
    const form = affineForm(frame.parse(text, where.key), known, frame.values, field, where);
    if (!field.isZero(form.constant))
      throw new InputError(`the map of ${g.name} moves the origin: ${name} ↦ ${text}`, {
        ...where,
        value: text,
        expected: 'a linear map without constant term',
      });
    rows[frame.index.get(name)!] = new Map([...form.coefficients].map(([k, v]) => [frame.index.get(k)!, v]));
  }
  const full = sparseFromMaps(field, names.length, rows);
  const listsMomentum = [...g.map.keys()].some((n) => frame.index.get(n)! >= half);
  if (!lifted || listsMomentum) return { ...head, matrix: full };
  const block = dense(full);
  const a: Algebraic[][] = [];
  for (let i = 0; i < half; i++) {
    for (let j = half; j < 2 * half; j++)
      if (!field.isZero(block.data[i * 2 * half + j]!))
        throw new InputError(`the map of ${g.name} sends a coordinate to a momentum but says nothing about the momenta`, {
          file: declaration.source,
          key: `${g.where}.map`,
          expected: 'a map that lists the momenta it moves',
        });
    a.push(block.data.slice(i * 2 * half, i * 2 * half + half) as Algebraic[]);
  }
  return { ...head, matrix: cotangentLift(frame, fromRows(field, a, half), sigma, g.where) };
}

function groupGenerators(frame: Frame, g: GroupDeclaration): ModelGenerator[] {
  const { field, half, names, declaration, values } = frame;
  const group = loadCatalogueGroup(g.group, { folder: declaration.folder });
  for (const r of g.reversing)
    if (!group.generators.includes(r))
      throw new InputError(`${group.name} has no generator ${r}`, {
        file: declaration.source,
        key: `${g.where}.reversing`,
        value: r,
        expected: `one of ${group.generators.join(', ')}`,
      });
  if (g.on === 'points') return pointGenerators(frame, g);
  const sites = g.on.map((site) => ({ on: site.on, action: group.action(site.action, site.on.length) }));
  const momentum = sites.some((s) => s.on.some((n) => (frame.index.get(n) ?? 0) >= half));
  const lift = declaration.form === undefined && !momentum;
  return group.generators.map((name) => {
    const rows = names.map((_, i) => new Map([[i, field.one]]));
    for (const site of sites) {
      if (site.action.dimension !== site.on.length)
        throw new InputError(
          `the action ${site.action.name} of ${group.name} moves ${site.action.dimension} coordinates, the list names ${site.on.length}`,
          {
            file: declaration.source,
            key: `${g.where}.on`,
            value: site.on.join(', '),
            expected: `${site.action.dimension} coordinates`,
            next: 'see the actions with: symcodim groups NAME',
          },
        );
      const texts = site.action.matrices.get(name)!;
      texts.forEach((line, i) => {
        const row = new Map<number, Algebraic>();
        line.forEach((text, j) => {
          if (text === '0') return;
          row.set(frame.index.get(site.on[j]!)!, exactValue(parseExpression(text, { key: g.where }), values, field));
        });
        rows[frame.index.get(site.on[i]!)!] = row;
      });
    }
    const reversing = g.reversing.includes(name);
    const where = `${g.where}.${name}`;
    if (!lift) return { name, where, matrix: sparseFromMaps(field, names.length, rows), declared: reversing };
    const a = Array.from({ length: half }, (_, i) => Array.from({ length: half }, (_, j) => rows[i]!.get(j) ?? field.zero));
    return { name, where, matrix: cotangentLift(frame, fromRows(field, a, half), reversing ? -1 : 1, where), declared: reversing };
  });
}

/** Rotation and permutation of the points of a network. */
function pointGenerators(frame: Frame, g: GroupDeclaration): ModelGenerator[] {
  const { declaration, field, half, values } = frame;
  const energy = declaration.energy;
  if (energy.kind !== 'network')
    throw new InputError('`on: points` needs a network', {
      file: declaration.source,
      key: `${g.where}.on`,
      value: 'points',
      expected: 'lists of coordinates',
    });
  const d = energy.dimension;
  const group = loadCatalogueGroup(g.group, { folder: declaration.folder });
  const action =
    g.action === undefined
      ? ([...group.actions.values()].find((a) => a.dimension === d) ?? group.action(undefined, d))
      : group.action(g.action, d);
  if (action.dimension !== d)
    throw new InputError(`no action of ${group.name} turns points of ${d} coordinates`, {
      file: declaration.source,
      key: `${g.where}.group`,
      value: g.group,
      expected: `a group with an action of dimension ${d}`,
    });
  const labels = [...energy.points.keys()];
  const positions = labels.map((label) =>
    energy.points.get(label)!.map((text, i) => exactValue(frame.parse(text, `network.points.${label}[${i + 1}]`), values, field)),
  );
  const at = new Map(positions.map((x, i) => [x.map((c) => field.key(c)).join(';'), i]));
  return group.generators.map((name) => {
    const r = action.matrices
      .get(name)!
      .map((line) => line.map((text) => exactValue(parseExpression(text, { key: g.where }), values, field)));
    const a = Array.from({ length: half }, () => new Map<number, Algebraic>());
    positions.forEach((x, from) => {
      const y = r.map((line) => line.reduce((s, c, j) => field.add(s, field.mul(c, x[j]!)), field.zero));
      const to = at.get(y.map((c) => field.key(c)).join(';'));
      if (to === undefined)
        throw new InputError(
          `${name} of ${group.name} moves point ${labels[from]} to (${y.map((c) => field.format(c)).join(', ')}), where there is no point`,
          {
            file: declaration.source,
            key: `network.points.${labels[from]}`,
            expected: 'a set of points that the group maps to itself',
            next: 'check the axes: main axis z, two-fold axes of D_n along x, vertical mirrors contain x',
          },
        );
      for (let i = 0; i < d; i++)
        r[i]!.forEach((c, j) => {
          if (!field.isZero(c)) a[to * d + i]!.set(from * d + j, c);
        });
    });
    // orthogonal matrices: the lift of A is A itself, with the sign
    const reversing = g.reversing.includes(name);
    const rows = [...a, ...a.map((m) => new Map([...m].map(([j, c]) => [j + half, reversing ? field.neg(c) : c])))];
    return { name, where: `${g.where}.${name}`, matrix: sparseFromMaps(field, 2 * half, rows), declared: reversing };
  });
}
