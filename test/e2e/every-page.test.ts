import path from 'node:path';
import type { Page } from 'playwright-core';
import { seriousFaults } from '../support/accessibility';
import { type DemoRole, STEP_MS, type Tab, useBrowser } from '../support/browser';
import { goToPayment, listDrawn, releasePricedPlate } from '../support/part-walk';

jest.setTimeout(10 * STEP_MS);

const PHOTO = path.resolve(__dirname, '../fixtures/photos/05-corner-gusset-card.jpg');
const STEPS = ['mock-up', 'outline', 'bends', 'checks', 'full-size-print', 'release'] as const;
/** Every page is looked at in both themes and two widths, from one visit. */
const VIEWS = [
  { theme: 'light', width: 1280 },
  { theme: 'dark', width: 1280 },
  { theme: 'dark', width: 390 },
] as const;

describe('every page, by day and by night, wide and narrow', () => {
  const browser = useBrowser();

  /** What is wrong with the page as it stands, in each of the views. */
  async function look(page: Page, what: string): Promise<readonly string[]> {
    await page.getByRole('heading', { level: 1 }).first().waitFor();
    const found: string[] = [];
    for (const { theme, width } of VIEWS) {
      await page.emulateMedia({ colorScheme: theme });
      await page.setViewportSize({ width, height: 860 });
      await page.waitForLoadState('networkidle');
      // At its end nothing lies half under the card that a phone keeps at the foot of the screen.
      await page.evaluate(() => window.scrollTo(0, document.documentElement.scrollHeight));
      const where = `${what}, ${theme}, ${width} px`;
      for (const fault of await seriousFaults(page)) found.push(`${where}: ${fault}`);
      // Nothing but wide tables and the drawing may need scrolling sideways; the page itself never does.
      const overhang = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      if (overhang > 0) found.push(`${where}: ${overhang} px wider than the screen`);
    }
    return found;
  }

  async function lookAtAll({ page }: Pick<Tab, 'page'>, addresses: readonly string[]): Promise<readonly string[]> {
    const found: string[] = [];
    for (const address of addresses) {
      await page.goto(address);
      found.push(...(await look(page, address)));
    }
    return found;
  }

  const partCalled = async (page: Page, name: string): Promise<string> => {
    await page.goto('/parts');
    const href = await page
      .getByRole('link', { name: new RegExp(name) })
      .first()
      .getAttribute('href');
    return href ?? '';
  };

  it('the sign-in', async () => {
    const tab = await browser.open(null);
    expect(await lookAtAll(tab, ['/sign-in', '/sign-up', '/trouble'])).toEqual([]);
    const fonts = await tab.page.evaluate(() =>
      [...document.fonts].filter(({ status }) => status === 'loaded').map(({ family }) => family.replaceAll('"', '')),
    );
    expect(fonts).toContain('IBM Plex Sans');
  });

  it('the areas of a workshop', async () => {
    const tab = await browser.open('owner');
    const addresses = [
      '/parts',
      '/parts/new',
      '/parts/new?from=u-bracket',
      '/orders',
      '/materials',
      '/office',
      '/account',
      ...['/stock', '/stock/hardware', '/stock/kits', '/stock/kits/new', '/stock/earnings'],
      ...['/shop-desk/sales', '/shop-desk/listings', '/shop-desk/listings/new', '/shop-desk/questions'],
      ...['/shop-desk/books', '/shop-desk/settings'],
    ];
    expect(await lookAtAll(tab, [...addresses, '/not-yours', '/nowhere'])).toEqual([]);
  });

  it('every step of a part, with its lists, forms and findings', async () => {
    const tab = await browser.open('fabricator');
    const { page } = tab;
    const draft = await partCalled(page, 'Grinder cradle');
    const found = [
      ...(await lookAtAll(
        tab,
        STEPS.map((step) => draft.replace(/[^/]+$/, step)),
      )),
    ];
    const inList = async (step: 'outline' | 'bends', thing: RegExp): Promise<void> => {
      await page.setViewportSize({ width: 1280, height: 860 });
      await page.goto(draft.replace(/[^/]+$/, step));
      await listDrawn(page);
      await page.getByRole('option', { name: thing }).first().click();
      found.push(...(await look(page, `${step} with ${thing.source} chosen`)));
    };
    await inList('outline', /^Hole/);
    await inList('outline', /^Edge/);
    await inList('bends', /^Bend/);
    for (const list of ['Bend table', 'Sheets', 'Edits']) {
      await page.getByRole('button', { name: list }).click();
      found.push(...(await look(page, `bends with ${list}`)));
    }
    await page.getByRole('button', { name: /part card$/i }).click();
    found.push(...(await look(page, 'bends with the part card lifted')));
    expect(found).toEqual([]);
    // Figures are set in the other face.
    const fonts = await page.evaluate(() =>
      [...document.fonts].filter(({ status }) => status === 'loaded').map(({ family }) => family.replaceAll('"', '')),
    );
    expect(fonts).toEqual(expect.arrayContaining(['IBM Plex Sans', 'IBM Plex Mono']));
  });

  it('a photo before and after it was read', async () => {
    const { page } = await browser.open('fabricator');
    await page.goto('/parts/new?from=mock-up');
    await page.getByLabel('Name', { exact: true }).fill('Gusset to look at');
    await page.getByRole('button', { name: 'Go on to the photo' }).click();
    await page.getByRole('heading', { name: 'Photograph the template' }).waitFor();
    const found = [...(await look(page, 'a mock-up without a photo'))];
    await page.getByLabel('Choose a photo').setInputFiles(PHOTO);
    await page.getByText(/^Good to about 0\.\d mm$/).waitFor();
    found.push(...(await look(page, 'a mock-up with its outline')));
    expect(found).toEqual([]);
  });

  it('a released part with prices, its order and the payment page', async () => {
    const { page } = await browser.open('fabricator');
    await releasePricedPlate(page, 'Plate to look at');
    const found = [...(await look(page, 'a released part with prices'))];
    await page.setViewportSize({ width: 1280, height: 860 });
    await page.getByRole('button', { name: 'Order 1', exact: true }).click();
    await page.getByRole('heading', { name: /^Order \d+$/ }).waitFor();
    found.push(...(await look(page, 'an order to pay')));
    const address = new URL(page.url()).pathname;
    await goToPayment(page, 'Go on to payment');
    found.push(...(await look(page, 'the payment page')));
    await page.goto(`${address}?payment=left`);
    found.push(...(await look(page, 'an order that was left unpaid')));
    await page.goto('/orders');
    found.push(...(await look(page, 'orders')));
    expect(found).toEqual([]);
  });

  it('the shop, from its front to an order', async () => {
    const { page } = await browser.open(null);
    const found = [
      ...(await lookAtAll({ page }, [
        ...['/shop/larkfield', '/shop/larkfield/battery-strap-anchor', '/shop/larkfield/two-pump-water-kit'],
        ...['/shop/larkfield/ask', '/shop/larkfield/cart'],
      ])),
    ];
    await page.setViewportSize({ width: 1280, height: 860 });
    await page.goto('/shop/larkfield/battery-strap-anchor');
    await page.getByRole('button', { name: 'Add to cart' }).click();
    found.push(...(await lookAtAll({ page }, ['/shop/larkfield/cart', '/shop/larkfield/checkout'])));
    await page.setViewportSize({ width: 1280, height: 860 });
    await page.getByLabel('E-mail').fill('guest@example.test');
    await page.getByLabel('Name', { exact: true }).fill('Noor Vale');
    await page.getByLabel('Street and number').fill('Quay Row 8');
    await page.getByLabel('Postcode').fill('1042');
    await page.getByLabel('Town').fill('Westmere');
    await page.getByRole('button', { name: 'Order and pay' }).click();
    await page.getByRole('link', { name: 'Back without paying' }).click();
    await page.getByText('You left before paying.').waitFor();
    found.push(...(await look(page, 'an order of a customer')));
    expect(found).toEqual([]);
    const { page: owner } = await browser.open('owner');
    await owner.goto('/shop-desk/sales');
    await owner
      .getByRole('link', { name: /Battery strap anchor/ })
      .first()
      .click();
    await owner.getByRole('heading', { name: /^Sale \d+$/ }).waitFor();
    expect(await look(owner, 'a sale at the desk')).toEqual([]);
  });

  it.each([
    ['viewer', ['/parts', '/office']],
    ['customer', ['/welcome', '/purchases', '/account', '/parts']],
    ['operator', ['/operator', '/account']],
  ] as const satisfies readonly (readonly [DemoRole, readonly string[]])[])(
    'what the %s sees',
    async (role, addresses) => {
      expect(await lookAtAll(await browser.open(role), addresses)).toEqual([]);
    },
  );
});
