/**
 * The Hamiltonian of a declaration as one expression: typed, or built from a Hessian, from mass, gyroscopic and
 * stiffness matrices, or from a network of springs. Matrices of floating numbers have no expression; see
 * floating-hessian.ts.
 */
import { InputError } from '../errors/index.ts';
import type { Algebraic } from '../field/index.ts';
import { fromRows, inverse } from '../linear/index.ts';
import { PolynomialRing, type RationalFunction, RationalFunctionField } from '../polynomial/index.ts';
import type { Declaration, EnergyDeclaration, MatrixFamily, NumberedFiles } from './declaration/declaration.ts';
import { type Expression, parseExpression, substituteSymbols, taylor } from './expression/index.ts';
import { weightedFiles } from './file-family.ts';
import type { MatrixText } from './matrix-file/index.ts';

const number = (n: bigint, d = 1n): Expression => ({ kind: 'number', n, d });
const symbol = (name: string): Expression => ({ kind: 'symbol', name });
const product = (...factors: Expression[]): Expression => ({ kind: 'product', factors });
const sum = (terms: Expression[]): Expression => (terms.length === 0 ? number(0n) : { kind: 'sum', terms });
const square = (base: Expression): Expression => ({ kind: 'power', base, exponent: number(2n) });
const half = number(1n, 2n);

/** Whether the numbers of the energy are floating because a file says so; names the file. */
export function floatingSource(energy: EnergyDeclaration): string | undefined {
  const matrices: MatrixText[] = [];
  const family = (f: MatrixFamily | undefined) => {
    if (f?.constant !== undefined) matrices.push(f.constant);
    for (const m of f?.terms.values() ?? []) matrices.push(m);
    for (const m of f?.files?.nodes ?? []) matrices.push(m.matrix);
  };
  if (energy.kind === 'hessian') matrices.push(energy.matrix, ...(energy.files?.nodes.map((file) => file.matrix) ?? []));
  if (energy.kind === 'mechanical') {
    family(energy.mass);
    family(energy.gyroscopic);
    family(energy.stiffness);
  }
  return matrices.find((m) => !m.exact)?.source;
}

/** H as an expression in coordinates, momenta and parameters; undefined where the declaration gives none. */
export function energyExpression(declaration: Declaration, definitions: ReadonlyMap<string, Expression>): Expression | undefined {
  const { energy, source: file } = declaration;
  const read = (text: string, key: string) => substituteSymbols(parseExpression(text, { file, key }), definitions);
  switch (energy.kind) {
    case 'none':
      return undefined;
    case 'hamiltonian':
      return read(energy.text, 'hamiltonian');
    case 'quadratic':
      return read(energy.text, 'quadratic');
    case 'hessian':
      return quadraticForm(energy.matrix, energy.files, declaration, read);
    case 'mechanical':
      return mechanicalEnergy(energy, declaration, read);
    case 'network':
      return networkEnergy(energy, declaration, read);
  }
}

type Reader = (text: string, key: string) => Expression;

/** ½ Σ m_ij x_i x_j. */
function quadraticForm(m: MatrixText, files: NumberedFiles | undefined, declaration: Declaration, read: Reader): Expression {
  const names = [...declaration.coordinates, ...declaration.momenta];
  if (m.rows !== names.length || m.cols !== names.length)
    throw new InputError(`the Hessian is ${m.rows} × ${m.cols}`, {
      file: declaration.source,
      key: m.source,
      expected: `${names.length} × ${names.length}, for coordinates and momenta`,
    });
  if (files !== undefined) {
    const entries = familyEntries({ rows: m.rows, cols: m.cols, terms: new Map(), files, where: 'quadratic' }, declaration, read);
    const term = (e: Expression | undefined, i: number, j: number) =>
      e === undefined ? [] : [product(e, symbol(names[i]!), symbol(names[j]!))];
    return product(half, sum(entries.flatMap((row, i) => row.flatMap((e, j) => term(e, i, j)))));
  }
  const texts = new Map(m.entries.map((e) => [e.i * m.cols + e.j, e.text]));
  // entries that read alike need no proof of symmetry
  if (m.entries.some((e) => texts.get(e.j * m.cols + e.i) !== e.text))
    requireSymmetry(
      familyEntries({ rows: m.rows, cols: m.cols, constant: m, terms: new Map(), where: 'quadratic' }, declaration, read),
      declaration,
      'quadratic',
      1,
    );
  return product(
    half,
    sum(m.entries.map((e) => product(read(e.text, `${m.source}[${e.i + 1}][${e.j + 1}]`), symbol(names[e.i]!), symbol(names[e.j]!)))),
  );
}

/** Entries of a family as expressions, row by row; absent ones undefined. */
function familyEntries(f: MatrixFamily, declaration: Declaration, read: Reader): (Expression | undefined)[][] {
  const out = Array.from({ length: f.rows }, () => new Array<Expression[] | undefined>(f.cols).fill(undefined));
  const add = (m: MatrixText, factor?: Expression) => {
    for (const e of m.entries) {
      const value = read(e.text, `${m.source}[${e.i + 1}][${e.j + 1}]`);
      const term = factor === undefined ? value : product(factor, value);
      (out[e.i]![e.j] ??= []).push(term);
    }
  };
  if (f.constant !== undefined) add(f.constant);
  for (const [name, m] of f.terms) add(m, symbol(name));
  if (f.files !== undefined) for (const { weight, matrix } of weightedFiles(f.files, declaration)) add(matrix, weight);
  return out.map((row) => row.map((terms) => (terms === undefined ? undefined : terms.length === 1 ? terms[0] : sum(terms))));
}

/** H = ½(p − ½Gq)ᵀ M⁻¹ (p − ½Gq) + ½ qᵀKq. */
function mechanicalEnergy(energy: EnergyDeclaration & { kind: 'mechanical' }, declaration: Declaration, read: Reader): Expression {
  const q = declaration.coordinates.map(symbol);
  const p = declaration.momenta.map(symbol);
  const mass = familyEntries(energy.mass, declaration, read);
  const gyroscopic = energy.gyroscopic === undefined ? undefined : familyEntries(energy.gyroscopic, declaration, read);
  const stiffness = familyEntries(energy.stiffness, declaration, read);
  // numbered files were checked when they were read
  if (energy.mass.files === undefined) requireSymmetry(mass, declaration, 'mass', 1);
  if (energy.stiffness.files === undefined) requireSymmetry(stiffness, declaration, 'stiffness', 1);
  if (gyroscopic !== undefined && energy.gyroscopic?.files === undefined) requireSymmetry(gyroscopic, declaration, 'gyroscopic', -1);
  const velocity = p.map((pi, i) => {
    const terms = (gyroscopic?.[i] ?? []).flatMap((g, j) => (g === undefined ? [] : [product(number(-1n, 2n), g, q[j]!)]));
    return terms.length === 0 ? pi : sum([pi, ...terms]);
  });
  const inverseMass = invertEntries(mass, declaration);
  const kinetic = inverseMass.flatMap((row, i) =>
    row.flatMap((m, j) =>
      m === undefined ? [] : [i === j ? product(half, m, square(velocity[i]!)) : product(half, m, velocity[i]!, velocity[j]!)],
    ),
  );
  const potential = stiffness.flatMap((row, i) => row.flatMap((k, j) => (k === undefined ? [] : [product(half, k, q[i]!, q[j]!)])));
  return sum([...kinetic, ...potential]);
}

/** Entries over the rational functions in the parameters, exactly. */
function symbolicEntries(entries: readonly (readonly (Expression | undefined)[])[], declaration: Declaration) {
  const keep = [...declaration.parameters.keys(), ...declaration.unset];
  const n = entries.length;
  const names = Array.from({ length: n * n }, (_, i) => `entry ${i}`);
  // one expansion for all entries, so that they share a field: Σ entry · name, linear in the names
  const e = sum(entries.flatMap((row, i) => row.flatMap((x, j) => (x === undefined ? [] : [product(x, symbol(names[i * n + j]!))]))));
  const t = taylor(e, { names, keep, degree: 1 });
  const field: RationalFunctionField<Algebraic> =
    t.kind === 'symbolic' ? t.constants.field : new RationalFunctionField(new PolynomialRing(t.field, []));
  const at = (i: number, j: number): RationalFunction<Algebraic> => {
    const exponents = names.map((_, k) => (k === i * n + j ? 1 : 0));
    return t.kind === 'symbolic'
      ? t.ring.coefficient(t.polynomial, exponents)
      : field.fromConstant(t.ring.coefficient(t.polynomial, exponents));
  };
  return { field, at };
}

function requireSymmetry(
  entries: readonly (readonly (Expression | undefined)[])[],
  declaration: Declaration,
  key: string,
  sign: 1 | -1,
): void {
  const n = entries.length;
  const { field, at } = symbolicEntries(entries, declaration);
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      const [a, b] = [at(i, j), at(j, i)];
      if (!field.isZero(sign === 1 ? field.sub(a, b) : field.add(a, b)))
        throw new InputError(
          `the ${key} matrix is not ${sign === 1 ? 'symmetric' : 'skew-symmetric'}: entry (${i + 1}, ${j + 1}) is ${field.format(a)}, entry (${j + 1}, ${i + 1}) is ${field.format(b)}`,
          {
            file: declaration.source,
            key: `${key}[${i + 1}][${j + 1}]`,
            value: field.format(a),
            expected: sign === 1 ? field.format(b) : field.format(field.neg(b)),
            next:
              sign === 1
                ? key === 'quadratic'
                  ? 'give the symmetric matrix S of H = x^T S x/2'
                  : 'a non-symmetric stiffness is not conservative: it has no Hamiltonian'
                : 'the symmetric part of a velocity term is damping',
          },
        );
    }
}

function invertEntries(entries: readonly (readonly (Expression | undefined)[])[], declaration: Declaration): (Expression | undefined)[][] {
  const n = entries.length;
  const one = number(1n);
  if (entries.every((row, i) => row.every((x, j) => (i === j) === (x !== undefined))))
    return entries.map((row, i) => row.map((x, j) => (i === j ? { kind: 'quotient', numerator: one, denominator: x! } : undefined)));
  const { field, at } = symbolicEntries(entries, declaration);
  const m = fromRows(
    field,
    Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => at(i, j))),
    n,
  );
  try {
    const inv = inverse(m);
    return Array.from({ length: n }, (_, i) =>
      Array.from({ length: n }, (_, j) => {
        const x = inv.data[i * n + j]!;
        return field.isZero(x) ? undefined : parseExpression(field.format(x));
      }),
    );
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    throw new InputError('the mass matrix is singular', {
      file: declaration.source,
      key: 'mass',
      expected: 'a positive definite mass matrix',
      next: 'eliminate the coordinates without inertia first',
    });
  }
}

/** Σ p²/2m + Σ k/2 (d·(u_a − u_b))²/|d|², d the vector of a bond: central springs at rest length, to second order. */
function networkEnergy(energy: EnergyDeclaration & { kind: 'network' }, declaration: Declaration, read: Reader): Expression {
  const d = energy.dimension;
  const labels = [...energy.points.keys()];
  const index = new Map(labels.map((l, i) => [l, i]));
  const positions = labels.map((l) => energy.points.get(l)!.map((text, i) => read(text, `network.points.${l}[${i + 1}]`)));
  const terms: Expression[] = [];
  labels.forEach((l, a) => {
    const mass = read(energy.masses.get(l)!, `network.masses.${l}`);
    for (let i = 0; i < d; i++)
      terms.push({ kind: 'quotient', numerator: square(symbol(declaration.momenta[a * d + i]!)), denominator: product(number(2n), mass) });
  });
  for (const bond of energy.bonds) {
    const [a, b] = [index.get(bond.from)!, index.get(bond.to)!];
    const along: Expression[] = [];
    const length: Expression[] = [];
    for (let i = 0; i < d; i++) {
      const difference = sum([positions[a]![i]!, { kind: 'negate', argument: positions[b]![i]! }]);
      along.push(
        product(
          difference,
          sum([symbol(declaration.coordinates[a * d + i]!), { kind: 'negate', argument: symbol(declaration.coordinates[b * d + i]!) }]),
        ),
      );
      length.push(square(difference));
    }
    const stiffness = read(bond.stiffness, bond.where);
    terms.push({ kind: 'quotient', numerator: product(stiffness, square(sum(along))), denominator: product(number(2n), sum(length)) });
  }
  return sum(terms);
}
