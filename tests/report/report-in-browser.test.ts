import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { chromium } from 'playwright-core';
import type { Browser, BrowserContextOptions, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { nightPage } from '../../report/page/night-page.ts';
import { pageAssets } from '../../report/page/page-assets.ts';
import type { PlotLimits } from '../../report/page/flagged-section.ts';
import type { CatalogueRow } from '../../store/catalogue-row.ts';
import { hasOutsideTool } from '../support/outside-tool.ts';
import { fabricatedRows, measuredRow, readerOf, seeded } from './fabricated-night.ts';

const CHROMIUM = '/usr/bin/chromium';
/** As root in a container, without the browser's own calls home. */
const FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];
const AXE = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

const HOSTILE = fabricatedRows();
/** What the list must show: objects that need a look, and those without a redshift whatever they claim. */
const LISTED = HOSTILE.filter((row) => row.role !== 'sky' && (row.needs_review || row.redshift === null));
const FLAGGED = LISTED.length;
/** Rows without a redshift have no curves in the fabricated night. */
const PLOTTED = LISTED.filter((row) => row.redshift !== null).length;
/** Enough for the checks that take long per card: hostile texts among them. */
const FEW = HOSTILE.slice(-6);

/** A browser without graphics hardware on a busy machine; a hang still ends. */
const PATIENCE_MS = 120_000;

let browser: Browser;
let folder = '';

/** A page of the report and what went wrong on it. */
interface Opened {
  readonly page: Page;
  readonly requests: string[];
  readonly complaints: string[];
}

async function open(
  rows: readonly CatalogueRow[],
  context: BrowserContextOptions = {},
  limits?: PlotLimits,
): Promise<Opened> {
  const path = join(folder, `${Math.random().toString(36).slice(2)}.html`);
  writeFileSync(path, nightPage(readerOf(rows), await pageAssets(), limits));
  const page = await (
    await browser.newContext({ viewport: { width: 1280, height: 800 }, ...context })
  ).newPage();
  page.setDefaultTimeout(PATIENCE_MS);
  const requests: string[] = [];
  const complaints: string[] = [];
  page.on('request', (request) => requests.push(request.url()));
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('console', (message) => {
    if (['error', 'warning'].includes(message.type())) complaints.push(message.text());
  });
  await page.goto(pathToFileURL(path).href);
  return { page, requests, complaints };
}

/** Scrolls to a card, as a reader would, and waits for its plots. */
async function lookAt(page: Page, index: number): Promise<void> {
  await page.locator(`#card-${index}`).scrollIntoViewIfNeeded();
  await page.locator(`#card-${index} canvas`).first().waitFor();
}

/** Findings of axe-core worth failing for. The page's own policy forbids foreign scripts, so axe comes by the debugger. */
async function seriousFindings(page: Page): Promise<readonly string[]> {
  await page.evaluate(AXE);
  return page.evaluate(async () => {
    const { axe } = globalThis as unknown as {
      axe: { run(): Promise<{ violations: { id: string; impact: string; nodes: { html: string }[] }[] }> };
    };
    return (await axe.run()).violations
      .filter(({ impact }) => impact === 'serious' || impact === 'critical')
      .map(({ id, nodes }) => `${id}: ${nodes[0]?.html ?? ''}`);
  });
}

/** Whether anything but background has been drawn on the first canvas of a card. */
function inkOnCanvas(page: Page, card: string): Promise<boolean> {
  return page
    .locator(`${card} canvas`)
    .first()
    .evaluate((element) => {
      const canvas = element as unknown as {
        width: number;
        height: number;
        getContext(kind: '2d'): {
          getImageData(x: number, y: number, w: number, h: number): { data: Uint8ClampedArray };
        };
      };
      const { data } = canvas.getContext('2d').getImageData(0, 0, canvas.width, canvas.height);
      return data.some((value) => value > 0);
    });
}

describe.skipIf(!hasOutsideTool(CHROMIUM, ['--version'], 'chromium'))(
  'report.html opened from disk',
  { timeout: PATIENCE_MS },
  () => {
    beforeAll(async () => {
      // Always the present sources: what lies in dist/ may be older.
      execFileSync(process.execPath, [
        fileURLToPath(new URL('../../report/build-page-script.mjs', import.meta.url)),
      ]);
      folder = mkdtempSync(join(tmpdir(), 'report-'));
      browser = await chromium.launch({ executablePath: CHROMIUM, args: FLAGS });
    });
    afterEach(async () => {
      for (const context of browser.contexts()) await context.close();
    });
    afterAll(async () => {
      await browser.close();
      rmSync(folder, { recursive: true });
    });

    it('shows hostile texts harmlessly, asks the network for nothing and complains about nothing', async () => {
      const { page, requests, complaints } = await open(HOSTILE);
      await lookAt(page, 0);
      expect(await page.evaluate(() => (globalThis as { broken?: boolean }).broken)).toBeUndefined();
      expect(await page.locator('img').count()).toBe(0);
      expect(await page.locator('h3', { hasText: '<script>window.broken = true</script>' }).count()).toBe(2);
      expect(requests.filter((url) => !url.startsWith('file:'))).toEqual([]);
      expect(requests.length).toBe(1);
      expect(complaints).toEqual([]);
      const overflow = await page.evaluate('document.documentElement.scrollWidth - innerWidth');
      expect(overflow).toBeLessThanOrEqual(0);
    });

    it('draws a card when it is scrolled to, with its residuals and its chi-square curve, and gives far ones back', async () => {
      const { page } = await open(Array.from({ length: 150 }, (_, i) => measuredRow(i, seeded(i))));
      await lookAt(page, 0);
      expect(await page.locator('#card-0 canvas').count()).toBe(3);
      expect(await inkOnCanvas(page, '#card-0')).toBe(true);
      expect(await page.locator('#card-15 canvas').count()).toBe(0);
      await lookAt(page, 15);
      await expect.poll(() => page.locator('#card-0 canvas').count(), { timeout: PATIENCE_MS }).toBe(0);
    });

    it('shows the runner-up when asked', async () => {
      const { page } = await open(HOSTILE);
      await lookAt(page, 0);
      const canvas = page.locator('#card-0 canvas').first();
      const before = await canvas.screenshot();
      await page.locator('#card-0').getByLabel('runner-up').check();
      expect((await canvas.screenshot()).equals(before)).toBe(false);
      await page.locator('#card-0').getByLabel('runner-up').uncheck();
      expect((await canvas.screenshot()).equals(before)).toBe(true);
    });

    it('filters by reason, kind, fibre, confidence and name, and sorts', async () => {
      const { page } = await open(HOSTILE);
      const shown = page.locator('.card:not([hidden])');
      const facts = (name: string): Promise<(string | undefined)[]> =>
        shown.evaluateAll(
          (cards, key) =>
            cards.map((card) => (card as unknown as { dataset: Record<string, string> }).dataset[key]),
          name,
        );
      expect(await shown.count()).toBe(FLAGGED);
      await page.getByRole('combobox', { name: 'reason', exact: true }).selectOption('rival');
      expect(new Set((await facts('reasons')).map((words) => words?.split(' ').includes('rival')))).toEqual(
        new Set([true]),
      );
      await page.getByRole('combobox', { name: 'kind', exact: true }).selectOption('galaxy');
      expect(new Set(await facts('kind'))).toEqual(new Set(['galaxy']));
      await page.getByRole('combobox', { name: 'reason', exact: true }).selectOption('any');
      await page.getByRole('combobox', { name: 'kind', exact: true }).selectOption('any');
      await page.locator('#controls').getByLabel('fibre').fill('9');
      expect(await facts('fibre')).toEqual(['9']);
      await page.locator('#controls').getByLabel('fibre').fill('');
      await page.locator('#controls').getByLabel('confidence from').fill('50');
      expect((await facts('confidence')).every((text) => Number(text) >= 0.5)).toBe(true);
      await page.locator('#controls').getByLabel('confidence from').fill('');
      await page.locator('#controls').getByLabel('name or id').fill('GRÖSSE');
      expect(await shown.count()).toBe(0);
      await page.locator('#controls').getByLabel('name or id').fill('größe');
      expect(await shown.count()).toBe(1);
      await page.locator('#controls').getByLabel('name or id').fill('');
      await page.getByRole('combobox', { name: 'order', exact: true }).selectOption('by fibre');
      const fibres = (await facts('fibre')).filter((text) => text !== '').map(Number);
      expect(fibres).toEqual(fibres.toSorted((a, b) => a - b));
      expect(await page.getByRole('status').textContent()).toBe(`${FLAGGED} of ${FLAGGED} shown`);
    });

    it.each(['light', 'dark'] as const)('has no serious accessibility finding, %s', async (colorScheme) => {
      const { page } = await open(FEW, { colorScheme });
      await lookAt(page, 0);
      expect(await seriousFindings(page)).toEqual([]);
    });

    it('says everything but the plots without its script', async () => {
      const { page } = await open(HOSTILE, { javaScriptEnabled: false });
      expect(await page.locator('.card').count()).toBe(FLAGGED);
      expect(await page.locator('#card-0 .why').textContent()).toContain('fits nearly as well');
      expect(await page.locator('.chart svg[role=img]').count()).toBe(5);
      expect(await page.locator('.no-plot').first().isVisible()).toBe(true);
    });

    it('stands without any flagged spectrum, and without any spectrum', async () => {
      for (const rows of [[measuredRow(0, seeded(1))], []]) {
        const { page, complaints } = await open(rows);
        expect(await page.locator('#h-flagged + p').textContent()).toContain('None');
        expect(complaints).toEqual([]);
        expect(await seriousFindings(page)).toEqual([]);
      }
    });

    it('says how many plots it left out', async () => {
      const { page } = await open(HOSTILE, {}, { plots: 2, bytes: 1e9 });
      expect(await page.locator('[data-plot=embedded]').count()).toBe(2);
      expect(await page.locator('[data-plot=left-out]').count()).toBe(PLOTTED - 2);
      expect(await page.locator('#h-flagged + p').textContent()).toContain(
        `of ${PLOTTED - 2} spectra are left out`,
      );
    });

    it('draws all plots for paper when asked, and prints', async () => {
      const { page, complaints } = await open(HOSTILE);
      await page.locator('#controls').getByLabel('draw all plots').check();
      await expect
        .poll(() => page.locator('.card:has(canvas)').count(), { timeout: PATIENCE_MS })
        .toBe(PLOTTED);
      const pdf = await page.pdf({ format: 'A4' });
      expect(pdf.length).toBeGreaterThan(100_000);
      expect(complaints).toEqual([]);
    });

    it('of 1,000 spectra with 214 flagged stays below 6 MB: 5,000 then stay below 30', async () => {
      const random = seeded(11);
      const rows = Array.from({ length: 1_000 }, (_, i) => measuredRow(i, random));
      const { page } = await open(rows);
      const paint = await page.evaluate(
        `performance.getEntriesByName('first-contentful-paint')[0]?.startTime`,
      );
      const bytes = statSync(fileURLToPath(page.url())).size;
      // Printed, not held to: it is the machine's load as much as the page's.
      console.log(
        `1,000 spectra: ${(bytes / 1e6).toFixed(1)} MB, first paint ${Math.round(Number(paint))} ms`,
      );
      expect(await page.locator('.card').count()).toBe(214);
      expect(bytes).toBeLessThan(6e6);
    });
  },
);
