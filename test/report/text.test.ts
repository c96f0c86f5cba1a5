import { describe, expect, it } from 'vitest';
import { renderText } from '../../src/report/index.ts';
import { gridLines } from '../../src/report/printers/grid.ts';
import { columns, wrapWords } from '../../src/report/printers/wrap.ts';
import { hostile, largeInvariants } from './fixtures/large.ts';
import { ringAll, ringCheck, ringCodim } from './fixtures/ring.ts';

describe('text for a terminal', () => {
  it('gives the answer before everything else', () => {
    const [title, rule, answer] = renderText(ringCodim).split('\n');
    expect(title).toBe('Three resonators on a ring');
    expect(rule).toMatch(/^═+$/);
    expect(answer).toMatch(/^Generic in one parameter: /);
  });

  it('says what fails when a check fails', () => {
    const failing = {
      ...ringCheck,
      symmetry: {
        holds: false,
        generators: [{ name: 'r', reversing: false, symplectic: true, invariant: false, reason: 'q1^3 becomes q2^3' }],
      },
    };
    const text = renderText(failing).replace(/\s+/g, ' ');
    expect(text).toContain('The declaration fails: The point is an equilibrium; 1 generator is no symmetry of H: r.');
    expect(text).toContain('q1^3 becomes q2^3');
    expect(renderText(ringCheck)).toContain('The declaration holds');
  });

  it.each([40, 60, 80, 100])('keeps to %i columns', (width) => {
    for (const result of [ringAll, ringCodim]) {
      const wide = renderText(result, { width })
        .split('\n')
        .filter((line) => columns(line) > width);
      expect(wide).toEqual([]);
    }
  });

  it('has no blank at the end of a line, no escape sequence and no line break at the end', () => {
    for (const result of [ringAll, hostile, largeInvariants]) {
      const text = renderText(result);
      expect(text).not.toMatch(/[ \t]\n/);
      expect(text).not.toContain('\u001b');
      expect(text.endsWith('\n')).toBe(false);
    }
  });
});

describe('tables', () => {
  const heads = [
    { head: 'name', right: false },
    { head: 'a long head', right: true },
  ];
  it('are aligned', () => {
    expect(
      gridLines(
        heads,
        [
          ['E', '1'],
          ['A1g', '12'],
        ],
        80,
      ),
    ).toEqual(['  name  a long head', '  ────  ───────────', '  E               1', '  A1g            12']);
  });
  it('break their heads before their cells', () => {
    expect(gridLines(heads, [['E', '1']], 14)).toEqual(['        a long', '  name    head', '  ────  ──────', '  E          1']);
  });
  it('become records where they cannot fit', () => {
    expect(gridLines(heads, [['E'.repeat(30), '1'.repeat(30)]], 40)).toEqual([
      `  name: ${'E'.repeat(30)}`,
      `    a long head:`,
      `      ${'1'.repeat(30)}`,
    ]);
  });
  it('without rows are heads alone', () => {
    expect(gridLines(heads, [], 80)).toEqual(['  name  a long head', '  ────  ───────────']);
  });
  it('count wide signs as two columns and marks as none', () => {
    expect(columns('漢字')).toBe(4);
    expect(columns('e\u0301')).toBe(1);
  });
  it('break long expressions behind an operator', () => {
    expect(wrapWords('aaaa*bbbb*cccc', 10)).toEqual(['aaaa*bbbb*', 'cccc']);
  });
});
