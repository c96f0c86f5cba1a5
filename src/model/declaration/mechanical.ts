/**
 * M q″ + G q′ + K q = 0 from the keys mass, gyroscopic, stiffness, each a matrix, a file, or affine in parameters:
 * {constant: K0.mtx, c: K1.mtx} is K0 + c·K1. Or by numbered files, see numbered-files.ts.
 */
import type { MatrixText } from '../matrix-file/index.ts';
import type { EnergyDeclaration, MatrixFamily } from './declaration.ts';
import { assertName } from './keys.ts';
import { matrixOf } from './matrix-value.ts';
import { numberedFilesOf, numberedNode, type Parity } from './numbered-files.ts';
import { refuse, type YamlMap, type YamlNode } from './yaml-reader.ts';

function familyOf(node: YamlNode, folder: string, parity: Parity): MatrixFamily {
  const numbered = numberedNode(node);
  if (numbered !== undefined) {
    const files = numberedFilesOf(numbered, folder, parity);
    const { rows, cols } = files.nodes[0]!.matrix;
    return { rows, cols, terms: new Map(), files, where: node.key };
  }
  const terms = new Map<string, MatrixText>();
  let constant: MatrixText | undefined;
  let size: MatrixText | undefined;
  const parts: Iterable<readonly [string, YamlNode]> = node.kind === 'map' ? node.entries : [['constant', node] as const];
  for (const [name, part] of parts) {
    const matrix = matrixOf(part, folder);
    if (matrix.rows !== matrix.cols) throw refuse(part, `${part.key} is ${matrix.rows} × ${matrix.cols}`, 'a square matrix');
    size ??= matrix;
    if (matrix.rows !== size.rows)
      throw refuse(
        part,
        `${part.key} is ${matrix.rows} × ${matrix.cols} and ${size.source} is ${size.rows} × ${size.cols}`,
        'matrices of one size',
      );
    if (name === 'constant') constant = matrix;
    else {
      assertName(part, name);
      terms.set(name, matrix);
    }
  }
  if (size === undefined) throw refuse(node, `${node.key} is empty`, 'a matrix, a file, or {constant: …, parameter: …}');
  return { rows: size.rows, cols: size.cols, ...(constant === undefined ? {} : { constant }), terms, where: node.key };
}

/** Reads the three keys of the top mapping. Throws InputError, for `damping` with the reason. */
export function mechanicalOf(top: YamlMap, folder: string): EnergyDeclaration & { kind: 'mechanical' } {
  const damping = top.entries.get('damping');
  if (damping !== undefined) {
    throw refuse(
      damping,
      'damping makes the system lose energy, so it has no Hamiltonian: its eigenvalues no longer come in ± pairs and the counts here do not hold',
      'mass, gyroscopic and stiffness only',
      'remove damping; a part that is skew-symmetric belongs under gyroscopic',
    );
  }
  const [mass, gyroscopic, stiffness] = ['mass', 'gyroscopic', 'stiffness'].map((key) => top.entries.get(key));
  const present = mass ?? gyroscopic ?? stiffness!;
  if (mass === undefined) throw refuse(present, `${present.key} is given without mass`, 'mass and stiffness', 'add mass: [[…]]');
  if (stiffness === undefined)
    throw refuse(present, `${present.key} is given without stiffness`, 'mass and stiffness', 'add stiffness: [[…]]');
  const energy = {
    kind: 'mechanical' as const,
    mass: familyOf(mass, folder, 1),
    ...(gyroscopic === undefined ? {} : { gyroscopic: familyOf(gyroscopic, folder, -1) }),
    stiffness: familyOf(stiffness, folder, 1),
  };
  for (const [node, family] of [
    [gyroscopic, energy.gyroscopic],
    [stiffness, energy.stiffness],
  ] as const) {
    if (node !== undefined && family !== undefined && family.rows !== energy.mass.rows) {
      throw refuse(
        node,
        `${node.key} is ${family.rows} × ${family.cols} and mass is ${energy.mass.rows} × ${energy.mass.cols}`,
        'matrices of one size',
      );
    }
  }
  return energy;
}
