/** The report in a real browser: nothing is refused or missing, it fits a phone, prints, darkens, and copies. */
import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { type Browser, type BrowserContextOptions, chromium, type Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { latexSections } from '../../src/emit/latex.js';
import { reportHtml } from '../../src/emit/report.js';
import { deriveText } from './emitted-module.js';

const CHROMIUM = process.env.CHROMIUM_PATH ?? '/usr/bin/chromium';
const FLAGS = (
  '--no-sandbox --disable-gpu --disable-quic --no-first-run --disable-background-networking ' +
  '--disable-component-update --disable-sync'
).split(' ');

const general = deriveText(`untwist: 1
name: Harbour light
constants: [c0, a1, a2, a4, a5, b1, b2, a_coupling_with_a_rather_long_name_for_a_narrow_page]
scales: { M: mass }
lagrangian: |
  1/2 c0 M^2 R + a1 R^2 + a2 R_{ab} R^{ab} + a4 R_{abcd} R^{abcd} + a5 R_{abcd} R^{acbd}
  + M^2 ( b1 T_{abc} T^{abc} + b2 T_{abc} T^{bac} )
  + a_coupling_with_a_rather_long_name_for_a_narrow_page R_{abcd} T^{abe} T^{cd}{}_e
matter: [ dust, { vacuum: Lambda }, { fluid: chi, w: "1/5" } ]
`);
const hostile = {
  ...general,
  theory: {
    ...general.theory,
    name: `${'Unbroken'.repeat(20)} <script>document.title = 'run'</script><img src="x" onerror="document.title = 'run'">`,
  },
};
const bianchi = deriveText(
  'untwist: 1\nname: Outer mole\nconstants: [b1]\nscales: { M: mass }\nlagrangian: "1/2 M^2 R + b1 T_a T^a"\ngeometry: bianchi-i\n',
);
const PAGES = { general, hostile, bianchi };

// A machine without a browser may skip this; continuous integration may not.
describe.skipIf(!existsSync(CHROMIUM) && !process.env.CI)('report in a browser', { timeout: 60_000 }, () => {
  let browser: Browser;
  let directory: string;
  beforeAll(async () => {
    directory = mkdtempSync(join(tmpdir(), 'untwist-report-'));
    for (const [name, d] of Object.entries(PAGES)) writeFileSync(join(directory, `${name}.html`), reportHtml(d));
    browser = await chromium.launch({ executablePath: CHROMIUM, args: FLAGS });
  }, 60_000);
  afterAll(async () => {
    await browser?.close();
    rmSync(directory, { recursive: true, force: true });
  });

  /** Opens a page; what it complains about or asks for is collected. */
  async function open(
    name: keyof typeof PAGES,
    options: BrowserContextOptions,
  ): Promise<{ page: Page; faults: string[] }> {
    const context = await browser.newContext(options);
    const page = await context.newPage();
    const faults: string[] = [];
    page.on('console', (message) => {
      if (['error', 'warning'].includes(message.type())) faults.push(message.text());
    });
    page.on('pageerror', (error) => faults.push(String(error)));
    page.on('request', (request) => {
      if (!/^(file|data):/.test(request.url())) faults.push(request.url());
    });
    await page.goto(pathToFileURL(join(directory, `${name}.html`)).href);
    if (options.javaScriptEnabled === false) return { page, faults };
    await page.evaluate('document.fonts.ready.then(() => true)');
    // Sections out of sight are laid out too, as they are when a reader gets to them.
    await page.addStyleTag({ content: '.step { content-visibility: visible !important; }' }).catch(() => undefined);
    return { page, faults };
  }

  for (const name of ['general', 'hostile', 'bianchi'] as const)
    it(`fits 375 pixels without complaint: ${name}`, async () => {
      const { page, faults } = await open(name, {
        viewport: { width: 375, height: 740 },
        isMobile: true,
        hasTouch: true,
      });
      expect(faults).toEqual([]);
      expect(await page.title()).not.toBe('run');
      // Sources opened, too.
      await page.evaluate("document.querySelectorAll('details').forEach((d) => { d.open = true; })");
      const width = await page.evaluate('document.documentElement.scrollWidth');
      expect(width).toBe(375);
      expect(await page.locator('.display').count()).toBeGreaterThan(5);
      await page.context().close();
    });

  it('copies the source of an equation', async () => {
    const { page, faults } = await open('general', { viewport: { width: 1200, height: 800 } });
    await page.context().grantPermissions(['clipboard-read', 'clipboard-write']);
    const displays = latexSections(general).flatMap((s) => s.passages.flatMap((p) => p.displays));
    const wanted = displays.find((d) => d.label.endsWith(':equation-N')) ?? displays[0]!;
    const button = page.locator(`figure[id="${wanted.label}"] button`);
    await button.click();
    await page.waitForFunction("document.getElementById('said').textContent !== ''");
    expect(await button.textContent()).toBe('Copied');
    expect(await page.evaluate('navigator.clipboard.readText()')).toBe(wanted.copyTex);
    expect(faults).toEqual([]);
    await page.context().close();
  });

  it('copies also where the clipboard is refused', async () => {
    const { page } = await open('general', { viewport: { width: 1200, height: 800 } });
    await page.evaluate("Object.defineProperty(navigator, 'clipboard', { value: undefined })");
    const button = page.locator('figure button').first();
    await button.click();
    await page.waitForFunction("document.getElementById('said').textContent !== ''");
    expect(await button.textContent()).toMatch(/^(Copied|Select it below)$/);
    await page.context().close();
  });

  it('is complete without its script', async () => {
    const { page } = await open('general', { viewport: { width: 1200, height: 800 }, javaScriptEnabled: false });
    expect(await page.locator('figure button').first().isVisible()).toBe(false);
    await page.locator('figure summary').first().click();
    expect(await page.locator('figure pre').first().isVisible()).toBe(true);
    await page.context().close();
  });

  it('darkens and prints', async () => {
    const colour = (page: Page) => page.evaluate('getComputedStyle(document.body).backgroundColor');
    const light = await open('general', { colorScheme: 'light' });
    const dark = await open('general', { colorScheme: 'dark' });
    expect(await colour(dark.page)).not.toBe(await colour(light.page));
    await dark.page.emulateMedia({ media: 'print', colorScheme: 'dark' });
    expect(await dark.page.evaluate('getComputedStyle(document.documentElement).getPropertyValue("--ink")')).toBe(
      await light.page.evaluate('getComputedStyle(document.documentElement).getPropertyValue("--ink")'),
    );
    expect(await dark.page.locator('figure button').first().isVisible()).toBe(false);
    expect((await light.page.pdf({ format: 'A4' })).length).toBeGreaterThan(20_000);
    await light.page.context().close();
    await dark.page.context().close();
  });
});
