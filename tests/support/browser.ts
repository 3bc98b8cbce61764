import { type Browser, type BrowserContext, chromium, type ConsoleMessage, type Page } from 'playwright-core';
import { DEMO_PASSWORD } from '#scripts/demo/demoAccounts.ts';

/** Debian's Chromium, without its own network habits: everything it may reach is the application under test. */
const CHROMIUM = '/usr/bin/chromium';
const CHROMIUM_ARGUMENTS = [
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export const VIEWPORTS = {
  phone: { width: 390, height: 844 },
  desk: { width: 1440, height: 900 },
} as const;
export type ViewportName = keyof typeof VIEWPORTS;

export function baseUrl(): string {
  const url = process.env.RIPPLEBENCH_TEST_URL;
  if (url === undefined) throw new Error('RIPPLEBENCH_TEST_URL is missing: run the tests with npm test.');
  return url;
}

export function launchBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: CHROMIUM,
    chromiumSandbox: false,
    args: CHROMIUM_ARGUMENTS,
  });
}

export interface Visit {
  readonly context: BrowserContext;
  readonly page: Page;
  /** What the pages complained about: script errors, console errors, refused by the content security policy. */
  readonly complaints: readonly string[];
}

/** A fresh profile: no cookies, nothing stored. */
export async function openVisit(
  browser: Browser,
  options: { viewport: ViewportName; theme?: 'light' | 'dark' },
): Promise<Visit> {
  const context = await browser.newContext({
    baseURL: baseUrl(),
    viewport: VIEWPORTS[options.viewport],
    colorScheme: options.theme ?? 'light',
    reducedMotion: 'reduce',
    hasTouch: options.viewport === 'phone',
    isMobile: options.viewport === 'phone',
  });
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('pageerror', (error) => complaints.push(`page error: ${error.message}`));
  page.on('console', (message: ConsoleMessage) => {
    if (message.type() === 'error') complaints.push(`console: ${message.text()}`);
  });
  return { context, page, complaints };
}

export async function signIn(page: Page, email = 'owner@ripplebench.example'): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(DEMO_PASSWORD);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
}

/** Every island has come to life; one that stays asleep was stopped by an error or by the policy. */
export async function waitForIslands(page: Page): Promise<void> {
  await page.waitForFunction(() => document.querySelectorAll('astro-island[ssr][client="load"]').length === 0);
}

/** Whether the page can be moved sideways: it never should. */
export function scrollsSideways(page: Page): Promise<boolean> {
  return page.evaluate(() => document.documentElement.scrollWidth > document.documentElement.clientWidth);
}
