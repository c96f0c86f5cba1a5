/** What a result of codim must agree with; every disagreement as one line. */
import type { Expected } from './brute-force.ts';

// biome-ignore lint/suspicious/noExplicitAny: a parsed result of the program
export type Result = any;

const sortKey = (x: { order: number; reversing: number; conjugates: number; codimension: number }): string =>
  [x.order, x.reversing, x.conjugates, x.codimension].join('/');

export function compareCodim(got: Result, want: Expected): string[] {
  const wrong: string[] = [];
  const same = (name: string, a: unknown, b: unknown): void => {
    if (JSON.stringify(a) !== JSON.stringify(b)) wrong.push(`${name}: got ${JSON.stringify(a)}, expected ${JSON.stringify(b)}`);
  };
  same('group', [got.group.order, got.group.reversing], [want.order, want.reversing]);
  same(
    'inertia',
    [got.inertia.positive, got.inertia.zero, got.inertia.negative],
    [want.inertia.positive, want.inertia.zero, want.inertia.negative],
  );
  same('zero', got.zero === null, want.zero === null);
  if (got.zero !== null && want.zero !== null) {
    for (const k of ['dimension', 'kernel', 'blocks', 'codimension', 'codimensionWithoutSymmetry'] as const)
      same(`zero.${k}`, got.zero[k], want.zero[k]);
    const motion = want.zero.codimension !== 1 ? 'degenerate' : want.zero.blocks.every((b) => b === 1) ? 'passes' : 'splits';
    same('zero.motion', got.zero.motion, motion);
    same(
      'zero.semisimple',
      got.zero.semisimple,
      want.zero.blocks.every((b) => b === 1),
    );
    same('subgroups', got.zero.subgroups.map(sortKey).sort(), want.zero.subgroups.map(sortKey).sort());
    same('verdict', got.verdict.answer, want.zero.codimension <= got.verdict.parameters ? 'generic' : 'not generic');
  } else if (want.zero === null) same('verdict', got.verdict.answer, 'no event');
  same(
    'Σ collisions.codimension',
    got.collisions.reduce((s: number, c: Result) => s + c.codimension, 0),
    want.collisions,
  );
  return wrong;
}
export function compareComponents(got: Result, want: Expected, n: number): string[] {
  const wrong: string[] = [];
  const same = (name: string, a: unknown, b: unknown): void => {
    if (JSON.stringify(a) !== JSON.stringify(b)) wrong.push(`${name}: got ${JSON.stringify(a)}, expected ${JSON.stringify(b)}`);
  };
  const sum = (list: Result[], f: (x: Result) => number): number => list.reduce((s, x) => s + f(x), 0);
  const beta = { real: 1, complex: 2, quaternionic: 4 } as Record<string, number>;
  same(
    'Σ multiplicity·dimension',
    sum(got.components, (c) => c.multiplicity * c.dimension),
    n,
  );
  same(
    'Σ dim of invariant forms',
    sum(got.components, (c) => c.multiplicity + (beta[c.type]! * c.multiplicity * (c.multiplicity - 1)) / 2),
    want.dimP,
  );
  same(
    'Σ dimensionOfClass',
    sum(got.classes, (c) => c.dimensionOfClass),
    want.dimP,
  );
  same(
    'Σ dimensionOfGroup',
    sum(got.classes, (c) => c.dimensionOfGroup),
    want.dimG,
  );
  return wrong;
}
