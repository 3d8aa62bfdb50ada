import type { Page } from 'playwright-core';
import { STEP_MS, personOf, useBrowser } from '../support/browser';
import { drawn, startTyped } from '../support/part-walk';

jest.setTimeout(4 * STEP_MS);

/** More presses of a key than any page here needs. */
const MOST_PRESSES = 60;

/** What has the focus, in the words a reader says. */
function focused(page: Page): Promise<string> {
  return page.evaluate(() => {
    const element = document.activeElement;
    if (element === document.body) return '';
    const labels = element instanceof HTMLInputElement ? [...(element.labels ?? [])] : [];
    const words = [
      element?.getAttribute('aria-label'),
      ...labels.map(({ textContent }) => textContent),
      element?.textContent,
    ];
    return (
      words
        .find((text) => text !== null && text !== undefined && text.trim() !== '')
        ?.replace(/\s+/g, ' ')
        .trim() ?? ''
    );
  });
}

/** Presses one key until something with these words has the focus. */
async function pressUntil(page: Page, key: string, words: RegExp): Promise<void> {
  const seen: string[] = [];
  for (let press = 0; press < MOST_PRESSES; press += 1) {
    const now = await focused(page);
    if (words.test(now)) return;
    seen.push(now);
    await page.keyboard.press(key);
  }
  throw new Error(`${key} never came to ${words}, only to: ${[...new Set(seen)].join(' | ')}`);
}

describe('the keyboard alone', () => {
  const browser = useBrowser();

  it('signs in, opens a part, changes a length and takes it back', async () => {
    const { page: before } = await browser.open('fabricator');
    await startTyped(before, 'plate', 'Plate by keyboard', [90, 45]);

    const { page } = await browser.open(null);
    const { email, password } = personOf('fabricator');
    await page.goto('/sign-in');
    await page.getByRole('button', { name: 'Sign in' }).waitFor();
    await pressUntil(page, 'Tab', /^E-mail/);
    await page.keyboard.type(email);
    await pressUntil(page, 'Tab', /^Password/);
    await page.keyboard.type(password);
    await page.keyboard.press('Enter');
    await page.getByRole('link', { name: /Plate by keyboard/ }).waitFor();
    await pressUntil(page, 'Tab', /Plate by keyboard/);
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: 'Everything drawn' }).waitFor();
    await pressUntil(page, 'Tab', /^Everything drawn$/);
    await page.keyboard.press('Enter');
    await page.getByRole('listbox', { name: 'Everything drawn' }).waitFor();
    await pressUntil(page, 'Tab', /^Corner P1/);
    await pressUntil(page, 'ArrowDown', /^Edge E1/);
    const length = /^(\d+) mm long$/m.exec(await drawn(page, 'Edge E1').innerText())?.[1] ?? '';
    expect(['90', '45']).toContain(length);

    await page.keyboard.press('Enter');
    await page.waitForFunction(() => document.activeElement instanceof HTMLInputElement);
    await page.keyboard.press('Control+a');
    await page.keyboard.type('77.5');
    await page.keyboard.press('Enter');
    await drawn(page, 'Edge E1').getByText('77.5 mm long').waitFor();
    await page.keyboard.press('Escape');
    await page.keyboard.press('Control+z');
    await drawn(page, 'Edge E1').getByText(`${length} mm long`).waitFor();
    await page.keyboard.press('Control+Shift+z');
    await drawn(page, 'Edge E1').getByText('77.5 mm long').waitFor();
  });
});
