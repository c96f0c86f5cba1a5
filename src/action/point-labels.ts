/**
 * Mulliken's labels for the irreducibles of a point group, read off its matrices: A, B by the principal axis,
 * E, T, G, H by the dimension over R (complex pairs are one E), 1 and 2 by the two-fold axes across the principal one or by
 * vertical mirrors, g and u by the inversion, ' and '' by the horizontal mirror where there is no inversion.
 * Choices that the rules leave open: the two-fold axis nearest to x, else the vertical mirror that contains x, tells 1 from 2;
 * in D2 and D2h the axes z, y, x give B1, B2, B3. In the planar groups a reflection counts as a two-fold axis.
 * @source Mulliken1955 R. S. Mulliken, Report on notation for the spectra of polyatomic molecules, J. Chem. Phys. 23 (1955)
 */

/** A real orthogonal matrix, row by row, 2 x 2 or 3 x 3. */
export type PointMatrix = readonly (readonly number[])[];

/** A real irreducible: its dimension over R and its character on the elements, in the order of their matrices. */
export interface PointCharacter {
  readonly dimension: number;
  readonly values: ArrayLike<number>;
}

type Vector = readonly [number, number, number];

/** One element: proper (1) or improper (-1), and the rotation through `angle` in [0, π] about `axis` that it is up to that sign. */
interface Isometry {
  readonly proper: boolean;
  readonly angle: number;
  readonly axis: Vector;
}

/** Angles of one group differ by far more: 2π over the square of the order is the least that can occur. */
const NEAR = 1e-6;
const near = (x: number, y: number): boolean => Math.abs(x - y) < NEAR;
const dot = (a: Vector, b: Vector): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
const parallel = (a: Vector, b: Vector): boolean => near(Math.abs(dot(a, b)), 1);
const across = (a: Vector, b: Vector): boolean => near(dot(a, b), 0);
const X: Vector = [1, 0, 0];
const Y: Vector = [0, 1, 0];
const Z: Vector = [0, 0, 1];

function isometry(matrix: PointMatrix): Isometry | undefined {
  const m = matrix.length === 2 ? plane(matrix) : matrix;
  if (m.length !== 3 || m.some((row) => row.length !== 3)) return undefined;
  for (let i = 0; i < 3; i++)
    for (let j = 0; j < 3; j++) if (!near(dot(m[i] as unknown as Vector, m[j] as unknown as Vector), i === j ? 1 : 0)) return undefined;
  const [a, b, c] = m as unknown as [Vector, Vector, Vector];
  const det = a[0] * (b[1] * c[2] - b[2] * c[1]) - a[1] * (b[0] * c[2] - b[2] * c[0]) + a[2] * (b[0] * c[1] - b[1] * c[0]);
  const s = Math.sign(det);
  const r = m.map((row) => row.map((x) => s * x));
  const cosine = (r[0]![0]! + r[1]![1]! + r[2]![2]! - 1) / 2;
  const twist = [r[2]![1]! - r[1]![2]!, r[0]![2]! - r[2]![0]!, r[1]![0]! - r[0]![1]!].map((x) => x / 2);
  const sine = Math.hypot(...twist);
  const angle = Math.atan2(sine, cosine);
  if (sine > NEAR) return { proper: s > 0, angle, axis: twist.map((x) => x / sine) as unknown as Vector };
  if (cosine > 0) return { proper: s > 0, angle: 0, axis: Z };
  // a half turn is 2aaᵀ - 1: its longest column gives the axis
  const columns = [0, 1, 2].map((j) => [0, 1, 2].map((i) => r[i]![j]! + (i === j ? 1 : 0)));
  const lengths = columns.map((c) => Math.hypot(...c));
  const length = Math.max(...lengths);
  const longest = columns[lengths.findIndex((l) => l > length - NEAR)]!;
  return { proper: s > 0, angle: Math.PI, axis: longest.map((x) => x / length) as unknown as Vector };
}

/** A planar matrix as a rotation of space: about z, or by a half turn about the line that a reflection fixes. */
function plane(m: PointMatrix): PointMatrix {
  if (m.some((row) => row.length !== 2)) return m;
  const det = m[0]![0]! * m[1]![1]! - m[0]![1]! * m[1]![0]!;
  return [
    [...m[0]!, 0],
    [...m[1]!, 0],
    [0, 0, det],
  ];
}

/** Rotation axes with the order of each. */
function rotationAxes(elements: readonly Isometry[]): { axis: Vector; order: number }[] {
  const found: { axis: Vector; angle: number }[] = [];
  for (const { proper, angle, axis } of elements) {
    if (!proper || angle < NEAR) continue;
    const known = found.find((f) => parallel(f.axis, axis));
    if (known === undefined) found.push({ axis, angle });
    else known.angle = Math.min(known.angle, angle);
  }
  return found.map(({ axis, angle }) => ({ axis, order: Math.round((2 * Math.PI) / angle) }));
}

/** The angle of an improper element as rotation followed by the reflection across its axis; π is the inversion, 0 a mirror. */
const reflectedAngle = (e: Isometry): number => Math.PI - e.angle;

/**
 * A label for each irreducible, or undefined where the matrices are not those of a point group, each element its own.
 * `matrices` are those of all elements.
 */
export function pointLabels(matrices: readonly PointMatrix[], irreducibles: readonly PointCharacter[]): string[] | undefined {
  const elements: Isometry[] = [];
  for (const m of matrices) {
    const e = isometry(m);
    if (e === undefined) return undefined;
    elements.push(e);
  }
  // one identity among the matrices: otherwise elements share a matrix
  if (elements.filter((e) => e.proper && e.angle < NEAR).length !== 1) return undefined;
  const axes = rotationAxes(elements);
  const inversion = elements.findIndex((e) => !e.proper && near(e.angle, 0));
  const high = axes.filter((a) => a.order >= 3);
  const rules = high.length > 1 ? polyhedral(elements, axes) : axial(elements, axes, inversion >= 0);
  const labels = irreducibles.map((k) => {
    const parity = inversion < 0 ? '' : k.values[inversion]! > 0 ? 'g' : 'u';
    return rules(k, parity);
  });
  return new Set(labels).size === labels.length ? labels : undefined;
}

/** The label of an irreducible, given its parity under the inversion. */
type Rules = (k: PointCharacter, parity: string) => string;

const LETTERS = ['', 'A', 'E', 'T', 'G', 'H', 'I'];

/** Cubic and icosahedral groups: 1 and 2 by a four-fold axis, proper or with reflection, or by a five-fold one. */
function polyhedral(elements: readonly Isometry[], axes: readonly { order: number }[]): Rules {
  const icosahedral = axes.some((a) => a.order === 5);
  const fourfold = elements.findIndex((e) => e.proper && near(e.angle, Math.PI / 2));
  const witness = icosahedral
    ? elements.findIndex((e) => e.proper && near(e.angle, (2 * Math.PI) / 5))
    : fourfold >= 0
      ? fourfold
      : elements.findIndex((e) => !e.proper && near(e.angle, Math.PI / 2));
  // T and T_h have no such axis and number nothing
  return (k, parity) => {
    const letter = LETTERS[k.dimension]!;
    const numbered = witness >= 0 && (icosahedral ? k.dimension === 3 : k.dimension !== 2);
    return `${letter}${numbered ? (k.values[witness]! > 0 ? '1' : '2') : ''}${parity}`;
  };
}

function axial(elements: readonly Isometry[], axes: readonly { axis: Vector; order: number }[], inversion: boolean): Rules {
  const turning = elements.find((e) => !e.proper && near(reflectedAngle(e), Math.PI / 2));
  const main = principalAxis(axes, turning);
  if (main === undefined) {
    const mirror = elements.findIndex((e) => !e.proper && near(e.angle, Math.PI));
    return (k, parity) => `A${parity}${mirror < 0 ? '' : prime(k, mirror)}`;
  }
  const twofold = axes.filter((a) => a.order === 2);
  if (twofold.length === 3 && main.order === 2 && turning === undefined) return rectangular(elements, twofold);
  const generator = principalElement(elements, main, inversion);
  const order = Math.round((2 * Math.PI) / generator.angle);
  const horizontal = inversion ? -1 : elements.findIndex((e) => !e.proper && near(e.angle, Math.PI) && parallel(e.axis, main.axis));
  const witness = secondary(elements, main.axis);
  return (k, parity) => {
    const suffix = `${parity}${horizontal < 0 ? '' : prime(k, horizontal)}`;
    const value = k.values[generator.element]!;
    if (k.dimension === 1) {
      const letter = order % 2 === 0 && value < 0 ? 'B' : 'A';
      return `${letter}${witness < 0 ? '' : k.values[witness]! > 0 ? '1' : '2'}${suffix}`;
    }
    const turns = Math.round((order * Math.acos(Math.max(-1, Math.min(1, value / 2)))) / (2 * Math.PI));
    return `E${order >= 5 ? turns : ''}${suffix}`;
  };
}

const prime = (k: PointCharacter, mirror: number): string => (k.values[mirror]! > 0 ? "'" : "''");

/** The axis of highest order; among two-fold ones that of a four-fold rotation with reflection, then the one nearest to z. */
function principalAxis(
  axes: readonly { axis: Vector; order: number }[],
  turning: Isometry | undefined,
): { axis: Vector; order: number } | undefined {
  if (axes.length === 0) return undefined;
  const top = Math.max(...axes.map((a) => a.order));
  const best = axes.filter((a) => a.order === top);
  const marked = top === 2 && turning !== undefined ? best.find((a) => parallel(a.axis, turning.axis)) : undefined;
  return marked ?? nearest(best, (a) => a.axis, [Z, Y, X]);
}

/** The item whose direction lies closest to the first of the given lines; ties go to the next line. */
function nearest<T>(items: readonly T[], direction: (item: T) => Vector, lines: readonly Vector[]): T {
  let left = items;
  for (const line of lines) {
    const best = Math.max(...left.map((item) => Math.abs(dot(direction(item), line))));
    left = left.filter((item) => Math.abs(dot(direction(item), line)) > best - NEAR);
  }
  return left[0]!;
}

/** D2 and D2h: B1, B2, B3 are even under the half turns about z, y, x. */
function rectangular(elements: readonly Isometry[], axes: readonly { axis: Vector }[]): Rules {
  const z = nearest(axes, (a) => a.axis, [Z, Y, X]);
  const rest = axes.filter((a) => a !== z);
  const y = nearest(rest, (a) => a.axis, [Y, X, Z]);
  const x = rest.find((a) => a !== y)!;
  const halfTurns = [z, y, x].map(({ axis }) => elements.findIndex((e) => e.proper && near(e.angle, Math.PI) && parallel(e.axis, axis)));
  return (k, parity) => {
    const even = halfTurns.map((t) => k.values[t]! > 0);
    return even.every(Boolean) ? `A${parity}` : `B${even.indexOf(true) + 1}${parity}`;
  };
}

/** The rotation by 2π/n about the principal axis, or the rotation by π/n with reflection where nothing else tells its powers apart. */
function principalElement(
  elements: readonly Isometry[],
  main: { axis: Vector; order: number },
  inversion: boolean,
): { element: number; angle: number } {
  const step = (2 * Math.PI) / main.order;
  if (!inversion) {
    const reflected = elements.findIndex((e) => !e.proper && near(reflectedAngle(e), step / 2) && parallel(e.axis, main.axis));
    const horizontal = elements.some((e) => !e.proper && near(e.angle, Math.PI) && parallel(e.axis, main.axis));
    if (reflected >= 0 && !horizontal) return { element: reflected, angle: step / 2 };
  }
  return { element: elements.findIndex((e) => e.proper && near(e.angle, step) && parallel(e.axis, main.axis)), angle: step };
}

/** The element that tells 1 from 2: a two-fold axis across the principal one, else a mirror that contains it; -1 without either. */
function secondary(elements: readonly Isometry[], main: Vector): number {
  const halves = elements.map((e, i) => ({ ...e, i })).filter((e) => near(e.angle, Math.PI) && across(e.axis, main));
  const turns = halves.filter((e) => e.proper);
  if (turns.length > 0) return nearest(turns, (e) => e.axis, [X, Y, Z]).i;
  if (halves.length === 0) return -1;
  // a mirror contains x where its normal is across x: the normals nearest to y, then z
  const least = Math.min(...halves.map((e) => Math.abs(dot(e.axis, X))));
  return nearest(
    halves.filter((e) => Math.abs(dot(e.axis, X)) < least + NEAR),
    (e) => e.axis,
    [Y, Z, X],
  ).i;
}
