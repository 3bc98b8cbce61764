import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DEMO_PASSWORD } from '#scripts/demo/demoAccounts.ts';
import { launchBrowser, openVisit, signIn } from '../support/browser.ts';

describe('signing in and out', () => {
  let browser: Browser;

  beforeAll(async () => {
    browser = await launchBrowser();
  });

  afterAll(async () => {
    await browser.close();
  });

  it('sends a stranger to the sign-in page and back to where they wanted to go', async () => {
    const { context, page } = await openVisit(browser, { viewport: 'desk' });
    await page.goto('/builds');
    expect(new URL(page.url()).pathname).toBe('/sign-in');
    await page.getByLabel('E-mail').fill('viewer@ripplebench.example');
    await page.getByLabel('Password').fill(DEMO_PASSWORD);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.waitForURL('**/builds');
    await context.close();
  });

  it('gives the same answer to a wrong password and to an unknown account', async () => {
    const { context, page } = await openVisit(browser, { viewport: 'phone' });
    const answers: string[] = [];
    for (const email of ['lead@ripplebench.example', 'nobody@ripplebench.example']) {
      await page.goto('/sign-in');
      await page.getByLabel('E-mail').fill(email);
      await page.getByLabel('Password').fill('not the password at all');
      await page.getByRole('button', { name: 'Sign in' }).click();
      answers.push(await page.getByText('Not signed in').locator('..').innerText());
    }
    expect(answers[0]).toBe(answers[1]);
    await context.close();
  });

  it('forgets the person on sign-out', async () => {
    const { context, page } = await openVisit(browser, { viewport: 'desk' });
    await signIn(page);
    await page.getByRole('button', { name: 'Sign out' }).first().click();
    await page.waitForURL('**/sign-in**');
    await page.goto('/sessions');
    expect(new URL(page.url()).pathname).toBe('/sign-in');
    await context.close();
  });
});
