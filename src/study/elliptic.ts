/** `reduce --elliptic`: the Birkhoff normal form at an elliptic equilibrium, adapted to the components. */
import { InputError, LimitError } from '../errors/index.ts';
import type { Algebraic } from '../field/index.ts';
import { column, dense, sparseTimes } from '../linear/index.ts';
import { taylor } from '../model/expression/index.ts';
import { birkhoffNormalForm } from '../normalform/birkhoff.ts';
import { birkhoffSummary } from '../normalform/birkhoff-text.ts';
import type { LinearStudy } from './linear-study.ts';
import type { StudyResult, Value } from './result.ts';
import { groupSummary, head } from './summary.ts';

/** Degree where none is asked for, and the largest degree and dimension that are worth it. */
export const DEFAULT_DEGREE = 4;
const DEGREE_LIMIT = 12;
const DIMENSION_LIMIT = 12;

export interface EllipticSummary {
  readonly degree: number;
  readonly arithmetic: 'exact' | 'floating';
  /** Signed by the energy of the mode; the component it belongs to. */
  readonly frequencies: readonly { readonly name: string; readonly value: Value; readonly component: string; readonly sign: number }[];
  readonly modes: readonly { readonly name: string; readonly real: string; readonly imaginary: string; readonly bracket: string }[];
  /** Integer relations Σ k_j ω_j = 0 up to the degree, with the resonant monomial. */
  readonly resonances: readonly { readonly relation: readonly number[]; readonly order: number; readonly generator?: string }[];
  /** The normal form in I_j and the real and imaginary parts of resonant monomials. */
  readonly expression: string;
  /** The part in the actions alone, and its twist determinants. */
  readonly actions: string;
  readonly twist: Value | null;
  readonly kolmogorov: Value | null;
  readonly stability: string;
}

export interface EllipticResult extends StudyResult {
  readonly birkhoff: EllipticSummary;
}

/** Throws InputError unless the equilibrium is elliptic and semisimple, LimitError for a phase space that is too large. */
export function ellipticResult(study: LinearStudy, degree = DEFAULT_DEGREE): EllipticResult {
  const { prepared, action } = study;
  const { quantities, hamiltonian, declaration } = prepared;
  const n = quantities.names.length;
  if (n > DIMENSION_LIMIT)
    throw new LimitError(`a Birkhoff normal form in ${n} coordinates is out of reach`, {
      file: declaration.source,
      expected: `at most ${DIMENSION_LIMIT} coordinates`,
    });
  if (degree < 2 || degree > DEGREE_LIMIT)
    throw new InputError(`a Birkhoff normal form of degree ${degree}`, {
      key: 'degree',
      value: `${degree}`,
      expected: `a degree from 2 to ${DEGREE_LIMIT}`,
    });
  const field = action.field;
  const t = taylor(hamiltonian, {
    names: quantities.names,
    point: quantities.pointExpressions,
    parameters: quantities.valueExpressions,
    degree,
    field,
  });
  if (t.kind !== 'exact' || t.field !== field) throw new Error('an exact model has an expansion that is not exact');
  const adapted = study.forms.map((b, i) => ({ basis: b.block.basis, labels: study.blockComponents[i]!.map((c) => c.label) }));
  const form = dense(action.form);
  const preferred: (readonly Algebraic[])[] = adapted.flatMap(({ basis }) =>
    Array.from({ length: basis.cols }, (_, j) => column(basis, j)),
  );
  const normal = birkhoffNormalForm({ ring: t.ring, hamiltonian: t.polynomial, form, degree, preferred });
  const summary = birkhoffSummary(normal, quantities.names);
  const labels = normal.modes.map((m) =>
    componentOf(
      study,
      Float64Array.from(m.a as readonly unknown[], (x) =>
        normal.arithmetic === 'exact' ? normal.field.toNumber(x as Algebraic) : (x as number),
      ),
    ),
  );
  return {
    ...head('reduce', prepared, groupSummary(action, prepared)),
    birkhoff: {
      degree: summary.degree,
      arithmetic: summary.arithmetic,
      frequencies: summary.frequencies.map((f, j) => ({
        name: `omega_${j + 1}`,
        value: f.exact ?? f.value,
        component: labels[j]!,
        sign: Math.sign(f.value),
      })),
      modes: summary.modes.map((m, j) => ({ name: `z${j + 1}`, ...m })),
      resonances: summary.resonances.map((r) => ({
        relation: r.relation,
        order: r.order,
        ...(r.generator === undefined ? {} : { generator: r.generator }),
      })),
      expression: summary.expression,
      actions: summary.actions,
      twist: summary.twist === null ? null : summary.arithmetic === 'exact' ? summary.twist.arnold : summary.twist.value,
      kolmogorov: summary.twist === null ? null : summary.twist.kolmogorov,
      stability: stabilityWords(summary.frequencies.map((f) => f.value)),
    },
  };
}

/** Labels of the flow blocks on which a linear form does not vanish. */
function componentOf(study: LinearStudy, covector: Float64Array): string {
  const { action } = study;
  const size = covector.reduce((m, x) => Math.max(m, Math.abs(x)), 0);
  const order = Math.min(action.group.order, TRANSLATES);
  const labels = study.forms.flatMap(({ block }, i) => {
    const seen = () => {
      for (let g = 0; g < order; g++) {
        const moved = sparseTimes(action.matrix(g), block.basis);
        for (let c = 0; c < moved.cols; c++) {
          let s = 0;
          let scale = 0;
          for (let k = 0; k < moved.rows; k++) {
            const x = action.field.toNumber(moved.data[k * moved.cols + c]!);
            s += covector[k]! * x;
            scale += Math.abs(x);
          }
          if (Math.abs(s) > 1e-7 * size * scale) return true;
        }
      }
      return false;
    };
    return seen() ? study.blockComponents[i]!.map((c) => c.label) : [];
  });
  return [...new Set(labels)].join(' + ');
}

/** Images of a multiplicity space that are looked at to find the component of a mode. */
const TRANSLATES = 500;

function stabilityWords(frequencies: readonly number[]): string {
  const positive = frequencies.filter((w) => w > 0).length;
  if (positive === frequencies.length || positive === 0)
    return 'The energy is definite: the equilibrium is nonlinearly stable (Lagrange–Dirichlet).';
  return 'The energy is indefinite: nothing follows from it; the twist says whether most invariant tori survive, which in two degrees of freedom confines the motion.';
}
