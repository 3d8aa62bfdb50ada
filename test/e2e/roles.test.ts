import { STEP_MS, personOf, useBrowser } from '../support/browser';
import { board, drawn, listDrawn, stepTo } from '../support/part-walk';

jest.setTimeout(4 * STEP_MS);

describe('what each person may do', () => {
  const browser = useBrowser();

  it('tells a wrong password in place and keeps the e-mail', async () => {
    const { page } = await browser.open(null, { provoked: [401] });
    const { email } = personOf('viewer');
    await page.goto('/sign-in');
    await page.getByLabel('E-mail').fill(email);
    await page.getByLabel('Password', { exact: true }).fill('not the one');
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByRole('alert').getByText('E-mail or password is wrong').waitFor();
    expect(await page.getByLabel('E-mail').inputValue()).toBe(email);
    expect(new URL(page.url()).pathname).toBe('/sign-in');
  });

  it('brings whoever is signed out to the sign-in, and from there to the page they wanted', async () => {
    const { page } = await browser.open(null);
    await page.goto('/materials');
    await page.waitForURL(/\/sign-in/);
    const { email, password } = personOf('viewer');
    await page.getByLabel('E-mail').fill(email);
    await page.getByLabel('Password', { exact: true }).fill(password);
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.waitForURL(/\/materials$/);
    await page.getByRole('heading', { level: 1 }).waitFor();
  });

  it('lets a viewer read a part and change nothing of it', async () => {
    const { page } = await browser.open('viewer', { provoked: [403] });
    await page.getByRole('link', { name: /Grinder cradle/ }).waitFor();
    expect(await page.getByRole('link', { name: /^Start from/ }).count()).toBe(0);
    await page.getByRole('link', { name: /Grinder cradle/ }).click();
    await page.getByRole('heading', { name: 'Grinder cradle', level: 1 }).waitFor();

    await stepTo(page, 'Outline');
    await board(page).waitFor();
    await listDrawn(page);
    await drawn(page, 'Hole H1').click();
    await page.getByRole('combobox', { name: 'For' }).waitFor();
    expect(await page.getByRole('combobox', { name: 'For' }).isDisabled()).toBe(true);
    const verbs = page.getByRole('toolbar').getByRole('button', { name: /^(Size|Place|Take away|Hole|Slot|Corner)$/ });
    expect(await verbs.count()).toBe(0);
    const before = await page.getByRole('option').count();
    await drawn(page, 'Hole H1').press('Delete');
    expect(await page.getByRole('option').count()).toBe(before);

    await stepTo(page, 'Checks');
    await page.getByRole('group', { name: 'What it is used for' }).waitFor();
    for (const box of await page.getByRole('checkbox').all()) expect(await box.isDisabled()).toBe(true);
    await stepTo(page, 'Release');
    await page.getByRole('heading', { name: 'Release A' }).waitFor();
    for (const button of await page.getByRole('button', { name: 'Release A' }).all()) {
      expect(await button.isDisabled()).toBe(true);
    }

    // Not only the page refuses: so does the server, and in words.
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
    expect(answer).toMatchObject({ status: 403, type: expect.stringContaining('application/problem+json') });
    expect(answer.body).toContain('/problems/not-allowed');
    await page.goto('/parts/new');
    await page.getByRole('heading', { name: 'Your role doesn’t open this page' }).waitFor();
  });

  it.each([
    ['customer', /\/welcome$/, 'Good day, Ravi Sandle'],
    ['operator', /\/operator$/, 'Installation'],
  ] as const)('brings the %s to a page of their own and keeps the parts from them', async (role, address, heading) => {
    const { page } = await browser.open(role);
    await page.waitForURL(address);
    await page.getByRole('heading', { name: heading }).waitFor();
    expect(await page.getByRole('navigation', { name: 'Areas' }).getByRole('link', { name: 'Parts' }).count()).toBe(0);
    await page.goto('/parts');
    await page.getByRole('heading', { name: 'Your role doesn’t open this page' }).waitFor();
    expect(await page.getByRole('link', { name: /Grinder cradle/ }).count()).toBe(0);
  });
});
