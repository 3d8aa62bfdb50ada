import { readFileSync } from 'node:fs';
import type axeCore from 'axe-core';
import type { Page } from 'playwright-core';

declare const axe: typeof axeCore;

const AXE = readFileSync(require.resolve('axe-core/axe.min.js'), 'utf8');

/** What axe finds serious or critical on a page (WCAG 2.2 AA), one line each. */
export async function seriousFaults(page: Page): Promise<readonly string[]> {
  // Evaluated, not added as a script: the page's policy would rightly refuse that. Once is enough for each load.
  if (!(await page.evaluate(() => 'axe' in window))) await page.evaluate(AXE);
  return page.evaluate(async () => {
    const found = await axe.run(document, {
      runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'],
      resultTypes: ['violations'],
    });
    return found.violations
      .filter(({ impact }) => impact === 'serious' || impact === 'critical')
      .map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => String(target)).join(' | ')}`);
  });
}
