import { STEP_MS, download, useBrowser } from '../support/browser';
import { release, startTyped, stepTo } from '../support/part-walk';
import { readCutFile } from '../support/read-cut-file';

jest.setTimeout(4 * STEP_MS);

describe('from typed sizes to a cut file', () => {
  const browser = useBrowser();

  it('cuts an L of 50 by 30 from the blank that its card shows, in either sheet', async () => {
    const { page } = await browser.open('fabricator');
    await startTyped(page, 'angle', 'Corner for a shelf', [50, 30, 40]);
    const blanks = page
      .getByRole('region', { name: 'Part card' })
      .getByRole('row', { name: /^Blank/ })
      .getByRole('cell');
    await blanks.first().getByText(/\d/).first().waitFor();
    const shown = (await blanks.allInnerTexts()).map((text) => text.trim());
    // The bend takes up some of 50 + 30, more of it in the thicker sheet.
    const lengthsMm = shown.map((text) => Number(text.split(' × ')[0]));
    expect(lengthsMm).toEqual([...lengthsMm].sort((a, b) => b - a));
    for (const lengthMm of lengthsMm) {
      expect(lengthMm).toBeGreaterThan(70);
      expect(lengthMm).toBeLessThan(80);
    }

    await stepTo(page, 'Release');
    await release(page, 'A');
    for (const [index, role] of ['trial', 'production'].entries()) {
      await page.getByRole('radio', { name: new RegExp(`${role}$`) }).check();
      const bytes = await download(page, () => page.getByRole('link', { name: 'DXF to cut from' }).click());
      const { errors, layers, blank } = readCutFile(bytes);
      expect(errors).toEqual([]);
      expect(layers).toContain('FOLD-TOWARD');
      expect(`${blank.widthMm.toFixed(1)} × ${blank.heightMm.toFixed(1)}`).toBe(shown[index]);
    }
  });
});
