import type { Browser } from 'playwright-core';
import { type DemoRole, type Tab, launchBrowser, openTab, personOf, signIn } from '../support/browser';
import { type RunningProduct, startProduct } from '../support/running-product';

jest.setTimeout(300_000);

describe('what each person of the demo may do', () => {
  let product: RunningProduct;
  let browser: Browser;
  const tabs: Tab[] = [];
  const tabFor = async (role: DemoRole | null): Promise<Tab> => {
    const tab = await openTab(browser, product.url);
    tabs.push(tab);
    if (role !== null) await signIn(tab.page, role);
    return tab;
  };

  beforeAll(async () => {
    product = await startProduct();
    browser = await launchBrowser();
  });
  afterEach(async () => {
    const faults = tabs.flatMap((tab) => tab.faults);
    await Promise.all(tabs.splice(0).map(({ context }) => context.close()));
    expect(faults).toEqual([]);
  });
  afterAll(async () => {
    await browser.close();
    await product.stop();
  });

  it('tells a wrong password in place and keeps the e-mail', async () => {
    const { page } = await tabFor(null);
    await page.goto('/sign-in');
    await page.getByLabel('E-mail').fill(personOf('fabricator').email);
    await page.getByLabel('Password', { exact: true }).fill('not the one');
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByText('E-mail or password is wrong').first().waitFor();
    expect(await page.getByLabel('E-mail').inputValue()).toBe(personOf('fabricator').email);
  });

  it('lets a viewer read and refuses the rest', async () => {
    const { page } = await tabFor('viewer');
    await page.getByRole('link', { name: /Grinder cradle/ }).click();
    await page.getByRole('heading', { name: 'Grinder cradle' }).waitFor();
    expect(await page.getByRole('link', { name: 'Start from a mock-up' }).count()).toBe(0);
    await page
      .getByRole('link', { name: /^Release/ })
      .first()
      .click();
    await page.getByRole('heading', { name: /Release A/ }).waitFor();
    const release = page.getByRole('button', { name: 'Release A' });
    expect((await release.count()) === 0 || (await release.isDisabled())).toBe(true);
    // Not only the page: the server refuses the same person a write.
    const answer = await page.evaluate(async () => {
      const session: unknown = await (await fetch('/api/session')).json();
      const token =
        typeof session === 'object' && session !== null && 'csrfToken' in session ? String(session.csrfToken) : '';
      const response = await fetch('/api/parts', {
        method: 'POST',
        headers: { 'content-type': 'application/json', 'x-csrf-token': token, 'idempotency-key': crypto.randomUUID() },
        body: JSON.stringify({ name: 'Not mine to start', starter: null }),
      });
      return { status: response.status, type: response.headers.get('content-type'), body: await response.text() };
    });
    expect(answer.status).toBe(403);
    expect(answer.type).toContain('application/problem+json');
    expect(answer.body).toContain('/problems/not-allowed');
  });

  it.each([
    ['customer', /\/welcome$/, 'Good day, Ravi Sandle'],
    ['operator', /\/operator$/, 'Installation'],
  ] as const)('brings the %s to a page of their own', async (role, address, heading) => {
    const { page } = await tabFor(role);
    await page.waitForURL(address);
    await page.getByRole('heading', { name: heading }).waitFor();
    await page.goto('/parts');
    expect(await page.getByRole('link', { name: /Grinder cradle/ }).count()).toBe(0);
  });

  it('keeps the work of two people on one draft, and tells each of the other', async () => {
    const [tomasz, imogen] = [await tabFor('fabricator'), await tabFor('owner')];
    for (const { page } of [tomasz, imogen]) {
      await page.getByRole('link', { name: /Sign bracket/ }).click();
      await page
        .getByRole('link', { name: /^Outline/ })
        .first()
        .click();
      await page.getByRole('button', { name: 'Everything drawn' }).click();
      await page.getByRole('option', { name: /Hole H1/ }).click();
    }
    // Both take a different hole away at the same moment.
    await imogen.page.getByRole('option', { name: /Hole H2/ }).click();
    await Promise.all([
      tomasz.page.getByRole('option', { name: /Hole H1/ }).press('Delete'),
      imogen.page.getByRole('option', { name: /Hole H2/ }).press('Delete'),
    ]);
    for (const { page } of [tomasz, imogen]) {
      await expectHoles(page, 0);
    }
    const told = await Promise.all(
      [tomasz, imogen].map(({ page }) =>
        page
          .getByText(/(Imogen Harrow|Tomasz Wren)/)
          .first()
          .isVisible(),
      ),
    );
    expect(told).toContain(true);
    // Undo brings one's own back and leaves the other's away.
    await tomasz.page.keyboard.press('Control+z');
    for (const { page } of [tomasz, imogen]) await expectHoles(page, 1);
  });

  async function expectHoles(page: Tab['page'], count: number): Promise<void> {
    await page.waitForFunction(
      (wanted) =>
        [...document.querySelectorAll('[role=option] b')].filter((name) => /Hole H\d/.test(name.textContent ?? ''))
          .length === wanted,
      count,
    );
  }
});
