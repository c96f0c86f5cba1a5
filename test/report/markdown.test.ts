import { describe, expect, it } from 'vitest';
import { renderMarkdown } from '../../src/report/index.ts';
import { escapeMarkdown } from '../../src/report/printers/markdown.ts';
import { hostile } from './fixtures/large.ts';
import { ringAll, ringCodim } from './fixtures/ring.ts';

describe('Markdown', () => {
  it('has formulas between dollars, tables with as many cells as heads, and displays in fences', async () => {
    const text = await renderMarkdown(ringAll);
    expect(text).toContain('$c = -\\frac{1}{3}$');
    expect(text).toContain("$A_{1}'$");
    expect(text.match(/```math/g)!.length * 2).toBe(text.match(/```/g)!.length);
    let cells = 0;
    for (const line of text.split('\n')) {
      const count = line.startsWith('|') ? line.replaceAll('\\|', '').split('|').length : 0;
      if (count > 0 && cells > 0) expect(count).toBe(cells);
      cells = count;
    }
  });

  it('begins with title and verdict', async () => {
    const lines = (await renderMarkdown(ringCodim)).split('\n').filter((l) => l !== '');
    expect(lines[0]).toBe('# Three resonators on a ring');
    expect(lines[2]).toMatch(/^\*\*Generic in one parameter\.\*\* The kernel/);
  });

  it('shows hostile text as it is', async () => {
    const text = await renderMarkdown(hostile);
    expect(text).not.toContain('<script');
    expect(text).not.toContain('![x](javascript');
    expect(text.split('\n')[0]).toContain('\\\\input');
    expect(escapeMarkdown('# a')).toBe('\\# a');
    expect(escapeMarkdown('a\n# b')).toBe('a # b');
    expect(escapeMarkdown('1. *a* [b](c) `d` $e$ <f>')).toBe('1\\. \\*a\\* \\[b\\](c) \\`d\\` \\$e\\$ &lt;f&gt;');
  });
});
