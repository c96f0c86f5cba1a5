/** All expression texts of a declaration with the keys they stand under, and the names they use. */
import type { MatrixText } from '../matrix-file/index.ts';
import type { Declaration, EnergyDeclaration, MatrixFamily, NumberedFiles } from './declaration.ts';
import { namesIn } from './names.ts';

type Parts = Pick<Declaration, 'energy' | 'define' | 'parameters' | 'equilibrium' | 'generators' | 'neutral' | 'range'> & {
  readonly form?: readonly (readonly string[])[];
};

function* ofMatrix(matrix: MatrixText): Generator<string> {
  // Matrix files hold numbers only; names can stand in typed matrices alone.
  if (matrix.exact) for (const { text } of matrix.entries) yield text;
}

function* ofFamily(family: MatrixFamily | undefined): Generator<string> {
  if (family === undefined) return;
  if (family.files !== undefined) yield family.files.parameter;
  if (family.constant !== undefined) yield* ofMatrix(family.constant);
  for (const [name, matrix] of family.terms) {
    yield name;
    yield* ofMatrix(matrix);
  }
}

/** The parts of an energy that numbered files give. */
export function numberedFamilies(energy: EnergyDeclaration): NumberedFiles[] {
  const families =
    energy.kind === 'hessian' ? [energy] : energy.kind === 'mechanical' ? [energy.mass, energy.gyroscopic, energy.stiffness] : [];
  return families.flatMap((f) => (f?.files === undefined ? [] : [f.files]));
}

/** Every expression text of a declaration. */
export function* expressionTexts(parts: Parts): Generator<string> {
  const { energy } = parts;
  if (energy.kind === 'hamiltonian' || energy.kind === 'quadratic') yield energy.text;
  else if (energy.kind === 'hessian') {
    if (energy.files === undefined) yield* ofMatrix(energy.matrix);
    else yield energy.files.parameter;
  } else if (energy.kind === 'mechanical') {
    yield* ofFamily(energy.mass);
    yield* ofFamily(energy.gyroscopic);
    yield* ofFamily(energy.stiffness);
  } else if (energy.kind === 'network') {
    for (const position of energy.points.values()) yield* position;
    yield* energy.masses.values();
    for (const bond of energy.bonds) yield bond.stiffness;
  }
  yield* parts.define.values();
  yield* parts.parameters.values();
  yield* parts.equilibrium.values();
  for (const generator of parts.generators) {
    yield* generator.map?.values() ?? [];
    for (const row of generator.matrix ?? []) yield* row;
  }
  for (const field of parts.neutral) yield* field.values();
  for (const row of parts.form ?? []) yield* row;
  for (const { from, to } of parts.range.values()) {
    yield from;
    yield to;
  }
}

/** The names that the expressions of a declaration use, in order of appearance. */
export function usedNames(parts: Parts): Set<string> {
  const names = new Set<string>();
  for (const text of expressionTexts(parts)) {
    if (/^[-+\d./]*$/.test(text)) continue;
    for (const name of namesIn(text)) names.add(name);
  }
  return names;
}
