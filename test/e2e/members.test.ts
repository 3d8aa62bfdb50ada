import { STEP_MS, useBrowser } from '../support/browser';

jest.setTimeout(4 * STEP_MS);

const PASSWORD = 'a long enough secret';

describe('members of a workshop', () => {
  const browser = useBrowser();

  it('somebody starts a workshop, invites another, changes what they may do, and removes them', async () => {
    const { page: owner } = await browser.open(null);
    const { page: guest } = await browser.open(null, { provoked: [403] });
    const mark = Date.now().toString(36);
    await owner.goto('/sign-up');
    await owner.getByLabel('Name of the workshop').fill('Vale Brackets');
    await owner.getByLabel('Your name').fill('Noor Vale');
    await owner.getByLabel('E-mail').fill(`noor.${mark}@vale.example.test`);
    await owner.getByLabel('Password').fill('short');
    await owner.getByRole('button', { name: 'Start the workshop' }).click();
    await owner.getByText('At least 10 letters.').waitFor();
    await owner.getByLabel('Password').fill(PASSWORD);
    await owner.getByRole('button', { name: 'Start the workshop' }).click();
    await owner.waitForURL(/\/parts$/);

    await owner.goto('/office');
    await owner.getByLabel('Invite by e-mail').fill(`ida.${mark}@vale.example.test`);
    await owner.getByLabel(/^As/).selectOption('viewer');
    await owner.getByRole('button', { name: 'Send the invitation' }).click();
    await owner.getByText(new RegExp(`ida\\.${mark}@vale.example.test as viewer, until`)).waitFor();
    await owner.locator('summary', { hasText: 'Noor Vale invites you to Vale Brackets' }).click();
    const letter = await owner.locator('.letter').first().innerText();
    const link = /\/invitation\/\S+/.exec(letter)?.[0] ?? '';

    await guest.goto(link);
    await guest.getByText(/Noor Vale invites/).waitFor();
    await guest.getByLabel('Your name').fill('Ida Moss');
    await guest.getByLabel('Password').fill(PASSWORD);
    await guest.getByRole('button', { name: 'Join the workshop' }).click();
    await guest.waitForURL(/\/parts$/);
    expect(await guest.getByRole('link', { name: 'Start a part' }).count()).toBe(0);

    // A viewer looks and changes nothing.
    await guest.goto('/parts/new');
    await guest.getByText('Your role doesn’t open this page').waitFor();
    await guest.goto('/office');
    await guest.getByRole('cell', { name: 'viewer', exact: true }).waitFor();
    expect(await guest.getByRole('button', { name: /Send the invitation|Remove/ }).count()).toBe(0);

    // The link works once.
    const { page: late } = await browser.open(null, { provoked: [410, 404] });
    await late.goto(link);
    await late.getByText('It was accepted already').waitFor();
    await late.goto(link.slice(0, -3));
    await late.getByText('Copy the whole link from the mail').waitFor();

    // The owner's page has heard of the new member, and the member's page hears of the new role.
    await owner.getByLabel('Role of Ida Moss').selectOption('fabricator');
    await owner.getByText('Vale Brackets: your membership').first().waitFor();
    await guest.getByText('You are fabricator in Vale Brackets now').waitFor();
    await guest.goto('/parts/new');
    await guest.getByRole('heading', { name: 'Start a part' }).waitFor();

    await owner.getByRole('button', { name: /Remove\s*Ida Moss/ }).click();
    await owner.getByRole('button', { name: 'Leave it as it is' }).click();
    await owner.getByRole('button', { name: /Remove\s*Ida Moss/ }).click();
    await owner.getByRole('button', { name: 'Remove them' }).click();
    await owner.getByRole('button', { name: /Remove\s*Ida Moss/ }).waitFor({ state: 'detached' });
    // At once, without a click of theirs.
    await guest.getByText('You no longer belong to Vale Brackets').waitFor();
    await guest.getByText('You belong to no workshop yet.').waitFor();
    await owner.getByRole('cell', { name: 'Removed Ida Moss' }).waitFor();
  });
});
