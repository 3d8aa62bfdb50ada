import { randomUUID } from 'node:crypto';
import { customerOrderSchema } from '@foldwright/shared/contracts/sale-links';
import { ledgerSchema } from '@foldwright/shared/contracts/ledger';
import { saleSchema } from '@foldwright/shared/contracts/sales';
import { listingSchema } from '@foldwright/shared/contracts/shop';
import { offerSchema } from '@foldwright/shared/contracts/storefront';
import type { CartLine } from '@foldwright/shared/contracts/storefront';
import { kitSchema } from '@foldwright/shared/contracts/kits';
import { hardwareItemSchema } from '@foldwright/shared/contracts/stock';
import type { TestBrowser } from './people';

export const ADDRESS = {
  name: 'Ravi Sandle',
  street: 'Quay Row 8',
  more: '',
  postcode: '1042',
  city: 'Westmere',
  country: 'IE',
} as const;

export const SHOP = {
  slug: 'larkfield',
  isOpen: true,
  headline: 'Brackets for carts',
  about: '',
  currency: 'EUR',
  taxName: 'VAT',
  taxBasisPoints: 2300,
  taxNumber: '',
  postageMinor: 690,
  packingDays: 1,
  senderAddress: 'Hopper Lane 3',
  questionsTo: 'fit@larkfield.example.test',
} as const;

const key = (): [string, string] => ['idempotency-key', randomUUID()];

async function made(browser: TestBrowser, address: string, body: object, idempotencyKey = randomUUID()) {
  const answer = await browser.post(address).set('idempotency-key', idempotencyKey).send(body);
  if (answer.status !== 201) throw new Error(`${address}: ${answer.status} ${JSON.stringify(answer.body)}`);
  return answer.body as unknown;
}

export async function openShop(owner: TestBrowser, changes: object = {}): Promise<void> {
  const { body } = await owner.get('/api/shop/settings').expect(200);
  const sent = owner.put('/api/shop/settings').set('if-match', `"${body.revision}"`);
  await sent.send({ ...SHOP, ...changes }).expect(200);
}

export async function addHardware(owner: TestBrowser, name = 'Socket screw M6 × 20'): Promise<string> {
  const body = { name, specification: 'ISO 4762', cost: { amountMinor: 18, currency: 'EUR' }, isInUse: true };
  return hardwareItemSchema.parse(await made(owner, '/api/hardware', body)).id;
}

export type Shelved = { readonly kind: 'bracket'; readonly revisionId: string; readonly finishId: string };

export async function receive(
  owner: TestBrowser,
  what: Shelved | { readonly kind: 'hardware'; readonly hardwareId: string },
  quantity: number,
  orderId: string | null = null,
): Promise<{ positionId: string; onHand: number; reserved: number }> {
  const body = { what, quantity, orderId, reason: 'came in' };
  return (await made(owner, '/api/stock/receipts', body)) as { positionId: string; onHand: number; reserved: number };
}

export async function addKit(owner: TestBrowser, lines: readonly object[]): Promise<string> {
  return kitSchema.parse(await made(owner, '/api/kits', { name: 'Water kit', note: '', lines })).id;
}

export async function publish(owner: TestBrowser, what: object, changes: object = {}): Promise<string> {
  const body = {
    ...{ what, slug: `l-${randomUUID().slice(0, 8)}`, title: 'Regulator bracket', summary: '' },
    ...{ fits: 'Rails 30 mm', doesNotFit: '', fittingSteps: 'Fasten it.\nLook at it.', priceMinor: 3400 },
    finishes: [
      { finishId: 'powder-moss', surchargeMinor: 0 },
      { finishId: 'bare', surchargeMinor: 0 },
    ],
    leadTimeDays: 9,
    ...changes,
  };
  const listing = listingSchema.parse(await made(owner, '/api/shop/listings', body));
  const sent = owner.put(`/api/shop/listings/${listing.id}/state`).set('if-match', `"${listing.revision}"`);
  await sent.send({ state: 'published' }).expect(200);
  return listing.id;
}

export async function offerFor(guest: TestBrowser, lines: readonly CartLine[]) {
  return offerSchema.parse((await guest.post('/api/shops/larkfield/offers').send({ lines }).expect(200)).body);
}

/** Order what is offered now. @returns the private link */
export async function place(
  guest: TestBrowser,
  lines: readonly CartLine[],
  idempotencyKey = randomUUID(),
): Promise<string> {
  const { offerHash } = await offerFor(guest, lines);
  const body = { lines, offerHash, email: 'ravi@example.test', address: ADDRESS };
  return ((await made(guest, '/api/shops/larkfield/sales', body, idempotencyKey)) as { link: string }).link;
}

export async function readLink(guest: TestBrowser, link: string) {
  return customerOrderSchema.parse((await guest.get(`/api/sale-links/${link}`).expect(200)).body);
}

export async function checkoutOf(guest: TestBrowser, link: string): Promise<string> {
  const answer = await guest.post(`/api/sale-links/${link}/checkout`).set(...key());
  if (answer.status !== 201) throw new Error(JSON.stringify(answer.body));
  return String(answer.body.url);
}

export async function readSale(owner: TestBrowser, saleId: string) {
  return saleSchema.parse((await owner.get(`/api/sales/${saleId}`).expect(200)).body);
}

/** Something the workshop does with a sale, by what it sees now. */
export async function act(owner: TestBrowser, saleId: string, what: string, body?: object) {
  const { revision } = await readSale(owner, saleId);
  const sent = owner
    .post(`/api/sales/${saleId}/${what}`)
    .set(...key())
    .set('if-match', `"${revision}"`);
  return body === undefined ? sent : sent.send(body);
}

export async function readBooks(owner: TestBrowser) {
  return ledgerSchema.parse((await owner.get('/api/ledger').expect(200)).body);
}

/** The books balance to the cent and the piece. */
export async function expectBalance(owner: TestBrowser): Promise<void> {
  const { money, units } = await readBooks(owner);
  expect(money.difference.amountMinor).toBe(0);
  expect(money.proof.books).toEqual(money.proof.sales);
  expect(units.difference).toBe(0);
}
