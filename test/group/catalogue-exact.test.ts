/** The texts of the catalogue as exact numbers: orthogonality and defining relations hold without rounding. */
import { describe, expect, it } from 'vitest';
import { type Algebraic, RealField, rational } from '../../src/field/index.ts';
import { type CatalogueAction, loadCatalogueGroup } from '../../src/group/catalogue.ts';
import { equals, fromRows, identity, type Matrix, multiply, transpose } from '../../src/linear/index.ts';
import { fold, parseExpression } from '../../src/model/expression/index.ts';

/** Value of a constant expression in a field; a multiple of pi is kept as the rational factor. */
function exact(field: RealField, text: string): Algebraic {
  type Part = { readonly value: Algebraic; readonly pi: boolean };
  const ratio = (a: Algebraic) => ({ n: Number(a.c[0]!), d: Number(a.d) });
  const part = fold<Part>(parseExpression(text), (e, parts) => {
    const [a, b] = parts;
    const pi = parts.some((p) => p.pi);
    switch (e.kind) {
      case 'number':
        return { value: field.fromRational(e.n, e.d), pi: false };
      case 'pi':
        return { value: field.one, pi: true };
      case 'sum':
        return { value: parts.reduce((x, p) => field.add(x, p.value), field.zero), pi };
      case 'product':
        return { value: parts.reduce((x, p) => field.mul(x, p.value), field.one), pi };
      case 'negate':
        return { value: field.neg(a!.value), pi };
      case 'quotient':
        return { value: field.mul(a!.value, field.inv(b!.value)), pi };
      case 'call': {
        const { n, d } = ratio(a!.value);
        // the argument is (n/d) pi = 2 pi n/(2d)
        const value =
          e.name === 'sqrt' ? field.sqrt(rational(BigInt(n), BigInt(d))) : e.name === 'cos' ? field.cos(n, 2 * d) : field.sin(n, 2 * d);
        if (value === undefined) throw new Error(`${text} is not in ${field.name}`);
        return { value, pi: false };
      }
      default:
        throw new Error(`${e.kind} in ${text}`);
    }
  });
  return part.value;
}

function exactMatrices(field: RealField, action: CatalogueAction): Map<string, Matrix<Algebraic>> {
  return new Map(
    [...action.matrices].map(([g, rows]) => [
      g,
      fromRows(
        field,
        rows.map((row) => row.map((x) => exact(field, x))),
      ),
    ]),
  );
}

/** The product of a word like `srsr`, one letter per generator. */
const word = (m: ReadonlyMap<string, Matrix<Algebraic>>, letters: string, n: number): Matrix<Algebraic> =>
  [...letters].map((g) => m.get(g)!).reduce(multiply, identity([...m.values()][0]!.field, n));

/**
 * [group, action, field demand, relations]: each relation is a word that must be 1, repeated so often. Presentations: Coxeter & Moser,
 * Generators and Relations for Discrete Groups (1980), sections 1 and 6 and table 1 (from memory), in the letters of the catalogue.
 */
const RELATIONS: readonly (readonly [
  string,
  string,
  { cosines?: number[]; squareRoots?: bigint[] },
  readonly (readonly [string, number])[],
])[] = [
  ['cyclic:7', 'plane', { cosines: [28] }, [['r', 7]]],
  [
    'dihedral:1',
    'plane',
    {},
    [
      ['r', 1],
      ['s', 2],
    ],
  ],
  [
    'dihedral:5',
    'plane',
    { cosines: [20] },
    [
      ['r', 5],
      ['s', 2],
      ['rs', 2],
    ],
  ],
  [
    'dihedral:12',
    'plane',
    { cosines: [12] },
    [
      ['r', 12],
      ['s', 2],
      ['rs', 2],
    ],
  ],
  [
    'dihedral:5',
    'ring',
    {},
    [
      ['r', 5],
      ['s', 2],
      ['rs', 2],
    ],
  ],
  [
    'dihedral:3',
    'ring*plane',
    { cosines: [12] },
    [
      ['r', 3],
      ['s', 2],
      ['rs', 2],
    ],
  ],
  [
    'icosahedral',
    'space',
    { squareRoots: [5n] },
    [
      ['r', 5],
      ['c', 3],
      ['rc', 2],
    ],
  ],
  [
    'icosahedral',
    'permutation',
    {},
    [
      ['r', 5],
      ['c', 3],
      ['rc', 2],
    ],
  ],
  [
    'octahedral',
    'space',
    {},
    [
      ['r', 4],
      ['c', 3],
      ['rc', 2],
    ],
  ],
  [
    'tetrahedral',
    'space',
    {},
    [
      ['d', 2],
      ['c', 3],
      ['dc', 3],
    ],
  ],
  [
    'quaternion',
    'left',
    {},
    [
      ['i', 4],
      ['iijj', 1],
      ['ijij', 2],
      ['jiji', 2],
    ],
  ],
  [
    'dicyclic:5',
    'left',
    { cosines: [20] },
    [
      ['a', 10],
      ['aaaaajj', 1],
      ['j', 4],
    ],
  ],
  [
    'binary-icosahedral',
    'left',
    { squareRoots: [5n] },
    [
      ['v', 10],
      ['w', 6],
      ['vvvvvwww', 1],
    ],
  ],
  [
    'binary-octahedral',
    'left',
    { squareRoots: [2n] },
    [
      ['v', 8],
      ['w', 6],
      ['vvvvwww', 1],
    ],
  ],
  [
    'coxeter:H3',
    'space',
    { squareRoots: [5n] },
    [
      ['a', 2],
      ['b', 2],
      ['c', 2],
      ['ab', 5],
      ['bc', 3],
      ['ac', 2],
    ],
  ],
  [
    'coxeter:H4',
    'space',
    { squareRoots: [5n] },
    [
      ['ab', 5],
      ['bc', 3],
      ['cd', 3],
      ['ac', 2],
      ['ad', 2],
      ['bd', 2],
    ],
  ],
  [
    'coxeter:F4',
    'space',
    {},
    [
      ['ab', 3],
      ['bc', 4],
      ['cd', 3],
      ['ac', 2],
      ['ad', 2],
      ['bd', 2],
    ],
  ],
];

describe('exact matrices', () => {
  it.each(RELATIONS)('%s, %s: orthogonal, and the relations hold exactly', (name, of, demand, relations) => {
    const field = RealField.of(demand);
    const action = loadCatalogueGroup(name).action(of);
    const m = exactMatrices(field, action);
    const one = identity<Algebraic>(field, action.dimension);
    for (const a of m.values()) expect(equals(multiply(transpose(a), a), one)).toBe(true);
    for (const [letters, times] of relations) {
      expect(equals(word(m, letters.repeat(times), action.dimension), one), `${letters}^${times}`).toBe(true);
      for (let k = 1; k < times; k++)
        if (times % k === 0) expect(equals(word(m, letters.repeat(k), action.dimension), one), `${letters}^${k}`).toBe(false);
    }
  });

  it('standard actions of S_2 … S_9: orthogonal over Q(sqrt N), the cycle has order N, the swap 2, their product N - 1', () => {
    for (let n = 2; n <= 9; n++) {
      const field = RealField.of({ squareRoots: [BigInt(n)] });
      const m = exactMatrices(field, loadCatalogueGroup(`symmetric:${n}`).action('standard'));
      const [cycle, swap] = [m.get('cycle')!, m.get('swap')!];
      const one = identity<Algebraic>(field, n - 1);
      const order = (a: Matrix<Algebraic>) => {
        let power = a;
        for (let k = 1; ; k++, power = multiply(power, a)) if (equals(power, one)) return k;
      };
      for (const a of m.values()) expect(equals(multiply(transpose(a), a), one)).toBe(true);
      expect([order(cycle), order(swap), order(multiply(swap, cycle))]).toEqual([n, 2, n - 1]);
    }
  });
});
