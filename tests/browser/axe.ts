import { readFileSync } from 'node:fs';
import type { Page } from 'playwright-core';

const AXE = readFileSync(require.resolve('axe-core/axe.min.js'), 'utf8');
const EVERY_RULE = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];
/** The rules that can find in one room what they do not find in the other. */
export const COLOURS = ['color-contrast', 'link-in-text-block'];

interface Found {
  violations: { id: string; nodes: { html: string }[] }[];
}

/**
 * What axe-core finds on a page against WCAG 2.2 A and AA, or by the named rules. Its script is injected past the page's
 * policy, as an extension would.
 */
export async function violations(page: Page, runOnly: readonly string[] = EVERY_RULE): Promise<string[]> {
  if (!(await page.evaluate(() => 'axe' in window))) await page.evaluate(AXE);
  const found = await page.evaluate(async (rules) => {
    const { axe } = window as unknown as { axe: { run(options: object): Promise<Found> } };
    return (await axe.run({ runOnly: rules, resultTypes: ['violations'] })).violations;
  }, runOnly);
  return found.flatMap(({ id, nodes }) => nodes.map(({ html }) => `${id}: ${html.slice(0, 160)}`));
}
