import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors/index.ts';
import { denseTexts, parseMatrixMarket } from '../../../src/model/matrix-file/index.ts';

interface Case {
  readonly name: string;
  readonly text: string;
  readonly ok: boolean;
  readonly dense?: readonly (readonly string[])[];
}
// Fifteen small files with what scipy.io.mmread 1.10.1 makes of them.
const cases = JSON.parse(readFileSync(new URL('./matrix-market-cases.json', import.meta.url), 'utf8')) as Case[];
/** Cases that a reader of real matrices, strict on shape, refuses although scipy reads them. */
const refused = new Map([
  ['coordinate complex hermitian', /complex/],
  ['coordinate pattern general', /pattern/],
  ['symmetric but not square (error)', /square/],
]);

const numbers = (text: string): number[][] => denseTexts(parseMatrixMarket(text, 'a.mtx')).map((row) => row.map(Number));
const refusal = (text: string): InputError => {
  try {
    parseMatrixMarket(text, 'a.mtx');
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error(`not refused: ${text}`);
};
const REAL = '%%MatrixMarket matrix coordinate real general\n';

describe('Matrix Market exchange format (Boisvert, Pozo, Remington, NISTIR 5935, 1996)', () => {
  it('has all fifteen reference files', () => expect(cases).toHaveLength(15));
  for (const { name, text, ok, dense } of cases) {
    const reason = refused.get(name);
    if (ok && reason === undefined) {
      it(`reads: ${name}`, () => expect(numbers(text)).toEqual(dense!.map((row) => row.map(Number))));
    } else {
      it(`refuses: ${name}`, () => {
        const error = refusal(text);
        expect(error.culprit.file).toBe('a.mtx');
        expect(error.culprit.expected).toBeTruthy();
        expect(error.culprit.next).toBeTruthy();
        if (reason !== undefined) expect(error.message).toMatch(reason);
      });
    }
  }

  it('keeps integers exact whatever their size, and marks reals as floating', () => {
    const big = '123456789012345678901234567890';
    const whole = parseMatrixMarket(`%%MatrixMarket matrix array integer general\n1 1\n-${big}\n`, 'a.mtx');
    expect([whole.exact, whole.entries[0]!.text]).toEqual([true, `-${big}`]);
    expect(parseMatrixMarket(`${REAL}1 1 1\n1 1 2\n`, 'a.mtx').exact).toBe(false);
  });
  it('mirrors the stored triangle, with the sign for skew-symmetric', () => {
    const text = '%%MatrixMarket matrix coordinate integer skew-symmetric\n2 2 1\n2 1 -7\n';
    expect(denseTexts(parseMatrixMarket(text, 'a.mtx'))).toEqual([
      ['0', '7'],
      ['-7', '0'],
    ]);
  });
  it.each([
    ['a value that is no number', `${REAL}1 1 1\n1 1 x\n`, /number of the declared field/],
    ['a point in an integer file', '%%MatrixMarket matrix coordinate integer general\n1 1 1\n1 1 1.0\n', /declared field/],
    ['an entry twice', `${REAL}2 2 2\n1 1 1\n1 1 2\n`, /twice/],
    ['too many entries', `${REAL}1 1 1\n1 1 1\n1 1 1\n`, /more than/],
    ['an upper entry of a symmetric file', '%%MatrixMarket matrix coordinate real symmetric\n2 2 1\n1 2 1\n', /lower triangle/],
    ['a diagonal entry of a skew file', '%%MatrixMarket matrix coordinate real skew-symmetric\n2 2 1\n1 1 1\n', /zero diagonal/],
    ['a missing size line', REAL, /size line/],
    ['an absurd size', `${REAL}999999999 999999999 1\n1 1 1\n`, /too large/],
    ['two values on an array line', '%%MatrixMarket matrix array real general\n2 1\n1 2\n', /one value/],
    ['an unknown symmetry', '%%MatrixMarket matrix coordinate real triangular\n1 1 0\n', /symmetry is unknown/],
    ['an empty text', '', /not a Matrix Market/],
  ])('refuses %s', (_, text, message) => expect(refusal(text).message).toMatch(message));
  it('names the line of the fault', () => expect(refusal(`${REAL}% note\n\n2 2 1\n3 1 1\n`).message).toContain('line 5'));
  it('reads 0 × 0 and Windows line ends', () => {
    expect(parseMatrixMarket('%%MatrixMarket matrix array real general\r\n0 0\r\n', 'a.mtx')).toMatchObject({
      rows: 0,
      cols: 0,
      entries: [],
    });
    expect(numbers('%%MatrixMarket matrix array real general\r\n1 2\r\n3\r\n4\r\n')).toEqual([[3, 4]]);
  });
  it('reads back what is written, coordinate and array alike', () => {
    const table = fc
      .tuple(fc.integer({ min: 1, max: 6 }), fc.integer({ min: 1, max: 6 }))
      .chain(([m, n]) =>
        fc.array(fc.array(fc.integer({ min: -99, max: 99 }), { minLength: n, maxLength: n }), { minLength: m, maxLength: m }),
      );
    fc.assert(
      fc.property(table, (rows) => {
        const [m, n] = [rows.length, rows[0]!.length];
        const cells = rows.flatMap((row, i) => row.map((v, j) => `${i + 1} ${j + 1} ${v}`));
        const coordinate = `%%MatrixMarket matrix coordinate integer general\n${m} ${n} ${m * n}\n${cells.join('\n')}\n`;
        const columns = Array.from({ length: n }, (_, j) => rows.map((row) => row[j])).flat();
        const array = `%%MatrixMarket matrix array integer general\n${m} ${n}\n${columns.join('\n')}\n`;
        expect(numbers(coordinate)).toEqual(rows);
        expect(numbers(array)).toEqual(rows);
      }),
    );
  });
  it('reads a dense 500 × 500 file', () => {
    const text = `%%MatrixMarket matrix array real symmetric\n500 500\n${'1.25e-3\n'.repeat((500 * 501) / 2)}`;
    expect(parseMatrixMarket(text, 'big.mtx').entries).toHaveLength(250_000);
  });
});
