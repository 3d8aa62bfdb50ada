import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { type Tab, download, launchBrowser, openTab, personOf, signIn } from '../support/browser';
import { type RunningProduct, startProduct } from '../support/running-product';

jest.setTimeout(400_000);

const PHOTO = path.resolve(__dirname, '../fixtures/photos/01-pump-tray-corrugated.jpg');
const READER = path.resolve(__dirname, '../support/read_dxf.py');

describe('the fabricator’s road', () => {
  let product: RunningProduct;
  let browser: Browser;
  let tab: Tab;
  const page = (): Page => tab.page;

  beforeAll(async () => {
    product = await startProduct();
    browser = await launchBrowser();
  });
  beforeEach(async () => {
    tab = await openTab(browser, product.url);
  });
  afterEach(async () => {
    await tab.context.close();
    expect(tab.faults).toEqual([]);
  });
  afterAll(async () => {
    await browser.close();
    await product.stop();
  });

  const goOn = (to: string): Promise<void> =>
    page()
      .getByRole('link', { name: `Go on to ${to}` })
      .click();

  /** Accepts every caution and releases what stands there. */
  async function release(letter: string): Promise<void> {
    await page()
      .getByRole('heading', { name: `Release ${letter}` })
      .waitFor();
    for (const box of await page()
      .getByRole('checkbox', { name: /accept/ })
      .all())
      await box.check();
    await page()
      .getByRole('button', { name: `Release ${letter}` })
      .click();
    await page()
      .getByRole('heading', { name: `Revision ${letter}` })
      .waitFor();
  }

  it('goes from a photo of a template to bends, checks and a full-size print', async () => {
    await signIn(page(), 'fabricator');
    await page().getByRole('link', { name: 'Start from a mock-up' }).click();
    await page().getByLabel('Name').fill('Kettle rail');
    await page().getByRole('button', { name: 'Go on to the photo' }).click();
    await page().waitForURL(/\/mock-up$/);

    const sheet = await page().getByRole('link', { name: 'A4' }).getAttribute('href');
    const pdf = await page().request.get(sheet ?? '');
    expect((await pdf.body()).subarray(0, 5).toString()).toBe('%PDF-');

    await page().locator('input[type=file]').first().setInputFiles(PHOTO);
    await page()
      .getByText(/^Good to about 0\.\d mm$/)
      .waitFor();
    await page().getByText('21 markers').first().waitFor();
    for (const answer of ['The inside, flanges fold up', 'The one on the table', 'Scored, liner whole']) {
      await page().getByText(answer, { exact: true }).click();
    }
    await page().getByRole('button', { name: 'Use this outline' }).click();
    await page().waitForURL(/\/outline$/);

    // A hole's fastener, chosen where it stands.
    await page().getByRole('button', { name: 'Everything drawn' }).click();
    await page()
      .getByRole('option', { name: /Hole H1/ })
      .click();
    await page()
      .getByRole('option', { name: /Hole H1/ })
      .press('Enter');
    await page().getByRole('combobox', { name: /for/i }).first().selectOption('clearance');
    await page()
      .getByRole('option', { name: /Hole H1.*clearance/ })
      .waitFor();
    // A flange along a straight edge, then what the server makes of it.
    await goOn('Bends');
    await page().getByRole('button', { name: 'Everything drawn' }).click();
    await page()
      .getByRole('option', { name: /Edge E14 / })
      .first()
      .click();
    const distance = page().getByRole('textbox', { name: /^Distance of the bend/ });
    await distance.fill('16');
    await distance.press('Enter');
    await page().getByRole('button', { name: 'Bend table' }).click();
    await page().getByRole('row', { name: /B1/ }).first().waitFor();

    // Two holes sit too near to the bend for the thicker sheet, and the checks say so.
    await goOn('Checks');
    await page()
      .getByText(/can’t be made/)
      .first()
      .waitFor();
    await goOn('Full-size print');
    const print = await download(page(), () =>
      page()
        .getByRole('link', { name: /Get the print/ })
        .click(),
    );
    expect(print.subarray(0, 5).toString()).toBe('%PDF-');
  });

  it('orders a released part, pays for it and follows it to the parcel', async () => {
    await signIn(page(), 'fabricator');
    await page()
      .getByRole('link', { name: /Pump tray/ })
      .click();
    await page()
      .getByRole('button', { name: /Ask the price/ })
      .click();
    for (const quantity of [1, 10, 50])
      await page()
        .getByRole('heading', { name: `${quantity} off` })
        .waitFor();
    await page()
      .getByRole('button', { name: /^Order/ })
      .first()
      .click();
    await page().waitForURL(/\/orders\/[0-9a-f-]+/);
    await page()
      .locator('a,button')
      .filter({ hasText: /go on to payment/i })
      .first()
      .click();
    await page()
      .getByLabel(/card number/i)
      .fill('4242424242424242');
    await page()
      .getByLabel(/expires/i)
      .fill('12 / 30');
    await page()
      .getByLabel(/security/i)
      .fill('123');
    await page().getByRole('button', { name: /pay/i }).click();
    await page().waitForURL(/\/orders\/[0-9a-f-]+/);
    await page()
      .getByText(/Shipped\. Tracking code/)
      .first()
      .waitFor();
    await page().goto('/office');
    for (const subject of ['placed', 'paid', 'shipped']) {
      await page()
        .getByText(new RegExp(`Order \\d+: ${subject}`))
        .first()
        .waitFor();
    }
  });

  it('turns typed sizes of an L into a cut file of the blank the card shows', async () => {
    await signIn(page(), 'fabricator');
    await page().goto('/parts/new?from=l-bracket');
    await page().getByLabel('Name').fill('Corner for a shelf');
    for (const [field, sizeMm] of [
      ['Base', '50'],
      ['Flange', '30'],
      ['Width along the bend', '40'],
    ] as const) {
      await page().getByLabel(field).fill(sizeMm);
    }
    await page().getByRole('button', { name: 'Start the part' }).click();
    await page().waitForURL(/\/outline$/);
    const card = await page()
      .getByText(/^\d+\.\d × 40\.0$/)
      .last()
      .innerText();
    await page()
      .getByRole('link', { name: /^Release/ })
      .first()
      .click();
    await release('A');
    const dxf = await download(page(), () => page().getByRole('link', { name: 'DXF to cut from' }).click());
    const folder = mkdtempSync(path.join(os.tmpdir(), 'cut-'));
    try {
      const file = path.join(folder, 'part.dxf');
      writeFileSync(file, dxf);
      // Our own reader's output; its shape is what read_dxf.py prints.
      const read = JSON.parse(
        execFileSync('/usr/bin/python3', [READER, file], { encoding: 'utf8', timeout: 60_000 }),
      ) as {
        readonly errors: readonly string[];
        readonly entities: readonly {
          readonly layer: string;
          readonly extents?: readonly [number, number, number, number];
        }[];
      };
      const [left = 0, bottom = 0, right = 0, top = 0] =
        read.entities.find(({ layer }) => layer === 'OUTLINE')?.extents ?? [];
      expect(read.errors).toEqual([]);
      expect(`${(right - left).toFixed(1)} × ${(top - bottom).toFixed(1)}`).toBe(card);
    } finally {
      rmSync(folder, { recursive: true, force: true });
    }
  });

  it('can be walked by keyboard alone: sign in, open a part, change a length, take it back', async () => {
    const { email, password } = personOf('fabricator');
    await page().goto('/sign-in');
    await page().getByLabel('E-mail').focus();
    await page().keyboard.type(email);
    await page().keyboard.press('Tab');
    await page().keyboard.type(password);
    await page().keyboard.press('Enter');
    await page().waitForURL(/\/parts$/);
    await page()
      .getByRole('link', { name: /Sign bracket/ })
      .focus();
    await page().keyboard.press('Enter');
    await page().getByRole('button', { name: 'Everything drawn' }).focus();
    await page().keyboard.press('Enter');
    const edge = page()
      .getByRole('option', { name: /Edge E\d+/ })
      .first();
    const before = await edge.innerText();
    await page().getByRole('option').first().focus();
    while ((await page().evaluate(() => document.activeElement?.textContent ?? '')).match(/Edge E\d+/) === null) {
      await page().keyboard.press('ArrowDown');
    }
    await page().keyboard.press('Enter');
    const length = page().getByRole('textbox', { name: /^(Length|Radius) of/ });
    await length.waitFor();
    await page().waitForFunction(() => document.activeElement?.tagName === 'INPUT');
    await page().keyboard.type('33');
    await page().keyboard.press('Enter');
    await page().waitForFunction(
      (text) => [...document.querySelectorAll('[role=option]')].every((option) => option.textContent !== text),
      before.replace(/\n/g, ''),
    );
    await page().keyboard.press('Escape');
    await page().keyboard.press('Control+z');
    await edge.filter({ hasText: before.split('\n').at(-1) ?? before }).waitFor();
  });
});
