/** The parts that every result begins with. */

import type { Action, Components } from '../action/index.ts';
import type { Algebraic, RealField } from '../field/index.ts';
import { interpolationNotes } from '../model/file-family.ts';
import { energyText, type Prepared, type Stated } from './prepare.ts';
import type { ComponentSummary, GeneratorSummary, ModelSummary, StudyResult } from './result.ts';

/** Where a result can hurt somebody: structures, rotors, mechanical models. */
export const CAUTION =
  'A linear or local analysis is no proof of safety: it says nothing about large motions, damping, imperfections or loads that were not modelled. Local codes and licensed practice decide.';

export function modelSummary(p: Stated): ModelSummary {
  const { declaration, quantities } = p;
  const text = energyText(p);
  const interpolated = interpolationNotes(declaration);
  return {
    title: declaration.title,
    degreesOfFreedom: declaration.coordinates.length,
    coordinates: declaration.coordinates,
    momenta: declaration.momenta,
    parameters: Object.fromEntries([
      ...[...declaration.parameters.keys()].map((k) => [k, quantities.field.format(quantities.values.get(k)!)] as const),
      ...declaration.unset.map((k) => [k, null] as const),
    ]),
    vary: declaration.vary,
    ...(text === undefined ? {} : { hamiltonian: text }),
    ...(interpolated.length === 0 ? {} : { interpolated }),
  };
}

export function generatorSummaries(p: Pick<Prepared, 'generators'>): GeneratorSummary[] {
  return p.generators.map((g) => ({
    name: g.name,
    reversing: g.sign === -1,
    symplectic: g.sign !== undefined,
    invariant: g.invariant,
    ...(g.reason === undefined ? {} : { reason: g.reason }),
  }));
}

export function groupSummary(action: Action, p: Pick<Prepared, 'generators' | 'declaration'>): StudyResult['group'] {
  let reversing = 0;
  for (const s of action.signs) if (s === -1) reversing++;
  const named = p.declaration.groups.map((g) => g.group);
  return {
    order: action.group.order,
    reversing,
    generators: p.generators.map((g) => g.name),
    ...(named.length === 1 && p.declaration.generators.length === 0 && !p.declaration.timeReversal ? { name: named[0]! } : {}),
  };
}

export function head(command: string, p: Prepared, group: StudyResult['group']): StudyResult {
  const { field, local, quantities } = p;
  const largest = local.gradient.find((x) => !field.isZero(x));
  const kind = p.declaration.energy.kind;
  return {
    schema: 'symcodim/1',
    command,
    model: modelSummary(p),
    arithmetic: 'exact',
    field: field.name,
    group,
    equilibrium: {
      holds: p.equilibriumHolds,
      gradient: largest === undefined ? '0' : field.format(largest),
      point: Object.fromEntries(quantities.names.map((n, i) => [n, quantities.field.format(quantities.point[i]!)])),
    },
    symmetry: { holds: p.symmetryHolds, generators: generatorSummaries(p) },
    ...(kind === 'mechanical' || kind === 'network' ? { caution: CAUTION } : {}),
  };
}

export function componentSummaries(components: Components): ComponentSummary[] {
  return components.present.map((c) => ({
    label: c.label,
    dimension: c.irreducible.dimension,
    type: c.irreducible.type,
    multiplicity: c.irreducible.multiplicity,
    carriesForm: c.carriesForm,
    flowsTo: c.flowsTo,
  }));
}

/** A linear form in the coordinates, as text. */
export function linearText(coefficients: readonly Algebraic[], names: readonly string[], field: RealField): string {
  let out = '';
  coefficients.forEach((c, i) => {
    if (field.isZero(c)) return;
    const negative = field.sign(c) < 0;
    const size = negative ? field.neg(c) : c;
    const text = field.format(size);
    const body = field.equal(size, field.one) ? names[i]! : `${/ [+-] /.test(text) ? `(${text})` : text}*${names[i]!}`;
    out += out === '' ? (negative ? `-${body}` : body) : negative ? ` - ${body}` : ` + ${body}`;
  });
  return out === '' ? '0' : out;
}
