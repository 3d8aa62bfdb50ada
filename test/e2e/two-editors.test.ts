import type { Page } from 'playwright-core';
import { STEP_MS, useBrowser } from '../support/browser';
import { board, drawn, listDrawn, startTyped } from '../support/part-walk';

jest.setTimeout(4 * STEP_MS);

/** Puts a hole down at a point of the board, px from the middle. */
async function putHole(page: Page, fromMiddlePx: number): Promise<void> {
  await page.getByRole('toolbar').getByRole('button', { name: 'Hole', exact: true }).click();
  const box = await board(page).boundingBox();
  if (box === null) throw new Error('The board is not in view.');
  await page.mouse.click(box.x + box.width / 2 + fromMiddlePx, box.y + box.height / 2);
}

describe('two people on one draft', () => {
  const browser = useBrowser();

  it('loses nothing of either, tells each of the other, and undoes only one’s own', async () => {
    const { page: tomasz } = await browser.open('fabricator', { provoked: [409] });
    const { page: imogen } = await browser.open('owner', { provoked: [409, 'ERR_INTERNET_DISCONNECTED'] });
    await startTyped(tomasz, 'plate', 'Plate for two', [160, 80]);
    await imogen.goto(tomasz.url());
    await board(imogen).waitFor();
    const both = [tomasz, imogen];

    // Both draw at the same moment: each draft is one edit behind the other when it arrives.
    for (const page of both) await listDrawn(page);
    await Promise.all([putHole(tomasz, -150), putHole(imogen, 150)]);
    for (const page of both) {
      await drawn(page, 'Hole H1').waitFor();
      await drawn(page, 'Hole H2').waitFor();
    }
    await tomasz.getByText(/^Imogen Harrow changed this draft: /).waitFor();
    await imogen.getByText(/^Tomasz Wren changed this draft: /).waitFor();
    const places = async (page: Page): Promise<readonly string[]> =>
      (await page.getByRole('option', { name: /^Hole / }).allTextContents()).map((text) => text.trim());
    expect(await places(tomasz)).toEqual(await places(imogen));

    // Undo takes back one's own hole and leaves the other's.
    const left = (await places(imogen)).map((text) => Number(/at ([\d.]+),/.exec(text)?.[1]));
    await tomasz.getByRole('button', { name: /^Undo/ }).click();
    for (const page of both) {
      await drawn(page, 'Hole H2').waitFor({ state: 'detached' });
      const [only] = await places(page);
      expect(Number(/at ([\d.]+),/.exec(only ?? '')?.[1])).toBe(Math.max(...left));
    }
    await imogen.getByRole('button', { name: /^Undo/ }).click();
    for (const page of both) await drawn(page, 'Hole H1').waitFor({ state: 'detached' });
    expect(await tomasz.getByRole('button', { name: /^Undo/ }).isDisabled()).toBe(true);

    // What one takes away under the other's hands is told, and the other's edit is not lost in silence.
    await tomasz.getByRole('button', { name: 'Redo' }).click();
    for (const page of both) await drawn(page, 'Hole H1').waitFor();
    await imogen.context().setOffline(true);
    await drawn(imogen, 'Hole H1').click();
    await imogen.getByRole('combobox', { name: 'For' }).selectOption('tapped');
    await drawn(imogen, 'Hole H1')
      .getByText(/tapped/)
      .waitFor();
    await drawn(tomasz, 'Hole H1').press('Delete');
    await drawn(tomasz, 'Hole H1').waitFor({ state: 'detached' });
    await imogen.context().setOffline(false);
    await imogen.getByText(/no longer fits/).waitFor();
    await drawn(imogen, 'Hole H1').waitFor({ state: 'detached' });
  });
});
