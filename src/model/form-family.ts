/** Derivatives of a symplectic form whose entries use parameters. */
import type { Algebraic, RealField } from '../field/index.ts';
import { type SparseMatrix, sparseFromMaps } from '../linear/index.ts';
import type { Declaration } from './declaration/declaration.ts';
import { parseExpression, substituteSymbols, symbolsOf, taylor } from './expression/index.ts';
import type { Quantities } from './quantities.ts';

/** ∂W/∂μ for each varied parameter; undefined where W does not depend on them. */
export function formDerivatives(declaration: Declaration, quantities: Quantities, field: RealField): SparseMatrix<Algebraic>[] | undefined {
  const { vary, form: texts } = declaration;
  if (texts === undefined || vary.length === 0) return undefined;
  const n = texts.length;
  const rows = vary.map(() => Array.from({ length: n }, () => new Map<number, Algebraic>()));
  const at = new Map(vary.map((v) => [v, quantities.valueExpressions.get(v)!]));
  let depends = false;
  texts.forEach((line, i) => {
    line.forEach((text, j) => {
      const e = substituteSymbols(
        parseExpression(text, { file: declaration.source, key: `symplectic[${i + 1}][${j + 1}]` }),
        quantities.definitions,
      );
      const symbols = symbolsOf(e);
      if (!vary.some((v) => symbols.has(v))) return;
      const t = taylor(e, { names: vary, point: at, parameters: quantities.valueExpressions, degree: 1, field });
      if (t.kind !== 'exact' || t.field !== field) return;
      depends = true;
      vary.forEach((_, k) => {
        rows[k]![i]!.set(
          j,
          t.ring.coefficient(
            t.polynomial,
            vary.map((_v, l) => (l === k ? 1 : 0)),
          ),
        );
      });
    });
  });
  return depends ? rows.map((r) => sparseFromMaps(field, n, r)) : undefined;
}
