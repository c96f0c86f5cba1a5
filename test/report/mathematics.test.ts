import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  algebra,
  emsOf,
  formula,
  label,
  labels,
  latexLabel,
  latexOf,
  latexPieces,
  latexSymbol,
  latexText,
  numberText,
  symbolText,
} from '../../src/report/mathematics/index.ts';
import { compileLatex } from './latex-run.ts';

const latex = (text: string): string => latexOf(formula(text));

describe('formulas of the model language in LaTeX', () => {
  it.each([
    ['q1', 'q_{1}'],
    ['omega_0', '\\omega_{0}'],
    ['μ', '\\mu'],
    ['2*q1*p1', '2 q_{1} p_{1}'],
    ['q1^2', 'q_{1}^{2}'],
    ['(q1+p1)^2', '(q_{1} + p_{1})^{2}'],
    ['-1/3', '-\\frac{1}{3}'],
    ['sqrt(3)/2', '\\frac{\\sqrt{3}}{2}'],
    ['2*cos(2*pi/7)', '2 \\cos\\left(\\frac{2 \\pi}{7}\\right)'],
    ['0.10', '0.10'],
    ['1.25e-3', '1.25\\cdot 10^{-3}'],
    ['q*2', 'q \\cdot 2'],
    ['x^(-1/2)', 'x^{-1/2}'],
    ['a - b - (c - d)', 'a - b - (c - d)'],
    ['a/b/c', '\\frac{\\frac{a}{b}}{c}'],
    ['sin(x)^2', '\\sin^{2}(x)'],
    ['2^-3', '2^{-3}'],
    ['a*-b', 'a(-b)'],
    ['--a', 'a'],
    ['123456789012345678901234567890', '123456789012345678901234567890'],
  ])('%s', (text, expected) => {
    expect(latex(text)).toBe(expected);
  });

  it('sets a wide sum behind its fraction, a narrow one above the line', () => {
    expect(latex('mu*(q1^2+p1^2+q2^2)/2')).toBe('\\frac{\\mu}{2}(q_{1}^{2} + p_{1}^{2} + q_{2}^{2})');
    expect(latex('(1+sqrt(5))/2')).toBe('\\frac{1 + \\sqrt{5}}{2}');
  });

  it('keeps what is not in the language as words', () => {
    expect(latex('q1 = p1')).toBe('\\text{q1 = p1}');
    expect(latex('(q1')).toBe('\\text{(q1}');
    expect(latex('')).toBe('\\text{}');
    expect(latex(`${'('.repeat(500)}q${')'.repeat(500)}`)).toContain('\\text');
  });

  it('rounds floating numbers to twelve digits and keeps integers', () => {
    expect(numberText(1 / 3)).toBe('0.333333333333');
    expect(numberText(-0.1 - 0.2)).toBe('-0.3');
    expect(numberText(7)).toBe('7');
    expect(numberText(1e-20)).toBe('1e-20');
    expect(numberText(Number.NaN)).toBe('not a number');
  });

  it('puts blanks around the signs of the outermost sum only', () => {
    expect(formula('(p1^2+p2^2)/2+q1-1e-3').text).toBe('(p1^2+p2^2)/2 + q1 - 1e-3');
    expect(formula('-q1+q2^-2').text).toBe('-q1 + q2^-2');
  });
});

describe('labels and algebras', () => {
  it.each([
    ['A1g', 'A_{1g}'],
    ['T1u', 'T_{1u}'],
    ["E'", "E'"],
    ["A2''", "A_{2}''"],
    ['B', 'B'],
    ['Hg', 'H_{g}'],
    ['K12', 'K_{12}'],
  ])('Mulliken label %s', (text, expected) => {
    expect(latexLabel(text)).toBe(expected);
  });
  it.each([
    ['sp(4,R)', '\\mathfrak{sp}(4,\\mathbb{R})'],
    ['u(1,1)', '\\mathfrak{u}(1,1)'],
    ['so*(4)', '\\mathfrak{so}^{*}(4)'],
    ['gl(2,H)', '\\mathfrak{gl}(2,\\mathbb{H})'],
  ])('algebra %s', (text, expected) => {
    expect(latexOf(algebra(text))).toBe(expected);
  });
  it('joins labels by direct sums', () => {
    expect(latexOf(labels(['A1', 'E']))).toBe('A_{1}\\oplus  E');
  });
  it('writes names for pictures with Greek letters and lowered digits', () => {
    expect(symbolText('omega_0')).toBe('ω₀');
    expect(symbolText('c')).toBe('c');
    expect(symbolText('q12')).toBe('q₁₂');
  });
});

describe('escaping', () => {
  it('leaves no command, comment or mathematics of a user alive', () => {
    expect(latexText('\\input{/etc/passwd}')).toBe('\\textbackslash{}input\\{/etc/passwd\\}');
    expect(latexText('50% & $x_1^2$ ~ #1')).toBe('50\\% \\& \\$x\\_1\\textasciicircum{}2\\$ \\textasciitilde{} \\#1');
    expect(latexText('漢')).toBe('\\texttt{[U+6F22]}');
    expect(latexText('Koçak Žižek')).toBe('Ko\\c{c}ak \\v{Z}i\\v{z}ek');
    expect(latexSymbol('Ж')).toBe('\\text{\\texttt{[U+0416]}}');
  });
  it('leaves no special sign unescaped in any text', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'grapheme' }), (text) => {
        // what remains after the escapes, the accents and the formulas made here are taken away
        const rest = latexText(text)
          .replace(/\$\\?[A-Za-z{}^0-9\\-]*\$/g, '')
          .replace(/\\[{}$&#%_,]/g, '')
          .replace(/\\[A-Za-z]+\{\}/g, '')
          .replace(/\\texttt\{\[U\+[0-9A-F]+\]\}/g, '')
          .replace(/\\[`'^~=."uvHrcdb]\{\\?[A-Za-z]\}/g, '')
          .replaceAll('{}', '');
        expect(rest).not.toMatch(/[\\$&#%_^{}]/);
      }),
    );
  });
});

/** Random texts of the language, with long numbers and names among them. */
const text = fc.letrec<{ sum: string; product: string; power: string }>((tie) => ({
  sum: fc.array(tie('product'), { minLength: 1, maxLength: 6 }).map((terms) => terms.join(' - ')),
  product: fc
    .tuple(fc.array(tie('power'), { minLength: 1, maxLength: 4 }), fc.constantFrom('*', '/'))
    .map(([factors, sign]) => factors.join(sign)),
  power: fc.oneof(
    { maxDepth: 2, withCrossShrink: true },
    fc.constantFrom('q1', 'omega_0', '12', '0.5', 'stiffness', 'w'),
    fc.bigInt({ min: 10n ** 40n, max: 10n ** 120n }).map(String),
    tie('sum').map((s) => `(${s})^3`),
    tie('sum').map((s) => `sqrt(${s})`),
    tie('sum').map((s) => `cos(${s})`),
  ),
})).sum;

describe('pieces', () => {
  it('are balanced in braces and never wider than asked for', () => {
    fc.assert(
      fc.property(text, fc.integer({ min: 14, max: 40 }), (t, limit) => {
        for (const piece of latexPieces(formula(t), limit)) {
          expect(piece.ems).toBeLessThanOrEqual(limit);
          expect(
            piece.latex
              .replaceAll('\\{', '')
              .replaceAll('\\}', '')
              .replace(/[^{}]/g, '')
              .replaceAll('{', '+')
              .split('')
              .reduce((n, c) => n + (c === '+' ? 1 : -1), 0),
          ).toBe(0);
          expect(piece.latex.split('\\left').length).toBe(piece.latex.split('\\right').length);
        }
      }),
      { numRuns: 30, seed: 7 },
    );
  });

  it('keep every digit of a long number', () => {
    const digits = '1234567890'.repeat(30);
    expect(
      latexPieces(formula(digits), 20)
        .map((p) => p.latex)
        .join(''),
    ).toBe(digits);
  });
});

describe('estimated widths', () => {
  it('are never below what TeX measures, and less than twice of it', () => {
    const formulas = [
      ...['mu*(q1^2+p1^2)/2', 'sqrt(3)/2', '2*cos(2*pi/7)', 'q10', 'omega_0', 'alpha12', 'k_rot', 'stiffness', 'x', 'm', 'w', 'MMMM', 'Wm'],
      ...['(1+sqrt(5))/2', '123456789012345678901234567890/12345678901234567', 'I1^2*I2 - 3*I3', 'exp(-x^2/2)*sin(q1)', 'tan(pi/8)^2'],
      ...[
        '-q1 - q2 - q3 + 7/3*q4',
        '(a+b)^2/(c+d)',
        'sqrt(2+sqrt(2))/2',
        '1.25e-3',
        'M_max^2*W_min',
        'Re(z1^3*w2)',
        'x^(1/2)',
        'Omega_12',
        'psi*phi*Phi*Theta',
      ],
    ].map((t) => [t, formula(t)] as const);
    const all = [...formulas, ...['A1g', "E''", 'T2u'].map((t) => [t, label(t)] as const), ['so*(10)', algebra('so*(10)')] as const];
    const source = [
      '\\documentclass[10pt]{article}\\usepackage{amsmath,amssymb}\\begin{document}',
      ...all.map(([, f], i) => `\\sbox0{$\\displaystyle ${latexOf(f)}$}\\typeout{width ${i} \\the\\wd0}`),
      '\\end{document}',
    ].join('\n');
    const measured = [...compileLatex(source).log.matchAll(/width (\d+) ([\d.]+)pt/g)].map((m) => Number(m[2]) / 10);
    expect(measured).toHaveLength(all.length);
    all.forEach(([t, f], i) => {
      expect(emsOf(f), t).toBeGreaterThanOrEqual(measured[i]! * 0.99);
      expect(emsOf(f), t).toBeLessThan(measured[i]! * 2.1);
    });
  });
});
