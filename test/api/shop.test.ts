import { randomUUID } from 'node:crypto';
import { draftSchema, partDetailSchema } from '@foldwright/shared/contracts/parts';
import { listingSchema } from '@foldwright/shared/contracts/shop';
import { shopCardSchema, shopListingSchema } from '@foldwright/shared/contracts/storefront';
import sharp from 'sharp';
import * as z from 'zod/mini';
import type { Commerce } from '../support/commerce';
import { quoteFor, releaseBracket, startCommerce } from '../support/commerce';
import { plainJpeg } from '../support/jpeg';
import { TestBrowser, addPerson, addWorkshop } from '../support/people';
import { SHOP, addHardware, addKit, offerFor, openShop, publish, receive } from '../support/shop';

jest.setTimeout(90_000);

describe('a workshop’s shop', () => {
  let test: Commerce;
  let workshop: string;
  let owner: TestBrowser;
  let guest: TestBrowser;
  let partId: string;
  let revisionId: string;
  let hardwareId: string;

  beforeEach(async () => {
    test = await startCommerce();
    workshop = await addWorkshop(test.ownerUrl, 'Larkfield Cartworks');
    owner = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Imogen Harrow', { [workshop]: 'owner' }),
    );
    guest = await new TestBrowser(test.app).open();
    ({ partId, revisionId } = await releaseBracket(owner));
    hardwareId = await addHardware(owner);
  });
  afterEach(() => test.closeAll());

  const read = async (listingId: string) =>
    listingSchema.parse((await owner.get(`/api/shop/listings/${listingId}`).expect(200)).body);
  const cards = async (query = '') =>
    z
      .object({ cards: z.array(shopCardSchema) })
      .parse((await guest.get(`/api/shops/larkfield/listings${query}`).expect(200)).body).cards;

  /** Change a listing as its page does: all of it, against the revision that was seen. */
  async function change(listingId: string, changes: object) {
    const listing = await read(listingId);
    const { slug, title, summary, fits, doesNotFit, fittingSteps, finishes, leadTimeDays, price, revision } = listing;
    const what =
      listing.what.kind === 'bracket'
        ? { kind: 'bracket', revisionId: listing.what.bracket.revisionId }
        : { kind: 'kit', kitId: listing.what.kitId };
    return owner
      .put(`/api/shop/listings/${listingId}`)
      .set('if-match', `"${revision}"`)
      .send({
        ...{ what, slug, title, summary, fits, doesNotFit, fittingSteps, finishes, leadTimeDays },
        ...{ priceMinor: price.amountMinor, ...changes },
      });
  }

  async function releaseNext(): Promise<string> {
    const draft = draftSchema.parse((await owner.post(`/api/parts/${partId}/draft`).expect(201)).body);
    await owner
      .post(`/api/drafts/${draft.id}/release`)
      .set('idempotency-key', randomUUID())
      .send({ baseRevision: draft.revision, note: 'Next', acceptedCautionIds: [] })
      .expect(201);
    const part = partDetailSchema.parse((await owner.get(`/api/parts/${partId}`).expect(200)).body);
    const newest = part.revisions.find(({ id }) => id !== revisionId);
    if (newest === undefined) throw new Error('nothing newer is released');
    return newest.id;
  }

  it('is closed until its owner opens it, at an address that no other shop has', async () => {
    const { body: first } = await owner.get('/api/shop/settings').expect(200);
    expect(first).toMatchObject({ isOpen: false, headline: 'Larkfield Cartworks', revision: 1 });
    expect(first.questionsTo).toContain('imogen.harrow');
    await guest.get(`/api/shops/${first.slug}`).expect(404);

    await openShop(owner);
    const front = await guest.get('/api/shops/larkfield').expect(200);
    expect(front.body).toMatchObject({ name: 'Larkfield Cartworks', postage: { amountMinor: 690, currency: 'EUR' } });
    const stale = owner.put('/api/shop/settings').set('if-match', '"1"').send(SHOP);
    expect((await stale).body.type).toBe('/problems/stale-row');

    const other = await addWorkshop(test.ownerUrl, 'Orchard Street Welding', 'OS');
    const neighbour = await new TestBrowser(test.app).signIn(
      await addPerson(test.ownerUrl, 'Petra Lowe', { [other]: 'owner' }),
    );
    await neighbour.get('/api/shop/settings').expect(200);
    const taken = await neighbour.put('/api/shop/settings').set('if-match', '"1"').send(SHOP);
    expect(taken.body).toMatchObject({ type: '/problems/already-exists', errors: [{ pointer: '/slug' }] });
  });

  it('shows what is published and nothing else', async () => {
    await openShop(owner);
    const input = {
      ...{ what: { kind: 'bracket', revisionId }, slug: 'regulator', title: 'Regulator bracket', summary: '' },
      ...{ fits: ' Rails 30 mm \n\nHoses up to 16 mm', doesNotFit: '', fittingSteps: '', priceMinor: 3400 },
      ...{ finishes: [{ finishId: 'bare', surchargeMinor: 150 }], leadTimeDays: 9 },
    };
    const key = randomUUID();
    const create = (body: object, idempotencyKey = key) =>
      owner.post('/api/shop/listings').set('idempotency-key', idempotencyKey).send(body);
    const { body: created } = await create(input).expect(201);
    expect((await create(input)).body).toEqual(created);
    expect((await create({ ...input, title: 'Other' })).body.type).toBe('/problems/already-exists');
    expect((await create(input, randomUUID())).body).toMatchObject({
      type: '/problems/already-exists',
      errors: [{ pointer: '/slug' }],
    });
    expect(await cards()).toEqual([]);
    await guest.get('/api/shops/larkfield/listings/regulator').expect(404);

    const state = (to: string, revision: number) =>
      owner.put(`/api/shop/listings/${created.id}/state`).set('if-match', `"${revision}"`).send({ state: to });
    await state('published', 1).expect(200);
    expect(await cards()).toMatchObject([{ slug: 'regulator', from: { amountMinor: 3550 }, isOnShelf: false }]);
    const shown = await guest.get('/api/shops/larkfield/listings/regulator').expect(200);
    const listing = shopListingSchema.parse(shown.body);
    expect(listing).toMatchObject({
      fits: ['Rails 30 mm', 'Hoses up to 16 mm'],
      doesNotFit: [],
      availability: [{ finishId: 'bare', onShelf: 0, leavesInDays: 10 }],
      pieces: [{ kind: 'bracket', name: 'Regulator bracket', letter: 'A', finishId: null, quantity: 1 }],
    });
    const [piece] = listing.pieces;
    const size = piece?.kind === 'bracket' ? Object.values(piece.sizeMm).sort((a, b) => a - b) : [];
    // An L of 80 and 40 by 60, measured over its outside.
    expect(size.map(Math.round)).toEqual([40, 60, 80]);

    expect((await state('withdrawn', 1)).body.type).toBe('/problems/stale-row');
    await state('withdrawn', 2).expect(200);
    expect(await cards()).toEqual([]);
    await guest.get('/api/shops/larkfield/listings/regulator').expect(404);
  });

  it('takes no listing for nothing, in no finish or one twice, or at an address that can’t be one', async () => {
    const wrong = [
      ['/priceMinor', { priceMinor: 0 }],
      ['/finishes', { finishes: [0, 100].map((surchargeMinor) => ({ finishId: 'bare', surchargeMinor })) }],
      ['/finishes', { finishes: [] }],
      ['/slug', { slug: 'two words' }],
    ] as const;
    for (const [pointer, changes] of wrong) {
      const refused = publish(owner, { kind: 'bracket', revisionId }, changes);
      await expect(refused).rejects.toThrow(`"errors":[{"pointer":"${pointer}"`);
    }
  });

  it('says what a listing costs and leaves, and keeps selling the revision it names', async () => {
    await openShop(owner);
    const listingId = await publish(owner, { kind: 'bracket', revisionId });
    expect(await read(listingId)).toMatchObject({ margin: null, cost: { each: null }, isBehind: false });
    const quote = await quoteFor(owner, revisionId, [1]);
    const each = quote.breaks[0]?.each.amountMinor ?? 0;
    await owner
      .put(`/api/parts/${partId}/hardware`)
      .send({ hardware: [{ hardwareId, quantity: 3 }] })
      .expect(200);
    // 34.00 holds 6.36 of tax at 23 %; three screws at 18 cents.
    expect(await read(listingId)).toMatchObject({
      cost: { each: { amountMinor: each + 54 } },
      margin: { amountMinor: 3400 - 636 - each - 54 },
    });

    const newer = await releaseNext();
    const behind = await read(listingId);
    expect(behind.isBehind).toBe(true);
    expect(behind.what).toMatchObject({ bracket: { revisionId, letter: 'A' } });
    await await change(listingId, { what: { kind: 'bracket', revisionId: newer } });
    const moved = await read(listingId);
    expect(moved).toMatchObject({ isBehind: false, what: { bracket: { revisionId: newer, letter: 'B' } } });
    const lines = [{ listingId, finishId: 'bare', quantity: 1 }];
    expect((await offerFor(guest, lines)).lines[0]?.contents).toEqual([
      '1 × Regulator bracket, revision B, bare, deburred',
      '3 × Socket screw M6 × 20, ISO 4762',
    ]);
  });

  it('finds by every word that is typed, whatever its accents, and by kind', async () => {
    await openShop(owner);
    const kitId = await addKit(owner, [
      { kind: 'bracket', revisionId, finishId: null, quantity: 1 },
      { kind: 'hardware', hardwareId, quantity: 2 },
    ]);
    await publish(owner, { kind: 'bracket', revisionId }, { title: 'Regulator bracket', summary: 'For a café cart' });
    await publish(owner, { kind: 'kit', kitId }, { title: 'Two-pump water kit', fits: 'Rails 170 mm apart' });
    const titles = async (query: string) => (await cards(query)).map(({ title }) => title);
    expect(await titles('')).toEqual(['Two-pump water kit', 'Regulator bracket']);
    expect(await titles('?words=rails+PUMP')).toEqual(['Two-pump water kit']);
    expect(await titles('?words=cafe')).toEqual(['Regulator bracket']);
    expect(await titles('?words=pump+regulator')).toEqual([]);
    expect(await titles('?kind=bracket')).toEqual(['Regulator bracket']);
    expect((await cards('?kind=kit'))[0]?.pieces).toHaveLength(1);
  });

  it('counts no piece twice, within a kit, within a cart, and for hardware', async () => {
    await openShop(owner);
    const kitId = await addKit(owner, [
      { kind: 'bracket', revisionId, finishId: null, quantity: 2 },
      { kind: 'bracket', revisionId, finishId: 'bare', quantity: 1 },
      { kind: 'hardware', hardwareId, quantity: 4 },
    ]);
    const kit = await publish(owner, { kind: 'kit', kitId });
    const single = await publish(owner, { kind: 'bracket', revisionId });
    await receive(owner, { kind: 'bracket', revisionId, finishId: 'bare' }, 7);
    await receive(owner, { kind: 'hardware', hardwareId }, 8);
    const shelf = async (...lines: { listingId: string; finishId: string; quantity: number }[]) =>
      (await offerFor(guest, lines)).lines.map(({ fromShelf }) => fromShelf);
    const bare = (listingId: string, quantity: number) => ({ listingId, finishId: 'bare', quantity });
    // In bare metal a kit takes three brackets: seven make two kits, and leave one.
    expect(await shelf(bare(kit, 3))).toEqual([2]);
    expect(await shelf(bare(kit, 2), bare(single, 5))).toEqual([2, 1]);
    expect(await shelf(bare(single, 5), bare(kit, 2))).toEqual([5, 0]);
    expect(await shelf(bare(single, 1), bare(single, 2))).toEqual([3]);
    // In moss only the third of the kit is there.
    expect(await shelf({ listingId: kit, finishId: 'powder-moss', quantity: 1 })).toEqual([0]);
    await receive(owner, { kind: 'bracket', revisionId, finishId: 'bare' }, 20);
    // Now it is the screws that run out.
    expect(await shelf(bare(kit, 9))).toEqual([2]);
  });

  it('shows photos without what the camera wrote into them, and only of what is published', async () => {
    await openShop(owner);
    const listingId = await publish(owner, { kind: 'bracket', revisionId });
    const withPlace = await sharp(await plainJpeg())
      .withExif({ IFD0: { Copyright: 'somebody' }, IFD3: { GPSLatitude: '53/1 20/1 0/1' } })
      .jpeg()
      .toBuffer();
    const add = (file: Buffer) =>
      owner
        .post(`/api/shop/listings/${listingId}/photos`)
        .field({ description: 'On the cart' })
        .attach('file', file, 'cart.jpg');
    const { body } = await add(withPlace).expect(201);
    const [photo] = listingSchema.parse(body).photos;
    expect(photo).toMatchObject({ description: 'On the cart' });
    const address = `/api/shops/larkfield/photos/${photo?.id}`;
    const shown = await guest.get(address).buffer(true).expect(200);
    expect(shown.headers['content-type']).toBe('image/jpeg');
    expect((await sharp(Buffer.from(shown.body)).metadata()).exif).toBeUndefined();
    expect((await cards())[0]?.photoId).toBe(photo?.id);
    expect((await add(Buffer.from('not a picture'))).status).toBeGreaterThanOrEqual(400);

    await owner
      .put(`/api/shop/listings/${listingId}/state`)
      .set('if-match', `"${(await read(listingId)).revision}"`)
      .send({ state: 'withdrawn' })
      .expect(200);
    await guest.get(address).expect(404);
    const { body: bared } = await owner.delete(`/api/shop/listings/${listingId}/photos/${photo?.id}`).expect(200);
    expect(bared.photos).toEqual([]);
    await owner.delete(`/api/shop/listings/${listingId}/photos/${photo?.id}`).expect(404);
  });
});
