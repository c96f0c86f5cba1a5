/**
 * Normal modes of M q̈ = -K q by components of a symmetry group that acts on the coordinates: which components there are and
 * how often is exact (characters), their bases are doubles, and on each component only a block of the size of its
 * multiplicity is diagonalised (E. P. Wigner, 1930; common practice: symmetry-adapted coordinates).
 */
import {
  assembleAction,
  componentsOf,
  findCutters,
  groupOfMatrices,
  numericMultiplicityColumns,
  representedBy,
  withCharacters,
} from '../action/index.ts';
import { ShapeError } from '../errors/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import {
  type NumberMatrix,
  numberMatrix,
  orthonormalColumns,
  pencilEigenvalues,
  type SparseMatrix,
  sparseIdentity,
  symmetricEigenvalues,
} from '../linear/index.ts';

/** The modes of one component. */
export interface ComponentModes {
  readonly label: string;
  /** Dimension of the irreducible: how often each value occurs. */
  readonly dimension: number;
  readonly type: 'real' | 'complex' | 'quaternionic';
  readonly multiplicity: number;
  /** ω², ascending, one for each copy of the irreducible; negative where the equilibrium is unstable. */
  readonly squares: Float64Array;
}

export interface ModeOptions {
  /** M, symmetric and positive definite; 1 by default. */
  readonly mass?: NumberMatrix;
  /** Labels of all real irreducibles, in the order of the character table. */
  readonly names?: readonly string[];
  readonly orderLimit?: number;
}

/**
 * @param generators exact n × n matrices ρ with ρᵀKρ = K and ρᵀMρ = M; this is the caller's to check.
 * @param stiffness K, n × n symmetric.
 * Throws ShapeError if the sizes differ, NotAGroupError past the limit.
 */
export function normalModes(
  field: RealField,
  generators: readonly SparseMatrix<Algebraic>[],
  stiffness: NumberMatrix,
  options: ModeOptions = {},
): ComponentModes[] {
  const n = stiffness.rows;
  const { mass, names, orderLimit = 100_000 } = options;
  for (const m of [...generators, stiffness, ...(mass === undefined ? [] : [mass])])
    if (m.rows !== n || m.cols !== n) throw new ShapeError(`a ${m.rows} x ${m.cols} matrix on ${n} coordinates`);
  const group = groupOfMatrices(field, n, generators, orderLimit);
  const action = withCharacters(
    assembleAction(
      field,
      sparseIdentity<Algebraic>(field, n),
      generators.map((matrix, i) => ({ name: `g${i + 1}`, matrix, sign: 1 as const })),
      group,
    ),
  );
  const components = componentsOf(action, names);
  const irreducibles = components.present.map((c) => c.irreducible);
  const cutters = findCutters(group, irreducibles);
  const rep = representedBy(action, components.whole);
  const k = formRows(stiffness);
  const m = mass === undefined ? undefined : formRows(mass);
  return components.present.map((component, i): ComponentModes => {
    const { irreducible, label } = component;
    const cut = cutters[i]!.dimensions[i]!;
    const columns = orthonormalColumns(numericMultiplicityColumns(rep, irreducibles, i, cutters[i]!));
    const block = restricted(k, columns);
    const values = m === undefined ? symmetricEigenvalues(block) : pencilEigenvalues(block, restricted(m, columns));
    return {
      label,
      dimension: irreducible.dimension,
      type: irreducible.type,
      multiplicity: irreducible.multiplicity,
      // each value occurs `cut` times on the cut space; the mean of those is the better value
      squares: Float64Array.from({ length: irreducible.multiplicity }, (_, i) => {
        let sum = 0;
        for (let j = 0; j < cut; j++) sum += values[i * cut + j]!;
        return sum / cut;
      }),
    };
  });
}

/** The nonzero entries of a form: row i holds value[k] in column[k] for start[i] <= k < start[i + 1]. */
interface FormRows {
  readonly start: Int32Array;
  readonly column: Int32Array;
  readonly value: Float64Array;
}

function formRows({ rows: n, data }: NumberMatrix): FormRows {
  let count = 0;
  for (let i = 0; i < data.length; i++) if (data[i] !== 0) count++;
  const start = new Int32Array(n + 1);
  const column = new Int32Array(count);
  const value = new Float64Array(count);
  let end = 0;
  for (let i = 0, at = 0; i < n; i++) {
    for (let j = 0; j < n; j++, at++) {
      const x = data[at]!;
      if (x === 0) continue;
      column[end] = j;
      value[end++] = x;
    }
    start[i + 1] = end;
  }
  return { start, column, value };
}

/** Values of a symmetric form on columns. */
function restricted({ start, column, value }: FormRows, columns: readonly Float64Array[]): NumberMatrix {
  const n = start.length - 1;
  const u = columns.length;
  const out = new Float64Array(u * u);
  const image = new Float64Array(n);
  for (let a = 0; a < u; a++) {
    const v = columns[a]!;
    image.fill(0);
    for (let k = 0; k < n; k++) {
      const x = v[k]!;
      if (x === 0) continue;
      const end = start[k + 1]!;
      for (let q = start[k]!; q < end; q++) image[column[q]!]! += x * value[q]!;
    }
    for (let b = 0; b <= a; b++) {
      const w = columns[b]!;
      let sum = 0;
      for (let j = 0; j < n; j++) sum += image[j]! * w[j]!;
      out[a * u + b] = sum;
      out[b * u + a] = sum;
    }
  }
  return numberMatrix(u, u, out);
}
