/**
 * The core of a result that is compared with the golden one: group, components, event, counts and degrees, with floating
 * numbers rounded. Bases, expressions in them, certificates and pictures are left out: they are a choice, or long.
 */
import type { SymcodimError } from '../../src/errors/index.ts';

type Plain = Record<string, unknown>;

const DIGITS = 9;
const NEARLY_ZERO = 1e-9;

const round = (x: number): number => (Math.abs(x) < NEARLY_ZERO ? 0 : Number(x.toPrecision(DIGITS)));

/** Plain data with every number rounded and undefined left out. */
export function rounded(value: unknown): unknown {
  if (typeof value === 'number') return round(value);
  if (Array.isArray(value)) return value.map(rounded);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .filter(([, v]) => v !== undefined)
      .map(([k, v]) => [k, rounded(v)]),
  );
}

const pick = (from: unknown, ...keys: string[]): Plain =>
  Object.fromEntries(keys.filter((k) => (from as Plain)[k] !== undefined).map((k) => [k, (from as Plain)[k]]));

const list = (value: unknown): Plain[] => (Array.isArray(value) ? (value as Plain[]) : []);
const count = (value: unknown): number => list(value).length;

/** Equal texts gathered, each with how often it occurs, in order of the alphabet. */
function gathered(texts: readonly string[]): string[] {
  const times = new Map<string, number>();
  for (const text of texts) times.set(text, (times.get(text) ?? 0) + 1);
  return [...times]
    .sort(([a], [b]) => a.localeCompare(b, 'en', { numeric: true }))
    .map(([text, n]) => (n === 1 ? text : `${n} times ${text}`));
}

const inertia = (value: unknown): string => {
  const { positive, zero, negative } = value as { positive: number; zero: number; negative: number };
  return `+${positive} 0:${zero} -${negative}`;
};

const components = (value: unknown) =>
  list(value).map((c) =>
    [
      `${c.multiplicity} ${c.label}`,
      `dimension ${c.dimension}`,
      `${c.type}`,
      ...(c.carriesForm === true ? ['carries a form'] : []),
      ...(c.flowsTo === c.label ? [] : [`flows to ${c.flowsTo}`]),
      ...(c.inertia === undefined ? [] : [inertia(c.inertia)]),
    ].join(', '),
  );

const classes = (value: unknown) =>
  list(value).map((c) =>
    pick(c, 'number', 'algebra', 'subalgebra', 'components', 'dimensionOfClass', 'dimensionOfGroup', 'signature', 'copies'),
  );

const degrees = (value: unknown) => gathered(list(value).map((g) => `degree ${g.degree}`));

const zero = (value: unknown) => {
  if (value === null) return null;
  const z = value as Plain;
  return {
    ...pick(
      z,
      'dimension',
      'kernel',
      'blocks',
      'semisimple',
      'codimension',
      'codimensionWithoutSymmetry',
      'motion',
      'components',
      'signs',
      'routes',
    ),
    subgroups: gathered(
      list(z.subgroups).map((s) => `order ${s.order}, ${s.reversing} reversing, ${s.conjugates} conjugates: ${s.codimension} ${s.motion}`),
    ),
    unfolding: z.unfolding === undefined ? undefined : count(z.unfolding),
    unfoldingWithoutSymmetry: z.unfoldingWithoutSymmetry === undefined ? undefined : count(z.unfoldingWithoutSymmetry),
  };
};

const collisions = (value: unknown) =>
  list(value).map((c) =>
    pick(
      c,
      'kind',
      'value',
      'exact',
      'multiplicity',
      'blocks',
      'signature',
      'codimension',
      'codimensionWithoutSymmetry',
      'motion',
      'components',
    ),
  );

const spectrum = (value: unknown) => list(value).map((s) => pick(s, 'components', 're', 'im', 'multiplicity', 'krein'));

/** Distance of the equilibrium found on a branch from the one it leaves. */
function amplitude(branch: Plain, centre: Plain): number | undefined {
  const found = branch.found as { point: Record<string, number> } | undefined;
  if (found === undefined) return undefined;
  return Number(Math.hypot(...Object.entries(found.point).map(([name, x]) => x - number(centre[name]))).toPrecision(5));
}

/** A coordinate of the equilibrium of a sample whose branches are followed: an integer or a fraction. */
function number(value: unknown): number {
  const [over, under = '1'] = `${value ?? 0}`.split('/');
  const result = Number(over) / Number(under);
  if (Number.isNaN(result)) throw new RangeError(`${value} is no fraction`);
  return result;
}

const reduced = (value: unknown) => {
  if (value === null) return null;
  const r = value as Plain;
  return {
    ...pick(r, 'leadingDegree', 'codimension', 'moduli', 'stratumCodimension', 'determinedAt', 'degree', 'generic', 'because', 'kinetic'),
    coordinates: count(r.coordinates),
    invariants: list(r.invariants).map((i) => i.name),
    unfolding: count(r.unfolding),
  };
};

const branches = (value: unknown, centre: Plain) =>
  list(value).map((b) => ({
    ...pick(b, 'isotropyOrder', 'axial', 'copies', 'side', 'morseIndex', 'confirmed', 'exponent', 'stability'),
    amplitude: amplitude(b, centre),
  }));

const crossings = (value: unknown) =>
  list(value).map((c) => ({
    ...pick(
      c,
      'parameter',
      'value',
      'exact',
      'component',
      'kernel',
      'dimension',
      'blocks',
      'motion',
      'codimension',
      'codimensionWithoutSymmetry',
    ),
    ...pick(c, 'versal', 'observed', 'agrees', 'arithmetic', 'fold'),
    inertiaBefore: inertia(c.inertiaBefore),
    inertiaAfter: inertia(c.inertiaAfter),
  }));

const chart = (value: unknown) =>
  value === undefined
    ? undefined
    : { ...pick(value, 'parameters', 'ranges'), curves: gathered(list((value as Plain).curves).map((c) => `${c.component}`)) };

const counted = (value: unknown) => ({
  ...pick(value, 'numerator', 'denominator', 'series'),
  ...((value as Plain).generators === undefined ? {} : { generators: degrees((value as Plain).generators) }),
});

/** What is kept of each key of a result; keys without an entry are left out. */
const KEYS: Readonly<Record<string, (value: unknown, result: Plain) => unknown>> = {
  command: (v) => v,
  arithmetic: (v) => v,
  floatingBecause: (v) => v,
  field: (v) => v,
  caution: (v) => v !== undefined,
  group: (v) => pick(v, 'name', 'order', 'reversing'),
  equilibrium: (v) => (v as Plain).holds,
  symmetry: (v) => (v as Plain).holds,
  invarianceDegree: (v) => v,
  failures: (v) => v,
  symbols: (v) => v,
  components,
  classes,
  inertia,
  neutral: (v) => pick(v, 'dimension'),
  zero,
  collisions: (v, result) => (result.command === 'sweep' ? v : collisions(v)),
  spectrum,
  stability: (v) => v,
  verdict: (v) => v,
  molien: counted,
  equivariants: counted,
  generators: degrees,
  complete: (v) => v,
  relations: count,
  hamiltonian: (v) => pick(v, 'remainder', 'degree'),
  reduced,
  parameter: (v) => v,
  isotropy: (v) => list(v).map((i) => pick(i, 'order', 'conjugates', 'fixedDimension', 'axial')),
  branches: (v, result) => branches(v, ((result.equilibrium as Plain).point ?? {}) as Plain),
  undecided: (v) => v,
  topologicalDegree: (v) => v,
  range: (v) => v,
  followed: (v) => v,
  crossings,
  singular: (v) => v,
  chart,
  ends: (v) => v,
};

export function coreOf(result: Readonly<Plain>): unknown {
  const kept = Object.entries(KEYS).filter(([key]) => result[key] !== undefined);
  return rounded(Object.fromEntries(kept.map(([key, keep]) => [key, keep(result[key], result)])));
}

/** A question that has no answer for the model: what the program says then. */
export const refusalOf = (error: SymcodimError): unknown => ({ refused: error.name, message: error.message });

/** The outline of a report in Markdown: its headings and captions, and how many rows each table has. */
export function outlineOf(markdown: string): unknown {
  const outline: string[] = [];
  let rows = 0;
  const close = () => {
    if (rows > 0) outline.push(`table of ${rows - 2} rows`);
    rows = 0;
  };
  for (const line of markdown.split('\n')) {
    if (line.startsWith('|')) {
      if (rows === 0) outline.push(line);
      rows++;
      continue;
    }
    close();
    if (/^#+ |^\*\*/.test(line)) outline.push(line);
  }
  close();
  return { outline };
}
