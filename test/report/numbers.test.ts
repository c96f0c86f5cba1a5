/**
 * Nothing of a result is lost: every count in it is replaced by a number of its own, and all of those numbers
 * must then be found in each kind of document.
 */
import { describe, expect, it } from 'vitest';
import { renderHtml, renderLatex, renderMarkdown, renderText } from '../../src/report/index.ts';
import type { ResultObject } from '../../src/study/outcome.ts';
import { ringBranches, ringCodim, ringComponents, ringInvariants, ringReduce } from './fixtures/ring.ts';
import { birkhoff, events, ringSweep } from './fixtures/sweep.ts';

/** Keys that are not for reading: pictures, places in lists, and how often an equal block is repeated. */
const SILENT = new Set(['paths', 'chart', 'diagram', 'lattice', 'coveredBy', 'copies', 'sign']);
/** Counts that pictures draw: they have to stay small. */
const SMALL = new Set(['multiplicity', 'dimension']);

function numbered(result: ResultObject): { result: ResultObject; used: readonly number[] } {
  const used: number[] = [];
  const walk = (value: unknown, key: string): unknown => {
    if (SILENT.has(key)) return key === 'copies' && result.command === 'branches' ? next() : value;
    if (typeof value === 'number') {
      if (SMALL.has(key) && result.command !== 'codim') return value;
      return next();
    }
    if (Array.isArray(value)) return value.map((item) => walk(item, key === 'components' ? '' : key));
    if (value !== null && typeof value === 'object') return Object.fromEntries(Object.entries(value).map(([k, v]) => [k, walk(v, k)]));
    return value;
  };
  const next = (): number => {
    const number = 10_007 + 13 * used.length;
    used.push(number);
    return number;
  };
  const copy = Object.fromEntries(
    Object.entries(result).map(([key, value]) => [key, ['components', 'schema', 'command'].includes(key) ? value : walk(value, key)]),
  ) as unknown as ResultObject;
  return { result: copy, used };
}

const CASES = [ringCodim, ringComponents, ringInvariants, ringReduce, ringBranches, ringSweep, birkhoff, events];

describe.each(CASES.map((c) => [c.command, c] as const))('every number of %s', (_, original) => {
  const { result, used } = numbered(original);
  const printers = {
    text: () => renderText(result),
    LaTeX: () => renderLatex(result, { figures: false }),
    Markdown: () => renderMarkdown(result),
    HTML: () => renderHtml(result),
  };
  it.each(Object.keys(printers) as (keyof typeof printers)[])('is in the %s', async (format) => {
    const text = (await printers[format]()).replace(/<annotation[\s\S]*?<\/annotation>/g, '');
    const missing = used.filter((n) => !new RegExp(`(?<!\\d)${n}(?!\\d)`).test(text));
    expect(used.length).toBeGreaterThan(2);
    expect(missing).toEqual([]);
  });
});

it('exact values are printed exactly', async () => {
  const value = '-31415926535897932384/27182818284590452353';
  const result: ResultObject = { ...ringCodim, model: { ...(ringCodim.model as object), parameters: { c: value } } };
  expect(renderText(result)).toContain(`c = ${value}`);
  for (const text of [await renderLatex(result), await renderMarkdown(result)])
    expect(text).toContain('\\frac{31415926535897932384}{27182818284590452353}');
  expect(await renderHtml(result)).toContain('31415926535897932384');
});
