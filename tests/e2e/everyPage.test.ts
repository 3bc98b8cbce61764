import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser, openVisit, scrollsSideways, signIn, VIEWPORTS, waitForIslands } from '../support/browser.ts';
import { seriousViolations } from '../support/accessibility.ts';

const NARROWEST_PX = 320;
const FIXED_PAGES = ['/', '/sessions', '/sessions/new', '/builds', '/builds/new', '/no-such-page'];

/** The first thing of a kind that a page links to. */
async function firstLink(page: Page, list: string, kind: string): Promise<string> {
  await page.goto(list);
  const href = await page.locator(`main a[href^="/${kind}/"]:not([href$="/new"])`).first().getAttribute('href');
  if (href === null) throw new Error(`${list} links to no ${kind}`);
  return href;
}

describe('every page', () => {
  let browser: Browser;

  beforeAll(async () => {
    browser = await launchBrowser();
  });

  afterAll(async () => {
    await browser.close();
  });

  const visits = (['phone', 'desk'] as const).flatMap((viewport) =>
    (['light', 'dark'] as const).map((theme) => ({ viewport, theme })),
  );

  it.each(visits)('is whole and accessible on a $viewport in $theme', async (visit) => {
    const { context, page, complaints } = await openVisit(browser, visit);
    await signIn(page);
    const session = await firstLink(page, '/sessions', 'sessions');
    const build = await firstLink(page, '/builds', 'builds');
    const recording = await firstLink(page, session, 'recordings');
    const defects: string[] = [];
    for (const path of [...FIXED_PAGES, session, build, recording]) {
      const isMissing = path === '/no-such-page';
      const response = await page.goto(path);
      expect(response?.status(), path).toBe(isMissing ? 404 : 200);
      await waitForIslands(page);
      defects.push(...(await seriousViolations(page)).map((violation) => `${path}: ${violation}`));
      if (await scrollsSideways(page)) defects.push(`${path} scrolls sideways`);
      await page.setViewportSize({ width: NARROWEST_PX, height: 800 });
      if (await scrollsSideways(page)) defects.push(`${path} scrolls sideways at ${String(NARROWEST_PX)} px`);
      await page.setViewportSize(VIEWPORTS[visit.viewport]);
    }
    expect(defects).toEqual([]);
    const unexpected = complaints.filter((line) => !line.includes('404'));
    expect(unexpected).toEqual([]);
    await context.close();
  });

  it('shows the reading before any script runs', async () => {
    const signedIn = await openVisit(browser, { viewport: 'desk' });
    await signIn(signedIn.page);
    const session = await firstLink(signedIn.page, '/sessions', 'sessions');
    const recording = await firstLink(signedIn.page, session, 'recordings');
    const context = await browser.newContext({
      baseURL: new URL(signedIn.page.url()).origin,
      javaScriptEnabled: false,
      storageState: await signedIn.context.storageState(),
    });
    const page = await context.newPage();
    await page.goto(recording);
    expect(await page.getByRole('heading', { level: 1 }).innerText()).toMatch(/rpm/);
    expect(await page.getByText('SHA-256').isVisible()).toBe(true);
    await context.close();
    await signedIn.context.close();
  });

  it.each(['phone', 'desk'] as const)('offers a viewer on a %s nothing that would be refused', async (viewport) => {
    const { context, page } = await openVisit(browser, { viewport });
    await signIn(page, 'viewer@ripplebench.example');
    const session = await firstLink(page, '/sessions', 'sessions');
    const build = await firstLink(page, '/builds', 'builds');
    const recording = await firstLink(page, session, 'recordings');
    const offers: string[] = [];
    for (const path of ['/', '/sessions', '/builds', session, build, recording]) {
      await page.goto(path);
      await waitForIslands(page);
      for (const role of ['link', 'button'] as const) {
        const words = page.getByRole(role, { name: /^(?:Record|New |Begin|Add |Decide|Confirm|Choose|Save|Change)/u });
        offers.push(...(await words.allInnerTexts()).map((text) => `${path}: ${text}`));
      }
    }
    expect(offers).toEqual([]);
    await page.goto('/builds/new');
    expect(new URL(page.url()).pathname).toBe('/builds');
    await context.close();
  });

  it('takes the chosen theme from the first byte on', async () => {
    const { context, page } = await openVisit(browser, { viewport: 'desk', theme: 'light' });
    await signIn(page);
    await page.getByRole('button', { name: 'Dark' }).click();
    await page.waitForFunction(() => document.documentElement.dataset.theme === 'dark');
    const html = await (await context.request.get('/')).text();
    expect(html).toMatch(/<html[^>]*data-theme="dark"/);
    await context.close();
  });
});
