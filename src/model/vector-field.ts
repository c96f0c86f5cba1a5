/** Continuous symmetries as affine vector fields ξ(x) = Ax + b, as a declaration gives them. */
import type { Algebraic, RealField } from '../field/index.ts';
import { type SparseMatrix, sparseFromMaps } from '../linear/index.ts';
import type { Declaration } from './declaration/declaration.ts';
import type { Expression } from './expression/index.ts';
import { affineForm } from './linear-form.ts';

/** ξ(x) = constant + linear·x on (q, p). */
export interface VectorField {
  readonly where: string;
  readonly linear: SparseMatrix<Algebraic>;
  readonly constant: readonly Algebraic[];
}

/** The declared fields; momenta that a field does not list follow by p ↦ −Aᵀp. Throws InputError where a component is not affine. */
export function declaredFields(
  declaration: Declaration,
  field: RealField,
  values: ReadonlyMap<string, Algebraic>,
  parse: (text: string, key: string) => Expression,
): VectorField[] {
  const names = [...declaration.coordinates, ...declaration.momenta];
  const half = declaration.coordinates.length;
  const index = new Map(names.map((n, i) => [n, i]));
  const known = new Set(names);
  return declaration.neutral.map((components, number) => {
    const where = `neutral[${number + 1}]`;
    const rows = names.map(() => new Map<number, Algebraic>());
    const constant = new Array<Algebraic>(names.length).fill(field.zero);
    for (const [name, text] of components) {
      const at = { file: declaration.source, key: `${where}.${name}` };
      const form = affineForm(parse(text, at.key), known, values, field, at);
      constant[index.get(name)!] = form.constant;
      for (const [k, v] of form.coefficients) rows[index.get(name)!]!.set(index.get(k)!, v);
    }
    if (declaration.form === undefined)
      for (let i = 0; i < half; i++) {
        if (components.has(names[i + half]!)) continue;
        for (let j = 0; j < half; j++) {
          const a = rows[j]!.get(i);
          if (a !== undefined) rows[i + half]!.set(j + half, field.neg(a));
        }
      }
    return { where, linear: sparseFromMaps(field, names.length, rows), constant };
  });
}
