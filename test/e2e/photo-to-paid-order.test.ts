import path from 'node:path';
import { computeDraft } from '@foldwright/shared/contracts/parts';
import type { Page } from 'playwright-core';
import * as z from 'zod/mini';
import { STEP_MS, download, useBrowser } from '../support/browser';
import {
  askPrices,
  board,
  cornerAt,
  drawn,
  goOnTo,
  goToPayment,
  listDrawn,
  longestEdge,
  onScreen,
  payWith,
  release,
} from '../support/part-walk';
import { mailListUrl } from '../support/product-url';
import { readCutFile } from '../support/read-cut-file';
import { until } from '../support/until';

jest.setTimeout(6 * STEP_MS);

const PHOTO = path.resolve(__dirname, '../fixtures/photos/01-pump-tray-corrugated.jpg');
/** A bend that is moved to the same place more often than there are holes does not come to rest. */
const MOST_MENDS = 12;

const mailsSchema = z.object({ messages: z.array(z.object({ to: z.string(), subject: z.string() })) });

/** From the three questions to an outline on the board. */
async function takeOutline(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Answer the 3 questions' }).waitFor();
  for (const answer of ['The inside, flanges fold up', 'The one on the table', 'Scored, liner whole']) {
    await page.getByRole('radio', { name: answer }).check({ force: true });
  }
  await page.getByRole('button', { name: 'Use this outline' }).click();
  await board(page).waitFor();
}

/** Drags a corner by the mouse and answers how far it went, mm. */
async function dragCorner(page: Page, name: string, byPx: { readonly x: number; readonly y: number }): Promise<number> {
  const before = await cornerAt(page, name);
  const from = await onScreen(page, before);
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  await page.mouse.move(from.x + byPx.x / 2, from.y + byPx.y / 2);
  await page.mouse.move(from.x + byPx.x, from.y + byPx.y);
  await page.mouse.up();
  await page.getByRole('button', { name: /^Undo: Move corner/ }).waitFor();
  const after = await cornerAt(page, name);
  return Math.hypot(after.x - before.x, after.y - before.y);
}

/** Takes every mend that the checks offer for what can't be made; answers how many it took. */
async function mendAll(page: Page): Promise<number> {
  const blockers = page.getByRole('list').getByRole('region', { name: /^Can’t be made: / });
  await blockers.first().waitFor();
  for (let mends = 0; mends < MOST_MENDS; mends += 1) {
    if ((await blockers.count()) === 0) return mends;
    const name = (await blockers.first().getAttribute('aria-label')) ?? '';
    const detail = await blockers.first().innerText();
    await blockers.first().getByRole('button').click();
    await page
      .getByRole('region', { name })
      .filter({ hasText: detail.split('\n')[1] ?? detail })
      .waitFor({ state: 'detached' });
  }
  throw new Error(`After ${MOST_MENDS} mends there is still: ${(await blockers.allInnerTexts()).join(' / ')}`);
}

describe('from a photo of a template to a bracket that is on its way', () => {
  const browser = useBrowser();

  it('photographs, draws, bends, checks, prints, releases, orders and pays', async () => {
    const { page } = await browser.open('fabricator');
    await page.getByRole('link', { name: 'Start from a mock-up' }).click();
    await page.getByLabel('Name', { exact: true }).fill('Kettle rail');
    await page.getByRole('button', { name: 'Go on to the photo' }).click();
    await page.getByRole('heading', { name: 'Photograph the template' }).waitFor();
    const address = page.url().replace(/\/mock-up$/, '');
    const sheet = await download(page, () => page.getByRole('link', { name: 'A4' }).click());
    expect(sheet.subarray(0, 5).toString()).toBe('%PDF-');

    // The reading: its stages come one after the other, each with what it found.
    const isUnderWay = page
      .getByText(/under way/)
      .first()
      .waitFor({ state: 'attached' });
    await page.getByLabel('Choose a photo').setInputFiles(PHOTO);
    await isUnderWay;
    await page.getByText(/^Good to about 0\.\d mm$/).waitFor();
    const stages = await page
      .getByRole('listitem')
      .filter({ hasText: /^\s*(Markers|Template found|Holes)/ })
      .allInnerTexts();
    expect(stages).toEqual([
      expect.stringContaining('21 markers'),
      expect.stringMatching(/pixels for each mm/),
      expect.stringContaining('8 openings'),
    ]);
    await takeOutline(page);

    // Drawing: by the mouse, by typing, and from the fastener table.
    await listDrawn(page);
    expect(await page.getByRole('option', { name: /^Hole / }).count()).toBe(5);
    const edge = await longestEdge(page);
    expect(await dragCorner(page, edge.name.replace('Edge E', 'Corner P'), { x: -12, y: 0 })).toBeGreaterThan(1);
    await page.getByRole('button', { name: /^Undo: Move corner/ }).click();
    await drawn(page, edge.name).getByText(`${edge.lengthMm} mm long`).waitFor();
    await drawn(page, edge.name).click();
    const wantedMm = Math.round(edge.lengthMm) + 2;
    await page.getByRole('textbox', { name: `Length of ${edge.name}` }).fill(`${wantedMm}`);
    await page.getByRole('textbox', { name: `Length of ${edge.name}` }).press('Enter');
    await drawn(page, edge.name).getByText(`${wantedMm} mm long`).waitFor();
    await drawn(page, 'Hole H1').click();
    await page.getByRole('combobox', { name: 'For' }).selectOption({ label: 'A bolt passes through' });
    await page.getByRole('combobox', { name: 'Thread' }).selectOption('M8');
    // ISO 273:1979, medium series: 9.0 mm for M8.
    await drawn(page, 'Hole H1')
      .getByText(/^M8 clearance, Ø 9,/)
      .waitFor();
    await page
      .getByText(/ISO 273/)
      .first()
      .waitFor();

    // A flange along the longest edge; the table shows what the server computed.
    await goOnTo(page, 'Bends');
    await listDrawn(page);
    await drawn(page, edge.name).click();
    const place = page.getByRole('textbox', { name: `Distance of the bend from ${edge.name}` });
    // Well behind the template's notched corners, so that their edges keep clear of the bend.
    await place.fill('26');
    await place.press('Enter');
    await page.getByRole('button', { name: 'Bend table' }).click();
    const row = page.getByRole('region', { name: 'Bend table' }).getByRole('row', { name: /^B1/ });
    await row.waitFor();
    const draftId = await page.evaluate(
      () =>
        performance
          .getEntriesByType('resource')
          .map(({ name }) => /drafts\/([^/]+)\/computed/.exec(name)?.[1])
          .find(Boolean) ?? '',
    );
    const ofServer = await until(async () => {
      const answer = await page.request.get(`/api/drafts/${draftId}/computed?stock=production`);
      return computeDraft.response.parse(await answer.json()).computed.development?.bendTable[0];
    }, STEP_MS);
    expect(ofServer.name).toBe('B1');
    await row.getByRole('cell', { name: ofServer.bendAllowanceMm.toFixed(2), exact: true }).waitFor();
    await row.getByRole('cell', { name: ofServer.bendDeductionMm.toFixed(2), exact: true }).waitFor();
    const fold = page.getByRole('slider', { name: 'Fold' });
    await fold.press('Home');
    await fold.and(page.locator('[aria-valuenow="0"]')).waitFor();
    await fold.press('End');
    await fold.and(page.locator('[aria-valuenow="100"]')).waitFor();

    await goOnTo(page, 'Checks');
    expect(await mendAll(page)).toBeGreaterThan(0);
    await goOnTo(page, 'Full-size print');
    const print = await download(page, () => page.getByRole('link', { name: /^Get the print/ }).click());
    expect(print.subarray(0, 5).toString()).toBe('%PDF-');

    await goOnTo(page, 'Release');
    await release(page, 'A');
    for (const name of ['Drawing', 'Full-size print']) {
      const revision = page.getByRole('region', { name: 'Revision A' });
      const file = await download(page, () => revision.getByRole('link', { name }).click());
      expect(file.subarray(0, 5).toString()).toBe('%PDF-');
    }
    const cutFile = readCutFile(
      await download(page, () => page.getByRole('link', { name: 'DXF to cut from' }).click()),
    );
    expect(cutFile.errors).toEqual([]);
    expect(cutFile.layers).toEqual(expect.arrayContaining(['FOLD-TOWARD', 'OPENING', 'OUTLINE']));

    await askPrices(page);
    await page.getByRole('button', { name: 'Order 10', exact: true }).click();
    const heading = page.getByRole('heading', { name: /^Order \d+$/ });
    await heading.waitFor();
    const order = await heading.innerText();
    await goToPayment(page, 'Go on to payment');
    await payWith(page, '4242 4242 4242 4242');
    await heading.waitFor();
    await page.getByText(/Shipped\. Tracking code/).waitFor();
    const road = page.getByRole('navigation', { name: 'Where the order is' });
    await road.getByRole('listitem').filter({ hasText: 'On its way' }).filter({ hasText: 'done' }).waitFor();

    // Mail went out, and our own outbox says so.
    await page.getByRole('navigation', { name: 'Areas' }).getByRole('link', { name: 'Office' }).click();
    const subjects = ['placed', 'paid', 'accepted by the cutting service', 'shipped'].map(
      (what) => `${order}: ${what}`,
    );
    for (const subject of subjects) {
      // By case: a customer's order of the same number has a letter that ends alike.
      await page
        .getByRole('listitem')
        .filter({ hasText: new RegExp(subject) })
        .getByText('sent', { exact: true })
        .waitFor();
    }
    const { messages } = mailsSchema.parse(await (await fetch(mailListUrl())).json());
    expect(messages.map(({ subject }) => subject)).toEqual(expect.arrayContaining(subjects));

    // The next change starts draft B; what was ordered stays.
    await page.goto(address);
    await page.getByRole('button', { name: 'Start draft B' }).click();
    await page
      .getByText(/draft of B/)
      .first()
      .waitFor();
    await page.getByRole('heading', { name: 'Revision A' }).waitFor();
  });
});
