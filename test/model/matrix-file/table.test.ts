import { describe, expect, it } from 'vitest';
import { InputError } from '../../../src/errors/index.ts';
import { denseTexts, namesMatrixFile, parseCsv, parseJsonMatrix, parseMatrix } from '../../../src/model/matrix-file/index.ts';

describe('matrices as CSV (RFC 4180) and JSON (RFC 8259)', () => {
  it('keeps integers and fractions exact', () => {
    const matrix = parseCsv('1,2/3\r\n-4,"0"\r\n', 'k.csv');
    expect(matrix.exact).toBe(true);
    expect(denseTexts(matrix)).toEqual([
      ['1', '2/3'],
      ['-4', '0'],
    ]);
  });
  it('is floating as soon as one entry has a point or an exponent', () => {
    expect(parseCsv('1,2\n3,4.0\n', 'k.csv').exact).toBe(false);
    expect(parseJsonMatrix('[[1, 2e0], [3, 4]]', 'k.json').exact).toBe(false);
    expect(parseJsonMatrix('[[1, 2], [3, 4]]', 'k.json').exact).toBe(true);
  });
  it('never rounds a digit of JSON', () => {
    const text = '0.1234567890123456789012345678901234567890';
    expect(parseJsonMatrix(`[[${text}]]`, 'k.json').entries[0]!.text).toBe(text);
    expect(parseJsonMatrix('[["12345678901234567890/7"]]', 'k.json').entries[0]!.text).toBe('12345678901234567890/7');
  });
  it('takes semicolons, tabs and comment lines', () => {
    expect(denseTexts(parseCsv('# K\n1;2\n\n3\t4\n', 'k.csv'))).toEqual([
      ['1', '2'],
      ['3', '4'],
    ]);
  });
  it.each([
    ['a heading', () => parseCsv('x,y\n1,2', 'k.csv'), /not a number/],
    ['rows of two lengths', () => parseCsv('1,2\n3', 'k.csv'), /Row 2 has 1 entries/],
    ['a zero denominator', () => parseCsv('1/0', 'k.csv'), /not a number/],
    ['no rows', () => parseCsv('# nothing\n', 'k.csv'), /no rows/],
    ['a flat list', () => parseJsonMatrix('[1, 2]', 'k.json'), /list of rows/],
    ['an object', () => parseJsonMatrix('{"a": 1}', 'k.json'), /list of rows/],
    ['an open bracket', () => parseJsonMatrix('[[1, 2]', 'k.json'), /list of rows/],
    ['an empty row', () => parseJsonMatrix('[[]]', 'k.json'), /missing/],
    ['text after the end', () => parseJsonMatrix('[[1]] 2', 'k.json'), /follows/],
    ['NaN', () => parseJsonMatrix('[[NaN]]', 'k.json'), /not a number/],
    ['an empty file', () => parseMatrix(' \n', 'k.csv'), /empty/],
  ])('refuses %s', (_, read, message) => {
    expect(read).toThrow(InputError);
    expect(read).toThrow(message);
  });
  it('chooses the format by the content, then by the ending', () => {
    expect(parseMatrix('[[1]]', 'k.txt').rows).toBe(1);
    expect(parseMatrix('1,2', 'k.csv').cols).toBe(2);
    expect(() => parseMatrix('1,2', 'k.mtx')).toThrow(/not a Matrix Market/);
    expect(parseMatrix('%%MatrixMarket matrix array integer general\n1 1\n5', 'k.csv').entries[0]!.text).toBe('5');
  });
  it('tells file names from expressions', () => {
    expect(['K.mtx', 'a/K0.CSV', 'S.json'].every(namesMatrixFile)).toBe(true);
    expect(['q1^2', 'mu*q1', '0.5'].some(namesMatrixFile)).toBe(false);
  });
});
