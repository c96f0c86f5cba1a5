/** Names and readable forms of invariants: in real coordinates always, in z and z̄ where the action has planes. */
import { factorsOf, type Monomial } from '../polynomial/index.ts';
import type { Generator, Readable } from './generator.ts';
import { total } from './parameter-plan.ts';
import type { FoundGenerator } from './piece-search.ts';
import type { BasisElement, InvariantSpaces } from './reynolds.ts';

/** What the complex coordinates mean: `z = q1 + i*q2`. */
export interface ComplexCoordinate {
  readonly name: string;
  readonly x: string;
  readonly y: string;
}

/** The complex coordinates of an action with planes, none for other actions. */
export function complexCoordinates(spaces: InvariantSpaces): ComplexCoordinate[] {
  const planes = spaces.letters?.planes ?? [];
  const { names } = spaces.action;
  const taken = new Set(names);
  const pick = (i: number) => (planes.length <= 2 && !taken.has('z') && !taken.has('w') ? ['z', 'w'][i]! : `z${i + 1}`);
  return planes.map(([x, y], i) => ({ name: pick(i), x: names[x]!, y: names[y]! }));
}

/** Terms of an orbit sum beyond which the complex form is left out. */
const COMPLEX_TERMS_MOST = 4;

export function describeElement(spaces: InvariantSpaces, element: BasisElement): Readable {
  const real = spaces.ring.format(element.polynomial);
  const realLatex = spaces.ring.latex(element.polynomial);
  const complex = complexForm(spaces, element, false);
  return { real, realLatex, complex, complexLatex: complex === undefined ? undefined : complexForm(spaces, element, true) };
}

function complexForm(spaces: InvariantSpaces, { orbit }: BasisElement, latex: boolean): string | undefined {
  const { letters } = spaces;
  if (letters === undefined || orbit === undefined || letters.planes.length === 0 || orbit.part === 'all') return undefined;
  if (orbit.monomials.length > COMPLEX_TERMS_MOST || orbit.phases.some((k) => k !== orbit.phases[0])) return undefined;
  const quarter = (4 * orbit.phases[0]!) / letters.order;
  if (!Number.isInteger(quarter)) return undefined;
  // Re(i^k f) is Re f, -Im f, -Re f, Im f; signs are dropped, as they were when the polynomial was made primitive
  const imaginary = (quarter % 2 === 1) !== (orbit.part === 'imaginary');
  const coordinates = complexCoordinates(spaces);
  const parts = orbit.monomials.map((m) => writeLetters(spaces, m, coordinates, latex));
  if (!imaginary && parts.every((p) => p.phase === '')) return parts.map((p) => p.modulus).join(' + ');
  const operator = latex ? (imaginary ? '\\operatorname{Im}' : '\\operatorname{Re}') : imaginary ? 'Im' : 'Re';
  if (parts.length === 1) {
    const { modulus, phase } = parts[0]!;
    const body = latex ? `${operator} ${/[ +]/.test(phase) ? `(${phase})` : phase}` : `${operator}(${phase})`;
    return modulus === '' || modulus === '1' ? body : latex ? `${modulus} ${body}` : `${modulus}*${body}`;
  }
  const inner = parts.map((p) => [p.modulus, p.phase].filter((s) => s !== '' && s !== '1').join(latex ? ' ' : '*')).join(' + ');
  return `${operator}(${inner})`;
}

/** A monomial in letters as |z|^2a times real coordinates, and the rest. */
function writeLetters(
  spaces: InvariantSpaces,
  m: Monomial,
  coordinates: readonly ComplexCoordinate[],
  latex: boolean,
): { modulus: string; phase: string } {
  const factors = new Map(factorsOf(m));
  const { planes } = spaces.letters!;
  const power = (base: string, e: number) => (e === 1 ? base : latex ? `${base}^{${e}}` : `${base}^${e}`);
  const modulus: string[] = [];
  const phase: string[] = [];
  const inPlane = new Set(planes.flat());
  for (const [v, e] of factors) if (!inPlane.has(v)) modulus.push(power(spaces.action.names[v]!, e));
  planes.forEach(([x, y], i) => {
    const a = factors.get(x) ?? 0;
    const b = factors.get(y) ?? 0;
    const name = latex ? coordinates[i]!.name.replace(/(\d+)$/, '_{$1}') : coordinates[i]!.name;
    const bar = latex ? `\\bar{${name}}` : `conj(${name})`;
    const common = Math.min(a, b);
    if (common > 0) modulus.push(power(`|${name}|`, 2 * common));
    if (a > common) phase.push(power(name, a - common));
    if (b > common) phase.push(power(bar, b - common));
  });
  const times = latex ? ' ' : '*';
  return { modulus: modulus.join(times) || (phase.length === 0 ? '1' : ''), phase: phase.join(times) };
}

/**
 * Names by degree, then multidegree, then as found. On one plane: I for |z|^2, R for the first real part, S for the
 * first imaginary part; else I1, I2, …
 */
export function nameGenerators(spaces: InvariantSpaces, found: readonly FoundGenerator[], reserved: readonly string[]): Generator[] {
  const taken = new Set([...reserved, ...spaces.action.names]);
  const sorted = [...found].sort((a, b) => total(a.degrees) - total(b.degrees) || compareDown(a.degrees, b.degrees));
  const readable = sorted.map((g) => describeElement(spaces, g.element));
  const short = spaces.letters?.planes.length === 1 && spaces.action.dimension === 2 ? shortNames(readable) : undefined;
  const usable = short?.every((n) => !taken.has(n)) ? short : undefined;
  let prefix = 'I';
  while (sorted.some((_, i) => taken.has(`${prefix}${i + 1}`))) prefix += 'I';
  return sorted.map((g, i) => ({
    name: usable?.[i] ?? `${prefix}${i + 1}`,
    degree: total(g.degrees),
    degrees: g.degrees,
    polynomial: g.element.polynomial,
    readable: readable[i]!,
  }));
}

function shortNames(list: readonly Readable[]): string[] | undefined {
  const out = list.map((r) =>
    r.complex?.startsWith('|z|^2') ? 'I' : r.complex?.startsWith('Re') ? 'R' : r.complex?.startsWith('Im') ? 'S' : '',
  );
  return out.includes('') || new Set(out).size < out.length ? undefined : out;
}

function compareDown(a: readonly number[], b: readonly number[]): number {
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return b[i]! - a[i]!;
  return 0;
}
