/**
 * Collisions of exact models. A modular look at the characteristic polynomials of the blocks in y = λ² settles most models at once:
 * where each is as square-free as its class makes it and no two have a common root, nothing collides. Else the polynomials are taken
 * exactly; gcds say which roots coincide, characteristic polynomials of L² on the images of the powers of q(L²) give the Jordan blocks, and in
 * classes 2, 7, 8 those of LN, N = √ν I the compressed complex structure of χ, tell iω on χ from −iω.
 */
import { coordinateMap } from '../action/index.ts';
import { type Algebraic, type Rational, type RealField, rationals } from '../field/index.ts';
import { congruence, identity, image, inertia, kernel, type Matrix, multiply, scale, sub } from '../linear/index.ts';
import { type RealRoot, RealRoots, type Univariate, UnivariateRing } from '../polynomial/index.ts';
import { characteristicPolynomial, nonzeroSquares } from './characteristic.ts';
import type { ClusterPart, ClusterPlace } from './collisions.ts';
import { complexClass, genericMultiplicity, suspectBlocks } from './collisions-suspects.ts';
import type { EigenvalueKind } from './partition-codimension.ts';
import { type ComplexRoot, polynomialRoots } from './polynomial-roots.ts';
import type { BlockForms } from './zero-event.ts';

/** Blocks on larger multiplicity spaces are not taken exactly. */
export const COLLISION_BLOCK_LIMIT = 60;

interface Piece {
  readonly polynomial: Univariate<Algebraic>;
  readonly blocks: readonly number[];
}

/** Coprime square-free polynomials, each with the blocks in whose characteristic polynomial it occurs. */
function coprimePieces(squares: ReadonlyMap<number, Univariate<Algebraic>>, ring: UnivariateRing<Algebraic>): Piece[] {
  let pieces: Piece[] = [];
  for (const [block, g] of squares)
    for (const { factor } of ring.squareFree(g)) {
      let rest: Univariate<Algebraic> = factor;
      const next: Piece[] = [];
      for (const piece of pieces) {
        const common = piece.blocks.includes(block) || rest.length <= 1 ? [] : ring.gcd(piece.polynomial, rest);
        if (common.length <= 1) {
          next.push(piece);
          continue;
        }
        rest = ring.divide(rest, common).quotient;
        const left = ring.divide(piece.polynomial, common).quotient;
        if (left.length > 1) next.push({ ...piece, polynomial: left });
        next.push({ polynomial: common, blocks: [...piece.blocks, block] });
      }
      if (rest.length > 1) next.push({ polynomial: rest, blocks: [block] });
      pieces = next;
    }
  return pieces;
}

/** q(a) by Horner's rule. */
function evaluateAt(q: Univariate<Algebraic>, a: Matrix<Algebraic>): Matrix<Algebraic> {
  const one = identity<Algebraic>(a.field, a.rows);
  let out = scale(one, q.at(-1)!);
  for (let e = q.length - 2; e >= 0; e--) {
    const product = multiply(out, a);
    const c = q[e]!;
    out = { ...product, data: product.data.map((x, i) => (i % (a.rows + 1) === 0 ? a.field.add(x, c) : x)) };
  }
  return out;
}

/** How often a root occurs in a polynomial given by its square-free factors: that of the factor that is least there. */
function multiplicityIn(factors: readonly { readonly values: readonly number[]; readonly multiplicity: number }[], z: ComplexRoot): number {
  let best = 0;
  let least = Infinity;
  for (const { values, multiplicity } of factors) {
    let value = { re: 0, im: 0 };
    let size = 0;
    const radius = Math.hypot(z.re, z.im);
    for (let e = values.length - 1; e >= 0; e--) {
      value = { re: value.re * z.re - value.im * z.im + values[e]!, im: value.re * z.im + value.im * z.re };
      size = size * radius + Math.abs(values[e]!);
    }
    const relative = Math.hypot(value.re, value.im) / size;
    if (relative < least) {
      least = relative;
      best = multiplicity;
    }
  }
  // rounding of a root leaves far less than this, and another root of degree below a hundred far more
  return least < 1e-7 ? best : 0;
}

/** N = √ν I on the multiplicity space of an irreducible of complex type, with N² = −ν; undefined if none is at hand. */
function complexStructure(b: BlockForms, field: RealField): { n: Matrix<Algebraic>; root: number } | undefined {
  for (const o of b.block.operators) {
    if (o.sign !== 1) continue;
    const n = sub(o.matrix, o.inverse);
    const square = multiply(n, n);
    const nu = field.neg(square.data[0]!);
    if (field.sign(nu) <= 0) continue;
    const scalar = square.data.every((x, i) => field.equal(x, i % (square.cols + 1) === 0 ? field.neg(nu) : field.zero));
    if (scalar && b.block.cut === 2) return { n, root: Math.sqrt(field.toNumber(nu)) };
  }
  return undefined;
}

/** A block on the generalised eigenspaces of a piece, with the images of the powers of q(L²). */
interface Restricted {
  readonly block: BlockForms;
  readonly basis: Matrix<Algebraic>;
  readonly squares: Matrix<Algebraic>;
  /** Square-free factors of the characteristic polynomials of L², and of LN where there is N, on im q(L²)^k, k = 0, 1, … */
  readonly even: readonly (readonly { readonly values: readonly number[]; readonly multiplicity: number }[])[];
  readonly turned: readonly (readonly { readonly values: readonly number[]; readonly multiplicity: number }[])[] | undefined;
  readonly root: number;
}

function restricted(b: BlockForms, q: Univariate<Algebraic>, field: RealField, ring: UnivariateRing<Algebraic>): Restricted {
  const a = multiply(b.l, b.l);
  const value = evaluateAt(q, a);
  let power = value;
  let basis = kernel(power);
  for (;;) {
    power = multiply(power, value);
    const next = kernel(power);
    if (next.cols === basis.cols) break;
    basis = next;
  }
  const coordinates = coordinateMap(basis, field);
  const on = (m: Matrix<Algebraic>) => coordinates(multiply(m, basis));
  const squares = on(a);
  const nilpotent = on(value);
  const structure = complexClass(b.block.symmetryClass) ? complexStructure(b, field) : undefined;
  const turnedMap = structure === undefined ? undefined : on(multiply(b.l, structure.n));
  const factorsOf = (m: Matrix<Algebraic>) =>
    ring
      .squareFree(ring.trim(characteristicPolynomial(m)))
      .map(({ factor, multiplicity }) => ({ values: factor.map((c) => field.toNumber(c)), multiplicity }));
  const even: Restricted['even'][number][] = [];
  const turned: Restricted['even'][number][] = [];
  let space = identity<Algebraic>(field, basis.cols);
  while (space.cols > 0) {
    const inside = coordinateMap(space, field);
    even.push(factorsOf(inside(multiply(squares, space))));
    if (turnedMap !== undefined) turned.push(factorsOf(inside(multiply(turnedMap, space))));
    space = image(multiply(nilpotent, space));
  }
  return { block: b, basis, squares, even, turned: turnedMap === undefined ? undefined : turned, root: structure?.root ?? 0 };
}

/** Block sizes, descending, from the dimensions left in the images of the powers. */
function sizesFrom(multiplicities: readonly number[], unit: number): number[] {
  const counts = multiplicities.map((m, k) => (m - (multiplicities[k + 1] ?? 0)) / unit);
  // counts[k]: blocks of size > k
  return counts.flatMap((c, k) => new Array<number>(Math.max(0, Math.round(c - (counts[k + 1] ?? 0)))).fill(k + 1)).sort((x, y) => y - x);
}

/** Krein signatures of the negative roots of a piece, ascending, on the multiplicity space: from inertias of S(L² − a). */
function kreinSignatures(r: Restricted, separators: readonly Algebraic[], field: RealField): number[] {
  const s = congruence(r.basis, r.block.s);
  const signature = (form: Matrix<Algebraic>) => {
    const i = inertia(form, field);
    return i.positive - i.negative;
  };
  const values = [signature(s)];
  for (const a of separators) {
    const shifted = sub(r.squares, scale(identity<Algebraic>(field, r.squares.rows), a));
    values.push(signature(multiply(s, shifted)));
  }
  return values.slice(1).map((v, i) => (values[i]! - v) / 2);
}

function kindOf(y: ComplexRoot): EigenvalueKind {
  return y.im !== 0 ? 'quadruple' : y.re < 0 ? 'imaginary' : 'real';
}

/** λ in the closed first quadrant with λ² = y. */
export function eigenvalueOf(y: ComplexRoot): ComplexRoot {
  if (y.im === 0) return y.re < 0 ? { re: 0, im: Math.sqrt(-y.re) } : { re: Math.sqrt(y.re), im: 0 };
  const size = Math.hypot(y.re, y.im);
  return { re: Math.sqrt((size + y.re) / 2), im: Math.sqrt((size - y.re) / 2) };
}

/** The square root of |y| as text where y is a number of the field. */
function exactText(y: Algebraic, field: RealField): string {
  const size = field.sign(y) < 0 ? field.neg(y) : y;
  const text = field.format(size);
  const rational = /^(\d+)(?:\/(\d+))?$/.exec(text);
  if (rational !== null) {
    const root = (t: string) => {
      const n = BigInt(t);
      let r = BigInt(Math.floor(Math.sqrt(Number(n))));
      while (r * r > n) r--;
      while ((r + 1n) * (r + 1n) <= n) r++;
      return r * r === n ? r : undefined;
    };
    const [a, b] = [root(rational[1]!), root(rational[2] ?? '1')];
    if (a !== undefined && b !== undefined) return b === 1n ? `${a}` : `${a}/${b}`;
  }
  return `sqrt(${text})`;
}

/** Rational roots of a polynomial whose degree is above 1 split off, as linear factors. */
function withoutRationalRoots(piece: Piece, field: RealField, ring: UnivariateRing<Algebraic>): Piece[] {
  let rest = piece.polynomial;
  const out: Piece[] = [];
  if (rest.length > 2)
    for (const y of polynomialRoots(rest.map((c) => field.toNumber(c)))) {
      if (y.im !== 0 || rest.length <= 2) continue;
      for (let d = 1; d <= 60; d++) {
        const n = Math.round(y.re * d);
        if (Math.abs(n / d - y.re) > 1e-9 * Math.max(1, Math.abs(y.re)) || !Number.isSafeInteger(n)) continue;
        const root = field.fromRational(BigInt(n), BigInt(d));
        if (!field.isZero(ring.evaluate(rest, root))) break;
        const linear = [field.neg(root), field.one];
        rest = ring.divide(rest, linear).quotient;
        out.push({ ...piece, polynomial: linear });
        break;
      }
    }
  return rest.length > 1 ? [...out, { ...piece, polynomial: rest }] : out;
}

/** A rational number strictly between two neighbouring roots. */
function between(a: RealRoot, b: RealRoot, refine: (r: RealRoot, digits: number) => RealRoot): Rational {
  if (a.exact === undefined) return a.high;
  let next = b;
  for (let digits = 1; rationals.compare(next.low, a.exact) <= 0; digits *= 2) next = refine(b, digits);
  return rationals.mul(rationals.add(a.exact, next.low), { n: 1n, d: 2n });
}

function placesOfPiece(piece: Piece, forms: readonly BlockForms[], field: RealField, ring: UnivariateRing<Algebraic>): ClusterPlace[] {
  const q = piece.polynomial;
  const sturm = new RealRoots<Algebraic>(field);
  const isolated = q.length === 2 ? undefined : sturm.isolate(q);
  const roots = polynomialRoots(
    q.map((c) => field.toNumber(c)),
    isolated?.length ?? 1,
  );
  const negative = roots.filter((y) => y.im === 0 && y.re < 0).length;
  // a number between each negative root and the next one, or zero
  const separators = Array.from({ length: negative }, (_, i) => {
    if (isolated === undefined || i + 1 === negative) return field.zero;
    const at = between(isolated[i]!, isolated[i + 1]!, (r, digits) => sturm.refine(q, r, digits));
    return field.fromRational(at.n, at.d);
  });
  const parts = piece.blocks.map((number) => {
    const r = restricted(forms[number]!, q, field, ring);
    return { number, r, krein: negative > 0 ? kreinSignatures(r, separators, field) : [] };
  });
  const exact = q.length === 2 ? exactText(field.neg(field.div(q[0]!, q[1]!)), field) : null;
  return roots
    .filter((y) => y.im >= 0)
    .map((y): ClusterPlace => {
      const kind = kindOf(y);
      const lambda = eigenvalueOf(y);
      const position = roots.indexOf(y);
      return {
        kind,
        ...lambda,
        exact: kind === 'quadruple' ? null : exact,
        parts: parts.map(({ number, r, krein }): ClusterPart => {
          const { block } = r.block;
          // λ and −λ have the same square
          const sizes = sizesFrom(
            r.even.map((f) => multiplicityIn(f, y)),
            2,
          );
          const members: number[][] = [];
          if (complexClass(block.symmetryClass) && kind !== 'real') {
            if (r.turned === undefined) members.push([]);
            else
              for (const sign of [-1, 1] as const)
                members.push(
                  sizesFrom(
                    r.turned.map((f) => multiplicityIn(f, { re: sign * r.root * lambda.im, im: r.root * lambda.re })),
                    block.cut,
                  ),
                );
          } else {
            const unit = block.irreducible.beta === 4 ? block.cut / 2 : block.cut;
            members.push(perUnit(sizes, unit));
          }
          const dimension = sizes.reduce((s, x) => s + x, 0) * block.copies;
          const difference = (krein[position] ?? 0) / 2;
          return {
            block: number,
            classNumber: block.symmetryClass,
            members: members.filter((m) => m.length > 0),
            sizes: sizes.flatMap((s) => new Array<number>(block.copies).fill(s)),
            ...(kind === 'imaginary'
              ? { krein: [(dimension + difference * block.copies) / 2, (dimension - difference * block.copies) / 2] as const }
              : {}),
          };
        }),
      };
    });
}

/** One of each `unit` equal parts. */
function perUnit(sizes: readonly number[], unit: number): number[] {
  return sizes.filter((_, i) => i % unit === 0);
}

/**
 * The places of the spectrum off zero at which something may collide, exactly; undefined where a block is too large or too little is
 * known of its complex structure (then the numbers must do).
 */
export function exactPlaces(forms: readonly BlockForms[], field: RealField): ClusterPlace[] | undefined {
  const suspects = suspectBlocks(forms, field);
  if (suspects.length === 0) return [];
  if (suspects.some((i) => forms[i]!.l.rows > COLLISION_BLOCK_LIMIT)) return undefined;
  if (suspects.some((i) => complexClass(forms[i]!.block.symmetryClass) && complexStructure(forms[i]!, field) === undefined))
    return undefined;
  const ring = new UnivariateRing<Algebraic>(field);
  const squares = new Map(suspects.map((i) => [i, nonzeroSquares(characteristicPolynomial(forms[i]!.l), (x) => field.isZero(x))]));
  return coprimePieces(squares, ring)
    .filter(({ polynomial, blocks }) => {
      if (blocks.length > 1) return true;
      // alone and as simple as its class allows
      const [i] = blocks as [number];
      const { block } = forms[i]!;
      const expected = genericMultiplicity(block.symmetryClass, block.cut);
      const once = ring.power(polynomial, expected + 1);
      return ring.divide(squares.get(i)!, once).remainder.length === 0;
    })
    .flatMap((piece) => withoutRationalRoots(piece, field, ring))
    .flatMap((piece) => placesOfPiece(piece, forms, field, ring));
}
