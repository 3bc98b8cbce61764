import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { encodeWav } from '#scripts/demo/encodeWav.ts';
import { commutatorSound } from '#lib/signal/synthesis/motorSounds.ts';
import { synthesiseMotor } from '#lib/signal/synthesis/synthesiseMotor.ts';
import {
  launchBrowser,
  openVisit,
  scrollsSideways,
  signIn,
  waitForIslands,
  type ViewportName,
} from '../support/browser.ts';
import { seriousViolations } from '../support/accessibility.ts';

const SAMPLE_RATE_HZ = 44_100;
const TRUE_RPM = 4980;
const RIPPLES_PER_TURN = 6;
/** The product's promise for a clean steady recording: right within 1 %. */
const ALLOWED_ERROR_RPM = TRUE_RPM * 0.01;

describe('the journey of a recording', () => {
  let browser: Browser;
  let folder: string;

  beforeAll(async () => {
    browser = await launchBrowser();
    folder = mkdtempSync(join(tmpdir(), 'ripplebench-journey-'));
  });

  afterAll(async () => {
    await browser.close();
    rmSync(folder, { recursive: true, force: true });
  });

  function makeRecording(name: string, seed: number): string {
    const { samples } = synthesiseMotor({
      seed,
      durationSeconds: 6,
      sampleRateHz: SAMPLE_RATE_HZ,
      speed: [{ timeSeconds: 0, shaftSpeedRpm: TRUE_RPM }],
      ...commutatorSound(RIPPLES_PER_TURN),
      noise: { colour: 'pink', levelDecibels: -50 },
    });
    const path = join(folder, name);
    writeFileSync(path, encodeWav(samples, SAMPLE_RATE_HZ, 'int16'));
    return path;
  }

  async function upload(page: Page, path: string): Promise<void> {
    await page.goto('/');
    await waitForIslands(page);
    await page.getByLabel('Build').selectOption({ label: 'Kestrel' });
    await page.locator('input[type="file"]').last().setInputFiles(path);
  }

  const visits: { viewport: ViewportName; theme: 'light' | 'dark' }[] = [
    { viewport: 'phone', theme: 'dark' },
    { viewport: 'desk', theme: 'light' },
  ];

  it.each(visits)('leads from sign-in over upload and live state to the charts on a $viewport', async (visit) => {
    const { context, page, complaints } = await openVisit(browser, visit);
    const name = `journey-${visit.viewport}.wav`;
    await signIn(page);
    await upload(page, makeRecording(name, visit.viewport === 'phone' ? 11 : 12));

    // The row of the file goes from sending to the speed without a reload.
    const row = page.getByRole('list', { name: 'Files of this visit' }).getByRole('listitem').filter({ hasText: name });
    const link = row.getByRole('link', { name: /rpm/ });
    await link.waitFor();
    await link.click();
    await page.waitForURL('**/recordings/*');

    const claim = await page.getByRole('heading', { level: 1 }).innerText();
    const rpm = Number(claim.replaceAll(/[^\d.]/g, ''));
    expect(Math.abs(rpm - TRUE_RPM)).toBeLessThan(ALLOWED_ERROR_RPM);
    expect(await page.getByText('Six ripples a turn').first().isVisible()).toBe(true);

    for (const title of ['Proof in the sound', 'How it ran']) {
      const section = page.getByRole('region', { name: title });
      await section.scrollIntoViewIfNeeded();
      const opener = section.getByRole('button', { name: 'Open' });
      if (visit.viewport === 'phone') await opener.click();
      await section.locator('canvas').first().waitFor();
    }
    expect(await scrollsSideways(page)).toBe(false);
    expect(await seriousViolations(page)).toEqual([]);
    expect(complaints).toEqual([]);
    await context.close();
  });

  it('moves a page that is already open from queued to done', async () => {
    const { context, page, complaints } = await openVisit(browser, { viewport: 'desk' });
    await signIn(page);
    const watching = await context.newPage();
    await watching.goto('/sessions');
    await watching.getByRole('link', { name: /Kestrel from/ }).click();
    await watching.waitForURL('**/sessions/*');
    await waitForIslands(watching);
    const name = 'journey-watched.wav';

    await page.goto(watching.url());
    await waitForIslands(page);
    await page.locator('input[type="file"]').last().setInputFiles(makeRecording(name, 13));

    // The other page was never touched: only the stream of updates can tell it.
    const row = watching.getByRole('row').filter({ hasText: name });
    await row.getByText(/in 100/).waitFor();
    expect(complaints).toEqual([]);
    await context.close();
  });

  it('keeps what a person confirmed', async () => {
    const { context, page } = await openVisit(browser, { viewport: 'desk' });
    await signIn(page);
    const name = 'journey-confirmed.wav';
    await upload(page, makeRecording(name, 14));
    await page.getByRole('listitem').filter({ hasText: name }).getByRole('link', { name: /rpm/ }).click();
    await page.waitForURL('**/recordings/*');
    await waitForIslands(page);
    await page.getByRole('button', { name: 'Confirm' }).first().click();
    await page.getByText('Looked at by a person').first().waitFor();
    await page.reload();
    expect(await page.getByText('Looked at by a person').first().isVisible()).toBe(true);
    await context.close();
  });

  it('tells why a file was not taken and keeps the page usable', async () => {
    const { context, page } = await openVisit(browser, { viewport: 'desk' });
    await signIn(page);
    const path = join(folder, 'journey-empty.wav');
    writeFileSync(path, '');
    await upload(page, path);
    const row = page.getByRole('listitem').filter({ hasText: 'journey-empty.wav' });
    await row.getByText('The file is empty (0 bytes).').waitFor();
    await context.close();
  });
});
