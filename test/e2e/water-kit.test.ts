import type { Page } from 'playwright-core';
import { download, STEP_MS, useBrowser } from '../support/browser';
import { payWith } from '../support/part-walk';

jest.setTimeout(6 * STEP_MS);

const CARD = '4242 4242 4242 4242';

/** Chooses a finish of the water kit, puts it into the cart and types the address. */
async function orderKit(page: Page, finish: string): Promise<void> {
  await page.goto('/shop/larkfield');
  await page.getByPlaceholder(/^Search/).fill('diaphragm pumps');
  await page.waitForURL(/words=/);
  await page.getByRole('link', { name: /Regulator bracket/ }).waitFor({ state: 'detached' });
  await page.getByRole('link', { name: /Two-pump water kit/ }).click();
  await page.getByRole('heading', { name: 'Two-pump water kit' }).waitFor();
  await page.getByRole('button', { name: finish, exact: true }).click();
  await page.getByText(/^Cut and bent for you/).waitFor();
  await page.getByRole('button', { name: 'Add to cart' }).click();
  await page.getByRole('link', { name: 'Go to the cart' }).click();
  await page.getByRole('link', { name: 'Go on to the address' }).click();
  await page.getByLabel('E-mail').fill('guest@example.test');
  await page.getByLabel('Name', { exact: true }).fill('Noor Vale');
  await page.getByLabel('Street and number').fill('Quay Row 8');
  await page.getByLabel('Postcode').fill('1042');
  await page.getByLabel('Town').fill('Westmere');
}

describe('the two-pump water kit', () => {
  const browser = useBrowser();

  it('is bought by a guest, cut to order, sent in two parcels, partly returned, and the books balance', async () => {
    const { page: guest } = await browser.open(null, { provoked: [409] });
    const { page: owner } = await browser.open('owner');

    // The price changes while the guest types the address: the guest is asked, never surprised.
    await orderKit(guest, 'Moss');
    await guest.getByText('€154.90').waitFor();
    await owner.goto('/shop-desk/listings');
    await owner.getByRole('link', { name: 'Two-pump water kit' }).click();
    await owner.getByLabel('Price with tax').fill('149.00');
    await owner.getByRole('button', { name: 'Keep the listing' }).click();
    await owner.getByText('Customers see it as it is now.').waitFor();
    await guest.getByRole('button', { name: 'Order and pay' }).click();
    await guest.getByText(/€148\.00 each was what you saw, now it is €149\.00/).waitFor();
    await guest.getByRole('button', { name: 'Order at the new sum and pay' }).click();
    await guest.getByLabel('Card number').waitFor();
    await payWith(guest, CARD);
    await guest.waitForURL(/\/shop\/order\//);
    const heading = guest.getByRole('heading', { name: /^Order \d+$/ });
    await heading.waitFor();
    const number = /\d+/.exec(await heading.innerText())?.[0] ?? '';
    await guest.getByText(/^€155\.90 paid$/).waitFor();
    const sheet = await guest.request.get(
      (await guest.getByRole('link', { name: 'Fitting sheet' }).getAttribute('href')) ?? '',
    );
    expect((await sheet.body()).subarray(0, 5).toString()).toBe('%PDF-');

    // At the desk: what is there goes at once.
    await owner.goto('/shop-desk/sales');
    await owner.getByRole('link', { name: new RegExp(`${number}.*1 to be cut`, 's') }).click();
    await owner.getByText('1 missing').first().waitFor();
    await owner.getByRole('button', { name: 'Send a parcel' }).click();
    await owner.getByLabel('Carrier').fill('Harbour Post');
    await owner.getByRole('button', { name: 'Send it and tell the customer' }).click();
    await owner.getByRole('heading', { name: 'Parcel 1' }).waitFor();
    const slip = await download(owner, async () => {
      const href = await owner.getByRole('link', { name: 'Packing slip' }).getAttribute('href');
      await owner.evaluate((address) => {
        const link = document.createElement('a');
        link.href = address ?? '';
        link.download = 'slip.pdf';
        link.click();
      }, href);
    });
    expect(slip.subarray(0, 5).toString()).toBe('%PDF-');

    // What is missing is cut, paid, received and sent.
    await owner.getByRole('button', { name: 'Have the missing brackets cut' }).click();
    const saleAddress = owner.url();
    await owner.getByRole('link', { name: /^Order \d+$/ }).click();
    await owner.getByRole('button', { name: 'Go on to payment' }).click();
    await owner.getByLabel('Card number').waitFor();
    await payWith(owner, CARD);
    await owner.waitForURL((url) => url.pathname.startsWith('/orders/'));
    await owner.getByText(/Shipped\. Tracking code/).waitFor();
    await owner.goto(saleAddress);
    await owner.getByRole('button', { name: 'Put what was cut on the shelf' }).click();
    await owner.getByRole('button', { name: 'Put 1 on the shelf' }).click();
    await owner.getByRole('button', { name: 'Send a parcel' }).click();
    await owner.getByLabel('Carrier').fill('Harbour Post');
    await owner.getByRole('button', { name: 'Send it and tell the customer' }).click();
    await owner.getByRole('heading', { name: 'Parcel 2' }).waitFor();
    await guest.reload();
    await guest.getByRole('heading', { name: 'Parcel 2' }).waitFor();

    // A question about fit goes both ways.
    await guest.getByPlaceholder(/Sizes of your machine/).fill('My rails are 28 mm. Will it sit?');
    await guest.getByRole('button', { name: 'Send', exact: true }).click();
    await guest.getByText('Not answered yet; you get a mail.').waitFor();
    await owner.getByLabel('Your answer').fill('It will, with a packer of 2 mm.');
    await owner.getByRole('button', { name: 'Send the answer' }).click();
    await owner.getByText('It will, with a packer of 2 mm.').waitFor();
    await guest.reload();
    await guest.getByText('It will, with a packer of 2 mm.').waitFor();

    // One part comes back, with money for it.
    await owner.getByRole('button', { name: 'Take a piece back' }).click();
    await owner.getByLabel('Piece').selectOption({ label: 'Regulator bracket, revision A, moss' });
    await owner.getByLabel('Money back for it').fill('34.00');
    await owner.getByLabel('Reason').fill('One too many');
    await owner.getByRole('button', { name: 'Take it back' }).click();
    await owner.getByText(/^€34\.00 went back/).waitFor();
    await guest.reload();
    await guest
      .getByText(/€34\.00 went back/)
      .first()
      .waitFor();

    // The books balance to the cent and the piece; every step was mailed once.
    await owner.getByRole('link', { name: 'Books' }).click();
    await owner.getByText('It balances to the cent.', { exact: false }).waitFor();
    await owner.getByText('It balances to the piece', { exact: false }).waitFor();
    await owner.goto('/office');
    for (const words of ['noted', 'paid', 'parcel 1', 'being cut', 'parcel 2', 'return noted', 'money sent back']) {
      await owner
        .getByText(new RegExp(`order ${number}: ${words}`))
        .first()
        .waitFor();
      expect(await owner.getByText(new RegExp(`order ${number}: ${words}`)).count()).toBe(1);
    }

    // Which revision did they get?
    await owner.goto('/parts');
    await owner
      .getByRole('link', { name: /Regulator bracket/ })
      .first()
      .click();
    await owner
      .getByRole('navigation', { name: /steps/i })
      .getByRole('link', { name: /Release/ })
      .click();
    await owner.getByRole('heading', { name: 'Who has this revision' }).waitFor();
    await owner.getByText(new RegExp(`Noor Vale.*order ${number}`)).waitFor();
  });

  it('is bought by a customer who is signed in, and nobody else sees the order', async () => {
    const { page } = await browser.open('customer', { provoked: [404] });
    await page.goto('/shop/larkfield/battery-strap-anchor');
    await page.getByText(/on the shelf/).waitFor();
    await page.getByRole('button', { name: 'Add to cart' }).click();
    await page.goto('/shop/larkfield/checkout');
    expect(await page.getByLabel('E-mail').inputValue()).toBe('ravi@example.test');
    await page.getByRole('button', { name: 'Order and pay' }).click();
    await page.getByText('Type street and number.').waitFor();
    await page.getByLabel('Street and number').fill('Quay Row 8');
    await page.getByLabel('Postcode').fill('1042');
    await page.getByLabel('Town').fill('Westmere');
    await page.getByRole('button', { name: 'Order and pay' }).click();
    await page.getByLabel('Card number').waitFor();
    await payWith(page, CARD);
    await page.waitForURL(/\/shop\/order\//);
    await page.getByText(/^€25\.90 paid$/).waitFor();
    await page.goto('/purchases');
    await page
      .getByRole('link', { name: /Battery strap anchor/ })
      .first()
      .waitFor();
    await page.goto(`/shop/order/${'x'.repeat(43)}`);
    await page.getByText(/This link leads to no order/).waitFor();
  });
});
