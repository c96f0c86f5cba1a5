import { createHash } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type Browser, chromium } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { renderHtml } from '../../src/report/index.ts';
import type { ResultObject } from '../../src/study/outcome.ts';
import { hostile, largeComponents } from './fixtures/large.ts';
import { ringAll, ringCodim } from './fixtures/ring.ts';
import { ringSweep } from './fixtures/sweep.ts';

describe('HTML', () => {
  it('refers to nothing outside of itself', async () => {
    const html = await renderHtml(ringAll);
    const outside = html.replace(/xmlns="[^"]*"/g, '');
    expect(outside).not.toMatch(/https?:|\bsrc=|@import|url\(/);
    for (const [, href] of outside.matchAll(/href="([^"]*)"/g)) expect(href).toMatch(/^#[a-z0-9-]+$/);
  });
  it('names its script by hash in the content security policy', async () => {
    const html = await renderHtml(ringCodim);
    const scripts = [...html.matchAll(/<script>([\s\S]*?)<\/script>/g)];
    expect(scripts).toHaveLength(1);
    expect(html).toContain(`'sha256-${createHash('sha256').update(scripts[0]![1]!).digest('base64')}'`);
  });
  it('has a contents list whose entries lead to sections', async () => {
    const html = await renderHtml(ringAll);
    const targets = [...html.matchAll(/<li><a href="#([a-z-]+)">/g)].map((m) => m[1]!);
    expect(targets.length).toBeGreaterThan(8);
    for (const target of targets) expect(html.split(`id="${target}"`)).toHaveLength(2);
  });
  it('shows hostile text as text', async () => {
    const html = await renderHtml(hostile);
    expect(html.match(/<script/g)).toHaveLength(1);
    expect(html).not.toContain('<script>alert');
    expect(html).not.toContain('</math><script>');
    expect(html).toContain('&lt;script&gt;alert(1)&lt;/script&gt;');
  });
});

describe('HTML in Chromium', () => {
  let browser: Browser;
  const folder = mkdtempSync(join(tmpdir(), 'symcodim-html-'));
  beforeAll(async () => {
    try {
      browser = await chromium.launch({ executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium', args: ['--no-sandbox'] });
    } catch (error) {
      throw new Error(
        `Chromium cannot be run; apt-get install chromium, or name one in CHROMIUM (${(error as Error).message.split('\n')[0]})`,
      );
    }
  }, 30_000);
  afterAll(async () => {
    await browser?.close();
    rmSync(folder, { recursive: true, force: true });
  });

  async function open(results: ResultObject | readonly ResultObject[], options: { colorScheme?: 'light' | 'dark'; width?: number } = {}) {
    const file = join(folder, 'report.html');
    writeFileSync(file, await renderHtml(results));
    const page = await browser.newPage({
      colorScheme: options.colorScheme ?? 'light',
      viewport: { width: options.width ?? 1100, height: 900 },
    });
    const complaints: string[] = [];
    page.on('console', (message) => complaints.push(message.text()));
    page.on('pageerror', (error) => complaints.push(String(error)));
    page.on('dialog', (dialog) => {
      complaints.push('dialog');
      void dialog.dismiss();
    });
    page.on('request', (request) => {
      if (!request.url().startsWith('file:')) complaints.push(request.url());
    });
    await page.goto(pathToFileURL(file).href);
    return { page, complaints };
  }

  it.each([
    ['all stages', ringAll, 100],
    ['a sweep', ringSweep, 20],
    ['wide matrices', largeComponents, 20],
    ['hostile names', hostile, 20],
  ] as const)('renders without a complaint, formulas visible, nothing wider than the window: %s', async (_, results, least) => {
    for (const width of [1100, 400]) {
      const { page, complaints } = await open(results, { width });
      const formulas = await page.locator('math').count();
      expect(formulas).toBeGreaterThan(least);
      const flat = await page.locator('math').evaluateAll((all) => all.filter((m) => m.getBoundingClientRect().height < 4).length);
      expect(flat).toBe(0);
      expect(await page.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(width);
      expect(complaints).toEqual([]);
      await page.close();
    }
  });

  it('sorts a table by the keyboard, up and down', async () => {
    const { page, complaints } = await open(ringCodim);
    const table = page.locator('#zero-event table.sortable').last();
    const button = table.locator('th button', { hasText: 'codimension' });
    const values = () =>
      table.locator('tbody td:nth-child(4)').evaluateAll((cells) => cells.map((c) => Number(c.getAttribute('data-key'))));
    await button.focus();
    await page.keyboard.press('Enter');
    expect(await values()).toEqual([1, 1, 1, 1, 2, 2, 2, 2, 3, 4]);
    await page.keyboard.press('Enter');
    expect(await values()).toEqual([4, 3, 2, 2, 2, 2, 1, 1, 1, 1]);
    expect(await table.locator('th[aria-sort=descending]').count()).toBe(1);
    expect(complaints).toEqual([]);
    await page.close();
  });

  it('is dark where the reader wants it, and hides the contents list in print', async () => {
    const { page } = await open(ringCodim, { colorScheme: 'dark' });
    const background = () => page.evaluate('getComputedStyle(document.body).backgroundColor');
    expect(await background()).toBe('rgb(23, 25, 28)');
    await page.emulateMedia({ media: 'print', colorScheme: 'light' });
    expect(await background()).toBe('rgb(255, 255, 255)');
    expect(await page.locator('nav').isVisible()).toBe(false);
    await page.close();
  });

  it('holds the pictures with a description for those who do not see them', async () => {
    const { page } = await open(ringAll);
    const pictures = page.locator('figure svg[role=img]');
    expect(await pictures.count()).toBe(4);
    for (const words of await pictures.evaluateAll((all) => all.map((p) => p.getAttribute('aria-label'))))
      expect(words!.length).toBeGreaterThan(20);
    await page.close();
  });
});
