import { randomUUID } from 'node:crypto';
import type { CartLine } from '@foldwright/shared/contracts/storefront';
import { releaseBracket } from './commerce';
import { TestBrowser, addPerson, addWorkshop, asOwner } from './people';
import { openShop, publish } from './shop';
import type { TestApp } from './test-app';
import { startTestApp } from './test-app';

/** A mail in the outbox. */
interface Mail {
  readonly key: string;
  readonly recipient: string;
  readonly subject: string;
  readonly body: string;
}

/** The web application with one shop in it that is open and sells one bracket; no outside party is there. */
export interface OpenShop extends TestApp {
  readonly owner: TestBrowser;
  readonly guest: TestBrowser;
  readonly partId: string;
  readonly revisionId: string;
  readonly listingId: string;
  /** A line of a cart; by itself one bracket in moss. */
  line(changes?: Partial<CartLine>): CartLine;
  /** Everything in the outbox, the oldest first. */
  mails(): Promise<readonly Mail[]>;
}

export async function startOpenShop(): Promise<OpenShop> {
  const test = await startTestApp();
  const workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
  const person = await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' });
  const owner = await new TestBrowser(test.app).signIn(person);
  const guest = await new TestBrowser(test.app).open();
  const { partId, revisionId } = await releaseBracket(owner);
  await openShop(owner);
  const listingId = await publish(owner, { kind: 'bracket', revisionId }, { slug: 'regulator' });
  return {
    ...test,
    ...{ owner, guest, partId, revisionId, listingId },
    line: (changes = {}) => ({ listingId, finishId: 'powder-moss', quantity: 1, ...changes }),
    mails: () =>
      asOwner(test.ownerUrl, async (client) => {
        const { rows } = await client.query<Mail>(
          'SELECT key, recipient, subject, body FROM mails ORDER BY created_at, key',
        );
        return rows;
      }),
  };
}

/** Post something under a key of its own, or under the one that is given. */
export const sendOnce = (browser: TestBrowser, address: string, body: object, key: string = randomUUID()) =>
  browser.post(address).set('idempotency-key', key).send(body);

/** Order at a shop. */
export const sendOrder = (guest: TestBrowser, body: object, key: string = randomUUID(), shop = 'larkfield') =>
  sendOnce(guest, `/api/shops/${shop}/sales`, body, key);
