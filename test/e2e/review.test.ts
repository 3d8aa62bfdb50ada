import { STEP_MS, useBrowser } from '../support/browser';
import { releasePricedPlate } from '../support/part-walk';

jest.setTimeout(4 * STEP_MS);

describe('looking at a part together', () => {
  const browser = useBrowser();

  it('a viewer comments and agrees, a guest does the same by a private link, until it is withdrawn', async () => {
    const { page: owner } = await browser.open('owner');
    const { page: viewer } = await browser.open('viewer');
    const { page: guest } = await browser.open(null, { provoked: [404] });
    await releasePricedPlate(owner, 'Plate to talk about');
    const address = new URL(owner.url()).pathname;

    await viewer.goto(address);
    await viewer.getByLabel('x, mm').fill('12.5');
    await viewer.getByLabel('x, mm').press('Tab');
    await viewer.getByLabel('Your comment').fill('This corner wants a radius.');
    await viewer.getByRole('button', { name: 'Send the comment' }).click();
    await viewer.getByText('This corner wants a radius.').waitFor();
    await viewer.getByRole('button', { name: 'Agree to this revision' }).click();
    await viewer.getByText('Ada Quill agrees to this revision').waitFor();
    await owner.getByText('This corner wants a radius.').waitFor();

    await owner.getByLabel('Their name').fill('Noor Vale');
    await owner.getByRole('button', { name: 'Make a private link' }).click();
    const link = (await owner.getByRole('link', { name: /\/review\// }).getAttribute('href')) ?? '';
    await guest.goto(new URL(link).pathname);
    await guest.getByRole('heading', { name: /Plate to talk about, revision A/ }).waitFor();
    await guest.getByRole('img', { name: /laid out/ }).click();
    await guest.getByLabel('Your comment').fill('Can it be wider?');
    await guest.getByRole('button', { name: 'Send the comment' }).click();
    await guest.getByText('Can it be wider?').waitFor();
    await guest.getByLabel('A note with it, if you want').fill('Two millimetres.');
    await guest.getByRole('button', { name: 'Ask for changes' }).click();
    await guest.getByText('Noor Vale (guest) asks for changes').waitFor();
    await owner.getByText('Noor Vale (guest) asks for changes').waitFor();

    await owner.getByRole('button', { name: /^Withdraw it.*Noor Vale/ }).click();
    await owner.getByRole('button', { name: /^Withdraw it.*Noor Vale/ }).waitFor({ state: 'detached' });
    await guest.reload();
    await guest.getByText('This link opens nothing').waitFor();
  });
});
