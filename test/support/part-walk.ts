import type { Locator, Page } from 'playwright-core';

/** Steps of a part as its route strip names them. */
export type StepName = 'Mock-up' | 'Outline' | 'Bends' | 'Checks' | 'Full-size print' | 'Release';

/** Shapes that can be typed, by the words of their fields. */
const SHAPES = {
  plate: { from: 'flat-plate', fields: ['Length', 'Width'] },
  angle: { from: 'l-bracket', fields: ['Base', 'Flange', 'Width along the bend'] },
} as const;

/** A board that has not moved for so many frames has made room for its lists. */
const REST_FRAMES = 8;

/** Starts a part from typed sizes, mm, in the order in which the form asks for them, and waits for its outline. */
export async function startTyped(
  page: Page,
  shape: keyof typeof SHAPES,
  name: string,
  sizesMm: readonly number[],
): Promise<void> {
  const { from, fields } = SHAPES[shape];
  await page.goto(`/parts/new?from=${from}`);
  await page.getByLabel('Name', { exact: true }).fill(name);
  for (const [index, field] of fields.entries()) {
    await page.getByLabel(field, { exact: true }).fill(String(sizesMm[index]));
  }
  await page.getByRole('button', { name: 'Start the part' }).click();
  await board(page).waitFor();
}

/** Takes the one call to act to the next step. */
export async function goOnTo(page: Page, step: StepName): Promise<void> {
  await page.getByRole('link', { name: `Go on to ${step}` }).click();
  await page.waitForURL((url) => url.pathname.endsWith(`/${step.toLowerCase().replaceAll(' ', '-')}`));
}

/** Takes the route strip to a step. */
export async function stepTo(page: Page, step: StepName): Promise<void> {
  await page
    .getByRole('navigation', { name: /^Steps of/ })
    .getByRole('link', { name: new RegExp(`^${step}`) })
    .click();
  await page.waitForURL((url) => url.pathname.endsWith(`/${step.toLowerCase().replaceAll(' ', '-')}`));
}

/** The board with the sheet on it. */
export function board(page: Page): Locator {
  return page.getByRole('application', { name: /^Layout of/ });
}

/** One thing of the list that holds everything drawn, by its name: "Edge E3", "Hole H1". */
export function drawn(page: Page, name: string): Locator {
  return page.getByRole('option', { name: new RegExp(`^${name} `) });
}

/** Opens the list that holds everything drawn. */
export async function listDrawn(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Everything drawn' }).click();
  await page.getByRole('listbox', { name: 'Everything drawn' }).waitFor();
}

/** Name and length of the longest straight edge, mm: an edge that a reading surely finds. */
export async function longestEdge(page: Page): Promise<{ readonly name: string; readonly lengthMm: number }> {
  const rows = await page
    .getByRole('option', { name: /^Edge / })
    .evaluateAll((options) =>
      options.map((option) => [option.querySelector('b')?.textContent, option.lastElementChild?.textContent]),
    );
  const edges = rows.map(([name, detail]) => ({
    name: name?.trim() ?? '',
    lengthMm: Number(/^\s*([\d.]+) mm long/.exec(detail ?? '')?.[1]),
  }));
  if (edges.some(({ lengthMm }) => Number.isNaN(lengthMm))) throw new Error(`Not read: ${JSON.stringify(rows)}`);
  return edges.reduce((longest, edge) => (edge.lengthMm > longest.lengthMm ? edge : longest));
}

/** Place of a corner of the list in the layout, mm. */
export async function cornerAt(page: Page, name: string): Promise<{ readonly x: number; readonly y: number }> {
  const [, x = NaN, y = NaN] = /at (-?[\d.]+), (-?[\d.]+)/.exec((await drawn(page, name).textContent()) ?? '') ?? [];
  return { x: Number(x), y: Number(y) };
}

/** Where a point of the layout, mm, lies on the screen, px, once the board has come to rest. */
export async function onScreen(
  page: Page,
  point: { readonly x: number; readonly y: number },
): Promise<{ readonly x: number; readonly y: number }> {
  return board(page).evaluate(
    async (surface, { x, y, restFrames }) => {
      const place = (): DOMPoint => {
        const matrix = surface.querySelector('g')?.getScreenCTM();
        if (matrix === null || matrix === undefined) throw new Error('The board draws nothing.');
        return new DOMPoint(x, y).matrixTransform(matrix);
      };
      let last = place();
      for (let still = 0; still < restFrames;) {
        await new Promise(requestAnimationFrame);
        const now = place();
        still = Math.hypot(now.x - last.x, now.y - last.y) < 0.01 ? still + 1 : 0;
        last = now;
      }
      return { x: last.x, y: last.y };
    },
    { ...point, restFrames: REST_FRAMES },
  );
}

/** Accepts every caution and releases the draft. */
export async function release(page: Page, letter: string): Promise<void> {
  await page.getByRole('heading', { name: `Release ${letter}` }).waitFor();
  const button = page.getByRole('button', { name: `Release ${letter}` });
  for (const box of await page.getByRole('checkbox', { name: /I have seen this/ }).all()) await box.check();
  await button.click();
  await page.getByRole('heading', { name: `Revision ${letter}`, exact: true }).waitFor();
}

/** A released plate of the size, with prices for 1, 10 and 50 beside it. */
export async function releasePricedPlate(page: Page, name: string): Promise<void> {
  await startTyped(page, 'plate', name, [120, 60]);
  await stepTo(page, 'Release');
  await release(page, 'A');
  await askPrices(page);
}

/** Asks the cutting service for the prices of a released revision. */
export async function askPrices(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Ask the price of 1, 10 and 50' }).click();
  for (const quantity of [1, 10, 50]) await page.getByRole('region', { name: `${quantity} off` }).waitFor();
}

/** From an order's page to the payment host's. */
export async function goToPayment(page: Page, button: 'Go on to payment' | 'Pay again'): Promise<void> {
  await page.getByRole('button', { name: button }).click();
  await page.getByLabel('Card number').waitFor();
}

/** Types a card on the payment host's page and pays with it. */
export async function payWith(page: Page, card: string): Promise<void> {
  await page.getByLabel('Card number').fill(card);
  await page.getByLabel(/^Expires/).fill('12 / 31');
  await page.getByLabel('Security code').fill('123');
  await page.getByRole('button', { name: /^Pay / }).click();
}
