import { source as axeSource } from 'axe-core';
import type { AxeResults } from 'axe-core';
import type { Page } from 'playwright-core';

/** WCAG 2.2 A and AA, as far as a machine can judge them. */
const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** @returns one line for each rule that the page breaks, with the first place where it does */
export async function seriousViolations(page: Page): Promise<string[]> {
  // By evaluate: the content security policy refuses a script tag.
  await page.evaluate(axeSource);
  const results = await page.evaluate(
    (tags) =>
      (window as unknown as { axe: { run: (options: object) => Promise<AxeResults> } }).axe.run({ runOnly: tags }),
    TAGS,
  );
  return results.violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html ?? ''}`);
}
