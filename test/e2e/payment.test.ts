import { STEP_MS, useBrowser } from '../support/browser';
import { goToPayment, payWith, releasePricedPlate } from '../support/part-walk';

jest.setTimeout(4 * STEP_MS);

describe('paying for an order', () => {
  const browser = useBrowser();

  it('keeps the order after a declined card, and after leaving, until it is paid once', async () => {
    const { page } = await browser.open('fabricator', { provoked: [402] });
    await releasePricedPlate(page, 'Plate to pay for');
    await page.getByRole('button', { name: 'Order 1', exact: true }).click();
    await page.getByRole('heading', { name: /^Order \d+$/ }).waitFor();
    const address = page.url();

    await goToPayment(page, 'Go on to payment');
    await payWith(page, '4000 0000 0000 0002');
    await page
      .getByRole('alert')
      .getByText(/declined/)
      .waitFor();
    await page.getByRole('link', { name: 'Back without paying' }).click();
    await page.getByText('You left before paying.').waitFor();
    await page.getByText('Nothing was charged', { exact: false }).first().waitFor();

    // A fresh look at the order, then the same checkout with a card that pays.
    await page.goto(address);
    await page.getByText(/The payment did not go through/).waitFor();
    await page.getByRole('button', { name: /^(Go on to payment|Pay again)$/ }).click();
    await payWith(page, '4242 4242 4242 4242');
    await page.waitForURL((url) => url.pathname.startsWith('/orders/'));
    await page.getByText(/^€[\d.,]+ paid\.$/).waitFor();
    await page.getByText(/Shipped\. Tracking code/).waitFor();
    expect(await page.getByText(/paid\.$/).count()).toBe(1);
    expect(await page.getByRole('button', { name: /payment|Pay again|Cancel/ }).count()).toBe(0);
  });

  it('makes one order of a double click', async () => {
    const { page } = await browser.open('fabricator');
    await releasePricedPlate(page, 'Plate clicked twice');
    await page.getByRole('button', { name: 'Order 10', exact: true }).dblclick();
    await page.getByRole('heading', { name: /^Order \d+$/ }).waitFor();
    await page.getByRole('navigation', { name: 'Areas' }).getByRole('link', { name: 'Orders' }).click();
    await page.getByRole('heading', { name: 'Orders' }).waitFor();
    await page
      .getByRole('link', { name: /Plate clicked twice/ })
      .first()
      .waitFor();
    expect(await page.getByRole('link', { name: /Plate clicked twice/ }).count()).toBe(1);
  });
});
