import { describe, expect, it } from 'vitest';
import { renderLatex } from '../../src/report/index.ts';
import type { ResultObject } from '../../src/study/outcome.ts';
import { hostile, largeComponents, largeInvariants } from './fixtures/large.ts';
import { ringAll, ringCodim } from './fixtures/ring.ts';
import { birkhoff, events, ringSweep } from './fixtures/sweep.ts';
import { compileLatex } from './latex-run.ts';

const DOCUMENTS: readonly (readonly [string, ResultObject | readonly ResultObject[]])[] = [
  ['all stages of the three-resonator ring', ringAll],
  ['long polynomials, long numbers, long tables', largeInvariants],
  ['wide and high matrices', largeComponents],
  ['hostile names and titles', hostile],
  ['a sweep with pictures', ringSweep],
  ['a Birkhoff normal form', birkhoff],
  ['a list of events', events],
];

/** A document of somebody else around a fragment, with the narrow lines of the standard class. */
const around = (fragment: string, size: string): string =>
  `\\documentclass[${size}]{article}\n\\usepackage{amsmath,amssymb,array,booktabs,graphicx,xcolor}\n\\begin{document}\nBefore.\n\n${fragment}\nAfter.\n\\end{document}\n`;

describe('LaTeX documents', () => {
  it.each(DOCUMENTS)('compile with nothing over the margin: %s', async (_, results) => {
    const run = compileLatex(await renderLatex(results));
    expect(run.errors).toEqual([]);
    expect(run.overfull).toEqual([]);
    expect(run.status).toBe(0);
    expect(run.pages).toBeGreaterThan(0);
  });

  it.each([
    ['all stages of the three-resonator ring', ringAll, '10pt'],
    ['long polynomials', largeInvariants, '12pt'],
    ['hostile names', hostile, '11pt'],
  ] as const)('fragments compile inside another document: %s', async (_, results, size) => {
    const fragment = await renderLatex(results, { fragment: true });
    expect(fragment).not.toContain('\\documentclass');
    expect(fragment).not.toContain('\\begin{document}');
    expect(fragment).toMatch(/^% needs \\usepackage\{amsmath,amssymb,array,booktabs,graphicx,xcolor\}/);
    const run = compileLatex(around(fragment, size));
    expect(run.errors).toEqual([]);
    expect(run.overfull).toEqual([]);
    expect(run.text).toContain('After.');
  });

  it('print a hostile title as it is typed and read no file', async () => {
    const source = await renderLatex(hostile);
    expect(source).not.toMatch(/\\input(?![a-z])/);
    expect(source.match(/\\end\{document\}/g)).toHaveLength(1);
    const run = compileLatex(source);
    expect(run.text.replace(/\s/g, '')).toContain('\\input{/etc/passwd}$%&');
    expect(run.text).not.toContain('root:');
  });

  it('carry no picture when none is wanted', async () => {
    const drawn = await renderLatex(ringCodim);
    const plain = await renderLatex(ringCodim, { figures: false });
    expect(drawn).toContain('\\begin{picture}');
    expect(plain).not.toContain('\\begin{picture}');
    expect(plain).toContain('\\begin{tabular}');
  });

  it('begin with the verdict', async () => {
    const { text } = compileLatex(await renderLatex(ringCodim));
    const verdict = text.indexOf('Generic in one parameter.');
    expect(verdict).toBeGreaterThan(0);
    expect(verdict).toBeLessThan(text.indexOf('Model'));
  });

  it('are the same each time', async () => {
    expect(await renderLatex(ringAll)).toBe(await renderLatex(ringAll));
  });
});
