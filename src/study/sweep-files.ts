/**
 * A sweep along the parameter of numbered matrix files, from file to file. The action and the bases of its components
 * are those of the whole family, so blocks are matched across files by component. Between two files S is that of the
 * interpolated matrices: a rational function of the parameter where the files are exact, so that its zeros are roots of
 * determinants; else in double precision, where an eigenvalue within the tolerance at a file counts as zero there.
 */
import { InputError, NotAnEquilibriumError, NotInvariantError, UsageError } from '../errors/index.ts';
import { type Rational, rationals } from '../field/index.ts';
import { largestEntry, numberCombine, numberMatrix } from '../linear/index.ts';
import { symmetricEigen } from '../linear/spectral.ts';
import { type Declaration, numberedFamilies } from '../model/declaration/index.ts';
import { floatingSource } from '../model/energy.ts';
import { betweenFiles, filesAt, INTERPOLATED, listedValues } from '../model/file-family.ts';
import { congruenceNumeric, numberSparse } from './floating-action.ts';
import type { InertiaSummary } from './result.ts';
import type { Tracked } from './sweep-collisions.ts';
import { type BlocksAt, blockEvaluator, type Curve, type CurvePoint } from './sweep-curve.ts';
import { exactEvent, floatingEvent, inertiaAt } from './sweep-event.ts';
import { familyWithEnergy, type SweepFamily, sweepFamily } from './sweep-family.ts';
import { type FloatingMatrices, floatingMatrices, isPiecewiseLinear } from './sweep-matrices.ts';
import { declarationAt, type Range, readRanges } from './sweep-range.ts';
import type { BlockEigenvalue } from './sweep-spectrum.ts';
import { type Zero, type Zeros, zerosOfFamily, zerosOnCurve } from './sweep-zeros.ts';

/** The matrices at one listed value. */
export interface FilePoint {
  /** Exactly, as a text. */
  readonly value: string;
  readonly at: number;
  readonly files: readonly string[];
  readonly inertia: InertiaSummary;
  /** Frequencies (im), rates (re) and signs, one of each pair, by component; equal ones that symmetry repeats once. */
  readonly eigenvalues: readonly { readonly component: string; readonly values: readonly BlockEigenvalue[] }[];
}

export interface FileTable {
  readonly parameter: string;
  /** That the matrix between the files is interpolated. */
  readonly note: string;
  readonly points: readonly FilePoint[];
}

/** What a sweep along files brings in place of a sweep along an expression. */
export interface FileSweep {
  readonly family: SweepFamily;
  readonly curve: Curve;
  readonly blocks: (p: CurvePoint) => BlocksAt;
  readonly place: (u: number) => CurvePoint;
  readonly zeros: Zeros;
  /** The files that a crossing lies between or at, and whether it is versal with the slopes on both sides. */
  readonly named: (crossing: Seen, zero: Zero) => Place;
  readonly table: (tracked: Tracked) => FileTable;
}

/** What was found of a crossing. */
interface Seen {
  readonly versal: boolean | null;
  readonly inertiaBefore: InertiaSummary;
  readonly inertiaAfter: InertiaSummary;
}

interface Place {
  readonly versal: boolean | null;
  /** The files below and above. */
  readonly between?: readonly [string, string];
  /** The file, where the event happens at a listed value. */
  readonly file?: string;
}

/** Part of the range between two neighbouring listed values (or an end of the range). */
interface Piece {
  readonly range: Range;
  readonly energy: Declaration['energy'];
  /** Number of its first point on the curve. */
  readonly start: number;
}

/** The parameter to be swept, if it numbers files. Throws UsageError for grids. */
function numberedParameter(declaration: Declaration): string | undefined {
  const numbered = new Set(numberedFamilies(declaration.energy).map((f) => f.parameter));
  if (numbered.size === 0) return undefined;
  const asked = [...declaration.range.keys()];
  if (asked.length === 0) return declaration.vary.find((name) => numbered.has(name)) ?? [...numbered][0];
  const inGrid = asked.find((name) => numbered.has(name));
  if (asked.length > 1 && inGrid !== undefined)
    throw new UsageError(`${inGrid} numbers files, and they are swept one parameter at a time`, {
      key: '--range',
      value: asked.join(', '),
      expected: 'one range',
      next: `keep the range of ${inGrid}, or give the matrices affine in parameters`,
    });
  return inGrid;
}

/** The declaration with the range that is swept: the one declared, or from the first to the last file. */
function withRange(declaration: Declaration, parameter: string): { declaration: Declaration; range: Range; listed: Rational[] } {
  const listed = listedValues(declaration.energy, parameter);
  const [first, last] = [listed[0], listed.at(-1)];
  if (first === undefined || rationals.equal(first, last!))
    throw new InputError(`the files numbered by ${parameter} have no interval of values in common`, {
      file: declaration.source,
      key: numberedFamilies(declaration.energy).find((f) => f.parameter === parameter)!.where,
      expected: 'files of mass, gyroscopic and stiffness over one interval',
      next: 'add the missing files',
    });
  const ends = { from: rationals.format(first), to: rationals.format(last!) };
  const own = declaration.range.size > 0 ? declaration : { ...declaration, range: new Map([[parameter, ends]]) };
  const range = readRanges(own)[0]!;
  if (rationals.compare(range.low, first) < 0 || rationals.compare(range.high, last!) > 0)
    throw new InputError(`the range of ${parameter} goes beyond the files, which go from ${ends.from} to ${ends.to}`, {
      file: declaration.source,
      key: `range.${parameter}`,
      value: `${rationals.format(range.low)}, ${rationals.format(range.high)}`,
      expected: `an interval inside [${ends.from}, ${ends.to}]`,
      next: 'choose a smaller range, or add files',
    });
  return { declaration: own, range, listed };
}

function piecesOf(declaration: Declaration, range: Range, listed: readonly Rational[]): Piece[] {
  const inner = listed.filter((x) => rationals.compare(x, range.low) > 0 && rationals.compare(x, range.high) < 0);
  const values = [range.low, ...inner, range.high];
  const steps = Math.max(2, Math.ceil(range.steps / (values.length - 1)));
  return values.slice(1).map((high, k): Piece => {
    const low = values[k]!;
    const { parameter } = range;
    return {
      range: { parameter, from: rationals.toNumber(low), to: rationals.toNumber(high), low, high, steps },
      energy: betweenFiles(declaration.energy, parameter, low, high),
      start: k * steps,
    };
  });
}

/** Reads a declaration whose swept parameter numbers files; undefined for any other. Throws the errors of `sweepFamily`. */
export function fileSweep(declaration: Declaration): FileSweep | undefined {
  const parameter = numberedParameter(declaration);
  if (parameter === undefined) return undefined;
  const { declaration: own, range, listed } = withRange(declaration, parameter);
  const pieces = piecesOf(own, range, listed);
  const last = pieces.at(-1)!;
  const count = last.start + last.range.steps;
  const whole = { ...range, steps: count };
  const exact = exactPieces(own, pieces, whole);
  const numeric = exact === undefined ? numericPieces(own, whole) : undefined;
  const family = exact?.family ?? numeric!.family;
  const pieceAt = (mu: number): number => {
    let [low, high] = [0, pieces.length - 1];
    while (low < high) {
      const middle = (low + high) >> 1;
      if (mu <= pieces[middle]!.range.to) high = middle;
      else low = middle + 1;
    }
    return low;
  };
  const blocks = numeric?.blocks ?? ((p: CurvePoint) => exact!.blocks[pieceAt(p.mu)]!(p));
  const muAt = placesOf(pieces);
  const at = (mu: number): CurvePoint => ({ mu, x: family.pointAt(mu) });
  const curve = curveOf(at, muAt, count);
  const isListed = (x: Rational) => listed.some((v) => rationals.equal(v, x));
  const ends = [range.low, ...pieces.map((p) => p.range.high)];
  const nodes = ends.flatMap((value, k) => (isListed(value) ? [{ value, j: k === pieces.length ? count : pieces[k]!.start }] : []));
  const atNode = new Set(nodes.map((n) => n.j));
  if (numeric !== undefined) {
    const points = nodes.map(({ value, j }) => ({ point: curve.points[j]!, files: filesAt(own.energy, parameter, value).join(', ') }));
    requireHeld(family, numeric, points);
  }
  const zeros =
    numeric === undefined
      ? joinedZeros(exact!, curve, pieces)
      : zerosOnCurve(family, curve, blocks, (j) => (atNode.has(j) ? family.tolerance! : 0));
  const named = (crossing: Seen, zero: Zero): Place => {
    const node = nodes.find(({ j }) => Math.abs(zero.u - j) <= 1e-9);
    if (node !== undefined) {
      const file = filesAt(own.energy, parameter, node.value).join(', ');
      return { versal: versalAt(crossing, zero, node.j), file };
    }
    const sources = (end: 0 | 1) =>
      numberedFamilies(pieces[pieceAt(zero.value)]!.energy)
        .filter((f) => f.parameter === parameter)
        .map((f) => f.nodes[end]!.matrix.source)
        .join(', ');
    return { versal: crossing.versal, between: [sources(0), sources(1)] };
  };
  /** At a file the family has a slope on each side: versal where both are and the inertia changes. */
  const versalAt = (crossing: Seen, zero: Zero, j: number): boolean | null => {
    const { inertiaBefore: a, inertiaAfter: b } = crossing;
    const changes = a.positive !== b.positive || a.negative !== b.negative;
    if (crossing.versal !== true || j === 0 || j === count) return crossing.versal;
    if (!changes) return false;
    const element = zero.closed?.element;
    if (exact === undefined || element === undefined) return crossing.versal;
    const seen = floatingEvent(family, blocks(zero.point));
    const k = pieces.findIndex((p) => p.start === j);
    return [exact.families[k - 1]!, exact.families[k]!].every((f) => exactEvent(f, element, seen)?.versal === true);
  };
  return {
    family,
    curve,
    blocks,
    place: (u) => at(muAt(u)),
    zeros,
    named,
    table: (tracked) => ({
      parameter,
      note: INTERPOLATED,
      points: nodes.map(({ value, j }) => ({
        value: rationals.format(value),
        at: rationals.toNumber(value),
        files: filesAt(own.energy, parameter, value),
        inertia: inertiaAt(family, blocks(curve.points[j]!)),
        eigenvalues: family.flow.map((_, i) => ({
          component: family.flowLabels[i]!.join(' + '),
          values: [...tracked.values[i]![j]!].sort((a, b) => a.im - b.im || a.re - b.re),
        })),
      })),
    }),
  };
}

/** The parameter at a real number u: point j of the curve at u = j. */
function placesOf(pieces: readonly Piece[]): (u: number) => number {
  const { steps } = pieces[0]!.range;
  return (u) => {
    const { range, start } = pieces[Math.min(Math.max(Math.floor(u / steps), 0), pieces.length - 1)]!;
    const t = (u - start) / steps;
    return t >= 1 ? range.to : range.from + Math.max(t, 0) * (range.to - range.from);
  };
}

/** Points from piece to piece; every listed value is one of them. */
function curveOf(at: (mu: number) => CurvePoint, muAt: (u: number) => number, count: number): Curve {
  const points = Array.from({ length: count + 1 }, (_, j) => at(muAt(j)));
  const between = (i: number, theta: number) => at(points[i]!.mu + theta * (points[i + 1]!.mu - points[i]!.mu));
  return { points, between, followed: false, ends: [] };
}

interface ExactPieces {
  readonly family: SweepFamily;
  readonly families: readonly SweepFamily[];
  readonly blocks: readonly ((p: CurvePoint) => BlocksAt)[];
}

/** S on each piece as a rational function of the parameter; undefined where the model is not exact. */
function exactPieces(declaration: Declaration, pieces: readonly Piece[], whole: Range): ExactPieces | undefined {
  if (declaration.numbers === 'floating' || floatingSource(declaration.energy) !== undefined) return undefined;
  const { parameter } = whole;
  const cut = ({ range, energy }: Piece): Declaration => ({
    ...declarationAt(declaration, new Map([[parameter, rationals.format(range.low)]])),
    energy,
    range: new Map([[parameter, { from: rationals.format(range.low), to: rationals.format(range.high), steps: range.steps }]]),
  });
  try {
    const first = sweepFamily(cut(pieces[0]!));
    if (first.rational === undefined) return undefined;
    const families = pieces.map((piece, k) => (k === 0 ? first : familyWithEnergy(first, cut(piece), piece.range)));
    const at = declarationAt(
      declaration,
      declaration.parameters.has(parameter) ? new Map() : new Map([[parameter, rationals.format(whole.low)]]),
    );
    const family: SweepFamily = { ...first, declaration: at, range: whole, ranges: [whole], declaredValue: undefined };
    return { family, families, blocks: families.map(blockEvaluator) };
  } catch (error) {
    if (!(error instanceof NotInvariantError)) throw error;
    nameTheFile(declaration, whole);
    throw error;
  }
}

/** Throws NotInvariantError with the name of the file whose matrix is not invariant, where doubles can tell. */
function nameTheFile(declaration: Declaration, whole: Range): void {
  const numeric = numericPieces(declaration, whole);
  const { parameter } = whole;
  const points = listedValues(declaration.energy, parameter).map((value) => {
    const mu = rationals.toNumber(value);
    return { point: { mu, x: numeric.family.pointAt(mu) }, files: filesAt(declaration.energy, parameter, value).join(', ') };
  });
  requireHeld(numeric.family, numeric, points);
}

function numericPieces(declaration: Declaration, whole: Range): FloatingMatrices {
  const inFile = floatingSource(declaration.energy);
  const because =
    inFile === undefined ? 'floating numbers were asked for, or its values have no exact form' : `${inFile} holds floating numbers`;
  return floatingMatrices(sweepFamily(declaration, because), whole);
}

/** Whether each file is invariant under the generators and the point an equilibrium at it. Throws with the name of the file. */
function requireHeld(
  family: SweepFamily,
  { hessian, levels }: FloatingMatrices,
  points: readonly { readonly point: CurvePoint; readonly files: string }[],
): void {
  const n = family.names.length;
  const tolerance = family.tolerance!;
  const unit = Float64Array.from({ length: n }, (_, i) => 1 / Math.sqrt(levels[i]!));
  const generators = family.action.generators.map((g) => ({ name: g.name, matrix: numberSparse(g.matrix, family.action.field, unit) }));
  for (const { point, files } of points) {
    const plain = hessian(point.mu);
    const s = numberMatrix(
      n,
      n,
      plain.data.map((x, k) => x * unit[Math.floor(k / n)]! * unit[k % n]!),
    );
    const size = { ...s, data: s.data.map(Math.abs) };
    for (const { name, matrix } of generators) {
      const spread = { index: matrix.index, value: matrix.value.map((row) => row.map(Math.abs)) };
      const bound = tolerance * Math.max(largestEntry(s), largestEntry(congruenceNumeric(spread, size)));
      const difference = numberCombine(congruenceNumeric(matrix, s), s, -1);
      const worst = difference.data.findIndex((x) => Math.abs(x) > bound);
      if (worst < 0) continue;
      const [a, b] = [Math.floor(worst / n), worst % n];
      throw new NotInvariantError(
        `${files} is not invariant under ${name}: the coefficient of ${family.names[b]}*${family.names[a]} changes`,
        {
          file: files,
          value: name,
          expected: 'matrices in every file that each generator leaves invariant',
          next: 'correct the file, or declare a smaller group',
        },
      );
    }
    const gradient = Float64Array.from({ length: n }, (_, i) => point.x.reduce((sum, x, j) => sum + plain.data[i * n + j]! * x, 0));
    const largest = point.x.reduce((m, x, j) => Math.max(m, Math.abs(x) / unit[j]!), 0);
    if (gradient.some((g, i) => Math.abs(g) * unit[i]! > tolerance * largest))
      throw new NotAnEquilibriumError(`the point is not an equilibrium with ${files}`, {
        file: family.declaration.source,
        key: 'equilibrium',
        expected: 'the origin, or a point in the kernel of every matrix',
        next: 'leave equilibrium out',
      });
  }
}

/** Eigenvalues above this share of S are not zero. */
const MARGIN = 1e-6;

/**
 * Whether each component is definite at both ends of a piece, with one sign. Where S is linear in the parameter the
 * least eigenvalue is concave and the largest convex, so that there is no zero in between.
 */
function isDefinite(family: SweepFamily, ends: readonly BlocksAt[]): boolean {
  return family.adapted.every((_, i) => {
    const [a, b] = ends.map((at): number => {
      const m = at.component(i);
      const { values } = symmetricEigen(m.data, m.rows);
      const cut = MARGIN * largestEntry(m);
      return values.every((x) => x > cut) ? 1 : values.every((x) => x < -cut) ? -1 : 0;
    });
    return a !== 0 && a === b;
  });
}

/** Zeros of all pieces; one that is found from both sides of a file is one. */
function joinedZeros({ family: whole, families, blocks }: ExactPieces, curve: Curve, pieces: readonly Piece[]): Zeros {
  const linear = isPiecewiseLinear(whole.declaration, whole.range.parameter);
  const found = families.map((family, k): Zeros => {
    const { start, range } = pieces[k]!;
    const ends = [start, start + range.steps].map((j) => blocks[k]!(curve.points[j]!));
    return linear && isDefinite(family, ends) ? { zeros: [], singular: [] } : zerosOfFamily(family, blocks[k]!);
  });
  const zeros: Zero[] = [];
  found.forEach((part, k) => {
    for (const zero of part.zeros) {
      const u = pieces[k]!.start + zero.u;
      const before = zeros.at(-1);
      if (before !== undefined && before.value === zero.value && Math.abs(before.u - u) <= 1e-9) {
        const components = [...new Set([...before.components, ...zero.components])].sort((a, b) => a - b);
        zeros[zeros.length - 1] = { ...before, components };
      } else zeros.push({ ...zero, u });
    }
  });
  const singular = found[0]!.singular.filter((label) => found.every((part) => part.singular.includes(label)));
  return { zeros, singular };
}
