import type { Browser } from 'playwright-core';
import { seriousFaults } from '../support/accessibility';
import { type DemoRole, launchBrowser, openTab, signIn } from '../support/browser';
import { type RunningProduct, startProduct } from '../support/running-product';

jest.setTimeout(300_000);

const STEPS = ['mock-up', 'outline', 'bends', 'checks', 'full-size-print', 'release'] as const;

describe('every page, for everybody, by day and by night', () => {
  let product: RunningProduct;
  let browser: Browser;
  beforeAll(async () => {
    product = await startProduct();
    browser = await launchBrowser();
  });
  afterAll(async () => {
    await browser.close();
    await product.stop();
  });

  /** Addresses of a role's pages, with those of a draft and a released part found in the list. */
  async function pagesOf(role: DemoRole, hrefs: readonly string[]): Promise<readonly string[]> {
    const part = (name: string): string => hrefs.find((href) => href.startsWith(`${name} `))?.split(' ')[1] ?? '';
    switch (role) {
      case 'fabricator':
        return [
          ...[
            '/parts',
            '/parts/new',
            '/parts/new?from=l-bracket',
            '/orders',
            '/materials',
            '/office',
            '/account',
            '/nowhere',
          ],
          ...STEPS.map((step) => part('draft').replace(/[^/]+$/, step)),
          part('released'),
        ];
      case 'customer':
        return ['/welcome', '/account', '/parts'];
      case 'operator':
        return ['/operator'];
      default:
        return [];
    }
  }

  it.each([
    ['fabricator', 1280, 'light'],
    ['fabricator', 1280, 'dark'],
    ['fabricator', 390, 'light'],
    ['fabricator', 390, 'dark'],
    ['customer', 1280, 'light'],
    ['customer', 390, 'dark'],
    ['operator', 1280, 'dark'],
  ] as const)('has no serious fault: %s, %i wide, %s', async (role, width, theme) => {
    const tab = await openTab(browser, product.url, { width, height: 860, theme });
    const { page, context, faults } = tab;
    const found: string[] = [];
    const look = async (address: string): Promise<void> => {
      await page.waitForLoadState('networkidle');
      for (const fault of await seriousFaults(page)) found.push(`${address}: ${fault}`);
      // Nothing but wide tables and the drawing may need scrolling sideways; the page itself never does.
      const overhang = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      if (overhang > 0) found.push(`${address}: ${overhang} px wider than the screen`);
    };
    await page.goto('/sign-in');
    await look('/sign-in');
    await signIn(page, role);
    await page.waitForLoadState('networkidle');
    const links = await page
      .getByRole('link')
      .evaluateAll((all) =>
        all.map((link) => ({ href: link.getAttribute('href') ?? '', text: link.textContent ?? '' })),
      );
    const find = (name: string): string => links.find(({ text }) => text.includes(name))?.href ?? '';
    const addresses = await pagesOf(role, [`draft ${find('Grinder cradle')}`, `released ${find('Regulator bracket')}`]);
    for (const address of addresses) {
      await page.goto(address);
      await look(address);
    }
    const isPlex = await page.evaluate(() =>
      [...document.fonts].some((font) => font.family.includes('IBM Plex Sans') && font.status === 'loaded'),
    );
    await context.close();
    expect(found).toEqual([]);
    expect(faults).toEqual([]);
    expect(isPlex).toBe(true);
  });
});
